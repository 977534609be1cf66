//! The budget: how wrong the words are over the envelope, and which stage and source it is.

use num_complex::Complex;
use stagebits_kernel::Word;

use crate::comparison::{Comparison, ComparisonPoint, Split};
use crate::constants::Constants;
use crate::envelope::{Effort, Envelope, Point, Survey};
use crate::plan::{Accuracy, Plan, Switches};

/// Largest closure that the rounding of `f64` can account for.
pub const CLOSURE_LIMIT: f64 = 1e-12;

/// How many of the worst points the local ascent starts from.
const ASCENTS: usize = 12;

/// Largest and root mean square of the magnitudes of something over an envelope.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Spread {
    /// Largest magnitude.
    pub worst: f64,
    squares: f64,
    count: u64,
}

impl Spread {
    fn take(&mut self, error: Complex<f64>) {
        self.worst = self.worst.max(magnitude(error));
        self.squares += error.norm_sqr();
        self.count += 1;
    }

    fn merge(&mut self, later: Self) {
        self.worst = self.worst.max(later.worst);
        self.squares += later.squares;
        self.count += later.count;
    }

    /// Root mean square; zero of nothing.
    pub fn rms(&self) -> f64 {
        (self.squares / self.count.max(1) as f64).sqrt()
    }
}

/// |z|; infinite where it is not a number, so that a comparison that failed is the worst of all.
fn magnitude(z: Complex<f64>) -> f64 {
    if z.is_finite() {
        z.norm()
    } else {
        f64::INFINITY
    }
}

/// One line of a budget.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Contribution {
    /// What it adds to ΔΓ at the worst point.
    pub at_worst: Complex<f64>,
    /// Its size over the envelope.
    pub spread: Spread,
}

/// The error of one word length over an envelope.
#[derive(Clone, Debug, PartialEq)]
pub struct Budget {
    /// Word length in bits.
    pub word_bits: u32,
    /// Points and seed asked for.
    pub effort: Effort,
    /// Points of the envelope evaluated: at least as many as asked for.
    pub surveyed: u64,
    /// Points evaluated, those of the ascent included.
    pub evaluations: u64,
    /// Where the error is largest.
    pub worst: Point,
    /// The error there, taken apart.
    pub split: Split,
    /// The whole error: at the worst point, and over the points before the ascent.
    pub total: Contribution,
    /// Rounding the load.
    pub load: Contribution,
    /// Per stage, radio side first, by [`crate::comparison::StageSource::ALL`].
    pub stages: Vec<[Contribution; 4]>,
    /// Per stage, its sources added up point by point.
    pub by_stage: Vec<Contribution>,
    /// By [`crate::comparison::StageSource::ALL`], the stages added up point by point.
    pub by_source: [Contribution; 4],
    /// Reading Γ.
    pub readout: Contribution,
    /// Largest |sum of contributions − total| of any point.
    pub closure: f64,
}

impl Budget {
    /// Largest |ΔΓ| found.
    pub fn worst_error(&self) -> f64 {
        magnitude(self.total.at_worst)
    }

    /// Whether the largest |ΔΓ| found is good enough.
    pub fn meets(&self, accuracy: Accuracy) -> bool {
        self.worst_error() <= accuracy.gamma
    }
}

/// Works out the budget of `plan` in words of type `W`.
pub fn budget<W: Word>(plan: &Plan, exact: &Constants<f64>, effort: Effort) -> Budget {
    let comparison = Comparison::<W>::new(plan, exact);
    let envelope = Envelope::new(plan);
    let mut tally = envelope.run(
        effort,
        &BudgetSurvey {
            comparison: &comparison,
            plan,
        },
    );
    let mut evaluations = tally.total.count;
    let at = |point: &Point| comparison.at_state(point.hertz, &point.switches);
    let error = |point: Point| magnitude(at(&point).error(point.load));
    let mut worst = tally.worst[0];
    for (index, (_, start)) in tally.worst.iter().enumerate() {
        let seed = effort.seed.wrapping_add(index as u64);
        let (point, value, tried) = envelope.ascend(*start, seed, error);
        evaluations += tried;
        if value > worst.0 {
            worst = (value, point);
        }
    }
    let split = at(&worst.1).split(worst.1.load);
    tally.closure = tally.closure.max(split.closure());
    tally.finish(W::BITS, effort, evaluations, worst.1, split)
}

struct BudgetSurvey<'a, W> {
    comparison: &'a Comparison<'a, W>,
    plan: &'a Plan,
}

/// What is added up over the points.
struct Tally {
    /// The worst point of each of the worst frequencies, worst first.
    worst: Vec<(f64, Point)>,
    total: Spread,
    load: Spread,
    stages: Vec<[Spread; 4]>,
    by_stage: Vec<Spread>,
    by_source: [Spread; 4],
    readout: Spread,
    closure: f64,
}

impl<W: Word> Survey for BudgetSurvey<'_, W> {
    type Prepared = ComparisonPoint<W>;
    type Kept = Tally;

    fn prepare(&self, hertz: u32, switches: &Switches) -> Self::Prepared {
        self.comparison.at_state(hertz, switches)
    }

    fn empty(&self) -> Tally {
        let stages = self.plan.stages.len();
        Tally {
            worst: Vec::new(),
            total: Spread::default(),
            load: Spread::default(),
            stages: vec![Default::default(); stages],
            by_stage: vec![Spread::default(); stages],
            by_source: Default::default(),
            readout: Spread::default(),
            closure: 0.0,
        }
    }

    fn take(&self, prepared: &Self::Prepared, point: Point, kept: &mut Tally) {
        let split = prepared.split(point.load);
        kept.closure = kept.closure.max(split.closure());
        kept.total.take(split.total);
        kept.load.take(split.load);
        kept.readout.take(split.readout);
        for (spreads, stage) in kept.stages.iter_mut().zip(&split.stages) {
            for (spread, part) in spreads.iter_mut().zip(stage) {
                spread.take(*part);
            }
        }
        for (spread, sum) in kept.by_stage.iter_mut().zip(by_stage(&split)) {
            spread.take(sum);
        }
        for (spread, sum) in kept.by_source.iter_mut().zip(by_source(&split)) {
            spread.take(sum);
        }
        // within one frequency only the worst load is kept
        let error = magnitude(split.total);
        match kept.worst.first_mut() {
            Some(worst) if worst.0 >= error => {}
            Some(worst) => *worst = (error, point),
            None => kept.worst.push((error, point)),
        }
    }

    fn merge(&self, kept: &mut Tally, later: Tally) {
        kept.closure = kept.closure.max(later.closure);
        kept.total.merge(later.total);
        kept.load.merge(later.load);
        kept.readout.merge(later.readout);
        let pairs = kept
            .stages
            .iter_mut()
            .flatten()
            .zip(later.stages.into_iter().flatten());
        let sums = kept.by_stage.iter_mut().zip(later.by_stage);
        let sources = kept.by_source.iter_mut().zip(later.by_source);
        for (spread, other) in pairs.chain(sums).chain(sources) {
            spread.merge(other);
        }
        kept.worst.extend(later.worst);
        // stable: among equals the earlier frequency stays first
        kept.worst.sort_by(|a, b| b.0.total_cmp(&a.0));
        kept.worst.truncate(ASCENTS);
    }
}

impl Tally {
    fn finish(
        self,
        word_bits: u32,
        effort: Effort,
        evaluations: u64,
        worst: Point,
        split: Split,
    ) -> Budget {
        let line = |at_worst, spread| Contribution { at_worst, spread };
        let lines = |parts: &[Complex<f64>; 4], spreads: [Spread; 4]| {
            std::array::from_fn(|source| line(parts[source], spreads[source]))
        };
        Budget {
            word_bits,
            effort,
            surveyed: self.total.count,
            evaluations,
            worst,
            total: line(split.total, self.total),
            load: line(split.load, self.load),
            readout: line(split.readout, self.readout),
            stages: split
                .stages
                .iter()
                .zip(self.stages)
                .map(|(parts, spreads)| lines(parts, spreads))
                .collect(),
            by_stage: by_stage(&split)
                .zip(self.by_stage)
                .map(|(sum, spread)| line(sum, spread))
                .collect(),
            by_source: lines(&by_source(&split), self.by_source),
            closure: self.closure,
            split,
        }
    }
}

fn by_stage(split: &Split) -> impl Iterator<Item = Complex<f64>> {
    split.stages.iter().map(|stage| stage.iter().sum())
}

fn by_source(split: &Split) -> [Complex<f64>; 4] {
    std::array::from_fn(|source| split.stages.iter().map(|stage| stage[source]).sum())
}

/// Share of a contribution in the whole error at a point: its component along the total, over the
/// total. Shares of all contributions sum to 1.
pub fn share(contribution: Complex<f64>, total: Complex<f64>) -> f64 {
    if total.norm_sqr() == 0.0 {
        return 0.0;
    }
    (contribution * total.conj()).re / total.norm_sqr()
}

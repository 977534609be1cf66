//! The budget: how wrong the words are over the envelope, and which stage and source it is.

use num_complex::Complex;
use stagebits_kernel::Word;

use crate::comparison::{Comparison, ComparisonPoint, Split};
use crate::constants::Constants;
use crate::envelope::{Effort, Envelope, Point, Survey};
use crate::plan::{Accuracy, Plan, Switches};
use crate::spread::{Spread, WorstPoints, magnitude};

/// Largest closure that the rounding of `f64` can account for.
pub const CLOSURE_LIMIT: f64 = 1e-12;

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
    let at = |point: &Point| comparison.at_state(point.hertz, &point.switches);
    let error = |point: Point| magnitude(at(&point).error(point.load));
    let summit = tally.worst.climb(&envelope, effort.seed, error);
    let evaluations = tally.total.count() + summit.evaluations;
    let split = at(&summit.point).split(summit.point.load);
    tally.closure = tally.closure.max(split.closure());
    tally.finish(W::BITS, effort, evaluations, summit.point, split)
}

struct BudgetSurvey<'a, W> {
    comparison: &'a Comparison<'a, W>,
    plan: &'a Plan,
}

/// What is added up over the points.
struct Tally {
    worst: WorstPoints,
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
            worst: WorstPoints::default(),
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
        kept.worst.take(magnitude(split.total), point);
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
        kept.worst.merge(later.worst);
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
            surveyed: self.total.count(),
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

//! The size: which word length is long enough, and what keeps the next shorter one from it.
//!
//! Every word length and `f32` see the same points, at which the reference is evaluated once; each
//! then climbs from its own worst points. A length's figures are those of [`crate::budget`] with the
//! same effort.

use std::ops::RangeInclusive;

use num_complex::Complex;
use rayon::prelude::*;
use stagebits_kernel::{Gamma, Word};

use crate::arithmetic::{Arithmetic, Block, Single, to_complex, with_word};
use crate::budget::share;
use crate::comparison::{Comparison, Split, StageSource};
use crate::constants::Constants;
use crate::envelope::{Effort, Envelope, Point, Survey};
use crate::plan::{Accuracy, Plan, Switches};
use crate::reference::{FrequencyPoint, Reference};
use crate::spread::{Spread, WorstPoints, magnitude};
use crate::theory;

/// The word lengths tried, in bits.
pub const WORD_BITS: RangeInclusive<u32> = 10..=32;

/// Word lengths that cores have, and the kernel with them.
const FIRMWARE_WORD_BITS: [u32; 2] = [16, 32];

/// What numbers are made of.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Format {
    /// Block fixed point in words of this many bits.
    Block(u32),
    /// IEEE 754 binary32.
    Single,
}

/// One format over the envelope.
#[derive(Clone, Debug, PartialEq)]
pub struct Candidate {
    /// The format.
    pub format: Format,
    /// |ΔΓ| over the points before the ascent.
    pub spread: Spread,
    /// Largest |ΔΓ| found, those of the ascent included.
    pub worst_error: f64,
    /// Where that is.
    pub worst: Point,
    /// Points of the ascent.
    pub ascent: u64,
    /// Root mean square of |ΔΓ| by [`theory`]; none for `f32`, whose errors are relative ones.
    pub theory: Option<f64>,
}

impl Candidate {
    /// Whether the largest |ΔΓ| found is good enough.
    pub fn meets(&self, accuracy: Accuracy) -> bool {
        self.worst_error <= accuracy.gamma
    }
}

/// All formats over an envelope.
#[derive(Clone, Debug, PartialEq)]
pub struct Sizing {
    /// Points and seed asked for.
    pub effort: Effort,
    /// Points of the envelope evaluated: at least as many as asked for.
    pub surveyed: u64,
    /// Every length of [`WORD_BITS`], from short to long.
    pub words: Vec<Candidate>,
    /// The same walk in `f32`.
    pub single: Candidate,
    /// The longest words that are too short, if any are.
    pub too_short: Option<TooShort>,
    /// Largest |ΔΓ| that is good enough.
    accuracy: Accuracy,
}

/// What is wrong with words that are too short, at their worst point.
#[derive(Clone, Debug, PartialEq)]
pub struct TooShort {
    /// Word length in bits.
    pub word_bits: u32,
    /// Largest |ΔΓ| found.
    pub worst_error: f64,
    /// Where that is.
    pub worst: Point,
    /// The error there, taken apart.
    pub split: Split,
}

/// Where most of an error comes from.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Culprit {
    /// Index of the stage, radio side first.
    pub stage: usize,
    /// Its share of the whole error: see [`share`].
    pub stage_share: f64,
    /// What in that stage.
    pub source: StageSource,
    /// The share of that alone.
    pub source_share: f64,
}

impl Sizing {
    /// All formats, words from short to long and `f32` last.
    pub fn formats(&self) -> impl Iterator<Item = &Candidate> {
        self.words.iter().chain([&self.single])
    }

    /// Points of the ascents of all formats.
    pub fn ascent(&self) -> u64 {
        self.formats().map(|candidate| candidate.ascent).sum()
    }

    /// The words with the smallest worst error, the shorter of equals.
    pub fn best(&self) -> Option<&Candidate> {
        let errors =
            |one: &&Candidate, other: &&Candidate| one.worst_error.total_cmp(&other.worst_error);
        self.words.iter().min_by(errors)
    }

    /// The shortest words that are good enough and so are all longer ones.
    pub fn recommended(&self) -> Option<&Candidate> {
        let meeting = |candidate: &&Candidate| candidate.meets(self.accuracy);
        self.words.iter().rev().take_while(meeting).last()
    }

    /// The shortest words that firmware has and that are as good.
    pub fn in_firmware(&self) -> Option<&Candidate> {
        let least = self.recommended()?.format;
        let Format::Block(least) = least else {
            return None;
        };
        let bits = FIRMWARE_WORD_BITS.into_iter().find(|&bits| bits >= least)?;
        let format = Format::Block(bits);
        self.words.iter().find(|words| words.format == format)
    }
}

impl TooShort {
    /// The stage with the largest share of the error, and in it the source with the largest.
    pub fn culprit(&self) -> Culprit {
        let total = self.split.total;
        let stages = self.split.stages.iter().enumerate();
        let (stage, stage_share, sources) = stages
            .map(|(index, sources)| (index, share(sources.iter().sum(), total), sources))
            .max_by(|one, other| one.1.total_cmp(&other.1))
            .expect("a chain has a stage");
        let (source, source_share) = StageSource::ALL
            .into_iter()
            .zip(sources.map(|contribution| share(contribution, total)))
            .max_by(|one, other| one.1.total_cmp(&other.1))
            .expect("a stage has sources");
        Culprit {
            stage,
            stage_share,
            source,
            source_share,
        }
    }
}

/// Tries every format on `plan`, whose constants are `exact`.
pub fn size(plan: &Plan, exact: &Constants<f64>, effort: Effort) -> Sizing {
    let words = WORD_BITS.map(|bits| (Format::Block(bits), with_word!(bits, block(exact))));
    let single: Box<dyn Walker> = Box::new(Single::new(exact));
    let formats: Vec<_> = words.chain([(Format::Single, single)]).collect();
    let survey = SizeSurvey {
        reference: Reference::new(plan),
        walkers: formats.iter().map(|(_, walker)| &**walker).collect(),
    };
    let envelope = Envelope::new(plan);
    let tally = envelope.run(effort, &survey);
    let surveyed = tally[0].spread.count();
    let mut candidates: Vec<_> = formats
        .par_iter()
        .zip(tally)
        .map(|((format, walker), found)| {
            let error = |point: Point| {
                let Point {
                    hertz,
                    switches,
                    load,
                } = point;
                let reference = survey.reference.at_state(f64::from(hertz), &switches);
                let exact = reference.input_gamma(to_complex(load));
                magnitude(walker.at_state(hertz, &switches).gamma(load) - exact)
            };
            let summit = found.worst.climb(&envelope, effort.seed, error);
            Candidate {
                format: *format,
                spread: found.spread,
                worst_error: summit.error,
                worst: summit.point,
                ascent: summit.evaluations,
                theory: match format {
                    Format::Block(_) => Some((found.variances / surveyed as f64).sqrt()),
                    Format::Single => None,
                },
            }
        })
        .collect();
    let single = candidates.pop().expect("f32 comes last");
    let too_short = candidates
        .iter()
        .zip(WORD_BITS)
        .filter(|(candidate, _)| !candidate.meets(plan.accuracy))
        .last()
        .map(|(candidate, word_bits)| TooShort {
            word_bits,
            worst_error: candidate.worst_error,
            worst: candidate.worst,
            split: with_word!(word_bits, split(plan, exact, candidate.worst)),
        });
    Sizing {
        effort,
        surveyed,
        words: candidates,
        single,
        too_short,
        accuracy: plan.accuracy,
    }
}

fn split<W: Word>(plan: &Plan, exact: &Constants<f64>, point: Point) -> Split {
    Comparison::<W>::new(plan, exact)
        .at_state(point.hertz, &point.switches)
        .split(point.load)
}

fn block<W: Word>(exact: &Constants<f64>) -> Box<dyn Walker> {
    Box::new(Block::<W>::new(exact))
}

/// A chain in a format of any kind.
trait Walker: Sync {
    fn at_state(&self, hertz: u32, switches: &Switches) -> Box<dyn WalkerPoint>;
}

/// A [`Walker`] at one frequency.
trait WalkerPoint {
    /// Γ at the input for a load.
    fn gamma(&self, load: Gamma) -> Complex<f64>;
    /// Variance of its error by [`theory`], 0 where there is none.
    fn variance(&self, load: Gamma) -> f64;
}

struct BlockPoint<W: Word>(<Block<W> as Arithmetic>::Point);

impl<W: Word> Walker for Block<W> {
    fn at_state(&self, hertz: u32, switches: &Switches) -> Box<dyn WalkerPoint> {
        Box::new(BlockPoint::<W>(Arithmetic::at_state(self, hertz, switches)))
    }
}

impl<W: Word> WalkerPoint for BlockPoint<W> {
    fn gamma(&self, load: Gamma) -> Complex<f64> {
        Block::<W>::gamma(&self.0, load)
    }

    fn variance(&self, load: Gamma) -> f64 {
        theory::variance(&self.0, load)
    }
}

struct SinglePoint(<Single as Arithmetic>::Point);

impl Walker for Single {
    fn at_state(&self, hertz: u32, switches: &Switches) -> Box<dyn WalkerPoint> {
        Box::new(SinglePoint(Arithmetic::at_state(self, hertz, switches)))
    }
}

impl WalkerPoint for SinglePoint {
    fn gamma(&self, load: Gamma) -> Complex<f64> {
        Single::gamma(&self.0, load)
    }

    fn variance(&self, _: Gamma) -> f64 {
        0.0
    }
}

struct SizeSurvey<'a> {
    reference: Reference<'a>,
    walkers: Vec<&'a dyn Walker>,
}

/// What is added up over the points for one format.
#[derive(Clone, Default)]
struct Found {
    spread: Spread,
    worst: WorstPoints,
    variances: f64,
}

impl Survey for SizeSurvey<'_> {
    type Prepared = (FrequencyPoint, Vec<Box<dyn WalkerPoint>>);
    type Kept = Vec<Found>;

    fn prepare(&self, hertz: u32, switches: &Switches) -> Self::Prepared {
        let reference = self.reference.at_state(f64::from(hertz), switches);
        let walkers = self.walkers.iter();
        let points = walkers.map(|walker| walker.at_state(hertz, switches));
        (reference, points.collect())
    }

    fn empty(&self) -> Vec<Found> {
        vec![Found::default(); self.walkers.len()]
    }

    fn take(&self, (reference, points): &Self::Prepared, point: Point, kept: &mut Vec<Found>) {
        let exact = reference.input_gamma(to_complex(point.load));
        for (walker, found) in points.iter().zip(kept) {
            let error = walker.gamma(point.load) - exact;
            found.spread.take(error);
            found.worst.take(magnitude(error), point);
            found.variances += walker.variance(point.load);
        }
    }

    fn merge(&self, kept: &mut Vec<Found>, later: Vec<Found>) {
        for (found, later) in kept.iter_mut().zip(later) {
            found.spread.merge(later.spread);
            found.worst.merge(later.worst);
            found.variances += later.variances;
        }
    }
}

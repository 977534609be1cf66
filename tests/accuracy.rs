//! How accurate the firmware's words are over the envelopes of the shipped examples, and that the
//! budget of it is in order.

use std::path::Path;

use num_complex::Complex;
use rayon::ThreadPoolBuilder;
use stagebits::arithmetic::{Arithmetic, Single, to_complex};
use stagebits::budget::{Budget, budget};
use stagebits::chain_file::read;
use stagebits::comparison::{Comparison, ComparisonPoint};
use stagebits::constants::{self, Constants};
use stagebits::envelope::{Effort, Envelope, Point, Survey};
use stagebits::plan::{Plan, Switches};
use stagebits::reference::{FrequencyPoint, Reference};
use stagebits_kernel::{Bits, Word};

const BUOY: &str = "tide-gauge-buoy";
const METER: &str = "handheld-impedance-meter";
const STATION: &str = "shore-station";

const EFFORT: Effort = Effort {
    points: 100_000,
    seed: 1,
};

/// A shipped example with its constants.
fn example(name: &str) -> (Plan, Constants<f64>) {
    let folder = Path::new(env!("CARGO_MANIFEST_DIR")).join("../examples");
    let plan = read(&folder.join(name).with_extension("toml"));
    let plan = plan.unwrap_or_else(|fault| panic!("{fault}"));
    let exact = constants::exact(&plan);
    (plan, exact)
}

fn buoy<W: Word>() -> Budget {
    let (plan, exact) = example(BUOY);
    budget::<W>(&plan, &exact, EFFORT)
}

/// Worst |ΔΓ| of the buoy in words of type `W`, and what keeps the figure from being too easy:
/// a budget that looked at nothing would show no error at all.
fn worst_is_within<W: Word>(limit: f64) {
    let budget = buoy::<W>();
    let worst = budget.worst_error();
    assert!(worst <= limit, "{} bits: {worst:e}", W::BITS);
    assert!(worst >= limit / 10.0, "{} bits: {worst:e}", W::BITS);
    assert!(budget.evaluations > EFFORT.points);
}

#[test]
fn buoy_in_32_bits() {
    worst_is_within::<i32>(3e-8);
}

#[test]
fn buoy_in_24_bits() {
    worst_is_within::<Bits<24>>(8e-6);
}

#[test]
fn buoy_in_16_bits() {
    worst_is_within::<i16>(1.5e-3);
}

/// Largest |ΔΓ| of the kernel's stages and walk in `f32`.
struct SingleSurvey<'a> {
    reference: Reference<'a>,
    single: Single,
}

impl SingleSurvey<'_> {
    fn error(prepared: &<Self as Survey>::Prepared, point: Point) -> f64 {
        let (reference, single) = prepared;
        let exact = reference.input_gamma(to_complex(point.load));
        (Single::gamma(single, point.load) - exact).norm()
    }
}

impl Survey for SingleSurvey<'_> {
    type Prepared = (FrequencyPoint, <Single as Arithmetic>::Point);
    type Kept = f64;

    fn prepare(&self, hertz: u32, switches: &Switches) -> Self::Prepared {
        let reference = self.reference.at_state(f64::from(hertz), switches);
        (reference, self.single.at_state(hertz, switches))
    }

    fn empty(&self) -> f64 {
        0.0
    }

    fn take(&self, prepared: &Self::Prepared, point: Point, kept: &mut f64) {
        *kept = kept.max(Self::error(prepared, point));
    }

    fn merge(&self, kept: &mut f64, later: f64) {
        *kept = kept.max(later);
    }
}

/// 31 significant bits against 24: the same walk in `f32` is far worse at the same points.
#[test]
fn single_precision_is_thirty_times_worse_than_32_bits() {
    let (plan, exact) = example(BUOY);
    let single = Envelope::new(&plan).run(
        EFFORT,
        &SingleSurvey {
            reference: Reference::new(&plan),
            single: Single::new(&exact),
        },
    );
    let words = buoy::<i32>().total.spread.worst;
    assert!(single >= 30.0 * words, "{single:e} against {words:e}");
}

/// The contributions of every point, added up stage by stage and source by source, against the
/// error taken from the two results themselves: what is left over at most.
struct Sums<'a, W> {
    comparison: Comparison<'a, W>,
    reference: Reference<'a>,
}

impl<W: Word> Survey for Sums<'_, W> {
    type Prepared = (ComparisonPoint<W>, FrequencyPoint);
    type Kept = f64;

    fn prepare(&self, hertz: u32, switches: &Switches) -> Self::Prepared {
        let reference = self.reference.at_state(f64::from(hertz), switches);
        (self.comparison.at_state(hertz, switches), reference)
    }

    fn empty(&self) -> f64 {
        0.0
    }

    fn take(&self, (point, reference): &Self::Prepared, at: Point, kept: &mut f64) {
        let split = point.split(at.load);
        let total = point.word_gamma(at.load) - reference.input_gamma(to_complex(at.load));
        let stages = total - split.load - split.readout;
        let by_stage = split.stages.iter().map(|stage| stage.iter().sum());
        let by_source = (0..4).map(|source| split.stages.iter().map(|s| s[source]).sum());
        for sum in [added(by_stage), added(by_source)] {
            self.merge(kept, (sum - stages).norm());
        }
    }

    fn merge(&self, kept: &mut f64, later: f64) {
        // unlike the larger of the two, this keeps what is not a number
        if later.is_nan() || later > *kept {
            *kept = later;
        }
    }
}

fn added(parts: impl Iterator<Item = Complex<f64>>) -> Complex<f64> {
    parts.sum()
}

/// Rounding of `f64`, far below the smallest contribution that anybody would look at.
const CLOSURE: f64 = 1e-12;

fn contributions_close<W: Word>(name: &str) {
    let (plan, exact) = example(name);
    let sums = Sums {
        comparison: Comparison::<W>::new(&plan, &exact),
        reference: Reference::new(&plan),
    };
    let left = Envelope::new(&plan).run(EFFORT, &sums);
    assert!(left <= CLOSURE, "{name}, {} bits: {left:e}", W::BITS);

    let budget = budget::<W>(&plan, &exact, EFFORT);
    let closure = budget.closure;
    assert!(closure <= CLOSURE, "{name}, {} bits: {closure:e}", W::BITS);
    let total = budget.total.at_worst - budget.load.at_worst - budget.readout.at_worst;
    for lines in [&budget.by_stage[..], &budget.by_source[..]] {
        let sum = added(lines.iter().map(|line| line.at_worst));
        let left = (sum - total).norm();
        assert!(left <= CLOSURE, "{name}, {} bits: {left:e}", W::BITS);
    }
}

#[test]
fn contributions_to_the_buoy_close() {
    contributions_close::<i16>(BUOY);
    contributions_close::<i32>(BUOY);
}

#[test]
fn contributions_to_the_meter_close() {
    contributions_close::<i16>(METER);
    contributions_close::<i32>(METER);
}

#[test]
fn contributions_to_the_station_close() {
    contributions_close::<i16>(STATION);
    contributions_close::<i32>(STATION);
}

/// Figures depend on the points and the seed alone.
#[test]
fn budget_is_the_same_on_any_number_of_threads() {
    let effort = Effort {
        points: 20_000,
        ..EFFORT
    };
    let on = |threads, effort| {
        let (plan, exact) = example(BUOY);
        let pool = ThreadPoolBuilder::new().num_threads(threads).build();
        let pool = pool.expect("a pool of threads");
        pool.install(|| budget::<i32>(&plan, &exact, effort))
    };
    let one = on(1, effort);
    assert_eq!(one, on(2, effort));
    assert_eq!(one, on(5, effort));
    let other = Effort { seed: 2, ..effort };
    assert_ne!(one.total, on(2, other).total);
}

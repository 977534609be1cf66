//! The envelope: which frequencies, loads and states of banks are tried, and the search for the
//! worst of them.
//!
//! A run of n points takes about √n frequencies, the band's grid first and seeded random ones
//! after, and at each of them loads from a fixed pattern and seeded random ones. A chain with banks
//! shares the points of a frequency out over about as many states as there are loads in each: all
//! steps off, all on, and seeded random ones. From the worst points found, local ascent goes on.
//! Where there is one load for each frequency, all of the points are frequencies, or states of
//! banks at these. Each frequency has a random stream of its own and results are put together in
//! the order of the frequencies, so that the figures depend on the seed and the number of points
//! alone, not on the number of threads.

mod states;

use std::f64::consts::TAU;

use num_complex::Complex;
use rand_chacha::ChaCha8Rng;
use rand_chacha::rand_core::{Rng, SeedableRng};
use rayon::prelude::*;
use stagebits_kernel::Gamma;

use crate::arithmetic::{to_complex, to_gamma};
use crate::plan::{Band, Loads, Plan, Switches};
use crate::reference;
use states::States;

/// What to try.
#[derive(Clone, Debug)]
pub struct Envelope {
    band: Band,
    loads: LoadSet,
    states: States,
}

#[derive(Clone, Debug)]
enum LoadSet {
    /// All |Γ| up to this radius.
    Disc(f64),
    /// These and no others.
    List(Vec<Gamma>),
    /// One for each frequency: that of these loads, referred to this many ohms.
    ByFrequency(Loads, f64),
}

/// How thoroughly to try.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Effort {
    /// Number of points before the ascent, at least 1.
    pub points: u64,
    /// Seed of the random points.
    pub seed: u64,
}

/// A frequency with a load and a state of the banks.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Point {
    /// Frequency in hertz.
    pub hertz: u32,
    /// Load, referred to R0.
    pub load: Gamma,
    /// Which steps of the banks are on.
    pub switches: Switches,
}

/// What is done with the points of one frequency.
pub trait Survey: Sync {
    /// What depends on the frequency and the state of the banks alone.
    type Prepared;
    /// What is kept of one frequency's points; parts are merged in order.
    type Kept: Send;

    /// Prepares a frequency in a state of the banks.
    fn prepare(&self, hertz: u32, switches: &Switches) -> Self::Prepared;
    /// An empty record.
    fn empty(&self) -> Self::Kept;
    /// Takes in one point.
    fn take(&self, prepared: &Self::Prepared, point: Point, kept: &mut Self::Kept);
    /// Adds the record of a later frequency.
    fn merge(&self, kept: &mut Self::Kept, later: Self::Kept);
}

impl Envelope {
    /// The envelope that a plan asks for.
    pub fn new(plan: &Plan) -> Self {
        let loads = match &plan.loads {
            Loads::SwrUpTo(swr) => LoadSet::Disc(reference::gamma_magnitude_from_swr(*swr)),
            Loads::Impedances(impedances) => LoadSet::List(
                impedances
                    .iter()
                    .map(|&(r, x)| {
                        let impedance = Complex::new(r, x);
                        to_gamma(reference::gamma_from_impedance(impedance, plan.reference))
                    })
                    .collect(),
            ),
            by_frequency @ (Loads::Measured(_) | Loads::SeriesModel(_)) => {
                LoadSet::ByFrequency(by_frequency.clone(), plan.reference)
            }
        };
        Self {
            band: plan.band,
            loads,
            states: States::of(plan),
        }
    }

    /// Shows every point to the survey.
    pub fn run<S: Survey>(&self, effort: Effort, survey: &S) -> S::Kept {
        let frequencies = self.frequency_count(effort.points);
        let (states, loads) = self.state_and_load_count(effort.points.div_ceil(frequencies));
        (0..frequencies as usize)
            .into_par_iter()
            .map(|index| {
                let index = index as u64;
                let mut random = ChaCha8Rng::seed_from_u64(effort.seed);
                random.set_stream(index);
                let hertz = self.frequency(index, &mut random);
                let mut kept = survey.empty();
                for state in 0..states {
                    let switches = self.states.draw(state, &mut random);
                    let prepared = survey.prepare(hertz, &switches);
                    for load in 0..loads {
                        let load = self.load(hertz, load, loads, &mut random);
                        let point = Point {
                            hertz,
                            load,
                            switches,
                        };
                        survey.take(&prepared, point, &mut kept);
                    }
                }
                kept
            })
            // merged in order and a few at a time: memory does not grow with the points
            .fold_chunks(64, || None, |sum, kept| Some(join(survey, sum, kept)))
            .collect::<Vec<_>>()
            .into_iter()
            .flatten()
            .fold(None, |sum, kept| Some(join(survey, sum, kept)))
            .unwrap_or_else(|| survey.empty())
    }

    /// Climbs from `start` towards larger values of `error`; returns the highest point, its value
    /// and the number of evaluations.
    ///
    /// Random steps of a size that halves after a run of failures, frequency and load by turns, and
    /// now and then a step of a bank switched over.
    pub fn ascend(
        &self,
        start: Point,
        seed: u64,
        error: impl Fn(Point) -> f64,
    ) -> (Point, f64, u64) {
        const FAILURES: u32 = 12;
        const SMALLEST_STEP: f64 = 1e-6;
        let mut random = ChaCha8Rng::seed_from_u64(seed);
        random.set_stream(u64::MAX);
        let (mut best, mut highest) = (start, error(start));
        let (mut step, mut failures, mut evaluations) = (0.05, 0, 1);
        while step > SMALLEST_STEP {
            let candidate = self.neighbour(best, step, &mut random);
            let value = error(candidate);
            evaluations += 1;
            if value > highest {
                (best, highest, failures) = (candidate, value, 0);
            } else {
                failures += 1;
                if failures == FAILURES {
                    (step, failures) = (step / 2.0, 0);
                }
            }
        }
        (best, highest, evaluations)
    }

    fn frequency_count(&self, points: u64) -> u64 {
        let root = match &self.loads {
            LoadSet::ByFrequency(..) if self.states.is_single() => points,
            _ => (points as f64).sqrt().ceil() as u64,
        };
        let span = u64::from(self.band.to - self.band.from) + 1;
        root.max(u64::from(self.band.points))
            .min(points)
            .min(span.max(1))
            .max(1)
    }

    /// Over how many states, and loads in each, the points of one frequency are shared out.
    fn state_and_load_count(&self, points: u64) -> (u64, u64) {
        match &self.loads {
            LoadSet::ByFrequency(..) if self.states.is_single() => (1, 1),
            LoadSet::ByFrequency(..) => (points, 1),
            _ if self.states.is_single() => (1, points),
            _ => {
                let states = (points as f64).sqrt().ceil() as u64;
                (states, points.div_ceil(states))
            }
        }
    }

    /// The grid first, random frequencies after.
    fn frequency(&self, index: u64, random: &mut ChaCha8Rng) -> u32 {
        let Band { from, to, points } = self.band;
        if index < u64::from(points) {
            return self.band.grid(index as u32);
        }
        from + (unit(random) * f64::from(to - from)).round() as u32
    }

    /// A third of the disc's loads on rings and spokes, a third random on the rim, the rest
    /// random over the area; the list in turn; or the only one at this frequency.
    fn load(&self, hertz: u32, index: u64, count: u64, random: &mut ChaCha8Rng) -> Gamma {
        match &self.loads {
            LoadSet::ByFrequency(loads, reference) => only_load(loads, *reference, hertz),
            LoadSet::List(list) => list[(index % list.len() as u64) as usize],
            LoadSet::Disc(radius) => {
                let pattern = count / 3;
                let gamma = if index == 0 {
                    Complex::new(0.0, 0.0)
                } else if index < pattern {
                    // the golden angle spreads points evenly over a disc
                    let share = index as f64 / (pattern - 1).max(1) as f64;
                    let golden = TAU * (3.0 - 5.0_f64.sqrt()) / 2.0;
                    Complex::from_polar(radius * share.sqrt(), golden * index as f64)
                } else {
                    let magnitude = if index < 2 * pattern {
                        1.0
                    } else {
                        unit(random).sqrt()
                    };
                    Complex::from_polar(radius * magnitude, TAU * unit(random))
                };
                to_gamma(gamma)
            }
        }
    }

    fn neighbour(&self, from: Point, step: f64, random: &mut ChaCha8Rng) -> Point {
        let mut point = from;
        let span = f64::from(self.band.to - self.band.from);
        let mut signed = || 2.0 * unit(random) - 1.0;
        let (turn, along, across) = (signed(), signed(), signed());
        if turn > 0.0 || matches!(self.loads, LoadSet::ByFrequency(..)) {
            let moved = f64::from(from.hertz) + (step * span * along).round();
            let band = f64::from(self.band.from)..=f64::from(self.band.to);
            point.hertz = moved.clamp(*band.start(), *band.end()) as u32;
        }
        match &self.loads {
            LoadSet::ByFrequency(loads, reference) => {
                point.load = only_load(loads, *reference, point.hertz);
            }
            LoadSet::Disc(radius) => {
                let moved = to_complex(from.load) + Complex::new(along, across) * step;
                let shrink = (radius / moved.norm()).min(1.0);
                point.load = to_gamma(moved * shrink);
            }
            LoadSet::List(list) => {
                if across > 0.5 {
                    let pick = (unit(random) * list.len() as f64) as usize;
                    point.load = list[pick.min(list.len() - 1)];
                }
            }
        }
        self.states.flip(&mut point.switches, random);
        point
    }
}

/// The only load at a frequency of the band.
fn only_load(loads: &Loads, reference: f64, hertz: u32) -> Gamma {
    let gamma = reference::load_gamma(loads, reference, f64::from(hertz));
    to_gamma(gamma.expect("a plan's measured load covers its band"))
}

fn join<S: Survey>(survey: &S, sum: Option<S::Kept>, kept: S::Kept) -> S::Kept {
    match sum {
        None => kept,
        Some(mut sum) => {
            survey.merge(&mut sum, kept);
            sum
        }
    }
}

/// A random number from 0 (included) to 1 (excluded).
fn unit(random: &mut ChaCha8Rng) -> f64 {
    (random.next_u64() >> 11) as f64 / (1_u64 << 53) as f64
}

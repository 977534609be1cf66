//! The size of an error over an envelope, and the search for where it is largest.

use num_complex::Complex;

use crate::envelope::{Envelope, Point};

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
    pub(crate) fn take(&mut self, error: Complex<f64>) {
        let magnitude = magnitude(error);
        self.worst = self.worst.max(magnitude);
        self.squares += magnitude * magnitude;
        self.count += 1;
    }

    pub(crate) fn merge(&mut self, later: Self) {
        self.worst = self.worst.max(later.worst);
        self.squares += later.squares;
        self.count += later.count;
    }

    /// Root mean square; zero of nothing.
    pub fn rms(&self) -> f64 {
        (self.squares / self.count.max(1) as f64).sqrt()
    }

    /// How many there were.
    pub fn count(&self) -> u64 {
        self.count
    }
}

/// |z|; infinite where it is not a number, so that a comparison that failed is the worst of all.
pub(crate) fn magnitude(z: Complex<f64>) -> f64 {
    if z.is_finite() {
        z.norm()
    } else {
        f64::INFINITY
    }
}

/// The worst point of each of the worst frequencies, worst first.
#[derive(Clone, Debug, Default, PartialEq)]
pub(crate) struct WorstPoints(Vec<(f64, Point)>);

/// A point with the error there, and how many points were tried to find it.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(crate) struct Summit {
    pub(crate) error: f64,
    pub(crate) point: Point,
    pub(crate) evaluations: u64,
}

impl WorstPoints {
    /// Takes in one of the points of a frequency; the worst of them is kept.
    pub(crate) fn take(&mut self, error: f64, point: Point) {
        match self.0.first_mut() {
            Some(worst) if worst.0 >= error => {}
            Some(worst) => *worst = (error, point),
            None => self.0.push((error, point)),
        }
    }

    /// Adds the points of later frequencies.
    pub(crate) fn merge(&mut self, later: Self) {
        self.0.extend(later.0);
        // stable: among equals the earlier frequency stays first
        self.0.sort_by(|a, b| b.0.total_cmp(&a.0));
        self.0.truncate(ASCENTS);
    }

    /// Climbs from each of the points to where `error` is larger; the highest point of all.
    ///
    /// # Panics
    /// If no point has been taken in.
    pub(crate) fn climb(
        &self,
        envelope: &Envelope,
        seed: u64,
        error: impl Fn(Point) -> f64,
    ) -> Summit {
        let (highest, point) = self.0[0];
        let mut summit = Summit {
            error: highest,
            point,
            evaluations: 0,
        };
        for (index, (_, start)) in self.0.iter().enumerate() {
            let seed = seed.wrapping_add(index as u64);
            let (point, value, tried) = envelope.ascend(*start, seed, &error);
            summit.evaluations += tried;
            if value > summit.error {
                (summit.error, summit.point) = (value, point);
            }
        }
        summit
    }
}

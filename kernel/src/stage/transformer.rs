//! Ideal transformers.

use super::Step;
use crate::real::{Complex, Real};

/// An ideal transformer: the voltage at the source side is `ratio` times that at the load side.
#[derive(Clone, Copy, PartialEq, Debug)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Transformer<R> {
    /// Turns ratio n, source side to load side.
    pub ratio: R,
    /// 1/n
    pub inverse: R,
}

impl<R: Real> Transformer<R> {
    #[inline]
    pub(super) fn step(&self) -> Step<Complex<R>> {
        let real = |re: R| Complex { re, im: R::ZERO };
        Step::Stretch {
            ratio: real(self.ratio),
            inverse: real(self.inverse),
        }
    }
}

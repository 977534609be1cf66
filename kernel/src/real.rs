//! What a number must offer so that the stages can be resolved with it.

use core::fmt::Debug;
use core::ops::{Add, Sub};

/// The numbers in which a stage turns its constants and the frequency into immittances.
///
/// [`crate::Scalar`] is the fixed-point one. With the feature `float`, `f32` and `f64` are here,
/// too, so that a core with a floating-point unit runs the very same stages.
pub trait Real: Copy + Debug + PartialEq + Send + Sync + 'static {
    /// Zero.
    const ZERO: Self;
    /// One.
    const ONE: Self;
    /// Stands in for infinity: an immittance as good as an open or short circuit.
    const HUGE: Self;
    /// A whole number of hertz.
    fn from_hertz(hertz: u32) -> Self;
    /// Product.
    fn times(self, other: Self) -> Self;
    /// Sum.
    fn plus(self, other: Self) -> Self;
    /// The number with the other sign.
    fn negated(self) -> Self;
    /// The number times 2^power.
    fn times_power_of_two(self, power: i32) -> Self;
    /// 1/x; of zero a very large positive number or infinity.
    fn reciprocal(self) -> Self;
    /// √x; zero where x < 0.
    fn square_root(self) -> Self;
    /// Sine and cosine of angle · π/2 / 2^63, an angle within ±π/2; the cosine is not negative.
    fn sine_cosine(angle: i64) -> (Self, Self);
    /// Hyperbolic sine and cosine of x ≥ 0.
    fn hyperbolic(self) -> (Self, Self);
    /// Whether the number is zero.
    fn is_zero(self) -> bool;
    /// Whether 1/2 ≤ x < 2.
    fn is_near_one(self) -> bool;
    /// A number in a unit that up to sixteen share, so that they are soon added up in ever new
    /// selections.
    type Term: Copy
        + Debug
        + Default
        + PartialEq
        + Send
        + Sync
        + 'static
        + Add<Output = Self::Term>
        + Sub<Output = Self::Term>;
    /// The smallest power of two in units of which sixteen numbers up to this magnitude are added.
    fn unit(self) -> i32;
    /// The number in units of 2^unit, which is at least [`Real::unit`].
    fn term(self, unit: i32) -> Self::Term;
    /// The term in units 2^places times as large.
    fn coarser(term: Self::Term, places: u32) -> Self::Term;
    /// The number that is a sum of terms in units of 2^unit.
    fn from_term(term: Self::Term, unit: i32) -> Self;
    /// Difference.
    #[inline(always)]
    fn minus(self, other: Self) -> Self {
        self.plus(other.negated())
    }
}

/// A complex number.
#[derive(Clone, Copy, PartialEq, Eq, Debug, Default)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Complex<R> {
    /// Real part.
    pub re: R,
    /// Imaginary part.
    pub im: R,
}

impl<R> Complex<R> {
    /// The same with both parts converted.
    #[inline(always)]
    pub fn map<S>(self, mut convert: impl FnMut(R) -> S) -> Complex<S> {
        Complex {
            re: convert(self.re),
            im: convert(self.im),
        }
    }
}

impl<R: Real> Complex<R> {
    /// Zero.
    pub const ZERO: Self = Self {
        re: R::ZERO,
        im: R::ZERO,
    };

    /// Sum.
    #[inline]
    pub(crate) fn plus(self, other: Self) -> Self {
        Self {
            re: self.re.plus(other.re),
            im: self.im.plus(other.im),
        }
    }

    /// Difference.
    #[inline]
    pub(crate) fn minus(self, other: Self) -> Self {
        Self {
            re: self.re.minus(other.re),
            im: self.im.minus(other.im),
        }
    }

    /// Product.
    #[inline]
    pub(crate) fn times(self, other: Self) -> Self {
        Self {
            re: self.re.times(other.re).minus(self.im.times(other.im)),
            im: self.re.times(other.im).plus(self.im.times(other.re)),
        }
    }

    /// Whether both parts are zero.
    #[inline]
    pub(crate) fn is_zero(self) -> bool {
        self.re.is_zero() && self.im.is_zero()
    }

    /// Product with a real number.
    #[inline]
    pub(crate) fn scaled(self, factor: R) -> Self {
        Self {
            re: self.re.times(factor),
            im: self.im.times(factor),
        }
    }

    /// 1/z; of zero a very large positive real number.
    ///
    /// A purely real or imaginary z takes one reciprocal and keeps its phase exactly.
    #[inline]
    pub(crate) fn reciprocal(self) -> Self {
        if self.im.is_zero() {
            return Self {
                re: self.re.reciprocal(),
                im: R::ZERO,
            };
        }
        if self.re.is_zero() {
            return Self {
                re: R::ZERO,
                im: self.im.reciprocal().negated(),
            };
        }
        let norm = self
            .re
            .times(self.re)
            .plus(self.im.times(self.im))
            .reciprocal();
        Self {
            re: self.re,
            im: self.im.negated(),
        }
        .scaled(norm)
    }
}

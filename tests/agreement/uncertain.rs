//! Numbers with a bound on how far the kernel's scalar may be from them.
//!
//! [`Uncertain`] is one more arithmetic for the kernel's stages: a value in `f64`, which stands for
//! the exact one, and the largest error that the errors stated in the kernel's documentation can
//! have led to. What each operation adds is its own rounding; what it was given is carried on with
//! the largest derivative over the range of its arguments.

use stagebits_kernel::Real;
use std::f64::consts::{FRAC_PI_2, TAU};
use std::ops::{Add, Sub};

/// Half a unit of a scalar's last place over the scalar: what one operation adds at most.
const SCALAR: f64 = 1.0 / (1_u64 << 31) as f64;

/// Sine or cosine of the angle, the rounding of the angle included, absolute.
const CIRCULAR: f64 = 1.6 * SCALAR;

/// A line's angle, in radians: 2^-65 turns per hertz from the stored length, at less than 2^32 Hz.
const ANGLE: f64 = TAU * 0.25 * SCALAR;

/// Hyperbolic sine or cosine of x, over cosh x · (1 + x).
const HYPERBOLIC: f64 = 2.0 * SCALAR;

/// Stands in for the reciprocal of zero, as large as the reference's own.
const OPEN: f64 = stagebits::reference::IDEAL;

/// A number, and the largest distance of the kernel's own from it; infinite where the kernel may
/// be on either side of a pole.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub(crate) struct Uncertain {
    /// The exact number.
    pub(crate) value: f64,
    /// Bound of |kernel's − exact|.
    pub(crate) error: f64,
    /// Of a constant: the word that is stored. Else as good as `value`.
    nearest: f64,
}

impl Uncertain {
    /// A constant that the image stores in a word of `word_bits` bits, sign included: half a unit
    /// of its last place.
    pub(crate) fn constant(value: f64, word_bits: u32) -> Self {
        if value == 0.0 {
            return Self::ZERO;
        }
        let half_unit = (value.abs().log2().floor() - f64::from(word_bits - 1)).exp2();
        Self {
            value,
            error: half_unit,
            nearest: (value / half_unit / 2.0).round() * half_unit * 2.0,
        }
    }

    /// The result of an operation that was given an error and rounds once more.
    fn rounded(value: f64, error: f64) -> Self {
        Self {
            value,
            error: error + SCALAR * (value.abs() + error),
            nearest: value,
        }
    }

    /// Largest magnitude that the kernel's number may have.
    pub(crate) fn magnitude(self) -> f64 {
        self.value.abs() + self.error
    }
}

impl Real for Uncertain {
    const ZERO: Self = Self {
        value: 0.0,
        error: 0.0,
        nearest: 0.0,
    };
    const ONE: Self = Self {
        value: 1.0,
        error: 0.0,
        nearest: 1.0,
    };
    const HUGE: Self = Self {
        value: OPEN,
        error: f64::INFINITY,
        nearest: OPEN,
    };

    fn from_hertz(hertz: u32) -> Self {
        let exact = hertz < 1 << 31;
        Self {
            value: f64::from(hertz),
            error: if exact { 0.0 } else { 0.5 },
            nearest: f64::from(hertz),
        }
    }

    fn times(self, other: Self) -> Self {
        if self.is_zero() || other.is_zero() {
            return Self::ZERO;
        }
        let value = self.value * other.value;
        if self.error.is_infinite() || other.error.is_infinite() {
            return Self::rounded(value, f64::INFINITY);
        }
        let error = self.error * other.magnitude() + self.value.abs() * other.error;
        Self::rounded(value, error)
    }

    fn plus(self, other: Self) -> Self {
        if self.is_zero() {
            return other;
        }
        if other.is_zero() {
            return self;
        }
        Self::rounded(self.value + other.value, self.error + other.error)
    }

    fn negated(self) -> Self {
        Self {
            value: -self.value,
            nearest: -self.nearest,
            ..self
        }
    }

    fn times_power_of_two(self, power: i32) -> Self {
        let factor = f64::from(power).exp2();
        Self {
            value: self.value * factor,
            error: self.error * factor,
            nearest: self.nearest * factor,
        }
    }

    fn reciprocal(self) -> Self {
        let least = self.value.abs() - self.error;
        if least > 0.0 {
            // |1/(x + δ) − 1/x| = |δ| / (|x| |x + δ|)
            return Self::rounded(self.value.recip(), self.error / (self.value.abs() * least));
        }
        let value = if self.value == 0.0 {
            OPEN
        } else {
            self.value.recip()
        };
        Self {
            value,
            error: f64::INFINITY,
            nearest: value,
        }
    }

    fn square_root(self) -> Self {
        let least = (self.value - self.error).max(0.0);
        let root = self.value.sqrt();
        // |√(x + δ) − √x| = |δ| / (√x + √(x + δ))
        Self::rounded(root, self.error / (root + least.sqrt()))
    }

    fn sine_cosine(angle: i64) -> (Self, Self) {
        let angle = angle as f64 / (1_u64 << 63) as f64 * FRAC_PI_2;
        let (sine, cosine) = angle.sin_cos();
        let with = |value: f64, slope: f64| Self {
            value,
            error: CIRCULAR + ANGLE * (slope.abs() + ANGLE),
            nearest: value,
        };
        (with(sine, cosine), with(cosine, sine))
    }

    fn hyperbolic(self) -> (Self, Self) {
        let Self {
            value: x, error, ..
        } = self;
        let carried = (x + error).cosh() * error;
        let own = HYPERBOLIC * x.cosh() * (1.0 + x);
        let with = |value: f64| Self {
            value,
            error: carried + own,
            nearest: value,
        };
        (with(x.sinh()), with(x.cosh()))
    }

    fn is_zero(self) -> bool {
        self == Self::ZERO
    }

    /// The kernel has only the word.
    fn is_near_one(self) -> bool {
        (0.5..2.0).contains(&self.nearest)
    }

    // sums of terms are exact to far more places than any other operation
    type Term = Self;

    fn unit(self) -> i32 {
        0
    }

    fn term(self, _: i32) -> Self {
        self
    }

    fn coarser(term: Self, _: u32) -> Self {
        term
    }

    fn from_term(term: Self, _: i32) -> Self {
        term
    }
}

impl Add for Uncertain {
    type Output = Self;

    fn add(self, other: Self) -> Self {
        self.plus(other)
    }
}

impl Sub for Uncertain {
    type Output = Self;

    fn sub(self, other: Self) -> Self {
        self.minus(other)
    }
}

//! Scalars: numbers with a 32-bit mantissa and an exponent of their own.
//!
//! A point's frequency words, the constants of a chain and everything between them and the
//! immittances are scalars. Each operation rounds once, to the nearest with ties up.

use crate::product;
use crate::real::Real;
use crate::root;
use crate::word::round_shift;

/// The number mantissa · 2^exponent; 2^30 ≤ |mantissa| < 2^31, or both zero.
#[derive(Clone, Copy, PartialEq, Eq, Debug, Default)]
pub struct Scalar {
    mantissa: i32,
    exponent: i32,
}

/// Significant bits of a scalar, the sign not counted.
const SIGNIFICANT: u32 = 31;

impl Scalar {
    /// Zero.
    pub const ZERO: Self = Self {
        mantissa: 0,
        exponent: 0,
    };
    /// One.
    pub const ONE: Self = Self {
        mantissa: 1 << 30,
        exponent: -30,
    };
    /// Stands in for the reciprocal of zero: about 2^1000, beyond every immittance that a word
    /// length can tell from an open or short circuit.
    pub const HUGE: Self = Self {
        mantissa: i32::MAX,
        exponent: 970,
    };
    /// Largest magnitude of an exponent that [`Scalar::from_parts`] accepts.
    pub const EXPONENT_MAX: i32 = 500;

    /// The number mantissa · 2^exponent, or `None` if it is not normalised or the exponent is
    /// beyond ±[`Scalar::EXPONENT_MAX`].
    pub const fn from_parts(mantissa: i32, exponent: i32) -> Option<Self> {
        let magnitude = mantissa.unsigned_abs();
        let normal = magnitude >= 1 << 30 && magnitude < 1 << 31;
        let range = exponent >= -Self::EXPONENT_MAX && exponent <= Self::EXPONENT_MAX;
        if (normal && range) || (mantissa == 0 && exponent == 0) {
            Some(Self { mantissa, exponent })
        } else {
            None
        }
    }

    /// Mantissa: 0, or at least 2^30 and less than 2^31 in magnitude.
    pub const fn mantissa(self) -> i32 {
        self.mantissa
    }

    /// Exponent of two that the mantissa is multiplied by.
    pub const fn exponent(self) -> i32 {
        self.exponent
    }

    /// Whether this is zero.
    #[inline(always)]
    pub const fn is_zero(self) -> bool {
        self.mantissa == 0
    }

    /// value · 2^exponent, rounded to a scalar. |value| ≤ 2^63 − 1.
    #[inline]
    pub fn from_i64(value: i64, exponent: i32) -> Self {
        let bits = 64 - value.unsigned_abs().leading_zeros();
        if bits == 0 {
            return Self::ZERO;
        }
        if bits <= SIGNIFICANT {
            let left = SIGNIFICANT - bits;
            return Self {
                mantissa: (value << left) as i32,
                exponent: exponent - left as i32,
            };
        }
        let right = bits - SIGNIFICANT;
        Self::carry(round_shift(value, right), exponent + right as i32)
    }

    /// From a mantissa with 2^30 ≤ |mantissa| ≤ 2^31, where rounding may have carried into bit 31.
    #[inline(always)]
    fn carry(mantissa: i64, exponent: i32) -> Self {
        if mantissa.unsigned_abs() >> SIGNIFICANT != 0 {
            Self {
                mantissa: (mantissa >> 1) as i32,
                exponent: exponent + 1,
            }
        } else {
            Self {
                mantissa: mantissa as i32,
                exponent,
            }
        }
    }

    /// value · 2^exponent of a 32-bit integer, exact but for magnitudes of 2^31 and above.
    #[inline]
    pub fn from_i32(value: i32, exponent: i32) -> Self {
        Self::from_i64(value as i64, exponent)
    }

    /// The number times 2^power.
    #[inline(always)]
    pub const fn scaled(self, power: i32) -> Self {
        if self.is_zero() {
            self
        } else {
            Self {
                mantissa: self.mantissa,
                exponent: self.exponent + power,
            }
        }
    }

    /// The number in fixed point with `fraction_bits`, rounded half up; saturates at the ends of
    /// `i32`.
    #[inline]
    pub fn to_fixed(self, fraction_bits: i32) -> i32 {
        let left = self.exponent + fraction_bits;
        if left <= 0 {
            round_shift(self.mantissa as i64, left.unsigned_abs()) as i32
        } else if self.is_zero() {
            0
        } else if self.mantissa < 0 {
            i32::MIN
        } else {
            i32::MAX
        }
    }

    /// Whether this is below zero.
    #[inline(always)]
    pub const fn is_negative(self) -> bool {
        self.mantissa < 0
    }
}

impl Real for Scalar {
    const ZERO: Self = Self::ZERO;
    const ONE: Self = Self::ONE;
    const HUGE: Self = Self::HUGE;

    #[inline]
    fn from_hertz(hertz: u32) -> Self {
        Self::from_i64(hertz as i64, 0)
    }

    #[inline]
    fn times(self, other: Self) -> Self {
        // 2^60 ≤ |product| < 2^62 unless a factor is zero
        let product = product::signed(self.mantissa, other.mantissa);
        if product == 0 {
            return Self::ZERO;
        }
        let right = if product.unsigned_abs() >> 61 == 0 {
            30
        } else {
            31
        };
        Self::carry(
            round_shift(product, right),
            self.exponent + other.exponent + right as i32,
        )
    }

    #[inline]
    fn plus(self, other: Self) -> Self {
        if self.is_zero() {
            return other;
        }
        if other.is_zero() {
            return self;
        }
        let (large, small) = if self.exponent >= other.exponent {
            (self, other)
        } else {
            (other, self)
        };
        let distance = (large.exponent - small.exponent).unsigned_abs();
        // 31 guard bits: exact for distances up to 31; beyond that what is lost is below 2^-31 of
        // the larger mantissa's last place
        let guard = SIGNIFICANT;
        let sum = ((large.mantissa as i64) << guard)
            + (((small.mantissa as i64) << guard) >> distance.min(63));
        Self::from_i64(sum, large.exponent - guard as i32)
    }

    #[inline(always)]
    fn negated(self) -> Self {
        Self {
            mantissa: -self.mantissa,
            exponent: self.exponent,
        }
    }

    #[inline(always)]
    fn times_power_of_two(self, power: i32) -> Self {
        self.scaled(power)
    }

    #[inline]
    fn reciprocal(self) -> Self {
        if self.is_zero() {
            return Self::HUGE;
        }
        let magnitude = self.mantissa.unsigned_abs();
        // 1 / (m · 2^e) = (2^61 / m) · 2^(−61−e)
        let mantissa = if magnitude == 1 << 30 {
            // 2^61 / 2^30 = 2^31 needs one bit more than a mantissa has
            return Self {
                mantissa: self.mantissa,
                exponent: -60 - self.exponent,
            };
        } else {
            root::reciprocal(magnitude) as i32
        };
        Self {
            mantissa: if self.mantissa < 0 {
                -mantissa
            } else {
                mantissa
            },
            exponent: -61 - self.exponent,
        }
    }

    #[inline]
    fn square_root(self) -> Self {
        if self.mantissa <= 0 {
            return Self::ZERO;
        }
        // m · 2^e = (m · 2^(30 or 31)) · 2^(even), so that the root has 31 bits
        let odd = (self.exponent & 1) as u32;
        let root = root::square_root((self.mantissa as u64) << (30 + odd));
        Self::carry(root as i64, (self.exponent - 30 - odd as i32) >> 1)
    }

    #[inline]
    fn sine_cosine(angle: i64) -> (Self, Self) {
        let [sine, cosine] =
            crate::angle::sine_cosine(angle.unsigned_abs()).map(|part| Self::from_i64(part, -31));
        (if angle < 0 { sine.negated() } else { sine }, cosine)
    }

    #[inline]
    fn is_near_one(self) -> bool {
        !self.is_negative() && (self.exponent == -31 || self.exponent == -30)
    }

    #[inline]
    fn hyperbolic(self) -> (Self, Self) {
        crate::hyperbolic::sine_cosine(self)
    }

    #[inline(always)]
    fn is_zero(self) -> bool {
        self.mantissa == 0
    }

    /// Sixteen terms of up to 2^58 leave a sum two bits short of an overflow.
    type Term = i64;

    #[inline]
    fn unit(self) -> i32 {
        if self.is_zero() {
            return UNIT_MIN;
        }
        (self.exponent - TERM_GUARD).min(UNIT_MAX)
    }

    #[inline]
    fn term(self, unit: i32) -> i64 {
        if self.is_zero() {
            return 0;
        }
        let left = self.exponent - unit;
        if left > TERM_GUARD {
            // beyond what units are made for
            let most = (i32::MAX as i64) << TERM_GUARD;
            return if self.mantissa < 0 { -most } else { most };
        }
        if left >= 0 {
            return (self.mantissa as i64) << left;
        }
        round_shift(self.mantissa as i64, left.unsigned_abs())
    }

    #[inline]
    fn coarser(term: i64, places: u32) -> i64 {
        round_shift(term, places)
    }

    #[inline]
    fn from_term(term: i64, unit: i32) -> Self {
        Self::from_i64(term, unit)
    }
}

/// Bits of a term below those of the largest mantissa.
const TERM_GUARD: i32 = 27;
/// Unit of the terms where all numbers are zero: below that of every other.
const UNIT_MIN: i32 = i32::MIN / 2;
/// Unit of the terms of numbers of 2^32 and above, which are taken to be 2^32: no word length can
/// tell either from an open or short circuit.
const UNIT_MAX: i32 = 32 - TERM_GUARD - SIGNIFICANT as i32;

#[cfg(test)]
mod tests {
    use super::*;
    use proptest::prelude::*;

    fn value(s: Scalar) -> f64 {
        f64::from(s.mantissa) * 2.0_f64.powi(s.exponent)
    }

    fn normal() -> impl Strategy<Value = Scalar> {
        ((1_i32 << 30)..=i32::MAX, any::<bool>(), -80..80).prop_map(|(m, negative, exponent)| {
            Scalar {
                mantissa: if negative { -m } else { m },
                exponent,
            }
        })
    }

    fn is_normal(s: Scalar) -> bool {
        s == Scalar::ZERO || (1 << 30..1_u32 << 31).contains(&s.mantissa.unsigned_abs())
    }

    /// Half a unit in the last place of a scalar, relative to its smallest mantissa.
    const HALF_UNIT: f64 = 1.0 / (1_u64 << 31) as f64;

    proptest! {
        #[test]
        fn each_operation_rounds_once(a in normal(), b in normal()) {
            for (result, exact) in [
                (a.times(b), value(a) * value(b)),
                (a.plus(b), value(a) + value(b)),
                (a.reciprocal(), 1.0 / value(a)),
            ] {
                prop_assert!(is_normal(result));
                // f64 itself rounds the exact value by 2^-53
                let limit = exact.abs() * (HALF_UNIT + 1e-15);
                prop_assert!((value(result) - exact).abs() <= limit, "{a:?} {b:?} {result:?}");
            }
            if a.mantissa > 0 {
                let exact = value(a).sqrt();
                let root = a.square_root();
                prop_assert!(is_normal(root));
                prop_assert!((value(root) - exact).abs() <= exact * (HALF_UNIT + 1e-15));
            }
        }

        #[test]
        fn fixed_point_is_rounded_and_saturates(a in normal(), fraction in 0..40) {
            let exact = (value(a) * 2.0_f64.powi(fraction) + 0.5).floor();
            let expected = exact.clamp(f64::from(i32::MIN), f64::from(i32::MAX));
            prop_assert_eq!(f64::from(a.to_fixed(fraction)), expected);
        }
    }

    #[test]
    fn zero_and_its_reciprocal_stay_in_range() {
        assert_eq!(Scalar::ZERO.reciprocal(), Scalar::HUGE);
        assert_eq!(Scalar::ZERO.times(Scalar::HUGE), Scalar::ZERO);
        assert_eq!(Scalar::ZERO.plus(Scalar::ONE), Scalar::ONE);
        assert_eq!(Scalar::ONE.plus(Scalar::ONE.negated()), Scalar::ZERO);
        assert_eq!(Scalar::from_parts(1, 0), None);
        assert_eq!(Scalar::from_parts(i32::MIN, 0), None);
        assert_eq!(Scalar::from_parts(1 << 30, -30), Some(Scalar::ONE));
    }
}

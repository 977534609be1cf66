//! Logarithms in integers.

use crate::angle::horner;
use crate::product;
use crate::scalar::Scalar;
use crate::word::round_shift;

/// log2(1 + t) / t on 0 ≤ t ≤ 1: coefficients of t⁹ to t⁰ in 2^-30, minimax for t times the
/// polynomial; largest error 2^-29.7.
const RATIO: [i32; 10] = [
    -3_755_917,
    24_607_662,
    -75_665_679,
    150_123_604,
    -227_580_100,
    300_883_512,
    -385_599_311,
    516_177_135,
    -774_530_894,
    1_549_081_811,
];

impl Scalar {
    /// Bits after the binary point of [`Scalar::log2`].
    pub const LOG2_FRACTION_BITS: u32 = 24;

    /// log2 x in 2^-24, rounded to the nearest; saturates at ±128, where zero and everything below
    /// count as zero.
    ///
    /// Largest error 0.56 · 2^-24, tested at 10^6 values and at the ends of every power of two;
    /// exact for powers of two.
    pub fn log2(self) -> i32 {
        if self.mantissa() <= 0 {
            return i32::MIN;
        }
        // x = (1 + t) · 2^whole, t in 2^-31
        let whole = self.exponent() as i64 + 30;
        let t = (self.mantissa() - (1 << 30)) << 1;
        let fraction = product::signed(horner(t, &RATIO), t); // in 2^-61
        let log = (whole << Self::LOG2_FRACTION_BITS)
            + round_shift(fraction, 61 - Self::LOG2_FRACTION_BITS);
        log.clamp(i32::MIN as i64, i32::MAX as i64) as i32
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::testing::value;

    const UNIT: f64 = (1 << Scalar::LOG2_FRACTION_BITS) as f64;

    fn error(x: Scalar) -> f64 {
        (f64::from(x.log2()) - value(x).log2() * UNIT).abs()
    }

    /// The figure in the documentation of `log2`.
    #[test]
    fn logarithms_stay_within_the_stated_error() {
        let spaced = (0..1_000_000).map(|i| Scalar::from_i32((1 << 30) + i * 1_073 + i % 7, -30));
        let ends = (-128..128).flat_map(|exponent| {
            let mantissas = [1 << 30, (1 << 30) + 1, i32::MAX - 1, i32::MAX];
            mantissas.map(|mantissa| Scalar::from_i32(mantissa, exponent - 30))
        });
        let largest = spaced.chain(ends.filter(|x| value(*x) < 2.0_f64.powi(127)));
        let largest = largest.map(error).fold(0.0, f64::max);
        assert!(largest <= 0.56 && largest > 0.5, "{largest}");
    }

    #[test]
    fn powers_of_two_are_exact_and_order_is_kept() {
        for exponent in -127..127 {
            let power = Scalar::ONE.scaled(exponent);
            assert_eq!(power.log2(), exponent << Scalar::LOG2_FRACTION_BITS);
            let below = Scalar::from_i32(i32::MAX, exponent - 31);
            assert!(below.log2() <= power.log2() && below.log2() >= power.log2() - 1);
        }
        let mut last = 0;
        for i in 0..1_000_000 {
            let log = Scalar::from_i32((1 << 30) + i * 1_073, -30).log2();
            assert!(log >= last, "{i}");
            last = log;
        }
    }

    #[test]
    fn what_is_out_of_range_saturates() {
        for x in [
            Scalar::ZERO,
            Scalar::ONE.scaled(-200),
            Scalar::from_i32(-5, 0),
        ] {
            assert_eq!(x.log2(), i32::MIN, "{x:?}");
        }
        for x in [Scalar::HUGE, Scalar::ONE.scaled(128)] {
            assert_eq!(x.log2(), i32::MAX, "{x:?}");
        }
    }
}

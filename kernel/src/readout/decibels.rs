//! Decibels.

use crate::product;
use crate::scalar::Scalar;
use crate::word::round_shift;

/// A level in 2^-16 dB, rounded to the nearest.
#[derive(Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Debug)]
pub struct Decibels(i32);

impl Decibels {
    /// Bits after the binary point.
    pub const FRACTION_BITS: u32 = 16;
    /// Stands for infinity: the ratio to nothing at all.
    pub const MAX: Self = Self(i32::MAX);
    /// Stands for minus infinity: the ratio of nothing at all.
    pub const MIN: Self = Self(-i32::MAX);

    /// The level in 2^-16 dB.
    pub const fn bits(self) -> i32 {
        self.0
    }

    /// The level in thousandths of a decibel, rounded to the nearest.
    pub fn thousandths(self) -> i32 {
        round_shift(product::signed(self.0, 1_000), Self::FRACTION_BITS) as i32
    }
}

/// 10 log10 2 in 2^-29.
const PER_OCTAVE: i32 = 1_616_142_483;

impl Scalar {
    /// 10 log10 x, the level of a ratio of powers, rounded to the nearest.
    ///
    /// Within 0.51 · 2^-16 dB. Saturates at ±385 dB; [`Decibels::MIN`] for zero and below.
    pub fn decibels(self) -> Decibels {
        if self.mantissa() <= 0 {
            return Decibels::MIN;
        }
        let fraction_bits = Self::LOG2_FRACTION_BITS + 29 - Decibels::FRACTION_BITS;
        Decibels(round_shift(product::signed(self.log2(), PER_OCTAVE), fraction_bits) as i32)
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::testing::value;
    use proptest::prelude::*;

    proptest! {
        #[test]
        fn levels_stay_within_the_stated_error(mantissa in 1 << 30..=i32::MAX, exponent in -157..97) {
            let x = Scalar::from_parts(mantissa, exponent).unwrap();
            let exact = 10.0 * value(x).log10();
            let level = x.decibels();
            prop_assert!((f64::from(level.bits()) - exact * 65_536.0).abs() <= 0.51, "{exact}");
            // to thousandths: half of one and the error of the level
            let error = (f64::from(level.thousandths()) - exact * 1e3).abs();
            prop_assert!(error <= 0.5 + 0.51 * 1e3 / 65_536.0, "{exact}");
        }
    }

    #[test]
    fn the_ends_are_ordered() {
        let levels = [
            Scalar::ZERO.decibels(),
            Scalar::ONE.scaled(-400).decibels(),
            Scalar::ONE.decibels(),
            Scalar::HUGE.decibels(),
            Decibels::MAX,
        ];
        assert!(levels.is_sorted_by(|a, b| a < b), "{levels:?}");
        assert_eq!(levels[2].bits(), 0);
        assert_eq!(
            levels.map(|level| level.thousandths() / 1_000),
            [-32_768, -385, 0, 385, 32_768]
        );
    }
}

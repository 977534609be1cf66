//! Angles as binary turns, and their sine and cosine.
//!
//! A line's length in turns per hertz is a `u64` in units of 2^-64, so the angle at a frequency
//! is one wrapping product: whole turns fall off the top by themselves and what remains is right
//! to hertz · 2^-65 turns, however many turns long the line is.

use crate::product;
use crate::word::round_shift;

/// Electrical angle of a line in 2^-64 turns, whole turns left out. Exact.
#[inline]
pub(crate) fn turns(hertz: u32, turns_per_hertz: u64) -> u64 {
    let low = product::unsigned(hertz, turns_per_hertz as u32);
    let high = hertz.wrapping_mul((turns_per_hertz >> 32) as u32);
    low.wrapping_add((high as u64) << 32)
}

/// Position of an angle in 2^-64 turns within its half turn.
///
/// The result h stands for the angle θ = h · π/2 / 2^63, −π/2 ≤ θ < π/2, which differs from the
/// line's angle by a whole number of half turns. A half turn only changes the sign of the whole
/// state. Exact.
#[inline]
pub(crate) fn within_half_turn(turns: u64) -> i64 {
    (turns << 1) as i64
}

/// Whether the half turns that [`within_half_turn`] leaves out are odd in number.
///
/// An angle of a quarter turn and above is a half turn plus something negative. `rounding`, in
/// 2^-64 turns, is what the sine and cosine add before they drop bits: an angle just below a
/// quarter turn that rounds up to it is taken as a half turn away, and counts as such.
#[inline]
pub(crate) fn is_odd_half_turn(turns: u64, rounding: u64) -> bool {
    turns.wrapping_add((1 << 62) + rounding) >> 63 != 0
}

/// Half a unit of [`rounded`], in 2^-64 turns.
pub(crate) const ROUNDING: u64 = 1 << 30;

/// The angle in 32 bits, rounded half up; π/2 becomes −π/2, a half turn away.
#[inline]
pub(crate) fn rounded(half_angle: i64) -> i32 {
    (half_angle.wrapping_add(1 << 31) >> 32) as i32
}

/// Sine (signed, in 2^-31) and cosine (unsigned, in 2^-31) of h · π/4 / 2^31.
///
/// Minimax polynomials of degree 9 and 8. Largest error 1.15 units of 2^-31 for either, found over all 2^16 values of the high half word, all edges and 10^6 values
/// between. cos 0 = 2^31 exactly, and the sine is odd but for the rounding of ties.
#[inline]
pub(crate) fn sine_cosine(h: i32) -> (i32, u32) {
    // x² in 2^-31; the single value 2^31 at h = −2^31 is one unit too large for a signed word
    let square = round_shift(product::signed(h, h), 31).min(i32::MAX as i64) as i32;
    // in 2^-34, where the largest coefficient still fits
    let odd = horner(square, &[5_301, -628_292, 42_784_617, -1_387_197_330]);
    let slope = 1_686_629_713 + round_shift(product::signed(odd, square), 34) as i32;
    let sine = round_shift(product::signed(slope, h), 31) as i32;
    let tail = horner(square, &[121_336, -11_199_282, 544_750_554]); // in 2^-35
    let even = -1_324_675_872 + round_shift(product::signed(tail, square), 34) as i32;
    let drop = round_shift(product::signed(even, square), 32) as i32;
    (sine, (1_u32 << 31).wrapping_add_signed(drop))
}

/// The polynomial with these coefficients, highest first, at `x` in 2^-31; in their unit.
#[inline(always)]
pub(crate) fn horner(x: i32, coefficients: &[i32]) -> i32 {
    coefficients.iter().fold(0, |sum, c| {
        round_shift(product::signed(sum, x), 31) as i32 + c
    })
}

#[cfg(test)]
mod tests {
    use super::*;
    use std::f64::consts::{FRAC_PI_2, FRAC_PI_4};

    const UNIT: f64 = (1_u64 << 31) as f64;

    fn errors(h: i32) -> (f64, f64) {
        let angle = f64::from(h) / UNIT * FRAC_PI_4;
        let (sine, cosine) = sine_cosine(h);
        (
            (f64::from(sine) - angle.sin() * UNIT).abs(),
            (f64::from(cosine) - angle.cos() * UNIT).abs(),
        )
    }

    /// The figures in the documentation of `sine_cosine`.
    #[test]
    fn sine_and_cosine_stay_within_the_stated_error() {
        let words = (i16::MIN..=i16::MAX).map(|h| i32::from(h) << 16);
        let edges = [i32::MIN, i32::MIN + 1, -1, 0, 1, i32::MAX - 1, i32::MAX];
        let between = (0..1_000_000_u32).map(|i| i.wrapping_mul(4_292_761_991) as i32);
        let (mut sine, mut cosine) = (0.0_f64, 0.0_f64);
        for h in words.chain(edges).chain(between) {
            let (s, c) = errors(h);
            (sine, cosine) = (sine.max(s), cosine.max(c));
        }
        assert!(sine <= 1.15 && sine > 1.0, "{sine}");
        assert!(cosine <= 1.15 && cosine > 1.0, "{cosine}");
        assert_eq!(sine_cosine(0), (0, 1 << 31));
    }

    #[test]
    fn sine_is_odd_and_cosine_even() {
        for i in 0..100_000 {
            let h = i * 21_474 + i % 11;
            let ((s, c), (minus, same)) = (sine_cosine(h), sine_cosine(-h));
            assert!((s + minus).abs() <= 1, "{h}");
            assert_eq!(c, same, "{h}");
        }
    }

    /// Against the angle in exact integer arithmetic, for lines up to a thousand turns.
    #[test]
    fn angle_keeps_its_digits_over_many_turns() {
        for delay in [1e-12, 3.03e-9, 1e-7, 1e-6_f64] {
            let rate = (delay * 2.0_f64.powi(64)) as u64;
            for hertz in [1, 999, 1_800_000, 30_000_000, 1_000_000_007, u32::MAX] {
                let turns = u128::from(rate) * u128::from(hertz);
                // fraction of a half turn, as a signed number
                let half = ((turns << 1) as u64) as i64;
                assert_eq!(within_half_turn(super::turns(hertz, rate)), half);
                let expected = half as f64 / 2.0_f64.powi(63) * FRAC_PI_2;
                let h = rounded(half);
                let mut error = f64::from(h) / UNIT * FRAC_PI_2 - expected;
                error -= (error / (2.0 * FRAC_PI_2)).round() * 2.0 * FRAC_PI_2;
                let limit = std::f64::consts::TAU * 2.0_f64.powi(-34) * 1.000_001;
                assert!(error.abs() <= limit, "{delay} s at {hertz} Hz: {error}");
            }
        }
    }

    /// What is left of the angle plus the half turns taken off is the angle, to its rounding.
    #[test]
    fn half_turns_are_counted_across_every_quarter_turn() {
        let steps = [
            0,
            1,
            ROUNDING - 1,
            ROUNDING,
            ROUNDING + 1,
            2 * ROUNDING,
            1 << 40,
        ];
        for quarter in 0..4_u64 {
            for step in steps {
                for turns in [
                    (quarter << 62).wrapping_add(step),
                    (quarter << 62).wrapping_sub(step),
                ] {
                    let half = within_half_turn(turns);
                    // both in 2^-64 turns
                    let exact = half >> 1;
                    let short = i64::from(rounded(half)) << 31;
                    for (left, rounding) in [(exact, 0), (short, ROUNDING)] {
                        let odd = u64::from(is_odd_half_turn(turns, rounding));
                        let sum = (left as u64).wrapping_add(odd << 63);
                        let error = sum.wrapping_sub(turns) as i64;
                        assert!(error.unsigned_abs() <= rounding, "{turns:#x}");
                    }
                }
            }
        }
    }
}

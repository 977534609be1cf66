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
/// An angle of a quarter turn and above is a half turn plus something negative.
#[inline]
pub(crate) fn is_odd_half_turn(turns: u64) -> bool {
    turns.wrapping_add(1 << 62) >> 63 != 0
}

/// Sine and cosine, in 2^-31, of angle · π/2 / 2^63 for 0 ≤ angle ≤ 2^63.
///
/// Above π/4 the two change places. The angle is rounded to 2^-34 turns, half a unit of which
/// moves a result by 0.4 units; largest error of either with it: 1.6 units of 2^-31.
#[inline]
pub(crate) fn sine_cosine(angle: u64) -> [i64; 2] {
    const QUARTER: u64 = 1 << 62;
    let above = angle > QUARTER;
    let folded = if above { (QUARTER << 1) - angle } else { angle };
    let [sine, cosine] = within_octant(round_shift(folded as i64, 31).min(i32::MAX as i64) as i32);
    if above {
        [cosine, sine]
    } else {
        [sine, cosine]
    }
}

/// Sine and cosine, in 2^-31, of h · π/4 / 2^31 for 0 ≤ h < 2^31.
///
/// Minimax polynomials of degree 9 and 8. Largest error of either, found over all 2^15 values of
/// the high half word, the edges and 10^6 values between: 1.15 units. cos 0 = 2^31 exactly.
#[inline]
fn within_octant(h: i32) -> [i64; 2] {
    let square = round_shift(product::signed(h, h), 31) as i32;
    // in 2^-34, where the largest coefficient still fits
    let odd = horner(square, &[5_301, -628_292, 42_784_617, -1_387_197_330]);
    let slope = 1_686_629_713 + round_shift(product::signed(odd, square), 34) as i32;
    let sine = round_shift(product::signed(slope, h), 31);
    let tail = horner(square, &[121_336, -11_199_282, 544_750_554]); // in 2^-35
    let even = -1_324_675_872 + round_shift(product::signed(tail, square), 34) as i32;
    let drop = round_shift(product::signed(even, square), 32);
    [sine, (1 << 31) + drop]
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

    fn errors(exact: f64, [sine, cosine]: [i64; 2]) -> [f64; 2] {
        [
            (sine as f64 - exact.sin() * UNIT).abs(),
            (cosine as f64 - exact.cos() * UNIT).abs(),
        ]
    }

    /// The figure in the documentation of `within_octant`.
    #[test]
    fn octant_stays_within_the_stated_error() {
        let words = (0..=i16::MAX).map(|h| i32::from(h) << 16);
        let edges = [0, 1, 2, i32::MAX - 1, i32::MAX];
        let between = (0..1_000_000_u32).map(|i| (i.wrapping_mul(4_292_761_991) >> 1) as i32);
        let mut largest = [0.0_f64; 2];
        for h in words.chain(edges).chain(between) {
            let found = errors(f64::from(h) / UNIT * FRAC_PI_4, within_octant(h));
            largest = [largest[0].max(found[0]), largest[1].max(found[1])];
        }
        for error in largest {
            assert!(error <= 1.15 && error > 1.0, "{error}");
        }
        assert_eq!(within_octant(0), [0, 1 << 31]);
    }

    /// The figure in the documentation of `sine_cosine`, and its ends.
    #[test]
    fn quarter_turn_stays_within_the_stated_error() {
        let mut largest = 0.0_f64;
        let spaced = (0..=1_000_000_u64).map(|i| (i << 63) / 1_000_000);
        let around = (0..200).map(|i| (1 << 62) - (100 << 30) + (i << 30));
        for angle in spaced.chain(around).chain([0, 1, (1 << 63) - 1, 1 << 63]) {
            let exact = angle as f64 / 2.0_f64.powi(63) * FRAC_PI_2;
            for error in errors(exact, sine_cosine(angle)) {
                largest = largest.max(error);
            }
        }
        assert!(largest <= 1.6 && largest > 1.2, "{largest}");
        assert_eq!(sine_cosine(0), [0, 1 << 31]);
        assert_eq!(sine_cosine(1 << 63), [1 << 31, 0]);
    }

    /// Against exact integer arithmetic, for lines up to a thousand turns.
    #[test]
    fn angle_keeps_its_digits_over_many_turns() {
        for delay in [1e-12, 3.03e-9, 1e-7, 1e-6_f64] {
            let rate = (delay * 2.0_f64.powi(64)) as u64;
            for hertz in [1, 999, 1_800_000, 30_000_000, 1_000_000_007, u32::MAX] {
                let exact = u128::from(rate) * u128::from(hertz);
                assert_eq!(turns(hertz, rate), exact as u64);
            }
        }
    }

    /// What is left of the angle plus the half turns taken off is the angle.
    #[test]
    fn half_turns_are_counted_across_every_quarter_turn() {
        for quarter in 0..4_u64 {
            for step in [0, 1, 1 << 30, 1 << 40] {
                for turns in [
                    (quarter << 62).wrapping_add(step),
                    (quarter << 62).wrapping_sub(step),
                ] {
                    let left = within_half_turn(turns) >> 1;
                    let odd = u64::from(is_odd_half_turn(turns));
                    // an even angle loses its last bit in the half
                    assert!((left as u64).wrapping_add(odd << 63).abs_diff(turns) <= 1);
                }
            }
        }
    }
}

//! Hyperbolic sine and cosine of a line's loss.

use crate::angle::horner;
use crate::product;
use crate::real::Real;
use crate::scalar::Scalar;
use crate::word::round_shift;

/// log2 e in 2^-30.
const LOG2_E: i32 = 1_549_082_005;
/// Losses above this power of e (277 dB) count as this much: what is left is far below a word.
const POWERS_OF_TWO_MAX: i64 = 46;

/// Hyperbolic sine and cosine of x ≥ 0 (a negative x counts as zero).
///
/// With n = round(x · log2 e) and r the rest, |r| ≤ 1/2, minimax polynomials of degree 7 and 6
/// give sinh and cosh of r · ln 2, and 2^n is put in by shifts. Largest error of either: 2^-30 of
/// the cosine, tested over 10^6 values.
pub(crate) fn sine_cosine(x: Scalar) -> (Scalar, Scalar) {
    let powers = times_log2_e(x); // in 2^-32
    let whole = round_shift(powers, 32).min(POWERS_OF_TWO_MAX);
    // twice the rest lies in [−1, 1), so the rest in 2^-32 is that in 2^-31
    let rest = (powers - (whole << 32)).clamp(i32::MIN as i64, i32::MAX as i64) as i32;
    let square = round_shift(product::signed(rest, rest), 31).min(i32::MAX as i64) as i32;
    let odd = horner(square, &[514, 178_959, 29_798_542]);
    let slope = 744_261_118 + round_shift(product::signed(odd, square), 32) as i32;
    let sine = round_shift(product::signed(slope, rest), 31); // in 2^-31
    let even = horner(square, &[10_380, 2_581_822, 257_941_252]);
    let rise = round_shift(product::signed(even, square), 32); // in 2^-31
    let cosine = (1 << 31) + rise;
    if whole == 0 {
        return (Scalar::from_i64(sine, -31), Scalar::from_i64(cosine, -31));
    }
    // e^x = (cosh + sinh) 2^n, e^-x = (cosh − sinh) 2^-n; halved by the exponent
    let whole = whole as i32;
    let rising = Scalar::from_i64(cosine + sine, whole - 32);
    let falling = Scalar::from_i64(cosine - sine, -whole - 32);
    (rising.minus(falling), rising.plus(falling))
}

/// x · log2 e in 2^-32, at most just above [`POWERS_OF_TWO_MAX`].
fn times_log2_e(x: Scalar) -> i64 {
    if x.is_negative() {
        return 0;
    }
    let product = product::signed(x.mantissa(), LOG2_E); // in 2^(exponent − 30)
    let right = -2 - x.exponent();
    // beyond 2^6 the product's top bit stands at 2^38 or above
    if right < 23 {
        return if x.is_zero() {
            0
        } else {
            POWERS_OF_TWO_MAX << 32
        };
    }
    round_shift(product, right.unsigned_abs()).min(POWERS_OF_TWO_MAX << 32)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn value(s: Scalar) -> f64 {
        f64::from(s.mantissa()) * 2.0_f64.powi(s.exponent())
    }

    fn check(x: Scalar) {
        let (sine, cosine) = sine_cosine(x);
        let (exact_sine, exact_cosine) = (value(x).sinh(), value(x).cosh());
        // the argument in 2^-32 · ln 2 and its factor log2 e, relative 2^-31, act on e^x
        let limit = exact_cosine * 2.0_f64.powi(-30) * (1.0 + value(x));
        assert!(
            (value(sine) - exact_sine).abs() <= limit,
            "sinh {}: {}",
            value(x),
            value(sine)
        );
        assert!(
            (value(cosine) - exact_cosine).abs() <= limit,
            "cosh {}",
            value(x)
        );
    }

    #[test]
    fn sine_and_cosine_stay_within_the_stated_error() {
        for i in 0..1_000_000_i64 {
            check(Scalar::from_i64(i * 31_000_003 + 1, -40));
        }
        for exponent in -60..-26 {
            check(Scalar::from_i64(1_234_567_891, exponent));
        }
    }

    #[test]
    fn ends_of_the_range_are_finite() {
        assert_eq!(sine_cosine(Scalar::ZERO), (Scalar::ZERO, Scalar::ONE));
        let (sine, cosine) = sine_cosine(Scalar::HUGE);
        assert_eq!(sine, cosine);
        assert!(value(sine) > 2.0_f64.powi(44) && value(sine) < 2.0_f64.powi(48));
        assert_eq!(
            sine_cosine(Scalar::ONE.negated()),
            (Scalar::ZERO, Scalar::ONE)
        );
    }
}

//! Sine and cosine of the electrical length of a line.

use crate::plan::Line;
use std::f64::consts::TAU;

/// Sine and cosine of 2π·f·delay for `line` at `hertz`, both within about 2⁻⁵² absolute.
///
/// The number of turns is formed as an unevaluated sum of two `f64`, straight from length, velocity
/// factor and frequency, and whole quarter turns are taken off before the multiplication by 2π.
/// An exact quarter turn thus gives an exact zero.
pub(super) fn sin_cos(line: &Line, hertz: f64) -> (f64, f64) {
    let (turns, turns_low) = turns(line, hertz);
    let fraction = turns.fract();
    let quadrant = (4.0 * fraction).round();
    // Exact: both terms are multiples of the last place of the larger one, the difference is ≤ 1/8.
    let rest = (fraction - 0.25 * quadrant) + turns_low;
    let (sin, cos) = (TAU * rest).sin_cos();
    if quadrant == 1.0 {
        (cos, -sin)
    } else if quadrant == 2.0 {
        (-sin, -cos)
    } else if quadrant == 3.0 {
        (-cos, sin)
    } else {
        (sin, cos)
    }
}

/// Electrical length in turns (wavelengths) as a leading part and the rounding error left over.
fn turns(line: &Line, hertz: f64) -> (f64, f64) {
    let delay = line.delay();
    let speed = line.velocity * crate::plan::SPEED_OF_LIGHT;
    let speed_low = line.velocity.mul_add(crate::plan::SPEED_OF_LIGHT, -speed);
    let delay_low = ((-delay).mul_add(speed, line.length) - delay * speed_low) / speed;
    let turns = hertz * delay;
    (turns, hertz.mul_add(delay, -turns) + hertz * delay_low)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::plan::SPEED_OF_LIGHT;

    fn lossless(length: f64, velocity: f64) -> Line {
        Line {
            impedance: 50.0,
            length,
            velocity,
            k1: 0.0,
            k2: 0.0,
        }
    }

    /// Quarter turns are exact, however many whole turns lie before them.
    #[test]
    fn quarter_turns_are_exact() {
        for (quarters, expected) in [
            (0, (0.0, 1.0)),
            (1, (1.0, 0.0)),
            (2, (0.0, -1.0)),
            (3, (-1.0, 0.0)),
        ] {
            for whole in [0, 1, 1000, 1 << 20] {
                let quarter_waves = f64::from(4 * whole + quarters);
                let line = lossless(quarter_waves * SPEED_OF_LIGHT / 4.0, 1.0);
                let (sin, cos) = sin_cos(&line, 1.0);
                assert_eq!(
                    (sin + 0.0, cos + 0.0),
                    expected,
                    "{quarter_waves} quarter waves"
                );
            }
        }
    }

    /// Against integer arithmetic: the velocity factor is an integer times 2⁻⁵³ and the length in
    /// whole metres, so 128-bit integers give the fraction of a turn exactly. At the longest of
    /// these lines, two million turns, the plain product f × delay would be off by 2⁻³³ turn.
    #[test]
    fn agrees_with_exact_rationals() {
        let velocity = 0.66_f64;
        let scaled_velocity = (velocity * (1_u64 << 53) as f64) as u128;
        for metres in [1_u32, 7, 1234, 98_765] {
            for hertz in [1_u32, 1_850_000, 433_920_000, 4_294_967_295] {
                let numerator = (u128::from(hertz) * u128::from(metres)) << 53;
                let denominator = scaled_velocity * 299_792_458;
                let turns = (numerator % denominator) as f64 / denominator as f64;
                let line = lossless(f64::from(metres), velocity);
                let (sin, cos) = sin_cos(&line, f64::from(hertz));
                let (expected_sin, expected_cos) = (TAU * turns).sin_cos();
                // `TAU * turns` here is not reduced to a quadrant: up to an ulp of 2π in the angle.
                let slack = 6.0 * f64::EPSILON;
                assert!(
                    (sin - expected_sin).abs() <= slack,
                    "{metres} m, {hertz} Hz"
                );
                assert!(
                    (cos - expected_cos).abs() <= slack,
                    "{metres} m, {hertz} Hz"
                );
            }
        }
    }
}

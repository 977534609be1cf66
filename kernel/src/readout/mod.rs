//! Readouts: what a state, or a walk from load to source, says.
//!
//! Stated errors are those of the readout itself, for the words of the state as they are.

mod decibels;
mod gamma;
mod impedance;
mod loss;
mod matrix;
mod power;
mod scattering;
mod stress;
mod swr;

pub use decibels::Decibels;
pub use gamma::Gamma;
pub use matrix::ChainMatrix;
pub use scattering::Scattering;
pub use stress::Drive;
pub use swr::Swr;

use crate::real::Complex;
use crate::real::Real;
use crate::scalar::Scalar;
use crate::state::State;
use crate::word::{DoubleWord, Word};

/// |v|², |i|² and v·i* of a state, exact, in units that cancel in every ratio.
///
/// With these, Γ = (|v|² − |i|² + 2j Im) / (|v|² + |i|² + 2 Re): what the sum v + i would need in
/// headroom is not needed. The unit of all four is 2^exponent; states of one walk share a scale.
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Moments {
    voltage: i64,
    current: i64,
    active: i64,
    reactive: i64,
    exponent: i32,
}

impl Moments {
    /// |v + i|²: what a source of R0 has to offer.
    ///
    /// Largest words make it 2^63, which as a scalar is the same as the greatest `i64`.
    #[inline]
    fn sum_square(&self) -> i64 {
        (self.voltage + self.current).saturating_add(2 * self.active)
    }

    /// |v − i|²: what comes back to it.
    #[inline]
    fn difference_square(&self) -> i64 {
        (self.voltage + self.current).saturating_sub(2 * self.active)
    }

    /// (re + j im) / of, two roundings beyond those of the numerator; a very large real number
    /// where `of` is zero.
    #[inline]
    fn ratio(re: Scalar, im: Scalar, of: i64) -> Complex<Scalar> {
        if of == 0 {
            return Complex {
                re: Scalar::HUGE,
                im: Scalar::ZERO,
            };
        }
        Complex { re, im }.scaled(Scalar::from_i64(of, 0).reciprocal())
    }
}

impl<W: Word> State<W> {
    /// Squares and products of the state, from which every ratio is read.
    #[inline]
    pub fn moments(&self) -> Moments {
        let dot = |a: [W; 2], b: [W; 2]| (a[0].times(b[0]) + a[1].times(b[1])).to_i64();
        let [v_re, v_im] = self.v;
        let [i_re, i_im] = self.i;
        Moments {
            voltage: dot(self.v, self.v),
            current: dot(self.i, self.i),
            active: dot(self.v, self.i),
            reactive: (v_im.times(i_re) - v_re.times(i_im)).to_i64(),
            exponent: 2 * self.exponent,
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::testing::{state_of_words, value};
    use proptest::prelude::*;

    fn check<W: Word>(words: [i32; 4]) {
        let state = state_of_words::<W>(words);
        let (v, i, _) = state.words();
        let [v_re, v_im, i_re, i_im] = [v[0], v[1], i[0], i[1]].map(f64::from);
        let moments = state.moments();
        let (a, b) = (v_re * v_re + v_im * v_im, i_re * i_re + i_im * i_im);
        let (p, q) = (v_re * i_re + v_im * i_im, v_im * i_re - v_re * i_im);
        let sum = a + b + 2.0 * p;
        let one = f64::from(1 << 30);
        // away from Γ = ∞, where f64 itself cancels
        if p >= 0.0 && sum > 0.0 {
            let gamma = moments.gamma();
            assert!(
                (f64::from(gamma.re) - (a - b) / sum * one).abs() <= 2.5,
                "{words:?}"
            );
            assert!(
                (f64::from(gamma.im) - 2.0 * q / sum * one).abs() <= 2.5,
                "{words:?}"
            );
            // exact integers, where f64 would cancel
            let difference = (i128::from(v[0]) - i128::from(i[0])).pow(2)
                + (i128::from(v[1]) - i128::from(i[1])).pow(2);
            let square = difference as f64 / sum;
            let read = f64::from(moments.gamma_square());
            assert!((read - square * one).abs() <= 2.5, "{words:?} {read}");
            let read = f64::from(moments.gamma_magnitude());
            assert!(
                (read - square.sqrt() * one).abs() <= 2.0,
                "{words:?} {read}"
            );
        }
        let relative = 2.0_f64.powi(-29);
        for (ratio, square, sign) in [
            (moments.impedance(), b, 1.0),
            (moments.admittance(), a, -1.0),
        ] {
            if square > 0.0 {
                // the numerators are exact integers that f64 may round
                let slack = (a * b).sqrt() / square * 1e-15;
                for (part, exact) in [(ratio.re, p / square), (ratio.im, sign * q / square)] {
                    let error = (value(part) - exact).abs();
                    assert!(error <= exact.abs() * relative + slack, "{words:?}");
                }
            }
        }
        if p > (a + b) * 1e-4 {
            let (forward, reflected) = (sum.sqrt(), (a + b - 2.0 * p).max(0.0).sqrt());
            let exact = (forward + reflected) / (forward - reflected) * 65_536.0;
            let swr = f64::from(moments.swr().bits());
            assert!((swr - exact).abs() <= 0.5 + exact * 1e-8, "{swr} {exact}");
        }
    }

    proptest! {
        #[test]
        fn readouts_agree_with_their_definitions(words: [i32; 4]) {
            check::<i32>(words);
            check::<i16>(words);
            check::<crate::word::Bits<24>>(words);
        }
    }

    /// All words at their ends: |v + i|² or |v − i|² is 2^63.
    #[test]
    fn largest_words_read_like_any_other() {
        for (sign, gamma) in [
            (1, Gamma::MATCHED),
            (
                -1,
                Gamma {
                    re: i32::MAX,
                    im: 0,
                },
            ),
        ] {
            let end = -i32::LIMIT;
            let state = State::<i32> {
                v: [end, end],
                i: [sign * end, sign * end],
                exponent: 0,
            };
            let moments = state.moments();
            assert_eq!(moments.gamma(), gamma);
            assert_eq!(value(moments.impedance().re), f64::from(sign));
            assert_eq!(value(moments.admittance().re), f64::from(sign));
            assert_eq!(moments.gamma_square(), gamma.re as u32);
            let loss = if sign > 0 { 0 } else { Decibels::MAX.bits() };
            assert_eq!(moments.mismatch_loss().bits(), loss);
        }
    }
}

//! Scattering parameters of a whole chain.

use super::Gamma;
use crate::chain::Resolved;
use crate::immittance::Immittance;
use crate::real::{Complex, Real};
use crate::scalar::Scalar;
use crate::state::State;
use crate::word::Word;

/// Scattering parameters referred to R0 at both ends; port 1 is the source's, port 2 the load's.
///
/// The stages are reciprocal: S12 is S21.
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Scattering {
    /// Reflection at port 1, port 2 being matched.
    pub s11: Gamma,
    /// Transmission either way. Scalars, because a high loss would leave few bits in fixed point.
    pub s21: Complex<Scalar>,
    /// Reflection at port 2, port 1 being matched.
    pub s22: Gamma,
}

impl<W: Word, const N: usize> Resolved<Immittance<W>, N> {
    /// The scattering parameters, from the walks of a matched load through the chain as it is and
    /// turned end for end.
    ///
    /// The readout adds 2.5 · 2^-30 to each part of a reflection (see
    /// [`Moments::gamma`](super::Moments::gamma)) and a relative 2^-29 to each part of S21; what
    /// the walks add is as in any walk. |S21|² in decibels is the
    /// [transducer gain](super::Moments::transducer_gain) into a matched load.
    pub fn scattering(&self) -> Scattering {
        let matched = State::<W>::from_load(Gamma::MATCHED);
        let input = self.walk(matched);
        let transmission = input.transmission();
        Scattering {
            s11: input.gamma(),
            s21: transmission.map(|part| self.signed(part)),
            s22: self.walk_turned(matched).gamma(),
        }
    }
}

impl<W: Word> State<W> {
    /// 2 / (v + i): the wave into a load of v = i = 1 over the wave into this state.
    ///
    /// v + i is exact as an integer, |v + i|² too.
    fn transmission(&self) -> Complex<Scalar> {
        let ([v_re, v_im], [i_re, i_im], exponent) = self.words();
        let sum = |v: i32, i: i32| v as i64 + i as i64;
        let moments = self.moments();
        Complex {
            re: Scalar::from_i64(sum(v_re, i_re), exponent + 1),
            im: Scalar::from_i64(-sum(v_im, i_im), exponent + 1),
        }
        .scaled(Scalar::from_i64(moments.sum_square(), moments.exponent).reciprocal())
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::testing::circuit::{Circuit, circuit, gamma_value, line, pair, series, shunt};
    use crate::testing::{state_of_words, value};
    use crate::word::Bits;
    use num_complex::Complex64;
    use proptest::prelude::*;

    fn complex(z: Complex<Scalar>) -> Complex64 {
        Complex64::new(value(z.re), value(z.im))
    }

    fn check<W: Word>(circuit: &Circuit) {
        let scattering = circuit.words::<W>().scattering();
        let matched = pair(Gamma::MATCHED);
        let input = circuit.input::<W>(matched);
        for (words, node) in [
            (scattering.s11, input),
            (scattering.s22, circuit.turned::<W>(matched)),
        ] {
            let (exact, limit) = node.gamma();
            let error = (gamma_value(words) - exact).norm();
            assert!(error <= limit, "{error:e} {limit:e} {circuit:?}");
        }
        let (sum, difference) = input.sum();
        let exact = 2.0 / sum;
        let error = (complex(scattering.s21) - exact).norm();
        let relative = difference / (sum.norm() - difference).max(0.0) + 2.0_f64.powi(-28);
        assert!(error <= exact.norm() * relative, "{error:e} {circuit:?}");
    }

    proptest! {
        #[test]
        fn parameters_agree_with_the_chain_matrix_of_the_stages(circuit in circuit()) {
            check::<i16>(&circuit);
            check::<Bits<24>>(&circuit);
            check::<i32>(&circuit);
        }

        /// The readout alone, for states of any words.
        #[test]
        fn transmission_is_the_reciprocal_of_the_sum(words: [i32; 4]) {
            let state = state_of_words::<i32>(words);
            let ([a, b], [c, d], _) = state.words();
            let sum = Complex64::new(f64::from(a) + f64::from(c), f64::from(b) + f64::from(d));
            let exact = 2.0 / sum;
            if sum != Complex64::default() {
                let words = complex(state.transmission());
                let relative = 2.0_f64.powi(-29) * (1.0 + 1e-6);
                prop_assert!((words.re - exact.re).abs() <= exact.re.abs() * relative);
                prop_assert!((words.im - exact.im).abs() <= exact.im.abs() * relative);
            }
        }
    }

    /// D. M. Pozar, Microwave Engineering, 4th ed., Tables 4.1 and 4.2 (from memory): R0 in series
    /// has S11 = 1/3, in shunt −1/3, and S21 = 2/3 either way.
    #[test]
    fn one_resistor_has_its_published_parameters() {
        for (circuit, reflection) in [(series(1.0, 0.0), 1.0), (shunt(1.0, 0.0), -1.0)] {
            let circuit = Circuit::new(&[circuit]);
            let words = circuit.words::<i32>().scattering();
            for gamma in [words.s11, words.s22] {
                let error = (gamma_value(gamma) - reflection / 3.0).norm();
                assert!(error <= 4.0 * 2.0_f64.powi(-30), "{gamma:?}");
            }
            let error = (complex(words.s21) - 2.0 / 3.0).norm();
            assert!(error <= 2.0_f64.powi(-29), "{words:?}");
        }
    }

    /// A matched line only turns the phase: S21 = e^(−jθ), the whole half turns included.
    #[test]
    fn a_matched_line_turns_the_phase_of_the_transmission() {
        for eighths in 0..24 {
            let turns = f64::from(eighths) / 8.0 + 0.01;
            let circuit = Circuit::new(&[line(1.0, turns, 0.0)]);
            let words = circuit.words::<i32>().scattering();
            let exact = Complex64::from_polar(1.0, -turns * std::f64::consts::TAU);
            // three shears of a state of two unit waves, 2^-28 each
            let error = (complex(words.s21) - exact).norm();
            assert!(error <= 3.0 * 2.0_f64.powi(-28), "{turns}: {error:e}");
            assert!(gamma_value(words.s11).norm() <= 3.0 * 2.0_f64.powi(-28));
        }
    }
}

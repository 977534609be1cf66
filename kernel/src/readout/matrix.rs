//! The chain matrix of a whole chain.

use super::Gamma;
use crate::chain::Resolved;
use crate::immittance::Immittance;
use crate::real::{Complex, Real};
use crate::scalar::Scalar;
use crate::state::State;
use crate::word::Word;

/// The chain (ABCD) matrix, normalised to R0: v₁ = a·v₂ + b·i₂, i₁ = c·v₂ + d·i₂.
///
/// Port 1 is the source's, port 2 the load's, and i₂ flows into the load. In ohms and siemens, B is
/// b·R0 and C is c/R0.
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct ChainMatrix {
    /// v₁ for v₂ = 1 and i₂ = 0.
    pub a: Complex<Scalar>,
    /// v₁ for v₂ = 0 and i₂ = 1.
    pub b: Complex<Scalar>,
    /// i₁ for v₂ = 1 and i₂ = 0.
    pub c: Complex<Scalar>,
    /// i₁ for v₂ = 0 and i₂ = 1.
    pub d: Complex<Scalar>,
}

impl<W: Word, const N: usize> Resolved<Immittance<W>, N> {
    /// The chain matrix, from the walks of an open and of a short circuit.
    ///
    /// Nothing is rounded beside the walks. `a` and `c` share the block of one walk, `b` and `d`
    /// that of the other: the smaller of two has the absolute error of the larger. For what stands
    /// between a source and a load of about R0, [`Resolved::scattering`] is the more accurate,
    /// because there nothing has to cancel.
    pub fn chain_matrix(&self) -> ChainMatrix {
        let [a, c] = self.column(Gamma::OPEN);
        let [b, d] = self.column(Gamma::SHORT);
        ChainMatrix { a, b, c, d }
    }

    /// v and i at the source for this load, with the sign that the walk leaves out, halved: an
    /// open or short circuit starts from 2.
    fn column(&self, load: Gamma) -> [Complex<Scalar>; 2] {
        let (v, i, exponent) = self.walk(State::<W>::from_load(load)).words();
        [v, i].map(|[re, im]| {
            let part = |word| self.signed(Scalar::from_i32(word, exponent - 1));
            Complex {
                re: part(re),
                im: part(im),
            }
        })
    }

    /// A part of a walked state with the sign that the lines' whole half turns give it.
    pub(super) fn signed(&self, part: Scalar) -> Scalar {
        if self.inverted() {
            part.negated()
        } else {
            part
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::testing::circuit::{Circuit, circuit, line_of, series, shunt};
    use crate::testing::value;
    use crate::word::Bits;
    use num_complex::Complex64;
    use proptest::prelude::*;

    fn complex(z: Complex<Scalar>) -> Complex64 {
        Complex64::new(value(z.re), value(z.im))
    }

    fn check<W: Word>(circuit: &Circuit) {
        let matrix = circuit.words::<W>().chain_matrix();
        let [one, zero] = [1.0, 0.0].map(Complex64::from);
        let [a, b, c, d] = circuit.matrix();
        for (words, exact, load) in [
            ([matrix.a, matrix.c], [a, c], [one, zero]),
            ([matrix.b, matrix.d], [b, d], [zero, one]),
        ] {
            let limit = circuit.input::<W>(load).error;
            for (word, exact) in words.into_iter().zip(exact) {
                let error = (complex(word) - exact).norm();
                assert!(error <= limit, "{error:e} {limit:e} {circuit:?}");
            }
        }
    }

    fn check_lengths(circuit: &Circuit) {
        check::<i16>(circuit);
        check::<Bits<24>>(circuit);
        check::<i32>(circuit);
    }

    proptest! {
        #[test]
        fn entries_agree_with_the_product_of_the_stages(circuit in circuit()) {
            check_lengths(&circuit);
        }
    }

    /// Lines whose end lies on either side of every quarter turn, where the half turns that are
    /// left out change: a = cos θ and b = j sin θ keep their signs.
    #[test]
    fn signs_hold_across_every_quarter_turn() {
        for quarter in 0..16_u64 {
            // 2^62 of a turn over the frequency of the circuits, which is not a power of two
            let near =
                (quarter << 62).wrapping_div(10_000_000) + (quarter / 4) * (u64::MAX / 10_000_000);
            for step in -200..200 {
                check_lengths(&Circuit::new(&[line_of(
                    1.0,
                    near.wrapping_add_signed(step),
                    0.0,
                )]));
            }
        }
        // two lines that are odd each are even together
        let odd = line_of(1.0, u64::MAX / 20_000_000, 0.0);
        check_lengths(&Circuit::new(&[odd, odd]));
        check_lengths(&Circuit::new(&[
            odd,
            series(0.3, 0.0),
            odd,
            shunt(0.1, 0.0),
            odd,
        ]));
    }

    /// D. M. Pozar, Microwave Engineering, 4th ed., Table 4.1 (from memory): T of Z1 = 10 + j20,
    /// Z2 = 15 − j5, Z3 = 30 − j60 ohm. A = 1 + Z1/Z3, B = Z1 + Z2 + Z1·Z2/Z3, C = 1/Z3,
    /// D = 1 + Z2/Z3, worked out by hand; referred to 50 ohm.
    #[test]
    fn a_published_tee_has_its_matrix() {
        let circuit = Circuit::new(&[
            series(0.2, 0.4),
            shunt(1.0 / 3.0, 2.0 / 3.0),
            series(0.3, -0.1),
        ]);
        let matrix = circuit.words::<i32>().chain_matrix();
        for (entry, re, im) in [
            (matrix.a, 0.8, 0.8 / 3.0),
            (matrix.b, 1.4 / 3.0, 0.4),
            (matrix.c, 1.0 / 3.0, 2.0 / 3.0),
            (matrix.d, 3.5 / 3.0, 0.5 / 3.0),
        ] {
            let error = (complex(entry) - Complex64::new(re, im)).norm();
            assert!(error <= 4e-9, "{entry:?}");
        }
    }

    /// The sign is the same over floating point, which rounds its angles otherwise.
    #[cfg(feature = "float")]
    #[test]
    fn floating_point_walks_leave_out_the_same_sign() {
        use crate::FloatState;
        for step in -200..200 {
            for quarter in [1, 3] {
                let length = ((quarter << 62) / 10_000_000_u64).wrapping_add_signed(step);
                let circuit = Circuit::new(&[line_of(1.0, length, 0.0)]);
                let point = circuit.floats();
                let short = FloatState {
                    v: Complex::ZERO,
                    i: Complex { re: 1.0, im: 0.0 },
                };
                let sign = if point.inverted() { -1.0 } else { 1.0 };
                let b = sign * point.walk(short).v.im;
                assert!(
                    (b - circuit.matrix()[1].im).abs() < 1e-15,
                    "{quarter} {step}"
                );
            }
        }
    }
}

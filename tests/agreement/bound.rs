//! How far the kernel may be from the exact result at one point, from the word length and the
//! conditioning of that very point.
//!
//! # Derivation
//!
//! Every stage acts on (v, i) by a matrix of determinant 1. (A line in words may be a half turn off,
//! which changes the sign of the whole state and nothing below.) So v̂·i − v·î, between a state of
//! words (v̂, î) and the exact one (v, i), is the same on both sides of an exact stage. A stage in
//! words leaves its result off by (δv, δi), and that adds δv·i − δi·v with the exact state at that
//! place. Summed over the walk, with S = v + i,
//!
//! ```text
//! N = Σ (δv·i − δi·v)      Γ̂ − Γ = 2·N / (S·Ŝ)      ẑ − z = N / (i·î)      ŷ − y = −N / (v·v̂)
//! ```
//!
//! at the end of the walk. These are identities, not first-order estimates. The conditioning is in
//! the states: 2·i/S² and 2·v/S² are |dΓ/dv| and |dΓ/di| at that place.
//!
//! |δv| and |δi| have three sources:
//!
//! - each rounded word: half a unit of the block's last place, for the passed-on pair, too, where
//!   the block grows; √½ of a unit for both parts together;
//! - the words of the immittance: half a unit of their last place, times |î| or |v̂|;
//! - the immittance before it was rounded to words: what [`crate::uncertain::Uncertain`] says, times the same.
//!
//! Near a pole the third has no useful bound, while the reciprocal has. With z = 1/y,
//! |ẑ − z| = |z|·|ẑ|·|ŷ − y|, and the smaller of the two bounds counts. An immittance beyond the
//! largest one that words hold stands for all larger ones in its direction, so that there
//! |ŷ − y| gains |ŷ| itself.
//!
//! Block exponents and ẑ are taken from the walk in words; that the block does not grow without
//! need is a property of its own.

use num_complex::Complex;
use stagebits::arithmetic::state_values;
use stagebits::reference::{self, State};
use stagebits_kernel as kernel;
use stagebits_kernel::{Gamma, Walk, Word};
use std::f64::consts::{FRAC_1_SQRT_2, SQRT_2};

use crate::moves::Move;
use crate::published::Quantity;

/// A state on its walk, exact and in words, with the bound N.
#[derive(Clone, Copy, Debug)]
pub(crate) struct Trace<W> {
    /// The exact state.
    pub(crate) exact: State,
    /// The state in words.
    pub(crate) words: kernel::State<W>,
    /// Bound of |v̂·i − v·î|.
    wronskian: f64,
    /// Largest |v| or |i| of the exact state so far.
    largest: f64,
}

impl<W: Word> Trace<W> {
    /// At the end where the walk begins, with a Γ whose nearest kernel Γ is `gamma`.
    pub(crate) fn new(exact: Complex<f64>, gamma: Gamma) -> Self {
        let mut trace = Self {
            exact: State::from_gamma(exact),
            words: kernel::State::from_load(gamma),
            wronskian: 0.0,
            largest: 0.0,
        };
        let moved = (stagebits::arithmetic::to_complex(gamma) - exact).norm();
        let rounding = trace.rounding();
        trace.add(moved + rounding, moved + rounding);
        trace
    }

    /// Through the moves of one stage, behind which the exact state is `behind`.
    ///
    /// The moves' own exact state is good for the places within the stage. Where little is left of
    /// a state, the rounding of `f64` would grow from stage to stage.
    pub(crate) fn through(&mut self, moves: &[Move<W>], behind: State) {
        for step in moves {
            self.pass(step);
        }
        self.exact = behind;
    }

    /// Both parts of a pair of words, rounded once: √½ of a unit.
    fn rounding(&self) -> f64 {
        f64::from(self.words.words().2).exp2() * FRAC_1_SQRT_2
    }

    fn add(&mut self, of_v: f64, of_i: f64) {
        let (v, i) = (self.exact.v.norm(), self.exact.i.norm());
        self.wronskian += of_v * i + of_i * v;
        self.largest = self.largest.max(v).max(i);
    }

    pub(crate) fn pass(&mut self, step: &Move<W>) {
        let (v, i) = state_values(&self.words);
        let exponent = self.words.words().2;
        match step {
            Move::Series(z) => {
                self.exact.v += z.exact * self.exact.i;
                self.words.series(&z.words);
                let (rounding, other) = self.roundings(exponent);
                self.add(rounding + z.error * i.norm(), other);
            }
            Move::Shunt(y) => {
                self.exact.i += y.exact * self.exact.v;
                self.words.shunt(&y.words);
                let (rounding, other) = self.roundings(exponent);
                self.add(other, rounding + y.error * v.norm());
            }
            Move::Stretch(ratio, inverse) => {
                self.exact.v *= ratio.exact;
                self.exact.i *= inverse.exact;
                self.words.stretch(&ratio.words, &inverse.words);
                let rounding = self.rounding();
                self.add(
                    rounding + ratio.error * v.norm(),
                    rounding + inverse.error * i.norm(),
                );
            }
            Move::TwoPort(matrix) => {
                let [a, b, c, d] = matrix.exact;
                let exact = self.exact;
                self.exact.v = a * exact.v + b * exact.i;
                self.exact.i = c * exact.v + d * exact.i;
                self.words.two_port(&matrix.words);
                let rounding = self.rounding();
                let [of_a, of_b, of_c, of_d] = matrix.errors;
                self.add(
                    rounding + of_a * v.norm() + of_b * i.norm(),
                    rounding + of_c * v.norm() + of_d * i.norm(),
                );
            }
        }
    }

    /// Of the pair that was added to, and of the one passed on, which moves if the block has grown.
    fn roundings(&self, exponent_before: i32) -> (f64, f64) {
        let rounding = self.rounding();
        let grown = self.words.words().2 > exponent_before;
        (rounding, if grown { rounding } else { 0.0 })
    }

    /// How much larger than at the end the state has been on the walk, squared: 1/4 to 1 where
    /// nothing resonates.
    pub(crate) fn conditioning(&self) -> f64 {
        self.largest * self.largest / (self.exact.v + self.exact.i).norm_sqr()
    }

    /// The words as a state in `f64`.
    pub(crate) fn word_state(&self) -> State {
        let (v, i) = state_values(&self.words);
        State { v, i }
    }

    /// Bound of |Γ̂ − Γ|, reading it out not included.
    pub(crate) fn gamma_bound(&self) -> f64 {
        let words = self.word_state();
        let exact = self.exact;
        2.0 * self.wronskian / (exact.v + exact.i).norm() / (words.v + words.i).norm()
    }

    /// Bound of |ẑ − z|, normalised.
    pub(crate) fn impedance_bound(&self) -> f64 {
        self.wronskian / self.exact.i.norm() / self.word_state().i.norm()
    }

    /// Bound of |ŷ − y|, normalised.
    fn admittance_bound(&self) -> f64 {
        self.wronskian / self.exact.v.norm() / self.word_state().v.norm()
    }

    /// Bound of the error of a figure that follows from the state; infinite where it has none.
    pub(crate) fn figure_bound(&self, quantity: Quantity, r0: f64) -> f64 {
        let magnitude = self.exact.gamma().norm();
        let bound = self.gamma_bound();
        match quantity {
            Quantity::GammaMagnitude => bound,
            Quantity::GammaDegrees if bound < magnitude => (bound / magnitude).asin().to_degrees(),
            Quantity::Resistance | Quantity::Reactance => r0 * self.impedance_bound(),
            Quantity::Conductance | Quantity::Susceptance => self.admittance_bound() / r0,
            // (1 + g)/(1 − g) = 2/(1 − g) − 1
            Quantity::Swr if magnitude + bound < 1.0 => {
                2.0 / (1.0 - magnitude - bound) - 2.0 / (1.0 - magnitude)
            }
            Quantity::ReturnLoss if bound < magnitude => {
                reference::return_loss_db(1.0 - bound / magnitude)
            }
            _ => f64::INFINITY,
        }
    }
}

/// Bound of reading Γ from a state: each part goes through four roundings of a scalar and one to
/// 2^-30, which is 2.5 · 2^-30 where the part is 1.
pub(crate) fn readout_bound(gamma: Complex<f64>) -> f64 {
    let unit = f64::from(-(Gamma::FRACTION_BITS as i32)).exp2();
    unit * (2.0 * gamma.norm() + 0.5 * SQRT_2)
}

//! What rounding noise ought to be: the textbook's figure beside the measured one.
//!
//! A rounded word is off by an error that is spread evenly over a unit q of its last place, of
//! variance q²/12 and independent of all others (W. R. Bennett, Spectra of quantized signals, Bell
//! System Technical Journal 27, 1948, from memory). Each such error is carried to the input. All
//! two-ports of a chain are reciprocal, so that their matrices have the determinant 1 and
//! δv·i − δi·v is the same on both sides of each; with v and i at the place where the error is made
//! and S = v + i at the input,
//!
//! ```text
//! dΓ/dv = 2·i/S²      dΓ/di = −2·v/S²      |ΔΓ|² = 4·Σ |δv·i − δi·v|² / |S|⁴
//! ```
//!
//! The sum goes over the words of the load, of every state on the walk and of the immittances, a
//! word that stands in two places of a stage counted once with both. States and exponents are those
//! of the walk in words itself, which says nothing about their errors but where blocks grow.
//!
//! Stored constants, which are a handful of fixed errors rather than noise, and the functions of a
//! frequency, which are as good as 2⁻³¹ whatever W, are left out. Practice is thus above theory
//! where two large reactances nearly cancel, and a little at 32 bits.

use num_complex::Complex;
use stagebits_kernel::{Gamma, Immittance, Resolved, State, Step, TwoPortWords, Walk, Word};

use crate::arithmetic::state_values;
use crate::constants::CAPACITY;

/// Variance of an error spread evenly over 1.
const EVEN: f64 = 1.0 / 12.0;

/// Variance of ΔΓ at one point in words of type `W`.
pub fn variance<W: Word>(point: &Resolved<Immittance<W>, CAPACITY>, load: Gamma) -> f64 {
    let state = State::from_load(load);
    let (v, i) = state_values(&state);
    let mut noise = Noise { state, sum: 0.0 };
    // rounding the load moves v and i by the same amount, in opposite directions
    noise.add(2.0 * noise.unit(), v + i);
    for step in point.steps().iter().rev() {
        noise.pass(step);
    }
    let (v, i) = noise.values();
    let readout = 2.0 * EVEN * 4_f64.powi(-(Gamma::FRACTION_BITS as i32));
    4.0 * noise.sum / (v + i).norm_sqr().powi(2) + readout
}

/// A walk with the sum of the variances of δv·i − δi·v so far.
struct Noise<W> {
    state: State<W>,
    sum: f64,
}

type Pair = (Complex<f64>, Complex<f64>);

impl<W: Word> Noise<W> {
    fn values(&self) -> Pair {
        state_values(&self.state)
    }

    /// Variance of one word of the state.
    fn unit(&self) -> f64 {
        EVEN * 4_f64.powi(self.state.words().2)
    }

    /// Errors of this variance that δv·i − δi·v has `lever` times.
    fn add(&mut self, variance: f64, lever: Complex<f64>) {
        self.sum += variance * lever.norm_sqr();
    }

    fn pass(&mut self, step: &Step<Immittance<W>>) {
        match step {
            Step::Series(z) => {
                let lever = self.series(z);
                self.add(of_immittance(z), lever);
            }
            Step::Shunt(y) => self.shunt(y),
            Step::Tee { series, shunt } => {
                let first = self.series(series);
                self.shunt(shunt);
                let second = self.series(series);
                self.add(of_immittance(series), first + second);
            }
            Step::Stretch { ratio, inverse } => {
                let (v, i) = self.values();
                self.state.stretch(ratio, inverse);
                let (stretched_v, stretched_i) = self.values();
                self.add(of_immittance(ratio), v * stretched_i);
                self.add(of_immittance(inverse), i * stretched_v);
                self.round(true, true);
            }
            Step::TwoPort(two_port) => {
                let before = self.values();
                self.state.two_port(two_port);
                self.two_port(two_port, before);
                self.round(true, true);
            }
        }
    }

    /// Passes a series impedance; returns the lever of its own error.
    fn series(&mut self, z: &Immittance<W>) -> Complex<f64> {
        let exponent = self.state.words().2;
        self.state.series(z);
        let grown = self.state.words().2 > exponent;
        self.round(true, grown);
        let (_, i) = self.values();
        i * i
    }

    fn shunt(&mut self, y: &Immittance<W>) {
        let exponent = self.state.words().2;
        self.state.shunt(y);
        let grown = self.state.words().2 > exponent;
        self.round(grown, true);
        let (v, _) = self.values();
        self.add(of_immittance(y), v * v);
    }

    /// Rounding the two words of v, of i, or of both.
    fn round(&mut self, of_v: bool, of_i: bool) {
        let (v, i) = self.values();
        let variance = 2.0 * self.unit();
        if of_v {
            self.add(variance, i);
        }
        if of_i {
            self.add(variance, v);
        }
    }

    /// The words of a chain matrix that has been passed, from the state `before` it.
    fn two_port(&mut self, two_port: &TwoPortWords<W>, (v, i): Pair) {
        let (after_v, after_i) = self.values();
        let [a, b, c, d] = two_port.words();
        let [of_a, of_b, of_c, of_d] = [v * after_i, i * after_i, -v * after_v, -i * after_v];
        for (one, other, lever_of_one, lever_of_other) in [(a, d, of_a, of_d), (b, c, of_b, of_c)] {
            let variance = |words| of_words(words, two_port.exponent());
            if one == other {
                self.add(variance(one), lever_of_one + lever_of_other);
            } else {
                self.add(variance(one), lever_of_one);
                self.add(variance(other), lever_of_other);
            }
        }
    }
}

fn of_immittance<W: Word>(z: &Immittance<W>) -> f64 {
    of_words(z.words(), z.exponent())
}

/// Variance of a complex number in words of this exponent; a word that is zero is so exactly.
fn of_words(words: [i32; 2], exponent: i32) -> f64 {
    let rounded = words.iter().filter(|&&word| word != 0).count();
    rounded as f64 * EVEN * 4_f64.powi(exponent)
}

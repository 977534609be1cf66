//! What the chain does, in `f64` and by the textbook: the yardstick for everything else.
//!
//! Every stage becomes a 2×2 complex chain (ABCD) matrix and the matrices are multiplied. Nothing
//! here is shared with the firmware's arithmetic, which never forms a matrix, so that the two can
//! be held against each other.
//!
//! # Two scalings
//!
//! - **Ohmic**: V in volts, I in amperes, B in ohms, C in siemens: [`stage_matrix`],
//!   [`chain_matrix`], [`Matrix::input_impedance`], [`Matrix::transducer_gain`].
//! - **Normalised** to the reference resistance R0: v = V, i = R0·I, all four entries without
//!   dimension: [`State`], [`FrequencyPoint`], [`SParameters`].
//!
//! [`Matrix::normalised`] goes from the first to the second.
//!
//! # Accuracy and range
//!
//! Angles are reduced to a fraction of a turn at twice the precision of `f64`, so a line of a
//! thousand wavelengths is as good as a short one. What is left is rounding at each stage,
//! magnified by the mismatch between the parts of the chain that it stands between.
//! A chain whose total matrix has entries above 1e308 overflows to values that are not finite;
//! one line of 6000 dB does that, no chain of practical use comes near it.

mod angle;
mod bank;
mod gamma;
mod immittance;
mod load;
mod matrix;
mod point;
mod scattering;
mod stage;

pub use gamma::{
    State, gamma_from_impedance, gamma_magnitude_from_swr, impedance_from_gamma, mismatch_loss_db,
    return_loss_db, swr,
};
pub use immittance::IDEAL;
pub use load::load_gamma;
pub use matrix::Matrix;
pub use point::{FrequencyPoint, Reference, input_gamma, input_impedance};
pub use scattering::SParameters;
pub use stage::{chain_matrix, chain_matrix_at_state, stage_matrix, stage_matrix_at_state};

use num_complex::Complex;

/// The imaginary unit, named as the field does.
const J: Complex<f64> = Complex::new(0.0, 1.0);
const ONE: Complex<f64> = Complex::new(1.0, 0.0);
const ZERO: Complex<f64> = Complex::new(0.0, 0.0);

/// `numerator / denominator` without overflow or underflow of the squared magnitude: both are
/// first scaled by the same power of two, which rounds nothing.
fn quotient(numerator: Complex<f64>, denominator: Complex<f64>) -> Complex<f64> {
    let largest = denominator.re.abs().max(denominator.im.abs());
    if !largest.is_normal() {
        return numerator / denominator;
    }
    let power_of_two = f64::from_bits(largest.to_bits() & f64::INFINITY.to_bits());
    (numerator / power_of_two) / (denominator / power_of_two)
}

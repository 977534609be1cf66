//! Scattering parameters for a real reference resistance.

use super::{Matrix, quotient};
use num_complex::Complex;

/// Scattering parameters with the same real reference resistance at both ports; port 1 is the
/// radio side.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct SParameters {
    /// Reflection at the radio side with the load side matched.
    pub s11: Complex<f64>,
    /// Transmission from the load side to the radio side.
    pub s12: Complex<f64>,
    /// Transmission from the radio side to the load side.
    pub s21: Complex<f64>,
    /// Reflection at the load side with the radio side matched.
    pub s22: Complex<f64>,
}

impl SParameters {
    /// From a *normalised* matrix, which carries the reference resistance.
    ///
    /// S12 is formed from the determinant, which cancels badly where the loss is high. For a chain
    /// of reciprocal parts use [`super::FrequencyPoint::s_parameters`].
    pub fn from_normalised(matrix: &Matrix) -> Self {
        let Matrix { a, b, c, d } = *matrix;
        let sum = a + b + c + d;
        Self {
            s11: quotient(a + b - c - d, sum),
            s12: quotient(2.0 * matrix.determinant(), sum),
            s21: quotient(Complex::from(2.0), sum),
            s22: quotient(b + d - a - c, sum),
        }
    }
}

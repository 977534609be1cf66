//! The normalised state at a port and what is read out from it.

use super::{ONE, ZERO, quotient};
use num_complex::Complex;

/// Voltage and current at a port, normalised to the reference resistance R0: v = V, i = R0·I, the
/// current counted towards the load. Only the ratio of the two matters for Γ and impedance.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct State {
    /// Voltage V.
    pub v: Complex<f64>,
    /// Current times R0, in the unit of `v`.
    pub i: Complex<f64>,
}

impl State {
    /// The state v = 1 + Γ, i = 1 − Γ: a forward wave of 1 at a port with reflection coefficient
    /// `gamma`. Open (Γ = 1) and short (Γ = −1) are ordinary states.
    pub fn from_gamma(gamma: Complex<f64>) -> Self {
        Self {
            v: ONE + gamma,
            i: ONE - gamma,
        }
    }

    /// Reflection coefficient (v − i)/(v + i), referred to R0.
    ///
    /// Never divides by zero for a passive load, where |v + i| ≥ |v − i| and not both are zero.
    pub fn gamma(&self) -> Complex<f64> {
        quotient(self.v - self.i, self.v + self.i)
    }

    /// Impedance in ohms looking towards the load, infinite (real) where the current is zero.
    pub fn impedance(&self, reference: f64) -> Complex<f64> {
        if self.i == ZERO {
            return Complex::from(f64::INFINITY);
        }
        quotient(self.v, self.i) * reference
    }

    /// Admittance in siemens looking towards the load, infinite (real) where the voltage is zero.
    pub fn admittance(&self, reference: f64) -> Complex<f64> {
        if self.v == ZERO {
            return Complex::from(f64::INFINITY);
        }
        quotient(self.i, self.v) / reference
    }

    /// Re(v·i*): R0 times the mean power towards the load, for RMS voltage and current.
    pub fn power(&self) -> f64 {
        self.v.re * self.i.re + self.v.im * self.i.im
    }
}

/// Reflection coefficient, referred to `reference` ohms, of `impedance` ohms.
pub fn gamma_from_impedance(impedance: Complex<f64>, reference: f64) -> Complex<f64> {
    quotient(impedance - reference, impedance + reference)
}

/// Impedance in ohms of a reflection coefficient referred to `reference` ohms; infinite for Γ = 1.
pub fn impedance_from_gamma(gamma: Complex<f64>, reference: f64) -> Complex<f64> {
    State::from_gamma(gamma).impedance(reference)
}

/// Standing wave ratio (1 + |Γ|)/(1 − |Γ|) for a magnitude |Γ|; infinite from |Γ| = 1 on.
pub fn swr(gamma_magnitude: f64) -> f64 {
    if gamma_magnitude >= 1.0 {
        f64::INFINITY
    } else {
        (1.0 + gamma_magnitude) / (1.0 - gamma_magnitude)
    }
}

/// Magnitude |Γ| of a standing wave ratio ≥ 1; an infinite ratio gives 1.
pub fn gamma_magnitude_from_swr(swr: f64) -> f64 {
    if swr.is_infinite() {
        1.0
    } else {
        (swr - 1.0) / (swr + 1.0)
    }
}

/// Return loss −20·lg |Γ| in decibels; infinite for a perfect match.
pub fn return_loss_db(gamma_magnitude: f64) -> f64 {
    -20.0 * gamma_magnitude.log10()
}

/// Mismatch loss −10·lg(1 − |Γ|²) in decibels; infinite for |Γ| = 1.
pub fn mismatch_loss_db(gamma_magnitude: f64) -> f64 {
    // (1 − g)(1 + g) keeps the digits that 1 − g² would lose near total reflection.
    -10.0 * ((1.0 - gamma_magnitude) * (1.0 + gamma_magnitude)).log10()
}

//! The 2×2 chain matrix.

use super::{ONE, ZERO, quotient};
use num_complex::Complex;
use std::ops::Mul;

/// A chain (ABCD) matrix: the voltage and current at the radio side as a linear function of those
/// at the load side, current counted towards the load.
///
/// ```text
/// V1 = A·V2 + B·I2
/// I1 = C·V2 + D·I2
/// ```
///
/// Ohmic (B in ohms, C in siemens) as the stages are made, or normalised (no dimension) after
/// [`Matrix::normalised`]; the algebra is the same.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Matrix {
    /// V1/V2 with the load side open.
    pub a: Complex<f64>,
    /// V1/I2 with the load side shorted: ohms, or normalised.
    pub b: Complex<f64>,
    /// I1/V2 with the load side open: siemens, or normalised.
    pub c: Complex<f64>,
    /// I1/I2 with the load side shorted.
    pub d: Complex<f64>,
}

impl Matrix {
    /// A through connection.
    pub const IDENTITY: Self = Self {
        a: ONE,
        b: ZERO,
        c: ZERO,
        d: ONE,
    };

    /// An impedance in the through path.
    pub fn series(impedance: Complex<f64>) -> Self {
        Self {
            b: impedance,
            ..Self::IDENTITY
        }
    }

    /// An admittance from the through path to ground.
    pub fn shunt(admittance: Complex<f64>) -> Self {
        Self {
            c: admittance,
            ..Self::IDENTITY
        }
    }

    /// An ideal transformer: voltage at the radio side = `ratio` × voltage at the load side.
    pub fn transformer(ratio: f64) -> Self {
        Self {
            a: Complex::from(ratio),
            d: Complex::from(1.0 / ratio),
            ..Self::IDENTITY
        }
    }

    /// This two-port followed, towards the load, by `next`.
    pub fn then(&self, next: &Self) -> Self {
        Self {
            a: self.a * next.a + self.b * next.c,
            b: self.a * next.b + self.b * next.d,
            c: self.c * next.a + self.d * next.c,
            d: self.c * next.b + self.d * next.d,
        }
    }

    /// AD − BC: 1 for a reciprocal two-port, within rounding times the magnitude of the products.
    pub fn determinant(&self) -> Complex<f64> {
        self.a * self.d - self.b * self.c
    }

    /// Voltage and current at the radio side from those at the load side.
    pub fn apply(
        &self,
        voltage: Complex<f64>,
        current: Complex<f64>,
    ) -> (Complex<f64>, Complex<f64>) {
        (
            self.a * voltage + self.b * current,
            self.c * voltage + self.d * current,
        )
    }

    /// An ohmic matrix rescaled for states v = V, i = R0·I, with R0 = `reference` in ohms.
    pub fn normalised(&self, reference: f64) -> Self {
        Self {
            b: self.b / reference,
            c: self.c * reference,
            ..*self
        }
    }

    /// Of an ohmic matrix: impedance in ohms seen at the radio side with `load` ohms at the other,
    /// (A·ZL + B)/(C·ZL + D).
    pub fn input_impedance(&self, load: Complex<f64>) -> Complex<f64> {
        let (voltage, current) = self.apply(load, ONE);
        quotient(voltage, current)
    }

    /// Of an ohmic matrix: impedance in ohms seen at the load side with
    /// `source` ohms at the radio side, (D·ZS + B)/(C·ZS + A).
    pub fn output_impedance(&self, source: Complex<f64>) -> Complex<f64> {
        quotient(self.d * source + self.b, self.c * source + self.a)
    }

    /// Of an ohmic matrix: power delivered to `load` over power available from a generator of
    /// impedance `source`, both in ohms, 4·RS·RL/|A·ZL + B + C·ZS·ZL + D·ZS|².
    pub fn transducer_gain(&self, source: Complex<f64>, load: Complex<f64>) -> f64 {
        let (voltage, current) = self.apply(load, ONE);
        4.0 * source.re * load.re / (voltage + current * source).norm_sqr()
    }
}

impl Mul for Matrix {
    type Output = Self;

    /// Cascade, radio side first: see [`Matrix::then`].
    fn mul(self, next: Self) -> Self {
        self.then(&next)
    }
}

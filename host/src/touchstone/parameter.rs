//! Network parameters other than S, and the way to S for one-ports.

use num_complex::Complex;

use crate::reference::gamma_from_impedance;

/// The parameters that a file may hold.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Parameter {
    /// Scattering parameters.
    S,
    /// Admittance parameters.
    Y,
    /// Impedance parameters.
    Z,
    /// Hybrid parameters, of two-ports only.
    H,
    /// Inverse hybrid parameters, of two-ports only.
    G,
}

impl Parameter {
    /// All of them with their names in the option line.
    pub(super) const NAMES: [(&'static str, Self); 5] = [
        ("S", Self::S),
        ("Y", Self::Y),
        ("Z", Self::Z),
        ("H", Self::H),
        ("G", Self::G),
    ];

    /// Γ of a one-port, given its only parameter, which is S, Y or Z.
    ///
    /// `unit` is the impedance in ohms that Z is a multiple of, and Y of its reciprocal: the
    /// `reference` itself in version 1.x, 1 ohm in version 2.0. Not finite for a Z of exactly minus
    /// the reference and its likes.
    pub(super) fn gamma(self, value: Complex<f64>, unit: f64, reference: f64) -> Complex<f64> {
        match self {
            Self::Y => -gamma_from_impedance(value * (reference / unit), 1.0),
            Self::Z => gamma_from_impedance(value * unit, reference),
            Self::S | Self::H | Self::G => value,
        }
    }
}

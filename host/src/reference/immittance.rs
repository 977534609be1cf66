//! Impedance and admittance of two-terminal parts: branches and stubs.

use super::{J, ONE, ZERO, angle, quotient};
use crate::plan::{Arrangement, Branch, Line, Loss, Reactor, Termination};
use num_complex::Complex;
use std::f64::consts::TAU;

/// Magnitude that stands for an infinite impedance (in ohms) or admittance (in siemens): 2¹⁰⁰.
///
/// A lossless parallel circuit at exact resonance or an open stub of exactly a half wave would need
/// an infinite entry in a chain matrix. It gets the reactance +2¹⁰⁰ Ω (or susceptance +2¹⁰⁰ S)
/// instead: lossless like the ideal part, and so large that Γ moves by no more than about
/// 2¹⁻¹⁰⁰·R0/Ω, far below the last digit of `f64`. Parts that only come close to resonance stay
/// below 2⁶⁰ and are represented as they are.
pub const IDEAL: f64 = (1_u128 << 100) as f64;

/// An impedance kept as a ratio, so that open and short are both finite.
#[derive(Clone, Copy, Debug)]
pub(super) struct Immittance {
    pub(super) numerator: Complex<f64>,
    pub(super) denominator: Complex<f64>,
}

impl Immittance {
    /// Impedance in ohms; an exact open gives +j[`IDEAL`].
    pub(super) fn impedance(self) -> Complex<f64> {
        ratio(self.numerator, self.denominator)
    }

    /// Admittance in siemens; an exact short gives +j[`IDEAL`].
    pub(super) fn admittance(self) -> Complex<f64> {
        ratio(self.denominator, self.numerator)
    }

    /// A branch at `hertz`.
    pub(super) fn of_branch(branch: &Branch, hertz: f64) -> Self {
        let omega = TAU * hertz;
        let inductive = |coil: Reactor| lossy_reactance(omega * coil.value, coil.loss);
        let capacitive = |c: Reactor| lossy_reactance(-1.0 / (omega * c.value), c.loss);
        let elements = [
            branch.resistance.map(Complex::from),
            branch.inductor.map(inductive),
            branch.capacitor.map(capacitive),
        ];
        let present = elements.into_iter().flatten();
        match branch.arrangement {
            Arrangement::Series => Self {
                numerator: present.sum(),
                denominator: ONE,
            },
            Arrangement::Parallel => Self {
                numerator: ONE,
                denominator: present.map(|z| quotient(ONE, z)).sum(),
            },
        }
    }

    /// A stub at `hertz`: Z0·tanh γl if shorted, Z0·coth γl if open.
    ///
    /// Numerator and denominator are sinh γl and cosh γl, both divided by cosh αl, which keeps them
    /// in range for any loss.
    pub(super) fn of_stub(termination: Termination, line: &Line, hertz: f64) -> Self {
        let (sin, cos) = angle::sin_cos(line, hertz);
        let tanh = (line.attenuation(hertz) * line.length).tanh();
        let sinh = Complex::new(tanh * cos, sin);
        let cosh = Complex::new(cos, tanh * sin);
        let (numerator, denominator) = match termination {
            Termination::Short => (sinh, cosh),
            Termination::Open => (cosh, sinh),
        };
        Self {
            numerator: numerator * line.impedance,
            denominator,
        }
    }
}

fn ratio(numerator: Complex<f64>, denominator: Complex<f64>) -> Complex<f64> {
    if denominator == ZERO {
        J * IDEAL
    } else {
        quotient(numerator, denominator)
    }
}

/// Impedance in ohms of a reactance with its loss in series.
pub(super) fn lossy_reactance(reactance: f64, loss: Loss) -> Complex<f64> {
    let resistance = match loss {
        Loss::Lossless => 0.0,
        Loss::Q(q) => reactance.abs() / q,
        Loss::Esr(ohms) => ohms,
    };
    Complex::new(resistance, reactance)
}

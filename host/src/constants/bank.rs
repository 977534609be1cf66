//! The constants of banks.

use std::f64::consts::TAU;

use stagebits_kernel as kernel;

use super::place;
use crate::plan::{Bank, BankElement, Position, StepLoss};

/// The bank without its steps.
pub(super) fn bank(position: Position, bank: &Bank, reference: f64) -> kernel::Bank<f64> {
    // an ideal contact is written as zero whatever its immittance
    let real = |value: f64, immittance: fn(f64, f64) -> f64| {
        if value == 0.0 {
            0.0
        } else {
            immittance(value, reference)
        }
    };
    let (element, contact, stray) = match bank.element {
        BankElement::Capacitors => (
            kernel::BankElement::Capacitors,
            real(bank.contact, |ohms, reference| ohms / reference),
            real(bank.stray, capacitive_reactance),
        ),
        BankElement::Coils => (
            kernel::BankElement::Coils,
            real(bank.contact, |ohms, reference| reference / ohms),
            real(bank.stray, |farads, reference| TAU * farads * reference),
        ),
    };
    kernel::Bank {
        position: place(position),
        element,
        proportional: bank.loss == StepLoss::Dissipation,
        steps: bank.steps.len() as u8,
        contact,
        stray,
    }
}

/// The steps of the bank.
pub(super) fn steps(bank: &Bank, reference: f64) -> impl Iterator<Item = kernel::BankStep<f64>> {
    bank.steps.iter().map(move |step| {
        let reactance = match bank.element {
            BankElement::Capacitors => capacitive_reactance(step.value, reference),
            BankElement::Coils => TAU * step.value / reference,
        };
        let resistance = match bank.loss {
            StepLoss::Dissipation => reactance.abs() * step.loss,
            StepLoss::Resistance => step.loss / reference,
        };
        kernel::BankStep {
            reactance,
            resistance,
        }
    })
}

/// Reactance over R0 times hertz.
fn capacitive_reactance(farads: f64, reference: f64) -> f64 {
    -1.0 / (TAU * farads * reference)
}

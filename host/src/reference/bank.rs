//! Banks by the textbook: impedances one after the other, admittances side by side.

use super::immittance::{Immittance, lossy_reactance};
use super::{J, ONE, ZERO, quotient};
use crate::plan::{Bank, BankElement, Loss, StepLoss};
use num_complex::Complex;
use std::f64::consts::TAU;

impl Immittance {
    /// A bank at `hertz` with the steps on whose bits are set in `word`.
    pub(super) fn of_bank(bank: &Bank, hertz: f64, word: u16) -> Self {
        let omega = TAU * hertz;
        let steps = bank.steps.iter().enumerate().map(|(bit, step)| {
            let loss = match bank.loss {
                _ if step.loss == 0.0 => Loss::Lossless,
                StepLoss::Dissipation => Loss::Q(1.0 / step.loss),
                StepLoss::Resistance => Loss::Esr(step.loss),
            };
            let reactance = match bank.element {
                BankElement::Coils => omega * step.value,
                BankElement::Capacitors => -1.0 / (omega * step.value),
            };
            let on = word >> bit & 1 != 0;
            (lossy_reactance(reactance, loss), on)
        });
        match bank.element {
            BankElement::Coils => Self {
                numerator: steps
                    .map(|(coil, on)| {
                        if on {
                            // coil and stray side by side: product over sum, in units of 1/(jωC)
                            let product = J * omega * bank.stray * coil;
                            Self::ratio(coil, ONE + product)
                        } else {
                            quotient(coil * bank.contact, coil + bank.contact)
                        }
                    })
                    .sum(),
                denominator: ONE,
            },
            BankElement::Capacitors => Self {
                numerator: ONE,
                denominator: steps
                    .map(|(capacitor, on)| {
                        if on {
                            quotient(ONE, capacitor + bank.contact)
                        } else if bank.stray > 0.0 {
                            let stray = -1.0 / (omega * bank.stray);
                            quotient(ONE, capacitor + Complex::new(0.0, stray))
                        } else {
                            ZERO
                        }
                    })
                    .sum(),
            },
        }
    }

    /// An impedance as a ratio; an exact open is as large as [`super::IDEAL`].
    fn ratio(numerator: Complex<f64>, denominator: Complex<f64>) -> Complex<f64> {
        Self {
            numerator,
            denominator,
        }
        .impedance()
    }
}

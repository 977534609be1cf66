//! Random banks, and the same as separate parts.

use proptest::prelude::*;
use stagebits::plan::{
    Accuracy, Arrangement, Band, Bank, BankElement, BankStep, Branch, Firmware, Loads, Loss, Part,
    Plan, Position, Reactor, Stage, StepLoss,
};
use std::f64::consts::TAU;

/// The frequency that values are drawn for.
pub(crate) const HERTZ: f64 = 10e6;

pub(crate) fn stage(part: Part) -> Stage {
    Stage {
        name: "test".to_owned(),
        part,
    }
}

/// A chain of these stages, of any load and at one frequency.
pub(crate) fn plan(stages: Vec<Stage>) -> Plan {
    Plan {
        title: "test".to_owned(),
        reference: 50.0,
        band: Band {
            from: HERTZ as u32,
            to: HERTZ as u32,
            points: 1,
        },
        loads: Loads::SwrUpTo(10.0),
        firmware: Firmware { word_bits: 32 },
        accuracy: Accuracy { gamma: 1e-4 },
        stages,
    }
}

/// Coils or capacitors of half an ohm to five kilohms at [`HERTZ`], losses and contacts as they
/// come, or none. A coil's resonance with its open contact is above four times that.
pub(crate) fn bank() -> impl Strategy<Value = Bank> {
    let size = |low: f64, high: f64| (low..high).prop_map(|power| 10.0_f64.powf(power));
    let maybe = |some: BoxedStrategy<f64>| prop_oneof![1 => Just(0.0).boxed(), 2 => some];
    let element = prop_oneof![Just(BankElement::Coils), Just(BankElement::Capacitors)];
    let kind = prop_oneof![Just(StepLoss::Dissipation), Just(StepLoss::Resistance)];
    let loss = maybe(size(-3.5, -1.0).boxed());
    (
        element,
        kind,
        prop::collection::vec((size(-0.3, 3.7), loss), 1..=16),
        maybe(size(-2.0, 0.0).boxed()),
        maybe(size(4.9, 6.0).boxed()),
    )
        .prop_map(|(element, loss, steps, contact, stray)| {
            let omega = TAU * HERTZ;
            let steps = steps.into_iter().map(|(reactance, loss)| BankStep {
                value: match element {
                    BankElement::Coils => reactance / omega,
                    BankElement::Capacitors => 1.0 / (omega * reactance),
                },
                loss,
            });
            Bank {
                element,
                loss,
                steps: steps.collect(),
                contact,
                stray: if stray == 0.0 {
                    0.0
                } else {
                    1.0 / (omega * stray)
                },
            }
        })
}

/// What each step is as a part of its own: a series branch of a coil bank, a shunt branch of a
/// capacitor bank; none where it is not there.
pub(crate) fn separate(bank: &Bank, word: u16) -> Vec<Stage> {
    let steps = bank.steps.iter().enumerate();
    steps
        .filter_map(|(bit, step)| separate_step(bank, step, word >> bit & 1 != 0))
        .collect()
}

fn separate_step(bank: &Bank, step: &BankStep, on: bool) -> Option<Stage> {
    let loss = match bank.loss {
        _ if step.loss == 0.0 => Loss::Lossless,
        StepLoss::Dissipation => Loss::Q(1.0 / step.loss),
        StepLoss::Resistance => Loss::Esr(step.loss),
    };
    let element = Reactor {
        value: step.value,
        loss,
    };
    let alone = Branch {
        arrangement: Arrangement::Series,
        resistance: None,
        inductor: None,
        capacitor: None,
    };
    let (position, branch) = match bank.element {
        BankElement::Capacitors if on => {
            let resistance = (bank.contact > 0.0).then_some(bank.contact);
            let capacitor = Some(element);
            (
                Position::Shunt,
                Branch {
                    resistance,
                    capacitor,
                    ..alone
                },
            )
        }
        BankElement::Capacitors => {
            // two capacitors in series; the loss of one is less of the whole reactance
            let ratio = step.value / bank.stray;
            if bank.stray == 0.0 {
                return None;
            }
            let loss = match loss {
                Loss::Q(q) => Loss::Q(q * (1.0 + ratio)),
                other => other,
            };
            let value = step.value / (1.0 + ratio);
            let capacitor = Some(Reactor { value, loss });
            (Position::Shunt, Branch { capacitor, ..alone })
        }
        BankElement::Coils => {
            let inductor = Some(element);
            let beside = Branch {
                arrangement: Arrangement::Parallel,
                inductor,
                ..alone
            };
            let branch = match (on, bank.contact > 0.0, bank.stray > 0.0) {
                (true, _, false) => Branch { inductor, ..alone },
                (true, _, true) => Branch {
                    capacitor: Some(Reactor {
                        value: bank.stray,
                        loss: Loss::Lossless,
                    }),
                    ..beside
                },
                (false, false, _) => return None,
                (false, true, _) => Branch {
                    resistance: Some(bank.contact),
                    ..beside
                },
            };
            (Position::Series, branch)
        }
    };
    Some(stage(Part::Branch(position, branch)))
}

/// A reflection coefficient in the closed unit disc.
pub(crate) fn gamma() -> impl Strategy<Value = num_complex::Complex<f64>> {
    (0.0..=1.0_f64, 0.0..TAU)
        .prop_map(|(area, angle)| num_complex::Complex::from_polar(area.sqrt(), angle))
}

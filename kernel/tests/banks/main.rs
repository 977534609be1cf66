//! Banks: the same as the parts that they stand for, in every state.

mod building;
mod ends;
mod equivalence;
mod states;

use proptest::prelude::*;
use stagebits_kernel::{Bank, BankElement, BankStep, Complex, Position, Scalar};

/// The frequency that immittances are drawn for.
const HERTZ: u32 = 10_000_000;

/// The value of a scalar; exact.
fn value(s: Scalar) -> f64 {
    f64::from(s.mantissa()) * 2.0_f64.powi(s.exponent())
}

/// The scalar nearest to a number.
fn scalar(value: f64) -> Scalar {
    if value == 0.0 {
        return Scalar::ZERO;
    }
    let exponent = value.abs().log2().floor() as i32 - 40;
    Scalar::from_i64((value * 2.0_f64.powi(-exponent)).round() as i64, exponent)
}

fn imaginary(im: Scalar) -> Complex<Scalar> {
    Complex {
        re: Scalar::ZERO,
        im,
    }
}

/// A bank with its steps.
#[derive(Clone, Debug)]
struct Case {
    bank: Bank<Scalar>,
    steps: Vec<BankStep<Scalar>>,
}

/// A bank of up to `most` steps: reactances from a hundredth to a hundred times R0 at [`HERTZ`],
/// losses and contacts as they come, or none.
fn case(most: usize) -> impl Strategy<Value = Case> {
    let size = |low: f64, high: f64| (low..high).prop_map(|power| 10.0_f64.powf(power));
    let maybe = |some: BoxedStrategy<f64>| prop_oneof![1 => Just(0.0).boxed(), 2 => some];
    let loss = maybe(size(-4.0, -1.0).boxed());
    let step = (size(-2.0, 2.0), loss);
    let position = prop_oneof![Just(Position::Series), Just(Position::Shunt)];
    let element = prop_oneof![Just(BankElement::Coils), Just(BankElement::Capacitors)];
    (
        (position, element, any::<bool>()),
        maybe(size(-4.0, -2.0).boxed()),
        maybe(size(2.0, 4.0).boxed()),
        prop::collection::vec(step, 1..=most),
    )
        .prop_map(|((position, element, proportional), closed, open, steps)| {
            let hertz = f64::from(HERTZ);
            // of a reactance of 1 at the frequency
            let unit = match element {
                BankElement::Coils => 1.0 / hertz,
                BankElement::Capacitors => -hertz,
            };
            let steps: Vec<_> = steps
                .into_iter()
                .map(|(reactance, loss)| BankStep {
                    reactance: scalar(reactance * unit),
                    resistance: scalar(if proportional {
                        reactance * loss * unit.abs()
                    } else {
                        loss
                    }),
                })
                .collect();
            let ideal = |contact: f64, of: f64| scalar(if contact == 0.0 { 0.0 } else { of });
            let (contact, stray) = match element {
                BankElement::Coils => (ideal(closed, 1.0 / closed), ideal(open, unit / open)),
                BankElement::Capacitors => (scalar(closed), ideal(open, unit * open)),
            };
            let bank = Bank {
                position,
                element,
                proportional,
                steps: steps.len() as u8,
                contact,
                stray,
            };
            Case { bank, steps }
        })
}

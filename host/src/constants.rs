//! From a plan to the constants that a firmware image stores.
//!
//! The kernel's stages are normalised to R0 and written as laws of frequency. Here every constant
//! is worked out in `f64` ([`exact`]) and then rounded to what the target stores: words of W bits
//! ([`rounded`]) or `f32` ([`single`]).

mod bank;

use std::f64::consts::TAU;

use stagebits_kernel as kernel;
use stagebits_kernel::{Chain, Complex, Law, LossyReactor, Scalar, StubFunction};

use crate::plan::{
    Arrangement, BANK_STEPS_MAX, Branch, Line, Loss, Part, Plan, Position, Reactor, Termination,
};

/// Capacity of the chains that the desktop works with.
pub const CAPACITY: usize = crate::plan::STAGE_CAPACITY;

/// Steps of banks that they have room for: those of full banks only.
pub const STEP_CAPACITY: usize = CAPACITY * BANK_STEPS_MAX;

/// A chain of constants, as the desktop works with it.
pub type Constants<R> = Chain<R, CAPACITY, STEP_CAPACITY>;

/// The chain with its constants in `f64`.
///
/// # Panics
/// If the plan has more stages than [`CAPACITY`], a bank without steps or with more than
/// [`BANK_STEPS_MAX`], or a parallel branch whose coil and capacitor both have a constant series
/// resistance; the chain file reader lets none of them through.
pub fn exact(plan: &Plan) -> Constants<f64> {
    let reference = plan.reference;
    let stages: Vec<_> = plan
        .stages
        .iter()
        .map(|stage| match &stage.part {
            Part::Branch(position, branch) => {
                kernel::Stage::Branch(branch_constants(*position, branch, reference))
            }
            Part::Line(line) => kernel::Stage::Line(line_constants(line, reference)),
            Part::Stub(position, end, line) => {
                kernel::Stage::Stub(stub_constants(*position, *end, line, reference))
            }
            Part::Transformer { ratio } => kernel::Stage::Transformer(kernel::Transformer {
                ratio: *ratio,
                inverse: ratio.recip(),
            }),
            Part::Bank(position, bank) => {
                kernel::Stage::Bank(bank::bank(*position, bank, reference))
            }
        })
        .collect();
    let banks = plan.banks();
    let steps: Vec<_> = banks
        .flat_map(|(_, bank)| bank::steps(bank, reference))
        .collect();
    Chain::with_banks(&stages, &steps).expect("a plan has at most CAPACITY stages and full banks")
}

/// The chain with each constant rounded to a word of `word_bits` and an exponent.
pub fn rounded(chain: &Constants<f64>, word_bits: u32) -> Constants<Scalar> {
    chain.map(|constant| word(constant, word_bits))
}

/// The chain with each constant rounded to `f32`.
pub fn single(chain: &Constants<f64>) -> Constants<f32> {
    chain.map(|constant| constant as f32)
}

/// The value of a scalar.
pub fn value(scalar: Scalar) -> f64 {
    f64::from(scalar.mantissa()) * f64::from(scalar.exponent()).exp2()
}

/// `value` with a mantissa of `word_bits` bits, sign included, rounded to the nearest.
///
/// Values below 2^-450 become zero and values above 2^450 stop there, both far outside what a
/// plan can hold.
fn word(value: f64, word_bits: u32) -> Scalar {
    let magnitude = value.abs();
    if magnitude < (-450_f64).exp2() {
        return Scalar::ZERO;
    }
    let magnitude = magnitude.min(450_f64.exp2());
    // 2^30 ≤ mantissa < 2^31, the lowest 32 − W bits clear
    let mut exponent = magnitude.log2().floor() as i32 - 30;
    let step = f64::from(1_u32 << (32 - word_bits));
    let round = |exponent: i32| (magnitude / f64::from(exponent).exp2() / step).round() * step;
    if round(exponent) >= f64::from(1_u32 << 31) {
        exponent += 1;
    } else if round(exponent) < f64::from(1_u32 << 30) {
        // log2 rounded up across a power of two
        exponent -= 1;
    }
    let mantissa = (round(exponent) as i32) * if value < 0.0 { -1 } else { 1 };
    Scalar::from_parts(mantissa, exponent).expect("normalised by construction")
}

fn branch_constants(position: Position, branch: &Branch, reference: f64) -> kernel::Branch<f64> {
    let kernel_position = place(position);
    let reactors = [branch.inductor, branch.capacitor];
    let single = reactors.iter().flatten().count() + usize::from(branch.resistance.is_some()) == 1;
    let constant_loss = reactors
        .iter()
        .flatten()
        .any(|reactor| matches!(reactor.loss, Loss::Esr(_)));
    // A lone element follows a law in either position, unless a constant loss is in series with it
    let admittances = match branch.arrangement {
        Arrangement::Series => single && position == Position::Shunt && !constant_loss,
        Arrangement::Parallel => true,
    };
    let (law, beside) = if admittances {
        admittance_law(branch, reference)
    } else {
        (impedance_law(branch, reference), None)
    };
    kernel::Branch {
        position: kernel_position,
        inverted: admittances != (position == Position::Shunt),
        law,
        beside,
    }
}

/// Elements in series: Z/R0 = R + rising·f + falling/f.
fn impedance_law(branch: &Branch, reference: f64) -> Law<f64> {
    let esr = |reactor: &Option<Reactor>| match reactor.map(|reactor| reactor.loss) {
        Some(Loss::Esr(ohms)) => ohms,
        _ => 0.0,
    };
    let resistance = branch.resistance.unwrap_or(0.0);
    let mut law = Law {
        constant: (resistance + esr(&branch.inductor) + esr(&branch.capacitor)) / reference,
        ..Law::ZERO
    };
    if let Some(coil) = branch.inductor {
        let reactance = TAU * coil.value / reference;
        law.rising = Complex {
            re: reactance * dissipation(coil.loss),
            im: reactance,
        };
    }
    if let Some(capacitor) = branch.capacitor {
        let reactance = 1.0 / (TAU * capacitor.value * reference);
        law.falling = Complex {
            re: reactance * dissipation(capacitor.loss),
            im: -reactance,
        };
    }
    law
}

/// Elements side by side: Y·R0 = G + rising·f + falling/f, and an element with a constant loss in
/// series with it, whose admittance is no such law, apart.
fn admittance_law(branch: &Branch, reference: f64) -> (Law<f64>, Option<LossyReactor<f64>>) {
    let mut law = Law {
        constant: branch.resistance.map_or(0.0, |ohms| reference / ohms),
        ..Law::ZERO
    };
    let mut beside = None;
    if let Some(coil) = branch.inductor {
        let reactance = TAU * coil.value / reference;
        if let Loss::Esr(ohms) = coil.loss {
            let resistance = ohms / reference;
            beside = Some(LossyReactor {
                resistance,
                reactance,
                falling: false,
            });
        } else {
            // 1/(X (d + j)) = (d − j) / (X (1 + d²)), d = 1/Q
            let d = dissipation(coil.loss);
            let susceptance = 1.0 / (reactance * (1.0 + d * d));
            law.falling = Complex {
                re: susceptance * d,
                im: -susceptance,
            };
        }
    }
    if let Some(capacitor) = branch.capacitor {
        let susceptance = TAU * capacitor.value * reference;
        if let Loss::Esr(ohms) = capacitor.loss {
            assert!(
                beside.is_none(),
                "a parallel branch holds one element with a constant series resistance"
            );
            let (resistance, reactance) = (ohms / reference, -1.0 / susceptance);
            beside = Some(LossyReactor {
                resistance,
                reactance,
                falling: true,
            });
        } else {
            let d = dissipation(capacitor.loss);
            let susceptance = susceptance / (1.0 + d * d);
            law.rising = Complex {
                re: susceptance * d,
                im: susceptance,
            };
        }
    }
    (law, beside)
}

/// Series resistance over reactance: 1/Q.
fn dissipation(loss: Loss) -> f64 {
    match loss {
        Loss::Q(q) => 1.0 / q,
        Loss::Lossless | Loss::Esr(_) => 0.0,
    }
}

fn line_constants(line: &Line, reference: f64) -> kernel::Line<f64> {
    kernel::Line {
        impedance: line.impedance / reference,
        admittance: reference / line.impedance,
        turns_per_hertz: turns_per_hertz(line),
        root_loss: line.k1 * line.length,
        linear_loss: line.k2 * line.length,
    }
}

fn stub_constants(
    position: Position,
    end: Termination,
    line: &Line,
    reference: f64,
) -> kernel::Stub<f64> {
    let constants = line_constants(line, reference);
    // a shorted stub's impedance and an open one's admittance go with tanh γl
    let tanh = (position == Position::Series) == (end == Termination::Short);
    kernel::Stub {
        position: place(position),
        function: if tanh {
            StubFunction::Tanh
        } else {
            StubFunction::Coth
        },
        immittance: match position {
            Position::Series => constants.impedance,
            Position::Shunt => constants.admittance,
        },
        turns_per_hertz: constants.turns_per_hertz,
        root_loss: constants.root_loss,
        linear_loss: constants.linear_loss,
    }
}

/// Electrical length in 2^-64 turns per hertz. Whole turns per hertz are whole turns at every whole
/// frequency and are left out.
fn turns_per_hertz(line: &Line) -> u64 {
    (line.delay().fract() * 64_f64.exp2()).round() as u64
}

fn place(position: Position) -> kernel::Position {
    match position {
        Position::Series => kernel::Position::Series,
        Position::Shunt => kernel::Position::Shunt,
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use proptest::prelude::*;

    proptest! {
        #[test]
        fn words_are_nearest(mantissa in 1.0_f64..2.0, exponent in -60..60, bits in 10_u32..=32) {
            let exact = mantissa * f64::from(exponent).exp2();
            let rounded = value(word(-exact, bits));
            let half_unit = f64::from(exponent - bits as i32 + 1).exp2();
            prop_assert!((rounded + exact).abs() <= half_unit);
            prop_assert_eq!(word(rounded, bits), word(-exact, bits));
        }
    }

    #[test]
    fn words_carry_at_powers_of_two() {
        for power in [-53, -1, 0, 1, 40] {
            let exact = f64::from(power).exp2();
            for neighbour in [exact, exact.next_down(), exact.next_up()] {
                assert_eq!(value(word(neighbour, 16)), exact);
            }
        }
        assert_eq!(word(0.0, 16), Scalar::ZERO);
    }
}

//! Which kind of stage stores what: stages as records and back.

use super::error::StageFault;
use super::record::{CONSTANTS, Record};
use crate::real::Complex;
use crate::scalar::Scalar;
use crate::stage::{
    Bank, BankElement, Branch, Law, Line, LossyReactor, Position, Stage, Stub, StubFunction,
    Transformer,
};

// kinds, in the lowest bits of the tag
const KINDS: u8 = 0b111;
const BRANCH: u8 = 1;
const LINE: u8 = 2;
const STUB: u8 = 3;
const TRANSFORMER: u8 = 4;
const BANK: u8 = 5;

/// Constants of a bank beside those of its steps.
pub(super) const BANK_CONSTANTS: usize = 2;

// options above them
const SHUNT: u8 = 1 << 3;
const INVERTED: u8 = 1 << 4;
const COTH: u8 = 1 << 4;
const COILS: u8 = 1 << 4;
const BESIDE: u8 = 1 << 5;
const PROPORTIONAL: u8 = 1 << 5;
const FALLING: u8 = 1 << 6;

/// What a stage stores, but for the steps of a bank.
pub(super) fn record(stage: &Stage<Scalar>) -> Record {
    let mut tag = 0;
    let mut option = |is_set: bool, bit: u8| tag |= if is_set { bit } else { 0 };
    let mut constants = [Scalar::ZERO; CONSTANTS];
    let mut turns_per_hertz = 0;
    match stage {
        Stage::Branch(branch) => {
            option(true, BRANCH);
            option(branch.position == Position::Shunt, SHUNT);
            option(branch.inverted, INVERTED);
            option(branch.beside.is_some(), BESIDE);
            let beside = branch.beside.unwrap_or(LossyReactor {
                resistance: Scalar::ZERO,
                reactance: Scalar::ZERO,
                falling: false,
            });
            option(beside.falling, FALLING);
            let Law {
                constant,
                rising,
                falling,
            } = branch.law;
            constants = [
                constant,
                rising.re,
                rising.im,
                falling.re,
                falling.im,
                beside.resistance,
                beside.reactance,
            ];
        }
        Stage::Line(line) => {
            option(true, LINE);
            fill(
                &mut constants,
                [
                    line.impedance,
                    line.admittance,
                    line.root_loss,
                    line.linear_loss,
                ],
            );
            turns_per_hertz = line.turns_per_hertz;
        }
        Stage::Stub(stub) => {
            option(true, STUB);
            option(stub.position == Position::Shunt, SHUNT);
            option(stub.function == StubFunction::Coth, COTH);
            fill(
                &mut constants,
                [stub.immittance, stub.root_loss, stub.linear_loss],
            );
            turns_per_hertz = stub.turns_per_hertz;
        }
        Stage::Transformer(transformer) => {
            option(true, TRANSFORMER);
            fill(&mut constants, [transformer.ratio, transformer.inverse]);
        }
        Stage::Bank(bank) => {
            option(true, BANK);
            option(bank.position == Position::Shunt, SHUNT);
            option(bank.element == BankElement::Coils, COILS);
            option(bank.proportional, PROPORTIONAL);
            fill::<BANK_CONSTANTS>(&mut constants, [bank.contact, bank.stray]);
        }
    }
    Record {
        tag,
        constants,
        turns_per_hertz,
    }
}

fn fill<const M: usize>(constants: &mut [Scalar; CONSTANTS], with: [Scalar; M]) {
    for (constant, value) in constants.iter_mut().zip(with) {
        *constant = value;
    }
}

/// The stage that stores this; a bank is without steps.
pub(super) fn stage(stored: &Record) -> Result<Stage<Scalar>, StageFault> {
    let option = |bit: u8| stored.tag & bit != 0;
    let position = if option(SHUNT) {
        Position::Shunt
    } else {
        Position::Series
    };
    let turns_per_hertz = stored.turns_per_hertz;
    let [a, b, c, d, e, f, g] = stored.constants;
    let stage = match stored.tag & KINDS {
        BRANCH => Stage::Branch(Branch {
            position,
            inverted: option(INVERTED),
            law: Law {
                constant: a,
                rising: Complex { re: b, im: c },
                falling: Complex { re: d, im: e },
            },
            beside: option(BESIDE).then_some(LossyReactor {
                resistance: f,
                reactance: g,
                falling: option(FALLING),
            }),
        }),
        LINE => Stage::Line(Line {
            impedance: a,
            admittance: b,
            turns_per_hertz,
            root_loss: c,
            linear_loss: d,
        }),
        STUB => Stage::Stub(Stub {
            position,
            function: if option(COTH) {
                StubFunction::Coth
            } else {
                StubFunction::Tanh
            },
            immittance: a,
            turns_per_hertz,
            root_loss: b,
            linear_loss: c,
        }),
        TRANSFORMER => Stage::Transformer(Transformer {
            ratio: a,
            inverse: b,
        }),
        BANK => Stage::Bank(Bank {
            position,
            element: if option(COILS) {
                BankElement::Coils
            } else {
                BankElement::Capacitors
            },
            proportional: option(PROPORTIONAL),
            steps: 0,
            contact: a,
            stray: b,
        }),
        unknown => return Err(StageFault::UnknownKind(unknown)),
    };
    // what the stage has no place for is lost on the way
    if record(&stage) == *stored {
        Ok(stage)
    } else {
        Err(StageFault::UnknownField)
    }
}

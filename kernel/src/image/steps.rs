//! The steps of a bank in bytes: their number, then for each a byte of masks and its constants.

use super::constant::Form;
use super::cursor::{Reader, Writer};
use super::error::StageFault;
use super::record::form;
use crate::scalar::Scalar;
use crate::stage::{BANK_STEPS_MAX, BankStep};

/// Constants of a step: reactance and resistance.
const CONSTANTS: usize = 2;

/// The steps of a bank take no more bytes.
pub(super) const LENGTH_MAX: usize =
    1 + BANK_STEPS_MAX as usize * (1 + CONSTANTS * Form::LENGTH_MAX);

/// Room for the steps of any bank.
pub(super) type Room = [BankStep<Scalar>; BANK_STEPS_MAX as usize];

/// Writes the steps of a bank. There are at most [`BANK_STEPS_MAX`].
pub(super) fn write(
    steps: &[BankStep<Scalar>],
    writer: &mut Writer<'_>,
    word_bits: u32,
) -> Result<(), StageFault> {
    writer.put(&[steps.len() as u8]);
    for step in steps {
        let constants = [step.reactance, step.resistance];
        let (mut present, mut full) = (0, 0);
        for (bit, constant) in constants.into_iter().enumerate() {
            match Form::of(constant, word_bits).ok_or(StageFault::Constant)? {
                Form::Absent => {}
                Form::Short => present |= 1 << bit,
                Form::Full => {
                    present |= 1 << bit;
                    full |= 1 << bit;
                }
            }
        }
        writer.put(&[present | full << CONSTANTS]);
        for (bit, constant) in constants.into_iter().enumerate() {
            form(present, full, bit).write(constant, writer, word_bits);
        }
    }
    Ok(())
}

/// Reads the steps of a bank into the start of `room`.
pub(super) fn read<'a>(
    reader: &mut Reader<'_>,
    word_bits: u32,
    room: &'a mut Room,
) -> Result<&'a [BankStep<Scalar>], StageFault> {
    let [count] = reader.take().ok_or(StageFault::Incomplete)?;
    let steps = match room.get_mut(..count.into()) {
        Some(steps) if count > 0 => steps,
        _ => return Err(StageFault::StepCount(count)),
    };
    for step in steps.iter_mut() {
        let [masks] = reader.take().ok_or(StageFault::Incomplete)?;
        let (present, full) = (masks & 0b11, masks >> CONSTANTS);
        if full & !present != 0 {
            return Err(StageFault::UnknownField);
        }
        let mut constant = |bit| form(present, full, bit).read(reader, word_bits);
        *step = BankStep {
            reactance: constant(0)?,
            resistance: constant(1)?,
        };
    }
    Ok(steps)
}

//! One stage in bytes, whatever its kind: a tag, constants, and turns per hertz.

use super::constant::Form;
use super::cursor::{Reader, Writer};
use super::error::StageFault;
use crate::scalar::Scalar;

/// Most constants that a stage has.
pub(super) const CONSTANTS: usize = 7;
/// Bit of the tag: a mask of the constants in full follows.
const ANY_IN_FULL: u8 = 1 << 7;
/// Bit of the mask of what is not zero, above those of the constants: turns per hertz.
const TURNS: u8 = 1 << CONSTANTS;

/// What a stage stores.
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
pub(super) struct Record {
    /// Kind and options; the highest bit is clear.
    pub(super) tag: u8,
    /// The constants of the kind in its order, then zeros.
    pub(super) constants: [Scalar; CONSTANTS],
    /// Electrical length of a line or a stub in 2^-64 turns per hertz, or zero.
    pub(super) turns_per_hertz: u64,
}

impl Record {
    /// No record of a kind with this number of constants takes more bytes.
    pub(super) const fn length_max(constants: usize) -> usize {
        3 + constants * Form::LENGTH_MAX + 8
    }

    pub(super) fn write(&self, writer: &mut Writer<'_>, word_bits: u32) -> Result<(), StageFault> {
        let (mut present, mut full) = (0, 0);
        if self.turns_per_hertz != 0 {
            present |= TURNS;
        }
        for (bit, constant) in self.constants.iter().enumerate() {
            match Form::of(*constant, word_bits).ok_or(StageFault::Constant)? {
                Form::Absent => {}
                Form::Short => present |= 1 << bit,
                Form::Full => {
                    present |= 1 << bit;
                    full |= 1 << bit;
                }
            }
        }
        if full == 0 {
            writer.put(&[self.tag, present]);
        } else {
            writer.put(&[self.tag | ANY_IN_FULL, present, full]);
        }
        for (bit, constant) in self.constants.iter().enumerate() {
            form(present, full, bit).write(*constant, writer, word_bits);
        }
        if present & TURNS != 0 {
            writer.put(&self.turns_per_hertz.to_le_bytes());
        }
        Ok(())
    }

    pub(super) fn read(reader: &mut Reader<'_>, word_bits: u32) -> Result<Self, StageFault> {
        let [tag, present] = reader.take().ok_or(StageFault::Incomplete)?;
        let mut full = 0;
        if tag & ANY_IN_FULL != 0 {
            [full] = reader.take().ok_or(StageFault::Incomplete)?;
            if full == 0 || full & !(present & !TURNS) != 0 {
                return Err(StageFault::UnknownField);
            }
        }
        let mut constants = [Scalar::ZERO; CONSTANTS];
        for (bit, constant) in constants.iter_mut().enumerate() {
            *constant = form(present, full, bit).read(reader, word_bits)?;
        }
        let mut turns_per_hertz = 0;
        if present & TURNS != 0 {
            turns_per_hertz = u64::from_le_bytes(reader.take().ok_or(StageFault::Incomplete)?);
            if turns_per_hertz == 0 {
                return Err(StageFault::UnknownField);
            }
        }
        Ok(Self {
            tag: tag & !ANY_IN_FULL,
            constants,
            turns_per_hertz,
        })
    }
}

/// The form that the masks give the constant at this bit.
pub(super) fn form(present: u8, full: u8, bit: usize) -> Form {
    let bit = 1 << bit;
    match (present & bit != 0, full & bit != 0) {
        (false, _) => Form::Absent,
        (true, false) => Form::Short,
        (true, true) => Form::Full,
    }
}

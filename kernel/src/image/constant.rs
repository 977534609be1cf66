//! One constant in bytes.

use super::cursor::{Reader, Writer};
use super::error::StageFault;
use crate::scalar::Scalar;

/// Power of two of a scalar's mantissa: what its exponent is short of that of the value.
const MANTISSA_POWER: i32 = 30;
/// Bytes of a scalar's mantissa.
const MANTISSA_LENGTH: usize = 4;

/// How a constant is stored. Every constant has one form only.
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
pub(super) enum Form {
    /// Not at all: zero.
    Absent,
    /// A mantissa of the word length and one byte of exponent.
    Short,
    /// A mantissa of 32 bits and two bytes of exponent.
    Full,
}

impl Form {
    /// Bytes that the longest form takes.
    pub(super) const LENGTH_MAX: usize = MANTISSA_LENGTH + 2;

    /// The form of a constant, or `None` if it is beyond what an image can hold.
    pub(super) fn of(constant: Scalar, word_bits: u32) -> Option<Self> {
        Scalar::from_parts(constant.mantissa(), constant.exponent())?;
        if constant.is_zero() {
            return Some(Self::Absent);
        }
        let mantissa = constant.mantissa().trailing_zeros() + word_bits >= 32;
        let exponent = i8::try_from(constant.exponent() + MANTISSA_POWER).is_ok();
        Some(if mantissa && exponent {
            Self::Short
        } else {
            Self::Full
        })
    }

    /// Bytes of the mantissa, which are the highest of the scalar's.
    fn mantissa_length(self, word_bits: u32) -> usize {
        match self {
            Self::Absent => 0,
            Self::Short => word_bits.div_ceil(8) as usize,
            Self::Full => MANTISSA_LENGTH,
        }
    }

    /// Writes a constant of this form.
    pub(super) fn write(self, constant: Scalar, writer: &mut Writer<'_>, word_bits: u32) {
        let cut = MANTISSA_LENGTH.saturating_sub(self.mantissa_length(word_bits));
        for byte in constant.mantissa().to_le_bytes().iter().skip(cut) {
            writer.put(&[*byte]);
        }
        let exponent = constant.exponent() + MANTISSA_POWER;
        match self {
            Self::Absent => {}
            Self::Short => writer.put(&(exponent as i8).to_le_bytes()),
            Self::Full => writer.put(&(exponent as i16).to_le_bytes()),
        }
    }

    /// Reads a constant of this form.
    pub(super) fn read(
        self,
        reader: &mut Reader<'_>,
        word_bits: u32,
    ) -> Result<Scalar, StageFault> {
        let mut mantissa: u32 = 0;
        for _ in 0..self.mantissa_length(word_bits) {
            let [byte] = reader.take().ok_or(StageFault::Incomplete)?;
            mantissa = (mantissa >> 8) | (u32::from(byte) << 24);
        }
        let exponent = match self {
            Self::Absent => return Ok(Scalar::ZERO),
            Self::Short => {
                let byte = reader.take().ok_or(StageFault::Incomplete)?;
                i32::from(i8::from_le_bytes(byte))
            }
            Self::Full => {
                let bytes = reader.take().ok_or(StageFault::Incomplete)?;
                i32::from(i16::from_le_bytes(bytes))
            }
        };
        Scalar::from_parts(mantissa as i32, exponent - MANTISSA_POWER)
            .filter(|constant| Self::of(*constant, word_bits) == Some(self))
            .ok_or(StageFault::Constant)
    }
}

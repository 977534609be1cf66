//! What an image says about its chain as a whole.

use core::ops::RangeInclusive;

use super::error::ImageError;

/// Word length and reference resistance of an image.
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Header {
    word_bits: u8,
    reference_milliohms: u32,
}

impl Header {
    /// Word lengths that an image can be made for.
    pub const WORD_BITS: RangeInclusive<u32> = 10..=32;

    /// A header for words of `word_bits`, sign included, and a reference resistance R0 in
    /// milliohms.
    ///
    /// # Errors
    /// [`ImageError::WordLength`] beyond [`Header::WORD_BITS`], and
    /// [`ImageError::NoReference`] for 0 milliohms.
    pub const fn new(word_bits: u32, reference_milliohms: u32) -> Result<Self, ImageError> {
        if word_bits < *Self::WORD_BITS.start() || word_bits > *Self::WORD_BITS.end() {
            return Err(ImageError::WordLength(word_bits));
        }
        if reference_milliohms == 0 {
            return Err(ImageError::NoReference);
        }
        Ok(Self {
            word_bits: word_bits as u8,
            reference_milliohms,
        })
    }

    /// Word length W in bits, sign included.
    pub const fn word_bits(self) -> u32 {
        self.word_bits as u32
    }

    /// R0 in milliohms, as [`crate::Moments::milliohms`] takes it.
    pub const fn reference_milliohms(self) -> u32 {
        self.reference_milliohms
    }
}

//! Why bytes are no image, or a chain has none.

use core::fmt;

use super::header::Header;
use super::{MAGIC, VERSION};
use crate::stage::BANK_STEPS_MAX;

/// Why bytes are no image of a chain, or a chain has no image.
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub enum ImageError {
    /// The bytes end within the header or the checksum.
    TooShort,
    /// The first four bytes, these, are not those of an image.
    NotAnImage([u8; 4]),
    /// The image has a layout of this version.
    UnsupportedVersion(u8),
    /// The image is longer or shorter than its header says.
    WrongLength {
        /// Bytes according to the header.
        stated: u16,
        /// Bytes given.
        found: usize,
    },
    /// The bytes are not those that were checksummed.
    BadChecksum {
        /// Checksum at the end of the image.
        stated: u32,
        /// Checksum of what is before it.
        found: u32,
    },
    /// The word length, this many bits, is beyond [`Header::WORD_BITS`].
    WordLength(u32),
    /// The reference resistance is zero.
    NoReference,
    /// There is no room for the stages: in the chain when decoding, in the image when encoding.
    TooManyStages {
        /// Number of stages.
        stages: usize,
        /// Most that there is room for.
        capacity: usize,
    },
    /// There is no room in the chain for the steps of a bank.
    TooManySteps {
        /// Which stage the bank is, counted from 1 at the source.
        number: u8,
        /// Most steps of all banks together that there is room for.
        capacity: usize,
    },
    /// A stage cannot be read or written.
    BadStage {
        /// Which one, counted from 1 at the source.
        number: u8,
        /// What is wrong with it.
        fault: StageFault,
    },
    /// This many bytes stand between the last stage and the checksum.
    TrailingBytes(usize),
    /// The image does not fit the buffer.
    BufferTooSmall {
        /// Length of the image in bytes.
        needed: usize,
        /// Length of the buffer in bytes.
        found: usize,
    },
}

/// What is wrong with a stage of an image.
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub enum StageFault {
    /// The stages end within it.
    Incomplete,
    /// There is no kind of stage with this number.
    UnknownKind(u8),
    /// It has an option or a number that its kind does not have, masks that contradict each other,
    /// or zero turns per hertz written out.
    UnknownField,
    /// A constant is not normalised, out of range, or stored in another form than its own.
    Constant,
    /// It is a bank with this number of steps, which is not 1 to [`crate::BANK_STEPS_MAX`].
    StepCount(u8),
}

impl fmt::Display for ImageError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::TooShort => f.write_str("the image ends within its header or checksum"),
            Self::NotAnImage(found) => write!(
                f,
                "no image of a chain: it starts with {:08x}, an image with {:08x}",
                u32::from_be_bytes(*found),
                u32::from_be_bytes(MAGIC)
            ),
            Self::UnsupportedVersion(version) => write!(
                f,
                "the image has layout version {version}, where {VERSION} is supported"
            ),
            Self::WrongLength { stated, found } => write!(
                f,
                "the image is {found} bytes long, and {stated} by its header"
            ),
            Self::BadChecksum { stated, found } => write!(
                f,
                "the image is damaged: its checksum is {stated:08x}, that of its bytes {found:08x}"
            ),
            Self::WordLength(bits) => write!(
                f,
                "a word length of {bits} bits; from {} to {} are possible",
                Header::WORD_BITS.start(),
                Header::WORD_BITS.end()
            ),
            Self::NoReference => f.write_str("the reference resistance is zero milliohms"),
            Self::TooManyStages { stages, capacity } => {
                write!(f, "{stages} stages, where there is room for {capacity}")
            }
            Self::TooManySteps { number, capacity } => write!(
                f,
                "no room for the steps of stage {number}: banks have room for {capacity} together"
            ),
            Self::BadStage { number, fault } => write!(f, "stage {number} {fault}"),
            Self::TrailingBytes(bytes) => write!(
                f,
                "bytes after the last stage of the image: {bytes} before its checksum"
            ),
            Self::BufferTooSmall { needed, found } => write!(
                f,
                "the image takes {needed} bytes, and the buffer has {found}"
            ),
        }
    }
}

impl fmt::Display for StageFault {
    /// Continues a sentence that begins with the stage.
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::Incomplete => f.write_str("is cut off"),
            Self::UnknownKind(kind) => write!(f, "is of an unknown kind, {kind}"),
            Self::UnknownField => f.write_str("has a field that its kind does not have or need"),
            Self::Constant => f.write_str(
                "has a constant that is not normalised, out of range or not in its shortest form",
            ),
            Self::StepCount(steps) => write!(
                f,
                "is a bank of {steps} steps, where 1 to {BANK_STEPS_MAX} are possible"
            ),
        }
    }
}

impl core::error::Error for ImageError {}

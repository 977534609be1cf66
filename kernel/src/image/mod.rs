//! Images: a chain as bytes, the way a firmware stores it.
//!
//! [`encode`] keeps every constant as it stands, so that a chain read back walks to the same
//! words. [`decode`] takes any bytes and gives a chain or an error. There is one image of a chain:
//! an image that is accepted is the one that encoding its chain gives.
//!
//! # Layout
//! All numbers are little endian; signed ones are in two's complement.
//!
//! | offset | bytes | field |
//! |-------:|------:|-------|
//! | 0 | 4 | `SBIM` in ASCII |
//! | 4 | 1 | version of this layout, 1 |
//! | 5 | 1 | word length W in bits, 10 to 32 |
//! | 6 | 2 | length of the image in bytes, from the first to the last of the checksum |
//! | 8 | 1 | number of stages |
//! | 9 | 4 | reference resistance in milliohms, not 0 |
//! | 13 | | the stages, from the source to the load |
//! | −4 | 4 | checksum of all bytes before it: CRC-32/ISO-HDLC, the one of Ethernet, gzip and PNG |
//!
//! A stage stores only what is not zero:
//!
//! | bytes | field |
//! |------:|-------|
//! | 1 | bits 0–2 the kind, bits 3–6 its options, bit 7 whether the third byte is there |
//! | 1 | bits 0–6 which constants are not zero, bit 7 whether the turns per hertz are not zero |
//! | 0, 1 | which of these constants are in full |
//! | | the constants, lowest bit first |
//! | 0, 8 | 2^-64 turns per hertz |
//!
//! | kind | bit 3 | bit 4 | bit 5 | bit 6 | constants from bit 0 up | turns |
//! |-----:|-------|-------|-------|-------|-------------------------|-------|
//! | 1, branch | shunt | inverted | with an element beside the law | which falls with frequency | constant, rising re, rising im, falling re, falling im, resistance and reactance of the element beside | |
//! | 2, line | | | | | impedance, admittance, root loss, linear loss | yes |
//! | 3, stub | shunt | coth, not tanh | | | immittance, root loss, linear loss | yes |
//! | 4, transformer | | | | | ratio, inverse | |
//! | 5, bank | shunt | coils | resistance as reactance | | contact, stray | |
//!
//! After a bank, its steps:
//!
//! | bytes | field |
//! |------:|-------|
//! | 1 | number of steps, 1 to 16 |
//! | 1 | step 0: bits 0 and 1 whether its reactance and its resistance are not zero, bits 2 and 3 which of them are in full |
//! | | the constants, lowest bit first |
//! | | the same for every other step |
//!
//! A constant is a mantissa of B bits and an exponent, with 2^(B−2) ≤ |mantissa| < 2^(B−1) and the
//! value mantissa · 2^(exponent + 2 − B), so that the exponent is that of the largest power of two
//! in the value:
//!
//! | form | mantissa | exponent | where |
//! |------|----------|----------|-------|
//! | short | 2 bytes for W ≤ 16, 3 for W ≤ 24, 4 above; all but the highest W bits are zero | 1 byte | this holds the value |
//! | full | 4 bytes | 2 bytes | it does not |
//!
//! Short exponents reach from −128 to 127, which is 2.9e-39 to 3.4e38 and takes in the constants
//! of every part that can be built; full ones take in every [`Scalar`] that can be stored.
//!
//! A lossless coil takes five bytes in an image for 16-bit words, a lossless line sixteen, and each
//! step of a bank seven with its loss.
//!
//! ```
//! use stagebits_kernel::image::{self, Header};
//! use stagebits_kernel::{Chain, Scalar, Stage, Transformer};
//!
//! let transformer = Transformer {
//!     ratio: Scalar::ONE.scaled(2),
//!     inverse: Scalar::ONE.scaled(-2),
//! };
//! let chain = Chain::<Scalar, 4>::new(&[Stage::Transformer(transformer)]).unwrap();
//! let header = Header::new(16, 50_000).unwrap();
//!
//! let mut bytes = [0; 64];
//! let length = image::encode(&chain, header, &mut bytes).unwrap();
//! assert_eq!(length, 25);
//! assert_eq!(image::decode(&bytes[..length]), Ok((header, chain)));
//! ```

mod checksum;
mod constant;
mod cursor;
mod error;
mod header;
mod kind;
mod record;
mod steps;

use crate::chain::{Chain, ChainError};
use crate::scalar::Scalar;
use crate::stage::Stage;
use checksum::Checksum;
use cursor::{Reader, Writer};
use record::Record;

pub use error::{ImageError, StageFault};
pub use header::Header;

const MAGIC: [u8; 4] = *b"SBIM";
const VERSION: u8 = 1;
/// Bytes before the first stage.
const HEADER_LENGTH: usize = 13;
const CHECKSUM_LENGTH: usize = 4;
/// The number of stages is one byte.
const STAGES_MAX: usize = u8::MAX as usize;

// the length of an image is written in two bytes
const _: () = {
    let bank = Record::length_max(kind::BANK_CONSTANTS) + steps::LENGTH_MAX;
    let stage = Record::length_max(record::CONSTANTS);
    let longest = if bank > stage { bank } else { stage };
    assert!(HEADER_LENGTH + STAGES_MAX * longest + CHECKSUM_LENGTH <= u16::MAX as usize);
};

/// The chain of an image, and what the image says about it.
///
/// The chain is made for words of [`Header::word_bits`]; a firmware that walks words of one length
/// compares. No bytes make this panic.
///
/// # Errors
/// [`ImageError`] unless the bytes are exactly what [`encode`] gives for a chain of up to `N`
/// stages and `S` steps of banks.
pub fn decode<const N: usize, const S: usize>(
    bytes: &[u8],
) -> Result<(Header, Chain<Scalar, N, S>), ImageError> {
    let (body, checksum) = bytes
        .split_last_chunk::<CHECKSUM_LENGTH>()
        .ok_or(ImageError::TooShort)?;
    let mut reader = Reader::new(body);
    let magic = reader.take().ok_or(ImageError::TooShort)?;
    if magic != MAGIC {
        return Err(ImageError::NotAnImage(magic));
    }
    let [version] = reader.take().ok_or(ImageError::TooShort)?;
    if version != VERSION {
        return Err(ImageError::UnsupportedVersion(version));
    }
    let [word_bits] = reader.take().ok_or(ImageError::TooShort)?;
    let length = u16::from_le_bytes(reader.take().ok_or(ImageError::TooShort)?);
    if usize::from(length) != bytes.len() {
        return Err(ImageError::WrongLength {
            stated: length,
            found: bytes.len(),
        });
    }
    let (stated, found) = (u32::from_le_bytes(*checksum), Checksum::of(body));
    if stated != found {
        return Err(ImageError::BadChecksum { stated, found });
    }
    let [stages] = reader.take().ok_or(ImageError::TooShort)?;
    let reference = u32::from_le_bytes(reader.take().ok_or(ImageError::TooShort)?);
    let header = Header::new(word_bits.into(), reference)?;
    let mut chain = Chain::empty();
    let mut room = steps::Room::default();
    for number in 1..=stages {
        let bad_stage = |fault| ImageError::BadStage { number, fault };
        let mut stage = Record::read(&mut reader, word_bits.into())
            .and_then(|record| kind::stage(&record))
            .map_err(bad_stage)?;
        let mut bank_steps: &[_] = &[];
        if let Stage::Bank(bank) = &mut stage {
            if S == 0 {
                // no code for steps where there is no room for any
                return Err(ImageError::TooManySteps {
                    number,
                    capacity: S,
                });
            }
            bank_steps =
                steps::read(&mut reader, word_bits.into(), &mut room).map_err(bad_stage)?;
            bank.steps = bank_steps.len() as u8;
        }
        chain.push(stage, bank_steps).map_err(|error| match error {
            ChainError::TooManySteps => ImageError::TooManySteps {
                number,
                capacity: S,
            },
            // the steps have been counted above
            ChainError::TooManyStages | ChainError::BankSize | ChainError::StepCount => {
                ImageError::TooManyStages {
                    stages: stages.into(),
                    capacity: N,
                }
            }
        })?;
    }
    match reader.remaining() {
        0 => Ok((header, chain)),
        bytes => Err(ImageError::TrailingBytes(bytes)),
    }
}

/// Writes the image of a chain to the start of `out` and gives its length in bytes.
///
/// # Errors
/// Those of [`encoded_len`], and [`ImageError::BufferTooSmall`]; `out` is then as it was.
pub fn encode<const N: usize, const S: usize>(
    chain: &Chain<Scalar, N, S>,
    header: Header,
    out: &mut [u8],
) -> Result<usize, ImageError> {
    let length = encoded_len(chain, header)?;
    if length > out.len() {
        return Err(ImageError::BufferTooSmall {
            needed: length,
            found: out.len(),
        });
    }
    write(chain, header, length as u16, Writer::new(out))
}

/// Length in bytes of the image of a chain.
///
/// # Errors
/// [`ImageError::TooManyStages`] above 255, and [`ImageError::BadStage`] for a constant beyond what
/// [`Scalar::from_parts`] accepts.
pub fn encoded_len<const N: usize, const S: usize>(
    chain: &Chain<Scalar, N, S>,
    header: Header,
) -> Result<usize, ImageError> {
    write(chain, header, 0, Writer::new(&mut []))
}

fn write<const N: usize, const S: usize>(
    chain: &Chain<Scalar, N, S>,
    header: Header,
    length: u16,
    mut writer: Writer<'_>,
) -> Result<usize, ImageError> {
    let stages = chain.stages();
    let count = u8::try_from(stages.len()).map_err(|_| ImageError::TooManyStages {
        stages: stages.len(),
        capacity: STAGES_MAX,
    })?;
    let word_bits = header.word_bits();
    writer.put(&MAGIC);
    writer.put(&[VERSION, word_bits as u8]);
    writer.put(&length.to_le_bytes());
    writer.put(&[count]);
    writer.put(&header.reference_milliohms().to_le_bytes());
    let mut bank_steps = chain.bank_steps();
    for (number, stage) in (1..=count).zip(stages) {
        let bad_stage = |fault| ImageError::BadStage { number, fault };
        kind::record(stage)
            .write(&mut writer, word_bits)
            .map_err(bad_stage)?;
        if let Stage::Bank(bank) = stage {
            let (own, rest) = bank_steps
                .split_at_checked(bank.steps.into())
                .unwrap_or_default();
            bank_steps = rest;
            steps::write(own, &mut writer, word_bits).map_err(bad_stage)?;
        }
    }
    Ok(writer.finish())
}

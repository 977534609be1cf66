//! Images: what goes in comes out, one image for each chain, and nothing else is accepted.

mod bank_faults;
mod chains;
mod damage;
mod faults;
mod golden;
mod round_trip;

use stagebits_kernel::image::{self, Header, ImageError};
use stagebits_kernel::{Chain, Scalar};

/// Capacity of the chains in these tests.
const CAPACITY: usize = 6;
/// Room for the steps of their banks: three full ones.
const STEPS: usize = 48;

type TestChain = Chain<Scalar, CAPACITY, STEPS>;

fn decode(bytes: &[u8]) -> Result<(Header, TestChain), ImageError> {
    image::decode(bytes)
}

/// The image of a chain, in a buffer of just its length.
fn encode<const N: usize, const S: usize>(chain: &Chain<Scalar, N, S>, header: Header) -> Vec<u8> {
    let mut bytes = vec![0; image::encoded_len(chain, header).expect("constants are in range")];
    let written = image::encode(chain, header, &mut bytes);
    assert_eq!(written, Ok(bytes.len()));
    bytes
}

/// An image with these stages, whatever they are, under a header and a checksum that are right.
fn image_of(word_bits: u8, count: u8, stages: &[u8]) -> Vec<u8> {
    let mut bytes = b"SBIM\x01".to_vec();
    bytes.extend([word_bits, 0, 0, count]);
    bytes.extend(50_000_u32.to_le_bytes());
    bytes.extend(stages);
    bytes.extend([0; 4]);
    sealed(bytes)
}

/// The same bytes with length and checksum made right.
fn sealed(mut bytes: Vec<u8>) -> Vec<u8> {
    let length = u16::try_from(bytes.len()).expect("images are short");
    bytes[6..8].copy_from_slice(&length.to_le_bytes());
    checksummed(bytes)
}

/// The same bytes with the checksum made right: bit by bit, apart from the table that is tested.
fn checksummed(mut bytes: Vec<u8>) -> Vec<u8> {
    let body = bytes.len() - 4;
    let mut rest = u32::MAX;
    for byte in &bytes[..body] {
        rest ^= u32::from(*byte);
        for _ in 0..8 {
            rest = (rest >> 1) ^ (0xedb8_8320 * (rest & 1));
        }
    }
    bytes[body..].copy_from_slice(&(!rest).to_le_bytes());
    bytes
}

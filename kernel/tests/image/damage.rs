//! Damage that the checksum and the length must show.

use proptest::strategy::{Strategy, ValueTree};
use proptest::test_runner::TestRunner;
use stagebits_kernel::image::{Header, ImageError};

use super::chains::chains;
use super::{decode, encode};

/// Images of an empty chain, of a middling and of a long one, for words of several lengths.
fn images() -> Vec<Vec<u8>> {
    let mut runner = TestRunner::deterministic();
    let mut images = vec![];
    for word_bits in [10, 16, 24, 32] {
        let header = Header::new(word_bits, 75_000).expect("both are in range");
        images.push(encode(
            &super::TestChain::with_banks(&[], &[]).expect("empty"),
            header,
        ));
        let mut random: Vec<_> = (0..32)
            .map(|_| {
                let chain = chains(word_bits).new_tree(&mut runner).expect("no filter");
                encode(&chain.current(), header)
            })
            .collect();
        random.sort_by_key(Vec::len);
        images.extend([random[16].clone(), random[31].clone()]);
    }
    assert!(images.iter().any(|image| image.len() > 100));
    for image in &images {
        assert!(decode(image).is_ok());
    }
    images
}

#[test]
fn no_flipped_bit_nor_any_two_go_unnoticed() {
    for image in images() {
        let mut damaged = image.clone();
        let bits = image.len() * 8;
        for first in 0..bits {
            damaged[first / 8] ^= 1 << (first % 8);
            assert!(decode(&damaged).is_err(), "bit {first} of {image:02x?}");
            for second in first + 1..bits {
                damaged[second / 8] ^= 1 << (second % 8);
                assert!(
                    decode(&damaged).is_err(),
                    "{first}, {second} of {image:02x?}"
                );
                damaged[second / 8] ^= 1 << (second % 8);
            }
            damaged[first / 8] ^= 1 << (first % 8);
        }
    }
}

/// Bursts of up to 32 bits that begin and end with a flipped one, with one pattern between.
#[test]
fn no_burst_goes_unnoticed() {
    for image in images() {
        for start in 0..image.len() * 8 - 32 {
            for length in 2..=32_u32 {
                let between = 0x9e37_79b9_u32.wrapping_mul(start as u32 + length) >> (32 - length);
                let burst = u64::from(between | 1 | 1 << (length - 1)) << (start % 8);
                let mut damaged = image.clone();
                for (byte, flips) in damaged.iter_mut().skip(start / 8).zip(burst.to_le_bytes()) {
                    *byte ^= flips;
                }
                assert!(decode(&damaged).is_err(), "{length} bits from {start}");
            }
        }
    }
}

#[test]
fn no_other_length_goes_unnoticed() {
    for image in images() {
        for length in 0..image.len() {
            let expected = if length < 4 + 8 {
                ImageError::TooShort
            } else {
                ImageError::WrongLength {
                    stated: image.len() as u16,
                    found: length,
                }
            };
            assert_eq!(decode(&image[..length]), Err(expected));
        }
        for byte in 0..=u8::MAX {
            let mut longer = image.clone();
            for _ in 0..40 {
                longer.push(byte);
                let expected = ImageError::WrongLength {
                    stated: image.len() as u16,
                    found: longer.len(),
                };
                assert_eq!(decode(&longer), Err(expected));
            }
        }
        assert!(decode(&[image.clone(), image].concat()).is_err());
    }
}

/// What a memory holds that nobody wrote to.
#[test]
fn blank_memory_is_no_image() {
    for byte in [0x00, 0xff] {
        assert_eq!(decode(&[byte; 64]), Err(ImageError::NotAnImage([byte; 4])));
    }
}

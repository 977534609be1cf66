//! Every fault that a right checksum leaves, one by one.

use stagebits_kernel::image::{self, Header, ImageError, StageFault};
use stagebits_kernel::{
    BANK_STEPS_MAX, Bank, BankElement, BankStep, Branch, Chain, Complex, Law, Line, Position,
    Scalar, Stage, Transformer,
};

use super::{checksummed, decode, encode, image_of, sealed};

/// A transformer of ratio 1 in an image for 16 bits.
const TRANSFORMER: [u8; 8] = [4, 0b11, 0x00, 0x40, 0, 0x00, 0x40, 0];

/// The fault of the second of two stages, of which the first is right.
pub(crate) fn fault_of(word_bits: u8, stage: &[u8]) -> Option<StageFault> {
    // the same transformer at any length of mantissa
    let cut = usize::from(word_bits.div_ceil(8));
    let one = [&[0, 0, 0, 0x40][4 - cut..], &[0]].concat();
    let stages = [&[4, 0b11], &one[..], &one, stage].concat();
    match decode(&image_of(word_bits, 2, &stages)) {
        Ok(_) => None,
        Err(ImageError::BadStage { number: 2, fault }) => Some(fault),
        Err(other) => panic!("{other:?}"),
    }
}

fn altered(place: usize, value: u8) -> Result<(), ImageError> {
    let mut bytes = image_of(16, 1, &TRANSFORMER);
    assert_ne!(bytes[place], value);
    bytes[place] = value;
    decode(&checksummed(bytes)).map(|_| ())
}

#[test]
fn header_fields_are_checked_one_by_one() {
    assert_eq!(altered(0, b's'), Err(ImageError::NotAnImage(*b"sBIM")));
    assert_eq!(altered(3, 0), Err(ImageError::NotAnImage(*b"SBI\0")));
    assert_eq!(altered(4, 0), Err(ImageError::UnsupportedVersion(0)));
    assert_eq!(altered(4, 2), Err(ImageError::UnsupportedVersion(2)));
    assert_eq!(altered(5, 9), Err(ImageError::WordLength(9)));
    assert_eq!(altered(5, 33), Err(ImageError::WordLength(33)));
    let found = 13 + 8 + 4;
    for (place, value, stated) in [(6, 24, 24), (6, 26, 26), (7, 1, 256 + 25)] {
        let expected = ImageError::WrongLength { stated, found };
        assert_eq!(altered(place, value), Err(expected));
    }
    assert_eq!(altered(8, 0), Err(ImageError::TrailingBytes(8)));
    let incomplete = ImageError::BadStage {
        number: 2,
        fault: StageFault::Incomplete,
    };
    assert_eq!(altered(8, 2), Err(incomplete));
    // any other reference is as good as this one
    assert_eq!(altered(12, 0xff), Ok(()));
    let mut bytes = image_of(16, 1, &TRANSFORMER);
    bytes[9..13].fill(0);
    assert_eq!(decode(&checksummed(bytes)), Err(ImageError::NoReference));
}

#[test]
fn checksum_is_compared() {
    let mut bytes = image_of(16, 1, &TRANSFORMER);
    let end = bytes.len() - 4;
    let sum = |bytes: &[u8]| u32::from_le_bytes(bytes[end..].try_into().expect("four bytes"));
    let found = sum(&bytes);
    bytes[end] ^= 1;
    let stated = sum(&bytes);
    assert_eq!(
        decode(&bytes),
        Err(ImageError::BadChecksum { stated, found })
    );
}

/// Headers that end early, length and checksum being right.
#[test]
fn header_is_whole() {
    let image = image_of(16, 0, &[]);
    assert!(decode(&image).is_ok());
    for length in 8..image.len() - 4 {
        let cut = [&image[..length], &[0; 4]].concat();
        assert_eq!(decode(&sealed(cut)), Err(ImageError::TooShort));
    }
}

#[test]
fn words_of_every_length_are_accepted() {
    for word_bits in 0..=u32::from(u8::MAX) {
        let possible = (10..=32).contains(&word_bits);
        assert_eq!(Header::new(word_bits, 1).is_ok(), possible);
        assert_eq!(decode(&image_of(word_bits as u8, 0, &[])).is_ok(), possible);
    }
    assert_eq!(Header::new(16, 0), Err(ImageError::NoReference));
}

#[test]
fn stages_are_whole() {
    // a line with all four constants, two of them in full
    let line = [
        &[0x82, 0x8f, 0x0c, 0, 0x60, 0xff, 0x55, 0x55, 0][..],
        &[
            0xab, 0x89, 0x67, 0x45, 0xec, 0xff, 0, 0, 0, 0x40, 0x7f, 0xff,
        ],
        &[1, 2, 3, 4, 5, 6, 7, 8],
    ]
    .concat();
    assert_eq!(fault_of(16, &line), None);
    for length in 0..line.len() {
        assert_eq!(fault_of(16, &line[..length]), Some(StageFault::Incomplete));
    }
    for bytes in 1..4 {
        let stages = [&TRANSFORMER[..], &line[..bytes]].concat();
        let expected = ImageError::TrailingBytes(bytes);
        assert_eq!(decode(&image_of(16, 1, &stages)), Err(expected));
    }
}

#[test]
fn kinds_and_their_options_are_checked() {
    for tag in 0..128 {
        let (kind, options) = (tag & 7, tag >> 3);
        let expected = match kind {
            // what falls is the element beside
            1 if options & 0b1100 == 0b1000 => Some(StageFault::UnknownField),
            1 => None,
            2 | 4 if options == 0 => None,
            3 if options < 4 => None,
            5 if options < 8 => None,
            2..=5 => Some(StageFault::UnknownField),
            unknown => Some(StageFault::UnknownKind(unknown)),
        };
        let stage: &[u8] = if kind == 5 {
            &[tag, 0, 1, 0]
        } else {
            &[tag, 0]
        };
        assert_eq!(fault_of(16, stage), expected, "tag {tag:07b}");
    }
}

#[test]
fn each_kind_has_its_own_constants() {
    // kind and options, and the fields that it has
    for (tag, fields) in [
        (0b0000_0001, 0b0001_1111),
        (0b0010_0001, 0b0111_1111),
        (0b0000_0010, 0b1000_1111),
        (0b0000_0011, 0b1000_0111),
        (0b0000_0100, 0b0000_0011),
        (0b0000_0101, 0b0000_0011),
    ] {
        for bit in 0..8 {
            let number: &[u8] = if bit == 7 {
                &[1, 0, 0, 0, 0, 0, 0, 0]
            } else {
                &[0x00, 0x40, 0]
            };
            let steps: &[u8] = if tag == 5 { &[1, 0] } else { &[] };
            let stage = [&[tag, 1 << bit], number, steps].concat();
            let expected = (fields >> bit & 1 == 0).then_some(StageFault::UnknownField);
            assert_eq!(fault_of(16, &stage), expected, "tag {tag:07b}, bit {bit}");
        }
    }
}

#[test]
fn masks_agree_with_each_other() {
    let full = [0x01, 0, 0, 0x40, 0, 0];
    let turns = [1, 0, 0, 0, 0, 0, 0, 0];
    let line = |present: u8, in_full: u8, rest: &[u8]| {
        fault_of(16, &[&[0x82, present, in_full], rest].concat())
    };
    assert_eq!(line(0b0000_0001, 0b0000_0001, &full), None);
    assert_eq!(
        line(0b1000_0001, 0b0000_0001, &[&full[..], &turns].concat()),
        None
    );
    // nothing in full, something in full that is not there, turns in full
    for (present, in_full) in [(0b0001, 0), (0b0001, 0b0011), (0b1000_0001, 0b1000_0001)] {
        let rest = [&full[..], &turns].concat();
        assert_eq!(
            line(present, in_full, &rest),
            Some(StageFault::UnknownField)
        );
    }
    assert_eq!(
        fault_of(16, &[2, 0x80, 0, 0, 0, 0, 0, 0, 0, 0]),
        Some(StageFault::UnknownField)
    );
}

#[test]
fn constants_are_normalised_and_in_their_shortest_form() {
    let short = |word_bits: u8, mantissa: &[u8], exponent: i8| {
        fault_of(
            word_bits,
            &[&[4, 1], mantissa, &exponent.to_le_bytes()].concat(),
        )
    };
    let full = |mantissa: i32, exponent: i16| {
        let number = [&mantissa.to_le_bytes()[..], &exponent.to_le_bytes()].concat();
        fault_of(16, &[&[0x84, 1, 1], &number[..]].concat())
    };
    let refused = Some(StageFault::Constant);
    for exponent in [i8::MIN, 30, i8::MAX] {
        for mantissa in [0x4000_i16, 0x7fff, -0x4000, -0x7fff] {
            assert_eq!(short(16, &mantissa.to_le_bytes(), exponent), None);
        }
        for mantissa in [0_i16, 1, 0x3fff, -1, -0x3fff, i16::MIN] {
            assert_eq!(short(16, &mantissa.to_le_bytes(), exponent), refused);
        }
    }
    // the lowest bit of each word length, and the one below
    for word_bits in 10_u8..=32 {
        let lowest = (0x4000_0000_u32 | 1 << (32 - word_bits)).to_le_bytes();
        let bytes = usize::from(word_bits.div_ceil(8));
        assert_eq!(
            short(word_bits, &lowest[4 - bytes..], 0),
            None,
            "W = {word_bits}"
        );
        if word_bits % 8 != 0 {
            let below = (0x4000_0000_u32 | 1 << (31 - word_bits)).to_le_bytes();
            assert_eq!(
                short(word_bits, &below[4 - bytes..], 0),
                refused,
                "W = {word_bits}"
            );
        }
    }
    // 2^-470 to 2^530, the first and last powers that a scalar holds
    for exponent in [-470, -129, 128, 530] {
        assert_eq!(full(0x4000_0000, exponent), None);
        assert_eq!(full(0x4000_0001, exponent), None);
    }
    for exponent in [i16::MIN, -471, 531, i16::MAX] {
        assert_eq!(full(0x4000_0001, exponent), refused);
    }
    for exponent in [-128, 0, 30, 127] {
        assert_eq!(full(0x4000_8000, exponent), None);
        assert_eq!(full(0x4000_0000, exponent), refused);
    }
    for mantissa in [0, 0x3fff_ffff, -0x3fff_ffff, i32::MIN] {
        assert_eq!(full(mantissa, 30), refused);
        assert_eq!(full(mantissa, 200), refused);
    }
}

#[test]
fn chains_beyond_an_image_are_refused() {
    let header = Header::new(32, 50_000).expect("both are in range");
    let transformer = |ratio| {
        Stage::Transformer(Transformer {
            ratio,
            inverse: Scalar::ONE,
        })
    };
    let one = transformer(Scalar::ONE);
    let mut buffer = [0; 64];
    for beyond in [
        Scalar::HUGE,
        Scalar::ONE.scaled(531),
        Scalar::ONE.scaled(-471),
    ] {
        let chain = Chain::<Scalar, 3>::new(&[one, transformer(beyond), one]).expect("three");
        let expected = ImageError::BadStage {
            number: 2,
            fault: StageFault::Constant,
        };
        assert_eq!(image::encoded_len(&chain, header), Err(expected));
        assert_eq!(image::encode(&chain, header, &mut buffer), Err(expected));
        assert_eq!(buffer, [0; 64]);
    }
    let most = Chain::<Scalar, 256>::new(&[one; 255]).expect("they fit");
    let bytes = encode(&most, header);
    assert_eq!(image::decode::<256, 0>(&bytes), Ok((header, most)));
    let chain = Chain::<Scalar, 256>::new(&[one; 256]).expect("they fit");
    let expected = ImageError::TooManyStages {
        stages: 256,
        capacity: 255,
    };
    assert_eq!(image::encoded_len(&chain, header), Err(expected));
}

/// The sizes that the documentation gives.
#[test]
fn small_parts_take_few_bytes() {
    let header = Header::new(16, 50_000).expect("both are in range");
    let length_with = |stages: &[Stage<Scalar>], steps: &[BankStep<Scalar>]| {
        let chain = super::TestChain::with_banks(stages, steps).expect("they fit");
        image::encoded_len(&chain, header)
    };
    let length = |stages: &[Stage<Scalar>]| length_with(stages, &[]);
    let coil = Stage::Branch(Branch {
        position: Position::Series,
        inverted: false,
        law: Law {
            rising: Complex {
                re: Scalar::ZERO,
                im: Scalar::ONE.scaled(-20),
            },
            ..Law::ZERO
        },
        beside: None,
    });
    let line = Stage::Line(Line {
        impedance: Scalar::ONE,
        admittance: Scalar::ONE,
        turns_per_hertz: 1 << 36,
        root_loss: Scalar::ZERO,
        linear_loss: Scalar::ZERO,
    });
    assert_eq!(length(&[]), Ok(17));
    assert_eq!(length(&[coil]), Ok(17 + 5));
    assert_eq!(length(&[line]), Ok(17 + 16));
    let bank = |steps| {
        Stage::Bank(Bank {
            position: Position::Series,
            element: BankElement::Coils,
            proportional: true,
            steps,
            contact: Scalar::ZERO,
            stray: Scalar::ZERO,
        })
    };
    let step = BankStep {
        reactance: Scalar::ONE.scaled(-20),
        resistance: Scalar::ONE.scaled(-28),
    };
    for steps in 1..=BANK_STEPS_MAX {
        let count = usize::from(steps);
        assert_eq!(
            length_with(&[bank(steps)], &vec![step; count]),
            Ok(17 + 3 + 7 * count)
        );
    }
}

/// One message of each sort; a reader must be able to tell what to do.
#[test]
fn messages_name_what_was_found_and_what_is_right() {
    for (error, message) in [
        (
            ImageError::NotAnImage(*b"\x7fELF"),
            "no image of a chain: it starts with 7f454c46, an image with 5342494d",
        ),
        (
            ImageError::UnsupportedVersion(9),
            "the image has layout version 9, where 1 is supported",
        ),
        (
            ImageError::WordLength(8),
            "a word length of 8 bits; from 10 to 32 are possible",
        ),
        (
            ImageError::BadStage {
                number: 3,
                fault: StageFault::UnknownKind(7),
            },
            "stage 3 is of an unknown kind, 7",
        ),
        (
            ImageError::BadStage {
                number: 2,
                fault: StageFault::StepCount(17),
            },
            "stage 2 is a bank of 17 steps, where 1 to 16 are possible",
        ),
        (
            ImageError::TooManySteps {
                number: 4,
                capacity: 16,
            },
            "no room for the steps of stage 4: banks have room for 16 together",
        ),
    ] {
        assert_eq!(error.to_string(), message);
    }
}

//! Faults of banks and their steps that a right checksum leaves.

use stagebits_kernel::image::{self, Header, ImageError, StageFault};
use stagebits_kernel::{Bank, BankElement, BankStep, Chain, Position, Scalar, Stage};

use super::faults::fault_of;
use super::{decode, image_of};

/// A bank of capacitors with two steps, all constants there, one of them in full.
#[rustfmt::skip]
const BANK: [u8; 27] = [
    0b0000_0101, 0b0000_0011, 0x00, 0x40, 0xf0, 0x00, 0xc0, 0xf8,
    2,
    0b1011, 0x00, 0xc0, 0x16, 0x01, 0x00, 0x00, 0x40, 0xf6, 0xff,
    0b0011, 0x00, 0xc0, 0x15, 0x00, 0x40, 0xf8,
    // what stands behind it
    0,
];

#[test]
fn banks_are_whole() {
    let whole = &BANK[..BANK.len() - 1];
    assert_eq!(fault_of(16, whole), None);
    for length in 0..whole.len() {
        assert_eq!(fault_of(16, &BANK[..length]), Some(StageFault::Incomplete));
    }
    let image = image_of(16, 1, &BANK);
    assert_eq!(decode(&image), Err(ImageError::TrailingBytes(1)));
}

#[test]
fn number_of_steps_is_checked() {
    for count in 0..=u8::MAX {
        let steps = vec![0; count.into()];
        let bank = [&[5, 0, count][..], &steps].concat();
        let expected = (!(1..=16).contains(&count)).then_some(StageFault::StepCount(count));
        assert_eq!(fault_of(16, &bank), expected, "{count} steps");
    }
}

#[test]
fn masks_of_steps_are_checked() {
    for masks in 0..=u8::MAX {
        let (present, in_full) = (masks & 3, masks >> 2);
        let mut bank = vec![5, 0, 1, masks];
        for bit in 0..2 {
            let full: &[u8] = &[0x01, 0, 0, 0x40, 0, 0];
            match (present >> bit & 1, in_full >> bit & 1) {
                (0, _) => {}
                (_, 0) => bank.extend([0x00, 0x40, 0]),
                _ => bank.extend(full),
            }
        }
        let expected = (in_full & !present != 0).then_some(StageFault::UnknownField);
        assert_eq!(fault_of(16, &bank), expected, "masks {masks:08b}");
    }
    // a step's constants are in their shortest form like all others
    for number in [
        [0x00, 0x40, 0, 0x00, 0x3f, 0],
        [0x00, 0x80, 0, 0x00, 0x40, 0],
    ] {
        let bank = [&[5, 0, 1, 0b0011][..], &number].concat();
        assert_eq!(fault_of(16, &bank), Some(StageFault::Constant));
    }
    let full = [5, 0, 1, 0b0101, 0, 0, 0, 0x40, 0, 0];
    assert_eq!(fault_of(16, &full), Some(StageFault::Constant));
}

#[test]
fn banks_beyond_an_image_are_refused() {
    let header = Header::new(32, 50_000).expect("both are in range");
    let one = Scalar::ONE;
    let chain = |contact, resistance| {
        let bank = Bank {
            position: Position::Shunt,
            element: BankElement::Capacitors,
            proportional: false,
            steps: 1,
            contact,
            stray: one,
        };
        let step = BankStep {
            reactance: one,
            resistance,
        };
        Chain::<Scalar, 1, 1>::with_banks(&[Stage::Bank(bank)], &[step]).expect("it fits")
    };
    assert!(image::encoded_len(&chain(one, one), header).is_ok());
    for chain in [chain(Scalar::HUGE, one), chain(one, Scalar::HUGE)] {
        let expected = ImageError::BadStage {
            number: 1,
            fault: StageFault::Constant,
        };
        assert_eq!(image::encoded_len(&chain, header), Err(expected));
    }
}

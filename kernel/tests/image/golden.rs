//! One image written by hand from the layout.

use stagebits_kernel::image::Header;
use stagebits_kernel::{
    Bank, BankElement, BankStep, Branch, Complex, Law, Line, LossyReactor, Position, Scalar, Stage,
    Stub, StubFunction, Transformer,
};

use super::{TestChain, decode, encode};

fn scalar(mantissa: i32, exponent: i32) -> Scalar {
    Scalar::from_parts(mantissa, exponent).expect("written normalised")
}

/// A chain of all kinds of stage, with every option and both forms of constants.
fn chain() -> TestChain {
    let zero = Scalar::ZERO;
    let one = Scalar::ONE;
    let stages = [
        // a lossless coil of 1 µH on 50 ohms, 2π·1e-6/50, in 16 bits: 17271 · 2^-37
        Stage::Branch(Branch {
            position: Position::Series,
            inverted: false,
            law: Law {
                rising: Complex {
                    re: zero,
                    im: scalar(17_271 << 16, -53),
                },
                ..Law::ZERO
            },
            beside: None,
        }),
        // −1 and 1/2 for the imaginary parts, and an element of 2 and −4 beside, which falls
        Stage::Branch(Branch {
            position: Position::Shunt,
            inverted: true,
            law: Law {
                constant: zero,
                rising: Complex {
                    re: zero,
                    im: scalar(-(1 << 30), -30),
                },
                falling: Complex {
                    re: zero,
                    im: one.scaled(-1),
                },
            },
            beside: Some(LossyReactor {
                resistance: one.scaled(1),
                reactance: scalar(-(1 << 30), -28),
                falling: true,
            }),
        }),
        // a loss of more than 16 bits, and one with a power of −129
        Stage::Line(Line {
            impedance: scalar(3 << 29, -31),
            admittance: scalar(0x5555 << 16, -30),
            turns_per_hertz: 0x0123_4567_89ab_cdef,
            root_loss: scalar(0x4567_89ab, -50),
            linear_loss: one.scaled(-129),
        }),
        Stage::Stub(Stub {
            position: Position::Shunt,
            function: StubFunction::Coth,
            immittance: one,
            turns_per_hertz: 1 << 40,
            root_loss: zero,
            linear_loss: zero,
        }),
        Stage::Transformer(Transformer {
            ratio: one.scaled(2),
            inverse: one.scaled(-2),
        }),
        // coils with a resistance that rises with frequency, contacts of 2 and 2^-20 per hertz
        Stage::Bank(Bank {
            position: Position::Shunt,
            element: BankElement::Coils,
            proportional: true,
            steps: 3,
            contact: one.scaled(1),
            stray: one.scaled(-20),
        }),
    ];
    // of 2^-22 and 2^-30, of 2^-21 without a loss, and of more than 16 bits with one of 2^-29
    let steps = [
        (one.scaled(-22), one.scaled(-30)),
        (one.scaled(-21), zero),
        (scalar(0x4567_89ab, -50), one.scaled(-29)),
    ]
    .map(|(reactance, resistance)| BankStep {
        reactance,
        resistance,
    });
    TestChain::with_banks(&stages, &steps).expect("it has room")
}

#[rustfmt::skip]
const IMAGE: [u8; 116] = [
    b'S', b'B', b'I', b'M', // magic
    1, // version
    16, // word length
    116, 0, // length of the image
    6, // stages
    0x50, 0xc3, 0x00, 0x00, // 50 000 milliohms
    // branch in series
    0b0000_0001, 0b0000_0100,
    0x77, 0x43, 0xe9, // 17 271, −23
    // branch in shunt, inverted, with an element beside which falls
    0b0111_1001, 0b0111_0100,
    0x00, 0xc0, 0x00, // −2^14, 0
    0x00, 0x40, 0xff, // 2^14, −1
    0x00, 0x40, 0x01, // 2^14, 1
    0x00, 0xc0, 0x02, // −2^14, 2
    // line, both losses in full
    0b1000_0010, 0b1000_1111, 0b0000_1100,
    0x00, 0x60, 0xff, // 3 · 2^13, −1
    0x55, 0x55, 0x00, // 21 845, 0
    0xab, 0x89, 0x67, 0x45, 0xec, 0xff, // −20
    0x00, 0x00, 0x00, 0x40, 0x7f, 0xff, // −129
    0xef, 0xcd, 0xab, 0x89, 0x67, 0x45, 0x23, 0x01,
    // stub in shunt, coth
    0b0001_1011, 0b1000_0001,
    0x00, 0x40, 0x00,
    0x00, 0x00, 0x00, 0x00, 0x00, 0x01, 0x00, 0x00, // 2^40
    // transformer
    0b0000_0100, 0b0000_0011,
    0x00, 0x40, 0x02,
    0x00, 0x40, 0xfe,
    // bank in shunt, coils, with a resistance as the reactance
    0b0011_1101, 0b0000_0011,
    0x00, 0x40, 0x01, // 2^14, 1
    0x00, 0x40, 0xec, // 2^14, −20
    3, // steps
    0b0011,
    0x00, 0x40, 0xea, // 2^14, −22
    0x00, 0x40, 0xe2, // 2^14, −30
    0b0001,
    0x00, 0x40, 0xeb, // 2^14, −21
    0b0111,
    0xab, 0x89, 0x67, 0x45, 0xec, 0xff, // −20
    0x00, 0x40, 0xe3, // 2^14, −29
    // checksum by zlib's crc32
    0xc5, 0x8a, 0xf1, 0x11,
];

#[test]
fn image_is_as_the_layout_says() {
    let header = Header::new(16, 50_000).expect("both are in range");
    assert_eq!(encode(&chain(), header), IMAGE);
    assert_eq!(decode(&IMAGE), Ok((header, chain())));
}

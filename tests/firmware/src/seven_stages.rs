//! The chain that costs are measured on: two lines, two lossy branches, three reactive ones.
//!
//! A lead, a shunt capacitor, a blocking capacitor, a capacitor with series resistance, a coil
//! with Q, a drain coil and a feed line, near what an antenna tuner between 2 and 12 MHz holds.
//! Lines are lossless, which is the case that the walk treats apart.

use core::f64::consts::TAU;

use stagebits_kernel::{Branch, Chain, Complex, Law, Line, Position, Scalar, Stage};

/// Ohms.
const REFERENCE: f64 = 50.0;

/// The stages with their constants in `f64`, from the source to the load.
pub const STAGES: [Stage<f64>; 7] = [
    line(0.6),
    shunt_capacitor(100e-12),
    Stage::Branch(Branch {
        position: Position::Series,
        inverted: false,
        law: falling(-1.0 / (TAU * 10e-9 * REFERENCE), 0.0),
        beside: None,
    }),
    // 220 pF with 0.1 ohm in series: an impedance that the position needs the reciprocal of
    Stage::Branch(Branch {
        position: Position::Shunt,
        inverted: true,
        law: Law {
            constant: 0.1 / REFERENCE,
            ..falling(-1.0 / (TAU * 220e-12 * REFERENCE), 0.0)
        },
        beside: None,
    }),
    // 1.2 µH with a Q of 180
    Stage::Branch(Branch {
        position: Position::Series,
        inverted: false,
        law: rising(TAU * 1.2e-6 / REFERENCE, TAU * 1.2e-6 / REFERENCE / 180.0),
        beside: None,
    }),
    Stage::Branch(Branch {
        position: Position::Shunt,
        inverted: false,
        law: falling(-REFERENCE / (TAU * 47e-6), 0.0),
        beside: None,
    }),
    line(1.8),
];

/// The chain in any arithmetic.
pub fn chain<R: Copy>(convert: impl Fn(f64) -> R) -> Chain<R, 7> {
    let stages = STAGES.each_ref().map(|stage| stage.map(&convert));
    match Chain::new(&stages) {
        Ok(chain) => chain,
        Err(_) => unreachable!("seven stages have room for seven"),
    }
}

/// The scalar nearest to `value`, towards zero in the last place.
pub const fn scalar(value: f64) -> Scalar {
    let bits = value.to_bits();
    if bits << 1 == 0 {
        return Scalar::ZERO;
    }
    let fraction = (bits & ((1 << 52) - 1)) | (1 << 52);
    let mantissa = (fraction >> 22) as i32;
    let exponent = (bits >> 52 & 0x7ff) as i32 - 1023 - 30;
    let signed = if bits >> 63 == 0 { mantissa } else { -mantissa };
    match Scalar::from_parts(signed, exponent) {
        Some(scalar) => scalar,
        None => Scalar::ZERO,
    }
}

/// A lossless 50 ohm line of this length in metres, velocity factor 0.66.
const fn line(length: f64) -> Stage<f64> {
    let delay = length / (0.66 * 299_792_458.0);
    Stage::Line(Line {
        impedance: 1.0,
        admittance: 1.0,
        turns_per_hertz: (delay * 18_446_744_073_709_551_616.0) as u64,
        root_loss: 0.0,
        linear_loss: 0.0,
    })
}

const fn shunt_capacitor(farads: f64) -> Stage<f64> {
    Stage::Branch(Branch {
        position: Position::Shunt,
        inverted: false,
        law: rising(TAU * farads * REFERENCE, 0.0),
        beside: None,
    })
}

const ZERO: Complex<f64> = Complex { re: 0.0, im: 0.0 };

const fn rising(im: f64, re: f64) -> Law<f64> {
    Law {
        constant: 0.0,
        rising: Complex { re, im },
        falling: ZERO,
    }
}

const fn falling(im: f64, re: f64) -> Law<f64> {
    Law {
        constant: 0.0,
        rising: ZERO,
        falling: Complex { re, im },
    }
}

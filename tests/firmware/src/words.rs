//! Every word that the kernel gives for an image: printed by the cores, compared on the desktop.

use stagebits_kernel::image::{ImageError, decode};
use stagebits_kernel::{
    Chain, Complex, Frequency, Gamma, Immittance, Resolved, Scalar, State, Step, Word,
};

use crate::points::{Band, frequencies, loads};

/// Most stages that a chain may have.
pub const CAPACITY: usize = 16;

/// What a line of words is about.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Subject {
    /// The frequency's own words.
    Frequency,
    /// The step of this number, counted from 0 at the source.
    Step(usize),
    /// The chain with this load.
    Point(Gamma),
}

impl Subject {
    /// What each word of the line is.
    pub fn names(self) -> &'static [&'static str] {
        match self {
            Self::Frequency => &FREQUENCY,
            Self::Step(_) => &STEP,
            Self::Point(_) => &POINT,
        }
    }
}

const FREQUENCY: [&str; 7] = [
    "f in hertz",
    "mantissa of f",
    "exponent of f",
    "mantissa of 1/f",
    "exponent of 1/f",
    "mantissa of √f",
    "exponent of √f",
];

const STEP: [&str; 7] = [
    "kind of the step",
    "first immittance, re",
    "first immittance, im",
    "first immittance, exponent",
    "second immittance, re",
    "second immittance, im",
    "second immittance, exponent",
];

const POINT: [&str; 18] = [
    "load, re",
    "load, im",
    "input v, re",
    "input v, im",
    "input i, re",
    "input i, im",
    "exponent of the input",
    "Γ, re",
    "Γ, im",
    "SWR",
    "mantissa of R/R0",
    "exponent of R/R0",
    "mantissa of X/R0",
    "exponent of X/R0",
    "R in milliohms",
    "X in milliohms",
    "Γ walked back, re",
    "Γ walked back, im",
];

/// Evaluates the chain of an image at every point for its word length and hands each line of
/// words, with its frequency in hertz, to `sink`.
///
/// # Errors
/// Those of [`decode`], and [`ImageError::WordLength`] unless the words have 16 or 32 bits.
pub fn evaluate(
    image: &[u8],
    band: Band,
    sink: impl FnMut(u32, Subject, &[u32]),
) -> Result<(), ImageError> {
    let (header, chain) = decode(image)?;
    match header.word_bits() {
        16 => all::<i16>(&chain, band, header.reference_milliohms(), sink),
        32 => all::<i32>(&chain, band, header.reference_milliohms(), sink),
        other => return Err(ImageError::WordLength(other)),
    }
    Ok(())
}

fn all<W: Word>(
    chain: &Chain<Scalar, CAPACITY>,
    band: Band,
    reference_milliohms: u32,
    mut sink: impl FnMut(u32, Subject, &[u32]),
) {
    for hertz in frequencies(band) {
        let frequency = Frequency::new(hertz);
        sink(hertz, Subject::Frequency, &frequency_words(&frequency));
        let resolved = chain.at::<W>(&frequency);
        for (number, step) in resolved.steps().iter().enumerate() {
            sink(hertz, Subject::Step(number), &step_words(step));
        }
        for load in loads(hertz) {
            let words = point_words(&resolved, load, reference_milliohms);
            sink(hertz, Subject::Point(load), &words);
        }
    }
}

fn frequency_words(frequency: &Frequency<Scalar>) -> [u32; FREQUENCY.len()] {
    let [value, value_exponent] = scalar(frequency.value());
    let [inverse, inverse_exponent] = scalar(frequency.inverse());
    let [root, root_exponent] = scalar(frequency.root());
    [
        frequency.hertz(),
        value,
        value_exponent,
        inverse,
        inverse_exponent,
        root,
        root_exponent,
    ]
}

fn step_words<W: Word>(step: &Step<Immittance<W>>) -> [u32; STEP.len()] {
    let zero = Immittance::default();
    let (kind, first, second) = match step {
        Step::Series(z) => (0, z, &zero),
        Step::Shunt(y) => (1, y, &zero),
        Step::Tee { series, shunt } => (2, series, shunt),
        Step::Stretch { ratio, inverse } => (3, ratio, inverse),
    };
    let words = |immittance: &Immittance<W>| {
        let [re, im] = immittance.words();
        [re, im, immittance.exponent()].map(i32::cast_unsigned)
    };
    let ([a, b, c], [d, e, f]) = (words(first), words(second));
    [kind, a, b, c, d, e, f]
}

fn point_words<W: Word>(
    resolved: &Resolved<Immittance<W>, CAPACITY>,
    load: Gamma,
    reference_milliohms: u32,
) -> [u32; POINT.len()] {
    let input = resolved.walk(State::<W>::from_load(load));
    let (v, i, exponent) = input.words();
    let moments = input.moments();
    let gamma = moments.gamma();
    let Complex { re, im } = moments.impedance();
    let ([resistance, resistance_exponent], [reactance, reactance_exponent]) =
        (scalar(re), scalar(im));
    let (r, x) = moments.milliohms(reference_milliohms);
    let back = resolved.walk_back(input).gamma();
    [
        load.re.cast_unsigned(),
        load.im.cast_unsigned(),
        v[0].cast_unsigned(),
        v[1].cast_unsigned(),
        i[0].cast_unsigned(),
        i[1].cast_unsigned(),
        exponent.cast_unsigned(),
        gamma.re.cast_unsigned(),
        gamma.im.cast_unsigned(),
        moments.swr().bits(),
        resistance,
        resistance_exponent,
        reactance,
        reactance_exponent,
        r.cast_unsigned(),
        x.cast_unsigned(),
        back.re.cast_unsigned(),
        back.im.cast_unsigned(),
    ]
}

fn scalar(scalar: Scalar) -> [u32; 2] {
    [scalar.mantissa(), scalar.exponent()].map(i32::cast_unsigned)
}

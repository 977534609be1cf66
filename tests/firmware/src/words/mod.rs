//! Every word that the kernel gives for an image: printed by the cores, compared on the desktop.

mod record;

use stagebits_kernel::image::{ImageError, decode};
use stagebits_kernel::{
    Chain, ChainMatrix, Drive, Frequency, Gamma, Immittance, Moments, Resolved, Scalar, State,
    Step, Word,
};

use crate::points::{Band, frequencies, loads, switches};
pub use record::{Name, Record};

/// Most stages that a chain may have.
pub const CAPACITY: usize = 16;
/// Most steps that its banks may have together.
const STEPS: usize = 32;

/// Forward power in milliwatts that voltages and currents are read for.
const FORWARD_MILLIWATTS: u32 = 100_000;

/// Name of the word that tells kinds of step apart.
const KIND: &str = "kind of step";

/// What a line of words is about.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Subject {
    /// The frequency's own words.
    Frequency,
    /// The step of this number, counted from 0 at the source.
    Step(usize),
    /// The chain whatever its load.
    Chain,
    /// The chain with this load.
    Point(Gamma),
}

/// Evaluates the chain of an image at every point for its word length and hands each line of
/// words, with its frequency in hertz, to `sink`.
///
/// # Errors
/// Those of [`decode`], and [`ImageError::WordLength`] unless the words have 16 or 32 bits.
pub fn evaluate(
    image: &[u8],
    band: Band,
    sink: impl FnMut(u32, Subject, &Record),
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
    chain: &Chain<Scalar, CAPACITY, STEPS>,
    band: Band,
    reference_milliohms: u32,
    mut sink: impl FnMut(u32, Subject, &Record),
) {
    for hertz in frequencies(band) {
        let frequency = Frequency::new(hertz);
        sink(hertz, Subject::Frequency, &of_frequency(&frequency));
        let switches = switches(hertz);
        let resolved = chain.at_state::<W>(&frequency, &switches);
        let alike = *chain.switched(&frequency).at_state(&switches) == resolved;
        for (number, step) in resolved.steps().iter().enumerate() {
            sink(hertz, Subject::Step(number), &of_step(step));
        }
        sink(hertz, Subject::Chain, &of_chain(&resolved, alike));
        for load in loads(hertz) {
            let record = of_point(&resolved, load, reference_milliohms);
            sink(hertz, Subject::Point(load), &record);
        }
    }
}

fn of_frequency(frequency: &Frequency<Scalar>) -> Record {
    let mut record = Record::new();
    record.word("f in hertz", frequency.hertz());
    record.scalar("f", frequency.value());
    record.scalar("1/f", frequency.inverse());
    record.scalar("√f", frequency.root());
    record
}

fn of_step<W: Word>(step: &Step<Immittance<W>>) -> Record {
    let mut record = Record::new();
    let mut immittances = |kind, first, second: Option<&_>| {
        record.word(KIND, kind);
        record.immittance("first immittance", first);
        if let Some(second) = second {
            record.immittance("second immittance", second);
        }
    };
    match step {
        Step::Series(z) => immittances(0, z, None),
        Step::Shunt(y) => immittances(1, y, None),
        Step::Tee { series, shunt } => immittances(2, series, Some(shunt)),
        Step::Stretch { ratio, inverse } => immittances(3, ratio, Some(inverse)),
        Step::TwoPort(two_port) => {
            record.word(KIND, 4);
            let [a, b, c, d] = two_port.words();
            record.pair("a", a);
            record.pair("b", b);
            record.pair("c", c);
            record.pair("d", d);
            record.signed("exponent of the two-port", two_port.exponent());
        }
    }
    record
}

fn of_chain<W: Word>(resolved: &Resolved<Immittance<W>, CAPACITY>, alike: bool) -> Record {
    let mut record = Record::new();
    record.word("inverted", resolved.inverted().into());
    record.word("switched alike", alike.into());
    let ChainMatrix { a, b, c, d } = resolved.chain_matrix();
    record.complex("a", a);
    record.complex("b", b);
    record.complex("c", c);
    record.complex("d", d);
    let scattering = resolved.scattering();
    record.gamma("S11", scattering.s11);
    record.complex("S21", scattering.s21);
    record.gamma("S22", scattering.s22);
    record
}

fn of_point<W: Word>(
    resolved: &Resolved<Immittance<W>, CAPACITY>,
    load: Gamma,
    reference_milliohms: u32,
) -> Record {
    let mut record = Record::new();
    record.gamma("load", load);
    let start = State::<W>::from_load(load);
    let input = resolved.walk(start);
    let (v, i, exponent) = input.words();
    record.pair("input v", v);
    record.pair("input i", i);
    record.signed("exponent of the input", exponent);
    ratios(&mut record, &input.moments(), reference_milliohms);
    record.gamma("Γ walked back", resolved.walk_back(input).gamma());

    let (input, load) = (input.moments(), start.moments());
    let gain = input.transducer_gain(&load);
    record.scalar("transducer gain", gain);
    record.signed("transducer gain in 2^-16 dB", gain.decibels().bits());
    record.scalar("efficiency", input.efficiency(&load));
    let first_stage = resolved.efficiencies(start).last();
    record.scalar(
        "efficiency of the first stage",
        first_stage.unwrap_or_default(),
    );
    let drive = Drive::new(&input, FORWARD_MILLIWATTS, reference_milliohms);
    let (mut millivolts, mut microamperes) = (0, 0);
    for node in resolved.nodes(start) {
        let node = node.moments();
        millivolts = drive.millivolts(&node).max(millivolts);
        microamperes = drive.microamperes(&node).max(microamperes);
    }
    record.word("largest voltage in millivolts", millivolts);
    record.word("largest current in microamperes", microamperes);
    record
}

/// What is read from the state at the input alone.
fn ratios(record: &mut Record, input: &Moments, reference_milliohms: u32) {
    record.gamma("Γ", input.gamma());
    record.word("|Γ|² in 2^-30", input.gamma_square());
    record.word("|Γ| in 2^-30", input.gamma_magnitude());
    record.word("SWR in 2^-16", input.swr().bits());
    record.signed("return loss in 2^-16 dB", input.return_loss().bits());
    record.signed("mismatch loss in 2^-16 dB", input.mismatch_loss().bits());
    record.complex("Z/R0", input.impedance());
    record.complex("Y·R0", input.admittance());
    let (resistance, reactance) = input.milliohms(reference_milliohms);
    record.pair("Z in milliohms", [resistance, reactance]);
    let (conductance, susceptance) = input.microsiemens(reference_milliohms);
    record.pair("Y in microsiemens", [conductance, susceptance]);
}

//! A log that a core sends by defmt, decoded on the desktop, against what the desktop computes.

use std::fmt::{self, Debug};
use std::fs;

use defmt_decoder::{DecodeError, Table};
use stagebits_kernel::{
    Chain, Complex, Frequency, Gamma, Immittance, Resolved, Scalar, State, Step, Word, image,
};

#[path = "common/emulator.rs"]
mod emulator;
#[path = "firmware/src/logged.rs"]
#[allow(
    unreachable_pub,
    reason = "public in the images, where it is a library's"
)]
mod logged;
#[path = "firmware/src/seven_stages.rs"]
#[allow(
    unreachable_pub,
    reason = "public in the images, where it is a library's"
)]
mod seven_stages;

use emulator::{CORES, Failure};

/// A scalar to be shown as mantissa and exponent.
#[derive(Clone, Copy)]
struct Mantissa(Scalar);

impl Debug for Mantissa {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "{}·2^{}", self.0.mantissa(), self.0.exponent())
    }
}

fn pair([re, im]: [i32; 2]) -> String {
    format!("({re}, {im})")
}

fn immittance<W: Word>(z: &Immittance<W>) -> String {
    format!("{}·2^{}", pair(z.words()), z.exponent())
}

fn step<W: Word>(step: &Step<Immittance<W>>) -> String {
    match step {
        Step::Series(z) => format!("Series({})", immittance(z)),
        Step::Shunt(y) => format!("Shunt({})", immittance(y)),
        Step::Tee { series, shunt } => {
            let (series, shunt) = (immittance(series), immittance(shunt));
            format!("Tee {{ series: {series}, shunt: {shunt} }}")
        }
        Step::Stretch { ratio, inverse } => {
            let (ratio, inverse) = (immittance(ratio), immittance(inverse));
            format!("Stretch {{ ratio: {ratio}, inverse: {inverse} }}")
        }
        Step::TwoPort(two_port) => {
            let [a, b, c, d] = two_port.words().map(pair);
            let exponent = two_port.exponent();
            format!("TwoPort(a = {a}, b = {b}, c = {c}, d = {d}, ·2^{exponent})")
        }
    }
}

fn resolved<W: Word>(point: &Resolved<Immittance<W>, 7>) -> String {
    let steps: Vec<_> = point.steps().iter().map(step).collect();
    format!(
        "Resolved {{ steps: [{}], inverted: {} }}",
        steps.join(", "),
        point.inverted()
    )
}

/// The lines that a point takes.
fn point<W: Word>(chain: &Chain<Scalar, 7>, hertz: u32, load: Gamma) -> [String; 5] {
    let point = chain.at::<W>(&Frequency::new(hertz));
    let input = point.walk(State::from_load(load));
    let (v, i, exponent) = input.words();
    let moments = input.moments();
    let impedance: Complex<_> = moments.impedance().map(Mantissa);
    let (swr, loss) = (moments.swr().bits(), moments.return_loss().bits());
    [
        format!(
            "word length {}, frequency {hertz} Hz, load {load:?}",
            W::BITS
        ),
        format!("point {}", resolved(&point)),
        format!("input v = {}, i = {}, ·2^{exponent}", pair(v), pair(i)),
        format!("reflection {:?}, {swr}·2^-16", moments.gamma()),
        format!("impedance {impedance:?}, return loss {loss}·2^-16 dB"),
    ]
}

/// All that the image logs.
fn expected() -> Vec<String> {
    let chain = seven_stages::chain(seven_stages::scalar);
    let mut lines = vec![format!("{:?}", chain.map(Mantissa))];
    for (hertz, load) in logged::POINTS {
        lines.extend(point::<i32>(&chain, hertz, load));
        lines.extend(point::<i16>(&chain, hertz, load));
    }
    lines.push(format!("{:?}", image::decode::<7, 0>(b"no image at all")));
    lines
}

/// The messages that these bytes hold for a reader that has the image at hand.
fn messages(image: &[u8], log: &[u8]) -> Result<Vec<String>, Failure> {
    let failure = |error: &dyn fmt::Display| Failure(format!("the log of defmt: {error}"));
    let table = Table::parse(image)
        .map_err(|error| failure(&error))?
        .ok_or_else(|| failure(&"the image has no table of texts"))?;
    let mut decoder = table.new_stream_decoder();
    decoder.received(log);
    let mut messages = Vec::new();
    loop {
        match decoder.decode() {
            Ok(frame) => messages.push(frame.display_message().to_string()),
            Err(DecodeError::UnexpectedEof) => return Ok(messages),
            Err(DecodeError::Malformed) => return Err(failure(&"a frame is malformed")),
        }
    }
}

#[test]
fn logged_words_are_those_of_the_desktop() -> Result<(), Failure> {
    let expected = expected();
    for core in &CORES {
        let image = emulator::build(core, "log", &["log"], &[])?;
        let (log, status) = emulator::run_raw(core, &image, None, emulator::TIME_LIMIT)?;
        assert_eq!(status, 0, "{}", core.name);
        let image = fs::read(image).expect("the image has just run");
        let messages = messages(&image, &log)?;
        for (logged, expected) in messages.iter().zip(&expected) {
            assert_eq!(logged, expected, "{}", core.name);
        }
        assert_eq!(messages.len(), expected.len(), "{}", core.name);
    }
    Ok(())
}

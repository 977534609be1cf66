//! A log that a core sends by defmt, decoded on the desktop, against what the desktop computes.

use std::fmt::{self, Debug};
use std::fs;

use defmt_decoder::{DecodeError, Table};
use stagebits_kernel::{
    Chain, Complex, Frequency, Gamma, Immittance, Resolved, Scalar, State, Word, image,
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

/// Text in place of a value, so that what holds the value can be shown by its `Debug`.
#[derive(Clone)]
struct Text(String);

impl Debug for Text {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(&self.0)
    }
}

/// A scalar to be shown as mantissa and exponent.
#[derive(Clone, Copy)]
struct Mantissa(Scalar);

impl Debug for Mantissa {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "{}·2^{}", self.0.mantissa(), self.0.exponent())
    }
}

fn immittance<W: Word>(z: Immittance<W>) -> Text {
    let [re, im] = z.words();
    Text(format!("({re}, {im})·2^{}", z.exponent()))
}

fn resolved<W: Word>(point: &Resolved<Immittance<W>, 7>) -> String {
    let steps = point.steps().iter();
    let steps: Vec<_> = steps.map(|step| step.map(immittance)).collect();
    format!(
        "Resolved {{ steps: {steps:?}, inverted: {} }}",
        point.inverted()
    )
}

/// The lines that a point takes.
fn point<W: Word>(chain: &Chain<Scalar, 7>, hertz: u32, load: Gamma) -> [String; 5] {
    let point = chain.at::<W>(&Frequency::new(hertz));
    let input = point.walk(State::from_load(load));
    let ([v_re, v_im], [i_re, i_im], exponent) = input.words();
    let moments = input.moments();
    let impedance: Complex<_> = moments.impedance().map(Mantissa);
    let (swr, loss) = (moments.swr().bits(), moments.return_loss().bits());
    [
        format!(
            "word length {}, frequency {hertz} Hz, load {load:?}",
            W::BITS
        ),
        format!("point {}", resolved(&point)),
        format!("input v = ({v_re}, {v_im}), i = ({i_re}, {i_im}), ·2^{exponent}"),
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
    lines.push(format!("{:?}", image::decode::<7>(b"no image at all")));
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

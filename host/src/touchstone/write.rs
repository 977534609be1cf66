//! Writing Touchstone files.

use std::fmt::{self, Write as _};

use super::data::Order;
use super::format::Format;
use super::keyword::Keyword;
use super::network::{NPort, Network};

/// How a file is to be written.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Style {
    /// Version of the standard.
    pub version: Version,
    /// Format of the parameters.
    pub format: Format,
}

/// Version of the standard.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Version {
    /// 1.1, which every reader takes. The name of the file has to end in `.s1p` or `.s2p`.
    V1_1,
    /// 2.0, in which the ports of a two-port may have different references.
    V2_0,
}

/// The ports have different references, which version 1.1 cannot say.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct DifferentReferences;

impl fmt::Display for DifferentReferences {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(
            "version 1.1 has one reference for all ports, and the ports have different ones",
        )
    }
}

impl std::error::Error for DifferentReferences {}

/// The text of a Touchstone file with the network's S-parameters.
///
/// Numbers have the 17 significant digits that give each `f64` back. Read again, frequencies,
/// references and values in [`Format::RealImaginary`] are the same to the bit; the other formats
/// add the rounding of their own conversion.
///
/// # Errors
/// Where version 1.1 is asked for and the ports have different references.
pub fn write<const PORTS: usize>(
    network: &NPort<PORTS>,
    style: Style,
) -> Result<String, DifferentReferences> {
    let mut text = format!(
        "! Written by {} {}\n",
        env!("CARGO_PKG_NAME"),
        env!("CARGO_PKG_VERSION")
    );
    let first = network.reference[0];
    let options = format!("# Hz S {} R {first}", style.format.name());
    let order = Order::Columns;
    match style.version {
        Version::V1_1 if network.reference.iter().any(|&other| other != first) => {
            return Err(DifferentReferences);
        }
        Version::V1_1 => push_line(&mut text, &options),
        Version::V2_0 => {
            let references: Vec<_> = network.reference.iter().map(f64::to_string).collect();
            push_keyword(&mut text, Keyword::Version, "2.0");
            push_line(&mut text, &options);
            push_keyword(&mut text, Keyword::NumberOfPorts, &PORTS.to_string());
            if PORTS == 2 {
                push_keyword(&mut text, Keyword::TwoPortDataOrder, "21_12");
            }
            let frequencies = network.points.len().to_string();
            push_keyword(&mut text, Keyword::NumberOfFrequencies, &frequencies);
            push_keyword(&mut text, Keyword::Reference, &references.join(" "));
            push_keyword(&mut text, Keyword::NetworkData, "");
        }
    }
    for point in &network.points {
        let mut line = point.hertz.to_string();
        for &(row, column) in order.entries(PORTS) {
            for number in style.format.pair(point.s[row][column]) {
                // Writing to a string cannot fail.
                let _ = write!(line, " {number:.16e}");
            }
        }
        push_line(&mut text, &line);
    }
    if style.version == Version::V2_0 {
        push_keyword(&mut text, Keyword::End, "");
    }
    Ok(text)
}

fn push_keyword(text: &mut String, keyword: Keyword, value: &str) {
    push_line(text, format!("[{}] {value}", keyword.name()).trim_end());
}

fn push_line(text: &mut String, line: &str) {
    text.push_str(line);
    text.push('\n');
}

impl Network {
    /// See [`write()`].
    ///
    /// # Errors
    /// As [`write()`].
    pub fn write(&self, style: Style) -> Result<String, DifferentReferences> {
        match self {
            Self::OnePort(one_port) => write(one_port, style),
            Self::TwoPort(two_port) => write(two_port, style),
        }
    }
}

//! Files of the IBIS Touchstone standard, versions 1.x and 2.0: scattering parameters of one- and
//! two-ports over frequency, as instruments and simulators save them.
//!
//! ```text
//! ! a comment, up to the end of the line
//! # MHz S MA R 50
//! 2.0  0.981  -11.9
//! 2.5  0.974  -15.2
//! ```
//!
//! # What is read
//!
//! - The option line in any order and case: unit (Hz, kHz, MHz, GHz), parameter, format (RI, MA,
//!   DB), reference resistance. What it leaves out is GHz, S, MA, R 50. Only the first one counts.
//! - S-parameters; of one-ports also Y and Z, which are converted. In version 1.x they are in units
//!   of the reference resistance, in 2.0 in ohms and siemens.
//! - One line for each frequency: S11, or S11 S21 S12 S22. In version 2.0 the order of a two-port's
//!   data and symmetric matrices written as a triangle, too.
//! - The number of ports of version 1.x comes from the end of the name, `.s1p` or `.s2p`.
//! - Noise data are recognised and left out; in version 1.x they begin where a line of five numbers
//!   has a frequency that does not rise.
//! - Comments and information blocks may hold any bytes. Everything else is ASCII.
//!
//! Anything else is refused with its line and column; nothing is corrected silently.

mod data;
mod format;
mod header;
mod keyword;
mod line;
mod network;
mod number;
mod option_line;
mod parameter;
mod version_1;
mod version_2;
mod write;

pub use format::Format;
pub use network::{Flaw, NPort, Network, OnePort, Point, TwoPort};
pub use write::{DifferentReferences, Style, Version, write};

use std::path::Path;

use crate::diagnostic::{Diagnostic, Source};
use crate::input;
use line::{Kind, Lines};

/// Largest Touchstone file in bytes: room for 300 000 frequencies of a two-port with all digits.
pub const LARGEST_FILE: u64 = 64 << 20;

/// Reads the Touchstone file at `path`.
///
/// # Errors
/// Where the file cannot be read or is larger than [`LARGEST_FILE`], and where [`parse`] fails.
pub fn read(path: &Path) -> Result<Network, Diagnostic> {
    let bytes = input::read(path, LARGEST_FILE, "Touchstone file")?;
    // Bytes that are no text do no harm in a comment; elsewhere what replaces them is refused.
    let text = String::from_utf8_lossy(&bytes);
    parse(&text, &path.display().to_string())
}

/// Reads a Touchstone file from its `text`; `file` is the name under which faults are reported, and
/// whose end (`.s1p`, `.s2p`) tells the number of ports of a file of version 1.x.
///
/// # Errors
/// Where the text is no Touchstone file of a one- or two-port, or holds values that are of no use:
/// not finite, of no ascending frequency, or without an S-parameter.
pub fn parse(text: &str, file: &str) -> Result<Network, Diagnostic> {
    let text = text.strip_prefix('\u{feff}').unwrap_or(text);
    let source = Source { file, text };
    let mut lines = Lines::new(source);
    match lines.significant()? {
        None => Err(source.fault(
            text.len()..text.len(),
            "the file is empty but for comments",
            "give a file with an option line, such as `# MHz S MA R 50`, and network data",
        )),
        Some(first) if first.kind() == Kind::Keyword => version_2::read(lines, &first),
        Some(first) => version_1::read(lines, first),
    }
}

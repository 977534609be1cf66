//! The chain file: a circuit, its band and its loads, written down in TOML.
//!
//! ```toml
//! title = "tide-gauge buoy, 2 to 12 MHz"
//! reference = "50 ohm"              # R0 of Γ and SWR; this is the default
//! [band]
//! from = "2 MHz"                    # whole hertz, 1 Hz to 4294967295 Hz
//! to = "12 MHz"
//! points = 41                       # the default; 1 where `from` equals `to`
//! [load]
//! swr_up_to = 10                    # or one of the other kinds of load, see below
//! [firmware]
//! word_bits = 32                    # 16 or 32, the default
//! [accuracy]
//! gamma = 1e-4                      # largest |ΔΓ| accepted; this is the default
//! [[stage]]                         # radio side first, each of exactly one kind
//! name = "patch lead"               # made from kind and position where it is left out
//! line = { impedance = "50 ohm", length = "0.6 m", velocity = 0.66, loss_db_per_100m = { "10 MHz" = 2.2, "100 MHz" = 7.6 } }
//! [[stage]]
//! series = { inductance = "1.2 uH", q = 180 }
//! [[stage]]
//! shunt = { arrangement = "parallel", inductance = "1 uH", inductor_q = 200, capacitance = "100 pF", capacitor_esr = "0.1 ohm" }
//! [[stage]]
//! shunt_stub = { end = "open", impedance = "50 ohm", length = "0.5 m", velocity = 0.66 }
//! [[stage]]
//! transformer = { ratio = 3 }       # voltage at the radio side ÷ voltage at the load side
//! [[stage]]
//! shunt_bank = { capacitances = ["10 pF", "22 pF", "47 pF"], q = 1000, contact = "0.05 ohm", stray = "0.5 pF" }
//! [[stage]]
//! series_bank = { inductances = { first = "60 nH", steps = 8 }, q = 150, contact = "0.05 ohm", stray = "1 pF" }
//! ```
//!
//! A bank is up to 16 coils or capacitors that relays switch, see [`crate::plan::Bank`]. Its values
//! are a list, or the first of `steps` values each twice the one before. `q` or `esr` is one value
//! for all steps or a list of one for each; `contact` is the resistance of each closed contact and
//! `stray` the capacitance of each open one.
//!
//! The loads are one of
//!
//! - `swr_up_to = 10`: all with a standing wave ratio up to this one;
//! - `impedances = [["30 ohm", "-40 ohm"], ...]`: these, as R and X, at every frequency;
//! - `one_port = "antenna.s1p"`: the one measured at each frequency, in a file of the Touchstone
//!   standard ([`crate::touchstone`]) whose path starts in the folder of the chain file. Its
//!   frequencies have to enclose the band; between them Γ is interpolated in a straight line, after
//!   it has been referred to `reference`;
//! - `series = { resistance = "36 ohm", inductance = "4.7 uH", capacitance = "150 pF" }`: that of a
//!   series circuit, from which one or two elements may be left out.
//!
//! Quantities are strings with their unit ([`crate::quantity`]) within
//! [`Dimension::limits`](crate::quantity::Dimension::limits). The first fault found is reported with
//! its line and column; nothing is corrected silently.

mod bank;
mod branch;
mod line;
mod load;
mod loss;
mod settings;
mod stage;
mod syntax;
mod table;
mod value;

use std::path::Path;

use crate::diagnostic::{Diagnostic, Source};
use crate::input;
use crate::plan::Plan;

/// Largest chain file in bytes: hundreds of times a full one, and an end to reading a device.
pub const LARGEST_FILE: u64 = 1 << 20;

/// Reads the chain file at `path`.
///
/// # Errors
/// Where the file cannot be read, is larger than [`LARGEST_FILE`] or not in UTF-8, or is no valid
/// chain file.
pub fn read(path: &Path) -> Result<Plan, Diagnostic> {
    let file = path.display().to_string();
    let bytes = input::read(path, LARGEST_FILE, "chain file")?;
    match std::str::from_utf8(&bytes) {
        Ok(text) => parse_in(folder_of(path), text, &file),
        Err(error) => {
            let start = error.valid_up_to();
            let message = format!("byte {:#04x} is not part of UTF-8 text", bytes[start]);
            let text = String::from_utf8_lossy(&bytes);
            let source = Source {
                file: &file,
                text: &text,
            };
            // The text before the first bad byte is unchanged, and so is its offset.
            Err(source.fault(start..start + 1, message, "save the file in UTF-8"))
        }
    }
}

/// Reads a chain file from its `text`; `file` is the name under which faults are reported, and in
/// whose folder the paths in the text start.
///
/// # Errors
/// Where the text is not TOML or is no valid chain file.
pub fn parse(text: &str, file: &str) -> Result<Plan, Diagnostic> {
    parse_in(folder_of(Path::new(file)), text, file)
}

fn parse_in(folder: &Path, text: &str, file: &str) -> Result<Plan, Diagnostic> {
    let text = text.strip_prefix('\u{feff}').unwrap_or(text);
    let source = Source { file, text };
    let document = syntax::document(source)?;
    settings::plan(source, document.get_ref(), folder)
}

fn folder_of(file: &Path) -> &Path {
    file.parent().unwrap_or(Path::new(""))
}

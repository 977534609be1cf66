//! The option line: `# MHz S MA R 50`.

use std::ops::Range;

use super::format::Format;
use super::line::{Line, Token};
use super::number::{resistance, shown};
use super::parameter::Parameter;
use crate::diagnostic::{Diagnostic, Source};
use crate::quantity::decimal;

/// What the option line says, or the standard in its place.
#[derive(Clone, Debug)]
pub(super) struct Options {
    /// Power of ten of the unit of frequency in hertz.
    pub(super) power_of_ten: i64,
    /// Which parameters the data are.
    pub(super) parameter: Parameter,
    /// Where the parameter is named, or the line if it is not.
    pub(super) parameter_range: Range<usize>,
    /// How they are written.
    pub(super) format: Format,
    /// Reference resistance in ohms.
    pub(super) resistance: f64,
}

const UNITS: [(&str, i64); 4] = [("Hz", 0), ("kHz", 3), ("MHz", 6), ("GHz", 9)];
/// In words, for advice.
const EXAMPLE: &str = "write for example `# MHz S MA R 50`: a unit (Hz, kHz, MHz, GHz), a \
                       parameter (S, Y, Z, H, G), a format (RI, MA, DB) and a resistance behind R";

/// Reads an option line.
pub(super) fn parse(source: Source<'_>, line: &Line<'_>) -> Result<Options, Diagnostic> {
    let fault = |token: &Token<'_>, message: String, help: &str| {
        Err(source.fault(token.range.clone(), message, help))
    };
    let mut options = Options {
        power_of_ten: 9,
        parameter: Parameter::S,
        parameter_range: line.range(),
        format: Format::MagnitudeAngle,
        resistance: 50.0,
    };
    let mut given: [bool; 4] = [false; 4];
    let behind_sign = line.text().find('#').map_or(0, |sign| sign + 1);
    let mut tokens = line.tokens_after(behind_sign);
    while let Some(token) = tokens.next() {
        let word = token.text;
        let (which, what) = if let Some(power_of_ten) = meaning(&UNITS, word) {
            options.power_of_ten = power_of_ten;
            (0, "unit")
        } else if let Some(parameter) = meaning(&Parameter::NAMES, word) {
            options.parameter = parameter;
            options.parameter_range = token.range.clone();
            (1, "parameter")
        } else if let Some(format) =
            meaning(&Format::ALL.map(|format| (format.name(), format)), word)
        {
            options.format = format;
            (2, "format")
        } else if word.eq_ignore_ascii_case("R") {
            let Some(ohms) = tokens.next() else {
                return fault(&token, "R without a resistance".to_owned(), "write R 50");
            };
            options.resistance = resistance(source, &ohms)?;
            (3, "resistance")
        } else {
            let message = format!("unknown option {}", shown(word));
            return match word.strip_prefix(['r', 'R']) {
                Some(ohms) if decimal(ohms, 0).is_some() => {
                    fault(&token, message, &format!("write R {ohms}, with a blank"))
                }
                _ => fault(&token, message, EXAMPLE),
            };
        };
        if std::mem::replace(&mut given[which], true) {
            let message = format!("a second {what} on the option line");
            return fault(&token, message, EXAMPLE);
        }
    }
    Ok(options)
}

fn meaning<T: Copy>(words: &[(&str, T)], wanted: &str) -> Option<T> {
    let known = |(word, _): &&(&str, T)| word.eq_ignore_ascii_case(wanted);
    words.iter().find(known).map(|&(_, meaning)| meaning)
}

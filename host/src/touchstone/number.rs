//! Words read as numbers.

use std::ops::RangeInclusive;

use super::line::Token;
use crate::diagnostic::{Diagnostic, Source};
use crate::quantity::{Dimension, decimal};

/// The word, cut to what fits a message of one line.
pub(super) fn shown(text: &str) -> String {
    match text.char_indices().nth(40) {
        Some((end, _)) => format!("\"{}...\"", text[..end].escape_debug()),
        None => format!("{text:?}"),
    }
}

/// A finite number, times ten to the power `power_of_ten`.
pub(super) fn number(
    source: Source<'_>,
    token: &Token<'_>,
    power_of_ten: i64,
) -> Result<f64, Diagnostic> {
    let text = token.text;
    match decimal(text, power_of_ten) {
        Some(value) if value.is_finite() => Ok(value),
        Some(_) => {
            let message = format!("{} is too large", shown(text));
            Err(source.fault(token.range.clone(), message, "write a smaller number"))
        }
        None => {
            let message = format!("{} is not a number", shown(text));
            let point = text.replacen(',', ".", 1);
            let help = if point != text && decimal(&point, 0).is_some() {
                format!("write a point before the decimals: {point}")
            } else {
                "write a finite decimal number, such as 0.25 or -1.2e-3; a comment begins with `!`"
                    .to_owned()
            };
            Err(source.fault(token.range.clone(), message, help))
        }
    }
}

/// A whole number in `range`.
pub(super) fn whole(
    source: Source<'_>,
    token: &Token<'_>,
    range: RangeInclusive<usize>,
) -> Result<usize, Diagnostic> {
    match token.text.parse() {
        Ok(number) if range.contains(&number) => Ok(number),
        _ => {
            let message = format!("{} is not a whole number in range", shown(token.text));
            let help = format!(
                "write a whole number from {} to {}",
                range.start(),
                range.end()
            );
            Err(source.fault(token.range.clone(), message, help))
        }
    }
}

/// A reference resistance in ohms, within the limits of a resistance.
pub(super) fn resistance(source: Source<'_>, token: &Token<'_>) -> Result<f64, Diagnostic> {
    let ohms = number(source, token, 0)?;
    let limits = Dimension::Resistance.limits();
    if limits.contains(&ohms) {
        return Ok(ohms);
    }
    let message = format!("a reference resistance of {ohms} ohm is of no use");
    let help = format!(
        "write a real resistance from {:e} to {:e} ohm",
        limits.start(),
        limits.end()
    );
    Err(source.fault(token.range.clone(), message, help))
}

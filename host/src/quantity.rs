//! Written-out quantities such as `1.2 uH`: a number, a blank, and a unit with or without a prefix.
//!
//! The number is read in decimal together with the power of ten of the prefix and rounded once, so
//! that `1.2 uH` is the `f64` nearest to 1.2e-6.

use std::fmt;
use std::ops::{Range, RangeInclusive};

/// What a quantity measures.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Dimension {
    /// Ohms; reactances and impedances, too.
    Resistance,
    /// Henries.
    Inductance,
    /// Farads.
    Capacitance,
    /// Hertz.
    Frequency,
    /// Metres.
    Length,
    /// A ratio written in per cent; 5 % is 0.05.
    Ratio,
}

/// Why a text is not the quantity wanted.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct QuantityError {
    /// The bytes of the text that are at fault.
    pub range: Range<usize>,
    /// What is wrong.
    pub message: String,
    /// What would be right.
    pub help: String,
}

/// A unit: how it is written, what it measures, its power of ten, and whether it takes a prefix.
struct Unit(&'static str, Dimension, i64, bool);

/// Where a dimension has several spellings of its unit, the first is the one that is written.
const UNITS: [Unit; 8] = [
    Unit("ohm", Dimension::Resistance, 0, true),
    // Unicode holds the unit as a letter (U+03A9) and as a sign of its own (U+2126).
    Unit("\u{3a9}", Dimension::Resistance, 0, true),
    Unit("\u{2126}", Dimension::Resistance, 0, true),
    Unit("H", Dimension::Inductance, 0, true),
    Unit("F", Dimension::Capacitance, 0, true),
    Unit("Hz", Dimension::Frequency, 0, true),
    Unit("m", Dimension::Length, 0, true),
    Unit("%", Dimension::Ratio, -2, false),
];

/// SI prefixes and their powers of ten (BIPM, The International System of Units, 9th edition,
/// table 7). Micro has three spellings: ASCII, U+00B5 and U+03BC; the first is the one written.
const PREFIXES: [(&str, i64); 10] = [
    ("f", -15),
    ("p", -12),
    ("n", -9),
    ("u", -6),
    ("\u{b5}", -6),
    ("\u{3bc}", -6),
    ("m", -3),
    ("k", 3),
    ("M", 6),
    ("G", 9),
];

impl Dimension {
    /// The values accepted for a part or a setting, in SI units, both ends included.
    ///
    /// Wide enough for any circuit made, narrow enough that a slip in the prefix of an extreme
    /// value is caught and that no product of a few of them leaves the range of `f64`.
    pub fn limits(self) -> RangeInclusive<f64> {
        match self {
            Self::Resistance => 1e-6..=1e9,
            Self::Inductance => 1e-15..=1e3,
            Self::Capacitance => 1e-15..=1.0,
            // The firmware holds a frequency as a 32-bit number of hertz.
            Self::Frequency => 1.0..=u32::MAX as f64,
            Self::Length => 1e-6..=1e6,
            Self::Ratio => 0.0..=1.0,
        }
    }

    /// A quantity of this dimension, written out.
    pub fn example(self) -> &'static str {
        match self {
            Self::Resistance => "50 ohm",
            Self::Inductance => "1.2 uH",
            Self::Capacitance => "100 pF",
            Self::Frequency => "2 MHz",
            Self::Length => "0.6 m",
            Self::Ratio => "5 %",
        }
    }

    /// `value` in SI units, written out with the prefix that leaves one to three digits before the
    /// point; without one where no prefix does. Finite.
    pub fn write(self, value: f64) -> String {
        let Unit(unit, _, unit_power, takes_prefix) = UNITS
            .iter()
            .find(|unit| unit.1 == self)
            .expect("each dimension has a unit");
        // Moving the point in decimal keeps round numbers round.
        let scientific = format!("{value:e}");
        let power = power(&scientific).unwrap_or(0);
        let (prefix, prefix_power) = PREFIXES
            .iter()
            .filter(|_| *takes_prefix)
            .find(|(_, prefix_power)| (0..3).contains(&(power - prefix_power)))
            .unwrap_or(&("", 0));
        let number = scaled(&scientific, power - prefix_power - unit_power).unwrap_or(value);
        format!("{number} {prefix}{unit}")
    }
}

impl fmt::Display for Dimension {
    /// With its article: "an inductance".
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(match self {
            Self::Resistance => "a resistance",
            Self::Inductance => "an inductance",
            Self::Capacitance => "a capacitance",
            Self::Frequency => "a frequency",
            Self::Length => "a length",
            Self::Ratio => "a ratio",
        })
    }
}

/// Reads `text` as a quantity of the dimension `wanted`, in SI units (a ratio as a fraction of one).
///
/// The value is finite, of any sign, and not held against [`Dimension::limits`].
///
/// # Errors
/// Where the number cannot be read or is too large for `f64`, where number and unit are not
/// separated by blanks, where the unit is missing or unknown, or where it is of another dimension.
pub fn parse(text: &str, wanted: Dimension) -> Result<f64, QuantityError> {
    let example = format!("write {wanted}, such as \"{}\"", wanted.example());
    let fail = |range, message: String, help: String| {
        Err(QuantityError {
            range,
            message,
            help,
        })
    };

    let start = text.len() - text.trim_start().len();
    let body = text.trim();
    if body.is_empty() {
        let message = format!("{text:?} is empty; {wanted} is wanted");
        return fail(0..text.len(), message, example);
    }
    let (number, unit) = match body.find(char::is_whitespace) {
        Some(blank) => (&body[..blank], body[blank..].trim_start()),
        None => (body, ""),
    };
    let number_range = start..start + number.len();
    let unit_range = start + body.len() - unit.len()..start + body.len();

    let Some(power_of_number) = power(number) else {
        if unit.is_empty()
            && let Some(split) = number.rfind(|c: char| c.is_ascii_digit() || c == '.')
            && power(&number[..=split]).is_some()
        {
            let (number, unit) = number.split_at(split + 1);
            let message = format!("{text:?} has no blank between number and unit");
            return fail(number_range, message, format!("write \"{number} {unit}\""));
        }
        let message = format!("{number:?} is not a number");
        let help = match number.replacen(',', ".", 1) {
            point if point != number && power(&point).is_some() => {
                format!("write a point before the decimals: {point}")
            }
            _ => example,
        };
        return fail(number_range, message, help);
    };
    if unit.is_empty() {
        let message = format!("{text:?} has no unit; {wanted} is wanted");
        return fail(number_range, message, example);
    }

    let (found, power_of_unit) = match read_unit(unit) {
        Ok(known) => known,
        Err(message) => {
            let plausible = |power_of_unit: i64| {
                scaled(number, power_of_number.saturating_add(power_of_unit))
                    .is_some_and(|value| wanted.limits().contains(&value.abs()))
            };
            let help = match alike(unit, wanted, plausible) {
                Some(alike) => format!("write \"{number} {alike}\""),
                None => format!("{example}; {}", prefixes()),
            };
            return fail(unit_range, message, help);
        }
    };
    if found != wanted {
        let message = format!("{body:?} is {found}; {wanted} is wanted");
        return fail(start..start + body.len(), message, example);
    }
    match scaled(number, power_of_number.saturating_add(power_of_unit)) {
        Some(value) => Ok(value),
        None => {
            let message = format!("{number:?} is too large");
            fail(number_range, message, example)
        }
    }
}

/// A decimal number times ten to the power `power_of_ten`, rounded once; infinite where that is too
/// large for `f64`, `None` where `text` is no number ("inf" and "nan" are none).
pub(crate) fn decimal(text: &str, power_of_ten: i64) -> Option<f64> {
    let power = power(text)?;
    if power_of_ten == 0 {
        return text.parse().ok();
    }
    Some(scaled(text, power.saturating_add(power_of_ten)).unwrap_or(f64::INFINITY))
}

/// The power of ten behind the `e` of a decimal number, 0 without one; `None` if it is no number.
fn power(number: &str) -> Option<i64> {
    // The standard library reads "inf" and "nan" as well, which are no values of a part.
    if !number.contains(|c: char| c.is_ascii_digit()) || number.parse::<f64>().is_err() {
        return None;
    }
    let Some((_, power)) = number.split_once(['e', 'E']) else {
        return Some(0);
    };
    // A power that overflows is as good as infinite.
    let limit = if power.starts_with('-') {
        i64::MIN
    } else {
        i64::MAX
    };
    Some(power.parse().unwrap_or(limit))
}

/// The digits of `number` with the power of ten `power` in place of its own, rounded once;
/// `None` where that is no finite number.
fn scaled(number: &str, power: i64) -> Option<f64> {
    let digits = number.split(['e', 'E']).next().unwrap_or(number);
    let value: f64 = format!("{digits}e{power}").parse().ok()?;
    value.is_finite().then_some(value)
}

/// Dimension and power of ten of a unit, or what is wrong with it.
fn read_unit(text: &str) -> Result<(Dimension, i64), String> {
    // A unit alone comes first: "m" is the metre, not a prefix without a unit.
    if let Some(&Unit(_, dimension, power, _)) = UNITS.iter().find(|unit| unit.0 == text) {
        return Ok((dimension, power));
    }
    let mut unknown_prefix = None;
    for &Unit(symbol, dimension, power, takes_prefix) in &UNITS {
        let Some(prefix) = text.strip_suffix(symbol) else {
            continue;
        };
        match PREFIXES.iter().find(|known| known.0 == prefix) {
            Some((_, prefix_power)) if takes_prefix => {
                return Ok((dimension, power + prefix_power));
            }
            Some(_) => return Err(format!("{symbol:?} takes no prefix")),
            None if prefix.chars().count() == 1 => unknown_prefix = Some((prefix, symbol)),
            None => {}
        }
    }
    Err(match unknown_prefix {
        Some((prefix, symbol)) => format!("unknown prefix {prefix:?} of the unit {symbol:?}"),
        None => format!("unknown unit {text:?}"),
    })
}

/// A unit of the dimension wanted that differs from `text` in the case of letters or a plural s
/// only, and whose power of ten is `plausible` (2 mhz is not likely to mean 2 mHz).
fn alike(text: &str, wanted: Dimension, plausible: impl Fn(i64) -> bool) -> Option<String> {
    let text = text.to_lowercase();
    let singular = text.strip_suffix('s').unwrap_or(&text);
    UNITS
        .iter()
        .filter(|unit| unit.1 == wanted)
        .flat_map(|&Unit(symbol, _, power, takes_prefix)| {
            let prefixes = PREFIXES.iter().filter(move |_| takes_prefix);
            std::iter::once((symbol.to_owned(), power)).chain(
                prefixes.map(move |(prefix, more)| (format!("{prefix}{symbol}"), power + more)),
            )
        })
        .find(|(unit, power)| unit.to_lowercase() == singular && plausible(*power))
        .map(|(unit, _)| unit)
}

fn prefixes() -> String {
    let mut list = "the prefixes are".to_owned();
    for (prefix, _) in PREFIXES.iter().filter(|(prefix, _)| prefix.is_ascii()) {
        list.push(' ');
        list.push_str(prefix);
    }
    list
}

#[cfg(test)]
mod tests;

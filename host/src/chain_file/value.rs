//! A TOML value read as what is wanted of it: text, a number, a quantity, a list or a table.

use std::ops::{Range, RangeInclusive};

use toml::Spanned;
use toml::de::{DeArray, DeInteger, DeString, DeTable, DeValue};

use super::table::{Key, Table, in_order};
use crate::diagnostic::{Diagnostic, Source};
use crate::quantity::{self, Dimension};

/// A value with the key it stands under.
pub(super) struct Value<'a> {
    source: Source<'a>,
    key: Key,
    key_range: Range<usize>,
    node: &'a Spanned<DeValue<'a>>,
}

impl<'a> Value<'a> {
    pub(super) fn new(
        source: Source<'a>,
        key: Key,
        key_range: Range<usize>,
        node: &'a Spanned<DeValue<'a>>,
    ) -> Self {
        Self {
            source,
            key,
            key_range,
            node,
        }
    }

    pub(super) fn key(&self) -> Key {
        self.key
    }

    /// Where the key stands.
    pub(super) fn key_range(&self) -> Range<usize> {
        self.key_range.clone()
    }

    /// A fault at the value.
    pub(super) fn fault(&self, message: String, help: impl Into<String>) -> Diagnostic {
        self.source.fault(self.node.span(), message, help)
    }

    /// A fault at the key.
    pub(super) fn key_fault(&self, message: String, help: impl Into<String>) -> Diagnostic {
        self.source.fault(self.key_range(), message, help)
    }

    /// The value as it is written, cut to what fits a message of one line.
    fn written(&self) -> String {
        let written = self.source.text.get(self.node.span()).unwrap_or_default();
        let short: String = written
            .lines()
            .next()
            .unwrap_or_default()
            .chars()
            .take(40)
            .collect();
        let more = if short.len() < written.len() {
            "..."
        } else {
            ""
        };
        short + more
    }

    /// The key with its value, as messages begin.
    fn subject(&self) -> String {
        format!("`{}` is {}", self.key.name, self.written())
    }

    fn example(&self) -> String {
        format!("write for example {}", self.key.example)
    }

    fn wrong_type(&self, wanted: &str) -> Diagnostic {
        let found = match self.node.get_ref() {
            DeValue::String(_) => "a string",
            DeValue::Integer(_) | DeValue::Float(_) => "a number",
            DeValue::Boolean(_) => "a boolean",
            DeValue::Datetime(_) => "a date or time",
            DeValue::Array(_) => "an array",
            DeValue::Table(_) => "a table",
        };
        let message = format!("`{}` is {found}; {wanted} is wanted", self.key.name);
        self.fault(message, self.example())
    }

    /// One line of text that is not blank.
    pub(super) fn text(&self) -> Result<String, Diagnostic> {
        let DeValue::String(text) = self.node.get_ref() else {
            return Err(self.wrong_type("a string"));
        };
        if text.trim().is_empty() {
            return Err(self.fault(format!("`{}` is empty", self.key.name), self.example()));
        }
        if text.contains(char::is_control) {
            let message = format!("`{}` holds a control character", self.key.name);
            return Err(self.fault(message, "write it on one line without tabs"));
        }
        Ok(text.trim().to_owned())
    }

    /// One of a few words.
    pub(super) fn word<T: Copy>(&self, words: &[(&str, T)]) -> Result<T, Diagnostic> {
        let DeValue::String(text) = self.node.get_ref() else {
            return Err(self.wrong_type("a string"));
        };
        let known = words.iter().find(|(word, _)| word == text);
        known.map(|&(_, meaning)| meaning).ok_or_else(|| {
            let list: Vec<_> = words.iter().map(|(word, _)| format!("{word:?}")).collect();
            self.fault(self.subject(), format!("write {}", list.join(" or ")))
        })
    }

    /// A finite number for which `holds` is true; `rule` is the same in words.
    pub(super) fn number(
        &self,
        rule: &str,
        holds: impl Fn(f64) -> bool,
    ) -> Result<f64, Diagnostic> {
        let number = match self.node.get_ref() {
            DeValue::Integer(integer) => float_of(integer),
            DeValue::Float(float) => float.as_str().parse().ok(),
            DeValue::String(text) if text.trim().parse::<f64>().is_ok() => {
                let message = format!("`{}` is a string; a number is wanted", self.key.name);
                let help = format!("leave the quotes out: {} = {}", self.key.name, text.trim());
                return Err(self.fault(message, help));
            }
            _ => return Err(self.wrong_type("a number")),
        };
        match number {
            Some(number) if number.is_finite() && holds(number) => Ok(number),
            _ => {
                let message = format!("{}; it has to be {rule}", self.subject());
                Err(self.fault(message, self.example()))
            }
        }
    }

    /// A whole number in `range`.
    pub(super) fn whole(&self, range: RangeInclusive<u32>) -> Result<u32, Diagnostic> {
        let (low, high) = (range.start(), range.end());
        let rule = format!("a whole number from {low} to {high}");
        let within = |number| (f64::from(*low)..=f64::from(*high)).contains(&number);
        let number = self.number(&rule, within)?;
        if number.fract() != 0.0 {
            let message = format!("{}; it has to be {rule}", self.subject());
            return Err(self.fault(message, self.example()));
        }
        // Whole and between two u32, so the conversion is exact.
        Ok(number as u32)
    }

    /// A quantity within the limits of its dimension, in SI units.
    pub(super) fn quantity(&self, dimension: Dimension) -> Result<f64, Diagnostic> {
        self.quantity_in(dimension, dimension.limits())
    }

    /// A quantity within `limits`, in SI units.
    pub(super) fn quantity_in(
        &self,
        dimension: Dimension,
        limits: RangeInclusive<f64>,
    ) -> Result<f64, Diagnostic> {
        match self.node.get_ref() {
            DeValue::String(text) => {
                quantity_at(self.source, text, self.node.span(), dimension, limits)
            }
            DeValue::Integer(_) | DeValue::Float(_) => {
                let message = format!("{}, without a unit; {dimension} is wanted", self.subject());
                let help = format!("write a string with a unit, such as {}", self.key.example);
                Err(self.fault(message, help))
            }
            _ => Err(self.wrong_type(&format!("a string with {dimension}"))),
        }
    }

    /// A frequency in whole hertz, as the firmware holds it.
    pub(super) fn hertz(&self) -> Result<u32, Diagnostic> {
        let value = self.quantity(Dimension::Frequency)?;
        if value.fract() != 0.0 {
            let message = format!("{}, which is {value} Hz", self.subject());
            return Err(self.fault(message, "write a frequency in whole hertz"));
        }
        // Whole and within the limits of a frequency, which are those of u32.
        Ok(value as u32)
    }

    /// A table that takes `keys`; `what` is its name in messages.
    pub(super) fn table(&self, what: &'static str, keys: &[Key]) -> Result<Table<'a>, Diagnostic> {
        Table::open(self.source, what, self.node.span(), self.entries()?, keys)
    }

    /// The entries of a table whose keys are quantities: each key in SI units with its value, in
    /// the order of the text.
    pub(super) fn quantity_entries(
        &self,
        dimension: Dimension,
    ) -> Result<Vec<(f64, Value<'a>)>, Diagnostic> {
        let entry = |(name, node): (&Spanned<DeString<'_>>, _)| {
            let (text, range) = (name.get_ref(), name.span());
            let key = quantity_at(self.source, text, range, dimension, dimension.limits())?;
            Ok((key, Value::new(self.source, self.key, name.span(), node)))
        };
        in_order(self.entries()?).into_iter().map(entry).collect()
    }

    /// Whether it is a table.
    pub(super) fn is_table(&self) -> bool {
        matches!(self.node.get_ref(), DeValue::Table(_))
    }

    /// Whether it is an array.
    pub(super) fn is_array(&self) -> bool {
        matches!(self.node.get_ref(), DeValue::Array(_))
    }

    fn entries(&self) -> Result<&'a DeTable<'a>, Diagnostic> {
        match self.node.get_ref() {
            DeValue::Table(entries) => Ok(entries),
            _ => Err(self.wrong_type("a table")),
        }
    }

    /// The values of an array; each stands under the key of the array.
    pub(super) fn items(&self) -> Result<Vec<Value<'a>>, Diagnostic> {
        let array: &'a DeArray<'a> = match self.node.get_ref() {
            DeValue::Array(array) => array,
            _ => return Err(self.wrong_type("an array")),
        };
        let item = |node| Value::new(self.source, self.key, self.key_range(), node);
        Ok(array.iter().map(item).collect())
    }
}

/// Reads `text`, which stands at `range` with or without quotes, as a quantity in SI units.
fn quantity_at(
    source: Source<'_>,
    text: &str,
    range: Range<usize>,
    dimension: Dimension,
    limits: RangeInclusive<f64>,
) -> Result<f64, Diagnostic> {
    let value = quantity::parse(text, dimension).map_err(|error| {
        let part = part_of(source.text, text, range.clone(), error.range);
        source.fault(part, error.message, error.help)
    })?;
    if limits.contains(&value) {
        return Ok(value);
    }
    let fault = match value {
        0.0 => "zero",
        ..0.0 if *limits.start() >= 0.0 => "negative",
        _ => "out of range",
    };
    let (low, high) = (
        dimension.write(*limits.start()),
        dimension.write(*limits.end()),
    );
    let message = format!("{text:?} is {fault}");
    Err(source.fault(
        range,
        message,
        format!("write {dimension} from {low} to {high}"),
    ))
}

/// Where `part` of the string `text`, written in `file` at `whole`, stands in the file. A string
/// with escapes is marked as a whole, and so is one of which no part is better than the other.
fn part_of(file: &str, text: &str, whole: Range<usize>, part: Range<usize>) -> Range<usize> {
    let written = file.get(whole.clone()).unwrap_or_default();
    let quoted = written.get(1..written.len().saturating_sub(1));
    if part.len() == text.len() || quoted != Some(text) {
        return whole;
    }
    let start = whole.start + 1;
    start + part.start..start + part.end
}

/// The value of an integer of any size; `None` where it is beyond all use.
fn float_of(integer: &DeInteger<'_>) -> Option<f64> {
    let exact = i128::from_str_radix(integer.as_str(), integer.radix()).ok()?;
    Some(exact as f64)
}

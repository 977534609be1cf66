//! A TOML table of which every key is known.

use std::ops::Range;

use toml::Spanned;
use toml::de::{DeString, DeTable, DeValue};

use super::value::Value;
use crate::diagnostic::{Diagnostic, Source};

/// A key that a table may hold.
#[derive(Clone, Copy, Debug)]
pub(super) struct Key {
    /// How it is written.
    pub(super) name: &'static str,
    /// A right entry, in TOML.
    pub(super) example: &'static str,
}

impl Key {
    pub(super) const fn new(name: &'static str, example: &'static str) -> Self {
        Self { name, example }
    }
}

/// A table that holds no key but those it was opened with.
pub(super) struct Table<'a> {
    source: Source<'a>,
    /// What it is, for messages: "[band]", "a line".
    what: &'static str,
    /// Where it begins.
    range: Range<usize>,
    entries: &'a DeTable<'a>,
}

/// How unlike a known key an unknown one may be to pass as a typing error of it:
/// 1 is equal, 0 has nothing in common (normalised Damerau–Levenshtein distance).
const LIKENESS: f64 = 0.6;
/// Likeness of a key to its own beginning, at least.
const BEGINNING: f64 = 0.8;
/// A key less like the unknown one than the most alike by no more than this is offered, too.
const AS_LIKELY: f64 = 0.25;

impl<'a> Table<'a> {
    /// Fails at the first key, in the order of the text, that is not one of `keys`.
    pub(super) fn open(
        source: Source<'a>,
        what: &'static str,
        range: Range<usize>,
        entries: &'a DeTable<'a>,
        keys: &[Key],
    ) -> Result<Self, Diagnostic> {
        let unknown = in_order(entries)
            .into_iter()
            .find(|(key, _)| keys.iter().all(|known| known.name != key.get_ref()));
        if let Some((key, _)) = unknown {
            let name = key.get_ref();
            let message = format!("unknown key `{}` in {what}", name.escape_debug());
            let list: Vec<_> = keys.iter().map(|key| format!("`{}`", key.name)).collect();
            let known = format!("{what} takes {}", list.join(", "));
            let help = match nearest(name, keys) {
                nearest if nearest.is_empty() => known,
                nearest => format!("did you mean {}? {known}", nearest.join(" or ")),
            };
            return Err(source.fault(key.span(), message, help));
        }
        Ok(Self {
            source,
            what,
            range,
            entries,
        })
    }

    /// The value of `key`, if it is there.
    pub(super) fn optional(&self, key: Key) -> Option<Value<'a>> {
        let (name, node) = self.entries.get_key_value(key.name)?;
        Some(Value::new(self.source, key, name.span(), node))
    }

    /// The value of `key`, or a fault at the head of the table.
    pub(super) fn required(&self, key: Key) -> Result<Value<'a>, Diagnostic> {
        self.optional(key).ok_or_else(|| {
            let message = format!("{} has no `{}`", self.what, key.name);
            self.fault(message, format!("add {}", key.example))
        })
    }

    /// The value of the only one of `keys` that is there, if any; a fault at the second of two.
    pub(super) fn at_most_one(&self, keys: &[Key]) -> Result<Option<Value<'a>>, Diagnostic> {
        let mut found: Vec<_> = keys.iter().filter_map(|&key| self.optional(key)).collect();
        found.sort_by_key(|value| value.key_range().start);
        if let [first, second, ..] = &found[..] {
            let (first, second_name) = (first.key().name, second.key().name);
            let message = format!("{} has both `{first}` and `{second_name}`", self.what);
            let help = format!("keep one of `{first}` and `{second_name}`");
            return Err(second.key_fault(message, help));
        }
        Ok(found.pop())
    }

    /// The value of the only one of `keys` that is there.
    pub(super) fn exactly_one(&self, keys: &[Key]) -> Result<Value<'a>, Diagnostic> {
        self.at_most_one(keys)?.ok_or_else(|| {
            let names: Vec<_> = keys.iter().map(|key| format!("`{}`", key.name)).collect();
            let example = keys.first().map_or("", |key| key.example);
            let message = format!("{} has none of {}", self.what, names.join(", "));
            self.fault(message, format!("add one of them, such as {example}"))
        })
    }

    /// A fault at the head of the table.
    pub(super) fn fault(&self, message: String, help: impl Into<String>) -> Diagnostic {
        self.source.fault(self.range.clone(), message, help)
    }
}

/// The entries of a table in the order of the text; the tree itself sorts them by key.
pub(super) fn in_order<'a>(
    entries: &'a DeTable<'a>,
) -> Vec<(&'a Spanned<DeString<'a>>, &'a Spanned<DeValue<'a>>)> {
    let mut entries: Vec<_> = entries.iter().collect();
    entries.sort_by_key(|(key, _)| key.span().start);
    entries
}

/// The keys, in backquotes, that `name` is likely a typing error or the beginning of.
fn nearest(name: &str, keys: &[Key]) -> Vec<String> {
    let name = name.to_lowercase().replace('-', "_");
    let likeness = |key: &Key| {
        let begins = name.len() >= 3 && key.name.starts_with(&name);
        let floor = if begins { BEGINNING } else { 0.0 };
        strsim::normalized_damerau_levenshtein(&name, key.name).max(floor)
    };
    let best = keys.iter().map(likeness).fold(LIKENESS, f64::max);
    keys.iter()
        .filter(|key| likeness(key) >= LIKENESS.max(best - AS_LIKELY))
        .map(|key| format!("`{}`", key.name))
        .collect()
}

//! TOML syntax, and what is said where it is broken.

use toml::Spanned;
use toml::de::DeTable;

use crate::diagnostic::{Diagnostic, Source};

/// The text as a tree of TOML values that know their places.
pub(super) fn document(source: Source<'_>) -> Result<Spanned<DeTable<'_>>, Diagnostic> {
    DeTable::parse(source.text).map_err(|error| {
        let message = format!("not valid TOML: {}", error.message());
        let help = help(error.message());
        match error.span() {
            Some(range) => source.fault(range, message, help),
            None => Diagnostic::of_file(source.file, message, help),
        }
    })
}

fn help(message: &str) -> &'static str {
    if message.contains("duplicate key") {
        "a table holds each key once, and a table other than [[stage]] stands once; remove one"
    } else {
        "an entry is `key = value`; text and quantities stand in double quotes, such as \"2 MHz\""
    }
}

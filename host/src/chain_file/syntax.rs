//! TOML syntax, and what is said where it is broken.

use toml::Spanned;
use toml::de::DeTable;

use crate::diagnostic::{Diagnostic, Source};

/// The text as a tree of TOML values that know their places.
pub(super) fn document(source: Source<'_>) -> Result<Spanned<DeTable<'_>>, Diagnostic> {
    DeTable::parse(source.text).map_err(|error| {
        let range = error.span();
        let spot = range.clone().and_then(|range| source.text.get(range));
        let (message, help) = explain(error.message(), spot.unwrap_or_default());
        match range {
            Some(range) => source.fault(range, message, help),
            None => Diagnostic::of_file(source.file, message, help),
        }
    })
}

/// The parser's `message` on the text `spot`, with advice where the slip is a common one. A
/// wording of the parser that is not known here gets the general advice.
fn explain(message: &str, spot: &str) -> (String, String) {
    let (what, expected) = message.split_once(", expected ").unwrap_or((message, ""));
    if what == "duplicate key" {
        let help = "a table holds each key once, and only [[stage]] may stand several times";
        return (format!("{what} `{}`", spot.escape_debug()), help.to_owned());
    }
    if what == "string values must be quoted" {
        return match spot.trim() {
            "" => (
                "no value".to_owned(),
                "write a value behind the `=`".to_owned(),
            ),
            spot => {
                let spot = spot.escape_debug();
                (
                    format!("`{spot}` is not a number"),
                    format!("text and quantities stand in double quotes: \"{spot}\""),
                )
            }
        };
    }
    if expected == "nothing" {
        let help = "write a number such as 41, 0.66 or 1e-4, or text in double quotes";
        return (format!("not valid TOML: {what}"), help.to_owned());
    }
    let help = "an entry is `key = value`, a table starts with [name], a stage with [[stage]]; \
                text and quantities stand in double quotes, such as \"2 MHz\"";
    (format!("not valid TOML: {message}"), help.to_owned())
}

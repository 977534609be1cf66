//! The keywords of version 2.0 files: `[Number of Ports] 2`.

use std::ops::Range;

use super::line::{Line, Token};
use super::number::shown;
use crate::diagnostic::{Diagnostic, Source};

/// What stands in brackets.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Keyword {
    Version,
    NumberOfPorts,
    TwoPortDataOrder,
    NumberOfFrequencies,
    NumberOfNoiseFrequencies,
    Reference,
    MatrixFormat,
    MixedModeOrder,
    BeginInformation,
    EndInformation,
    NetworkData,
    NoiseData,
    End,
}

/// All keywords with their names, which may be written in any case.
const NAMES: [(&str, Keyword); 13] = [
    ("Version", Keyword::Version),
    ("Number of Ports", Keyword::NumberOfPorts),
    ("Two-Port Data Order", Keyword::TwoPortDataOrder),
    ("Number of Frequencies", Keyword::NumberOfFrequencies),
    (
        "Number of Noise Frequencies",
        Keyword::NumberOfNoiseFrequencies,
    ),
    ("Reference", Keyword::Reference),
    ("Matrix Format", Keyword::MatrixFormat),
    ("Mixed-Mode Order", Keyword::MixedModeOrder),
    ("Begin Information", Keyword::BeginInformation),
    ("End Information", Keyword::EndInformation),
    ("Network Data", Keyword::NetworkData),
    ("Noise Data", Keyword::NoiseData),
    ("End", Keyword::End),
];

impl Keyword {
    /// How the standard writes it, without brackets.
    pub(super) fn name(self) -> &'static str {
        let known = NAMES.iter().find(|(_, keyword)| *keyword == self);
        known.map_or("", |(name, _)| name)
    }
}

/// A line with a keyword.
#[derive(Clone, Debug)]
pub(super) struct Entry<'a> {
    pub(super) keyword: Keyword,
    /// Where keyword and brackets stand.
    pub(super) range: Range<usize>,
    /// The words behind it.
    pub(super) arguments: Vec<Token<'a>>,
}

impl<'a> Entry<'a> {
    /// Reads a line that begins with a bracket.
    pub(super) fn parse(source: Source<'a>, line: &Line<'a>) -> Result<Self, Diagnostic> {
        let text = line.text();
        let open = text.find('[').unwrap_or(0);
        let Some(close) = text.find(']') else {
            let message = "a keyword without its closing bracket";
            let help = "close the keyword, as in [Network Data]";
            return Err(source.fault(line.range(), message, help));
        };
        let range = line.place(open..close + 1);
        let words: Vec<_> = text[open + 1..close].split_ascii_whitespace().collect();
        let name = words.join(" ");
        let known = NAMES
            .iter()
            .find(|(known, _)| known.eq_ignore_ascii_case(&name));
        let Some(&(_, keyword)) = known else {
            let message = format!("unknown keyword {}", shown(&name));
            let list: Vec<_> = NAMES.iter().map(|(name, _)| format!("[{name}]")).collect();
            let help = format!("version 2.0 knows {}", list.join(", "));
            return Err(source.fault(range, message, help));
        };
        Ok(Self {
            keyword,
            range,
            arguments: line.tokens_after(close + 1).collect(),
        })
    }

    /// The one word behind the keyword; `example` is a right one.
    pub(super) fn argument(
        &self,
        source: Source<'_>,
        example: &str,
    ) -> Result<&Token<'a>, Diagnostic> {
        match &self.arguments[..] {
            [only] => Ok(only),
            [] => Err(self.fault(
                source,
                format!("[{}] without a value", self.keyword.name()),
                format!("write [{}] {example}", self.keyword.name()),
            )),
            [_, second, ..] => Err(source.fault(
                second.range.clone(),
                format!("a second value of [{}]", self.keyword.name()),
                format!("write [{}] {example}", self.keyword.name()),
            )),
        }
    }

    /// One of a few words behind the keyword, in any case.
    pub(super) fn word<T: Copy>(
        &self,
        source: Source<'_>,
        words: &[(&str, T)],
    ) -> Result<T, Diagnostic> {
        let list: Vec<_> = words.iter().map(|(word, _)| *word).collect();
        let list = list.join(" or ");
        let argument = self.argument(source, &list)?;
        let known = words
            .iter()
            .find(|(word, _)| word.eq_ignore_ascii_case(argument.text));
        known.map(|&(_, meaning)| meaning).ok_or_else(|| {
            let message = format!("[{}] is {}", self.keyword.name(), shown(argument.text));
            source.fault(argument.range.clone(), message, format!("write {list}"))
        })
    }

    /// Expects nothing behind the keyword.
    pub(super) fn alone(&self, source: Source<'_>) -> Result<(), Diagnostic> {
        match self.arguments.first() {
            None => Ok(()),
            Some(surplus) => Err(source.fault(
                surplus.range.clone(),
                format!("[{}] takes no value", self.keyword.name()),
                "begin what follows on a line of its own",
            )),
        }
    }

    /// A fault at the keyword.
    pub(super) fn fault(
        &self,
        source: Source<'_>,
        message: String,
        help: impl Into<String>,
    ) -> Diagnostic {
        source.fault(self.range.clone(), message, help)
    }
}

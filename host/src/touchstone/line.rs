//! Lines of a Touchstone file without their comments, and the words on them.

use std::ops::Range;

use crate::diagnostic::{Diagnostic, Source};

/// A line up to its comment.
#[derive(Clone, Debug)]
pub(super) struct Line<'a> {
    /// Where it begins in the text.
    start: usize,
    text: &'a str,
}

/// What a line holds.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Kind {
    /// `# MHz S MA R 50`
    Options,
    /// `[Network Data]`
    Keyword,
    /// Anything else: numbers, if it is right.
    Data,
}

/// A word with its place.
#[derive(Clone, Debug)]
pub(super) struct Token<'a> {
    pub(super) text: &'a str,
    pub(super) range: Range<usize>,
}

impl<'a> Line<'a> {
    pub(super) fn kind(&self) -> Kind {
        match self.text.trim_ascii_start().as_bytes().first() {
            Some(b'#') => Kind::Options,
            Some(b'[') => Kind::Keyword,
            _ => Kind::Data,
        }
    }

    /// The words of the line.
    pub(super) fn tokens(&self) -> impl Iterator<Item = Token<'a>> + use<'a> {
        self.tokens_after(0)
    }

    /// The words behind the first `skipped` bytes of the line.
    pub(super) fn tokens_after(&self, skipped: usize) -> impl Iterator<Item = Token<'a>> + use<'a> {
        let Self { start, text } = *self;
        text[skipped..].split_ascii_whitespace().map(move |word| {
            // A word is a part of the text, so its place is the distance of their addresses.
            let at = start + (word.as_ptr().addr() - text.as_ptr().addr());
            Token {
                text: word,
                range: at..at + word.len(),
            }
        })
    }

    /// Where the line stands, without blanks at its ends.
    pub(super) fn range(&self) -> Range<usize> {
        let start = self.start + self.text.len() - self.text.trim_ascii_start().len();
        start..self.start + self.text.trim_ascii_end().len()
    }

    /// The line as it is written, with the blanks at its ends.
    pub(super) fn text(&self) -> &'a str {
        self.text
    }

    /// The place of the bytes `range` of this line in the file.
    pub(super) fn place(&self, range: Range<usize>) -> Range<usize> {
        self.start + range.start..self.start + range.end
    }
}

/// The lines not read yet.
#[derive(Clone, Debug)]
pub(super) struct Lines<'a> {
    pub(super) source: Source<'a>,
    next: usize,
}

impl<'a> Lines<'a> {
    pub(super) fn new(source: Source<'a>) -> Self {
        Self { source, next: 0 }
    }

    /// The next line, whatever it holds.
    pub(super) fn any(&mut self) -> Option<Line<'a>> {
        let start = self.next;
        let rest = &self.source.text[start..];
        if rest.is_empty() {
            return None;
        }
        let line = rest.split_inclusive('\n').next().unwrap_or(rest);
        self.next += line.len();
        let text = line.split(['!', '\n']).next().unwrap_or(line);
        Some(Line { start, text })
    }

    /// The next line that holds more than blanks and a comment; `None` at the end of the text.
    ///
    /// # Errors
    /// Where the line is not in ASCII.
    pub(super) fn significant(&mut self) -> Result<Option<Line<'a>>, Diagnostic> {
        while let Some(line) = self.any() {
            if let Some((at, c)) = line.text.char_indices().find(|(_, c)| !c.is_ascii()) {
                let message = format!("{c:?} is not an ASCII character");
                let help = "save the file as plain ASCII text; any other character has to stand \
                            in a comment, behind `!`";
                let place = line.place(at..at + c.len_utf8());
                return Err(self.source.fault(place, message, help));
            }
            if !line.text.trim_ascii().is_empty() {
                return Ok(Some(line));
            }
        }
        Ok(None)
    }

    /// A fault at the end of the text.
    pub(super) fn fault_at_end(&self, message: &str, help: &str) -> Diagnostic {
        let end = self.source.text.len();
        self.source.fault(end..end, message, help)
    }
}

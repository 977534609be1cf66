//! What is wrong with an input file, where, and what would be right.

use std::fmt;
use std::ops::Range;

/// A text together with the name it was read under, so that a byte range can be shown to its author.
#[derive(Clone, Copy, Debug)]
pub struct Source<'a> {
    /// Name of the file as the user gave it.
    pub file: &'a str,
    /// Its text, without a byte order mark.
    pub text: &'a str,
}

/// One fault of an input file.
///
/// `Display` prints `file:line:column: message`, the line with a mark under the spot, and
/// `help: what would be right`, without a newline at the end:
///
/// ```text
/// buoy.toml:14:25: "5 ohm" is a resistance; a capacitance is wanted
///    14 | shunt = { capacitance = "5 ohm" }
///       |                         ^^^^^^^
/// help: write a capacitance, such as "100 pF"
/// ```
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Diagnostic {
    /// Name of the file as the user gave it.
    pub file: String,
    /// Where the fault is; `None` where the file as a whole is at fault.
    pub spot: Option<Spot>,
    /// What is wrong.
    pub message: String,
    /// What would be right.
    pub help: String,
}

/// A stretch of one line.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Spot {
    /// Line, from 1.
    pub line: u32,
    /// Column of the first character, from 1, counted in characters (Unicode scalar values).
    pub column: u32,
    /// Number of characters, at least 1; a range over several lines is cut at the end of its first.
    pub width: u32,
    /// The whole line without its line end.
    pub text: String,
}

impl Source<'_> {
    /// A fault at the bytes `range` of the text.
    pub fn fault(
        &self,
        range: Range<usize>,
        message: impl Into<String>,
        help: impl Into<String>,
    ) -> Diagnostic {
        Diagnostic {
            file: self.file.to_owned(),
            spot: Some(Spot::locate(self.text, range)),
            message: message.into(),
            help: help.into(),
        }
    }
}

impl Diagnostic {
    /// A fault of the file as a whole.
    pub fn of_file(file: &str, message: impl Into<String>, help: impl Into<String>) -> Self {
        Self {
            file: file.to_owned(),
            spot: None,
            message: message.into(),
            help: help.into(),
        }
    }
}

impl Spot {
    /// The place of the bytes `range` in `text`; offsets past the end or inside a character are
    /// moved back to the nearest one that is a character boundary.
    fn locate(text: &str, range: Range<usize>) -> Self {
        let start = boundary(text, range.start);
        let end = boundary(text, range.end);
        let line_start = text[..start].rfind('\n').map_or(0, |newline| newline + 1);
        let rest = &text[line_start..];
        // A carriage return ends a line together with the newline behind it, and only so.
        let line = rest
            .split_once('\n')
            .map_or(rest, |(line, _)| line.strip_suffix('\r').unwrap_or(line));
        // Between a carriage return and its newline there is no column.
        let line_end = line_start + line.len();
        let start = start.min(line_end);
        let end = end.clamp(start, line_end);
        Self {
            line: count(text[..line_start].matches('\n').count() + 1),
            column: count(text[line_start..start].chars().count() + 1),
            width: count(text[start..end].chars().count().max(1)),
            text: line.to_owned(),
        }
    }
}

fn boundary(text: &str, offset: usize) -> usize {
    let mut offset = offset.min(text.len());
    while !text.is_char_boundary(offset) {
        offset -= 1;
    }
    offset
}

/// Lines and columns beyond four thousand million are of no use to anybody.
fn count(number: usize) -> u32 {
    u32::try_from(number).unwrap_or(u32::MAX)
}

impl fmt::Display for Diagnostic {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(&self.file)?;
        if let Some(spot) = &self.spot {
            let Spot { line, column, .. } = spot;
            write!(f, ":{line}:{column}: {}\n{spot}", self.message)?;
        } else {
            write!(f, ": {}", self.message)?;
        }
        write!(f, "\nhelp: {}", self.help)
    }
}

impl fmt::Display for Spot {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        // A control character must not reach the terminal; a tab keeps its width on both lines.
        let shown = |c: char| match c {
            '\t' => '\t',
            c if c.is_control() => char::REPLACEMENT_CHARACTER,
            c => c,
        };
        let text: String = self.text.chars().map(shown).collect();
        let indent: String = self
            .text
            .chars()
            .map(|c| if c == '\t' { '\t' } else { ' ' })
            .chain(std::iter::repeat(' '))
            .take(self.column as usize - 1)
            .collect();
        let mark = "^".repeat(self.width as usize);
        write!(f, "{:5} | {text}\n{:5} | {indent}{mark}", self.line, "")
    }
}

impl std::error::Error for Diagnostic {}

#[cfg(test)]
mod tests {
    use super::*;

    fn spot(text: &str, start: usize, end: usize) -> (u32, u32, u32, String) {
        let spot = Spot::locate(text, start..end);
        (spot.line, spot.column, spot.width, spot.text)
    }

    #[test]
    fn columns_count_characters() {
        // "µ" takes two bytes, "日" three.
        assert_eq!(spot("µ日x", 5, 6), (1, 3, 1, "µ日x".into()));
    }

    #[test]
    fn offset_inside_a_character_moves_to_its_start() {
        assert_eq!(spot("日x", 2, 4), (1, 1, 2, "日x".into()));
    }

    #[test]
    fn line_ends_are_not_part_of_the_line() {
        assert_eq!(spot("a\r\nbc\r\nd", 4, 8), (2, 2, 1, "bc".into()));
        assert_eq!(spot("a\r\nbc", 2, 3), (1, 2, 1, "a".into()));
    }

    #[test]
    fn carriage_return_without_newline_is_part_of_the_line() {
        assert_eq!(spot("a\r\r\nb", 1, 3), (1, 2, 1, "a\r".into()));
        assert_eq!(spot("a\rb\r", 3, 4), (1, 4, 1, "a\rb\r".into()));
    }

    #[test]
    fn end_of_text_is_a_spot() {
        assert_eq!(spot("", 0, 0), (1, 1, 1, String::new()));
        assert_eq!(spot("a\n", 2, 2), (2, 1, 1, String::new()));
        assert_eq!(spot("a", 9, 12), (1, 2, 1, "a".into()));
    }

    #[test]
    fn mark_stands_under_the_spot_behind_a_tab() {
        let source = Source {
            file: "x.toml",
            text: "one\n\tkey = 1\n",
        };
        assert_eq!(
            source.fault(5..8, "wrong", "right").to_string(),
            "x.toml:2:2: wrong\n    2 | \tkey = 1\n      | \t^^^\nhelp: right"
        );
    }

    #[test]
    fn control_characters_are_not_passed_on() {
        let source = Source {
            file: "x.toml",
            text: "\u{1b}[2Jx",
        };
        let shown = source.fault(4..5, "wrong", "right").to_string();
        assert!(!shown.contains('\u{1b}'));
        assert!(shown.contains("\u{fffd}[2Jx\n      |     ^\n"));
    }

    #[test]
    fn a_file_as_a_whole_has_no_spot() {
        assert_eq!(
            Diagnostic::of_file("x.toml", "wrong", "right").to_string(),
            "x.toml: wrong\nhelp: right"
        );
    }
}

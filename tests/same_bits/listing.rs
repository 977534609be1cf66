//! The desktop's words in the order in which a core prints them, and the comparison.

use std::fmt;

use stagebits_kernel::Gamma;

use super::cases::Image;
use crate::words::{Name, Subject, evaluate};

/// Where a line of words belongs.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(crate) struct Place {
    /// Name of the chain.
    pub(crate) chain: String,
    /// Word length.
    pub(crate) word_bits: u32,
    /// Frequency in hertz.
    pub(crate) hertz: u32,
    /// What the line is about.
    pub(crate) subject: Subject,
    /// Number of points of this chain and word length before the line.
    pub(crate) point: usize,
}

impl fmt::Display for Place {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "{}, {} bits", self.chain, self.word_bits)?;
        match self.subject {
            Subject::Frequency => write!(f, ", {} Hz", self.hertz),
            Subject::Step(number) => write!(f, ", {} Hz, stage {}", self.hertz, number + 1),
            Subject::Chain => write!(f, ", {} Hz, whatever the load", self.hertz),
            Subject::Point(Gamma { re, im }) => {
                let (point, hertz) = (self.point, self.hertz);
                write!(f, ", point {point}, {hertz} Hz, load {re} {im:+}j in 2^-30")
            }
        }
    }
}

/// A line of the desktop's words.
pub(crate) struct Line {
    /// Where it belongs.
    pub(crate) place: Place,
    /// What the words are.
    pub(crate) names: Vec<Name>,
    /// The words.
    pub(crate) words: Vec<u32>,
}

impl Line {
    /// The signed word of this name.
    pub(crate) fn word(&self, name: &str) -> i32 {
        let is_it = |it: &Name| it.to_string() == name;
        let index = self.names.iter().position(is_it);
        self.words[index.unwrap_or_else(|| panic!("{name}: no word of this line"))].cast_signed()
    }
}

/// The words of these images, evaluated here.
pub(crate) fn listing(images: &[Image]) -> Vec<Line> {
    let mut lines = Vec::new();
    for image in images {
        let mut point = 0;
        let evaluated = evaluate(&image.bytes, image.band, |hertz, subject, record| {
            lines.push(Line {
                place: Place {
                    chain: image.name.clone(),
                    word_bits: image.word_bits,
                    hertz,
                    subject,
                    point,
                },
                names: record.names().to_vec(),
                words: record.words().to_vec(),
            });
            point += usize::from(matches!(subject, Subject::Point(_)));
        });
        evaluated.unwrap_or_else(|error| panic!("{}: {error}", image.name));
    }
    lines
}

/// How much was compared.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub(crate) struct Extent {
    /// Points: a chain with a word length, a frequency and a load.
    pub(crate) points: usize,
    /// Words of all lines.
    pub(crate) words: usize,
}

/// The first difference between what a core printed and the desktop's words.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(crate) enum Difference {
    /// A word.
    Word {
        /// Where.
        place: Place,
        /// What the word is.
        name: Name,
        /// The desktop's.
        here: u32,
        /// The core's.
        there: u32,
    },
    /// A line that is missing or holds other than as many words.
    Line {
        /// Where.
        place: Place,
        /// What is there.
        found: Option<String>,
    },
    /// More than the desktop has.
    Surplus(String),
}

impl fmt::Display for Difference {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::Word {
                place,
                name,
                here,
                there,
            } => write!(
                f,
                "{place}: {name}: {there:08x} on the core, {here:08x} on the desktop"
            ),
            Self::Line { place, found: None } => write!(f, "{place}: the core printed no more"),
            Self::Line {
                place,
                found: Some(found),
            } => write!(f, "{place}: no such line of words: {found:?}"),
            Self::Surplus(line) => write!(f, "the core printed more: {line:?}"),
        }
    }
}

/// Compares every word that a core printed with the desktop's.
///
/// # Errors
/// The first [`Difference`].
pub(crate) fn compare(desktop: &[Line], printed: &str) -> Result<Extent, Box<Difference>> {
    let mut extent = Extent::default();
    let mut printed = printed.lines();
    for Line {
        place,
        names,
        words,
    } in desktop
    {
        let line = printed.next();
        let other_line = || Difference::Line {
            place: place.clone(),
            found: line.map(str::to_owned),
        };
        let there = line.and_then(parse).ok_or_else(other_line)?;
        if there.len() != words.len() {
            return Err(other_line().into());
        }
        for ((&here, there), name) in words.iter().zip(there).zip(names) {
            if here != there {
                let place = place.clone();
                return Err(Difference::Word {
                    place,
                    name: *name,
                    here,
                    there,
                }
                .into());
            }
        }
        extent.points += usize::from(matches!(place.subject, Subject::Point(_)));
        extent.words += words.len();
    }
    match printed.next() {
        None => Ok(extent),
        Some(line) => Err(Difference::Surplus(line.to_owned()).into()),
    }
}

/// Words in hexadecimal, or `None` if the line is anything else.
fn parse(line: &str) -> Option<Vec<u32>> {
    line.split(' ')
        .map(|word| u32::from_str_radix(word, 16).ok())
        .collect()
}

//! A line of words, each with its name.

use core::fmt;

use stagebits_kernel::{Complex, Gamma, Immittance, Scalar, Word};

/// Most words of a line.
const ROOM: usize = 64;

/// What a word is: a quantity, and which part of it.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct Name {
    quantity: &'static str,
    part: &'static str,
}

impl fmt::Display for Name {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        let Self { quantity, part } = self;
        let comma = if part.is_empty() { "" } else { ", " };
        write!(f, "{quantity}{comma}{part}")
    }
}

/// The words of a line.
pub struct Record {
    names: [Name; ROOM],
    words: [u32; ROOM],
    length: usize,
}

impl Record {
    pub(super) fn new() -> Self {
        Self {
            names: [Name::default(); ROOM],
            words: [0; ROOM],
            length: 0,
        }
    }

    /// The words.
    pub fn words(&self) -> &[u32] {
        self.words.get(..self.length).unwrap_or_default()
    }

    /// The name of each word.
    pub fn names(&self) -> &[Name] {
        self.names.get(..self.length).unwrap_or_default()
    }

    fn put(&mut self, quantity: &'static str, part: &'static str, word: u32) {
        debug_assert!(self.length < ROOM, "no room for {quantity}");
        let places = self
            .names
            .get_mut(self.length)
            .zip(self.words.get_mut(self.length));
        if let Some((name, place)) = places {
            *name = Name { quantity, part };
            *place = word;
            self.length += 1;
        }
    }

    pub(super) fn word(&mut self, quantity: &'static str, word: u32) {
        self.put(quantity, "", word);
    }

    pub(super) fn signed(&mut self, quantity: &'static str, word: i32) {
        self.put(quantity, "", word.cast_unsigned());
    }

    pub(super) fn pair(&mut self, quantity: &'static str, [re, im]: [i32; 2]) {
        self.put(quantity, "re", re.cast_unsigned());
        self.put(quantity, "im", im.cast_unsigned());
    }

    pub(super) fn gamma(&mut self, quantity: &'static str, Gamma { re, im }: Gamma) {
        self.pair(quantity, [re, im]);
    }

    pub(super) fn immittance<W: Word>(&mut self, quantity: &'static str, z: &Immittance<W>) {
        self.pair(quantity, z.words());
        self.put(quantity, "exponent", z.exponent().cast_unsigned());
    }

    pub(super) fn scalar(&mut self, quantity: &'static str, scalar: Scalar) {
        self.put(quantity, "mantissa", scalar.mantissa().cast_unsigned());
        self.put(quantity, "exponent", scalar.exponent().cast_unsigned());
    }

    pub(super) fn complex(&mut self, quantity: &'static str, Complex { re, im }: Complex<Scalar>) {
        self.put(quantity, "mantissa of re", re.mantissa().cast_unsigned());
        self.put(quantity, "exponent of re", re.exponent().cast_unsigned());
        self.put(quantity, "mantissa of im", im.mantissa().cast_unsigned());
        self.put(quantity, "exponent of im", im.exponent().cast_unsigned());
    }
}

//! How the types appear in a log, where derived text would hide what they mean.
//!
//! Numbers go out as the words they are, so that a log shows the very bits.

use defmt::{Format, Formatter, write};

use crate::{Bits, Decibels, Frequency, Immittance, Real, Scalar, State, Swr, Word};

/// As `mantissa·2^exponent`.
impl Format for Scalar {
    fn format(&self, f: Formatter<'_>) {
        write!(f, "{=i32}·2^{=i32}", self.mantissa(), self.exponent());
    }
}

/// As `(re, im)·2^exponent`, both parts words.
impl<W: Word> Format for Immittance<W> {
    fn format(&self, f: Formatter<'_>) {
        let [re, im] = self.words();
        write!(f, "({=i32}, {=i32})·2^{=i32}", re, im, self.exponent());
    }
}

/// As `v = (re, im), i = (re, im), ·2^exponent`, the parts of v and i words.
impl<W: Word> Format for State<W> {
    fn format(&self, f: Formatter<'_>) {
        let ([v_re, v_im], [i_re, i_im], exponent) = self.words();
        write!(
            f,
            "v = ({=i32}, {=i32}), i = ({=i32}, {=i32}), ·2^{=i32}",
            v_re, v_im, i_re, i_im, exponent
        );
    }
}

/// As its word.
impl<const W: u32> Format for Bits<W> {
    fn format(&self, f: Formatter<'_>) {
        write!(f, "{=i32}", self.to_i32());
    }
}

/// As the whole hertz, which give the rest.
impl<R: Real> Format for Frequency<R> {
    fn format(&self, f: Formatter<'_>) {
        write!(f, "{=u32} Hz", self.hertz());
    }
}

/// As `bits·2^-16`.
impl Format for Swr {
    fn format(&self, f: Formatter<'_>) {
        write!(f, "{=u32}·2^-16", self.bits());
    }
}

/// As `bits·2^-16 dB`.
impl Format for Decibels {
    fn format(&self, f: Formatter<'_>) {
        write!(f, "{=i32}·2^-16 dB", self.bits());
    }
}

//! How the types appear in a log, where derived text would hide what they mean.
//!
//! Numbers go out as the words they are, so that a log shows the very bits.

use defmt::{Format, Formatter, write};

use crate::{
    Bits, Decibels, Frequency, Immittance, Real, Resolved, Scalar, State, Step, StepForm, Swr,
    TwoPortWords, Word,
};

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

/// As `a = (re, im), b = (re, im), c = (re, im), d = (re, im), ·2^exponent`, all parts words.
impl<W: Word> Format for TwoPortWords<W> {
    fn format(&self, f: Formatter<'_>) {
        let [a, b, c, d] = self.words();
        write!(
            f,
            "a = ({=i32}, {=i32}), b = ({=i32}, {=i32}), c = ({=i32}, {=i32}), d = ({=i32}, {=i32}), ·2^{=i32}",
            a[0],
            a[1],
            b[0],
            b[1],
            c[0],
            c[1],
            d[0],
            d[1],
            self.exponent()
        );
    }
}

/// As derived; a derive would not know that both kinds of entries have a format.
impl<Z: StepForm<TwoPort: Format> + Format> Format for Step<Z> {
    fn format(&self, f: Formatter<'_>) {
        match self {
            Self::Series(z) => write!(f, "Series({})", z),
            Self::Shunt(y) => write!(f, "Shunt({})", y),
            Self::Tee { series, shunt } => {
                write!(f, "Tee {{ series: {}, shunt: {} }}", series, shunt)
            }
            Self::Stretch { ratio, inverse } => {
                write!(f, "Stretch {{ ratio: {}, inverse: {} }}", ratio, inverse)
            }
            Self::TwoPort(two_port) => write!(f, "TwoPort({})", two_port),
        }
    }
}

/// As derived.
impl<Z: StepForm<TwoPort: Format> + Format, const N: usize> Format for Resolved<Z, N> {
    fn format(&self, f: Formatter<'_>) {
        let (steps, inverted) = (self.steps(), self.inverted());
        write!(
            f,
            "Resolved {{ steps: {=[?]}, inverted: {=bool} }}",
            steps, inverted
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

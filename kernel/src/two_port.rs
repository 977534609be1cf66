//! Two-ports that are neither a branch nor a row of them: four complex numbers at one frequency.

use crate::immittance::{Packed, pack};
use crate::real::{Complex, Real};
use crate::scalar::Scalar;
use crate::word::Word;

/// A chain matrix normalised to R0: v ← a·v + b·i, i ← c·v + d·i.
///
/// Any common factor of the four is without effect on a ratio of v and i.
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct TwoPort<R> {
    /// v per v.
    pub a: Complex<R>,
    /// v per i.
    pub b: Complex<R>,
    /// i per v.
    pub c: Complex<R>,
    /// i per i.
    pub d: Complex<R>,
}

#[cfg_attr(
    not(feature = "float"),
    expect(dead_code, reason = "only floating point walks unrounded two-ports")
)]
impl<R: Real> TwoPort<R> {
    /// The inverse but for a factor, 1 for a reciprocal two-port: d, −b, −c, a.
    pub(crate) fn adjugate(&self) -> Self {
        let negated = |z: Complex<R>| Complex {
            re: z.re.negated(),
            im: z.im.negated(),
        };
        Self {
            a: self.d,
            b: negated(self.b),
            c: negated(self.c),
            d: self.a,
        }
    }

    /// The same with its ends exchanged, but for a factor: d, b, c, a.
    pub(crate) fn turned(&self) -> Self {
        Self {
            a: self.d,
            d: self.a,
            ..*self
        }
    }
}

/// A [`TwoPort`] in words of a common exponent: word · 2^(exponent − W).
///
/// The largest word m obeys 2^(W−3) ≤ |m| < 2^(W−2), unless all entries are below 1/8. An entry
/// has the absolute error of the largest one.
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
pub struct TwoPortWords<W> {
    pub(crate) a: [W; 2],
    pub(crate) b: [W; 2],
    pub(crate) c: [W; 2],
    pub(crate) d: [W; 2],
    /// Exponent + 1, times eight; see [`crate::Immittance`].
    up: u8,
    /// Whether a and d are real and b and c imaginary, as of all that is symmetric in time.
    lossless: bool,
}

impl<W: Word> TwoPortWords<W> {
    /// Rounds all parts to words of a common exponent of at least 0.
    #[inline]
    pub(crate) fn from_scalars(two_port: &TwoPort<Scalar>) -> Self {
        let TwoPort { a, b, c, d } = two_port;
        let lossless = [a.im, b.re, c.re, d.im].iter().all(|part| part.is_zero());
        let Packed { words, exponent } =
            pack::<W, 8>([a.re, a.im, b.re, b.im, c.re, c.im, d.re, d.im], 0);
        let [a, a_im, b, b_im, c, c_im, d, d_im] = words.map(W::from_i32);
        Self {
            a: [a, a_im],
            b: [b, b_im],
            c: [c, c_im],
            d: [d, d_im],
            up: (exponent + 1) as u8 * 8,
            lossless,
        }
    }

    /// The words of a, b, c and d, real and imaginary part of each.
    pub fn words(&self) -> [[i32; 2]; 4] {
        [self.a, self.b, self.c, self.d].map(|pair| pair.map(W::to_i32))
    }

    /// Power of two that the words are multiplied by.
    pub fn exponent(&self) -> i32 {
        self.up() as i32 - 1 - W::BITS as i32
    }

    /// Bits from the upper half of a sum of products to one below the last place of a state.
    #[inline(always)]
    pub(crate) fn up(&self) -> u32 {
        (self.up >> 3) as u32
    }

    #[inline(always)]
    pub(crate) fn is_lossless(&self) -> bool {
        self.lossless
    }

    /// See [`TwoPort::adjugate`].
    pub(crate) fn adjugate(&self) -> Self {
        let negated = |pair: [W; 2]| pair.map(|word| W::from_i32(-word.to_i32()));
        Self {
            a: self.d,
            b: negated(self.b),
            c: negated(self.c),
            d: self.a,
            ..*self
        }
    }

    /// See [`TwoPort::turned`].
    pub(crate) fn turned(&self) -> Self {
        Self {
            a: self.d,
            d: self.a,
            ..*self
        }
    }
}

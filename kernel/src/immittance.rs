//! Immittances: complex numbers of two words with a shared exponent.

use crate::real::Complex;
use crate::scalar::Scalar;
use crate::word::{Word, round_shift};

/// A normalised impedance or admittance: (re + j im) · 2^(exponent − W).
///
/// The larger part has its top bit at W − 2, so that 2^(exponent−2) ≤ max(|re|, |im|) <
/// 2^(exponent−1) in value, or all is zero. The exponent is at most [`Immittance::exponent_max`].
#[derive(Clone, Copy, PartialEq, Eq, Debug, Default)]
pub struct Immittance<W> {
    pub(crate) re: W,
    pub(crate) im: W,
    pub(crate) exponent: i8,
}

impl<W: Word> Immittance<W> {
    /// Largest exponent: W − 3. Greater immittances count as 2^(W−4) in their own direction, an
    /// open or short circuit to within what the word length can show: |ΔΓ| ≤ 2^(5−W).
    pub const fn exponent_max() -> i32 {
        W::BITS as i32 - 3
    }

    /// Smallest exponent; what lies below is zero to every state.
    const EXPONENT_MIN: i32 = -100;

    /// Rounds both parts to words of a common exponent.
    #[inline]
    pub(crate) fn from_scalars(z: Complex<Scalar>) -> Self {
        // value = m · 2^e with 2^30 ≤ |m| < 2^31, so that |value| < 2^(e+31) = 2^(exponent−1)
        let top = |s: Scalar| {
            if s.is_zero() {
                i32::MIN
            } else {
                s.exponent() + 32
            }
        };
        let exponent = top(z.re).max(top(z.im));
        if exponent < Self::EXPONENT_MIN {
            return Self::default();
        }
        // a saturated immittance keeps its direction
        let excess = (exponent - Self::exponent_max()).max(0);
        let exponent = exponent - excess;
        let part = |s: Scalar, exponent: i32| {
            let right = exponent - W::BITS as i32 - (s.exponent() - excess);
            round_shift(s.mantissa() as i64, right.unsigned_abs()) as i32
        };
        let (re, im) = (part(z.re, exponent), part(z.im, exponent));
        // rounding may carry into the sign bit
        let carried = |word: i32| word.unsigned_abs() > W::MANTISSA_MAX as u32;
        if carried(re) || carried(im) {
            if exponent < Self::exponent_max() {
                let exponent = exponent + 1;
                return Self::new(part(z.re, exponent), part(z.im, exponent), exponent);
            }
            let clamp = |word: i32| word.clamp(-W::MANTISSA_MAX, W::MANTISSA_MAX);
            return Self::new(clamp(re), clamp(im), exponent);
        }
        Self::new(re, im, exponent)
    }

    #[inline(always)]
    fn new(re: i32, im: i32, exponent: i32) -> Self {
        Self {
            re: W::from_i32(re),
            im: W::from_i32(im),
            exponent: exponent as i8,
        }
    }

    /// The two words, real part first.
    pub fn words(&self) -> [i32; 2] {
        [self.re.to_i32(), self.im.to_i32()]
    }

    /// Power of two that the words are multiplied by.
    pub fn exponent(&self) -> i32 {
        self.exponent as i32 - W::BITS as i32
    }

    /// The immittance with the other sign.
    pub(crate) fn negated(&self) -> Self {
        Self {
            re: W::from_i32(-self.re.to_i32()),
            im: W::from_i32(-self.im.to_i32()),
            exponent: self.exponent,
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::word::Bits;
    use proptest::prelude::*;

    fn value(s: Scalar) -> f64 {
        f64::from(s.mantissa()) * 2.0_f64.powi(s.exponent())
    }

    fn check<W: Word>(re: Scalar, im: Scalar) {
        let z = Immittance::<W>::from_scalars(Complex { re, im });
        let unit = 2.0_f64.powi(z.exponent());
        let largest = value(re).abs().max(value(im).abs());
        let [re_word, im_word] = z.words();
        assert!(re_word.abs() <= W::MANTISSA_MAX && im_word.abs() <= W::MANTISSA_MAX);
        let saturation = f64::from(W::MANTISSA_MAX) / 8.0;
        if largest < saturation {
            for (word, exact) in [(re_word, re), (im_word, im)] {
                let error = (f64::from(word) * unit - value(exact)).abs();
                assert!(error <= 0.5 * unit, "{word} for {exact:?}");
            }
            if largest > 2.0_f64.powi(-90) {
                let top = re_word.unsigned_abs().max(im_word.unsigned_abs());
                assert!(top >= 1 << (W::BITS - 2), "{z:?}");
            }
        } else {
            let modulus = f64::from(re_word).hypot(f64::from(im_word)) * unit;
            assert!(
                modulus >= saturation / 2.0 && modulus < saturation * 1.5,
                "{z:?}"
            );
        }
    }

    proptest! {
        #[test]
        fn parts_are_rounded_to_half_a_unit(
            re: i32, im: i32, a in -90..20, b in -90..20,
        ) {
            let (re, im) = (Scalar::from_i32(re, a), Scalar::from_i32(im, b));
            check::<i16>(re, im);
            check::<i32>(re, im);
            check::<Bits<10>>(re, im);
            check::<Bits<24>>(re, im);
        }
    }

    #[test]
    fn all_ones_carry_into_the_next_exponent() {
        let almost = Scalar::from_parts(i32::MAX, -31).unwrap();
        check::<i16>(almost, Scalar::ZERO);
        check::<i16>(almost.scaled(12), Scalar::ZERO);
        check::<i32>(almost, Scalar::HUGE);
        check::<i16>(Scalar::HUGE, Scalar::ZERO);
    }
}

//! Immittances: complex numbers of two words with a shared exponent.

use crate::real::Complex;
use crate::scalar::Scalar;
use crate::word::{Word, round_shift};

/// A normalised impedance or admittance: (re + j im) · 2^(exponent − W).
///
/// The larger part m obeys 2^(W−3) ≤ |m| < 2^(W−2), or both are zero: in value the larger part is
/// at least 2^(exponent−3) and less than 2^(exponent−2).
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
pub struct Immittance<W> {
    pub(crate) re: W,
    pub(crate) im: W,
    /// `up` and `down`, see there, each times eight.
    up: u8,
    down: u8,
}

impl<W: Word> Immittance<W> {
    /// Largest exponent: W − 2. Greater immittances count as 2^(W−4) in their own direction: an
    /// open or short circuit to within |ΔΓ| = 2^(5−W), unless what lies behind resonates with them.
    pub const EXPONENT_MAX: i32 = W::BITS as i32 - 2;

    /// Smallest exponent: what lies below adds nothing to a state of W − 1 bits.
    pub const EXPONENT_MIN: i32 = 3 - W::BITS as i32;

    /// Rounds both parts to words of a common exponent.
    #[inline]
    pub(crate) fn from_scalars(z: Complex<Scalar>) -> Self {
        let Packed {
            words: [re, im],
            exponent,
        } = pack::<W, 2>([z.re, z.im], Self::EXPONENT_MIN);
        Self::new(re, im, exponent)
    }

    #[inline(always)]
    fn new(re: i32, im: i32, exponent: i32) -> Self {
        // kept times eight: the compiler then knows that what it shifts by is below 32
        let (up, down) = ((exponent + 1).max(1) as u8, (-exponent).max(0) as u8);
        Self {
            re: W::from_i32(re),
            im: W::from_i32(im),
            up: up << 3,
            down: down << 3,
        }
    }

    /// Bits from a product's upper half to one below the last place of a state's word: the
    /// exponent + 1, at least 1.
    #[inline(always)]
    pub(crate) fn up(&self) -> u32 {
        (self.up >> 3) as u32
    }

    /// Bits by which a product is smaller than with exponent 0, at least 0.
    #[inline(always)]
    pub(crate) fn down(&self) -> u32 {
        (self.down >> 3) as u32
    }

    /// The exponent of the type's documentation.
    #[inline(always)]
    pub(crate) fn power(&self) -> i32 {
        self.up() as i32 - 1 - self.down() as i32
    }

    /// The two words, real part first.
    pub fn words(&self) -> [i32; 2] {
        [self.re.to_i32(), self.im.to_i32()]
    }

    /// Power of two that the words are multiplied by.
    pub fn exponent(&self) -> i32 {
        self.power() - W::BITS as i32
    }

    /// The immittance with the other sign.
    pub(crate) fn negated(&self) -> Self {
        Self {
            re: W::from_i32(-self.re.to_i32()),
            im: W::from_i32(-self.im.to_i32()),
            ..*self
        }
    }
}

/// Words with a common exponent: word · 2^(exponent − W).
pub(crate) struct Packed<const N: usize> {
    pub(crate) words: [i32; N],
    pub(crate) exponent: i32,
}

/// Rounds scalars to words below 2^(W−2) of the smallest common exponent from `least` to
/// [`Immittance::EXPONENT_MAX`]. Greater ones are scaled down together to what fits.
#[inline]
pub(crate) fn pack<W: Word, const N: usize>(parts: [Scalar; N], least: i32) -> Packed<N> {
    // |scalar| < 2^(its exponent + 31), and words take values below 2^(exponent − 2)
    let mut exponent = least;
    for part in parts {
        if !part.is_zero() {
            exponent = exponent.max(part.exponent() + 33);
        }
    }
    let most = Immittance::<W>::EXPONENT_MAX;
    let excess = (exponent - most).max(0);
    let round = |exponent: i32| {
        parts.map(|part| {
            let right = exponent + excess - W::BITS as i32 - part.exponent();
            // a zero's own exponent says nothing, and its mantissa is zero at any shift
            round_shift(part.mantissa() as i64, right.max(0) as u32) as i32
        })
    };
    exponent -= excess;
    let words = round(exponent);
    // rounding may carry into the next bit
    if words
        .iter()
        .all(|word| word.unsigned_abs() < W::LIMIT as u32)
    {
        return Packed { words, exponent };
    }
    if exponent < most {
        let exponent = exponent + 1;
        return Packed {
            words: round(exponent),
            exponent,
        };
    }
    let words = words.map(|word| word.clamp(1 - W::LIMIT, W::LIMIT - 1));
    Packed { words, exponent }
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
        assert!(re_word.abs() < W::LIMIT && im_word.abs() < W::LIMIT);
        let saturation = f64::from(W::LIMIT - 1) / 4.0;
        if largest < saturation {
            // what is too small for every state becomes zero
            let smallest = 2.0_f64.powi(Immittance::<W>::EXPONENT_MIN - 3);
            for (word, exact) in [(re_word, re), (im_word, im)] {
                let error = (f64::from(word) * unit - value(exact)).abs();
                assert!(
                    error <= 0.5 * unit || largest < smallest,
                    "{word} for {exact:?}"
                );
            }
            if largest >= 2.0_f64.powi(Immittance::<W>::EXPONENT_MIN - 2) {
                let top = re_word.unsigned_abs().max(im_word.unsigned_abs());
                assert!(top >= 1 << (W::BITS - 3), "{z:?}");
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
        check::<i16>(almost.scaled(11), Scalar::ZERO);
        check::<i32>(almost, Scalar::HUGE);
        check::<i16>(Scalar::HUGE, Scalar::ZERO);
    }
}

//! States: voltage and current of a wave on the chain, as one block of four words.

use crate::immittance::Immittance;
use crate::readout::Gamma;
use crate::two_port::TwoPortWords;
use crate::word::{DoubleWord, Word, round_shift};

/// Voltage v and current R0·i at one point of the chain: four words with a shared exponent.
///
/// Every word fits W − 1 bits: −2^(W−2) ≤ word < 2^(W−2). The exponent only grows on a walk, and it cancels in
/// every ratio of v and i.
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
pub struct State<W> {
    pub(crate) v: [W; 2],
    pub(crate) i: [W; 2],
    pub(crate) exponent: i32,
}

impl<W: Word> State<W> {
    /// The state v = 1 + Γ, i = 1 − Γ at a load with this reflection coefficient.
    ///
    /// No division: open and short circuits are loads like any other. Each word is rounded once,
    /// to 2^(2−W) of the block or better.
    #[inline]
    pub fn from_load(load: Gamma) -> Self {
        // −2 has no negative
        let re = load.re.max(-i32::MAX);
        let im = load.im.max(-i32::MAX);
        let words = |right: u32| {
            let one = 1 << (Gamma::FRACTION_BITS - right);
            let [re, im, minus_re, minus_im] =
                [re, im, -re, -im].map(|part| (part >> right) + (part >> (right - 1) & 1));
            [one + re, im, one + minus_re, minus_im]
        };
        let mut right = 33 - W::BITS;
        let mut state = words(right);
        if state.into_iter().fold(0, |top, word| top | magnitude(word)) >= W::LIMIT {
            right += 1;
            state = words(right);
        }
        let [v_re, v_im, i_re, i_im] = state.map(W::from_i32);
        Self {
            v: [v_re, v_im],
            i: [i_re, i_im],
            exponent: right as i32 - Gamma::FRACTION_BITS as i32,
        }
    }

    /// The words of v and i (real and imaginary part of each) and the power of two that they are
    /// multiplied by.
    pub fn words(&self) -> ([i32; 2], [i32; 2], i32) {
        (self.v.map(W::to_i32), self.i.map(W::to_i32), self.exponent)
    }

    /// Passes a series immittance towards the source: v ← v + z·i.
    #[inline]
    pub(crate) fn series(&mut self, z: &Immittance<W>) {
        let grown = shear(&mut self.v, &mut self.i, z);
        self.exponent += grown as i32;
    }

    /// Passes a shunt immittance towards the source: i ← i + y·v.
    #[inline]
    pub(crate) fn shunt(&mut self, y: &Immittance<W>) {
        let grown = shear(&mut self.i, &mut self.v, y);
        self.exponent += grown as i32;
    }

    /// Multiplies v and i by two real factors, an ideal transformer's ratio and its inverse.
    ///
    /// The factors are the real parts of two immittances with exponents of their own.
    #[inline]
    pub(crate) fn stretch(&mut self, of_v: &Immittance<W>, of_i: &Immittance<W>) {
        let v = self.v.map(|word| word.times(of_v.re));
        let i = self.i.map(|word| word.times(of_i.re));
        // the product times 2^(exponent − W) must be within a word after growth
        let need = |[re, im]: [W::Double; 2], exponent: i32| {
            let top = magnitude(W::upper(re, 0)) | magnitude(W::upper(im, 0));
            let bits = 32 - (top + 1).leading_zeros() as i32;
            bits + exponent - (W::BITS as i32 - 2)
        };
        let (of_v, of_i) = (of_v.power(), of_i.power());
        let grown = need(v, of_v).max(need(i, of_i)).max(0);
        let settle = |product: W::Double, exponent: i32| {
            let right = W::BITS as i32 - exponent + grown;
            W::from_i32(round_shift(product, right.unsigned_abs()).to_i64() as i32)
        };
        self.v = v.map(|product| settle(product, of_v));
        self.i = i.map(|product| settle(product, of_i));
        self.exponent += grown;
    }

    /// Multiplies v and i by a chain matrix, each of the four words summed at full width and
    /// rounded once.
    ///
    /// Four products of words below 2^(W−2) sum to less than 2^(2W−2); the block grows by as much
    /// as the sums need, up to the matrix's exponent.
    #[inline]
    pub(crate) fn two_port(&mut self, two_port: &TwoPortWords<W>) {
        let TwoPortWords { a, b, c, d, .. } = two_port;
        let (v, i) = (&self.v, &self.i);
        let ([v_re, v_im], [i_re, i_im]) = if two_port.is_lossless() {
            (real_row(a, v, b, i), real_row(d, i, c, v))
        } else {
            (row(a, v, b, i), row(d, i, c, v))
        };
        let up = two_port.up();
        let top = magnitude(W::upper(v_re, 0))
            | magnitude(W::upper(v_im, 0))
            | magnitude(W::upper(i_re, 0))
            | magnitude(W::upper(i_im, 0));
        let kept = room::<W>(top, up);
        let settle = |sum: W::Double| W::from_i32(round_half(W::upper(sum, kept)));
        self.v = [settle(v_re), settle(v_im)];
        self.i = [settle(i_re), settle(i_im)];
        self.exponent += (up - kept) as i32;
    }
}

/// target ← target + z · other, with both kept in one block; returns by how many powers of two
/// the block has grown.
///
/// The complex product and the target are summed at full width and rounded once, half up. With
/// the target in units of 1, the product is in 2^(up − 1 − down − W). Headroom: words of the state
/// are within ±2^(W−2) and those of z below it, so the parts of the product stay below 2^(2W−3).
///
/// - `up` = 1, parts of z below 1/4: the product adds less than 2^(W−3), so the sum fits a word
///   and the block grows by at most one.
/// - `up` ≥ 2: whether the block can stay as it is, is judged by the upper halves alone: `top`,
///   within 2 of the sum's floor in units of 2^(up−1). If so, the sum in half units fits a word and
///   its two terms may be added in wrapping arithmetic whatever their size. Else the target is
///   raised to the product's scale, where the sum stays below 2^(2W−2) − 2^W, and the block grows
///   by as much as the sum needs, at least one.
#[inline(always)]
fn shear<W: Word>(target: &mut [W; 2], other: &mut [W; 2], z: &Immittance<W>) -> u32 {
    let [re, im] = times([z.re, z.im], *other);
    let [word_re, word_im] = target.map(W::to_i32);
    let up = z.up();
    if up == 1 {
        let down = z.down();
        // one bit below the word's last place
        let (low_re, low_im) = (W::upper(re, 1) >> down, W::upper(im, 1) >> down);
        let sum = [word_re + round_half(low_re), word_im + round_half(low_im)];
        if magnitude(sum[0]) | magnitude(sum[1]) < W::LIMIT {
            *target = sum.map(W::from_i32);
            return 0;
        }
        // floor of the sum and one place more: rounded once from the same exact sum
        let floor = [word_re + (low_re >> 1), word_im + (low_im >> 1)];
        *target = floor.map(|word| W::from_i32(round_half(word)));
        *other = other.map(|word| W::from_i32(round_half(word.to_i32())));
        return 1;
    }
    let (twice_re, twice_im) = (word_re << 1, word_im << 1);
    let top_re = magnitude((twice_re >> up) + W::upper(re, 0));
    let top_im = magnitude((twice_im >> up) + W::upper(im, 0));
    if ((top_re | top_im) as u32 + 2) >> (W::BITS - 1 - up) == 0 {
        *target = [
            W::from_i32(round_half(twice_re.wrapping_add(W::upper(re, up)))),
            W::from_i32(round_half(twice_im.wrapping_add(W::upper(im, up)))),
        ];
        return 0;
    }
    let [of_re, of_im] = target.map(|word| word.raised(up - 1));
    let (re, im) = (of_re + re, of_im + im);
    let top = magnitude(W::upper(re, 0)) | magnitude(W::upper(im, 0));
    let kept = room::<W>(top, up - 1);
    *target = [re, im].map(|sum| W::from_i32(round_half(W::upper(sum, kept))));
    let grown = up - kept;
    *other = other.map(|word| W::from_i32(round_half(word.to_i32() >> (grown - 1))));
    grown
}

/// a·x + b·y. Apart where registers are few: one row's sums fill those of ARMv6-M.
#[cfg_attr(short_products, inline(never))]
#[cfg_attr(not(short_products), inline(always))]
fn row<W: Word>(a: &[W; 2], x: &[W; 2], b: &[W; 2], y: &[W; 2]) -> [W::Double; 2] {
    let ([re, im], [more_re, more_im]) = (times(*a, *x), times(*b, *y));
    [re + more_re, im + more_im]
}

/// a·x + b·y with a real and b imaginary.
#[cfg_attr(short_products, inline(never))]
#[cfg_attr(not(short_products), inline(always))]
fn real_row<W: Word>(
    [a, _]: &[W; 2],
    [re, im]: &[W; 2],
    [_, b]: &[W; 2],
    [other_re, other_im]: &[W; 2],
) -> [W::Double; 2] {
    [
        a.times(*re) + minus(*b).times(*other_im),
        a.times(*im) + b.times(*other_re),
    ]
}

/// The most bits, up to `up`, that sums may be taken at below their upper halves so that half of
/// what is taken, rounded, is a word of the state. `top` has the bits of all upper halves.
#[inline(always)]
fn room<W: Word>(top: i32, up: u32) -> u32 {
    let room = |kept: u32| (top as u32 + 1) >> (W::BITS - 1 - kept) == 0;
    // seldom more than one or two: a count of leading zeros costs more where it is a call
    let mut kept = up;
    while kept > 0 && !room(kept) {
        kept -= 1;
    }
    kept
}

/// x/2, rounded half up.
#[inline(always)]
fn round_half(x: i32) -> i32 {
    (x + 1) >> 1
}

/// Exact complex product; parts of the first factor that are zero cost nothing.
#[inline(always)]
fn times<W: Word>([a, b]: [W; 2], [re, im]: [W; 2]) -> [W::Double; 2] {
    let zero = W::default();
    if a == zero {
        [minus(b).times(im), b.times(re)]
    } else if b == zero {
        [a.times(re), a.times(im)]
    } else {
        [a.times(re) + minus(b).times(im), a.times(im) + b.times(re)]
    }
}

/// The word with the other sign; the words of an immittance have one.
#[inline(always)]
fn minus<W: Word>(word: W) -> W {
    W::from_i32(-word.to_i32())
}

/// x for x ≥ 0, −1 − x below: the bits that the integer takes beside its sign.
#[inline(always)]
fn magnitude(x: i32) -> i32 {
    x ^ (x >> 31)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::real::Complex;
    use crate::scalar::Scalar;
    use crate::word::Bits;
    use proptest::prelude::*;

    /// Exact value of a shear in 2^-scale, by 128-bit integers.
    fn exact<W: Word>(state: &State<W>, z: &Immittance<W>, scale: i32) -> [i128; 2] {
        let ([v_re, v_im], [i_re, i_im], exponent) = state.words();
        let [re, im] = z.words().map(i128::from);
        let (i_re, i_im) = (i128::from(i_re), i128::from(i_im));
        let product = [re * i_re - im * i_im, re * i_im + im * i_re];
        [v_re, v_im]
            .map(i128::from)
            .into_iter()
            .zip(product)
            .map(|(v, p)| (v << (scale + exponent)) + (p << (scale + exponent + z.exponent())))
            .collect::<Vec<_>>()
            .try_into()
            .unwrap()
    }

    fn in_window<W: Word>(state: &State<W>) -> bool {
        let (v, i, _) = state.words();
        v.into_iter()
            .chain(i)
            .all(|word| (-W::LIMIT..W::LIMIT).contains(&word))
    }

    fn check<W: Word>(words: [i32; 4], re: Scalar, im: Scalar) {
        let [a, b, c, d] = words.map(|word| {
            let word = word >> (32 - W::BITS + 1);
            W::from_i32(word.clamp(-W::LIMIT, W::LIMIT - 1))
        });
        let before = State {
            v: [a, b],
            i: [c, d],
            exponent: 0,
        };
        let z = Immittance::<W>::from_scalars(Complex { re, im });
        let mut after = before;
        after.series(&z);
        assert!(in_window(&after), "{before:?} {z:?} {after:?}");
        let scale = 60;
        if z.exponent() >= -scale {
            let (v, _, exponent) = after.words();
            let unit = scale + exponent;
            for (word, exact) in v.into_iter().zip(exact(&before, &z, scale)) {
                let rounded = (exact + (1 << (unit - 1))) >> unit;
                assert_eq!(i128::from(word), rounded, "{before:?} {z:?} {after:?}");
            }
        }
        let grown = after.exponent as u32;
        let expected = before
            .i
            .map(|w| round_shift(i64::from(w.to_i32()), grown) as i32);
        assert_eq!(after.i.map(W::to_i32), expected);
    }

    proptest! {
        /// The window holds and the sum is rounded once, for every length and size of immittance.
        #[test]
        fn a_shear_is_the_exact_sum_rounded_once(
            words: [i32; 4], re: i32, im: i32, e in -60..10, f in -60..10, kind in 0..3,
        ) {
            let re = if kind == 1 { Scalar::ZERO } else { Scalar::from_i32(re, e) };
            let im = if kind == 2 { Scalar::ZERO } else { Scalar::from_i32(im, f) };
            check::<i16>(words, re, im);
            check::<i32>(words, re, im);
            check::<Bits<10>>(words, re, im);
            check::<Bits<21>>(words, re, im);
        }
    }

    /// Corners where a sum or a rounding could leave the window.
    #[test]
    fn the_window_holds_at_its_corners() {
        let corners = [i32::MIN, i32::MIN + 1, -1, 0, 1, i32::MAX - 1, i32::MAX];
        for a in corners {
            for c in corners {
                for d in corners {
                    for exponent in -40..8 {
                        for re in [0, -i32::MAX, i32::MAX] {
                            for im in [0, -i32::MAX, i32::MAX] {
                                let (re, im) = (
                                    Scalar::from_i32(re, exponent),
                                    Scalar::from_i32(im, exponent),
                                );
                                check::<i16>([a, -(a / 2), c, d], re, im);
                                check::<i32>([a, -(a / 2), c, d], re, im);
                            }
                        }
                    }
                }
            }
        }
    }

    proptest! {
        #[test]
        fn loads_start_within_the_window(re: i32, im: i32) {
            let load = Gamma { re, im };
            prop_assert!(in_window(&State::<i32>::from_load(load)));
            prop_assert!(in_window(&State::<i16>::from_load(load)));
            prop_assert!(in_window(&State::<Bits<10>>::from_load(load)));
            let (v, i, exponent) = State::<i32>::from_load(load).words();
            let one = f64::from(1 << 30);
            for (word, exact) in v.into_iter().chain(i).zip([
                one + f64::from(re), f64::from(im), one - f64::from(re), -f64::from(im),
            ]) {
                let unit = 2.0_f64.powi(exponent + 30);
                prop_assert!((f64::from(word) * unit - exact).abs() <= unit / 2.0);
            }
        }

        #[test]
        fn a_transformer_keeps_the_window_and_rounds_to_half_a_unit(
            words: [i32; 4], ratio in (1_i32 << 30)..i32::MAX, e in -36..-24,
        ) {
            use crate::real::Real;
            let [a, b, c, d] = words.map(|word| word >> 1).map(|w| w.clamp(-i32::LIMIT, i32::LIMIT - 1));
            let before = State::<i32> { v: [a, b], i: [c, d], exponent: 0 };
            let ratio = Scalar::from_i32(ratio, e);
            let real = |re| Immittance::from_scalars(Complex { re, im: Scalar::ZERO });
            let (n, inverse) = (real(ratio), real(ratio.reciprocal()));
            let mut after = before;
            after.stretch(&n, &inverse);
            prop_assert!(in_window(&after));
            let unit = 2.0_f64.powi(after.exponent);
            for (pair, factor, result) in [(before.v, n, after.v), (before.i, inverse, after.i)] {
                let factor = f64::from(factor.words()[0]) * 2.0_f64.powi(factor.exponent());
                for (word, result) in pair.into_iter().zip(result) {
                    let exact = f64::from(word) * factor;
                    let error = (f64::from(result) * unit - exact).abs();
                    prop_assert!(error <= unit * 0.5 + exact.abs() * 1e-15);
                }
            }
        }
    }
}

//! Words, double words, and the one rounding function.

use core::fmt::Debug;
use core::ops::{Add, Neg, Shl, Shr, Sub};

use crate::product;

/// Shifts right by `bits` and rounds half up: to the nearest, ties towards +∞.
///
/// This is the rounding of the whole kernel. `bits` = 0 returns the value unchanged. The sum with
/// half a unit must not overflow, which every caller's headroom ensures. Above the width of the
/// double word the result is that of the largest shift, 0 for every value within headroom.
#[inline(always)]
pub fn round_shift<D: DoubleWord>(value: D, bits: u32) -> D {
    if bits == 0 {
        return value;
    }
    // floor(floor(x / 2^(b-1)) + 1) / 2) = floor((x + 2^(b-1)) / 2^b), without a wide constant
    ((value >> (bits - 1).min(D::BITS - 1)) + D::ONE) >> 1
}

/// An integer twice as long as a word, in which products are summed exactly.
pub trait DoubleWord:
    Copy
    + Ord
    + Debug
    + Add<Output = Self>
    + Sub<Output = Self>
    + Neg<Output = Self>
    + Shl<u32, Output = Self>
    + Shr<u32, Output = Self>
{
    /// Width in bits.
    const BITS: u32;
    /// The integer 1.
    const ONE: Self;
    /// The same integer, sign-extended.
    fn to_i64(self) -> i64;
}

impl DoubleWord for i32 {
    const BITS: u32 = 32;
    const ONE: Self = 1;
    #[inline(always)]
    fn to_i64(self) -> i64 {
        self as i64
    }
}

impl DoubleWord for i64 {
    const BITS: u32 = 64;
    const ONE: Self = 1;
    #[inline(always)]
    fn to_i64(self) -> i64 {
        self
    }
}

/// A signed integer of [`Word::BITS`] bits: what states and immittances are made of.
///
/// Firmware uses `i16` and `i32`; [`Bits`] gives every other length, so that the desktop can size.
/// Implementing the trait for another type is possible, but only these three are tested.
pub trait Word: Copy + Eq + Ord + Debug + Default + Send + Sync + 'static {
    /// Word length W in bits, sign included.
    const BITS: u32;
    /// 2^(W−2): state words w obey −LIMIT ≤ w < LIMIT, those of immittances |w| < LIMIT; one bit of
    /// headroom beside the sign.
    const LIMIT: i32 = 1 << (Self::BITS - 2);

    /// The type that holds exact sums of products.
    type Double: DoubleWord;

    /// Exact product.
    fn times(self, other: Self) -> Self::Double;
    /// This word times 2^(W − down), 1 ≤ down < W.
    fn raised(self, down: u32) -> Self::Double;
    /// floor(sum · 2^up / 2^W), 0 ≤ up < W; the caller ensures that it fits 32 bits.
    fn upper(sum: Self::Double, up: u32) -> i32;
    /// The word as `i32`.
    fn to_i32(self) -> i32;
    /// The word with this value; the caller ensures that it fits W bits.
    fn from_i32(value: i32) -> Self;
}

impl Word for i16 {
    const BITS: u32 = 16;
    type Double = i32;
    #[inline(always)]
    fn times(self, other: Self) -> i32 {
        self as i32 * other as i32
    }
    #[inline(always)]
    fn raised(self, down: u32) -> i32 {
        (self as i32) << (16 - down)
    }
    #[inline(always)]
    fn upper(sum: i32, up: u32) -> i32 {
        sum >> (16 - up)
    }
    #[inline(always)]
    fn to_i32(self) -> i32 {
        self as i32
    }
    #[inline(always)]
    fn from_i32(value: i32) -> Self {
        debug_assert!(i16::try_from(value).is_ok());
        value as i16
    }
}

impl Word for i32 {
    const BITS: u32 = 32;
    type Double = i64;
    #[inline(always)]
    fn times(self, other: Self) -> i64 {
        product::within_limit(self, other)
    }
    #[inline(always)]
    fn raised(self, down: u32) -> i64 {
        product::join((self >> down) as u32, (self as u32) << (32 - down)) as i64
    }
    #[inline(always)]
    fn upper(sum: i64, up: u32) -> i32 {
        let (upper, lower) = ((sum >> 32) as u32, sum as u32);
        // 31 − up, in a form that shows to be below 32
        (upper << up | lower >> 1 >> (up ^ 31)) as i32
    }
    #[inline(always)]
    fn to_i32(self) -> i32 {
        self
    }
    #[inline(always)]
    fn from_i32(value: i32) -> Self {
        value
    }
}

/// A word of `W` bits (8 ≤ W ≤ 32), kept in 32, with the results of a true `W`-bit word.
///
/// `Bits<16>` and `i16`, `Bits<32>` and `i32` give the same words.
#[derive(Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Debug, Default)]
pub struct Bits<const W: u32>(i32);

impl<const W: u32> Word for Bits<W> {
    const BITS: u32 = {
        assert!(8 <= W && W <= 32, "a word has 8 to 32 bits");
        W
    };
    type Double = i64;
    #[inline(always)]
    fn times(self, other: Self) -> i64 {
        self.0 as i64 * other.0 as i64
    }
    #[inline(always)]
    fn raised(self, down: u32) -> i64 {
        (self.0 as i64) << (W - down)
    }
    #[inline(always)]
    fn upper(sum: i64, up: u32) -> i32 {
        (sum >> (W - up)) as i32
    }
    #[inline(always)]
    fn to_i32(self) -> i32 {
        self.0
    }
    #[inline(always)]
    fn from_i32(value: i32) -> Self {
        debug_assert!(value >> (W - 1) == 0 || value >> (W - 1) == -1);
        Self(value)
    }
}

#[cfg(test)]
mod tests {
    use super::round_shift;

    /// Every rounding shift of every 16-bit value, against the definition in wider arithmetic.
    #[test]
    fn rounding_is_to_the_nearest_with_ties_up() {
        for bits in 0..=16 {
            for value in i32::from(i16::MIN)..=i32::from(i16::MAX) {
                let nearest = (f64::from(value) / f64::from(1_u32 << bits) + 0.5).floor();
                assert_eq!(
                    f64::from(round_shift(value, bits)),
                    nearest,
                    "{value} >> {bits}"
                );
                assert_eq!(round_shift(i64::from(value), bits), nearest as i64);
            }
        }
    }

    #[test]
    fn shifts_beyond_the_width_give_zero() {
        for value in [-(1_i64 << 61), -1, 0, 1, 1 << 61] {
            assert_eq!(round_shift(value, 64), 0);
            assert_eq!(round_shift(value, 200), 0);
        }
    }
}

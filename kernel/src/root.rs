//! Correctly rounded reciprocals and square roots of mantissas.

use crate::product;

/// Nearest integer to 2^61 / m for 2^30 < m < 2^31.
///
/// Newton's iteration from a table of 8-bit seeds, then one exact remainder: the result is the
/// correctly rounded quotient (ties up), whatever the path to it.
pub(crate) fn reciprocal(m: u32) -> u32 {
    /// Seeds: 2^17 / (2^8 + i + 1/2) − 2^8, the reciprocal at the middle of each 1/256 of [1, 2).
    const SEEDS: [u8; 256] = {
        let mut seeds = [0; 256];
        let mut i = 0;
        while i < 256 {
            // rounded 2^18 / (2^9 + 2 i + 1), in 2^-9
            let seed = ((1 << 19) / (512 + 2 * i as u32 + 1)).div_ceil(2);
            seeds[i] = (seed - 256) as u8;
            i += 1;
        }
        seeds
    };
    let seed = SEEDS[(m >> 22) as usize & 0xff] as u32 + 256;
    // x = m / 2^30 in [1, 2). First step in 32 bits: r ← r (2 − x r)
    let error = (1 << 31) - (m >> 9) * seed;
    let r = (seed * (error >> 9)) as i32;
    // second step, relative to the first: r ← r + r (1 − x r), r in 2^-30 then 2^-31
    let rest = ((1 << 60) - product::signed(m as i32, r)) >> 14;
    let r = ((r as i64) << 1) + (product::signed(r, rest as i32) >> 45);
    // r is within one unit of the quotient: the exact remainder settles the last place
    let half = (m >> 1) as i64;
    let remainder = (1 << 61) - product::unsigned(r as u32, m) as i64;
    let m = m as i64;
    let correction = if remainder < -half {
        -1
    } else if remainder >= m - half {
        1
    } else {
        0
    };
    (r + correction) as u32
}

/// Nearest integer to √x for 2^60 ≤ x < 2^62, digit by digit.
pub(crate) fn square_root(x: u64) -> u32 {
    let mut rest = x;
    let mut root: u64 = 0;
    let mut digit: u64 = 1 << 60;
    while digit != 0 {
        if rest >= root + digit {
            rest -= root + digit;
            root = (root >> 1) + digit;
        } else {
            root >>= 1;
        }
        digit >>= 2;
    }
    // rest = x − root²; √x > root + 1/2 exactly if rest > root
    (root + u64::from(rest > root)) as u32
}

#[cfg(test)]
mod tests {
    use super::*;
    use proptest::prelude::*;

    fn nearest_quotient(m: u32) -> u64 {
        ((1_u64 << 61) + u64::from(m / 2)) / u64::from(m)
    }

    /// All seeds' edges with their neighbours, a spaced set and both ends of the range.
    #[test]
    fn reciprocal_is_the_nearest_integer_at_every_table_edge() {
        let edges = (256_u32..512).flat_map(|i| {
            let edge = i << 22;
            (edge.saturating_sub(3)..=edge + 3).chain(std::iter::once(edge + (1 << 21)))
        });
        let spaced = (0..2_000_000).map(|i| (1 << 30) + i * 536 + i % 7);
        for m in edges
            .chain(spaced)
            .chain(i32::MAX as u32 - 9..=i32::MAX as u32)
        {
            if m > 1 << 30 {
                assert_eq!(u64::from(reciprocal(m)), nearest_quotient(m), "m = {m}");
            }
        }
    }

    #[test]
    fn square_root_is_the_nearest_integer_at_squares_and_half_way() {
        for root in [
            1_u64 << 30,
            (1 << 30) + 1,
            1_518_500_249,
            (1 << 31) - 2,
            (1 << 31) - 1,
        ] {
            for (x, expected) in [
                (root * root, root),
                (root * root + root, root),
                (root * root + root + 1, root + 1),
            ] {
                if x >> 62 == 0 {
                    assert_eq!(u64::from(square_root(x)), expected, "√{x}");
                }
            }
        }
    }

    proptest! {
        #[test]
        fn reciprocal_is_the_nearest_integer(m in (1_u32 << 30) + 1..1 << 31) {
            prop_assert_eq!(u64::from(reciprocal(m)), nearest_quotient(m));
        }

        #[test]
        fn square_root_is_the_nearest_integer(x in 1_u64 << 60..1 << 62) {
            let root = u64::from(square_root(x));
            prop_assert!(root * root - root < x && x <= root * root + root);
        }
    }
}

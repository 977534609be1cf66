//! Exact products of 32-bit integers.
//!
//! The results are those of 64-bit arithmetic on every core. Cores without a long multiplication
//! (ARMv6-M, ARMv8-M baseline) put them together from four 16-bit ones, because the compiler would
//! otherwise call a 64 × 64 bit routine at several times the cost.

/// Exact product of two signed 32-bit integers.
#[cfg(not(short_products))]
#[inline(always)]
pub(crate) fn signed(a: i32, b: i32) -> i64 {
    a as i64 * b as i64
}

/// Exact product of two unsigned 32-bit integers.
#[cfg(not(short_products))]
#[inline(always)]
pub(crate) fn unsigned(a: u32, b: u32) -> u64 {
    a as u64 * b as u64
}

/// Exact product of two signed 32-bit integers.
///
/// Each factor is high · 2^16 + low with a signed high and an unsigned low half. Every partial
/// product fits 32 bits: the mixed ones are at most 2^15 · (2^16 − 1) in magnitude.
#[cfg(short_products)]
#[inline(always)]
pub(crate) fn signed(a: i32, b: i32) -> i64 {
    let (a_low, a_high) = (a & 0xffff, a >> 16);
    let (b_low, b_high) = (b & 0xffff, b >> 16);
    let outer = join(
        a_high.wrapping_mul(b_high) as u32,
        a_low.wrapping_mul(b_low) as u32,
    );
    let middle = |m: i32| join((m >> 16) as u32, (m as u32) << 16);
    outer
        .wrapping_add(middle(a_low.wrapping_mul(b_high)))
        .wrapping_add(middle(a_high.wrapping_mul(b_low))) as i64
}

/// Exact product of two unsigned 32-bit integers.
#[cfg(short_products)]
#[inline(always)]
pub(crate) fn unsigned(a: u32, b: u32) -> u64 {
    let (a_low, a_high) = (a & 0xffff, a >> 16);
    let (b_low, b_high) = (b & 0xffff, b >> 16);
    let outer = join(a_high.wrapping_mul(b_high), a_low.wrapping_mul(b_low));
    let middle = |m: u32| join(m >> 16, m << 16);
    outer
        .wrapping_add(middle(a_low.wrapping_mul(b_high)))
        .wrapping_add(middle(a_high.wrapping_mul(b_low)))
}

/// Exact product of two words of at most 2^30 in magnitude, one of them less.
///
/// With that the two mixed products sum to less than 2^31, which saves a carry.
#[inline(always)]
pub(crate) fn within_limit(a: i32, b: i32) -> i64 {
    debug_assert!(a.unsigned_abs() <= 1 << 30 && b.unsigned_abs() <= 1 << 30);
    #[cfg(not(short_products))]
    return signed(a, b);
    #[cfg(short_products)]
    {
        let (a_low, a_high) = (a & 0xffff, a >> 16);
        let (b_low, b_high) = (b & 0xffff, b >> 16);
        let outer = join(
            a_high.wrapping_mul(b_high) as u32,
            a_low.wrapping_mul(b_low) as u32,
        );
        let middle = a_low
            .wrapping_mul(b_high)
            .wrapping_add(a_high.wrapping_mul(b_low));
        outer.wrapping_add(join((middle >> 16) as u32, (middle as u32) << 16)) as i64
    }
}

/// The integer with these upper and lower halves.
#[inline(always)]
pub(crate) fn join(high: u32, low: u32) -> u64 {
    (high as u64) << 32 | low as u64
}

#[cfg(test)]
mod tests {
    use super::{signed, unsigned, within_limit};

    /// Corners of every half word, where a carry or a sign could be lost.
    const CORNERS: [u32; 12] = [
        0,
        1,
        2,
        0x7fff,
        0x8000,
        0xffff,
        0x1_0000,
        0x7fff_ffff,
        0x8000_0000,
        0x8000_0001,
        0xffff_8000,
        0xffff_ffff,
    ];

    #[test]
    fn products_are_exact_at_every_pair_of_corners() {
        for a in CORNERS {
            for b in CORNERS {
                assert_eq!(unsigned(a, b), u64::from(a) * u64::from(b), "{a:#x} {b:#x}");
                let (a, b) = (a as i32, b as i32);
                assert_eq!(signed(a, b), i64::from(a) * i64::from(b), "{a:#x} {b:#x}");
            }
        }
    }

    #[test]
    fn products_within_the_limit_are_exact_at_its_corners() {
        let limit = 1 << 30;
        for a in [
            -limit,
            1 - limit,
            -0xffff,
            -1,
            0,
            1,
            0x8000,
            0xffff,
            limit - 1,
            limit,
        ] {
            for b in [1 - limit, -0x1_0000, -1, 0, 1, 0x7fff, 0xffff, limit - 1] {
                assert_eq!(
                    within_limit(a, b),
                    i64::from(a) * i64::from(b),
                    "{a:#x} {b:#x}"
                );
            }
        }
    }

    proptest::proptest! {
        #[test]
        fn products_are_exact(a: u32, b: u32) {
            let (small_a, small_b) = (a as i32 >> 1, b as i32 >> 1);
            assert_eq!(within_limit(small_a, small_b), i64::from(small_a) * i64::from(small_b));
            assert_eq!(unsigned(a, b), u64::from(a) * u64::from(b));
            let (a, b) = (a as i32, b as i32);
            assert_eq!(signed(a, b), i64::from(a) * i64::from(b));
        }
    }
}

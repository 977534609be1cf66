//! Integer arithmetic whose results the language defines, so that they are the same on a core
//! without long multiply or divide as on the desktop: tells a broken tool chain from a broken
//! kernel.

/// SplitMix64 (Steele, Lea and Flood, "Fast splittable pseudorandom number generators", 2014).
pub struct Stream(pub u64);

impl Iterator for Stream {
    type Item = u64;

    fn next(&mut self) -> Option<u64> {
        self.0 = self.0.wrapping_add(0x9E37_79B9_7F4A_7C15);
        let mut word = self.0;
        word = (word ^ (word >> 30)).wrapping_mul(0xBF58_476D_1CE4_E5B9);
        word = (word ^ (word >> 27)).wrapping_mul(0x94D0_49BB_1331_11EB);
        Some(word ^ (word >> 31))
    }
}

/// One step over everything a fixed-point kernel asks of a core: long products, high halves,
/// arithmetic shifts, leading zeros, division and remainder of both signs.
pub fn mix(sum: u64, word: u64) -> u64 {
    let (high, low) = ((word >> 32) as i32, word as i32);
    let product = i64::from(high) * i64::from(low);
    let upper = ((product + (1 << 31)) >> 32) as i32;
    let shifted = product >> (word & 63);
    // Divisors are odd, so never zero, and i64::MIN / -1 would need a product of 2^63.
    let divisor = i64::from(low | 1);
    let quotient = product.wrapping_div(divisor);
    let remainder = (word ^ sum) % (u64::from(high.unsigned_abs()) | 1);
    let wide = (u128::from(sum) * u128::from(word)) >> 64;
    sum.rotate_left(5)
        .wrapping_add(upper as u64)
        .wrapping_add(shifted as u64)
        .wrapping_add(quotient as u64)
        .wrapping_add(remainder)
        .wrapping_add(u64::from(product.leading_zeros()))
        ^ wide as u64
}

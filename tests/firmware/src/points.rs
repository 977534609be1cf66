//! Frequencies and loads to try a chain at, the same on every core and on the desktop.
//!
//! Integers alone, so that neither side can have points of its own.

use stagebits_kernel::Gamma;

use crate::checksum::Stream;

/// A closed range of frequencies in hertz.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Band {
    /// Lowest frequency.
    pub from: u32,
    /// Highest frequency, not below `from`.
    pub to: u32,
}

/// What a caller may ask for outside every band; immittances saturate there.
const EXTREME_FREQUENCIES: [u32; 3] = [0, 1, u32::MAX];
/// Between the spaced frequencies, of which there is one more.
const INTERVALS: u64 = 9;
const RANDOM_FREQUENCIES: usize = 11;

const ONE: i32 = 1 << Gamma::FRACTION_BITS;
const HALF: i32 = ONE / 2;

const EDGE_LOADS: [Gamma; 23] = [
    Gamma::OPEN,
    Gamma::SHORT,
    Gamma::MATCHED,
    // nearly so
    load(ONE - 1, 1),
    load(1 - ONE, -1),
    load(1, -1),
    // purely reactive, and both parts as large as a passive load's can be
    load(0, ONE),
    load(0, -ONE),
    load(ONE, ONE),
    load(ONE, -ONE),
    load(-ONE, ONE),
    load(-ONE, -ONE),
    // the ends of the format
    load(i32::MIN, i32::MIN),
    load(i32::MIN, i32::MAX),
    load(i32::MAX, i32::MIN),
    load(i32::MAX, i32::MAX),
    load(i32::MAX, 0),
    load(0, i32::MIN),
    load(i32::MIN, 1),
    // spaced
    load(HALF, HALF),
    load(HALF, -HALF),
    load(-HALF, HALF),
    load(-HALF, -HALF),
];
/// Random loads with both parts within ±1.
const PASSIVE_LOADS: usize = 8;
/// Random loads with both parts within ±2.
const ANY_LOADS: usize = 3;

/// Most banks that a chain may have for [`switches`] to reach all of them.
pub const BANKS: usize = 12;

/// The state of a chain's banks at a frequency: all steps off, all on or any.
pub fn switches(hertz: u32) -> [u16; BANKS] {
    match hertz % 8 {
        0 => [0; BANKS],
        1 => [u16::MAX; BANKS],
        _ => {
            let mut words = [0; BANKS];
            for (word, random) in words.iter_mut().zip(Stream(!u64::from(hertz))) {
                *word = random as u16;
            }
            words
        }
    }
}

const fn load(re: i32, im: i32) -> Gamma {
    Gamma { re, im }
}

/// Frequencies outside, spaced over both ends of and at random in a band.
pub fn frequencies(band: Band) -> impl Iterator<Item = u32> {
    let span = u64::from(band.to - band.from);
    let spaced = (0..=INTERVALS).map(move |index| band.from + (span * index / INTERVALS) as u32);
    let random = Stream(u64::from(band.from) << 32 | u64::from(band.to))
        .map(move |word| band.from + (((word >> 32) * (span + 1)) >> 32) as u32);
    EXTREME_FREQUENCIES
        .into_iter()
        .chain(spaced)
        .chain(random.take(RANDOM_FREQUENCIES))
}

/// Loads at the edges of the format and at random in it, others at every frequency.
pub fn loads(hertz: u32) -> impl Iterator<Item = Gamma> {
    let random = Stream(u64::from(hertz)).enumerate().map(|(index, word)| {
        let right = u32::from(index < PASSIVE_LOADS);
        load((word >> 32) as i32 >> right, word as i32 >> right)
    });
    EDGE_LOADS
        .into_iter()
        .chain(random.take(PASSIVE_LOADS + ANY_LOADS))
}

//! The checksum: CRC-32/ISO-HDLC.

/// Polynomial 0x04c11db7, lowest bit first.
const POLYNOMIAL: u32 = 0xedb8_8320;

/// What each value of four bits leaves behind: 64 bytes of table, a quarter of the bitwise steps.
const NIBBLES: [u32; 16] = {
    let mut table = [0; 16];
    let mut nibble = 0;
    while nibble < 16 {
        let mut rest = nibble as u32;
        let mut bit = 0;
        while bit < 4 {
            rest = (rest >> 1) ^ if rest & 1 == 1 { POLYNOMIAL } else { 0 };
            bit += 1;
        }
        table[nibble] = rest;
        nibble += 1;
    }
    table
};

/// A CRC-32/ISO-HDLC in the making.
///
/// Every burst of up to 32 bits changes it, and so does every single flipped bit.
#[derive(Clone, Copy)]
pub(super) struct Checksum(u32);

impl Checksum {
    /// Of no bytes.
    pub(super) const EMPTY: Self = Self(u32::MAX);

    /// With one more byte.
    #[must_use]
    pub(super) const fn with(self, byte: u8) -> Self {
        let mut rest = self.0 ^ byte as u32;
        // the mask keeps the index within the table
        rest = (rest >> 4) ^ NIBBLES[(rest & 0xf) as usize];
        rest = (rest >> 4) ^ NIBBLES[(rest & 0xf) as usize];
        Self(rest)
    }

    /// The finished checksum.
    pub(super) const fn value(self) -> u32 {
        !self.0
    }

    /// The checksum of these bytes.
    pub(super) fn of(bytes: &[u8]) -> u32 {
        bytes
            .iter()
            .fold(Self::EMPTY, |sum, byte| sum.with(*byte))
            .value()
    }
}

#[cfg(test)]
mod tests {
    use super::Checksum;

    /// The check value in Greg Cook's catalogue of parametrised CRC algorithms, from memory.
    #[test]
    fn check_value_is_that_of_the_catalogue() {
        assert_eq!(Checksum::of(b"123456789"), 0xcbf4_3926);
    }

    /// Bytes followed by their checksum leave the residue of the same catalogue, from memory.
    #[test]
    fn residue_is_that_of_the_catalogue() {
        let mut bytes = b"a coil, a line and a load".to_vec();
        let checksum = Checksum::of(&bytes);
        bytes.extend(checksum.to_le_bytes());
        assert_eq!(!Checksum::of(&bytes), 0xdebb_20e3);
    }
}

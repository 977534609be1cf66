//! Bytes in order: reading that cannot pass the end, and writing that counts beyond it.

use super::checksum::Checksum;

/// What is left to read.
pub(super) struct Reader<'a>(&'a [u8]);

impl<'a> Reader<'a> {
    pub(super) const fn new(bytes: &'a [u8]) -> Self {
        Self(bytes)
    }

    /// The next `N` bytes, or `None` if fewer are left.
    pub(super) fn take<const N: usize>(&mut self) -> Option<[u8; N]> {
        let (first, rest) = self.0.split_first_chunk()?;
        self.0 = rest;
        Some(*first)
    }

    /// Number of bytes left.
    pub(super) const fn remaining(&self) -> usize {
        self.0.len()
    }
}

/// Bytes written so far; those beyond the buffer are only counted.
pub(super) struct Writer<'a> {
    room: core::slice::IterMut<'a, u8>,
    length: usize,
    checksum: Checksum,
}

impl<'a> Writer<'a> {
    pub(super) fn new(out: &'a mut [u8]) -> Self {
        Self {
            room: out.iter_mut(),
            length: 0,
            checksum: Checksum::EMPTY,
        }
    }

    pub(super) fn put(&mut self, bytes: &[u8]) {
        for byte in bytes {
            if let Some(place) = self.room.next() {
                *place = *byte;
            }
            self.length += 1;
            self.checksum = self.checksum.with(*byte);
        }
    }

    /// Appends the checksum of all bytes and gives their number, it included.
    pub(super) fn finish(mut self) -> usize {
        self.put(&self.checksum.value().to_le_bytes());
        self.length
    }
}

//! Flash and RAM that an image takes.

use std::fs;
use std::path::Path;

use object::read::elf::{ElfFile32, SectionHeader};
use object::{Object, ObjectSection, elf};

use super::Failure;

/// Sizes in bytes; the stack is not in them.
#[derive(Debug, Clone, Copy, Default, PartialEq, Eq)]
pub(crate) struct Footprint {
    /// Instructions and the constants between them.
    pub(crate) code: u64,
    /// Vector table and constants.
    pub(crate) constants: u64,
    /// Variables with an initial value, which take flash and RAM.
    pub(crate) initialised: u64,
    /// Variables that start as zero or as anything.
    pub(crate) zeroed: u64,
}

impl Footprint {
    /// Bytes of flash.
    pub(crate) fn flash(&self) -> u64 {
        self.code + self.constants + self.initialised
    }

    /// Bytes of RAM, without the stack.
    pub(crate) fn ram(&self) -> u64 {
        self.initialised + self.zeroed
    }
}

/// Sums the sections of the 32-bit ELF file at `image`.
pub(crate) fn footprint(image: &Path) -> Result<Footprint, Failure> {
    let failure = |error: String| Failure(format!("{}: {error}", image.display()));
    let bytes = fs::read(image).map_err(|error| failure(error.to_string()))?;
    let file = ElfFile32::<object::Endianness>::parse(&*bytes)
        .map_err(|error| failure(error.to_string()))?;
    let mut footprint = Footprint::default();
    for section in file.sections() {
        // riscv-rt's script marks the memory that is left with sections of these names.
        if matches!(section.name(), Ok(".stack" | ".heap")) {
            continue;
        }
        let header = section.elf_section_header();
        let flags = header.sh_flags(file.endian());
        if flags & elf::SHF_ALLOC == 0 {
            continue;
        }
        let sum = if header.sh_type(file.endian()) == elf::SHT_NOBITS {
            &mut footprint.zeroed
        } else if flags & elf::SHF_EXECINSTR != 0 {
            &mut footprint.code
        } else if flags & elf::SHF_WRITE != 0 {
            &mut footprint.initialised
        } else {
            &mut footprint.constants
        };
        *sum += section.size();
    }
    Ok(footprint)
}

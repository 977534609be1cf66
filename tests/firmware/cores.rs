//! The emulated cores: one table, read by the firmware's build script and by the tests.

/// A stretch of memory that an image may use.
#[derive(Clone, Copy)]
pub(crate) struct Region {
    /// First address.
    pub(crate) origin: u32,
    /// Length in bytes.
    pub(crate) bytes: u32,
}

/// What an image reads to count its own instructions.
#[derive(Clone, Copy)]
pub(crate) enum Counter {
    /// The 24-bit SysTick timer at this clock, in hertz. With `-icount shift=N` an instruction
    /// lasts 2^N ns, so the shift is chosen to give between one and two ticks per instruction:
    /// at less than one the count is not exact, at more the timer runs out sooner.
    SysTick(u64),
    /// The counter of retired instructions, exact where an instruction lasts 1 ns.
    Retired,
}

/// An emulated core.
#[derive(Clone, Copy)]
pub(crate) struct Core {
    /// Name in chain files, tables and messages.
    pub(crate) name: &'static str,
    /// Target triple of the compiler.
    pub(crate) target: &'static str,
    /// Emulator program.
    pub(crate) emulator: &'static str,
    /// Debian package that holds the emulator.
    pub(crate) package: &'static str,
    /// Arguments that choose the machine.
    pub(crate) machine: &'static [&'static str],
    /// An instruction lasts 2^`shift` ns of emulated time.
    pub(crate) shift: u32,
    /// What counts instructions.
    pub(crate) counter: Counter,
    /// Memory for code and constants.
    pub(crate) flash: Region,
    /// Memory for data and stack: what parts with this core usually have, not all that the
    /// emulator offers, so that an image that needs more does not link.
    pub(crate) ram: Region,
}

/// All cores, the smallest first.
pub(crate) const CORES: [Core; 5] = [
    Core {
        name: "armv6m",
        target: "thumbv6m-none-eabi",
        emulator: "qemu-system-arm",
        package: "qemu-system-arm",
        machine: &["-M", "microbit"],
        shift: 6,
        counter: Counter::SysTick(16_000_000),
        flash: Region {
            origin: 0x0000_0000,
            bytes: 256 << 10,
        },
        ram: Region {
            origin: 0x2000_0000,
            bytes: 16 << 10,
        },
    },
    Core {
        name: "armv7m",
        target: "thumbv7m-none-eabi",
        emulator: "qemu-system-arm",
        package: "qemu-system-arm",
        machine: &["-M", "mps2-an385"],
        shift: 6,
        counter: Counter::SysTick(25_000_000),
        flash: Region {
            origin: 0x0000_0000,
            bytes: 1 << 20,
        },
        ram: Region {
            origin: 0x2000_0000,
            bytes: 64 << 10,
        },
    },
    Core {
        name: "armv7em",
        target: "thumbv7em-none-eabihf",
        emulator: "qemu-system-arm",
        package: "qemu-system-arm",
        machine: &["-M", "mps2-an386"],
        shift: 6,
        counter: Counter::SysTick(25_000_000),
        flash: Region {
            origin: 0x0000_0000,
            bytes: 1 << 20,
        },
        ram: Region {
            origin: 0x2000_0000,
            bytes: 64 << 10,
        },
    },
    Core {
        name: "armv8m",
        target: "thumbv8m.main-none-eabihf",
        emulator: "qemu-system-arm",
        package: "qemu-system-arm",
        machine: &["-M", "mps2-an505"],
        shift: 6,
        counter: Counter::SysTick(20_000_000),
        flash: Region {
            origin: 0x1000_0000,
            bytes: 1 << 20,
        },
        ram: Region {
            origin: 0x3800_0000,
            bytes: 64 << 10,
        },
    },
    Core {
        name: "rv32imc",
        target: "riscv32imc-unknown-none-elf",
        emulator: "qemu-system-riscv32",
        package: "qemu-system-misc",
        machine: &["-M", "virt", "-bios", "none"],
        shift: 0,
        counter: Counter::Retired,
        flash: Region {
            origin: 0x8000_0000,
            bytes: 1 << 20,
        },
        ram: Region {
            origin: 0x8010_0000,
            bytes: 64 << 10,
        },
    },
];

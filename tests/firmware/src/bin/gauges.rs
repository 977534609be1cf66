//! Prints what the instruction counter and the stack gauge say about work whose cost is known.
#![no_std]
#![no_main]

use core::arch::asm;
use core::hint::black_box;

use stagebits_firmware::checksum::{Stream, mix};
use stagebits_firmware::{CORE, console, count, entry, exit, print, stack};

/// Counts `$count` no-operations for each of the counts.
macro_rules! no_operations {
    ($($count:literal)*) => { $(
        // SAFETY: does nothing.
        let counted = count::instructions(|| unsafe {
            asm!(concat!(".rept ", $count), "nop", ".endr", options(nomem, nostack))
        });
        print!("nop {} {counted}\n", $count);
    )* };
}

/// Executes exactly `2 * rounds` instructions, and those that load `rounds`.
#[inline(always)]
fn turn(rounds: u32) {
    // SAFETY: counts a register down to zero.
    unsafe {
        #[cfg(target_arch = "arm")]
        asm!("2:", "subs {0}, #1", "bne 2b", inout(reg) rounds => _, options(nomem, nostack));
        #[cfg(target_arch = "riscv32")]
        asm!("2:", "addi {0}, {0}, -1", "bnez {0}, 2b", inout(reg) rounds => _,
            options(nomem, nostack));
    }
}

/// Occupies at least `BYTES` of stack.
#[inline(never)]
fn occupy<const BYTES: usize>() {
    black_box(&mut [0x11_u8; BYTES]);
}

#[entry]
fn main() -> ! {
    print!("core {CORE}\n");
    no_operations!(0 1 2 3 4 5 6 7 8 9 10 11 12 13 14 15 16 17 18 19 20 21 22 23 24 25 26 27 28 29
        30 31 97 128 255 999 4096);
    for rounds in [1, 2, 1000, 1001, 1_000_000, 4_000_000] {
        print!("loop {rounds} {}\n", count::instructions(|| turn(rounds)));
    }
    let mixed = count::instructions(|| {
        black_box(Stream(black_box(1)).take(1000).fold(0, mix));
    });
    console::figure("mix", u64::from(mixed));
    print!("stack 0 {}\n", stack::depth(|| {}));
    print!("stack 64 {}\n", stack::depth(occupy::<64>));
    print!("stack 1024 {}\n", stack::depth(occupy::<1024>));
    print!("stack 4096 {}\n", stack::depth(occupy::<4096>));
    exit::success()
}

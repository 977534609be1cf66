//! Stack that a piece of work touches, found by painting.
//!
//! A path that the run does not take leaves no trace, so this is a lower limit of the worst case.

use core::arch::asm;
use core::hint::black_box;

/// What untouched stack holds.
const PAINT: u32 = 0xA5A5_5A5A;

unsafe extern "C" {
    /// Lowest word of the stack, from the linker script of the start-up crate.
    #[cfg_attr(target_arch = "arm", link_name = "_stack_end")]
    #[cfg_attr(target_arch = "riscv32", link_name = "__estack")]
    static LOWEST: u32;
}

/// Bytes of stack between the caller's frame and the deepest word that `work` overwrites, its own
/// frame and return address included. Whole words; a frame's unwritten lowest words do not show.
///
/// Ends the run with exit status 1 where `work` reaches the end of the stack.
#[inline(never)]
pub fn depth(mut work: impl FnMut()) -> usize {
    let work: &mut dyn FnMut() = &mut work;
    let work = black_box(work);
    let lowest = &raw const LOWEST as usize;
    let top: usize;
    // SAFETY: fills from the end of the stack up to the stack pointer, exclusive. Nothing lives
    // below the stack pointer: neither architecture has a red zone, and no interrupt is enabled.
    unsafe {
        #[cfg(target_arch = "arm")]
        asm!(
            "mov {top}, sp",
            "b 3f",
            "2:",
            "str {paint}, [{word}]",
            "adds {word}, #4",
            "3:",
            "cmp {word}, {top}",
            "blo 2b",
            top = out(reg) top,
            word = inout(reg) lowest => _,
            paint = in(reg) PAINT,
            options(nostack),
        );
        #[cfg(target_arch = "riscv32")]
        asm!(
            "mv {top}, sp",
            "j 3f",
            "2:",
            "sw {paint}, 0({word})",
            "addi {word}, {word}, 4",
            "3:",
            "bltu {word}, {top}, 2b",
            top = out(reg) top,
            word = inout(reg) lowest => _,
            paint = in(reg) PAINT,
            options(nostack),
        );
    }
    work();
    let mut word = lowest;
    // SAFETY: reads aligned words of the stack, below this function's frame; volatile, because
    // the compiler takes them for unwritten.
    while word < top && unsafe { (word as *const u32).read_volatile() } == PAINT {
        word += 4;
    }
    if word == lowest {
        crate::exit::failure("the work needs more stack than there is");
    }
    top - word
}

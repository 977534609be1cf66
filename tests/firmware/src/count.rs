//! Instructions that a piece of work executes.
//!
//! The emulator lets an instruction last a fixed time, so a timer counts instructions, the same
//! in every run. These are instructions, not cycles.

use core::hint::black_box;

/// Instructions that `work` executes, exactly.
///
/// The call itself and the closure's return are not counted, as measured on an empty closure.
/// Compilers move arithmetic freely, so inputs and results must pass through
/// [`black_box`] inside `work`; its stores then count too.
///
/// Ends the run with exit status 1 where the timer runs out, at 10 million instructions or more.
pub fn instructions(mut work: impl FnMut()) -> u32 {
    let whole = span(&mut work);
    let empty = span(&mut || {});
    whole - empty
}

/// Instructions between the two looks at the timer, `work` called between them.
#[inline(never)]
fn span(work: &mut dyn FnMut()) -> u32 {
    // Not knowing what it calls, the compiler can neither inline it nor move parts of it out.
    let work = black_box(work);
    let start = timer::start();
    work();
    timer::since(start)
}

#[cfg(target_arch = "arm")]
mod timer {
    use cortex_m::peripheral::syst::SystClkSource;
    use cortex_m::peripheral::{Peripherals, SYST};

    /// Largest reload value of the 24-bit down-counter.
    const TOP: u32 = 0x00FF_FFFF;

    fn systick() -> SYST {
        // SAFETY: images have one thread and no interrupt, and only this module has the timer.
        unsafe { Peripherals::steal() }.SYST
    }

    /// Starts the timer anew and returns where it counts down from; the last thing it does is the
    /// write that makes the counter reload.
    #[inline(always)]
    pub(super) fn start() -> u32 {
        let mut systick = systick();
        systick.set_clock_source(SystClkSource::Core);
        systick.disable_interrupt();
        systick.set_reload(TOP);
        systick.enable_counter();
        systick.clear_current();
        TOP
    }

    /// Instructions since `start`. The counter takes a tick to reload and, read within a tick,
    /// shows the value before it: two ticks more have begun than it has counted down. With at
    /// least one tick per instruction, rounding down then gives the exact count.
    #[inline(always)]
    pub(super) fn since(start: u32) -> u32 {
        let left = SYST::get_current();
        if systick().has_wrapped() {
            crate::exit::failure("the span to count is too long for the timer");
        }
        let begun = u64::from(start - left) + 2;
        (begun * 1_000_000_000 / crate::TICKS_PER_BILLION) as u32
    }
}

#[cfg(target_arch = "riscv32")]
mod timer {
    use riscv::register::minstret;

    /// The low half of the counter, which wraps after 4 thousand million instructions.
    #[inline(always)]
    pub(super) fn start() -> u32 {
        minstret::read() as u32
    }

    /// Instructions since `start`.
    #[inline(always)]
    pub(super) fn since(start: u32) -> u32 {
        (minstret::read() as u32).wrapping_sub(start)
    }
}

//! The end of a run: exit status, panics and faults.

use crate::console;

/// Exit status of a run, as the emulator returns it.
mod status {
    pub(super) const SUCCESS: i32 = 0;
    pub(super) const FAILURE: i32 = 1;
    #[cfg(not(feature = "prove-no-panic"))]
    pub(super) const PANIC: i32 = 101;
    pub(super) const FAULT: i32 = 102;
    pub(super) const OUTPUT_LOST: i32 = 103;
}

fn with_status(status: i32) -> ! {
    console::flush();
    semihosting::process::exit(status)
}

/// Ends the run with exit status 0.
pub fn success() -> ! {
    with_status(status::SUCCESS)
}

/// Prints `reason` as the last line and ends the run with exit status 1.
pub fn failure(reason: &str) -> ! {
    console::text(reason);
    console::text("\n");
    with_status(status::FAILURE)
}

/// Ends the run with exit status 103, where not even the console works.
pub(crate) fn without_output() -> ! {
    semihosting::process::exit(status::OUTPUT_LOST)
}

/// Prints the panic's message and place and ends the run with exit status 101.
#[cfg(not(feature = "prove-no-panic"))]
#[panic_handler]
fn panic(info: &core::panic::PanicInfo<'_>) -> ! {
    console::formatted(format_args!("{info}\n"));
    with_status(status::PANIC)
}

/// Exists to be absent: if a branch that can panic is left, the linker asks for the symbol.
#[cfg(feature = "prove-no-panic")]
#[panic_handler]
fn panic(_: &core::panic::PanicInfo<'_>) -> ! {
    unsafe extern "C" {
        fn a_branch_that_can_panic_is_left() -> !;
    }
    // SAFETY: an image that holds this call does not link, so it is never made.
    unsafe { a_branch_that_can_panic_is_left() }
}

/// Reports a fault and ends the run with exit status 102.
fn fault(kind: &str, cause: u32, address: u32) -> ! {
    console::text(kind);
    console::text(": cause, address\n");
    console::line(&[cause, address]);
    with_status(status::FAULT)
}

#[cfg(target_arch = "arm")]
mod handlers {
    use cortex_m_rt::{ExceptionFrame, exception};

    #[exception]
    unsafe fn HardFault(frame: &ExceptionFrame) -> ! {
        super::fault("hard fault", 3, frame.pc())
    }

    #[exception]
    unsafe fn DefaultHandler(number: i16) -> ! {
        super::fault("exception without a handler", number as u32, 0)
    }
}

#[cfg(target_arch = "riscv32")]
mod handlers {
    use riscv::register::{mcause, mepc};

    // The names by which riscv-rt's linker script finds the handlers of traps and interrupts.
    #[unsafe(export_name = "ExceptionHandler")]
    fn exception(_: &riscv_rt::TrapFrame) -> ! {
        super::fault(
            "exception",
            mcause::read().bits() as u32,
            mepc::read() as u32,
        )
    }

    #[unsafe(export_name = "DefaultHandler")]
    fn interrupt() -> ! {
        super::fault(
            "interrupt",
            mcause::read().bits() as u32,
            mepc::read() as u32,
        )
    }
}

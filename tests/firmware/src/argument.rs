//! The text that the test hands to the image.

use core::ffi::CStr;

use semihosting::sys::arm_compat::syscall::{OperationNumber, ParamRegW, syscall};

/// Text given to the emulator for this run, read into `buffer`; without one it is the path of
/// the image. Ends the run with exit status 1 where the text does not fit together with the zero
/// that ends it.
pub fn argument(buffer: &mut [u8]) -> &CStr {
    buffer.fill(0);
    let length = buffer.len();
    let mut parameters = [ParamRegW::buf(buffer), ParamRegW::usize(length)];
    // SAFETY: SYS_GET_CMDLINE takes these two parameters, writes bytes to `buffer` only, the last
    // of them zero, changes the parameters, and returns zero where the text fits. The safe wrapper
    // holds a branch that can panic.
    let failed = unsafe {
        syscall(
            OperationNumber::SYS_GET_CMDLINE,
            ParamRegW::block(&mut parameters),
        )
    };
    match CStr::from_bytes_until_nul(buffer) {
        Ok(text) if failed.usize() == 0 => text,
        _ => crate::exit::failure("the argument does not fit"),
    }
}

//! The text that the test hands to the image.

use core::mem::MaybeUninit;

use semihosting::sys::arm_compat::sys_get_cmdline_uninit;

/// Text given to the emulator for this run, read into `buffer`; without one it is the path of
/// the image. Ends the run with exit status 1 where the text is not UTF-8 or does not fit
/// together with the zero that ends it.
pub fn argument(buffer: &mut [u8]) -> &str {
    buffer.fill(0);
    // SAFETY: the emulator writes bytes, and only initialised bytes are safe to write as such.
    let place = unsafe { &mut *(core::ptr::from_mut(buffer) as *mut [MaybeUninit<u8>]) };
    match sys_get_cmdline_uninit(place).map(|text| core::str::from_utf8(text)) {
        Ok(Ok(text)) => text,
        _ => crate::exit::failure("the argument does not fit or is not UTF-8"),
    }
}

//! A file of the desktop's, read from its start over semihosting.
//!
//! By system calls and not by their safe wrappers, which hold branches that can panic.

use core::ffi::CStr;

use semihosting::fd::RawFd;
use semihosting::sys::arm_compat::syscall::{OperationNumber, ParamRegW, syscall};
use semihosting::sys::arm_compat::{OpenMode, sys_open};

use crate::exit;

/// An open file.
pub struct File(RawFd);

impl File {
    /// Opens the file at `path`; ends the run with exit status 1 where that fails.
    pub fn open(path: &CStr) -> Self {
        match sys_open(path, OpenMode::RDONLY_BINARY) {
            Ok(file) => Self(file.into_raw_fd()),
            Err(_) => exit::failure("cannot open the file that the argument names"),
        }
    }

    /// Reads into `buffer` and returns how many bytes: fewer than it holds only where the file
    /// ends. Ends the run with exit status 1 where reading fails.
    pub fn read(&mut self, buffer: &mut [u8]) -> usize {
        let length = buffer.len();
        let mut parameters = [
            ParamRegW::raw_fd(self.0),
            ParamRegW::buf(buffer),
            ParamRegW::usize(length),
        ];
        // SAFETY: SYS_READ takes these three parameters, writes bytes to `buffer` only and returns
        // how many of its bytes are left unwritten.
        let missing =
            unsafe { syscall(OperationNumber::SYS_READ, ParamRegW::block(&mut parameters)) };
        match length.checked_sub(missing.usize()) {
            Some(read) => read,
            None => exit::failure("cannot read the file that the argument names"),
        }
    }
}

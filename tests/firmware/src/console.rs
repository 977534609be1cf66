//! Buffered text output over semihosting.
//!
//! One semihosting call stops the emulator for longer than formatting a line takes, so text is
//! collected and handed over a block at a time. [`exit`](crate::exit) hands over the rest.
//! [`text`], [`line`] and [`number`] hold no branch that can panic; [`print!`](crate::print!)
//! goes through `core::fmt` and makes no such promise.

use core::cell::RefCell;
use core::fmt;

use semihosting::fd::RawFd;
use semihosting::sys::arm_compat::syscall::{OperationNumber, ParamRegR, syscall_readonly};
use semihosting::sys::arm_compat::{OpenMode, sys_open};

/// Bytes collected before they are handed over.
const BLOCK: usize = 1024;

struct Console {
    stdout: Option<RawFd>,
    block: [u8; BLOCK],
    filled: usize,
}

struct Shared(RefCell<Console>);

// SAFETY: images run on one core and enable no interrupt; a fault that arrives while the console
// is borrowed finds it borrowed and writes nothing.
unsafe impl Sync for Shared {}

static CONSOLE: Shared = Shared(RefCell::new(Console {
    stdout: None,
    block: [0; BLOCK],
    filled: 0,
}));

impl Console {
    fn push(&mut self, text: &[u8]) {
        for &byte in text {
            if self.filled >= BLOCK {
                self.flush();
            }
            if let Some(place) = self.block.get_mut(self.filled) {
                *place = byte;
                self.filled += 1;
            }
        }
    }

    /// Hands the block over; output that is lost ends the run, because a test would otherwise
    /// judge half of it.
    fn flush(&mut self) {
        let block = self.block.get(..self.filled).unwrap_or_default();
        self.filled = 0;
        if self.stdout.is_none() {
            // The name that stands for the host's standard output.
            let opened = sys_open(c":tt", OpenMode::WRONLY_TRUNC);
            self.stdout = opened.map(|stdout| stdout.into_raw_fd()).ok();
        }
        match self.stdout {
            Some(stdout) if write(stdout, block) => {}
            _ => crate::exit::without_output(),
        }
    }
}

/// Writes the block and returns whether all of it arrived. Not by the safe wrapper, which holds
/// an assertion that would stand in the way of a proof that an image cannot panic.
fn write(stdout: RawFd, block: &[u8]) -> bool {
    let parameters = [
        ParamRegR::raw_fd(stdout),
        ParamRegR::buf(block),
        ParamRegR::usize(block.len()),
    ];
    // SAFETY: SYS_WRITE takes these three parameters, reads `block` only and returns how many
    // bytes it did not write.
    let missing =
        unsafe { syscall_readonly(OperationNumber::SYS_WRITE, ParamRegR::block(&parameters)) };
    missing.usize() == 0
}

impl fmt::Write for Console {
    fn write_str(&mut self, text: &str) -> fmt::Result {
        self.push(text.as_bytes());
        Ok(())
    }
}

fn with(action: impl FnOnce(&mut Console)) {
    if let Ok(mut console) = CONSOLE.0.try_borrow_mut() {
        action(&mut console);
    }
}

/// Prints `text` as it is.
pub fn text(text: &str) {
    with(|console| console.push(text.as_bytes()));
}

/// Prints `words` in hexadecimal, eight digits each, a blank between, as one line.
pub fn line(words: &[u32]) {
    with(|console| {
        for (place, &word) in words.iter().enumerate() {
            let mut digits = [b' '; 9];
            for (digit, shift) in digits.iter_mut().skip(1).zip((0..8).rev()) {
                let nibble = (word >> (4 * shift)) as u8 & 15;
                *digit = if nibble < 10 {
                    b'0' + nibble
                } else {
                    b'a' - 10 + nibble
                };
            }
            let blank = usize::from(place == 0);
            console.push(digits.get(blank..).unwrap_or_default());
        }
        console.push(b"\n");
    });
}

/// Prints `value` in decimal, without a line end.
pub fn number(value: u64) {
    let mut digits = [0; 20];
    let mut rest = value;
    let mut length = 0;
    for digit in digits.iter_mut().rev() {
        *digit = b'0' + (rest % 10) as u8;
        rest /= 10;
        length += 1;
        if rest == 0 {
            break;
        }
    }
    let unused = digits.len() - length;
    with(|console| console.push(digits.get(unused..).unwrap_or_default()));
}

/// Prints `name`, a blank, `value` in decimal, as one line.
pub fn figure(name: &str, value: u64) {
    text(name);
    text(" ");
    number(value);
    text("\n");
}

/// Prints formatted text; [`print!`](crate::print!) calls it.
pub fn formatted(arguments: fmt::Arguments<'_>) {
    with(|console| {
        // The console's `write_str` never fails, and a failing `Display` only loses its text.
        let _ = fmt::Write::write_fmt(console, arguments);
    });
}

/// Hands over what was printed so far.
pub fn flush() {
    with(Console::flush);
}

/// Prints formatted text, as `print!` does on a desktop.
#[macro_export]
macro_rules! print {
    ($($argument:tt)*) => { $crate::console::formatted(format_args!($($argument)*)) };
}

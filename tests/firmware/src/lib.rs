//! What every image needs: start-up, output, exit status, instruction counter, stack gauge.
//!
//! An image is a file in `src/bin`:
//! ```ignore
//! #![no_std]
//! #![no_main]
//! use stagebits_firmware::{console, entry, exit};
//!
//! #[entry]
//! fn main() -> ! {
//!     console::line(&[0xCAFE_F00D]);
//!     exit::success()
//! }
//! ```
#![no_std]

mod argument;
pub mod checksum;
pub mod console;
pub mod count;
pub mod exit;
pub mod file;
pub mod logged;
pub mod points;
pub mod seven_stages;
pub mod stack;
pub mod words;

pub use argument::argument;
#[cfg(target_arch = "arm")]
pub use cortex_m_rt::entry;
#[cfg(target_arch = "riscv32")]
pub use riscv_rt::entry;

include!(concat!(env!("OUT_DIR"), "/core.rs"));

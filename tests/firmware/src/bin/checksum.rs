//! Prints many lines of words, each a step of the checksum.
#![no_std]
#![no_main]

use stagebits_firmware::checksum::{Stream, mix};
use stagebits_firmware::{console, entry, exit};

const LINES: usize = 20_000;

#[entry]
fn main() -> ! {
    let mut sum = 0;
    for word in Stream(1).take(LINES) {
        sum = mix(sum, word);
        console::line(&[
            (word >> 32) as u32,
            word as u32,
            (sum >> 32) as u32,
            sum as u32,
        ]);
    }
    console::figure("sum", sum);
    exit::success()
}

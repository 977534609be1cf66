//! Counter-example of the proofs: holds a branch that can panic, arithmetic in floating point and
//! a heap.
#![no_std]
#![no_main]

extern crate alloc;

use core::alloc::{GlobalAlloc, Layout};
use core::hint::black_box;

use stagebits_firmware::{console, entry, exit};

/// Has room for nothing: the image is linked and not run.
struct Heap;

// SAFETY: gives out no memory, which an allocator may always refuse.
unsafe impl GlobalAlloc for Heap {
    unsafe fn alloc(&self, _: Layout) -> *mut u8 {
        core::ptr::null_mut()
    }

    unsafe fn dealloc(&self, _: *mut u8, _: Layout) {}
}

#[global_allocator]
static HEAP: Heap = Heap;

#[entry]
fn main() -> ! {
    let number = black_box(7_u32);
    let ratio = black_box(1.5_f64) / f64::from(number);
    let list = alloc::vec![ratio.to_bits(); number as usize];
    console::figure("element", list[black_box(3)]);
    exit::success()
}

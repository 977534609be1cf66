//! Ends in the way that the emulator's argument names.
#![no_std]
#![no_main]

use core::arch::asm;
use core::hint::black_box;

use stagebits_firmware::{argument, count, entry, exit, print};

#[entry]
fn main() -> ! {
    let mut buffer = [0; 64];
    let Ok(ending) = argument(&mut buffer).to_str() else {
        exit::failure("the argument is not UTF-8");
    };
    print!("ending: {ending}\n");
    match ending {
        "success" => exit::success(),
        "failure" => exit::failure("told to fail"),
        "panic" => panic!("told to panic"),
        "fault" => {
            // SAFETY: an instruction that is undefined for ever; it must not be passed.
            #[cfg(target_arch = "arm")]
            unsafe {
                asm!("udf #0")
            };
            // SAFETY: as above.
            #[cfg(target_arch = "riscv32")]
            unsafe {
                asm!("unimp")
            };
            exit::failure("an undefined instruction did not fault")
        }
        "hang" => loop {
            core::hint::spin_loop();
        },
        "count" => {
            let spins = count::instructions(|| {
                for spin in 0..20_000_000_u32 {
                    black_box(spin);
                }
            });
            print!("counted {spins}\n");
            exit::success()
        }
        _ => exit::failure("unknown ending"),
    }
}

//! Memory layout, linker arguments and clock of the core that the image is built for.

use std::path::PathBuf;
use std::{env, fs};

#[path = "cores.rs"]
#[allow(dead_code, reason = "how to start the emulator is for the tests")]
mod cores;

use cores::{CORES, Core, Counter};

fn main() {
    println!("cargo:rerun-if-changed=build.rs");
    println!("cargo:rerun-if-changed=cores.rs");
    let target = env::var("TARGET").expect("cargo names the target");
    let Some(core) = CORES.iter().find(|core| core.target == target) else {
        let known: Vec<_> = CORES.iter().map(|core| core.target).collect();
        panic!(
            "no emulated core for target {target}; known: {}",
            known.join(", ")
        );
    };
    let out = PathBuf::from(env::var_os("OUT_DIR").expect("cargo names the output directory"));
    fs::write(out.join("memory.x"), memory(core)).expect("memory.x is writable");
    fs::write(out.join("core.rs"), constants(core)).expect("core.rs is writable");
    println!("cargo:rustc-link-search={}", out.display());
    let scripts: &[&str] = match core.counter {
        // cortex-m-rt's script includes memory.x, riscv-rt's wants it first.
        Counter::SysTick(_) => &["--nmagic", "-Tlink.x"],
        Counter::Retired => &["--nmagic", "-Tmemory.x", "-Tlink.x"],
    };
    for argument in scripts {
        println!("cargo:rustc-link-arg-bins={argument}");
    }
    if env::var_os("CARGO_FEATURE_LOG").is_some() {
        println!("cargo:rustc-link-arg-bins=-Tdefmt.x");
        // defmt's macros leave out all but errors unless told otherwise
        println!("cargo:rustc-env=DEFMT_LOG=info");
    }
}

fn memory(core: &Core) -> String {
    let mut script = format!(
        "MEMORY\n{{\n  FLASH : ORIGIN = {:#x}, LENGTH = {}\n  RAM : ORIGIN = {:#x}, LENGTH = {}\n}}\n",
        core.flash.origin, core.flash.bytes, core.ram.origin, core.ram.bytes
    );
    if matches!(core.counter, Counter::Retired) {
        for (region, place) in [
            ("TEXT", "FLASH"),
            ("RODATA", "FLASH"),
            ("DATA", "RAM"),
            ("BSS", "RAM"),
            ("HEAP", "RAM"),
            ("STACK", "RAM"),
        ] {
            script += &format!("REGION_ALIAS(\"REGION_{region}\", {place});\n");
        }
    }
    script
}

fn constants(core: &Core) -> String {
    let clock = match core.counter {
        Counter::SysTick(hertz) => format!(
            "/// SysTick ticks in 10^9 instructions.\n\
             pub(crate) const TICKS_PER_BILLION: u64 = {};\n",
            hertz << core.shift
        ),
        Counter::Retired => String::new(),
    };
    format!(
        "/// Name of the core.\npub const CORE: &str = {:?};\n{clock}",
        core.name
    )
}

//! Builds images for the emulated cores and runs them.
//!
//! Nothing here skips: what is missing is named in a [`Failure`], with the command that installs
//! it.
#![allow(dead_code, unused_imports, reason = "each test uses the part it needs")]

use std::fmt;
use std::io::Read;
use std::path::Path;
use std::process::{Command, Stdio};
use std::thread;
use std::time::Duration;

use wait_timeout::ChildExt;

#[path = "compiler.rs"]
mod compiler;
#[path = "../firmware/cores.rs"]
mod cores;
#[path = "footprint.rs"]
mod footprint;
#[path = "symbols.rs"]
mod symbols;

pub(crate) use compiler::{build, compiler_version, lint};
pub(crate) use cores::{CORES, Core, Counter};
pub(crate) use footprint::{Footprint, footprint};
pub(crate) use symbols::{Unwanted, symbols, unwanted};

/// Longest time that a run may take unless the test says otherwise: many times what any needs.
pub(crate) const TIME_LIMIT: Duration = Duration::from_secs(120);

/// Why an image could not be built, run or read. `Debug` prints the plain text, so that a test
/// can return it.
pub(crate) struct Failure(pub(crate) String);

impl fmt::Debug for Failure {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(&self.0)
    }
}

/// The core with this name; its absence is a mistake in the test.
pub(crate) fn core(name: &str) -> &'static Core {
    CORES
        .iter()
        .find(|core| core.name == name)
        .expect("a core from tests/firmware/cores.rs")
}

/// What a finished run left.
#[derive(Debug)]
pub(crate) struct Output {
    /// All that the image printed.
    pub(crate) stdout: String,
    /// Its exit status: 0 success, 1 failure, 101 panic, 102 fault, 103 output lost.
    pub(crate) status: i32,
}

/// Runs `elf` on `core` and returns what it printed, whatever its exit status.
pub(crate) fn run(core: &Core, elf: &Path) -> Result<Output, Failure> {
    run_within(core, elf, None, TIME_LIMIT)
}

/// Runs `elf` on `core` and returns what it printed if it ended well.
pub(crate) fn stdout(core: &Core, elf: &Path) -> Result<String, Failure> {
    let output = run(core, elf)?;
    if output.status == 0 {
        return Ok(output.stdout);
    }
    let tail: Vec<_> = output.stdout.lines().rev().take(5).collect();
    let tail: Vec<_> = tail.into_iter().rev().collect();
    Err(Failure(format!(
        "{} on {}: exit status {}; its last lines:\n{}",
        elf.display(),
        core.name,
        output.status,
        tail.join("\n")
    )))
}

/// Runs `elf` on `core`, with a text that the image can ask for, for at most `limit`.
pub(crate) fn run_within(
    core: &Core,
    elf: &Path,
    argument: Option<&str>,
    limit: Duration,
) -> Result<Output, Failure> {
    let (stdout, status) = run_raw(core, elf, argument, limit)?;
    Ok(Output {
        stdout: text(&stdout),
        status,
    })
}

/// As [`run_within`], for an image whose output is no text: its bytes and the exit status.
pub(crate) fn run_raw(
    core: &Core,
    elf: &Path,
    argument: Option<&str>,
    limit: Duration,
) -> Result<(Vec<u8>, i32), Failure> {
    let mut semihosting = String::from("enable=on,target=native");
    if let Some(argument) = argument {
        // The emulator's option parser takes a doubled comma for a comma.
        semihosting += &format!(",arg={}", argument.replace(',', ",,"));
    }
    let mut child = Command::new(core.emulator)
        .args(core.machine)
        .args(["-display", "none", "-monitor", "none", "-serial", "none"])
        .arg("-icount")
        .arg(format!("shift={}", core.shift))
        .arg("-semihosting-config")
        .arg(semihosting)
        .arg("-kernel")
        .arg(elf)
        .stdin(Stdio::null())
        .stdout(Stdio::piped())
        .stderr(Stdio::piped())
        .spawn()
        .map_err(|error| {
            Failure(format!(
                "cannot start {} ({error}); install it: apt-get install {}",
                core.emulator, core.package
            ))
        })?;
    let stdout = collect(child.stdout.take().expect("stdout is piped"));
    let stderr = collect(child.stderr.take().expect("stderr is piped"));
    let ended = child.wait_timeout(limit);
    if !matches!(ended, Ok(Some(_))) {
        // Fails only for a child that is gone already.
        let _ = child.kill();
        let _ = child.wait();
    }
    let bytes =
        |reader: thread::JoinHandle<Vec<u8>>| reader.join().expect("reading does not panic");
    let (stdout, stderr) = (bytes(stdout), text(&bytes(stderr)));
    let what = format!("{} on {} ({})", elf.display(), core.name, core.emulator);
    let ended = ended.map_err(|error| Failure(format!("{what}: cannot wait: {error}")))?;
    let Some(ended) = ended else {
        let stdout = text(&stdout);
        let last = stdout.lines().last().unwrap_or("nothing");
        return Err(Failure(format!(
            "{what}: stopped at the time limit of {} s; printed last: {last}\n{stderr}",
            limit.as_secs_f64()
        )));
    };
    let Some(status) = ended.code() else {
        return Err(Failure(format!(
            "{what}: the emulator died of {ended}\n{stderr}"
        )));
    };
    if !stderr.is_empty() {
        // The emulator complains there: of its arguments, of an image it cannot load, of accesses
        // outside all memory.
        return Err(Failure(format!(
            "{what}: exit status {status}, and complaints:\n{stderr}"
        )));
    }
    Ok((stdout, status))
}

fn text(bytes: &[u8]) -> String {
    String::from_utf8_lossy(bytes).into_owned()
}

fn collect(mut pipe: impl Read + Send + 'static) -> thread::JoinHandle<Vec<u8>> {
    thread::spawn(move || {
        let mut bytes = Vec::new();
        // A pipe that breaks ends the text; the exit status tells why.
        let _ = pipe.read_to_end(&mut bytes);
        bytes
    })
}

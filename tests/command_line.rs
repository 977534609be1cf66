//! The program `stagebits` as its users meet it: arguments, streams, exit statuses and files.

#[path = "command_line/agreement.rs"]
mod agreement;
#[path = "command_line/bad_input.rs"]
mod bad_input;
#[path = "command_line/exit_status.rs"]
mod exit_status;
#[path = "command_line/help.rs"]
mod help;
#[path = "command_line/json.rs"]
mod json;
#[path = "command_line/output_file.rs"]
mod output_file;
#[cfg(unix)]
#[path = "command_line/permissions.rs"]
mod permissions;
#[path = "command_line/repeatability.rs"]
mod repeatability;
#[path = "command_line/response.rs"]
mod response;
#[path = "command_line/sizing.rs"]
mod sizing;
#[path = "command_line/switches.rs"]
mod switches;
#[path = "command_line/text.rs"]
mod text;
#[path = "command_line/usage.rs"]
mod usage;

use std::ffi::OsStr;
use std::fs;
use std::path::{Path, PathBuf};
use std::process::Output;

use assert_cmd::Command;
use assert_cmd::cargo::cargo_bin_cmd;
use tempfile::TempDir;

const COMMANDS: [&str; 3] = ["respond", "budget", "size"];

/// Those that search the envelope.
const SEARCHES: [&str; 2] = ["budget", "size"];

const EXAMPLES: [&str; 4] = [
    "handheld-impedance-meter",
    "mountain-hut-tuner",
    "shore-station",
    "tide-gauge-buoy",
];

/// A chain file that is right.
const CHAIN: &str = r#"title = "buoy"
[band]
from = "2 MHz"
to = "12 MHz"
[load]
swr_up_to = 10
[accuracy]
gamma = 1e-4
[[stage]]
shunt = { capacitance = "220 pF" }
"#;

fn example(name: &str) -> PathBuf {
    let root = Path::new(env!("CARGO_MANIFEST_DIR")).join("..");
    root.join("examples").join(name).with_extension("toml")
}

/// A folder that holds [`CHAIN`] as `chain.toml`.
fn folder() -> TempDir {
    folder_with(CHAIN)
}

fn folder_with(chain: impl AsRef<[u8]>) -> TempDir {
    let folder = tempfile::tempdir().expect("a folder for the test");
    fs::write(folder.path().join("chain.toml"), chain).expect("a file for the test");
    folder
}

/// The names in a folder, in order.
fn names(folder: &Path) -> Vec<String> {
    let entries = fs::read_dir(folder).expect("a folder");
    let mut names: Vec<_> = entries
        .map(|entry| entry.expect("an entry").file_name().display().to_string())
        .collect();
    names.sort();
    names
}

/// What a run left behind.
#[derive(Debug, PartialEq, Eq)]
struct Run {
    status: i32,
    stdout: String,
    stderr: String,
}

impl From<Output> for Run {
    fn from(output: Output) -> Self {
        Self {
            status: output.status.code().expect("no signal ended the program"),
            stdout: String::from_utf8(output.stdout).expect("text"),
            stderr: String::from_utf8(output.stderr).expect("text"),
        }
    }
}

impl Run {
    /// Standard output of a run that was right in every way and met the accuracy.
    fn result(self) -> String {
        assert_eq!((self.status, self.stderr.as_str()), (0, ""));
        self.stdout
    }
}

fn stagebits() -> Command {
    cargo_bin_cmd!("stagebits")
}

/// Runs the program in `folder`.
fn run_in<S: AsRef<OsStr>>(folder: &Path, arguments: impl IntoIterator<Item = S>) -> Run {
    let mut command = stagebits();
    command.current_dir(folder).args(arguments);
    command.output().expect("the program starts").into()
}

/// Runs a command on one of the examples; a search over few points, to be quick.
fn run_example(command: &str, name: &str, arguments: &[&str]) -> Run {
    let mut run = stagebits();
    run.arg(command).arg(example(name)).args(arguments);
    if SEARCHES.contains(&command) {
        run.args(["--points", "2000"]);
    }
    run.output().expect("the program starts").into()
}

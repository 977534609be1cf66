//! The exit status says how it went; what a stream has to do with it.

use std::io::{BufRead, BufReader};
use std::process::{Command, Stdio};

use assert_cmd::cargo::cargo_bin;

use super::{COMMANDS, example, folder, names, run_example, run_in};

#[test]
fn met() {
    for command in COMMANDS {
        for name in super::EXAMPLES {
            let run = run_example(command, name, &[]);
            assert_eq!(
                (run.status, run.stderr.as_str()),
                (0, ""),
                "{command} {name}"
            );
        }
    }
}

#[test]
fn not_met() {
    // sixteen bits are good for about 1e-3
    let run = run_example("budget", "tide-gauge-buoy", &["--word-bits", "16"]);
    assert_eq!((run.status, run.stderr.as_str()), (1, ""));
    assert!(
        run.stdout.contains("\naccuracy    NOT met, "),
        "{}",
        run.stdout
    );

    let run = run_example("budget", "tide-gauge-buoy", &["--word-bits=16", "--json"]);
    assert_eq!((run.status, run.stderr.as_str()), (1, ""));
}

#[test]
fn not_met_with_an_output_file() {
    let folder = folder();
    let run = run_in(
        folder.path(),
        "budget chain.toml --word-bits 10 --points 100 --output result".split(' '),
    );
    assert_eq!(
        (run.status, run.stdout.as_str(), run.stderr.as_str()),
        (1, "", "")
    );
    assert_eq!(names(folder.path()), ["chain.toml", "result"]);
}

#[test]
fn respond_has_no_accuracy_to_meet() {
    run_example("respond", "tide-gauge-buoy", &["--word-bits", "10"]).result();
}

/// Expects status 3 where `output` cannot be written, and nothing but the error.
fn not_written(output: &str, reason: &str) {
    let folder = folder();
    for command in COMMANDS {
        let run = run_in(folder.path(), [command, "chain.toml", "--output", output]);
        assert_eq!((run.status, run.stdout.as_str()), (3, ""), "{run:?}");
        let start = format!("error: cannot write {output}: ");
        assert!(run.stderr.starts_with(&start), "{}", run.stderr);
        assert!(run.stderr.contains(reason), "{}", run.stderr);
        assert_eq!(names(folder.path()), ["chain.toml"]);
    }
}

#[test]
fn output_in_no_directory() {
    not_written("nowhere/result", "nowhere is not a directory");
}

#[test]
fn output_is_a_directory() {
    not_written(".", "is a directory");
}

#[test]
fn output_in_a_file() {
    not_written("chain.toml/result", "directory");
}

#[test]
fn bad_input_goes_before_an_output_that_cannot_be_written() {
    let folder = super::folder_with("");
    let run = run_in(
        folder.path(),
        ["respond", "chain.toml", "--output", "nowhere/result"],
    );
    assert_eq!(run.status, 2, "{run:?}");
}

#[cfg(target_os = "linux")]
#[test]
fn standard_output_on_a_full_device() {
    for command in COMMANDS {
        let full = std::fs::OpenOptions::new().write(true).open("/dev/full");
        let output = Command::new(cargo_bin!("stagebits"))
            .arg(command)
            .arg(example("tide-gauge-buoy"))
            .stdout(full.expect("a full device"))
            .output()
            .expect("the program starts");
        assert_eq!(output.status.code(), Some(3));
        let error = String::from_utf8_lossy(&output.stderr);
        assert!(
            error.starts_with("error: cannot write standard output: "),
            "{error}"
        );
    }
}

/// A reader such as `head -1` leaves while the program still writes.
#[test]
fn reader_that_leaves_early_is_no_error() {
    /// More than the pipes of any system hold.
    const PIPE: usize = 1 << 17;
    let folder = super::folder_with(super::CHAIN.replace("[load]", "points = 1000\n[load]"));
    let arguments = ["respond", "chain.toml", "--json"];
    let whole = run_in(folder.path(), arguments).result();
    assert!(whole.len() > PIPE, "{} bytes fit a pipe", whole.len());

    let mut program = Command::new(cargo_bin!("stagebits"))
        .current_dir(folder.path())
        .args(arguments)
        .stdout(Stdio::piped())
        .stderr(Stdio::piped())
        .spawn()
        .expect("the program starts");
    let mut first = String::new();
    let mut reader = BufReader::with_capacity(1, program.stdout.take().expect("a pipe"));
    reader.read_line(&mut first).expect("a line");
    drop(reader);
    let rest = program.wait_with_output().expect("an end");
    assert_eq!(first, "{\n");
    assert_eq!(String::from_utf8_lossy(&rest.stderr), "");
    assert_eq!(rest.status.code(), Some(0));
}

//! `--help` fits a terminal of 24 lines of 80 columns, and its examples work.

use std::fs;

use super::{COMMANDS, example, run_in};

fn help(arguments: &[&str]) -> String {
    let folder = tempfile::tempdir().expect("a folder for the test");
    run_in(folder.path(), arguments).result()
}

#[test]
fn fits_a_small_terminal() {
    let of_commands = COMMANDS.map(|command| help(&[command, "--help"]));
    for help in [help(&["--help"])].iter().chain(&of_commands) {
        assert!(help.lines().count() <= 24, "{help}");
        for line in help.lines() {
            assert!(line.chars().count() <= 80, "{line}");
        }
    }
}

#[test]
fn is_the_same_however_asked_for() {
    assert_eq!(help(&["--help"]), help(&["-h"]));
    for command in COMMANDS {
        assert_eq!(help(&[command, "--help"]), help(&[command, "-h"]));
        assert_eq!(help(&[command, "--help"]), help(&["help", command]));
    }
}

#[test]
fn of_the_program_names_commands_and_exit_statuses() {
    let help = help(&["--help"]);
    for command in COMMANDS {
        assert!(help.contains(&format!("\n  {command}  ")), "{help}");
    }
    let statuses = help.split_whitespace().collect::<Vec<_>>().join(" ");
    assert!(
        statuses.contains(
            "Exit status: 0 met, 1 accuracy not met, 2 bad input or usage, 3 result not written."
        ),
        "{help}"
    );
}

#[test]
fn of_each_command_names_every_option() {
    let shared = ["<FILE>", "--json", "--output <PATH>"];
    let words = "--word-bits <BITS>";
    let search = ["--points <POINTS>", "--seed <SEED>"];
    for (command, own) in [
        ("respond", &[words, "--load <R, X>"][..]),
        ("budget", &[words, search[0], search[1]]),
        ("size", &search),
    ] {
        let help = help(&[command, "--help"]);
        for option in shared.iter().chain(own) {
            assert!(help.contains(option), "{option} in\n{help}");
        }
    }
}

/// Runs the example of a help text as a shell would, with the chain files that it names.
#[cfg(unix)]
#[test]
fn examples_work() {
    use std::process::Command;

    use assert_cmd::cargo::cargo_bin;

    let folder = tempfile::tempdir().expect("a folder for the test");
    let buoy = example("tide-gauge-buoy");
    fs::create_dir(folder.path().join("examples")).expect("a folder for the test");
    for name in ["buoy.toml", "examples/tide-gauge-buoy.toml"] {
        fs::copy(&buoy, folder.path().join(name)).expect("a copy");
    }
    for (arguments, status) in [
        (&["--help"][..], 0),
        (&["respond", "--help"], 0),
        // sixteen bits are too few for the buoy
        (&["budget", "--help"], 1),
        (&["size", "--help"], 0),
    ] {
        let help = help(arguments);
        let line = help
            .lines()
            .find_map(|line| line.strip_prefix("Example: stagebits "));
        let script = format!("exec \"$0\" {}", line.expect("an example"));
        let output = Command::new("sh")
            .current_dir(folder.path())
            .args(["-c", &script])
            .arg(cargo_bin!("stagebits"))
            .output()
            .expect("a shell");
        assert_eq!(output.status.code(), Some(status), "{script}");
        assert!(output.stderr.is_empty() && !output.stdout.is_empty());
    }
}

#[test]
fn version_is_that_of_the_package() {
    assert_eq!(
        help(&["--version"]),
        concat!("stagebits ", env!("CARGO_PKG_VERSION"), "\n")
    );
}

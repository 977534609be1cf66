//! Files and their permissions: those a result gets, and those that stand in the way.

use std::fs::{self, File, Permissions};
use std::os::unix::fs::PermissionsExt;
use std::os::unix::process::CommandExt;
use std::path::Path;
use std::process::Command;

use assert_cmd::cargo::cargo_bin;

use super::{CHAIN, Run, folder, names, run_in};

fn set_mode(path: &Path, mode: u32) {
    fs::set_permissions(path, Permissions::from_mode(mode)).expect("permissions set");
}

fn mode(path: &Path) -> u32 {
    fs::metadata(path).expect("a file").permissions().mode() & 0o7777
}

#[test]
fn new_file_has_those_of_any_new_file() {
    for (umask, expected) in [
        ("022", 0o644),
        ("027", 0o640),
        ("002", 0o664),
        ("077", 0o600),
    ] {
        let folder = folder();
        let status = Command::new("sh")
            .current_dir(folder.path())
            .args([
                "-c",
                r#"umask "$1"; exec "$0" respond chain.toml --output result"#,
            ])
            .arg(cargo_bin!("stagebits"))
            .arg(umask)
            .status();
        assert!(status.expect("a shell").success());
        assert_eq!(
            mode(&folder.path().join("result")),
            expected,
            "umask {umask}"
        );
    }
}

#[test]
fn existing_file_keeps_its_own() {
    for kept in [0o600, 0o640, 0o666, 0o755] {
        let folder = folder();
        let result = folder.path().join("result");
        fs::write(&result, "old").expect("a file for the test");
        set_mode(&result, kept);
        run_in(
            folder.path(),
            ["respond", "chain.toml", "--output", "result"],
        )
        .result();
        assert_eq!(mode(&result), kept);
    }
}

/// Runs the program in `folder` as a user whom permissions bind: the one of the test or, where
/// that is root, nobody. `None` where the system does not let root change into nobody.
fn run_bound(folder: &Path, arguments: &[&str]) -> Option<Run> {
    const NOBODY: u32 = 65534;
    let place = tempfile::tempdir().expect("a folder for the test");
    let probe = place.path().join("probe");
    File::create(&probe).expect("a file for the test");
    set_mode(&probe, 0);
    let mut command = if File::open(&probe).is_err() {
        Command::new(cargo_bin!("stagebits"))
    } else {
        // where the program was built nobody may not look
        let program = place.path().join("stagebits");
        let copied = Command::new("cp")
            .arg(cargo_bin!("stagebits"))
            .arg(&program)
            .status();
        assert!(copied.expect("cp").success());
        set_mode(place.path(), 0o755);
        set_mode(&program, 0o755);
        let mut command = Command::new(program);
        command.uid(NOBODY).gid(NOBODY);
        command
    };
    match command.current_dir(folder).args(arguments).output() {
        Err(error) if error.kind() == std::io::ErrorKind::PermissionDenied => {
            eprintln!("not tested: nobody cannot be run as");
            None
        }
        output => Some(output.expect("the program starts").into()),
    }
}

#[test]
fn chain_file_without_permission_is_bad_input() {
    let folder = folder();
    set_mode(folder.path(), 0o777);
    set_mode(&folder.path().join("chain.toml"), 0);
    for arguments in [
        ["respond", "chain.toml", "--output", "result"],
        ["budget", "chain.toml", "--output", "result"],
    ] {
        let Some(run) = run_bound(folder.path(), &arguments) else {
            return;
        };
        assert_eq!((run.status, run.stdout.as_str()), (2, ""), "{run:?}");
        let lines: Vec<_> = run.stderr.lines().collect();
        assert_eq!(
            lines,
            [
                "chain.toml: cannot read the chain file: Permission denied (os error 13)",
                "help: give the path of a readable chain file"
            ]
        );
        assert_eq!(names(folder.path()), ["chain.toml"]);
    }
}

/// Expects status 3 and no change.
fn not_written(folder: &Path, output: &str) {
    let before = names(folder);
    let arguments = ["respond", "chain.toml", "--output", output];
    let Some(run) = run_bound(folder, &arguments) else {
        return;
    };
    assert_eq!((run.status, run.stdout.as_str()), (3, ""), "{run:?}");
    let start = format!("error: cannot write {output}: Permission denied");
    assert!(run.stderr.starts_with(&start), "{}", run.stderr);
    assert_eq!(names(folder), before);
}

#[test]
fn write_protected_directory() {
    let folder = folder();
    set_mode(&folder.path().join("chain.toml"), 0o644);
    set_mode(folder.path(), 0o555);
    not_written(folder.path(), "result");
    set_mode(folder.path(), 0o755);
}

/// The directory would let the file be replaced; its owner has said otherwise.
#[test]
fn write_protected_file() {
    let folder = folder();
    set_mode(folder.path(), 0o777);
    set_mode(&folder.path().join("chain.toml"), 0o644);
    let result = folder.path().join("result");
    fs::write(&result, "kept").expect("a file for the test");
    set_mode(&result, 0o444);
    not_written(folder.path(), "result");
    assert_eq!(fs::read_to_string(result).expect("a file"), "kept");
}

#[test]
fn write_protected_chain_file_is_read() {
    let folder = folder();
    set_mode(folder.path(), 0o555);
    set_mode(&folder.path().join("chain.toml"), 0o444);
    if let Some(run) = run_bound(folder.path(), &["respond", "chain.toml"]) {
        assert!(run.result().starts_with("buoy\n"));
    }
    set_mode(folder.path(), 0o755);
    let kept = fs::read_to_string(folder.path().join("chain.toml"));
    assert_eq!(kept.expect("the chain file"), CHAIN);
}

/// By a user who may not replace devices: were it ever tried, the test must not harm the system.
#[cfg(target_os = "linux")]
#[test]
fn output_file_on_a_full_device() {
    let folder = folder();
    set_mode(folder.path(), 0o755);
    set_mode(&folder.path().join("chain.toml"), 0o644);
    let arguments = ["respond", "chain.toml", "--output", "/dev/full"];
    if let Some(run) = run_bound(folder.path(), &arguments) {
        assert_eq!((run.status, run.stdout.as_str()), (3, ""), "{run:?}");
        let expected = "error: cannot write /dev/full: No space left on device (os error 28)\n";
        assert_eq!(run.stderr, expected);
    }
}

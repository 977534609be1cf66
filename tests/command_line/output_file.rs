//! `--output`: the file named holds the whole result or what it held before.

use std::fs::{self, File};
use std::io::Read;
use std::path::Path;

use super::{CHAIN, COMMANDS, folder, names, run_in};

fn write_to(folder: &Path, command: &str, output: &str) {
    let run = run_in(folder, [command, "chain.toml", "--output", output]);
    assert_eq!(run.result(), "", "nothing on standard output");
}

/// The result as standard output gets it.
fn expected(folder: &Path, command: &str) -> String {
    run_in(folder, [command, "chain.toml"]).result()
}

#[test]
fn new_file_holds_what_standard_output_would() {
    let folder = folder();
    for command in COMMANDS {
        write_to(folder.path(), command, command);
        let written = fs::read_to_string(folder.path().join(command)).expect("a result");
        assert_eq!(written, expected(folder.path(), command));
    }
    assert_eq!(
        names(folder.path()),
        ["budget", "chain.toml", "respond", "size"]
    );
}

#[test]
fn existing_file_is_replaced_as_a_whole() {
    let folder = folder();
    let path = folder.path().join("result");
    // longer than any result, so that a rest of it would show
    let old = "old\n".repeat(100_000);
    for command in COMMANDS {
        fs::write(&path, &old).expect("a file for the test");
        let mut reader = File::open(&path).expect("the old file");
        write_to(folder.path(), command, "result");
        assert_eq!(
            fs::read_to_string(&path).expect("a result"),
            expected(folder.path(), command)
        );
        // on Windows an open file cannot be replaced like that
        if cfg!(unix) {
            let mut seen = String::new();
            reader.read_to_string(&mut seen).expect("the old file");
            assert_eq!(seen, old, "who reads the old file sees all of it");
        }
    }
    assert_eq!(names(folder.path()), ["chain.toml", "result"]);
}

#[cfg(unix)]
mod links {
    use std::os::unix::fs::{FileTypeExt, symlink};
    use std::process::Command;

    use super::*;

    /// A link to a file is a way to name that file: it stays, and the file is replaced.
    #[test]
    fn link_stays_and_its_target_is_replaced() {
        let folder = folder();
        let results = folder.path().join("results");
        fs::create_dir(&results).expect("a folder for the test");
        fs::write(results.join("today"), "old").expect("a file for the test");
        symlink("today", results.join("latest")).expect("a link");
        symlink("results/latest", folder.path().join("result")).expect("a link");

        write_to(folder.path(), "respond", "result");
        assert_eq!(
            fs::read_to_string(results.join("today")).expect("a result"),
            expected(folder.path(), "respond")
        );
        for link in [folder.path().join("result"), results.join("latest")] {
            assert!(link.is_symlink());
        }
        assert_eq!(names(folder.path()), ["chain.toml", "result", "results"]);
        assert_eq!(names(&results), ["latest", "today"]);
    }

    #[test]
    fn link_to_nothing_yields_its_target() {
        let folder = folder();
        symlink("later", folder.path().join("result")).expect("a link");
        write_to(folder.path(), "respond", "result");
        assert!(folder.path().join("result").is_symlink());
        assert_eq!(
            fs::read_to_string(folder.path().join("later")).expect("a result"),
            expected(folder.path(), "respond")
        );
    }

    #[test]
    fn links_in_a_ring_are_refused() {
        let folder = folder();
        symlink("two", folder.path().join("one")).expect("a link");
        symlink("one", folder.path().join("two")).expect("a link");
        let run = run_in(folder.path(), ["respond", "chain.toml", "--output", "one"]);
        assert_eq!((run.status, run.stdout.as_str()), (3, ""), "{run:?}");
        assert_eq!(names(folder.path()), ["chain.toml", "one", "two"]);
    }

    #[test]
    fn link_to_the_chain_file_is_refused() {
        let folder = folder();
        symlink("chain.toml", folder.path().join("link")).expect("a link");
        for (file, output) in [
            ("chain.toml", "link"),
            ("link", "chain.toml"),
            ("link", "link"),
        ] {
            let run = run_in(folder.path(), ["respond", file, "--output", output]);
            assert_eq!((run.status, run.stdout.as_str()), (2, ""), "{run:?}");
            let kept = fs::read_to_string(folder.path().join("chain.toml"));
            assert_eq!(kept.expect("the chain file"), CHAIN);
        }
    }

    /// What is no file is written to: a file in the place of a device would be a disaster.
    #[test]
    fn pipe_is_written_to_and_stays() {
        let folder = folder();
        let pipe = folder.path().join("pipe");
        let made = Command::new("mkfifo").arg(&pipe).status();
        assert!(made.expect("mkfifo").success());
        let reader = std::thread::spawn({
            let pipe = pipe.clone();
            move || fs::read_to_string(pipe).expect("a result")
        });
        write_to(folder.path(), "respond", "pipe");
        // asked first: with a file in its place the reader would wait for ever
        let kind = fs::metadata(&pipe).expect("a pipe").file_type();
        assert!(kind.is_fifo());
        let read = reader.join().expect("a reader");
        assert_eq!(read, expected(folder.path(), "respond"));
        assert_eq!(names(folder.path()), ["chain.toml", "pipe"]);
    }
}

//! Arguments that are wrong: status 2, nothing on standard output, and an error that names them.

use super::{CHAIN, SEARCHES, folder, names, run_in};

fn refused(arguments: &[&str], named: &[&str]) {
    let folder = folder();
    let run = run_in(folder.path(), arguments);
    assert_eq!((run.status, run.stdout.as_str()), (2, ""), "{run:?}");
    for named in named {
        assert!(
            run.stderr.contains(named),
            "{named} is named:\n{}",
            run.stderr
        );
    }
    assert_eq!(names(folder.path()), ["chain.toml"]);
}

#[test]
fn unknown_option() {
    for command in super::COMMANDS {
        refused(&[command, "chain.toml", "--jsn"], &["'--jsn'", "'--json'"]);
    }
    refused(&["respond", "chain.toml", "--points", "5"], &["'--points'"]);
    for command in SEARCHES {
        refused(&[command, "chain.toml", "--load", "1, 2"], &["'--load'"]);
    }
    let bits = ["size", "chain.toml", "--word-bits", "16"];
    refused(&bits, &["'--word-bits'"]);
}

#[test]
fn unknown_command() {
    refused(&["budge", "chain.toml"], &["'budge'", "'budget'"]);
    refused(&["chain.toml"], &["'chain.toml'", "Usage:"]);
}

#[test]
fn no_command() {
    refused(&[], &["Usage:", "respond", "budget", "size"]);
}

#[test]
fn no_file() {
    for command in super::COMMANDS {
        refused(&[command], &["<FILE>", "Usage:"]);
    }
}

#[test]
fn two_files() {
    for command in super::COMMANDS {
        refused(&[command, "chain.toml", "second.toml"], &["'second.toml'"]);
    }
}

#[test]
fn word_length_out_of_range() {
    for command in ["respond", "budget"] {
        for bits in ["9", "33", "-16", "16.0", ""] {
            let option = format!("--word-bits={bits}");
            refused(&[command, "chain.toml", &option], &["--word-bits"]);
        }
        refused(
            &[command, "chain.toml", "--word-bits", "9"],
            &["9 is not in 10..=32"],
        );
    }
}

#[test]
fn points_out_of_range() {
    for points in ["0", "1000000000001", "-1", "1e6"] {
        let option = format!("--points={points}");
        for command in SEARCHES {
            refused(&[command, "chain.toml", &option], &["--points", points]);
        }
    }
}

#[test]
fn seed_out_of_range() {
    for seed in ["18446744073709551616", "-1", "x"] {
        let option = format!("--seed={seed}");
        for command in SEARCHES {
            refused(&[command, "chain.toml", &option], &["--seed", seed]);
        }
    }
}

#[test]
fn load_that_is_none() {
    for (load, what) in [
        ("nonsense", "there is no comma"),
        ("", "there is no comma"),
        ("50 ohm", "there is no comma"),
        ("-5 ohm, 0 ohm", "a passive load has no negative resistance"),
        ("2 Gohm, 0 ohm", "the limit of either is 1 Gohm"),
        ("50 ohm, -1.1 Gohm", "the limit of either is 1 Gohm"),
        ("50, 0", "\"50\" has no unit; a resistance is wanted"),
        (
            "50 ohm, 3 nH",
            "\"3 nH\" is an inductance; a resistance is wanted",
        ),
        ("50 ohm, 1 ohm, 2 ohm", "1 ohm, 2 ohm"),
        ("nan ohm, 0 ohm", "\"nan\" is not a number"),
        ("50 ohm, inf ohm", "\"inf\" is not a number"),
    ] {
        refused(
            &["respond", "chain.toml", "--load", load],
            &[
                &format!("error: --load '{load}': "),
                what,
                "write resistance and reactance, such as '36 ohm, -120 ohm'",
            ],
        );
    }
}

#[test]
fn the_chain_file_as_output() {
    let folder = folder();
    let absolute = folder.path().join("chain.toml").display().to_string();
    for output in ["chain.toml", "./chain.toml", &absolute] {
        for command in super::COMMANDS {
            let run = run_in(folder.path(), [command, "chain.toml", "--output", output]);
            assert_eq!((run.status, run.stdout.as_str()), (2, ""), "{run:?}");
            assert_eq!(
                run.stderr,
                "error: --output would replace the chain file chain.toml; name another file\n"
            );
            let kept = std::fs::read_to_string(&absolute).expect("the chain file");
            assert_eq!(kept, CHAIN);
        }
    }
}

//! Every kind of bad chain file: status 2, nothing on standard output, the place, what is wrong
//! and what would be right on standard error, and no trace in the file system.

use std::fs;
use std::path::Path;

use super::{CHAIN, COMMANDS, folder_with, names, run_in};

/// [`CHAIN`] with one part of it changed.
fn changed(right: &str, wrong: &str) -> String {
    assert_eq!(CHAIN.matches(right).count(), 1, "{right} stands once");
    CHAIN.replace(right, wrong)
}

/// Expects both commands to refuse the `chain`: the first line on standard error begins with
/// `fault`, which holds the place, and the last one is `help`.
fn refused(chain: impl AsRef<[u8]>, fault: &str, help: &str) {
    let folder = folder_with(chain);
    refused_in(folder.path(), "chain.toml", fault, help);
}

fn refused_in(folder: &Path, file: &str, fault: &str, help: &str) {
    let before = names(folder);
    let old = folder.join("old result");
    for command in COMMANDS {
        let check = |arguments: &[&str]| {
            let run = run_in(folder, [&[command, file], arguments].concat());
            assert_eq!((run.status, run.stdout.as_str()), (2, ""), "{run:?}");
            let lines: Vec<_> = run.stderr.lines().collect();
            assert_eq!(lines.first(), Some(&format!("{file}:{fault}").as_str()));
            assert_eq!(lines.last(), Some(&format!("help: {help}").as_str()));
            assert!(run.stderr.ends_with('\n'));
        };
        check(&[]);
        check(&["--json", "--output", "new result"]);
        assert_eq!(names(folder), before, "nothing is left behind");

        fs::write(&old, "as before").expect("a file for the test");
        check(&["--output", "old result"]);
        assert_eq!(fs::read_to_string(&old).expect("a file"), "as before");
        fs::remove_file(&old).expect("removed");
        assert_eq!(names(folder), before, "nothing is left behind");
    }
}

#[test]
fn the_chain_without_a_fault_is_taken() {
    let folder = folder_with(CHAIN);
    for command in COMMANDS {
        run_in(folder.path(), [command, "chain.toml"]).result();
    }
}

/// Each case: the name of its test, what is changed to what, the fault and the help.
macro_rules! refused {
    ($($name:ident: $right:literal => $wrong:expr, $fault:expr, $help:expr;)*) => {
        $(
            #[test]
            fn $name() {
                refused(changed($right, $wrong), $fault, $help);
            }
        )*
    };
}

refused! {
    unknown_key: "swr_up_to" => "swr_upto",
        "6:1: unknown key `swr_upto` in [load]",
        "did you mean `swr_up_to`? [load] takes `swr_up_to`, `impedances`, `one_port`, `series`";
    wrong_dimension: "220 pF" => "5 ohm",
        r#"10:25: "5 ohm" is a resistance; a capacitance is wanted"#,
        r#"write a capacitance, such as "100 pF""#;
    negative: "220 pF" => "-220 pF",
        r#"10:25: "-220 pF" is negative"#,
        "write a capacitance from 1 fF to 1 F";
    zero: "220 pF" => "0 pF",
        r#"10:25: "0 pF" is zero"#,
        "write a capacitance from 1 fF to 1 F";
    infinite: "= 10" => "= inf",
        "6:13: `swr_up_to` is inf; it has to be 1 or more, and finite",
        "write for example swr_up_to = 10";
    not_a_number: "1e-4" => "nan",
        "8:9: `gamma` is nan; it has to be above 0 and at most 1",
        "write for example gamma = 1e-4";
    quantity_not_finite: "220 pF" => "inf pF",
        r#"10:26: "inf" is not a number"#,
        r#"write a capacitance, such as "100 pF""#;
    empty_chain: "[[stage]]\nshunt = { capacitance = \"220 pF\" }" => "",
        "1:1: the chain file has no `stage`",
        "add [[stage]] in double brackets, once for each stage";
    band_from_above_to: "\"12 MHz\"" => "\"1.9 MHz\"",
        "4:6: the band ends at 1900000 Hz, below its start at 2000000 Hz",
        "write a frequency from 2000000 Hz up";
    more_stages_than_capacity: "[[stage]]\n" => &format!("{}[[stage]]\n", SURPLUS.repeat(16)),
        "41:1: the chain has 17 stages; the firmware has room for 16",
        "join neighbouring stages, such as two lines of the same impedance";
    frequency_beyond_32_bits: "12 MHz" => "5 GHz",
        r#"4:6: "5 GHz" is out of range"#,
        "write a frequency from 1 Hz to 4.294967295 GHz";
    quantity_beyond_f64: "220 pF" => "1e400 pF",
        r#"10:26: "1e400" is too large"#,
        r#"write a capacitance, such as "100 pF""#;
    number_beyond_f64: "= 10" => "= 1e999",
        "6:13: `swr_up_to` is 1e999; it has to be 1 or more, and finite",
        "write for example swr_up_to = 10";
    integer_beyond_64_bits: "\"12 MHz\"" => "\"12 MHz\"\npoints = 99999999999999999999",
        "5:10: `points` is 99999999999999999999; it has to be a whole number from 1 to 100000",
        "write for example points = 41";
    word_length_of_no_target: "[accuracy]" => "[firmware]\nword_bits = 24\n[accuracy]",
        "8:13: `word_bits` is 24; it has to be 16 or 32",
        "write for example word_bits = 32";
    no_equals_sign: "from = " => "from ",
        "3:6: not valid TOML: key with no value, expected `=`",
        GENERAL_ADVICE;
    bracket_left_open: "220 pF\" }" => "220 pF\"",
        "10:33: not valid TOML: unclosed inline table, expected `}`",
        GENERAL_ADVICE;
    quantity_without_quotes: "\"2 MHz\"" => "2 MHz",
        "3:8: `2 MHz` is not a number",
        "text and quantities stand in double quotes: \"2 MHz\"";
    same_key_twice: "\nto = " => "\nfrom = ",
        "4:1: duplicate key `from`",
        "a table holds each key once, and only [[stage]] may stand several times";
}

const GENERAL_ADVICE: &str = "an entry is `key = value`, a table starts with [name], a stage with \
    [[stage]]; text and quantities stand in double quotes, such as \"2 MHz\"";

/// A right stage of two lines.
const SURPLUS: &str = "[[stage]]\ntransformer.ratio = 2\n";

#[test]
fn chain_of_no_stages() {
    let (settings, _) = CHAIN.split_once("[[stage]]").expect("a stage");
    refused(
        format!("stage = []\n{settings}"),
        "1:9: the chain has no stage",
        "add a table [[stage]]",
    );
}

#[test]
fn not_utf_8() {
    // the micro sign of ISO 8859-1
    let chain = changed("buoy", "µ");
    let (before, after) = chain.split_once('µ').expect("a micro sign");
    refused(
        [before.as_bytes(), b"\xb5", after.as_bytes()].concat(),
        "1:10: byte 0xb5 is not part of UTF-8 text",
        "save the file in UTF-8",
    );
}

#[test]
fn larger_than_any_chain_file() {
    refused(
        CHAIN.repeat(10_000),
        " the file is larger than 1048576 bytes",
        "give the path of a readable chain file",
    );
}

/// What the system says of the error that reading `path` gives.
fn unreadable(path: &Path) -> String {
    let error = fs::read(path).expect_err("not readable");
    format!(" cannot read the chain file: {error}")
}

#[test]
fn missing_file() {
    let folder = folder_with(CHAIN);
    refused_in(
        folder.path(),
        "nowhere.toml",
        &unreadable(&folder.path().join("nowhere.toml")),
        "give the path of a readable chain file",
    );
}

#[test]
fn directory_in_place_of_a_file() {
    let folder = folder_with(CHAIN);
    fs::create_dir(folder.path().join("chains")).expect("a folder for the test");
    refused_in(
        folder.path(),
        "chains",
        &unreadable(&folder.path().join("chains")),
        "give the path of a readable chain file",
    );
}

#[test]
fn the_spot_is_shown_with_its_line() {
    let folder = folder_with(changed("220 pF", "5 ohm"));
    let run = run_in(folder.path(), ["respond", "chain.toml"]);
    assert_eq!(
        run.stderr,
        r#"chain.toml:10:25: "5 ohm" is a resistance; a capacitance is wanted
   10 | shunt = { capacitance = "5 ohm" }
      |                         ^^^^^^^
help: write a capacitance, such as "100 pF"
"#
    );
}

//! Faults of loads that depend on the frequency, in the chain file and in the file measured.

use std::fs;

use stagebits::chain_file::read;
use stagebits::diagnostic::Diagnostic;

use super::{says, unmarked};

/// What is said about a chain file over 2 to 12 MHz with this load, beside which stands a
/// measurement of this name.
fn fault_of(load: &str, name: &str, measured: &str) -> Diagnostic {
    let folder = tempfile::tempdir().expect("a folder for the test");
    fs::write(folder.path().join(name), measured).expect("a measurement for the test");
    let path = folder.path().join("chain.toml");
    let text = format!(
        "title = \"test\"\nband = {{ from = \"2 MHz\", to = \"12 MHz\" }}\n{load}\n\
         [[stage]]\ntransformer.ratio = 1\n"
    );
    fs::write(&path, text).expect("a chain for the test");
    read(&path).expect_err(load)
}

/// Expects a fault of the chain file at what stands between « and ».
fn bad_load(marked: &str, measured: (&str, &str), message: &str, help: &str) {
    let (load, before, fault) = unmarked(marked);
    let found = fault_of(&load, measured.0, measured.1);
    says(&found, message, help);
    let spot = found.spot.as_ref().expect("a place");
    let place = (spot.line, spot.column as usize, spot.width as usize);
    let wanted = (3, before.chars().count() + 1, fault.chars().count());
    assert_eq!(place, wanted, "\n{found}");
    assert!(found.file.ends_with("chain.toml"), "{found}");
}

const LOAD: &str = "load.one_port = «\"whip.s1p\"»";

fn bad_measurement(text: &str, message: &str, help: &str) {
    bad_load(LOAD, ("whip.s1p", text), message, help);
}

#[test]
fn the_measurement_has_to_cover_the_band() {
    let help = "measure over all of the band, or narrow the band";
    for (text, covers) in [
        ("# MHz\n2.000001 0 0\n12 0 0\n", "2.000001 MHz to 12 MHz"),
        ("# MHz\n2 0 0\n11.999 0 0\n", "2 MHz to 11.999 MHz"),
        ("# kHz\n7000 0 0\n", "7 MHz to 7 MHz"),
        ("# GHz\n2 0 0\n12 0 0\n", "2 GHz to 12 GHz"),
    ] {
        let message = format!("the measurement covers {covers}, the band is 2 MHz to 12 MHz");
        bad_measurement(text, &message, help);
    }
}

#[test]
fn the_load_has_to_be_passive() {
    let help = "a passive load with a calibrated instrument";
    bad_measurement(
        "# MHz\n1 0 0\n3 0 0\n7 1.0021 12\n20 0 0\n",
        "the measured load is active: |Γ| is 1.0021 at 7 MHz",
        help,
    );
    // The point beyond the end of the band still has a part in the load.
    bad_measurement("# MHz\n1 0 0\n20 1.5 0\n", "|Γ| is 1.5000 at 20 MHz", help);
    // −50 ohm, which has no reflection at the reference of the chain.
    bad_measurement(
        "# MHz R 75\n1 0 0\n20 5 180\n",
        "the measured load is active: an impedance of -50 ohm",
        help,
    );
}

#[test]
fn the_measurement_has_to_be_there_and_of_a_one_port() {
    let readable = "a readable Touchstone file";
    bad_load(
        "load.one_port = «\"mast.s1p\"»",
        ("whip.s1p", ""),
        "mast.s1p: cannot read the Touchstone file: ",
        readable,
    );
    let two_port = "# MHz\n1 0 0 1 0 1 0 0 0\n20 0 0 1 0 1 0 0 0\n";
    bad_load(
        "load.one_port = «\"pad.s2p\"»",
        ("pad.s2p", two_port),
        "pad.s2p: the file is of a two-port; a one-port is wanted",
        ".s1p",
    );
    bad_load(
        "load.one_port = «\"whip.txt\"»",
        ("whip.txt", "# MHz\n1 0 0\n"),
        "whip.txt: the name does not say how many ports",
        ".s1p",
    );
    bad_load(
        "load.one_port = «3»",
        ("x", ""),
        "`one_port` is a number; a string",
        "antenna.s1p",
    );
    bad_load(
        "load.one_port = «\"\"»",
        ("x", ""),
        "`one_port` is empty",
        "antenna.s1p",
    );
}

#[test]
fn a_fault_in_the_measurement_is_located_there() {
    let found = fault_of(
        "load.one_port = \"whip.s1p\"",
        "whip.s1p",
        "# MHz\n1 0 0\n2 x 0\n",
    );
    says(&found, "\"x\" is not a number", "a finite decimal number");
    assert!(found.file.ends_with("whip.s1p"), "{found}");
    assert_eq!(
        found.spot.map(|spot| (spot.line, spot.column)),
        Some((3, 3))
    );
}

#[test]
fn series_model() {
    let bad = |marked: &str, message: &str, help: &str| bad_load(marked, ("x", ""), message, help);
    bad(
        "load.series = «{}»",
        "the series model has no element",
        "add a resistance, an inductance",
    );
    bad(
        "load.series = { «q» = 100, inductance = \"1 uH\" }",
        "unknown key `q` in a series model",
        "a series model takes `resistance`, `inductance`, `capacitance`",
    );
    bad(
        "load.series = { resistance = «\"0 ohm\"» }",
        "\"0 ohm\" is zero",
        "from 1 uohm to 1 Gohm",
    );
    bad(
        "load.series = { resistance = «\"-5 ohm\"» }",
        "is negative",
        "from 1 uohm to 1 Gohm",
    );
    bad(
        "load.series = { capacitance = «\"5 uH\"» }",
        "is an inductance; a capacitance",
        "100 pF",
    );
    bad(
        "load.series = «\"36 ohm\"»",
        "`series` is a string; a table is wanted",
        "series = {",
    );
    bad(
        "load = { one_port = \"x\", «series» = {} }",
        "[load] has both `one_port` and `series`",
        "keep one of",
    );
    bad(
        "load = «{}»",
        "none of `swr_up_to`, `impedances`, `one_port`, `series`",
        "such as",
    );
}

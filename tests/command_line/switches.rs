//! The state of a chain's banks: asked for, and shown.

use serde_json::Value;

use super::json::{complex, items, json, number};
use super::{CHAIN, Run, folder_with, run_example, run_in};

const TUNER: &str = "mountain-hut-tuner";

/// Words of a result's banks, with their stages and numbers of steps.
fn words(switches: &Value) -> Vec<(&str, u64, u64)> {
    let bank = |bank: &'_ Value| -> (u64, u64) {
        let whole = |key: &str| bank[key].as_u64().expect("a whole number");
        (whole("steps"), whole("word"))
    };
    items(switches)
        .iter()
        .map(|entry| {
            let (steps, word) = bank(entry);
            (entry["stage"].as_str().expect("a name"), steps, word)
        })
        .collect()
}

/// The input impedance at each frequency.
fn impedances(switches: &[&str]) -> Vec<(f64, f64)> {
    let response = json("respond", TUNER, switches);
    let points = items(&response["points"]);
    points
        .iter()
        .map(|point| complex(&point["impedance_ohm"]))
        .collect()
}

#[test]
fn words_are_binary_hexadecimal_or_decimal() {
    let response = json("respond", TUNER, &["--switches", "0b00101101, 0x0b"]);
    let expected = [("coils", 8, 0x2d), ("capacitors", 8, 11)];
    assert_eq!(words(&response["switches"]), expected);
    let binary = impedances(&["--switches", "0b101101,0b1011"]);
    assert_eq!(binary, impedances(&["--switches", "45,11"]));
    assert_eq!(binary, impedances(&["--switches=0x2D , 0xb"]));
    assert_ne!(binary, impedances(&["--switches", "45, 12"]));
    let off = impedances(&["--switches", "0, 0"]);
    assert_eq!(off, impedances(&[]));
    assert_ne!(off, binary);
}

/// Each step of the coils adds its reactance; the lead before them, θ = 0.014 long, makes some
/// x²·θ more of the largest.
#[test]
fn words_switch_the_steps_that_they_name() {
    let omega = std::f64::consts::TAU * 1.8e6;
    let load = ["--load", "50 ohm, 0 ohm"];
    let reactance = |word: &str| impedances(&[&load[..], &["--switches", word]].concat())[0].1;
    let off = reactance("0, 0");
    for step in 0..8 {
        let coil = omega * 60e-9 * f64::from(1 << step);
        let found = reactance(&format!("{}, 0", 1 << step)) - off;
        assert!(
            (found / coil - 1.0).abs() < 0.03,
            "step {step}: {found} for {coil}"
        );
    }
}

#[test]
fn text_shows_the_words() {
    let shown = |arguments: &[&str]| run_example("respond", TUNER, arguments).result();
    let text = shown(&["--switches", "0b101101, 11"]);
    assert!(
        text.contains("against f64\ncoils 0b00101101\ncapacitors 0b00001011\n\n  "),
        "{text}"
    );
    let text = shown(&[]);
    assert!(
        text.contains("\ncoils 0b00000000\ncapacitors 0b00000000\n\n"),
        "{text}"
    );
}

#[test]
fn a_budget_names_the_state_of_its_worst_point() {
    let text = run_example("budget", TUNER, &[]).result();
    let budget = json("budget", TUNER, &[]);
    let words = words(&budget["worst"]["switches"]);
    let [("coils", 8, coils), ("capacitors", 8, capacitors)] = words[..] else {
        panic!("{words:?}")
    };
    let lines = format!(
        "\nswitches    coils 0b{coils:08b}\n            capacitors 0b{capacitors:08b}\npoints "
    );
    assert!(text.contains(&lines), "{text}");
    // the same point by the other command
    let worst = &budget["worst"];
    let (r, x) = complex(&worst["load_ohm"]);
    let hertz = number(&worst["hertz"]);
    let source = std::fs::read_to_string(super::example(TUNER)).expect("the example");
    let at = format!("from = \"{hertz} Hz\"\nto = \"{hertz} Hz\"\n");
    let chain = source.replace("from = \"1.8 MHz\"\nto = \"30 MHz\"\npoints = 48\n", &at);
    assert_ne!(chain, source);
    let folder = folder_with(chain);
    let arguments = [
        "respond".to_owned(),
        "chain.toml".to_owned(),
        "--json".to_owned(),
        format!("--load={r} ohm, {x} ohm"),
        format!("--switches={coils}, {capacitors}"),
    ];
    let found: Value =
        serde_json::from_str(&run_in(folder.path(), arguments).result()).expect("JSON");
    let point = &items(&found["points"])[0];
    let (gamma, word) = (complex(&point["gamma"]), complex(&point["word_gamma"]));
    let error = (gamma.0 - word.0).hypot(gamma.1 - word.1);
    // the load goes through decimals and comes back rounded
    let expected = number(&budget["accuracy"]["gamma_worst"]);
    assert!(error > expected / 4.0, "{error:e} for {expected:e}");
}

fn refused(chain: &str, switches: &str, what: &str, help: &str) {
    let folder = folder_with(chain);
    let option = format!("--switches={switches}");
    let Run {
        status,
        stdout,
        stderr,
    } = run_in(folder.path(), ["respond", "chain.toml", &option]);
    assert_eq!((status, stdout.as_str()), (2, ""), "{stderr}");
    let expected = format!("error: --switches '{switches}': {what}; {help}\n");
    assert_eq!(stderr, expected);
}

#[test]
fn words_that_are_none() {
    let chain = std::fs::read_to_string(super::example(TUNER)).expect("the example");
    for word in [
        "",
        "x",
        "0b2",
        "0b",
        "0xg",
        "-1",
        "+1",
        "0b+1",
        "1.0",
        "99999999999999999999",
    ] {
        let what = format!("'{word}' is no word");
        let help = "write for example 0b101, 0x5 or 5";
        refused(&chain, &format!("1,{word}"), &what, help);
    }
    for word in ["256", "0b100000000", "65536", "0x1ff"] {
        let what = format!("'{word}' has a bit beyond the steps of capacitors");
        refused(
            &chain,
            &format!("1, {word}"),
            &what,
            "write 0b0 to 0b11111111",
        );
    }
    for (switches, count) in [("1", 1), ("", 1), ("1, 2, 3", 3)] {
        let what = format!("{count} words for 2 banks");
        refused(
            &chain,
            switches,
            &what,
            "write one for each of coils, capacitors",
        );
    }
    refused(CHAIN, "1", "the chain has no bank", "leave the option out");
}

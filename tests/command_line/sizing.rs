//! `size`: its keys, what its text says, and how it ends where no words are long enough.

use std::fs;

use serde_json::Value;

use super::agreement::{between, labelled, named, shows, shows_complex};
use super::json::{complex, items, json, keys, number};
use super::text::{cells, table};
use super::{CHAIN, EXAMPLES, example, folder_with, run_example, run_in};

const CHAIN_THAT_ASKS_TOO_MUCH: &str = "gamma = 1e-12";

#[test]
fn has_its_keys() {
    for name in EXAMPLES {
        let size = json("size", name, &[]);
        keys(
            &size,
            &[
                "best_word_bits",
                "command",
                "envelope",
                "firmware_word_bits",
                "formats",
                "gamma_wanted",
                "recommended_word_bits",
                "reference_ohm",
                "title",
                "too_short",
                "version",
            ],
        );
        assert_eq!(size["command"], "size");
        assert_eq!(size["version"], env!("CARGO_PKG_VERSION"));
        keys(&size["envelope"], &["points", "seed"]);
        let formats = items(&size["formats"]);
        let names: Vec<_> = formats
            .iter()
            .map(|format| (format["format"].as_str(), format["word_bits"].as_u64()))
            .collect();
        let words = (10..=32).map(|bits| (Some("block"), Some(bits)));
        let all: Vec<_> = words.chain([(Some("f32"), None)]).collect();
        assert_eq!(names, all);
        for format in formats {
            keys(
                format,
                &[
                    "ascent_points",
                    "format",
                    "gamma_rms",
                    "gamma_worst",
                    "margin",
                    "met",
                    "theory_rms",
                    "word_bits",
                    "worst",
                ],
            );
            let worst = number(&format["gamma_worst"]);
            assert!(number(&format["gamma_rms"]) < worst);
            let margin = number(&size["gamma_wanted"]) / worst;
            assert!((number(&format["margin"]) / margin - 1.0).abs() < 1e-12);
            assert_eq!(format["met"], margin >= 1.0);
            keys(
                &format["worst"],
                &["hertz", "load_gamma", "load_ohm", "switches"],
            );
            complex(&format["worst"]["load_ohm"]);
            assert_eq!(format["theory_rms"].is_null(), format["format"] == "f32");
        }
        let short = &size["too_short"];
        keys(short, &["culprit", "gamma_worst", "word_bits", "worst"]);
        let culprit = &short["culprit"];
        keys(culprit, &["share", "source", "source_share", "stage"]);
        assert!(number(&culprit["source_share"]) <= number(&culprit["share"]) + 1.0);
    }
}

/// The recommended words meet the accuracy, as do all longer ones, and the next shorter do not;
/// what is said of those is what `budget` finds.
#[test]
fn recommendation_is_the_shortest_of_those_that_meet() {
    for name in EXAMPLES {
        let size = json("size", name, &[]);
        let formats = items(&size["formats"]);
        let words = &formats[..23];
        let recommended = size["recommended_word_bits"].as_u64().expect("words");
        for format in words {
            let bits = format["word_bits"].as_u64().expect("a length");
            if bits >= recommended {
                assert_eq!(format["met"], true, "{name}, {bits} bits");
            }
        }
        let short = &size["too_short"];
        let bits = short["word_bits"].as_u64().expect("a length");
        assert_eq!(bits + 1, recommended);
        let firmware = size["firmware_word_bits"].as_u64();
        assert_eq!(firmware, Some(if recommended <= 16 { 16 } else { 32 }));

        let budget = json("budget", name, &["--word-bits", &bits.to_string()]);
        assert_eq!(budget["accuracy"]["gamma_worst"], short["gamma_worst"]);
        assert_eq!(budget["worst"], short["worst"]);
        let culprit = &short["culprit"];
        let share = |stage: &Value| number(&stage["sum"]["share"]);
        let stages = items(&budget["stages"]);
        let most = stages.iter().max_by(|a, b| share(a).total_cmp(&share(b)));
        let most = most.expect("a stage");
        assert_eq!(most["name"], culprit["stage"]);
        // added up in another order
        assert!((share(most) - number(&culprit["share"])).abs() < 1e-12);
        let source = culprit["source"].as_str().expect("a source");
        let of_source = number(&most["sources"][source]["share"]);
        assert!((of_source - number(&culprit["source_share"])).abs() < 1e-12);
        let sources = most["sources"].as_object().expect("sources").values();
        assert!(
            sources
                .map(|source| number(&source["share"]))
                .all(|share| share <= of_source)
        );
    }
}

/// Expects words of so many bits that are so many times better or worse than wanted.
fn verdict(text: &str, size: &Value, bits: &Value) {
    let formats = items(&size["formats"]);
    let format = formats.iter().find(|format| &format["word_bits"] == bits);
    let margin = number(&format.expect("a format")["margin"]);
    let start = format!("{bits} bits, ");
    let times = between(text, &start, " times").replace(' ', "");
    if margin >= 1.0 {
        assert!(text.ends_with(" better than wanted"), "{text}");
        shows(&times, margin);
    } else {
        assert!(text.contains(" worse than wanted"), "{text}");
        shows(&times, 1.0 / margin);
    }
}

#[test]
fn says_the_same_as_the_text() {
    for name in EXAMPLES {
        let text = run_example("size", name, &[]).result();
        let size = json("size", name, &[]);
        assert_eq!(text.lines().next(), size["title"].as_str());
        let wanted = between(labelled(&text, "accuracy"), "|ΔΓ| ", " wanted");
        shows(wanted, number(&size["gamma_wanted"]));
        for (label, key) in [
            ("recommended", "recommended_word_bits"),
            ("in firmware", "firmware_word_bits"),
        ] {
            verdict(labelled(&text, label), &size, &size[key]);
        }
        let short = &size["too_short"];
        verdict(labelled(&text, "too short"), &size, &short["word_bits"]);
        let (_, reasons) = text.split_once("\ntoo short").expect("a reason");
        let mut reasons = reasons.lines().skip(1).map(str::trim);
        let mut reason = || reasons.next().expect("a line");
        let place = reason();
        shows(
            between(place, "", " MHz, "),
            number(&short["worst"]["hertz"]) / 1e6,
        );
        shows_complex(
            between(place, "load Γ ", " ("),
            complex(&short["worst"]["load_gamma"]),
        );
        let culprit = &short["culprit"];
        let stage = reason();
        shows(between(stage, "", " % "), 100.0 * number(&culprit["share"]));
        let (_, stage) = stage.split_once("by the stage ").expect("a stage");
        named(stage.trim_end_matches(','), &culprit["stage"]);
        shows(
            between(reason(), "", " % by its "),
            100.0 * number(&culprit["source_share"]),
        );

        let rows = &table(&text, "worst  ")[1..];
        let formats = items(&size["formats"]);
        assert_eq!(rows.len(), formats.len());
        for (row, format) in rows.iter().zip(formats) {
            let cells: Vec<_> = cells(row).into_iter().map(|(_, cell)| cell).collect();
            let [name, worst, margin, met, rms, theory, ratio] = &cells[..] else {
                panic!("seven cells: {row}");
            };
            match format["word_bits"].as_u64() {
                Some(bits) => assert_eq!(*name, format!("{bits} bits")),
                None => assert_eq!(name, "f32"),
            }
            shows(worst, number(&format["gamma_worst"]));
            shows(&margin.replace(' ', ""), number(&format["margin"]));
            assert_eq!(met, if format["met"] == true { "yes" } else { "no" });
            shows(rms, number(&format["gamma_rms"]));
            if format["theory_rms"].is_null() {
                assert_eq!((theory.as_str(), ratio.as_str()), ("–", "–"));
            } else {
                shows(theory, number(&format["theory_rms"]));
                shows(
                    ratio,
                    number(&format["gamma_rms"]) / number(&format["theory_rms"]),
                );
            }
        }
    }
}

/// The file of an example, or [`CHAIN`], with another accuracy.
fn asking(text: &str, accuracy: &str) -> String {
    let wanted = text.lines().find(|line| line.starts_with("gamma = "));
    text.replace(wanted.expect("an accuracy"), accuracy)
}

#[test]
fn no_words_are_long_enough() {
    for name in EXAMPLES {
        let text = fs::read_to_string(example(name)).expect("an example");
        let folder = folder_with(asking(&text, CHAIN_THAT_ASKS_TOO_MUCH));
        let arguments = ["size", "chain.toml", "--points", "2000"];
        let run = run_in(folder.path(), arguments);
        assert_eq!((run.status, run.stderr.as_str()), (1, ""));
        assert_eq!(
            labelled(&run.stdout, "recommended"),
            "none, NO words are long enough"
        );
        assert!(labelled(&run.stdout, "best").starts_with("32 bits, "));
        assert!(labelled(&run.stdout, "best").ends_with(" times worse than wanted"));
        assert!(!run.stdout.contains("in firmware"));
        assert!(!run.stdout.contains("yes"));

        let run = run_in(folder.path(), arguments.iter().chain(&["--json"]));
        assert_eq!((run.status, run.stderr.as_str()), (1, ""));
        let size: Value = serde_json::from_str(&run.stdout).expect("JSON");
        assert!(size["recommended_word_bits"].is_null());
        assert!(size["firmware_word_bits"].is_null());
        assert_eq!(size["best_word_bits"], 32);
        assert_eq!(size["too_short"]["word_bits"], 32);
    }
}

#[test]
fn all_words_are_long_enough() {
    let folder = folder_with(asking(CHAIN, "gamma = 1"));
    let arguments = ["size", "chain.toml", "--points", "2000"];
    let text = run_in(folder.path(), arguments).result();
    assert!(labelled(&text, "recommended").starts_with("10 bits, "));
    assert!(labelled(&text, "in firmware").starts_with("16 bits, "));
    assert!(!text.contains("too short"));
    let json = run_in(folder.path(), arguments.iter().chain(&["--json"])).result();
    let size: Value = serde_json::from_str(&json).expect("JSON");
    assert!(size["too_short"].is_null());
    assert_eq!(size["recommended_word_bits"], 10);
}

/// Words that only just meet the accuracy are called so.
#[test]
fn thin_margin_is_named() {
    let folder = folder_with(CHAIN);
    let arguments = ["size", "chain.toml", "--points", "2000"];
    let run = run_in(folder.path(), arguments.iter().chain(&["--json"]));
    let size: Value = serde_json::from_str(&run.stdout).expect("JSON");
    let worst = number(&items(&size["formats"])[6]["gamma_worst"]);
    for (times, thin) in [(1.2, true), (1.3, false)] {
        let accuracy = format!("gamma = {:e}", times * worst);
        let folder = folder_with(asking(CHAIN, &accuracy));
        let text = run_in(folder.path(), arguments).result();
        assert!(labelled(&text, "recommended").starts_with("16 bits, "));
        assert_eq!(text.contains("\n            a thin margin; "), thin);
    }
}

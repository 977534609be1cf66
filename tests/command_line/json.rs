//! The JSON form: its keys.

use serde_json::Value;

use super::{EXAMPLES, run_example};

pub(super) fn json(command: &str, name: &str, arguments: &[&str]) -> Value {
    let run = run_example(command, name, &[arguments, &["--json"]].concat());
    assert_eq!(run.stderr, "");
    assert!(run.stdout.ends_with("}\n"));
    serde_json::from_str(&run.stdout).expect("JSON")
}

/// Expects exactly these keys, which stand in alphabetical order.
pub(super) fn keys(value: &Value, expected: &[&str]) {
    let object = value
        .as_object()
        .unwrap_or_else(|| panic!("an object: {value}"));
    assert_eq!(object.keys().collect::<Vec<_>>(), expected);
}

pub(super) fn number(value: &Value) -> f64 {
    value
        .as_f64()
        .unwrap_or_else(|| panic!("a number: {value}"))
}

/// Real and imaginary part.
pub(super) fn complex(value: &Value) -> (f64, f64) {
    keys(value, &["im", "re"]);
    (number(&value["re"]), number(&value["im"]))
}

pub(super) fn items(value: &Value) -> &[Value] {
    value
        .as_array()
        .unwrap_or_else(|| panic!("an array: {value}"))
}

#[test]
fn response_has_its_keys() {
    for name in EXAMPLES {
        let response = json("respond", name, &[]);
        keys(
            &response,
            &[
                "command",
                "points",
                "reference_ohm",
                "stages",
                "switches",
                "title",
                "version",
                "word_bits",
            ],
        );
        assert_eq!(response["command"], "respond");
        assert_eq!(response["version"], env!("CARGO_PKG_VERSION"));
        assert_eq!(response["reference_ohm"], 50.0);
        let stages = items(&response["stages"]);
        assert!(stages.iter().all(Value::is_string));
        for point in items(&response["points"]) {
            keys(
                point,
                &[
                    "abcd",
                    "gamma",
                    "hertz",
                    "impedance_ohm",
                    "load_gamma",
                    "return_loss_db",
                    "s",
                    "stage_losses_db",
                    "swr",
                    "transducer_gain_db",
                    "word_gamma",
                ],
            );
            assert!(point["hertz"].is_u64());
            for key in ["gamma", "impedance_ohm", "load_gamma", "word_gamma"] {
                complex(&point[key]);
            }
            keys(&point["abcd"], &["a", "b_ohm", "c_siemens", "d"]);
            keys(&point["s"], &["s11", "s12", "s21", "s22"]);
            for matrix in ["abcd", "s"] {
                for entry in point[matrix].as_object().expect("an object").values() {
                    complex(entry);
                }
            }
            let losses = items(&point["stage_losses_db"]);
            assert_eq!(losses.len(), stages.len());
            assert!(losses.iter().all(|loss| number(loss) >= 0.0));
        }
    }
}

#[test]
fn budget_has_its_keys() {
    for name in EXAMPLES {
        let budget = json("budget", name, &[]);
        keys(
            &budget,
            &[
                "accuracy",
                "closure",
                "command",
                "envelope",
                "load",
                "readout",
                "reference_ohm",
                "sources",
                "stages",
                "style",
                "title",
                "total",
                "version",
                "word_bits",
                "worst",
            ],
        );
        assert_eq!(budget["command"], "budget");
        assert_eq!(budget["version"], env!("CARGO_PKG_VERSION"));
        assert_eq!(budget["reference_ohm"], 50.0);
        assert_eq!(budget["style"], "block");
        keys(&budget["accuracy"], &["gamma_wanted", "gamma_worst", "met"]);
        assert!(budget["accuracy"]["met"].is_boolean());
        keys(&budget["envelope"], &["ascent_points", "points", "seed"]);
        keys(&budget["closure"], &["largest", "limit"]);
        keys(
            &budget["worst"],
            &["hertz", "load_gamma", "load_ohm", "switches"],
        );
        for bank in items(&budget["worst"]["switches"]) {
            keys(bank, &["stage", "steps", "word"]);
        }
        complex(&budget["worst"]["load_gamma"]);
        complex(&budget["worst"]["load_ohm"]);

        let contribution = |line: &Value| {
            keys(line, &["at_worst", "rms", "share", "worst"]);
            complex(&line["at_worst"]);
            assert!(number(&line["rms"]) <= number(&line["worst"]));
            number(&line["share"])
        };
        let sources = |sources: &Value| {
            keys(
                sources,
                &["constants", "frequency", "immittances", "products"],
            );
            let sources = sources.as_object().expect("an object");
            sources.values().map(contribution).sum::<f64>()
        };
        let stages = items(&budget["stages"]).iter().map(|stage| {
            keys(stage, &["name", "sources", "sum"]);
            let sum = contribution(&stage["sum"]);
            assert!((sources(&stage["sources"]) - sum).abs() < 1e-6);
            sum
        });
        let apart = contribution(&budget["load"]) + contribution(&budget["readout"]);
        assert!((contribution(&budget["total"]) - 1.0).abs() < 1e-12);
        // the shares of all parts are the whole, in either cut
        assert!((stages.sum::<f64>() + apart - 1.0).abs() < 1e-6);
        assert!((sources(&budget["sources"]) + apart - 1.0).abs() < 1e-6);
    }
}

/// JSON has no infinity: a matched load has no return loss, a short takes no power.
#[test]
fn infinite_figures_are_null() {
    let short = json("respond", "tide-gauge-buoy", &["--load", "0 ohm, 0 ohm"]);
    for point in items(&short["points"]) {
        assert!(point["transducer_gain_db"].is_null());
        assert!(point["return_loss_db"].is_f64());
    }
}

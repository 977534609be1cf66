//! Text and JSON say the same wherever both show a figure.

use serde_json::Value;

use super::json::{complex, items, json, number};
use super::text::{cells, table};
use super::{EXAMPLES, run_example};

fn magnitude(value: &Value) -> f64 {
    let (re, im) = complex(value);
    re.hypot(im)
}

/// Expects the figure `text`, of as many digits as it has, to be `value` rounded.
pub(super) fn shows(text: &str, value: f64) {
    let text = text.replace('−', "-");
    let shown: f64 = text.parse().unwrap_or_else(|_| panic!("a number: {text}"));
    let (digits, power) = text.split_once('e').unwrap_or((&text, "0"));
    let places = digits.split_once('.').map_or(0, |(_, places)| places.len());
    let power: i32 = power.parse().expect("an exponent");
    let unit = 10_f64.powi(power - i32::try_from(places).expect("few places"));
    // half a unit of the last place, and the rounding of f64
    assert!(
        (shown - value).abs() <= 0.5 * unit * (1.0 + 1e-6),
        "{text} for {value}"
    );
}

#[test]
fn response_says_the_same_as_the_text() {
    for name in EXAMPLES {
        let load = ["--load", "36 ohm, -120 ohm"];
        let text = run_example("respond", name, &load).result();
        let response = json("respond", name, &load);
        let points = items(&response["points"]);

        assert_eq!(text.lines().next(), response["title"].as_str());
        let bits = format!(
            "\n|ΔΓ|: words of {} bits against f64\n",
            response["word_bits"]
        );
        assert!(text.contains(&bits), "{text}");

        let rows = &table(&text, "MHz")[1..];
        assert_eq!(rows.len(), points.len());
        for (row, point) in rows.iter().zip(points) {
            let (re, im) = complex(&point["gamma"]);
            let word = complex(&point["word_gamma"]);
            let impedance = complex(&point["impedance_ohm"]);
            let expected = [
                number(&point["hertz"]) / 1e6,
                re.hypot(im),
                im.atan2(re).to_degrees(),
                impedance.0,
                impedance.1,
                number(&point["swr"]),
                number(&point["return_loss_db"]),
                number(&point["transducer_gain_db"]),
                (word.0 - re).hypot(word.1 - im),
            ];
            let cells = cells(row);
            assert_eq!(cells.len(), expected.len(), "{row}");
            for ((_, cell), expected) in cells.iter().zip(expected) {
                shows(cell, expected);
            }
        }

        let total = |point: &&Value| {
            items(&point["stage_losses_db"])
                .iter()
                .map(number)
                .sum::<f64>()
        };
        let worst = points.iter().max_by(|a, b| total(a).total_cmp(&total(b)));
        let worst = worst.expect("a point");
        let losses = items(&worst["stage_losses_db"]);
        let rows = &table(&text, "stage  ")[1..];
        assert_eq!(rows.len(), losses.len() + 1);
        for ((row, loss), stage) in rows.iter().zip(losses).zip(items(&response["stages"])) {
            let cells = cells(row);
            named(&cells[0].1, stage);
            shows(&cells[1].1, number(loss));
        }
        shows(&cells(rows[losses.len()])[1].1, total(&worst));
    }
}

/// Expects the name of a stage, whole or cut.
pub(super) fn named(text: &str, stage: &Value) {
    let stage = stage.as_str().expect("a name");
    assert!(
        text == stage
            || text
                .strip_suffix('…')
                .is_some_and(|text| stage.starts_with(text))
    );
}

/// What stands behind a label at the head of a budget.
pub(super) fn labelled<'a>(text: &'a str, label: &str) -> &'a str {
    let line = text.lines().find_map(|line| line.strip_prefix(label));
    line.unwrap_or_else(|| panic!("{label} in\n{text}"))
        .trim_start()
}

/// The text between two others.
pub(super) fn between<'a>(text: &'a str, before: &str, after: &str) -> &'a str {
    let (_, rest) = text
        .split_once(before)
        .unwrap_or_else(|| panic!("{before} in {text}"));
    rest.split_once(after)
        .unwrap_or_else(|| panic!("{after} in {text}"))
        .0
}

/// Expects a complex number such as `0.7951 − 0.1930j`.
pub(super) fn shows_complex(text: &str, (re, im): (f64, f64)) {
    let text = text.strip_suffix('j').expect("an imaginary part");
    let (shown_re, shown_im) = text
        .split_once(" + ")
        .map(|(re, im)| (re, im.to_owned()))
        .or_else(|| {
            text.split_once(" − ")
                .map(|(re, im)| (re, format!("-{im}")))
        })
        .expect("two parts");
    shows(shown_re, re);
    shows(&shown_im, im);
}

fn shows_contribution(row: &str, line: &Value) {
    let cells = cells(row);
    let [_, (_, at_worst), (_, share), (_, rms), (_, worst)] = &cells[..] else {
        panic!("five cells: {row}");
    };
    shows(at_worst, magnitude(&line["at_worst"]));
    shows(
        share.strip_suffix(" %").expect("a share"),
        100.0 * number(&line["share"]),
    );
    shows(rms, number(&line["rms"]));
    shows(worst, number(&line["worst"]));
}

/// Sources in the order of the text.
const SOURCES: [&str; 4] = ["constants", "frequency", "immittances", "products"];

#[test]
fn budget_says_the_same_as_the_text() {
    for (name, bits) in EXAMPLES
        .into_iter()
        .flat_map(|name| [(name, "16"), (name, "32")])
    {
        let text = run_example("budget", name, &["--word-bits", bits]).stdout;
        let budget = json("budget", name, &["--word-bits", bits]);

        assert_eq!(text.lines().next(), budget["title"].as_str());
        let verdict = labelled(&text, "accuracy");
        let accuracy = &budget["accuracy"];
        let (worst, wanted) = (
            number(&accuracy["gamma_worst"]),
            number(&accuracy["gamma_wanted"]),
        );
        let times = between(verdict, "met, ", " times").replace(' ', "");
        if accuracy["met"] == true {
            assert!(verdict.starts_with("met, ") && verdict.ends_with(" better than wanted"));
            shows(&times, wanted / worst);
        } else {
            assert!(verdict.starts_with("NOT met, ") && verdict.ends_with(" worse than wanted"));
            shows(&times, worst / wanted);
        }
        let figures = labelled(&text, "worst |ΔΓ|");
        shows(between(figures, "", " found"), worst);
        shows(between(figures, "found, ", " wanted"), wanted);
        shows(labelled(&text, "rms |ΔΓ|"), number(&budget["total"]["rms"]));
        assert_eq!(labelled(&text, "words"), format!("{bits} bits, block"));
        assert_eq!(budget["word_bits"].to_string(), bits);

        let place = labelled(&text, "worst at");
        shows(
            between(place, "", " MHz, "),
            number(&budget["worst"]["hertz"]) / 1e6,
        );
        shows_complex(
            between(place, "load Γ ", " ("),
            complex(&budget["worst"]["load_gamma"]),
        );
        shows_complex(
            between(place, "(", " ohm)"),
            complex(&budget["worst"]["load_ohm"]),
        );

        let envelope = &budget["envelope"];
        let points = labelled(&text, "points").replace(' ', "");
        let expected = format!(
            "{}and{}ofascent,seed{}",
            envelope["points"], envelope["ascent_points"], envelope["seed"]
        );
        assert_eq!(points, expected);
        let closure = labelled(&text, "closure");
        shows(
            between(closure, "", " of"),
            number(&budget["closure"]["largest"]),
        );
        shows(
            between(closure, "of ", " allowed"),
            number(&budget["closure"]["limit"]),
        );

        let stages = items(&budget["stages"]);
        let rows = &table(&text, "at worst  ")[1..];
        let (of_stages, rest) = rows.split_at(stages.len());
        for (row, stage) in of_stages.iter().zip(stages) {
            named(&cells(row)[0].1, &stage["name"]);
            shows_contribution(row, &stage["sum"]);
        }
        for (row, key) in rest.iter().zip(["load", "readout", "total"]) {
            shows_contribution(row, &budget[key]);
        }
        assert_eq!(rest.len(), 3);

        let (_, by_source) = text.split_once("|ΔΓ| by source").expect("a table");
        let rows = &table(by_source, "at worst  ")[1..];
        assert_eq!(rows.len(), SOURCES.len());
        for (row, source) in rows.iter().zip(SOURCES) {
            shows_contribution(row, &budget["sources"][source]);
        }

        let grid = table(&text, "constants  ");
        let headings: Vec<_> = cells(grid[0]).into_iter().map(|(_, cell)| cell).collect();
        assert_eq!(headings, SOURCES);
        assert_eq!(grid.len(), stages.len() + 1);
        for (row, stage) in grid[1..].iter().zip(stages) {
            for ((_, cell), source) in cells(row)[1..].iter().zip(SOURCES) {
                shows(cell, magnitude(&stage["sources"][source]["at_worst"]));
            }
        }
    }
}

//! `respond` against values worked out by hand, and where its load comes from.

use approx::assert_abs_diff_eq;
use serde_json::Value;

use super::text::{cells, table};
use super::{folder_with, run_in};

/// A chain of one stage between 50 Ω, at 10 MHz.
fn chain(load: &str, stage: &str) -> String {
    format!(
        "title = \"one stage\"\nband = {{ from = \"10 MHz\", to = \"10 MHz\" }}\n\
         load = {{ {load} }}\n[[stage]]\n{stage}\n"
    )
}

/// The cells of the only row of the table, and the only point of the JSON form.
fn response(chain: &str) -> (Vec<String>, Value) {
    let folder = folder_with(chain);
    let text = run_in(folder.path(), ["respond", "chain.toml"]).result();
    let [_, row] = table(&text, "MHz")[..] else {
        panic!("one row:\n{text}");
    };
    let json = run_in(folder.path(), ["respond", "chain.toml", "--json"]).result();
    let json: Value = serde_json::from_str(&json).expect("JSON");
    let cells = cells(row).into_iter().map(|(_, cell)| cell).collect();
    (cells, json["points"][0].clone())
}

/// Expects a complex number to within the rounding of `f64`.
fn is(value: &Value, re: f64, im: f64) {
    let part = |key: &str| value[key].as_f64().expect("a number");
    assert_abs_diff_eq!(part("re"), re, epsilon = 1e-12);
    assert_abs_diff_eq!(part("im"), im, epsilon = 1e-12);
}

/// Series impedance z = Z/R0 between matched ends: Γ = z/(2 + z), S21 = 2/(2 + z), and
/// [A B; C D] = [1 Z; 0 1] (Pozar, Microwave Engineering, tables 4.1 and 4.2, from memory).
#[test]
fn series_resistor_into_the_reference() {
    let (cells, point) = response(&chain(
        "swr_up_to = 2",
        "series = { resistance = \"50 ohm\" }",
    ));
    // 100 Ω; Γ = 1/3; SWR 2; 20 lg 3 = 9.54 dB; 20 lg (2/3) = -3.522 dB
    assert_eq!(
        cells[..8],
        [
            "10.000000",
            "0.33333",
            "0.00",
            "100.00",
            "0.000",
            "2.000",
            "9.54",
            "-3.522"
        ]
    );
    let difference: f64 = cells[8].parse().expect("a number");
    assert!(
        difference < 1e-9,
        "32 bits are good for 2e-9 on every stage: {difference}"
    );

    is(&point["abcd"]["a"], 1.0, 0.0);
    is(&point["abcd"]["b_ohm"], 50.0, 0.0);
    is(&point["abcd"]["c_siemens"], 0.0, 0.0);
    is(&point["abcd"]["d"], 1.0, 0.0);
    for (key, expected) in [("s11", 1.0), ("s12", 2.0), ("s21", 2.0), ("s22", 1.0)] {
        is(&point["s"][key], expected / 3.0, 0.0);
    }
    // half of the power that enters: 10 lg 2
    let loss = point["stage_losses_db"][0].as_f64().expect("a number");
    assert_abs_diff_eq!(loss, 10.0 * 2_f64.log10(), epsilon = 1e-12);
}

/// z = j, by 795.775 nH at 10 MHz: Γ = j/(2 + j) = (1 + 2j)/5.
#[test]
fn series_coil_into_the_reference() {
    let (cells, point) = response(&chain(
        "swr_up_to = 2",
        "series = { inductance = \"795.774715459 nH\" }",
    ));
    // |Γ| = 1/√5; arctan 2 = 63.43°; SWR (√5 + 1)/(√5 - 1) = 2.618; 10 lg 5 = 6.99 dB;
    // 10 lg (4/5) = -0.969 dB
    assert_eq!(
        cells[..8],
        [
            "10.000000",
            "0.44721",
            "63.43",
            "50.000",
            "50.000",
            "2.618",
            "6.99",
            "-0.969"
        ]
    );
    assert_abs_diff_eq!(
        point["stage_losses_db"][0].as_f64().expect("a number"),
        0.0,
        epsilon = 1e-12
    );
}

/// y = 1 across the reference is Γ = -1/3, on the other side of the chart.
#[test]
fn shunt_resistor_across_the_reference() {
    let (cells, point) = response(&chain(
        "swr_up_to = 2",
        "shunt = { resistance = \"50 ohm\" }",
    ));
    assert_eq!(
        cells[..8],
        [
            "10.000000",
            "0.33333",
            "180.00",
            "25.000",
            "0.000",
            "2.000",
            "9.54",
            "-3.522"
        ]
    );
    is(&point["abcd"]["b_ohm"], 0.0, 0.0);
    is(&point["abcd"]["c_siemens"], 0.02, 0.0);
}

fn whole(folder: &std::path::Path, load: &[&str]) -> String {
    run_in(folder, [&["respond", "chain.toml"], load].concat()).result()
}

#[test]
fn load_is_the_first_of_the_list_or_the_one_given() {
    let list = "impedances = [[\"100 ohm\", \"-20 ohm\"], [\"25 ohm\", \"0 ohm\"]]";
    let folder = folder_with(chain(list, "series = { resistance = \"10 ohm\" }"));
    let first = whole(folder.path(), &[]);
    assert!(
        first.contains("\nload 100.00 − 20.000j ohm, reference 50.00 ohm\n"),
        "{first}"
    );
    assert_eq!(first, whole(folder.path(), &["--load", "100 ohm, -20 ohm"]));
    assert_eq!(
        first,
        whole(folder.path(), &["--load=0.1 kohm,-20000 mohm"])
    );

    // 10 Ω + 25 Ω: Γ = -15/85
    let other = whole(folder.path(), &["--load", "25 ohm, 0 ohm"]);
    let row = cells(table(&other, "MHz")[1]);
    assert_eq!(row[1].1, "0.17647");
    assert_eq!(row[3].1, "35.000");
}

#[test]
fn load_is_the_reference_where_there_is_no_list() {
    let text = chain("swr_up_to = 2", "series = { resistance = \"10 ohm\" }");
    let folder = folder_with(text.replace("load =", "reference = \"75 ohm\"\nload ="));
    let own = whole(folder.path(), &[]);
    assert!(
        own.contains("\nload 75.000 + 0.000j ohm, reference 75.00 ohm\n"),
        "{own}"
    );
    assert_eq!(own, whole(folder.path(), &["--load", "75 ohm, 0 ohm"]));
}

/// The words' |ΔΓ| stands beside the reference, which does not depend on the words.
#[test]
fn word_length_changes_the_words_alone() {
    let points = |bits: &str| {
        let run = super::run_example(
            "respond",
            "tide-gauge-buoy",
            &["--json", "--word-bits", bits],
        );
        let json: Value = serde_json::from_str(&run.result()).expect("JSON");
        assert_eq!(json["word_bits"].to_string(), bits);
        let points = json["points"].as_array().expect("points").clone();
        let (words, rest): (Vec<_>, Vec<_>) = points
            .into_iter()
            .map(|mut point| (point["word_gamma"].take(), point))
            .unzip();
        (words, rest)
    };
    let (words, rest) = points("32");
    for bits in ["10", "16", "24", "31"] {
        let (other_words, other_rest) = points(bits);
        assert_eq!(rest, other_rest);
        assert_ne!(words, other_words);
    }
}

/// A matched input returns nothing, which is an infinite return loss and no number in JSON.
#[test]
fn matched_input() {
    let (cells, point) = response(&chain("swr_up_to = 2", "transformer = { ratio = 1 }"));
    assert_eq!(
        cells,
        [
            "10.000000",
            "0.00000",
            "0.00",
            "50.000",
            "0.000",
            "1.000",
            "∞",
            "0.000",
            "0"
        ]
    );
    assert!(point["return_loss_db"].is_null());
}

//! The chain file: what is read, what is refused and where, and the chains in `examples/`.

#[path = "chain_file/bank_faults.rs"]
mod bank_faults;
#[path = "chain_file/bank_values.rs"]
mod bank_values;
#[path = "chain_file/examples.rs"]
mod examples;
#[path = "chain_file/file_faults.rs"]
mod file_faults;
#[path = "chain_file/key_faults.rs"]
mod key_faults;
#[path = "chain_file/line_faults.rs"]
mod line_faults;
#[path = "chain_file/positions.rs"]
mod positions;
#[path = "chain_file/setting_faults.rs"]
mod setting_faults;
#[path = "chain_file/stage_faults.rs"]
mod stage_faults;
#[path = "chain_file/values.rs"]
mod values;

use stagebits::chain_file::parse;
use stagebits::plan::Plan;

/// A chain file of which only the stages are given.
fn with_stages(stages: &str) -> String {
    format!(
        "title = \"test\"\n[band]\nfrom = \"2 MHz\"\nto = \"12 MHz\"\n[load]\nswr_up_to = 10\n{stages}\n"
    )
}

/// A chain file with one stage of the kind given.
fn with_stage(kind: &str) -> String {
    with_stages(&format!("[[stage]]\n{kind}"))
}

/// A chain file with one stage, and `settings` in place of band and load.
fn with_settings(settings: &str) -> String {
    format!("title = \"test\"\n{settings}\n[[stage]]\nseries = {{ resistance = \"50 ohm\" }}\n")
}

/// What a right chain file says.
fn plan(text: &str) -> Plan {
    parse(text, "test.toml").unwrap_or_else(|fault| panic!("{fault}"))
}

/// Expects `marked` to be refused for what stands between « and », over its whole width, with a
/// message and a help that hold the texts given.
fn refused(marked: &str, message: &str, help: &str) {
    let (before, rest) = marked.split_once('«').expect("a mark");
    let (fault, after) = rest.split_once('»').expect("an end of the mark");
    let text = format!("{before}{fault}{after}");
    let found = parse(&text, "test.toml").expect_err(&text);
    assert!(
        found.message.contains(message),
        "{message:?} is wanted:\n{found}"
    );
    assert!(found.help.contains(help), "{help:?} is wanted:\n{found}");

    let spot = found
        .spot
        .as_ref()
        .expect("a fault of the text has a place");
    let line = before.matches('\n').count() + 1;
    let column = before.chars().rev().take_while(|&c| c != '\n').count() + 1;
    let place = (
        spot.line as usize,
        spot.column as usize,
        spot.width as usize,
    );
    assert_eq!(
        place,
        (line, column, fault.chars().count().max(1)),
        "\n{found}"
    );
    assert_eq!(text.lines().nth(line - 1).unwrap_or_default(), spot.text);
}

const BAND: &str = "band = { from = \"2 MHz\", to = \"12 MHz\" }";
const LOAD: &str = "load = { swr_up_to = 10 }";

/// Expects a fault in settings in place of the band.
fn bad_band(band: &str, message: &str, help: &str) {
    refused(&with_settings(&format!("{band}\n{LOAD}")), message, help);
}

/// Expects a fault in settings in place of the load.
fn bad_load(load: &str, message: &str, help: &str) {
    refused(&with_settings(&format!("{BAND}\n{load}")), message, help);
}

/// Expects a fault in settings beside band and load.
fn bad_setting(setting: &str, message: &str, help: &str) {
    refused(
        &with_settings(&format!("{BAND}\n{LOAD}\n{setting}")),
        message,
        help,
    );
}

/// Expects a fault in the entries of a stage.
fn bad_stage(stage: &str, message: &str, help: &str) {
    refused(&with_stage(stage), message, help);
}

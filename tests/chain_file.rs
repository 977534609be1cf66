//! The chain file: what is read, what is refused and where, and the chains in `examples/`.

#[path = "chain_file/examples.rs"]
mod examples;
#[path = "chain_file/faults.rs"]
mod faults;
#[path = "chain_file/files.rs"]
mod files;
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

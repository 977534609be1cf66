//! Faults of a bank: its steps, its losses, its contacts.

use super::bad_stage;

fn bad_bank(entries: &str, message: &str, help: &str) {
    bad_stage(&format!("shunt_bank = {{ {entries} }}"), message, help);
}

const COILS: &str = "inductances = [\"1 uH\", \"2 uH\"]";

#[test]
fn values() {
    bad_stage(
        "shunt_bank = «{ q = 100 }»",
        "a bank has none of `inductances`, `capacitances`",
        "such as inductances = [\"60 nH\", \"120 nH\", \"240 nH\"] or inductances = { first",
    );
    bad_bank(
        &format!("{COILS}, «capacitances» = [\"1 pF\"]"),
        "a bank has both `inductances` and `capacitances`",
        "keep one of `inductances` and `capacitances`",
    );
    bad_bank(
        "«inductance» = \"1 uH\"",
        "unknown key `inductance` in a bank",
        "did you mean `inductances`? a bank takes `inductances`, `capacitances`, `q`, `esr`",
    );
    bad_bank(
        "capacitances = «\"10 pF\"»",
        "`capacitances` is a string; an array is wanted",
        "write for example capacitances = [\"10 pF\", \"22 pF\", \"47 pF\"] or",
    );
    bad_bank(
        "capacitances = «[]»",
        "the bank has no steps",
        "write for example capacitances = [\"10 pF\"",
    );
    let sixteen = "\"1 pF\", ".repeat(16);
    bad_bank(
        &format!("capacitances = [{sixteen} «\"1 pF\"», \"1 pF\"]"),
        "the bank has 18 steps; the firmware switches 16",
        "make two banks of it, one stage each",
    );
    bad_bank(
        "capacitances = [\"1 pF\", «\"0 pF\"»]",
        "\"0 pF\" is zero",
        "write a capacitance from 1 fF to 1 F",
    );
    bad_bank(
        "inductances = [«\"10 pF\"»]",
        "\"10 pF\" is a capacitance; an inductance is wanted",
        "write an inductance, such as",
    );
    bad_bank(
        "inductances = [«10»]",
        "`inductances` is 10, without a unit; an inductance is wanted",
        "write a string with a unit",
    );
    bad_bank(
        "inductances = [«[\"1 uH\"]»]",
        "`inductances` is an array; a string with an inductance is wanted",
        "write for example",
    );
}

#[test]
fn values_that_double() {
    bad_bank(
        "inductances = «{ steps = 8 }»",
        "a bank that doubles has no `first`",
        "add first = \"60 nH\"",
    );
    bad_bank(
        "capacitances = «{ first = \"10 pF\" }»",
        "a bank that doubles has no `steps`",
        "add steps = 8",
    );
    bad_bank(
        "capacitances = { first = \"10 pF\", «last» = \"20 pF\" }",
        "unknown key `last` in a bank that doubles",
        "a bank that doubles takes `first`, `steps`",
    );
    bad_bank(
        "capacitances = { first = «\"10 nH\"», steps = 8 }",
        "\"10 nH\" is an inductance; a capacitance is wanted",
        "write a capacitance",
    );
    bad_bank(
        "capacitances = { first = «\"0 pF\"», steps = 8 }",
        "\"0 pF\" is zero",
        "write a capacitance from 1 fF to 1 F",
    );
    for steps in ["0", "17", "2.5", "-1"] {
        bad_bank(
            &format!("capacitances = {{ first = \"10 pF\", steps = «{steps}» }}"),
            &format!("`steps` is {steps}; it has to be a whole number from 1 to 16"),
            "steps = 8",
        );
    }
    bad_bank(
        "capacitances = { first = «\"0.3 F\"», steps = 3 }",
        "the last of 3 steps is 1.2 F",
        "the most is 1 F; write a smaller first",
    );
}

#[test]
fn losses() {
    bad_bank(
        &format!("{COILS}, q = 100, «esr» = \"1 ohm\""),
        "a bank has both `q` and `esr`",
        "keep one of `q` and `esr`",
    );
    bad_bank(
        &format!("{COILS}, q = «0»"),
        "`q` is 0; it has to be from 0.001 to 1e9",
        "write for example q = 180",
    );
    bad_bank(
        &format!("{COILS}, q = «[100]»"),
        "1 values of `q` for 2 steps",
        "write one value for all steps, or one for each",
    );
    bad_bank(
        &format!("{COILS}, esr = «[\"1 ohm\", \"1 ohm\", \"1 ohm\"]»"),
        "3 values of `esr` for 2 steps",
        "write one value for all steps, or one for each",
    );
    bad_bank(
        &format!("{COILS}, q = [100, «0»]"),
        "`q` is 0; it has to be from 0.001 to 1e9",
        "write for example q = 180",
    );
    bad_bank(
        &format!("{COILS}, esr = «\"0 ohm\"»"),
        "\"0 ohm\" is zero",
        "write a resistance from",
    );
}

#[test]
fn contacts() {
    bad_bank(
        &format!("{COILS}, contact = «\"0 ohm\"»"),
        "\"0 ohm\" is zero",
        "write a resistance from",
    );
    bad_bank(
        &format!("{COILS}, contact = «0.05»"),
        "`contact` is 0.05, without a unit; a resistance is wanted",
        "such as contact = \"0.05 ohm\"",
    );
    bad_bank(
        &format!("{COILS}, stray = «\"1 ohm\"»"),
        "\"1 ohm\" is a resistance; a capacitance is wanted",
        "write a capacitance",
    );
    bad_bank(
        &format!("{COILS}, «contacts» = \"1 ohm\""),
        "unknown key `contacts` in a bank",
        "did you mean `contact`?",
    );
}

#[test]
fn kinds() {
    bad_stage(
        "«bank» = {}",
        "unknown key `bank` in [[stage]]",
        "`transformer`, `series_bank`, `shunt_bank`",
    );
    bad_stage(
        "shunt_bank = {}\n«series_bank» = {}",
        "[[stage]] has both `shunt_bank` and `series_bank`",
        "keep one of",
    );
    bad_stage(
        "shunt_bank = «[\"1 pF\"]»",
        "`shunt_bank` is an array; a table is wanted",
        "shunt_bank = { capacitances",
    );
}

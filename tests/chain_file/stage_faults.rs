//! Faults of a stage: its kind, its transformer, its branch.

use super::{bad_stage, refused, with_stage};

fn bad_branch(elements: &str, message: &str, help: &str) {
    bad_stage(&format!("series = {{ {elements} }}"), message, help);
}

#[test]
fn kinds() {
    bad_stage(
        "name = \"x\"\ntransformer = { ratio = 1 }\n«line» = {}",
        "[[stage]] has both `transformer` and `line`",
        "keep one of `transformer` and `line`",
    );
    bad_stage(
        "series.resistance = \"1 ohm\"\n«shunt».resistance = \"1 ohm\"",
        "[[stage]] has both `series` and `shunt`",
        "keep one of",
    );
    bad_stage(
        "«lines» = {}",
        "unknown key `lines` in [[stage]]",
        "did you mean `line`?",
    );
    bad_stage(
        "«resistor» = {}",
        "unknown key `resistor` in [[stage]]",
        "takes `name`, `line`, `series`, `shunt`, `series_stub`, `shunt_stub`, `transformer`",
    );
    bad_stage(
        "name = «\"  \"»\nshunt = {}",
        "`name` is empty",
        "name = \"patch lead\"",
    );
    bad_stage(
        "name = «7»\nshunt = {}",
        "`name` is a number; a string is wanted",
        "name = \"patch lead\"",
    );
    bad_stage(
        "series = «\"50 ohm\"»",
        "`series` is a string; a table is wanted",
        "series = {",
    );
}

#[test]
fn no_kind() {
    let text = with_stage("name = \"empty\"").replace("[[stage]]", "«[[stage]]»");
    refused(
        &text,
        "[[stage]] has none of `line`, `series`",
        "such as line = {",
    );
}

#[test]
fn transformer() {
    bad_stage(
        "transformer = «{}»",
        "a transformer has no `ratio`",
        "add ratio = 3",
    );
    bad_stage(
        "transformer = { «ration» = 3 }",
        "unknown key `ration` in a transformer",
        "`ratio`?",
    );
    for bad in ["0", "-3", "inf", "nan", "1e4"] {
        bad_stage(
            &format!("transformer.ratio = «{bad}»"),
            &format!("`ratio` is {bad}; it has to be from 0.001 to 1000"),
            "ratio = 3",
        );
    }
    bad_stage(
        "transformer.ratio = «\"3:1\"»",
        "`ratio` is a string; a number is wanted",
        "ratio = 3",
    );
}

#[test]
fn branch_elements() {
    bad_stage(
        "shunt = «{}»",
        "the branch has no element",
        "add a resistance, an inductance or",
    );
    bad_branch(
        "«inductor» = \"1 uH\"",
        "unknown key `inductor` in a branch",
        "did you mean `inductance` or `inductor_q` or `inductor_esr`?",
    );
    bad_branch(
        "inductance = «\"5 ohm\"»",
        "\"5 ohm\" is a resistance; an inductance is wanted",
        "\"1.2 uH\"",
    );
    bad_branch(
        "capacitance = «\"5 ohm\"»",
        "\"5 ohm\" is a resistance; a capacitance is wanted",
        "\"100 pF\"",
    );
    bad_branch(
        "resistance = «\"5 pF\"»",
        "\"5 pF\" is a capacitance; a resistance is wanted",
        "\"50 ohm\"",
    );
    bad_branch(
        "inductance = «\"0 uH\"»",
        "\"0 uH\" is zero",
        "an inductance from 1 fH to 1 kH",
    );
    bad_branch(
        "inductance = «\"2 kH\"»",
        "\"2 kH\" is out of range",
        "an inductance from 1 fH to 1 kH",
    );
    bad_branch(
        "capacitance = «\"-1 pF\"»",
        "\"-1 pF\" is negative",
        "a capacitance from 1 fF to 1 F",
    );
    bad_branch(
        "capacitance = «\"100 F\"»",
        "\"100 F\" is out of range",
        "a capacitance from 1 fF to 1 F",
    );
    bad_branch(
        "capacitance = \"10 «pf»\"",
        "unknown unit \"pf\"",
        "write \"10 pF\"",
    );
    bad_branch(
        "inductance = \"«1,2» uH\"",
        "\"1,2\" is not a number",
        "write a point before the decimals: 1.2",
    );
    bad_branch(
        "inductance = \"«1e400» uH\"",
        "\"1e400\" is too large",
        "\"1.2 uH\"",
    );
}

#[test]
fn arrangement() {
    let two = "inductance = \"1 uH\", capacitance = \"1 nF\"";
    bad_stage(
        &format!("series = «{{ {two} }}»"),
        "a branch of 2 elements has no `arrangement`",
        "\"series\" or arrangement = \"parallel\"",
    );
    bad_branch(
        &format!("{two}, arrangement = «\"paralel\"»"),
        "`arrangement` is \"paralel\"",
        "write \"series\" or \"parallel\"",
    );
    bad_branch(
        &format!("{two}, arrangement = «\"\"\"»\nboth\"\"\""),
        "`arrangement` is \"\"\"...",
        "write \"series\" or \"parallel\"",
    );
    bad_branch(
        &format!("{two}, arrangement = «1»"),
        "`arrangement` is a number; a string",
        "arrangement = \"series\"",
    );
    bad_branch(
        "resistance = \"1 ohm\", «arrangement» = \"series\"",
        "says nothing about a single element",
        "leave it out",
    );
}

#[test]
fn branch_losses() {
    let two = "arrangement = \"parallel\", inductance = \"1 uH\", capacitance = \"1 nF\"";
    bad_branch(
        "inductance = \"1 uH\", q = 90, «esr» = \"1 ohm\"",
        "a branch has both `q` and `esr`",
        "keep one of `q` and `esr`",
    );
    bad_branch(
        "inductance = \"1 uH\", inductor_q = 90, «q» = 80",
        "a branch has both `inductor_q` and `q`",
        "keep one",
    );
    bad_branch(
        &format!("{two}, capacitor_esr = \"1 ohm\", «capacitor_q» = 90"),
        "has both `capacitor_esr` and `capacitor_q`",
        "keep one",
    );
    bad_branch(
        &format!("{two}, «q» = 90"),
        "`q` could be of the coil or of the capacitor",
        "write `inductor_q` or `capacitor_q`",
    );
    bad_branch(
        &format!("{two}, «esr» = \"1 ohm\""),
        "`esr` could be of the coil or of",
        "`inductor_esr` or `capacitor_esr`",
    );
    bad_branch(
        "resistance = \"1 ohm\", «q» = 90",
        "a branch of a resistor alone has no `q`",
        "a resistor is its own loss",
    );
    bad_branch(
        "resistance = \"1 ohm\", «esr» = \"1 ohm\"",
        "a branch of a resistor alone has no `esr`",
        "leave it out",
    );
    bad_branch(
        "capacitance = \"1 nF\", «inductor_q» = 90",
        "`inductor_q` without `inductance`",
        "add inductance = \"1.2 uH\", or leave it out",
    );
    bad_branch(
        "resistance = \"1 ohm\", «capacitor_esr» = \"1 ohm\"",
        "`capacitor_esr` without `capacitance`",
        "add capacitance",
    );
    bad_branch(
        &format!("{two}, capacitor_esr = \"1 ohm\", «inductor_esr» = \"1 ohm\""),
        "both reactors of a parallel arrangement have an ESR",
        "one of them as its Q",
    );
    for bad in ["0", "-5", "nan", "inf", "1e12"] {
        bad_branch(
            &format!("inductance = \"1 uH\", q = «{bad}»"),
            &format!("`q` is {bad}; it has to be from 0.001 to 1e9"),
            "q = 180",
        );
    }
    bad_branch(
        "inductance = \"1 uH\", esr = «\"0 ohm\"»",
        "\"0 ohm\" is zero",
        "a resistance from 1 uohm",
    );
    bad_branch(
        "inductance = \"1 uH\", q = «\"90 ohm\"»",
        "`q` is a string; a number is wanted",
        "q = 180",
    );
}

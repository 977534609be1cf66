//! Faults of the syntax and of the keys: unknown, missing, duplicate, of the wrong kind.

use super::{BAND, LOAD, bad_band, bad_load, bad_setting, refused};

#[test]
fn syntax() {
    let text = "text and quantities stand in double quotes";
    bad_band(
        "band.from = «2 MHz»",
        "`2 MHz` is not a number",
        "double quotes: \"2 MHz\"",
    );
    bad_band("band.from = «»", "no value", "behind the `=`");
    bad_band(
        "band.from = \"2 MHz«»",
        "not valid TOML: invalid basic string, expected `\"`",
        text,
    );
    bad_band(
        "[band«»\nfrom = 3",
        "unclosed table, expected `]`",
        "a table starts with [name]",
    );
    bad_band("band «\"»2 MHz\"", "key with no value, expected `=`", text);
    bad_load(
        "load.swr_up_to = «0»10",
        "unexpected leading zero",
        "a number such as 41",
    );
}

#[test]
fn duplicate_keys() {
    let help = "a table holds each key once, and only [[stage]] may stand several times";
    bad_band(
        "[band]\nfrom = \"2 MHz\"\n«from» = \"3 MHz\"",
        "duplicate key `from`",
        help,
    );
    bad_band(
        "[band]\nfrom = \"2 MHz\"\n[«band»]",
        "duplicate key `band`",
        help,
    );
    bad_load(
        "load = { swr_up_to = 1, «swr_up_to» = 2 }",
        "duplicate key `swr_up_to`",
        help,
    );
}

#[test]
fn unknown_keys() {
    bad_setting(
        "«refrence» = \"50 ohm\"",
        "unknown key `refrence` in the chain file",
        "did you mean `reference`?",
    );
    bad_setting(
        "[«Accuracy»]",
        "unknown key `Accuracy`",
        "did you mean `accuracy`?",
    );
    bad_setting(
        "«colour» = 3",
        "unknown key `colour`",
        "takes `title`, `reference`, `band`, `load`, `firmware`, `accuracy`, `stage`",
    );
    // A slip in a required key is a slip, not a missing key.
    bad_band(
        "band = { «form» = \"2 MHz\", to = \"12 MHz\" }",
        "unknown key `form` in [band]",
        "did you mean `from`? [band] takes `from`, `to`, `points`",
    );
    bad_load(
        "load = { «swr» = 3 }",
        "unknown key `swr` in [load]",
        "did you mean `swr_up_to`?",
    );
    bad_load(
        "load = { «\"swr up\\u0007\"» = 3 }",
        "unknown key `swr up\\u{7}`",
        "[load] takes",
    );
    bad_setting(
        "firmware = { «word-bits» = 32 }",
        "unknown key `word-bits` in [firmware]",
        "did you mean `word_bits`?",
    );
    bad_setting(
        "accuracy = { «gama» = 32 }",
        "unknown key `gama` in [accuracy]",
        "did you mean `gamma`?",
    );
}

#[test]
fn the_first_of_several_unknown_keys_is_reported() {
    bad_band(
        "[band]\n«zulu» = 1\nalpha = 1",
        "unknown key `zulu`",
        "takes",
    );
}

#[test]
fn missing_keys() {
    refused(
        "«b»and = {}",
        "the chain file has no `title`",
        "add title = \"",
    );
    refused("«»", "the chain file has no `title`", "add title = \"");
    refused(
        "«t»itle = \"t\"",
        "the chain file has no `band`",
        "add band = {",
    );
    refused(
        &format!("«t»itle = \"t\"\n{BAND}"),
        "the chain file has no `load`",
        "add load = {",
    );
    refused(
        &format!("«t»itle = \"t\"\n{BAND}\n{LOAD}"),
        "the chain file has no `stage`",
        "add [[stage]]",
    );
    bad_band(
        "«[band]»\nto = \"2 MHz\"\n[load]\nswr_up_to=1",
        "[band] has no `from`",
        "add from = \"2 MHz\"",
    );
    bad_band(
        "band = «{ from = \"2 MHz\" }»",
        "[band] has no `to`",
        "add to = \"12 MHz\"",
    );
    bad_load(
        "load = «{}»",
        "[load] has none of `swr_up_to`, `impedances`",
        "such as swr_up_to = 10",
    );
}

#[test]
fn stage_list() {
    let start = format!("title = \"t\"\n{BAND}\n{LOAD}\n");
    refused(
        &format!("{start}stage = «[]»"),
        "the chain has no stage",
        "[[stage]]",
    );
    refused(
        &format!("{start}«[stage]»"),
        "`stage` is a table; an array is wanted",
        "[[stage]] in double brackets",
    );
    refused(
        &format!("{start}stage = [«3»]"),
        "`stage` is a number; a table is wanted",
        "[[stage]]",
    );
    let stage = "[[stage]]\ntransformer.ratio = 1\n";
    refused(
        &format!("{start}{}«[[stage]]»\n{stage}", stage.repeat(16)),
        "the chain has 18 stages; the firmware has room for 16",
        "join neighbouring stages",
    );
}

//! Faults outside the stages: title, reference, band, load, firmware and accuracy.

use super::{BAND, LOAD, bad_band, bad_load, bad_setting, refused};

#[test]
fn title() {
    let rest = format!("{BAND}\n{LOAD}\n[[stage]]\ntransformer.ratio = 1");
    refused(
        &format!("title = «\"\"»\n{rest}"),
        "`title` is empty",
        "write for example title = \"",
    );
    refused(
        &format!("title = «\" \\t\"»\n{rest}"),
        "`title` is empty",
        "write for example title = \"",
    );
    refused(
        &format!("title = «3»\n{rest}"),
        "`title` is a number; a string is wanted",
        "title = \"",
    );
    refused(
        &format!("title = «2024-05-01»\n{rest}"),
        "is a date or time; a string",
        "title = \"",
    );
    refused(
        &format!("title = «\"a\\nb\"»\n{rest}"),
        "`title` holds a control character",
        "one line",
    );
}

#[test]
fn reference() {
    bad_setting(
        "reference = «50»",
        "`reference` is 50, without a unit; a resistance is wanted",
        "\"50 ohm\"",
    );
    bad_setting(
        "reference = «\"50\"»",
        "\"50\" has no unit; a resistance is wanted",
        "\"50 ohm\"",
    );
    bad_setting(
        "reference = «\"50 nH\"»",
        "\"50 nH\" is an inductance; a resistance is wanted",
        "\"50 ohm\"",
    );
    bad_setting(
        "reference = «\"0 ohm\"»",
        "\"0 ohm\" is zero",
        "a resistance from 1 uohm to 1 Gohm",
    );
    bad_setting(
        "reference = «\"-50 ohm\"»",
        "\"-50 ohm\" is negative",
        "a resistance from 1 uohm",
    );
    bad_setting(
        "reference = «\"2 Gohm\"»",
        "\"2 Gohm\" is out of range",
        "to 1 Gohm",
    );
    bad_setting(
        "reference = «true»",
        "`reference` is a boolean; a string with a resistance",
        "\"50 ohm\"",
    );
    bad_setting(
        "reference = \"50 «ohms»\"",
        "unknown unit \"ohms\"",
        "write \"50 ohm\"",
    );
    bad_setting(
        "reference = \"50 «Tohm»\"",
        "unknown prefix \"T\" of the unit \"ohm\"",
        "f p n u m k M G",
    );
    bad_setting(
        "reference = \"«fifty» ohm\"",
        "\"fifty\" is not a number",
        "\"50 ohm\"",
    );
    bad_setting(
        "reference = \"«nan» ohm\"",
        "\"nan\" is not a number",
        "\"50 ohm\"",
    );
    bad_setting(
        "reference = «\"\"»",
        "\"\" is empty; a resistance is wanted",
        "\"50 ohm\"",
    );
}

#[test]
fn band() {
    bad_band(
        "band = { from = \"2 MHz\", to = «\"1 MHz\"» }",
        "the band ends at 1000000 Hz, below its start at 2000000 Hz",
        "from 2000000 Hz up",
    );
    bad_band(
        "band.from = «\"0.5 Hz\"»",
        "\"0.5 Hz\" is out of range",
        "from 1 Hz to 4.294967295 GHz",
    );
    bad_band(
        "band.from = «\"5 GHz\"»",
        "\"5 GHz\" is out of range",
        "from 1 Hz to 4.294967295 GHz",
    );
    bad_band(
        "band.from = «\"2.0000005 MHz\"»",
        "`from` is \"2.0000005 MHz\", which is 2000000.5 Hz",
        "whole hertz",
    );
    bad_band(
        "band.from = \"2 «mhz»\"",
        "unknown unit \"mhz\"",
        "write \"2 MHz\"",
    );
    bad_band(
        "band.from = «\"2MHz\"»",
        "\"2MHz\" has no blank",
        "write \"2 MHz\"",
    );
    bad_band(
        "band.from = «[\"2 MHz\"]»",
        "`from` is an array; a string with a frequency",
        "\"2 MHz\"",
    );
    bad_band(
        "band = «\"2 MHz\"»",
        "`band` is a string; a table is wanted",
        "band = {",
    );
}

#[test]
fn band_points() {
    let with = |points: &str| {
        format!("band = {{ from = \"7 MHz\", to = \"7.000010 MHz\", points = {points} }}")
    };
    bad_band(
        &with("«0»"),
        "`points` is 0; it has to be a whole number from 1 to 100000",
        "points = 41",
    );
    bad_band(
        &with("«-3»"),
        "`points` is -3; it has to be a whole number",
        "points = 41",
    );
    bad_band(
        &with("«4.5»"),
        "`points` is 4.5; it has to be a whole number",
        "points = 41",
    );
    bad_band(&with("«100001»"), "`points` is 100001", "points = 41");
    bad_band(
        &with("«99999999999999999999»"),
        "`points` is 99999999999999999999;",
        "points = 41",
    );
    bad_band(
        &with("«0x1_0000_0000_0000_0000_0000_0000_0000_0000_0»"),
        "`points` is 0x1_0000",
        "points = 41",
    );
    bad_band(
        &with("«12»"),
        "12 points are more than the band has whole hertz, 11",
        "points = 11 or less",
    );
    bad_band(&with("«1»"), "one point cannot cover", "2 points or more");
    bad_band(
        &with("«\"4\"»"),
        "`points` is a string; a number is wanted",
        "points = 4",
    );
    bad_band(
        &with("«\"many\"»"),
        "`points` is a string; a number is wanted",
        "points = 41",
    );
}

#[test]
fn load() {
    bad_load(
        "load = { swr_up_to = 3, «impedances» = [] }",
        "[load] has both `swr_up_to` and `impedances`",
        "keep one of",
    );
    bad_load(
        "load = { impedances = [], «swr_up_to» = 3 }",
        "[load] has both `impedances` and `swr_up_to`",
        "keep one of",
    );
    for bad in ["0.99", "-2", "inf", "nan", "1e999", "0"] {
        bad_load(
            &format!("load.swr_up_to = «{bad}»"),
            &format!("`swr_up_to` is {bad}; it has to be 1 or more, and finite"),
            "swr_up_to = 10",
        );
    }
    bad_load(
        "load.impedances = «[]»",
        "0 impedances, where 1 to 100000 are wanted",
        "[[\"30 ohm\", \"-40 ohm\"]]",
    );
    bad_load(
        "load.impedances = [«\"30 ohm\"»]",
        "`impedances` is a string; an array is wanted",
        "[[",
    );
    bad_load(
        "load.impedances = [[\"1 ohm\", \"1 ohm\"], «[\"30 ohm\"]»]",
        "an impedance of 1 values; two",
        "[\"30 ohm\", \"-40 ohm\"]",
    );
    bad_load(
        "load.impedances = [[«\"-1 ohm\"», \"1 ohm\"]]",
        "\"-1 ohm\" is negative",
        "from 0 ohm to 1 Gohm",
    );
    bad_load(
        "load.impedances = [[\"1 ohm\", «\"-2 Gohm\"»]]",
        "\"-2 Gohm\" is out of range",
        "from -1 Gohm to 1 Gohm",
    );
    bad_load(
        "load.impedances = [[\"1 ohm\", «5»]]",
        "`impedances` is 5, without a unit",
        "\"-40 ohm\"",
    );
}

#[test]
fn firmware_and_accuracy() {
    for bad in ["24", "0", "16.5", "-16", "nan"] {
        bad_setting(
            &format!("firmware.word_bits = «{bad}»"),
            &format!("`word_bits` is {bad}; it has to be 16 or 32"),
            "word_bits = 32",
        );
    }
    for bad in ["0", "0.0", "-1e-4", "1.5", "inf", "+nan"] {
        bad_setting(
            &format!("accuracy.gamma = «{bad}»"),
            &format!("`gamma` is {bad}; it has to be above 0 and at most 1"),
            "gamma = 1e-4",
        );
    }
    bad_setting(
        "accuracy.gamma = «\"1e-4\"»",
        "`gamma` is a string; a number is wanted",
        "gamma = 1e-4",
    );
    bad_setting(
        "accuracy = «1e-4»",
        "`accuracy` is a number; a table is wanted",
        "accuracy = {",
    );
}

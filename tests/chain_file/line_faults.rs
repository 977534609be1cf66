//! Faults of a line, a stub and their losses.

use super::bad_stage;

/// A line with `property`, all else being right.
fn bad_line(property: &str, message: &str, help: &str) {
    let mut line = property.to_owned();
    for (key, value) in [
        ("impedance", "\"50 ohm\""),
        ("length", "\"1 m\""),
        ("velocity", "0.66"),
    ] {
        if !property.contains(key) {
            line.push_str(&format!(", {key} = {value}"));
        }
    }
    bad_stage(&format!("line = {{ {line} }}"), message, help);
}

fn bad_loss(points: &str, message: &str, help: &str) {
    bad_line(&format!("loss_db_per_100m = {{ {points} }}"), message, help);
}

#[test]
fn lines_and_stubs() {
    bad_stage(
        "line = «{ length = \"1 m\", velocity = 1 }»",
        "a line has no `impedance`",
        "add impedance = \"50 ohm\"",
    );
    bad_stage(
        "line = «{ impedance = \"50 ohm\", velocity = 1 }»",
        "a line has no `length`",
        "add length = \"0.6 m\"",
    );
    bad_stage(
        "line = «{ impedance = \"50 ohm\", length = \"1 m\" }»",
        "a line has no `velocity`",
        "add velocity = 0.66",
    );
    bad_line(
        "length = «\"0 m\"»",
        "\"0 m\" is zero",
        "a length from 1 um to 1 Mm",
    );
    bad_line(
        "length = \"60 «cm»\"",
        "unknown prefix \"c\" of the unit \"m\"",
        "f p n u m k M G",
    );
    bad_line(
        "length = «\"60 ohm\"»",
        "\"60 ohm\" is a resistance; a length is wanted",
        "\"0.6 m\"",
    );
    for bad in ["1.01", "0", "-0.66", "66", "nan"] {
        bad_line(
            &format!("velocity = «{bad}»"),
            &format!("`velocity` is {bad}; it has to be from 0.001 to 1"),
            "velocity = 0.66",
        );
    }
    bad_line(
        "«end» = \"open\"",
        "unknown key `end` in a line",
        "takes `impedance`, `length`",
    );
    bad_line(
        "«loss» = 3",
        "unknown key `loss` in a line",
        "did you mean `loss_db_per_100m`?",
    );
    let stub = "impedance = \"50 ohm\", length = \"1 m\", velocity = 1";
    bad_stage(
        &format!("shunt_stub = «{{ {stub} }}»"),
        "a stub has no `end`",
        "add end = \"open\"",
    );
    bad_stage(
        &format!("shunt_stub = {{ end = «\"closed\"», {stub} }}"),
        "`end` is \"closed\"",
        "\"open\" or \"short\"",
    );
    bad_stage(
        &format!("series_stub = {{ end = «true», {stub} }}"),
        "`end` is a boolean; a string",
        "end = \"open\"",
    );
}

#[test]
fn line_losses() {
    bad_line(
        "loss_db_per_100m = «3»",
        "`loss_db_per_100m` is a number; a table is wanted",
        "{ \"10 MHz\" = 2.2",
    );
    bad_loss(
        "\"10 «mhz»\" = 2",
        "unknown unit \"mhz\"",
        "write \"10 MHz\"",
    );
    bad_loss(
        "«\"10 m\"» = 2",
        "\"10 m\" is a length; a frequency is wanted",
        "\"2 MHz\"",
    );
    bad_loss(
        "«10» = 2",
        "\"10\" has no unit; a frequency is wanted",
        "\"2 MHz\"",
    );
    bad_loss(
        "«\"0 Hz\"» = 2",
        "\"0 Hz\" is zero",
        "a frequency from 1 Hz",
    );
    bad_loss(
        "\"10 MHz\" = «\"2 dB\"»",
        "`loss_db_per_100m` is a string; a number is wanted",
        "2.2",
    );
    for bad in ["-2", "nan", "inf", "1e7"] {
        bad_loss(
            &format!("\"10 MHz\" = «{bad}»"),
            &format!("is {bad}; it has to be from 0 to 1e6 dB per 100 m"),
            "2.2",
        );
    }
    bad_loss(
        "\"1 MHz\" = 1, \"2 MHz\" = 1.6, «\"3 MHz\"» = 2",
        "the table holds more than two frequencies",
        "keep two",
    );
    bad_loss(
        "\"10 MHz\" = 1, «\"10000 kHz\"» = 2",
        "the table holds this frequency already",
        "another frequency",
    );
}

#[test]
fn line_losses_that_no_line_has() {
    // Twice the frequency: 2 dB has to rise to between 2.83 and 4 dB.
    bad_loss(
        "\"10 MHz\" = 2, \"20 MHz\" = «2.8»",
        "from 2 dB at 10 MHz to 2.8 dB at 20 MHz; a line's loss, k1·√f + k2·f, rises at least as √f and at most as f",
        "write 2.9 to 4 dB",
    );
    bad_loss(
        "\"10 MHz\" = 2, \"20 MHz\" = «4.1»",
        "from 2 dB at 10 MHz to 4.1 dB at 20 MHz",
        "write 2.9 to 4 dB",
    );
    // The mark is on the loss at the higher frequency, wherever it stands.
    bad_loss(
        "\"20 MHz\" = «1.5», \"10 MHz\" = 2",
        "from 2 dB at 10 MHz to 1.5 dB at 20 MHz",
        "write 2.9 to 4 dB",
    );
    bad_loss(
        "\"10 MHz\" = 2, \"10.001 MHz\" = «2.1»",
        "2.1 dB at 10.001 MHz",
        "write 2.0001 to 2.0002 dB",
    );
    bad_loss(
        "\"10 MHz\" = 0, \"20 MHz\" = «1»",
        "from 0 dB at 10 MHz",
        "write 0 to 0 dB",
    );
}

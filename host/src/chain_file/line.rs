//! A line, and its loss from what a cable's data sheet gives.

use super::loss::{self, Constants, Limits, Point};
use super::table::{Key, Table};
use super::value::Value;
use crate::diagnostic::Diagnostic;
use crate::plan::{DECIBELS_PER_NEPER, Line, Termination};
use crate::quantity::Dimension;

const END: Key = Key::new("end", r#"end = "open""#);
const IMPEDANCE: Key = Key::new("impedance", r#"impedance = "50 ohm""#);
const LENGTH: Key = Key::new("length", r#"length = "0.6 m""#);
const VELOCITY: Key = Key::new("velocity", "velocity = 0.66");
const LOSS: Key = Key::new(
    "loss_db_per_100m",
    r#"loss_db_per_100m = { "10 MHz" = 2.2, "100 MHz" = 7.6 }"#,
);

/// Reads a line in the through path.
pub(super) fn line(value: &Value<'_>) -> Result<Line, Diagnostic> {
    let table = value.table("a line", &[IMPEDANCE, LENGTH, VELOCITY, LOSS])?;
    properties(&table)
}

/// Reads a stub: a line with a far end.
pub(super) fn stub(value: &Value<'_>) -> Result<(Termination, Line), Diagnostic> {
    let table = value.table("a stub", &[END, IMPEDANCE, LENGTH, VELOCITY, LOSS])?;
    let ends = [("open", Termination::Open), ("short", Termination::Short)];
    Ok((table.required(END)?.word(&ends)?, properties(&table)?))
}

fn properties(table: &Table<'_>) -> Result<Line, Diagnostic> {
    let Constants { k1, k2 } = match table.optional(LOSS) {
        Some(value) => constants(&value)?,
        None => Constants::default(),
    };
    Ok(Line {
        impedance: table.required(IMPEDANCE)?.quantity(Dimension::Resistance)?,
        length: table.required(LENGTH)?.quantity(Dimension::Length)?,
        // A wave a thousand times slower than light is beyond any line; it is a slip of the pen.
        velocity: table
            .required(VELOCITY)?
            .number("from 0.001 to 1", |velocity| {
                (1e-3..=1.0).contains(&velocity)
            })?,
        k1,
        k2,
    })
}

/// Loss constants in nepers per metre from a table of frequency to dB per 100 m.
fn constants(table: &Value<'_>) -> Result<Constants, Diagnostic> {
    let mut points: Vec<(Point, Value<'_>)> = Vec::new();
    for (hertz, loss) in table.quantity_entries(Dimension::Frequency)? {
        if points.iter().any(|(point, _)| point.hertz == hertz) {
            let message = "the table holds this frequency already".to_owned();
            return Err(loss.key_fault(message, "write another frequency, or one alone"));
        }
        if points.len() == 2 {
            let message = "the table holds more than two frequencies".to_owned();
            let help = "keep two near the ends of the band; k1·√f + k2·f goes through both";
            return Err(loss.key_fault(message, help));
        }
        let attenuation = loss.number("from 0 to 1e6 dB per 100 m", |attenuation| {
            (0.0..=1e6).contains(&attenuation)
        })?;
        points.push((Point { hertz, attenuation }, loss));
    }
    points.sort_by(|(one, _), (other, _)| one.hertz.total_cmp(&other.hertz));
    let constants = match &points[..] {
        [] => Constants::default(),
        [(only, _)] => loss::through_one(*only),
        [(low, _), (high, value), ..] => loss::through_two(*low, *high)
            .map_err(|limits| beyond_limits(*low, *high, limits, value))?,
    };
    let per_metre = 1.0 / (100.0 * DECIBELS_PER_NEPER);
    Ok(Constants {
        k1: constants.k1 * per_metre,
        k2: constants.k2 * per_metre,
    })
}

fn beyond_limits(low: Point, high: Point, limits: Limits, value: &Value<'_>) -> Diagnostic {
    let point = |point: Point| {
        let frequency = Dimension::Frequency.write(point.hertz);
        format!("{} dB at {frequency}", point.attenuation)
    };
    let message = format!(
        "the loss goes from {} to {}; a line's loss, k1·√f + k2·f, \
         rises at least as √f and at most as f",
        point(low),
        point(high)
    );
    // As many decimals as tell the limits apart, both rounded inwards.
    let decimals = (1.0 - (limits.high - limits.low).log10())
        .ceil()
        .clamp(0.0, 15.0);
    let scale = 10f64.powf(decimals);
    let help = format!(
        "at the higher frequency write {} to {} dB, or leave one frequency out",
        (limits.low * scale).ceil() / scale,
        (limits.high * scale).floor() / scale
    );
    value.fault(message, help)
}

//! All of a chain file but its loads and stages: title, reference, band, firmware, accuracy.

use std::path::Path;

use toml::de::DeTable;

use super::load;
use super::stage;
use super::table::{Key, Table};
use super::value::Value;
use crate::diagnostic::{Diagnostic, Source};
use crate::plan::{Accuracy, Band, Firmware, Plan, STAGE_CAPACITY, Stage};
use crate::quantity::Dimension;

const TITLE: Key = Key::new("title", r#"title = "antenna tuner, 2 to 12 MHz""#);
const REFERENCE: Key = Key::new("reference", r#"reference = "50 ohm""#);
const BAND: Key = Key::new("band", r#"band = { from = "2 MHz", to = "12 MHz" }"#);
const LOAD: Key = Key::new("load", "load = { swr_up_to = 10 }");
const FIRMWARE: Key = Key::new("firmware", "firmware = { word_bits = 32 }");
const ACCURACY: Key = Key::new("accuracy", "accuracy = { gamma = 1e-4 }");
const STAGE: Key = Key::new("stage", "[[stage]] in double brackets, once for each stage");

const FROM: Key = Key::new("from", r#"from = "2 MHz""#);
const TO: Key = Key::new("to", r#"to = "12 MHz""#);
const POINTS: Key = Key::new("points", "points = 41");

const WORD_BITS: Key = Key::new("word_bits", "word_bits = 32");
const GAMMA: Key = Key::new("gamma", "gamma = 1e-4");

const DEFAULT_REFERENCE: f64 = 50.0;
const DEFAULT_POINTS: u32 = 41;
const DEFAULT_WORD_BITS: u32 = 32;
const DEFAULT_GAMMA: f64 = 1e-4;

/// Most grid points of a band and most impedances of a list.
pub(super) const MOST_POINTS: u32 = 100_000;

/// Reads a whole document; `folder` is where the paths in it start.
pub(super) fn plan<'a>(
    source: Source<'a>,
    document: &'a DeTable<'a>,
    folder: &Path,
) -> Result<Plan, Diagnostic> {
    let keys = [TITLE, REFERENCE, BAND, LOAD, FIRMWARE, ACCURACY, STAGE];
    let file = Table::open(source, "the chain file", 0..0, document, &keys)?;
    let title = file.required(TITLE)?.text()?;
    let reference = match file.optional(REFERENCE) {
        Some(value) => value.quantity(Dimension::Resistance)?,
        None => DEFAULT_REFERENCE,
    };
    let band = band(&file.required(BAND)?)?;
    Ok(Plan {
        title,
        reference,
        band,
        loads: load::loads(&file.required(LOAD)?, reference, band, folder)?,
        firmware: firmware(file.optional(FIRMWARE))?,
        accuracy: accuracy(file.optional(ACCURACY))?,
        stages: stages(&file.required(STAGE)?)?,
    })
}

fn band(value: &Value<'_>) -> Result<Band, Diagnostic> {
    let table = value.table("[band]", &[FROM, TO, POINTS])?;
    let from = table.required(FROM)?.hertz()?;
    let to_value = table.required(TO)?;
    let to = to_value.hertz()?;
    if to < from {
        let message = format!("the band ends at {to} Hz, below its start at {from} Hz");
        return Err(to_value.fault(message, format!("write a frequency from {from} Hz up")));
    }
    let Some(points_value) = table.optional(POINTS) else {
        // Where the band is narrow, every hertz of it is a point.
        let points = DEFAULT_POINTS.min((to - from).saturating_add(1));
        return Ok(Band { from, to, points });
    };
    let points = points_value.whole(1..=MOST_POINTS)?;
    if points > 1 && points - 1 > to - from {
        let most = to - from + 1;
        let message = format!("{points} points are more than the band has whole hertz, {most}");
        return Err(points_value.fault(message, format!("write points = {most} or less")));
    }
    if points == 1 && to > from {
        let message = "one point cannot cover a band that ends above its start".to_owned();
        return Err(points_value.fault(message, "write 2 points or more, or `to` equal to `from`"));
    }
    Ok(Band { from, to, points })
}

fn firmware(value: Option<Value<'_>>) -> Result<Firmware, Diagnostic> {
    let mut word_bits = DEFAULT_WORD_BITS;
    if let Some(value) = value
        && let Some(bits) = value.table("[firmware]", &[WORD_BITS])?.optional(WORD_BITS)
    {
        let number = bits.number("16 or 32", |number| number == 16.0 || number == 32.0)?;
        word_bits = if number == 16.0 { 16 } else { 32 };
    }
    Ok(Firmware { word_bits })
}

fn accuracy(value: Option<Value<'_>>) -> Result<Accuracy, Diagnostic> {
    let mut gamma = DEFAULT_GAMMA;
    if let Some(value) = value
        && let Some(limit) = value.table("[accuracy]", &[GAMMA])?.optional(GAMMA)
    {
        gamma = limit.number("above 0 and at most 1", |gamma| gamma > 0.0 && gamma <= 1.0)?;
    }
    Ok(Accuracy { gamma })
}

fn stages(value: &Value<'_>) -> Result<Vec<Stage>, Diagnostic> {
    let items = value.items()?;
    if items.is_empty() {
        return Err(value.fault("the chain has no stage".to_owned(), "add a table [[stage]]"));
    }
    if let Some(surplus) = items.get(STAGE_CAPACITY) {
        let message = format!(
            "the chain has {} stages; the firmware has room for {STAGE_CAPACITY}",
            items.len()
        );
        let help = "join neighbouring stages, such as two lines of the same impedance";
        return Err(surplus.fault(message, help));
    }
    let numbered = items.iter().zip(1..);
    numbered
        .map(|(item, number)| stage::stage(item, number))
        .collect()
}

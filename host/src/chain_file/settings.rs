//! All of a chain file but its stages: title, reference, band, loads, firmware, accuracy.

use toml::de::DeTable;

use super::stage;
use super::table::{Key, Table};
use super::value::Value;
use crate::diagnostic::{Diagnostic, Source};
use crate::plan::{Accuracy, Band, Firmware, Loads, Plan, STAGE_CAPACITY, Stage};
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

const SWR_UP_TO: Key = Key::new("swr_up_to", "swr_up_to = 10");
const IMPEDANCES: Key = Key::new("impedances", r#"impedances = [["30 ohm", "-40 ohm"]]"#);

const WORD_BITS: Key = Key::new("word_bits", "word_bits = 32");
const GAMMA: Key = Key::new("gamma", "gamma = 1e-4");

const DEFAULT_REFERENCE: f64 = 50.0;
const DEFAULT_POINTS: u32 = 41;
const DEFAULT_WORD_BITS: u32 = 32;
const DEFAULT_GAMMA: f64 = 1e-4;

/// Most grid points of a band and most impedances of a list.
const MOST_POINTS: u32 = 100_000;

/// Reads a whole document.
pub(super) fn plan<'a>(source: Source<'a>, document: &'a DeTable<'a>) -> Result<Plan, Diagnostic> {
    let keys = [TITLE, REFERENCE, BAND, LOAD, FIRMWARE, ACCURACY, STAGE];
    let file = Table::open(source, "the chain file", 0..0, document, &keys)?;
    let title = file.required(TITLE)?.text()?;
    let reference = match file.optional(REFERENCE) {
        Some(value) => value.quantity(Dimension::Resistance)?,
        None => DEFAULT_REFERENCE,
    };
    Ok(Plan {
        title,
        reference,
        band: band(&file.required(BAND)?)?,
        loads: loads(&file.required(LOAD)?)?,
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

fn loads(value: &Value<'_>) -> Result<Loads, Diagnostic> {
    let table = value.table("[load]", &[SWR_UP_TO, IMPEDANCES])?;
    let loads = table.exactly_one(&[SWR_UP_TO, IMPEDANCES])?;
    if loads.key().name == SWR_UP_TO.name {
        let swr = loads.number("1 or more, and finite", |swr| swr >= 1.0)?;
        return Ok(Loads::SwrUpTo(swr));
    }
    let items = loads.items()?;
    if items.is_empty() || items.len() > MOST_POINTS as usize {
        let message = format!(
            "{} impedances, where 1 to {MOST_POINTS} are wanted",
            items.len()
        );
        return Err(loads.fault(message, format!("write for example {}", IMPEDANCES.example)));
    }
    let impedances: Result<_, _> = items.iter().map(impedance).collect();
    Ok(Loads::Impedances(impedances?))
}

/// A pair of resistance and reactance in ohms; a passive load has a resistance of zero or more.
fn impedance(value: &Value<'_>) -> Result<(f64, f64), Diagnostic> {
    let parts = value.items()?;
    let [resistance, reactance] = &parts[..] else {
        let message = format!("an impedance of {} values; two are wanted", parts.len());
        let help = r#"write resistance and reactance, such as ["30 ohm", "-40 ohm"]"#;
        return Err(value.fault(message, help));
    };
    let most = *Dimension::Resistance.limits().end();
    Ok((
        resistance.quantity_in(Dimension::Resistance, 0.0..=most)?,
        reactance.quantity_in(Dimension::Resistance, -most..=most)?,
    ))
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

//! One `[[stage]]`: a name and exactly one kind of two-port.

use super::bank::bank;
use super::branch::branch;
use super::line::{line, stub};
use super::table::Key;
use super::value::Value;
use crate::diagnostic::Diagnostic;
use crate::plan::{Part, Position, Stage};

const NAME: Key = Key::new("name", r#"name = "patch lead""#);
const LINE: Key = Key::new(
    "line",
    r#"line = { impedance = "50 ohm", length = "0.6 m", velocity = 0.66 }"#,
);
const SERIES: Key = Key::new("series", r#"series = { inductance = "1.2 uH", q = 180 }"#);
const SHUNT: Key = Key::new("shunt", r#"shunt = { capacitance = "220 pF" }"#);
const SERIES_STUB: Key = Key::new(
    "series_stub",
    r#"series_stub = { end = "open", impedance = "50 ohm", length = "0.5 m", velocity = 0.66 }"#,
);
const SHUNT_STUB: Key = Key::new(
    "shunt_stub",
    r#"shunt_stub = { end = "short", impedance = "50 ohm", length = "0.5 m", velocity = 0.66 }"#,
);
const TRANSFORMER: Key = Key::new("transformer", "transformer = { ratio = 3 }");
const SERIES_BANK: Key = Key::new(
    "series_bank",
    r#"series_bank = { inductances = ["60 nH", "120 nH"], q = 150, contact = "0.05 ohm" }"#,
);
const SHUNT_BANK: Key = Key::new(
    "shunt_bank",
    r#"shunt_bank = { capacitances = ["10 pF", "22 pF"], q = 1000, stray = "0.5 pF" }"#,
);
const RATIO: Key = Key::new("ratio", "ratio = 3");

/// A kind of two-port: its key, how a stage without a name is called, and how it is read.
struct Kind(
    Key,
    &'static str,
    fn(&Value<'_>) -> Result<Part, Diagnostic>,
);

const KINDS: [Kind; 8] = [
    Kind(LINE, "line", |value| line(value).map(Part::Line)),
    Kind(SERIES, "series branch", |value| {
        branch(value).map(|branch| Part::Branch(Position::Series, branch))
    }),
    Kind(SHUNT, "shunt branch", |value| {
        branch(value).map(|branch| Part::Branch(Position::Shunt, branch))
    }),
    Kind(SERIES_STUB, "series stub", |value| {
        stub(value).map(|(end, line)| Part::Stub(Position::Series, end, line))
    }),
    Kind(SHUNT_STUB, "shunt stub", |value| {
        stub(value).map(|(end, line)| Part::Stub(Position::Shunt, end, line))
    }),
    Kind(TRANSFORMER, "transformer", transformer),
    Kind(SERIES_BANK, "series bank", |value| {
        bank(value).map(|bank| Part::Bank(Position::Series, bank))
    }),
    Kind(SHUNT_BANK, "shunt bank", |value| {
        bank(value).map(|bank| Part::Bank(Position::Shunt, bank))
    }),
];

/// Reads the stage that is `number` from the radio side, counted from 1.
pub(super) fn stage(value: &Value<'_>, number: usize) -> Result<Stage, Diagnostic> {
    let kinds = KINDS.map(|Kind(key, _, _)| key);
    let mut keys = vec![NAME];
    keys.extend(kinds);
    let table = value.table("[[stage]]", &keys)?;
    let name = table.optional(NAME).map(|name| name.text()).transpose()?;
    let kind_value = table.exactly_one(&kinds)?;
    let Kind(_, called, read) = KINDS
        .iter()
        .find(|Kind(key, _, _)| key.name == kind_value.key().name)
        .expect("the key is one of these");
    Ok(Stage {
        name: name.unwrap_or_else(|| format!("{called} {number}")),
        part: read(&kind_value)?,
    })
}

/// Turns ratios beyond these are no transformers but slips of the pen.
fn transformer(value: &Value<'_>) -> Result<Part, Diagnostic> {
    let ratio = value
        .table("a transformer", &[RATIO])?
        .required(RATIO)?
        .number("from 0.001 to 1000", |ratio| (1e-3..=1e3).contains(&ratio))?;
    Ok(Part::Transformer { ratio })
}

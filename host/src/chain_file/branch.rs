//! A branch of a resistor, a coil and a capacitor, each with its loss.

use super::table::{Key, Table};
use super::value::Value;
use crate::diagnostic::Diagnostic;
use crate::plan::{Arrangement, Branch, Loss, Reactor};
use crate::quantity::Dimension;

const ARRANGEMENT: Key = Key::new("arrangement", r#"arrangement = "series""#);
pub(super) const RESISTANCE: Key = Key::new("resistance", r#"resistance = "50 ohm""#);
pub(super) const INDUCTANCE: Key = Key::new("inductance", r#"inductance = "1.2 uH""#);
pub(super) const CAPACITANCE: Key = Key::new("capacitance", r#"capacitance = "100 pF""#);
pub(super) const Q: Key = Key::new("q", "q = 180");
pub(super) const ESR: Key = Key::new("esr", r#"esr = "0.2 ohm""#);
const INDUCTOR_Q: Key = Key::new("inductor_q", "inductor_q = 180");
const INDUCTOR_ESR: Key = Key::new("inductor_esr", r#"inductor_esr = "0.2 ohm""#);
const CAPACITOR_Q: Key = Key::new("capacitor_q", "capacitor_q = 1000");
const CAPACITOR_ESR: Key = Key::new("capacitor_esr", r#"capacitor_esr = "0.1 ohm""#);

pub(super) const ELEMENTS: [Key; 3] = [RESISTANCE, INDUCTANCE, CAPACITANCE];
const INDUCTOR_LOSS: [Key; 2] = [INDUCTOR_Q, INDUCTOR_ESR];
const CAPACITOR_LOSS: [Key; 2] = [CAPACITOR_Q, CAPACITOR_ESR];
/// Which Q are no slips of the pen, in words.
pub(super) const Q_RANGE: &str = "from 0.001 to 1e9";

/// The same in numbers.
pub(super) fn q_is_in_range(q: f64) -> bool {
    (1e-3..=1e9).contains(&q)
}

/// Loss of the only reactor, whichever it is.
const ONLY_LOSS: [Key; 2] = [Q, ESR];

/// Advice where none of them is there.
pub(super) const ADD_AN_ELEMENT: &str = "add a resistance, an inductance or a capacitance";

/// Reads a branch.
pub(super) fn branch(value: &Value<'_>) -> Result<Branch, Diagnostic> {
    let mut keys = vec![ARRANGEMENT];
    for group in [&ELEMENTS[..], &ONLY_LOSS, &INDUCTOR_LOSS, &CAPACITOR_LOSS] {
        keys.extend(group);
    }
    let table = value.table("a branch", &keys)?;
    let elements = ELEMENTS.map(|key| table.optional(key));
    let present = elements.iter().flatten().count();
    if present == 0 {
        let message = "the branch has no element".to_owned();
        return Err(table.fault(message, ADD_AN_ELEMENT));
    }
    let arrangement = arrangement(&table, present)?;
    let [resistance, inductance, capacitance] = elements;
    check_only_loss(&table, inductance.is_some(), capacitance.is_some())?;
    let inductor = reactor(
        &table,
        INDUCTANCE,
        inductance,
        Dimension::Inductance,
        INDUCTOR_LOSS,
    )?;
    let capacitor = reactor(
        &table,
        CAPACITANCE,
        capacitance,
        Dimension::Capacitance,
        CAPACITOR_LOSS,
    )?;
    if arrangement == Arrangement::Parallel
        && let (Some(Loss::Esr(_)), Some(Loss::Esr(_))) = (
            inductor.map(|coil| coil.loss),
            capacitor.map(|capacitor| capacitor.loss),
        )
        && let Some(second) = last(&table, [INDUCTOR_ESR, CAPACITOR_ESR])
    {
        let message = "both reactors of a parallel arrangement have an ESR; \
                       the firmware holds one in such a branch"
            .to_owned();
        return Err(second.key_fault(message, "give the loss of one of them as its Q"));
    }
    Ok(Branch {
        arrangement,
        resistance: resistance
            .map(|value| value.quantity(Dimension::Resistance))
            .transpose()?,
        inductor,
        capacitor,
    })
}

fn arrangement(table: &Table<'_>, present: usize) -> Result<Arrangement, Diagnostic> {
    match table.optional(ARRANGEMENT) {
        None if present == 1 => Ok(Arrangement::Series),
        None => {
            let message = format!("a branch of {present} elements has no `arrangement`");
            let help = r#"add arrangement = "series" or arrangement = "parallel""#;
            Err(table.fault(message, help))
        }
        Some(value) => {
            let words = [
                ("series", Arrangement::Series),
                ("parallel", Arrangement::Parallel),
            ];
            let arrangement = value.word(&words)?;
            if present == 1 {
                let message = "`arrangement` says nothing about a single element".to_owned();
                return Err(value.key_fault(message, "leave it out, or add the missing element"));
            }
            Ok(arrangement)
        }
    }
}

/// `q` and `esr` need a reactor, and only one, to belong to.
fn check_only_loss(table: &Table<'_>, coil: bool, capacitor: bool) -> Result<(), Diagnostic> {
    let Some(loss) = table.at_most_one(&ONLY_LOSS)? else {
        return Ok(());
    };
    let name = loss.key().name;
    match (coil, capacitor) {
        (true, true) => {
            let message = format!("`{name}` could be of the coil or of the capacitor");
            let help = format!("write `inductor_{name}` or `capacitor_{name}`");
            Err(loss.key_fault(message, help))
        }
        (false, false) => {
            let message = format!("a branch of a resistor alone has no `{name}`");
            Err(loss.key_fault(message, "leave it out; a resistor is its own loss"))
        }
        _ => Ok(()),
    }
}

/// A coil or a capacitor with its loss, which stands under one of `own` or of [`ONLY_LOSS`].
fn reactor(
    table: &Table<'_>,
    key: Key,
    value: Option<Value<'_>>,
    dimension: Dimension,
    own: [Key; 2],
) -> Result<Option<Reactor>, Diagnostic> {
    let Some(value) = value else {
        return match table.at_most_one(&own)? {
            Some(loss) => {
                let message = format!("`{}` without `{}`", loss.key().name, key.name);
                Err(loss.key_fault(message, format!("add {}, or leave it out", key.example)))
            }
            None => Ok(None),
        };
    };
    let [own_q, own_esr] = own;
    let loss = match table.at_most_one(&[own_q, own_esr, Q, ESR])? {
        None => Loss::Lossless,
        Some(loss) if [own_q.name, Q.name].contains(&loss.key().name) => {
            Loss::Q(loss.number(Q_RANGE, q_is_in_range)?)
        }
        Some(loss) => Loss::Esr(loss.quantity(Dimension::Resistance)?),
    };
    Ok(Some(Reactor {
        value: value.quantity(dimension)?,
        loss,
    }))
}

/// The one of two entries that stands last in the text.
fn last<'a>(table: &Table<'a>, keys: [Key; 2]) -> Option<Value<'a>> {
    let found = keys.into_iter().filter_map(|key| table.optional(key));
    found.max_by_key(|value| value.key_range().start)
}

//! A bank of switched coils or capacitors.

use super::branch::{ESR, Q, Q_RANGE, q_is_in_range};
use super::table::{Key, Table};
use super::value::Value;
use crate::diagnostic::Diagnostic;
use crate::plan::{BANK_STEPS_MAX, Bank, BankElement, BankStep, StepLoss};
use crate::quantity::Dimension;

const INDUCTANCES: Key = Key::new(
    "inductances",
    r#"inductances = ["60 nH", "120 nH", "240 nH"] or inductances = { first = "60 nH", steps = 8 }"#,
);
const CAPACITANCES: Key = Key::new(
    "capacitances",
    r#"capacitances = ["10 pF", "22 pF", "47 pF"] or capacitances = { first = "10 pF", steps = 8 }"#,
);
const CONTACT: Key = Key::new("contact", r#"contact = "0.05 ohm""#);
const STRAY: Key = Key::new("stray", r#"stray = "0.5 pF""#);

const FIRST_CAPACITANCE: Key = Key::new("first", r#"first = "10 pF""#);
const FIRST_INDUCTANCE: Key = Key::new("first", r#"first = "60 nH""#);
const STEPS: Key = Key::new("steps", "steps = 8");

/// Reads a bank.
pub(super) fn bank(value: &Value<'_>) -> Result<Bank, Diagnostic> {
    let values = [INDUCTANCES, CAPACITANCES];
    let keys = [INDUCTANCES, CAPACITANCES, Q, ESR, CONTACT, STRAY];
    let table = value.table("a bank", &keys)?;
    let listed = table.exactly_one(&values)?;
    let (element, dimension, first) = if listed.key().name == INDUCTANCES.name {
        (BankElement::Coils, Dimension::Inductance, FIRST_INDUCTANCE)
    } else {
        (
            BankElement::Capacitors,
            Dimension::Capacitance,
            FIRST_CAPACITANCE,
        )
    };
    let values = if listed.is_table() {
        doubling(&listed, dimension, first)?
    } else {
        each(&listed, dimension)?
    };
    let (loss, losses) = losses(&table, values.len())?;
    let at_rest = |key, dimension| {
        let value = table.optional(key);
        let quantity = value.map(|value: Value<'_>| value.quantity(dimension));
        quantity.transpose().map(Option::unwrap_or_default)
    };
    Ok(Bank {
        element,
        loss,
        steps: values
            .into_iter()
            .zip(losses)
            .map(|(value, loss)| BankStep { value, loss })
            .collect(),
        contact: at_rest(CONTACT, Dimension::Resistance)?,
        stray: at_rest(STRAY, Dimension::Capacitance)?,
    })
}

/// The values one by one.
fn each(list: &Value<'_>, dimension: Dimension) -> Result<Vec<f64>, Diagnostic> {
    let items = list.items()?;
    if items.is_empty() {
        let message = "the bank has no steps".to_owned();
        return Err(list.fault(message, format!("write for example {}", list.key().example)));
    }
    if let Some(surplus) = items.get(BANK_STEPS_MAX) {
        let message = format!(
            "the bank has {} steps; the firmware switches {BANK_STEPS_MAX}",
            items.len()
        );
        return Err(surplus.fault(message, "make two banks of it, one stage each"));
    }
    items.iter().map(|item| item.quantity(dimension)).collect()
}

/// Values that double from step to step.
fn doubling(
    value: &Value<'_>,
    dimension: Dimension,
    first_key: Key,
) -> Result<Vec<f64>, Diagnostic> {
    let table = value.table("a bank that doubles", &[first_key, STEPS])?;
    let first_value = table.required(first_key)?;
    let first = first_value.quantity(dimension)?;
    let steps_value = table.required(STEPS)?;
    let steps = steps_value.whole(1..=BANK_STEPS_MAX as u32)?;
    let values: Vec<_> = (0..steps)
        .map(|step| first * f64::from(1 << step))
        .collect();
    let (most, last) = (*dimension.limits().end(), values[values.len() - 1]);
    if last > most {
        let message = format!("the last of {steps} steps is {}", dimension.write(last));
        let help = format!(
            "the most is {}; write a smaller first",
            dimension.write(most)
        );
        return Err(first_value.fault(message, help));
    }
    Ok(values)
}

/// One loss for all steps, or one for each.
fn losses(table: &Table<'_>, steps: usize) -> Result<(StepLoss, Vec<f64>), Diagnostic> {
    let Some(value) = table.at_most_one(&[Q, ESR])? else {
        return Ok((StepLoss::Dissipation, vec![0.0; steps]));
    };
    let is_q = value.key().name == Q.name;
    let read = |value: &Value<'_>| {
        if is_q {
            let q = value.number(Q_RANGE, q_is_in_range)?;
            Ok(q.recip())
        } else {
            value.quantity(Dimension::Resistance)
        }
    };
    let losses = if value.is_array() {
        let items = value.items()?;
        if items.len() != steps {
            let name = value.key().name;
            let message = format!("{} values of `{name}` for {steps} steps", items.len());
            return Err(value.fault(message, "write one value for all steps, or one for each"));
        }
        items.iter().map(read).collect::<Result<_, _>>()?
    } else {
        vec![read(&value)?; steps]
    };
    let kind = if is_q {
        StepLoss::Dissipation
    } else {
        StepLoss::Resistance
    };
    Ok((kind, losses))
}

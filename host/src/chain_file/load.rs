//! The loads: a set that is the same at every frequency, or one load for each frequency.

use std::path::Path;

use super::branch::{self, CAPACITANCE, INDUCTANCE, RESISTANCE};
use super::settings::MOST_POINTS;
use super::table::Key;
use super::value::Value;
use crate::diagnostic::Diagnostic;
use crate::plan::{Arrangement, Band, Branch, Loads, Loss, Reactor};
use crate::quantity::Dimension;
use crate::touchstone;

const SWR_UP_TO: Key = Key::new("swr_up_to", "swr_up_to = 10");
const IMPEDANCES: Key = Key::new("impedances", r#"impedances = [["30 ohm", "-40 ohm"]]"#);
const ONE_PORT: Key = Key::new("one_port", r#"one_port = "antenna.s1p""#);
const SERIES: Key = Key::new(
    "series",
    r#"series = { resistance = "36 ohm", inductance = "4.7 uH", capacitance = "150 pF" }"#,
);

/// A measured |Γ| may exceed 1 by what rounding to three decimals and a good calibration leave.
const PASSIVE: f64 = 1.0 + 1e-3;

/// Reads the loads; `folder` is where the path of a measurement starts.
pub(super) fn loads(
    value: &Value<'_>,
    reference: f64,
    band: Band,
    folder: &Path,
) -> Result<Loads, Diagnostic> {
    let kinds = [SWR_UP_TO, IMPEDANCES, ONE_PORT, SERIES];
    let loads = value.table("[load]", &kinds)?.exactly_one(&kinds)?;
    match loads.key().name {
        name if name == SWR_UP_TO.name => {
            let swr = loads.number("1 or more, and finite", |swr| swr >= 1.0)?;
            Ok(Loads::SwrUpTo(swr))
        }
        name if name == IMPEDANCES.name => impedances(&loads),
        name if name == ONE_PORT.name => one_port(&loads, reference, band, folder),
        _ => series(&loads),
    }
}

fn impedances(value: &Value<'_>) -> Result<Loads, Diagnostic> {
    let items = value.items()?;
    if items.is_empty() || items.len() > MOST_POINTS as usize {
        let message = format!(
            "{} impedances, where 1 to {MOST_POINTS} are wanted",
            items.len()
        );
        return Err(value.fault(message, format!("write for example {}", IMPEDANCES.example)));
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

/// A measurement, referred to the reference of the plan.
fn one_port(
    value: &Value<'_>,
    reference: f64,
    band: Band,
    folder: &Path,
) -> Result<Loads, Diagnostic> {
    let path = folder.join(value.text()?);
    // A fault of that file as a whole is one of its name here.
    let place = |fault: Diagnostic| match fault.spot {
        Some(_) => fault,
        None => value.fault(format!("{}: {}", fault.file, fault.message), fault.help),
    };
    let measured = touchstone::read(&path)
        .and_then(|network| network.one_port(&path.display().to_string()))
        .map_err(place)?;
    let active = |what: String| {
        let message = format!("the measured load is active: {what}");
        value.fault(
            message,
            "measure a passive load with a calibrated instrument",
        )
    };
    let Some(measured) = measured.referred_to(reference) else {
        return Err(active(format!("an impedance of -{reference} ohm")));
    };

    let written = |hertz| Dimension::Frequency.write(hertz);
    let (from, to) = (f64::from(band.from), f64::from(band.to));
    let Some(points) = measured.covering(from, to) else {
        let (lowest, highest) = measured.range();
        let message = format!(
            "the measurement covers {} to {}, the band is {} to {}",
            written(lowest),
            written(highest),
            written(from),
            written(to)
        );
        return Err(value.fault(message, "measure over all of the band, or narrow the band"));
    };
    for point in points {
        let magnitude = point.s[0][0].norm();
        if magnitude > PASSIVE {
            let hertz = written(point.hertz);
            return Err(active(format!("|Γ| is {magnitude:.4} at {hertz}")));
        }
    }
    Ok(Loads::Measured(measured))
}

/// A series circuit of at least one element.
fn series(value: &Value<'_>) -> Result<Loads, Diagnostic> {
    let table = value.table("a series model", &branch::ELEMENTS)?;
    let element = |key, dimension| {
        let value = table.optional(key);
        value.map(|value| value.quantity(dimension)).transpose()
    };
    let lossless = |value| Reactor {
        value,
        loss: Loss::Lossless,
    };
    let model = Branch {
        arrangement: Arrangement::Series,
        resistance: element(RESISTANCE, Dimension::Resistance)?,
        inductor: element(INDUCTANCE, Dimension::Inductance)?.map(lossless),
        capacitor: element(CAPACITANCE, Dimension::Capacitance)?.map(lossless),
    };
    if let (None, None, None) = (model.resistance, model.inductor, model.capacitor) {
        let message = "the series model has no element".to_owned();
        return Err(table.fault(message, branch::ADD_AN_ELEMENT));
    }
    Ok(Loads::SeriesModel(model))
}

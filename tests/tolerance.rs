//! The one table of tolerances for the checks of the f64 reference.

// Each test program uses its own part of this shared table.
#![allow(dead_code, reason = "shared by several test programs")]

/// For values known to 16 digits and more: relative to the value or to the natural scale of the
/// quantity, whichever is larger. The eleven stages of the longest ladder need 3e-14 of it.
pub(crate) const EXACT: f64 = 1e-13;

/// Rounding allowed on the edge of a printed figure's half unit, relative to the half unit.
pub(crate) const PRINTED_EDGE: f64 = 1e-9;

/// One part worked out by hand, relative: a few dozen roundings of the same quantity.
pub(crate) const SINGLE_PART: f64 = 1e-14;

/// Γ to impedance and back, absolute.
pub(crate) const CONVERSION: f64 = 8.0 * f64::EPSILON;

/// Properties of random chains: roundings per stage in one entry, to be multiplied by the product
/// of the magnitudes of the stage matrices. 200 000 chains each get by with one.
pub(crate) const ROUNDINGS_PER_STAGE: f64 = 4.0;

/// `value` against a value known to full precision.
pub(crate) fn exact(value: f64, exact: f64, scale: f64) -> Result<(), String> {
    let slack = EXACT * exact.abs().max(scale);
    // Written so that a value that is not a number fails.
    if (value - exact).abs() <= slack {
        Ok(())
    } else {
        Err(format!("{value:e} against {exact:e}, tolerance {slack:e}"))
    }
}

/// `value` against a figure as printed: half a unit of its last place.
pub(crate) fn printed(value: f64, printed: &str) -> Result<(), String> {
    let figure: f64 = printed.parse().expect("a printed figure is a number");
    let slack = half_unit(printed) * (1.0 + PRINTED_EDGE);
    if (value - figure).abs() <= slack {
        Ok(())
    } else {
        Err(format!("{value:e} does not print as {printed}"))
    }
}

/// Half a unit of the last place of a decimal number such as `"0.95"` or `"3.04e-3"`.
pub(crate) fn half_unit(printed: &str) -> f64 {
    let (digits, exponent) = printed.split_once('e').unwrap_or((printed, "0"));
    let exponent: i32 = exponent.parse().expect("a decimal exponent");
    let decimals = digits.split_once('.').map_or(0, |(_, d)| d.len());
    let decimals = i32::try_from(decimals).expect("few decimals");
    0.5 * 10_f64.powi(exponent - decimals)
}

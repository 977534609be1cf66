//! The sizing as text.

use std::fmt::Write;

use super::{NAME_WIDTH, WIDTH, place, shortened, times_wanted};
use crate::output::figures::{error, grouped};
use crate::output::table::Table;
use crate::plan::Plan;
use crate::size::{Candidate, Format, Sizing, TooShort};

/// A margin below this is called thin: the worst of two searches may be as far apart.
const THIN: f64 = 1.25;

/// The sizing: the recommendation first, then why no shorter words, then every format.
pub fn size(plan: &Plan, sizing: &Sizing) -> String {
    let wanted = plan.accuracy.gamma;
    let mut text = format!("{}\n", shortened(&plan.title, WIDTH));
    let mut line = |label: &str, value: String| {
        let _ = writeln!(text, "{label:<12}{value}");
    };
    line("accuracy", format!("|ΔΓ| {} wanted", error(wanted)));
    let verdict = |words: &Candidate| {
        let times = times_wanted(words.worst_error, wanted);
        format!("{}, {times}", name(words.format))
    };
    match sizing.recommended() {
        Some(words) => {
            line("recommended", verdict(words));
            if wanted / words.worst_error < THIN {
                line("", "a thin margin; more points may find a worse one".into());
            }
        }
        None => {
            line("recommended", "none, NO words are long enough".into());
            if let Some(best) = sizing.best() {
                line("best", verdict(best));
            }
        }
    }
    if let Some(words) = sizing.in_firmware() {
        line("in firmware", verdict(words));
    }
    if let Some(too_short) = &sizing.too_short {
        for (index, reason) in reasons(plan, too_short).into_iter().enumerate() {
            line(if index == 0 { "too short" } else { "" }, reason);
        }
    }
    line(
        "points",
        format!(
            "{} each, {} of ascent in all, seed {}",
            grouped(sizing.surveyed),
            grouped(sizing.ascent()),
            sizing.effort.seed,
        ),
    );

    text.push_str("\n|ΔΓ|; margin: wanted ÷ worst; theory: rms of rounding noise\n");
    let mut table = Table::named(["", "worst", "margin", "met", "rms", "theory", "rms÷theory"]);
    for candidate in sizing.formats() {
        let rms = candidate.spread.rms();
        let theory = candidate.theory;
        table.row([
            name(candidate.format),
            error(candidate.worst_error),
            margin(wanted / candidate.worst_error),
            (if candidate.meets(plan.accuracy) {
                "yes"
            } else {
                "no"
            })
            .into(),
            error(rms),
            theory.map_or("–".into(), error),
            theory.map_or("–".into(), |theory| format!("{:.2}", rms / theory)),
        ]);
    }
    text.push_str(&table.text(2));
    text
}

fn name(format: Format) -> String {
    match format {
        Format::Block(bits) => format!("{bits} bits"),
        Format::Single => "f32".to_owned(),
    }
}

/// How bad the longest words that are too short are, where, and what of.
fn reasons(plan: &Plan, too_short: &TooShort) -> [String; 4] {
    let culprit = too_short.culprit();
    let percent = |share: f64| format!("{:.0} %", 100.0 * share);
    [
        format!(
            "{} bits, {} at",
            too_short.word_bits,
            times_wanted(too_short.worst_error, plan.accuracy.gamma),
        ),
        place(plan, too_short.worst),
        format!(
            "{} of that by the stage {},",
            percent(culprit.stage_share),
            shortened(&plan.stages[culprit.stage].name, NAME_WIDTH),
        ),
        format!(
            "{} by its {}",
            percent(culprit.source_share),
            culprit.source.name()
        ),
    ]
}

/// Three significant digits without an exponent, fewer below 0.01.
fn margin(margin: f64) -> String {
    if margin.is_infinite() {
        return "∞".to_owned();
    }
    if margin >= 1000.0 {
        return grouped(margin.min(1e18).round() as u64);
    }
    let places = (2.0 - margin.log10().floor()).clamp(0.0, 4.0) as usize;
    format!("{margin:.places$}")
}

//! Results as text of at most 80 columns.

mod size;

pub use size::size;

use std::fmt::Write;

use super::figures::{complex, engineering, error, fixed, frequency, grouped, ohms, significant};
use super::table::Table;
use crate::arithmetic::to_complex;
use crate::budget::{Budget, CLOSURE_LIMIT, Contribution, share};
use crate::comparison::StageSource;
use crate::envelope::Point;
use crate::plan::{Plan, Switches};
use crate::reference::impedance_from_gamma;
use crate::respond::Response;

/// Widest line, in characters.
const WIDTH: usize = 80;

/// Widest name of a stage that a table shows in full.
const NAME_WIDTH: usize = 30;

/// The response as a table over frequency.
pub fn response(plan: &Plan, response: &Response) -> String {
    let load = response.load.map_or(
        "from the chain file, one per frequency".to_owned(),
        |load| ohms(impedance_from_gamma(load, plan.reference)),
    );
    let mut text = format!(
        "{}\nload {}, reference {}\n|ΔΓ|: words of {} bits against f64\n",
        shortened(&plan.title, WIDTH),
        load,
        engineering(plan.reference, "ohm", 4),
        response.word_bits,
    );
    for line in switches(plan, &response.switches) {
        let _ = writeln!(text, "{line}");
    }
    text.push('\n');
    let mut table = Table::of_figures([
        "MHz", "|Γ|", "∠Γ °", "R ohm", "X ohm", "SWR", "RL dB", "gain dB", "|ΔΓ|",
    ]);
    for point in &response.points {
        table.row([
            format!("{:.6}", f64::from(point.hertz) / 1e6),
            format!("{:.5}", point.gamma.norm()),
            fixed(point.gamma.arg().to_degrees(), 6, 2),
            significant(point.impedance.re),
            significant(point.impedance.im),
            significant(point.swr),
            fixed(point.return_loss, 5, 2),
            fixed(gain(point.gain), 6, 3),
            error((point.word_gamma - point.gamma).norm()),
        ]);
    }
    text.push_str(&table.text(0));
    let losses = response
        .points
        .iter()
        .max_by(|a, b| total(&a.stage_losses).total_cmp(&total(&b.stage_losses)));
    if let Some(point) = losses {
        let _ = writeln!(
            text,
            "\nloss by stage at {}, where the chain loses most, dB",
            frequency(point.hertz),
        );
        let mut table = Table::named(["stage", "dB"]);
        for (stage, loss) in plan.stages.iter().zip(&point.stage_losses) {
            table.row([shortened(&stage.name, NAME_WIDTH), fixed(*loss, 6, 3)]);
        }
        table.row([
            "whole chain".to_owned(),
            fixed(total(&point.stage_losses), 6, 3),
        ]);
        text.push_str(&table.text(2));
    }
    text
}

/// A load that takes no power may seem to return more than it gets, by the rounding of `f64`.
fn gain(decibels: f64) -> f64 {
    if decibels.is_nan() {
        f64::NEG_INFINITY
    } else {
        decibels
    }
}

/// Loss of the whole chain. Without power in the load it is infinite, and that of a stage into
/// which no power flows is not a number.
fn total(losses: &[f64]) -> f64 {
    let total = losses.iter().sum::<f64>();
    if total.is_nan() { f64::INFINITY } else { total }
}

/// The budget: the verdict first, then stages and sources.
pub fn budget(plan: &Plan, budget: &Budget) -> String {
    let wanted = plan.accuracy.gamma;
    let worst = budget.worst_error();
    let met = if budget.meets(plan.accuracy) {
        "met"
    } else {
        "NOT met"
    };
    let mut text = format!("{}\n", shortened(&plan.title, WIDTH));
    let mut line = |label: &str, value: String| {
        let _ = writeln!(text, "{label:<12}{value}");
    };
    line(
        "accuracy",
        format!("{met}, {}", times_wanted(worst, wanted)),
    );
    line(
        "worst |ΔΓ|",
        format!("{} found, {} wanted", error(worst), error(wanted)),
    );
    line("rms |ΔΓ|", error(budget.total.spread.rms()));
    line("words", format!("{} bits, block", budget.word_bits));
    line("worst at", place(plan, budget.worst));
    for (index, word) in switches(plan, &budget.worst.switches).enumerate() {
        line(if index == 0 { "switches" } else { "" }, word);
    }
    line(
        "points",
        format!(
            "{} and {} of ascent, seed {}",
            grouped(budget.surveyed),
            grouped(budget.evaluations - budget.surveyed),
            budget.effort.seed,
        ),
    );
    line(
        "closure",
        format!(
            "{} of {} allowed",
            error(budget.closure),
            error(CLOSURE_LIMIT)
        ),
    );

    text.push_str(
        "\n|ΔΓ| by stage, radio side first; share: part of the error at the worst point\n",
    );
    let mut table = Table::named(["", "at worst", "share", "rms", "worst"]);
    let add = |table: &mut Table, name: &str, line: &Contribution| {
        table.row([
            shortened(name, NAME_WIDTH),
            error(line.at_worst.norm()),
            percent(share(line.at_worst, budget.total.at_worst)),
            error(line.spread.rms()),
            error(line.spread.worst),
        ]);
    };
    for (stage, line) in plan.stages.iter().zip(&budget.by_stage) {
        add(&mut table, &stage.name, line);
    }
    add(&mut table, "(load to words)", &budget.load);
    add(&mut table, "(reading Γ)", &budget.readout);
    add(&mut table, "total", &budget.total);
    text.push_str(&table.text(2));

    text.push_str("\n|ΔΓ| by source, all stages together\n");
    let mut table = Table::named(["", "at worst", "share", "rms", "worst"]);
    for (source, line) in StageSource::ALL.into_iter().zip(&budget.by_source) {
        add(&mut table, source.name(), line);
    }
    text.push_str(&table.text(2));

    text.push_str("\n|ΔΓ| at the worst point, stage by source\n");
    let mut table = Table::named(["", "constants", "frequency", "immittances", "products"]);
    for (stage, sources) in plan.stages.iter().zip(&budget.stages) {
        let cells = sources.iter().map(|line| error(line.at_worst.norm()));
        table.row(std::iter::once(shortened(&stage.name, NAME_WIDTH)).chain(cells));
    }
    text.push_str(&table.text(2));
    text
}

/// The state of each bank as its name and a binary number, the last step first.
fn switches(plan: &Plan, switches: &Switches) -> impl Iterator<Item = String> {
    plan.banks()
        .zip(switches.words)
        .map(|((stage, bank), word)| {
            let (name, steps) = (shortened(&stage.name, NAME_WIDTH), bank.steps.len());
            format!("{name} 0b{:0steps$b}", word & bank.all_on())
        })
}

/// A share in tenths of a percent, without a sign where it rounds to zero.
fn percent(share: f64) -> String {
    // adding zero turns −0 into 0
    format!("{:.1} %", (share * 1000.0).round() / 10.0 + 0.0)
}

/// How much better or worse than wanted an error is.
fn times_wanted(worst: f64, wanted: f64) -> String {
    if worst == 0.0 {
        "no error found".to_owned()
    } else if worst <= wanted {
        format!("{} times better than wanted", times(wanted / worst))
    } else {
        format!("{} times worse than wanted", times(worst / wanted))
    }
}

/// A point of the envelope.
fn place(plan: &Plan, point: Point) -> String {
    let load = to_complex(point.load);
    format!(
        "{}, load Γ {} ({})",
        frequency(point.hertz),
        complex(load, 4),
        ohms(impedance_from_gamma(load, plan.reference)),
    )
}

/// A ratio of at least 1 in two to four digits.
fn times(ratio: f64) -> String {
    if ratio < 100.0 {
        format!("{ratio:.1}")
    } else {
        grouped(ratio.min(1e18).round() as u64)
    }
}

fn shortened(name: &str, width: usize) -> String {
    if name.chars().count() <= width {
        return name.to_owned();
    }
    let kept: String = name.chars().take(width - 1).collect();
    format!("{kept}…")
}

//! Results as JSON. Complex numbers are `{"re": …, "im": …}`; SI units unless a name says other;
//! null where a figure is infinite or not defined.

mod size;

pub use size::size;

use num_complex::Complex;
use serde_json::{Value, json};

use crate::arithmetic::to_complex;
use crate::budget::{Budget, CLOSURE_LIMIT, Contribution, share};
use crate::comparison::StageSource;
use crate::envelope::Point;
use crate::plan::{Plan, Switches};
use crate::reference::{Matrix, SParameters, impedance_from_gamma};
use crate::respond::Response;

/// The response, one entry per frequency.
pub fn response(plan: &Plan, response: &Response) -> String {
    let points: Vec<_> = response
        .points
        .iter()
        .map(|point| {
            let Matrix { a, b, c, d } = point.abcd;
            let SParameters { s11, s12, s21, s22 } = point.s;
            // a lossless stage may seem to gain the rounding of f64
            let passive = |loss: &f64| finite(if *loss < 0.0 { 0.0 } else { *loss });
            let losses: Vec<_> = point.stage_losses.iter().map(passive).collect();
            json!({
                "hertz": point.hertz,
                "load_gamma": complex(point.load),
                "gamma": complex(point.gamma),
                "impedance_ohm": complex(point.impedance),
                "swr": finite(point.swr),
                "return_loss_db": finite(point.return_loss),
                "transducer_gain_db": finite(point.gain),
                "stage_losses_db": losses,
                "abcd": { "a": complex(a), "b_ohm": complex(b), "c_siemens": complex(c), "d": complex(d) },
                "s": { "s11": complex(s11), "s12": complex(s12), "s21": complex(s21), "s22": complex(s22) },
                "word_gamma": complex(point.word_gamma),
            })
        })
        .collect();
    rendered(&json!({
        "command": "respond",
        "version": env!("CARGO_PKG_VERSION"),
        "title": plan.title,
        "reference_ohm": plan.reference,
        "word_bits": response.word_bits,
        "switches": switches(plan, &response.switches),
        "stages": plan.stages.iter().map(|stage| &stage.name).collect::<Vec<_>>(),
        "points": points,
    }))
}

/// The budget.
pub fn budget(plan: &Plan, budget: &Budget) -> String {
    let total = budget.total.at_worst;
    let line = |line: &Contribution| contribution(line, total);
    let stages: Vec<_> = plan
        .stages
        .iter()
        .zip(&budget.by_stage)
        .zip(&budget.stages)
        .map(|((stage, sum), sources)| {
            json!({ "name": stage.name, "sum": line(sum), "sources": by_source(sources, line) })
        })
        .collect();
    rendered(&json!({
        "command": "budget",
        "version": env!("CARGO_PKG_VERSION"),
        "title": plan.title,
        "reference_ohm": plan.reference,
        "word_bits": budget.word_bits,
        "style": "block",
        "accuracy": {
            "gamma_wanted": plan.accuracy.gamma,
            "gamma_worst": budget.worst_error(),
            "met": budget.meets(plan.accuracy),
        },
        "envelope": {
            "points": budget.surveyed,
            "ascent_points": budget.evaluations - budget.surveyed,
            "seed": budget.effort.seed,
        },
        "worst": place(plan, budget.worst),
        "closure": { "largest": budget.closure, "limit": CLOSURE_LIMIT },
        "total": line(&budget.total),
        "load": line(&budget.load),
        "readout": line(&budget.readout),
        "stages": stages,
        "sources": by_source(&budget.by_source, line),
    }))
}

/// The word of each bank, whose bit k is set if the step k, counted from 0, is on.
fn switches(plan: &Plan, switches: &Switches) -> Vec<Value> {
    plan.banks()
        .zip(switches.words)
        .map(|((stage, bank), word)| {
            json!({ "stage": stage.name, "steps": bank.steps.len(), "word": word & bank.all_on() })
        })
        .collect()
}

fn place(plan: &Plan, point: Point) -> Value {
    let load = to_complex(point.load);
    json!({
        "hertz": point.hertz,
        "load_gamma": complex(load),
        "load_ohm": complex(impedance_from_gamma(load, plan.reference)),
        "switches": switches(plan, &point.switches),
    })
}

fn by_source(
    lines: &[Contribution; 4],
    line: impl Fn(&Contribution) -> Value,
) -> serde_json::Map<String, Value> {
    StageSource::ALL
        .into_iter()
        .zip(lines)
        .map(|(source, contribution)| (source.key().to_owned(), line(contribution)))
        .collect()
}

fn contribution(line: &Contribution, total: Complex<f64>) -> Value {
    json!({
        "at_worst": complex(line.at_worst),
        "share": share(line.at_worst, total),
        "rms": line.spread.rms(),
        "worst": line.spread.worst,
    })
}

fn complex(z: Complex<f64>) -> Value {
    json!({ "re": finite(z.re), "im": finite(z.im) })
}

/// JSON has no infinity and no NaN: null.
fn finite(value: f64) -> Value {
    if value.is_finite() {
        json!(value)
    } else {
        Value::Null
    }
}

fn rendered(value: &Value) -> String {
    format!("{value:#}\n")
}

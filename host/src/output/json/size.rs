//! The sizing as JSON.

use serde_json::{Value, json};

use super::{finite, place, rendered};
use crate::comparison::StageSource;
use crate::plan::Plan;
use crate::size::{Candidate, Format, Sizing, TooShort};

/// The sizing, one entry per format.
pub fn size(plan: &Plan, sizing: &Sizing) -> String {
    let formats: Vec<_> = sizing
        .formats()
        .map(|candidate| format(plan, candidate))
        .collect();
    rendered(&json!({
        "command": "size",
        "version": env!("CARGO_PKG_VERSION"),
        "title": plan.title,
        "reference_ohm": plan.reference,
        "gamma_wanted": plan.accuracy.gamma,
        "envelope": { "points": sizing.surveyed, "seed": sizing.effort.seed },
        "recommended_word_bits": sizing.recommended().and_then(word_bits),
        "firmware_word_bits": sizing.in_firmware().and_then(word_bits),
        "best_word_bits": sizing.best().and_then(word_bits),
        "too_short": sizing.too_short.as_ref().map(|words| too_short(plan, words)),
        "formats": formats,
    }))
}

fn word_bits(candidate: &Candidate) -> Option<u32> {
    match candidate.format {
        Format::Block(bits) => Some(bits),
        Format::Single => None,
    }
}

fn format(plan: &Plan, candidate: &Candidate) -> Value {
    json!({
        "format": match candidate.format {
            Format::Block(_) => "block",
            Format::Single => "f32",
        },
        "word_bits": word_bits(candidate),
        "gamma_worst": finite(candidate.worst_error),
        "worst": place(plan, candidate.worst),
        "ascent_points": candidate.ascent,
        "margin": finite(plan.accuracy.gamma / candidate.worst_error),
        "met": candidate.meets(plan.accuracy),
        "gamma_rms": finite(candidate.spread.rms()),
        "theory_rms": candidate.theory.map(finite),
    })
}

fn too_short(plan: &Plan, words: &TooShort) -> Value {
    let culprit = words.culprit();
    json!({
        "word_bits": words.word_bits,
        "gamma_worst": finite(words.worst_error),
        "worst": place(plan, words.worst),
        "culprit": {
            "stage": plan.stages[culprit.stage].name,
            "share": culprit.stage_share,
            "source": StageSource::key(culprit.source),
            "source_share": culprit.source_share,
        },
    })
}

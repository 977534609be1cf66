//! The sizing: its figures are those of the budget, its recommendation holds on points that it has
//! not seen, and theory agrees with practice.

use std::path::Path;

use rayon::ThreadPoolBuilder;
use stagebits::budget::{Budget, budget};
use stagebits::chain_file::read;
use stagebits::constants::{self, Constants};
use stagebits::envelope::Effort;
use stagebits::plan::{Accuracy, Plan};
use stagebits::size::{Candidate, Format, Sizing, WORD_BITS, size};
use stagebits_kernel::Bits;

const EXAMPLES: [&str; 3] = [
    "tide-gauge-buoy",
    "handheld-impedance-meter",
    "shore-station",
];

const EFFORT: Effort = Effort {
    points: 100_000,
    seed: 1,
};

/// A shipped example with its constants.
fn example(name: &str) -> (Plan, Constants<f64>) {
    let folder = Path::new(env!("CARGO_MANIFEST_DIR")).join("../examples");
    let plan = read(&folder.join(name).with_extension("toml"));
    let plan = plan.unwrap_or_else(|fault| panic!("{fault}"));
    let exact = constants::exact(&plan);
    (plan, exact)
}

fn sizing(name: &str, effort: Effort) -> Sizing {
    let (plan, exact) = example(name);
    size(&plan, &exact, effort)
}

fn bits(candidate: &Candidate) -> u32 {
    match candidate.format {
        Format::Block(bits) => bits,
        Format::Single => panic!("words are wanted"),
    }
}

/// The budget in words of a length known at run time only.
fn budget_of(plan: &Plan, exact: &Constants<f64>, bits: u32, effort: Effort) -> Budget {
    macro_rules! dispatch {
        ($($width:literal)*) => {
            match bits {
                $($width => budget::<Bits<$width>>(plan, exact, effort),)*
                _ => panic!("{bits} bits"),
            }
        };
    }
    dispatch!(10 11 12 13 14 15 16 17 18 19 20 21 22 23 24 25 26 27 28 29 30 31 32)
}

#[test]
fn figures_are_those_of_the_budget() {
    let effort = Effort {
        points: 5_000,
        seed: 3,
    };
    for name in EXAMPLES {
        let (plan, exact) = example(name);
        let sizing = sizing(name, effort);
        assert_eq!(sizing.words.len(), WORD_BITS.count());
        for candidate in &sizing.words {
            let budget = budget_of(&plan, &exact, bits(candidate), effort);
            assert_eq!(candidate.worst_error, budget.worst_error());
            assert_eq!(candidate.worst, budget.worst);
            assert_eq!(candidate.spread, budget.total.spread);
            assert_eq!(sizing.surveyed, budget.surveyed);
            assert_eq!(candidate.ascent, budget.evaluations - budget.surveyed);
        }
    }
}

/// Figures depend on the points and the seed alone.
#[test]
fn sizing_is_the_same_on_any_number_of_threads() {
    let effort = Effort {
        points: 10_000,
        ..EFFORT
    };
    let on = |threads, effort| {
        let pool = ThreadPoolBuilder::new().num_threads(threads).build();
        let pool = pool.expect("a pool of threads");
        pool.install(|| sizing(EXAMPLES[0], effort))
    };
    let one = on(1, effort);
    assert_eq!(one, on(2, effort));
    assert_eq!(one, on(5, effort));
    let other = Effort { seed: 2, ..effort };
    assert_ne!(one.words, on(2, other).words);
}

/// On another envelope with ten times the points.
#[test]
fn recommendation_holds_on_points_not_seen() {
    let fresh = Effort {
        points: 10 * EFFORT.points,
        seed: 0xfeed,
    };
    for name in EXAMPLES {
        let (plan, exact) = example(name);
        let sizing = sizing(name, EFFORT);
        let recommended = bits(sizing.recommended().expect("words that are long enough"));
        let shorter = sizing
            .too_short
            .expect("words that are too short")
            .word_bits;
        assert_eq!(shorter, recommended - 1, "{name}");
        let meets = |bits| budget_of(&plan, &exact, bits, fresh).meets(plan.accuracy);
        assert!(meets(recommended), "{name}, {recommended} bits");
        assert!(!meets(shorter), "{name}, {shorter} bits");
    }
}

/// Independent errors of variance q²/12 in every rounded word explain what is measured, from blocks
/// of few bits, which grow at every other step, to long ones.
#[test]
fn theory_and_practice_agree() {
    for name in EXAMPLES {
        for candidate in sizing(name, EFFORT).words {
            let bits = bits(&candidate);
            // the functions of a frequency are as good as 32 bits, and no better
            if bits > 30 {
                continue;
            }
            let theory = candidate.theory.expect("a theory of words");
            let ratio = candidate.spread.rms() / theory;
            assert!(
                (0.97..1.15).contains(&ratio),
                "{name}, {bits} bits: {ratio}"
            );
        }
    }
}

/// A word is worth 6.02 dB a bit, over all of them.
#[test]
fn each_bit_halves_the_error() {
    for name in EXAMPLES {
        let words = sizing(name, EFFORT).words;
        let [short, long] = [&words[0], &words[20]].map(|words| words.spread.rms());
        let per_bit = (short / long).log2() / 20.0;
        assert!((0.98..1.05).contains(&per_bit), "{name}: {per_bit}");
        let falling = words.is_sorted_by(|one, other| one.spread.rms() > other.spread.rms());
        assert!(falling, "{name}");
    }
}

#[test]
fn no_words_meet_what_no_words_can() {
    for name in EXAMPLES {
        let (mut plan, exact) = example(name);
        plan.accuracy = Accuracy { gamma: 1e-12 };
        let effort = Effort {
            points: 1_000,
            ..EFFORT
        };
        let sizing = size(&plan, &exact, effort);
        assert_eq!(sizing.recommended(), None);
        assert_eq!(sizing.in_firmware(), None);
        assert_eq!(sizing.best().map(bits), Some(32));
        assert_eq!(sizing.too_short.expect("32 bits").word_bits, 32);
    }
}

/// Only what all longer words do, too, is a recommendation.
#[test]
fn recommendation_is_not_a_lucky_length() {
    let mut sizing = sizing(
        EXAMPLES[0],
        Effort {
            points: 1_000,
            ..EFFORT
        },
    );
    let recommended = bits(sizing.recommended().expect("words that are long enough"));
    let index = (recommended - WORD_BITS.start()) as usize;
    sizing.words[index - 3].worst_error = 0.0;
    assert_eq!(sizing.recommended().map(bits), Some(recommended));
    sizing.words[index + 2].worst_error = 1.0;
    assert_eq!(sizing.recommended().map(bits), Some(recommended + 3));
}

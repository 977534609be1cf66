//! The chains, frequencies and loads that are compared are worth comparing.

use std::collections::{BTreeSet, HashSet};

use stagebits::arithmetic::{Arithmetic, Block, to_complex};
use stagebits::plan::Switches;
use stagebits_kernel::{Branch, Gamma, Immittance, Law, LossyReactor, Stage, Word};

use super::cases::{Case, cases};
use super::listing::{Line, listing};
use crate::points::{BANKS, switches};
use crate::words::Subject;

// The kinds of step as the words tell them.
const SERIES: i32 = 0;
const SHUNT: i32 = 1;
const TEE: i32 = 2;
const STRETCH: i32 = 3;
const TWO_PORT: i32 = 4;

/// The lines of a case for words of type `W`.
fn lines<W: Word>(case: &Case) -> Vec<Line> {
    listing(&[case.image(W::BITS, |constant| constant)])
}

/// Γ at the input of the points among these lines, with frequency and load.
fn points(lines: &[Line]) -> impl Iterator<Item = (u32, Gamma, Gamma)> {
    lines.iter().filter_map(|line| match line.place.subject {
        Subject::Point(load) => Some((
            line.place.hertz,
            load,
            Gamma {
                re: line.word("Γ, re"),
                im: line.word("Γ, im"),
            },
        )),
        _ => None,
    })
}

#[test]
fn every_kind_of_stage_is_compared() {
    let mut kinds = BTreeSet::new();
    let mut terms = [false; 5];
    for case in cases() {
        for stage in case.exact().stages() {
            kinds.insert(kind(stage));
            if let Stage::Branch(Branch { law, .. }) = stage {
                let Law {
                    constant,
                    rising,
                    falling,
                } = law;
                let parts = [*constant, rising.re, rising.im, falling.re, falling.im];
                for (term, part) in terms.iter_mut().zip(parts) {
                    *term |= part != 0.0;
                }
            }
        }
    }
    let mut expected = BTreeSet::new();
    for position in ["Series", "Shunt"] {
        for loss in ["without", "with"] {
            for function in ["Tanh", "Coth"] {
                expected.insert(format!("stub {position} {function} {loss} loss"));
            }
            expected.insert(format!("line {loss} loss"));
        }
        for inverted in [false, true] {
            expected.insert(format!("branch {position}, inverted {inverted}"));
        }
        // side by side: admittances add
        let inverted = position == "Series";
        for reactor in ["a coil", "a capacitor"] {
            expected.insert(format!(
                "branch {position}, inverted {inverted}, beside {reactor}"
            ));
        }
    }
    for position in ["Series", "Shunt"] {
        for element in ["Coils", "Capacitors"] {
            for (proportional, closed, open) in [
                (true, "real", "real"),
                (false, "real", "ideal"),
                (false, "ideal", "real"),
            ] {
                expected.insert(format!(
                    "bank {position} {element}, proportional {proportional}, \
                     {closed} closed and {open} open"
                ));
            }
        }
    }
    for direction in ["up", "down", "one to one"] {
        expected.insert(format!("transformer {direction}"));
    }
    assert_eq!(kinds, expected);
    assert_eq!(terms, [true; 5], "terms of laws of frequency");
}

/// Whether a line or stub with these loss constants has a loss.
fn loss(root: f64, linear: f64) -> &'static str {
    if (root, linear) == (0.0, 0.0) {
        "without loss"
    } else {
        "with loss"
    }
}

/// What distinguishes a stage from others in what the kernel does with it.
fn kind(stage: &Stage<f64>) -> String {
    match stage {
        Stage::Branch(Branch {
            position,
            inverted,
            beside,
            ..
        }) => {
            let beside = match beside {
                None => "",
                Some(LossyReactor { falling: false, .. }) => ", beside a coil",
                Some(LossyReactor { falling: true, .. }) => ", beside a capacitor",
            };
            format!("branch {position:?}, inverted {inverted}{beside}")
        }
        Stage::Line(line) => format!("line {}", loss(line.root_loss, line.linear_loss)),
        Stage::Stub(stub) => format!(
            "stub {:?} {:?} {}",
            stub.position,
            stub.function,
            loss(stub.root_loss, stub.linear_loss)
        ),
        Stage::Transformer(transformer) => match transformer.ratio {
            ratio if ratio > 1.0 => "transformer up".into(),
            ratio if ratio < 1.0 => "transformer down".into(),
            _ => "transformer one to one".into(),
        },
        Stage::Bank(bank) => {
            let ideal = |part: f64| if part == 0.0 { "ideal" } else { "real" };
            format!(
                "bank {:?} {:?}, proportional {}, {} closed and {} open",
                bank.position,
                bank.element,
                bank.proportional,
                ideal(bank.contact),
                ideal(bank.stray)
            )
        }
    }
}

/// Every kind of step, each kind that a line can be, and both ends of the immittances' exponents.
#[test]
fn every_kind_of_step_is_compared() {
    fn check<W: Word>(cases: &[Case]) {
        let [mut kinds, mut largest, mut zero] = [(); 3].map(|()| BTreeSet::new());
        let mut line_kinds = BTreeSet::new();
        for case in cases {
            let chain = case.exact();
            for line in lines::<W>(case) {
                let Subject::Step(number) = line.place.subject else {
                    continue;
                };
                let kind = line.word("kind of step");
                kinds.insert(kind);
                if let Stage::Line(of) = &chain.stages()[number] {
                    line_kinds.insert((kind, loss(of.root_loss, of.linear_loss)));
                }
                if kind == TWO_PORT {
                    continue;
                }
                let [re, im, exponent] = ["re", "im", "exponent"]
                    .map(|part| line.word(&format!("first immittance, {part}")));
                if exponent == Immittance::<W>::EXPONENT_MAX - W::BITS as i32 {
                    largest.insert(kind);
                }
                if (re, im) == (0, 0) {
                    zero.insert(kind);
                }
            }
        }
        let bits = W::BITS;
        let all = BTreeSet::from([SERIES, SHUNT, TEE, STRETCH, TWO_PORT]);
        assert_eq!(kinds, all, "{bits} bits");
        let both = |kind| [(kind, "without loss"), (kind, "with loss")];
        let of_lines = BTreeSet::from_iter([both(TEE), both(TWO_PORT)].concat());
        assert_eq!(line_kinds, of_lines, "{bits} bits");
        let saturating = BTreeSet::from([SERIES, SHUNT, TEE]);
        assert!(largest.is_superset(&saturating), "{bits} bits: {largest:?}");
        let vanishing = BTreeSet::from([SERIES, SHUNT]);
        assert!(zero.is_superset(&vanishing), "{bits} bits: {zero:?}");
    }
    let cases = cases();
    check::<i16>(&cases);
    check::<i32>(&cases);
}

/// The budget judges Γ as the library evaluates a plan; a core evaluates its image. They are the
/// same number.
#[test]
fn words_compared_are_those_that_the_budget_judges() {
    fn check<W: Word>(case: &Case) {
        let block = Block::<W>::new(&case.exact());
        for (hertz, load, gamma) in points(&lines::<W>(case)) {
            let mut state = Switches::OFF;
            state.words[..BANKS].copy_from_slice(&switches(hertz));
            assert_eq!(
                to_complex(gamma),
                Block::<W>::gamma(&block.at_state(hertz, &state), load),
                "{}, {} bits, {hertz} Hz, {load:?}",
                case.name,
                W::BITS
            );
        }
    }
    for case in cases() {
        check::<i16>(&case);
        check::<i32>(&case);
    }
}

/// The states that a tuner tries one after the other are those that it gets one by one.
#[test]
fn states_switched_to_are_those_resolved_alone() {
    for case in cases() {
        for lines in [lines::<i16>(&case), lines::<i32>(&case)] {
            let of_chain = lines
                .iter()
                .filter(|line| line.place.subject == Subject::Chain);
            for line in of_chain {
                assert_eq!(line.word("switched alike"), 1, "{}", line.place);
            }
        }
    }
}

/// A kernel that gave the same words for everything would agree with itself.
#[test]
fn points_differ_from_each_other() {
    for case in cases() {
        // Beyond saturated immittances all loads look alike.
        if case.name.ends_with("/extremes.toml") {
            continue;
        }
        for lines in [lines::<i16>(&case), lines::<i32>(&case)] {
            let band = case.plan.band.from..=case.plan.band.to;
            let in_band = points(&lines).filter(|(hertz, ..)| band.contains(hertz));
            let (mut all, mut distinct) = (0, HashSet::new());
            for (_, _, Gamma { re, im }) in in_band {
                all += 1;
                distinct.insert((re, im));
            }
            let place = &lines[0].place;
            let share = distinct.len() as f64 / f64::from(all);
            assert!(share > 0.5, "{place}: {} of {all}", distinct.len());
        }
    }
}

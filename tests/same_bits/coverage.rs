//! The chains, frequencies and loads that are compared are worth comparing.

use std::collections::{BTreeSet, HashSet};

use stagebits::arithmetic::{Arithmetic, Block, to_complex};
use stagebits_kernel::{Branch, Gamma, Immittance, Law, LossyReactor, Stage, Word};

use super::cases::{Case, cases};
use super::listing::{Line, listing};
use crate::words::Subject;

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
    for direction in ["up", "down", "one to one"] {
        expected.insert(format!("transformer {direction}"));
    }
    assert_eq!(kinds, expected);
    assert_eq!(terms, [true; 5], "terms of laws of frequency");
}

/// What distinguishes a stage from others in what the kernel does with it.
fn kind(stage: &Stage<f64>) -> String {
    let loss = |root: f64, linear: f64| {
        let with = if (root, linear) == (0.0, 0.0) {
            "without"
        } else {
            "with"
        };
        format!("{with} loss")
    };
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
    }
}

/// Every kind of step, each end of the immittances' exponents.
#[test]
fn every_kind_of_immittance_is_compared() {
    fn check<W: Word>(cases: &[Case]) {
        let mut kinds = BTreeSet::new();
        let (mut largest, mut zero) = (HashSet::new(), HashSet::new());
        for line in cases.iter().flat_map(lines::<W>) {
            if !matches!(line.place.subject, Subject::Step(_)) {
                continue;
            }
            let kind = line.word("kind of step");
            kinds.insert(kind);
            let [re, im, exponent] = ["re", "im", "exponent"]
                .map(|part| line.word(&format!("first immittance, {part}")));
            if exponent == Immittance::<W>::EXPONENT_MAX - W::BITS as i32 {
                largest.insert(kind);
            }
            if (re, im) == (0, 0) {
                zero.insert(kind);
            }
        }
        assert_eq!(kinds, BTreeSet::from([0, 1, 2, 3]), "{} bits", W::BITS);
        for kind in [0, 1, 2] {
            assert!(largest.contains(&kind), "{} bits, kind {kind}", W::BITS);
        }
        for kind in [0, 1] {
            assert!(zero.contains(&kind), "{} bits, kind {kind}", W::BITS);
        }
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
            assert_eq!(
                to_complex(gamma),
                Block::<W>::gamma(&block.at(hertz), load),
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

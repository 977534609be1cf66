//! Random chains: the kernel and its equivalent circuits against the reference, and what network
//! theory demands of the kernel itself, each within the bound of the point at hand.

use num_complex::Complex;
use proptest::prelude::*;
use proptest::strategy::ValueTree;
use proptest::test_runner::{RngAlgorithm, TestRng, TestRunner};
use stagebits::arithmetic::{Arithmetic, Double, to_complex, to_gamma};
use stagebits::constants;
use stagebits::plan::{Line, Part, Plan, SPEED_OF_LIGHT, Stage};
use stagebits_kernel::{Bits, State, Word};
use std::f64::consts::TAU;

use crate::bound::{Trace, readout_bound};
use crate::case::{Case, plan};
use crate::moves;
use crate::strategies::{self, Dissipation};

/// Rounding of `f64` over that of 32-bit words is 2^-21; the rest is for the errors of several
/// units of the functions in the mathematical library, and for those of the reference itself.
const DOUBLE_OVER_WORDS: f64 = 1.0 / (1 << 17) as f64;

/// The plan with every line cut to a whole number of 2^-64 turns per hertz, so that the kernel's
/// length of line is exact.
fn cut(plan: &mut Plan) {
    let unit = 64_f64.exp2();
    for stage in &mut plan.stages {
        if let Part::Line(line) | Part::Stub(_, _, line) = &mut stage.part {
            let turns = (line.delay() * unit).round() / unit;
            line.length = turns * line.velocity * SPEED_OF_LIGHT;
        }
    }
}

/// Γ at the end of a walk in words against the exact one.
///
/// The bound is infinite where the words have lost the state: nothing is said about Γ there.
fn within<W: Word>(trace: &Trace<W>, exact: Complex<f64>) -> Result<(), TestCaseError> {
    let gamma = trace.word_state().gamma();
    let (error, bound) = ((gamma - exact).norm(), trace.gamma_bound());
    prop_assert!(
        error <= bound || bound.is_infinite(),
        "{} bits: {gamma}, {exact}: {error:e} > {bound:e}",
        W::BITS
    );
    Ok(())
}

/// Γ in words against the reference, and the same as the kernel reads it out.
fn agrees<W: Word>(plan: &Plan, hertz: u32, load: Complex<f64>) -> Result<(), TestCaseError> {
    let case = Case::<W>::new(plan, hertz);
    let trace = case.forward(load);
    let exact = case.exact.input_gamma(load);
    within(&trace, exact)?;
    let gamma = trace.word_state().gamma();
    let read = to_complex(trace.words.gamma());
    // beyond ±2 the readout saturates
    prop_assert!(
        gamma.norm() >= 2.0 || (read - gamma).norm() <= readout_bound(gamma),
        "{read} read from {gamma}"
    );
    Ok(())
}

/// The load seen through the inverse chain from the radio side, against the exact inverse.
fn de_embeds<W: Word>(plan: &Plan, hertz: u32, load: Complex<f64>) -> Result<(), TestCaseError> {
    let case = Case::<W>::new(plan, hertz);
    let trace = case.backward(case.exact.input_gamma(load));
    within(&trace, trace.exact.gamma())
}

/// Forward and back again: only the roundings of the walk are left, not those of the immittances.
fn returns<W: Word>(plan: &Plan, hertz: u32, load: Complex<f64>) -> Result<(), TestCaseError> {
    let case = Case::<W>::new(plan, hertz);
    let gamma = to_gamma(load);
    let moves = moves::moves_of_words(case.words.steps());
    let mut trace = Trace::<W>::new(to_complex(gamma), gamma);
    let mut passed = Vec::new();
    for step in &moves {
        passed.push((step.inverse(), trace.exact));
        trace.pass(step);
    }
    for (inverse, exact) in passed.into_iter().rev() {
        trace.through(&[inverse], exact);
    }
    let walked = case
        .words
        .walk_back(case.words.walk(State::from_load(gamma)));
    prop_assert_eq!(trace.words, walked);
    within(&trace, to_complex(gamma))
}

/// A line in as many pieces as a chain has room for.
fn splits<W: Word>(line: Line, hertz: u32, load: Complex<f64>) -> Result<(), TestCaseError> {
    let pieces = constants::CAPACITY;
    let piece = Line {
        length: line.length / pieces as f64,
        ..line
    };
    let walk = |stages| {
        let plan = strategies::chain(stages, hertz, 50.0);
        Case::<W>::new(&plan, hertz).forward(load)
    };
    let (whole, split) = (walk(vec![part(line)]), walk(vec![part(piece); pieces]));
    let error = (whole.word_state().gamma() - split.word_state().gamma()).norm();
    let bound = whole.gamma_bound() + split.gamma_bound();
    prop_assert!(error <= bound, "{} bits: {error:e} > {bound:e}", W::BITS);
    Ok(())
}

/// A line with its frequency.
fn line(dissipation: Dissipation) -> impl Strategy<Value = (Line, u32)> {
    (100_000_u32..3_000_000_000)
        .prop_flat_map(move |hertz| (strategies::line(dissipation, f64::from(hertz)), Just(hertz)))
}

fn part(line: Line) -> Stage {
    Stage {
        name: "line".to_owned(),
        part: Part::Line(line),
    }
}

/// |Γ| at the radio side is that of the load.
fn keeps_magnitude<W: Word>(
    plan: &Plan,
    hertz: u32,
    load: Complex<f64>,
) -> Result<(), TestCaseError> {
    let trace = Case::<W>::new(plan, hertz).forward(load);
    let change = trace.word_state().gamma().norm() - load.norm();
    let bound = trace.gamma_bound();
    prop_assert!(
        change.abs() <= bound,
        "{} bits: {change:e}, bound {bound:e}",
        W::BITS
    );
    Ok(())
}

proptest! {
    #![proptest_config(ProptestConfig {
        cases: 2000,
        // Failures are printed; the tests lie outside the package that could store them.
        failure_persistence: None,
        ..ProptestConfig::default()
    })]

    #[test]
    fn words_agree_with_the_reference(
        (plan, hertz) in plan(Dissipation::Allowed),
        load in strategies::gamma(),
    ) {
        agrees::<Bits<12>>(&plan, hertz, load)?;
        agrees::<i16>(&plan, hertz, load)?;
        agrees::<Bits<24>>(&plan, hertz, load)?;
        agrees::<i32>(&plan, hertz, load)?;
    }

    /// The stages of the kernel in `f64`: where they leave the reference, an equivalent circuit or
    /// a constant is wrong.
    #[test]
    fn equivalent_circuits_are_those_of_the_reference(
        (mut plan, hertz) in plan(Dissipation::Allowed),
        load in strategies::gamma(),
    ) {
        cut(&mut plan);
        let load = to_gamma(load);
        let case = Case::<i32>::new(&plan, hertz);
        let exact = case.exact.input_gamma(to_complex(load));
        let double = Double::new(&constants::exact(&plan));
        let gamma = Double::gamma(&double.at(hertz), load);
        let bound = case.forward(to_complex(load)).gamma_bound() * DOUBLE_OVER_WORDS;
        let error = (gamma - exact).norm();
        prop_assert!(error <= bound, "{gamma}, {exact}: {error:e} > {bound:e}");
    }

    #[test]
    fn inverse_chains_agree_with_the_reference(
        (plan, hertz) in plan(Dissipation::Allowed),
        load in strategies::gamma(),
    ) {
        de_embeds::<i16>(&plan, hertz, load)?;
        de_embeds::<Bits<24>>(&plan, hertz, load)?;
        de_embeds::<i32>(&plan, hertz, load)?;
    }

    #[test]
    fn forward_and_back_is_where_it_began(
        (plan, hertz) in plan(Dissipation::Allowed),
        load in strategies::gamma(),
    ) {
        returns::<i16>(&plan, hertz, load)?;
        returns::<Bits<24>>(&plan, hertz, load)?;
        returns::<i32>(&plan, hertz, load)?;
    }

    #[test]
    fn splitting_a_line_changes_nothing(
        (line, hertz) in line(Dissipation::Allowed),
        load in strategies::gamma(),
    ) {
        splits::<i16>(line, hertz, load)?;
        splits::<Bits<24>>(line, hertz, load)?;
        splits::<i32>(line, hertz, load)?;
    }

    /// A reactance behind any chain without loss is a reactance.
    #[test]
    fn lossless_chains_keep_total_reflection(
        (plan, hertz) in plan(Dissipation::None),
        angle in 0.0..TAU,
    ) {
        let load = Complex::from_polar(1.0, angle);
        keeps_magnitude::<i16>(&plan, hertz, load)?;
        keeps_magnitude::<Bits<24>>(&plan, hertz, load)?;
        keeps_magnitude::<i32>(&plan, hertz, load)?;
    }

    /// A line of the reference resistance turns Γ and leaves its magnitude.
    #[test]
    fn lossless_matched_lines_keep_the_magnitude_of_gamma(
        (line, hertz) in line(Dissipation::None),
        load in strategies::gamma(),
    ) {
        let plan = strategies::chain(vec![part(line)], hertz, line.impedance);
        keeps_magnitude::<i16>(&plan, hertz, load)?;
        keeps_magnitude::<Bits<24>>(&plan, hertz, load)?;
        keeps_magnitude::<i32>(&plan, hertz, load)?;
    }
}

/// The properties above say something: the bound is small for nearly all of the chains drawn.
#[test]
fn bound_is_small_for_most_random_chains() {
    let rng = TestRng::deterministic_rng(RngAlgorithm::ChaCha);
    let mut runner = TestRunner::new_with_rng(ProptestConfig::default(), rng);
    let chains = (plan(Dissipation::Allowed), strategies::gamma());
    let points: Vec<_> = (0..2000)
        .map(|_| {
            let tree = chains.new_tree(&mut runner);
            tree.expect("nothing is rejected").current()
        })
        .collect();
    is_small::<i16>(&points);
    is_small::<Bits<24>>(&points);
    is_small::<i32>(&points);
}

/// Half of the chains within ten units of the last place of a word of one, 99 in 100 within a
/// hundred. Scalars add as much again and more at 32 bits.
fn is_small<W: Word>(points: &[((Plan, u32), Complex<f64>)]) {
    let unit = f64::from(2 - W::BITS as i32).exp2();
    let factor = if W::BITS == 32 { 2.0 } else { 1.0 };
    let bound = |((plan, hertz), load): &((Plan, u32), Complex<f64>)| {
        Case::<W>::new(plan, *hertz).forward(*load).gamma_bound() / unit / factor
    };
    let mut bounds: Vec<f64> = points.iter().map(bound).collect();
    bounds.sort_by(f64::total_cmp);
    let (half, most) = (bounds[bounds.len() / 2], bounds[bounds.len() / 100 * 99]);
    assert!(
        half <= 10.0 && most <= 100.0,
        "{} bits: {half}, {most}",
        W::BITS
    );
}

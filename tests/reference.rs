//! Properties of the f64 reference: what network theory demands of any chain.
//!
//! Tolerances come from the conditioning of the chain at hand: the product of the magnitudes of the
//! stage matrices bounds how far rounding can have carried each entry.

#[path = "reference/parts.rs"]
mod parts;
mod strategies;
mod tolerance;

use num_complex::Complex;
use proptest::prelude::*;
use stagebits::plan::{Line, Part, Plan, Stage};
use stagebits::reference::{
    FrequencyPoint, Matrix, Reference, State, chain_matrix, gamma_from_impedance,
    impedance_from_gamma, input_gamma, input_impedance,
};
use std::f64::consts::TAU;
use strategies::Dissipation;

/// The magnitudes of the stage matrices multiplied out: no entry of the chain can be larger, and
/// rounding moves none by more than `slack` times this.
struct Magnitudes {
    matrix: Matrix,
    slack: f64,
}

impl Magnitudes {
    fn of(point: &FrequencyPoint) -> Self {
        let norms = |m: &Matrix| Matrix {
            a: m.a.norm().into(),
            b: m.b.norm().into(),
            c: m.c.norm().into(),
            d: m.d.norm().into(),
        };
        Self {
            matrix: point
                .stages
                .iter()
                .fold(Matrix::IDENTITY, |product, stage| product * norms(stage)),
            slack: (point.stages.len() as f64 + 1.0)
                * tolerance::ROUNDINGS_PER_STAGE
                * f64::EPSILON,
        }
    }

    /// How far rounding can move Γ_in: error of v and i, over the magnitude of v + i.
    fn gamma_slack(&self, point: &FrequencyPoint, gamma_load: Complex<f64>) -> f64 {
        let load = State::from_gamma(gamma_load);
        let (v, i) = self
            .matrix
            .apply(load.v.norm().into(), load.i.norm().into());
        let input = point.input_state(gamma_load);
        2.0 * self.slack * (v.re + i.re) / (input.v + input.i).norm()
    }
}

/// Entry by entry: (left, right, magnitude).
fn entries(
    left: &Matrix,
    right: &Matrix,
    magnitude: &Matrix,
) -> [(Complex<f64>, Complex<f64>, f64); 4] {
    [
        (left.a, right.a, magnitude.a.re),
        (left.b, right.b, magnitude.b.re),
        (left.c, right.c, magnitude.c.re),
        (left.d, right.d, magnitude.d.re),
    ]
}

fn at(plan: &Plan, hertz: f64) -> FrequencyPoint {
    Reference::new(plan).at(hertz)
}

proptest! {
    #![proptest_config(ProptestConfig {
        cases: 2000,
        // Failures are printed; the tests lie outside the package that could store them.
        failure_persistence: None,
        ..ProptestConfig::default()
    })]

    /// AD − BC = 1 for any chain of reciprocal parts.
    #[test]
    fn determinant_is_one((plan, hertz) in strategies::plan(Dissipation::Allowed, 8)) {
        let point = at(&plan, hertz);
        let Magnitudes { matrix: m, slack } = Magnitudes::of(&point);
        let tolerance = 2.0 * slack * (m.a.re * m.d.re + m.b.re * m.c.re);
        let error = (point.chain().determinant() - 1.0).norm();
        prop_assert!(error <= tolerance, "{error:e} > {tolerance:e}");
    }

    /// Without loss A and D are real, B and C imaginary, to the last bit.
    #[test]
    fn lossless_chains_are_real_and_imaginary((plan, hertz) in strategies::plan(Dissipation::None, 8)) {
        let point = at(&plan, hertz);
        let m = point.chain();
        prop_assert_eq!((m.a.im, m.b.re, m.c.re, m.d.im), (0.0, 0.0, 0.0, 0.0));
    }

    /// Without loss, what is not reflected gets through.
    #[test]
    fn lossless_scattering_is_unitary((plan, hertz) in strategies::plan(Dissipation::None, 8)) {
        let point = at(&plan, hertz);
        let s = point.s_parameters();
        prop_assert_eq!(s.s12, s.s21);
        let tolerance = 8.0 * Magnitudes::of(&point).gamma_slack(&point, Complex::from(0.0));
        for reflection in [s.s11, s.s22] {
            let sum = reflection.norm_sqr() + s.s21.norm_sqr();
            prop_assert!((sum - 1.0).abs() <= tolerance, "{sum} off by more than {tolerance:e}");
        }
    }

    /// A passive chain with a passive load reflects no more than it gets.
    #[test]
    fn passive_chains_do_not_amplify(
        (plan, hertz) in strategies::plan(Dissipation::Allowed, 8),
        gamma_load in strategies::gamma(),
    ) {
        let point = at(&plan, hertz);
        let gamma = point.input_gamma(gamma_load);
        let slack = Magnitudes::of(&point).gamma_slack(&point, gamma_load);
        prop_assert!(gamma.norm() <= 1.0 + slack + tolerance::CONVERSION, "{gamma}, slack {slack:e}");
        prop_assert!(point.transducer_gain(gamma_load) <= 1.0 + slack);
    }

    /// Power only decreases from port to port on the way to the load.
    #[test]
    fn power_decreases_towards_the_load(
        (plan, hertz) in strategies::plan(Dissipation::Allowed, 8),
        gamma_load in strategies::gamma(),
    ) {
        let point = at(&plan, hertz);
        let states = point.states(gamma_load);
        prop_assert_eq!(states.len(), plan.stages.len() + 1);
        for (k, stage) in point.stages.iter().enumerate() {
            let (source_side, load_side) = (states[k], states[k + 1]);
            // One stage: rounding of v and i times the other one.
            let v = stage.a.norm() * load_side.v.norm() + stage.b.norm() * load_side.i.norm();
            let i = stage.c.norm() * load_side.v.norm() + stage.d.norm() * load_side.i.norm();
            let slack = 2.0 * tolerance::ROUNDINGS_PER_STAGE * f64::EPSILON * v * i;
            prop_assert!(
                source_side.power() >= load_side.power() - slack,
                "stage {k}: {} in, {} out, slack {slack:e}", source_side.power(), load_side.power()
            );
        }
    }

    /// Read from the other side, a chain of reciprocal, symmetric parts swaps A and D.
    #[test]
    fn reversal_swaps_a_and_d((mut plan, hertz) in strategies::plan(Dissipation::Allowed, 8)) {
        let forward = at(&plan, hertz);
        let Magnitudes { matrix, slack } = Magnitudes::of(&forward);
        plan.stages.reverse();
        for stage in &mut plan.stages {
            if let Part::Transformer { ratio } = &mut stage.part {
                *ratio = 1.0 / *ratio;
            }
        }
        let m = *forward.chain();
        let expected = Matrix { a: m.d, d: m.a, ..m };
        let magnitude = Matrix { a: matrix.d, d: matrix.a, ..matrix };
        let backward = at(&plan, hertz);
        for (left, right, magnitude) in entries(backward.chain(), &expected, &magnitude) {
            prop_assert!((left - right).norm() <= 2.0 * slack * magnitude, "{left} against {right}");
        }
        // What is S22 from one side is S11 from the other.
        let matched = Complex::from(0.0);
        let tolerance = 4.0 * Magnitudes::of(&backward).gamma_slack(&backward, matched);
        let (s22, s11) = (forward.s_parameters().s22, backward.s_parameters().s11);
        prop_assert!((s22 - s11).norm() <= tolerance, "{s22} against {s11}");
    }

    /// A line in 20 pieces is the line.
    #[test]
    fn splitting_a_line_changes_nothing(
        (line, hertz) in (1e5..3e9_f64).prop_flat_map(|hertz| {
            (strategies::line(Dissipation::Allowed, hertz), Just(hertz))
        }),
    ) {
        let stage = |line: Line| Stage { name: "line".to_owned(), part: Part::Line(line) };
        let piece = Line { length: line.length / 20.0, ..line };
        let whole = chain_matrix(&[stage(line)], hertz).normalised(line.impedance);
        let pieces = chain_matrix(&vec![stage(piece); 20], hertz).normalised(line.impedance);
        // Dividing the length rounds the angle of up to 20 turns by half an ulp.
        let turns = hertz * line.delay();
        let growth = (line.attenuation(hertz) * line.length).exp();
        let slack = f64::EPSILON * growth * (TAU * turns + 20.0 * tolerance::ROUNDINGS_PER_STAGE);
        let one = Matrix { a: 1.0.into(), b: 1.0.into(), c: 1.0.into(), d: 1.0.into() };
        for (left, right, _) in entries(&whole, &pieces, &one) {
            prop_assert!((left - right).norm() <= slack, "{left} against {right}");
        }
    }

    /// The state behind any stage, taken from the walk, leads through the prefix to the same Γ_in,
    /// and so do the one-shot functions and the ohmic matrix.
    #[test]
    fn all_routes_to_gamma_agree(
        (plan, hertz) in strategies::plan(Dissipation::Allowed, 8),
        gamma_load in strategies::gamma(),
        exponent in -900..900,
    ) {
        let point = at(&plan, hertz);
        let expected = point.input_gamma(gamma_load);
        let tolerance = 2.0 * Magnitudes::of(&point).gamma_slack(&point, gamma_load);
        let scale = 2_f64.powi(exponent);
        for (k, state) in point.states(gamma_load).into_iter().enumerate() {
            let scaled = State { v: state.v * scale, i: state.i * scale };
            let gamma = point.input_gamma_after(k, scaled);
            prop_assert!((gamma - expected).norm() <= tolerance, "after stage {k}: {gamma} against {expected}");
        }
        prop_assert_eq!(input_gamma(&plan, hertz, gamma_load), expected);
        let z = input_impedance(&plan, hertz, gamma_load);
        if z.re.is_finite() {
            let back = gamma_from_impedance(z, plan.reference);
            prop_assert!((back - expected).norm() <= tolerance::CONVERSION, "{back} against {expected}");
        }
        let load = impedance_from_gamma(gamma_load, plan.reference);
        if load.re.is_finite() {
            let ohmic = chain_matrix(&plan.stages, hertz).input_impedance(load);
            let gamma = gamma_from_impedance(ohmic, plan.reference);
            prop_assert!((gamma - expected).norm() <= tolerance, "{gamma} against {expected}");
        }
    }
}

//! Properties of the f64 reference: what network theory demands of any chain.
//!
//! Tolerances come from the conditioning of the chain at hand: the product of the magnitudes of the
//! stage matrices bounds how far rounding can have carried each entry.

mod strategies;

use num_complex::Complex;
use proptest::prelude::*;
use stagebits::plan::{
    Arrangement, Branch, Line, Loss, Part, Plan, Position, Reactor, SPEED_OF_LIGHT, Stage,
    Termination,
};
use stagebits::reference::{
    FrequencyPoint, IDEAL, Matrix, Reference, State, chain_matrix, gamma_from_impedance,
    impedance_from_gamma, input_gamma, input_impedance, stage_matrix,
};
use std::f64::consts::TAU;
use strategies::Dissipation;

/// Roundings per stage that touch one entry: its own making, a complex product and a sum, with a
/// factor for the magnitudes of real and imaginary parts.
const ROUNDINGS_PER_STAGE: f64 = 4.0;

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
            slack: (point.stages.len() as f64 + 1.0) * ROUNDINGS_PER_STAGE * f64::EPSILON,
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
        prop_assert!(gamma.norm() <= 1.0 + slack + 2.0 * f64::EPSILON, "{gamma}, slack {slack:e}");
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
            let slack = 2.0 * ROUNDINGS_PER_STAGE * f64::EPSILON * v * i;
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
        let slack = f64::EPSILON * growth * (TAU * turns + 20.0 * ROUNDINGS_PER_STAGE);
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
            prop_assert!((back - expected).norm() <= 8.0 * f64::EPSILON, "{back} against {expected}");
        }
        let load = impedance_from_gamma(gamma_load, plan.reference);
        if load.re.is_finite() {
            let ohmic = chain_matrix(&plan.stages, hertz).input_impedance(load);
            let gamma = gamma_from_impedance(ohmic, plan.reference);
            prop_assert!((gamma - expected).norm() <= tolerance, "{gamma} against {expected}");
        }
    }
}

fn lossless(value: f64) -> Reactor {
    Reactor {
        value,
        loss: Loss::Lossless,
    }
}

fn branch_stage(position: Position, branch: Branch) -> Stage {
    Stage {
        name: "branch".to_owned(),
        part: Part::Branch(position, branch),
    }
}

/// Frequency of the checks on single parts.
const HERTZ: f64 = 1e6;

/// Losses as `plan` defines them, worked out by hand: a coil of 200 ohm with Q = 100 and a capacitor
/// of 50 ohm with 0.5 ohm in series, beside 1000 ohm.
#[test]
fn branches_follow_their_definition() {
    let omega = TAU * HERTZ;
    let coil = Reactor {
        value: 200.0 / omega,
        loss: Loss::Q(100.0),
    };
    let capacitor = Reactor {
        value: 1.0 / (omega * 50.0),
        loss: Loss::Esr(0.5),
    };
    let (z_coil, z_capacitor) = (Complex::new(2.0, 200.0), Complex::new(0.5, -50.0));
    let branch = |arrangement| Branch {
        arrangement,
        resistance: Some(1000.0),
        inductor: Some(coil),
        capacitor: Some(capacitor),
    };
    let in_series = 1000.0 + z_coil + z_capacitor;
    let side_by_side = (Complex::from(0.001) + z_coil.inv() + z_capacitor.inv()).inv();
    for (arrangement, expected) in [
        (Arrangement::Series, in_series),
        (Arrangement::Parallel, side_by_side),
    ] {
        let series = stage_matrix(&branch_stage(Position::Series, branch(arrangement)), HERTZ);
        assert!((series.b - expected).norm() <= 1e-14 * expected.norm());
        assert_eq!(series.c, Complex::from(0.0));
        let shunt = stage_matrix(&branch_stage(Position::Shunt, branch(arrangement)), HERTZ);
        assert!((shunt.c - expected.inv()).norm() <= 1e-14 / expected.norm());
        assert_eq!(shunt.b, Complex::from(0.0));
    }
    // A capacitor's Q, and a loss that does not follow frequency against one that does.
    let q_capacitor = Branch {
        arrangement: Arrangement::Series,
        resistance: None,
        inductor: None,
        capacitor: Some(Reactor {
            loss: Loss::Q(100.0),
            ..capacitor
        }),
    };
    for factor in [1.0, 2.0] {
        let hertz = factor * HERTZ;
        let stage = branch_stage(Position::Series, q_capacitor);
        let expected = Complex::new(0.5, -50.0) / factor;
        assert!((stage_matrix(&stage, hertz).b - expected).norm() <= 1e-13);
        let esr = Branch {
            capacitor: Some(capacitor),
            ..q_capacitor
        };
        let expected = Complex::new(0.5, -50.0 / factor);
        let stage = branch_stage(Position::Series, esr);
        assert!((stage_matrix(&stage, hertz).b - expected).norm() <= 1e-13);
    }
}

/// Stubs at their exact resonances and ideal tuned circuits: an open in series and a short in shunt
/// reflect everything whatever the load, the other two are not there, and nothing is ever NaN.
#[test]
fn exact_resonances_are_ideal() {
    // 1 Hz and whole multiples of c/4 make the electrical length exact.
    let hertz = 1.0;
    let stub = |position, termination, quarters: f64| Stage {
        name: "stub".to_owned(),
        part: Part::Stub(
            position,
            termination,
            Line {
                impedance: 50.0,
                length: quarters * SPEED_OF_LIGHT / 4.0,
                velocity: 1.0,
                k1: 0.0,
                k2: 0.0,
            },
        ),
    };
    let loads = [
        Complex::new(1.0, 0.0),
        Complex::new(-1.0, 0.0),
        Complex::new(0.0, 0.0),
        Complex::new(0.3, -0.6),
    ];
    for (position, termination, quarters, reflection) in [
        (Position::Series, Termination::Open, 2.0, Some(1.0)),
        (Position::Series, Termination::Short, 1.0, Some(1.0)),
        (Position::Shunt, Termination::Open, 1.0, Some(-1.0)),
        (Position::Shunt, Termination::Short, 2.0, Some(-1.0)),
        (Position::Series, Termination::Open, 1.0, None),
        (Position::Series, Termination::Short, 2.0, None),
        (Position::Shunt, Termination::Open, 2.0, None),
        (Position::Shunt, Termination::Short, 1.0, None),
    ] {
        let matrix = stage_matrix(&stub(position, termination, quarters), hertz);
        let entry = matrix.b + matrix.c;
        let expected = reflection.map_or(0.0, |_| IDEAL);
        assert_eq!(
            entry,
            Complex::new(0.0, expected),
            "{position:?} {termination:?} {quarters}"
        );
        let matrix = matrix.normalised(50.0);
        for gamma_load in loads {
            let load = State::from_gamma(gamma_load);
            let (v, i) = matrix.apply(load.v, load.i);
            let gamma = State { v, i }.gamma();
            let expected = reflection.map_or(gamma_load, Complex::from);
            assert!(
                (gamma - expected).norm() <= f64::EPSILON,
                "{gamma} against {expected}"
            );
        }
    }
}

/// Tuned circuits of equal and opposite reactances, which cancel to the last bit.
#[test]
fn exactly_tuned_circuits_are_ideal() {
    let omega = TAU * HERTZ;
    let tuned = |ohms: f64| (ohms / omega, 1.0 / (omega * ohms));
    // Not every reactance cancels exactly after rounding; these must, or the test tests nothing.
    let exact: Vec<(f64, f64)> = (1..200)
        .map(|ohms| tuned(f64::from(ohms)))
        .filter(|(l, c)| omega * l == 1.0 / (omega * c))
        .collect();
    assert!(exact.len() > 20, "only {} exact resonances", exact.len());
    for (henries, farads) in exact {
        let branch = |arrangement| Branch {
            arrangement,
            resistance: None,
            inductor: Some(lossless(henries)),
            capacitor: Some(lossless(farads)),
        };
        let matrix = |position, arrangement| {
            stage_matrix(&branch_stage(position, branch(arrangement)), HERTZ)
        };
        let ideal = Complex::new(0.0, IDEAL);
        assert_eq!(matrix(Position::Series, Arrangement::Parallel).b, ideal);
        assert_eq!(matrix(Position::Shunt, Arrangement::Series).c, ideal);
        assert_eq!(
            matrix(Position::Series, Arrangement::Series),
            Matrix::IDENTITY
        );
        assert_eq!(
            matrix(Position::Shunt, Arrangement::Parallel),
            Matrix::IDENTITY
        );
    }
}

/// A stub with hundreds of nepers is its characteristic impedance, not infinity over infinity.
#[test]
fn very_lossy_stubs_stay_finite() {
    let stub = |termination| Stage {
        name: "stub".to_owned(),
        part: Part::Stub(
            Position::Series,
            termination,
            Line {
                impedance: 50.0,
                length: 1.0,
                velocity: 0.66,
                k1: 0.0,
                k2: 1000.0 / HERTZ,
            },
        ),
    };
    for termination in [Termination::Open, Termination::Short] {
        let z = stage_matrix(&stub(termination), HERTZ).b;
        assert!((z - 50.0).norm() <= 1e-13, "{z}");
    }
}

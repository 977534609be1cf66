//! Single parts: losses as the plan defines them, exact resonances, very lossy stubs.

use crate::tolerance;
use num_complex::Complex;
use stagebits::plan::{
    Arrangement, Branch, Line, Loss, Part, Position, Reactor, SPEED_OF_LIGHT, Stage, Termination,
};
use stagebits::reference::{IDEAL, Matrix, State, stage_matrix};
use std::f64::consts::TAU;

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
        assert!((series.b - expected).norm() <= tolerance::SINGLE_PART * expected.norm());
        assert_eq!(series.c, Complex::from(0.0));
        let shunt = stage_matrix(&branch_stage(Position::Shunt, branch(arrangement)), HERTZ);
        assert!((shunt.c - expected.inv()).norm() <= tolerance::SINGLE_PART / expected.norm());
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
        assert!(
            (stage_matrix(&stage, hertz).b - expected).norm()
                <= tolerance::SINGLE_PART * expected.norm()
        );
        let esr = Branch {
            capacitor: Some(capacitor),
            ..q_capacitor
        };
        let expected = Complex::new(0.5, -50.0 / factor);
        let stage = branch_stage(Position::Series, esr);
        assert!(
            (stage_matrix(&stage, hertz).b - expected).norm()
                <= tolerance::SINGLE_PART * expected.norm()
        );
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
        assert!((z - 50.0).norm() <= tolerance::SINGLE_PART * 50.0, "{z}");
    }
}

//! The reference: a bank is its parts in cascade, whose shunt admittances and series impedances add.

use num_complex::Complex;
use proptest::prelude::*;
use stagebits::plan::{Bank, BankElement, BankStep, Part, Position, StepLoss, Switches};
use stagebits::reference::{
    IDEAL, Matrix, Reference, chain_matrix, chain_matrix_at_state, stage_matrix,
    stage_matrix_at_state,
};
use std::f64::consts::TAU;

use crate::case::{HERTZ, bank, plan, separate, stage};

/// Relative to the largest of the steps: sixteen of them, a few roundings each.
const LIMIT: f64 = 1e-12;

fn matrix(position: Position, bank: &Bank, hertz: f64, word: u16) -> Matrix {
    stage_matrix_at_state(&stage(Part::Bank(position, bank.clone())), hertz, word)
}

proptest! {
    #![proptest_config(ProptestConfig {
        cases: 2000,
        // Failures are printed; the tests lie outside the package that could store them.
        failure_persistence: None,
        ..ProptestConfig::default()
    })]

    #[test]
    fn a_bank_is_its_parts(bank in bank(), word: u16, octave in -1.0..1.0_f64) {
        let hertz = HERTZ * octave.exp2();
        let parts = separate(&bank, word);
        let sum = chain_matrix(&parts, hertz);
        let largest = parts.iter().map(|part| {
            let matrix = stage_matrix(part, hertz);
            (matrix.b + matrix.c).norm()
        });
        let largest = largest.fold(0.0, f64::max);
        let (series, shunt) = (
            matrix(Position::Series, &bank, hertz, word),
            matrix(Position::Shunt, &bank, hertz, word),
        );
        let (own, found, reciprocal) = match bank.element {
            BankElement::Coils => (sum.b, series.b, shunt.c),
            BankElement::Capacitors => (sum.c, shunt.c, series.b),
        };
        prop_assert!((found - own).norm() <= LIMIT * largest, "{found} for {own}");
        if own.norm() > 0.0 {
            let product = reciprocal * found;
            prop_assert!((product - 1.0).norm() <= LIMIT, "{product}");
        } else {
            prop_assert_eq!(reciprocal, Complex::new(0.0, IDEAL));
        }
        prop_assert_eq!((series.a, series.c, series.d), (1.0.into(), 0.0.into(), 1.0.into()));
        prop_assert_eq!((shunt.a, shunt.b, shunt.d), (1.0.into(), 0.0.into(), 1.0.into()));
    }

    /// The words go to the banks in the order of the stages, whatever stands between them.
    #[test]
    fn each_bank_has_its_word(first in bank(), second in bank(), words: [u16; 2]) {
        let between = stage(Part::Transformer { ratio: 2.0 });
        let stages = vec![
            stage(Part::Bank(Position::Shunt, first.clone())),
            between.clone(),
            stage(Part::Bank(Position::Series, second.clone())),
        ];
        let mut switches = Switches::OFF;
        switches.words[..2].copy_from_slice(&words);
        switches.words[2] = u16::MAX;
        let expected = matrix(Position::Shunt, &first, HERTZ, words[0])
            * stage_matrix(&between, HERTZ)
            * matrix(Position::Series, &second, HERTZ, words[1]);
        prop_assert_eq!(chain_matrix_at_state(&stages, HERTZ, &switches), expected);
        let plan = plan(stages);
        let point = Reference::new(&plan).at_state(HERTZ, &switches);
        prop_assert_eq!(point.stages[0], matrix(Position::Shunt, &first, HERTZ, words[0]).normalised(50.0));
        prop_assert_eq!(point.stages[2], matrix(Position::Series, &second, HERTZ, words[1]).normalised(50.0));
        prop_assert_eq!(Reference::new(&plan).at(HERTZ), Reference::new(&plan).at_state(HERTZ, &Switches::OFF));
    }
}

/// By hand, at 10 MHz: capacitors of 100 and 200 ohm with Q = 100 and contacts of 1 ohm, open ones
/// of 10 kilohms; coils of the same size.
#[test]
fn banks_follow_their_definition() {
    let omega = TAU * HERTZ;
    let steps = |values: [f64; 2]| values.map(|value| BankStep { value, loss: 0.01 }).to_vec();
    let bank = |element, values| Bank {
        element,
        loss: StepLoss::Dissipation,
        steps: steps(values),
        contact: 1.0,
        stray: 1.0 / (omega * 10e3),
    };
    let z = Complex::new;
    let beside = |a: Complex<f64>, b: Complex<f64>| a * b / (a + b);
    let capacitors = bank(
        BankElement::Capacitors,
        [1.0 / (omega * 100.0), 1.0 / (omega * 200.0)],
    );
    let coils = bank(BankElement::Coils, [100.0 / omega, 200.0 / omega]);
    let open = z(0.0, -10e3);
    for word in 0..4_u16 {
        let on = [word & 1 != 0, word & 2 != 0];
        let leg = |index: usize, x: f64| {
            let capacitor = z(x / 100.0, -x);
            (capacitor + if on[index] { z(1.0, 0.0) } else { open }).inv()
        };
        let expected = leg(0, 100.0) + leg(1, 200.0);
        let found = matrix(Position::Shunt, &capacitors, HERTZ, word).c;
        assert!(
            (found - expected).norm() <= 1e-13 * expected.norm(),
            "{word:b}"
        );

        let coil = |index: usize, x: f64| {
            let coil = z(x / 100.0, x);
            beside(coil, if on[index] { open } else { z(1.0, 0.0) })
        };
        let expected = coil(0, 100.0) + coil(1, 200.0);
        let found = matrix(Position::Series, &coils, HERTZ, word).b;
        assert!(
            (found - expected).norm() <= 1e-13 * expected.norm(),
            "{word:b}"
        );
    }
}

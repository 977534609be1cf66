//! The kernel against the reference, and against itself with the bank as separate parts.

use num_complex::Complex;
use proptest::prelude::*;
use stagebits::arithmetic::{Arithmetic, Block, Double, Single, to_complex, to_gamma};
use stagebits::comparison::Comparison;
use stagebits::constants;
use stagebits::plan::{
    Arrangement, Bank, BankElement, Branch, Loss, Part, Plan, Position, Reactor, Stage, Switches,
};
use stagebits::reference::{FrequencyPoint, Matrix, Reference, State};
use stagebits_kernel::Word;

use crate::case::{HERTZ, bank, gamma, plan, separate, stage};

/// A coil with its Q beside the bank, so that the chain is no bank alone.
fn coil() -> Stage {
    let inductor = Some(Reactor {
        value: 0.5e-6,
        loss: Loss::Q(200.0),
    });
    let branch = Branch {
        arrangement: Arrangement::Series,
        resistance: None,
        inductor,
        capacitor: None,
    };
    stage(Part::Branch(Position::Series, branch))
}

fn with_bank(position: Position, bank: &Bank) -> Plan {
    plan(vec![
        coil(),
        stage(Part::Bank(position, bank.clone())),
        coil(),
    ])
}

fn switches(word: u16) -> Switches {
    let mut switches = Switches::OFF;
    switches.words[0] = word;
    switches
}

fn reference(plan: &Plan, word: u16) -> FrequencyPoint {
    Reference::new(plan).at_state(HERTZ, &switches(word))
}

/// Of Γ, one unit of error in every entry of the stage matrices, relative to it.
fn condition(point: &FrequencyPoint, load: Complex<f64>) -> f64 {
    let norms = |m: &Matrix| Matrix {
        a: m.a.norm().into(),
        b: m.b.norm().into(),
        c: m.c.norm().into(),
        d: m.d.norm().into(),
    };
    let stages = point.stages.iter().map(norms);
    let magnitudes = stages.fold(Matrix::IDENTITY, |product, stage| product * stage);
    let load = State::from_gamma(load);
    let (v, i) = magnitudes.apply(load.v.norm().into(), load.i.norm().into());
    let input = point.input_state(to_complex(to_gamma(load.gamma())));
    2.0 * (v.re + i.re) / (input.v + input.i).norm()
}

fn gammas<A: Arithmetic>(
    new: impl Fn(&constants::Constants<f64>) -> A,
    plan: &Plan,
    word: u16,
    load: Complex<f64>,
) -> Complex<f64> {
    let arithmetic = new(&constants::exact(plan));
    let point = arithmetic.at_state(HERTZ as u32, &switches(word));
    A::gamma(&point, to_gamma(load))
}

/// Roundings of a word along the walk of a chain of `stages`: at most 2^(4−W) of the state for each
/// and for the load, and 2^(3−W) of what each immittance adds.
fn words_agree<W: Word>(bank: &Bank, word: u16, load: Complex<f64>) -> Result<(), TestCaseError> {
    let position = match bank.element {
        BankElement::Coils => Position::Series,
        BankElement::Capacitors => Position::Shunt,
    };
    // as many steps as a chain has room for beside the coils
    let bank = Bank {
        steps: bank.steps[..bank.steps.len().min(14)].to_vec(),
        ..bank.clone()
    };
    let whole = with_bank(position, &bank);
    let parts = separate(&bank, word);
    let count = parts.len() as f64 + 3.0;
    let apart = plan([vec![coil()], parts, vec![coil()]].concat());
    let found = gammas(Block::<W>::new, &whole, word, load);
    let expected = gammas(Block::<W>::new, &apart, 0, load);
    let exact = reference(&apart, 0);
    let unit = 2.0_f64.powi(4 - W::BITS as i32);
    let limit = 2.0 * (count + 1.0) * 1.5 * unit * condition(&exact, load);
    let error = (found - expected).norm();
    // where the words have lost the state, nothing is said about Γ
    prop_assert!(
        error <= limit || limit > 0.5,
        "{} bits: {error:e} > {limit:e}",
        W::BITS
    );
    Ok(())
}

proptest! {
    #![proptest_config(ProptestConfig {
        cases: 1000,
        // Failures are printed; the tests lie outside the package that could store them.
        failure_persistence: None,
        ..ProptestConfig::default()
    })]

    /// The same equivalent circuits in another order of operations.
    #[test]
    fn double_precision_agrees_with_the_reference(
        bank in bank(), series: bool, word: u16, load in gamma(),
    ) {
        let position = if series { Position::Series } else { Position::Shunt };
        let plan = with_bank(position, &bank);
        for word in [word, 0, bank.all_on()] {
            let load = to_complex(to_gamma(load));
            let point = reference(&plan, word);
            let exact = point.input_gamma(load);
            let found = gammas(Double::new, &plan, word, load);
            // as for a chain of separate parts, and a sum of sixteen
            let limit = 1e-14 * condition(&point, load);
            prop_assert!(
                (found - exact).norm() <= limit.max(1e-12),
                "{word:b}: {found} for {exact}, {limit:e}"
            );
            let single = gammas(Single::new, &plan, word, load);
            let limit = 64.0 * f64::from(f32::EPSILON) * condition(&point, load);
            prop_assert!((single - exact).norm() <= limit || limit > 0.5, "{single} for {exact}");
        }
    }

    #[test]
    fn words_agree_with_separate_parts(bank in bank(), word: u16, load in gamma()) {
        words_agree::<i32>(&bank, word, load)?;
        words_agree::<i16>(&bank, word, load)?;
        words_agree::<stagebits_kernel::Bits<24>>(&bank, word, load)?;
    }

    /// The error of a bank is taken apart like that of every other stage.
    #[test]
    fn contributions_close(bank in bank(), series: bool, word: u16, load in gamma()) {
        let position = if series { Position::Series } else { Position::Shunt };
        let plan = with_bank(position, &bank);
        let exact = constants::exact(&plan);
        let comparison = Comparison::<i16>::new(&plan, &exact);
        for word in [word, 0, bank.all_on()] {
            let point = comparison.at_state(HERTZ as u32, &switches(word));
            let split = point.split(to_gamma(load));
            prop_assert!(split.closure() <= 1e-12, "{split:?}");
            prop_assert!(split.total.is_finite());
        }
    }
}

//! What a right bank is read as.

use stagebits::plan::*;

use super::{plan, with_stage};

fn bank(kind: &str) -> (Position, Bank) {
    let mut stages = plan(&with_stage(kind)).stages;
    match stages.remove(0).part {
        Part::Bank(position, bank) => (position, bank),
        other => panic!("{other:?}"),
    }
}

fn steps<const N: usize>(steps: [(f64, f64); N]) -> Vec<BankStep> {
    steps.map(|(value, loss)| BankStep { value, loss }).to_vec()
}

#[test]
fn everything_that_is_written_arrives() {
    let found = bank(
        r#"shunt_bank = { capacitances = ["10 pF", "22 pF", "47 pF"], q = 1000,
           contact = "0.05 ohm", stray = "0.5 pF" }"#,
    );
    let expected = Bank {
        element: BankElement::Capacitors,
        loss: StepLoss::Dissipation,
        steps: steps([(10e-12, 1e-3), (22e-12, 1e-3), (47e-12, 1e-3)]),
        contact: 0.05,
        stray: 0.5e-12,
    };
    assert_eq!(found, (Position::Shunt, expected));
    let found =
        bank(r#"series_bank = { inductances = ["1 uH", "0.5 uH"], esr = ["0.4 ohm", "0.3 ohm"] }"#);
    let expected = Bank {
        element: BankElement::Coils,
        loss: StepLoss::Resistance,
        steps: steps([(1e-6, 0.4), (0.5e-6, 0.3)]),
        contact: 0.0,
        stray: 0.0,
    };
    assert_eq!(found, (Position::Series, expected));
}

#[test]
fn either_element_has_either_position() {
    for (kind, position) in [
        ("series_bank", Position::Series),
        ("shunt_bank", Position::Shunt),
    ] {
        for (values, element) in [
            ("inductances = [\"1 uH\"]", BankElement::Coils),
            ("capacitances = [\"1 nF\"]", BankElement::Capacitors),
        ] {
            let (found, bank) = bank(&format!("{kind} = {{ {values} }}"));
            assert_eq!((found, bank.element), (position, element));
            assert_eq!(bank.steps[0].loss, 0.0);
        }
    }
}

#[test]
fn values_may_double() {
    let (_, found) = bank("series_bank.inductances = { first = \"60 nH\", steps = 4 }");
    let (_, listed) =
        bank("series_bank.inductances = [\"60 nH\", \"120 nH\", \"240 nH\", \"480 nH\"]");
    for (one, other) in found.steps.iter().zip(&listed.steps) {
        approx::assert_relative_eq!(one.value, other.value, max_relative = 1e-15);
    }
    assert_eq!(found.steps.len(), 4);
    // each is exactly twice the one before, up to the most that a word switches
    let (_, full) = bank("shunt_bank.capacitances = { first = \"1 pF\", steps = 16 }");
    assert!(
        full.steps
            .windows(2)
            .all(|pair| pair[1].value == 2.0 * pair[0].value)
    );
    assert_eq!(full.steps.len(), BANK_STEPS_MAX);
    assert_eq!(full.all_on(), u16::MAX);
    let (_, one) = bank("shunt_bank.capacitances = { first = \"1 pF\", steps = 1 }");
    assert_eq!((one.steps.len(), one.all_on()), (1, 1));
}

#[test]
fn a_bank_without_a_name_gets_one() {
    let plan = plan(&with_stage("shunt_bank.capacitances = [\"1 pF\"]"));
    assert_eq!(plan.stages[0].name, "shunt bank 1");
    let banks: Vec<_> = plan.banks().map(|(stage, _)| stage.name.clone()).collect();
    assert_eq!(banks, ["shunt bank 1"]);
}

//! What makes a chain with banks, and the room that it takes.

use stagebits_kernel::{
    BANK_STEPS_MAX, Bank, BankElement, BankStep, Chain, ChainError, Position, Scalar, Stage,
    Transformer,
};

fn bank(steps: u8) -> Stage<Scalar> {
    Stage::Bank(Bank {
        position: Position::Series,
        element: BankElement::Coils,
        proportional: false,
        steps,
        contact: Scalar::ONE,
        stray: Scalar::ONE,
    })
}

const STEP: BankStep<Scalar> = BankStep {
    reactance: Scalar::ONE,
    resistance: Scalar::ONE,
};

fn through() -> Stage<Scalar> {
    Stage::Transformer(Transformer {
        ratio: Scalar::ONE,
        inverse: Scalar::ONE,
    })
}

#[test]
fn steps_are_those_of_the_banks() {
    type Three = Chain<Scalar, 3, 20>;
    let error = |stages: &[_], steps: usize| Three::with_banks(stages, &vec![STEP; steps]).err();
    assert_eq!(error(&[], 0), None);
    assert_eq!(error(&[bank(4), through(), bank(16)], 20), None);
    assert_eq!(error(&[bank(4)], 3), Some(ChainError::StepCount));
    assert_eq!(error(&[bank(4)], 5), Some(ChainError::StepCount));
    assert_eq!(error(&[through()], 1), Some(ChainError::StepCount));
    assert_eq!(error(&[bank(4), bank(3)], 8), Some(ChainError::StepCount));
    assert_eq!(error(&[bank(0)], 0), Some(ChainError::BankSize));
    let beyond = BANK_STEPS_MAX + 1;
    assert_eq!(
        error(&[bank(beyond)], beyond.into()),
        Some(ChainError::BankSize)
    );
    assert_eq!(
        error(&[bank(5), bank(16)], 21),
        Some(ChainError::TooManySteps)
    );
    assert_eq!(error(&[through(); 4], 0), Some(ChainError::TooManyStages));
}

#[test]
fn chains_without_room_for_steps_have_no_banks() {
    let new = |stages: &[_]| Chain::<Scalar, 2>::new(stages).err();
    assert_eq!(new(&[through(), through()]), None);
    assert_eq!(new(&[through(), bank(0)]), Some(ChainError::BankSize));
    assert_eq!(new(&[bank(1)]), Some(ChainError::StepCount));
    let with = Chain::<Scalar, 2>::with_banks(&[bank(1)], &[STEP]);
    assert_eq!(with.err(), Some(ChainError::TooManySteps));
}

/// A bank makes no stage larger, and the table of steps takes no room where it is empty.
#[test]
fn chains_without_banks_take_no_more_room() {
    type Chains<const N: usize, const S: usize> = Chain<Scalar, N, S>;
    let stage = size_of::<Stage<Scalar>>();
    assert!(size_of::<Bank<Scalar>>() <= stage / 2);
    assert_eq!(
        size_of::<Chains<16, 0>>(),
        16 * stage + size_of::<heapless::Vec<u64, 0>>()
    );
    assert_eq!(size_of::<BankStep<Scalar>>(), 16);
    assert_eq!(
        size_of::<Chains<16, 16>>(),
        size_of::<Chains<16, 0>>() + 256
    );
}

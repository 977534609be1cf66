//! States: asked for one by one or at one frequency many at a time.

use proptest::prelude::*;
use stagebits_kernel::{Chain, Frequency, Gamma, Line, Scalar, Stage, State, Word};

use super::{Case, case, scalar};

/// Two banks with a line before, between and behind them.
fn chain(first: &Case, second: &Case) -> Chain<Scalar, 5, 32> {
    let line = Stage::Line(Line {
        impedance: scalar(1.5),
        admittance: scalar(1.0 / 1.5),
        turns_per_hertz: 1 << 40,
        root_loss: scalar(1e-5),
        linear_loss: Scalar::ZERO,
    });
    let stages = [
        line,
        Stage::Bank(first.bank),
        line,
        Stage::Bank(second.bank),
        line,
    ];
    let steps = [&first.steps[..], &second.steps].concat();
    Chain::with_banks(&stages, &steps).expect("it fits")
}

fn check<W: Word>(
    chain: &Chain<Scalar, 5, 32>,
    hertz: u32,
    states: &[[u16; 2]],
) -> Result<(), TestCaseError> {
    let frequency = Frequency::new(hertz);
    let mut switched = chain.switched::<W>(&frequency);
    prop_assert_eq!(switched.point(), &chain.at(&frequency));
    for state in states {
        let expected = chain.at_state::<W>(&frequency, state);
        prop_assert_eq!(switched.at_state(state), &expected);
        prop_assert_eq!(switched.point(), &expected);
    }
    Ok(())
}

proptest! {
    #[test]
    fn a_state_has_one_form(
        first in case(16), second in case(16), hertz in 1_000_000..100_000_000_u32,
        states in prop::collection::vec(any::<[u16; 2]>(), 1..10),
    ) {
        let chain = chain(&first, &second);
        check::<i32>(&chain, hertz, &states)?;
        check::<i16>(&chain, hertz, &states)?;
    }

    /// Bits beyond the steps, words beyond the banks and words left out.
    #[test]
    fn what_no_step_has_does_nothing(first in case(15), second in case(15), state: [u16; 2]) {
        let chain = chain(&first, &second);
        let frequency = Frequency::new(7_000_000);
        let at = |switches: &[u16]| chain.at_state::<i32>(&frequency, switches);
        let masks = [&first, &second].map(|case| (1 << case.steps.len()) - 1);
        let meant = [state[0] & masks[0], state[1] & masks[1]];
        prop_assert_eq!(at(&state), at(&meant));
        prop_assert_eq!(at(&[state[0], state[1], 0xffff]), at(&meant));
        prop_assert_eq!(at(&[state[0]]), at(&[meant[0], 0]));
        prop_assert_eq!(at(&[]), chain.at(&frequency));
        let mut switched = chain.switched::<i32>(&frequency);
        prop_assert_eq!(switched.at_state(&state), &at(&meant));
        prop_assert_eq!(switched.at_state(&[]), &at(&[]));
    }

    /// The order of the steps is that of the bits, and of no other consequence for the sum.
    #[test]
    fn steps_may_stand_in_any_order(first in case(16), second in case(16), state: [u16; 2]) {
        let frequency = Frequency::new(7_000_000);
        let forward = chain(&first, &second).at_state::<i16>(&frequency, &state);
        let turned = |case: &Case| {
            let steps = case.steps.iter().rev().copied().collect();
            Case { steps, ..case.clone() }
        };
        let words = [(&first, state[0]), (&second, state[1])].map(|(case, word)| {
            word.reverse_bits() >> (16 - case.steps.len())
        });
        let backward = chain(&turned(&first), &turned(&second)).at_state::<i16>(&frequency, &words);
        // sums differ by less than 2^-50, words of 16 bits by a unit at most
        for (one, other) in forward.steps().iter().zip(backward.steps()) {
            if one != other {
                let load = State::from_load(Gamma::MATCHED);
                let (a, b) = (forward.walk(load).gamma(), backward.walk(load).gamma());
                prop_assert!(a.re.abs_diff(b.re).max(a.im.abs_diff(b.im)) < 1 << 20);
            }
        }
    }
}

/// A bank beside stages of other kinds keeps to its own steps.
#[test]
fn converted_chains_keep_their_steps() {
    use proptest::strategy::ValueTree;
    use proptest::test_runner::TestRunner;
    let mut runner = TestRunner::deterministic();
    let mut draw = || case(16).new_tree(&mut runner).expect("no filter").current();
    let (first, second) = (draw(), draw());
    let chain = chain(&first, &second);
    assert_eq!(chain.map(|constant| constant), chain);
    assert_eq!(
        chain.bank_steps(),
        [&first.steps[..], &second.steps].concat()
    );
}

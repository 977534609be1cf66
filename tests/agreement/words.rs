//! What holds for the words themselves, at every length.

use num_complex::Complex;
use proptest::prelude::*;
use stagebits::arithmetic::{Arithmetic, Block, states, to_gamma};
use stagebits::constants::{self, CAPACITY};
use stagebits::plan::Plan;
use stagebits_kernel::{Bits, Gamma, Immittance, Resolved, State, Step, Word};

use crate::bound::Trace;
use crate::case::plan;
use crate::moves::moves_of_words;
use crate::strategies::{self, Dissipation};

/// Four words of a state with its exponent.
type StateWords = ([i32; 2], [i32; 2], i32);

/// Everything that a chain gives at one point: steps, states, Γ.
type Everything = (Vec<Step<([i32; 2], i32)>>, Vec<StateWords>, Gamma);

fn resolved<W: Word>(plan: &Plan, hertz: u32) -> Resolved<Immittance<W>, CAPACITY> {
    Block::<W>::new(&constants::exact(plan).expect("few stages")).at(hertz)
}

fn everything<W: Word>(plan: &Plan, hertz: u32, load: Gamma) -> Everything {
    let point = resolved::<W>(plan, hertz);
    let plain = |z: Immittance<W>| (z.words(), z.exponent());
    let steps = point.steps().iter().map(|step| step.map(plain)).collect();
    let states = states(&point, load).map(|state| state.words()).collect();
    let gamma = point.walk(State::from_load(load)).gamma();
    (steps, states, gamma)
}

/// Every state of a walk, within a line's T, too.
fn stays_in_the_window<W: Word>(
    plan: &Plan,
    hertz: u32,
    load: Complex<f64>,
) -> Result<(), TestCaseError> {
    let gamma = to_gamma(load);
    let mut trace = Trace::<W>::new(load, gamma);
    let mut last = i32::MIN;
    let mut check = |state: State<W>| {
        let (v, i, exponent) = state.words();
        let words = [v, i].concat();
        let window = -W::LIMIT..W::LIMIT;
        prop_assert!(
            words.iter().all(|word| window.contains(word)),
            "{} bits: {state:?}",
            W::BITS
        );
        prop_assert!(exponent >= last, "{} bits: {state:?}", W::BITS);
        // a block that has grown needed to, but for one place
        let largest = words.iter().map(|word| word.abs()).max().unwrap_or(0);
        prop_assert!(
            exponent == last || largest >= W::LIMIT / 4 - 1,
            "{} bits: {state:?} after exponent {last}",
            W::BITS
        );
        last = exponent;
        Ok(())
    };
    check(trace.words)?;
    for step in moves_of_words(resolved::<W>(plan, hertz).steps()) {
        trace.pass(&step);
        check(trace.words)?;
    }
    Ok(())
}

macro_rules! at_every_length {
    ($check:ident, $plan:expr, $hertz:expr, $load:expr; $($bits:literal)*) => {
        $($check::<Bits<$bits>>($plan, $hertz, $load)?;)*
    };
}

proptest! {
    #![proptest_config(ProptestConfig {
        cases: 1000,
        // Failures are printed; the tests lie outside the package that could store them.
        failure_persistence: None,
        ..ProptestConfig::default()
    })]

    #[test]
    fn words_of_any_length_are_those_of_the_machine(
        (plan, hertz) in plan(Dissipation::Allowed),
        load in strategies::gamma(),
    ) {
        let load = to_gamma(load);
        prop_assert_eq!(
            everything::<Bits<16>>(&plan, hertz, load),
            everything::<i16>(&plan, hertz, load)
        );
        prop_assert_eq!(
            everything::<Bits<32>>(&plan, hertz, load),
            everything::<i32>(&plan, hertz, load)
        );
    }

    #[test]
    fn states_stay_in_the_window(
        (plan, hertz) in plan(Dissipation::Allowed),
        load in strategies::gamma(),
    ) {
        at_every_length!(
            stays_in_the_window, &plan, hertz, load;
            10 11 12 13 14 15 16 17 18 19 20 21 22 23 24 25 26 27 28 29 30 31 32
        );
    }
}

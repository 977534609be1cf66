//! What holds for the words themselves, at every length.

use num_complex::Complex;
use proptest::prelude::*;
use stagebits::arithmetic::{Arithmetic, Block, state_values, states, to_gamma};
use stagebits::constants::{self, CAPACITY};
use stagebits::plan::Plan;
use stagebits_kernel::{Bits, Gamma, Immittance, Resolved, State, Step, Word};

use crate::bound::Trace;
use crate::case::plan;
use crate::moves::{Move, moves_of_words, value, values};
use crate::strategies::{self, Dissipation};

/// Four words of a state with its exponent.
type StateWords = ([i32; 2], [i32; 2], i32);

/// A complex word with its exponent.
type ComplexWord = ([i32; 2], i32);

/// Everything that a chain gives at one point: immittances of every step, states, Γ.
type Everything = (Vec<Vec<ComplexWord>>, Vec<StateWords>, Gamma);

fn resolved<W: Word>(plan: &Plan, hertz: u32) -> Resolved<Immittance<W>, CAPACITY> {
    Block::<W>::new(&constants::exact(plan)).at(hertz)
}

fn everything<W: Word>(plan: &Plan, hertz: u32, load: Gamma) -> Everything {
    let point = resolved::<W>(plan, hertz);
    let plain = |z: &Immittance<W>| (z.words(), z.exponent());
    let steps = point.steps().iter().map(|step| match step {
        Step::Series(z) | Step::Shunt(z) => vec![plain(z)],
        Step::Tee { series, shunt } => vec![plain(series), plain(shunt)],
        Step::Stretch { ratio, inverse } => vec![plain(ratio), plain(inverse)],
        Step::TwoPort(words) => words
            .words()
            .map(|entry| (entry, words.exponent()))
            .to_vec(),
    });
    let steps = steps.collect();
    let states = states(&point, load).map(|state| state.words()).collect();
    let gamma = point.walk(State::from_load(load)).gamma();
    (steps, states, gamma)
}

/// Largest part of what a move makes of a state, before any rounding.
fn largest_part<W: Word>(step: &Move<W>, state: &State<W>) -> f64 {
    let (mut v, mut i) = state_values(state);
    match step {
        Move::Series(z) => v += value(&z.words) * i,
        Move::Shunt(y) => i += value(&y.words) * v,
        Move::Stretch(ratio, inverse) => {
            v *= value(&ratio.words);
            i *= value(&inverse.words);
        }
        Move::TwoPort(matrix) => {
            let [a, b, c, d] = values(&matrix.words);
            (v, i) = (a * v + b * i, c * v + d * i);
        }
    }
    [v.re, v.im, i.re, i.im]
        .into_iter()
        .fold(0.0, |top, part| part.abs().max(top))
}

/// Every state of a walk, within a line's T, too.
fn stays_in_the_window<W: Word>(
    plan: &Plan,
    hertz: u32,
    load: Complex<f64>,
) -> Result<(), TestCaseError> {
    let in_window = |state: &State<W>| {
        let (v, i, _) = state.words();
        let mut words = v.into_iter().chain(i);
        words.all(|word| (-W::LIMIT..W::LIMIT).contains(&word))
    };
    let gamma = to_gamma(load);
    let mut trace = Trace::<W>::new(load, gamma);
    prop_assert!(in_window(&trace.words), "{:?}", trace.words);
    for step in moves_of_words(resolved::<W>(plan, hertz).steps()) {
        let before = trace.words;
        trace.pass(&step);
        let after = trace.words;
        let context = || format!("{} bits: {before:?} {step:?} {after:?}", W::BITS);
        prop_assert!(in_window(&after), "{}", context());

        // the block grows until the largest part fits, or one place more
        let (exponent, grown_to) = (before.words().2, after.words().2);
        let largest = largest_part(&step, &before) / f64::from(W::LIMIT);
        let needed = largest.log2().floor() as i32 + 1;
        prop_assert!(exponent <= grown_to, "{}", context());
        prop_assert!(grown_to <= exponent.max(needed) + 1, "{}", context());
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

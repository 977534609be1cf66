//! Open and short circuits: ideal contacts, and steps that resonate with theirs.

use stagebits_kernel::{
    Bank, BankElement, BankStep, Chain, Frequency, Gamma, Position, Scalar, Stage, State, Word,
};

use super::scalar;

const STEPS: [BankStep<Scalar>; 3] = [BankStep {
    reactance: Scalar::ONE,
    resistance: Scalar::ZERO,
}; 3];

fn gamma<W: Word>(bank: Bank<Scalar>, steps: &[BankStep<Scalar>], hertz: u32, word: u16) -> Gamma {
    let chain = Chain::<Scalar, 1, 3>::with_banks(&[Stage::Bank(bank)], steps).expect("it fits");
    let point = chain.at_state::<W>(&Frequency::new(hertz), &[word]);
    point.walk(State::from_load(Gamma::MATCHED)).gamma()
}

fn ideal(position: Position, element: BankElement) -> Bank<Scalar> {
    Bank {
        position,
        element,
        proportional: false,
        steps: 3,
        contact: Scalar::ZERO,
        stray: Scalar::ZERO,
    }
}

fn assert_gamma<W: Word>(found: Gamma, expected: Gamma) {
    // the limit that `Immittance` states, and the readout's own rounding
    let limit = (1_u32 << (35 - W::BITS)) + 3;
    let error = found
        .re
        .abs_diff(expected.re)
        .max(found.im.abs_diff(expected.im));
    assert!(
        error <= limit,
        "{found:?} for {expected:?} in {} bits",
        W::BITS
    );
}

fn check<W: Word>() {
    use BankElement::{Capacitors, Coils};
    use Position::{Series, Shunt};
    for (position, element, expected) in [
        // nothing is left in the path, or across it
        (Series, Coils, Gamma::MATCHED),
        (Shunt, Capacitors, Gamma::MATCHED),
        // the path is open, or shorted
        (Series, Capacitors, Gamma::OPEN),
        (Shunt, Coils, Gamma::SHORT),
    ] {
        let found = gamma::<W>(ideal(position, element), &STEPS, 1_000_000, 0);
        assert_gamma::<W>(found, expected);
    }
}

#[test]
fn all_steps_off_with_ideal_contacts() {
    check::<i16>();
    check::<i32>();
}

/// A coil of R0 at 2^20 Hz that resonates there with the stray capacitance of its contact: an open
/// circuit beside which nothing counts, and a coil like all others when it is off.
#[test]
fn resonance_with_the_contact_is_an_open_circuit() {
    let hertz = 1 << 20;
    let bank = Bank {
        stray: Scalar::ONE.scaled(-20),
        ..ideal(Position::Series, BankElement::Coils)
    };
    let step = |ohms: f64| BankStep {
        reactance: scalar(ohms / f64::from(hertz)),
        resistance: Scalar::ZERO,
    };
    let steps = [step(0.125), step(1.0), step(0.25)];
    for word in [0b010, 0b111] {
        assert_gamma::<i32>(gamma::<i32>(bank, &steps, hertz, word), Gamma::OPEN);
        assert_gamma::<i16>(gamma::<i16>(bank, &steps, hertz, word), Gamma::OPEN);
    }
    // without it: j/7 and j/3 with the same capacitance beside, Γ = z/(2 + z)
    for (word, x) in [(0b001, 1.0 / 7.0), (0b100, 1.0 / 3.0), (0b101, 10.0 / 21.0)] {
        let found = gamma::<i32>(bank, &steps, hertz, word);
        let square = 4.0 + x * x;
        let one = f64::from(1 << 30);
        let error = (f64::from(found.re) / one - x * x / square)
            .hypot(f64::from(found.im) / one - 2.0 * x / square);
        // the open circuit sets the unit of the sum: 2^-26, of which two are rounded
        assert!(error <= 2.0_f64.powi(-25), "{error:e}");
    }
}

#[cfg(feature = "float")]
#[test]
fn floating_point_has_open_circuits_too() {
    use stagebits_kernel::{Complex, FloatState};
    let series = ideal(Position::Series, BankElement::Capacitors);
    let chain = Chain::<Scalar, 1, 3>::with_banks(&[Stage::Bank(series)], &STEPS);
    let chain = chain.expect("it fits");
    let matched = Complex { re: 0.0, im: 0.0 };
    let single = chain.map(|constant| super::value(constant) as f32);
    let gamma = single
        .at_float(&Frequency::new(1_000_000))
        .walk(FloatState::from_load(matched.map(|part: f64| part as f32)))
        .gamma();
    assert!((gamma.re - 1.0).hypot(gamma.im) <= f32::EPSILON);
    let double = chain.map(super::value);
    let gamma = double
        .at_float(&Frequency::new(1_000_000))
        .walk(FloatState::from_load(matched))
        .gamma();
    assert!((gamma.re - 1.0).hypot(gamma.im) <= f64::EPSILON);
    let frequency = Frequency::new(1_000_000);
    let mut switched = double.switched_float(&frequency);
    for word in 0..8 {
        assert_eq!(
            *switched.at_state(&[word]),
            double.at_float_state(&frequency, &[word])
        );
    }
}

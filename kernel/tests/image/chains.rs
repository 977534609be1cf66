//! Random chains of every kind of stage.

use proptest::collection::vec;
use proptest::prelude::*;
use stagebits_kernel::image::Header;
use stagebits_kernel::{
    BANK_STEPS_MAX, Bank, BankElement, BankStep, Branch, Complex, Law, Line, LossyReactor,
    Position, Scalar, Stage, Stub, StubFunction, Transformer,
};

use super::{CAPACITY, STEPS, TestChain};

/// Headers of every word length.
pub(crate) fn headers() -> impl Strategy<Value = Header> {
    (Header::WORD_BITS, 1..=u32::MAX).prop_map(|(word_bits, reference)| {
        Header::new(word_bits, reference).expect("both are in range")
    })
}

/// Chains of up to [`CAPACITY`] stages.
///
/// Constants are zeros, words of W bits and of more, with small exponents and with any.
pub(crate) fn chains(word_bits: u32) -> impl Strategy<Value = TestChain> {
    let constants = constants(word_bits).boxed();
    let steps = vec(bank_step(constants.clone()), STEPS);
    (vec(stages(constants), 0..=CAPACITY), steps).prop_map(|(mut stages, steps)| {
        let mut used = 0;
        stages.retain(|stage| {
            let Stage::Bank(bank) = stage else {
                return true;
            };
            let fits = used + usize::from(bank.steps) <= STEPS;
            used += if fits { bank.steps.into() } else { 0 };
            fits
        });
        TestChain::with_banks(&stages, &steps[..used]).expect("as many as fit")
    })
}

fn bank_step(constants: BoxedStrategy<Scalar>) -> impl Strategy<Value = BankStep<Scalar>> {
    (constants.clone(), constants).prop_map(|(reactance, resistance)| BankStep {
        reactance,
        resistance,
    })
}

fn constants(word_bits: u32) -> impl Strategy<Value = Scalar> {
    let words = move |bits: u32| {
        (1_u32 << (bits - 2)..1 << (bits - 1), any::<bool>()).prop_map(move |(word, negative)| {
            let mantissa = (word << (32 - bits)) as i32;
            if negative { -mantissa } else { mantissa }
        })
    };
    let mantissas = prop_oneof![
        4 => words(word_bits),
        1 => words((word_bits + 1).min(32)),
        1 => words(32),
        1 => prop::sample::select(vec![1 << 30, -(1 << 30), i32::MAX, -i32::MAX]),
    ];
    let limit = Scalar::EXPONENT_MAX;
    let exponents = prop_oneof![
        4 => -140..50,
        1 => -limit..=limit,
        // both ends of the short exponents and of all
        1 => prop::sample::select(vec![-159, -158, 97, 98, -limit, limit]),
    ];
    prop_oneof![
        2 => Just(Scalar::ZERO),
        3 => (mantissas, exponents).prop_map(|(mantissa, exponent)| {
            Scalar::from_parts(mantissa, exponent).expect("normalised by construction")
        }),
    ]
}

fn stages(constants: BoxedStrategy<Scalar>) -> impl Strategy<Value = Stage<Scalar>> {
    let position = prop_oneof![Just(Position::Series), Just(Position::Shunt)];
    let function = prop_oneof![Just(StubFunction::Tanh), Just(StubFunction::Coth)];
    let turns = prop_oneof![Just(0), any::<u64>(), (0..64_u32).prop_map(|bit| 1 << bit)];
    let complex = (constants.clone(), constants.clone()).prop_map(|(re, im)| Complex { re, im });
    let law =
        (constants.clone(), complex.clone(), complex).prop_map(|(constant, rising, falling)| Law {
            constant,
            rising,
            falling,
        });
    let beside = (constants.clone(), constants.clone(), any::<bool>()).prop_map(
        |(resistance, reactance, falling)| LossyReactor {
            resistance,
            reactance,
            falling,
        },
    );
    let element = prop_oneof![Just(BankElement::Coils), Just(BankElement::Capacitors)];
    let bank_constants = (constants.clone(), constants.clone());
    let bank = (
        position.clone(),
        element,
        any::<bool>(),
        prop_oneof![3 => 1..=4_u8, 1 => 1..=BANK_STEPS_MAX],
        bank_constants,
    )
        .prop_map(
            |(position, element, proportional, steps, (contact, stray))| {
                Stage::Bank(Bank {
                    position,
                    element,
                    proportional,
                    steps,
                    contact,
                    stray,
                })
            },
        );
    let four = [(); 4].map(|()| constants.clone());
    prop_oneof![
        2 => (position.clone(), any::<bool>(), law, prop::option::of(beside)).prop_map(
            |(position, inverted, law, beside)| Stage::Branch(Branch {
                position,
                inverted,
                law,
                beside,
            })
        ),
        1 => (four, turns.clone()).prop_map(
            |([impedance, admittance, root_loss, linear_loss], turns_per_hertz)| {
                Stage::Line(Line {
                    impedance,
                    admittance,
                    turns_per_hertz,
                    root_loss,
                    linear_loss,
                })
            }
        ),
        1 => (
            position,
            function,
            [constants.clone(), constants.clone(), constants.clone()],
            turns,
        )
            .prop_map(
                |(position, function, [immittance, root_loss, linear_loss], turns_per_hertz)| {
                    Stage::Stub(Stub {
                        position,
                        function,
                        immittance,
                        turns_per_hertz,
                        root_loss,
                        linear_loss,
                    })
                }
            ),
        1 => (constants.clone(), constants).prop_map(|(ratio, inverse)| {
            Stage::Transformer(Transformer { ratio, inverse })
        }),
        1 => bank,
    ]
}

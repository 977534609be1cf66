//! A bank against the parts that it stands for.

use num_complex::Complex64;
use proptest::prelude::*;
use stagebits_kernel::{
    BankElement, BankStep, Branch, Chain, Complex, Frequency, Immittance, Law, LossyReactor,
    Position, Scalar, Stage, Step, Word,
};

use super::{Case, case, imaginary, value};

/// The branch that a bank of one step is, where there is one whose constants are those of the bank
/// and that takes its reciprocals as often.
fn branch(case: &Case, on: bool) -> Option<Branch<Scalar>> {
    let (
        bank,
        BankStep {
            reactance,
            resistance,
        },
    ) = (case.bank, case.steps[0]);
    let zero = Scalar::ZERO;
    let mut branch = Branch {
        position: bank.position,
        inverted: bank.position == Position::Shunt,
        law: Law::ZERO,
        beside: None,
    };
    let ideal = if on == (bank.element == BankElement::Coils) {
        bank.stray.is_zero()
    } else {
        bank.contact.is_zero()
    };
    let factor = Complex {
        re: if bank.proportional { resistance } else { zero },
        im: reactance,
    };
    let constant = if bank.proportional { zero } else { resistance };
    match bank.element {
        // in series with its contact
        BankElement::Capacitors if on && bank.position == Position::Shunt => {
            if !constant.is_zero() && !ideal {
                return None;
            }
            branch.law.falling = factor;
            branch.law.constant = if ideal { constant } else { bank.contact };
        }
        BankElement::Coils if on && ideal => {
            branch.law.rising = factor;
            branch.law.constant = constant;
        }
        // side by side with its contact
        BankElement::Coils
            if !ideal
                && bank.position == Position::Series
                && (!bank.proportional || resistance.is_zero()) =>
        {
            branch.inverted = true;
            branch.beside = Some(LossyReactor {
                resistance,
                reactance,
                falling: false,
            });
            if on {
                branch.law.rising = imaginary(bank.stray);
            } else {
                branch.law.constant = bank.contact;
            }
        }
        BankElement::Capacitors | BankElement::Coils => return None,
    }
    Some(branch)
}

/// The textbook's sum over the steps, in the immittance of the position, and how far the roundings
/// of scalars may move it.
///
/// Constants are exact. Each rounding is of 2^-31: one of f or 1/f and one for each product, six of
/// a complex reciprocal; of the sum of an element and its contact, relative to the larger. A bank
/// keeps 2^-57 of the largest of its steps, on or off.
fn exact(case: &Case, hertz: u32, word: u16) -> (Complex64, f64) {
    let f = f64::from(hertz);
    let bank = case.bank;
    let rounding = 2.0_f64.powi(-31);
    let capacitors = bank.element == BankElement::Capacitors;
    let factor = if capacitors { 1.0 / f } else { f };
    let closed = Complex64::from(value(bank.contact));
    let open = Complex64::new(0.0, value(bank.stray) * factor);
    // an element joined to its contact
    let joined = |element: Complex64, contact: Complex64| {
        let sum = element + contact;
        let magnified = (element.norm() + contact.norm()) / sum.norm();
        (
            sum.inv(),
            sum.inv().norm() * rounding * (6.0 + 10.0 * magnified),
        )
    };
    let none = (Complex64::ZERO, 0.0);
    let (mut sum, mut error, mut largest) = (Complex64::ZERO, 0.0, 0.0_f64);
    for (bit, step) in case.steps.iter().enumerate() {
        let proportion = if bank.proportional { factor } else { 1.0 };
        let z = Complex64::new(
            value(step.resistance) * proportion,
            value(step.reactance) * factor,
        );
        let (off, on) = if capacitors {
            let off = if open == Complex64::ZERO {
                none
            } else {
                joined(z, open)
            };
            (off, joined(z, closed))
        } else {
            let off = if closed == Complex64::ZERO {
                none
            } else {
                joined(z.inv(), closed)
            };
            let on = (z, 2.0 * rounding * z.norm());
            (
                off,
                if open == Complex64::ZERO {
                    on
                } else {
                    joined(z.inv(), open)
                },
            )
        };
        let (term, moved) = if word >> bit & 1 != 0 { on } else { off };
        sum += term;
        error += moved;
        largest = largest.max(on.0.norm()).max(off.0.norm());
    }
    error += largest * 2.0_f64.powi(-57) * case.steps.len() as f64 + sum.norm() * rounding;
    if capacitors == (bank.position == Position::Series) {
        let moved = error / (sum.norm() * (sum.norm() - error).max(0.0));
        (sum.inv(), moved + 6.0 * rounding * sum.inv().norm())
    } else {
        (sum, error)
    }
}

fn resolved<W: Word>(case: &Case, hertz: u32, word: u16) -> Step<Immittance<W>> {
    let chain = Chain::<Scalar, 1, 16>::with_banks(&[Stage::Bank(case.bank)], &case.steps);
    let point = chain
        .expect("it fits")
        .at_state(&Frequency::new(hertz), &[word]);
    point.steps()[0]
}

/// The words are right to half a unit each beside what the scalars are wrong by.
fn check<W: Word>(case: &Case, hertz: u32, word: u16) -> Result<(), TestCaseError> {
    let (exact, scalars) = exact(case, hertz, word);
    // open and short circuits saturate, what is too small is zero
    let top = 2.0_f64.powi(W::BITS as i32 - 5);
    if !exact.is_finite() || exact.norm() >= top || exact.norm() * top <= 1.0 {
        return Ok(());
    }
    let (Step::Series(z) | Step::Shunt(z)) = resolved::<W>(case, hertz, word) else {
        panic!("a bank is a branch");
    };
    let unit = f64::from(z.exponent()).exp2();
    let [re, im] = z.words().map(|word| f64::from(word) * unit);
    let error = (Complex64::new(re, im) - exact).norm();
    let limit = 0.5_f64.sqrt() * unit + scalars;
    prop_assert!(error <= limit, "{error:e} > {limit:e}: {exact} {case:?}");
    Ok(())
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(2_000))]

    /// Word for word the same as the branch with the same constants.
    #[test]
    fn one_step_is_a_branch(case in case(1), hertz in 1_000_000..100_000_000_u32, on: bool) {
        if let Some(branch) = branch(&case, on) {
            let chain = Chain::<Scalar, 1>::new(&[Stage::Branch(branch)]).expect("it fits");
            let point = chain.at::<i32>(&Frequency::new(hertz));
            prop_assert_eq!(resolved(&case, hertz, on.into()), point.steps()[0]);
            let point = chain.at::<i16>(&Frequency::new(hertz));
            prop_assert_eq!(resolved(&case, hertz, on.into()), point.steps()[0]);
        }
    }

    #[test]
    fn every_state_is_the_sum_of_its_steps(
        case in case(16), hertz in 1_000_000..100_000_000_u32, word: u16,
    ) {
        for word in [word, 0, u16::MAX] {
            check::<i32>(&case, hertz, word)?;
            check::<i16>(&case, hertz, word)?;
            check::<stagebits_kernel::Bits<24>>(&case, hertz, word)?;
        }
    }
}

/// The strategy draws every kind of branch, or the test above would test nothing.
#[test]
fn most_banks_of_one_step_are_branches() {
    use proptest::strategy::ValueTree;
    let mut runner = proptest::test_runner::TestRunner::deterministic();
    let mut found = [0; 4];
    for _ in 0..1000 {
        let case = case(1).new_tree(&mut runner).expect("no filter").current();
        for on in [false, true] {
            let kind = 2 * usize::from(case.bank.element == BankElement::Coils);
            found[kind + usize::from(on)] += usize::from(branch(&case, on).is_some());
        }
    }
    assert_eq!(
        found[0], 0,
        "a capacitor that is off has a constant of its own"
    );
    assert!(found[1..].iter().all(|count| *count > 50), "{found:?}");
}

//! Many states of a chain's banks at one frequency, which is what a tuner tries.

use heapless::Vec;

use crate::chain::{Chain, Resolved};
use crate::frequency::Frequency;
use crate::immittance::Immittance;
use crate::real::{Complex, Real};
use crate::scalar::Scalar;
use crate::stage::{BankSum, Change, Step, StepForm};
use crate::word::Word;

/// A chain at one frequency whose banks can be switched.
///
/// Lines, branches and each step of each bank, on and off, are resolved once. A state then takes
/// two additions for each step that is on and one reciprocal for a bank whose position needs it;
/// a bank whose word is the same as before takes nothing. The words are those of
/// [`Chain::at_state`].
///
/// ```
/// use stagebits_kernel::{Bank, BankElement, BankStep, Chain, Frequency, Position, Scalar, Stage};
///
/// // two ideal capacitors in shunt, of R0 and R0/2 at 1 MHz
/// let reactance = |ohms| BankStep {
///     reactance: Scalar::from_i32(-1_000_000 * ohms, -1),
///     resistance: Scalar::ZERO,
/// };
/// let bank = Bank {
///     position: Position::Shunt,
///     element: BankElement::Capacitors,
///     proportional: false,
///     steps: 2,
///     contact: Scalar::ZERO,
///     stray: Scalar::ZERO,
/// };
/// let steps = [reactance(2), reactance(1)];
/// let chain = Chain::<Scalar, 1, 2>::with_banks(&[Stage::Bank(bank)], &steps).unwrap();
///
/// let frequency = Frequency::new(1_000_000);
/// let mut switched = chain.switched::<i32>(&frequency);
/// for word in 0..4 {
///     assert_eq!(*switched.at_state(&[word]), chain.at_state(&frequency, &[word]));
/// }
/// ```
#[derive(Clone, PartialEq, Debug)]
pub struct Switched<R: Real, Z: StepForm, const N: usize, const S: usize> {
    point: Resolved<Z, N>,
    banks: Vec<SwitchedBank<R>, N>,
    /// In the order of the chain's steps.
    changes: [Change<R>; S],
}

#[derive(Clone, Copy, PartialEq, Debug)]
struct SwitchedBank<R: Real> {
    sum: BankSum<R>,
    /// Number of the stage, from 0.
    stage: usize,
    steps: u8,
    /// State in which the bank is.
    word: u16,
}

impl<R: Real, const N: usize, const S: usize> Chain<R, N, S> {
    #[inline]
    fn switched_with<Z: StepForm>(
        &self,
        frequency: &Frequency<R>,
        convert: impl Fn(Step<Complex<R>>) -> Step<Z>,
    ) -> Switched<R, Z, N, S> {
        let mut banks = Vec::new();
        let mut changes = [Change::<R>::default(); S];
        let mut rest = &mut changes[..];
        let point = self.resolve_with(frequency, convert, |stage, bank, steps| {
            let (own, after) = core::mem::take(&mut rest)
                .split_at_mut_checked(steps.len())
                .unwrap_or_default();
            rest = after;
            let sum = bank.at(steps, frequency, own);
            let word = 0;
            // the banks are among up to N stages, so that none is left out
            let _ = banks.push(SwitchedBank {
                sum,
                stage,
                steps: bank.steps,
                word,
            });
            sum.step(word, own)
        });
        Switched {
            point,
            banks,
            changes,
        }
    }
}

impl<const N: usize, const S: usize> Chain<Scalar, N, S> {
    /// The chain at one frequency, to be tried in many states of its banks.
    #[inline]
    pub fn switched<W: Word>(
        &self,
        frequency: &Frequency<Scalar>,
    ) -> Switched<Scalar, Immittance<W>, N, S> {
        self.switched_with(frequency, Step::to_words)
    }
}

#[cfg(feature = "float")]
impl<R: Real, const N: usize, const S: usize> Chain<R, N, S> {
    /// The same in floating point.
    #[inline]
    pub fn switched_float(&self, frequency: &Frequency<R>) -> Switched<R, Complex<R>, N, S> {
        self.switched_with(frequency, |step| step)
    }
}

impl<R: Real, Z: StepForm, const N: usize, const S: usize> Switched<R, Z, N, S> {
    /// The chain in the state that was last asked for; at first all steps are off.
    pub fn point(&self) -> &Resolved<Z, N> {
        &self.point
    }

    #[inline]
    fn switch(
        &mut self,
        switches: &[u16],
        convert: impl Fn(Step<Complex<R>>) -> Step<Z>,
    ) -> &Resolved<Z, N> {
        let mut switches = switches.iter();
        let mut changes = &self.changes[..];
        for bank in &mut self.banks {
            let (own, rest) = changes
                .split_at_checked(bank.steps.into())
                .unwrap_or_default();
            changes = rest;
            let word = switches.next().copied().unwrap_or(0);
            if word != bank.word
                && let Some(step) = self.point.step_mut(bank.stage)
            {
                *step = convert(bank.sum.step(word, own));
                bank.word = word;
            }
        }
        &self.point
    }
}

impl<W: Word, const N: usize, const S: usize> Switched<Scalar, Immittance<W>, N, S> {
    /// The chain with its banks in this state; `switches` as in [`Chain::at_state`].
    #[inline]
    pub fn at_state(&mut self, switches: &[u16]) -> &Resolved<Immittance<W>, N> {
        self.switch(switches, Step::to_words)
    }
}

#[cfg(feature = "float")]
impl<R: Real, const N: usize, const S: usize> Switched<R, Complex<R>, N, S> {
    /// The chain with its banks in this state; `switches` as in [`Chain::at_state`].
    #[inline]
    pub fn at_state(&mut self, switches: &[u16]) -> &Resolved<Complex<R>, N> {
        self.switch(switches, |step| step)
    }
}

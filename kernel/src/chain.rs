//! Chains of stages, and the same at one frequency.

use heapless::Vec;

use crate::frequency::Frequency;
use crate::real::{Complex, Real};
use crate::scalar::Scalar;
use crate::stage::{BANK_STEPS_MAX, Bank, BankStep, Change, Stage, Step, StepForm};
use crate::walk::Walk;

/// Up to `N` stages, the first at the source and the last at the load, and up to `S` steps of the
/// banks among them.
///
/// The steps have a table of their own, so that a chain without banks takes no room for them.
#[derive(Clone, PartialEq, Debug)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Chain<R, const N: usize, const S: usize = 0> {
    stages: Vec<Stage<R>, N>,
    /// Steps of the first bank, of the second, and so on; the rest are zeros.
    bank_steps: [BankStep<R>; S],
}

/// Stages, or steps of banks, that make no chain.
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub enum ChainError {
    /// There are more stages than the chain's capacity `N`.
    TooManyStages,
    /// There are more steps of banks than the chain's capacity `S`.
    TooManySteps,
    /// A bank has no steps, or more than [`crate::BANK_STEPS_MAX`].
    BankSize,
    /// The steps given are more or fewer than those of the banks together.
    StepCount,
}

impl<R: Copy, const N: usize> Chain<R, N> {
    /// A chain of these stages, from the source to the load, none of which is a bank.
    ///
    /// # Errors
    /// [`ChainError`] if there are more than `N`, or if one is a bank: for those there is
    /// [`Chain::with_banks`].
    pub fn new(stages: &[Stage<R>]) -> Result<Self, ChainError> {
        let empty = Self {
            stages: Vec::new(),
            bank_steps: [],
        };
        empty.filled(stages, &[])
    }
}

impl<R: Copy + Default, const N: usize, const S: usize> Chain<R, N, S> {
    /// A chain without stages.
    pub(crate) fn empty() -> Self {
        Self {
            stages: Vec::new(),
            bank_steps: [BankStep::default(); S],
        }
    }

    /// A chain of these stages, from the source to the load, and of the steps of its banks: those
    /// of the bank next to the source first.
    ///
    /// # Errors
    /// [`ChainError`] if there are more than `N` or `S`, or if the steps are not as many as the
    /// banks have.
    pub fn with_banks(stages: &[Stage<R>], bank_steps: &[BankStep<R>]) -> Result<Self, ChainError> {
        Self::empty().filled(stages, bank_steps)
    }
}

impl<R: Copy, const N: usize, const S: usize> Chain<R, N, S> {
    fn filled(
        mut self,
        stages: &[Stage<R>],
        mut bank_steps: &[BankStep<R>],
    ) -> Result<Self, ChainError> {
        for stage in stages {
            let (own, rest) = bank_steps
                .split_at_checked(stage.bank_steps())
                .ok_or(ChainError::StepCount)?;
            self.push(*stage, own)?;
            bank_steps = rest;
        }
        if bank_steps.is_empty() {
            Ok(self)
        } else {
            Err(ChainError::StepCount)
        }
    }

    /// Appends a stage at the load, with its steps if it is a bank.
    pub(crate) fn push(
        &mut self,
        stage: Stage<R>,
        bank_steps: &[BankStep<R>],
    ) -> Result<(), ChainError> {
        let count = stage.bank_steps();
        if let Stage::Bank(bank) = stage
            && !(1..=BANK_STEPS_MAX).contains(&bank.steps)
        {
            return Err(ChainError::BankSize);
        }
        if bank_steps.len() != count {
            return Err(ChainError::StepCount);
        }
        let used = self.bank_steps().len();
        let room = self
            .bank_steps
            .get_mut(used..used + count)
            .ok_or(ChainError::TooManySteps)?;
        self.stages
            .push(stage)
            .map_err(|_| ChainError::TooManyStages)?;
        for (place, step) in room.iter_mut().zip(bank_steps) {
            *place = *step;
        }
        Ok(())
    }

    /// The same chain with every constant converted.
    pub fn map<T: Copy>(&self, mut convert: impl FnMut(R) -> T) -> Chain<T, N, S> {
        let mut stages = Vec::new();
        for stage in &self.stages {
            // both have capacity N, so that no stage is left out
            let _ = stages.push(stage.map(&mut convert));
        }
        let bank_steps = self.bank_steps.map(|step| step.map(&mut convert));
        Chain { stages, bank_steps }
    }

    /// The stages, from the source to the load.
    pub fn stages(&self) -> &[Stage<R>] {
        &self.stages
    }

    /// The steps of the banks, those of the bank next to the source first.
    pub fn bank_steps(&self) -> &[BankStep<R>] {
        let used = self.stages.iter().map(Stage::bank_steps).sum();
        self.bank_steps.get(..used).unwrap_or_default()
    }
}

impl<const N: usize, const S: usize> Chain<Scalar, N, S> {
    /// The chain at one frequency with all steps of its banks off, its immittances rounded to
    /// words.
    #[inline]
    pub fn at<W: crate::Word>(
        &self,
        frequency: &Frequency<Scalar>,
    ) -> Resolved<crate::Immittance<W>, N> {
        self.at_state(frequency, &[])
    }

    /// The same with the banks in this state: a word for each bank, the one next to the source
    /// first, in which bit k switches step k, counted from 0.
    ///
    /// A bank without a word has all steps off; bits beyond a bank's steps and words beyond the
    /// banks do nothing. For many states at one frequency there is [`Chain::switched`].
    #[inline]
    pub fn at_state<W: crate::Word>(
        &self,
        frequency: &Frequency<Scalar>,
        switches: &[u16],
    ) -> Resolved<crate::Immittance<W>, N> {
        self.resolve(frequency, switches, Step::to_words)
    }
}

impl<R: Real, const N: usize, const S: usize> Chain<R, N, S> {
    #[inline]
    pub(crate) fn resolve<Z: StepForm>(
        &self,
        frequency: &Frequency<R>,
        switches: &[u16],
        convert: impl Fn(Step<Complex<R>>) -> Step<Z>,
    ) -> Resolved<Z, N> {
        let mut switches = switches.iter();
        self.resolve_with(frequency, convert, |_, bank, steps| {
            let mut changes = [Change::<R>::default(); BANK_STEPS_MAX as usize];
            let changes = changes.get_mut(..steps.len()).unwrap_or_default();
            let word = switches.next().copied().unwrap_or(0);
            bank.at(steps, frequency, changes).step(word, changes)
        })
    }

    /// The chain at one frequency, with its banks as `bank` makes them from their number among the
    /// stages, counted from 0, and their steps.
    #[inline]
    pub(crate) fn resolve_with<Z: StepForm>(
        &self,
        frequency: &Frequency<R>,
        convert: impl Fn(Step<Complex<R>>) -> Step<Z>,
        mut bank: impl FnMut(usize, &Bank<R>, &[BankStep<R>]) -> Step<Complex<R>>,
    ) -> Resolved<Z, N> {
        let mut steps = Vec::new();
        let mut inverted = false;
        let mut bank_steps = &self.bank_steps[..];
        for (number, stage) in self.stages.iter().enumerate() {
            let (step, inverts) = match stage {
                // without room for steps there is no bank, and no code for it
                Stage::Bank(switched) if S > 0 => {
                    let (own, rest) = bank_steps
                        .split_at_checked(switched.steps.into())
                        .unwrap_or_default();
                    bank_steps = rest;
                    (bank(number, switched, own), false)
                }
                stage => stage.resolve(frequency),
            };
            // both have capacity N, so that no stage is left out
            let _ = steps.push(convert(step));
            inverted ^= inverts;
        }
        Resolved { steps, inverted }
    }
}

/// A chain at one frequency.
#[derive(Clone, PartialEq, Debug)]
pub struct Resolved<Z: StepForm, const N: usize> {
    steps: Vec<Step<Z>, N>,
    inverted: bool,
}

impl<Z: StepForm, const N: usize> Resolved<Z, N> {
    /// The steps, from the source to the load.
    pub fn steps(&self) -> &[Step<Z>] {
        &self.steps
    }

    /// The step of a stage, counted from 0.
    pub(crate) fn step_mut(&mut self, number: usize) -> Option<&mut Step<Z>> {
        self.steps.get_mut(number)
    }

    /// Whether the chain's lines leave out an odd number of half turns, so that a walk comes out
    /// with the other sign. No ratio of v and i shows it, a transmission does.
    pub fn inverted(&self) -> bool {
        self.inverted
    }

    /// Takes a state at the load to the source.
    #[inline]
    pub fn walk<S: Walk<Z>>(&self, mut state: S) -> S {
        for step in self.steps.iter().rev() {
            state.pass(step);
        }
        state
    }

    /// The states at the nodes between the stages, in the order of the walk: the load's first, then
    /// that at the source side of the last stage, and last that at the source.
    #[inline]
    pub fn nodes<S: Walk<Z> + Copy>(&self, load: S) -> impl Iterator<Item = S> {
        let mut state = load;
        let passed = self.steps.iter().rev().map(move |step| {
            state.pass(step);
            state
        });
        core::iter::once(load).chain(passed)
    }

    /// Takes a state through the chain turned end for end: a load at what was the source, seen
    /// from what was the load.
    #[inline]
    pub fn walk_turned<S: Walk<Z>>(&self, mut state: S) -> S {
        for step in &self.steps {
            state.pass_turned(step);
        }
        state
    }

    /// Takes a state at the source to the load: the inverse steps in the opposite order.
    #[inline]
    pub fn walk_back<S: Walk<Z>>(&self, mut state: S) -> S {
        for step in &self.steps {
            state.pass_back(step);
        }
        state
    }
}

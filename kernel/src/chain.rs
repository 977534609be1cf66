//! Chains of stages, and the same at one frequency.

use heapless::Vec;

use crate::frequency::Frequency;
use crate::real::Complex;
use crate::scalar::Scalar;
use crate::stage::{Stage, Step, StepForm};
use crate::walk::Walk;

/// Up to `N` stages, the first at the source and the last at the load.
#[derive(Clone, PartialEq, Debug)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Chain<R, const N: usize> {
    stages: Vec<Stage<R>, N>,
}

/// A chain with more stages than its capacity.
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct TooManyStages;

impl<R: Copy, const N: usize> Chain<R, N> {
    /// A chain of these stages, from the source to the load.
    ///
    /// # Errors
    /// [`TooManyStages`] if there are more than `N`.
    pub fn new(stages: &[Stage<R>]) -> Result<Self, TooManyStages> {
        let stages = Vec::from_slice(stages).map_err(|_| TooManyStages)?;
        Ok(Self { stages })
    }

    /// Appends a stage at the load.
    pub(crate) fn push(&mut self, stage: Stage<R>) -> Result<(), TooManyStages> {
        self.stages.push(stage).map_err(|_| TooManyStages)
    }

    /// The same chain with every constant converted.
    pub fn map<S: Copy>(&self, mut convert: impl FnMut(R) -> S) -> Chain<S, N> {
        let mut stages = Vec::new();
        for stage in &self.stages {
            // both have capacity N, so that no stage is left out
            let _ = stages.push(stage.map(&mut convert));
        }
        Chain { stages }
    }

    /// The stages, from the source to the load.
    pub fn stages(&self) -> &[Stage<R>] {
        &self.stages
    }
}

impl<const N: usize> Chain<Scalar, N> {
    /// The chain at one frequency, its immittances rounded to words.
    #[inline]
    pub fn at<W: crate::Word>(
        &self,
        frequency: &Frequency<Scalar>,
    ) -> Resolved<crate::Immittance<W>, N> {
        self.resolve(frequency, Step::to_words)
    }
}

impl<R: crate::Real, const N: usize> Chain<R, N> {
    #[inline]
    pub(crate) fn resolve<Z: StepForm>(
        &self,
        frequency: &Frequency<R>,
        convert: impl Fn(Step<Complex<R>>) -> Step<Z>,
    ) -> Resolved<Z, N> {
        let mut steps = Vec::new();
        let mut inverted = false;
        for stage in &self.stages {
            let (step, inverts) = stage.resolve(frequency);
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

//! A plan in `f64`, in words, and with the bound between the two.

use num_complex::Complex;
use proptest::prelude::*;
use stagebits::arithmetic::to_gamma;
use stagebits::constants::{self, CAPACITY};
use stagebits::plan::{Arrangement, Loss, Part, Plan};
use stagebits::reference::{FrequencyPoint, Reference, State};
use stagebits_kernel as kernel;
use stagebits_kernel::{Chain, Frequency, Immittance, Resolved, Scalar, Stage, Word};

use crate::bound::Trace;
use crate::moves::{self, Move};
use crate::strategies::{self, Dissipation};
use crate::uncertain::Uncertain;

/// Room for the longest chain of the tests, more than a chain file may have.
pub(crate) const LONGEST: usize = 32;

/// A plan at one frequency.
pub(crate) struct Case<W: Word> {
    /// The reference.
    pub(crate) exact: FrequencyPoint,
    /// The kernel.
    pub(crate) words: Resolved<Immittance<W>, LONGEST>,
    /// Both, stage by stage from the load to the source.
    pub(crate) moves: Vec<Vec<Move<W>>>,
}

impl<W: Word> Case<W> {
    pub(crate) fn new(plan: &Plan, hertz: u32) -> Self {
        let mut stored: Vec<Stage<Scalar>> = Vec::new();
        let mut uncertain = Vec::new();
        for stages in plan.stages.chunks(CAPACITY) {
            let part = Plan {
                stages: stages.to_vec(),
                ..plan.clone()
            };
            let constants = constants::exact(&part);
            stored.extend(constants::rounded(&constants, W::BITS).stages());
            let part = constants.stages().iter();
            uncertain.extend(part.map(|stage| stage.map(|c| Uncertain::constant(c, W::BITS))));
        }
        let exact = Reference::new(plan).at(f64::from(hertz));
        let stored: Chain<Scalar, LONGEST> = Chain::new(&stored).expect("room for the longest");
        let words = stored.at(&Frequency::new(hertz));
        let moves = moves::moves(&exact, words.steps(), &uncertain, hertz);
        Self {
            exact,
            words,
            moves,
        }
    }

    /// From a load to the radio side.
    pub(crate) fn forward(&self, load: Complex<f64>) -> Trace<W> {
        let gamma = to_gamma(load);
        let mut trace = Trace::new(load, gamma);
        let states = self.exact.states(load);
        for (moves, behind) in self.moves.iter().zip(states.iter().rev().skip(1)) {
            trace.through(moves, *behind);
        }
        // the moves are those of the kernel
        assert_eq!(
            trace.words,
            self.words.walk(kernel::State::from_load(gamma))
        );
        trace
    }

    /// From a reflection coefficient at the radio side to the load side.
    pub(crate) fn backward(&self, input: Complex<f64>) -> Trace<W> {
        let gamma = to_gamma(input);
        let mut trace = Trace::new(input, gamma);
        let mut state = State::from_gamma(input);
        for (moves, matrix) in self.moves.iter().rev().zip(&self.exact.stages) {
            // the inverse of a matrix of determinant 1
            state = State {
                v: matrix.d * state.v - matrix.b * state.i,
                i: matrix.a * state.i - matrix.c * state.v,
            };
            let inverses: Vec<_> = moves.iter().rev().map(Move::inverse).collect();
            trace.through(&inverses, state);
        }
        let walked = self.words.walk_back(kernel::State::from_load(gamma));
        assert_eq!(trace.words, walked);
        trace
    }
}

/// A random chain that the chain file reader would let through, with its frequency: of two
/// reactors side by side only one may have a constant loss.
pub(crate) fn plan(dissipation: Dissipation) -> impl Strategy<Value = (Plan, u32)> {
    strategies::plan(dissipation, 8).prop_map(|(mut plan, hertz)| {
        for stage in &mut plan.stages {
            if let Part::Branch(_, branch) = &mut stage.part
                && branch.arrangement == Arrangement::Parallel
                && let (Some(coil), Some(capacitor)) = (branch.inductor, &mut branch.capacitor)
                && matches!((coil.loss, capacitor.loss), (Loss::Esr(_), Loss::Esr(_)))
            {
                capacitor.loss = Loss::Lossless;
            }
        }
        (plan, hertz as u32)
    })
}

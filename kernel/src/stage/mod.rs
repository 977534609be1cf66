//! The kinds of two-port, one file each, and what they become at one frequency.

mod bank;
mod branch;
mod line;
mod stub;
mod transformer;

pub use bank::{BANK_STEPS_MAX, Bank, BankElement, BankStep};
pub(crate) use bank::{BankSum, Change};
pub use branch::{Branch, Law, LossyReactor};
pub use line::Line;
pub use stub::{Stub, StubFunction};
pub use transformer::Transformer;

use crate::frequency::Frequency;
use crate::immittance::Immittance;
use crate::real::{Complex, Real};
use crate::scalar::Scalar;
use crate::two_port::{TwoPort, TwoPortWords};
use crate::word::Word;

/// Where a branch or a stub sits.
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub enum Position {
    /// In the through path: an impedance.
    Series,
    /// From the through path to ground: an admittance.
    Shunt,
}

/// One two-port, as the constants that the image stores, normalised to R0.
#[derive(Clone, Copy, PartialEq, Debug)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub enum Stage<R> {
    /// An immittance that is a law of frequency.
    Branch(Branch<R>),
    /// A length of line.
    Line(Line<R>),
    /// A line with an open or shorted end.
    Stub(Stub<R>),
    /// An ideal transformer.
    Transformer(Transformer<R>),
    /// Coils or capacitors that are switched in and out.
    Bank(Bank<R>),
}

/// Immittances of some arithmetic, and what goes with them.
pub trait StepForm: Copy + PartialEq + core::fmt::Debug {
    /// A general two-port in the same arithmetic.
    type TwoPort: Copy + PartialEq + core::fmt::Debug;
}

impl<R: Real> StepForm for Complex<R> {
    type TwoPort = TwoPort<R>;
}

impl<W: Word> StepForm for Immittance<W> {
    type TwoPort = TwoPortWords<W>;
}

/// A stage at one frequency: what the walk multiplies by.
#[derive(Clone, Copy, PartialEq, Debug)]
pub enum Step<Z: StepForm> {
    /// v ← v + z·i
    Series(Z),
    /// i ← i + y·v
    Shunt(Z),
    /// A symmetrical T: the impedance, the admittance, the impedance again.
    Tee {
        /// Each of the two series impedances.
        series: Z,
        /// The shunt admittance between them.
        shunt: Z,
    },
    /// v ← n·v, i ← i/n, both factors real.
    Stretch {
        /// n
        ratio: Z,
        /// 1/n
        inverse: Z,
    },
    /// v and i by a chain matrix.
    TwoPort(Z::TwoPort),
}

impl<R: Real> Stage<R> {
    /// The stage at one frequency; a line but for the sign of the state, a bank without its steps.
    #[inline]
    pub fn at(&self, frequency: &Frequency<R>) -> Step<Complex<R>> {
        self.resolve(frequency).0
    }

    /// The stage at one frequency and whether the state must change sign beside.
    #[inline]
    pub(crate) fn resolve(&self, frequency: &Frequency<R>) -> (Step<Complex<R>>, bool) {
        match self {
            Self::Branch(branch) => (branch.at(frequency), false),
            Self::Line(line) => line.at(frequency),
            Self::Stub(stub) => (stub.at(frequency), false),
            Self::Transformer(transformer) => (transformer.step(), false),
            Self::Bank(bank) => (bank.at(&[], frequency, &mut []).step(0, &[]), false),
        }
    }
}

impl<R> Stage<R> {
    /// Number of steps that the stage has in the chain's table: those of a bank.
    pub(crate) fn bank_steps(&self) -> usize {
        match self {
            Self::Bank(bank) => bank.steps.into(),
            Self::Branch(_) | Self::Line(_) | Self::Stub(_) | Self::Transformer(_) => 0,
        }
    }
}

impl<R: Copy> Stage<R> {
    /// The same stage with every constant converted; a line's turns per hertz stay as they are.
    pub fn map<S>(&self, mut convert: impl FnMut(R) -> S) -> Stage<S> {
        match self {
            Self::Branch(branch) => Stage::Branch(branch.map(&mut convert)),
            Self::Line(line) => Stage::Line(Line {
                impedance: convert(line.impedance),
                admittance: convert(line.admittance),
                turns_per_hertz: line.turns_per_hertz,
                root_loss: convert(line.root_loss),
                linear_loss: convert(line.linear_loss),
            }),
            Self::Stub(stub) => Stage::Stub(Stub {
                position: stub.position,
                function: stub.function,
                immittance: convert(stub.immittance),
                turns_per_hertz: stub.turns_per_hertz,
                root_loss: convert(stub.root_loss),
                linear_loss: convert(stub.linear_loss),
            }),
            Self::Transformer(transformer) => Stage::Transformer(Transformer {
                ratio: convert(transformer.ratio),
                inverse: convert(transformer.inverse),
            }),
            Self::Bank(bank) => Stage::Bank(bank.map(&mut convert)),
        }
    }
}

impl Step<Complex<Scalar>> {
    /// The step in words.
    #[inline(always)]
    pub(crate) fn to_words<W: Word>(self) -> Step<Immittance<W>> {
        let words = Immittance::from_scalars;
        match self {
            Self::Series(z) => Step::Series(words(z)),
            Self::Shunt(y) => Step::Shunt(words(y)),
            Self::Tee { series, shunt } => Step::Tee {
                series: words(series),
                shunt: words(shunt),
            },
            Self::Stretch { ratio, inverse } => Step::Stretch {
                ratio: words(ratio),
                inverse: words(inverse),
            },
            Self::TwoPort(two_port) => Step::TwoPort(TwoPortWords::from_scalars(&two_port)),
        }
    }
}

//! Stubs: lines with an open or shorted far end, in series or in shunt.

use super::line::Loss;
use super::{Position, Step};
use crate::angle;
use crate::frequency::Frequency;
use crate::real::{Complex, Real};

/// Which function of γl the stub's immittance follows.
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub enum StubFunction {
    /// tanh γl: the impedance of a shorted stub, the admittance of an open one.
    Tanh,
    /// coth γl: the admittance of a shorted stub, the impedance of an open one.
    Coth,
}

/// A stub.
#[derive(Clone, Copy, PartialEq, Debug)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Stub<R> {
    /// Where the stub sits.
    pub position: Position,
    /// Law that the immittance of this position follows.
    pub function: StubFunction,
    /// Characteristic immittance over that of R0: Zc/R0 in series, R0/Zc in shunt.
    pub immittance: R,
    /// Electrical length in 2^-64 turns per hertz.
    pub turns_per_hertz: u64,
    /// Conductor loss of the whole length, nepers per √Hz.
    pub root_loss: R,
    /// Dielectric loss of the whole length, nepers per hertz.
    pub linear_loss: R,
}

impl<R: Real> Stub<R> {
    #[inline]
    pub(super) fn at(&self, frequency: &Frequency<R>) -> Step<Complex<R>> {
        let turns = angle::turns(frequency.hertz(), self.turns_per_hertz);
        let (sine, cosine) = R::sine_cosine(angle::within_half_turn(turns));
        let value = match Loss::at(self.root_loss, self.linear_loss, frequency) {
            None => {
                let im = match self.function {
                    StubFunction::Tanh => sine.times(cosine.reciprocal()),
                    StubFunction::Coth => cosine.times(sine.reciprocal()).negated(),
                };
                Complex { re: R::ZERO, im }
            }
            Some(Loss { sinh, cosh }) => {
                // tanh = (sinh cosh + j sin cos) / (sinh² + cos²), coth = (… − j …) / (sinh² + sin²)
                let (circular, im) = match self.function {
                    StubFunction::Tanh => (cosine, sine.times(cosine)),
                    StubFunction::Coth => (sine, sine.times(cosine).negated()),
                };
                let norm = sinh.times(sinh).plus(circular.times(circular)).reciprocal();
                Complex {
                    re: sinh.times(cosh),
                    im,
                }
                .scaled(norm)
            }
        };
        let value = value.scaled(self.immittance);
        match self.position {
            Position::Series => Step::Series(value),
            Position::Shunt => Step::Shunt(value),
        }
    }
}

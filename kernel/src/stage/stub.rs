//! Stubs: lines with an open or shorted far end, in series or in shunt.

use super::line::half_loss;
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
    /// Half of the conductor loss, nepers per √Hz.
    pub root_loss: R,
    /// Half of the dielectric loss, nepers per hertz.
    pub linear_loss: R,
}

impl<R: Real> Stub<R> {
    #[inline]
    pub(super) fn at(&self, frequency: &Frequency<R>) -> Step<Complex<R>> {
        let turns = angle::turns(frequency.hertz(), self.turns_per_hertz);
        let half_angle = angle::within_half_turn(turns);
        let (half_sine, half_cosine) = R::sine_cosine(half_angle);
        let sine = half_sine.times(half_cosine).times_power_of_two(1);
        let cosine = half_cosine
            .minus(half_sine)
            .times(half_cosine.plus(half_sine));
        let lossless = self.root_loss.is_zero() && self.linear_loss.is_zero();
        let value = if lossless {
            let im = match self.function {
                StubFunction::Tanh => sine.times(cosine.reciprocal()),
                StubFunction::Coth => cosine.times(sine.reciprocal()).negated(),
            };
            Complex { re: R::ZERO, im }
        } else {
            let (half_sinh, half_cosh) = half_loss(self.root_loss, self.linear_loss, frequency);
            let sinh = half_sinh.times(half_cosh).times_power_of_two(1);
            let square = sinh.times(sinh);
            // cosh² = 1 + sinh², and cosh of the whole from the half
            let cosh = R::ONE.plus(half_sinh.times(half_sinh).times_power_of_two(1));
            // tanh = (sinh cosh + j sin cos) / (sinh² + cos²), coth = (… − j …) / (sinh² + sin²)
            let (circular, im) = match self.function {
                StubFunction::Tanh => (cosine, sine.times(cosine)),
                StubFunction::Coth => (sine, sine.times(cosine).negated()),
            };
            let norm = square.plus(circular.times(circular)).reciprocal();
            Complex {
                re: sinh.times(cosh),
                im,
            }
            .scaled(norm)
        };
        let value = value.scaled(self.immittance);
        match self.position {
            Position::Series => Step::Series(value),
            Position::Shunt => Step::Shunt(value),
        }
    }
}

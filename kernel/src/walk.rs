//! The walk: what a state does at each kind of step, in one place for every arithmetic.

use crate::immittance::Immittance;
use crate::stage::{Step, StepForm};
use crate::state::State;
use crate::two_port::TwoPortWords;
use crate::word::Word;

/// A state that can pass the steps of a resolved chain.
pub trait Walk<Z: StepForm> {
    /// v ← v + z·i
    fn series(&mut self, z: &Z);
    /// i ← i + y·v
    fn shunt(&mut self, y: &Z);
    /// v ← ratio·v, i ← inverse·i
    fn stretch(&mut self, ratio: &Z, inverse: &Z);
    /// (v, i) ← two-port · (v, i)
    fn two_port(&mut self, two_port: &Z::TwoPort);
    /// The immittance with the other sign.
    fn negated(z: &Z) -> Z;
    /// The inverse of a two-port but for a factor.
    fn adjugate(two_port: &Z::TwoPort) -> Z::TwoPort;
    /// A two-port with its ends exchanged, but for a factor.
    fn turned(two_port: &Z::TwoPort) -> Z::TwoPort;

    /// From the load side of a step to its source side.
    #[inline]
    fn pass(&mut self, step: &Step<Z>) {
        match step {
            Step::Series(z) => self.series(z),
            Step::Shunt(y) => self.shunt(y),
            Step::Tee { series, shunt } => {
                self.series(series);
                self.shunt(shunt);
                self.series(series);
            }
            Step::Stretch { ratio, inverse } => self.stretch(ratio, inverse),
            Step::TwoPort(two_port) => self.two_port(two_port),
        }
    }

    /// Through a step turned end for end. A branch and a T are the same from both ends.
    #[inline]
    fn pass_turned(&mut self, step: &Step<Z>) {
        match step {
            Step::Stretch { ratio, inverse } => self.stretch(inverse, ratio),
            Step::TwoPort(two_port) => self.two_port(&Self::turned(two_port)),
            Step::Series(_) | Step::Shunt(_) | Step::Tee { .. } => self.pass(step),
        }
    }

    /// From the source side of a step to its load side.
    #[inline]
    fn pass_back(&mut self, step: &Step<Z>) {
        match step {
            Step::Series(z) => self.series(&Self::negated(z)),
            Step::Shunt(y) => self.shunt(&Self::negated(y)),
            Step::Tee { series, shunt } => {
                let (series, shunt) = (Self::negated(series), Self::negated(shunt));
                self.series(&series);
                self.shunt(&shunt);
                self.series(&series);
            }
            Step::Stretch { ratio, inverse } => self.stretch(inverse, ratio),
            Step::TwoPort(two_port) => self.two_port(&Self::adjugate(two_port)),
        }
    }
}

impl<W: Word> Walk<Immittance<W>> for State<W> {
    #[inline]
    fn series(&mut self, z: &Immittance<W>) {
        State::series(self, z);
    }
    #[inline]
    fn shunt(&mut self, y: &Immittance<W>) {
        State::shunt(self, y);
    }
    #[inline]
    fn stretch(&mut self, ratio: &Immittance<W>, inverse: &Immittance<W>) {
        State::stretch(self, ratio, inverse);
    }
    #[inline]
    fn two_port(&mut self, two_port: &TwoPortWords<W>) {
        State::two_port(self, two_port);
    }
    #[inline]
    fn negated(z: &Immittance<W>) -> Immittance<W> {
        z.negated()
    }
    #[inline]
    fn adjugate(two_port: &TwoPortWords<W>) -> TwoPortWords<W> {
        two_port.adjugate()
    }
    #[inline]
    fn turned(two_port: &TwoPortWords<W>) -> TwoPortWords<W> {
        two_port.turned()
    }
}

//! The walk: what a state does at each kind of step, in one place for every arithmetic.

use crate::immittance::Immittance;
use crate::stage::Step;
use crate::state::State;
use crate::word::Word;

/// A state that can pass the steps of a resolved chain.
pub trait Walk<Z> {
    /// v ← v + z·i
    fn series(&mut self, z: &Z);
    /// i ← i + y·v
    fn shunt(&mut self, y: &Z);
    /// v ← ratio·v, i ← inverse·i
    fn stretch(&mut self, ratio: &Z, inverse: &Z);
    /// The immittance with the other sign.
    fn negated(z: &Z) -> Z;

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
        }
    }

    /// Through a step turned end for end. All but a transformer are the same from both ends.
    #[inline]
    fn pass_turned(&mut self, step: &Step<Z>) {
        match step {
            Step::Stretch { ratio, inverse } => self.stretch(inverse, ratio),
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
    fn negated(z: &Immittance<W>) -> Immittance<W> {
        z.negated()
    }
}

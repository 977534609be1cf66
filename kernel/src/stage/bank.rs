//! Banks: coils or capacitors that relays switch in and out, as one stage.

use super::{Position, Step};
use crate::frequency::Frequency;
use crate::real::{Complex, Real};

/// Most steps of a bank: one for each bit of its word.
pub const BANK_STEPS_MAX: u8 = u16::BITS as u8;

/// What the steps of a bank are.
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub enum BankElement {
    /// Coils in series with each other, each with a contact across it.
    Coils,
    /// Capacitors side by side, each with a contact in series with it.
    Capacitors,
}

/// Up to [`BANK_STEPS_MAX`] coils or capacitors with a contact each, in series or in shunt.
///
/// A step is *on* when its element is in the circuit: a capacitor's contact is closed then, a
/// coil's open. With the impedance Z of the element, its own resistance included, and that of the
/// contact, Zc = R closed and 1/(jωC) open with the stray capacitance C, the bank is
///
/// ```text
/// capacitors   Y = Σ 1/(Z + Zc)        coils   Z = Σ 1/(1/Z + 1/Zc)
/// ```
///
/// Contacts of a bank are alike. Where one is ideal (R or C is zero), a capacitor that is off
/// carries no current and a coil that is off has no voltage.
///
/// The steps are in the chain's own table, [`crate::Chain::bank_steps`]: banks take theirs from it
/// in the order of the stages.
#[derive(Clone, Copy, PartialEq, Debug)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Bank<R> {
    /// Where the bank sits.
    pub position: Position,
    /// What its steps are.
    pub element: BankElement,
    /// Whether the resistance of each step goes with frequency as its reactance does: a Q.
    pub proportional: bool,
    /// Number of steps, 1 to [`BANK_STEPS_MAX`].
    pub steps: u8,
    /// A closed contact, 0 if it is ideal: resistance over R0 with capacitors, conductance times
    /// R0 with coils.
    pub contact: R,
    /// An open contact, 0 if it is ideal: reactance over R0 times hertz with capacitors, below
    /// zero, susceptance times R0 per hertz with coils.
    pub stray: R,
}

/// The element of one step of a bank, normalised to R0.
#[derive(Clone, Copy, PartialEq, Debug, Default)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct BankStep<R> {
    /// Reactance over R0: per hertz of a coil, times hertz of a capacitor, which has it below zero.
    pub reactance: R,
    /// Resistance in series with it over R0, in the unit of the reactance if
    /// [`Bank::proportional`].
    pub resistance: R,
}

impl<R: Copy> Bank<R> {
    pub(super) fn map<S>(&self, convert: &mut impl FnMut(R) -> S) -> Bank<S> {
        Bank {
            position: self.position,
            element: self.element,
            proportional: self.proportional,
            steps: self.steps,
            contact: convert(self.contact),
            stray: convert(self.stray),
        }
    }
}

impl<R: Copy> BankStep<R> {
    /// The same step with both constants converted.
    pub(crate) fn map<S>(&self, convert: &mut impl FnMut(R) -> S) -> BankStep<S> {
        BankStep {
            reactance: convert(self.reactance),
            resistance: convert(self.resistance),
        }
    }
}

/// What turning a step on adds to the sum of its bank, as terms.
pub(crate) type Change<R> = [<R as Real>::Term; 2];

/// A bank at one frequency but for the changes of its steps: the sum with all of them off.
#[derive(Clone, Copy, PartialEq, Debug)]
pub(crate) struct BankSum<R: Real> {
    /// Real and imaginary part: admittance of capacitors, impedance of coils.
    off: [R::Term; 2],
    /// Power of two that the terms are multiples of.
    unit: i32,
    position: Position,
    /// Whether the position needs the reciprocal of the sum.
    inverted: bool,
}

impl<R: Real> Bank<R> {
    /// The bank at one frequency; `changes` has as many places as there are `steps`.
    ///
    /// Every step is resolved on and off. What a step adds is rounded to 2^-58 of the largest of
    /// them, so that the sums of all states are exact in integers.
    pub(crate) fn at(
        &self,
        steps: &[BankStep<R>],
        frequency: &Frequency<R>,
        changes: &mut [Change<R>],
    ) -> BankSum<R> {
        let falling = self.element == BankElement::Capacitors;
        let factor = if falling {
            frequency.inverse()
        } else {
            frequency.value()
        };
        let stray = self.stray.times(factor);
        let mut sum = BankSum {
            off: [R::Term::default(); 2],
            unit: R::ZERO.unit(),
            position: self.position,
            inverted: falling == (self.position == Position::Series),
        };
        // from the last step, usually the largest, which saves taking terms to another unit
        for (done, step) in steps.iter().rev().enumerate() {
            let (off, on) = self.states(step, factor, stray);
            let parts = [off.re, off.im, on.re, on.im];
            let unit = parts.into_iter().map(R::unit).fold(sum.unit, i32::max);
            if unit > sum.unit {
                let places = unit.abs_diff(sum.unit);
                let coarser = |terms: [R::Term; 2]| terms.map(|term| R::coarser(term, places));
                sum.off = coarser(sum.off);
                for change in changes.iter_mut().rev().take(done) {
                    *change = coarser(*change);
                }
                sum.unit = unit;
            }
            let terms = |z: Complex<R>| [z.re.term(unit), z.im.term(unit)];
            let ([off_re, off_im], [on_re, on_im]) = (terms(off), terms(on));
            sum.off = [sum.off[0] + off_re, sum.off[1] + off_im];
            if let Some(change) = changes.iter_mut().rev().nth(done) {
                *change = [on_re - off_re, on_im - off_im];
            }
        }
        sum
    }

    /// What a step adds to the bank when it is off and when it is on.
    #[inline]
    fn states(&self, step: &BankStep<R>, factor: R, stray: R) -> (Complex<R>, Complex<R>) {
        let resistance = if self.proportional {
            step.resistance.times(factor)
        } else {
            step.resistance
        };
        let element = Complex {
            re: resistance,
            im: step.reactance.times(factor),
        };
        let closed = Complex {
            re: self.contact,
            im: R::ZERO,
        };
        let open = Complex {
            re: R::ZERO,
            im: stray,
        };
        let ideal = |part: R, otherwise: Complex<R>, sum: Complex<R>| {
            if part.is_zero() {
                otherwise
            } else {
                reciprocal(sum)
            }
        };
        match self.element {
            BankElement::Capacitors => (
                ideal(stray, Complex::ZERO, element.plus(open)),
                reciprocal(element.plus(closed)),
            ),
            BankElement::Coils => {
                let admittance = reciprocal(element);
                (
                    ideal(self.contact, Complex::ZERO, admittance.plus(closed)),
                    ideal(stray, element, admittance.plus(open)),
                )
            }
        }
    }
}

impl<R: Real> BankSum<R> {
    /// The bank with the steps on whose bits are set in `word`, the lowest for the first step.
    #[inline]
    pub(crate) fn step(&self, word: u16, changes: &[Change<R>]) -> Step<Complex<R>> {
        let mut sum = self.off;
        for (bit, change) in (0..u16::BITS).zip(changes) {
            if word >> bit & 1 != 0 {
                sum = [sum[0] + change[0], sum[1] + change[1]];
            }
        }
        let [re, im] = sum.map(|term| R::from_term(term, self.unit));
        let sum = Complex { re, im };
        let value = if self.inverted { reciprocal(sum) } else { sum };
        match self.position {
            Position::Series => Step::Series(value),
            Position::Shunt => Step::Shunt(value),
        }
    }
}

/// 1/z; of zero, exactly an open or short circuit, a huge reactance.
#[inline]
fn reciprocal<R: Real>(z: Complex<R>) -> Complex<R> {
    if z.re.is_zero() && z.im.is_zero() {
        return Complex {
            re: R::ZERO,
            im: R::HUGE,
        };
    }
    z.reciprocal()
}

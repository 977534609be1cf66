//! Branches: an immittance that is a law of frequency, in series or in shunt.

use super::{Position, Step};
use crate::frequency::Frequency;
use crate::real::{Complex, Real};

/// An immittance constant + rising·f + falling/f.
///
/// A resistor is constant; a coil's impedance and a capacitor's admittance rise, the other two
/// fall. A loss given as Q makes the factor complex, one given as a series resistance adds to the
/// constant. Normalised to R0, f in hertz.
#[derive(Clone, Copy, PartialEq, Debug)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Law<R> {
    /// Real part that does not change with frequency.
    pub constant: R,
    /// Factor of f.
    pub rising: Complex<R>,
    /// Factor of 1/f.
    pub falling: Complex<R>,
}

impl<R: Real> Law<R> {
    /// Zero at every frequency.
    pub const ZERO: Self = Self {
        constant: R::ZERO,
        rising: Complex::ZERO,
        falling: Complex::ZERO,
    };

    #[inline]
    fn at(&self, frequency: &Frequency<R>) -> Complex<R> {
        let rising = self.rising.scaled(frequency.value());
        let falling = self.falling.scaled(frequency.inverse());
        Complex {
            re: self.constant.plus(rising.re).plus(falling.re),
            im: rising.im.plus(falling.im),
        }
    }
}

/// A coil or capacitor with a constant series resistance, side by side with other elements.
///
/// Its admittance is the reciprocal of resistance + j·reactance·f, or j·reactance/f where
/// `falling`; a capacitor has a negative reactance.
#[derive(Clone, Copy, PartialEq, Debug)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct LossyReactor<R> {
    /// Series resistance over R0.
    pub resistance: R,
    /// Reactance over R0, per hertz or times hertz.
    pub reactance: R,
    /// Whether the reactance falls with frequency: a capacitor's.
    pub falling: bool,
}

/// An immittance in series or in shunt.
///
/// `law` (and `beside`) give the immittance that the position needs, impedance in series and
/// admittance in shunt, or its reciprocal where `inverted`.
#[derive(Clone, Copy, PartialEq, Debug)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Branch<R> {
    /// Where the branch sits.
    pub position: Position,
    /// Whether the law is of the reciprocal of what the position needs.
    pub inverted: bool,
    /// The law of frequency.
    pub law: Law<R>,
    /// An element whose reciprocal impedance is added to the law.
    pub beside: Option<LossyReactor<R>>,
}

impl<R: Copy> Branch<R> {
    pub(super) fn map<S>(&self, convert: &mut impl FnMut(R) -> S) -> Branch<S> {
        let law = &self.law;
        Branch {
            position: self.position,
            inverted: self.inverted,
            law: Law {
                constant: convert(law.constant),
                rising: law.rising.map(&mut *convert),
                falling: law.falling.map(&mut *convert),
            },
            beside: self.beside.map(|element| LossyReactor {
                resistance: convert(element.resistance),
                reactance: convert(element.reactance),
                falling: element.falling,
            }),
        }
    }
}

impl<R: Real> Branch<R> {
    #[inline]
    pub(super) fn at(&self, frequency: &Frequency<R>) -> Step<Complex<R>> {
        let mut value = self.law.at(frequency);
        if let Some(element) = &self.beside {
            let factor = if element.falling {
                frequency.inverse()
            } else {
                frequency.value()
            };
            let impedance = Complex {
                re: element.resistance,
                im: element.reactance.times(factor),
            };
            value = value.plus(impedance.reciprocal());
        }
        if self.inverted {
            value = value.reciprocal();
        }
        match self.position {
            Position::Series => Step::Series(value),
            Position::Shunt => Step::Shunt(value),
        }
    }
}

//! Lines with a real characteristic impedance, with or without loss.

use super::Step;
use crate::angle;
use crate::frequency::Frequency;
use crate::real::{Complex, Real};
use crate::two_port::TwoPort;

/// A length of uniform line.
#[derive(Clone, Copy, PartialEq, Debug)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Line<R> {
    /// Characteristic impedance over R0.
    pub impedance: R,
    /// R0 over the characteristic impedance.
    pub admittance: R,
    /// Electrical length in 2^-64 turns per hertz.
    pub turns_per_hertz: u64,
    /// Conductor loss of the whole length, nepers per √Hz.
    pub root_loss: R,
    /// Dielectric loss of the whole length, nepers per hertz.
    pub linear_loss: R,
}

impl<R: Real> Line<R> {
    /// The line but for whole half turns, and whether they were odd in number.
    ///
    /// Half turns change the sign of the state, which no ratio of v and i shows. What is left has
    /// |θ| ≤ π/2 and keeps every entry finite.
    ///
    /// Where Zc is within a factor 2 of R0 the line is its chain matrix, cosh γl, Zc·sinh γl,
    /// sinh γl / Zc, whose entries are then all of one size. Else it is the symmetrical T equivalent
    /// to it, Zc·tanh(γl/2) in series and sinh(γl)/Zc in shunt, whose immittances have exponents of
    /// their own. (D. M. Pozar, Microwave Engineering, 4th ed., Table 4.1 and sec. 2.7, from memory)
    #[inline]
    pub(super) fn at(&self, frequency: &Frequency<R>) -> (Step<Complex<R>>, bool) {
        let turns = angle::turns(frequency.hertz(), self.turns_per_hertz);
        let inverts = angle::is_odd_half_turn(turns);
        let (sine, cosine) = R::sine_cosine(angle::within_half_turn(turns));
        let loss = Loss::at(self.root_loss, self.linear_loss, frequency);
        let (cosh, sinh) = match &loss {
            None => {
                let imaginary = Complex {
                    re: R::ZERO,
                    im: sine,
                };
                (
                    Complex {
                        re: cosine,
                        im: R::ZERO,
                    },
                    imaginary,
                )
            }
            Some(Loss { sinh, cosh }) => (
                Complex {
                    re: cosh.times(cosine),
                    im: sinh.times(sine),
                },
                Complex {
                    re: sinh.times(cosine),
                    im: cosh.times(sine),
                },
            ),
        };
        let c = sinh.scaled(self.admittance);
        if self.impedance.is_near_one() {
            let b = sinh.scaled(self.impedance);
            return (
                Step::TwoPort(TwoPort {
                    a: cosh,
                    b,
                    c,
                    d: cosh,
                }),
                inverts,
            );
        }
        // tanh(γl/2) = (sinh αl + j sin θ) / (cosh αl + cos θ), whose denominator is at least 1
        let (numerator, denominator) = match &loss {
            None => (sinh, R::ONE.plus(cosine)),
            Some(Loss { sinh, cosh }) => (
                Complex {
                    re: *sinh,
                    im: sine,
                },
                cosh.plus(cosine),
            ),
        };
        let series = numerator.scaled(self.impedance.times(denominator.reciprocal()));
        (Step::Tee { series, shunt: c }, inverts)
    }
}

/// Hyperbolic sine and cosine of a line's loss in nepers.
pub(super) struct Loss<R> {
    pub(super) sinh: R,
    pub(super) cosh: R,
}

impl<R: Real> Loss<R> {
    /// At one frequency; `None` where both constants are zero.
    #[inline]
    pub(super) fn at(root: R, linear: R, frequency: &Frequency<R>) -> Option<Self> {
        if root.is_zero() && linear.is_zero() {
            return None;
        }
        let loss = root
            .times(frequency.root())
            .plus(linear.times(frequency.value()));
        let (sinh, cosh) = loss.hyperbolic();
        Some(Self { sinh, cosh })
    }
}

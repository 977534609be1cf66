//! Lines with a real characteristic impedance, with or without loss.

use super::Step;
use crate::angle;
use crate::frequency::Frequency;
use crate::real::{Complex, Real};

/// A length of uniform line.
///
/// The loss of the whole length is 2·(root_loss·√f + linear_loss·f) nepers: the half is what both
/// the line's T and the image need.
#[derive(Clone, Copy, PartialEq, Debug)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Line<R> {
    /// Characteristic impedance over R0.
    pub impedance: R,
    /// R0 over the characteristic impedance.
    pub admittance: R,
    /// Electrical length in 2^-64 turns per hertz.
    pub turns_per_hertz: u64,
    /// Half of the conductor loss, nepers per √Hz.
    pub root_loss: R,
    /// Half of the dielectric loss, nepers per hertz.
    pub linear_loss: R,
}

impl<R: Real> Line<R> {
    /// The symmetrical T equivalent to the line: series Zc·tanh(γl/2), shunt sinh(γl)/Zc.
    ///
    /// Whole half turns are taken off γl first. They change the sign of the state, which no
    /// ratio of v and i shows, and keep both immittances finite: with |θ| ≤ π/2 the denominator
    /// sinh²(αl/2) + cos²(θ/2) is at least 1/2. Also says whether they were odd in number.
    #[inline]
    pub(super) fn at(&self, frequency: &Frequency<R>) -> (Step<Complex<R>>, bool) {
        let turns = angle::turns(frequency.hertz(), self.turns_per_hertz);
        let inverts = angle::is_odd_half_turn(turns, R::ANGLE_ROUNDING);
        (self.tee(angle::within_half_turn(turns), frequency), inverts)
    }

    #[inline(always)]
    fn tee(&self, half_angle: i64, frequency: &Frequency<R>) -> Step<Complex<R>> {
        let (sine, cosine) = R::sine_cosine(half_angle);
        let product = sine.times(cosine);
        if self.root_loss.is_zero() && self.linear_loss.is_zero() {
            let tangent = sine.times(cosine.reciprocal());
            let imaginary = |im: R| Complex { re: R::ZERO, im };
            return Step::Tee {
                series: imaginary(self.impedance.times(tangent)),
                shunt: imaginary(self.admittance.times(product).times_power_of_two(1)),
            };
        }
        let (loss_sine, loss_cosine) = half_loss(self.root_loss, self.linear_loss, frequency);
        let loss_product = loss_sine.times(loss_cosine);
        let loss_square = loss_sine.times(loss_sine);
        let square = cosine.times(cosine);
        // tanh(γl/2) = (sh·ch + j sin·cos) / (sh² + cos²), arguments halved
        let scale = self.impedance.times(loss_square.plus(square).reciprocal());
        // sinh(γl) = 2 sh·ch·cos(θ) + 2j sin·cos·cosh(αl)
        let angle_cosine = square.minus(sine.times(sine));
        let whole_cosine = R::ONE.plus(loss_square.times_power_of_two(1));
        let sinh = Complex {
            re: loss_product.times(angle_cosine),
            im: product.times(whole_cosine),
        };
        Step::Tee {
            series: Complex {
                re: loss_product,
                im: product,
            }
            .scaled(scale),
            shunt: sinh.scaled(self.admittance.times_power_of_two(1)),
        }
    }
}

/// Hyperbolic sine and cosine of half a line's loss at this frequency.
#[inline]
pub(super) fn half_loss<R: Real>(root: R, linear: R, frequency: &Frequency<R>) -> (R, R) {
    let loss = root
        .times(frequency.root())
        .plus(linear.times(frequency.value()));
    loss.hyperbolic()
}

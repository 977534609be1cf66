//! Reflection coefficients.

use super::Moments;
use crate::real::{Complex, Real};
use crate::scalar::Scalar;
use crate::state::State;
use crate::word::Word;

/// A reflection coefficient referred to R0, both parts in 2^-30.
///
/// Loads go in and results come out in this format, whatever the word length. Parts reach ±2, so
/// that an active load is still a number.
#[derive(Clone, Copy, PartialEq, Eq, Debug, Default)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Gamma {
    /// Real part in 2^-30.
    pub re: i32,
    /// Imaginary part in 2^-30.
    pub im: i32,
}

impl Gamma {
    /// Bits after the binary point.
    pub const FRACTION_BITS: u32 = 30;
    /// An open circuit.
    pub const OPEN: Self = Self { re: 1 << 30, im: 0 };
    /// A short circuit.
    pub const SHORT: Self = Self {
        re: -(1 << 30),
        im: 0,
    };
    /// The reference resistance itself.
    pub const MATCHED: Self = Self { re: 0, im: 0 };

    /// Both parts as scalars; exact.
    #[inline]
    pub(crate) fn to_scalars(self) -> Complex<Scalar> {
        let part = |word| Scalar::from_i32(word, -(Self::FRACTION_BITS as i32));
        Complex {
            re: part(self.re),
            im: part(self.im),
        }
    }

    /// Both parts rounded half up; they saturate at ±2.
    #[inline]
    pub(crate) fn from_scalars(value: Complex<Scalar>) -> Self {
        Self {
            re: fixed(value.re),
            im: fixed(value.im),
        }
    }
}

/// A scalar in the unit of [`Gamma`], rounded half up; saturates at ±2.
#[inline]
fn fixed(part: Scalar) -> i32 {
    part.to_fixed(Gamma::FRACTION_BITS as i32)
}

impl Moments {
    /// Γ referred to R0, rounded to the nearest; saturates at ±2.
    ///
    /// Four roundings of a scalar and one to 2^-30: for |Γ| ≤ 1 each part is within 2.5 · 2^-30 of
    /// that of the state.
    #[inline]
    pub fn gamma(&self) -> Gamma {
        Gamma::from_scalars(Self::ratio(
            Scalar::from_i64(self.voltage - self.current, 0),
            Scalar::from_i64(self.reactive, 1),
            self.sum_square(),
        ))
    }

    /// |Γ|² as a scalar: relative error within 2^-29, however small; [`Scalar::HUGE`] at Γ = ∞.
    ///
    /// The power that comes back over the power available.
    #[inline]
    pub fn reflected(&self) -> Scalar {
        let difference = Scalar::from_i64(self.difference_square(), 0);
        Self::ratio(difference, Scalar::ZERO, self.sum_square()).re
    }

    /// |Γ|² in 2^-30, rounded to the nearest; saturates at 2.
    ///
    /// For |Γ| ≤ 1 within 2.5 · 2^-30 of that of the state. It orders states as |Γ| does and takes
    /// no root.
    #[inline]
    pub fn gamma_square(&self) -> u32 {
        fixed(self.reflected()) as u32
    }

    /// |Γ| in 2^-30, rounded to the nearest; saturates at 2.
    ///
    /// For |Γ| ≤ 1 within 2 · 2^-30 of that of the state.
    #[inline]
    pub fn gamma_magnitude(&self) -> u32 {
        fixed(self.reflected().square_root()) as u32
    }
}

impl<W: Word> State<W> {
    /// Γ referred to R0; see [`Moments::gamma`].
    #[inline]
    pub fn gamma(&self) -> Gamma {
        self.moments().gamma()
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn standard_loads_read_back() {
        for load in [
            Gamma::OPEN,
            Gamma::SHORT,
            Gamma::MATCHED,
            Gamma { re: 0, im: 1 << 30 },
        ] {
            assert_eq!(State::<i32>::from_load(load).gamma(), load);
            assert_eq!(State::<i16>::from_load(load).gamma(), load);
            let magnitude = if load == Gamma::MATCHED { 0 } else { 1 << 30 };
            let moments = State::<i32>::from_load(load).moments();
            assert_eq!(moments.gamma_magnitude(), magnitude);
            assert_eq!(moments.gamma_square(), magnitude);
        }
    }

    /// The square is taken from |v − i|², so that a good match keeps its digits.
    #[test]
    fn a_small_reflection_keeps_its_digits() {
        // even parts, which the state's words hold exactly
        let load = Gamma { re: 30, im: -40 };
        let moments = State::<i32>::from_load(load).moments();
        let exact = 50.0_f64.powi(2) * 2.0_f64.powi(-60);
        let read = crate::testing::value(moments.reflected());
        assert!((read - exact).abs() <= exact * 2.0_f64.powi(-29), "{read}");
        assert_eq!(moments.gamma_magnitude(), 50);
    }
}

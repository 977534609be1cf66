//! Standing wave ratios.

use super::Moments;
use crate::real::Real;
use crate::scalar::Scalar;

/// A standing wave ratio in 2^-16, rounded to the nearest; at least 1.
///
/// [`Swr::INFINITE`] stands for 32 768 and above, and for every state that takes no power.
#[derive(Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Debug)]
pub struct Swr(u32);

impl Swr {
    /// Bits after the binary point.
    pub const FRACTION_BITS: u32 = 16;
    /// The largest value, total reflection.
    pub const INFINITE: Self = Self(i32::MAX as u32);

    /// The ratio in 2^-16.
    pub const fn bits(self) -> u32 {
        self.0
    }
}

impl Moments {
    /// The standing wave ratio, (|v+i| + |v−i|) / (|v+i| − |v−i|).
    ///
    /// Taken as (|v|² + |i|² + |v+i|·|v−i|) / (2 Re v·i*), whose denominator is exact and whose
    /// terms are positive, so that nothing cancels at either end.
    #[inline]
    pub fn swr(&self) -> Swr {
        if self.active <= 0 {
            return Swr::INFINITE;
        }
        let forward = Scalar::from_i64(self.sum_square(), 0);
        let reflected = Scalar::from_i64(self.difference_square(), 0);
        let ratio = Scalar::from_i64(self.voltage + self.current, 0)
            .plus(forward.times(reflected).square_root())
            .times(Scalar::from_i64(self.active, 1).reciprocal());
        let fixed = ratio.to_fixed(Swr::FRACTION_BITS as i32);
        Swr(fixed.max(1 << Swr::FRACTION_BITS) as u32)
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::readout::Gamma;
    use crate::state::State;

    #[test]
    fn standard_loads_have_their_ratio() {
        let swr = |load| State::<i32>::from_load(load).moments().swr();
        assert_eq!(swr(Gamma::OPEN), Swr::INFINITE);
        assert_eq!(swr(Gamma::SHORT), Swr::INFINITE);
        assert_eq!(swr(Gamma::MATCHED).bits(), 1 << 16);
        // |Γ| = 1/3 is an SWR of 2
        let third = Gamma {
            re: 0,
            im: 357_913_941,
        };
        assert_eq!(swr(third).bits(), 2 << 16);
    }
}

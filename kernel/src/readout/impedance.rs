//! Impedance and admittance, normalised and in the units of an instrument.

use super::Moments;
use crate::real::{Complex, Real};
use crate::scalar::Scalar;

impl Moments {
    /// Z/R0, relative error of each part within 2^-29; a very large number for an open circuit.
    #[inline]
    pub fn impedance(&self) -> Complex<Scalar> {
        Self::ratio(
            Scalar::from_i64(self.active, 0),
            Scalar::from_i64(self.reactive, 0),
            self.current,
        )
    }

    /// Y·R0, relative error of each part within 2^-29; a very large number for a short circuit.
    #[inline]
    pub fn admittance(&self) -> Complex<Scalar> {
        Self::ratio(
            Scalar::from_i64(self.active, 0),
            Scalar::from_i64(-self.reactive, 0),
            self.voltage,
        )
    }

    /// R and X in milliohms for a reference resistance in milliohms, rounded to the nearest after
    /// a relative error within 2^-28; saturates at the ends of `i32`.
    #[inline]
    pub fn milliohms(&self, reference_milliohms: u32) -> (i32, i32) {
        let z = self
            .impedance()
            .scaled(Scalar::from_i64(reference_milliohms as i64, 0));
        (z.re.to_fixed(0), z.im.to_fixed(0))
    }

    /// G and B in microsiemens for a reference resistance in milliohms, rounded to the nearest
    /// after a relative error within 2^-28; saturates at the ends of `i32`.
    #[inline]
    pub fn microsiemens(&self, reference_milliohms: u32) -> (i32, i32) {
        // 1 S = 10^6 µS and 1 Ω = 10^3 mΩ
        let reference = Scalar::from_i64(reference_milliohms as i64, 0);
        let unit = Scalar::from_i64(1_000_000_000, 0).times(reference.reciprocal());
        let y = self.admittance().scaled(unit);
        (y.re.to_fixed(0), y.im.to_fixed(0))
    }
}

#[cfg(test)]
mod tests {
    use crate::readout::Gamma;
    use crate::state::State;

    #[test]
    fn ohms_and_siemens_follow_the_reference() {
        // Γ = 1/2: Z = 3 R0
        let moments = State::<i32>::from_load(Gamma { re: 1 << 29, im: 0 }).moments();
        assert_eq!(moments.milliohms(50_000), (150_000, 0));
        assert_eq!(moments.microsiemens(50_000), (6_667, 0));
        assert_eq!(moments.milliohms(75_000), (225_000, 0));
        assert_eq!(moments.microsiemens(75_000), (4_444, 0));
    }

    #[test]
    fn open_and_short_circuits_are_told_apart() {
        let open = State::<i32>::from_load(Gamma::OPEN).moments();
        assert_eq!(open.milliohms(50_000), (i32::MAX, 0));
        assert_eq!(open.microsiemens(50_000), (0, 0));
        let short = State::<i32>::from_load(Gamma::SHORT).moments();
        assert_eq!(short.milliohms(50_000), (0, 0));
        assert_eq!(short.microsiemens(50_000), (i32::MAX, 0));
    }

    /// D. M. Pozar, Microwave Engineering, 4th ed., Example 2.3 (from memory): 100 + j50 ohm on
    /// 50 ohm has YL = 0.0080 − j0.0040 S.
    #[test]
    fn a_published_load_has_its_admittance() {
        // Γ = (1 + j)/(3 + j) = 0.4 + j0.2
        let load = Gamma {
            re: 429_496_730,
            im: 214_748_365,
        };
        let moments = State::<i32>::from_load(load).moments();
        assert_eq!(moments.milliohms(50_000), (100_000, 50_000));
        assert_eq!(moments.microsiemens(50_000), (8_000, -4_000));
    }
}

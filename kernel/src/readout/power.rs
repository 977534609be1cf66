//! Powers along a chain: transducer gain and efficiency.

use super::Moments;
use crate::chain::Resolved;
use crate::immittance::Immittance;
use crate::real::Real;
use crate::scalar::Scalar;
use crate::state::State;
use crate::walk::Walk;
use crate::word::Word;

/// The word of caution that every readout of voltage, current or power carries.
macro_rules! caution {
    () => {
        "**Caution:** RF power burns, high voltage kills, and fields have exposure limits. A figure \
         is no proof that hardware is safe: follow local codes and leave the work to those \
         licensed for it."
    };
}
pub(super) use caution;

impl Moments {
    /// Re v·i*, the power that passes this point towards the load, in units that all states of one
    /// walk share.
    ///
    /// Rounded once. The words' own rounding moves it, relative to itself, by about 2^(5−W) times
    /// the standing wave ratio at this point for each step that the walk has taken: with total
    /// reflection, what is left of the power is noise.
    ///
    #[doc = caution!()]
    #[inline]
    pub fn power(&self) -> Scalar {
        Scalar::from_i64(self.active, self.exponent)
    }

    /// |v + i|²/4, the power available from the source of R0 that keeps up this state, in units
    /// that all states of one walk share. Rounded once.
    ///
    #[doc = caution!()]
    #[inline]
    pub fn available(&self) -> Scalar {
        Scalar::from_i64(self.sum_square(), self.exponent - 2)
    }

    /// Transducer gain: power into the load over power available from a source of R0 at the input,
    /// 4 Re v·i* of the load over |v + i|² of the input.
    ///
    /// `self` is the state at the input, `load` the one that its walk began with. The readout's
    /// relative error is within 2^-29. [`Scalar::decibels`] makes it a level.
    ///
    #[doc = caution!()]
    #[inline]
    pub fn transducer_gain(&self, load: &Self) -> Scalar {
        load.power().times(self.available().reciprocal())
    }

    /// Efficiency: power at a point nearer the load over power at this one; zero where no power
    /// goes in. The readout's relative error is within 2^-29.
    ///
    #[doc = caution!()]
    #[inline]
    pub fn efficiency(&self, nearer_load: &Self) -> Scalar {
        if self.active <= 0 {
            return Scalar::ZERO;
        }
        nearer_load.power().times(self.power().reciprocal())
    }
}

impl<W: Word, const N: usize> Resolved<Immittance<W>, N> {
    /// The efficiency of every stage into this load, the last stage's first; see
    /// [`Moments::efficiency`]. Their product is that of the chain.
    ///
    #[doc = caution!()]
    #[inline]
    pub fn efficiencies(&self, load: State<W>) -> impl Iterator<Item = Scalar> {
        let (mut state, mut nearer_load) = (load, load.moments());
        self.steps().iter().rev().map(move |step| {
            state.pass(step);
            let here = state.moments();
            let efficiency = here.efficiency(&nearer_load);
            nearer_load = here;
            efficiency
        })
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::readout::Gamma;
    use crate::testing::circuit::{Circuit, Part, circuit, gamma, line, load, pair, series, shunt};
    use crate::testing::value;
    use crate::word::Bits;
    use num_complex::Complex64;
    use proptest::prelude::*;

    fn check<W: Word>(circuit: &Circuit, load: Gamma) {
        let point = circuit.words::<W>();
        let nodes = circuit.nodes::<W>(pair(load));
        let start = State::<W>::from_load(load);
        let states: Vec<_> = point.nodes(start).map(|state| state.moments()).collect();
        assert_eq!(states.len(), nodes.len());
        for (state, node) in states.iter().zip(&nodes) {
            let (power, words) = node.power();
            let limit = words + power.abs() * 2.0_f64.powi(-30);
            let error = (value(state.power()) - power).abs();
            assert!(error <= limit, "{error:e} {limit:e} {circuit:?} {load:?}");
        }
        let input = states.last().unwrap();
        let ((power, power_error), (sum, sum_error)) =
            (nodes[0].power(), nodes.last().unwrap().sum());
        let exact = 4.0 * power / sum.norm_sqr();
        let gain = value(input.transducer_gain(&states[0]));
        let least = (sum.norm() - sum_error).max(0.0).powi(2);
        let limit = 4.0 * (power + power_error) / least - exact + exact * 2.0_f64.powi(-28);
        assert!(
            (gain - exact).abs() <= limit,
            "{gain} {exact} {limit:e} {circuit:?}"
        );

        // one after the other, the last stage first, as the ratio of neighbours
        let efficiencies: Vec<_> = point.efficiencies(start).collect();
        for (efficiency, ends) in efficiencies.iter().zip(states.windows(2)) {
            if value(ends[1].power()) > 0.0 {
                let exact = value(ends[0].power()) / value(ends[1].power());
                let error = (value(*efficiency) - exact).abs();
                assert!(error <= exact.abs() * 2.0_f64.powi(-29), "{efficiency:?}");
            } else {
                assert_eq!(*efficiency, Scalar::ZERO);
            }
        }
        assert_eq!(efficiencies.len() + 1, states.len());
    }

    proptest! {
        #[test]
        fn powers_agree_with_the_states_of_the_matrices(circuit in circuit(), load in load()) {
            check::<i16>(&circuit, load);
            check::<Bits<24>>(&circuit, load);
            check::<i32>(&circuit, load);
        }
    }

    fn matched_gain<W: Word>(parts: &[Part]) -> f64 {
        let start = State::<W>::from_load(Gamma::MATCHED);
        let input = Circuit::new(parts).words::<W>().walk(start).moments();
        decibels(input.transducer_gain(&start.moments()))
    }

    fn decibels(ratio: Scalar) -> f64 {
        f64::from(ratio.decibels().bits()) / 65_536.0
    }

    /// Per rounded step 2^(5−W) of a wave, 8.686 dB per neper, and one rounding to 2^-16 dB.
    fn limit<W: Word>(steps: f64) -> f64 {
        8.686 * steps * (2.0_f64.powi(5 - W::BITS as i32) + 2.0_f64.powi(-28)) + 0.51 / 65_536.0
    }

    /// T and π pads of 50 ohm: common attenuator tables (from memory), but those of 10 dB after
    /// T. R. Kuphaldt, Lessons in Electric Circuits, Vol. III, ch. 1. Ohms as printed, with the
    /// level that these give; half a unit of their last places moves it by 0.01 dB at most.
    #[test]
    fn published_pads_have_their_loss() {
        fn check<W: Word>() {
            for (level, arm, middle) in [
                (3.0, 8.55, 141.9),
                (6.0, 16.61, 66.93),
                (10.0, 25.97, 35.14),
                (20.0, 40.91, 10.10),
            ] {
                let arm = series(arm / 50.0, 0.0);
                let gain = matched_gain::<W>(&[arm, shunt(50.0 / middle, 0.0), arm]);
                assert!(
                    (gain + level).abs() <= 0.01 + limit::<W>(3.0),
                    "T {level}: {gain}"
                );
            }
            for (level, side, through) in [
                (3.0, 292.4, 17.61),
                (6.0, 150.5, 37.35),
                (10.0, 96.25, 71.15),
                (20.0, 61.11, 247.5),
            ] {
                let side = shunt(50.0 / side, 0.0);
                let gain = matched_gain::<W>(&[side, series(through / 50.0, 0.0), side]);
                assert!(
                    (gain + level).abs() <= 0.01 + limit::<W>(3.0),
                    "π {level}: {gain}"
                );
            }
        }
        check::<i16>();
        check::<Bits<24>>();
        check::<i32>();
    }

    /// R0 in shunt loses 3.52 dB: D. M. Pozar, Microwave Engineering, 4th ed., Table 4.2 (from
    /// memory), 20 log10 (3/2).
    #[test]
    fn one_resistor_has_its_loss() {
        let exact = -20.0 * 1.5_f64.log10();
        assert!((matched_gain::<i32>(&[shunt(1.0, 0.0)]) - exact).abs() <= limit::<i32>(1.0));
        assert!((matched_gain::<i16>(&[series(1.0, 0.0)]) - exact).abs() <= limit::<i16>(1.0));
    }

    /// Insertion loss of the maximally flat and the equal-ripple low-pass, G. L. Matthaei, L. Young
    /// and E. M. T. Jones, Microwave Filters, Impedance-Matching Networks, and Coupling
    /// Structures, Sec. 4.03 (from memory): 10 log10 (1 + w^6) and 10 log10 (1 + ε² T5²(w)), with
    /// prototype values g of n = 3 and of n = 5, 0.5 dB.
    #[test]
    fn prototype_filters_have_their_insertion_loss() {
        fn ladder(g: &[f64], w: f64) -> Vec<Part> {
            let part = |(k, g): (usize, &f64)| {
                if k % 2 == 0 {
                    shunt(0.0, w * g)
                } else {
                    series(0.0, w * g)
                }
            };
            g.iter().enumerate().map(part).collect()
        }
        let check = |g: &[f64], w: f64, exact: f64, printed: f64| {
            let gain = matched_gain::<i32>(&ladder(g, w));
            assert!(
                (gain + exact).abs() <= printed + limit::<i32>(g.len() as f64),
                "{w}: {gain} {exact}"
            );
        };
        for w in [0.5_f64, 0.9, 1.0, 1.1, 1.5, 2.0, 3.0, 5.0] {
            let exact = 10.0 * (1.0 + w.powi(6)).log10();
            check(&[1.0, 2.0, 1.0], w, exact, 0.0);
        }
        let ripple = 10.0_f64.powf(0.05) - 1.0;
        for w in [0.3_f64, 0.8, 1.0, 1.05, 1.2, 1.5, 2.0, 3.0] {
            let polynomial = 16.0 * w.powi(5) - 20.0 * w.powi(3) + 5.0 * w;
            let exact = 10.0 * (1.0 + ripple * polynomial.powi(2)).log10();
            // g as printed: half a unit of each fourth decimal moves the level by 0.002 dB at most
            check(&[1.7058, 1.2296, 2.5408, 1.2296, 1.7058], w, exact, 0.002);
        }
    }

    /// The ARRL Antenna Book, 20th ed., ch. 24 (from memory): 150 ft at 0.795 dB per 100 ft with an
    /// SWR of 4 at the load lose 2.12 dB in all, 0.93 dB more than when matched.
    #[test]
    fn a_mismatched_line_has_its_published_loss() {
        let matched = 0.795 * 1.5;
        let cable = line(1.0, 2.3, matched / 8.685_889_638);
        for degrees in (0..360).step_by(30) {
            let reflection = Complex64::from_polar(0.6, f64::from(degrees).to_radians());
            let start = State::<i32>::from_load(gamma(reflection));
            let point = Circuit::new(&[cable]).words::<i32>();
            let efficiency = point.efficiencies(start).next().unwrap();
            let loss = -decibels(efficiency);
            assert!((loss - 2.12).abs() <= 0.005, "{loss}");
            assert!((loss - matched - 0.93).abs() <= 0.005, "{loss}");
        }
    }

    /// Without loss every watt arrives, and the gain is what is not reflected.
    #[test]
    fn lossless_chains_lose_nothing() {
        let parts = [series(0.0, 1.3), shunt(0.0, 0.7), line(1.5, 0.3, 0.0)];
        let start = State::<i32>::from_load(gamma(Complex64::new(0.3, -0.5)));
        let point = Circuit::new(&parts).words::<i32>();
        let input = point.walk(start).moments();
        for efficiency in point.efficiencies(start) {
            assert!(
                decibels(efficiency).abs() <= limit::<i32>(5.0),
                "{efficiency:?}"
            );
        }
        let gain = decibels(input.transducer_gain(&start.moments()));
        let mismatch = f64::from(input.mismatch_loss().bits()) / 65_536.0;
        assert!(
            (gain + mismatch).abs() <= limit::<i32>(5.0),
            "{gain} {mismatch}"
        );
    }
}

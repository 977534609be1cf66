//! Peak voltage and current along a chain.

use super::Moments;
use super::power::caution;
use crate::real::Real;
use crate::scalar::Scalar;

/// A source of R0 at the input, which turns the states of one walk into volts and amperes.
///
/// A source whose forward wave carries the power P into R0 has an open-circuit voltage of
/// √(8·P·R0) peak. It stands over R0 + Z at the input, where a walk has v + i, so that the scale is
/// √(8·P·R0) / |v + i| volts per unit of v, and over R0 amperes per unit of i. The peak is that of
/// the carrier's sine; with modulation, P is the peak envelope power.
///
/// ```
/// use stagebits_kernel::{Drive, Gamma, State};
///
/// // 100 W into 50 ohm: 100 V and 2 A
/// let matched = State::<i32>::from_load(Gamma::MATCHED).moments();
/// let drive = Drive::new(&matched, 100_000, 50_000);
/// assert_eq!(drive.millivolts(&matched), 100_000);
/// assert_eq!(drive.microamperes(&matched), 2_000_000);
/// ```
///
#[doc = caution!()]
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Drive {
    /// Square millivolts per unit of |v|².
    voltage: Scalar,
    /// Square microamperes per unit of |i|².
    current: Scalar,
}

impl Drive {
    /// The source for this state at the input, with a forward power in milliwatts and R0 in
    /// milliohms, which must not be zero.
    #[inline]
    pub fn new(input: &Moments, forward_milliwatts: u32, reference_milliohms: u32) -> Self {
        // 8 / |v + i|² is 2 / available; mW · mΩ = (mV)², and mW / mΩ = A² = 10^12 (µA)²
        let power =
            Scalar::from_i64(forward_milliwatts as i64, 1).times(input.available().reciprocal());
        let reference = Scalar::from_i64(reference_milliohms as i64, 0);
        Self {
            voltage: power.times(reference),
            current: power
                .times(reference.reciprocal())
                .times(Scalar::from_i64(1_000_000_000_000, 0)),
        }
    }

    /// Peak voltage at a node of the same walk, in millivolts.
    ///
    /// Rounded to the nearest after a relative error within 2^-28; saturates at the end of `i32`,
    /// 2.1 MV.
    ///
    #[doc = caution!()]
    #[inline]
    pub fn millivolts(&self, node: &Moments) -> u32 {
        root_of(node.voltage, node.exponent, self.voltage)
    }

    /// Peak current at a node of the same walk, in microamperes.
    ///
    /// Rounded to the nearest after a relative error within 2^-28; saturates at the end of `i32`,
    /// 2147 A.
    ///
    #[doc = caution!()]
    #[inline]
    pub fn microamperes(&self, node: &Moments) -> u32 {
        root_of(node.current, node.exponent, self.current)
    }
}

/// √(square · 2^exponent · scale) to the nearest integer.
#[inline]
fn root_of(square: i64, exponent: i32, scale: Scalar) -> u32 {
    let square = Scalar::from_i64(square, exponent).times(scale);
    square.square_root().to_fixed(0) as u32
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::readout::Gamma;
    use crate::state::State;
    use crate::testing::circuit::{Circuit, circuit, gamma, line, load, pair, series, shunt};
    use crate::word::{Bits, Word};
    use num_complex::Complex64;
    use proptest::prelude::*;

    /// Peak millivolts and microamperes at every node, the load's first.
    fn stresses<W: Word>(
        circuit: &Circuit,
        load: Gamma,
        milliwatts: u32,
        milliohms: u32,
    ) -> Vec<(f64, f64)> {
        let point = circuit.words::<W>();
        let start = State::<W>::from_load(load);
        let drive = Drive::new(&point.walk(start).moments(), milliwatts, milliohms);
        let stress = |state: State<W>| {
            let node = state.moments();
            (
                drive.millivolts(&node).into(),
                drive.microamperes(&node).into(),
            )
        };
        point.nodes(start).map(stress).collect()
    }

    fn check<W: Word>(circuit: &Circuit, load: Gamma, milliwatts: u32, milliohms: u32) {
        let nodes = circuit.nodes::<W>(pair(load));
        let (sum, sum_error) = nodes.last().unwrap().sum();
        let (power, reference) = (f64::from(milliwatts) / 1e3, f64::from(milliohms) / 1e3);
        let source = (8.0 * power * reference).sqrt();
        let volts = source / sum.norm();
        // of the scale, from the words of the state at the input
        let relative = sum_error / (sum.norm() - sum_error).max(0.0) + 2.0_f64.powi(-28);
        let stresses = stresses::<W>(circuit, load, milliwatts, milliohms);
        assert_eq!(stresses.len(), nodes.len());
        for ((millivolts, microamperes), node) in stresses.into_iter().zip(nodes) {
            for (read, exact, unit) in [
                (millivolts, node.pair[0].norm(), 1e3 * volts),
                (microamperes, node.pair[1].norm(), 1e6 * volts / reference),
            ] {
                let limit = (exact * relative + node.error * (1.0 + relative)) * unit + 0.5;
                let error = (read - exact * unit).abs();
                if exact * unit + limit < f64::from(i32::MAX) {
                    assert!(
                        error <= limit,
                        "{read} {error:e} {limit:e} {circuit:?} {load:?}"
                    );
                }
            }
        }
    }

    proptest! {
        #[test]
        fn stresses_agree_with_the_states_of_the_matrices(
            circuit in circuit(), load in load(), milliwatts in 1_u32.., milliohms in 1_000_u32..1_000_000,
        ) {
            check::<i16>(&circuit, load, milliwatts, milliohms);
            check::<Bits<24>>(&circuit, load, milliwatts, milliohms);
            check::<i32>(&circuit, load, milliwatts, milliohms);
        }
    }

    fn assert_near(read: f64, printed: f64, half_unit: f64) {
        assert!((read - printed).abs() <= half_unit, "{read} for {printed}");
    }

    /// RMS volts and amperes of a peak in millivolts and microamperes.
    fn rms((millivolts, microamperes): (f64, f64)) -> (f64, f64) {
        let root = 2.0_f64.sqrt();
        (millivolts / 1e3 / root, microamperes / 1e6 / root)
    }

    /// L network from 50 to 1250 ohm at 100 W: Q = √(1250/50 − 1) = 4.90, series reactance 50·Q,
    /// shunt reactance 1250/Q (C. Bowick, RF Circuit Design, ch. 4, from memory). The series part
    /// carries 1.41 A, the shunt part bears 353.6 V, both RMS.
    #[test]
    fn an_l_network_bears_its_closed_form() {
        let q = 24.0_f64.sqrt();
        let circuit = Circuit::new(&[series(0.0, q), shunt(0.0, q / 25.0)]);
        // 1250 ohm on 50: Γ = 24/26
        let load = gamma((24.0 / 26.0).into());
        let nodes = stresses::<i32>(&circuit, load, 100_000, 50_000);
        let [at_load, between, at_input] = nodes[..] else {
            panic!("{nodes:?}")
        };
        assert_near(rms(at_load).0, 353.6, 0.05);
        assert_near(rms(between).0, 353.6, 0.05);
        assert_near(rms(between).1, 1.41, 0.005);
        assert_near(rms(at_input).1, 1.41, 0.005);
        // peaks in full: 500 V and 0.4 A at the load, 2 A through the coil, 100 V at the input. The
        // largest relative error is that of the load's i = 2/26 from words of 2^-29
        assert_near(at_load.0, 500e3, 1.0);
        assert_near(at_load.1, 400e3, 1.0);
        assert_near(between.1, 2e6, 1.0);
        assert_near(at_input.0, 100e3, 1.0);
        check::<i16>(&circuit, load, 100_000, 50_000);
        check::<Bits<24>>(&circuit, load, 100_000, 50_000);
    }

    /// The ARRL Antenna Book, 20th ed., ch. 24 (from memory): a lossless 50 ohm line that delivers
    /// 1500 W at an SWR of 3 has at most √(P·Z0·S) = 474 V and √(P·S/Z0) = 9.49 A, against 273.9 V
    /// and 5.48 A when matched, all RMS; 387.3 V peak.
    #[test]
    fn a_line_with_standing_waves_bears_its_published_maxima() {
        // 2000 W forward, of which a quarter comes back
        let quarter = Circuit::new(&[line(1.0, 0.25, 0.0)]);
        let load = gamma(Complex64::new(0.5, 0.0));
        let nodes = stresses::<i32>(&quarter, load, 2_000_000, 50_000);
        assert_near(rms(nodes[0]).0, 474.0, 0.5);
        assert_near(rms(nodes[1]).1, 9.49, 0.005);
        let matched = stresses::<i32>(&quarter, Gamma::MATCHED, 1_500_000, 50_000);
        for node in matched {
            assert_near(node.0 / 1e3, 387.3, 0.05);
            assert_near(rms(node).0, 273.9, 0.05);
            assert_near(rms(node).1, 5.48, 0.005);
        }
    }

    #[test]
    fn open_and_short_circuits_double_the_wave() {
        let circuit = Circuit::new(&[series(0.0, 0.0)]);
        // 1 W into 50 ohm: a wave of 10 V and 0.2 A peak
        let open = stresses::<i16>(&circuit, Gamma::OPEN, 1_000, 50_000);
        assert_eq!(open[0], (20_000.0, 0.0));
        let short = stresses::<i16>(&circuit, Gamma::SHORT, 1_000, 50_000);
        assert_eq!(short[0], (0.0, 400_000.0));
    }

    #[test]
    fn what_is_out_of_range_saturates() {
        let open = State::<i32>::from_load(Gamma::OPEN).moments();
        let drive = Drive::new(&open, u32::MAX, u32::MAX);
        assert_eq!(drive.millivolts(&open), i32::MAX as u32);
        assert_eq!(Drive::new(&open, 0, 50_000).millivolts(&open), 0);
    }
}

//! Return loss and mismatch loss.

use super::{Decibels, Moments};
use crate::real::{Complex, Real};
use crate::scalar::Scalar;

impl Moments {
    /// Return loss, −20 log10 |Γ|: power available over power that comes back.
    ///
    /// Zero at total reflection, below zero for an active load, [`Decibels::MAX`] at Γ = 0. Within
    /// 0.51 · 2^-16 dB of that of the state.
    #[inline]
    pub fn return_loss(&self) -> Decibels {
        let reflected = self.difference_square();
        if reflected == 0 {
            return Decibels::MAX;
        }
        let available = Scalar::from_i64(self.sum_square(), 0);
        let Complex { re: ratio, .. } = Self::ratio(available, Scalar::ZERO, reflected);
        ratio.decibels()
    }

    /// Mismatch loss, −10 log10 (1 − |Γ|²): power available over power taken.
    ///
    /// 1 − |Γ|² is 4 Re v·i* / |v + i|², so that nothing cancels. [`Decibels::MAX`] for a state
    /// that takes no power. Within 0.51 · 2^-16 dB of that of the state.
    #[inline]
    pub fn mismatch_loss(&self) -> Decibels {
        if self.active <= 0 {
            return Decibels::MAX;
        }
        let available = Scalar::from_i64(self.sum_square(), -2);
        let taken = Scalar::from_i64(self.active, 0);
        available.times(taken.reciprocal()).decibels()
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::readout::Gamma;
    use crate::state::State;
    use crate::testing::state_of_words;
    use crate::word::{Bits, Word};
    use proptest::prelude::*;

    fn moments<W: Word>(magnitude: f64) -> Moments {
        let re = (magnitude * f64::from(1 << 30)).round() as i32;
        State::<W>::from_load(Gamma { re, im: 0 }).moments()
    }

    fn decibels(level: Decibels) -> f64 {
        f64::from(level.bits()) / 65_536.0
    }

    /// Standard conversion table, after Reference Data for Engineers, 9th ed., ch. 29 (from
    /// memory): SWR, return loss and mismatch loss in dB as printed.
    const TABLE: [(f64, f64, f64); 11] = [
        (1.1, 26.44, 0.010),
        (1.2, 20.83, 0.036),
        (1.3, 17.69, 0.075),
        (1.4, 15.56, 0.122),
        (2.5, 7.36, 0.881),
        (3.0, 6.02, 1.249),
        (4.0, 4.44, 1.938),
        (5.0, 3.52, 2.553),
        (6.0, 2.92, 3.100),
        (8.0, 2.18, 4.033),
        (10.0, 1.74, 4.807),
    ];

    /// The load's words are rounded to 2^(2−W): 2^(3−W)/|Γ| of |Γ|, 8.686 dB per neper, and twice
    /// |Γ|/(1 − |Γ|²) of that in the power taken.
    fn check_table<W: Word>() {
        for (swr, return_loss, mismatch_loss) in TABLE {
            let magnitude = (swr - 1.0) / (swr + 1.0);
            let state = moments::<W>(magnitude);
            let rounded = 8.686 * 2.0_f64.powi(3 - W::BITS as i32);
            let error = (decibels(state.return_loss()) - return_loss).abs();
            assert!(error <= 0.005 + rounded / magnitude, "{swr}: {error}");
            let error = (decibels(state.mismatch_loss()) - mismatch_loss).abs();
            let taken = 1.0 - magnitude * magnitude;
            assert!(
                error <= 0.0005 + rounded * magnitude / taken,
                "{swr}: {error}"
            );
            let printed = f64::from(state.swr().bits()) / 65_536.0;
            let slope = 2.0 / (1.0 - magnitude).powi(2);
            assert!((printed - swr).abs() <= 1e-5 + slope * 2.0_f64.powi(3 - W::BITS as i32));
        }
    }

    #[test]
    fn published_table_of_losses_holds() {
        check_table::<i16>();
        check_table::<Bits<24>>();
        check_table::<i32>();
    }

    #[test]
    fn ends_of_the_range_are_what_they_should_be() {
        for load in [Gamma::OPEN, Gamma::SHORT, Gamma { re: 0, im: 1 << 30 }] {
            let state = State::<i32>::from_load(load).moments();
            assert_eq!(state.return_loss().bits(), 0);
            assert_eq!(state.mismatch_loss(), Decibels::MAX);
        }
        let matched = State::<i32>::from_load(Gamma::MATCHED).moments();
        assert_eq!(matched.return_loss(), Decibels::MAX);
        assert_eq!(matched.mismatch_loss().bits(), 0);
        // |Γ| = 2: more comes back than went out
        let active = moments::<i32>(1.999);
        assert!((decibels(active.return_loss()) + 20.0 * 1.999_f64.log10()).abs() < 2e-5);
        assert_eq!(active.mismatch_loss(), Decibels::MAX);
    }

    proptest! {
        /// Against |Γ| from exact integers, and against each other: |Γ|² + (1 − |Γ|²) = 1.
        #[test]
        fn losses_agree_with_their_definitions(words: [i32; 4]) {
            let state = state_of_words::<i32>(words);
            let ([a, b], [c, d], _) = state.words();
            let [a, b, c, d] = [a, b, c, d].map(i128::from);
            let sum = ((a + c).pow(2) + (b + d).pow(2)) as f64;
            let difference = ((a - c).pow(2) + (b - d).pow(2)) as f64;
            let taken = (4 * (a * c + b * d)) as f64;
            let moments = state.moments();
            let limit = 0.51 / 65_536.0;
            if sum > 0.0 && difference > 0.0 {
                let exact = 10.0 * (sum / difference).log10();
                prop_assert!((decibels(moments.return_loss()) - exact).abs() <= limit);
            }
            if taken > 0.0 {
                let exact = 10.0 * (sum / taken).log10();
                prop_assert!((decibels(moments.mismatch_loss()) - exact).abs() <= limit);
            } else {
                prop_assert_eq!(moments.mismatch_loss(), Decibels::MAX);
            }
        }
    }
}

//! Readouts: reflection coefficient, impedance and standing wave ratio of a state.

use crate::real::{Complex, Real};
use crate::scalar::Scalar;
use crate::state::State;
use crate::word::Word;

/// A reflection coefficient referred to R0, both parts in 2^-30.
///
/// Loads go in and results come out in this format, whatever the word length. Parts reach ±2, so
/// that an active load is still a number.
#[derive(Clone, Copy, PartialEq, Eq, Debug, Default)]
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
}

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

/// |v|², |i|² and v·i* of a state, exact, in units that cancel in every ratio.
///
/// With these, Γ = (|v|² − |i|² + 2j Im) / (|v|² + |i|² + 2 Re): what the sum v + i would need in
/// headroom is not needed.
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
pub struct Moments {
    voltage: i64,
    current: i64,
    active: i64,
    reactive: i64,
}

impl Moments {
    #[inline]
    fn ratio(re: Scalar, im: Scalar, of: i64) -> Complex<Scalar> {
        Complex { re, im }.scaled(Scalar::from_i64(of, 0).reciprocal())
    }

    /// Γ referred to R0; saturates at ±2.
    ///
    /// Four roundings of a scalar and one to 2^-30: for |Γ| ≤ 1 each part is within 2.5 · 2^-30 of
    /// that of the state.
    #[inline]
    pub fn gamma(&self) -> Gamma {
        let sum = self.voltage + self.current + 2 * self.active;
        let gamma = Self::ratio(
            Scalar::from_i64(self.voltage - self.current, 0),
            Scalar::from_i64(self.reactive, 1),
            sum,
        );
        let fixed = |part: Scalar| part.to_fixed(Gamma::FRACTION_BITS as i32);
        Gamma {
            re: fixed(gamma.re),
            im: fixed(gamma.im),
        }
    }

    /// Z/R0, relative error of each part within 2^-29; a very large number for an open circuit.
    #[inline]
    pub fn impedance(&self) -> Complex<Scalar> {
        Self::ratio(
            Scalar::from_i64(self.active, 0),
            Scalar::from_i64(self.reactive, 0),
            self.current,
        )
    }

    /// R and X in milliohms for a reference resistance in milliohms, rounded to the nearest;
    /// saturates at the ends of `i32`.
    #[inline]
    pub fn milliohms(&self, reference_milliohms: u32) -> (i32, i32) {
        let z = self
            .impedance()
            .scaled(Scalar::from_i64(reference_milliohms as i64, 0));
        (z.re.to_fixed(0), z.im.to_fixed(0))
    }

    /// The standing wave ratio, (|v+i| + |v−i|) / (|v+i| − |v−i|).
    ///
    /// Taken as (|v|² + |i|² + |v+i|·|v−i|) / (2 Re v·i*), whose denominator is exact and whose
    /// terms are positive, so that nothing cancels at either end.
    #[inline]
    pub fn swr(&self) -> Swr {
        if self.active <= 0 {
            return Swr::INFINITE;
        }
        let sum = self.voltage + self.current;
        let forward = Scalar::from_i64(sum + 2 * self.active, 0);
        let reflected = Scalar::from_i64(sum - 2 * self.active, 0);
        let ratio = Scalar::from_i64(sum, 0)
            .plus(forward.times(reflected).square_root())
            .times(Scalar::from_i64(self.active, 1).reciprocal());
        let fixed = ratio.to_fixed(Swr::FRACTION_BITS as i32);
        Swr(fixed.max(1 << Swr::FRACTION_BITS) as u32)
    }
}

impl<W: Word> State<W> {
    /// Squares and products of the state, from which every ratio is read.
    #[inline]
    pub fn moments(&self) -> Moments {
        use crate::word::DoubleWord;
        let dot = |a: [W; 2], b: [W; 2]| (a[0].times(b[0]) + a[1].times(b[1])).to_i64();
        let [v_re, v_im] = self.v;
        let [i_re, i_im] = self.i;
        Moments {
            voltage: dot(self.v, self.v),
            current: dot(self.i, self.i),
            active: dot(self.v, self.i),
            reactive: (v_im.times(i_re) - v_re.times(i_im)).to_i64(),
        }
    }

    /// Γ referred to R0; see [`Moments::gamma`].
    #[inline]
    pub fn gamma(&self) -> Gamma {
        self.moments().gamma()
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use proptest::prelude::*;

    fn value(s: Scalar) -> f64 {
        f64::from(s.mantissa()) * 2.0_f64.powi(s.exponent())
    }

    fn state<W: Word>(words: [i32; 4]) -> State<W> {
        let word = |word: i32| W::from_i32((word >> (33 - W::BITS)).clamp(-W::LIMIT, W::LIMIT - 1));
        let [a, b, c, d] = words.map(word);
        State {
            v: [a, b],
            i: [c, d],
            exponent: 0,
        }
    }

    fn check<W: Word>(words: [i32; 4]) {
        let state = state::<W>(words);
        let (v, i, _) = state.words();
        let [v_re, v_im, i_re, i_im] = [v[0], v[1], i[0], i[1]].map(f64::from);
        let moments = state.moments();
        let (a, b) = (v_re * v_re + v_im * v_im, i_re * i_re + i_im * i_im);
        let (p, q) = (v_re * i_re + v_im * i_im, v_im * i_re - v_re * i_im);
        let sum = a + b + 2.0 * p;
        // away from Γ = ∞, where f64 itself cancels
        if p >= 0.0 && sum > 0.0 {
            let gamma = moments.gamma();
            let one = f64::from(1 << 30);
            assert!(
                (f64::from(gamma.re) - (a - b) / sum * one).abs() <= 2.5,
                "{words:?}"
            );
            assert!(
                (f64::from(gamma.im) - 2.0 * q / sum * one).abs() <= 2.5,
                "{words:?}"
            );
        }
        if b > 0.0 {
            let z = moments.impedance();
            let relative = 2.0_f64.powi(-29);
            // the numerators are exact integers that f64 may round
            let slack = (a * b).sqrt() / b * 1e-15;
            assert!((value(z.re) - p / b).abs() <= (p / b).abs() * relative + slack);
            assert!((value(z.im) - q / b).abs() <= (q / b).abs() * relative + slack);
        }
        if p > (a + b) * 1e-4 {
            let (forward, reflected) = (sum.sqrt(), (a + b - 2.0 * p).max(0.0).sqrt());
            let exact = (forward + reflected) / (forward - reflected) * 65_536.0;
            let swr = f64::from(moments.swr().bits());
            assert!((swr - exact).abs() <= 0.5 + exact * 1e-8, "{swr} {exact}");
        }
    }

    proptest! {
        #[test]
        fn readouts_agree_with_their_definitions(words: [i32; 4]) {
            check::<i32>(words);
            check::<i16>(words);
            check::<crate::word::Bits<24>>(words);
        }
    }

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
        }
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

    #[test]
    fn milliohms_follow_the_reference() {
        // Γ = 1/2: Z = 3 R0
        let state = State::<i32>::from_load(Gamma { re: 1 << 29, im: 0 });
        assert_eq!(state.moments().milliohms(50_000), (150_000, 0));
        assert_eq!(
            State::<i32>::from_load(Gamma::OPEN)
                .moments()
                .milliohms(50_000)
                .0,
            0
        );
    }
}

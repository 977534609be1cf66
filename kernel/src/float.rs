//! The same stages and the same walk over `f32` and `f64`.
//!
//! For cores with a floating-point unit, and to compare like with like. Mathematical functions
//! come from `libm`, so that these, too, give the same bits on every core.

use crate::chain::{Chain, Resolved};
use crate::frequency::Frequency;
use crate::real::{Complex, Real};
use crate::two_port::TwoPort;
use crate::walk::Walk;

macro_rules! real {
    ($float:ty, $sqrt:path, $sin:path, $cos:path, $sinh:path, $cosh:path, $scalbn:path, $pi_2:expr) => {
        impl Real for $float {
            const ZERO: Self = 0.0;
            const ONE: Self = 1.0;
            // 2^60, whose square is in range, and which moves Γ by less than the last digit
            const HUGE: Self = (1_u64 << 60) as Self;
            #[inline]
            fn from_hertz(hertz: u32) -> Self {
                hertz as $float
            }
            #[inline(always)]
            fn times(self, other: Self) -> Self {
                self * other
            }
            #[inline(always)]
            fn plus(self, other: Self) -> Self {
                self + other
            }
            #[inline(always)]
            fn negated(self) -> Self {
                -self
            }
            #[inline]
            fn times_power_of_two(self, power: i32) -> Self {
                if power == 1 {
                    self + self
                } else {
                    $scalbn(self, power)
                }
            }
            #[inline]
            fn reciprocal(self) -> Self {
                1.0 / self
            }
            #[inline]
            fn square_root(self) -> Self {
                if self > 0.0 { $sqrt(self) } else { 0.0 }
            }
            #[inline]
            fn sine_cosine(angle: i64) -> (Self, Self) {
                // 2^63, exact in either type
                let angle = angle as $float * ($pi_2 / 9_223_372_036_854_775_808.0);
                ($sin(angle), $cos(angle).max(0.0))
            }
            #[inline]
            fn is_near_one(self) -> bool {
                (0.5..2.0).contains(&self)
            }
            #[inline]
            fn hyperbolic(self) -> (Self, Self) {
                ($sinh(self), $cosh(self))
            }
            #[inline(always)]
            fn is_zero(self) -> bool {
                self == 0.0
            }
            // a number has an exponent of its own, so that a unit is of no use
            type Term = Self;
            #[inline(always)]
            fn unit(self) -> i32 {
                0
            }
            #[inline(always)]
            fn term(self, _: i32) -> Self {
                self
            }
            #[inline(always)]
            fn coarser(term: Self, _: u32) -> Self {
                term
            }
            #[inline(always)]
            fn from_term(term: Self, _: i32) -> Self {
                term
            }
        }
    };
}

real!(
    f32,
    libm::sqrtf,
    libm::sinf,
    libm::cosf,
    libm::sinhf,
    libm::coshf,
    libm::scalbnf,
    core::f32::consts::FRAC_PI_2
);
real!(
    f64,
    libm::sqrt,
    libm::sin,
    libm::cos,
    libm::sinh,
    libm::cosh,
    libm::scalbn,
    core::f64::consts::FRAC_PI_2
);

/// Voltage v and current R0·i in floating point.
#[derive(Clone, Copy, PartialEq, Debug)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct FloatState<R> {
    /// Voltage.
    pub v: Complex<R>,
    /// Current times R0.
    pub i: Complex<R>,
}

impl<R: Real> FloatState<R> {
    /// The state v = 1 + Γ, i = 1 − Γ at a load with this reflection coefficient.
    #[inline]
    pub fn from_load(load: Complex<R>) -> Self {
        Self {
            v: Complex {
                re: R::ONE.plus(load.re),
                im: load.im,
            },
            i: Complex {
                re: R::ONE.minus(load.re),
                im: load.im.negated(),
            },
        }
    }

    /// Γ = (v − i) / (v + i) referred to R0.
    #[inline]
    pub fn gamma(&self) -> Complex<R> {
        let (v, i) = (self.v, self.i);
        let difference = Complex {
            re: v.re.minus(i.re),
            im: v.im.minus(i.im),
        };
        times(difference, v.plus(i).reciprocal())
    }
}

/// Complex product; parts of the first factor that are zero cost nothing.
#[inline(always)]
fn times<R: Real>(z: Complex<R>, w: Complex<R>) -> Complex<R> {
    if z.re.is_zero() {
        return Complex {
            re: z.im.times(w.im).negated(),
            im: z.im.times(w.re),
        };
    }
    if z.im.is_zero() {
        return w.scaled(z.re);
    }
    Complex {
        re: z.re.times(w.re).minus(z.im.times(w.im)),
        im: z.re.times(w.im).plus(z.im.times(w.re)),
    }
}

impl<R: Real> Walk<Complex<R>> for FloatState<R> {
    #[inline]
    fn series(&mut self, z: &Complex<R>) {
        self.v = self.v.plus(times(*z, self.i));
    }
    #[inline]
    fn shunt(&mut self, y: &Complex<R>) {
        self.i = self.i.plus(times(*y, self.v));
    }
    #[inline]
    fn stretch(&mut self, ratio: &Complex<R>, inverse: &Complex<R>) {
        self.v = self.v.scaled(ratio.re);
        self.i = self.i.scaled(inverse.re);
    }
    #[inline]
    fn two_port(&mut self, two_port: &TwoPort<R>) {
        let TwoPort { a, b, c, d } = *two_port;
        let (v, i) = (self.v, self.i);
        self.v = times(a, v).plus(times(b, i));
        self.i = times(c, v).plus(times(d, i));
    }
    #[inline]
    fn adjugate(two_port: &TwoPort<R>) -> TwoPort<R> {
        two_port.adjugate()
    }
    #[inline]
    fn turned(two_port: &TwoPort<R>) -> TwoPort<R> {
        two_port.turned()
    }
    #[inline]
    fn negated(z: &Complex<R>) -> Complex<R> {
        Complex {
            re: z.re.negated(),
            im: z.im.negated(),
        }
    }
}

impl<R: Real, const N: usize, const S: usize> Chain<R, N, S> {
    /// The chain at one frequency in floating point, with all steps of its banks off.
    #[inline]
    pub fn at_float(&self, frequency: &Frequency<R>) -> Resolved<Complex<R>, N> {
        self.at_float_state(frequency, &[])
    }

    /// The same with the banks in this state; see [`Chain::at_state`].
    #[inline]
    pub fn at_float_state(
        &self,
        frequency: &Frequency<R>,
        switches: &[u16],
    ) -> Resolved<Complex<R>, N> {
        self.resolve(frequency, switches, |step| step)
    }
}

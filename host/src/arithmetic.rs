//! The arithmetics that a firmware can use, behind one face, so that each meets the same points.

use num_complex::Complex;
use stagebits_kernel as kernel;
use stagebits_kernel::{FloatState, Frequency, Gamma, Immittance, Resolved, Scalar, State};
use stagebits_kernel::{Walk, Word};

use crate::constants::{self, CAPACITY, Constants};
use crate::plan::Switches;

/// A chain in some arithmetic, ready to be evaluated at any frequency.
pub trait Arithmetic: Sync {
    /// The chain at one frequency.
    type Point;
    /// Resolves the chain at one frequency, all steps of its banks off.
    fn at(&self, hertz: u32) -> Self::Point {
        self.at_state(hertz, &Switches::OFF)
    }
    /// Resolves the chain at one frequency with its banks in this state.
    fn at_state(&self, hertz: u32, switches: &Switches) -> Self::Point;
    /// Γ at the input for a load.
    fn gamma(point: &Self::Point, load: Gamma) -> Complex<f64>;
}

/// Block fixed point with words of type `W`.
pub struct Block<W> {
    /// The constants, each rounded to a word.
    pub stored: Constants<Scalar>,
    word: std::marker::PhantomData<W>,
}

impl<W: Word> Block<W> {
    /// The chain with its constants rounded to words of type `W`.
    pub fn new(exact: &Constants<f64>) -> Self {
        Self {
            stored: constants::rounded(exact, W::BITS),
            word: std::marker::PhantomData,
        }
    }
}

impl<W: Word> Arithmetic for Block<W> {
    type Point = Resolved<Immittance<W>, CAPACITY>;

    fn at_state(&self, hertz: u32, switches: &Switches) -> Self::Point {
        self.stored
            .at_state(&Frequency::new(hertz), &switches.words)
    }

    fn gamma(point: &Self::Point, load: Gamma) -> Complex<f64> {
        to_complex(point.walk(State::from_load(load)).gamma())
    }
}

/// The kernel's stages and walk in `f32`.
pub struct Single {
    chain: Constants<f32>,
}

impl Single {
    /// The chain with its constants rounded to `f32`.
    pub fn new(exact: &Constants<f64>) -> Self {
        Self {
            chain: constants::single(exact),
        }
    }
}

impl Arithmetic for Single {
    type Point = Resolved<kernel::Complex<f32>, CAPACITY>;

    fn at_state(&self, hertz: u32, switches: &Switches) -> Self::Point {
        self.chain
            .at_float_state(&Frequency::new(hertz), &switches.words)
    }

    fn gamma(point: &Self::Point, load: Gamma) -> Complex<f64> {
        let load = to_complex(load);
        let load = kernel::Complex {
            re: load.re as f32,
            im: load.im as f32,
        };
        let gamma = point.walk(FloatState::from_load(load)).gamma();
        Complex::new(f64::from(gamma.re), f64::from(gamma.im))
    }
}

/// The kernel's stages and walk in `f64`, with the constants as they are.
///
/// Not the reference: it walks the same equivalent circuits as the firmware. Where it leaves the
/// reference, an equivalent circuit or a constant is wrong, not a rounding.
pub struct Double {
    chain: Constants<f64>,
}

impl Double {
    /// The chain with these constants.
    pub fn new(exact: &Constants<f64>) -> Self {
        Self {
            chain: exact.clone(),
        }
    }
}

impl Arithmetic for Double {
    type Point = Resolved<kernel::Complex<f64>, CAPACITY>;

    fn at_state(&self, hertz: u32, switches: &Switches) -> Self::Point {
        self.chain
            .at_float_state(&Frequency::new(hertz), &switches.words)
    }

    fn gamma(point: &Self::Point, load: Gamma) -> Complex<f64> {
        let load = to_complex(load);
        let load = kernel::Complex {
            re: load.re,
            im: load.im,
        };
        let gamma = point.walk(FloatState::from_load(load)).gamma();
        Complex::new(gamma.re, gamma.im)
    }
}

/// A kernel Γ as a complex number; exact.
pub fn to_complex(gamma: Gamma) -> Complex<f64> {
    let unit = f64::from(1 << Gamma::FRACTION_BITS);
    Complex::new(f64::from(gamma.re) / unit, f64::from(gamma.im) / unit)
}

/// The kernel's Γ nearest to a complex number within ±2.
pub fn to_gamma(gamma: Complex<f64>) -> Gamma {
    let fixed = |part: f64| (part * f64::from(1 << Gamma::FRACTION_BITS)).round() as i32;
    Gamma {
        re: fixed(gamma.re),
        im: fixed(gamma.im),
    }
}

/// A block state's v and i in `f64`; exact.
pub fn state_values<W: Word>(state: &State<W>) -> (Complex<f64>, Complex<f64>) {
    let (v, i, exponent) = state.words();
    let unit = f64::from(exponent).exp2();
    let complex = |[re, im]: [i32; 2]| Complex::new(f64::from(re), f64::from(im)) * unit;
    (complex(v), complex(i))
}

/// Walks one stage after the other, giving every state from the load to the input.
pub fn states<W: Word>(
    point: &Resolved<Immittance<W>, CAPACITY>,
    load: Gamma,
) -> impl Iterator<Item = State<W>> {
    let mut state = State::from_load(load);
    std::iter::once(state).chain(point.steps().iter().rev().map(move |step| {
        state.pass(step);
        state
    }))
}

/// Calls a generic function with the word type of a length from 10 to 32 bits.
macro_rules! with_word {
    ($bits:expr, $function:ident($($argument:expr),*)) => {
        with_word!(@ $bits, $function($($argument),*),
            10 11 12 13 14 15 17 18 19 20 21 22 23 24 25 26 27 28 29 30 31)
    };
    (@ $bits:expr, $function:ident $arguments:tt, $($width:literal)*) => {
        match $bits {
            16 => $function::<i16> $arguments,
            $($width => $function::<::stagebits_kernel::Bits<$width>> $arguments,)*
            _ => $function::<i32> $arguments,
        }
    };
}
pub(crate) use with_word;

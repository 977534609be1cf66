//! The words of one frequency, made once and used by every stage.

use crate::real::Real;

/// A frequency in whole hertz with the powers of it that stages are made of.
#[derive(Clone, Copy, PartialEq, Debug)]
pub struct Frequency<R> {
    hertz: u32,
    value: R,
    inverse: R,
    root: R,
}

impl<R: Real> Frequency<R> {
    /// f, 1/f and √f, each rounded once.
    #[inline]
    pub fn new(hertz: u32) -> Self {
        let value = R::from_hertz(hertz);
        Self {
            hertz,
            value,
            inverse: value.reciprocal(),
            root: value.square_root(),
        }
    }

    /// The same with f, 1/f and √f converted as they are.
    pub fn map<S>(&self, mut convert: impl FnMut(R) -> S) -> Frequency<S> {
        Frequency {
            hertz: self.hertz,
            value: convert(self.value),
            inverse: convert(self.inverse),
            root: convert(self.root),
        }
    }

    /// The frequency in hertz.
    pub const fn hertz(&self) -> u32 {
        self.hertz
    }

    /// f in hertz.
    pub const fn value(&self) -> R {
        self.value
    }

    /// 1/f in seconds.
    pub const fn inverse(&self) -> R {
        self.inverse
    }

    /// √f in √Hz.
    pub const fn root(&self) -> R {
        self.root
    }
}

//! What tests share: scalars as `f64` and back, states of any words, circuits.

pub(crate) mod circuit;

use crate::scalar::Scalar;
use crate::state::State;
use crate::word::Word;

/// A scalar's value; exact.
pub(crate) fn value(s: Scalar) -> f64 {
    f64::from(s.mantissa()) * 2.0_f64.powi(s.exponent())
}

/// The scalar nearest to a number.
pub(crate) fn scalar(value: f64) -> Scalar {
    if value == 0.0 {
        return Scalar::ZERO;
    }
    let exponent = value.abs().log2().floor() as i32 - 40;
    Scalar::from_i64((value * 2.0_f64.powi(-exponent)).round() as i64, exponent)
}

/// A state whose words are the upper bits of these.
pub(crate) fn state_of_words<W: Word>(words: [i32; 4]) -> State<W> {
    let word = |word: i32| W::from_i32((word >> (33 - W::BITS)).clamp(-W::LIMIT, W::LIMIT - 1));
    let [a, b, c, d] = words.map(word);
    State {
        v: [a, b],
        i: [c, d],
        exponent: 0,
    }
}

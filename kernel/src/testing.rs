//! What tests share: scalars as `f64` and back, and states of any words.

use crate::scalar::Scalar;
use crate::state::State;
use crate::word::Word;

/// A scalar's value; exact.
pub(crate) fn value(s: Scalar) -> f64 {
    f64::from(s.mantissa()) * 2.0_f64.powi(s.exponent())
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

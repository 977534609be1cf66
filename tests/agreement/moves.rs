//! The multiplications of a walk, exact and in words, each with a bound on the words' error.

use num_complex::Complex;
use stagebits::reference::FrequencyPoint;
use stagebits_kernel as kernel;
use stagebits_kernel::{
    Frequency, Immittance, Real, Stage, Step, StubFunction, TwoPort, TwoPortWords, Walk, Word,
};

use crate::uncertain::Uncertain;

/// One multiplication of the walk, exact and in words.
#[derive(Clone, Copy, Debug)]
pub(crate) enum Move<W> {
    /// v ← v + z·i
    Series(Factor<W>),
    /// i ← i + y·v
    Shunt(Factor<W>),
    /// v ← n·v, i ← i/n
    Stretch(Factor<W>, Factor<W>),
    /// v and i by a matrix of determinant 1
    TwoPort(Matrix<W>),
}

/// A chain matrix, exact and in words.
#[derive(Clone, Copy, Debug)]
pub(crate) struct Matrix<W> {
    /// a, b, c, d
    pub(crate) exact: [Complex<f64>; 4],
    pub(crate) words: TwoPortWords<W>,
    /// Bounds of |words − exact|.
    pub(crate) errors: [f64; 4],
}

/// Values of a two-port's words; exact.
pub(crate) fn values<W: Word>(two_port: &TwoPortWords<W>) -> [Complex<f64>; 4] {
    let unit = f64::from(two_port.exponent()).exp2();
    two_port
        .words()
        .map(|[re, im]| Complex::new(f64::from(re), f64::from(im)) * unit)
}

impl<W: Word> Matrix<W> {
    /// Words for a matrix that was resolved with an uncertainty.
    fn resolved(words: TwoPortWords<W>, of: TwoPort<Uncertain>) -> Self {
        let half_unit = f64::from(words.exponent()).exp2() / 2.0;
        let error = |part: Uncertain| part.error + if part.is_zero() { 0.0 } else { half_unit };
        let entries = [of.a, of.b, of.c, of.d];
        Self {
            exact: entries.map(exact),
            words,
            errors: entries.map(|z| error(z.re).hypot(error(z.im))),
        }
    }

    /// Words that are what is meant, but for the factor that makes the determinant 1.
    fn of_words(words: TwoPortWords<W>) -> Self {
        let [a, b, c, d] = values(&words);
        let factor = (a * d - b * c).sqrt().inv();
        let exact = [a, b, c, d].map(|entry| entry * factor);
        let errors = [a, b, c, d].map(|entry| (entry - entry * factor).norm());
        Self {
            exact,
            words,
            errors,
        }
    }

    fn adjugate(&self) -> Self {
        let [a, b, c, d] = self.exact;
        let [of_a, of_b, of_c, of_d] = self.errors;
        Self {
            exact: [d, -b, -c, a],
            words: <kernel::State<W> as Walk<_>>::adjugate(&self.words),
            errors: [of_d, of_b, of_c, of_a],
        }
    }
}

/// An immittance, exact and in words.
#[derive(Clone, Copy, Debug)]
pub(crate) struct Factor<W> {
    pub(crate) exact: Complex<f64>,
    pub(crate) words: Immittance<W>,
    /// Bound of |words − exact|.
    pub(crate) error: f64,
}

/// Value of an immittance's words; exact.
pub(crate) fn value<W: Word>(z: &Immittance<W>) -> Complex<f64> {
    let unit = f64::from(z.exponent()).exp2();
    let [re, im] = z.words().map(f64::from);
    Complex::new(re, im) * unit
}

/// The exact value of an uncertain immittance.
fn exact(z: kernel::Complex<Uncertain>) -> Complex<f64> {
    Complex::new(z.re.value, z.im.value)
}

impl<W: Word> Factor<W> {
    /// Words for an immittance that was resolved with an uncertainty; `reciprocal` is the same
    /// resolved the other way up.
    fn resolved(
        exact: Complex<f64>,
        words: Immittance<W>,
        direct: kernel::Complex<Uncertain>,
        reciprocal: Option<kernel::Complex<Uncertain>>,
    ) -> Self {
        let unit = f64::from(words.exponent()).exp2();
        let half_unit = |part: Uncertain| if part.is_zero() { 0.0 } else { unit / 2.0 };
        let rounding = if words.words() == [0, 0] {
            // too small for every state
            exact.norm()
        } else {
            half_unit(direct.re).hypot(half_unit(direct.im))
        };
        let limit = f64::from(Immittance::<W>::EXPONENT_MAX - 2).exp2();
        let before = direct.re.error.hypot(direct.im.error);
        let error = if direct.re.magnitude().max(direct.im.magnitude()) < limit * 0.999 {
            rounding + before
        } else {
            f64::INFINITY
        };
        let by_reciprocal = reciprocal.map_or(f64::INFINITY, |y| {
            /// Reciprocal and product after the reciprocal was resolved: sixteen scalar roundings.
            const LAST: f64 = 16.0 / (1_u64 << 31) as f64;
            let word = value(&words).norm();
            let largest = words.exponent() + W::BITS as i32 == Immittance::<W>::EXPONENT_MAX;
            let own = if largest { 1.0 } else { rounding / word };
            let of_reciprocal = y.re.error.hypot(y.im.error) + (own + LAST) / word;
            exact.norm() * word * of_reciprocal
        });
        // `min` passes over what is not a number: 0 times infinity, for words that are all zero
        let error = error.min(by_reciprocal);
        assert!(error.is_finite(), "{words:?} {direct:?} {reciprocal:?}");
        Self {
            exact,
            words,
            error,
        }
    }

    /// Words that are what is meant.
    fn of_words(words: Immittance<W>) -> Self {
        Self {
            exact: value(&words),
            words,
            error: 0.0,
        }
    }

    fn negated(&self) -> Self {
        Self {
            exact: -self.exact,
            words: <kernel::State<W> as Walk<_>>::negated(&self.words),
            error: self.error,
        }
    }
}

impl<W: Word> Move<W> {
    /// How many of v and i it multiplies into the other.
    pub(crate) fn multiplications(&self) -> usize {
        match self {
            Self::Series(_) | Self::Shunt(_) | Self::Stretch(..) => 1,
            Self::TwoPort(_) => 2,
        }
    }

    /// The move that undoes this one.
    pub(crate) fn inverse(&self) -> Self {
        match self {
            Self::Series(z) => Self::Series(z.negated()),
            Self::Shunt(y) => Self::Shunt(y.negated()),
            Self::Stretch(ratio, inverse) => Self::Stretch(*inverse, *ratio),
            Self::TwoPort(matrix) => Self::TwoPort(matrix.adjugate()),
        }
    }
}

/// The moves of each stage, from the load to the source, exact as the reference has them.
///
/// The inner places of a line take their state from the line's T at the same half turn as in
/// words, for which `stages` are resolved in `f64` with a bound.
pub(crate) fn moves<W: Word>(
    point: &FrequencyPoint,
    words: &[Step<Immittance<W>>],
    stages: &[Stage<Uncertain>],
    hertz: u32,
) -> Vec<Vec<Move<W>>> {
    let frequency = Frequency::new(hertz);
    let stages = point.stages.iter().zip(words).zip(stages).rev();
    let moves = stages.map(|((matrix, words), stage)| {
        let upside_down = reciprocal(stage).map(|stage| match stage.at(&frequency) {
            Step::Series(z) | Step::Shunt(z) => z,
            other => panic!("no immittance: {other:?}"),
        });
        match (*words, stage.at(&frequency)) {
            (Step::Series(z), Step::Series(of)) => {
                vec![Move::Series(Factor::resolved(matrix.b, z, of, upside_down))]
            }
            (Step::Shunt(y), Step::Shunt(of)) => {
                vec![Move::Shunt(Factor::resolved(matrix.c, y, of, upside_down))]
            }
            (
                Step::Tee { series, shunt },
                Step::Tee {
                    series: of_series,
                    shunt: of_shunt,
                },
            ) => {
                let arm = Factor::resolved(exact(of_series), series, of_series, None);
                let stem = Factor::resolved(exact(of_shunt), shunt, of_shunt, None);
                vec![Move::Series(arm), Move::Shunt(stem), Move::Series(arm)]
            }
            (
                Step::Stretch { ratio, inverse },
                Step::Stretch {
                    ratio: of_ratio,
                    inverse: of_inverse,
                },
            ) => {
                let ratio = Factor::resolved(matrix.a, ratio, of_ratio, None);
                let inverse = Factor::resolved(matrix.d, inverse, of_inverse, None);
                vec![Move::Stretch(ratio, inverse)]
            }
            (Step::TwoPort(words), Step::TwoPort(of)) => {
                vec![Move::TwoPort(Matrix::resolved(words, of))]
            }
            pair => panic!("not the same stage: {pair:?}"),
        }
    });
    moves.collect()
}

/// The moves of a chain whose words are what is meant.
pub(crate) fn moves_of_words<W: Word>(words: &[Step<Immittance<W>>]) -> Vec<Move<W>> {
    let mut moves = Vec::new();
    for step in words.iter().rev() {
        match *step {
            Step::Series(z) => moves.push(Move::Series(Factor::of_words(z))),
            Step::Shunt(y) => moves.push(Move::Shunt(Factor::of_words(y))),
            Step::Tee { series, shunt } => {
                let arm = Move::Series(Factor::of_words(series));
                moves.extend([arm, Move::Shunt(Factor::of_words(shunt)), arm]);
            }
            Step::Stretch { ratio, inverse } => {
                // the determinant has to be 1, so one of the two words is not what is meant
                let ratio = Factor::of_words(ratio);
                let exact = ratio.exact.inv();
                let inverse = Factor {
                    exact,
                    words: inverse,
                    error: (value(&inverse) - exact).norm(),
                };
                moves.push(Move::Stretch(ratio, inverse));
            }
            Step::TwoPort(words) => moves.push(Move::TwoPort(Matrix::of_words(words))),
        }
    }
    moves
}

/// The stage whose immittance is the reciprocal; none for stages without an immittance.
fn reciprocal(stage: &Stage<Uncertain>) -> Option<Stage<Uncertain>> {
    match stage {
        Stage::Branch(branch) => Some(Stage::Branch(kernel::Branch {
            inverted: !branch.inverted,
            ..*branch
        })),
        Stage::Stub(stub) => Some(Stage::Stub(kernel::Stub {
            function: match stub.function {
                StubFunction::Tanh => StubFunction::Coth,
                StubFunction::Coth => StubFunction::Tanh,
            },
            immittance: stub.immittance.reciprocal(),
            ..*stub
        })),
        Stage::Line(_) | Stage::Transformer(_) | Stage::Bank(_) => None,
    }
}

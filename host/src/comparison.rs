//! One point in firmware words beside the same in `f64`, and where the difference comes from.
//!
//! The load is run through stages N…k in words and through the rest in `f64`; what moves when one
//! more stage, or one more thing within a stage, is done in words is that thing's contribution.
//! The contributions are differences of neighbours in one sequence of Γ, so they sum to the whole
//! difference identically.

use num_complex::Complex;
use stagebits_kernel as kernel;
use stagebits_kernel::{Frequency, Gamma, Immittance, Resolved, Scalar, Step, TwoPort, Word};

use crate::arithmetic::{self, Arithmetic, Block, state_values, to_complex};
use crate::constants::{self, CAPACITY, Constants};
use crate::plan::{Plan, Switches};
use crate::reference::{FrequencyPoint, Matrix, Reference, State};

/// Where an error can come from within a stage, in the order in which words replace `f64`.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum StageSource {
    /// Rounding the constants that the image stores.
    Constants,
    /// Rounding f, 1/f and √f.
    Frequency,
    /// Resolving the stage: line functions, sums and reciprocals, and the rounding to words.
    Immittance,
    /// Products, alignment and block growth on the walk.
    Products,
}

impl StageSource {
    /// All of them, in order.
    pub const ALL: [Self; 4] = [
        Self::Constants,
        Self::Frequency,
        Self::Immittance,
        Self::Products,
    ];

    /// The source's key in JSON.
    pub const fn key(self) -> &'static str {
        match self {
            Self::Constants => "constants",
            Self::Frequency => "frequency",
            Self::Immittance => "immittances",
            Self::Products => "products",
        }
    }

    /// What the source is called in text.
    pub const fn name(self) -> &'static str {
        match self {
            Self::Constants => "stored constants",
            Self::Frequency => "frequency words",
            Self::Immittance => "line functions and immittances",
            Self::Products => "products and alignment",
        }
    }
}

/// The error of one point, taken apart. All are differences of Γ at the input.
#[derive(Clone, Debug, PartialEq)]
pub struct Split {
    /// Words − reference.
    pub total: Complex<f64>,
    /// Rounding the load to state words.
    pub load: Complex<f64>,
    /// Per stage, radio side first, by [`StageSource::ALL`].
    pub stages: Vec<[Complex<f64>; 4]>,
    /// Reading Γ from the state at the input.
    pub readout: Complex<f64>,
}

impl Split {
    /// Sum of all contributions minus the total: what is left is the rounding of `f64` itself.
    pub fn closure(&self) -> f64 {
        let stages: Complex<f64> = self.stages.iter().flatten().sum();
        (self.load + stages + self.readout - self.total).norm()
    }
}

/// A plan in words of type `W` and in `f64`.
pub struct Comparison<'plan, W> {
    reference: Reference<'plan>,
    block: Block<W>,
    /// The words' values, to be walked in `f64`.
    stored: Constants<f64>,
}

/// A [`Comparison`] at one frequency, in one state of the banks.
pub struct ComparisonPoint<W: Word> {
    reference: FrequencyPoint,
    words: Resolved<Immittance<W>, CAPACITY>,
    /// Per stage, the chain up to and with that stage, in `f64` but for that stage's constants,
    /// then its frequency words, then its immittances.
    partial: Vec<[Matrix; 3]>,
}

impl<'plan, W: Word> Comparison<'plan, W> {
    /// Prepares both sides; `exact` are the constants of `plan`.
    pub fn new(plan: &'plan Plan, exact: &Constants<f64>) -> Self {
        let block = Block::new(exact);
        let stored = block.stored.map(constants::value);
        Self {
            reference: Reference::new(plan),
            block,
            stored,
        }
    }

    /// Both sides at one frequency, all steps of the banks off.
    pub fn at(&self, hertz: u32) -> ComparisonPoint<W> {
        self.at_state(hertz, &Switches::OFF)
    }

    /// Both sides at one frequency with the banks in this state.
    pub fn at_state(&self, hertz: u32, switches: &Switches) -> ComparisonPoint<W> {
        let reference = self.reference.at_state(f64::from(hertz), switches);
        let words = self.block.at_state(hertz, switches);
        let rounded: Frequency<Scalar> = Frequency::new(hertz);
        let resolved = |frequency| self.stored.at_float_state(&frequency, &switches.words);
        let stored = resolved(Frequency::new(hertz));
        let frequency = resolved(rounded.map(constants::value));
        let partial = (0..words.steps().len())
            .map(|k| {
                let before = reference.prefixes[k];
                [
                    before * matrix(&stored.steps()[k]),
                    before * matrix(&frequency.steps()[k]),
                    before * matrix(&step_value(&words.steps()[k])),
                ]
            })
            .collect();
        ComparisonPoint {
            reference,
            words,
            partial,
        }
    }
}

impl<W: Word> ComparisonPoint<W> {
    /// Γ at the input in `f64`.
    pub fn reference_gamma(&self, load: Gamma) -> Complex<f64> {
        self.reference.input_gamma(to_complex(load))
    }

    /// Γ at the input in words.
    pub fn word_gamma(&self, load: Gamma) -> Complex<f64> {
        Block::<W>::gamma(&self.words, load)
    }

    /// Words − reference.
    pub fn error(&self, load: Gamma) -> Complex<f64> {
        self.word_gamma(load) - self.reference_gamma(load)
    }

    /// The error, taken apart.
    pub fn split(&self, load: Gamma) -> Split {
        let exact = self.reference_gamma(load);
        let stages = self.partial.len();
        let mut contributions = vec![[Complex::default(); 4]; stages];
        let mut states = arithmetic::states(&self.words, load);
        let at_load = states.next().expect("a walk starts with the load");
        let mut state = state_values(&at_load);
        let mut last = after(self.reference.chain(), state);
        let load_part = last - exact;
        for (k, words) in (0..stages).rev().zip(states) {
            let first = last;
            let entering = state;
            state = state_values(&words);
            let leaving = after(&self.reference.prefixes[k], state);
            let [stored, frequency, immittance] = self.partial[k];
            let swapped = [
                after(&stored, entering),
                after(&frequency, entering),
                after(&immittance, entering),
                leaving,
            ];
            let mut previous = first;
            for (contribution, next) in contributions[k].iter_mut().zip(swapped) {
                *contribution = next - previous;
                previous = next;
            }
            last = leaving;
        }
        let words = self.word_gamma(load);
        Split {
            total: words - exact,
            load: load_part,
            stages: contributions,
            readout: words - last,
        }
    }
}

/// Γ after a matrix has taken a state to the input.
fn after(matrix: &Matrix, (v, i): (Complex<f64>, Complex<f64>)) -> Complex<f64> {
    let (v, i) = matrix.apply(v, i);
    State { v, i }.gamma()
}

/// A step's value in `f64`; exact.
fn step_value<W: Word>(step: &Step<Immittance<W>>) -> Step<kernel::Complex<f64>> {
    let complex = |[re, im]: [i32; 2], exponent: i32| {
        let unit = f64::from(exponent).exp2();
        kernel::Complex {
            re: f64::from(re) * unit,
            im: f64::from(im) * unit,
        }
    };
    let value = |z: &Immittance<W>| complex(z.words(), z.exponent());
    match step {
        Step::Series(z) => Step::Series(value(z)),
        Step::Shunt(y) => Step::Shunt(value(y)),
        Step::Tee { series, shunt } => Step::Tee {
            series: value(series),
            shunt: value(shunt),
        },
        Step::Stretch { ratio, inverse } => Step::Stretch {
            ratio: value(ratio),
            inverse: value(inverse),
        },
        Step::TwoPort(words) => {
            let [a, b, c, d] = words.words().map(|pair| complex(pair, words.exponent()));
            Step::TwoPort(TwoPort { a, b, c, d })
        }
    }
}

/// The chain matrix of a resolved step, normalised to R0.
fn matrix(step: &Step<kernel::Complex<f64>>) -> Matrix {
    let complex = |z: &kernel::Complex<f64>| Complex::new(z.re, z.im);
    match step {
        Step::Series(z) => Matrix::series(complex(z)),
        Step::Shunt(y) => Matrix::shunt(complex(y)),
        Step::Tee { series, shunt } => {
            let arm = Matrix::series(complex(series));
            arm * Matrix::shunt(complex(shunt)) * arm
        }
        Step::Stretch { ratio, inverse } => {
            let zero = Complex::default();
            Matrix {
                a: complex(ratio),
                b: zero,
                c: zero,
                d: complex(inverse),
            }
        }
        Step::TwoPort(TwoPort { a, b, c, d }) => Matrix {
            a: complex(a),
            b: complex(b),
            c: complex(c),
            d: complex(d),
        },
    }
}

//! Circuits in words and as textbook chain matrices in `f64`, with a bound on their difference.

use num_complex::Complex64;
use proptest::prelude::*;

use super::scalar;
use crate::Transformer;
use crate::immittance::Immittance;
use crate::real::Complex;
use crate::word::Word;
use crate::{Branch, Chain, Frequency, Gamma, Law, Line, Position, Resolved, Scalar, Stage};

/// The frequency of every circuit.
const HERTZ: u32 = 10_000_000;
const CAPACITY: usize = 8;

/// v and i, or any other pair.
pub(crate) type Pair = [Complex64; 2];

pub(crate) fn norm(pair: Pair) -> f64 {
    pair[0].norm().hypot(pair[1].norm())
}

/// [a, b, c, d] of D. M. Pozar, Microwave Engineering, 4th ed., Table 4.1, normalised to R0.
pub(crate) type Matrix = [Complex64; 4];

const ONE: Complex64 = Complex64::new(1.0, 0.0);
const ZERO: Complex64 = Complex64::new(0.0, 0.0);
const UNIT: Matrix = [ONE, ZERO, ZERO, ONE];

fn product([a, b, c, d]: Matrix, [e, f, g, h]: Matrix) -> Matrix {
    [a * e + b * g, a * f + b * h, c * e + d * g, c * f + d * h]
}

fn apply([a, b, c, d]: Matrix, [v, i]: Pair) -> Pair {
    [a * v + b * i, c * v + d * i]
}

/// One stage in both forms.
#[derive(Clone, Copy, Debug)]
pub(crate) struct Part {
    stage: Stage<Scalar>,
    matrix: Matrix,
    /// Roundings of a whole state on the way through.
    roundings: f64,
    /// By how much a state may grow inside, above its larger end.
    inside: f64,
}

fn branch(position: Position, z: Complex64) -> Stage<Scalar> {
    let rising = Complex {
        re: Scalar::ZERO,
        im: scalar(z.im / f64::from(HERTZ)),
    };
    Stage::Branch(Branch {
        position,
        inverted: false,
        law: Law {
            constant: scalar(z.re),
            rising,
            ..Law::ZERO
        },
        beside: None,
    })
}

/// A series impedance over R0.
pub(crate) fn series(re: f64, im: f64) -> Part {
    let z = Complex64::new(re, im);
    Part {
        stage: branch(Position::Series, z),
        matrix: [ONE, z, ZERO, ONE],
        roundings: 1.0,
        inside: 1.0,
    }
}

/// A shunt admittance times R0.
pub(crate) fn shunt(re: f64, im: f64) -> Part {
    let y = Complex64::new(re, im);
    Part {
        stage: branch(Position::Shunt, y),
        matrix: [ONE, ZERO, y, ONE],
        roundings: 1.0,
        inside: 1.0,
    }
}

/// A line: impedance over R0, length in turns, loss in nepers.
pub(crate) fn line(impedance: f64, turns: f64, nepers: f64) -> Part {
    let turns_per_hertz = (turns / f64::from(HERTZ) * 2.0_f64.powi(64)) as u64;
    line_of(impedance, turns_per_hertz, nepers)
}

/// The same with its length in 2^-64 turns per hertz.
pub(crate) fn line_of(impedance: f64, turns_per_hertz: u64, nepers: f64) -> Part {
    let fraction = turns_per_hertz.wrapping_mul(u64::from(HERTZ));
    let angle = fraction as f64 / 2.0_f64.powi(64) * std::f64::consts::TAU;
    let length = Complex64::new(nepers, angle);
    let (sinh, cosh) = (length.sinh(), length.cosh());
    Part {
        stage: Stage::Line(Line {
            impedance: scalar(impedance),
            admittance: scalar(1.0 / impedance),
            turns_per_hertz,
            root_loss: scalar(nepers / f64::from(HERTZ).sqrt()),
            linear_loss: Scalar::ZERO,
        }),
        matrix: [cosh, sinh * impedance, sinh / impedance, cosh],
        roundings: 3.0,
        // the arms of the T are at most Zc·(1 + αl)
        inside: 1.0 + impedance * (1.0 + nepers),
    }
}

/// An ideal transformer.
pub(crate) fn transformer(ratio: f64) -> Part {
    Part {
        stage: Stage::Transformer(Transformer {
            ratio: scalar(ratio),
            inverse: scalar(1.0 / ratio),
        }),
        matrix: [ratio.into(), ZERO, ZERO, (1.0 / ratio).into()],
        roundings: 1.0,
        inside: 1.0,
    }
}

/// Any part with immittances up to ten times and a tenth of the reference.
pub(crate) fn part() -> impl Strategy<Value = Part> {
    let size = || (-1.0..1.0).prop_map(|power: f64| 10.0_f64.powf(power));
    let resistance = || prop_oneof![Just(0.0), size()];
    let reactance = || prop_oneof![Just(0.0), size(), size().prop_map(|x| -x)];
    prop_oneof![
        (resistance(), reactance()).prop_map(|(re, im)| series(re, im)),
        (resistance(), reactance()).prop_map(|(re, im)| shunt(re, im)),
        (0.3..3.0, 0.0..4.0, prop_oneof![Just(0.0), 0.0..1.0])
            .prop_map(|(impedance, turns, nepers)| line(impedance, turns, nepers)),
        (0.3..3.0).prop_map(transformer),
    ]
}

/// Up to seven parts, the source's first.
pub(crate) fn circuit() -> impl Strategy<Value = Circuit> {
    prop::collection::vec(part(), 1..=CAPACITY - 1).prop_map(|parts| Circuit::new(&parts))
}

/// A passive load's |Γ| ≤ 1.
pub(crate) fn load() -> impl Strategy<Value = Gamma> {
    (0.0..=1.0, 0.0..std::f64::consts::TAU)
        .prop_map(|(magnitude, angle)| gamma(Complex64::from_polar(magnitude, angle)))
}

/// The Γ nearest to a complex number.
pub(crate) fn gamma(value: Complex64) -> Gamma {
    let fixed = |part: f64| (part * f64::from(1 << Gamma::FRACTION_BITS)).round() as i32;
    Gamma {
        re: fixed(value.re),
        im: fixed(value.im),
    }
}

/// A Γ as a complex number.
pub(crate) fn gamma_value(gamma: Gamma) -> Complex64 {
    Complex64::new(f64::from(gamma.re), f64::from(gamma.im)) / f64::from(1 << 30)
}

/// A state in `f64` and by how much the words' state may differ from it.
#[derive(Clone, Copy, Debug)]
pub(crate) struct Node {
    pub(crate) pair: Pair,
    /// Norm of the difference.
    pub(crate) error: f64,
}

impl Node {
    /// Re v·i*, and by how much it may differ.
    pub(crate) fn power(&self) -> (f64, f64) {
        let [v, i] = self.pair;
        (
            (v * i.conj()).re,
            self.error * (norm(self.pair) + self.error),
        )
    }

    /// v + i, and by how much it may differ.
    pub(crate) fn sum(&self) -> (Complex64, f64) {
        (self.pair[0] + self.pair[1], self.error * 2.0_f64.sqrt())
    }

    /// Γ and by how much it may differ, the readout's rounding included.
    pub(crate) fn gamma(&self) -> (Complex64, f64) {
        let (sum, sum_error) = self.sum();
        let gamma = (self.pair[0] - self.pair[1]) / sum;
        let relative = sum_error / (sum.norm() - sum_error).max(0.0);
        (
            gamma,
            relative * (1.0 + gamma.norm()) + 4.0 * 2.0_f64.powi(-30),
        )
    }
}

/// A few parts in cascade.
#[derive(Clone, Debug)]
pub(crate) struct Circuit {
    parts: Vec<Part>,
    chain: Chain<Scalar, CAPACITY>,
}

impl Circuit {
    /// These parts, the source's first.
    pub(crate) fn new(parts: &[Part]) -> Self {
        let stages: Vec<_> = parts.iter().map(|part| part.stage).collect();
        Self {
            parts: parts.to_vec(),
            chain: Chain::new(&stages).unwrap(),
        }
    }

    /// The chain in words.
    pub(crate) fn words<W: Word>(&self) -> Resolved<Immittance<W>, CAPACITY> {
        self.chain.at(&Frequency::new(HERTZ))
    }

    /// The chain over floating point.
    #[cfg(feature = "float")]
    pub(crate) fn floats(&self) -> Resolved<Complex<f64>, CAPACITY> {
        self.chain
            .map(super::value)
            .at_float(&Frequency::new(HERTZ))
    }

    /// The chain matrix.
    pub(crate) fn matrix(&self) -> Matrix {
        let matrices = self.parts.iter().map(|part| part.matrix);
        matrices.fold(UNIT, product)
    }

    /// The states at every node, the load's first, for a walk in words of type `W`.
    ///
    /// The load's four words are right to half a unit of at most 2^(4−W), with a norm of 2 where it
    /// is that large and √2 below. A block's largest word is at least 2^(W−4) when the block has just grown, so that one
    /// rounding of v and i moves the state by at most 2^(4−W) of the largest that it has been. The
    /// immittance's own two words are right to 2^(2−W) of what it adds, and to 2^-28 for the
    /// constants, the frequency and the line functions.
    pub(crate) fn nodes<W: Word>(&self, load: Pair) -> Vec<Node> {
        nodes::<W>(
            self.parts.iter().rev().map(|part| (*part, part.matrix)),
            load,
        )
    }

    /// The state at the source for this load.
    pub(crate) fn input<W: Word>(&self, load: Pair) -> Node {
        *self.nodes::<W>(load).last().unwrap()
    }

    /// The state at what was the load, for a load at what was the source.
    pub(crate) fn turned<W: Word>(&self, load: Pair) -> Node {
        // a reciprocal two-port turned end for end: a and d change places
        let turned = self.parts.iter().map(|part| {
            let [a, b, c, d] = part.matrix;
            (*part, [d, b, c, a])
        });
        *nodes::<W>(turned, load).last().unwrap()
    }
}

fn nodes<W: Word>(parts: impl Iterator<Item = (Part, Matrix)>, load: Pair) -> Vec<Node> {
    let word = 2.0_f64.powi(-(W::BITS as i32));
    let mut node = Node {
        pair: load,
        error: 8.0 * word * norm(load),
    };
    let mut largest = norm(load);
    let mut nodes = vec![node];
    for (part, matrix) in parts {
        node.pair = apply(matrix, node.pair);
        largest = largest.max(norm(node.pair));
        let rounded = part.roundings * part.inside.powi(2) * largest;
        let factor = matrix.iter().map(Complex64::norm_sqr).sum::<f64>().sqrt();
        node.error = node.error * factor + rounded * ((16.0 + 4.0) * word + 2.0_f64.powi(-28));
        nodes.push(node);
    }
    nodes
}

/// v = 1 + Γ and i = 1 − Γ.
pub(crate) fn pair(load: Gamma) -> Pair {
    let gamma = gamma_value(load);
    [ONE + gamma, ONE - gamma]
}

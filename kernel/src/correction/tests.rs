//! Against the textbook's formulas in `f64`, with the errors that the module states.

use num_complex::Complex64;
use proptest::prelude::*;

use super::{Correction, CorrectionError, Standard};
use crate::readout::Gamma;
use crate::testing::circuit::{Node, gamma, gamma_value, norm, pair};
use crate::testing::{scalar, value};
use crate::{Bits, Complex, Scalar, State, Walk, Word};

const ONE: Complex64 = Complex64::new(1.0, 0.0);
/// Last place of a [`Gamma`].
const UNIT: f64 = 1.0 / (1 << 30) as f64;
/// Largest error of a complex number whose parts are rounded to [`UNIT`].
const ROUNDING: f64 = UNIT * std::f64::consts::FRAC_1_SQRT_2;
/// Effect of the arithmetic in each standard: some way above the most that the module reports.
const ARITHMETIC: f64 = 8.0 * UNIT;

/// Error terms in floating point.
#[derive(Clone, Copy, Debug)]
struct Terms {
    directivity: Complex64,
    tracking: Complex64,
    source_match: Complex64,
}

impl Terms {
    fn of(correction: &Correction) -> Self {
        let complex = |z: Complex<Scalar>| Complex64::new(value(z.re), value(z.im));
        Self {
            directivity: complex(correction.directivity),
            tracking: complex(correction.tracking),
            source_match: complex(correction.source_match),
        }
    }

    /// The terms nearest to these that a correction can hold.
    fn correction(&self) -> Correction {
        let scalars = |z: Complex64| Complex {
            re: scalar(z.re),
            im: scalar(z.im),
        };
        Correction {
            directivity: scalars(self.directivity),
            tracking: scalars(self.tracking),
            source_match: scalars(self.source_match),
        }
    }

    /// Γm = e00 + e10e01·Γ / (1 − e11·Γ): Rytting, from memory.
    fn predict(&self, reflection: Complex64) -> Complex64 {
        self.directivity + self.tracking * reflection / (ONE - self.source_match * reflection)
    }

    /// Γ = (Γm − e00) / (Γm·e11 − Δe) with Δe = e00·e11 − e10e01: Rytting, from memory.
    fn apply(&self, reading: Complex64) -> Complex64 {
        let determinant = self.directivity * self.source_match - self.tracking;
        (reading - self.directivity) / (reading * self.source_match - determinant)
    }

    /// |dΓ/dΓm| at a reflection.
    fn sensitivity(&self, reflection: Complex64) -> f64 {
        (ONE - self.source_match * reflection).norm_sqr() / self.tracking.norm()
    }

    /// The textbook's e00 + Γ·Γm·e11 − Γ·Δe = Γm for three standards, by Cramer's rule: Rytting,
    /// from memory.
    fn solve(standards: &[Standard; 3]) -> Self {
        let reflection = standards.map(|standard| gamma_value(standard.reflection));
        let reading = standards.map(|standard| gamma_value(standard.reading));
        let product = [0, 1, 2].map(|k| reflection[k] * reading[k]);
        let minus = reflection.map(|gamma| -gamma);
        let ones = [ONE; 3];
        let divisor = determinant([ones, product, minus]);
        let directivity = determinant([reading, product, minus]) / divisor;
        let source_match = determinant([ones, reading, minus]) / divisor;
        let delta = determinant([ones, product, reading]) / divisor;
        Self {
            directivity,
            tracking: directivity * source_match - delta,
            source_match,
        }
    }

    /// What an ideal instrument of these terms reads, rounded to words.
    fn measure(&self, reflection: Gamma) -> Standard {
        Standard {
            reflection,
            reading: gamma(self.predict(gamma_value(reflection))),
        }
    }
}

/// The step both ways against v ← a·v + b·i, i ← c·v + d·i with entries in `f64`.
///
/// Entries are right to half a unit of at most 2^(3−W) of the largest, in eight parts. The load's
/// words and the rounding of the result are as in [`Circuit`](crate::testing::circuit::Circuit).
fn check_step<W: Word>(correction: &Correction, at: Gamma) {
    let terms = Terms::of(correction);
    let (e00, e11) = (terms.directivity, terms.source_match);
    let through = terms.tracking - e00 * e11;
    let [a, b] = [1.0, -1.0].map(|sign| ONE + e00 + (through - e11) * sign);
    let [c, d] = [-1.0, 1.0].map(|sign| ONE - e00 + (through + e11) * sign);
    let step = correction.step::<W>();
    let reading = terms.measure(at).reading;
    let mut there = State::<W>::from_load(at);
    there.pass(&step);
    let mut back = State::<W>::from_load(reading);
    back.pass_back(&step);
    for (state, load, [a, b, c, d], exact) in [
        (there, at, [a, b, c, d], terms.predict(gamma_value(at))),
        (
            back,
            reading,
            [d, -b, -c, a],
            terms.apply(gamma_value(reading)),
        ),
    ] {
        let [v, i] = pair(load);
        let output = [a * v + b * i, c * v + d * i];
        let size = [a, b, c, d]
            .iter()
            .map(Complex64::norm_sqr)
            .sum::<f64>()
            .sqrt();
        let (before, after) = (norm([v, i]), norm(output));
        let rounded = (8.0 + 4.0 * 8.0_f64.sqrt()) * size * before + 16.0 * before.max(after);
        let node = Node {
            pair: output,
            error: rounded * 2.0_f64.powi(-(W::BITS as i32)),
        };
        let (expected, limit) = node.gamma();
        assert!((expected - exact).norm() <= 1e-12, "{expected} {exact}");
        let error = (gamma_value(state.gamma()) - exact).norm();
        assert!(error <= limit, "{} bits: {error:e} {limit:e}", W::BITS);
    }
}

/// Determinant of the matrix with these columns.
fn determinant([a, b, c]: [[Complex64; 3]; 3]) -> Complex64 {
    let minor = |i: usize, k: usize| b[i] * c[k] - b[k] * c[i];
    a[0] * minor(1, 2) - a[1] * minor(0, 2) + a[2] * minor(0, 1)
}

/// Magnitudes of Lagrange's polynomials at a reflection, that of each standard.
fn lagrange(standards: &[Standard; 3], at: Complex64) -> [f64; 3] {
    let nodes = standards.map(|standard| gamma_value(standard.reflection));
    [[0, 1, 2], [1, 2, 0], [2, 0, 1]].map(|[k, a, b]| {
        let weight = (at - nodes[a]) * (at - nodes[b]);
        (weight / ((nodes[k] - nodes[a]) * (nodes[k] - nodes[b]))).norm()
    })
}

fn disc(radius: f64) -> impl Strategy<Value = Complex64> {
    (0.0..=radius, 0.0..std::f64::consts::TAU)
        .prop_map(|(magnitude, angle)| Complex64::from_polar(magnitude, angle))
}

fn terms() -> impl Strategy<Value = Terms> {
    let tracking = (0.3..1.5, 0.0..std::f64::consts::TAU);
    (disc(0.3), tracking, disc(0.3)).prop_map(|(directivity, (gain, angle), source_match)| Terms {
        directivity,
        tracking: Complex64::from_polar(gain, angle),
        source_match,
    })
}

/// An open with a fringing capacitance, a short with an inductance and a load that is not quite
/// R0, in any order; or any three that are at least a tenth apart.
fn reflections() -> impl Strategy<Value = [Gamma; 3]> {
    // ωCR0 of the open and ωL/R0 of the short
    let real = (0.0..0.5, 0.0..0.5, disc(0.1)).prop_map(|(susceptance, reactance, load)| {
        let (y, z) = (Complex64::I * susceptance, Complex64::I * reactance);
        [(ONE - y) / (ONE + y), (z - ONE) / (z + ONE), load]
    });
    let apart = [disc(1.0), disc(1.0), disc(1.0)].prop_filter("a tenth apart", |[a, b, c]| {
        let distances = [a - b, b - c, c - a].map(|distance| distance.norm());
        distances.into_iter().all(|distance| distance >= 0.1)
    });
    let orders = (0..3_usize, any::<bool>());
    (prop_oneof![real.boxed(), apart.boxed()], orders).prop_map(|(mut standards, (turns, swap))| {
        standards.rotate_left(turns);
        if swap {
            standards.swap(0, 1);
        }
        standards.map(gamma)
    })
}

/// Terms of an instrument, and standards that it reads within ±2.
fn measured() -> impl Strategy<Value = (Terms, [Standard; 3])> {
    (terms(), reflections())
        .prop_map(|(terms, reflections)| (terms, reflections.map(|gamma| terms.measure(gamma))))
        .prop_filter("readings within ±2", |(terms, standards)| {
            standards
                .iter()
                .all(|standard| in_range(terms, standard.reflection))
        })
}

fn in_range(terms: &Terms, reflection: Gamma) -> bool {
    let reading = terms.predict(gamma_value(reflection));
    reading.re.abs().max(reading.im.abs()) < 1.999
}

#[test]
fn ideal_standards_of_an_ideal_instrument_give_no_correction() {
    let [open, short, load] = [Gamma::OPEN, Gamma::SHORT, Gamma::MATCHED];
    for order in [
        [open, short, load],
        [open, load, short],
        [short, open, load],
        [short, load, open],
        [load, open, short],
        [load, short, open],
    ] {
        let standards = order.map(|gamma| Standard {
            reflection: gamma,
            reading: gamma,
        });
        assert_eq!(Correction::from_standards(&standards), Ok(Correction::NONE));
    }
}

/// For ideal standards e00 = ΓmL, e11 = (ΓmO + ΓmS − 2ΓmL) / (ΓmO − ΓmS) and
/// e10e01 = −2 (ΓmO − ΓmL)(ΓmS − ΓmL) / (ΓmO − ΓmS): Rytting, from memory.
#[test]
fn ideal_standards_give_the_published_closed_form() {
    // readings in eighths
    let [open, short, load] = [[7, -1], [-4, 2], [1, 1]];
    let complex = |[re, im]: [i32; 2]| Complex64::new(re.into(), im.into()) / 8.0;
    let word = |[re, im]: [i32; 2]| Gamma {
        re: re << 27,
        im: im << 27,
    };
    let standards = [
        (Gamma::OPEN, open),
        (Gamma::SHORT, short),
        (Gamma::MATCHED, load),
    ]
    .map(|(reflection, reading)| Standard {
        reflection,
        reading: word(reading),
    });
    let terms = Terms::of(&Correction::from_standards(&standards).unwrap());
    let [open, short, load] = [open, short, load].map(complex);
    let span = open - short;
    assert_eq!(terms.directivity, load);
    // the slopes and their difference are exact here: what is left is a quotient and products
    let source_match = (open + short - 2.0 * load) / span;
    assert!((terms.source_match - source_match).norm() <= 4.0 * UNIT);
    let tracking = -2.0 * (open - load) * (short - load) / span;
    assert!((terms.tracking - tracking).norm() <= 8.0 * UNIT);
}

proptest! {
    #[test]
    fn no_correction_changes_nothing(re: i32, im: i32) {
        let reading = Gamma { re, im };
        prop_assert_eq!(Correction::NONE.apply(reading), reading);
        prop_assert_eq!(Correction::NONE.predict(reading), reading);
    }

    #[test]
    fn terms_have_the_stated_effect_in_each_standard(
        (_, standards) in measured(), at in disc(1.0),
    ) {
        let exact = Terms::solve(&standards);
        let found = Terms::of(&Correction::from_standards(&standards).unwrap());
        let nodes = standards.map(|standard| gamma_value(standard.reflection));
        for at in nodes.into_iter().chain([at]) {
            let error = (found.apply(exact.predict(at)) - at).norm();
            let limit = ARITHMETIC * lagrange(&standards, at).iter().sum::<f64>();
            prop_assert!(error <= limit, "{error:e} {limit:e}");
        }
    }

    #[test]
    fn reflections_and_readings_are_within_the_stated_error(terms in terms(), at in disc(1.0)) {
        let correction = terms.correction();
        let terms = Terms::of(&correction);
        let at = gamma(at);
        prop_assume!(in_range(&terms, at));
        let limit = (2.0 + 9.0 * terms.tracking.norm()) * UNIT;
        let error = gamma_value(correction.predict(at)) - terms.predict(gamma_value(at));
        prop_assert!(error.norm() <= limit, "{error}");

        let reading = terms.measure(at).reading;
        let error = gamma_value(correction.apply(reading)) - terms.apply(gamma_value(reading));
        prop_assert!(error.norm() <= 6.0 * UNIT, "{error}");

        let error = gamma_value(correction.apply(correction.predict(at))) - gamma_value(at);
        let limit = limit * terms.sensitivity(gamma_value(at)) + 6.0 * UNIT;
        prop_assert!(error.norm() <= limit, "{error}");
    }

    #[test]
    fn a_step_predicts_and_corrects(terms in terms(), at in disc(1.0)) {
        let at = gamma(at);
        prop_assume!(in_range(&terms, at));
        let correction = terms.correction();
        check_step::<i16>(&correction, at);
        check_step::<Bits<24>>(&correction, at);
        check_step::<i32>(&correction, at);
    }

    /// From the readings of an instrument to what it is connected to, against what that is.
    #[test]
    fn corrected_readings_are_what_was_measured((terms, standards) in measured(), at in disc(1.0)) {
        let at = gamma(at);
        prop_assume!(in_range(&terms, at));
        let correction = Correction::from_standards(&standards).unwrap();
        let corrected = gamma_value(correction.apply(terms.measure(at).reading));
        let at = gamma_value(at);
        let weights = lagrange(&standards, at).into_iter().zip(standards);
        let of_standards = weights.map(|(weight, standard)| {
            let at = gamma_value(standard.reflection);
            weight * (ROUNDING * terms.sensitivity(at) + ARITHMETIC)
        });
        let limit = of_standards.sum::<f64>() + ROUNDING * terms.sensitivity(at) + 6.0 * UNIT;
        let error = (corrected - at).norm();
        prop_assert!(error <= limit, "{error:e} {limit:e}");
    }

    /// Any readings at all: an error or finite terms, and never a panic.
    #[test]
    fn no_readings_are_too_bad(words: [[i32; 4]; 3], at: [i32; 2], shift in 0..32) {
        let standards = words.map(|[a, b, c, d]| Standard {
            reflection: Gamma { re: a >> shift, im: b >> shift },
            reading: Gamma { re: c >> shift, im: d >> shift },
        });
        if let Ok(correction) = Correction::from_standards(&standards) {
            let terms = Terms::of(&correction);
            prop_assert!(terms.source_match.norm() <= 1.0);
            prop_assert!(terms.directivity.re.abs().max(terms.directivity.im.abs()) < 2.0);
            let [re, im] = at;
            let _ = correction.apply(Gamma { re, im });
            let _ = correction.predict(Gamma { re, im });
        }
    }
}

#[test]
fn standards_that_tell_nothing_are_errors() {
    let standard = |reflection, reading| Standard {
        reflection,
        reading,
    };
    let [open, short, load] =
        [Gamma::OPEN, Gamma::SHORT, Gamma::MATCHED].map(|gamma| standard(gamma, gamma));
    let other = Gamma { re: 7, im: 0 };
    let solve = |standards: [Standard; 3]| Correction::from_standards(&standards).unwrap_err();
    // at every place, so that each of the three pairs is the same once
    for turns in 0..3 {
        let mut standards = [open, short, standard(Gamma::OPEN, other)];
        standards.rotate_left(turns);
        assert_eq!(solve(standards), CorrectionError::SameReflection);
        let mut standards = [open, load, standard(Gamma::SHORT, Gamma::OPEN)];
        standards.rotate_left(turns);
        assert_eq!(solve(standards), CorrectionError::SameReading);
        let mut standards = [open, load, standard(Gamma::SHORT, Gamma::MATCHED)];
        standards.rotate_left(turns);
        assert_eq!(solve(standards), CorrectionError::SameReading);
    }
    // Γm = 1/Γ but for the load: no matched load could be read
    let half = Gamma { re: 1 << 29, im: 0 };
    let twice = Gamma {
        re: i32::MAX,
        im: 0,
    };
    assert_eq!(
        solve([open, short, standard(half, twice)]),
        CorrectionError::NoInstrument
    );
}

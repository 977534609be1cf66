//! Correction of a one-port instrument: from what it reads to what it is connected to.
//!
//! An instrument with linear errors reads Γm = e00 + e10e01·Γ / (1 − e11·Γ) of a reflection Γ: the
//! three-term error model of one-port instruments (D. Rytting, "Network Analyzer Error Models and
//! Calibration Methods", and S. Rehnmark, IEEE Trans. MTT, 1974, both from memory). Its three terms
//! follow from the readings of three standards with known reflections, such as an open, a short and
//! a load, none of which has to be ideal.
//!
//! # Method
//! With d = Γ − Γ₁ and m = Γm − Γm₁ against the first standard, exact in integers, the slopes
//! s = m/d of the other two are s = e10e01 / ((1 − e11·Γ)(1 − e11·Γ₁)), and so
//!
//! - e11 = (s₂ − s₃) / (Γm₂ − Γm₃ + Γ₁·(s₂ − s₃))
//! - t = s₂·(1 − e11·Γ₂), e10e01 = t·(1 − e11·Γ₁) and e00 = Γm₁ − t·Γ₁.
//!
//! Only s₂ − s₃ cancels, which is what e11 is small by. The first is the standard nearest to the
//! reference, whatever the order in which they are given.
//!
//! # Error
//! Let εₖ be the error of standard k as a reflection: that of its definition, or of its reading
//! times |dΓ/dΓm| = |1 − e11·Γ|² / |e10e01|. A correction is then off by Σ εₖ·Lₖ(Γ), where Lₖ is
//! Lagrange's polynomial of the second degree that is 1 at Γₖ and 0 at the two others. For an open,
//! a short and a load and |Γ| ≤ 1, Σ |Lₖ| is at most 2 + √2.
//!
//! For |e11| ≤ 0.3 and |Γₖ| ≤ 1, what the arithmetic adds to the terms has the effect of an εₖ of at
//! most 48·2^-30 in each standard, were every rounding at its worst and in the same direction;
//! the most seen in three million instruments and standards at random was 5·2^-30.
//!
//! # In a walk
//! [`Correction::step`] is the instrument as a two-port between a chain and its readings. Of e10 and
//! e01 only the product is known, and with it the ratio of the waves but not their size: what a walk
//! through this step says of powers and stresses is without meaning.
//!
//! ```
//! use stagebits_kernel::correction::{Correction, Standard};
//! use stagebits_kernel::{Chain, Frequency, Gamma, Scalar, State};
//!
//! // readings of an instrument that has nothing but a directivity error of 2^-6
//! let reading = |gamma: Gamma| Gamma { re: gamma.re + (1 << 24), ..gamma };
//! let standards = [Gamma::OPEN, Gamma::SHORT, Gamma::MATCHED].map(|reflection| Standard {
//!     reflection,
//!     reading: reading(reflection),
//! });
//! let correction = Correction::from_standards(&standards).unwrap();
//! assert_eq!(correction.directivity.re, Scalar::ONE.scaled(-6));
//!
//! // the load of a chain, here an empty one, from the reading at its other end
//! let chain = Chain::<Scalar, 1>::new(&[]).unwrap();
//! let point = chain.at::<i32>(&Frequency::new(7_000_000));
//! let input = correction.apply(reading(Gamma { re: 0, im: 1 << 29 }));
//! let load = point.walk_back(State::from_load(input));
//! assert_eq!(load.gamma(), Gamma { re: 0, im: 1 << 29 });
//! ```

mod error;
#[cfg(test)]
mod tests;

pub use error::CorrectionError;

use crate::immittance::Immittance;
use crate::readout::Gamma;
use crate::real::{Complex, Real};
use crate::scalar::Scalar;
use crate::stage::Step;
use crate::two_port::TwoPort;
use crate::word::Word;

/// A calibration standard at one frequency.
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Standard {
    /// What it is.
    pub reflection: Gamma,
    /// What the instrument reads of it.
    pub reading: Gamma,
}

/// The error terms of a one-port instrument at one frequency.
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct Correction {
    /// Directivity e00: the reading of a matched load.
    pub directivity: Complex<Scalar>,
    /// Reflection tracking e10·e01: gain on the way there and back.
    pub tracking: Complex<Scalar>,
    /// Source match e11: reflection of the instrument's port.
    pub source_match: Complex<Scalar>,
}

const ONE: Complex<Scalar> = Complex {
    re: Scalar::ONE,
    im: Scalar::ZERO,
};

impl Correction {
    /// That of an instrument without errors.
    pub const NONE: Self = Self {
        directivity: Complex::ZERO,
        tracking: ONE,
        source_match: Complex::ZERO,
    };

    /// The error terms by which the instrument reads the three standards as it does.
    ///
    /// # Errors
    /// [`CorrectionError`] if two standards are the same, or read the same, or if no instrument
    /// that can read every passive load reads them like that.
    pub fn from_standards(standards: &[Standard; 3]) -> Result<Self, CorrectionError> {
        let [first, second, third] = nearest_first(standards);
        let slope_of_second = slope(first, second)?;
        let slope_of_third = slope(first, third)?;
        if second.reflection == third.reflection {
            return Err(CorrectionError::SameReflection);
        }
        if second.reading == third.reading {
            return Err(CorrectionError::SameReading);
        }
        let reflection = first.reflection.to_scalars();
        let curvature = slope_of_second.minus(slope_of_third);
        let divisor = difference(second.reading, third.reading).plus(reflection.times(curvature));
        if divisor.is_zero() {
            return Err(CorrectionError::NoInstrument);
        }
        let source_match = curvature.times(divisor.reciprocal());
        let against_first = ONE.minus(source_match.times(reflection));
        let against_second = ONE.minus(source_match.times(second.reflection.to_scalars()));
        let tangent = slope_of_second.times(against_second);
        let correction = Self {
            directivity: first.reading.to_scalars().minus(tangent.times(reflection)),
            tracking: tangent.times(against_first),
            source_match,
        };
        if correction.reads_passive_loads() {
            Ok(correction)
        } else {
            Err(CorrectionError::NoInstrument)
        }
    }

    /// The instrument as a step from what it is connected to, its load side, to what it reads.
    ///
    /// [`Walk::pass`](crate::Walk::pass) goes from a state to that of its reading and
    /// [`Walk::pass_back`](crate::Walk::pass_back) from a reading's state to the one that has it,
    /// both but for a factor. Words of W bits leave an error of about 2^(5−W) in Γ, over |e10e01| on
    /// the way back; [`Correction::predict`] and [`Correction::apply`] have that of 30 bits.
    ///
    /// With the waves a = v + i and b = v − i, a ← a − e11·b and
    /// b ← e00·a + (e10e01 − e00·e11)·b.
    #[inline]
    pub fn step<W: Word>(&self) -> Step<Immittance<W>> {
        let Self {
            directivity,
            tracking,
            source_match,
        } = *self;
        let through = tracking.minus(directivity.times(source_match));
        let (sum, difference) = (ONE.plus(directivity), ONE.minus(directivity));
        let (more, less) = (through.minus(source_match), through.plus(source_match));
        Step::TwoPort(TwoPort {
            a: sum.plus(more),
            b: sum.minus(more),
            c: difference.minus(less),
            d: difference.plus(less),
        })
        .to_words()
    }

    /// Whether every |Γ| ≤ 1 has a reading, a matched load one within ±2, and no two the same.
    fn reads_passive_loads(&self) -> bool {
        let Complex { re, im } = self.source_match;
        let square = re.times(re).plus(im.times(im));
        // |scalar| < 2^(its exponent + 31)
        let within = |part: Scalar| part.is_zero() || part.exponent() + 31 <= 1;
        square.minus(Scalar::ONE).is_negative()
            && within(self.directivity.re)
            && within(self.directivity.im)
            && !self.tracking.is_zero()
    }

    /// The reflection that has this reading, Γ = m / (e10e01 + e11·m) with m = Γm − e00; saturates
    /// at ±2.
    ///
    /// For |Γ| ≤ 1 and |e11| ≤ 0.3 within 6·2^-30 of that of the terms.
    #[inline]
    pub fn apply(&self, reading: Gamma) -> Gamma {
        let wave = reading.to_scalars().minus(self.directivity);
        let divisor = self.tracking.plus(self.source_match.times(wave));
        Gamma::from_scalars(wave.times(divisor.reciprocal()))
    }

    /// The reading of this reflection, Γm = e00 + e10e01·Γ / (1 − e11·Γ); saturates at ±2.
    ///
    /// Inverse of [`Correction::apply`]. For |Γ| ≤ 1 and |e11| ≤ 0.3 within
    /// (2 + 9·|e10e01|)·2^-30 of that of the terms.
    #[inline]
    pub fn predict(&self, reflection: Gamma) -> Gamma {
        let reflection = reflection.to_scalars();
        let divisor = ONE.minus(self.source_match.times(reflection));
        let wave = self.tracking.times(reflection).times(divisor.reciprocal());
        Gamma::from_scalars(self.directivity.plus(wave))
    }
}

/// The standards, that with the smallest reflection first: the errors of the slopes count least.
fn nearest_first(&[a, b, c]: &[Standard; 3]) -> [Standard; 3] {
    let size = |standard: Standard| {
        let Gamma { re, im } = standard.reflection;
        re.unsigned_abs().max(im.unsigned_abs())
    };
    if size(a) <= size(b).min(size(c)) {
        [a, b, c]
    } else if size(b) <= size(c) {
        [b, a, c]
    } else {
        [c, a, b]
    }
}

/// Difference of the readings over that of the reflections.
fn slope(first: Standard, other: Standard) -> Result<Complex<Scalar>, CorrectionError> {
    if first.reflection == other.reflection {
        return Err(CorrectionError::SameReflection);
    }
    if first.reading == other.reading {
        return Err(CorrectionError::SameReading);
    }
    let run = difference(other.reflection, first.reflection);
    Ok(difference(other.reading, first.reading).times(run.reciprocal()))
}

/// a − b, rounded once.
fn difference(a: Gamma, b: Gamma) -> Complex<Scalar> {
    let part =
        |a: i32, b: i32| Scalar::from_i64(a as i64 - b as i64, -(Gamma::FRACTION_BITS as i32));
    Complex {
        re: part(a.re, b.re),
        im: part(a.im, b.im),
    }
}

//! How a complex number is written as two real ones.

use num_complex::Complex;

/// How a complex number is written as two real ones.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Format {
    /// `RI`: real and imaginary part.
    RealImaginary,
    /// `MA`: magnitude and angle in degrees.
    MagnitudeAngle,
    /// `DB`: magnitude in decibels, 20·lg, and angle in degrees.
    DecibelAngle,
}

/// What zero is written as in decibels: far below the smallest positive `f64`, −6466 dB, so that it
/// is read back as zero.
const ZERO_IN_DECIBELS: f64 = -9999.0;

impl Format {
    /// All of them.
    pub const ALL: [Self; 3] = [
        Self::RealImaginary,
        Self::MagnitudeAngle,
        Self::DecibelAngle,
    ];

    /// How the option line calls it.
    pub const fn name(self) -> &'static str {
        match self {
            Self::RealImaginary => "RI",
            Self::MagnitudeAngle => "MA",
            Self::DecibelAngle => "DB",
        }
    }

    /// The complex number that a pair stands for; not finite where its decibels are beyond `f64`.
    pub(super) fn complex(self, [first, second]: [f64; 2]) -> Complex<f64> {
        match self {
            Self::RealImaginary => Complex::new(first, second),
            Self::MagnitudeAngle => unit(second) * first,
            Self::DecibelAngle => unit(second) * 10_f64.powf(first / 20.0),
        }
    }

    /// The pair that stands for a complex number; its angle is within ±180°.
    pub(super) fn pair(self, value: Complex<f64>) -> [f64; 2] {
        let magnitude = value.norm();
        let angle = value.arg().to_degrees();
        match self {
            Self::RealImaginary => [value.re, value.im],
            Self::MagnitudeAngle => [magnitude, angle],
            Self::DecibelAngle if magnitude == 0.0 => [ZERO_IN_DECIBELS, 0.0],
            Self::DecibelAngle => [20.0 * magnitude.log10(), angle],
        }
    }
}

/// The number of magnitude 1 at an angle in degrees; exact at every quarter turn, so that an ideal
/// open or short stays one.
fn unit(degrees: f64) -> Complex<f64> {
    let degrees = degrees % 360.0;
    let quarter_turns = (degrees / 90.0).round();
    // Exact: both are within a factor of two of each other, or the second is zero.
    let (sin, cos) = (degrees - 90.0 * quarter_turns).to_radians().sin_cos();
    // From −4 to 4, so the conversion is exact.
    match (quarter_turns as i32).rem_euclid(4) {
        0 => Complex::new(cos, sin),
        1 => Complex::new(-sin, cos),
        2 => Complex::new(-cos, -sin),
        _ => Complex::new(sin, -cos),
    }
}

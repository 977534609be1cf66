//! What a Touchstone file holds: scattering parameters over frequency.

use std::fmt;

use num_complex::Complex;

use crate::diagnostic::Diagnostic;
use crate::quantity::Dimension;
use crate::reference::State;

/// Scattering parameters of a network with `PORTS` ports, 1 or 2, over frequency.
///
/// Has at least one point; frequencies are finite, zero or more, and ascend strictly; values are
/// finite, of any magnitude (a measured reflection may well exceed 1, and so may a gain).
#[derive(Clone, Debug, PartialEq)]
pub struct NPort<const PORTS: usize> {
    pub(super) reference: [f64; PORTS],
    pub(super) points: Vec<Point<PORTS>>,
}

/// A network with one port, such as an antenna.
pub type OnePort = NPort<1>;
/// A network with two ports.
pub type TwoPort = NPort<2>;

/// Scattering parameters at one frequency.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Point<const PORTS: usize> {
    /// Frequency in hertz.
    pub hertz: f64,
    /// `s[j − 1][k − 1]` is S_jk: the wave out of port j for a wave into port k.
    pub s: [[Complex<f64>; PORTS]; PORTS],
}

/// A network with the number of ports that its file has.
#[derive(Clone, Debug, PartialEq)]
pub enum Network {
    /// One port.
    OnePort(OnePort),
    /// Two ports.
    TwoPort(TwoPort),
}

/// Why parameters make no [`NPort`]. Ports and points are counted from 0.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Flaw {
    /// The reference resistance of this port is not within the limits of a resistance.
    Reference(usize),
    /// There is no point.
    NoPoint,
    /// The frequency of this point is not finite, negative, or not above that of the one before.
    Frequency(usize),
    /// A value of this point is not finite.
    Value(usize),
}

impl<const PORTS: usize> NPort<PORTS> {
    /// A network with a reference resistance in ohms for each port.
    ///
    /// # Errors
    /// Where the values are not what [`NPort`] promises.
    pub fn new(reference: [f64; PORTS], points: Vec<Point<PORTS>>) -> Result<Self, Flaw> {
        const { assert!(PORTS == 1 || PORTS == 2, "one- and two-ports only") }
        let limits = Dimension::Resistance.limits();
        if let Some(port) = reference.iter().position(|ohms| !limits.contains(ohms)) {
            return Err(Flaw::Reference(port));
        }
        if points.is_empty() {
            return Err(Flaw::NoPoint);
        }
        let mut last = None;
        for (index, point) in points.iter().enumerate() {
            let ascends = last.is_none_or(|last| point.hertz > last);
            if !point.hertz.is_finite() || point.hertz < 0.0 || !ascends {
                return Err(Flaw::Frequency(index));
            }
            if !point.s.iter().flatten().all(|value| value.is_finite()) {
                return Err(Flaw::Value(index));
            }
            last = Some(point.hertz);
        }
        Ok(Self { reference, points })
    }

    /// Reference resistance of each port in ohms.
    pub fn reference(&self) -> [f64; PORTS] {
        self.reference
    }

    /// The points, at least one, in ascending order of their frequencies.
    pub fn points(&self) -> &[Point<PORTS>] {
        &self.points
    }

    /// Lowest and highest frequency in hertz.
    pub fn range(&self) -> (f64, f64) {
        let last = self.points.len() - 1;
        (self.points[0].hertz, self.points[last].hertz)
    }

    /// The points between which all frequencies from `from` to `to` hertz lie: those within, and
    /// the nearest on either side where no point is on the end itself. `None` where the frequencies
    /// are not all between points.
    pub fn covering(&self, from: f64, to: f64) -> Option<&[Point<PORTS>]> {
        let first = self.points.partition_point(|point| point.hertz <= from);
        let last = self.points.partition_point(|point| point.hertz < to);
        self.points.get(first.checked_sub(1)?..=last)
    }
}

impl OnePort {
    /// Γ at `hertz`, on a straight line in the Γ plane between the points on either side; `None`
    /// outside of the range of frequencies.
    pub fn interpolate(&self, hertz: f64) -> Option<Complex<f64>> {
        match self.covering(hertz, hertz)? {
            [low, .., high] => {
                let share = (hertz - low.hertz) / (high.hertz - low.hertz);
                Some(low.s[0][0] * (1.0 - share) + high.s[0][0] * share)
            }
            points => points.first().map(|point| point.s[0][0]),
        }
    }

    /// The same one-port with Γ referred to `reference` ohms, finite and positive.
    ///
    /// `None` where a Γ is not finite then, as that of an active impedance of −`reference`; passive
    /// ones always are.
    #[must_use]
    pub fn referred_to(&self, reference: f64) -> Option<Self> {
        let [old] = self.reference;
        if old == reference {
            return Some(self.clone());
        }
        let refer = |point: &Point<1>| {
            let State { v, i } = State::from_gamma(point.s[0][0]);
            let i = i * (reference / old);
            let gamma = State { v, i }.gamma();
            gamma.is_finite().then_some(Point {
                hertz: point.hertz,
                s: [[gamma]],
            })
        };
        Some(Self {
            reference: [reference],
            points: self.points.iter().map(refer).collect::<Option<_>>()?,
        })
    }
}

impl Network {
    /// Number of ports.
    pub fn ports(&self) -> usize {
        match self {
            Self::OnePort(_) => 1,
            Self::TwoPort(_) => 2,
        }
    }

    /// The one-port that is needed.
    ///
    /// # Errors
    /// Where it is a two-port: a fault of `file`, the name of the file it comes from.
    pub fn one_port(self, file: &str) -> Result<OnePort, Diagnostic> {
        match self {
            Self::OnePort(one_port) => Ok(one_port),
            Self::TwoPort(_) => Err(Diagnostic::of_file(
                file,
                "the file is of a two-port; a one-port is wanted",
                "give the file of a one-port, .s1p",
            )),
        }
    }
}

impl fmt::Display for Flaw {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::Reference(port) => {
                let limits = Dimension::Resistance.limits();
                let (low, high) = (limits.start(), limits.end());
                write!(
                    f,
                    "the reference of port {} is not from {low:e} to {high:e} ohm",
                    port + 1
                )
            }
            Self::NoPoint => f.write_str("there is no point"),
            Self::Frequency(index) => write!(f, "the frequency of point {index} does not ascend"),
            Self::Value(index) => write!(f, "a value of point {index} is not finite"),
        }
    }
}

impl std::error::Error for Flaw {}

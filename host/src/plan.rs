//! The hardware as the chain file describes it, in SI units and `f64`.
//!
//! A [`Plan`] is what everything else starts from: the f64 reference evaluates it as it stands,
//! the image turns it into firmware words, and the envelope is drawn from its band and loads.
//! Values here have been checked by [`crate::chain_file`]: finite, in range, of the right dimension.

mod bank;

pub use bank::{BANK_STEPS_MAX, Bank, BankElement, BankStep, StepLoss, Switches};

use crate::touchstone::OnePort;

/// Speed of light in vacuum, m/s (SI definition).
pub const SPEED_OF_LIGHT: f64 = 299_792_458.0;

/// One neper in decibels: 20 / ln 10 (ISO 80000-3).
pub const DECIBELS_PER_NEPER: f64 = 20.0 / std::f64::consts::LN_10;

/// Most stages that a chain may have: the room that the firmware keeps for them.
pub const STAGE_CAPACITY: usize = 16;

/// A chain with all that is needed to evaluate and judge it.
#[derive(Clone, Debug, PartialEq)]
pub struct Plan {
    /// What the chain is, in the words of the chain file.
    pub title: String,
    /// Reference resistance R0 in ohms, real and positive.
    pub reference: f64,
    /// Frequencies to cover.
    pub band: Band,
    /// Loads to cover.
    pub loads: Loads,
    /// The arithmetic that the firmware will use.
    pub firmware: Firmware,
    /// How good the result has to be.
    pub accuracy: Accuracy,
    /// Stages from the radio side to the load side; 1 to [`STAGE_CAPACITY`] of them.
    pub stages: Vec<Stage>,
}

/// A closed range of frequencies in hertz.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Band {
    /// Lowest frequency, Hz, at least 1.
    pub from: u32,
    /// Highest frequency, Hz, at least `from`.
    pub to: u32,
    /// Number of grid points, ends included; 1 means `from` alone.
    pub points: u32,
}

impl Band {
    /// Frequency of a grid point in whole hertz, `index` from 0 to `points` − 1; evenly spaced.
    pub fn grid(&self, index: u32) -> u32 {
        let intervals = u64::from(self.points.max(2) - 1);
        let span = u64::from(self.to - self.from);
        // from + span · index / intervals, rounded half up
        let offset = (span * u64::from(index) * 2 + intervals) / (2 * intervals);
        self.from
            + u32::try_from(offset)
                .unwrap_or(u32::MAX)
                .min(self.to - self.from)
    }
}

/// Which reflection coefficients, referred to [`Plan::reference`], the chain may be loaded with.
#[derive(Clone, Debug, PartialEq)]
pub enum Loads {
    /// Every load whose standing wave ratio is at most this value (≥ 1): a disc in the Γ plane.
    SwrUpTo(f64),
    /// A list of impedances in ohms, (R, X) with R ≥ 0.
    Impedances(Vec<(f64, f64)>),
    /// One load at each frequency, as measured: referred to [`Plan::reference`], passive, and over
    /// all of [`Plan::band`].
    Measured(OnePort),
    /// One load at each frequency: a branch in [`Arrangement::Series`], from port to ground.
    SeriesModel(Branch),
}

/// The arithmetic on the target.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Firmware {
    /// Word length in bits, sign included: 16 or 32.
    pub word_bits: u32,
}

/// What the user accepts as good enough.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Accuracy {
    /// Largest acceptable |ΔΓ| at the input of the chain.
    pub gamma: f64,
}

/// One two-port of the chain.
#[derive(Clone, Debug, PartialEq)]
pub struct Stage {
    /// Name from the chain file, or one made from the kind and position.
    pub name: String,
    /// What it is made of.
    pub part: Part,
}

/// The kinds of two-port.
#[derive(Clone, Debug, PartialEq)]
pub enum Part {
    /// An immittance in the through path or from the through path to ground.
    Branch(Position, Branch),
    /// A length of line in the through path.
    Line(Line),
    /// A line with its far end open or shorted, in series or in shunt.
    Stub(Position, Termination, Line),
    /// An ideal transformer: voltage at the radio side = `ratio` × voltage at the load side.
    Transformer {
        /// Turns ratio, radio side to load side, positive.
        ratio: f64,
    },
    /// Switched coils or capacitors, in series or in shunt.
    Bank(Position, Bank),
}

/// Where a branch, a stub or a bank sits.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Position {
    /// In the through path.
    Series,
    /// From the through path to ground.
    Shunt,
}

/// The far end of a stub.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Termination {
    /// Open circuit.
    Open,
    /// Short circuit.
    Short,
}

/// How the elements of a branch are joined to each other.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Arrangement {
    /// One after the other: impedances add (a series-resonant circuit, where L and C are present).
    Series,
    /// Side by side: admittances add (a parallel-resonant circuit, where L and C are present).
    Parallel,
}

/// A branch of up to one resistor, one coil and one capacitor; at least one of them is present.
///
/// With a single element the arrangement has no effect and is [`Arrangement::Series`].
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Branch {
    /// How the elements are joined.
    pub arrangement: Arrangement,
    /// Resistance in ohms, positive.
    pub resistance: Option<f64>,
    /// The coil.
    pub inductor: Option<Reactor>,
    /// The capacitor.
    pub capacitor: Option<Reactor>,
}

/// A coil or a capacitor with its loss.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Reactor {
    /// Inductance in henries or capacitance in farads, positive.
    pub value: f64,
    /// Where its loss comes from.
    pub loss: Loss,
}

/// Loss of a coil or a capacitor, always seen as a resistance in series with it.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Loss {
    /// None.
    Lossless,
    /// Series resistance = reactance magnitude ÷ Q at every frequency.
    Q(f64),
    /// The same series resistance in ohms at every frequency.
    Esr(f64),
}

/// A uniform line with a real characteristic impedance.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Line {
    /// Characteristic impedance in ohms, real and positive.
    pub impedance: f64,
    /// Length in metres, positive.
    pub length: f64,
    /// Velocity factor, 0 < v ≤ 1.
    pub velocity: f64,
    /// Conductor loss: nepers per metre per √Hz, ≥ 0.
    pub k1: f64,
    /// Dielectric loss: nepers per metre per Hz, ≥ 0.
    pub k2: f64,
}

impl Line {
    /// Attenuation constant α in nepers per metre at `hertz`: k1·√f + k2·f.
    pub fn attenuation(&self, hertz: f64) -> f64 {
        self.k1 * hertz.sqrt() + self.k2 * hertz
    }

    /// Time of travel from end to end in seconds; the electrical length in turns is f × this.
    pub fn delay(&self) -> f64 {
        self.length / (self.velocity * SPEED_OF_LIGHT)
    }
}

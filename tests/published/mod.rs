//! Chains with published or independently computed results, as data.
//!
//! [`chains`] is the whole table. Each entry holds a real [`Plan`], so the same table serves any
//! evaluator of plans. Values called exact were computed at 50 digits by two independent routes and
//! rounded to `f64`; printed figures stand as the source prints them.

// Each test program uses its own part of this shared table.
#![allow(dead_code, reason = "shared by several test programs")]

pub(crate) mod build;
mod cables;
mod filters;
mod ladders;
mod lines;
mod matching;
mod networks;
mod pads;
mod power;
mod prototypes;
mod quantity;
#[path = "../tolerance.rs"]
pub(crate) mod tolerance;
mod two_ports;
mod works;

pub(crate) use power::{L_SECTION_TITLE, STANDING_WAVE_TITLE};
pub(crate) use quantity::Quantity;
pub(crate) use two_ports::FRICKEY_TITLE;

use num_complex::Complex;
use stagebits::plan::{Accuracy, Band, Firmware, Loads, Plan, Stage};
use stagebits::reference;

/// A chain and what is known about it.
pub(crate) struct Chain {
    /// Where it comes from.
    pub(crate) source: Source,
    /// The chain; its title names the check and its band spans the frequencies of `cases`.
    pub(crate) plan: Plan,
    /// What goes into the chain, as far as the source prints it: part values, loads.
    pub(crate) inputs: Vec<Input>,
    /// What the chain does.
    pub(crate) cases: Vec<Case>,
}

/// A publication and the place in it.
#[derive(Clone, Copy, Debug)]
pub(crate) struct Source {
    /// Author, title, edition.
    pub(crate) work: &'static str,
    /// Section, table or example.
    pub(crate) place: &'static str,
    /// The figure was recalled, not looked up.
    pub(crate) from_memory: bool,
}

/// A value that goes into a chain beside the figure printed for it.
pub(crate) struct Input {
    /// Name and unit of the printed figure.
    pub(crate) label: &'static str,
    /// What the source says.
    pub(crate) expected: Expected,
    /// What the chain uses, in the unit of the printed figure.
    pub(crate) used: f64,
}

/// One frequency and one load.
pub(crate) struct Case {
    /// Frequency in hertz.
    pub(crate) hertz: u32,
    /// The load.
    pub(crate) load: Load,
    /// Results at the radio side.
    pub(crate) figures: Vec<Figure>,
}

/// What the chain ends in.
#[derive(Clone, Copy, Debug)]
pub(crate) enum Load {
    /// An impedance in ohms.
    Ohms(Complex<f64>),
    /// A reflection coefficient referred to the reference resistance of the plan.
    Gamma(Complex<f64>),
    /// Nothing connected.
    Open,
    /// A short circuit.
    Short,
}

impl Load {
    /// Reflection coefficient referred to `r0` ohms.
    pub(crate) fn gamma(self, r0: f64) -> Complex<f64> {
        match self {
            Self::Ohms(ohms) => reference::gamma_from_impedance(ohms, r0),
            Self::Gamma(gamma) => gamma,
            Self::Open => Complex::new(1.0, 0.0),
            Self::Short => Complex::new(-1.0, 0.0),
        }
    }
}

/// An expected result.
pub(crate) struct Figure {
    /// What is read out.
    pub(crate) quantity: Quantity,
    /// What it has to be.
    pub(crate) expected: Expected,
}

/// An expected value with what it takes to meet it.
#[derive(Clone, Copy, Debug)]
pub(crate) enum Expected {
    /// Computed at high precision; met within [`tolerance::EXACT`].
    Exact(f64),
    /// As printed; met within half a unit of the last printed place.
    Printed(&'static str),
    /// The source is off: `exact` must be met, and the printed figure must not.
    Misprinted {
        /// As printed.
        printed: &'static str,
        /// The value it should have been.
        exact: f64,
        /// How the source came to print it.
        why: &'static str,
    },
}

impl Expected {
    /// Checks `value`, where `scale` is the magnitude at which a small exact value counts as zero.
    pub(crate) fn check(&self, value: f64, scale: f64) -> Result<(), String> {
        match *self {
            Self::Exact(exact) => tolerance::exact(value, exact, scale),
            Self::Printed(printed) => tolerance::printed(value, printed),
            Self::Misprinted {
                printed,
                exact,
                why,
            } => {
                tolerance::exact(value, exact, scale)?;
                match tolerance::printed(value, printed) {
                    Ok(()) => Err(format!(
                        "{value} does print as {printed}, so no need for: {why}"
                    )),
                    Err(_) => Ok(()),
                }
            }
        }
    }
}

impl Chain {
    /// A chain of `stages`, radio side first, with reference resistance `r0`; no cases yet.
    fn new(title: &str, source: Source, r0: f64, stages: Vec<Stage>) -> Self {
        Self {
            source,
            plan: Plan {
                title: title.to_owned(),
                reference: r0,
                band: Band {
                    from: u32::MAX,
                    to: 1,
                    points: 2,
                },
                loads: Loads::SwrUpTo(10.0),
                firmware: Firmware { word_bits: 32 },
                accuracy: Accuracy { gamma: 1e-6 },
                stages,
            },
            inputs: Vec::new(),
            cases: Vec::new(),
        }
    }

    fn case(mut self, hertz: u32, load: Load, figures: impl IntoIterator<Item = Figure>) -> Self {
        self.plan.band.from = self.plan.band.from.min(hertz);
        self.plan.band.to = self.plan.band.to.max(hertz);
        self.cases.push(Case {
            hertz,
            load,
            figures: figures.into_iter().collect(),
        });
        self
    }

    fn input(mut self, label: &'static str, expected: Expected, used: f64) -> Self {
        self.inputs.push(Input {
            label,
            expected,
            used,
        });
        self
    }
}

/// The whole table.
pub(crate) fn chains() -> Vec<Chain> {
    [
        two_ports::chains(),
        networks::chains(),
        matching::chains(),
        lines::chains(),
        cables::chains(),
        ladders::chains(),
        filters::chains(),
        pads::chains(),
        power::chains(),
    ]
    .into_iter()
    .flatten()
    .collect()
}

//! Banks of switched coils or capacitors, and which of their steps are on.

use super::{Part, Plan, STAGE_CAPACITY, Stage};

/// Most steps of a bank.
pub const BANK_STEPS_MAX: usize = stagebits_kernel::BANK_STEPS_MAX as usize;

/// Coils or capacitors that relays switch in and out.
///
/// A step is *on* when its element is in the circuit. Capacitors stand side by side, each in series
/// with its contact, which is closed when the step is on. Coils stand one after the other, each with
/// its contact across it, which is open when the step is on:
///
/// ```text
/// capacitors   Y = Σ 1/(Z + Zc)        coils   Z = Σ 1/(1/Z + 1/Zc)
/// ```
///
/// with the impedance Z of the element, its loss included, and Zc of the contact: `contact` ohms
/// closed, that of the capacitance `stray` open. With all steps off, a capacitor bank is that of the
/// elements behind their strays, and a coil bank that of the contacts.
#[derive(Clone, Debug, PartialEq)]
pub struct Bank {
    /// What is switched.
    pub element: BankElement,
    /// What the losses of the steps are.
    pub loss: StepLoss,
    /// 1 to [`BANK_STEPS_MAX`] steps, in the order of the bits that switch them.
    pub steps: Vec<BankStep>,
    /// Resistance of each closed contact in ohms, 0 if it has none.
    pub contact: f64,
    /// Capacitance of each open contact in farads, 0 if it has none.
    pub stray: f64,
}

/// What a bank switches.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum BankElement {
    /// Coils.
    Coils,
    /// Capacitors.
    Capacitors,
}

/// Where the losses of a bank's steps come from.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum StepLoss {
    /// [`BankStep::loss`] is 1/Q, the series resistance over the magnitude of the reactance at every
    /// frequency.
    Dissipation,
    /// [`BankStep::loss`] is a series resistance in ohms, the same at every frequency.
    Resistance,
}

/// The element of one step.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct BankStep {
    /// Inductance in henries or capacitance in farads, positive.
    pub value: f64,
    /// Its loss as [`Bank::loss`] says, 0 if it has none.
    pub loss: f64,
}

/// Which steps of a chain's banks are on: a word for each bank, radio side first, in which bit k is
/// set if the step k, counted from 0, is on.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct Switches {
    /// The words; those beyond the chain's banks do nothing.
    pub words: [u16; STAGE_CAPACITY],
}

impl Switches {
    /// All steps off.
    pub const OFF: Self = Self {
        words: [0; STAGE_CAPACITY],
    };
}

impl Bank {
    /// The word with all steps on.
    pub fn all_on(&self) -> u16 {
        u16::MAX >> (BANK_STEPS_MAX - self.steps.len())
    }
}

impl Plan {
    /// The banks with their stages, radio side first.
    pub fn banks(&self) -> impl Iterator<Item = (&Stage, &Bank)> {
        self.stages.iter().filter_map(|stage| match &stage.part {
            Part::Bank(_, bank) => Some((stage, bank)),
            _ => None,
        })
    }
}

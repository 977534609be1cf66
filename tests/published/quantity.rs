//! What can be read out of a chain.

use num_complex::Complex;
use stagebits::reference::{self, FrequencyPoint, State};

/// A real figure at the radio side of a chain.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) enum Quantity {
    /// Magnitude of the input reflection coefficient.
    GammaMagnitude,
    /// Its angle in degrees.
    GammaDegrees,
    /// Input resistance, ohms.
    Resistance,
    /// Input reactance, ohms.
    Reactance,
    /// Input conductance, siemens.
    Conductance,
    /// Input susceptance, siemens.
    Susceptance,
    /// Standing wave ratio at the input.
    Swr,
    /// Return loss at the input, dB.
    ReturnLoss,
    /// Available power over delivered power, dB, the source having the reference resistance.
    TransducerLoss,
    /// Power into the chain over power into the load, dB.
    PowerLoss,
    /// One entry of the chain matrix, ohmic.
    Entry(Entry, Component),
    /// One scattering parameter.
    Scattering(Scattering, Component),
}

/// An entry of the chain matrix.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) enum Entry {
    A,
    B,
    C,
    D,
}

/// A scattering parameter.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) enum Scattering {
    S11,
    S12,
    S21,
    S22,
}

/// A real number taken from a complex one.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) enum Component {
    Re,
    Im,
    Magnitude,
}

impl Component {
    fn of(self, value: Complex<f64>) -> f64 {
        match self {
            Self::Re => value.re,
            Self::Im => value.im,
            Self::Magnitude => value.norm(),
        }
    }
}

impl Quantity {
    /// From the state at the radio side, `r0` in ohms; `None` where it takes more than the state.
    pub(crate) fn of_state(self, state: &State, r0: f64) -> Option<f64> {
        let gamma = state.gamma();
        Some(match self {
            Self::GammaMagnitude => gamma.norm(),
            Self::GammaDegrees => gamma.arg().to_degrees(),
            Self::Resistance => state.impedance(r0).re,
            Self::Reactance => state.impedance(r0).im,
            Self::Conductance => state.admittance(r0).re,
            Self::Susceptance => state.admittance(r0).im,
            Self::Swr => reference::swr(gamma.norm()),
            Self::ReturnLoss => reference::return_loss_db(gamma.norm()),
            Self::TransducerLoss | Self::PowerLoss | Self::Entry(..) | Self::Scattering(..) => {
                return None;
            }
        })
    }

    /// From the reference: `point` and the reflection coefficient of the load.
    pub(crate) fn of_point(self, point: &FrequencyPoint, r0: f64, gamma_load: Complex<f64>) -> f64 {
        match self {
            Self::TransducerLoss => -10.0 * point.transducer_gain(gamma_load).log10(),
            Self::PowerLoss => {
                let powers = point
                    .states(gamma_load)
                    .iter()
                    .map(State::power)
                    .collect::<Vec<_>>();
                10.0 * (powers[0] / powers[powers.len() - 1]).log10()
            }
            Self::Entry(entry, component) => {
                // The inverse of the normalisation.
                let ohmic = point.chain().normalised(1.0 / r0);
                component.of(match entry {
                    Entry::A => ohmic.a,
                    Entry::B => ohmic.b,
                    Entry::C => ohmic.c,
                    Entry::D => ohmic.d,
                })
            }
            Self::Scattering(parameter, component) => {
                let s = point.s_parameters();
                component.of(match parameter {
                    Scattering::S11 => s.s11,
                    Scattering::S12 => s.s12,
                    Scattering::S21 => s.s21,
                    Scattering::S22 => s.s22,
                })
            }
            _ => self
                .of_state(&point.input_state(gamma_load), r0)
                .expect("everything else follows from the state"),
        }
    }

    /// Magnitude below which a value of this quantity is as good as zero before rounding.
    pub(crate) fn scale(self, r0: f64) -> f64 {
        match self {
            Self::Resistance | Self::Reactance | Self::Entry(Entry::B, _) => r0,
            Self::Conductance | Self::Susceptance | Self::Entry(Entry::C, _) => 1.0 / r0,
            Self::GammaDegrees => 180.0,
            _ => 1.0,
        }
    }
}

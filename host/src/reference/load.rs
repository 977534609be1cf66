//! Loads that depend on the frequency.

use super::gamma_from_impedance;
use super::immittance::Immittance;
use crate::plan::Loads;
use num_complex::Complex;

/// The load at `hertz` > 0, referred to `reference` ohms, which is that of the plan, where there is
/// one for each frequency.
///
/// `None` where `loads` are the same set at every frequency, and outside of the frequencies of a
/// measured load.
pub fn load_gamma(loads: &Loads, reference: f64, hertz: f64) -> Option<Complex<f64>> {
    match loads {
        Loads::SwrUpTo(_) | Loads::Impedances(_) => None,
        Loads::Measured(one_port) => one_port.interpolate(hertz),
        Loads::SeriesModel(branch) => {
            let impedance = Immittance::of_branch(branch, hertz).impedance();
            Some(gamma_from_impedance(impedance, reference))
        }
    }
}

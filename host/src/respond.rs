//! What a chain does over its band with one load: in `f64`, and beside it the firmware's words.

use num_complex::Complex;
use stagebits_kernel::{Gamma, Word};

use crate::arithmetic::{to_complex, to_gamma};
use crate::comparison::Comparison;
use crate::constants::Constants;
use crate::plan::{Plan, Switches};
use crate::reference::{self, Matrix, Reference, SParameters};

/// The response over the grid of the band.
#[derive(Clone, Debug)]
pub struct Response {
    /// Word length of the firmware's Γ.
    pub word_bits: u32,
    /// The load, where it is the same at every frequency.
    pub load: Option<Complex<f64>>,
    /// Which steps of the banks are on.
    pub switches: Switches,
    /// One entry per grid frequency.
    pub points: Vec<ResponsePoint>,
}

/// The response at one frequency. Everything but `word_gamma` is the `f64` reference.
#[derive(Clone, Debug)]
pub struct ResponsePoint {
    /// Frequency in hertz.
    pub hertz: u32,
    /// Load as the firmware takes it in, referred to the reference resistance.
    pub load: Complex<f64>,
    /// Γ at the input, referred to the reference resistance.
    pub gamma: Complex<f64>,
    /// Input impedance in ohms.
    pub impedance: Complex<f64>,
    /// Standing wave ratio at the input.
    pub swr: f64,
    /// −20 log₁₀ |Γ|, dB.
    pub return_loss: f64,
    /// Power in the load over power available from a source of the reference resistance, dB.
    pub gain: f64,
    /// Power lost in each stage over power entering it, dB ≥ 0; radio side first.
    pub stage_losses: Vec<f64>,
    /// Chain matrix of the whole, in ohms and siemens.
    pub abcd: Matrix,
    /// S-parameters of the whole, referred to the reference resistance.
    pub s: SParameters,
    /// Γ at the input from the firmware's words.
    pub word_gamma: Complex<f64>,
}

/// Evaluates `plan` over its grid with a load of `load` (Γ) and its banks in the state `switches`,
/// the firmware in words of type `W`.
///
/// Without `load`, the plan's own load at each frequency is taken. Loads are rounded to the format
/// in which firmware takes them, and both sides see that.
///
/// # Panics
/// If there is no `load` and the plan's loads are a set.
pub fn respond<W: Word>(
    plan: &Plan,
    exact: &Constants<f64>,
    load: Option<Complex<f64>>,
    switches: &Switches,
) -> Response {
    let comparison = Comparison::<W>::new(plan, exact);
    let reference = Reference::new(plan);
    let load = load.map(to_gamma);
    let points = (0..plan.band.points)
        .map(|index| {
            let hertz = plan.band.grid(index);
            let load = load.unwrap_or_else(|| {
                let own = reference::load_gamma(&plan.loads, plan.reference, f64::from(hertz));
                to_gamma(own.expect("one load per frequency, over the whole band"))
            });
            let word_gamma = comparison.at_state(hertz, switches).word_gamma(load);
            point(plan, &reference, hertz, load, switches, word_gamma)
        })
        .collect();
    Response {
        word_bits: W::BITS,
        load: load.map(to_complex),
        switches: *switches,
        points,
    }
}

fn point(
    plan: &Plan,
    reference: &Reference<'_>,
    hertz: u32,
    load: Gamma,
    switches: &Switches,
    word_gamma: Complex<f64>,
) -> ResponsePoint {
    let load = to_complex(load);
    let at = reference.at_state(f64::from(hertz), switches);
    let input = at.input_state(load);
    let gamma = input.gamma();
    let powers: Vec<f64> = at.states(load).iter().map(|state| state.power()).collect();
    ResponsePoint {
        hertz,
        load,
        gamma,
        impedance: input.impedance(plan.reference),
        swr: reference::swr(gamma.norm()),
        return_loss: reference::return_loss_db(gamma.norm()),
        gain: 10.0 * at.transducer_gain(load).log10(),
        stage_losses: powers
            .windows(2)
            .map(|side| 10.0 * (side[0] / side[1]).log10())
            .collect(),
        abcd: reference::chain_matrix_at_state(&plan.stages, f64::from(hertz), switches),
        s: at.s_parameters(),
        word_gamma,
    }
}

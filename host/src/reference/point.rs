//! A chain at one frequency, made once and then used for any number of loads.

use super::stage::stage_matrices;
use super::{Matrix, SParameters, State};
use crate::plan::{Plan, Stage, Switches};
use num_complex::Complex;

/// A chain ready to be evaluated at any frequency.
#[derive(Clone, Copy, Debug)]
pub struct Reference<'plan> {
    reference: f64,
    stages: &'plan [Stage],
}

impl<'plan> Reference<'plan> {
    /// The chain of `plan`, normalised to its reference resistance.
    pub fn new(plan: &'plan Plan) -> Self {
        Self {
            reference: plan.reference,
            stages: &plan.stages,
        }
    }

    /// Everything about the chain at `hertz` > 0 that does not depend on the load, with all steps
    /// of its banks off.
    pub fn at(&self, hertz: f64) -> FrequencyPoint {
        self.at_state(hertz, &Switches::OFF)
    }

    /// The same with the banks in this state.
    pub fn at_state(&self, hertz: f64, switches: &Switches) -> FrequencyPoint {
        let stages: Vec<Matrix> = stage_matrices(self.stages, hertz, switches)
            .map(|matrix| matrix.normalised(self.reference))
            .collect();
        let mut prefixes = Vec::with_capacity(stages.len() + 1);
        let mut prefix = Matrix::IDENTITY;
        prefixes.push(prefix);
        for stage in &stages {
            prefix = prefix * *stage;
            prefixes.push(prefix);
        }
        FrequencyPoint { stages, prefixes }
    }
}

/// A chain of N stages at one frequency. All matrices are normalised: they act on v = V, i = R0·I.
#[derive(Clone, Debug, PartialEq)]
pub struct FrequencyPoint {
    /// M_1 … M_N, radio side first.
    pub stages: Vec<Matrix>,
    /// N + 1 products from the radio side: `prefixes[k]` = M_1·…·M_k, `prefixes[0]` = identity.
    pub prefixes: Vec<Matrix>,
}

impl FrequencyPoint {
    /// The whole chain, M_1·…·M_N.
    pub fn chain(&self) -> &Matrix {
        &self.prefixes[self.stages.len()]
    }

    /// State at the radio side for a load with reflection coefficient `gamma_load`; one
    /// matrix-vector product.
    pub fn input_state(&self, gamma_load: Complex<f64>) -> State {
        apply(self.chain(), State::from_gamma(gamma_load))
    }

    /// Input reflection coefficient for a load `gamma_load`, both referred to R0.
    pub fn input_gamma(&self, gamma_load: Complex<f64>) -> Complex<f64> {
        self.input_state(gamma_load).gamma()
    }

    /// Input reflection coefficient from the `state` at the load side of stage k (counted from 1;
    /// k = 0 is the radio side itself), where stages k+1 … N have been walked in whatever
    /// arithmetic. The scale of `state` does not matter. One matrix-vector product.
    ///
    /// # Panics
    /// If `k` exceeds the number of stages.
    pub fn input_gamma_after(&self, k: usize, state: State) -> Complex<f64> {
        apply(&self.prefixes[k], state).gamma()
    }

    /// The N + 1 states along the chain for a load `gamma_load`: `[k]` is the state at the load
    /// side of stage k, `[0]` the input and `[N]` the load. Walked stage by stage from the load.
    pub fn states(&self, gamma_load: Complex<f64>) -> Vec<State> {
        let mut state = State::from_gamma(gamma_load);
        let mut states = Vec::with_capacity(self.prefixes.len());
        states.push(state);
        for stage in self.stages.iter().rev() {
            state = apply(stage, state);
            states.push(state);
        }
        states.reverse();
        states
    }

    /// Scattering parameters referred to R0. Every part of a plan is reciprocal, so S12 is S21.
    pub fn s_parameters(&self) -> SParameters {
        let s = SParameters::from_normalised(self.chain());
        SParameters { s12: s.s21, ..s }
    }

    /// Power delivered to the load `gamma_load` over power available from a source of resistance
    /// R0 at the radio side: 4·(1 − |Γ|²)/|v + i|² with the input state of that load.
    pub fn transducer_gain(&self, gamma_load: Complex<f64>) -> f64 {
        let input = self.input_state(gamma_load);
        4.0 * State::from_gamma(gamma_load).power() / (input.v + input.i).norm_sqr()
    }
}

fn apply(matrix: &Matrix, state: State) -> State {
    let (v, i) = matrix.apply(state.v, state.i);
    State { v, i }
}

/// Input reflection coefficient of `plan` at `hertz` > 0 for a load `gamma_load`, both referred to
/// the reference resistance of the plan, all steps of banks off. For many loads at one frequency use
/// [`Reference::at`].
pub fn input_gamma(plan: &Plan, hertz: f64, gamma_load: Complex<f64>) -> Complex<f64> {
    Reference::new(plan).at(hertz).input_gamma(gamma_load)
}

/// Input impedance of `plan` in ohms at `hertz` > 0 for a load `gamma_load`, all steps of banks off;
/// infinite for an open.
pub fn input_impedance(plan: &Plan, hertz: f64, gamma_load: Complex<f64>) -> Complex<f64> {
    Reference::new(plan)
        .at(hertz)
        .input_state(gamma_load)
        .impedance(plan.reference)
}

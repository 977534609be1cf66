//! From a stage of the plan to its chain matrix.

use super::immittance::Immittance;
use super::{Matrix, angle};
use crate::plan::{Line, Part, Position, Stage, Switches};
use num_complex::Complex;

/// Ohmic chain matrix of one stage at `hertz` > 0, all its steps off if it is a bank.
pub fn stage_matrix(stage: &Stage, hertz: f64) -> Matrix {
    stage_matrix_at_state(stage, hertz, 0)
}

/// Ohmic chain matrix of one stage at `hertz` > 0 with, if it is a bank, the steps on whose bits are
/// set in `word`.
pub fn stage_matrix_at_state(stage: &Stage, hertz: f64, word: u16) -> Matrix {
    match &stage.part {
        Part::Branch(position, branch) => {
            two_terminal(*position, Immittance::of_branch(branch, hertz))
        }
        Part::Line(line) => line_matrix(line, hertz),
        Part::Stub(position, termination, line) => {
            two_terminal(*position, Immittance::of_stub(*termination, line, hertz))
        }
        Part::Transformer { ratio } => Matrix::transformer(*ratio),
        Part::Bank(position, bank) => {
            two_terminal(*position, Immittance::of_bank(bank, hertz, word))
        }
    }
}

/// Ohmic chain matrix of `stages`, radio side first, at `hertz` > 0 with all steps of banks off.
pub fn chain_matrix(stages: &[Stage], hertz: f64) -> Matrix {
    chain_matrix_at_state(stages, hertz, &Switches::OFF)
}

/// Ohmic chain matrix of `stages`, radio side first, at `hertz` > 0 with their banks in this state.
pub fn chain_matrix_at_state(stages: &[Stage], hertz: f64, switches: &Switches) -> Matrix {
    stage_matrices(stages, hertz, switches).fold(Matrix::IDENTITY, |chain, stage| chain * stage)
}

/// Ohmic chain matrix of each of `stages` at `hertz` > 0 with their banks in this state.
pub(super) fn stage_matrices(
    stages: &[Stage],
    hertz: f64,
    switches: &Switches,
) -> impl Iterator<Item = Matrix> {
    let mut words = switches.words.iter();
    stages.iter().map(move |stage| {
        let word = match &stage.part {
            Part::Bank(..) => words.next().copied().unwrap_or(0),
            _ => 0,
        };
        stage_matrix_at_state(stage, hertz, word)
    })
}

fn two_terminal(position: Position, immittance: Immittance) -> Matrix {
    match position {
        Position::Series => Matrix::series(immittance.impedance()),
        Position::Shunt => Matrix::shunt(immittance.admittance()),
    }
}

/// cosh γl on the diagonal, Z0·sinh γl and sinh γl / Z0 beside it, γl = αl + jβl.
fn line_matrix(line: &Line, hertz: f64) -> Matrix {
    let (sin, cos) = angle::sin_cos(line, hertz);
    let nepers = line.attenuation(hertz) * line.length;
    let (sinh, cosh) = (nepers.sinh(), nepers.cosh());
    let diagonal = Complex::new(cosh * cos, sinh * sin);
    let off_diagonal = Complex::new(sinh * cos, cosh * sin);
    Matrix {
        a: diagonal,
        b: off_diagonal * line.impedance,
        c: off_diagonal / line.impedance,
        d: diagonal,
    }
}

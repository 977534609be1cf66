//! From a stage of the plan to its chain matrix.

use super::immittance::Immittance;
use super::{Matrix, angle};
use crate::plan::{Line, Part, Position, Stage};
use num_complex::Complex;

/// Ohmic chain matrix of one stage at `hertz` > 0.
pub fn stage_matrix(stage: &Stage, hertz: f64) -> Matrix {
    match &stage.part {
        Part::Branch(position, branch) => {
            two_terminal(*position, Immittance::of_branch(branch, hertz))
        }
        Part::Line(line) => line_matrix(line, hertz),
        Part::Stub(position, termination, line) => {
            two_terminal(*position, Immittance::of_stub(*termination, line, hertz))
        }
        Part::Transformer { ratio } => Matrix::transformer(*ratio),
    }
}

/// Ohmic chain matrix of `stages`, radio side first, at `hertz` > 0.
pub fn chain_matrix(stages: &[Stage], hertz: f64) -> Matrix {
    stages.iter().fold(Matrix::IDENTITY, |chain, stage| {
        chain * stage_matrix(stage, hertz)
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

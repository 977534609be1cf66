//! Short names for stages and figures.

use super::quantity::{Component, Entry};
use super::{Expected, Figure, Load, Quantity, Source};
use num_complex::Complex;
use stagebits::plan::{
    Arrangement, Branch, Line, Loss, Part, Position, Reactor, SPEED_OF_LIGHT, Stage, Termination,
};
use std::f64::consts::TAU;

/// Velocity factor of the lines that the sources give by electrical length only.
const VELOCITY: f64 = 0.66;

/// A branch without elements, to be filled in.
const EMPTY: Branch = Branch {
    arrangement: Arrangement::Series,
    resistance: None,
    inductor: None,
    capacitor: None,
};

pub(crate) fn stage(part: Part) -> Stage {
    let name = match &part {
        Part::Branch(Position::Series, _) => "series branch",
        Part::Branch(Position::Shunt, _) => "shunt branch",
        Part::Line(_) => "line",
        Part::Stub(..) => "stub",
        Part::Transformer { .. } => "transformer",
        Part::Bank(..) => "bank",
    };
    Stage {
        name: name.to_owned(),
        part,
    }
}

pub(crate) fn series(branch: Branch) -> Stage {
    stage(Part::Branch(Position::Series, branch))
}

pub(crate) fn shunt(branch: Branch) -> Stage {
    stage(Part::Branch(Position::Shunt, branch))
}

pub(crate) fn transformer(ratio: f64) -> Stage {
    stage(Part::Transformer { ratio })
}

pub(crate) fn resistor(ohms: f64) -> Branch {
    Branch {
        resistance: Some(ohms),
        ..EMPTY
    }
}

pub(crate) fn inductor(henries: f64) -> Branch {
    Branch {
        inductor: Some(lossless(henries)),
        ..EMPTY
    }
}

pub(crate) fn capacitor(farads: f64) -> Branch {
    Branch {
        capacitor: Some(lossless(farads)),
        ..EMPTY
    }
}

/// L and C one after the other.
pub(crate) fn series_lc(henries: f64, farads: f64) -> Branch {
    Branch {
        capacitor: Some(lossless(farads)),
        ..inductor(henries)
    }
}

/// R and L one after the other.
pub(crate) fn series_rl(ohms: f64, henries: f64) -> Branch {
    Branch {
        resistance: Some(ohms),
        ..inductor(henries)
    }
}

/// R and C side by side.
pub(crate) fn parallel_rc(ohms: f64, farads: f64) -> Branch {
    Branch {
        arrangement: Arrangement::Parallel,
        resistance: Some(ohms),
        ..capacitor(farads)
    }
}

/// The R–L or R–C series branch that is `re` + j`im` ohms at `hertz`.
pub(crate) fn impedance(re: f64, im: f64, hertz: u32) -> Branch {
    let omega = TAU * f64::from(hertz);
    Branch {
        arrangement: Arrangement::Series,
        resistance: (re > 0.0).then_some(re),
        inductor: (im > 0.0).then(|| lossless(im / omega)),
        capacitor: (im < 0.0).then(|| lossless(-1.0 / (omega * im))),
    }
}

/// The parallel R–C or R–L branch that is `re` + j`im` siemens at `hertz`.
pub(crate) fn admittance(re: f64, im: f64, hertz: u32) -> Branch {
    let omega = TAU * f64::from(hertz);
    let resistance = (re > 0.0).then_some(1.0 / re);
    Branch {
        arrangement: if resistance.is_some() {
            Arrangement::Parallel
        } else {
            Arrangement::Series
        },
        resistance,
        inductor: (im < 0.0).then(|| lossless(-1.0 / (omega * im))),
        capacitor: (im > 0.0).then(|| lossless(im / omega)),
    }
}

fn lossless(value: f64) -> Reactor {
    Reactor {
        value,
        loss: Loss::Lossless,
    }
}

/// A lossless line of `turns` wavelengths at `hertz`.
pub(crate) fn line(ohms: f64, turns: f64, hertz: u32) -> Stage {
    stage(Part::Line(line_of(ohms, turns, hertz)))
}

/// A line of `turns` wavelengths and `nepers` at `hertz`, half of the loss from either mechanism.
pub(crate) fn lossy_line(ohms: f64, nepers: f64, turns: f64, hertz: u32) -> Stage {
    let lossless = line_of(ohms, turns, hertz);
    let alpha = nepers / lossless.length;
    stage(Part::Line(Line {
        k1: 0.5 * alpha / f64::from(hertz).sqrt(),
        k2: 0.5 * alpha / f64::from(hertz),
        ..lossless
    }))
}

pub(crate) fn stub(
    position: Position,
    termination: Termination,
    ohms: f64,
    turns: f64,
    hertz: u32,
) -> Stage {
    stage(Part::Stub(
        position,
        termination,
        line_of(ohms, turns, hertz),
    ))
}

fn line_of(ohms: f64, turns: f64, hertz: u32) -> Line {
    Line {
        impedance: ohms,
        length: turns * VELOCITY * SPEED_OF_LIGHT / f64::from(hertz),
        velocity: VELOCITY,
        k1: 0.0,
        k2: 0.0,
    }
}

pub(crate) fn ohms(re: f64, im: f64) -> Load {
    Load::Ohms(Complex::new(re, im))
}

/// A source whose figure was recalled, not looked up.
pub(crate) const fn from_memory(work: &'static str, place: &'static str) -> Source {
    Source {
        work,
        place,
        from_memory: true,
    }
}

/// A source whose figure was seen.
pub(crate) const fn seen(work: &'static str, place: &'static str) -> Source {
    Source {
        work,
        place,
        from_memory: false,
    }
}

/// A value known to full precision.
pub(crate) fn exact(quantity: Quantity, value: f64) -> Figure {
    Figure {
        quantity,
        expected: Expected::Exact(value),
    }
}

/// A figure as printed.
pub(crate) fn printed(quantity: Quantity, figure: &'static str) -> Figure {
    Figure {
        quantity,
        expected: Expected::Printed(figure),
    }
}

/// A figure that the source has wrong in the last places or more.
pub(crate) fn misprinted(
    quantity: Quantity,
    figure: &'static str,
    exact: f64,
    why: &'static str,
) -> Figure {
    Figure {
        quantity,
        expected: Expected::Misprinted {
            printed: figure,
            exact,
            why,
        },
    }
}

/// Exact input impedance in ohms.
pub(crate) fn zin(re: f64, im: f64) -> Vec<Figure> {
    vec![
        exact(Quantity::Resistance, re),
        exact(Quantity::Reactance, im),
    ]
}

/// Exact chain matrix, (re, im) each, ohms and siemens.
pub(crate) fn abcd(a: (f64, f64), b: (f64, f64), c: (f64, f64), d: (f64, f64)) -> Vec<Figure> {
    [(Entry::A, a), (Entry::B, b), (Entry::C, c), (Entry::D, d)]
        .into_iter()
        .flat_map(|(entry, (re, im))| {
            [
                exact(Quantity::Entry(entry, Component::Re), re),
                exact(Quantity::Entry(entry, Component::Im), im),
            ]
        })
        .collect()
}

/// Exact A and D of a symmetric two-port.
pub(crate) fn diagonal(re: f64, im: f64) -> Vec<Figure> {
    [Entry::A, Entry::D]
        .into_iter()
        .flat_map(|entry| {
            [
                exact(Quantity::Entry(entry, Component::Re), re),
                exact(Quantity::Entry(entry, Component::Im), im),
            ]
        })
        .collect()
}

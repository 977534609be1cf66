//! Random chains, frequencies and loads for property tests.
//!
//! Values span what tuners and instruments meet between 100 kHz and 3 GHz with a margin: reactances
//! and resistances from tenths of an ohm to tens of kilohms at the frequency drawn.

use num_complex::Complex;
use proptest::prelude::*;
use stagebits::plan::{
    Accuracy, Arrangement, Band, Branch, Firmware, Line, Loads, Loss, Part, Plan, Position,
    Reactor, SPEED_OF_LIGHT, Stage, Termination,
};
use std::f64::consts::TAU;

/// Whether the parts of a chain may turn power into heat.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) enum Dissipation {
    None,
    Allowed,
}

/// A chain of 1 to `longest` stages and the frequency that its values are scaled for.
pub(crate) fn plan(dissipation: Dissipation, longest: usize) -> impl Strategy<Value = (Plan, f64)> {
    (100_000_u32..3_000_000_000, 10.0..300.0_f64).prop_flat_map(move |(hertz, reference)| {
        let hertz_f64 = f64::from(hertz);
        prop::collection::vec(stage(dissipation, hertz_f64), 1..=longest)
            .prop_map(move |stages| (chain(stages, hertz, reference), hertz_f64))
    })
}

/// A plan of these stages at one frequency.
pub(crate) fn chain(stages: Vec<Stage>, hertz: u32, reference: f64) -> Plan {
    Plan {
        title: "random".to_owned(),
        reference,
        band: Band {
            from: hertz,
            to: hertz,
            points: 1,
        },
        loads: Loads::SwrUpTo(f64::INFINITY),
        firmware: Firmware { word_bits: 32 },
        accuracy: Accuracy { gamma: 1e-6 },
        stages,
    }
}

/// A reflection coefficient in the closed unit disc, its edge, open and short included.
pub(crate) fn gamma() -> impl Strategy<Value = Complex<f64>> {
    prop_oneof![
        6 => (0.0..=1.0_f64, 0.0..TAU).prop_map(|(area, angle)| Complex::from_polar(area.sqrt(), angle)),
        1 => (0.0..TAU).prop_map(|angle| Complex::from_polar(1.0, angle)),
        1 => prop::sample::select(vec![
            Complex::new(1.0, 0.0),
            Complex::new(-1.0, 0.0),
            Complex::new(0.0, 0.0),
        ]),
    ]
}

/// A lossless or lossy line of up to 20 wavelengths and, if lossy, up to 1 Np.
pub(crate) fn line(dissipation: Dissipation, hertz: f64) -> impl Strategy<Value = Line> {
    (
        10.0..300.0_f64,
        1e-3..20.0_f64,
        0.3..=1.0_f64,
        loss_split(dissipation),
    )
        .prop_map(
            move |(impedance, turns, velocity, (conductor, dielectric))| {
                let length = turns * velocity * SPEED_OF_LIGHT / hertz;
                Line {
                    impedance,
                    length,
                    velocity,
                    k1: conductor / length / hertz.sqrt(),
                    k2: dielectric / length / hertz,
                }
            },
        )
}

/// Nepers of conductor and of dielectric loss over the whole line.
fn loss_split(dissipation: Dissipation) -> BoxedStrategy<(f64, f64)> {
    match dissipation {
        Dissipation::None => Just((0.0, 0.0)).boxed(),
        Dissipation::Allowed => (0.0..0.5_f64, 0.0..0.5_f64).boxed(),
    }
}

fn stage(dissipation: Dissipation, hertz: f64) -> impl Strategy<Value = Stage> {
    let position = prop::sample::select(vec![Position::Series, Position::Shunt]);
    let termination = prop::sample::select(vec![Termination::Open, Termination::Short]);
    prop_oneof![
        4 => (position.clone(), branch(dissipation, hertz))
            .prop_map(|(position, branch)| Part::Branch(position, branch)),
        2 => line(dissipation, hertz).prop_map(Part::Line),
        2 => (position, termination, line(dissipation, hertz))
            .prop_map(|(position, termination, line)| Part::Stub(position, termination, line)),
        1 => (0.2..5.0_f64).prop_map(|ratio| Part::Transformer { ratio }),
    ]
    .prop_map(|part| Stage {
        name: "random".to_owned(),
        part,
    })
}

fn branch(dissipation: Dissipation, hertz: f64) -> impl Strategy<Value = Branch> {
    let omega = TAU * hertz;
    let arrangement = prop::sample::select(vec![Arrangement::Series, Arrangement::Parallel]);
    // Bit 0: coil, bit 1: capacitor, bit 2: resistor; at least one of them.
    let present = match dissipation {
        Dissipation::None => 1_u8..4,
        Dissipation::Allowed => 1..8,
    };
    let inductor = reactor(dissipation, move |x| x / omega);
    let capacitor = reactor(dissipation, move |x| 1.0 / (omega * x));
    (present, arrangement, ohms(), inductor, capacitor).prop_map(
        |(present, arrangement, resistance, inductor, capacitor)| Branch {
            arrangement: if present.is_power_of_two() {
                Arrangement::Series
            } else {
                arrangement
            },
            resistance: (present & 4 != 0).then_some(resistance),
            inductor: (present & 1 != 0).then_some(inductor),
            capacitor: (present & 2 != 0).then_some(capacitor),
        },
    )
}

fn reactor(
    dissipation: Dissipation,
    value_of_reactance: impl Fn(f64) -> f64,
) -> impl Strategy<Value = Reactor> {
    let loss = match dissipation {
        Dissipation::None => Just(Loss::Lossless).boxed(),
        Dissipation::Allowed => prop_oneof![
            Just(Loss::Lossless),
            (5.0..2000.0_f64).prop_map(Loss::Q),
            (0.01..10.0_f64).prop_map(Loss::Esr),
        ]
        .boxed(),
    };
    (ohms(), loss).prop_map(move |(reactance, loss)| Reactor {
        value: value_of_reactance(reactance),
        loss,
    })
}

/// 0.1 ohm to 30 kilohms, evenly over the decades.
fn ohms() -> impl Strategy<Value = f64> {
    (-1.0..4.5_f64).prop_map(|decades| 10_f64.powf(decades))
}

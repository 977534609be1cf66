//! Chain matrices of single parts, and conversions between descriptions.

use super::build::*;
use super::quantity::{Component, Quantity, Scattering};
use super::works::{FRICKEY, POZAR, ULABY};
use super::{Chain, Figure};
use std::f64::consts::TAU;

/// For parts whose source gives no frequency.
const F: u32 = 10_000_000;

/// Title of the chain that more than one test looks up.
pub(crate) const FRICKEY_TITLE: &str = "lossy three-stage chain between complex impedances";

pub(super) fn chains() -> Vec<Chain> {
    let mut chains = single_parts();
    chains.extend(conversions());
    chains
}

fn single_parts() -> Vec<Chain> {
    let table = from_memory(POZAR, "Table 4.1");
    let load = ohms(50.0, 0.0);
    vec![
        Chain::new(
            "series impedance 30 - j40 ohm",
            table,
            50.0,
            vec![series(impedance(30.0, -40.0, F))],
        )
        .case(
            F,
            load,
            abcd((1.0, 0.0), (30.0, -40.0), (0.0, 0.0), (1.0, 0.0)),
        ),
        Chain::new(
            "shunt admittance 0.02 + j0.01 S",
            table,
            50.0,
            vec![shunt(admittance(0.02, 0.01, F))],
        )
        .case(
            F,
            load,
            abcd((1.0, 0.0), (0.0, 0.0), (0.02, 0.01), (1.0, 0.0)),
        ),
        Chain::new(
            "lossless 50 ohm line of 60 degrees",
            table,
            50.0,
            vec![line(50.0, 1.0 / 6.0, F)],
        )
        .case(
            F,
            load,
            abcd(
                (0.5, 0.0),
                (0.0, 43.30127018922193),
                (0.0, 0.017320508075688773),
                (0.5, 0.0),
            ),
        ),
        Chain::new("ideal transformer 3:1", table, 50.0, vec![transformer(3.0)])
            .case(
                F,
                load,
                abcd(
                    (3.0, 0.0),
                    (0.0, 0.0),
                    (0.0, 0.0),
                    (0.3333333333333333, 0.0),
                ),
            )
            .case(F, load, zin(450.0, 0.0)),
        // A = D = 0: anything that divides by them fails here.
        Chain::new(
            "quarter-wave line as impedance inverter",
            from_memory(POZAR, "Sec. 2.5 and 8.8 (K-inverter)"),
            50.0,
            vec![line(75.0, 0.25, F)],
        )
        .case(
            F,
            ohms(25.0, -60.0),
            abcd(
                (0.0, 0.0),
                (0.0, 75.0),
                (0.0, 0.013333333333333334),
                (0.0, 0.0),
            ),
        )
        .case(
            F,
            ohms(25.0, -60.0),
            zin(33.28402366863905, 79.88165680473372),
        ),
        // The source has Z0 = 60 + j40 ohm, of which A and D are independent.
        Chain::new(
            "lossy line, gamma l = 1.84 + j2",
            from_memory(
                POZAR,
                "Sec. 2.7 and Table 4.1 with gamma in place of j beta",
            ),
            60.0,
            vec![lossy_line(60.0, 1.84, 2.0 / TAU, F)],
        )
        .case(F, load, diagonal(-1.3431879239936215, 2.7905068808834455)),
    ]
}

fn conversions() -> Vec<Chain> {
    let table = from_memory(POZAR, "Table 4.2");
    let matched = ohms(50.0, 0.0);
    let at = 50_000_000;
    vec![
        Chain::new(
            "50 ohm in series",
            table,
            50.0,
            vec![series(resistor(50.0))],
        )
        .case(F, matched, scattering(1.0 / 3.0, 2.0 / 3.0)),
        Chain::new("50 ohm in shunt", table, 50.0, vec![shunt(resistor(50.0))])
            .case(F, matched, scattering(-1.0 / 3.0, 2.0 / 3.0))
            .case(
                F,
                matched,
                [
                    printed(Quantity::TransducerLoss, "3.52"),
                    exact(Quantity::TransducerLoss, 3.5218251811136247),
                ],
            ),
        Chain::new(
            "3 dB T attenuator of 8.56 and 141.8 ohm",
            from_memory(POZAR, "Example 4.4"),
            50.0,
            vec![
                series(resistor(8.56)),
                shunt(resistor(141.8)),
                series(resistor(8.56)),
            ],
        )
        .case(
            F,
            matched,
            abcd(
                (1.0603667136812411, 0.0),
                (17.636739069111425, 0.0),
                (0.007052186177715092, 0.0),
                (1.0603667136812411, 0.0),
            ),
        )
        .case(
            F,
            matched,
            [
                misprinted(
                    Quantity::Scattering(Scattering::S21, Component::Magnitude),
                    "0.707",
                    0.7076946713326204,
                    "truncated, or carried from a rounded intermediate",
                ),
                printed(
                    Quantity::Scattering(Scattering::S11, Component::Magnitude),
                    "0.00",
                ),
                printed(Quantity::Resistance, "50"),
                exact(Quantity::Resistance, 50.00444000798563),
            ],
        ),
        Chain::new(
            FRICKEY_TITLE,
            from_memory(FRICKEY, "Table I"),
            50.0,
            vec![
                series(series_rl(1.5, 80e-9)),
                shunt(parallel_rc(2200.0, 47e-12)),
                lossy_line(75.0, 0.02, 0.8 / TAU, at),
            ],
        )
        .case(
            at,
            ohms(75.0, -25.0),
            abcd(
                (0.19808420167238092, 0.05144766247385985),
                (-0.46394277498126696, 51.449766833999185),
                (0.00029069270707683925, 0.01986245305194269),
                (-0.09724609303063117, 0.05424013875425346),
            ),
        )
        .case(
            at,
            ohms(75.0, -25.0),
            zin(33.08161425656773, -1.137096844513187),
        ),
        Chain::new(
            "50 ohm in series with 10 pF on a 100 ohm line",
            from_memory(ULABY, "Example 2-3"),
            100.0,
            vec![series(capacitor(10e-12))],
        )
        .case(
            100_000_000,
            ohms(50.0, 0.0),
            [
                printed(Quantity::Reactance, "-159"),
                exact(Quantity::Reactance, -159.15494309189535),
                printed(Quantity::GammaMagnitude, "0.76"),
                exact(Quantity::GammaMagnitude, 0.7627941929768209),
                printed(Quantity::GammaDegrees, "-60.7"),
                exact(Quantity::GammaDegrees, -60.744401797682535),
            ],
        ),
    ]
}

/// Real scattering parameters of a symmetric two-port.
fn scattering(reflection: f64, transmission: f64) -> Vec<Figure> {
    [
        (Scattering::S11, reflection),
        (Scattering::S12, transmission),
        (Scattering::S21, transmission),
        (Scattering::S22, reflection),
    ]
    .into_iter()
    .flat_map(|(parameter, value)| {
        [
            exact(Quantity::Scattering(parameter, Component::Re), value),
            exact(Quantity::Scattering(parameter, Component::Im), 0.0),
        ]
    })
    .collect()
}

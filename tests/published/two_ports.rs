//! Chain matrices of single parts and small networks, and conversions between descriptions.

use super::build::*;
use super::quantity::{Component, Entry, Quantity, Scattering};
use super::works::{FRICKEY, POZAR, THEORY, ULABY};
use super::{Chain, Figure, Load};
use stagebits::plan::{Position, Termination};
use std::f64::consts::TAU;

/// For parts whose source gives no frequency.
const F: u32 = 10_000_000;

/// Title of the chain that more than one test looks up.
pub(crate) const FRICKEY_TITLE: &str = "lossy three-stage chain between complex impedances";

pub(super) fn chains() -> Vec<Chain> {
    let mut chains = single_parts();
    chains.extend(networks());
    chains.extend(identities());
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

fn networks() -> Vec<Chain> {
    let tee = || {
        vec![
            series(impedance(10.0, 20.0, F)),
            shunt(admittance(1.0 / 150.0, 2.0 / 150.0, F)),
            series(impedance(15.0, -5.0, F)),
        ]
    };
    let mirrored = || tee().into_iter().rev().collect();
    let table = from_memory(POZAR, "Table 4.1");
    let parameters = from_memory(POZAR, "Table 4.2");
    let order = from_memory(POZAR, "Sec. 4.4 (matrix products do not commute)");
    vec![
        Chain::new("T network of complex impedances", table, 50.0, tee()).case(
            F,
            ohms(50.0, 0.0),
            abcd(
                (0.8, 0.26666666666666666),
                (23.333333333333332, 20.0),
                (0.006666666666666667, 0.013333333333333334),
                (1.1666666666666667, 0.16666666666666666),
            ),
        ),
        // Z11 and Y11 are what the radio side sees with the far side open and shorted.
        Chain::new("T network, Z11 and Y11", parameters, 50.0, tee())
            .case(F, Load::Open, zin(40.0, -40.0))
            .case(
                F,
                Load::Short,
                yin(0.03235294117647059, -0.020588235294117647),
            ),
        Chain::new("T network, Z22 and Y22", parameters, 50.0, mirrored())
            .case(F, Load::Open, zin(45.0, -65.0))
            .case(
                F,
                Load::Short,
                yin(0.025411764705882352, -0.010352941176470589),
            ),
        Chain::new(
            "series j30 ohm, then shunt j20 mS",
            order,
            50.0,
            vec![
                series(impedance(0.0, 30.0, F)),
                shunt(admittance(0.0, 0.02, F)),
            ],
        )
        .case(F, ohms(50.0, 0.0), zin(25.0, 5.0)),
        Chain::new(
            "shunt j20 mS, then series j30 ohm",
            order,
            50.0,
            vec![
                shunt(admittance(0.0, 0.02, F)),
                series(impedance(0.0, 30.0, F)),
            ],
        )
        .case(
            F,
            ohms(50.0, 0.0),
            zin(43.10344827586207, -32.758620689655174),
        ),
    ]
}

fn identities() -> Vec<Chain> {
    let at = 28_000_000;
    let chain = || {
        vec![
            series(inductor(120e-9)),
            shunt(capacitor(33e-12)),
            series(series_rl(2.2, 82e-9)),
            lossy_line(75.0, 0.01, 0.9 / TAU, at),
        ]
    };
    let reversal = from_memory(POZAR, "Sec. 4.4 (from the definitions)");
    let (a, b) = (0.19289007805787844, 0.02983451922726979);
    let (c, d) = (0.22837933702158472, 0.017823897646062736);
    let kuroda = from_memory(
        POZAR,
        "Table 8.7 (after H. Ozaki and J. Ishii, IRE Trans. CT-5, 1958)",
    );
    let theta = 0.7 / TAU;
    vec![
        Chain::new("four stages", reversal, 50.0, chain()).case(
            at,
            ohms(50.0, 0.0),
            abcd(
                (0.19289007805787844, 0.02983451922726979),
                (1.344530153296515, 72.55903421557973),
                (-0.00010294391243603536, 0.013180181605454916),
                (0.22837933702158472, 0.017823897646062736),
            ),
        ),
        Chain::new(
            "the four stages reversed swap A and D",
            reversal,
            50.0,
            chain().into_iter().rev().collect(),
        )
        .case(
            at,
            ohms(50.0, 0.0),
            [
                exact(Quantity::Entry(Entry::A, Component::Re), c),
                exact(Quantity::Entry(Entry::A, Component::Im), d),
                exact(Quantity::Entry(Entry::D, Component::Re), a),
                exact(Quantity::Entry(Entry::D, Component::Im), b),
            ],
        ),
        // The source has Z0 = 50 - j0.45 ohm, of which A and D are independent.
        Chain::new(
            "20 pieces of lossy line make the whole, gamma l = 0.35 + j4.2",
            from_memory(THEORY, "addition theorem of cosh and sinh"),
            50.0,
            (0..20)
                .map(|_| lossy_line(50.0, 0.0175, 0.21 / TAU, F))
                .collect(),
        )
        .case(
            F,
            ohms(50.0, 0.0),
            diagonal(-0.5205970917828843, -0.3113179143324908),
        ),
        Chain::new(
            "Kuroda: series shorted stub, then unit element",
            kuroda,
            50.0,
            vec![
                stub(Position::Series, Termination::Short, 50.0, theta, F),
                line(50.0, theta, F),
            ],
        )
        .case(
            F,
            ohms(50.0, 0.0),
            abcd(
                (0.222225114835383, 0.0),
                (0.0, 64.4217687237691),
                (0.0, 0.01288435374475382),
                (0.7648421872844884, 0.0),
            ),
        ),
        // n² = 1 + Zs/Zu = 2.
        Chain::new(
            "Kuroda: unit element, then shunt open stub",
            kuroda,
            50.0,
            vec![
                line(100.0, theta, F),
                stub(Position::Shunt, Termination::Open, 100.0, theta, F),
            ],
        )
        .case(
            F,
            ohms(50.0, 0.0),
            abcd(
                (0.222225114835383, 0.0),
                (0.0, 64.4217687237691),
                (0.0, 0.01288435374475382),
                (0.7648421872844884, 0.0),
            ),
        ),
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

/// Equal A and D.
fn diagonal(re: f64, im: f64) -> Vec<Figure> {
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

/// Exact input admittance in siemens.
fn yin(re: f64, im: f64) -> Vec<Figure> {
    vec![
        exact(Quantity::Conductance, re),
        exact(Quantity::Susceptance, im),
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

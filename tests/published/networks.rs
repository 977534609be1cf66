//! Chain matrices of small networks, and identities between networks.

use super::build::*;
use super::quantity::{Component, Entry, Quantity};
use super::works::{POZAR, THEORY};
use super::{Chain, Figure, Load};
use stagebits::plan::{Position, Termination};
use std::f64::consts::TAU;

/// For networks whose source gives no frequency.
const F: u32 = 10_000_000;

pub(super) fn chains() -> Vec<Chain> {
    let mut chains = networks();
    chains.extend(identities());
    chains
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

/// Exact input admittance in siemens.
fn yin(re: f64, im: f64) -> Vec<Figure> {
    vec![
        exact(Quantity::Conductance, re),
        exact(Quantity::Susceptance, im),
    ]
}

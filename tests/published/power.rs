//! Chains whose voltages and currents have closed forms.

use super::build::*;
use super::works::{ANTENNA_BOOK, BOWICK};
use super::{Chain, Expected};

const F: u32 = 10_000_000;

/// Titles of the chains whose stress other tests look at.
pub(crate) const STANDING_WAVE_TITLE: &str = "quarter wave of 50 ohm line into SWR 3";
pub(crate) const L_SECTION_TITLE: &str = "L section, 50 ohm to 1250 ohm";

pub(super) fn chains() -> Vec<Chain> {
    let q = 4.898979485566356;
    vec![
        // Load 150 ohm: voltage maximum at the load, current maximum at the radio side.
        Chain::new(
            STANDING_WAVE_TITLE,
            from_memory(ANTENNA_BOOK, "voltage and current at SWR"),
            50.0,
            vec![line(50.0, 0.25, F)],
        )
        .case(F, ohms(150.0, 0.0), zin(50.0 / 3.0, 0.0)),
        Chain::new(
            L_SECTION_TITLE,
            from_memory(BOWICK, "design equations, with Ohm's law"),
            50.0,
            vec![
                series(impedance(0.0, q * 50.0, F)),
                shunt(admittance(0.0, q / 1250.0, F)),
            ],
        )
        .input("Q", Expected::Printed("4.90"), q)
        .case(
            F,
            ohms(1250.0, 0.0),
            abcd(
                (0.04, 0.0),
                (0.0, 244.94897427831782),
                (0.0, 0.0039191835884530846),
                (1.0, 0.0),
            ),
        )
        .case(F, ohms(1250.0, 0.0), zin(50.0, 0.0)),
    ]
}

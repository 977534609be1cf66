//! Cables: loss, capacitance, delay, additional loss through mismatch.

use super::build::*;
use super::quantity::Quantity;
use super::works::{ANTENNA_BOOK, GENERAL_MANUAL, HANDBOOK, THEORY};
use super::{Chain, Expected, Load};
use num_complex::Complex;
use stagebits::plan::{DECIBELS_PER_NEPER, Line, Part};
use std::f64::consts::TAU;

const METRES_PER_100_FEET: f64 = 30.48;

pub(super) fn chains() -> Vec<Chain> {
    let mut chains = cables();
    chains.push(cable_constants());
    chains.push(additional_loss());
    chains.extend(additional_loss_at_any_phase());
    chains
}

/// Conductor and dielectric loss fitted through the printed losses at 30 and 150 MHz; the fit is
/// this table's own, the losses are the source's (dB per 100 feet, errata page).
fn cables() -> Vec<Chain> {
    let source = seen(GENERAL_MANUAL, "corrected Table 6-1 (errata page)");
    let (low, high) = (30_000_000, 150_000_000);
    [
        (
            "RG-213",
            50.0,
            "1.08",
            "2.53",
            (0.18958060801821658, 0.0013874748409593394),
        ),
        (
            "RG-58",
            50.0,
            "2.47",
            "5.63",
            (0.443896057798751, 0.0012893719853356888),
        ),
        (
            "RG-174",
            50.0,
            "4.56",
            "10.3",
            (0.8256995122744624, 0.0012485838020877148),
        ),
        (
            "RG-8X",
            50.0,
            "1.96",
            "4.53",
            (0.3481149143749134, 0.001776536264293514),
        ),
        (
            "RG-59",
            75.0,
            "1.79",
            "4.11",
            (0.31971085115267184, 0.0012957183148350297),
        ),
        (
            "9913",
            50.0,
            "0.68",
            "1.58",
            (0.12022184898716173, 0.000717260468250638),
        ),
    ]
    .into_iter()
    .map(|(cable, z0, at_low, at_high, (k1, k2))| {
        let nepers_per_metre = 1.0 / (DECIBELS_PER_NEPER * METRES_PER_100_FEET);
        let line = Line {
            impedance: z0,
            length: METRES_PER_100_FEET,
            velocity: 0.66,
            // From dB per 100 feet and √MHz or MHz.
            k1: k1 * nepers_per_metre / 1e3,
            k2: k2 * nepers_per_metre / 1e6,
        };
        let (fit1, fit2) = two_point_fit(at_low, at_high);
        let mut chain = Chain::new(
            &format!("{cable}, loss of 100 feet"),
            source,
            z0,
            vec![stage(Part::Line(line))],
        )
        .input("k1, dB/100 ft/sqrt(MHz)", Expected::Exact(k1), fit1)
        .input("k2, dB/100 ft/MHz", Expected::Exact(k2), fit2);
        for (hertz, printed_db) in [(low, at_low), (high, at_high)] {
            let decibels = printed_db.parse().expect("a number");
            chain = chain.case(
                hertz,
                ohms(z0, 0.0),
                [
                    printed(Quantity::TransducerLoss, printed_db),
                    exact(Quantity::TransducerLoss, decibels),
                    exact(Quantity::PowerLoss, decibels),
                ],
            );
        }
        chain
    })
    .collect()
}

/// Solves k1·√f + k2·f for the losses at 30 and 150 MHz.
fn two_point_fit(at_30: &str, at_150: &str) -> (f64, f64) {
    let [low, high]: [f64; 2] = [at_30, at_150].map(|db| db.parse().expect("a number"));
    let determinant = 30_f64.sqrt() * 150.0 - 150_f64.sqrt() * 30.0;
    (
        (low * 150.0 - high * 30.0) / determinant,
        (30_f64.sqrt() * high - 150_f64.sqrt() * low) / determinant,
    )
}

/// 30.8 pF/ft at a velocity factor of 0.66, as catalogues print for RG-213, RG-58C and RG-174.
fn cable_constants() -> Chain {
    let hertz = 1_000;
    let z0 = 50.01492336501217;
    let metre = Line {
        impedance: z0,
        length: 1.0,
        velocity: 0.66,
        k1: 0.0,
        k2: 0.0,
    };
    // An open line of 1 m at 1 kHz is a capacitor but for (beta l)²/3 = 3e-10.
    let siemens = TAU * f64::from(hertz) * 101.0498687664042 * 1e-12;
    let nanoseconds = metre.delay() * 1e9;
    let length = TAU * f64::from(hertz) * metre.delay();
    Chain::new(
        "one metre of 50 ohm solid-polyethylene coaxial cable",
        from_memory(
            HANDBOOK,
            "coax table (30.8 pF/ft, 66 %), as in cable catalogues",
        ),
        z0,
        vec![stage(Part::Line(metre))],
    )
    .input("Z0, ohm", Expected::Printed("50"), z0)
    .input("delay, ns/m", Expected::Printed("5.05"), nanoseconds)
    .input(
        "delay, ns/m",
        Expected::Exact(5.054001442396244),
        nanoseconds,
    )
    .case(
        hertz,
        Load::Open,
        [exact(
            Quantity::Susceptance,
            siemens * (1.0 + length * length / 3.0),
        )],
    )
}

/// 150 ft of RG-213 at 14.2 MHz, 0.795 dB/100 ft, SWR 4 at the load. The formula behind the figures
/// is exact for real Z0.
fn additional_loss() -> Chain {
    let hertz = 14_200_000;
    let length = 1.5 * METRES_PER_100_FEET;
    let matched = 1.5 * 0.795;
    let turns = f64::from(hertz) * length / (0.66 * stagebits::plan::SPEED_OF_LIGHT);
    Chain::new(
        "150 feet of RG-213 at SWR 4",
        from_memory(ANTENNA_BOOK, "eq. 13 example"),
        50.0,
        vec![lossy_line(50.0, matched / DECIBELS_PER_NEPER, turns, hertz)],
    )
    .case(
        hertz,
        ohms(50.0, 0.0),
        [
            printed(Quantity::PowerLoss, "1.19"),
            exact(Quantity::PowerLoss, 1.1925),
        ],
    )
    .case(
        hertz,
        ohms(200.0, 0.0),
        [
            printed(Quantity::PowerLoss, "2.12"),
            exact(Quantity::PowerLoss, 2.118636835501224),
        ],
    )
}

/// With real Z0 the handbook formula holds for any phase of the load.
fn additional_loss_at_any_phase() -> Vec<Chain> {
    let hertz = 14_200_000;
    [0.0, 90.0, 180.0, 270.0_f64]
        .into_iter()
        .map(|degrees| {
            let gamma = Complex::from_polar(0.6, degrees.to_radians());
            Chain::new(
                &format!("1.19 dB of line at SWR 4, load at {degrees} degrees"),
                from_memory(THEORY, "forward and reflected power on a line with real Z0"),
                50.0,
                vec![lossy_line(
                    50.0,
                    1.19 / DECIBELS_PER_NEPER,
                    7.0 / TAU,
                    hertz,
                )],
            )
            .case(
                hertz,
                Load::Gamma(gamma),
                [exact(Quantity::PowerLoss, 2.1148237454090584)],
            )
        })
        .collect()
}

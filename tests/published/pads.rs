//! Resistive attenuators.

use super::build::*;
use super::quantity::Quantity;
use super::works::{KUPHALDT, REFERENCE_DATA};
use super::{Chain, Expected, Source};

const F: u32 = 10_000_000;

/// Attenuation in dB; T series and shunt, Π shunt and series arms, each (printed, exact) in ohms.
type Row = (f64, Source, [(&'static str, f64); 4]);

pub(super) fn chains() -> Vec<Chain> {
    let tables = from_memory(REFERENCE_DATA, "ch. 11, and common attenuator tables");
    let rows: [Row; 4] = [
        // 3.0000 dB, not half power.
        (
            3.0,
            tables,
            [
                ("8.55", 8.54986786718095),
                ("141.9", 141.92615588654357),
                ("292.4", 292.40217964026806),
                ("17.61", 17.61479400596541),
            ],
        ),
        (
            6.0,
            tables,
            [
                ("16.61", 16.613942458312206),
                ("66.93", 66.93104064770615),
                ("150.5", 150.47602375372452),
                ("37.35", 37.351877033540184),
            ],
        ),
        (
            10.0,
            seen(KUPHALDT, "ch. 1 (Attenuators)"),
            [
                ("25.97", 25.974692664795786),
                ("35.14", 35.136418446315325),
                ("96.25", 96.24752955742643),
                ("71.15", 71.15124735378853),
            ],
        ),
        (
            20.0,
            tables,
            [
                ("40.91", 40.90909090909091),
                ("10.10", 10.1010101010101),
                ("61.11", 61.111111111111114),
                ("247.5", 247.5),
            ],
        ),
    ];
    let mut chains: Vec<Chain> = rows.into_iter().flat_map(pads).collect();
    chains.push(minimum_loss());
    chains
}

fn pads((decibels, source, arms): Row) -> [Chain; 2] {
    let [t_series, t_shunt, pi_shunt, pi_series] = arms;
    let tee = vec![
        series(resistor(t_series.1)),
        shunt(resistor(t_shunt.1)),
        series(resistor(t_series.1)),
    ];
    let pi = vec![
        shunt(resistor(pi_shunt.1)),
        series(resistor(pi_series.1)),
        shunt(resistor(pi_shunt.1)),
    ];
    [
        ("T", tee, t_series, t_shunt),
        ("Pi", pi, pi_series, pi_shunt),
    ]
    .map(|(shape, stages, in_series, in_shunt)| {
        Chain::new(&format!("{decibels} dB {shape} pad"), source, 50.0, stages)
            .input(
                "series arm, ohm",
                Expected::Printed(in_series.0),
                in_series.1,
            )
            .input("shunt arm, ohm", Expected::Printed(in_shunt.0), in_shunt.1)
            .case(F, ohms(50.0, 0.0), zin(50.0, 0.0))
            .case(
                F,
                ohms(50.0, 0.0),
                [
                    exact(Quantity::TransducerLoss, decibels),
                    exact(Quantity::PowerLoss, decibels),
                ],
            )
    })
}

/// 75 ohm to 50 ohm, matched both ways with the least loss.
fn minimum_loss() -> Chain {
    let (in_series, in_shunt) = (43.30127018922193, 86.60254037844386);
    let load = ohms(50.0, 0.0);
    Chain::new(
        "minimum-loss pad, 75 ohm to 50 ohm",
        from_memory(REFERENCE_DATA, "ch. 11, and common practice"),
        75.0,
        vec![series(resistor(in_series)), shunt(resistor(in_shunt))],
    )
    .input("series arm, ohm", Expected::Printed("43.3"), in_series)
    .input("shunt arm, ohm", Expected::Printed("86.6"), in_shunt)
    .case(
        F,
        load,
        abcd(
            (1.5, 0.0),
            (43.30127018922193, 0.0),
            (0.011547005383792516, 0.0),
            (1.0, 0.0),
        ),
    )
    .case(F, load, zin(75.0, 0.0))
    .case(
        F,
        load,
        [
            printed(Quantity::TransducerLoss, "5.72"),
            exact(Quantity::TransducerLoss, 5.719475475333594),
        ],
    )
}

//! Worked filter examples: ladder, stepped-impedance and composite image-parameter low-pass.

use super::build::*;
use super::prototypes::BUTTERWORTH;
use super::quantity::Quantity;
use super::works::POZAR;
use super::{Chain, Expected, Source};
use std::f64::consts::TAU;

const ROUNDED: &str = "the source goes on from rounded intermediate results";

pub(super) fn chains() -> Vec<Chain> {
    vec![
        printed_parts(),
        exact_parts(),
        stepped_impedance(),
        composite(),
    ]
}

const EXAMPLE_8_3: Source = seen(POZAR, "Example 8.3");

/// The specification asks for at least 15 dB at 3 GHz.
fn printed_parts() -> Chain {
    let at = 3_000_000_000;
    let stages = vec![
        shunt(capacitor(0.984e-12)),
        series(inductor(6.438e-9)),
        shunt(capacitor(3.183e-12)),
        series(inductor(6.438e-9)),
        shunt(capacitor(0.984e-12)),
    ];
    Chain::new(
        "maximally flat low-pass at 2 GHz, printed parts",
        EXAMPLE_8_3,
        50.0,
        stages,
    )
    .case(
        at,
        ohms(50.0, 0.0),
        abcd(
            (5.605762485774089, 0.0),
            (0.0, -640.8651336875048),
            (0.0, 0.0474742210921207),
            (5.605762485774089, 0.0),
        ),
    )
    .case(
        at,
        ohms(50.0, 0.0),
        zin(1.3491971132016845, -114.89386848344434),
    )
    .case(
        at,
        ohms(50.0, 0.0),
        [exact(Quantity::TransducerLoss, 17.68576870463593)],
    )
}

fn exact_parts() -> Chain {
    let (c1, l2, c3) = (
        9.83631643083466e-13,
        6.437952685006049e-09,
        3.1830988618379067e-12,
    );
    let stages = vec![
        shunt(capacitor(c1)),
        series(inductor(l2)),
        shunt(capacitor(c3)),
        series(inductor(l2)),
        shunt(capacitor(c1)),
    ];
    Chain::new(
        "maximally flat low-pass at 2 GHz, exact parts",
        EXAMPLE_8_3,
        50.0,
        stages,
    )
    .input("C1, pF", Expected::Printed("0.984"), c1 * 1e12)
    .input("L2, nH", Expected::Printed("6.438"), l2 * 1e9)
    .input("C3, pF", Expected::Printed("3.183"), c3 * 1e12)
    .case(
        3_000_000_000,
        ohms(50.0, 0.0),
        [exact(Quantity::TransducerLoss, 17.6837936418573)],
    )
}

/// 20 and 120 ohm lines in place of capacitors and coils; more than 20 dB is asked for at 4 GHz.
fn stepped_impedance() -> Chain {
    let cut_off = 2_500_000_000;
    let at = 4_000_000_000;
    let g = BUTTERWORTH[2];
    let radians = |index: usize| {
        if index.is_multiple_of(2) {
            g[index].exact * 20.0 / 50.0
        } else {
            g[index].exact * 50.0 / 120.0
        }
    };
    let stages = (0..g.len())
        .map(|index| {
            let ohms = if index.is_multiple_of(2) { 20.0 } else { 120.0 };
            line(ohms, radians(index) / TAU, cut_off)
        })
        .collect();
    let mut chain = Chain::new(
        "stepped-impedance low-pass, n = 6",
        from_memory(POZAR, "Example 8.6"),
        50.0,
        stages,
    );
    let printed = [
        Expected::Misprinted {
            printed: "11.8",
            exact: 11.86339115358443,
            why: ROUNDED,
        },
        Expected::Printed("33.8"),
        Expected::Printed("44.3"),
        Expected::Printed("46.1"),
        Expected::Printed("32.4"),
        Expected::Misprinted {
            printed: "12.3",
            exact: 12.357699118317115,
            why: ROUNDED,
        },
    ];
    for (index, expected) in printed.into_iter().enumerate() {
        chain = chain.input(
            "electrical length, degrees",
            expected,
            radians(index).to_degrees(),
        );
    }
    let load = ohms(50.0, 0.0);
    chain
        .case(
            at,
            load,
            abcd(
                (18.14735570832008, 0.0),
                (0.0, 435.6286102706508),
                (0.0, 0.17643028373138211),
                (-4.180117507520928, 0.0),
            ),
        )
        .case(at, load, zin(0.5247002929422891, -103.10713955224995))
        .case(
            at,
            load,
            [exact(Quantity::TransducerLoss, 20.991002118434935)],
        )
}

/// Cut-off 2 MHz, pole at 2.05 MHz, 75 ohm: constant-k, m-derived and two m = 0.6 half sections.
fn composite() -> Chain {
    let at = 2_100_000;
    let load = ohms(75.0, 0.0);
    let (l, c, m) = (
        1.193662073189215e-05,
        2.1220659078919377e-09,
        0.21951219512195122,
    );
    let half_m_l = 1.3101169095979189e-06;
    let (trap_l, trap_c) = (1.2939426267633768e-05, 4.658193456348157e-10);
    let half_l = 3.5809862195676453e-06;
    let (end_l, end_c) = (6.366197723675813e-06, 6.366197723675813e-10);
    let stages = vec![
        shunt(series_lc(end_l, end_c)),
        series(inductor(half_l + l / 2.0)),
        shunt(capacitor(c)),
        series(inductor(l / 2.0 + half_m_l)),
        shunt(series_lc(trap_l, trap_c)),
        series(inductor(half_m_l + half_l)),
        shunt(series_lc(end_l, end_c)),
    ];
    let off = |printed, exact| Expected::Misprinted {
        printed,
        exact,
        why: ROUNDED,
    };
    Chain::new(
        "composite low-pass by image parameters",
        from_memory(POZAR, "Example 8.2 (8.1 in some printings)"),
        75.0,
        stages,
    )
    .input("L, uH", Expected::Printed("11.94"), l * 1e6)
    .input("C, nF", Expected::Printed("2.122"), c * 1e9)
    .input("m", Expected::Printed("0.2195"), m)
    .input("mL/2, uH", Expected::Printed("1.310"), half_m_l * 1e6)
    .input("mC, pF", Expected::Printed("465.8"), trap_c * 1e12)
    .input(
        "(1 - m^2)L/4m, uH",
        Expected::Printed("12.94"),
        trap_l * 1e6,
    )
    .input("0.6L/2, uH", off("3.582", 3.580986219567645), half_l * 1e6)
    .input("0.6C/2, pF", off("636.5", 636.6197723675813), end_c * 1e12)
    .input(
        "(1 - 0.36)L/1.2, uH",
        off("6.368", 6.366197723675813),
        end_l * 1e6,
    )
    .case(
        at,
        load,
        abcd(
            (17.690544787847042, 0.0),
            (0.0, -1218.1012048192772),
            (0.0, 0.256099717869588),
            (17.690544787847042, 0.0),
        ),
    )
    .case(at, load, zin(0.10998960523186628, -68.97548054442441))
    .case(
        at,
        load,
        [exact(Quantity::TransducerLoss, 24.985240030569823)],
    )
}

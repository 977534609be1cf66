//! Filters: ladder and stepped-impedance low-pass, composite image-parameter low-pass.

use super::build::*;
use super::prototypes::{
    BUTTERWORTH, BUTTERWORTH_HIGH, CHEBYSHEV_0_1_N8, CHEBYSHEV_0_5_N5, CHEBYSHEV_0_5_N10,
    CHEBYSHEV_3_N5, CHEBYSHEV_SMALL, CHEBYSHEV_SWAPPED, Value,
};
use super::quantity::Quantity;
use super::works::{MATTHAEI, POZAR};
use super::{Chain, Expected, Source};
use stagebits::plan::Stage;
use std::f64::consts::TAU;

const ROUNDED: &str = "the source goes on from rounded intermediate results";

/// Cut-off of the ladders built from prototypes, Hz; their source has 50 ohm.
const CUT_OFF: u32 = 10_000_000;

/// Frequencies at which a ladder is held against its formula, in units of the cut-off.
const GRID: [f64; 8] = [0.3, 0.5, 0.8, 1.0, 1.2, 1.5, 2.0, 3.0];

pub(super) fn chains() -> Vec<Chain> {
    let mut chains = butterworth();
    chains.extend(chebyshev());
    chains.extend(listed_losses());
    chains.push(printed_parts());
    chains.push(exact_parts());
    chains.push(stepped_impedance());
    chains.push(composite());
    chains
}

/// Low-pass ladder from the source end: shunt g1, series g2 and so on.
fn ladder(elements: impl IntoIterator<Item = f64>) -> Vec<Stage> {
    let omega = TAU * f64::from(CUT_OFF);
    elements
        .into_iter()
        .enumerate()
        .map(|(index, g)| {
            if index.is_multiple_of(2) {
                shunt(capacitor(g / (omega * 50.0)))
            } else {
                series(inductor(g * 50.0 / omega))
            }
        })
        .collect()
}

/// A tabulated prototype as a ladder, held against `loss` in dB as a function of f/cut-off.
fn prototype(
    title: String,
    source: Source,
    elements: &[Value],
    load_ohms: f64,
    loss: impl Fn(f64) -> f64,
) -> Chain {
    let stages = ladder(elements.iter().map(|g| g.exact));
    let mut chain = Chain::new(&title, source, 50.0, stages);
    for g in elements {
        chain = chain.input("g", g.expected, g.exact);
    }
    for w in GRID {
        // Whole hertz: every value of the grid times the cut-off.
        let hertz = (w * f64::from(CUT_OFF)).round() as u32;
        let figure = exact(Quantity::TransducerLoss, loss(w));
        chain = chain.case(hertz, ohms(load_ohms, 0.0), [figure]);
    }
    chain
}

/// 10·lg(1 + w^2n), Matthaei, Young and Jones, Sec. 4.03.
fn butterworth_loss(n: usize, w: f64) -> f64 {
    10.0 * w.powi(2 * n as i32).ln_1p() / std::f64::consts::LN_10
}

/// 10·lg(1 + ε²·T_n²(w)), Matthaei, Young and Jones, Sec. 4.03.
fn chebyshev_loss(n: usize, ripple_db: f64, w: f64) -> f64 {
    let n = n as f64;
    let polynomial = if w <= 1.0 {
        (n * w.acos()).cos()
    } else {
        (n * w.acosh()).cosh()
    };
    let epsilon_squared = 10_f64.powf(ripple_db / 10.0) - 1.0;
    10.0 * (1.0 + epsilon_squared * polynomial * polynomial).log10()
}

fn butterworth() -> Vec<Chain> {
    let low = seen(
        MATTHAEI,
        "Table 4.05-1(a); values seen on a public reference page",
    );
    let high = from_memory(MATTHAEI, "Table 4.05-1(a); also Pozar, Table 8.3");
    let low = BUTTERWORTH.iter().map(|table| (low, *table));
    let high = BUTTERWORTH_HIGH.iter().map(|table| (high, *table));
    low.chain(high)
        .map(|(source, table)| {
            let n = table.len();
            let title = format!("Butterworth low-pass, n = {n}");
            prototype(title, source, table, 50.0, |w| butterworth_loss(n, w))
        })
        .collect()
}

fn chebyshev() -> Vec<Chain> {
    let page = seen(
        MATTHAEI,
        "Table 4.05-2(a); values seen on a public reference page",
    );
    let swapped = seen(
        MATTHAEI,
        "Table 4.05-2(a) as copied on one revision of a public reference page",
    );
    let book = from_memory(MATTHAEI, "Table 4.05-2(a); also Pozar, Table 8.4");
    let odd = CHEBYSHEV_SMALL
        .iter()
        .map(|(ripple, table)| (page, *ripple, *table))
        .chain([
            (swapped, 0.01, CHEBYSHEV_SWAPPED),
            (book, 0.5, CHEBYSHEV_0_5_N5),
            (book, 3.0, CHEBYSHEV_3_N5),
        ]);
    let mut chains: Vec<Chain> = odd
        .map(|(source, ripple, table)| {
            let n = table.len();
            let title = format!("Chebyshev low-pass, {ripple} dB, n = {n}");
            prototype(title, source, table, 50.0, |w| chebyshev_loss(n, ripple, w))
        })
        .collect();
    // Even order: the last table value is the load, and the ladder ends in a series coil.
    // This page prints a resistance; the book prints its inverse, 1.3554.
    let (load, elements) = CHEBYSHEV_0_1_N8.split_last().expect("a table");
    chains.push(
        prototype(
            "Chebyshev low-pass, 0.1 dB, n = 8".to_owned(),
            page,
            elements,
            50.0 * load.exact,
            |w| chebyshev_loss(8, 0.1, w),
        )
        .input("load", load.expected, load.exact),
    );
    let (load, elements) = CHEBYSHEV_0_5_N10.split_last().expect("a table");
    chains.push(
        prototype(
            "Chebyshev low-pass, 0.5 dB, n = 10".to_owned(),
            book,
            elements,
            50.0 / load.exact,
            |w| chebyshev_loss(10, 0.5, w),
        )
        .input("load", load.expected, load.exact),
    );
    chains
}

/// Ladders whose loss was computed at 50 digits from the chain itself, up to 154 dB.
fn listed_losses() -> Vec<Chain> {
    let butterworth = from_memory(MATTHAEI, "Sec. 4.03 (maximally flat attenuation)");
    let chebyshev = from_memory(MATTHAEI, "Sec. 4.03 and eq. 4.05-2 (recursion)");
    let flat = |n: u32| -> Vec<f64> {
        let step = std::f64::consts::PI / f64::from(2 * n);
        (1..=n)
            .map(|k| 2.0 * (f64::from(2 * k - 1) * step).sin())
            .collect()
    };
    let rippled = |half: &[f64]| -> Vec<f64> {
        let mirrored = half.iter().rev().skip(1);
        half.iter().chain(mirrored).copied().collect()
    };
    // Title, source, elements, printed loss at cut-off, (hertz, loss) pairs.
    type Row = (
        &'static str,
        Source,
        Vec<f64>,
        &'static str,
        &'static [(u32, f64)],
    );
    let rows: [Row; 4] = [
        (
            "Butterworth ladder, n = 3",
            butterworth,
            flat(3),
            "3.01",
            &[
                (10000000, 3.010299956639812),
                (5000000, 0.06733382658968402),
                (9000000, 1.8510026991960322),
                (11000000, 4.427244415327953),
                (15000000, 10.930932133337166),
                (20000000, 18.129133566428557),
                (30000000, 28.63322860120456),
                (50000000, 41.93847819973558),
            ],
        ),
        (
            "Butterworth ladder, n = 11",
            butterworth,
            flat(11),
            "3.01",
            &[
                (10000000, 3.010299956639812),
                (5000000, 1.0354386094363294e-06),
                (9000000, 0.4079100372762539),
                (11000000, 9.609592594709712),
                (15000000, 38.740657419228334),
                (20000000, 66.22660008151448),
                (30000000, 104.96667603846413),
                (50000000, 153.77340095392415),
            ],
        ),
        (
            "Chebyshev ladder, 0.5 dB, n = 5",
            chebyshev,
            CHEBYSHEV_0_5_N5.iter().map(|g| g.exact).collect(),
            "0.5",
            &[
                (10000000, 0.5),
                (3000000, 0.4989425314788311),
                (8000000, 0.4972826702816126),
                (10500000, 2.4886537833100872),
                (12000000, 12.162062279132291),
                (15000000, 26.65115773678988),
                (20000000, 42.03869820122055),
                (30000000, 61.398795684968796),
            ],
        ),
        (
            "Chebyshev ladder, 0.5 dB, n = 11",
            chebyshev,
            rippled(&[
                1.7571341669283356,
                1.2743021288153369,
                2.6808102594997907,
                1.375963802280288,
                2.7487287523250186,
                1.3879636911581816,
            ]),
            "0.5",
            &[
                (10000000, 0.5),
                (3000000, 0.022972797468995974),
                (8000000, 0.2522302140695746),
                (10500000, 15.078590242543958),
                (12000000, 44.307318436841356),
                (15000000, 76.7982170846403),
                (20000000, 110.67211573571589),
                (30000000, 153.2649568269971),
            ],
        ),
    ];
    rows.into_iter()
        .map(|(title, source, elements, at_cut_off, losses)| {
            let load = ohms(50.0, 0.0);
            let mut chain = Chain::new(title, source, 50.0, ladder(elements));
            for &(hertz, loss) in losses {
                chain = chain.case(hertz, load, [exact(Quantity::TransducerLoss, loss)]);
            }
            chain.case(
                CUT_OFF,
                load,
                [printed(Quantity::TransducerLoss, at_cut_off)],
            )
        })
        .collect()
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

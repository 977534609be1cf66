//! Low-pass ladders from prototype tables, held against the formulas for their loss.

use super::build::*;
use super::prototypes::{
    BUTTERWORTH, BUTTERWORTH_HIGH, CHEBYSHEV_0_1_N8, CHEBYSHEV_0_5_N5, CHEBYSHEV_0_5_N10,
    CHEBYSHEV_3_N5, CHEBYSHEV_SMALL, CHEBYSHEV_SWAPPED, Value,
};
use super::quantity::Quantity;
use super::works::MATTHAEI;
use super::{Chain, Source};
use stagebits::plan::Stage;
use std::f64::consts::TAU;

/// Cut-off of the ladders built from prototypes, Hz; their source has 50 ohm.
const CUT_OFF: u32 = 10_000_000;

/// Frequencies at which a ladder is held against its formula, in units of the cut-off.
const GRID: [f64; 8] = [0.3, 0.5, 0.8, 1.0, 1.2, 1.5, 2.0, 3.0];

pub(super) fn chains() -> Vec<Chain> {
    let mut chains = butterworth();
    chains.extend(chebyshev());
    chains.extend(listed_losses());
    chains
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

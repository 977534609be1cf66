//! Matching networks: L and T sections, stubs, quarter-wave transformers.

use super::build::*;
use super::prototypes::{BINOMIAL, Value};
use super::quantity::Quantity;
use super::works::{BOWICK, POZAR};
use super::{Chain, Expected};
use stagebits::plan::{Position, Stage, Termination};
use std::f64::consts::{FRAC_PI_2, SQRT_2, TAU};

const ROUNDED: &str = "the source goes on from rounded intermediate results";
const CHART: &str = "read from a chart";

pub(super) fn chains() -> Vec<Chain> {
    let mut chains = sections_500_mhz();
    chains.extend(stubs());
    chains.extend(lumped());
    chains.extend(q_rule());
    chains.extend(transformers());
    chains.extend(binomial());
    chains
}

fn off(printed: &'static str, exact: f64, why: &'static str) -> Expected {
    Expected::Misprinted {
        printed,
        exact,
        why,
    }
}

/// 200 − j100 ohm to 100 ohm at 500 MHz.
fn sections_500_mhz() -> Vec<Chain> {
    let at = 500_000_000;
    let omega = TAU * f64::from(at);
    let source = from_memory(POZAR, "Example 5.1");
    let load = ohms(200.0, -100.0);
    let (c1, l1) = (9.22773830099771e-13, 3.898484006168381e-08);
    let (c2, l2) = (2.598989337445587e-12, 4.613869150498854e-08);
    let rounded_parts = from_memory(POZAR, "Example 5.1 (parts only; no residual printed)");
    vec![
        Chain::new(
            "L section, series L and shunt C",
            source,
            100.0,
            vec![series(inductor(l1)), shunt(capacitor(c1))],
        )
        .input("b", Expected::Printed("0.29"), omega * c1 * 100.0)
        .input("x", Expected::Printed("1.22"), omega * l1 / 100.0)
        .input("C, pF", Expected::Printed("0.92"), c1 * 1e12)
        .input("L, nH", off("38.8", 38.98484006168381, ROUNDED), l1 * 1e9)
        .case(
            at,
            load,
            abcd(
                (0.6449489742783178, 0.0),
                (0.0, 122.47448713915891),
                (0.0, 0.002898979485566356),
                (1.0, 0.0),
            ),
        )
        .case(at, load, zin(100.0, 0.0)),
        Chain::new(
            "L section, series C and shunt L",
            source,
            100.0,
            vec![series(capacitor(c2)), shunt(inductor(l2))],
        )
        .input("b", Expected::Printed("-0.69"), -100.0 / (omega * l2))
        .input("x", Expected::Printed("-1.22"), -1.0 / (omega * c2 * 100.0))
        .input("C, pF", off("2.61", 2.598989337445587, ROUNDED), c2 * 1e12)
        .input("L, nH", Expected::Printed("46.1"), l2 * 1e9)
        .case(
            at,
            load,
            abcd(
                (0.1550510257216822, 0.0),
                (0.0, -122.47448713915891),
                (0.0, -0.006898979485566357),
                (1.0, 0.0),
            ),
        )
        .case(at, load, zin(100.0, 0.0)),
        Chain::new(
            "L section of the printed parts",
            rounded_parts,
            100.0,
            vec![series(inductor(38.8e-9)), shunt(capacitor(0.92e-12))],
        )
        .case(at, load, zin(100.21372046452133, -0.6241235130321896))
        .case(
            at,
            load,
            [
                exact(Quantity::GammaMagnitude, 0.0032949724568320455),
                exact(Quantity::Swr, 1.0066117303831685),
                exact(Quantity::TransducerLoss, 4.715092814709606e-05),
            ],
        ),
    ]
}

/// 60 − j80 ohm to 50 ohm at 2 GHz: a line from the load, then a shorted stub across it.
fn stubs() -> Vec<Chain> {
    let at = 2_000_000_000;
    let source = from_memory(POZAR, "Example 5.2");
    let load = ohms(60.0, -80.0);
    let stages = |stub_turns, line_turns| {
        vec![
            stub(Position::Shunt, Termination::Short, 50.0, stub_turns, at),
            line(50.0, line_turns, at),
        ]
    };
    let (d1, l1) = (0.1104232186383003, 0.09497462163589146);
    let (d2, l2) = (0.2594445306228258, 0.4050253783641085);
    let susceptance = |turns: f64| -1.0 / (TAU * turns).tan();
    vec![
        Chain::new("shunt stub, first solution", source, 50.0, stages(l1, d1))
            .input("d1, wavelengths", Expected::Printed("0.110"), d1)
            .input("l1, wavelengths", Expected::Printed("0.095"), l1)
            .input("b1", Expected::Printed("1.47"), -susceptance(l1))
            .case(
                at,
                load,
                abcd(
                    (0.7688155074755022, 0.0),
                    (0.0, 31.973532627205348),
                    (0.0, -0.009843902656944943),
                    (1.710090821526198, 0.0),
                ),
            )
            .case(at, load, zin(50.0, 0.0)),
        Chain::new("shunt stub, second solution", source, 50.0, stages(l2, d2))
            .input("d2, wavelengths", off("0.260", d2, CHART), d2)
            .input("l2, wavelengths", Expected::Printed("0.405"), l2)
            .input("b2", Expected::Printed("-1.47"), -susceptance(l2))
            .case(at, load, zin(50.0, 0.0)),
    ]
}

fn lumped() -> Vec<Chain> {
    let at = 100_000_000;
    let omega = TAU * f64::from(at);
    let (l, c) = (4.77464829275686e-07, 4.77464829275686e-12);
    let f = 10_000_000;
    let (p1, p2) = (101.0, 230.4999096167574);
    let s2 = 219.08902300206645;
    vec![
        Chain::new(
            "L section, 100 ohm to 1000 ohm",
            from_memory(BOWICK, "Example 4-1"),
            100.0,
            vec![series(inductor(l)), shunt(capacitor(c))],
        )
        .input("Q", Expected::Printed("3"), omega * l / 100.0)
        .input("Xs, ohm", Expected::Printed("300"), omega * l)
        .input("Xp, ohm", Expected::Printed("333"), 1.0 / (omega * c))
        .input("L, nH", Expected::Printed("477"), l * 1e9)
        .input("C, pF", Expected::Printed("4.8"), c * 1e12)
        .case(
            at,
            ohms(1000.0, 0.0),
            abcd((0.1, 0.0), (0.0, 300.0), (0.0, 0.003), (1.0, 0.0)),
        )
        .case(at, ohms(1000.0, 0.0), zin(100.0, 0.0)),
        Chain::new(
            "T section by virtual resistance, 10 ohm to 50 ohm, Q = 10",
            from_memory(BOWICK, "Example 4-5"),
            10.0,
            vec![
                series(impedance(0.0, 100.0, f)),
                shunt(admittance(0.0, 1.0 / p1, f)),
                shunt(admittance(0.0, 1.0 / p2, f)),
                series(impedance(0.0, s2, f)),
            ],
        )
        .input("Xs1, ohm", Expected::Printed("100"), 100.0)
        .input("Xp1, ohm", Expected::Printed("101"), p1)
        .input("Q2", Expected::Printed("4.4"), s2 / 50.0)
        .input("Xp2, ohm", Expected::Printed("230"), p2)
        .input(
            "Xs2, ohm",
            off("220", s2, "formed from Q2 rounded to 4.4"),
            s2,
        )
        .case(
            f,
            ohms(50.0, 0.0),
            abcd(
                (-0.42393865941003256, 0.0),
                (0.0, 7.119693297050163),
                (0.0, 0.014239386594100326),
                (-2.119693297050163, 0.0),
            ),
        )
        .case(f, ohms(50.0, 0.0), zin(10.0, 0.0)),
    ]
}

/// Q = √(Rhi/Rlo − 1), Xs = Q·Rlo, Xp = Rhi/Q, down to 50 ohm. The source prints the formula; the
/// figures for Q are hand arithmetic from memory.
fn q_rule() -> Vec<Chain> {
    let source = from_memory(
        BOWICK,
        "eqs. 4-1 to 4-3; also F. E. Terman, Radio Engineers' Handbook, 1943, Sec. 3",
    );
    let f = 10_000_000;
    [
        (100.0, "1.00"),
        (200.0, "1.73"),
        (450.0, "2.83"),
        (1000.0, "4.36"),
        (2500.0, "7.00"),
    ]
    .into_iter()
    .map(|(high, printed): (f64, _)| {
        let q = (high / 50.0 - 1.0).sqrt();
        let stages = vec![
            series(impedance(0.0, q * 50.0, f)),
            shunt(admittance(0.0, q / high, f)),
        ];
        Chain::new(
            &format!("L section by Q, {high} ohm to 50 ohm"),
            source,
            50.0,
            stages,
        )
        .input("Q", Expected::Printed(printed), q)
        .case(f, ohms(high, 0.0), zin(50.0, 0.0))
    })
    .collect()
}

fn quarter_waves(impedances: impl IntoIterator<Item = f64>, at: u32) -> Vec<Stage> {
    impedances
        .into_iter()
        .map(|ohms| line(ohms, 0.25, at))
        .collect()
}

fn transformers() -> Vec<Chain> {
    let f = 10_000_000;
    let ghz = 1_000_000_000;
    let edge = 1.340549614265367;
    let z1 = 22.360679774997898;
    let chebyshev = [57.48067368437876, 50.0 * SQRT_2, 86.98575850823448];
    vec![
        Chain::new(
            "quarter-wave transformer, 100 ohm to 50 ohm",
            from_memory(POZAR, "Example 2.5"),
            50.0,
            quarter_waves([50.0 * SQRT_2], f),
        )
        .input("Z1, ohm", Expected::Printed("70.71"), 50.0 * SQRT_2)
        .case(
            f,
            ohms(100.0, 0.0),
            abcd(
                (0.0, 0.0),
                (0.0, 70.71067811865476),
                (0.0, 0.01414213562373095),
                (0.0, 0.0),
            ),
        )
        .case(f, ohms(100.0, 0.0), zin(50.0, 0.0)),
        // The line is given by its electrical length at the edge of the band where SWR = 1.5.
        Chain::new(
            "quarter-wave transformer, 10 ohm to 50 ohm, at the edge of its band",
            from_memory(POZAR, "Example 5.5"),
            50.0,
            vec![line(z1, edge / TAU, 3 * ghz)],
        )
        .input("Z1, ohm", Expected::Printed("22.36"), z1)
        .input(
            "fractional bandwidth",
            Expected::Printed("0.29"),
            2.0 - 2.0 * edge / FRAC_PI_2,
        )
        .case(
            3 * ghz,
            ohms(10.0, 0.0),
            abcd(
                (0.22821773229381923, 0.0),
                (0.0, 21.770584129355218),
                (0.0, 0.04354116825871044),
                (0.22821773229381923, 0.0),
            ),
        )
        .case(
            3 * ghz,
            ohms(10.0, 0.0),
            zin(41.37931034482759, 16.447227610636993),
        )
        .case(
            3 * ghz,
            ohms(10.0, 0.0),
            [
                exact(Quantity::Swr, 1.5),
                printed(Quantity::GammaMagnitude, "0.2"),
                exact(Quantity::GammaMagnitude, 0.2),
            ],
        ),
        Chain::new(
            "three-section Chebyshev transformer, 100 ohm to 50 ohm, approximate theory",
            from_memory(POZAR, "Example 5.7"),
            50.0,
            quarter_waves(chebyshev, ghz),
        )
        .input("Z1, ohm", Expected::Printed("57.5"), chebyshev[0])
        .input("Z2, ohm", Expected::Printed("70.7"), chebyshev[1])
        .input("Z3, ohm", Expected::Printed("87.0"), chebyshev[2])
        .case(
            600_000_000,
            ohms(100.0, 0.0),
            abcd(
                (-0.6766058316901454, 0.0),
                (0.0, 22.701925826529713),
                (0.0, 0.004540385165305943),
                (-1.3256233847598569, 0.0),
            ),
        )
        .case(
            600_000_000,
            ohms(100.0, 0.0),
            zin(50.93132167533556, 0.31898646081801646),
        ),
    ]
}

/// Maximally flat transformers to R·50 ohm: the loss is 1 + (R − 1)²/(4R)·cos^2N θ.
fn binomial() -> Vec<Chain> {
    let source = from_memory(POZAR, "Table 5.1 (after Matthaei, Young and Jones, ch. 6)");
    let centre = 10_000_000;
    let mut chains: Vec<Chain> = BINOMIAL
        .iter()
        .map(|(ratio, sections)| {
            let n = sections.len();
            let title = format!("maximally flat transformer, {n} sections, ratio {ratio}");
            let stages = quarter_waves(sections.iter().map(|z| 50.0 * z.exact), centre);
            let mut chain = Chain::new(&title, source, 50.0, stages);
            for Value { exact, expected } in *sections {
                chain = chain.input("Z/Z0", *expected, *exact);
            }
            for at in [3_000_000, 7_000_000, 10_000_000, 14_500_000] {
                let cos = (FRAC_PI_2 * f64::from(at) / f64::from(centre)).cos();
                let ripple = (ratio - 1.0).powi(2) / (4.0 * ratio);
                let loss = 10.0 * (1.0 + ripple * cos.powi(2 * n as i32)).log10();
                let load = ohms(50.0 * ratio, 0.0);
                chain = chain.case(at, load, [exact(Quantity::TransducerLoss, loss)]);
            }
            chain
        })
        .collect();
    let sections = BINOMIAL[BINOMIAL.len() - 1].1;
    let stages = quarter_waves(sections.iter().map(|z| 50.0 * z.exact), centre);
    chains.push(
        Chain::new(
            "maximally flat transformer at 0.7 of its centre",
            source,
            50.0,
            stages,
        )
        .case(
            7_000_000,
            ohms(100.0, 0.0),
            abcd(
                (-0.21477018044098412, 0.0),
                (0.0, -67.03074101948232),
                (0.0, -0.013406148203896464),
                (-0.47202061043886323, 0.0),
            ),
        )
        .case(
            7_000_000,
            ohms(100.0, 0.0),
            zin(49.50368708921285, 1.4096088794371695),
        ),
    );
    chains
}

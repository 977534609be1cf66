//! Lossless lines: input impedance and what goes with it.

use super::build::*;
use super::quantity::Quantity;
use super::works::{POZAR, SADIKU};
use super::{Chain, Expected};
use num_complex::Complex;
use stagebits::reference::{State, gamma_from_impedance};

const CHART: &str = "read from a chart";

pub(super) fn chains() -> Vec<Chain> {
    let f = 10_000_000;
    let load_gamma = |re, im, z0| gamma_from_impedance(Complex::new(re, im), z0);
    let (sadiku4, sadiku5) = (load_gamma(60.0, 40.0, 50.0), load_gamma(100.0, 150.0, 75.0));
    let pozar2 = load_gamma(40.0, 70.0, 100.0);
    // Through the conversions of the crate, not by a division here.
    let admittance = |gamma, z0| State::from_gamma(gamma).admittance(z0);
    let admittance5 = admittance(sadiku5, 75.0);
    let admittance3 = admittance(load_gamma(100.0, 50.0, 50.0), 50.0);
    let off = |printed, exact| Expected::Misprinted {
        printed,
        exact,
        why: CHART,
    };
    vec![
        Chain::new(
            "30 m of lossless line at 2 MHz, u = 0.6c",
            from_memory(SADIKU, "Example 11.4"),
            50.0,
            vec![line(50.0, 1.0 / 3.0, 2_000_000)],
        )
        .input("load |Gamma|", Expected::Printed("0.3523"), sadiku4.norm())
        .input(
            "load angle, degrees",
            Expected::Printed("56"),
            sadiku4.arg().to_degrees(),
        )
        .input(
            "load angle, degrees",
            Expected::Exact(55.98065001017354),
            sadiku4.arg().to_degrees(),
        )
        .case(
            2_000_000,
            ohms(60.0, 40.0),
            abcd(
                (-0.5, 0.0),
                (0.0, 43.30127018922193),
                (0.0, 0.017320508075688773),
                (-0.5, 0.0),
            ),
        )
        .case(
            2_000_000,
            ohms(60.0, 40.0),
            zin(23.972955408728925, 1.3515496382448893),
        )
        .case(
            2_000_000,
            ohms(60.0, 40.0),
            [
                printed(Quantity::GammaMagnitude, "0.3523"),
                exact(Quantity::GammaMagnitude, 0.3522606864821505),
                printed(Quantity::Swr, "2.088"),
                exact(Quantity::Swr, 2.08766190080091),
                printed(Quantity::Resistance, "23.97"),
                printed(Quantity::Reactance, "1.35"),
            ],
        ),
        Chain::new(
            "0.4 wavelength of 75 ohm line",
            from_memory(SADIKU, "Example 11.5"),
            75.0,
            vec![line(75.0, 0.4, f)],
        )
        .input(
            "load |Gamma|",
            off("0.659", 0.6597682302498801),
            sadiku5.norm(),
        )
        .input(
            "load angle, degrees",
            Expected::Printed("40"),
            sadiku5.arg().to_degrees(),
        )
        .input(
            "load conductance, mS",
            off("3.04", 3.076923076923077),
            admittance5.re * 1e3,
        )
        .input(
            "load susceptance, mS",
            Expected::Printed("-4.62"),
            admittance5.im * 1e3,
        )
        .case(
            f,
            ohms(100.0, 150.0),
            abcd(
                (-0.8090169943749475, 0.0),
                (0.0, 44.083893921935484),
                (0.0, 0.007837136697232974),
                (-0.8090169943749475, 0.0),
            ),
        )
        .case(
            f,
            ohms(100.0, 150.0),
            [
                misprinted(Quantity::GammaMagnitude, "0.659", 0.6597682302498801, CHART),
                misprinted(Quantity::Swr, "4.82", 4.878345815468325, CHART),
                misprinted(Quantity::Resistance, "21.9", 21.964531135441007, CHART),
                printed(Quantity::Reactance, "47.6"),
                exact(Quantity::Reactance, 47.60815967234112),
            ],
        ),
        Chain::new(
            "0.3 wavelength of 100 ohm line",
            from_memory(POZAR, "Example 2.2"),
            100.0,
            vec![line(100.0, 0.3, f)],
        )
        .input("load |Gamma|", Expected::Printed("0.59"), pozar2.norm())
        .case(
            f,
            ohms(40.0, 70.0),
            abcd(
                (-0.30901699437494745, 0.0),
                (0.0, 95.10565162951536),
                (0.0, 0.009510565162951536),
                (-0.30901699437494745, 0.0),
            ),
        )
        .case(
            f,
            ohms(40.0, 70.0),
            zin(36.53396092474521, -61.11897070964619),
        )
        .case(
            f,
            ohms(40.0, 70.0),
            [
                printed(Quantity::GammaMagnitude, "0.59"),
                exact(Quantity::GammaMagnitude, 0.5890150893739515),
                printed(Quantity::Swr, "3.87"),
                exact(Quantity::Swr, 3.8663587112077265),
                printed(Quantity::ReturnLoss, "4.6"),
                exact(Quantity::ReturnLoss, 4.597471586502397),
                printed(Quantity::Resistance, "36.5"),
                printed(Quantity::Reactance, "-61.1"),
            ],
        ),
        Chain::new(
            "0.15 wavelength of 50 ohm line, as an admittance",
            from_memory(POZAR, "Example 2.3"),
            50.0,
            vec![line(50.0, 0.15, f)],
        )
        .input(
            "load conductance, S",
            Expected::Printed("0.0080"),
            admittance3.re,
        )
        .input(
            "load susceptance, S",
            Expected::Printed("-0.0040"),
            admittance3.im,
        )
        .case(
            f,
            ohms(100.0, 50.0),
            abcd(
                (0.5877852522924731, 0.0),
                (0.0, 40.45084971874737),
                (0.0, 0.016180339887498948),
                (0.5877852522924731, 0.0),
            ),
        )
        .case(
            f,
            ohms(100.0, 50.0),
            zin(37.495629802961155, -41.45385646865034),
        )
        .case(
            f,
            ohms(100.0, 50.0),
            [
                misprinted(Quantity::Conductance, "0.0122", 0.012001119005175054, CHART),
                misprinted(Quantity::Susceptance, "0.0132", 0.013268017294762973, CHART),
            ],
        ),
    ]
}

//! What can be done with a network: interpolation, another reference, making one.

use num_complex::Complex;
use proptest::prelude::*;
use stagebits::reference::gamma_from_impedance;
use stagebits::touchstone::{Flaw, NPort, Network, OnePort, Point, TwoPort};

use super::{one_port, says, two_port};

fn point(hertz: f64, gamma: Complex<f64>) -> Point<1> {
    Point {
        hertz,
        s: [[gamma]],
    }
}

#[test]
fn between_points_gamma_is_on_a_straight_line() {
    let network = one_port("# MHz RI\n1 0.5 0\n2 0 0.5\n4 0 -0.5\n");
    let at = |megahertz: f64| network.interpolate(megahertz * 1e6);
    assert_eq!(at(1.0), Some(Complex::new(0.5, 0.0)));
    assert_eq!(at(1.25), Some(Complex::new(0.375, 0.125)));
    assert_eq!(at(2.0), Some(Complex::new(0.0, 0.5)));
    assert_eq!(at(3.5), Some(Complex::new(0.0, -0.25)));
    assert_eq!(at(4.0), Some(Complex::new(0.0, -0.5)));
    for outside in [0.0, 0.999_999, 4.000_001, f64::INFINITY, f64::NAN, -1.0] {
        assert_eq!(at(outside), None, "{outside}");
    }
    let single = one_port("# MHz RI\n3 0.5 0\n");
    assert_eq!(single.interpolate(3e6), Some(Complex::new(0.5, 0.0)));
    assert_eq!(single.interpolate(2e6), None);
}

#[test]
fn points_that_cover_a_range() {
    let network = one_port("# Hz RI\n10 0 0\n20 0 0\n30 0 0\n40 0 0\n");
    let covering = |from: f64, to: f64| {
        let points = network.covering(from, to)?;
        Some(points.iter().map(|point| point.hertz).collect::<Vec<_>>())
    };
    assert_eq!(covering(20.0, 30.0), Some(vec![20.0, 30.0]));
    assert_eq!(covering(19.0, 31.0), Some(vec![10.0, 20.0, 30.0, 40.0]));
    assert_eq!(covering(21.0, 22.0), Some(vec![20.0, 30.0]));
    assert_eq!(covering(10.0, 40.0).map(|points| points.len()), Some(4));
    assert_eq!(covering(9.0, 40.0), None);
    assert_eq!(covering(10.0, 41.0), None);
    assert_eq!(covering(31.0, 10.0), None);
    assert_eq!(covering(f64::NAN, 20.0), None);
}

#[test]
fn an_impedance_of_minus_the_reference_has_no_gamma() {
    // Z = −25 ohm: Γ = −75/25 at 50 ohm.
    let network = one_port("# MHz RI\n1 -3 0\n");
    assert_eq!(network.referred_to(25.0), None);
    let at_75 = network.referred_to(75.0).expect("a finite reflection");
    assert_eq!(at_75.points(), [point(1e6, Complex::new(-2.0, 0.0))]);
    assert_eq!(at_75.reference(), [75.0]);
}

#[test]
fn a_two_port_is_no_one_port() {
    let network = Network::TwoPort(two_port("# MHz\n1 0 0 1 0 1 0 0 0\n"));
    let fault = network.one_port("pad.s2p").expect_err("a two-port");
    says(
        &fault,
        "the file is of a two-port; a one-port is wanted",
        ".s1p",
    );
    assert_eq!((fault.file.as_str(), fault.spot), ("pad.s2p", None));
}

#[test]
fn a_network_is_made_of_values_that_can_be_used() {
    let zero = Complex::default();
    let make = |hertz: &[f64]| {
        OnePort::new(
            [50.0],
            hertz.iter().map(|&hertz| point(hertz, zero)).collect(),
        )
    };
    assert!(make(&[0.0, 1.0, 1.5]).is_ok());
    assert_eq!(make(&[]), Err(Flaw::NoPoint));
    assert_eq!(make(&[1.0, 2.0, 2.0]), Err(Flaw::Frequency(2)));
    assert_eq!(make(&[2.0, 1.0]), Err(Flaw::Frequency(1)));
    assert_eq!(make(&[-1.0]), Err(Flaw::Frequency(0)));
    assert_eq!(make(&[1.0, f64::NAN]), Err(Flaw::Frequency(1)));
    assert_eq!(make(&[f64::INFINITY]), Err(Flaw::Frequency(0)));
    let nan = Complex::new(0.0, f64::NAN);
    assert_eq!(
        OnePort::new([50.0], vec![point(1.0, nan)]),
        Err(Flaw::Value(0))
    );
    for ohms in [0.0, -50.0, f64::NAN, f64::INFINITY, 1e10] {
        let points = vec![Point {
            hertz: 1.0,
            s: [[zero; 2]; 2],
        }];
        assert_eq!(
            TwoPort::new([50.0, ohms], points),
            Err(Flaw::Reference(1)),
            "{ohms}"
        );
    }
    assert!(
        Flaw::Reference(1)
            .to_string()
            .contains("port 2 is not from 1e-6 to 1e9 ohm")
    );
}

proptest! {
    #![proptest_config(ProptestConfig { failure_persistence: None, ..Default::default() })]

    /// Through the impedance, in which no reference has a part.
    #[test]
    fn gamma_at_another_reference_is_that_of_the_same_impedance(
        resistance in 0.0..1e4f64, reactance in -1e4..1e4f64,
        old in 1.0..1e3f64, new in 1.0..1e3f64,
    ) {
        let impedance = Complex::new(resistance, reactance);
        let gamma = gamma_from_impedance(impedance, old);
        let network: NPort<1> = OnePort::new([old], vec![point(1.0, gamma)]).expect("a network");
        let there = network.referred_to(new).expect("passive");
        let wanted = gamma_from_impedance(impedance, new);
        // A change δ of Γ at one reference is at the other one of at most δ·max(a, 1/a), where a
        // is the ratio of the references; Γ itself is good to a few roundings.
        let ratio = (old / new).max(new / old);
        prop_assert!((there.points()[0].s[0][0] - wanted).norm() <= 8.0 * f64::EPSILON * ratio);
        prop_assert_eq!(network.referred_to(old), Some(network));
    }

    /// Straight lines do not leave the unit disc: between passive points the load is passive.
    #[test]
    fn between_passive_points_gamma_is_passive(
        first in 0.0..360f64, second in 0.0..360f64, share in 0.0..=1.0f64,
    ) {
        let rim = |degrees: f64| Complex::from_polar(1.0, degrees.to_radians());
        let points = vec![point(1e6, rim(first)), point(3e6, rim(second))];
        let network = OnePort::new([50.0], points).expect("a network");
        let gamma = network.interpolate(1e6 + share * 2e6).expect("inside");
        prop_assert!(gamma.norm() <= 1.0 + 4.0 * f64::EPSILON);
        let chord = (gamma - rim(first)).norm() + (rim(second) - gamma).norm();
        prop_assert!((chord - (rim(second) - rim(first)).norm()).abs() <= 8.0 * f64::EPSILON);
    }
}

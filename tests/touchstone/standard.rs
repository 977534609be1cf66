//! What the standard says: its own examples, its defaults and its two versions.
//!
//! Examples of the Touchstone File Format Specification, version 2.0 (IBIS Open Forum, 2009), from
//! memory; the expected values follow from their own numbers.

use approx::assert_relative_eq;
use num_complex::Complex;

use super::{gammas, one_port, two_port};

/// A few roundings of numbers of size one.
const ROUNDING: f64 = 4.0 * f64::EPSILON;

/// "1-port S-parameter file, single frequency point".
#[test]
fn one_port_of_a_single_point() {
    let network =
        one_port("! 1-port\n# MHz S MA R 50\n! freq magS11 angS11\n2.000 0.894 -12.136\n");
    assert_eq!(network.reference(), [50.0]);
    let [(hertz, gamma)] = gammas(&network)[..] else {
        panic!("{network:?}")
    };
    assert_eq!(hertz, 2e6);
    assert_relative_eq!(gamma.norm(), 0.894, max_relative = ROUNDING);
    assert_relative_eq!(gamma.arg().to_degrees(), -12.136, max_relative = ROUNDING);
}

/// "1-port Z-parameter file, multiple frequency points": the same one-port in version 1.x, in units
/// of 75 ohm, and in version 2.0, in ohms.
#[test]
fn impedances_are_relative_in_version_1_and_in_ohms_in_version_2() {
    let relative = "# MHz Z MA R 75\n100 0.99 -4\n200 0.80 -22\n300 0.707 -45\n400 0.40 -62\n\
                    500 0.01 -89\n";
    let ohms = "[Version] 2.0\n# MHz Z MA\n[Number of Ports] 1\n[Number of Frequencies] 5\n\
                [Reference] 75.0\n[Network Data]\n100 74.25 -4\n200 60 -22\n300 53.025 -45\n\
                400 30 -62\n500 0.75 -89\n[End]\n";
    let (old, new) = (one_port(relative), one_port(ohms));
    assert_eq!(old.reference(), [75.0]);
    assert_eq!(new.reference(), [75.0]);
    let pairs = gammas(&old).into_iter().zip(gammas(&new));
    assert_eq!(pairs.len(), 5);
    for ((hertz, old), (same_hertz, new)) in pairs {
        assert_eq!(hertz, same_hertz);
        assert!((old - new).norm() <= ROUNDING, "{old} {new}");
    }
    // 0.8 at -22 degrees, by hand
    let z = Complex::from_polar(0.8, -22_f64.to_radians());
    assert!((gammas(&old)[1].1 - (z - 1.0) / (z + 1.0)).norm() <= ROUNDING);
}

/// Y is the reciprocal of Z, in the same units.
#[test]
fn admittances_are_the_reciprocals_of_impedances() {
    for (z, y) in [
        ("0.8 0.6", "0.8 -0.6"),
        ("2 0", "0.5 0"),
        ("0 0.25", "0 -4"),
    ] {
        let [z, y] = [("Z", z), ("Y", y)].map(|(name, value)| {
            gammas(&one_port(&format!("# MHz {name} RI R 75\n1 {value}")))[0].1
        });
        assert!((z - y).norm() <= ROUNDING, "{z} {y}");
    }
    let version_2 = |parameter: &str, value: &str| {
        let text = format!(
            "[Version] 2.0\n# {parameter} RI R 75\n[Number of Ports] 1\n\
             [Number of Frequencies] 1\n[Network Data]\n1 {value}\n[End]"
        );
        gammas(&one_port(&text))[0].1
    };
    let (z, y) = (version_2("Z", "40 30"), version_2("Y", "0.016 -0.012"));
    assert!((z - y).norm() <= ROUNDING, "{z} {y}");
    // Short and open in either.
    let minus_one = Complex::new(-1.0, 0.0);
    assert_eq!(version_2("Z", "0 0"), minus_one);
    assert_eq!(version_2("Y", "0 0"), -minus_one);
}

/// "2-port S-parameter file, three frequency points".
#[test]
fn two_port_of_three_points() {
    let network = two_port(
        "# GHz S RI R 50.0\n\
         1.0000 0.3926 -0.1211 -0.0003 -0.0021 -0.0003 -0.0021 0.3926 -0.1211\n\
         2.0000 0.3517 -0.3054 -0.0096 -0.0298 -0.0096 -0.0298 0.3517 -0.3054\n\
         10.000 0.3419 0.3336 -0.0134 0.0379 -0.0134 0.0379 0.3419 0.3336\n",
    );
    assert_eq!(network.range(), (1e9, 10e9));
    let s = network.points()[1].s;
    assert_eq!(s[0][0], Complex::new(0.3517, -0.3054));
    assert_eq!(s[0][1], s[1][0]);
    assert_eq!(s[1][0], Complex::new(-0.0096, -0.0298));
}

/// "2-port network file with noise data": they begin where the frequency goes back.
#[test]
fn noise_data_are_left_out() {
    let network = "# GHZ S MA R 50\n2 .95 -26 3.57 157 .04 76 .66 -14\n\
                   22 .60 -144 1.30 40 .14 40 .56 -85\n";
    let noise = "! NOISE PARAMETERS\n4 .7 .64 69 .38\n18 2.7 .46 -33 .40\n";
    let with_noise = two_port(&format!("{network}{noise}"));
    assert_eq!(with_noise, two_port(network));
    assert_eq!(with_noise.points().len(), 2);
    // 11 21 12 22: the amplifier's forward gain comes second.
    let s = with_noise.points()[0].s;
    assert_relative_eq!(s[1][0].norm(), 3.57, max_relative = ROUNDING);
    assert_relative_eq!(s[0][1].norm(), 0.04, max_relative = ROUNDING);
    // The first noise frequency may be that of the last network data.
    assert_eq!(
        two_port(&format!("{network}22 .7 .64 69 .38\n")),
        with_noise
    );
}

const TWO_PORT_2: &str = "[Version] 2.0\n# MHz S RI\n[Number of Ports] 2\nORDER\n\
                          [Number of Frequencies] 1\n[Reference]\n50\n75\n[Network Data]\nDATA\nREST[End]\n";

fn two_port_2(order: &str, data: &str, rest: &str) -> super::TwoPort {
    let text = TWO_PORT_2
        .replace("ORDER", order)
        .replace("DATA", data)
        .replace("REST", rest);
    two_port(&text)
}

#[test]
fn version_2_writes_two_ports_in_either_order_or_as_a_triangle() {
    let columns = two_port_2(
        "[Two-Port Data Order] 21_12",
        "1 .11 0 .21 1 .12 2 .22 3",
        "",
    );
    assert_eq!(columns.reference(), [50.0, 75.0]);
    let s = columns.points()[0].s;
    let entries = [s[0][0], s[0][1], s[1][0], s[1][1]];
    let wanted = [(0.11, 0.0), (0.12, 2.0), (0.21, 1.0), (0.22, 3.0)];
    assert_eq!(entries, wanted.map(|(re, im)| Complex::new(re, im)));
    let rows = two_port_2(
        "[Two-Port Data Order] 12_21",
        "1 .11 0 .12 2 .21 1 .22 3",
        "",
    );
    assert_eq!(rows, columns);

    let full = "[Two-Port Data Order] 21_12\n[Matrix Format] Full";
    let symmetric = two_port_2(full, "1 .11 0 .21 1 .21 1 .22 3", "");
    let triangle = |name: &str| {
        let order = format!("[Matrix Format] {name}");
        two_port_2(&order, "1 .11 0 .21 1 .22 3", "")
    };
    assert_eq!(triangle("Lower"), symmetric);
    assert_eq!(triangle("upper"), symmetric);
}

#[test]
fn version_2_has_noise_data_and_information_that_are_left_out() {
    let order = "[two-port  data order] 21_12";
    let data = "1 .11 0 .21 1 .12 2 .22 3";
    let bare = two_port_2(order, data, "");
    let information = "[Begin Information]\n[Manufacturer] Ω works, [End] of the line\n# Hz\n1 2 3\n\
                       [End Information]";
    let noise = "[Noise Data]\n4 .7 .64 69 19\n18 2.7 .46 -33 20\n";
    let header = format!("{information}\n{order}\n[Number of Noise Frequencies] 2");
    assert_eq!(two_port_2(&header, data, noise), bare);
}

#[test]
fn the_number_of_ports_of_version_2_does_not_come_from_the_name() {
    let text = TWO_PORT_2.replace("ORDER", "[Two-Port Data Order] 12_21");
    let text = text
        .replace("DATA", "1 0 0 1 0 1 0 0 0")
        .replace("REST", "");
    let network = stagebits::touchstone::parse(&text, "test.ts").expect("a right file");
    assert_eq!(network.ports(), 2);
}

#[test]
fn options_stand_in_any_order_and_case_and_have_defaults() {
    let gamma = Complex::new(0.0, 0.5);
    for options in [
        "# GHz S MA R 50",
        "#",
        "  #r 50 ma",
        "# s\tghz",
        "# R 5e1 MA S GHZ",
        "# GHz ! S RI R 3",
    ] {
        let network = one_port(&format!("{options}\n0.002 0.5 90"));
        assert_eq!(network.reference(), [50.0], "{options}");
        assert_eq!(gammas(&network), [(2e6, gamma)], "{options}");
    }
    for (unit, hertz) in [("Hz", 7.0), ("khz", 7e3), ("MHZ", 7e6), ("gHz", 7e9)] {
        assert_eq!(
            gammas(&one_port(&format!("# {unit} RI\n7 0 .5")))[0],
            (hertz, gamma)
        );
    }
}

#[test]
fn only_the_first_option_line_counts() {
    let text = "# MHz RI R 75\n1 0 0.5\n# GHz DB R 50\n2 0 0.5\n# nonsense\n3 0 0.5\n";
    let network = one_port(text);
    assert_eq!(network.reference(), [75.0]);
    assert_eq!(network.range(), (1e6, 3e6));
    let header = "[Version] 2.0\n# MHz RI\n# kHz\n[Number of Ports] 1\n[Number of Frequencies] 1\n";
    let network = one_port(&format!("{header}[Network Data]\n# nonsense\n1 0 0\n[End]"));
    assert_eq!(network.range(), (1e6, 1e6));
}

#[test]
fn frequencies_are_rounded_once() {
    // In two steps these would be 1004999999.9999999 and 2000100000.0000002.
    let network = one_port("# GHz RI\n1.005 0 0\n2.0001 0 0\n20.2e-1 0 0");
    let hertz: Vec<_> = gammas(&network).iter().map(|point| point.0).collect();
    assert_eq!(hertz, [1_005_000_000.0, 2_000_100_000.0, 2_020_000_000.0]);
}

#[test]
fn quarter_turns_and_decibels_are_exact_where_they_can_be() {
    let points = "1 1 0\n2 1 90\n3 1 180\n4 1 -90\n5 1 -180\n6 1 450\n7 1 -36000\n";
    let values: Vec<_> = gammas(&one_port(&format!("# Hz MA\n{points}")))
        .iter()
        .map(|point| (point.1.re + 0.0, point.1.im + 0.0))
        .collect();
    let (right, up) = ((1.0, 0.0), (0.0, 1.0));
    let (left, down) = ((-1.0, 0.0), (0.0, -1.0));
    assert_eq!(values, [right, up, left, down, left, up, right]);
    let decibels = gammas(&one_port("# Hz DB\n1 0 0\n2 -20 0\n3 -40 180\n4 -9999 17"));
    let wanted = [1.0, 0.1, -0.01, 0.0];
    for ((_, gamma), wanted) in decibels.iter().zip(wanted) {
        assert_relative_eq!(gamma.re, wanted, max_relative = ROUNDING);
        assert_eq!(gamma.im.abs(), 0.0);
    }
}

#[test]
fn comments_blanks_and_line_ends_do_not_matter() {
    let plain = one_port("# MHz RI\n1 0.5 0\n2 0.25 -1e-3\n");
    let text =
        "\u{feff}! ΩΩ first\r\n\r\n\t# MHz RI!x\r\n  1\t0.5   0 ! [End] # GHz\r\n!\r\n2 .25 -1E-3";
    assert_eq!(one_port(text), plain);
}

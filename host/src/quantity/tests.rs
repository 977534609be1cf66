//! Values, faults, and the way there and back.

use super::*;
use Dimension::*;

fn fault(text: &str, wanted: Dimension) -> (Range<usize>, String, String) {
    let error = parse(text, wanted).expect_err(text);
    (error.range, error.message, error.help)
}

#[test]
fn values_are_the_nearest_to_what_is_written() {
    for (text, dimension, value) in [
        ("1.2 uH", Inductance, 1.2e-6),
        ("1.2 \u{b5}H", Inductance, 1.2e-6),
        ("1.2 \u{3bc}H", Inductance, 1.2e-6),
        ("2.7 fH", Inductance, 2.7e-15),
        ("220 pF", Capacitance, 220e-12),
        ("0.1 nF", Capacitance, 0.1e-9),
        ("50 ohm", Resistance, 50.0),
        ("4.7 k\u{3a9}", Resistance, 4.7e3),
        ("4.7 M\u{2126}", Resistance, 4.7e6),
        ("3.573 MHz", Frequency, 3_573_000.0),
        ("2.4 GHz", Frequency, 2.4e9),
        ("0.6 m", Length, 0.6),
        ("3 mm", Length, 3e-3),
        ("1 km", Length, 1e3),
        ("5 %", Ratio, 0.05),
        ("  1.5e-3\tmH ", Inductance, 1.5e-6),
        ("-40 ohm", Resistance, -40.0),
        ("+.5 ohm", Resistance, 0.5),
        ("1e-400 ohm", Resistance, 0.0),
        ("1e-99999999999999999999 ohm", Resistance, 0.0),
    ] {
        assert_eq!(parse(text, dimension), Ok(value), "{text}");
    }
}

#[test]
fn every_prefix_has_its_power_of_ten() {
    for (prefix, power) in PREFIXES {
        let value = parse(&format!("7 {prefix}H"), Inductance);
        assert_eq!(
            value,
            format!("7e{power}").parse().map_err(|_| unreachable!())
        );
    }
}

#[test]
fn wrong_dimension_names_both() {
    assert_eq!(
        fault("5 ohm", Capacitance),
        (
            0..5,
            "\"5 ohm\" is a resistance; a capacitance is wanted".into(),
            "write a capacitance, such as \"100 pF\"".into()
        )
    );
    assert!(
        fault("3 m", Inductance)
            .1
            .contains("is a length; an inductance")
    );
    assert!(
        fault("5 %", Resistance)
            .1
            .contains("is a ratio; a resistance")
    );
    assert!(
        fault("5 nF", Frequency)
            .1
            .contains("is a capacitance; a frequency")
    );
}

#[test]
fn range_covers_what_is_wrong() {
    assert_eq!(fault(" 1,5  uH", Inductance).0, 1..4);
    assert_eq!(fault(" 1.5  uX ", Inductance).0, 6..8);
    assert_eq!(fault(" 1.5 ", Inductance).0, 1..4);
    assert_eq!(fault("  ", Inductance).0, 0..2);
}

#[test]
fn help_writes_what_was_meant() {
    for (text, dimension, message, help) in [
        ("1,5 uH", Inductance, "not a number", "decimals: 1.5"),
        ("50ohm", Resistance, "no blank", "write \"50 ohm\""),
        ("5%", Ratio, "no blank", "write \"5 %\""),
        ("1e3Hz", Frequency, "no blank", "write \"1e3 Hz\""),
        ("50", Resistance, "has no unit", "\"50 ohm\""),
        (
            "2 mhz",
            Frequency,
            "unknown unit \"mhz\"",
            "write \"2 MHz\"",
        ),
        ("2 MHZ", Frequency, "unknown unit", "write \"2 MHz\""),
        ("50 Ohms", Resistance, "unknown unit", "write \"50 ohm\""),
        ("5 KOhm", Resistance, "unknown unit", "write \"5 kohm\""),
        ("10 pf", Capacitance, "unknown unit", "write \"10 pF\""),
        (
            "10 Kohm",
            Resistance,
            "unknown prefix \"K\"",
            "write \"10 kohm\"",
        ),
        (
            "60 cm",
            Length,
            "unknown prefix \"c\" of the unit \"m\"",
            "f p n u m k M G",
        ),
        ("3 feet", Length, "unknown unit \"feet\"", "\"0.6 m\""),
        ("3 m%", Ratio, "\"%\" takes no prefix", "\"5 %\""),
        ("ohm", Resistance, "\"ohm\" is not a number", "\"50 ohm\""),
        (
            "nan ohm",
            Resistance,
            "\"nan\" is not a number",
            "\"50 ohm\"",
        ),
        (
            "-inf ohm",
            Resistance,
            "\"-inf\" is not a number",
            "\"50 ohm\"",
        ),
        ("1e999 ohm", Resistance, "too large", "\"50 ohm\""),
        ("1e305 GHz", Frequency, "too large", "\"2 MHz\""),
        ("1.2.3 ohm", Resistance, "not a number", "\"50 ohm\""),
        (
            "50 ohm ohm",
            Resistance,
            "unknown unit \"ohm ohm\"",
            "\"50 ohm\"",
        ),
    ] {
        let (_, found, helped) = fault(text, dimension);
        assert!(found.contains(message), "{text}: {found}");
        assert!(helped.contains(help), "{text}: {helped}");
    }
}

#[test]
fn example_of_each_dimension_is_of_that_dimension_and_in_its_limits() {
    for dimension in [
        Resistance,
        Inductance,
        Capacitance,
        Frequency,
        Length,
        Ratio,
    ] {
        let value = parse(dimension.example(), dimension).expect("an example parses");
        assert!(dimension.limits().contains(&value), "{dimension}");
    }
}

#[test]
fn limits_are_written_with_the_prefix_that_fits() {
    for (dimension, low, high) in [
        (Resistance, "1 uohm", "1 Gohm"),
        (Inductance, "1 fH", "1 kH"),
        (Capacitance, "1 fF", "1 F"),
        (Frequency, "1 Hz", "4.294967295 GHz"),
        (Length, "1 um", "1 Mm"),
        (Ratio, "0 %", "100 %"),
    ] {
        assert_eq!(dimension.write(*dimension.limits().start()), low);
        assert_eq!(dimension.write(*dimension.limits().end()), high);
    }
}

proptest::proptest! {
    #[test]
    fn what_is_written_reads_back(mantissa in -9.99..9.99f64, power in -14..9i32) {
        let value = mantissa * 10f64.powi(power);
        let text = Resistance.write(value);
        let back = parse(&text, Resistance).expect("written quantities parse");
        approx::assert_relative_eq!(back, value, max_relative = 4.0 * f64::EPSILON);
    }

    #[test]
    fn any_text_gives_a_finite_value_or_a_range_within_it(text in "\\PC*") {
        match parse(&text, Length) {
            Ok(value) => assert!(value.is_finite()),
            Err(error) => assert!(text.get(error.range).is_some()),
        }
    }
}

//! What is written is read back, and no text makes the reader panic.

use num_complex::Complex;
use proptest::prelude::*;
use stagebits::touchstone::{
    DifferentReferences, Format, NPort, Network, OnePort, Point, Style, TwoPort, Version, parse,
    write,
};

/// Real numbers of all sizes: edge cases, the usual and any finite one.
fn real() -> impl Strategy<Value = f64> {
    prop_oneof![
        Just(0.0),
        Just(-1.0),
        Just(1.0 / 3.0),
        -1.0..1.0f64,
        // Squares of these stay finite, as a magnitude needs.
        any::<f64>().prop_filter("finite", |number| number.abs() < 1e150),
    ]
}

fn frequencies() -> impl Strategy<Value = Vec<f64>> {
    let hertz = prop_oneof![
        Just(0.0),
        0.0..1e12f64,
        1e-300..1e300f64,
        (1..1u32 << 31).prop_map(f64::from)
    ];
    prop::collection::btree_set(hertz.prop_map(f64::to_bits), 1..8)
        // Bits of floats that are not negative are in the order of the floats.
        .prop_map(|set| set.into_iter().map(f64::from_bits).collect())
}

fn network<const PORTS: usize>() -> impl Strategy<Value = NPort<PORTS>> {
    let reference = prop::array::uniform2(prop_oneof![Just(50.0), 1e-6..1e9f64]);
    let values = prop::collection::vec((real(), real()), PORTS * PORTS * 8);
    (reference, frequencies(), values).prop_map(|(reference, frequencies, values)| {
        let mut values = values.into_iter().map(|(re, im)| Complex::new(re, im));
        let mut value = || values.next().expect("enough values");
        let points = frequencies
            .into_iter()
            .map(|hertz| Point {
                hertz,
                s: std::array::from_fn(|_| std::array::from_fn(|_| value())),
            })
            .collect();
        NPort::new(std::array::from_fn(|port| reference[port]), points).expect("a network")
    })
}

fn style() -> impl Strategy<Value = Style> {
    let version = prop::sample::select(vec![Version::V1_1, Version::V2_0]);
    let format = prop::sample::select(Format::ALL.to_vec());
    (version, format).prop_map(|(version, format)| Style { version, format })
}

/// How far a value may be off when it has been written in a format and read back.
fn slack(format: Format, value: Complex<f64>) -> f64 {
    let magnitude = value.norm();
    let roundings = match format {
        Format::RealImaginary => 0.0,
        // Magnitude, angle (to 2π) and their product.
        Format::MagnitudeAngle => 16.0,
        // And the magnitude by its logarithm: a relative rounding of that is an absolute one here.
        Format::DecibelAngle => 16.0 + 4.0 * magnitude.max(f64::MIN_POSITIVE).ln().abs(),
    };
    // Below the normal range of floats, a step is not relative.
    roundings * (f64::EPSILON * magnitude + 5e-324)
}

fn check<const PORTS: usize>(wanted: &NPort<PORTS>, found: &NPort<PORTS>, format: Format) {
    assert_eq!(wanted.reference(), found.reference());
    assert_eq!(wanted.points().len(), found.points().len());
    for (wanted, found) in wanted.points().iter().zip(found.points()) {
        assert_eq!(wanted.hertz.to_bits(), found.hertz.to_bits());
        for (wanted, found) in wanted.s.iter().flatten().zip(found.s.iter().flatten()) {
            let error = (wanted - found).norm();
            assert!(
                error <= slack(format, *wanted),
                "{wanted} is read as {found}"
            );
        }
    }
}

const BASE: &str = "[Version] 2.0\n# MHz S RI R 75 ! options\n[Number of Ports] 2\n\
    [Two-Port Data Order] 21_12\n[Number of Frequencies] 2\n[Reference] 50\n75\n\
    [Begin Information]\nfree\n[End Information]\n[Network Data]\n1 .1 0 .2 1 .3 0 .4 -1\n\
    2 .1 0 .2 1 .3 0 .4 -1\n[Noise Data]\n1 2 .5 30 0.4\n[End]\n";

proptest! {
    #![proptest_config(ProptestConfig { failure_persistence: None, ..Default::default() })]

    #[test]
    fn a_one_port_is_read_as_it_was_written(network in network::<1>(), style in style()) {
        let text = write(&network, style).expect("one reference");
        match parse(&text, "x.s1p") {
            Ok(Network::OnePort(found)) => check(&network, &found, style.format),
            other => prop_assert!(false, "{other:?}\n{text}"),
        }
    }

    #[test]
    fn a_two_port_is_read_as_it_was_written(network in network::<2>(), style in style()) {
        let [first, second] = network.reference();
        match write(&network, style) {
            Err(DifferentReferences) => {
                prop_assert!(style.version == Version::V1_1 && first != second);
            }
            Ok(text) => match parse(&text, "x.s2p") {
                Ok(Network::TwoPort(found)) => check(&network, &found, style.format),
                other => prop_assert!(false, "{other:?}\n{text}"),
            },
        }
    }

    #[test]
    fn text_behind_a_right_start_is_read_or_refused(
        start in prop::sample::select(vec!["", "#", "# MHz S RI R 50\n1 ", "[Version] 2.0\n["]),
        text in "(?s).{0,60}",
        name in prop::sample::select(vec!["x.s1p", "x.s2p", "x.ts", ""]),
    ) {
        let _ = parse(&format!("{start}{text}"), name);
    }

    #[test]
    fn any_bytes_are_read_or_refused(bytes in prop::collection::vec(any::<u8>(), 0..200)) {
        let _ = parse(&String::from_utf8_lossy(&bytes), "x.s1p");
    }

    #[test]
    fn a_damaged_file_is_read_or_refused_with_a_place_in_it(
        at in 0..BASE.len(), length in 0..12usize, new in "[ -~µ\\n\\r\\t]{0,6}",
    ) {
        let end = (at + length).min(BASE.len());
        let text = format!("{}{new}{}", &BASE[..at], &BASE[end..]);
        if let Err(fault) = parse(&text, "x.s2p") {
            let spot = fault.spot.as_ref().expect("a fault of the text has a place");
            let line = text.split('\n').nth(spot.line as usize - 1).expect("a line of the file");
            prop_assert!(line.strip_suffix('\r') == Some(&spot.text) || line == spot.text);
            prop_assert!(spot.column as usize <= spot.text.chars().count() + 1);
            prop_assert!(!fault.message.is_empty() && !fault.help.is_empty());
        }
    }
}

#[test]
fn the_damaged_file_is_right_to_begin_with() {
    let network = parse(BASE, "x.s2p").unwrap_or_else(|fault| panic!("{fault}"));
    assert_eq!(network.ports(), 2);
}

/// The whole of a small file, as the standard wants it.
#[test]
fn layout_of_what_is_written() {
    let half = Complex::new(0.5, 0.0);
    let zero = Complex::new(0.0, 0.0);
    let s = [[zero, half], [half, zero]];
    let point = Point { hertz: 2e6, s };
    let pad = TwoPort::new([50.0, 75.0], vec![point]).expect("a pad");
    let version = env!("CARGO_PKG_VERSION");
    let style = |version| Style {
        version,
        format: Format::DecibelAngle,
    };
    let text = write(&pad, style(Version::V2_0)).expect("version 2.0 has two references");
    let half = "-6.0205999132796242e0 0.0000000000000000e0";
    let zero = "-9.9990000000000000e3 0.0000000000000000e0";
    assert_eq!(
        text,
        format!(
            "! Written by stagebits {version}\n[Version] 2.0\n# Hz S DB R 50\n\
             [Number of Ports] 2\n[Two-Port Data Order] 21_12\n[Number of Frequencies] 1\n\
             [Reference] 50 75\n[Network Data]\n2000000 {zero} {half} {half} {zero}\n[End]\n"
        )
    );
    assert_eq!(write(&pad, style(Version::V1_1)), Err(DifferentReferences));

    let load = OnePort::new(
        [75.0],
        vec![Point {
            hertz: 0.5,
            s: [[Complex::new(0.5, 0.0)]],
        }],
    );
    let load = Network::OnePort(load.expect("a load"));
    assert_eq!(
        load.write(style(Version::V1_1)).as_deref(),
        Ok(&*format!(
            "! Written by stagebits {version}\n# Hz S DB R 75\n0.5 {half}\n"
        ))
    );
}

//! How figures are written: engineering notation, complex numbers, as many digits as they are
//! worth.

use num_complex::Complex;

/// `value` with three significant digits in exponent notation: errors and bounds.
pub fn error(value: f64) -> String {
    if value == 0.0 {
        "0".to_owned()
    } else if !value.is_finite() {
        "∞".to_owned()
    } else {
        format!("{value:.2e}")
    }
}

/// `value` with at most `places` places after the point, as many as fit in `width` characters
/// besides a sign; without a sign where it rounds to zero.
pub fn fixed(value: f64, width: usize, places: usize) -> String {
    if value.is_nan() {
        return "–".to_owned();
    }
    let magnitude = match value.abs() {
        magnitude if magnitude.is_infinite() => "∞".to_owned(),
        magnitude => (0..=places)
            .rev()
            .map(|places| format!("{magnitude:.places$}"))
            .find(|text| text.len() <= width)
            .unwrap_or_else(|| format!("{magnitude:.0}")),
    };
    let zero = magnitude.bytes().all(|byte| matches!(byte, b'0' | b'.'));
    let sign = if value < 0.0 && !zero { "-" } else { "" };
    format!("{sign}{magnitude}")
}

/// An impedance in ohms or a ratio in at most six characters besides a sign, without an exponent
/// where it is of a usual size; below 1e-9 it is zero.
pub fn significant(value: f64) -> String {
    if !value.is_finite() {
        // parts of a complex number over zero have no sign
        return "∞".to_owned();
    }
    let usual = [0.0..1e-9, 1e-3..1e5];
    if usual.iter().any(|range| range.contains(&value.abs())) {
        fixed(value, 6, 3)
    } else {
        format!("{value:.1e}")
    }
}

/// `value` with an SI prefix and `digits` significant digits, such as `1.20 µH`.
pub fn engineering(value: f64, unit: &str, digits: usize) -> String {
    const PREFIXES: [&str; 9] = ["f", "p", "n", "µ", "m", "", "k", "M", "G"];
    if value == 0.0 || !value.is_finite() {
        return format!("{value} {unit}");
    }
    let power = |value: f64| (value.abs().log10() / 3.0).floor() as i32;
    let limited = |value: f64| power(value).clamp(-5, 3);
    let mut group = limited(value);
    let scaled = |group: i32| value / 10_f64.powi(3 * group);
    let text = |group: i32| {
        let whole = scaled(group).abs().log10().floor().max(0.0) as usize + 1;
        format!("{:.*}", digits.saturating_sub(whole), scaled(group))
    };
    // rounding may carry into the next prefix
    if text(group).trim_start_matches('-').starts_with("1000") && group < 3 {
        group += 1;
    }
    format!("{} {}{unit}", text(group), PREFIXES[(group + 5) as usize])
}

/// A frequency in whole hertz, to the last hertz: `10.100363 MHz`.
pub fn frequency(hertz: u32) -> String {
    let (divisor, unit, digits) = match hertz {
        0..1_000 => (1.0, "Hz", 0),
        1_000..1_000_000 => (1e3, "kHz", 3),
        1_000_000..1_000_000_000 => (1e6, "MHz", 6),
        _ => (1e9, "GHz", 9),
    };
    format!("{:.digits$} {unit}", f64::from(hertz) / divisor)
}

/// A complex number with `digits` places after the point: `0.7951 − 0.1930j`.
pub fn complex(z: Complex<f64>, digits: usize) -> String {
    rectangular(z, |part| fixed(part, usize::MAX, digits))
}

/// An impedance: `210.20 − 168.10j ohm`.
pub fn ohms(z: Complex<f64>) -> String {
    if !z.is_finite() || z.norm() > 1e9 {
        return "open".to_owned();
    }
    format!("{} ohm", rectangular(z, significant))
}

fn rectangular(z: Complex<f64>, write: impl Fn(f64) -> String) -> String {
    let im = write(z.im);
    let (sign, im) = match im.strip_prefix('-') {
        Some(magnitude) => ('−', magnitude),
        None => ('+', im.as_str()),
    };
    // an exponent keeps its hyphen
    let re = write(z.re);
    let re = match re.strip_prefix('-') {
        Some(magnitude) => format!("−{magnitude}"),
        None => re,
    };
    format!("{re} {sign} {im}j")
}

/// A whole number in groups of three.
pub fn grouped(number: u64) -> String {
    let digits = number.to_string();
    let mut text = String::new();
    for (index, digit) in digits.chars().enumerate() {
        if index > 0 && (digits.len() - index).is_multiple_of(3) {
            text.push(' ');
        }
        text.push(digit);
    }
    text
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn engineering_notation_keeps_its_digits() {
        for (value, digits, expected) in [
            (1.2e-6, 3, "1.20 µX"),
            (999.96e3, 4, "1.000 MX"),
            (-47.0, 3, "-47.0 X"),
            (0.0, 3, "0 X"),
            (5.3e12, 3, "5300 GX"),
        ] {
            assert_eq!(engineering(value, "X", digits), expected);
        }
    }

    #[test]
    fn frequencies_keep_every_hertz() {
        assert_eq!(frequency(10_100_363), "10.100363 MHz");
        assert_eq!(frequency(u32::MAX), "4.294967295 GHz");
        assert_eq!(frequency(999), "999 Hz");
    }

    #[test]
    fn fixed_figures_fit() {
        for (value, width, places, expected) in [
            (54.6512, 6, 3, "54.651"),
            (-99.9996, 6, 3, "-100.00"),
            (9999.96, 6, 3, "10000"),
            (-123_456_789.0, 6, 3, "-123456789"),
            (-0.0004, 6, 3, "0.000"),
            (-0.0, 6, 2, "0.00"),
            (f64::NEG_INFINITY, 6, 3, "-∞"),
            (f64::NAN, 6, 3, "–"),
        ] {
            assert_eq!(fixed(value, width, places), expected);
        }
    }

    #[test]
    fn impedances_take_seven_characters_at_most() {
        for (value, expected) in [
            (-3.6e-15, "0.000"),
            (-1.26e-4, "-1.3e-4"),
            (0.001, "0.001"),
            (-152.106, "-152.11"),
            (99_999.7, "100000"),
            (-1.26e17, "-1.3e17"),
            (f64::NAN, "∞"),
        ] {
            assert_eq!(significant(value), expected);
        }
        let z = Complex::new(-1.26e-4, -22.2);
        assert_eq!(ohms(z), "−1.3e-4 − 22.200j ohm");
        assert_eq!(ohms(Complex::new(1e9, 1e9)), "open");
    }

    #[test]
    fn complex_numbers_and_groups_read_well() {
        assert_eq!(complex(Complex::new(-0.5, -0.25), 2), "−0.50 − 0.25j");
        assert_eq!(complex(Complex::new(-0.001, -0.001), 2), "0.00 + 0.00j");
        assert_eq!(grouped(1_234_567), "1 234 567");
        assert_eq!(grouped(12), "12");
    }
}

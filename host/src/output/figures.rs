//! How figures are written: engineering notation, complex numbers, as many digits as they are
//! worth.

use num_complex::Complex;

/// `value` with three significant digits in exponent notation: errors and bounds.
pub fn error(value: f64) -> String {
    if value == 0.0 {
        "0".to_owned()
    } else {
        format!("{value:.2e}")
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
    let sign = if z.im < 0.0 { '−' } else { '+' };
    let re = format!("{:.digits$}", z.re).replace('-', "−");
    format!("{re} {sign} {:.digits$}j", z.im.abs())
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
    fn complex_numbers_and_groups_read_well() {
        assert_eq!(complex(Complex::new(-0.5, -0.25), 2), "−0.50 − 0.25j");
        assert_eq!(grouped(1_234_567), "1 234 567");
        assert_eq!(grouped(12), "12");
    }
}

//! The loss of a line from one or two points of its data sheet.

/// One point of a data sheet.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Point {
    /// Frequency in hertz, positive.
    pub(super) hertz: f64,
    /// Attenuation there in any unit, zero or more.
    pub(super) attenuation: f64,
}

/// Attenuation as `k1`·√f + `k2`·f, f in hertz, in the unit of the points.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub(super) struct Constants {
    /// Conductor loss (skin effect).
    pub(super) k1: f64,
    /// Dielectric loss.
    pub(super) k2: f64,
}

/// What the attenuation at the higher frequency has to lie between.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Limits {
    /// All of the loss in the conductor: it rises as √f.
    pub(super) low: f64,
    /// All of the loss in the dielectric: it rises as f.
    pub(super) high: f64,
}

/// A point is as good as on a limit where it misses it by no more than this part of it, which is
/// far above the rounding of the calculation and far below the digits of any data sheet.
const ON_THE_LIMIT: f64 = 1e-9;

/// All of the loss at one point taken as skin effect.
pub(super) fn through_one(point: Point) -> Constants {
    Constants {
        k1: point.attenuation / point.hertz.sqrt(),
        k2: 0.0,
    }
}

/// The curve through two points of different frequencies, the lower one first.
///
/// # Errors
/// Where one of the constants would be negative.
pub(super) fn through_two(low: Point, high: Point) -> Result<Constants, Limits> {
    let ratio = high.hertz / low.hertz;
    let root = ratio.sqrt();
    let limits = Limits {
        low: low.attenuation * root,
        high: low.attenuation * ratio,
    };
    let tolerance = ON_THE_LIMIT * high.attenuation;
    if high.attenuation < limits.low - tolerance || high.attenuation > limits.high + tolerance {
        return Err(limits);
    }
    // With c + d = a(low) and c·√r + d·r = a(high), c and d being the shares at the low frequency.
    let dielectric = ((high.attenuation - limits.low) / (ratio - root)).max(0.0);
    let conductor = ((limits.high - high.attenuation) / (ratio - root)).max(0.0);
    Ok(Constants {
        k1: conductor / low.hertz.sqrt(),
        k2: dielectric / low.hertz,
    })
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_relative_eq;

    fn point(hertz: f64, attenuation: f64) -> Point {
        Point { hertz, attenuation }
    }

    fn at(constants: Constants, hertz: f64) -> f64 {
        constants.k1 * hertz.sqrt() + constants.k2 * hertz
    }

    #[test]
    fn one_point_is_skin_effect_alone() {
        let constants = through_one(point(10e6, 2.2));
        assert_eq!(constants.k2, 0.0);
        assert_relative_eq!(at(constants, 10e6), 2.2, max_relative = 1e-15);
        assert_relative_eq!(at(constants, 40e6), 4.4, max_relative = 1e-15);
    }

    #[test]
    fn limits_belong_to_the_range() {
        let skin = through_two(point(1e6, 0.7), point(100e6, 7.0)).expect("rises as the root");
        assert_relative_eq!(skin.k1, 0.7e-3, max_relative = 1e-9);
        assert!(skin.k2 * 100e6 < 1e-8);
        let dielectric = through_two(point(1e6, 0.07), point(100e6, 7.0)).expect("rises as f");
        assert_relative_eq!(dielectric.k2, 0.07e-6, max_relative = 1e-9);
        assert!(dielectric.k1 * 1e4 < 1e-8);
        let none = through_two(point(1e6, 0.0), point(2e6, 0.0)).expect("no loss at all");
        assert_eq!((none.k1, none.k2), (0.0, 0.0));
    }

    #[test]
    fn beyond_the_limits_there_is_no_curve() {
        let low = point(10e6, 2.0);
        let limits = through_two(low, point(40e6, 3.9)).expect_err("less than the root");
        assert_eq!((limits.low, limits.high), (4.0, 8.0));
        assert!(through_two(low, point(40e6, 8.1)).is_err());
        assert!(through_two(point(10e6, 0.0), point(40e6, 0.1)).is_err());
    }

    proptest::proptest! {
        #[test]
        fn curve_goes_through_both_points(
            hertz in 1e3..1e9f64, ratio in 1.01..1e3f64, loss in 1e-6..10f64, share in 0.0..1.0f64,
        ) {
            let high = loss * (ratio.sqrt() * (1.0 - share) + ratio * share);
            let (low, high) = (point(hertz, loss), point(hertz * ratio, high));
            let constants = through_two(low, high).expect("between the limits");
            proptest::prop_assert!(constants.k1 >= 0.0 && constants.k2 >= 0.0);
            for Point { hertz, attenuation } in [low, high] {
                assert_relative_eq!(at(constants, hertz), attenuation, max_relative = 1e-9);
            }
        }
    }
}

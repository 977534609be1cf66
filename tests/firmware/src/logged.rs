//! The points that the image `log` logs.

use stagebits_kernel::Gamma;

/// Frequencies in hertz, and the load at each.
pub const POINTS: [(u32, Gamma); 3] = [
    (
        3_600_000,
        Gamma {
            re: 500_000_000,
            im: -700_000_000,
        },
    ),
    (
        7_100_000,
        Gamma {
            re: -878_000_000,
            im: 10_000_000,
        },
    ),
    (12_000_000, Gamma::OPEN),
];

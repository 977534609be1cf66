//! Why standards give no correction.

use core::fmt;

/// Why the readings of three standards give no correction.
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub enum CorrectionError {
    /// Two standards have the same reflection.
    SameReflection,
    /// Two standards read the same.
    SameReading,
    /// The readings take a source match of 1 or more, a directivity of 2 or more, or no tracking
    /// at all: an instrument like that could not read every passive load.
    NoInstrument,
}

impl fmt::Display for CorrectionError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(match self {
            Self::SameReflection => {
                "two of the three standards have the same reflection; they must differ"
            }
            Self::SameReading => {
                "two different standards read the same; measure each of them by itself"
            }
            Self::NoInstrument => {
                "no instrument that can read passive loads reads the three standards like that; \
                 check which reading belongs to which standard"
            }
        })
    }
}

impl core::error::Error for CorrectionError {}

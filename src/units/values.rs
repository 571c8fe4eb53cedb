//! Newtypes for what must not be mixed up.

use std::fmt;
use std::str::FromStr;

use super::error::UnitError;
use super::number::plain;
use super::quantity::{ANGLE, LENGTH};

/// A length, held in millimetres.
#[derive(Debug, Clone, Copy, PartialEq, PartialOrd, Default)]
pub struct Length {
    mm: f64,
}

impl Length {
    /// A length of so many millimetres.
    #[must_use]
    pub const fn from_mm(mm: f64) -> Self {
        Self { mm }
    }

    /// In millimetres.
    #[must_use]
    pub const fn mm(self) -> f64 {
        self.mm
    }
}

impl FromStr for Length {
    type Err = UnitError;

    fn from_str(text: &str) -> Result<Self, UnitError> {
        LENGTH.parse(text).map(Self::from_mm)
    }
}

impl fmt::Display for Length {
    /// In millimetres, to six decimals, as it may be written in a design file.
    fn fmt(&self, formatter: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(formatter, "{} mm", plain(self.mm))
    }
}

/// A speed in m/s in knots: 1852 metres an hour.
#[must_use]
pub fn knots(speed: f64) -> f64 {
    speed * 3600.0 / 1852.0
}

/// An angle. Held in degrees, so that what was written in degrees comes back exactly.
#[derive(Debug, Clone, Copy, PartialEq, PartialOrd, Default)]
pub struct Angle {
    degrees: f64,
}

impl Angle {
    /// An angle of so many degrees.
    #[must_use]
    pub const fn from_degrees(degrees: f64) -> Self {
        Self { degrees }
    }

    /// An angle of so many radians.
    #[must_use]
    pub const fn from_radians(radians: f64) -> Self {
        Self { degrees: radians.to_degrees() }
    }

    /// In degrees.
    #[must_use]
    pub const fn degrees(self) -> f64 {
        self.degrees
    }

    /// In radians.
    #[must_use]
    pub const fn radians(self) -> f64 {
        self.degrees.to_radians()
    }
}

impl FromStr for Angle {
    type Err = UnitError;

    fn from_str(text: &str) -> Result<Self, UnitError> {
        ANGLE.parse(text).map(Self::from_degrees)
    }
}

impl fmt::Display for Angle {
    /// In degrees, to six decimals, as it may be written in a design file.
    fn fmt(&self, formatter: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(formatter, "{} deg", plain(self.degrees))
    }
}

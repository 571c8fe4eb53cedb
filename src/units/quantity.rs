//! Kinds of quantity, the units each is written in, and the one parser for all of them.

use super::error::UnitError;
use super::number::{is_not_finite, split_number};
use super::spelling::{clipped, nearest};

/// A unit and the ways it is written.
#[derive(Debug, PartialEq, Eq, Clone, Copy)]
pub struct Unit {
    /// The usual way to write it, named in messages.
    pub symbol: &'static str,
    /// Other ways that are understood.
    pub also: &'static [&'static str],
    /// How many of the base unit make one.
    factor: Factor,
}

/// A unit's size in the base unit.
#[derive(Debug, PartialEq, Eq, Clone, Copy)]
enum Factor {
    /// Whole tenths of the base unit (254 for an inch in millimetres), so that the table is exact.
    Tenths(u32),
    /// The first over the second.
    Ratio(u32, u32),
    /// A radian in degrees.
    Radians,
}

/// A kind of quantity: its name and the table of its units, the base unit first.
#[derive(Debug, PartialEq, Eq)]
pub struct Quantity {
    /// With its article, as it stands in a sentence: "a length".
    pub name: &'static str,
    /// Every unit it is written in.
    pub units: &'static [Unit],
}

/// Lengths; the base unit is the millimetre.
pub static LENGTH: Quantity = Quantity {
    name: "a length",
    units: &[
        Unit { symbol: "mm", also: &[], factor: Factor::Tenths(10) },
        Unit { symbol: "cm", also: &[], factor: Factor::Tenths(100) },
        Unit { symbol: "m", also: &[], factor: Factor::Tenths(10_000) },
        Unit { symbol: "in", also: &["inch", "inches", "\""], factor: Factor::Tenths(254) },
        Unit { symbol: "ft", also: &["foot", "feet", "'"], factor: Factor::Tenths(3048) },
    ],
};

/// Angles; the base unit is the degree, which people write far more often than the radian.
pub static ANGLE: Quantity = Quantity {
    name: "an angle",
    units: &[
        Unit { symbol: "deg", also: &["°", "degree", "degrees"], factor: Factor::Tenths(10) },
        Unit { symbol: "rad", also: &[], factor: Factor::Radians },
    ],
};

/// Speeds; the base unit is the metre a second. A knot is 1852 metres an hour.
pub static SPEED: Quantity = Quantity {
    name: "a speed",
    units: &[
        Unit { symbol: "m/s", also: &[], factor: Factor::Tenths(10) },
        Unit { symbol: "kn", also: &["kt", "knots"], factor: Factor::Ratio(1852, 3600) },
        Unit { symbol: "km/h", also: &[], factor: Factor::Ratio(1000, 3600) },
    ],
};

/// Masses; the base unit is the kilogram. A pound is 0.45359237 kg.
pub static MASS: Quantity = Quantity {
    name: "a mass",
    units: &[
        Unit { symbol: "kg", also: &[], factor: Factor::Tenths(10) },
        Unit { symbol: "lb", also: &["lbs"], factor: Factor::Ratio(45_359_237, 100_000_000) },
    ],
};

/// Temperatures in degrees Celsius.
pub static TEMPERATURE: Quantity = Quantity {
    name: "a temperature",
    units: &[Unit { symbol: "°C", also: &["C", "degC"], factor: Factor::Tenths(10) }],
};

/// Weights of cloth for each area; the base unit is the gram for each square metre.
pub static AREAL_WEIGHT: Quantity = Quantity {
    name: "a weight for each area",
    units: &[
        Unit { symbol: "g/m2", also: &["g/m²"], factor: Factor::Tenths(10) },
        Unit { symbol: "kg/m2", also: &["kg/m²"], factor: Factor::Tenths(10_000) },
    ],
};

/// Stresses, strengths and moduli; the base unit is the megapascal, which is a newton on each square millimetre.
pub static STRESS: Quantity = Quantity {
    name: "a stress",
    units: &[
        Unit { symbol: "MPa", also: &["N/mm2", "N/mm²"], factor: Factor::Tenths(10) },
        Unit { symbol: "GPa", also: &[], factor: Factor::Tenths(10_000) },
    ],
};

/// Forces; the base unit is the newton.
pub static FORCE: Quantity = Quantity {
    name: "a force",
    units: &[
        Unit { symbol: "N", also: &[], factor: Factor::Tenths(10) },
        Unit { symbol: "kN", also: &[], factor: Factor::Tenths(10_000) },
    ],
};

/// Moments; the base unit is the newton metre.
pub static MOMENT: Quantity = Quantity {
    name: "a moment",
    units: &[Unit { symbol: "N m", also: &["Nm", "N·m"], factor: Factor::Tenths(10) }],
};

/// Densities; the base unit is the kilogram for each cubic metre.
pub static DENSITY: Quantity = Quantity {
    name: "a density",
    units: &[
        Unit { symbol: "kg/m3", also: &["kg/m³"], factor: Factor::Tenths(10) },
        Unit { symbol: "g/cm3", also: &["g/cm³"], factor: Factor::Tenths(10_000) },
    ],
};

impl Quantity {
    /// Reads `text` as this quantity, in its base unit (millimetres, degrees).
    ///
    /// A number, as much blank as you like, and a unit: "900 mm", "2.5cm", "1e2 mm", "-4 deg".
    ///
    /// # Errors
    /// When the text is empty, has no number or no unit, a unit that is not in the table, or a
    /// number that is not finite.
    pub fn parse(&'static self, text: &str) -> Result<f64, UnitError> {
        let trimmed = text.trim();
        if trimmed.is_empty() {
            return Err(UnitError::Empty { quantity: self });
        }
        if is_not_finite(trimmed) {
            return Err(UnitError::NotFinite { quantity: self, text: clipped(trimmed) });
        }
        let (digits, rest) = split_number(trimmed);
        let number = digits.replace('\u{2212}', "-").parse::<f64>();
        let Ok(number) = number else {
            return Err(UnitError::NotANumber { quantity: self, text: clipped(trimmed) });
        };
        let unit = rest.trim_start();
        if unit.is_empty() {
            return Err(UnitError::Bare { quantity: self, text: clipped(trimmed) });
        }
        let Some(known) = self.units.iter().find(|known| known.is_written(unit)) else {
            let nearest = nearest(unit, self.spellings());
            return Err(UnitError::UnknownUnit { quantity: self, unit: clipped(unit), nearest });
        };
        let value = known.factor.times(number);
        if !value.is_finite() {
            return Err(UnitError::NotFinite { quantity: self, text: clipped(trimmed) });
        }
        Ok(value)
    }

    /// The units as they stand in a sentence: "mm, cm, m, in or ft".
    #[must_use]
    pub fn unit_list(&self) -> String {
        let symbols: Vec<&str> = self.units.iter().map(|unit| unit.symbol).collect();
        match symbols.split_last() {
            Some((last, rest)) if !rest.is_empty() => format!("{} or {last}", rest.join(", ")),
            _ => symbols.concat(),
        }
    }

    /// A regular expression for every text that [`Quantity::parse`] takes in plain spaces and
    /// ASCII digits, for editors that check a file while it is written.
    #[must_use]
    pub fn pattern(&self) -> String {
        let units: Vec<&str> = self.spellings().collect();
        format!(r"^ *[+-]?([0-9]+\.?[0-9]*|\.[0-9]+)([eE][+-]?[0-9]+)? *({}) *$", units.join("|"))
    }

    /// The unit meant where none was written, for the help beside an error.
    pub(crate) fn base(&self) -> &'static str {
        self.units.first().map_or("", |unit| unit.symbol)
    }

    fn spellings(&self) -> impl Iterator<Item = &'static str> {
        self.units.iter().flat_map(|unit| std::iter::once(unit.symbol).chain(unit.also.iter().copied()))
    }
}

impl Unit {
    fn is_written(&self, text: &str) -> bool {
        self.symbol == text || self.also.contains(&text)
    }
}

impl Factor {
    fn times(self, number: f64) -> f64 {
        match self {
            // Whole factors go in whole, and the others divide last: one rounding, not two.
            Self::Tenths(tenths) if tenths % 10 == 0 => number * f64::from(tenths / 10),
            Self::Tenths(tenths) => number * f64::from(tenths) / 10.0,
            Self::Ratio(over, under) => number * f64::from(over) / f64::from(under),
            Self::Radians => number.to_degrees(),
        }
    }
}

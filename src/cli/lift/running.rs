//! How a section runs: speed, chord and water, and what coefficients become in them.

use plankform::flow::{GRAVITY, Salinity, Water};
use plankform::units::{knots, number};

use super::Failure;

/// The water, and the foil in it as far as it is known.
#[derive(Debug, Clone, Copy)]
pub(super) struct Surroundings {
    pub(super) water: Water,
    pub(super) salinity: Salinity,
    /// Degrees Celsius.
    pub(super) temperature: f64,
    /// In m.
    pub(super) chord: Option<f64>,
    /// In m.
    pub(super) depth: Option<f64>,
    /// By what share the cavitation number is to stay above the suction.
    pub(super) margin: f64,
}

/// What one curve runs at.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Running {
    pub(super) reynolds: Option<f64>,
    /// In m/s.
    pub(super) speed: Option<f64>,
}

/// What turns coefficients into forces on each metre of span.
#[derive(Debug, Clone, Copy)]
pub(super) struct Scale {
    /// N/m for a coefficient of one.
    pub(super) force: f64,
    /// Nm/m for a moment coefficient of one.
    pub(super) moment: f64,
}

impl Surroundings {
    pub(super) fn of(
        salinity: Salinity,
        temperature: f64,
        chord: Option<f64>,
        depth: Option<f64>,
        margin: f64,
    ) -> Result<Self, Failure> {
        let water = Water::at(salinity, temperature)
            .ok_or_else(|| Failure::Input(format!("water of {temperature} °C is outside 0 to 30 °C")))?;
        Ok(Self { water, salinity, temperature, chord, depth, margin })
    }

    /// Where chord and speed are known.
    pub(super) fn scale(&self, running: Running) -> Option<Scale> {
        let (chord, speed) = (self.chord?, running.speed?);
        let force = 0.5 * self.water.density * speed * speed * chord;
        Some(Scale { force, moment: force * chord })
    }

    /// Speed in m/s from which a suction makes the water boil at the depth, with the margin asked.
    pub(super) fn inception_speed(&self, cp_min: f64) -> Option<f64> {
        self.water.inception_speed(self.depth?, cp_min * (1.0 + self.margin))
    }

    /// Cavitation number at the speed of a curve.
    pub(super) fn cavitation_number(&self, running: Running) -> Option<f64> {
        Some(self.water.cavitation_number(self.depth?, running.speed?))
    }

    /// The water in words.
    pub(super) fn words(&self) -> String {
        let kind = match self.salinity {
            Salinity::Sea => "sea",
            Salinity::Fresh => "fresh",
        };
        format!("{kind} water of {} °C", number(self.temperature, 1))
    }
}

/// Mass in kg that a force in N carries.
pub(super) fn carries(force: f64) -> f64 {
    force / GRAVITY
}

/// A speed in words, short.
pub(super) fn in_knots(speed: f64) -> String {
    format!("{} kn", number(knots(speed), 1))
}

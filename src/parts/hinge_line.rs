//! Where the hinge of a flap runs along the span.

use crate::units::number;

/// What the places of a hinge line are measured as.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum HingeBy {
    /// Fractions of the chord from the nose.
    Fraction,
    /// Lengths along the chord from the nose, mm.
    FromNose,
    /// Lengths along the chord from the trailing edge, mm.
    FromTrailingEdge,
}

/// Where a flap is parted from the main body.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct HingeLine {
    /// What its places are measured as.
    pub by: HingeBy,
    /// Its places on the chord at the flap's inner and outer end; between them it changes evenly.
    pub places: [f64; 2],
    /// Where the flap begins, mm from the root.
    pub from: f64,
    /// Where it ends, mm from the root.
    pub to: f64,
}

impl HingeLine {
    /// Distance from the nose along a chord of so many mm at `at` mm from the root.
    #[must_use]
    pub fn x_at(&self, at: f64, chord: f64) -> f64 {
        let share = ((at - self.from) / (self.to - self.from)).clamp(0.0, 1.0);
        let [inner, outer] = self.places;
        let place = inner + share * (outer - inner);
        match self.by {
            HingeBy::Fraction => place * chord,
            HingeBy::FromNose => place,
            HingeBy::FromTrailingEdge => chord - place,
        }
    }

    /// Its places in words: "70 % of chord", "36 to 24 mm from the trailing edge".
    #[must_use]
    pub fn words(&self) -> String {
        let (factor, unit) = match self.by {
            HingeBy::Fraction => (100.0, "% of chord"),
            HingeBy::FromNose => (1.0, "mm from the nose"),
            HingeBy::FromTrailingEdge => (1.0, "mm from the trailing edge"),
        };
        let [inner, outer] = self.places.map(|place| number(factor * place, 1));
        if inner == outer { format!("{inner} {unit}") } else { format!("{inner} to {outer} {unit}") }
    }

    /// Whether the flap reaches the station at `at` mm from the root.
    #[must_use]
    pub fn reaches(&self, at: f64) -> bool {
        (self.from..=self.to).contains(&at)
    }
}

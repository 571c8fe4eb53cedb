//! The finish of a foil's nose, as far as the flow feels it.

use super::Conditions;

/// How the nose is finished.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum NoseFinish {
    /// So smooth that the layer turns turbulent where it will.
    Smooth,
    /// With dirt, dents or sanding marks that make the layer turbulent at the nose.
    Rough,
}

/// Where a rough nose makes the layer turbulent, a fraction of the chord. Common practice, no source.
const ROUGH_FROM: f64 = 0.02;

impl NoseFinish {
    /// Both, the smooth one first.
    pub const BOTH: [Self; 2] = [Self::Smooth, Self::Rough];

    /// The conditions with this finish.
    #[must_use]
    pub fn on(self, conditions: Conditions) -> Conditions {
        match self {
            Self::Smooth => conditions,
            Self::Rough => conditions.tripped(ROUGH_FROM),
        }
    }

    /// In a word.
    #[must_use]
    pub fn word(self) -> &'static str {
        match self {
            Self::Smooth => "smooth",
            Self::Rough => "rough",
        }
    }
}

//! What can be wrong with a quantity, in the user's words.

use super::quantity::Quantity;

/// Why a text is not the quantity that is wanted.
#[derive(Debug, Clone, PartialEq, thiserror::Error)]
pub enum UnitError {
    /// Nothing was written.
    #[error("{} is wanted here, and nothing is written", .quantity.name)]
    Empty {
        /// What was wanted.
        quantity: &'static Quantity,
    },
    /// A number without a unit.
    #[error("{text} has no unit: {} is written in {}", .quantity.name, .quantity.unit_list())]
    Bare {
        /// What was wanted.
        quantity: &'static Quantity,
        /// The number.
        text: String,
    },
    /// A unit that this quantity is not written in.
    #[error(
        "'{unit}' is not a unit of {}: it is written in {}{}",
        .quantity.name,
        .quantity.unit_list(),
        .nearest.map(|near| format!("; did you mean {near}?")).unwrap_or_default()
    )]
    UnknownUnit {
        /// What was wanted.
        quantity: &'static Quantity,
        /// What stands after the number.
        unit: String,
        /// The unit spelt most like it, if one is near.
        nearest: Option<&'static str>,
    },
    /// No number at the start, or one that cannot be read.
    #[error(
        "'{text}' does not start with a number{}",
        if .text.contains(',') { ": write decimals with a point, 2.5 and not 2,5" } else { "" }
    )]
    NotANumber {
        /// What was wanted.
        quantity: &'static Quantity,
        /// What was written.
        text: String,
    },
    /// NaN, infinity, or a number too large to compute with.
    #[error("'{text}' is not a finite number, and {} must be one", .quantity.name)]
    NotFinite {
        /// What was wanted.
        quantity: &'static Quantity,
        /// What was written.
        text: String,
    },
}

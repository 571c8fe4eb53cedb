//! Quantities with units as people write them.
//!
//! Text with a unit comes in here ("900 mm", "35 in", "12°") and leaves as a newtype that cannot be
//! mistaken for another quantity. What a quantity takes is one table, [`Quantity`], which feeds the
//! parser, its messages and the schema of the design file alike.

mod error;
mod number;
mod quantity;
mod spelling;
mod values;

pub use error::UnitError;
pub use number::{fixed, number};
pub use quantity::{
    ANGLE, AREAL_WEIGHT, DENSITY, FORCE, LENGTH, MASS, MOMENT, Quantity, SPEED, STRESS, TEMPERATURE, Unit,
};
pub use values::{Angle, Length, knots};

pub(crate) use number::plain;
pub(crate) use spelling::{clipped, harmless, nearest};

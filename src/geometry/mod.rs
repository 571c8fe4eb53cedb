//! Plane and solid geometry that knows no foil: curves, arcs, polygons, solids.

pub mod curve;

pub use curve::{Curve, Jet};
pub use kurbo::{Point, Vec2};

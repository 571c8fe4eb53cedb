//! Plane and solid geometry that knows no foil: curves, arcs, polygons, solids.

mod arc_cut;
mod arc_path;
mod biarcs;
pub mod curve;
mod error;
mod outline;
mod packing;
pub mod polygon;
mod room;
mod solid;
mod solid_faces;
mod solid_grid;
mod solid_measures;

pub use arc_path::{ArcPath, ArcVertex, Segment};
pub use biarcs::follow_with_arcs;
pub use curve::{Curve, Jet, height_at, parameter_at};
pub use error::GeometryError;
pub use kurbo::{Affine, BezPath, Point, Rect, Vec2};
pub use outline::fitted_outline;
pub use packing::{Place, packed};
pub use room::rectangle_fits;
pub use solid::Solid;
pub use solid_faces::Face;

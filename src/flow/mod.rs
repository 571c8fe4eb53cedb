//! Two-dimensional flow about a section.

mod bucket;
mod dense;
mod edge;
mod error;
mod far_field;
mod hinge;
mod influence;
mod lanes;
mod loads;
mod lu;
mod nose;
mod panelling;
mod potential;
mod side_by_side;
mod viscous;
mod water;

pub use bucket::{Bucket, BucketPoint, FreeLift};
pub use error::FlowError;
pub use hinge::hinge_moment;
pub use nose::NoseFinish;
pub use panelling::{DEFAULT_PANELS, LEAST_PANELS, MOST_PANELS, Panelling};
pub use potential::{PotentialFlow, PressurePoint, Solution};
pub use side_by_side::side_by_side;
pub use viscous::{
    Conditions, CurvePoint, LayerPoint, LiftCurve, SideFlow, Viscous, ViscousError, ViscousSolution,
    ViscousState, layer_along,
};
pub use water::{ATMOSPHERE, GRAVITY, Salinity, Water};

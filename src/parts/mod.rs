//! What is physically made: the finished surface less the laminate, in one piece or parted at a
//! flap's hinge.

mod core;
mod cut_out;
mod error;
mod hinge;
mod hinge_axis;
mod hinge_line;
mod laminate;
mod pieces;

pub use self::core::Core;
pub use cut_out::{CutOut, CutShape};
pub use error::PartError;
pub use hinge::{GAP_SLACK, Hinge, HingeKind, Piece, Split, split};
pub use hinge_axis::HingeAxis;
pub use hinge_line::{HingeBy, HingeLine};
pub use laminate::{Covers, Laminate, Ply, PlyMaterial};
pub use pieces::{WoodPiece, WoodPlan};

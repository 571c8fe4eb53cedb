//! What is physically made: the finished surface less the laminate, in one piece or parted at a
//! flap's hinge.

mod core;
mod error;
mod laminate;

pub use self::core::Core;
pub use error::PartError;
pub use laminate::{Covers, Laminate, Ply, PlyMaterial};

//! Why a pack is not made or not written.

use std::io;
use std::path::PathBuf;

use crate::export::ExportError;
use crate::flow::{FlowError, ViscousError};
use crate::geometry::GeometryError;
use crate::loading::LoadingError;
use crate::parts::PartError;
use crate::section::SectionError;
use crate::strength::StrengthError;
use crate::wing::WingError;

/// Why a pack is not made or not written. Nothing is half-written: the earlier pack, if any,
/// stays as it was.
#[derive(Debug, thiserror::Error)]
pub enum PackError {
    /// A station's shape cannot be made.
    #[error("station {at} mm: {source}")]
    Shape {
        /// Distance from the root, mm.
        at: f64,
        /// What is wrong.
        source: GeometryError,
    },
    /// A part cannot be made.
    #[error(transparent)]
    Part(#[from] PartError),
    /// The foil cannot be lofted.
    #[error(transparent)]
    Wing(#[from] WingError),
    /// The flow cannot be solved.
    #[error(transparent)]
    Flow(#[from] FlowError),
    /// The flow with friction is asked for out of its range.
    #[error("flow with friction: {0}")]
    Viscous(#[from] ViscousError),
    /// The foil under its boat cannot be worked out.
    #[error("the foil under its boat: {0}")]
    Loading(#[from] LoadingError),
    /// A section's flap cannot be turned.
    #[error(transparent)]
    Section(#[from] SectionError),
    /// The strength cannot be worked out.
    #[error("strength: {0}")]
    Strength(#[from] StrengthError),
    /// A ply or the wood has no values to work out strength by.
    #[error("strength: material values are missing")]
    NoMaterials,
    /// A temperature at which the properties of water are not tabulated.
    #[error("water of {celsius} °C is not known: 0 to 30 °C")]
    Water {
        /// Degrees Celsius.
        celsius: f64,
    },
    /// A curve is missing.
    #[error("flow with friction: a curve is missing")]
    Curves,
    /// A format refuses what it was given.
    #[error(transparent)]
    Export(#[from] ExportError),
    /// The place for the pack is taken by a file.
    #[error("{} is a file: --out takes the folder that the pack goes into", path.display())]
    NotAFolder {
        /// The place.
        path: PathBuf,
    },
    /// The place for the pack is the folder the program runs in, or one that holds it.
    #[error("{} holds the folder you stand in: name a folder of its own for the pack", path.display())]
    WorkingFolder {
        /// The place.
        path: PathBuf,
    },
    /// The folder holds something, but no pack of this design.
    #[error("{} is not empty and holds no pack of '{design}': name an empty or a new folder with --out", path.display())]
    NotOurs {
        /// The folder.
        path: PathBuf,
        /// Name of the design.
        design: String,
    },
    /// A file of the earlier pack was changed by hand.
    #[error("{} was changed since it was written: move it away, or build into another folder with --out", path.display())]
    Changed {
        /// The file.
        path: PathBuf,
    },
    /// Something of the user's stands where a file of the pack must go.
    #[error("{} is not part of the earlier pack and is in the way: move it, or build into another folder with --out", path.display())]
    InTheWay {
        /// The file.
        path: PathBuf,
    },
    /// The disk refused.
    #[error("{} {}: {source}", match doing { Doing::Reading => "cannot read", Doing::Writing => "cannot write" }, path.display())]
    Disk {
        /// What was being done.
        doing: Doing,
        /// Where.
        path: PathBuf,
        /// What the system said.
        source: io::Error,
    },
}

/// What the disk was asked for.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Doing {
    /// To give.
    Reading,
    /// To take.
    Writing,
}

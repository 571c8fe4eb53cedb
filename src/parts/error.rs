//! Why a part cannot be made.

/// Why a part cannot be made.
#[derive(Debug, Clone, PartialEq, thiserror::Error)]
pub enum PartError {
    /// The skins of both sides meet everywhere.
    #[error("at {at:.1} mm from the root the skins leave no wood: take fewer plies, or a thicker section")]
    NoCore {
        /// Distance from the root, mm.
        at: f64,
    },
    /// A skin reaches further in than the outline bends.
    #[error(
        "at {at:.1} mm from the root the skin is thicker than the outline's radius near {x:.1} mm from the nose, and the core would fold there"
    )]
    Folds {
        /// Distance from the root, mm.
        at: f64,
        /// Distance from the nose, mm.
        x: f64,
    },
    /// A hinge where there is no wood for it.
    #[error(
        "at {at:.1} mm from the root there is no wood for a hinge {x:.1} mm from the nose: move it forward, or take fewer plies"
    )]
    OffTheWood {
        /// Distance from the root, mm.
        at: f64,
        /// Distance from the nose, mm.
        x: f64,
    },
    /// An outline that cannot be followed or parted.
    #[error(transparent)]
    Geometry(#[from] crate::geometry::GeometryError),
}

//! Why a part cannot be made.

/// Why a part cannot be made.
#[derive(Debug, Clone, PartialEq, thiserror::Error)]
pub enum PartError {
    /// The skins of both sides meet everywhere.
    #[error(
        "at {at:.1} mm from the root the skins leave no wood: they take up {skins:.2} mm where the section is {thickest:.2} mm thick; less than {:.2} mm a side would leave some, or a thicker section", 0.5 * thickest
    )]
    NoCore {
        /// Distance from the root, mm.
        at: f64,
        /// Greatest thickness of the finished section, mm.
        thickest: f64,
        /// What the skins of both sides take up there, mm.
        skins: f64,
    },
    /// A skin reaches further in than the outline bends.
    #[error(
        "at {at:.1} mm from the root the skin is {skin:.2} mm thick where the outline bends with a radius of {radius:.2} mm, near {x:.1} mm from the nose, and the core would fold there: a skin thinner than that would do"
    )]
    Folds {
        /// Distance from the root, mm.
        at: f64,
        /// Distance from the nose, mm.
        x: f64,
        /// What the skin takes up there, mm.
        skin: f64,
        /// Radius of the outline, mm.
        radius: f64,
    },
    /// A hinge where there is no wood for it.
    #[error(
        "at {at:.1} mm from the root there is no wood for a hinge {x:.1} mm from the nose: {}",
        match works {
            Some(works) => format!("{works:.1} mm would do"),
            None => "take fewer plies, less travel or less laminate on the cut faces".to_owned(),
        }
    )]
    OffTheWood {
        /// Distance from the root, mm.
        at: f64,
        /// Distance from the nose, mm.
        x: f64,
        /// The nearest distance from the nose that leaves wood on both sides, if any does.
        works: Option<f64>,
    },
    /// A place off the foil.
    #[error(transparent)]
    Wing(#[from] crate::wing::WingError),
    /// An outline that cannot be followed or parted.
    #[error(transparent)]
    Geometry(#[from] crate::geometry::GeometryError),
}

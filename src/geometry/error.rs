//! What can go wrong in geometry.

/// Why a shape cannot be made.
#[derive(Debug, Clone, PartialEq, thiserror::Error)]
pub enum GeometryError {
    /// A tolerance that is not a small positive length.
    #[error("a tolerance of {tolerance} mm is not possible: it must be more than zero")]
    Tolerance {
        /// What was asked.
        tolerance: f64,
    },
    /// A curve that cannot be followed within the tolerance, as where it is not finite.
    #[error("the outline cannot be followed within {tolerance} mm near x = {x:.3} mm, y = {y:.3} mm")]
    CannotFollow {
        /// What was asked.
        tolerance: f64,
        /// Place.
        x: f64,
        /// Place.
        y: f64,
    },
    /// An offset that leaves nothing, or more than one piece.
    #[error("an offset of {distance} mm leaves {pieces} contours where one is needed")]
    Offset {
        /// What was asked, outwards positive.
        distance: f64,
        /// How many came back.
        pieces: usize,
    },
    /// An offset that does not keep its distance.
    #[error("an offset of {distance} mm came out at {found} mm")]
    OffsetStrays {
        /// What was asked, outwards positive.
        distance: f64,
        /// What was found.
        found: f64,
    },
    /// A contour that crosses or touches itself.
    #[error("the contour crosses itself near x = {x:.3} mm, y = {y:.3} mm")]
    Crosses {
        /// Place.
        x: f64,
        /// Place.
        y: f64,
    },
    /// A polygon that cannot be cut into triangles.
    #[error("the face cannot be triangulated: {why}")]
    Triangulation {
        /// What the triangulation said.
        why: String,
    },
    /// A solid with a hole in its skin, or with a facet turned the wrong way.
    #[error("the solid is not closed: an edge at x = {x:.3}, y = {y:.3}, z = {z:.3} mm has no partner")]
    Leaks {
        /// Place.
        x: f64,
        /// Place.
        y: f64,
        /// Place.
        z: f64,
    },
    /// A cut that does not leave two pieces.
    #[error("the cut at x = {x:.3}, y = {y:.3} mm does not part the outline into two pieces")]
    Cut {
        /// A place on the cut.
        x: f64,
        /// The same.
        y: f64,
    },
}

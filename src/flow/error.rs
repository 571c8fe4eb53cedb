//! What can be wrong with an outline or the flow about it.

/// Why there is no flow to show.
#[derive(Debug, Clone, PartialEq, thiserror::Error)]
pub enum FlowError {
    /// The outline has too few panels to mean anything, or more than are worth solving.
    #[error("the outline has {panels} panels: the flow needs from {least} to {most}")]
    PanelCount {
        /// How many were given.
        panels: usize,
        /// Fewest that are accepted.
        least: usize,
        /// Most that are accepted.
        most: usize,
    },
    /// A coordinate is not a number, or not a finite one.
    #[error("point {index} of the outline is not finite: ({x}, {y})")]
    NotFinite {
        /// Which point, counted from zero at the upper trailing edge.
        index: usize,
        /// Its abscissa.
        x: f64,
        /// Its ordinate.
        y: f64,
    },
    /// Two neighbouring points coincide.
    #[error("points {index} and {} of the outline coincide at ({x}, {y})", .index + 1)]
    Coincident {
        /// The first of the two, counted from zero.
        index: usize,
        /// Their abscissa.
        x: f64,
        /// Their ordinate.
        y: f64,
    },
    /// The outline runs the wrong way round, or crosses itself so often that it has no inside.
    #[error(
        "the outline runs the wrong way: list it from the upper trailing edge over the nose to the lower trailing edge"
    )]
    Direction,
    /// The equations have no finite solution, as when the outline lies on top of itself.
    #[error("the flow about this outline cannot be solved: its surfaces may touch or cross each other")]
    Singular,
}

//! How a trailing edge is finished.

use super::{Section, SectionError, TrailingEdge, Work};

/// What a maker asks of the trailing edge of a section.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub enum Finish {
    /// As the section has it: of a published family, open as its equation leaves it.
    #[default]
    Published,
    /// Sharp. A published family has a form of its own for that; of others the rear is drawn in.
    Closed,
    /// So thick.
    Thick {
        /// Thickness, a fraction of the chord.
        thickness: f64,
        /// Station behind which the section is changed for it, as [`Work::edge_from`].
        from: f64,
    },
}

impl Finish {
    /// What a family is asked for.
    #[must_use]
    pub fn of_family(self) -> TrailingEdge {
        match self {
            Self::Closed => TrailingEdge::Closed,
            Self::Published | Self::Thick { .. } => TrailingEdge::Published,
        }
    }

    /// A section that is no member of a family, or one of [`Finish::of_family`], so finished.
    ///
    /// # Errors
    /// As [`Section::worked`].
    pub(super) fn of(self, section: Section) -> Result<Section, SectionError> {
        let (thickness, edge_from) = match self {
            Self::Published => return Ok(section),
            Self::Closed if section.edge_word() == TrailingEdge::Closed.word() => return Ok(section),
            Self::Closed => (0.0, Work::EDGE_FROM),
            Self::Thick { thickness, from } => (thickness, from),
        };
        section.worked(&Work { trailing_edge: Some(thickness), edge_from, ..Work::NONE })
    }
}

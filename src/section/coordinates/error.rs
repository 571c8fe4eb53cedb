//! What can be wrong with coordinates, in the user's words.

/// Why points make no section. Points are counted from 1 as they stand in the file; of a drawing
/// along its outline.
#[derive(Debug, Clone, PartialEq, thiserror::Error)]
pub enum CoordinateError {
    /// A tolerance that is none.
    #[error(
        "a tolerance of {tolerance} chords is not possible: it must be more than 0 and at most 0.01, such as 0.0001"
    )]
    Tolerance {
        /// What was asked.
        tolerance: f64,
    },
    /// A file that is not read because of its size.
    #[error("the file has more than {most} bytes, the most that are read: give the outline alone")]
    TooLong {
        /// The most bytes.
        most: usize,
    },
    /// Points that are too few or too many.
    #[error("there are {count} points: a section takes from {least} to {most}")]
    Count {
        /// How many there are.
        count: usize,
        /// The least.
        least: usize,
        /// The most.
        most: usize,
    },
    /// A coordinate no section has.
    #[error(
        "point {index} lies at a place that no section reaches: a coordinate must be finite and below 1e9"
    )]
    Size {
        /// The point.
        index: usize,
    },
    /// All points in one place, or on one line.
    #[error("the points enclose nothing: they must go round a section")]
    Flat,
    /// An outline that does not come back to its trailing edge.
    #[error(
        "the outline starts at point {first} and ends at point {last}, {percent:.0} % of its length apart: both ends must lie at the trailing edge"
    )]
    Open {
        /// The first point.
        first: usize,
        /// The last point.
        last: usize,
        /// How far they are apart, percent of the length.
        percent: f64,
    },
    /// A surface that runs back towards the nose.
    #[error(
        "the {side} surface turns back at point {index}, {percent:.2} % of the chord behind the nose: from the nose on, each point must lie behind the one before it"
    )]
    TurnsBack {
        /// `upper` or `lower`.
        side: &'static str,
        /// The point.
        index: usize,
        /// Station, percent of chord.
        percent: f64,
    },
    /// A surface that steps.
    #[error(
        "the {side} surface steps at point {index}, {percent:.2} % of the chord behind the nose: it must run smoothly from nose to trailing edge"
    )]
    Steps {
        /// `upper` or `lower`.
        side: &'static str,
        /// The point.
        index: usize,
        /// Station, percent of chord.
        percent: f64,
    },
    /// Surfaces that cross.
    #[error(
        "the outline crosses itself near point {index}, {percent:.2} % of the chord behind the nose: the upper surface must stay above the lower one"
    )]
    Crosses {
        /// The nearest point.
        index: usize,
        /// Station, percent of chord.
        percent: f64,
    },
    /// A nose that nothing describes.
    #[error(
        "the nose has too few points: behind it (point {index}) the {side} surface has {count} within 10 % of the chord, the first at {percent:.2} %; it takes 2 at least, the first within 5 %"
    )]
    NoseBare {
        /// `upper` or `lower`.
        side: &'static str,
        /// How many there are.
        count: usize,
        /// Station of the first, percent of chord.
        percent: f64,
        /// The point at the nose.
        index: usize,
    },
    /// A stretch that nothing describes.
    #[error(
        "there is nothing between points {first} and {last}, {from:.1} % and {to:.1} % of the chord behind the nose: give points between them"
    )]
    Gap {
        /// The point before.
        first: usize,
        /// The point behind.
        last: usize,
        /// Station of the one, percent of chord.
        from: f64,
        /// Station of the other.
        to: f64,
    },
    /// A nose that is an edge.
    #[error(
        "the nose is sharp at point {index}: a section takes a round one, its radius 5e-7 of the chord at least"
    )]
    SharpNose {
        /// The point at the nose.
        index: usize,
    },
    /// Points that no smooth outline follows.
    #[error(
        "no smooth outline goes through the points: the best one passes point {index} at {distance:.5} of the chord"
    )]
    NotSmooth {
        /// The point that is furthest off.
        index: usize,
        /// Its distance, in chords.
        distance: f64,
    },
    /// A file that is no drawing.
    #[error("line {line} of the drawing cannot be read: {why}")]
    Drawing {
        /// Line, counted from 1.
        line: usize,
        /// What is wrong and what would be right.
        why: String,
    },
    /// A drawing that is written in another way.
    #[error("{why}")]
    Form {
        /// What is wrong and what would be right.
        why: String,
    },
    /// Not one outline.
    #[error(
        "the drawing holds {count} outlines ({which}): leave the one of the section and delete the others"
    )]
    SeveralOutlines {
        /// How many there are.
        count: usize,
        /// Their layers and handles.
        which: String,
    },
    /// A curve of a drawing that cannot be followed.
    #[error("the {kind} on layer '{layer}' (handle {handle}) cannot be read: {why}")]
    Curve {
        /// What it is.
        kind: &'static str,
        /// Its layer.
        layer: String,
        /// Its handle.
        handle: String,
        /// What is wrong and what would be right.
        why: String,
    },
}

impl CoordinateError {
    /// The point that it concerns, counted from 1, where it concerns one.
    #[must_use]
    pub fn point(&self) -> Option<usize> {
        match *self {
            Self::Size { index }
            | Self::TurnsBack { index, .. }
            | Self::Steps { index, .. }
            | Self::Crosses { index, .. }
            | Self::NoseBare { index, .. }
            | Self::SharpNose { index }
            | Self::NotSmooth { index, .. } => Some(index),
            Self::Gap { last, .. } | Self::Open { last, .. } => Some(last),
            _ => None,
        }
    }
}

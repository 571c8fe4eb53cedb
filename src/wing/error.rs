//! What can be wrong with a foil.

/// Why a foil cannot be built from its stations.
#[derive(Debug, Clone, PartialEq, thiserror::Error)]
pub enum WingError {
    /// A loft needs two ends.
    #[error("a foil needs at least two stations, one at each end; there are {count}")]
    TooFewStations {
        /// How many there are.
        count: usize,
    },
    /// The first station is not the root.
    #[error("the first station lies at {first} mm: it must be the root, at 0 mm")]
    NoRoot {
        /// Where it lies, mm.
        first: f64,
    },
    /// Stations that cross, or lie at the same place.
    #[error("a station at {after} mm follows one at {before} mm: stations go from the root to the tip")]
    Order {
        /// Earlier station, mm.
        before: f64,
        /// Later station, mm.
        after: f64,
    },
    /// A chord, twist or sweep that is no number, or a chord that is not positive.
    #[error("the station at {at} mm needs a positive chord and finite twist and sweep")]
    Station {
        /// Where, mm.
        at: f64,
    },
    /// A place outside the foil.
    #[error("{at} mm along the span is not on the foil, which runs from 0 mm to {reach} mm")]
    OffTheFoil {
        /// What was asked, mm.
        at: f64,
        /// Root to tip, mm.
        reach: f64,
    },
    /// An elliptic law for other than root and tip.
    #[error("an elliptic chord goes with two stations, root and tip: there are {count}")]
    EllipticStations {
        /// How many there are.
        count: usize,
    },
    /// A tip that takes up the whole foil.
    #[error(
        "a tip over {length} mm of the span does not go on a foil of {reach} mm from root to tip: take less"
    )]
    TipLength {
        /// What was asked, mm.
        length: f64,
        /// Root to tip, mm.
        reach: f64,
    },
    /// A tip whose end is no narrower than it was.
    #[error(
        "a tip that leaves a chord of {chord} mm does not draw the last station's {last} mm together: take less, but more than nothing"
    )]
    TipChord {
        /// What was asked, mm.
        chord: f64,
        /// That of the last station, mm.
        last: f64,
    },
    /// A section between two stations that cannot be made.
    #[error("between two stations: {why}")]
    Section {
        /// What is wrong.
        why: String,
    },
}

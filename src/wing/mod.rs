//! The whole foil: its planform, its stations and the surface lofted between them.
//!
//! Axes: x aft, z up, y along the span from the root (of a strut, from its upper end).

mod error;
mod fairing;
mod law;
mod loft;
mod planform;
mod tip;
mod wetted;

pub use error::WingError;
pub use law::{Law, along};
pub use loft::StationShape;
pub use planform::Planform;
pub use tip::{Tip, TipForm};

use crate::section::Section;

/// A section set at a place along the span.
#[derive(Debug, Clone, PartialEq)]
pub struct Station {
    /// Distance from the root, mm.
    pub at: f64,
    /// Chord, mm.
    pub chord: f64,
    /// Section, at unit chord.
    pub section: Section,
    /// Nose-up turn about [`Station::twist_about`], radians.
    pub twist: f64,
    /// How far the quarter chord lies aft of the first station's, mm.
    pub sweep: f64,
    /// How far it lies above the first station's, mm.
    pub rise: f64,
    /// Place on the chord about which the twist turns, a fraction of it from the nose.
    pub twist_about: f64,
}

/// A foil, lofted in straight lines between its stations as a batten fairs it; its end may be shaped.
#[derive(Debug, Clone, PartialEq)]
pub struct Wing {
    stations: Vec<Station>,
    mirrored: bool,
    tip: Option<Tip>,
}

impl Wing {
    /// A foil from its stations, the first at the root. `mirrored`: whether a second, mirrored
    /// half makes up the other side.
    ///
    /// # Errors
    /// When there are fewer than two stations, they do not ascend from zero, or a chord is not
    /// positive.
    pub fn new(stations: Vec<Station>, mirrored: bool) -> Result<Self, WingError> {
        if stations.len() < 2 {
            return Err(WingError::TooFewStations { count: stations.len() });
        }
        if stations[0].at != 0.0 {
            return Err(WingError::NoRoot { first: stations[0].at });
        }
        for pair in stations.windows(2) {
            if !(pair[1].at > pair[0].at && pair[1].at.is_finite()) {
                return Err(WingError::Order { before: pair[0].at, after: pair[1].at });
            }
        }
        for station in &stations {
            let finite = [station.twist, station.sweep, station.rise, station.twist_about];
            let finite = finite.iter().all(|value| value.is_finite());
            if !(station.chord > 0.0 && station.chord.is_finite() && finite) {
                return Err(WingError::Station { at: station.at });
            }
        }
        Ok(Self { stations, mirrored, tip: None })
    }

    /// The stations from root to tip.
    #[must_use]
    pub fn stations(&self) -> &[Station] {
        &self.stations
    }

    /// Whether a mirrored half makes up the other side.
    #[must_use]
    pub fn is_mirrored(&self) -> bool {
        self.mirrored
    }

    /// Length from the root to the tip, mm: half the span of a mirrored foil.
    #[must_use]
    pub fn reach(&self) -> f64 {
        self.stations.last().map_or(0.0, |s| s.at)
    }
}

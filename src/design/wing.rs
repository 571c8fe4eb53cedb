//! From the design to the foil it describes.

use super::{Design, Tip};
use crate::wing::{self, Station, Wing, WingError, along};

impl Design {
    /// The foil that the design describes.
    ///
    /// # Errors
    /// Never for a design read by [`Design::parse`], whose stations are in order; one put together
    /// by hand may break that.
    pub fn wing(&self) -> Result<Wing, WingError> {
        let stations = self.stations.iter().map(|station| Station {
            at: station.at.mm(),
            chord: station.chord.mm(),
            section: station.section.clone(),
            twist: station.twist.radians(),
            sweep: station.sweep.mm(),
            rise: station.rise.mm(),
            twist_about: self.twist_about,
        });
        let wing = Wing::new(along(self.law, stations.collect())?, self.in_halves())?;
        match self.tip {
            Some(Tip { form, length, chord, about }) => {
                wing.with_tip(wing::Tip { form, length: length.mm(), chord: chord.mm(), about })
            }
            None => Ok(wing),
        }
    }
}

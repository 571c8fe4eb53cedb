//! The end of a foil: rounded or cut, over a stretch of the span.

use super::{Wing, WingError};

/// How the end of a foil is shaped.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum TipForm {
    /// Both edges run in a quarter of an ellipse towards the chord that is left at the end: the
    /// chord is what the stations say times √(1 - s²), s from nought where the tip begins.
    Rounded,
    /// The chord falls evenly to what is left at the end, so that the edges run straight.
    Cut,
}

/// A shaped end. Every outline in it is that of the stations, drawn together in its own plane about
/// one place of its chord.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Tip {
    /// Rounded or cut.
    pub form: TipForm,
    /// Over how much of the span, mm.
    pub length: f64,
    /// Chord left at the very end, mm.
    pub chord: f64,
    /// The place that stays where it is, a fraction of the chord from the nose: 1 leaves the
    /// trailing edge as it is, 0 the nose.
    pub about: f64,
}

/// Straight pieces that stand for the tip's edges where these are wanted as polygons: their area is
/// then short by less than 1e-5 of the tip's.
const PIECES: usize = 128;

impl Wing {
    /// The same foil with its end shaped.
    ///
    /// # Errors
    /// When the tip is longer than the foil, or leaves no chord or more than there is.
    pub fn with_tip(mut self, tip: Tip) -> Result<Self, WingError> {
        let chord = self.stations().last().map_or(0.0, |station| station.chord);
        if !(tip.length > 0.0 && tip.length < self.reach()) {
            return Err(WingError::TipLength { length: tip.length, reach: self.reach() });
        }
        if !(tip.chord > 0.0 && tip.chord < chord && (0.0..=1.0).contains(&tip.about)) {
            return Err(WingError::TipChord { chord: tip.chord, last: chord });
        }
        self.tip = Some(tip);
        Ok(self)
    }

    /// How its end is shaped, if it is.
    #[must_use]
    pub fn tip(&self) -> Option<&Tip> {
        self.tip.as_ref()
    }

    /// Where a shaped end begins, mm from the root; the end itself where it is as the stations have it.
    #[must_use]
    pub fn tip_from(&self) -> f64 {
        self.reach() - self.tip.map_or(0.0, |tip| tip.length)
    }

    /// Places from the root to the end between which edges and volumes may be taken as running evenly:
    /// the stations, and more within a shaped end.
    #[must_use]
    pub fn even_places(&self) -> Vec<f64> {
        let mut places: Vec<f64> = self.stations().iter().map(|station| station.at).collect();
        if let Some(tip) = &self.tip {
            let from = self.tip_from();
            let (pieces, whole, end) = match tip.form {
                TipForm::Cut => (1, 0.0, 0.0),
                TipForm::Rounded => {
                    let whole = tip.whole_length(self.end_chord());
                    (PIECES, whole, (tip.length / whole).asin())
                }
            };
            // Equal steps of the ellipse's own angle, so that they draw together where it turns.
            places.extend((0..pieces).map(|i| from + whole * (end * i as f64 / pieces as f64).sin()));
            places.sort_by(f64::total_cmp);
            places.dedup_by(|a, b| (*a - *b).abs() < 1e-9);
        }
        places
    }

    /// Chord at `at` mm from the root as it runs between the stations in straight lines, with the tip's
    /// share of it.
    #[must_use]
    pub fn chord_at(&self, at: f64) -> f64 {
        let by_stations = self.chord_by_stations(at);
        by_stations[0] * self.drawn_together(at, by_stations)[0]
    }

    /// Chord at the end by the stations alone.
    fn end_chord(&self) -> f64 {
        self.stations().last().map_or(0.0, |station| station.chord)
    }

    /// By how much the outline at `at` is drawn together, and the change of that for each mm along
    /// the span. `chord`: by the stations, with its change for each mm.
    pub(super) fn drawn_together(&self, at: f64, [chord, rate]: [f64; 2]) -> [f64; 2] {
        let beyond = at - self.tip_from();
        let Some(tip) = self.tip.filter(|_| beyond > 0.0) else { return [1.0, 0.0] };
        match tip.form {
            TipForm::Rounded => {
                let whole = tip.whole_length(self.end_chord());
                let share = (1.0 - (beyond / whole).powi(2)).sqrt();
                [share, -beyond / (whole * whole * share)]
            }
            TipForm::Cut => {
                let begins = self.chord_by_stations(self.tip_from())[0];
                let fall = (tip.chord - begins) / tip.length;
                let share = (begins + fall * beyond) / chord;
                [share, (fall - share * rate) / chord]
            }
        }
    }

    /// Chord at `at` by the stations alone, and its change for each mm along the span.
    pub(super) fn chord_by_stations(&self, at: f64) -> [f64; 2] {
        let stations = self.stations();
        let outer = stations.partition_point(|station| station.at < at).clamp(1, stations.len() - 1);
        let (a, b) = (&stations[outer - 1], &stations[outer]);
        let rate = (b.chord - a.chord) / (b.at - a.at);
        [a.chord + rate * (at - a.at), rate]
    }
}

impl Tip {
    /// Half axis along the span of the ellipse that would run out to nothing.
    fn whole_length(&self, end_chord: f64) -> f64 {
        let left = self.chord / end_chord;
        self.length / (1.0 - left * left).sqrt()
    }
}

//! What other areas and spans would carry the same load with the same margin.

use super::polars::Curves;
use super::{Foil, RANGE};
use crate::loading::{GreatestLift, LiftingLine, LoadingError, SectionLift, SectionPoint, Setting, State};
use crate::wing::{Station, Wing};

/// Spans that are tried, in spans of the design.
const SPANS: [f64; 5] = [0.8, 0.9, 1.0, 1.15, 1.3];
/// Strips: a choice needs less than an answer.
const STRIPS: usize = 16;
/// Rounds in which the chord is found; lift goes nearly with area, so that each gains two digits.
const ROUNDS: usize = 3;

/// A foil that would do.
pub(in crate::pack) struct Size {
    /// Tip to tip, mm.
    pub(in crate::pack) span: f64,
    /// mm².
    pub(in crate::pack) area: f64,
    /// Chord of the root, mm.
    pub(in crate::pack) root: f64,
    /// Drag at the second speed, N; `None` where it does not carry the load there.
    pub(in crate::pack) drag: Option<f64>,
}

/// The curves of a foil read on one of another span.
struct Stretched<'a> {
    tables: &'a Curves,
    by: f64,
}

impl SectionLift for Stretched<'_> {
    fn at(&self, along: f64, incidence: f64, flap: f64) -> SectionPoint {
        self.tables.at(along / self.by, incidence, flap)
    }

    fn greatest(&self, along: f64, flap: f64) -> Option<GreatestLift> {
        self.tables.greatest(along / self.by, flap)
    }
}

/// Foils of the same sections and taper that carry `load` N at the slow speed with no more than `share` of
/// their greatest lift, and their drag at the fast one. Sections are read at the design's own Reynolds numbers.
pub(super) fn sizes(
    foil: &Foil<'_>,
    load: f64,
    share: f64,
    [slow, fast]: [f64; 2],
) -> Result<Vec<Size>, LoadingError> {
    let (slow, fast) = (foil.at(slow)?, foil.at(fast)?);
    let size = |&by: &f64| -> Result<Option<Size>, LoadingError> {
        let mut chord = 1.0;
        for _ in 0..ROUNDS {
            let Some(line) = laid(foil, by, chord, slow.depth) else { return Ok(None) };
            let tables = Stretched { tables: &slow.curves.lift, by };
            let Ok(most) = line.greatest_lift(&tables, &slow.state, RANGE) else { return Ok(None) };
            if most.lift <= 0.0 {
                return Ok(None);
            }
            chord *= load / (share * most.lift);
        }
        let Some(line) = laid(foil, by, chord, fast.depth) else { return Ok(None) };
        let state = State { flap: 0.0, ..fast.state };
        let carried = line.incidence_for(&Stretched { tables: &fast.curves.lift, by }, &state, load, RANGE);
        Ok(Some(Size {
            span: line.span(),
            area: line.area(),
            root: chord * foil.wing.stations()[0].chord,
            drag: carried.ok().map(|loading| loading.drag()),
        }))
    };
    let found: Vec<Option<Size>> = SPANS.iter().map(size).collect::<Result<_, _>>()?;
    Ok(found.into_iter().flatten().collect())
}

/// The foil with its span and its chords stretched.
fn laid(foil: &Foil<'_>, span: f64, chord: f64, depth: f64) -> Option<LiftingLine> {
    let stations = foil.wing.stations().iter().map(|station| Station {
        at: span * station.at,
        chord: chord * station.chord,
        sweep: span * station.sweep,
        rise: span * station.rise,
        ..station.clone()
    });
    let wing = Wing::new(stations.collect(), foil.wing.is_mirrored()).ok()?;
    let setting = Setting { strips: STRIPS, depth: Some(depth), ..Setting::default() };
    LiftingLine::new(&wing, &setting).ok()
}

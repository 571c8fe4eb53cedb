//! The whole foil under its boat: what it carries at which speed, and what that costs.

use super::PackError;
use super::friction::StationCurves;
use crate::design::{Design, Duty};
use crate::flow::{GRAVITY, LiftCurve, Water};
use crate::loading::{
    CurvePoint, LiftingLine, Loading, LoadingError, SectionTable, Setting, SpanTables, SpeedPoint, State,
    TakeOff,
};
use crate::wing::Wing;

/// How a foil does its duty.
pub(super) struct FoilDuty {
    pub(super) duty: Duty,
    /// Load in N.
    pub(super) load: f64,
    /// Least speed that carries the load with the margin asked, or why there is none.
    pub(super) take_off: Result<TakeOff, LoadingError>,
    /// Take-off, cruise and top speed, as far as they are named.
    pub(super) named: Vec<(&'static str, SpeedPoint)>,
    /// Speeds from take-off on, for a plot.
    pub(super) over_speeds: Vec<SpeedPoint>,
}

/// Incidence of the foil that is looked at, degrees.
const RANGE: (f64, f64) = (-8.0, 16.0);
/// Strips from the root to the tip.
const STRIPS: usize = 30;
/// Speeds of the plot, from take-off to twice that or the top speed.
const SPEEDS: usize = 13;

impl FoilDuty {
    /// `None` where the design asks nothing of its foil.
    pub(super) fn of(
        design: &Design,
        wing: &Wing,
        water: &Water,
        curves: &[StationCurves<'_>],
    ) -> Result<Option<Self>, PackError> {
        let Some(duty) = design.duty else { return Ok(None) };
        let tables = tables(curves)?;
        let setting = Setting { strips: STRIPS, depth: Some(design.lift.depth.mm()), ..Setting::default() };
        let line = LiftingLine::new(wing, &setting)?;
        let load = duty.carries * GRAVITY;
        let range = (RANGE.0.to_radians(), RANGE.1.to_radians());
        let state = State { speed: duty.take_off, density: water.density, incidence: 0.0, flap: 0.0 };
        let speeds =
            [("take-off", Some(duty.take_off)), ("cruise", duty.cruise), ("top", design.lift.top_speed)];
        let speeds: Vec<(&str, f64)> =
            speeds.into_iter().filter_map(|(name, at)| Some((name, at?))).collect();
        let at: Vec<f64> = speeds.iter().map(|(_, speed)| *speed).collect();
        let named = line.over_speeds(&tables, &state, load, range, &at);
        let fastest = at.iter().copied().fold(2.0 * duty.take_off, f64::max);
        let step = (fastest - duty.take_off) / (SPEEDS - 1) as f64;
        let along: Vec<f64> = (0..SPEEDS).map(|i| duty.take_off + step * i as f64).collect();
        Ok(Some(Self {
            duty,
            load,
            take_off: line.take_off(&tables, &state, load, duty.share, range),
            named: speeds.into_iter().map(|(name, _)| name).zip(named).collect(),
            over_speeds: line.over_speeds(&tables, &state, load, range, &along),
        }))
    }
}

impl FoilDuty {
    /// The loads at the speeds that are named, as far as they are carried.
    pub(super) fn flight(&self) -> Vec<(String, &Loading)> {
        let mut flight = Vec::with_capacity(self.named.len());
        for (name, point) in &self.named {
            flight.extend(point.carried.as_ref().ok().map(|loading| (format!("flight, {name}"), loading)));
        }
        flight
    }
}

/// The smooth curves of the stations, from the root outwards.
fn tables(curves: &[StationCurves<'_>]) -> Result<SpanTables, LoadingError> {
    let table = |curve: &LiftCurve| {
        let points =
            curve.solutions().map(|s| CurvePoint { incidence: s.incidence, cl: s.cl, cd: s.cd, cm: s.cm });
        SectionTable::new(points.collect())
    };
    let mut places: Vec<(f64, SectionTable)> = Vec::new();
    for station in curves {
        let table = table(&station.smooth)?;
        places.extend(station.stations.iter().map(|at| (*at, table.clone())));
    }
    places.sort_by(|a, b| a.0.total_cmp(&b.0));
    SpanTables::new(places)
}

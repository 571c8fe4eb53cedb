//! The whole foil under its boat: what it carries at which speed, and what that costs.

mod check;
mod polars;
mod sizing;
mod table;
mod window;

pub(super) use check::checks;
pub(super) use sizing::Size;
pub(super) use table::{span, speeds};
pub(super) use window::{Limits, works};

use super::PackError;
use crate::design::{Boat, Design, Duty, Role};
use crate::flow::{GRAVITY, Water};
use crate::loading::{LiftingLine, Loading, LoadingError, Setting, SpeedPoint, State, TakeOff};
use crate::strength::{LineLoad, LoadCase, PointLoad};
use crate::wing::Wing;
use polars::{AtSpeed, Polars};

/// Incidence of the foil that is looked at, radians: -6 to 16 degrees.
const RANGE: (f64, f64) = (-0.104_719_755_119_659_77, 0.279_252_680_319_092_7);
/// Strips from the root to the tip.
const STRIPS: usize = 30;
/// Speeds of the plot, from take-off to twice that or the top speed.
const SPEEDS: usize = 11;
/// Step of depth by which the change of lift is taken, mm.
const DEPTH_STEP: f64 = 10.0;

/// How a foil does its duty.
pub(super) struct FoilDuty {
    pub(super) duty: Duty,
    /// Load in N at take-off, heel included.
    pub(super) load: f64,
    /// Least speed that carries the load with the margin asked, or why there is none.
    pub(super) take_off: Result<TakeOff, LoadingError>,
    /// Take-off, cruise and top speed, as far as they are named.
    pub(super) flights: Vec<Flight>,
    /// Incidence at which it is set on its boat, radians, where it has a flap.
    pub(super) set_at: Option<f64>,
    /// Speeds from take-off on, for a plot.
    pub(super) over_speeds: Vec<SpeedPoint>,
    /// For each flap angle (radians) incidence and lift (degrees, N) at take-off speed.
    pub(super) lift_curves: Vec<(f64, Vec<(f64, f64)>)>,
    pub(super) window: Vec<Limits>,
    pub(super) sizes: Vec<Size>,
}

/// The foil at one of its speeds.
pub(super) struct Flight {
    pub(super) name: &'static str,
    /// m/s.
    pub(super) speed: f64,
    /// mm.
    pub(super) depth: f64,
    /// N.
    pub(super) load: f64,
    /// Carried by incidence, the flap straight.
    pub(super) level: Result<Loading, LoadingError>,
    /// Carried by the flap, as it is set.
    pub(super) flapped: Option<Result<Loading, LoadingError>>,
    /// Speed from which the water boils at its worst place, m/s, and where, mm from the root.
    pub(super) inception: Option<(f64, f64)>,
    /// Moment about the flap's hinge, both halves together, tail down, N m.
    pub(super) hinge_moment: Option<f64>,
    /// Change of lift with depth (N/mm), incidence and flap (N/degree).
    pub(super) stiffness: Option<[f64; 3]>,
    pub(super) partner: Option<Partner>,
}

/// The other foil at the same speed.
pub(super) struct Partner {
    pub(super) name: String,
    /// N.
    pub(super) load: f64,
    pub(super) carried: Result<Loading, LoadingError>,
    /// By how much this foil turns the flow down there, radians; negative where up.
    pub(super) downwash: Option<f64>,
}

impl Flight {
    /// The foil as it carries its load: by its flap where that does, else by incidence.
    pub(super) fn loading(&self) -> Result<&Loading, &LoadingError> {
        match &self.flapped {
            Some(Ok(loading)) => Ok(loading),
            _ => self.level.as_ref(),
        }
    }
}

/// A foil ready to be asked.
pub(super) struct Foil<'a> {
    wing: &'a Wing,
    water: &'a Water,
    polars: Polars,
    /// Ends of the flap, mm from the root, and the chord behind its hinge as a share.
    flap: Option<((f64, f64), f64)>,
    /// Speeds (m/s) in rising order and the depth at each, mm.
    depths: Vec<(f64, f64)>,
}

/// A foil at one speed and depth.
struct Ready {
    line: LiftingLine,
    curves: AtSpeed,
    state: State,
    depth: f64,
}

impl<'a> Foil<'a> {
    fn of(
        design: &Design,
        wing: &'a Wing,
        water: &'a Water,
        depths: Vec<(f64, f64)>,
        with_flap: bool,
    ) -> Result<Self, PackError> {
        let flap = design.flap.filter(|_| with_flap);
        let mut flaps = vec![0.0];
        if let Some(flap) = flap {
            flaps.extend([-flap.up.radians(), flap.down.radians()]);
            flaps.sort_by(f64::total_cmp);
            flaps.dedup();
        }
        let speeds = [depths.first(), depths.last()].map(|end| end.map_or(1.0, |end| end.0));
        Ok(Self {
            wing,
            water,
            polars: Polars::of(design, water, speeds, flaps)?,
            flap: flap.map(|flap| {
                let behind = 1.0 - f64::midpoint(flap.hinge, flap.hinge_end);
                ((flap.from.mm(), flap.to.mm()), behind)
            }),
            depths,
        })
    }

    /// At a speed in m/s.
    fn at(&self, speed: f64) -> Result<Ready, LoadingError> {
        self.at_depth(speed, self.depth(speed))
    }

    fn at_depth(&self, speed: f64, depth: f64) -> Result<Ready, LoadingError> {
        let setting = Setting {
            strips: STRIPS,
            depth: Some(depth),
            flap: self.flap.map(|(ends, _)| ends),
            ..Setting::default()
        };
        Ok(Ready {
            line: LiftingLine::new(self.wing, &setting)?,
            curves: self.polars.at_speed(self.water, speed)?,
            state: State { speed, density: self.water.density, incidence: 0.0, flap: 0.0 },
            depth,
        })
    }

    /// Depth at a speed, in straight lines between those that are named.
    fn depth(&self, speed: f64) -> f64 {
        let after = self.depths.partition_point(|(known, _)| *known < speed);
        match (after.checked_sub(1).and_then(|i| self.depths.get(i)), self.depths.get(after)) {
            (Some(a), Some(b)) => a.1 + (speed - a.0) / (b.0 - a.0) * (b.1 - a.1),
            (Some(end), None) | (None, Some(end)) => end.1,
            (None, None) => 0.0,
        }
    }

    /// The flap angle that holds at a place, radians.
    fn flap_at(&self, at: f64, flap: f64) -> f64 {
        if self.flap.is_some_and(|((from, to), _)| (from..=to).contains(&at)) { flap } else { 0.0 }
    }
}

/// The least speed from which the water boils at any strip, m/s, and where that is.
fn worst_inception(foil: &Foil<'_>, at: &Ready, loading: &Loading) -> Option<(f64, f64)> {
    let of_strip = |strip: &crate::loading::StripLoad| {
        let flap = foil.flap_at(strip.at, loading.state.flap);
        let (cp_min, _) = at.curves.pressure_and_hinge(strip.at, strip.effective_incidence, flap);
        let depth = 1e-3 * (at.depth - strip.quarter_chord[2]);
        Some((foil.water.inception_speed(depth, cp_min)?, strip.at))
    };
    loading.strips.iter().filter_map(of_strip).min_by(|a, b| a.0.total_cmp(&b.0))
}

/// Moment of all of the flap about its hinge, tail down, N m.
fn hinge_moment(foil: &Foil<'_>, at: &Ready, loading: &Loading) -> Option<f64> {
    let ((from, to), behind) = foil.flap?;
    let pressure = 0.5 * loading.state.density * loading.state.speed.powi(2);
    let halves = if foil.wing.is_mirrored() { 2.0 } else { 1.0 };
    let strips = loading.strips.iter().filter(|strip| (from..=to).contains(&strip.at));
    let moment = strips.map(|strip| {
        let (_, hinge) =
            at.curves.pressure_and_hinge(strip.at, strip.effective_incidence, loading.state.flap);
        hinge * pressure * (1e-3 * behind * strip.chord).powi(2) * 1e-3 * strip.width
    });
    Some(halves * moment.sum::<f64>())
}

/// The speeds that a design names, and the depth at each.
fn named_speeds(design: &Design, duty: &Duty) -> Vec<(&'static str, f64, f64)> {
    let speeds = [("take-off", Some(duty.take_off)), ("cruise", duty.cruise), ("top", design.lift.top_speed)];
    let at = speeds.into_iter().zip(duty.depths);
    at.filter_map(|((name, speed), depth)| Some((name, speed?, depth))).collect()
}

impl FoilDuty {
    /// `None` where the design asks nothing of its foil.
    pub(super) fn of(design: &Design, wing: &Wing, water: &Water) -> Result<Option<Self>, PackError> {
        let Some(duty) = design.duty else { return Ok(None) };
        let boat = design.boat.as_ref().filter(|boat| boat.role != Role::Strut);
        // The other foil's own file may name no top speed: both fly at those of the boat.
        let describing =
            boat.filter(|boat| boat.role == Role::Other).and_then(|boat| boat.partner.as_deref());
        let names = named_speeds(describing.unwrap_or(design), &duty);
        let depths: Vec<(f64, f64)> = names.iter().map(|(_, speed, depth)| (*speed, *depth)).collect();
        let foil = Foil::of(design, wing, water, depths.clone(), true)?;
        let upright = boat.map_or(1.0, |boat| boat.heel.cos());
        let partner = match boat.and_then(|boat| Some((boat, boat.partner.as_deref()?))) {
            Some((boat, other)) => Some((boat, other, other.wing()?)),
            None => None,
        };
        let other = match &partner {
            Some((boat, other, wing)) => {
                let deeper = boat.to_partner().map_or(0.0, |to| to[1]);
                let depths = depths.iter().map(|(speed, depth)| (*speed, depth + deeper)).collect();
                Some((*boat, *other, Foil::of(other, wing, water, depths, false)?))
            }
            None => None,
        };
        let mut set_at = duty.set_at.map(|angle| angle.radians());
        let mut flights = Vec::with_capacity(names.len());
        for &(name, speed, depth) in &names {
            let at = foil.at_depth(speed, depth)?;
            let mut shares = boat.map_or([duty.carries, 0.0], |boat| boat.own_first(boat.carries));
            let by_incidence = |mass: f64| {
                at.line.incidence_for(&at.curves.lift, &at.state, mass * GRAVITY / upright, RANGE)
            };
            let mut level = by_incidence(shares[0]);
            let mut beside = None;
            if let Some((boat, design, foil)) = &other {
                let there = foil.at(speed)?;
                let carry = |mass: f64| {
                    there.line.incidence_for(
                        &there.curves.lift,
                        &there.state,
                        mass * GRAVITY / upright,
                        RANGE,
                    )
                };
                let mut carried = carry(shares[1]);
                // The foils' own moments shift the shares, once: they are small beside the weights'.
                if let (Ok(mine), Ok(theirs)) = (&level, &carried)
                    && let Ok(shifted) = boat.shares(mine.pitching_moment + theirs.pitching_moment)
                {
                    shares = boat.own_first(shifted);
                    (level, carried) = (by_incidence(shares[0]), carry(shares[1]));
                }
                beside = Some((boat, design.name.clone(), shares[1] * GRAVITY / upright, carried));
            }
            flights.push((name, at, shares[0] * GRAVITY / upright, level, beside));
        }
        // Set so that at cruise, or at the slowest speed there is, the flap is straight.
        if foil.flap.is_some() && set_at.is_none() {
            let cruise = flights.iter().find(|flight| flight.0 == "cruise").or(flights.first());
            set_at = cruise.and_then(|flight| Some(flight.3.as_ref().ok()?.state.incidence));
        }
        let travel = design.flap.map(|flap| (-flap.up.radians(), flap.down.radians()));
        let set_at = set_at.filter(|_| foil.flap.is_some());
        let flights = flights.into_iter().map(|(name, at, load, level, beside)| {
            let flapped = set_at.zip(travel).map(|(incidence, travel)| {
                let state = State { incidence, ..at.state };
                at.line.flap_for(&at.curves.lift, &state, load, travel)
            });
            let mut flight = Flight {
                name,
                speed: at.state.speed,
                depth: at.depth,
                load,
                level,
                flapped,
                inception: None,
                hinge_moment: None,
                stiffness: None,
                partner: None,
            };
            if let Ok(loading) = flight.loading() {
                let (inception, moment) =
                    (worst_inception(&foil, &at, loading), hinge_moment(&foil, &at, loading));
                let stiffness = stiffness(&foil, &at, loading);
                let place = beside.as_ref().and_then(|(boat, ..)| boat.to_partner());
                let half = partner.as_ref().map_or(0.0, |(.., wing)| wing.reach());
                let downwash = place.and_then(|[aft, below]| mean_downwash(&at, loading, aft, below, half));
                flight.partner =
                    beside.map(|(_, name, load, carried)| Partner { name, load, carried, downwash });
                (flight.inception, flight.hinge_moment, flight.stiffness) = (inception, moment, stiffness);
            }
            flight
        });
        let flights: Vec<Flight> = flights.collect();
        let load = flights.first().map_or(duty.carries * GRAVITY, |flight| flight.load);
        let fastest = depths.iter().map(|(speed, _)| *speed).fold(1.5 * duty.take_off, f64::max);
        let slow = foil.at(duty.take_off)?;
        let along = (0..SPEEDS)
            .map(|i| duty.take_off + (fastest - duty.take_off) * i as f64 / (SPEEDS - 1) as f64)
            .map(|speed| {
                let at = foil.at(speed)?;
                let carried = at.line.incidence_for(&at.curves.lift, &at.state, load, RANGE);
                Ok(SpeedPoint { speed, carried })
            });
        Ok(Some(Self {
            duty,
            load,
            take_off: slow.line.take_off(&slow.curves.lift, &slow.state, load, duty.share, RANGE),
            set_at,
            over_speeds: along.collect::<Result<_, LoadingError>>()?,
            lift_curves: lift_curves(&foil, &slow),
            window: window::window(&foil, duty.take_off, fastest)?,
            sizes: sizing::sizes(&foil, load, duty.share, [duty.take_off, duty.cruise.unwrap_or(fastest)])?,
            flights,
        }))
    }

    /// The loads at the speeds that are named, as far as they are carried.
    pub(super) fn flight(&self) -> Vec<(String, &Loading)> {
        let carried = self.flights.iter().filter_map(|flight| Some((flight.name, flight.loading().ok()?)));
        carried.map(|(name, loading)| (format!("flight, {name}"), loading)).collect()
    }
}

/// Change of lift with depth, with incidence and with the flap.
fn stiffness(foil: &Foil<'_>, at: &Ready, loading: &Loading) -> Option<[f64; 3]> {
    let (step, state) = (0.1_f64.to_radians(), loading.state);
    let lift = |state: State| at.line.load(&at.curves.lift, &state).ok().map(|loading| loading.lift);
    let turned = lift(State { incidence: state.incidence + step, ..state })?;
    let flapped = lift(State { flap: state.flap - step, ..state })?;
    let deeper = foil.at_depth(state.speed, at.depth + DEPTH_STEP).ok()?;
    let deeper = deeper.line.load(&deeper.curves.lift, &state).ok()?.lift;
    Some([
        (deeper - loading.lift) / DEPTH_STEP,
        (turned - loading.lift) / 0.1,
        (loading.lift - flapped) / 0.1,
    ])
}

/// The mean angle by which the flow is turned down along the partner's half span.
fn mean_downwash(at: &Ready, loading: &Loading, aft: f64, below: f64, half: f64) -> Option<f64> {
    const PLACES: usize = 6;
    let along = (0..PLACES).map(|i| half * (i as f64 + 0.5) / PLACES as f64);
    let angles: Option<Vec<f64>> =
        along.map(|y| at.line.downwash_at(loading, [aft, y, -below]).ok()).collect();
    Some(angles?.iter().sum::<f64>() / PLACES as f64)
}

/// Lift over incidence at each flap angle that was solved.
fn lift_curves(foil: &Foil<'_>, at: &Ready) -> Vec<(f64, Vec<(f64, f64)>)> {
    let curve = |&flap: &f64| {
        let points = (-5..=15).map(|degrees| {
            let degrees = f64::from(degrees);
            let state = State { incidence: degrees.to_radians(), flap, ..at.state };
            let loading = at.line.load(&at.curves.lift, &state).ok().filter(|loading| !loading.is_beyond());
            (degrees, loading.map_or(f64::NAN, |loading| loading.lift))
        });
        (flap, points.collect())
    };
    foil.polars.flaps().iter().map(curve).collect()
}

/// What a strut stands in flight: its foil's share pushes up along it, the drive pulls against the foils' drag, and
/// the side force spreads over what is below the hull.
pub(super) fn strut_case(design: &Design) -> Option<LoadCase> {
    let boat: &Boat = design.boat.as_ref().filter(|boat| boat.role == Role::Strut)?;
    let held = design.strength.held_to.mm();
    let free = design.reach().mm() - held;
    let per_mm = boat.side_force / free;
    // The origin of the sections is the root's quarter chord, where the side force acts.
    let line = [0.0, free].map(|at| LineLoad { at, force: [per_mm, 0.0], torque: 0.0 });
    let push = PointLoad {
        at: free,
        force: [0.0, boat.drive],
        compression: boat.carries[0] * GRAVITY / boat.heel.cos(),
        torque: 0.0,
    };
    let name = "flight under the boat";
    let factor = design.strength.flight_factor;
    Some(LoadCase { spread: vec![line.to_vec()], points: vec![push], ..LoadCase::new(name, factor) })
}

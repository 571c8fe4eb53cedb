//! Layers on both sides and in the wake, at one incidence, as the unknowns of the coupled problem
//! have them.

use super::Conditions;
use super::coupling::{Coupling, OuterFlow};
use super::side::{Station, Surroundings, Transition, settle};

/// The unknowns: for every station both thicknesses and the mass defect, and between which
/// nodes the flow stagnates.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Unknowns {
    pub(super) theta: Vec<f64>,
    /// Without dead air.
    pub(super) delta_star: Vec<f64>,
    /// Positive, whichever way the flow runs.
    pub(super) mass: Vec<f64>,
    /// Last node of the upper side before the stagnation point.
    pub(super) stagnation: usize,
}

impl Unknowns {
    fn fill(&self, station: Station) -> Station {
        let i = station.index;
        Station { theta: self.theta[i], delta_star: self.delta_star[i], mass: self.mass[i], ..station }
    }

    /// Takes over what the stations have.
    pub(super) fn take(&mut self, sides: &[Vec<Station>; 3]) {
        for station in sides.iter().flatten() {
            self.theta[station.index] = station.theta;
            self.delta_star[station.index] = station.delta_star;
            self.mass[station.index] = station.mass;
        }
    }
}

/// Where the flow stagnates.
#[derive(Debug, Clone, Copy)]
pub(super) struct Stagnation {
    /// Along the outline.
    pub(super) length: f64,
    /// Change of it with the speeds of the two nodes about it.
    pub(super) slope: [f64; 2],
}

/// Everything that follows from the unknowns.
#[derive(Debug, Clone)]
pub(super) struct Layers {
    pub(super) stagnation: Stagnation,
    /// Last node of the upper side.
    pub(super) node: usize,
    /// Upper side, lower side, wake.
    pub(super) sides: [Vec<Station>; 3],
    pub(super) transitions: [Option<Transition>; 2],
    /// Speeds positive along the outline and the wake.
    pub(super) speed: Vec<f64>,
}

/// Part of the stagnation panel that a node keeps from the stagnation point.
const CLEARANCE: f64 = 0.02;
/// Least speed that the equations are given: in between iterations it can come out as less.
const LEAST_SPEED: f64 = 1e-3;
/// The dead air behind a blunt edge is closed within this many thicknesses of the base.
const DEAD_AIR: f64 = 2.5;

/// Stations that transition may move by in a step.
const HELD: usize = 3;

/// The coupled problem at one incidence.
pub(super) struct Problem<'a> {
    pub(super) coupling: &'a Coupling,
    pub(super) outer: OuterFlow<'a>,
    pub(super) reynolds: f64,
    critical: f64,
    /// Length along the outline to the trips.
    trip: [Option<f64>; 2],
    /// Dead air at the stations of the wake.
    gap: Vec<f64>,
    /// Where transition is held on either side for the time being.
    window: [Option<[f64; 2]>; 2],
}

impl<'a> Problem<'a> {
    pub(super) fn new(coupling: &'a Coupling, incidence: f64, conditions: &Conditions) -> Self {
        let base = coupling.points[0].distance(coupling.points[coupling.surface - 1]);
        let gap = coupling.length[coupling.surface..]
            .iter()
            .map(|&length| {
                let part = if base > 0.0 { (1.0 - length / (DEAD_AIR * base)).max(0.0) } else { 0.0 };
                // Level at the base, closed without a kink.
                base * part * part * (3.0 - 2.0 * part)
            })
            .collect();
        let nose = nose(coupling);
        let trip = |x: Option<f64>, upper: bool| {
            let x = x.filter(|&x| x < 1.0)?;
            Some(length_at(coupling, nose, upper, x))
        };
        Self {
            coupling,
            outer: coupling.at(incidence),
            reynolds: conditions.reynolds,
            critical: conditions.amplification,
            trip: [trip(conditions.trip_upper, true), trip(conditions.trip_lower, false)],
            gap,
            window: [None; 2],
        }
    }

    /// Holds transition within some stations of where it is: where the amplification grows slowly, a
    /// small error would send it to the other end of the section.
    pub(super) fn hold_transition(&mut self, layers: &Layers) {
        for (side, window) in self.window.iter_mut().enumerate() {
            let stations = &layers.sides[side];
            let last = stations.len() - 1;
            let behind = layers.transitions[side].map_or(last + 1, |transition| transition.behind);
            let earliest = stations[behind.saturating_sub(HELD + 1).min(last)].xi;
            let latest = stations.get(behind + HELD).map_or(f64::INFINITY, |station| station.xi);
            *window = Some([earliest, latest]);
        }
    }

    pub(super) fn around(&self, side: usize, stagnation: f64) -> Surroundings {
        let sign = [-1.0, 1.0, 1.0][side];
        let trip = self.trip.get(side).copied().flatten();
        Surroundings {
            reynolds: self.reynolds,
            critical: self.critical,
            trip: trip.map(|trip| (sign * (trip - stagnation)).max(0.0)),
            window: self.window.get(side).copied().flatten(),
            wake: side == 2,
        }
    }

    /// Whether the flow runs with the numbering at a station.
    pub(super) fn sign(stagnation: usize, station: usize) -> f64 {
        if station <= stagnation { -1.0 } else { 1.0 }
    }

    /// Mass defects positive along the outline.
    pub(super) fn signed_mass(unknowns: &Unknowns) -> Vec<f64> {
        let mass = unknowns.mass.iter().enumerate();
        mass.map(|(i, mass)| Self::sign(unknowns.stagnation, i) * mass).collect()
    }

    /// Between which nodes speeds change from aft to ahead, nearest to node `about`.
    pub(super) fn stagnation_node(&self, speed: &[f64], about: usize) -> Option<usize> {
        let changes = (1..self.coupling.surface - 2).filter(|&k| speed[k] < 0.0 && speed[k + 1] >= 0.0);
        changes.min_by_key(|&k| k.abs_diff(about))
    }

    pub(super) fn stagnation(&self, speed: &[f64], node: usize) -> Stagnation {
        let length = &self.coupling.length;
        let (before, after) = (speed[node], speed[node + 1]);
        let (panel, rise) = (length[node + 1] - length[node], (after - before).max(1e-9));
        let part = -before / rise;
        if (0.0..=1.0).contains(&part) {
            let slope = [-panel * after / (rise * rise), panel * before / (rise * rise)];
            Stagnation { length: length[node] + part * panel, slope }
        } else {
            Stagnation { length: length[node] + part.clamp(0.0, 1.0) * panel, slope: [0.0; 2] }
        }
    }

    /// Stations of the three sides for these speeds, without layers yet.
    pub(super) fn stations(
        &self,
        unknowns: &Unknowns,
        speed: &[f64],
        stagnation: Stagnation,
    ) -> [Vec<Station>; 3] {
        let coupling = self.coupling;
        let node = unknowns.stagnation;
        let rise = (speed[node + 1] - speed[node]).max(1e-9);
        let panel = coupling.length[node + 1] - coupling.length[node];
        let least = CLEARANCE * rise;
        let station = |index: usize, sign: f64| {
            let own = sign * speed[index];
            let mut xi = sign * (coupling.length[index] - stagnation.length);
            let mut used = own.max(LEAST_SPEED);
            if index == node || index == node + 1 {
                // Speed and length keep their ratio, which is what the similar layer lives on.
                used = own.max(least);
                xi = used * panel / rise;
            }
            Station { held: used > own, ..unknowns.fill(Station::new(index, sign, xi, 0.0, used)) }
        };
        let upper = (0..=node).rev().map(|i| station(i, -1.0)).collect();
        let lower: Vec<Station> = (node + 1..coupling.surface).map(|i| station(i, 1.0)).collect();
        let edge = lower.last().map_or(1.0, |station| station.xi);
        let wake = (coupling.surface..coupling.count())
            .zip(&self.gap)
            .map(|(i, &gap)| {
                unknowns.fill(Station::new(i, 1.0, edge + coupling.length[i], gap, speed[i].max(LEAST_SPEED)))
            })
            .collect();
        [upper, lower, wake]
    }

    /// The layers that go with these unknowns.
    pub(super) fn layers(&self, unknowns: &mut Unknowns) -> Layers {
        let mut speed = self.outer.speeds(&Self::signed_mass(unknowns));
        if let Some(node) =
            self.stagnation_node(&speed, unknowns.stagnation).filter(|&n| n != unknowns.stagnation)
        {
            // Nodes that the stagnation point has passed carry little; still their sources turn.
            unknowns.stagnation = node;
            speed = self.outer.speeds(&Self::signed_mass(unknowns));
        }
        let node = unknowns.stagnation;
        let stagnation = self.stagnation(&speed, node);
        let mut sides = self.stations(unknowns, &speed, stagnation);
        let mut transitions = [None; 2];
        for side in [0, 1] {
            transitions[side] = settle(&mut sides[side], &self.around(side, stagnation.length));
        }
        let [upper, lower, wake] = &mut sides;
        begin_wake(upper, lower, wake, self.reynolds);
        settle(wake, &self.around(2, stagnation.length));
        Layers { stagnation, node, sides, transitions, speed }
    }

    /// Lets the wake bend the outer flow as it is now.
    pub(super) fn bend_wake(&mut self, unknowns: &Unknowns) {
        let shape: Vec<f64> = (self.coupling.surface..self.coupling.count())
            .map(|i| (unknowns.delta_star[i] / unknowns.theta[i]).clamp(1.0, 10.0))
            .collect();
        self.outer.bend(&shape);
    }

    /// Thickness of the base.
    pub(super) fn base(&self) -> f64 {
        self.gap[0]
    }
}

/// Shear stress at the end of a side, as the wake takes it over: a layer that has come so far
/// laminar becomes turbulent there.
pub(super) fn shear_at_edge(station: &Station, reynolds: f64) -> super::dual::Dual<4> {
    if station.turbulent {
        super::dual::Dual::variable(station.shear, 0)
    } else {
        super::layer::shear_behind_transition(&station.profile(), reynolds)
    }
}

/// Momentum thickness and shear stress of the first station of the wake: those of both sides.
pub(super) fn begin_wake(upper: &[Station], lower: &[Station], wake: &mut [Station], reynolds: f64) {
    if let (Some(upper), Some(lower), Some(first)) = (upper.last(), lower.last(), wake.first_mut()) {
        first.theta = upper.theta + lower.theta;
        let [a, b] = [upper, lower].map(|side| side.theta * shear_at_edge(side, reynolds).value);
        first.shear = (a + b) / first.theta;
    }
}

/// Node furthest ahead.
fn nose(coupling: &Coupling) -> usize {
    let surface = coupling.points[..coupling.surface].iter().enumerate();
    surface.min_by(|a, b| a.1.x.total_cmp(&b.1.x)).map_or(0, |(node, _)| node)
}

/// Length along the outline to where a side passes `x`.
fn length_at(coupling: &Coupling, nose: usize, upper: bool, x: f64) -> f64 {
    let mut node = nose;
    let last = if upper { 0 } else { coupling.surface - 1 };
    while node != last {
        let next = if upper { node - 1 } else { node + 1 };
        let (here, there) = (coupling.points[node].x, coupling.points[next].x);
        if there > x {
            let part = ((x - here) / (there - here)).clamp(0.0, 1.0);
            return coupling.length[node] + part * (coupling.length[next] - coupling.length[node]);
        }
        node = next;
    }
    coupling.length[last]
}

//! From a first account to the converged flow at one incidence.

use super::march::{adjust, march};
use super::newton::{Newton, Step};
use super::side::Station;
use super::state::{Layers, Problem, Unknowns, begin_wake};

/// Newton steps before a point is given up.
const MOST_STEPS: usize = 45;
/// Relative change of the unknowns in the last step: with Newton's method what is left then is of
/// the order of its square.
const TOLERANCE: f64 = 2e-4;
/// Largest part by which θ or δ* may fall, or rise, in a step.
const FALL: f64 = 0.3;
const RISE: f64 = 0.5;
/// Largest change of a speed in a step.
const SPEED_CHANGE: f64 = 0.08;
/// Least shape factor that a step may leave, on the surface and in the wake.
const LEAST_SHAPE: [f64; 2] = [1.05, 1.001];

/// Stations behind transition that are set anew when it moves, and those kept clear of at the end.
const FOLLOWED: usize = 5;
/// Part of the chord ahead of the trailing edge where the first account keeps the speed level.
const RELIEF: f64 = 0.05;
/// Change of a step below which the bending of the wake is kept as it is.
const SETTLED: f64 = 3e-3;

/// Change of a step below which the next is made with its derivatives.
const CHORD: f64 = 2e-3;

/// Part of a step with old derivatives that the next may have, if they are to be kept.
const GAIN: f64 = 0.3;

/// How far it went without success.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Failed {
    pub(super) steps: usize,
    /// Relative change in the last step.
    pub(super) change: f64,
}

/// A first account by one march along the speeds without layers.
pub(super) fn first_account(problem: &Problem, nose: usize) -> Option<Unknowns> {
    let count = problem.coupling.count();
    let speed = relieved(problem);
    let stagnation = problem.stagnation_node(&speed, nose)?;
    let mut unknowns = Unknowns {
        theta: vec![1e-4; count],
        delta_star: vec![2e-4; count],
        mass: vec![2e-4; count],
        stagnation,
    };
    let place = problem.stagnation(&speed, stagnation);
    let mut sides = problem.stations(&unknowns, &speed, place);
    let [upper, lower, wake] = &mut sides;
    for (side, stations) in [&mut *upper, &mut *lower].into_iter().enumerate() {
        march(stations, &problem.around(side, place.length), 1.0);
    }
    begin_wake(upper, lower, wake, problem.reynolds);
    if let (Some(a), Some(b), Some(first)) = (upper.last(), lower.last(), wake.first_mut()) {
        first.mass = a.mass + b.mass + problem.base() * first.speed;
        first.delta_star = first.mass / first.speed - first.gap;
    }
    march(wake, &problem.around(2, place.length), 1.0);
    unknowns.take(&sides);
    Some(unknowns)
}

/// Speeds without layers, but for the fall towards the trailing edge, which the layers relieve: it
/// stops a little ahead of the edge, and the wake begins from there.
fn relieved(problem: &Problem) -> Vec<f64> {
    let coupling = problem.coupling;
    let mut speed = problem.outer.speed.clone();
    let last = coupling.surface - 1;
    let ahead = |station: usize| coupling.points[station].x < 1.0 - RELIEF;
    let upper = (0..last).find(|&i| ahead(i)).map_or(-1.0, |i| speed[i]);
    let lower = (0..last).rev().find(|&i| ahead(i)).map_or(1.0, |i| speed[i]);
    let edge = 0.5 * (lower - upper);
    for i in (0..last).take_while(|&i| !ahead(i)) {
        let part = (1.0 - coupling.points[i].x).max(0.0) / RELIEF;
        speed[i] = part * upper - (1.0 - part) * edge;
    }
    for i in (0..=last).rev().take_while(|&i| !ahead(i)) {
        let part = (1.0 - coupling.points[i].x).max(0.0) / RELIEF;
        speed[i] = part * lower + (1.0 - part) * edge;
    }
    for speed in &mut speed[coupling.surface..] {
        *speed = speed.max(edge);
    }
    speed
}

/// Layers and outer flow that agree.
pub(super) struct Converged {
    pub(super) layers: Layers,
    pub(super) unknowns: Unknowns,
    pub(super) steps: usize,
}

/// Newton's method from `unknowns` on.
pub(super) fn converge(problem: &mut Problem, mut unknowns: Unknowns) -> Result<Converged, Failed> {
    let mut newton = Newton::default();
    let mut factored: Option<Shape> = None;
    let mut last = f64::INFINITY;
    problem.bend_wake(&unknowns);
    let mut layers = problem.layers(&mut unknowns);
    for steps in 1..=MOST_STEPS {
        let shape = Shape::of(&layers);
        let chord = last < CHORD && factored == Some(shape);
        let step = if chord { newton.chord_step(problem, &layers) } else { newton.step(problem, &layers) };
        let failed = Failed { steps, change: last };
        let step = step.ok_or(failed)?;
        let (part, size) = admissible(&layers, &step);
        if !size.is_finite() {
            return Err(failed);
        }
        apply(&mut unknowns, &layers, &step, part);
        problem.hold_transition(&layers);
        // A step with old derivatives leaves of its size what it has of that before.
        let left = if chord { size * (size / last).max(size) } else { size * size };
        let held = layers.transitions.iter().flatten().any(|transition| transition.held);
        if size < TOLERANCE && left < TOLERANCE * TOLERANCE && !held {
            let layers = problem.layers(&mut unknowns);
            return Ok(Converged { layers, unknowns, steps });
        }
        factored = (!chord || size < GAIN * last).then_some(shape);
        if size > SETTLED {
            problem.bend_wake(&unknowns);
        }
        layers = follow_transition(problem, &mut unknowns, shape);
        last = size;
    }
    Err(Failed { steps: MOST_STEPS, change: last })
}

/// What the equations are made up of: with another they have other derivatives.
#[derive(Debug, Clone, Copy, PartialEq)]
struct Shape {
    node: usize,
    turbulent_from: [Option<usize>; 2],
}

impl Shape {
    fn of(layers: &Layers) -> Self {
        let turbulent_from =
            layers.transitions.map(|transition| transition.map(|transition| transition.behind));
        Self { node: layers.node, turbulent_from }
    }
}

/// Where transition has moved over stations, sets the layers about it anew: they are still those of
/// the other regime, and would throw the next step off. Gives the layers as they are then.
fn follow_transition(problem: &Problem, unknowns: &mut Unknowns, before: Shape) -> Layers {
    let mut layers = problem.layers(unknowns);
    if layers.node != before.node {
        return layers;
    }
    let sides = &mut layers.sides;
    let mut any = false;
    for side in [0, 1] {
        let count = sides[side].len();
        let new = layers.transitions[side].map_or(count, |transition| transition.behind);
        let old = before.turbulent_from[side].unwrap_or(count);
        if old == new {
            continue;
        }
        let range = old.min(new)..(old.max(new) + FOLLOWED).min(count.saturating_sub(FOLLOWED));
        if range.is_empty() || range.start < 2 {
            continue;
        }
        any = true;
        let around = problem.around(side, layers.stagnation.length);
        adjust(&mut sides[side], &around, layers.transitions[side], range, |of, by| {
            of.sign * by.sign * problem.outer.response(of.index)[by.index]
        });
    }
    if any {
        unknowns.take(&layers.sides);
        layers = problem.layers(unknowns);
    }
    layers
}

/// Part of the step that keeps changes within bounds, and the greatest relative change of θ and δ*.
fn admissible(layers: &Layers, step: &Step) -> (f64, f64) {
    let mut part: f64 = 1.0;
    let mut size: f64 = 0.0;
    for station in layers.sides.iter().flatten() {
        let i = station.index;
        let speed = station.sign * step.speed[i];
        let theta = step.theta[i] / station.theta;
        let delta_star = thicker(station, step) / station.delta_star;
        for change in [theta, delta_star] {
            let bound = if change < 0.0 { FALL } else { RISE };
            if change.abs() * part > bound {
                part = bound / change.abs();
            }
            size = size.max(change.abs());
        }
        if speed.abs() * part > SPEED_CHANGE {
            part = SPEED_CHANGE / speed.abs();
        }
        if !(theta.is_finite() && delta_star.is_finite()) {
            return (part, f64::NAN);
        }
    }
    (part, size)
}

/// Change of δ* in a step: m = u δ*, to first order.
fn thicker(station: &Station, step: &Step) -> f64 {
    let i = station.index;
    let mass = station.mass + station.sign * step.mass[i] - station.own_mass();
    let speed = if station.held { 0.0 } else { station.sign * step.speed[i] };
    (mass - (station.delta_star + station.gap) * speed) / station.speed
}

fn apply(unknowns: &mut Unknowns, layers: &Layers, step: &Step, part: f64) {
    let surface = layers.sides[0].len() + layers.sides[1].len();
    for station in layers.sides.iter().flatten() {
        let i = station.index;
        let theta = station.theta + part * step.theta[i];
        let delta_star = station.delta_star + part * thicker(station, step);
        unknowns.theta[i] = theta;
        let least = LEAST_SHAPE[usize::from(i >= surface)] * theta;
        unknowns.delta_star[i] = delta_star.max(least);
        unknowns.mass[i] = station.mass + part * station.sign * step.mass[i];
    }
}

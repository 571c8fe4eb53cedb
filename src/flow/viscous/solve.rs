//! From a first account to the converged flow at one incidence.

use super::march::{march, sweep};
use super::newton::{Step, newton_step};
use super::side::Station;
use super::state::{Layers, Problem, Unknowns, begin_wake};

/// Newton steps before a point is given up.
const MOST_STEPS: usize = 60;
/// Relative change of the unknowns in the last step: with Newton's method what is left then is of
/// the order of its square.
const TOLERANCE: f64 = 1e-5;
/// Largest part by which θ or δ* may fall, or rise, in a step.
const FALL: f64 = 0.4;
const RISE: f64 = 1.0;
/// Largest change of a speed in a step.
const SPEED_CHANGE: f64 = 0.25;
/// Least shape factor that a step may leave.
const LEAST_SHAPE: f64 = 1.02;

/// Sweeps that smooth the first account.
const SWEEPS: usize = 6;

/// How it went.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Convergence {
    pub(super) steps: usize,
    /// Relative change in the last step.
    pub(super) change: f64,
    pub(super) converged: bool,
}

/// A first account by one march along the speeds without layers.
pub(super) fn first_account(problem: &Problem, nose: usize) -> Option<Unknowns> {
    let count = problem.coupling.count();
    let speed = problem.outer.speed.clone();
    let stagnation = problem.stagnation_node(&speed, nose)?;
    let mut unknowns =
        Unknowns { theta: vec![1e-4; count], delta_star: vec![2e-4; count], mass: vec![2e-4; count], stagnation };
    let place = problem.stagnation(&speed, stagnation);
    let mut sides = problem.stations(&unknowns, &speed, place);
    let [upper, lower, wake] = &mut sides;
    for (side, stations) in [&mut *upper, &mut *lower].into_iter().enumerate() {
        march(stations, &problem.around(side, place.length), 1.0);
    }
    if std::env::var("VISCOUS_MARCH").is_ok() { for s in upper.iter() { eprintln!("{} xi {:.5} ue {:.4} inv {:.4} th {:.3e} H {:.3} N {:.2} {} {:?}", s.index, s.xi, s.speed, problem.outer.speed[s.index], s.theta, s.delta_star/s.theta, s.amplification, s.turbulent, problem.outer.response(s.index)[s.index]); } }
    begin_wake(upper, lower, wake, problem.reynolds);
    if let (Some(a), Some(b), Some(first)) = (upper.last(), lower.last(), wake.first_mut()) {
        first.mass = a.mass + b.mass + problem.base() * first.speed;
        first.delta_star = first.mass / first.speed - first.gap;
    }
    march(wake, &problem.around(2, place.length), 1.0);
    unknowns.take(&sides);
    let mut mass = Problem::signed_mass(&unknowns);
    let edge = problem.coupling.surface;
    for _ in 0..std::env::var("SWEEPS").ok().and_then(|s| s.parse().ok()).unwrap_or(SWEEPS) {
        for side in 0..3 {
            let (before, rest) = sides.split_at_mut(2);
            let stations = if side < 2 { &mut before[side] } else { &mut rest[0] };
            let last = stations.len() - 1;
            sweep(stations, &problem.around(side, place.length), |stations, i| {
                // What lies ahead has been settled anew.
                let ahead = &stations[i - 1];
                mass[ahead.index] = ahead.sign * ahead.mass;
                let here = &stations[i];
                let row = problem.outer.response(here.index);
                let mut slope = row[here.index];
                if side < 2 && i == last {
                    slope += here.sign * row[edge];
                }
                let all: f64 = std::iter::zip(row, &mass).map(|(row, mass)| row * mass).sum();
                let speed = here.sign * (problem.outer.speed[here.index] + all);
                [speed - slope * here.mass, slope]
            });
            mass[stations[last].index] = stations[last].sign * stations[last].mass;
            if side == 1 {
                let [upper, lower, wake] = &mut sides;
                begin_wake(upper, lower, wake, problem.reynolds);
                if let (Some(a), Some(b), Some(first)) = (upper.last(), lower.last(), wake.first_mut()) {
                    first.speed = 0.5 * (a.speed + b.speed);
                    first.mass = a.mass + b.mass + problem.base() * first.speed;
                    first.delta_star = first.mass / first.speed - first.gap;
        first.delta_star = first.mass / first.speed - first.gap;
                    mass[first.index] = first.mass;
                }
            }
        }
        if std::env::var("VISCOUS_TRACE").is_ok() { let u = &sides[0][sides[0].len()-1]; eprintln!("sweep te H {} u {}", u.delta_star/u.theta, u.speed); }
    }
    unknowns.take(&sides);
    Some(unknowns)
}

/// Newton's method from `unknowns` on. Leaves the last layers whether or not it converged.
pub(super) fn converge(problem: &Problem, unknowns: &mut Unknowns) -> Option<(Layers, Convergence)> {
    let mut change = f64::INFINITY;
    for steps in 1..=MOST_STEPS {
        let layers = problem.layers(unknowns);
        let step = newton_step(problem, &layers)?;
        let (part, size) = admissible(&layers, &step);
        if !size.is_finite() {
            return None;
        }
        apply(unknowns, &layers, &step, part);
        change = size;
        if std::env::var("VISCOUS_TRACE").is_ok() {
            eprintln!("step {steps} size {size:.2e} part {part:.3} residual {:.2e} stag {} tr {:?}", step.residual, layers.node,
               [0,1].map(|s| layers.transitions[s].map(|t| (t.behind, t.xi))));
        }
        if size < TOLERANCE {
            let layers = problem.layers(unknowns);
            return Some((layers, Convergence { steps, change, converged: true }));
        }
    }
    let layers = problem.layers(unknowns);
    Some((layers, Convergence { steps: MOST_STEPS, change, converged: false }))
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
    for station in layers.sides.iter().flatten() {
        let i = station.index;
        let theta = station.theta + part * step.theta[i];
        let delta_star = station.delta_star + part * thicker(station, step);
        unknowns.theta[i] = theta;
        unknowns.delta_star[i] = delta_star.max(LEAST_SHAPE * theta);
        unknowns.mass[i] = station.mass + part * station.sign * step.mass[i];
    }
}

pub(super) fn check(problem: &Problem, unknowns: &Unknowns) {
    use super::side::equations;
    use super::interval::similar;
    let all = |unknowns: &mut Unknowns| {
        let layers = problem.layers(unknowns);
        let mut out = Vec::new();
        for (k, side) in layers.sides.iter().enumerate() {
            if k < 2 { let s = &side[0]; let r = similar(&s.layer, super::dual::Dual::constant(s.xi), 1.0); out.push((s.index, [r.momentum.value, r.shape.value, 0.0])); }
            for i in 1..side.len() {
                let r = equations(side, i, layers.transitions.get(k).and_then(|t| t.as_ref()), problem.reynolds);
                out.push((side[i].index, [r.momentum.value, r.shape.value, r.shear.value]));
            }
        }
        (layers, out)
    };
    let mut u = unknowns.clone();
    let (layers, _) = all(&mut u);
    let (layers, before) = { let _ = layers; all(&mut u) };
    let Some(step) = newton_step(problem, &layers) else { eprintln!("none"); return };
    let part = 1e-6;
    let mut v = u.clone();
    apply(&mut v, &layers, &step, part);
    let (_, after) = all(&mut v);
    for (b, a) in before.iter().zip(&after) {
        let e: Vec<String> = (0..3).map(|k| format!("{:.3e}/{:.3e}", (a.1[k] - b.1[k]) / part, -b.1[k])).collect();
        eprintln!("{} {}", b.0, e.join("  "));
    }
}

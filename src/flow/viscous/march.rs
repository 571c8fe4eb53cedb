//! A first account of the layers along given speeds: one march with the flow, in which the speed
//! gives way where no layer goes with it.
//!
//! Where a layer separates, no thickness belongs to a given speed (Goldstein 1948). From there the
//! shape factor is given instead, and the speed follows: the inverse problem.

use std::ops::Range;

use super::dual::Dual;
use super::interval::{Residual, SECOND, VARIABLES, similar};
use super::layer::Layer;
use super::side::{Station, Surroundings, Transition, equations, settle_station};

/// Steps of Newton's method at a station.
const MOST_STEPS: usize = 40;
const TOLERANCE: f64 = 1e-10;
/// Least shape factor on the way.
const LEAST_SHAPE: f64 = 1.02;

/// Shape factors up to which a layer follows the given speed.
const MOST_LAMINAR_SHAPE: f64 = 3.7;
const MOST_TURBULENT_SHAPE: f64 = 2.3;

/// Least speed on the way.
const LEAST_SPEED: f64 = 0.01;

/// What is given at a station.
#[derive(Debug, Clone, Copy, PartialEq)]
enum Given {
    Speed,
    Shape(f64),
    /// Speed without the mass defect of the station itself, and its change with that.
    Response {
        rest: f64,
        slope: f64,
    },
}

/// Sets θ, mass defect and, where it gives way, speed of all stations. `exponent` is that of
/// [`similar`] at the first. Returns the transition, and the first station, if any, whose speed
/// could not be kept.
pub(super) fn march(
    stations: &mut [Station],
    around: &Surroundings,
    exponent: f64,
) -> (Option<Transition>, Option<usize>) {
    let mut transition = None;
    let mut departed = None;
    if around.wake {
        settle_station(stations, 0, around, &mut transition);
    } else {
        start(&mut stations[0], around, exponent);
    }
    for i in 1..stations.len() {
        let wanted = stations[i].speed;
        let solved = solve_station(stations, i, around, &mut transition, Given::Speed);
        let most = if stations[i].turbulent { MOST_TURBULENT_SHAPE } else { MOST_LAMINAR_SHAPE };
        // Behind transition the shape factor is still that of the laminar layer, but falls.
        let falling = stations[i].turbulent && shape(&stations[i]) < shape(&stations[i - 1]);
        if solved && (shape(&stations[i]) < most || falling) {
            continue;
        }
        departed = departed.or(Some(i));
        stations[i].speed = wanted;
        let ahead = shape(&stations[i - 1]);
        // Behind transition the shape factor falls to its turbulent value within some thicknesses.
        let falls = if stations[i - 1].turbulent {
            let length = (stations[i].xi - stations[i - 1].xi) / (20.0 * stations[i - 1].theta);
            most + (ahead - most) * (-length).exp()
        } else {
            most
        };
        let held = if around.wake { 1.0 + 0.9 * (ahead - 1.0) } else { falls };
        if !solve_station(stations, i, around, &mut transition, Given::Shape(held)) {
            transition = transition.filter(|transition: &Transition| transition.behind < i);
            let (ahead, here) = (stations[i - 1], &mut stations[i]);
            here.theta = ahead.theta;
            here.speed = wanted;
            here.delta_star = ahead.delta_star;
            here.mass = here.own_mass();
            settle_station(stations, i, around, &mut transition);
        }
    }
    (transition, departed)
}

/// Sets the stations of `range` anew, those ahead of it being settled: at each the speed follows the
/// mass defect by `response(station, of)`, the change of speed at a station by the mass defect of
/// another, both along the side (quasi-simultaneous coupling, A. E. P. Veldman, AIAA Journal 19
/// (1), 1981). A station without solution stays as it is.
pub(super) fn adjust(
    stations: &mut [Station],
    around: &Surroundings,
    transition: Option<Transition>,
    range: Range<usize>,
    response: impl Fn(&Station, &Station) -> f64,
) {
    let mut transition = transition;
    let old = stations.to_vec();
    for i in range.clone() {
        let changed: f64 =
            (range.start..i).map(|j| response(&old[i], &old[j]) * (stations[j].mass - old[j].mass)).sum();
        let slope = response(&old[i], &old[i]);
        let rest = old[i].speed + changed - slope * old[i].mass;
        let given = Given::Response { rest, slope };
        if slope <= 0.0 || !solve_station(stations, i, around, &mut transition, given) {
            stations[i] = old[i];
            transition = transition.filter(|transition: &Transition| transition.behind < i);
            settle_station(stations, i, around, &mut transition);
        }
    }
}

fn shape(station: &Station) -> f64 {
    station.delta_star / station.theta
}

/// The similar layer of the first station.
fn start(station: &mut Station, around: &Surroundings, exponent: f64) {
    // H alone settles both equations once θ² is eliminated: bisection between stagnation and
    // separation, where the shape equation less momentum has one root.
    let at = |h: f64| {
        let theta = (station.xi / (station.speed * around.reynolds)).sqrt();
        let trial = Station { theta, delta_star: h * theta, ..*station };
        let layer = Layer::of(super::layer::Regime::Laminar, &trial.profile(), around.reynolds);
        let r = similar(&layer, Dual::constant(station.xi), exponent);
        // Friction and dissipation go with 1/θ²: find its factor from momentum.
        let source = (h + 2.0) * exponent + 0.5 * (1.0 - exponent);
        let friction = source - r.momentum.value;
        let factor = source / friction;
        let work = r.shape.value - (1.0 - h) * exponent;
        ((1.0 - h) * exponent + factor * work, theta / factor.sqrt())
    };
    let (mut low, mut high) = (2.0, 4.0);
    for _ in 0..60 {
        let middle = 0.5 * (low + high);
        let (excess, theta) = at(middle);
        if excess > 0.0 && theta.is_finite() { low = middle } else { high = middle }
    }
    let h = 0.5 * (low + high);
    let (_, theta) = at(h);
    if theta.is_finite() {
        station.theta = theta;
        station.delta_star = h * theta;
        station.mass = station.own_mass();
    }
    settle_station(std::slice::from_mut(station), 0, around, &mut None);
}

/// θ of station `i`, with its mass defect or its speed, by Newton's method.
fn solve_station(
    stations: &mut [Station],
    i: usize,
    around: &Surroundings,
    transition: &mut Option<Transition>,
    given: Given,
) -> bool {
    let ahead = stations[i - 1];
    let here = &mut stations[i];
    let mut second = match given {
        Given::Speed => ahead.delta_star,
        Given::Shape(_) => here.speed,
        Given::Response { .. } => here.mass,
    };
    here.theta = ahead.theta;
    for _ in 0..MOST_STEPS {
        let here = &mut stations[i];
        match given {
            Given::Speed => here.delta_star = second,
            Given::Shape(shape) => {
                here.speed = second;
                here.delta_star = shape * here.theta;
            }
            Given::Response { rest, slope } => {
                here.speed = (rest + slope * second).max(LEAST_SPEED);
                here.delta_star = (second / here.speed - here.gap).max(LEAST_SHAPE * here.theta);
            }
        }
        here.mass = here.own_mass();
        *transition = transition.filter(|transition| transition.behind < i);
        settle_station(stations, i, around, transition);
        let r = equations(stations, i, transition.as_ref(), around.reynolds);
        let [step_theta, step_second] = newton_step(&r, given, &stations[i]);
        let here = &mut stations[i];
        let size = (step_theta / here.theta).abs().max((step_second / second).abs());
        if !size.is_finite() {
            return false;
        }
        if size < TOLERANCE {
            return true;
        }
        let mut part = (0.3 / size).min(1.0);
        if let Given::Response { slope, .. } = given {
            // The speed answers to a small part of the mass defect.
            part = part.min(0.1 * here.speed / (slope * step_second).abs().max(1e-12));
        }
        here.theta += part * step_theta;
        second += part * step_second;
        if given == Given::Speed {
            second = second.max(LEAST_SHAPE * here.theta);
        }
    }
    false
}

/// Newton's step of θ and δ*, or of θ and the speed, at the second station of an interval; the
/// shear stress is a function of them by its own equation.
fn newton_step(r: &Residual<VARIABLES>, given: Given, here: &Station) -> [f64; 2] {
    let [shear, theta, delta_star, speed] = SECOND;
    let by_shear = r.shear.slope[shear];
    let reduced = |equation: &Dual<VARIABLES>| {
        // Without the shear stress: a laminar layer has no such equation.
        let factor = if by_shear == 0.0 { 0.0 } else { equation.slope[shear] / by_shear };
        let by = |place: usize| equation.slope[place] - factor * r.shear.slope[place];
        let value = equation.value - factor * r.shear.value;
        match given {
            Given::Speed => [by(theta), by(delta_star), value],
            Given::Shape(shape) => [by(theta) + shape * by(delta_star), by(speed), value],
            Given::Response { slope, .. } => {
                let by_speed = by(speed) - by(delta_star) * (here.delta_star + here.gap) / here.speed;
                [by(theta), by(delta_star) / here.speed + slope * by_speed, value]
            }
        }
    };
    let (a, b) = (reduced(&r.momentum), reduced(&r.shape));
    let determinant = a[0] * b[1] - a[1] * b[0];
    [(a[1] * b[2] - b[1] * a[2]) / determinant, (b[0] * a[2] - a[0] * b[2]) / determinant]
}

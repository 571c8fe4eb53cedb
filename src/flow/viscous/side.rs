//! The stations of one side of the section, or of the wake, in the order of the flow, with
//! transition and shear stress marched along them.

use super::dual::Dual;
use super::interval::{
    End, FIRST, FIRST_XI, Residual, SECOND, SECOND_XI, VARIABLES, residual, through_transition,
};
use super::layer::{Layer, Profile, Regime, shear_behind_transition};

/// Greatest amplification exponent that is kept: beyond transition it says nothing.
const GREATEST_AMPLIFICATION: f64 = 30.0;

/// A station as the equations see it.
#[derive(Debug, Clone, Copy)]
pub(super) struct Station {
    /// Its number among all stations.
    pub(super) index: usize,
    /// Whether the flow runs with the numbers (1) or against them (-1).
    pub(super) sign: f64,
    /// Length from the stagnation point; along the wake it goes on from the lower side.
    pub(super) xi: f64,
    pub(super) theta: f64,
    /// Displacement thickness of the layer alone.
    pub(super) delta_star: f64,
    /// Mass defect u δ*, dead air included, as the sources have it; on the way to convergence not
    /// quite that of the layer.
    pub(super) mass: f64,
    /// Thickness of the dead air behind a blunt edge.
    pub(super) gap: f64,
    pub(super) speed: f64,
    /// Whether speed and length are held off the stagnation point and follow nothing.
    pub(super) held: bool,
    /// Amplification exponent of the layer as far as it is laminar.
    pub(super) amplification: f64,
    /// Growth of the exponent over the interval that ends here, by length.
    pub(super) growth: f64,
    /// Square root of C_τ where turbulent.
    pub(super) shear: f64,
    pub(super) turbulent: bool,
    /// By its profile: √C_τ, θ, δ* and speed, in that order.
    pub(super) layer: Layer<4>,
}

/// What makes the layer turbulent.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Transition {
    /// The station behind it, counted along the side.
    pub(super) behind: usize,
    /// Where: length from the stagnation point.
    pub(super) xi: f64,
    /// Whether a trip made it.
    pub(super) tripped: bool,
    /// Whether it would be elsewhere, were it not held within a window.
    pub(super) held: bool,
}

/// What the march along a side needs to know.
#[derive(Debug, Clone, Copy)]
pub(super) struct Surroundings {
    pub(super) reynolds: f64,
    /// Amplification exponent at which transition takes place.
    pub(super) critical: f64,
    /// Length from the stagnation point to a trip.
    pub(super) trip: Option<f64>,
    /// Between which lengths natural transition is held for the time being.
    pub(super) window: Option<[f64; 2]>,
    pub(super) wake: bool,
}

impl Station {
    /// Without layer yet.
    pub(super) fn new(index: usize, sign: f64, xi: f64, gap: f64, speed: f64) -> Self {
        let empty = Profile {
            shear: Dual::constant(1.0),
            theta: Dual::constant(1.0),
            delta_star: Dual::constant(2.0),
            speed: Dual::constant(1.0),
        };
        Self {
            index,
            sign,
            xi,
            theta: 1e-4,
            delta_star: 2e-4,
            mass: 0.0,
            gap,
            speed,
            held: false,
            amplification: 0.0,
            growth: 0.0,
            shear: 0.03,
            turbulent: false,
            layer: Layer::of(Regime::Laminar, &empty, 1.0),
        }
    }

    /// Mass defect of the layer as it is.
    pub(super) fn own_mass(&self) -> f64 {
        (self.delta_star + self.gap) * self.speed
    }

    pub(super) fn profile(&self) -> Profile<4> {
        Profile::free(self.shear, self.theta, self.delta_star, self.speed)
    }

    pub(super) fn numbers(&self) -> [f64; 5] {
        [self.shear, self.theta, self.delta_star, self.speed, self.xi]
    }
}

/// Mean growth of the amplification exponent over the interval to station `next`, from the
/// laminar stations before it, with the weights of the growth at the last and the one before.
///
/// Extrapolated (Adams and Bashforth's rule of second order): so where transition takes place
/// depends on what lies ahead of it alone, and cannot flicker with the layer behind.
pub(super) fn growth_ahead(stations: &[Station], next: usize) -> (f64, [f64; 2]) {
    let last = &stations[next - 1];
    if next < 2 {
        return (last.layer.growth.value, [1.0, 0.0]);
    }
    let before = &stations[next - 2];
    let ratio = 0.5 * (stations[next].xi - last.xi) / (last.xi - before.xi);
    let (one, two) = (last.layer.growth.value, before.layer.growth.value);
    let rate = one + ratio * (one - two);
    if rate < 0.5 * one { (0.5 * one, [0.5, 0.0]) } else { (rate, [1.0 + ratio, -ratio]) }
}

/// Marches amplification, transition and shear stress along the side for the given thicknesses
/// and speeds, and evaluates the closures. A wake keeps the shear stress of its first station.
pub(super) fn settle(stations: &mut [Station], around: &Surroundings) -> Option<Transition> {
    let mut transition = None;
    for i in 0..stations.len() {
        let turbulent = settle_station(stations, i, around, &mut transition);
        debug_assert_eq!(turbulent, stations[i].turbulent);
    }
    transition
}

/// The same for one station, those before it being settled. Whether it is turbulent.
pub(super) fn settle_station(
    stations: &mut [Station],
    i: usize,
    around: &Surroundings,
    transition: &mut Option<Transition>,
) -> bool {
    if around.wake {
        stations[i].turbulent = true;
        if i > 0 {
            follow_shear(stations, i, Regime::Wake, around.reynolds);
        }
        stations[i].layer = Layer::of(Regime::Wake, &stations[i].profile(), around.reynolds);
        return true;
    }
    if i == 0 {
        let first = &mut stations[0];
        (first.turbulent, first.amplification) = (false, 0.0);
        first.layer = Layer::of(Regime::Laminar, &first.profile(), around.reynolds);
        return false;
    }
    if stations[i - 1].turbulent {
        stations[i].turbulent = true;
        follow_shear(stations, i, Regime::Turbulent, around.reynolds);
        stations[i].layer = Layer::of(Regime::Turbulent, &stations[i].profile(), around.reynolds);
        return true;
    }
    let (rate, _) = growth_ahead(stations, i);
    let (before, here) = (stations[i - 1].xi, stations[i].xi);
    let reached = stations[i - 1].amplification + rate * (here - before);
    stations[i].growth = rate;
    stations[i].amplification = reached.min(GREATEST_AMPLIFICATION);
    let [earliest, latest] = around.window.unwrap_or([0.0, f64::INFINITY]);
    let natural = if reached >= around.critical {
        let free = before + (around.critical - stations[i - 1].amplification) / rate.max(1e-9);
        Some((free.max(earliest), free < earliest)).filter(|&(place, _)| place <= here)
    } else {
        (here >= latest).then_some((latest, true))
    };
    let tripped = around.trip.filter(|&trip| trip <= here);
    let place = match (natural, tripped) {
        (Some((natural, held)), Some(trip)) => {
            Some((natural.min(trip), trip < natural, held && trip >= natural))
        }
        (Some((natural, held)), None) => Some((natural, false, held)),
        (None, Some(trip)) => Some((trip, true, false)),
        (None, None) => None,
    };
    let Some((xi, tripped, held)) = place else {
        stations[i].turbulent = false;
        stations[i].layer = Layer::of(Regime::Laminar, &stations[i].profile(), around.reynolds);
        return false;
    };
    let margin = 1e-4 * (here - before);
    let xi = xi.clamp(before + margin, here - margin);
    *transition = Some(Transition { behind: i, xi, tripped, held });
    stations[i].turbulent = true;
    let part = (xi - before) / (here - before);
    let between = |a: f64, b: f64| a + part * (b - a);
    let (one, two) = (&stations[i - 1], &stations[i]);
    let middle: Profile<4> = Profile {
        shear: Dual::constant(1.0),
        theta: Dual::constant(between(one.theta, two.theta)),
        delta_star: Dual::constant(between(one.delta_star, two.delta_star)),
        speed: Dual::constant(between(one.speed, two.speed)),
    };
    let start = shear_behind_transition(&middle, around.reynolds);
    let middle = Profile { shear: Dual::variable(start.value, 0), ..middle };
    let ahead = Layer::of(Regime::Turbulent, &middle, around.reynolds);
    solve_shear(&mut stations[i], &ahead, xi, Regime::Turbulent, around.reynolds);
    stations[i].layer = Layer::of(Regime::Turbulent, &stations[i].profile(), around.reynolds);
    true
}

fn follow_shear(stations: &mut [Station], i: usize, regime: Regime, reynolds: f64) {
    let (ahead, xi) = (stations[i - 1].layer, stations[i - 1].xi);
    solve_shear(&mut stations[i], &ahead, xi, regime, reynolds);
}

/// Shear stress of `station` from the lag equation since a layer `ahead` of it.
fn solve_shear(station: &mut Station, ahead: &Layer<4>, from: f64, regime: Regime, reynolds: f64) {
    station.shear = ahead.log_shear.value.exp();
    let profile: Profile<1> = Profile {
        shear: Dual::variable(station.shear, 0),
        theta: Dual::constant(station.theta),
        delta_star: Dual::constant(station.delta_star),
        speed: Dual::constant(station.speed),
    };
    let layer = Layer::of(regime, &profile, reynolds);
    let length = station.xi - from;
    // The growth falls evenly with √C_τ: 2 ln c + ½ length · fall · c is known.
    let fall = -0.5 * length * layer.shear_growth.slope[0];
    let known = 2.0 * (ahead.log_shear.value + ahead.log_speed.value - layer.log_speed.value)
        + 0.5 * length * (ahead.shear_growth.value + layer.shear_growth.value)
        + fall * station.shear;
    let mut shear = station.shear;
    for _ in 0..40 {
        let excess = 2.0 * shear.ln() + fall * shear - known;
        let step = -excess / (2.0 / shear + fall);
        shear = (shear + step).max(0.2 * shear);
        if step.abs() < 1e-13 * shear {
            break;
        }
    }
    station.shear = if shear.is_finite() { shear.clamp(1e-8, 10.0) } else { 0.03 };
}

/// The equations of the interval that ends at station `i`, by the variables of `interval`.
pub(super) fn equations(
    stations: &[Station],
    i: usize,
    transition: Option<&Transition>,
    reynolds: f64,
) -> Residual<VARIABLES> {
    let (one, two) = (&stations[i - 1], &stations[i]);
    if let Some(transition) = transition.filter(|transition| transition.behind == i) {
        return through_transition(one.numbers(), two.numbers(), transition.xi, reynolds);
    }
    let first: Layer<VARIABLES> = one.layer.among(FIRST);
    let second: Layer<VARIABLES> = two.layer.among(SECOND);
    residual(
        End { layer: &first, xi: Dual::variable(one.xi, FIRST_XI) },
        End { layer: &second, xi: Dual::variable(two.xi, SECOND_XI) },
        two.turbulent,
    )
}

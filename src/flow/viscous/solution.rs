//! What is read off the converged layers.

use super::closure::{laminar_friction, turbulent_friction};
use super::dual::Dual;
use super::side::{Station, Transition};
use super::state::{Layers, Problem};
use super::{Conditions, ViscousState};
use crate::flow::loads::loads;
use crate::flow::{Panelling, PressurePoint};
use crate::geometry::{Point, Vec2};

/// Viscous flow at one incidence, for unit chord and onset speed.
#[derive(Debug, Clone, PartialEq)]
pub struct ViscousSolution {
    /// Angle of the onset against the x axis, in radians.
    pub incidence: f64,
    /// Lift coefficient, from the pressure.
    pub cl: f64,
    /// Drag coefficient, from the momentum of the wake carried on to infinity (Squire and Young
    /// 1938, R&M 1838): friction and pressure together.
    pub cd: f64,
    /// Part of `cd` that the friction on the surface makes.
    pub cd_friction: f64,
    /// The rest of `cd`, which the pressure makes.
    pub cd_pressure: f64,
    /// Moment coefficient about (0.25, 0), positive nose up, from the pressure.
    pub cm: f64,
    /// Lowest pressure coefficient at a node.
    pub cp_min: f64,
    /// Pressure at the nodes, from the upper trailing edge over the nose to the lower one.
    pub pressure: Vec<PressurePoint>,
    /// The upper side.
    pub upper: SideFlow,
    /// The lower side.
    pub lower: SideFlow,
    /// The wake, from the trailing edge on.
    pub wake: Vec<LayerPoint>,
    /// Newton steps it took.
    pub steps: usize,
    /// To start a neighbouring point from.
    pub state: ViscousState,
}

/// The layer of one side.
#[derive(Debug, Clone, PartialEq)]
pub struct SideFlow {
    /// Where it becomes turbulent, in chords along x; `None` if it is laminar to the trailing edge.
    pub transition: Option<f64>,
    /// Whether a trip made it turbulent.
    pub tripped: bool,
    /// Laminar separation and turbulent reattachment of a bubble, in chords along x.
    pub bubble: Option<[f64; 2]>,
    /// Where the layer separates for good, in chords along x.
    pub separation: Option<f64>,
    /// From the stagnation point to the trailing edge.
    pub layers: Vec<LayerPoint>,
}

/// The layer at one station; lengths in chords, speeds in onset speeds.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct LayerPoint {
    /// Along the chord.
    pub x: f64,
    /// Across the chord.
    pub y: f64,
    /// Along the side from the stagnation point.
    pub length: f64,
    /// Edge speed.
    pub speed: f64,
    /// Momentum thickness θ.
    pub theta: f64,
    /// Displacement thickness δ*.
    pub delta_star: f64,
    /// Friction coefficient by the edge speed: negative where the flow at the wall runs back.
    pub cf: f64,
    /// Amplification exponent, as far as laminar.
    pub amplification: f64,
    /// Coefficient C_τ of the greatest shear stress, where turbulent.
    pub shear: f64,
    /// Whether it is turbulent.
    pub turbulent: bool,
}

impl LayerPoint {
    /// Shape factor δ*/θ.
    #[must_use]
    pub fn shape(&self) -> f64 {
        self.delta_star / self.theta
    }

    pub(super) fn of(station: &Station, at: Point, reynolds: f64, wake: bool) -> Self {
        let h: Dual<0> = Dual::constant((station.delta_star / station.theta).max(1.0005));
        let re_theta = station.speed * station.theta * reynolds;
        let cf = match (wake, station.turbulent) {
            (true, _) => 0.0,
            (false, true) => 2.0 * turbulent_friction(h, Dual::constant(re_theta)).value,
            (false, false) => 2.0 * laminar_friction(h).value / re_theta,
        };
        Self {
            x: at.x,
            y: at.y,
            length: station.xi,
            speed: station.speed,
            theta: station.theta,
            delta_star: station.delta_star,
            cf,
            amplification: if station.turbulent { 0.0 } else { station.amplification },
            shear: if station.turbulent { station.shear * station.shear } else { 0.0 },
            turbulent: station.turbulent,
        }
    }
}

impl ViscousSolution {
    pub(super) fn of(
        panelling: &Panelling,
        problem: &Problem,
        conditions: &Conditions,
        incidence: f64,
        layers: &Layers,
        steps: usize,
        state: ViscousState,
    ) -> Self {
        let points = &problem.coupling.points;
        let point = |station: &Station, wake: bool| {
            LayerPoint::of(station, points[station.index], conditions.reynolds, wake)
        };
        let side = |k: usize| {
            let stations = layers.sides[k].iter().map(|station| point(station, false)).collect();
            SideFlow::of(stations, layers.transitions[k].as_ref())
        };
        let (upper, lower) = (side(0), side(1));
        let wake: Vec<LayerPoint> = layers.sides[2].iter().map(|station| point(station, true)).collect();

        let speed = &layers.speed[..problem.coupling.surface];
        let loads = loads(panelling, speed);
        let (sin, cos) = incidence.sin_cos();
        let cd = wake.last().map_or(0.0, momentum_far_behind);
        let onset = Vec2::new(cos, sin);
        let cd_friction = friction(&upper.layers, onset) + friction(&lower.layers, onset);
        let pressure: Vec<PressurePoint> = std::iter::zip(panelling.nodes(), speed)
            .map(|(node, speed)| PressurePoint { x: node.x, y: node.y, cp: 1.0 - speed * speed })
            .collect();
        Self {
            incidence,
            cl: loads.force.y * cos - loads.force.x * sin,
            cd,
            cd_friction,
            cd_pressure: cd - cd_friction,
            cm: loads.moment,
            cp_min: pressure.iter().map(|point| point.cp).fold(f64::INFINITY, f64::min),
            pressure,
            upper,
            lower,
            wake,
            steps,
            state,
        }
    }

    pub(super) fn is_finite(&self) -> bool {
        let coefficients = [self.cl, self.cd, self.cd_friction, self.cm, self.cp_min];
        let layers = [&self.upper.layers, &self.lower.layers, &self.wake];
        let of_layer = |layer: &LayerPoint| {
            [layer.speed, layer.theta, layer.delta_star, layer.cf, layer.amplification, layer.shear]
        };
        coefficients.into_iter().chain(layers.into_iter().flatten().flat_map(of_layer)).all(f64::is_finite)
    }

    /// Difference of the speeds of both sides a fiftieth of the chord ahead of the trailing edge.
    pub(super) fn edge_difference(&self) -> f64 {
        let at = |side: &SideFlow| -> Option<f64> {
            let end = side.layers.last()?.x - 0.02;
            let next = side.layers.iter().rposition(|layer| layer.x <= end)?;
            let (a, b) = (&side.layers[next], side.layers.get(next + 1)?);
            Some(a.speed + (b.speed - a.speed) * (end - a.x) / (b.x - a.x))
        };
        match (at(&self.upper), at(&self.lower)) {
            (Some(upper), Some(lower)) => (upper - lower).abs(),
            _ => 0.0,
        }
    }
}

impl SideFlow {
    fn of(layers: Vec<LayerPoint>, transition: Option<&Transition>) -> Self {
        let x_at = |length: f64| {
            let next = layers.iter().position(|layer| layer.length >= length).unwrap_or(layers.len() - 1);
            let Some(before) = next.checked_sub(1) else { return layers[0].x };
            let (a, b) = (&layers[before], &layers[next]);
            a.x + (b.x - a.x) * ((length - a.length) / (b.length - a.length)).clamp(0.0, 1.0)
        };
        // Where friction passes through nothing between two stations.
        let crossing = |i: usize| {
            let (a, b) = (&layers[i - 1], &layers[i]);
            a.x + (b.x - a.x) * a.cf / (a.cf - b.cf)
        };
        let falls = |from: usize| {
            (from.max(1)..layers.len()).find(|&i| layers[i].cf < 0.0 && layers[i - 1].cf >= 0.0)
        };
        let rises = |from: usize| {
            (from.max(1)..layers.len()).find(|&i| layers[i].cf > 0.0 && layers[i - 1].cf <= 0.0)
        };
        let mut bubble = None;
        let mut separation = None;
        let mut from = 1;
        while let Some(fall) = falls(from) {
            match rises(fall) {
                Some(rise) => {
                    if !layers[fall].turbulent && layers[rise].turbulent {
                        bubble = bubble.or(Some([crossing(fall), crossing(rise)]));
                    }
                    from = rise;
                }
                None => {
                    separation = Some(crossing(fall));
                    break;
                }
            }
        }
        Self {
            transition: transition.map(|transition| x_at(transition.xi)),
            tripped: transition.is_some_and(|transition| transition.tripped),
            bubble,
            separation,
            layers,
        }
    }
}

/// Drag coefficient from the last station of the wake: momentum thickness carried on to infinity
/// with a shape factor that falls evenly with the logarithm of the speed (Squire and Young 1938).
fn momentum_far_behind(last: &LayerPoint) -> f64 {
    2.0 * last.theta * last.speed.powf(0.5 * (last.shape() + 5.0))
}

/// Force of the friction of a side along the onset, by the trapezium rule.
fn friction(layers: &[LayerPoint], onset: Vec2) -> f64 {
    let stress = |layer: &LayerPoint| layer.cf * layer.speed * layer.speed;
    layers
        .windows(2)
        .map(|pair| {
            let along = Vec2::new(pair[1].x - pair[0].x, pair[1].y - pair[0].y);
            0.5 * (stress(&pair[0]) + stress(&pair[1])) * along.dot(onset)
        })
        .sum()
}

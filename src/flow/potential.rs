//! Potential flow about one outline, solved once for every incidence.

use super::edge::{Base, straight_run};
use super::influence::VortexInfluence;
use super::loads::{circulation, loads};
use super::lu::solve_in_place;
use super::{FlowError, Panelling};

/// Flow about an outline at any incidence: that of two onset directions, of which every other is
/// a sum.
///
/// The surface is a vortex sheet inside of which the fluid is at rest, so that its strength is
/// the speed of the flow along it. The unknowns are the strengths at the nodes and the stream
/// function of the surface; the equations are that all nodes have that stream function, and the
/// Kutta condition. Method of linear and higher vorticity panels in stream-function form:
/// see `docs/potential-flow.md`.
#[derive(Debug, Clone, PartialEq)]
pub struct PotentialFlow {
    panelling: Panelling,
    /// Speed along the outline at the nodes for onset along x and along y.
    speed: [Vec<f64>; 2],
    /// Circulation of each, anticlockwise.
    circulation: [f64; 2],
}

/// Pressure at a node.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct PressurePoint {
    /// Along the chord, in chords.
    pub x: f64,
    /// Across the chord, in chords.
    pub y: f64,
    /// Pressure coefficient: one less the square of the speed over that of the onset.
    pub cp: f64,
}

/// Flow at one incidence, for unit chord and onset speed.
#[derive(Debug, Clone, PartialEq)]
pub struct Solution {
    /// Angle of the onset against the x axis, in radians, positive for flow from below.
    pub incidence: f64,
    /// Lift coefficient, from the circulation (Kutta and Joukowski).
    pub cl: f64,
    /// Moment coefficient about (0.25, 0), positive nose up, from the pressure.
    pub cm: f64,
    /// Lift coefficient from the pressure: a measure of the discretisation against `cl`.
    pub pressure_lift: f64,
    /// Drag coefficient from the pressure: nothing in exact flow about a sharp edge, and for a
    /// blunt one that of the base, which is not to be taken for a real drag.
    pub pressure_drag: f64,
    /// Lowest pressure coefficient at a node.
    pub cp_min: f64,
    /// Pressure at the nodes, from the upper trailing edge over the nose to the lower one.
    pub pressure: Vec<PressurePoint>,
    /// Speed at the nodes along that way: negative where the flow runs aft on the upper side.
    pub speed: Vec<f64>,
}

impl PotentialFlow {
    /// Assembles the equations, factors them and solves for both onset directions.
    ///
    /// # Errors
    /// When the equations have no finite solution.
    pub fn new(panelling: &Panelling) -> Result<Self, FlowError> {
        let [along, across] = surface_speeds(panelling, 0, |_, _| ())?.0;
        let speed = [along, across];
        let base = Base::of(panelling);
        let base_circulation = base.map_or(0.0, |base| base.circulation());
        let circulation = [0, 1].map(|k| circulation(panelling, base_circulation, &speed[k]));
        Ok(Self { panelling: panelling.clone(), speed, circulation })
    }

    /// Flow at `incidence` in radians.
    #[must_use]
    pub fn at(&self, incidence: f64) -> Solution {
        let (sin, cos) = incidence.sin_cos();
        let speed: Vec<f64> = self.speed[0]
            .iter()
            .zip(&self.speed[1])
            .map(|(along, across)| along * cos + across * sin)
            .collect();
        let loads = loads(&self.panelling, &speed);
        let pressure: Vec<PressurePoint> = self
            .panelling
            .nodes()
            .iter()
            .zip(&speed)
            .map(|(node, speed)| PressurePoint { x: node.x, y: node.y, cp: 1.0 - speed * speed })
            .collect();
        Solution {
            incidence,
            cl: -2.0 * (self.circulation[0] * cos + self.circulation[1] * sin),
            cm: loads.moment,
            pressure_lift: loads.force.y * cos - loads.force.x * sin,
            pressure_drag: loads.force.x * cos + loads.force.y * sin,
            cp_min: pressure.iter().map(|point| point.cp).fold(f64::INFINITY, f64::min),
            pressure,
            speed,
        }
    }

    /// The nodes and panels it was solved on.
    #[must_use]
    pub fn panelling(&self) -> &Panelling {
        &self.panelling
    }

    /// Slope of the lift coefficient at zero lift, per radian: lift is this times the sine of the
    /// incidence from [`PotentialFlow::zero_lift`].
    #[must_use]
    pub fn slope_per_radian(&self) -> f64 {
        2.0 * self.circulation[0].hypot(self.circulation[1])
    }

    /// Incidence of zero lift, in radians.
    #[must_use]
    pub fn zero_lift(&self) -> f64 {
        self.circulation[0].atan2(-self.circulation[1])
    }

    /// Incidence of least amount that gives the lift coefficient `cl`, in radians; `None` where
    /// potential flow cannot give it.
    #[must_use]
    pub fn incidence_for_lift(&self, cl: f64) -> Option<f64> {
        let sine = cl / self.slope_per_radian();
        (sine.abs() <= 1.0).then(|| self.zero_lift() + sine.asin())
    }
}

/// What [`surface_speeds`] gives: speeds at the nodes for onset along x and along y, and for each
/// further stream function.
pub(super) type SurfaceSpeeds = ([Vec<f64>; 2], Vec<Vec<f64>>);

/// Speeds along the outline at the nodes for onset along x and along y, and for `further` other
/// stream functions alone, whose values at the nodes `fill` puts into columns of a given length.
pub(super) fn surface_speeds(
    panelling: &Panelling,
    further: usize,
    fill: impl FnOnce(&mut [f64], usize),
) -> Result<SurfaceSpeeds, FlowError> {
    let nodes = panelling.nodes();
    let (count, size) = (nodes.len(), nodes.len() + 1);
    let onsets = 2;
    // The stream function of the surface, the onsets and what is further asked for.
    let mut influence = VortexInfluence::of(panelling, 1 + onsets + further);
    let stride = influence.stride();
    let block = influence.block();

    block[count * stride..][..count].fill(1.0);
    for (i, node) in nodes.iter().enumerate() {
        block[size * stride + i] = node.y;
        block[(size + 1) * stride + i] = -node.x;
    }
    fill(&mut block[(size + onsets) * stride..], stride);
    if let Some(base) = Base::of(panelling) {
        // The edge speed is the mean of both sides, the upper one counted aft.
        for (i, &node) in nodes.iter().enumerate() {
            let half = 0.5 * base.stream_function(node);
            block[i] -= half;
            block[(count - 1) * stride + i] += half;
        }
    } else {
        let row = count - 1;
        for column in block.chunks_exact_mut(stride) {
            column[row] = 0.0;
        }
        for (i, weight) in straight_run(panelling).into_iter().enumerate() {
            block[i * stride + row] += weight;
            block[(count - 1 - i) * stride + row] -= weight;
        }
    }
    for column in block.chunks_exact_mut(stride) {
        column[count] = 0.0;
    }
    block[count] = 1.0;
    block[(count - 1) * stride + count] = 1.0;

    solve_in_place(block, stride, size);
    let mut speeds = block[size * stride..].chunks_exact(stride).map(|column| column[..count].to_vec());
    let speed = [(); 2].map(|()| speeds.next().unwrap_or_default());
    let rest: Vec<Vec<f64>> = speeds.collect();
    if speed.iter().chain(&rest).flatten().all(|speed| speed.is_finite()) {
        Ok((speed, rest))
    } else {
        Err(FlowError::Singular)
    }
}

//! A cantilever with stiffness that changes along it: half a foil from its root, a strut from the hull.
//!
//! Shear and moment come from the loads alone and are exact for loads in straight lines between samples;
//! slope, deflection and twist are integrals of M/EI and T/GJ by Gauss's rule of three points, EI and GJ
//! in straight lines between stations (Euler and Bernoulli's beam, with shear after Timoshenko if asked).

use super::{LoadCase, StrengthError};
use crate::geometry::Point;

/// Stiffness at a place along the span.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct BeamStation {
    /// Place, mm from the root.
    pub at: f64,
    /// Bending stiffness for loads across and along, N·mm².
    pub bending: [f64; 2],
    /// Torsional stiffness GJ, N·mm².
    pub torsion: f64,
    /// Shear centre in the section's axes, mm.
    pub shear_centre: Point,
    /// Shear stiffness for loads across, N (of a sandwich G b d²/c, Allen 1969); `None`: stiff.
    pub shear: Option<f64>,
}

impl BeamStation {
    /// A station with one bending stiffness both ways, its shear centre at the origin and stiff in shear.
    #[must_use]
    pub fn plain(at: f64, bending: f64, torsion: f64) -> Self {
        Self { at, bending: [bending; 2], torsion, shear_centre: Point::ORIGIN, shear: None }
    }
}

/// A beam held at its root.
#[derive(Debug, Clone, PartialEq)]
pub struct Cantilever {
    stations: Vec<BeamStation>,
}

/// State of the beam at one place. Pairs are across and along.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct BeamNode {
    /// Place, mm from the root.
    pub at: f64,
    /// Sum of the forces from here to the tip, N.
    pub shear: [f64; 2],
    /// Their moment, N·mm.
    pub moment: [f64; 2],
    /// Nose-up torque about the shear centre here, N·mm.
    pub torque: f64,
    /// Compressive force, N.
    pub compression: f64,
    /// Slope.
    pub slope: [f64; 2],
    /// Deflection, mm.
    pub deflection: [f64; 2],
    /// Nose-up twist, radians.
    pub twist: f64,
}

/// Longest step along the beam, as a share of it.
const STEP: f64 = 1.0 / 200.0;
/// Gauss's rule of three points on 0 to 1: places and weights.
const GAUSS: [[f64; 2]; 3] =
    [[0.112_701_665_379_258_3, 5.0 / 18.0], [0.5, 8.0 / 18.0], [0.887_298_334_620_741_7, 5.0 / 18.0]];

impl Cantilever {
    /// A beam from its stations, the first at the root.
    ///
    /// # Errors
    /// When there are fewer than two, they do not rise from zero, or a stiffness is not positive.
    pub fn new(stations: Vec<BeamStation>) -> Result<Self, StrengthError> {
        let rising = stations.windows(2).all(|pair| pair[0].at < pair[1].at && pair[1].at.is_finite());
        if stations.len() < 2 || stations[0].at != 0.0 || !rising {
            return Err(StrengthError::Stations);
        }
        let positive = |value: f64| value > 0.0 && value.is_finite();
        for station in &stations {
            let no = |what| StrengthError::NoStiffness { at: station.at, what };
            if !station.bending.into_iter().chain(station.shear).all(positive) {
                return Err(no("bending"));
            }
            let centre = station.shear_centre;
            if !(positive(station.torsion) && centre.x.is_finite() && centre.y.is_finite()) {
                return Err(no("torsional"));
            }
        }
        Ok(Self { stations })
    }

    /// Root to tip, mm.
    #[must_use]
    pub fn reach(&self) -> f64 {
        self.stations.last().map_or(0.0, |station| station.at)
    }

    /// The stiffness at a place, in straight lines between stations.
    #[must_use]
    pub fn stiffness(&self, at: f64) -> BeamStation {
        let last = self.stations.len() - 2;
        let i = self.stations.windows(2).position(|pair| at < pair[1].at).unwrap_or(last);
        let (a, b) = (&self.stations[i], &self.stations[i + 1]);
        let share = ((at - a.at) / (b.at - a.at)).clamp(0.0, 1.0);
        let mix = |p: f64, q: f64| p + share * (q - p);
        BeamStation {
            at,
            bending: [0, 1].map(|way| mix(a.bending[way], b.bending[way])),
            torsion: mix(a.torsion, b.torsion),
            shear_centre: a.shear_centre.lerp(b.shear_centre, share),
            shear: a.shear.zip(b.shear).map(|(p, q)| mix(p, q)),
        }
    }

    /// Forces, deflection and twist under a case, from the root to the tip.
    ///
    /// The nodes contain every station, every sample and every point load. A compressive force is
    /// carried along but its own bending is not: see [`Cantilever::buckling_load`].
    ///
    /// Not a certification: use tested material values; local codes and licensed practice come first.
    ///
    /// # Errors
    /// When a load of the case does not lie on the beam.
    pub fn under(&self, case: &LoadCase) -> Result<BeamResult, StrengthError> {
        case.check(self.reach())?;
        let grid = self.grid(case.places());
        let mut nodes: Vec<BeamNode> =
            grid.iter().map(|&at| BeamNode { at, ..BeamNode::default() }).collect();
        let steps: Vec<Step> = grid.windows(2).map(|pair| Step::of(case, pair[0], pair[1])).collect();
        // Torque about the origin; the shear centre is brought in at each node.
        let mut torque = vec![0.0; grid.len()];
        let nearest = |at: f64| {
            let after = grid.partition_point(|&place| place < at).min(grid.len() - 1);
            if after > 0 && at - grid[after - 1] < grid[after] - at { after - 1 } else { after }
        };
        for load in &case.points {
            let node = nearest(load.at);
            for way in [0, 1] {
                nodes[node].shear[way] += case.factor * load.force[way];
            }
            nodes[node].compression += case.factor * load.compression;
            torque[node] += case.factor * load.torque;
        }
        for i in (0..steps.len()).rev() {
            let outer = nodes[i + 1];
            let [shear, moment] = steps[i].inwards(&outer, 1.0);
            for way in [0, 1] {
                nodes[i].shear[way] += shear[way];
                nodes[i].moment[way] += moment[way];
            }
            nodes[i].compression += outer.compression;
            torque[i] += torque[i + 1] + steps[i].torque_inwards(1.0);
        }
        for i in 0..steps.len() {
            let (inner, outer) = (nodes[i], nodes[i + 1]);
            let length = steps[i].length;
            let mut next = outer;
            next.twist = inner.twist;
            for way in [0, 1] {
                next.slope[way] = inner.slope[way];
                next.deflection[way] = inner.deflection[way] + inner.slope[way] * length;
            }
            for [share, weight] in GAUSS {
                let here = self.stiffness(inner.at + share * length);
                let [shear, moment] = steps[i].inwards(&outer, 1.0 - share);
                let bit = weight * length;
                for way in [0, 1] {
                    let curvature = moment[way] / here.bending[way];
                    next.slope[way] += bit * curvature;
                    next.deflection[way] += bit * curvature * (1.0 - share) * length;
                }
                next.deflection[0] += here.shear.map_or(0.0, |stiffness| bit * shear[0] / stiffness);
                let about_origin = torque[i + 1] + steps[i].torque_inwards(1.0 - share);
                next.twist += bit * about(here.shear_centre, about_origin, shear) / here.torsion;
            }
            nodes[i + 1] = next;
        }
        for (node, about_origin) in nodes.iter_mut().zip(torque) {
            node.torque = about(self.stiffness(node.at).shear_centre, about_origin, node.shear);
        }
        Ok(BeamResult { nodes })
    }

    /// The least compressive force at the tip under which the beam buckles, N, in either plane; the tip
    /// is free.
    ///
    /// Of a uniform one Euler's π² EI / 4 L² (1744); of any by the iteration of Vianello (1898): a
    /// shape, its moments, the shape that they give. It says nothing of a part that is held at both ends.
    #[must_use]
    pub fn buckling_load(&self) -> f64 {
        [0, 1].map(|way| self.buckles_in(way)).into_iter().fold(f64::INFINITY, f64::min)
    }

    fn buckles_in(&self, way: usize) -> f64 {
        let grid = self.grid(std::iter::empty());
        let reach = self.reach();
        let mut shape: Vec<f64> = grid.iter().map(|at| (at / reach).powi(2)).collect();
        let mut load = 0.0;
        for _ in 0..60 {
            let tip = shape[shape.len() - 1];
            let (mut slope, mut deflection) = (0.0, 0.0);
            let mut next = vec![0.0];
            for (i, pair) in grid.windows(2).enumerate() {
                let length = pair[1] - pair[0];
                let start = slope;
                deflection += start * length;
                for [share, weight] in GAUSS {
                    let stiffness = self.stiffness(pair[0] + share * length).bending[way];
                    let lever = tip - (shape[i] + share * (shape[i + 1] - shape[i]));
                    slope += weight * length * lever / stiffness;
                    deflection += weight * length * lever / stiffness * (1.0 - share) * length;
                }
                next.push(deflection);
            }
            let now = tip / deflection;
            let settled = (now - load).abs() <= 1e-12 * now;
            load = now;
            next.iter_mut().for_each(|value| *value /= deflection);
            shape = next;
            if settled {
                break;
            }
        }
        load
    }

    /// Places that hold every station and the places given, no further apart than [`STEP`].
    fn grid(&self, places: impl Iterator<Item = f64>) -> Vec<f64> {
        let reach = self.reach();
        let mut ends: Vec<f64> =
            self.stations.iter().map(|station| station.at).chain(places.map(|at| at.min(reach))).collect();
        ends.sort_by(f64::total_cmp);
        ends.dedup_by(|a, b| (*a - *b).abs() < 1e-9 * reach);
        let mut grid = vec![0.0];
        for pair in ends.windows(2) {
            let parts = ((pair[1] - pair[0]) / (STEP * reach)).ceil().clamp(1.0, 1000.0);
            let step = (pair[1] - pair[0]) / parts;
            grid.extend(
                (1..=parts as usize)
                    .map(|part| if part as f64 == parts { pair[1] } else { pair[0] + step * part as f64 }),
            );
        }
        grid
    }
}

/// Torque about a shear centre from that about the origin.
fn about(centre: Point, torque: f64, [across, along]: [f64; 2]) -> f64 {
    torque + across * centre.x - along * centre.y
}

/// A step of the grid with its spread load in a straight line: across, along, torque.
struct Step {
    length: f64,
    inner: [f64; 3],
    outer: [f64; 3],
}

impl Step {
    /// The load is taken inside of the step and continued to its ends, where it may jump.
    fn of(case: &LoadCase, from: f64, to: f64) -> Self {
        let length = to - from;
        let (a, b) = (case.spread_at(from + 0.25 * length), case.spread_at(from + 0.75 * length));
        let ends = |i: usize| [1.5 * a[i] - 0.5 * b[i], 1.5 * b[i] - 0.5 * a[i]];
        Self { length, inner: [0, 1, 2].map(|i| ends(i)[0]), outer: [0, 1, 2].map(|i| ends(i)[1]) }
    }

    /// Shear and moment a share of the step inwards from its outer end.
    fn inwards(&self, outer: &BeamNode, share: f64) -> [[f64; 2]; 2] {
        let s = share * self.length;
        let change = |way: usize| (self.inner[way] - self.outer[way]) * share;
        let shear = [0, 1].map(|way| outer.shear[way] + s * (self.outer[way] + 0.5 * change(way)));
        let moment = [0, 1].map(|way| {
            outer.moment[way] + s * outer.shear[way] + s * s * (0.5 * self.outer[way] + change(way) / 6.0)
        });
        [shear, moment]
    }

    /// Torque that the step adds from its outer end inwards.
    fn torque_inwards(&self, share: f64) -> f64 {
        share * self.length * (self.outer[2] + 0.5 * share * (self.inner[2] - self.outer[2]))
    }
}

/// What a beam does under a case, root to tip.
#[derive(Debug, Clone, PartialEq)]
pub struct BeamResult {
    nodes: Vec<BeamNode>,
}

impl BeamResult {
    /// The nodes from root to tip.
    #[must_use]
    pub fn nodes(&self) -> &[BeamNode] {
        &self.nodes
    }

    /// At the root: what the hull or the foil joint has to hold.
    #[must_use]
    pub fn root(&self) -> BeamNode {
        self.nodes.first().copied().unwrap_or_default()
    }

    /// At the tip.
    #[must_use]
    pub fn tip(&self) -> BeamNode {
        self.nodes.last().copied().unwrap_or_default()
    }

    /// The node nearest to a place; every station and every load has one.
    #[must_use]
    pub fn near(&self, at: f64) -> BeamNode {
        let nearer = |a: &&BeamNode, b: &&BeamNode| (a.at - at).abs().total_cmp(&(b.at - at).abs());
        self.nodes.iter().min_by(nearer).copied().unwrap_or_default()
    }
}

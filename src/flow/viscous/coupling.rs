//! What the flow outside makes of the layers: speeds along surface and wake as a linear function
//! of incidence and mass defect, put up and factored once for an outline.
//!
//! The layers displace the outer flow by δ*. That is the same as sources of strength dm/ds along
//! surface and wake, m = u δ* being the mass defect (Lighthill 1958, "On displacement
//! thickness", Journal of Fluid Mechanics 4). Here they are even over each panel, so that each
//! panel gives what the mass defect grows by between its nodes.

use super::sources::{mean_speed_in_line, surface_stream_function, velocities, wake_stream_functions};
use super::wake::wake_line;
use crate::flow::dense::dot;
use crate::flow::edge::Base;
use crate::flow::potential::surface_speeds;
use crate::flow::{FlowError, Panelling};
use crate::geometry::{Point, Vec2};

/// Stations are the nodes of the outline, from the upper trailing edge over the nose to the lower
/// one, then those of the wake from the trailing edge on. Speeds and mass defects are positive
/// that way.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Coupling {
    /// Nodes of the outline.
    pub(super) surface: usize,
    /// Places of all stations.
    pub(super) points: Vec<Point>,
    /// Length along the outline, and along the wake from the trailing edge on.
    pub(super) length: Vec<f64>,
    /// Speeds at the surface without layers, for onset along x and along y.
    surface_speed: [Vec<f64>; 2],
    /// Velocities in the wake for both onsets.
    wake_velocity: [Vec<Vec2>; 2],
    /// Change of the surface speeds by mass defect: a row for each node.
    surface_response: Vec<f64>,
    /// Change of the velocities in the wake: rows of x, and rows of y.
    wake_response: [Vec<f64>; 2],
    /// Change of speeds and velocities by unit circulation on each panel of the wake.
    bend_response: Vec<BendResponse>,
}

/// What anticlockwise circulation on a panel of the wake does.
#[derive(Debug, Clone, PartialEq)]
struct BendResponse {
    /// To the speeds at the surface.
    surface: Vec<f64>,
    /// To the velocities in the wake; along itself the wake feels nothing of it.
    wake: Vec<Vec2>,
}

/// Speeds at one incidence: those without layers and their change by each mass defect.
#[derive(Debug, Clone)]
pub(super) struct OuterFlow<'a> {
    coupling: &'a Coupling,
    /// Without layers, at all stations.
    pub(super) speed: Vec<f64>,
    /// Rows of the change by each mass defect.
    response: Vec<f64>,
    /// Change by unit circulation on each panel of the wake: a column for each panel.
    bend: Vec<Vec<f64>>,
    /// The last columns of the rows of the wake, as they are without bending.
    unbent: Vec<f64>,
    /// By how much the flow turns along each panel of the wake, in radians.
    turn: Vec<f64>,
}

impl Coupling {
    pub(super) fn of(panelling: &Panelling) -> Result<Self, FlowError> {
        let nodes = panelling.nodes();
        let wake = wake_line(panelling);
        let (surface, count) = (nodes.len(), nodes.len() + wake.len());
        let surface_sources = surface_stream_function(panelling);
        let [wake_sources, wake_vortices] = wake_stream_functions(panelling, &wake);
        let bends = wake_vortices.len();

        // Each mass defect feeds the panel before it and drains the one after it.
        let (surface_speed, mut columns) = surface_speeds(panelling, count + bends, |block, stride| {
            let mut add = |station: usize, source: &[f64], weight: f64| {
                for (entry, value) in block[station * stride..].iter_mut().zip(source) {
                    *entry += weight * value;
                }
            };
            for (k, source) in surface_sources.iter().enumerate() {
                let weight = 1.0 / nodes[k].distance(nodes[k + 1]);
                add(k + 1, source, weight);
                add(k, source, -weight);
            }
            for (k, source) in wake_sources.iter().enumerate() {
                let weight = 1.0 / wake[k].distance(wake[k + 1]);
                add(surface + k + 1, source, weight);
                add(surface + k, source, -weight);
            }
            for (k, vortex) in wake_vortices.iter().enumerate() {
                add(count + k, vortex, 1.0 / wake[k].distance(wake[k + 1]));
            }
        })?;
        let bend_columns = columns.split_off(count);
        let mut surface_response = vec![0.0; surface * count];
        for (j, column) in columns.iter().enumerate() {
            for (i, &value) in column.iter().enumerate() {
                surface_response[i * count + j] = value;
            }
        }

        let mut length = vec![0.0];
        for (k, panel) in panelling.panels().iter().enumerate() {
            length.push(length[k] + 2.0 * panel.half_length());
        }
        length.push(0.0);
        for (k, ends) in wake.windows(2).enumerate() {
            length.push(length[surface + k] + ends[0].distance(ends[1]));
        }
        let fields: Vec<Fields> = wake.iter().map(|&z| Fields::at(panelling, z)).collect();
        let wake_velocity = [0, 1].map(|k| {
            let onset = [Vec2::new(1.0, 0.0), Vec2::new(0.0, 1.0)][k];
            fields.iter().map(|fields| onset + fields.of_vorticity(&surface_speed[k])).collect()
        });
        let wake_response = wake_response(&fields, &wake, &length[surface..], &columns);
        let bend_response = bend_columns
            .into_iter()
            .map(|column| {
                let wake = fields.iter().map(|fields| fields.of_vorticity(&column)).collect();
                BendResponse { surface: column, wake }
            })
            .collect();
        let points = nodes.iter().chain(&wake).copied().collect();
        let coupling = Self {
            surface,
            points,
            length,
            surface_speed,
            wake_velocity,
            surface_response,
            wake_response,
            bend_response,
        };
        if coupling.wake_response.iter().flatten().all(|value| value.is_finite()) {
            Ok(coupling)
        } else {
            Err(FlowError::Singular)
        }
    }

    /// All stations.
    pub(super) fn count(&self) -> usize {
        self.points.len()
    }

    /// Incidence without lift and layers, in radians: that of no circulation.
    pub(super) fn zero_lift(&self) -> f64 {
        let sum = |speed: &[f64]| -> f64 {
            let ends = std::iter::zip(self.length.windows(2), speed.windows(2)).take(self.surface - 1);
            ends.map(|(length, speed)| 0.5 * (length[1] - length[0]) * (speed[0] + speed[1])).sum()
        };
        let [along, across] = [&self.surface_speed[0], &self.surface_speed[1]].map(|speed| sum(speed));
        along.atan2(-across)
    }

    pub(super) fn at(&self, incidence: f64) -> OuterFlow<'_> {
        let (sin, cos) = incidence.sin_cos();
        let (count, surface) = (self.count(), self.surface);
        let mut speed: Vec<f64> = std::iter::zip(&self.surface_speed[0], &self.surface_speed[1])
            .map(|(along, across)| along * cos + across * sin)
            .collect();
        let last = surface - 1;
        // The wake begins with the speed of both sides at the edge.
        speed.push(0.5 * (speed[last] - speed[0]));
        let row = |i: usize| &self.surface_response[i * count..][..count];
        let mut response = Vec::with_capacity(count * count);
        response.extend_from_slice(&self.surface_response);
        response.extend(std::iter::zip(row(last), row(0)).map(|(lower, upper)| 0.5 * (lower - upper)));
        let leaves = (self.points[surface + 1] - self.points[surface]).normalize();
        let mut directions = vec![leaves];
        for i in 1..count - surface {
            let velocity = cos * self.wake_velocity[0][i] + sin * self.wake_velocity[1][i];
            let size = velocity.hypot().max(1e-6);
            let direction = velocity / size;
            speed.push(size);
            let [x, y] = [0, 1].map(|k| &self.wake_response[k][i * count..][..count]);
            response.extend(std::iter::zip(x, y).map(|(x, y)| direction.x * x + direction.y * y));
            directions.push(direction);
        }
        let bend = self
            .bend_response
            .iter()
            .map(|by| {
                let edge = 0.5 * (by.surface[last] - by.surface[0]);
                let wake =
                    std::iter::zip(&by.wake, &directions).skip(1).map(|(v, direction)| v.dot(*direction));
                by.surface.iter().copied().chain(std::iter::once(edge)).chain(wake).collect()
            })
            .collect();
        let turn =
            directions.windows(2).map(|pair| pair[0].cross(pair[1]).atan2(pair[0].dot(pair[1]))).collect();
        let unbent =
            (surface..count).flat_map(|i| response[i * count + surface..(i + 1) * count].to_vec()).collect();
        OuterFlow { coupling: self, speed, response, bend, unbent, turn }
    }
}

impl OuterFlow<'_> {
    /// Change of the speed at a station by the mass defect of each.
    pub(super) fn response(&self, station: usize) -> &[f64] {
        let count = self.coupling.count();
        &self.response[station * count..][..count]
    }

    /// Speeds with these mass defects, positive along the way.
    pub(super) fn speeds(&self, mass: &[f64]) -> Vec<f64> {
        let change = |i: usize| dot(self.response(i), mass);
        self.speed.iter().enumerate().map(|(i, speed)| speed + change(i)).collect()
    }

    /// Lets the bending of the wake act, for shape factors `shape` at its stations.
    ///
    /// Where the wake is bent, its slow fluid needs less pressure across than the outer flow has: to
    /// that flow the wake is a vortex sheet of strength κ u (δ* + θ), κ being the curvature (R. C.
    /// Lock and M. C. P. Firmin, "Survey of techniques for estimating viscous effects in external
    /// aerodynamics", in *Numerical Methods in Aeronautical Fluid Dynamics*, 1982). A panel's
    /// circulation is the mass defect times 1 + 1/H times the angle by which the flow turns along
    /// it; so it adds to the answer to the mass defects. The turn is that without layers.
    pub(super) fn bend(&mut self, shape: &[f64]) {
        let (count, surface) = (self.coupling.count(), self.coupling.surface);
        let share = |k: usize| 0.5 * (1.0 + 1.0 / shape[k]);
        for i in 0..count {
            // From the rows as they are without bending.
            let row = &mut self.response[i * count + surface..(i + 1) * count];
            match i.checked_sub(surface) {
                None => row.copy_from_slice(
                    &self.coupling.surface_response[i * count + surface..][..count - surface],
                ),
                Some(_) => {
                    row.copy_from_slice(&self.unbent[(i - surface) * (count - surface)..][..count - surface])
                }
            }
            for (k, (bend, turn)) in std::iter::zip(&self.bend, &self.turn).enumerate() {
                let speed = bend[i] * turn;
                row[k] += share(k) * speed;
                row[k + 1] += share(k + 1) * speed;
            }
        }
    }
}

/// Velocities at one point by unit strengths on the outline.
struct Fields {
    /// Of vorticity at each node, the base's included.
    vorticity: Vec<Vec2>,
    /// Of even sources on each panel.
    sources: Vec<Vec2>,
}

impl Fields {
    fn at(panelling: &Panelling, z: Point) -> Self {
        let nodes = panelling.nodes();
        let last = nodes.len() - 1;
        let mut vorticity = vec![Vec2::ZERO; nodes.len()];
        let mut sources = Vec::with_capacity(last);
        for (k, ends) in nodes.windows(2).enumerate() {
            let [source, first, second] = velocities(ends[0], ends[1], z);
            sources.push(source / ends[0].distance(ends[1]));
            vorticity[k] += first;
            vorticity[k + 1] += second;
        }
        if let Some(base) = Base::of(panelling) {
            let [source, first, second] = velocities(nodes[last], nodes[0], z);
            let [along, across] = base.strengths();
            let by_edge_speed = along * (first + second) + across * source;
            vorticity[0] -= 0.5 * by_edge_speed;
            vorticity[last] += 0.5 * by_edge_speed;
        }
        Self { vorticity, sources }
    }

    fn of_vorticity(&self, strength: &[f64]) -> Vec2 {
        std::iter::zip(&self.vorticity, strength).fold(Vec2::ZERO, |sum, (&field, &s)| sum + s * field)
    }
}

fn wake_response(fields: &[Fields], wake: &[Point], length: &[f64], columns: &[Vec<f64>]) -> [Vec<f64>; 2] {
    let count = columns.len();
    let surface = count - wake.len();
    let mut response = [vec![0.0; wake.len() * count], vec![0.0; wake.len() * count]];
    for (i, fields) in fields.iter().enumerate().skip(1) {
        let mut row: Vec<Vec2> = columns.iter().map(|column| fields.of_vorticity(column)).collect();
        for (k, &source) in fields.sources.iter().enumerate() {
            row[k + 1] += source;
            row[k] -= source;
        }
        let middle = |i: usize| 0.5 * (length[i] + length[i + 1]);
        let (from, to) =
            (middle(i - 1), if i + 1 < wake.len() { middle(i) } else { 2.0 * length[i] - middle(i - 1) });
        let before = (wake[i] - wake[i - 1]).normalize();
        let along = match wake.get(i + 1) {
            Some(&next) => (before + (next - wake[i]).normalize()).normalize(),
            None => before,
        };
        for (k, ends) in length.windows(2).enumerate() {
            let speed = mean_speed_in_line(from, to, ends[0], ends[1]) / (ends[1] - ends[0]);
            row[surface + k + 1] += speed * along;
            row[surface + k] -= speed * along;
        }
        for (j, velocity) in row.into_iter().enumerate() {
            response[0][i * count + j] = velocity.x;
            response[1][i * count + j] = velocity.y;
        }
    }
    response
}

#[cfg(test)]
#[allow(clippy::print_stdout)]
mod tests {
    use super::*;

    /// Water blown evenly through the surface of a circle as cos nθ runs along it as sin nθ: the
    /// potential is −cos nθ/(n rⁿ). Exact; it shares nothing with the panels.
    #[test]
    fn sources_on_a_circle_give_the_exact_speeds() {
        let count = 200;
        let circle = |i: usize| {
            let angle = std::f64::consts::TAU * i as f64 / count as f64;
            Point::new(0.5 + 0.5 * angle.cos(), 0.5 * angle.sin())
        };
        let mut points: Vec<Point> = (0..=count).map(circle).collect();
        points[count] = points[0];
        let coupling = Coupling::of(&Panelling::from_points(points).expect("panels")).expect("a flow");
        let outer = coupling.at(0.0);
        for waves in 1..=4 {
            let phase = |i: usize| std::f64::consts::TAU * (waves * i) as f64 / count as f64;
            // dm/ds = cos nθ on a radius of a half.
            let mass: Vec<f64> = (0..coupling.count())
                .map(|i| if i <= count { 0.5 * phase(i).sin() / waves as f64 } else { 0.0 })
                .collect();
            let worst = (0..count)
                .map(|i| (dot(outer.response(i), &mass) - phase(i).sin()).abs())
                .fold(0.0, f64::max);
            println!("{waves} waves round the circle: speeds within {worst:.1e}");
            assert!(worst < 3e-3, "{waves}: {worst:e}");
        }
    }

    /// The fields of a panel against the sum of many points.
    #[test]
    fn panel_fields_agree_with_sums_of_points() {
        let (from, to, z) = (Point::new(0.2, -0.1), Point::new(0.5, 0.15), Point::new(0.3, 0.4));
        let count = 4000;
        let mut sums = [Vec2::ZERO; 3];
        for i in 0..count {
            let part = (f64::from(i) + 0.5) / f64::from(count);
            let away = z - from.lerp(to, part);
            let field = away / (away.hypot2() * std::f64::consts::TAU) * from.distance(to) / f64::from(count);
            for (sum, more) in
                sums.iter_mut().zip([field, (1.0 - part) * field.turn_90(), part * field.turn_90()])
            {
                *sum += more;
            }
        }
        for (closed, sum) in velocities(from, to, z).into_iter().zip(sums) {
            assert!((closed - sum).hypot() < 1e-7, "{closed:?} {sum:?}");
        }
    }
}

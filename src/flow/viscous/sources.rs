//! Fields of source and vortex panels: what the displacement by the layers does to the flow.

use crate::flow::Panelling;
use crate::geometry::{Point, Vec2};

/// Stream function at the nodes of the outline, as seen from within it, due to even sources of
/// unit strength on each of its panels.
///
/// With G(ζ) = (z − ζ) log(z − ζ) over the direction of the panel, ψ = Im (G(first) − G(second))/2π.
/// Inside the outline there are no sources, and so ψ has one value everywhere if the angles are
/// followed from node to node along the inside.
pub(super) fn surface_stream_function(panelling: &Panelling) -> Vec<Vec<f64>> {
    let nodes = panelling.nodes();
    let count = nodes.len();
    let angles = inside_angles(nodes);
    let term = |i: usize, j: usize| weighted_log(nodes[i] - nodes[j], angles[j * count + i]);
    (0..count - 1)
        .map(|k| {
            let along = (nodes[k + 1] - nodes[k]).normalize();
            (0..count)
                .map(|i| stream_of(term(i, k), term(i, k + 1), along, nodes[k + 1] - nodes[k]))
                .collect()
        })
        .collect()
}

/// The same due to even sources of unit strength, and due to even anticlockwise vorticity of unit
/// strength, on panels between points downstream of the outline.
pub(super) fn wake_stream_functions(panelling: &Panelling, wake: &[Point]) -> [Vec<Vec<f64>>; 2] {
    let term = |z: Point, end: Point| {
        let from = z - end;
        // The cut runs downstream, where no node is.
        weighted_log(from, std::f64::consts::PI + (-from.y).atan2(-from.x))
    };
    let each = |of: fn(Vec2, Vec2, Vec2, Vec2) -> f64| -> Vec<Vec<f64>> {
        wake.windows(2)
            .map(|ends| {
                let panel = ends[1] - ends[0];
                let along = panel.normalize();
                panelling
                    .nodes()
                    .iter()
                    .map(|&z| of(term(z, ends[0]), term(z, ends[1]), along, panel))
                    .collect()
            })
            .collect()
    };
    [each(stream_of), each(|first, second, along, panel| -potential_of(first, second, along, panel))]
}

/// Angles at which each node is seen from each other, along the inside: entry `from * count + to`.
fn inside_angles(nodes: &[Point]) -> Vec<f64> {
    let count = nodes.len();
    let near = |angle: f64, wanted: f64| {
        angle + std::f64::consts::TAU * ((wanted - angle) / std::f64::consts::TAU).round()
    };
    let mut angles = vec![0.0; count * count];
    let mut direction = (nodes[1] - nodes[0]).atan2();
    for from in 0..count - 1 {
        direction = near((nodes[from + 1] - nodes[from]).atan2(), direction);
        let mut angle = direction;
        for to in from + 1..count {
            let seen = nodes[to] - nodes[from];
            if seen.hypot2() > 0.0 {
                angle = near(seen.atan2(), angle);
            }
            angles[from * count + to] = angle;
            // Back along the same chord, turning by way of the inside, which is to the left.
            angles[to * count + from] = angle + std::f64::consts::PI;
        }
    }
    angles
}

/// z log z, for a given branch of the angle.
fn weighted_log(z: Vec2, angle: f64) -> Vec2 {
    let square = z.hypot2();
    if square == 0.0 {
        return Vec2::ZERO;
    }
    let log = 0.5 * square.ln();
    Vec2::new(z.x * log - z.y * angle, z.x * angle + z.y * log)
}

/// (1/2π) Im of the difference of both terms less the panel, over its direction.
fn stream_of(first: Vec2, second: Vec2, along: Vec2, panel: Vec2) -> f64 {
    along.cross(first - second - panel) / std::f64::consts::TAU
}

/// (1/2π) Re of the same: ∫ log|z − ζ| ds/2π, the stream function of clockwise vorticity.
fn potential_of(first: Vec2, second: Vec2, along: Vec2, panel: Vec2) -> f64 {
    along.dot(first - second - panel) / std::f64::consts::TAU
}

/// Velocities at `z` by a straight panel: of even sources of unit strength, and of vorticity,
/// anticlockwise, that is one at the first or at the second end and falls evenly to nothing at the
/// other.
pub(super) fn velocities(from: Point, to: Point, z: Point) -> [Vec2; 3] {
    let half = 0.5 * (to - from);
    let from_middle = z - from.midpoint(to);
    let reach2 = half.hypot2();
    let p = [half.dot(from_middle) / reach2, half.cross(from_middle) / reach2];
    let (first, second) = ((z - from).hypot2(), (z - to).hypot2());
    // log((p + 1)/(p − 1)), and p times it less two.
    let log = [0.5 * (first / second).ln(), (-2.0 * p[1]).atan2(p[0] * p[0] + p[1] * p[1] - 1.0)];
    let rest = [p[0] * log[0] - p[1] * log[1] - 2.0, p[0] * log[1] + p[1] * log[0]];
    // u − iv over the direction of the panel, turned back into a vector.
    let along = half.normalize();
    let turned = |w: [f64; 2]| {
        let [re, im] = [w[0] * along.x + w[1] * along.y, w[1] * along.x - w[0] * along.y];
        Vec2::new(re, -im) / std::f64::consts::TAU
    };
    let source = turned(log);
    // Vorticity has the field of sources turned by a right angle.
    let share =
        |sign: f64| turned([0.5 * (log[0] + sign * rest[0]), 0.5 * (log[1] + sign * rest[1])]).turn_90();
    [source, share(-1.0), share(1.0)]
}

/// Mean speed along a line over `[from, to]` of it due to even sources of unit strength on
/// `[first, second]` of the same line: the mean has no singular ends.
pub(super) fn mean_speed_in_line(from: f64, to: f64, first: f64, second: f64) -> f64 {
    let term = |x: f64| if x == 0.0 { 0.0 } else { x * x.abs().ln() };
    let potential = |x: f64| term(x - first) - term(x - second);
    (potential(to) - potential(from)) / (std::f64::consts::TAU * (to - from))
}

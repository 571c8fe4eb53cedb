//! The line that the wake is taken to follow.

use crate::flow::Panelling;
use crate::geometry::{Point, Vec2};

/// Chords of wake behind the section.
const LENGTH: f64 = 1.0;
/// Stations of the wake for each panel of the section, and how few there may be.
const SHARE: f64 = 0.12;
const FEWEST: usize = 12;
/// Length in which the direction at the trailing edge gives way to that of the chord.
const TURN: f64 = 0.3;

/// Points of the wake from the trailing edge on, first apart as the last panels of the section
/// are long, and growing evenly from there.
///
/// The wake leaves along the bisector of the trailing edge and turns into the chord line. Where
/// exactly its sources lie hardly matters to the section, and its speeds are those along the
/// flow, whatever the line: so one line serves every incidence, and one factorisation does.
pub(super) fn wake_line(panelling: &Panelling) -> Vec<Point> {
    let nodes = panelling.nodes();
    let last = nodes.len() - 1;
    let sides = (nodes[0] - nodes[1]).normalize() + (nodes[last] - nodes[last - 1]).normalize();
    let leaves = if sides.hypot2() > 1e-12 && sides.x > 0.0 { sides.atan2() } else { 0.0 };
    let first = 0.5 * (nodes[0].distance(nodes[1]) + nodes[last].distance(nodes[last - 1]));
    let count = FEWEST.max((SHARE * panelling.len() as f64) as usize);
    let growth = growth_to_reach(LENGTH / first.max(1e-6), count);

    let mut points = vec![nodes[0].midpoint(nodes[last])];
    let (mut step, mut along) = (first.max(1e-6), 0.0);
    for i in 0..count {
        let direction = leaves * (-(along + 0.5 * step) / TURN).exp();
        points.push(points[i] + step * Vec2::from_angle(direction));
        along += step;
        step *= growth;
    }
    points
}

/// Ratio of a geometric series of `count` terms from one on with this sum.
fn growth_to_reach(sum: f64, count: usize) -> f64 {
    let (mut low, mut high) = (1.0_f64, 10.0_f64);
    for _ in 0..60 {
        let middle = 0.5 * (low + high);
        let reached = (middle.powi(count as i32) - 1.0) / (middle - 1.0);
        if reached < sum { low = middle } else { high = middle }
    }
    0.5 * (low + high)
}

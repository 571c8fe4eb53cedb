//! What happens at the trailing edge: the Kutta condition and what it needs to be enough.

use super::Panelling;
use crate::geometry::{Point, Vec2};

/// Weights of nodes 0, 1, 2 (and the same, negative, of the last three) in the condition that the
/// mean speed of both sides runs straight into a sharp trailing edge.
///
/// There the first and the last node are one point, and one of their equations says nothing new.
/// In exact flow the mean speed near the edge goes as a low power of the distance to it: constant
/// at a cusp, and for a wedge of some degrees nearly so until within a minute distance, where it
/// drops to nothing. The line through the two nodes ahead is the better account of what the
/// panels see; setting the speed itself to nothing would be exact and would spoil them.
pub(super) fn straight_run(panelling: &Panelling) -> [f64; 3] {
    let nodes = panelling.nodes();
    let last = nodes.len() - 1;
    let mean =
        |i: usize| 0.5 * (nodes[i].distance(nodes[i + 1]) + nodes[last - i].distance(nodes[last - i - 1]));
    let ahead = mean(0) / mean(1);
    [1.0, -(1.0 + ahead), ahead]
}

/// The base of a blunt trailing edge, from the lower edge to the upper one.
///
/// Behind it lies a strip of dead water as thick as the base that is carried off at the speed of
/// the edges, along the bisector of both sides. Seen from the body, whose inside is at rest, the
/// flow jumps by that speed across the base: its part across is a source sheet, the one along a
/// vortex sheet, and beyond the strip's own edges there is no jump at all. The base is short and
/// straight, and its sheets are constant.
pub(super) struct Base {
    from: Point,
    base: Vec2,
    downstream: Vec2,
}

impl Base {
    /// `None` for a sharp edge.
    pub(super) fn of(panelling: &Panelling) -> Option<Self> {
        if panelling.is_sharp() {
            return None;
        }
        let nodes = panelling.nodes();
        let last = nodes.len() - 1;
        let sides = (nodes[0] - nodes[1]).normalize() + (nodes[last] - nodes[last - 1]).normalize();
        // Two sides that meet head on have no bisector; then the strip leaves square to the base.
        let square = -panelling.base().turn_90();
        let downstream = if sides.hypot2() > 1e-12 { sides.normalize() } else { square.normalize() };
        Some(Self { from: nodes[last], base: panelling.base(), downstream })
    }

    /// Circulation of the base, anticlockwise, for unit edge speed.
    pub(super) fn circulation(&self) -> f64 {
        self.downstream.dot(self.base)
    }

    /// Strengths of its sheets for unit edge speed: of the vortex sheet, anticlockwise, and of the
    /// source sheet.
    pub(super) fn strengths(&self) -> [f64; 2] {
        let length = self.base.hypot();
        // Outwards is to the right of the way from the lower edge to the upper one.
        [self.base.dot(self.downstream) / length, -self.base.turn_90().dot(self.downstream) / length]
    }

    /// What the base takes from the stream function at `z` for unit edge speed.
    ///
    /// From ∫ log(z - ζ) ds, whose real part belongs to the vortex and whose imaginary part to the
    /// source. Angles are taken from upstream, so that their jump lies in the strip.
    pub(super) fn stream_function(&self, z: Point) -> f64 {
        let length = self.base.hypot();
        let half = 0.5 * self.base;
        let p = {
            let d = z - (self.from + half);
            [half.dot(d) / half.hypot2(), half.cross(d) / half.hypot2()]
        };
        let term = |along: f64, end: Vec2| {
            if end.hypot2() == 0.0 {
                return [0.0; 2];
            }
            let log = end.hypot().ln();
            let angle = (-self.downstream.cross(end)).atan2(-self.downstream.dot(end));
            [along * log - p[1] * angle, along * angle + p[1] * log]
        };
        let first = term(p[0] + 1.0, z - self.from);
        let second = term(p[0] - 1.0, z - (self.from + self.base));
        let scale = length / (4.0 * std::f64::consts::PI);
        let [vortex, source] = [scale * (first[0] - second[0] - 2.0), scale * (first[1] - second[1])];
        let [along, across] = self.strengths();
        vortex * along - source * across
    }
}

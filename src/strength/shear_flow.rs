//! Shear flow in the thin walls of a section, and from it the shear centre.
//!
//! Source: E. F. Bruhn, "Analysis and Design of Flight Vehicle Structures" (1973), chapters A14 and A15,
//! from memory: dq/ds = -E t (a x + b y) from the change of bending along the span; a closed cell adds the
//! flow that leaves it untwisted.

use super::walls::Walls;
use crate::geometry::{Point, Vec2};

/// A wall as a line with stiffnesses.
#[derive(Debug, Clone, Copy)]
struct ThinWall {
    from: Point,
    to: Point,
    length: f64,
    /// E t, N/mm.
    stretch: f64,
    /// G t, N/mm.
    shear: f64,
    /// Place in the ring of the section.
    place: usize,
}

/// The walls in order; of an open section from one lip to the other.
#[derive(Debug, Clone)]
pub(super) struct ThinRing {
    walls: Vec<ThinWall>,
    closed: bool,
    count: usize,
}

impl ThinRing {
    pub(super) fn of(walls: &Walls) -> Self {
        let count = walls.walls.len();
        let gap = walls.walls.iter().position(|wall| wall.skin.is_none());
        let start = gap.unwrap_or(0);
        let thin = |step: usize| {
            let place = (start + step) % count;
            let wall = &walls.walls[place];
            let length = wall.length();
            let skin = walls.skin(wall).filter(|_| length > 0.0)?;
            let [from, to] = wall.middle_line();
            // Where both skins have merged, each has less room than it is thick; the ring keeps the
            // nominal thickness in shear, as the two work as one there and enclose next to nothing.
            let thickness = (wall.area() / length).max(0.0);
            Some(ThinWall {
                from,
                to,
                length,
                stretch: skin.constants().ex * thickness,
                shear: skin.constants().gxy * skin.thickness(),
                place,
            })
        };
        Self { walls: (0..count).filter_map(thin).collect(), closed: gap.is_none(), count }
    }

    pub(super) fn is_closed(&self) -> bool {
        self.closed && !self.walls.is_empty()
    }

    /// ∮ ds / (G t), mm²/N.
    pub(super) fn flexibility(&self) -> f64 {
        self.walls.iter().map(|wall| wall.length / wall.shear).sum()
    }
}

/// Mean shear flow in every wall of the section for one newton across and one along, N/mm, and the
/// shear centre. `None` when the walls alone do not resist bending both ways.
pub(super) fn unit_flows(ring: &ThinRing) -> Option<(Vec<[f64; 2]>, Point)> {
    if ring.walls.is_empty() {
        return None;
    }
    let weigh = |of: &dyn Fn(&ThinWall) -> f64| {
        ring.walls.iter().map(|wall| wall.stretch * wall.length * of(wall)).sum::<f64>()
    };
    let total = weigh(&|_| 1.0);
    let centre = Vec2::new(
        weigh(&|wall| wall.from.midpoint(wall.to).x) / total,
        weigh(&|wall| wall.from.midpoint(wall.to).y) / total,
    );
    // Means over a straight wall of the products of two coordinates from the centre.
    let mean = |wall: &ThinWall, f: fn(Vec2) -> f64, g: fn(Vec2) -> f64| {
        let (a, b) = (wall.from.to_vec2() - centre, wall.to.to_vec2() - centre);
        (2.0 * f(a) * g(a) + f(a) * g(b) + f(b) * g(a) + 2.0 * f(b) * g(b)) / 6.0
    };
    let xx = weigh(&|wall| mean(wall, |v| v.x, |v| v.x));
    let yy = weigh(&|wall| mean(wall, |v| v.y, |v| v.y));
    let xy = weigh(&|wall| mean(wall, |v| v.x, |v| v.y));
    let det = xx * yy - xy * xy;
    if det.is_nan() || det <= 1e-12 * xx * yy {
        return None;
    }
    let mut flows = vec![[0.0; 2]; ring.count];
    let mut moments = [0.0; 2];
    for (direction, force) in [Vec2::new(0.0, 1.0), Vec2::new(1.0, 0.0)].into_iter().enumerate() {
        let by_x = (yy * force.x - xy * force.y) / det;
        let by_y = (xx * force.y - xy * force.x) / det;
        let rate = |point: Point| {
            let out = point.to_vec2() - centre;
            by_x * out.x + by_y * out.y
        };
        let mut running = 0.0;
        let mut means = Vec::with_capacity(ring.walls.len());
        for wall in &ring.walls {
            let (from, to) = (rate(wall.from), rate(wall.to));
            let weight = wall.stretch * wall.length;
            means.push(running - weight * (2.0 * from + to) / 6.0);
            running -= weight * (from + to) / 2.0;
        }
        if ring.is_closed() {
            let twist: f64 = ring.walls.iter().zip(&means).map(|(w, q)| q * w.length / w.shear).sum();
            let round = twist / ring.flexibility();
            means.iter_mut().for_each(|flow| *flow -= round);
        }
        for (wall, flow) in ring.walls.iter().zip(means) {
            flows[wall.place][direction] = flow;
            // About the centre, to lose no digits far from the origin.
            moments[direction] += flow * (wall.from.to_vec2() - centre).cross(wall.to.to_vec2() - centre);
        }
    }
    // A force across at x turns anticlockwise by x, one along at y by -y.
    let shear_centre = Point::new(centre.x + moments[0], centre.y - moments[1]);
    (shear_centre.x.is_finite() && shear_centre.y.is_finite()).then_some((flows, shear_centre))
}

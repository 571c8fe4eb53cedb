//! What a solid measures: level cuts, overhang, walls.

use kurbo::{Point, Vec2};

use super::Solid;

impl Solid {
    /// The cut at height `z`: from where to where in each facet that it meets, the solid on the left.
    /// Facets that lie in the plane itself are left out.
    #[must_use]
    pub fn level_cut(&self, z: f64) -> Vec<[Point; 2]> {
        self.cut([0, 1, 2], z)
    }

    /// The cut square to y at `y`, in x and z.
    #[must_use]
    pub fn upright_cut(&self, y: f64) -> Vec<[Point; 2]> {
        self.cut([2, 0, 1], y).into_iter().map(|ends| ends.map(|p| Point::new(p.y, p.x))).collect()
    }

    /// The cut square to the last of three axes, seen along it with the first across and the second up.
    fn cut(&self, [across, up, axis]: [usize; 3], at: f64) -> Vec<[Point; 2]> {
        let meets = |corners: [[f32; 3]; 3]| {
            let corners = corners.map(|corner| corner.map(f64::from));
            let mut ends = [Point::ZERO; 2];
            let mut found = 0;
            for i in 0..3 {
                let (a, b) = (corners[i], corners[(i + 1) % 3]);
                if (a[axis] < at) == (b[axis] < at) {
                    continue;
                }
                let share = (at - a[axis]) / (b[axis] - a[axis]);
                let place = |k: usize| a[k] + share * (b[k] - a[k]);
                // Seen from above, a facet is entered where it goes down through the plane.
                ends[usize::from(a[axis] < at)] = Point::new(place(across), place(up));
                found += 1;
            }
            (found == 2 && ends[0] != ends[1]).then_some(ends)
        };
        self.triangles().filter_map(meets).collect()
    }

    /// How far the steepest facet that hangs over free air leans out, radians from upright; nought where
    /// none does. What lies on the bed, at the solid's lowest, does not hang.
    #[must_use]
    pub fn overhang(&self) -> f64 {
        let lowest = self.triangles().flatten().map(|p| f64::from(p[2])).fold(f64::INFINITY, f64::min);
        let leans = self.triangles().filter_map(|corners| {
            let [a, b, c] = corners.map(|corner| corner.map(f64::from));
            let edge = |to: [f64; 3]| [to[0] - a[0], to[1] - a[1], to[2] - a[2]];
            let (u, v) = (edge(b), edge(c));
            let normal = [u[1] * v[2] - u[2] * v[1], u[2] * v[0] - u[0] * v[2], u[0] * v[1] - u[1] * v[0]];
            let length = normal.iter().map(|n| n * n).sum::<f64>().sqrt();
            let lies = [a, b, c].iter().all(|corner| corner[2] - lowest < 1e-4);
            (!lies && normal[2] < 0.0).then(|| (-normal[2] / length).asin())
        });
        leans.fold(0.0, f64::max)
    }

    /// The least wall of the cut at height `z`, mm: from the middle of each side square through the solid
    /// to the next side. Sides shorter than `shortest` mm are passed over.
    #[must_use]
    pub fn least_wall(&self, z: f64, shortest: f64) -> f64 {
        let sides = self.level_cut(z);
        let through = |side: &[Point; 2]| {
            let along = side[1] - side[0];
            let (from, inwards) = (side[0].midpoint(side[1]), along.normalize().turn_90());
            let met = sides.iter().filter_map(|other| ray(from, inwards, other));
            met.filter(|distance| *distance > 1e-6).fold(f64::INFINITY, f64::min)
        };
        sides
            .iter()
            .filter(|side| side[0].distance(side[1]) >= shortest)
            .map(through)
            .fold(f64::INFINITY, f64::min)
    }
}

/// How far along a ray a side is met.
fn ray(from: Point, way: Vec2, [a, b]: &[Point; 2]) -> Option<f64> {
    let (side, gap) = (*b - *a, *a - from);
    let det = way.cross(side);
    let (distance, share) = (gap.cross(side) / det, gap.cross(way) / det);
    ((0.0..=1.0).contains(&share) && distance > 0.0).then_some(distance)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn block(points: &[(f64, f64)]) -> Solid {
        let face: Vec<Point> = points.iter().map(|&p| p.into()).collect();
        Solid::extruded(&face, 5.0).expect("a block")
    }

    #[test]
    fn a_block_is_measured() {
        // A frame open on one side: walls of 3, 2 and 4 mm.
        let frame = block(&[
            (0.0, 0.0),
            (20.0, 0.0),
            (20.0, 10.0),
            (16.0, 10.0),
            (16.0, 2.0),
            (3.0, 2.0),
            (3.0, 10.0),
            (0.0, 10.0),
        ]);
        assert!((frame.least_wall(2.5, 0.5) - 2.0).abs() < 1e-6);
        assert_eq!(frame.overhang(), 0.0);
        let cut = frame.level_cut(2.5);
        let area: f64 = cut.iter().map(|[a, b]| 0.5 * a.to_vec2().cross(b.to_vec2())).sum();
        // The solid lies on the left of every side, so that the area comes out positive.
        assert!((area - (20.0 * 10.0 - 13.0 * 8.0)).abs() < 1e-4, "{area}");
    }
}

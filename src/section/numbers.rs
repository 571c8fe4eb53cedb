//! The shape of a section in numbers.

use kurbo::common::GAUSS_LEGENDRE_COEFFS_16;

use super::Section;
use crate::geometry::{Curve, Point};

/// What a section measures, in unit chord.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Numbers {
    /// Greatest thickness, perpendicular to the mean line.
    pub thickness: f64,
    /// Station of the greatest thickness along the chord.
    pub thickness_at: f64,
    /// Ordinate of the mean line where it is furthest from the chord.
    pub camber: f64,
    /// Station of the greatest camber along the chord.
    pub camber_at: f64,
    /// Radius of the nose circle of the thickness form, as published with it.
    pub nose_radius: f64,
    /// Radius of curvature of the outline itself at the nose. Smaller than `nose_radius` where
    /// the mean line slopes there.
    pub nose_radius_on_outline: f64,
    /// Width of the trailing edge.
    pub trailing_edge_thickness: f64,
    /// Angle between the two surfaces at the trailing edge, radians.
    pub trailing_edge_angle: f64,
    /// Area enclosed, in chord².
    pub area: f64,
    /// Centroid of that area.
    pub centroid: Point,
}

/// Intervals in which a stationary point is looked for before it is closed in on.
const SEARCH: usize = 400;

impl Section {
    /// Measures the section. Extremes are closed in on to rounding, not read off sample points.
    #[must_use]
    pub fn numbers(&self) -> Numbers {
        let form = self.thickness_form();
        let root = greatest(|r| form.half_at_root(r)[0], |r| form.half_at_root(r)[1]);
        let line = self.mean_line();
        let camber_at = greatest(|x| line.at(x).y.abs(), |x| line.at(x).slope * line.at(x).y.signum());
        let camber = line.at(camber_at).y;

        let (upper_end, lower_end) = (self.jet(-1.0), self.jet(1.0));
        // Both tangents run aft, so the wedge angle is the turn from the lower to the upper one.
        let (upper_aft, lower_aft) = (-upper_end.first, lower_end.first);
        let wedge = upper_aft.cross(lower_aft).atan2(upper_aft.dot(lower_aft));
        let (area, centroid) = self.area_and_centroid();
        Numbers {
            thickness: 2.0 * form.half_at_root(root)[0],
            thickness_at: root * root,
            camber,
            camber_at: if camber == 0.0 { 0.0 } else { camber_at },
            nose_radius: form.nose_radius(),
            nose_radius_on_outline: 1.0 / self.jet(0.0).curvature().abs(),
            trailing_edge_thickness: upper_end.point.distance(lower_end.point),
            trailing_edge_angle: wedge.abs(),
            area,
            centroid,
        }
    }

    /// Green's theorem along the outline and across the trailing edge, by Gauss quadrature on
    /// each smooth piece. The integrands are analytic there, and the error is at rounding.
    fn area_and_centroid(&self) -> (f64, Point) {
        let (mut area, mut moment_x, mut moment_y) = (0.0, 0.0, 0.0);
        let mut add = |p: Point, d: kurbo::Vec2, weight: f64| {
            area += weight * 0.5 * (p.x * d.y - p.y * d.x);
            moment_x += weight * 0.5 * p.x * p.x * d.y;
            moment_y -= weight * 0.5 * p.y * p.y * d.x;
        };
        for piece in self.breaks().windows(2) {
            const PARTS: usize = 4;
            let step = (piece[1] - piece[0]) / PARTS as f64;
            for part in 0..PARTS {
                let middle = piece[0] + step * (part as f64 + 0.5);
                for &(weight, offset) in GAUSS_LEGENDRE_COEFFS_16 {
                    let jet = self.jet(middle + 0.5 * step * offset);
                    add(jet.point, jet.first, weight * 0.5 * step);
                }
            }
        }
        let (from, to) = (self.jet(1.0).point, self.jet(-1.0).point);
        for &(weight, offset) in GAUSS_LEGENDRE_COEFFS_16 {
            add(from.lerp(to, 0.5 * (1.0 + offset)), to - from, weight * 0.5);
        }
        (area, Point::new(moment_x / area, moment_y / area))
    }
}

/// Where in [0, 1] a smooth `value` with derivative `slope` is greatest.
fn greatest(value: impl Fn(f64) -> f64, slope: impl Fn(f64) -> f64) -> f64 {
    let at = |i: usize| i as f64 / SEARCH as f64;
    let best = (0..=SEARCH).max_by(|&a, &b| value(at(a)).total_cmp(&value(at(b)))).unwrap_or(0);
    let (mut low, mut high) = (at(best.saturating_sub(1)), at((best + 1).min(SEARCH)));
    // A mean line's slope may jump at its joint; bisection on its sign needs no more than that.
    for _ in 0..60 {
        let middle = 0.5 * (low + high);
        if slope(middle) > 0.0 { low = middle } else { high = middle }
    }
    0.5 * (low + high)
}

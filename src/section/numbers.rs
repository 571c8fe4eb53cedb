//! The shape of a section in numbers.

use kurbo::common::GAUSS_LEGENDRE_COEFFS_16;

use super::Section;
use super::form::Form;
use crate::geometry::{Curve, Point, Vec2};

/// What a section measures, in unit chord. Thickness, camber and nose are those with any flap
/// straight, the rest is of the outline as it is.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Numbers {
    /// Greatest distance between two points at the same root of the station: for the published
    /// families across the mean line, for surfaces given as heights across the chord.
    pub thickness: f64,
    /// Station of the greatest thickness along the chord.
    pub thickness_at: f64,
    /// Ordinate of the line midway between the surfaces where it is furthest from the chord.
    pub camber: f64,
    /// Station of the greatest camber along the chord.
    pub camber_at: f64,
    /// Radius of the nose circle of the thickness alone, as published with it.
    pub nose_radius: f64,
    /// Radius of curvature of the outline itself at the nose, the smaller one where the surfaces
    /// differ. Smaller than `nose_radius` where the mean line slopes there.
    pub nose_radius_on_outline: f64,
    /// Width of the trailing edge.
    pub trailing_edge_thickness: f64,
    /// Angle between the two surfaces at the trailing edge, radians.
    pub trailing_edge_angle: f64,
    /// Area enclosed, in chord².
    pub area: f64,
    /// Centroid of that area.
    pub centroid: Point,
    /// Second moments of that area about its centroid, in chord⁴.
    pub second_moments: SecondMoments,
    /// Length of the outline with the trailing edge, in chords.
    pub perimeter: f64,
    /// Where the outline bulges most sharply, trailing edge aside: what a cutter meets that goes
    /// round the inside of a template.
    pub sharpest: Turn,
    /// Where it is most sharply hollow: what a cutter meets that goes round the section. `None`
    /// without a hollow.
    pub hollowest: Option<Turn>,
}

/// Second moments of area about axes through the centroid, along and square to the chord.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct SecondMoments {
    /// ∫ y² dA: resists bending of the foil up and down.
    pub about_x: f64,
    /// ∫ x² dA: resists bending in the plane of the foil.
    pub about_y: f64,
    /// ∫ x y dA.
    pub product: f64,
}

/// A place where an outline turns sharply.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Turn {
    /// Radius of curvature, in chords; nought at a corner.
    pub radius: f64,
    /// Where that is.
    pub at: Point,
}

/// Intervals in which a stationary point is looked for before it is closed in on.
const SEARCH: usize = 400;
/// A turn of the outline that counts as a corner, radians. The published four-digit surfaces turn
/// by up to 0.04 degrees where their mean line is joined; no cutter meets that.
const CORNER: f64 = 0.01;
/// A radius above this is no hollow, in chords: cusps of published sections are straight but for
/// rounding.
const STRAIGHT: f64 = 1e4;

impl Section {
    /// Measures the section. Extremes are closed in on to rounding, not read off sample points.
    #[must_use]
    pub fn numbers(&self) -> Numbers {
        let whole = self.form.unflapped();
        let (thickness_at, thickness) = whole.greatest_thickness();
        let (camber_at, camber) = whole.greatest_camber();
        let (upper_end, lower_end) = (self.jet(-1.0), self.jet(1.0));
        // Both tangents run aft, so the wedge angle is the turn from the lower to the upper one.
        let (upper_aft, lower_aft) = (-upper_end.first, lower_end.first);
        let wedge = upper_aft.cross(lower_aft).atan2(upper_aft.dot(lower_aft));
        let Integrals { area, centroid, second_moments, perimeter } = integrals(&self.form);
        let (sharpest, hollowest) = sharpest_turns(&self.form);
        Numbers {
            thickness,
            thickness_at,
            camber,
            camber_at,
            nose_radius: whole.nose_radius(),
            nose_radius_on_outline: whole.nose_radius_on_outline(),
            trailing_edge_thickness: upper_end.point.distance(lower_end.point),
            trailing_edge_angle: wedge.abs(),
            area,
            centroid,
            second_moments,
            perimeter,
            sharpest,
            hollowest,
        }
    }
}

impl Form {
    /// Station and amount of the greatest thickness.
    pub(super) fn greatest_thickness(&self) -> (f64, f64) {
        let across = |root: f64| self.jet(-root).point - self.jet(root).point;
        let slope = |root: f64| {
            let rate = -self.jet(-root).first - self.jet(root).first;
            across(root).dot(rate)
        };
        let root = greatest(|root| across(root).hypot2(), slope);
        (self.jet(-root).point.midpoint(self.jet(root).point).x, across(root).hypot())
    }

    /// Station and ordinate of the greatest camber, up or down.
    pub(super) fn greatest_camber(&self) -> (f64, f64) {
        let middle = |root: f64| self.jet(-root).point.midpoint(self.jet(root).point);
        let slope = |root: f64| {
            let rate = 0.5 * (self.jet(root).first - self.jet(-root).first);
            rate.y * middle(root).y.signum()
        };
        let root = greatest(|root| middle(root).y.abs(), slope);
        let Point { x, y } = middle(root);
        if y.abs() < 1e-15 { (0.0, 0.0) } else { (x, y) }
    }

    /// With x = root², half the rate at which the surfaces part is the coefficient of √x in the
    /// half thickness, and y² → 2 r x.
    fn nose_radius(&self) -> f64 {
        let [upper, lower] = self.at_nose();
        let rate = -0.5 * (upper.first + lower.first);
        0.5 * rate.hypot2()
    }

    fn nose_radius_on_outline(&self) -> f64 {
        self.at_nose().map(|jet| 1.0 / jet.curvature().abs()).into_iter().fold(f64::INFINITY, f64::min)
    }

    /// The nose as the upper and the lower surface see it.
    fn at_nose(&self) -> [crate::geometry::Jet; 2] {
        [self.jet_within(0.0, -1e-6, 0.0), self.jet(0.0)]
    }
}

struct Integrals {
    area: f64,
    centroid: Point,
    second_moments: SecondMoments,
    perimeter: f64,
}

/// Green's theorem along the outline and across the trailing edge, by Gauss quadrature on each
/// smooth piece. The integrands are analytic there, and the error is at rounding.
fn integrals(form: &Form) -> Integrals {
    let (mut area, mut perimeter) = (0.0, 0.0);
    let (mut first, mut second) = (Vec2::ZERO, [0.0; 3]);
    let mut add = |p: Point, d: Vec2, weight: f64| {
        let d = weight * d;
        area += 0.5 * (p.x * d.y - p.y * d.x);
        perimeter += d.hypot();
        first += 0.5 * Vec2::new(p.x * p.x * d.y, -p.y * p.y * d.x);
        second[0] -= p.y.powi(3) * d.x / 3.0;
        second[1] += p.x.powi(3) * d.y / 3.0;
        second[2] += 0.25 * p.x * p.y * (p.x * d.y - p.y * d.x);
    };
    for piece in form.knots().windows(2) {
        const PARTS: usize = 4;
        let step = (piece[1] - piece[0]) / PARTS as f64;
        for part in 0..PARTS {
            let middle = piece[0] + step * (part as f64 + 0.5);
            for &(weight, offset) in GAUSS_LEGENDRE_COEFFS_16 {
                let jet = form.jet(middle + 0.5 * step * offset);
                add(jet.point, jet.first, weight * 0.5 * step);
            }
        }
    }
    let (from, to) = (form.jet(1.0).point, form.jet(-1.0).point);
    for &(weight, offset) in GAUSS_LEGENDRE_COEFFS_16 {
        add(from.lerp(to, 0.5 * (1.0 + offset)), to - from, weight * 0.5);
    }
    let centroid = (first / area).to_point();
    let second_moments = SecondMoments {
        about_x: second[0] - area * centroid.y * centroid.y,
        about_y: second[1] - area * centroid.x * centroid.x,
        product: second[2] - area * centroid.x * centroid.y,
    };
    Integrals { area, centroid, second_moments, perimeter }
}

/// The sharpest bulge and the sharpest hollow of an outline between its ends.
fn sharpest_turns(form: &Form) -> (Turn, Option<Turn>) {
    // Greatest and least curvature, and where.
    let mut extremes = [(f64::NEG_INFINITY, Point::ORIGIN), (f64::INFINITY, Point::ORIGIN)];
    let mut note = |curvature: f64, at: Point| {
        if curvature > extremes[0].0 {
            extremes[0] = (curvature, at);
        }
        if curvature < extremes[1].0 {
            extremes[1] = (curvature, at);
        }
    };
    let breaks = form.breaks();
    for piece in breaks.windows(2) {
        let [from, to] = [piece[0], piece[1]];
        let share = |i: usize| from + (to - from) * i as f64 / SEARCH as f64;
        let curvature = |t: f64| form.jet_within(t, from, to).curvature();
        for sign in [1.0, -1.0] {
            let best = (0..=SEARCH)
                .max_by(|&a, &b| (sign * curvature(share(a))).total_cmp(&(sign * curvature(share(b)))));
            let best = best.unwrap_or(0);
            let (low, high) = (share(best.saturating_sub(1)), share((best + 1).min(SEARCH)));
            let t = golden_greatest(|t| sign * curvature(t), low, high);
            for t in [t, share(best)] {
                note(curvature(t), form.jet_within(t, from, to).point);
            }
        }
    }
    for three in breaks.windows(3) {
        let (before, after) =
            (form.jet_within(three[1], three[0], three[1]), form.jet_within(three[1], three[1], three[2]));
        let turn = before.first.cross(after.first).atan2(before.first.dot(after.first));
        if turn.abs() > CORNER {
            note(f64::INFINITY.copysign(turn), after.point);
        }
    }
    let turn = |(curvature, at): (f64, Point)| Turn { radius: 1.0 / curvature.abs(), at };
    let hollow = extremes[1].0 < -1.0 / STRAIGHT;
    (turn(extremes[0]), hollow.then(|| turn(extremes[1])))
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

/// Where in `[low, high]` a `value` that rises and then falls is greatest, by golden sections.
fn golden_greatest(value: impl Fn(f64) -> f64, mut low: f64, mut high: f64) -> f64 {
    let share = 0.5 * (5.0_f64.sqrt() - 1.0);
    for _ in 0..50 {
        let (left, right) = (high - share * (high - low), low + share * (high - low));
        if value(left) < value(right) { low = left } else { high = right }
    }
    0.5 * (low + high)
}

//! Curves of a drawing as points that lie on them.

use crate::geometry::{Point, Vec2};

/// A curve of a drawing.
pub(super) enum DrawnCurve {
    /// Corners, each with the bulge of what leads to the next, the tangent of a quarter of the
    /// angle of its arc. A ring if it is closed.
    Polyline { corners: Vec<(Point, f64)>, closed: bool },
    /// Centre, radius, and the angles in radians between which it runs anticlockwise.
    Arc { centre: Point, radius: f64, from: f64, to: f64 },
    /// Degree, knots, and poles with their weights.
    Spline { degree: usize, knots: Vec<f64>, poles: Vec<(Point, f64)> },
}

/// How densely curves are followed.
#[derive(Clone, Copy)]
pub(super) struct Density {
    /// Greatest distance of a curve from the straight line between two points on it.
    pub(super) sag: f64,
    /// Greatest distance between two points on a curve.
    pub(super) step: f64,
    /// A straight line that is longer than this is followed in such steps as well.
    pub(super) straight: f64,
}

/// The most points that one curve gives.
const MOST_OF_CURVE: usize = 20_000;
/// The highest degree of a spline.
const HIGHEST_DEGREE: usize = 25;

impl DrawnCurve {
    /// Points that tell how large it is.
    pub(super) fn corners(&self) -> Vec<Point> {
        match self {
            Self::Polyline { corners, .. } => corners.iter().map(|(point, _)| *point).collect(),
            Self::Arc { centre, radius, .. } => {
                let out = Vec2::new(*radius, *radius);
                vec![*centre - out, *centre + out]
            }
            Self::Spline { poles, .. } => poles.iter().map(|(point, _)| *point).collect(),
        }
    }

    /// Points along it, with both ends; of a ring the first is the last.
    ///
    /// Where it cannot be followed, why.
    pub(super) fn points(&self, density: Density) -> Result<Vec<Point>, String> {
        let mut points = Vec::new();
        match self {
            Self::Polyline { corners, closed } => {
                let first = corners.first().map(|(point, _)| *point);
                points.extend(first);
                for pair in corners.windows(2) {
                    follow_bulge(pair[0].0, pair[1].0, pair[0].1, density, &mut points);
                }
                if let (true, Some(first), Some((last, bulge))) = (*closed, first, corners.last()) {
                    follow_bulge(*last, first, *bulge, density, &mut points);
                }
            }
            Self::Arc { centre, radius, from, to } => {
                let wanted = *radius > 0.0 && from.is_finite() && to.is_finite();
                if !wanted {
                    return Err("its radius must be more than nought".to_owned());
                }
                let turn = std::f64::consts::TAU;
                let sweep = (to - from).rem_euclid(turn);
                let sweep = if sweep == 0.0 { turn } else { sweep };
                points.push(*centre + *radius * Vec2::from_angle(*from));
                follow_arc(*centre, *radius, *from, sweep, density, &mut points);
            }
            Self::Spline { degree, knots, poles } => {
                refuse_bad_spline(*degree, knots, poles)?;
                follow_spline(*degree, knots, poles, density, &mut points);
            }
        }
        if points.len() > MOST_OF_CURVE { Err("it is too intricate".to_owned()) } else { Ok(points) }
    }
}

/// Adds the points behind `from`, the last of them `to`.
fn follow_bulge(from: Point, to: Point, bulge: f64, density: Density, points: &mut Vec<Point>) {
    let chord = to - from;
    let length = chord.hypot();
    // Below this an arc is straight within what a drawing resolves.
    if bulge.abs() < 1e-9 || length == 0.0 {
        let steps = if length > density.straight { (length / density.step).ceil() } else { 1.0 };
        let steps = steps.min(1000.0) as u32;
        points.extend((1..steps).map(|i| from + chord * (f64::from(i) / f64::from(steps))));
        points.push(to);
        return;
    }
    let sweep = 4.0 * bulge.atan();
    let left = Vec2::new(-chord.y, chord.x);
    let centre = from + 0.5 * chord + left * (0.5 / (0.5 * sweep).tan());
    let start = from - centre;
    follow_arc(centre, start.hypot(), start.atan2(), sweep, density, points);
    // The end exactly as it is drawn.
    points.pop();
    points.push(to);
}

fn follow_arc(centre: Point, radius: f64, from: f64, sweep: f64, density: Density, points: &mut Vec<Point>) {
    let of_sag = sweep.abs() / (2.0 * (1.0 - (density.sag / radius).min(1.0)).acos()).max(1e-6);
    let of_step = sweep.abs() * radius / density.step;
    let steps = of_sag.max(of_step).ceil().clamp(1.0, 4096.0) as u32;
    for i in 1..=steps {
        let angle = from + sweep * f64::from(i) / f64::from(steps);
        points.push(centre + radius * Vec2::from_angle(angle));
    }
}

fn refuse_bad_spline(degree: usize, knots: &[f64], poles: &[(Point, f64)]) -> Result<(), String> {
    if !(1..=HIGHEST_DEGREE).contains(&degree) {
        return Err(format!("its degree is {degree}, and must be from 1 to {HIGHEST_DEGREE}"));
    }
    if poles.len() <= degree {
        return Err(format!(
            "it has {} control points, too few for its degree {degree}: draw it with control points, or as a polyline",
            poles.len()
        ));
    }
    if knots.len() != poles.len() + degree + 1 {
        let (found, wanted) = (knots.len(), poles.len() + degree + 1);
        return Err(format!("it has {found} knots where its control points ask for {wanted}"));
    }
    let ascend = knots.windows(2).all(|pair| pair[0] <= pair[1]);
    let some = knots[degree] < knots[poles.len()];
    if !ascend || !some {
        return Err("its knots do not ascend".to_owned());
    }
    if !poles.iter().all(|(_, weight)| *weight > 0.0) {
        return Err("its weights must be more than nought".to_owned());
    }
    Ok(())
}

fn follow_spline(
    degree: usize,
    knots: &[f64],
    poles: &[(Point, f64)],
    density: Density,
    points: &mut Vec<Point>,
) {
    let at = |span: usize, u: f64| spline_point(degree, knots, poles, span, u);
    for span in degree..poles.len() {
        let (from, to) = (knots[span], knots[span + 1]);
        if from >= to {
            continue;
        }
        if points.is_empty() {
            points.push(at(span, from));
        }
        let first = at(span, from);
        follow_between(&|u| at(span, u), (from, first), (to, at(span, to)), density, 0, points);
        if points.len() > MOST_OF_CURVE {
            return;
        }
    }
}

/// Adds points behind the first end as far as the second, halving where the curve asks for it.
fn follow_between(
    at: &dyn Fn(f64) -> Point,
    from: (f64, Point),
    to: (f64, Point),
    density: Density,
    depth: u32,
    points: &mut Vec<Point>,
) {
    const LEAST_DEPTH: u32 = 2;
    const DEEPEST: u32 = 12;
    let middle = 0.5 * (from.0 + to.0);
    let halfway = at(middle);
    let chord = to.1 - from.1;
    let off = |point: Point| {
        let away = point - from.1;
        if chord.hypot() > 0.0 { (chord.cross(away) / chord.hypot()).abs() } else { away.hypot() }
    };
    let fine = off(halfway) <= density.sag && chord.hypot() <= density.step && depth >= LEAST_DEPTH;
    if fine || depth >= DEEPEST || points.len() > MOST_OF_CURVE {
        points.push(to.1);
        return;
    }
    follow_between(at, from, (middle, halfway), density, depth + 1, points);
    follow_between(at, (middle, halfway), to, density, depth + 1, points);
}

/// A point of a rational spline, by de Boor's algorithm on weighted poles.
fn spline_point(degree: usize, knots: &[f64], poles: &[(Point, f64)], span: usize, u: f64) -> Point {
    let mut local = [[0.0; 3]; HIGHEST_DEGREE + 1];
    for (j, place) in local.iter_mut().enumerate().take(degree + 1) {
        let (point, weight) = poles[span - degree + j];
        *place = [point.x * weight, point.y * weight, weight];
    }
    for round in 1..=degree {
        for j in (round..=degree).rev() {
            let (low, high) = (knots[span - degree + j], knots[span + 1 + j - round]);
            let share = (u - low) / (high - low);
            let before = local[j - 1];
            for (value, before) in local[j].iter_mut().zip(before) {
                *value = (1.0 - share) * before + share * *value;
            }
        }
    }
    let [x, y, weight] = local[degree];
    Point::new(x / weight, y / weight)
}

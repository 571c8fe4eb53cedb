//! Following a curve with tangent-continuous arcs.
//!
//! Source: a biarc is two arcs that meet with a common tangent and take the given positions and
//! tangents at their ends; Bolton, "Biarc curves", Computer-Aided Design 7 (1975), with the two
//! tangent lengths taken equal.

use kurbo::{Point, Vec2};

use super::arc_path::Segment;
use super::{ArcPath, ArcVertex, Curve, GeometryError};

/// Places at which a biarc is held against the curve.
const PROBES: usize = 24;
/// Share of the tolerance that is used: what may hide between two probes.
const HEADROOM: f64 = 0.98;
/// Shortest step in a piece's parameter, a fraction of the piece.
const LEAST_STEP: f64 = 1e-5;
/// Ends closer than this are one point, mm: the edge is sharp.
const SAME_POINT: f64 = 1e-6;

/// Follows the closed `curve` (in mm) by arcs and lines, few and long, and closes it with a line
/// where its ends do not meet.
///
/// `tolerance`: greatest distance between path and curve in mm, probed at places along each arc.
/// The count of arcs grows with its inverse cube root. Tangents agree where arcs meet, but at the
/// corners of the curve itself. A mean line whose curvature jumps gives its surfaces such a corner,
/// of a few hundredths of a degree.
///
/// # Errors
/// When the tolerance is not positive, or the curve is too rough to be followed.
pub fn follow_with_arcs<C: Curve + ?Sized>(curve: &C, tolerance: f64) -> Result<ArcPath, GeometryError> {
    if !(tolerance > 0.0 && tolerance.is_finite()) {
        return Err(GeometryError::Tolerance { tolerance });
    }
    let mut vertices = Vec::new();
    for ends in curve.breaks().windows(2) {
        let piece = Piece { curve, from: ends[0], to: ends[1], tolerance };
        piece.follow(&mut vertices)?;
    }
    let breaks = curve.breaks();
    if let (Some(&first), Some(&last)) = (breaks.first(), breaks.last()) {
        let (start, end) = (curve.jet(first).point, curve.jet(last).point);
        if start.distance(end) > SAME_POINT {
            vertices.push(ArcVertex { point: end, bulge: 0.0 });
        }
    }
    Ok(ArcPath::new(vertices, true))
}

struct Piece<'a, C: Curve + ?Sized> {
    curve: &'a C,
    from: f64,
    to: f64,
    tolerance: f64,
}

impl<C: Curve + ?Sized> Piece<'_, C> {
    fn follow(&self, vertices: &mut Vec<ArcVertex>) -> Result<(), GeometryError> {
        let mut knots = vec![self.from];
        let mut start = self.from;
        while start < self.to {
            start = self.furthest(start)?;
            knots.push(start);
        }
        self.even_out_the_last(&mut knots);
        for pair in knots.windows(2) {
            let arcs = self.biarc(pair[0], pair[1]).ok_or_else(|| self.cannot_follow(pair[0]))?;
            vertices.extend(arcs.iter().map(|arc| ArcVertex { point: arc.from, bulge: arc.bulge }));
        }
        Ok(())
    }

    /// The furthest parameter that one biarc from `start` reaches within the tolerance.
    fn furthest(&self, start: f64) -> Result<f64, GeometryError> {
        if self.fits(start, self.to) {
            return Ok(self.to);
        }
        let least = (self.to - self.from) * LEAST_STEP;
        let (mut good, mut bad) = (start, self.to);
        while bad - good > least {
            let middle = 0.5 * (good + bad);
            if self.fits(start, middle) { good = middle } else { bad = middle }
        }
        if good > start { Ok(good) } else { Err(self.cannot_follow(start)) }
    }

    /// The greedy walk leaves a short last biarc; sharing its length with the one before keeps
    /// every segment long enough for a router's controller.
    fn even_out_the_last(&self, knots: &mut [f64]) {
        if let [.., before, middle, end] = knots {
            let even = 0.5 * (*before + *end);
            if self.fits(*before, even) && self.fits(even, *end) {
                *middle = even;
            }
        }
    }

    fn fits(&self, start: f64, end: f64) -> bool {
        let Some(arcs) = self.biarc(start, end) else { return false };
        (1..PROBES).all(|i| {
            let t = start + (end - start) * i as f64 / PROBES as f64;
            let point = self.curve.jet(t).point;
            arcs.iter().map(|arc| arc.distance(point)).fold(f64::INFINITY, f64::min)
                <= HEADROOM * self.tolerance
        })
    }

    fn biarc(&self, start: f64, end: f64) -> Option<[Segment; 2]> {
        let (first, last) = (
            self.curve.jet_within(start, self.from, self.to),
            self.curve.jet_within(end, self.from, self.to),
        );
        // Points are taken at the knots themselves so that neighbouring pieces share them.
        biarc(self.curve.jet(start).point, first.tangent()?, self.curve.jet(end).point, last.tangent()?)
    }

    fn cannot_follow(&self, t: f64) -> GeometryError {
        let Point { x, y } = self.curve.jet(t).point;
        GeometryError::CannotFollow { tolerance: self.tolerance, x, y }
    }
}

fn biarc(start: Point, start_tangent: Vec2, end: Point, end_tangent: Vec2) -> Option<[Segment; 2]> {
    let chord = end - start;
    let sum = start_tangent + end_tangent;
    // Equal tangent lengths d solve a d² + 2 b d - c = 0, the joint lying midway between them.
    let a = 2.0 * (1.0 - start_tangent.dot(end_tangent));
    let (b, c) = (chord.dot(sum), chord.hypot2());
    let d = c / (b + (b * b + a * c).sqrt());
    if !(d.is_finite() && d > 0.0) {
        return None;
    }
    let joint = start.midpoint(end) + 0.5 * d * (start_tangent - end_tangent);
    let (first_chord, second_chord) = (joint - start, end - joint);
    let half_turn = |from: Vec2, to: Vec2| from.cross(to).atan2(from.dot(to));
    Some([
        Segment { from: start, to: joint, bulge: (0.5 * half_turn(start_tangent, first_chord)).tan() },
        Segment { from: joint, to: end, bulge: (0.5 * half_turn(second_chord, end_tangent)).tan() },
    ])
}

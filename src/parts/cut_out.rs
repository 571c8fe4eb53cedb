//! Slots and bores along the span: for a control rod, a tube, a spar, the bolts of a joint.

use super::Core;
use crate::geometry::{ArcPath, ArcVertex, Curve, Point, Vec2, parameter_at};
use crate::section::Side;

/// What is taken out of the wood along a stretch of the span.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum CutOut {
    /// A slot with square corners, sunk from one face of the wood square to it.
    Slot {
        /// The face it is sunk from.
        from: Side,
        /// Its middle on the chord, a fraction of the finished one from the nose.
        at: f64,
        /// Width along the chord, mm.
        width: f64,
        /// Depth below the wood's face, mm.
        depth: f64,
    },
    /// A round bore.
    Bore {
        /// Its centre on the chord, a fraction of the finished one from the nose.
        at: f64,
        /// Its centre between the lower (0) and the upper (1) face of the wood.
        height: f64,
        /// Diameter, mm.
        diameter: f64,
    },
}

/// A cut-out at one station, in the frame of the finished shape, mm.
#[derive(Debug, Clone, PartialEq)]
pub struct CutShape {
    /// Its outline, closed.
    pub outline: ArcPath,
    /// Least wood left between it and any face of the core but the one that a slot opens, mm; negative
    /// where it goes through.
    pub wood_left: f64,
}

impl CutShape {
    /// Its edges ahead and behind as they are seen from above the chord: of a slot in the face of the
    /// wood, of a bore at its widest.
    #[must_use]
    pub fn mouth(&self) -> [Point; 2] {
        let vertices = self.outline.vertices();
        if let [a, b, c, d] = vertices {
            // From the proud end of a side to its bottom, back to the face.
            let deep = a.point.distance(d.point);
            let face = |proud: Point, bottom: Point| proud.lerp(bottom, (PROUD / deep).min(1.0));
            let [one, other] = [face(a.point, d.point), face(b.point, c.point)];
            return if one.x < other.x { [one, other] } else { [other, one] };
        }
        let bounds = self.outline.bounds();
        [Point::new(bounds.x0, bounds.center().y), Point::new(bounds.x1, bounds.center().y)]
    }
}

/// How far a slot stands proud of the face, so that the cutter runs free, mm.
const PROUD: f64 = 1.0;
/// Points along each face from which the wood left is taken.
const LOOKS: usize = 800;

impl CutOut {
    /// The cut-out in a core.
    #[must_use]
    pub fn of(&self, core: &Core<'_>) -> CutShape {
        match *self {
            Self::Slot { from, at, width, depth } => slot(core, from, at, width, depth),
            Self::Bore { at, height, diameter } => bore(core, at, height, diameter),
        }
    }
}

fn slot(core: &Core<'_>, from: Side, at: f64, width: f64, depth: f64) -> CutShape {
    let x = at * core.shape().chord;
    let jet = core.jet(root_at(core, from, x));
    // The outline runs anticlockwise, so that its left is inside.
    let along = jet.tangent().unwrap_or(Vec2::new(1.0, 0.0));
    let inwards = along.turn_90();
    let corner = |side: f64, deep: f64| jet.point + 0.5 * side * width * along + deep * inwards;
    let corners = [corner(-1.0, -PROUD), corner(1.0, -PROUD), corner(1.0, depth), corner(-1.0, depth)];
    let other = if from == Side::Upper { Side::Lower } else { Side::Upper };
    let bottom = |share: f64| corners[3].lerp(corners[2], share);
    let face = face(core, other);
    let deepest = (0..=8).map(|i| bottom(f64::from(i) / 8.0));
    let wood_left = deepest
        .map(|point| {
            let nearest = nearest(&face, point);
            // Beyond the other face there is no wood.
            let inside = (nearest - point).dot(inwards) > 0.0;
            if inside { nearest.distance(point) } else { -nearest.distance(point) }
        })
        .fold(f64::INFINITY, f64::min);
    CutShape { outline: ArcPath::polyline(corners, true), wood_left }
}

fn bore(core: &Core<'_>, at: f64, height: f64, diameter: f64) -> CutShape {
    let x = at * core.shape().chord;
    let [upper, lower] = [Side::Upper, Side::Lower].map(|side| core.jet(root_at(core, side, x)).point);
    let (centre, radius) = (lower.lerp(upper, height), 0.5 * diameter);
    let ends = [centre + Vec2::new(radius, 0.0), centre - Vec2::new(radius, 0.0)];
    let outline = ArcPath::new(ends.map(|point| ArcVertex { point, bulge: 1.0 }).to_vec(), true);
    let near = |side: Side| nearest(&face(core, side), centre).distance(centre);
    CutShape { outline, wood_left: near(Side::Upper).min(near(Side::Lower)) - radius }
}

/// Parameter of the core's face at `x` mm from the finished nose.
fn root_at(core: &Core<'_>, side: Side, x: f64) -> f64 {
    parameter_at(core, 0.0, end_of(side), x)
}

/// Parameter at which a face ends behind.
fn end_of(side: Side) -> f64 {
    if side == Side::Upper { -1.0 } else { 1.0 }
}

fn face(core: &Core<'_>, side: Side) -> Vec<Point> {
    (0..=LOOKS).map(|i| core.jet(end_of(side) * i as f64 / LOOKS as f64).point).collect()
}

/// The nearest place on a line of short chords.
fn nearest(line: &[Point], point: Point) -> Point {
    let on = |pair: &[Point]| {
        let chord = pair[1] - pair[0];
        let share = ((point - pair[0]).dot(chord) / chord.hypot2().max(f64::MIN_POSITIVE)).clamp(0.0, 1.0);
        pair[0] + share * chord
    };
    let places = line.windows(2).map(on);
    places.min_by(|a, b| a.distance(point).total_cmp(&b.distance(point))).unwrap_or(point)
}

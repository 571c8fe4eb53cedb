//! What is taken out of the wood: slots, bores, pockets, holes.

use super::Core;
use crate::geometry::{ArcPath, ArcVertex, Curve, Point, Vec2, parameter_at, polygon};
use crate::section::Side;

/// What is taken out of the wood, as it is at one station.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum CutOut {
    /// A slot with square corners and a flat floor, sunk from one face of the wood square to it.
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
    /// A round bore along the span.
    Bore {
        /// Its centre on the chord, a fraction of the finished one from the nose.
        at: f64,
        /// Its centre between the lower (0) and the upper (1) face of the wood.
        height: f64,
        /// Diameter, mm.
        diameter: f64,
    },
    /// A pocket, or a slot along the chord, whose floor follows the face that it is sunk from.
    Pocket {
        /// The face it is sunk from.
        from: Side,
        /// From where to where on the chord, fractions of the finished one from the nose.
        chord: [f64; 2],
        /// Depth square to the wood's face, mm.
        depth: f64,
    },
    /// A hole through both faces, square to the chord.
    Hole {
        /// Its middle on the chord, a fraction of the finished one from the nose.
        at: f64,
        /// Its width here, mm: the diameter, or less beside its middle.
        width: f64,
    },
}

/// A cut-out at one station, in the frame of the finished shape, mm.
#[derive(Debug, Clone, PartialEq)]
pub struct CutShape {
    /// Its outline, closed.
    pub outline: ArcPath,
    /// Least wood left between it and any face of the core but those that it opens, mm; negative
    /// where it goes through.
    pub wood_left: f64,
    /// The corners of what it takes from the wood, without what its outline stands proud of a face.
    pub taken: Vec<Point>,
    /// Convex polygons that make it up, anticlockwise.
    cells: Vec<Vec<Point>>,
}

/// Points along each face from which the wood left is taken.
const LOOKS: usize = 800;
/// Points along the floor of a slot and of a pocket.
const ALONG_SLOT: usize = 8;
const ALONG_POCKET: usize = 48;
/// How far an outline stands proud of the face, mm, so that the cutter runs free.
const PROUD: f64 = 1.0;
/// Chords of a bore's outline lie this near to it, mm.
const CHORDS: f64 = 1e-3;

impl CutOut {
    /// The cut-out in a core.
    #[must_use]
    pub fn of(&self, core: &Core<'_>) -> CutShape {
        match *self {
            Self::Slot { from, at, width, depth } => slot(core, from, at, width, depth),
            Self::Bore { at, height, diameter } => bore(core, at, height, diameter),
            Self::Pocket { from, chord, depth } => pocket(core, from, chord, depth),
            Self::Hole { at, width } => hole(core, at, width),
        }
    }

    /// The largest depth, or diameter of a bore, up to its own that leaves `least` mm of the core beside
    /// it; `None` where none does, and for a hole.
    #[must_use]
    pub fn largest(&self, core: &Core<'_>, least: f64) -> Option<f64> {
        let sized = |size: f64| match *self {
            Self::Slot { from, at, width, .. } => Some(Self::Slot { from, at, width, depth: size }),
            Self::Bore { at, height, .. } => Some(Self::Bore { at, height, diameter: size }),
            Self::Pocket { from, chord, .. } => Some(Self::Pocket { from, chord, depth: size }),
            Self::Hole { .. } => None,
        };
        let own = match *self {
            Self::Slot { depth, .. } | Self::Pocket { depth, .. } => depth,
            Self::Bore { diameter, .. } => diameter,
            Self::Hole { .. } => return None,
        };
        let leaves = |size: f64| sized(size).is_some_and(|cut| cut.of(core).wood_left >= least);
        let (mut good, mut bad) = (0.0, own);
        if leaves(own) {
            return Some(own);
        }
        if !leaves(good) {
            return None;
        }
        for _ in 0..30 {
            let middle = 0.5 * (good + bad);
            if leaves(middle) { good = middle } else { bad = middle }
        }
        Some(good)
    }
}

impl CutShape {
    /// Area in mm² that it takes from a piece of wood, whose outline runs anticlockwise.
    #[must_use]
    pub fn taken_from(&self, wood: &[Point]) -> f64 {
        self.cells.iter().map(|cell| polygon::shared_area(wood, cell)).sum()
    }

    /// Least distance from its outline to a polygon or, there and back, to a line, mm; nought where they
    /// cross.
    #[must_use]
    pub fn distance(&self, other: &[Point]) -> f64 {
        polygon::least_distance(&self.outline.flattened(CHORDS), other)
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
    let floor = (0..=ALONG_SLOT).map(|i| corners[3].lerp(corners[2], i as f64 / ALONG_SLOT as f64));
    let face = face(core, other(from));
    let wood_left = floor.map(|point| left_below(&face, point, inwards)).fold(f64::INFINITY, f64::min);
    let taken = vec![corner(-1.0, 0.0), corner(1.0, 0.0), corners[2], corners[3]];
    CutShape { outline: ArcPath::polyline(corners, true), wood_left, taken, cells: vec![corners.to_vec()] }
}

fn pocket(core: &Core<'_>, from: Side, chord: [f64; 2], depth: f64) -> CutShape {
    let face = face(core, other(from));
    let [front, back] = chord.map(|at| root_at(core, from, at * core.shape().chord));
    // The outline runs towards the nose above and away from it below: so does the floor.
    let (begin, end) = if from == Side::Upper { (back, front) } else { (front, back) };
    let mut wood_left = f64::INFINITY;
    let (mut rim, mut on_face, mut floor) = (Vec::new(), Vec::new(), Vec::new());
    for i in 0..=ALONG_POCKET {
        let jet = core.jet(begin + (end - begin) * i as f64 / ALONG_POCKET as f64);
        let inwards = jet.tangent().unwrap_or(Vec2::new(1.0, 0.0)).turn_90();
        let deep = jet.point + depth * inwards;
        wood_left = wood_left.min(left_below(&face, deep, inwards));
        rim.push(jet.point - PROUD * inwards);
        on_face.push(jet.point);
        floor.push(deep);
    }
    let cells = (0..ALONG_POCKET).map(|i| vec![rim[i], rim[i + 1], floor[i + 1], floor[i]]).collect();
    let closed = |edge: Vec<Point>| edge.into_iter().chain(floor.iter().rev().copied());
    let taken = closed(on_face).collect();
    CutShape { outline: ArcPath::polyline(closed(rim), true), wood_left, taken, cells }
}

fn hole(core: &Core<'_>, at: f64, width: f64) -> CutShape {
    let x = at * core.shape().chord;
    let ends = [x - 0.5 * width, x + 0.5 * width];
    let heights = |side: Side| ends.map(|x| core.jet(root_at(core, side, x)).point.y);
    let top = heights(Side::Upper).into_iter().fold(f64::MIN, f64::max) + PROUD;
    let bottom = heights(Side::Lower).into_iter().fold(f64::MAX, f64::min) - PROUD;
    let corners = [
        Point::new(ends[0], bottom),
        Point::new(ends[1], bottom),
        Point::new(ends[1], top),
        Point::new(ends[0], top),
    ];
    // It opens both faces: what is left stands ahead of it and behind.
    let wood_left = (ends[0] - core.nose().x).min(core.tail().x - ends[1]);
    let faces = [Side::Lower, Side::Upper].map(|side| ends.map(|x| core.jet(root_at(core, side, x)).point));
    let taken = vec![faces[0][0], faces[0][1], faces[1][1], faces[1][0]];
    CutShape { outline: ArcPath::polyline(corners, true), wood_left, taken, cells: vec![corners.to_vec()] }
}

fn bore(core: &Core<'_>, at: f64, height: f64, diameter: f64) -> CutShape {
    let x = at * core.shape().chord;
    let [upper, lower] = [Side::Upper, Side::Lower].map(|side| core.jet(root_at(core, side, x)).point);
    let (centre, radius) = (lower.lerp(upper, height), 0.5 * diameter);
    let ends = [centre + Vec2::new(radius, 0.0), centre - Vec2::new(radius, 0.0)];
    let outline = ArcPath::new(ends.map(|point| ArcVertex { point, bulge: 1.0 }).to_vec(), true);
    let near = |side: Side| nearest(&face(core, side), centre).distance(centre);
    let wood_left = near(Side::Upper).min(near(Side::Lower)) - radius;
    let taken = outline.flattened(CHORDS);
    CutShape { outline, wood_left, cells: vec![taken.clone()], taken }
}

/// Wood left between a point of a floor and the face below it, negative beyond that face.
fn left_below(face: &[Point], point: Point, inwards: Vec2) -> f64 {
    let nearest = nearest(face, point);
    let inside = (nearest - point).dot(inwards) > 0.0;
    if inside { nearest.distance(point) } else { -nearest.distance(point) }
}

/// Parameter of the core's face at `x` mm from the finished nose.
fn root_at(core: &Core<'_>, side: Side, x: f64) -> f64 {
    parameter_at(core, 0.0, end_of(side), x)
}

/// Parameter at which a face ends behind.
fn end_of(side: Side) -> f64 {
    if side == Side::Upper { -1.0 } else { 1.0 }
}

fn other(side: Side) -> Side {
    if side == Side::Upper { Side::Lower } else { Side::Upper }
}

fn face(core: &Core<'_>, side: Side) -> Vec<Point> {
    (0..=LOOKS).map(|i| core.jet(end_of(side) * i as f64 / LOOKS as f64).point).collect()
}

/// The nearest place on a line of short chords.
fn nearest(line: &[Point], point: Point) -> Point {
    let places = line.windows(2).map(|pair| polygon::nearest_between(pair[0], pair[1], point));
    places.min_by(|a, b| a.distance(point).total_cmp(&b.distance(point))).unwrap_or(point)
}

//! Printed masks: two plates that close round a station's outline and show where it is proud.

use super::strokes;
use crate::geometry::{GeometryError, Point, Solid, follow_with_arcs};
use crate::wing::StationShape;

/// How masks are made, millimetres.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct MaskSettings {
    /// Between the mask and the finished outline, all round.
    pub clearance: f64,
    /// Least wall round the opening.
    pub wall: f64,
    /// Thickness of the plates.
    pub thickness: f64,
    /// Greatest distance of the opening from its exact curve.
    pub tolerance: f64,
}

/// Which of the two plates.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Half {
    /// Over the upper surface.
    Upper,
    /// Under the lower surface.
    Lower,
}

impl Half {
    /// The word in file names.
    #[must_use]
    pub fn word(self) -> &'static str {
        match self {
            Self::Upper => "upper",
            Self::Lower => "lower",
        }
    }
}

/// A mask for one station.
#[derive(Debug, Clone, PartialEq)]
pub struct Mask {
    /// Over the upper surface.
    pub upper: Solid,
    /// Under the lower surface.
    pub lower: Solid,
}

/// What is put on a mask so that it can be told and set.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct MaskMarks<'a> {
    /// What is engraved, besides the half: station and fingerprint. Letters, digits, `-` and `.`.
    pub label: &'a str,
    /// Places along the chord that a notch in the far side shows, mm from the nose: nose, trailing edge,
    /// hinge.
    pub sights: &'a [f64],
}

/// Depth of the letters, mm, and the share of the plate that they take at most.
const ENGRAVED: f64 = 0.8;
const ENGRAVED_SHARE: f64 = 0.35;
/// Letters are no higher than this, mm, or than this share of the wall, and left out when they would be
/// lower than the last, which no nozzle prints.
const LETTERS: f64 = 5.0;
const LETTERS_SHARE: f64 = 0.45;
const LOWEST_LETTERS: f64 = 2.4;
/// Depth of a sight notch and half its width, mm, at most a tenth of the wall.
const NOTCH: f64 = 1.2;
/// Width and depth of the peg in the parting face, shares of the wall, and how much its socket is wider
/// and deeper, mm.
const PEG: [f64; 2] = [0.4, 0.22];
const PEG_PLAY: f64 = 0.15;

impl Mask {
    /// The mask of a station, its plates lying flat on the bed with x along the chord.
    ///
    /// The plates part at the foremost and the hindmost point of the opening, where the outline
    /// is upright, so that neither has to be forced over it. A peg in each parting face of the upper
    /// half goes into a socket of the lower one. Nothing needs support.
    ///
    /// # Errors
    /// When the outline cannot be followed, or the clearance leaves no single opening.
    pub fn of(
        shape: &StationShape<'_>,
        settings: MaskSettings,
        marks: MaskMarks<'_>,
    ) -> Result<Self, GeometryError> {
        // Half of the tolerance for the arcs, half for the chords that a solid is made of.
        let step = 0.5 * settings.tolerance;
        let opening = follow_with_arcs(shape, step)?.offset(settings.clearance)?;
        let bounds = opening.bounds();
        let points = opening.flattened(step);
        let Some((nose, tail)) = foremost_and_hindmost(&points) else {
            return Err(GeometryError::Offset { distance: settings.clearance, pieces: 0 });
        };
        let wall = settings.wall;
        let (left, right) = (bounds.x0 - wall, bounds.x1 + wall);
        let plate = |half: Half| {
            let (from, to, far_side, up) = match half {
                Half::Upper => (tail, nose, bounds.y1 + wall, 1.0),
                Half::Lower => (nose, tail, bounds.y0 - wall, -1.0),
            };
            // The opening runs anticlockwise, so a plate follows it backwards.
            let mut face: Vec<Point> = walk(&points, from, to).collect();
            let (first, last) = (points[from], points[to]);
            let (first_side, last_side) = if first.x > last.x { (right, left) } else { (left, right) };
            face.extend(joint(last, last_side, wall, half));
            face.push(Point::new(last_side, last.y));
            face.push(Point::new(last_side, far_side));
            face.extend(notches(marks.sights, [last_side, first_side], far_side, up, wall));
            face.push(Point::new(first_side, far_side));
            face.push(Point::new(first_side, first.y));
            let mut back = joint(first, first_side, wall, half);
            back.reverse();
            face.extend(back);
            let label = format!("{} {}", marks.label, half.word());
            let middle = far_side - up * 0.5 * wall;
            let letters = letters(&label, left, right, middle, wall);
            let depth = ENGRAVED.min(ENGRAVED_SHARE * settings.thickness);
            Solid::engraved(&face, settings.thickness, &letters, depth)
        };
        Ok(Self { upper: plate(Half::Upper)?, lower: plate(Half::Lower)? })
    }
}

/// The peg or socket in the parting face from the opening's end to the side of the plate.
fn joint(end: Point, side: f64, wall: f64, half: Half) -> Vec<Point> {
    let play = if half == Half::Lower { PEG_PLAY } else { 0.0 };
    let (width, depth) = (PEG[0] * wall + 2.0 * play, PEG[1] * wall + play);
    let out = (side - end.x).signum();
    let middle = 0.5 * (end.x + side);
    // A little narrower at its end, so that it finds its way.
    let (root, tip) = (0.5 * width, 0.5 * width - 0.15 * depth);
    [(-root, 0.0), (-tip, -depth), (tip, -depth), (root, 0.0)]
        .map(|(x, y)| Point::new(middle + out * x, end.y + y))
        .to_vec()
}

/// Notches in the far side at the sights, in the direction in which it is walked.
fn notches(sights: &[f64], [from, to]: [f64; 2], far_side: f64, up: f64, wall: f64) -> Vec<Point> {
    let size = NOTCH.min(0.1 * wall);
    let way = (to - from).signum();
    let mut places: Vec<f64> = sights
        .iter()
        .copied()
        .filter(|x| (x - from) * way > 2.0 * size && (to - x) * way > 2.0 * size)
        .collect();
    places.sort_by(|a, b| (a * way).total_cmp(&(b * way)));
    places.dedup_by(|a, b| (*a - *b).abs() < 3.0 * size);
    let notch = |x: f64| {
        [(-size, 0.0), (0.0, -size), (size, 0.0)].map(|(dx, dy)| Point::new(x + way * dx, far_side + up * dy))
    };
    places.into_iter().flat_map(notch).collect()
}

/// The label in the wall along the far side, as large as goes there.
fn letters(label: &str, left: f64, right: f64, middle: f64, wall: f64) -> Vec<Vec<Point>> {
    let room = right - left - wall;
    let height = (LETTERS_SHARE * wall).min(LETTERS).min(room / strokes::width(label, 1.0));
    if height < LOWEST_LETTERS {
        return Vec::new();
    }
    let start = 0.5 * (left + right - strokes::width(label, height));
    strokes::strokes(label, Point::new(start, middle - 0.5 * height), height)
}

fn foremost_and_hindmost(points: &[Point]) -> Option<(usize, usize)> {
    let by_x = |&a: &usize, &b: &usize| points[a].x.total_cmp(&points[b].x);
    let nose = (0..points.len()).min_by(by_x)?;
    let tail = (0..points.len()).max_by(by_x)?;
    (nose != tail).then_some((nose, tail))
}

/// The points from index `from` forwards to index `to`, round the end.
fn walk(points: &[Point], from: usize, to: usize) -> impl Iterator<Item = Point> + '_ {
    let count = points.len();
    let steps = (to + count - from) % count;
    (0..=steps).map(move |i| points[(from + i) % count])
}

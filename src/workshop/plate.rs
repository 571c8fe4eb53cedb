//! The outline of one printed plate of a mask: opening, pegs or dovetails, notches, letters.

use super::{Half, strokes};
use crate::geometry::{GeometryError, Point, Solid, rectangle_fits};

/// A stretch of a mask's half along the chord.
pub(super) struct Strip<'a> {
    /// Which half.
    pub(super) half: Half,
    /// The opening's side of the whole half, from the nose aft.
    pub(super) edge: &'a [Point],
    /// Height of the side away from the opening.
    pub(super) far: f64,
    /// Least wall.
    pub(super) wall: f64,
    /// How it ends ahead and behind.
    pub(super) ends: [End; 2],
}

/// How a strip ends.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) enum End {
    /// At the side of the mask, where the other half is met with a peg or a socket.
    Side(f64),
    /// At the side of a plate that meets nothing.
    Plain(f64),
    /// At a neighbour, which is met with a dovetail.
    Cut(f64),
}

/// A printed plate, or a piece of one that is longer than the bed.
#[derive(Debug, Clone, PartialEq)]
pub struct PlatePiece {
    /// Which piece, counted from the nose from 1, and how many there are.
    pub number: [usize; 2],
    /// Whether there was room to engrave its label.
    pub is_labelled: bool,
    /// The piece itself, flat on the bed.
    pub solid: Solid,
}

/// A plate is parted into so many pieces at most.
const MOST_PIECES: usize = 12;

/// A plate between two `sides` in as few pieces as lie on the bed; whole where parting does not help.
///
/// `piece`: makes the piece of a number between two ends.
pub(super) fn parted_on_bed(
    sides: [End; 2],
    wall: f64,
    bed: [f64; 2],
    piece: impl Fn([usize; 2], [End; 2]) -> Result<PlatePiece, GeometryError>,
) -> Result<Vec<PlatePiece>, GeometryError> {
    let [left, right] = sides.map(End::x);
    let parted = |count: usize| -> Result<Vec<PlatePiece>, GeometryError> {
        let end = |i: usize| match i {
            0 => sides[0],
            i if i == count => sides[1],
            i => End::Cut(left + (right - left) * i as f64 / count as f64),
        };
        (0..count).map(|i| piece([i + 1, count], [end(i), end(i + 1)])).collect()
    };
    let lies = |plate: &PlatePiece| {
        let [x, y, _] = plate.solid.size();
        rectangle_fits([x, y], bed)
    };
    let whole = parted(1)?;
    if whole.iter().all(lies) {
        return Ok(whole);
    }
    for count in 2..=MOST_PIECES {
        // Too narrow a piece has no room for its dovetails.
        if right - left < 3.0 * wall * count as f64 {
            break;
        }
        let pieces = parted(count)?;
        if pieces.iter().all(lies) {
            return Ok(pieces);
        }
    }
    // The check says what is too large.
    Ok(whole)
}

/// A label with the number of its piece, where there are several.
pub(super) fn numbered(label: &str, [number, count]: [usize; 2]) -> String {
    if count == 1 { label.to_owned() } else { format!("{label} {number}-{count}") }
}

impl End {
    pub(super) fn x(self) -> f64 {
        match self {
            Self::Side(x) | Self::Plain(x) | Self::Cut(x) => x,
        }
    }
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
/// Half width of a dovetail at its root and its tip, and its length, shares of the wall.
const DOVETAIL: [f64; 3] = [0.14, 0.22, 0.3];

impl Strip<'_> {
    /// How deep letters are engraved in a plate of a thickness.
    pub(super) fn engraved(thickness: f64) -> f64 {
        ENGRAVED.min(ENGRAVED_SHARE * thickness)
    }

    /// Upwards or downwards from the opening to the far side.
    fn away(&self) -> f64 {
        if self.half == Half::Upper { 1.0 } else { -1.0 }
    }

    /// The outline of the plate, with notches at the `sights`.
    pub(super) fn face(&self, sights: &[f64]) -> Vec<Point> {
        let [front, back] = self.ends;
        let mut face = self.front(front);
        // From the opening outwards it has been walked the other way.
        face.reverse();
        face.extend(between(self.edge, front, back));
        face.extend(self.back(back));
        face.extend(self.notches(sights, back.x(), front.x()));
        face
    }

    /// Along the end ahead, from the opening to the far side.
    fn front(&self, end: End) -> Vec<Point> {
        match (end, self.edge.first()) {
            (End::Side(x), Some(&first)) => self.side(first, x),
            (End::Plain(x), Some(&first)) => vec![Point::new(x, first.y), Point::new(x, self.far)],
            (End::Cut(x), _) => self.dovetail(x, PEG_PLAY),
            _ => Vec::new(),
        }
    }

    /// The same behind.
    fn back(&self, end: End) -> Vec<Point> {
        match (end, self.edge.last()) {
            (End::Side(x), Some(&last)) => self.side(last, x),
            (End::Plain(x), Some(&last)) => vec![Point::new(x, last.y), Point::new(x, self.far)],
            (End::Cut(x), _) => self.dovetail(x, 0.0),
            _ => Vec::new(),
        }
    }

    /// From the opening's end along the parting face with its peg or socket, and up the side.
    fn side(&self, end: Point, x: f64) -> Vec<Point> {
        let play = if self.half == Half::Lower { PEG_PLAY } else { 0.0 };
        let (width, depth) = (PEG[0] * self.wall + 2.0 * play, PEG[1] * self.wall + play);
        let out = (x - end.x).signum();
        let middle = 0.5 * (end.x + x);
        // A little narrower at its end, so that it finds its way.
        let (root, tip) = (0.5 * width, 0.5 * width - 0.15 * depth);
        let mut points = [(-root, 0.0), (-tip, -depth), (tip, -depth), (root, 0.0)]
            .map(|(along, down)| Point::new(middle + out * along, end.y + down))
            .to_vec();
        points.extend([Point::new(x, end.y), Point::new(x, self.far)]);
        points
    }

    /// Across the wall at a cut, from the opening to the far side, with a dovetail that stands aft:
    /// a tongue on the piece ahead, a socket with some play in the piece behind.
    fn dovetail(&self, x: f64, play: f64) -> Vec<Point> {
        let [root, tip, length] = DOVETAIL.map(|share| share * self.wall);
        let middle = self.far - self.away() * 0.5 * self.wall;
        let mut points = vec![height_at(self.edge, x)];
        points.extend(
            [
                (0.0, -root - play),
                (length + play, -tip - play),
                (length + play, tip + play),
                (0.0, root + play),
            ]
            .map(|(aft, out)| Point::new(x + aft, middle + self.away() * out)),
        );
        points.push(Point::new(x, self.far));
        points
    }

    /// Notches in the far side at the sights, walked forwards.
    fn notches(&self, sights: &[f64], back: f64, front: f64) -> Vec<Point> {
        let size = NOTCH.min(0.1 * self.wall);
        let mut places: Vec<f64> =
            sights.iter().copied().filter(|x| *x > front + 2.0 * size && *x < back - 2.0 * size).collect();
        places.sort_by(|a, b| b.total_cmp(a));
        places.dedup_by(|a, b| (*a - *b).abs() < 3.0 * size);
        let notch = |x: f64| {
            [(size, 0.0), (0.0, -size), (-size, 0.0)]
                .map(|(dx, dy)| Point::new(x + dx, self.far + self.away() * dy))
        };
        places.into_iter().flat_map(notch).collect()
    }

    /// The label in the wall along the far side, as large as goes there; nothing where that is too small
    /// to print.
    pub(super) fn letters(&self, label: &str) -> Vec<Vec<Point>> {
        let [left, right] = self.ends.map(End::x);
        let room = right - left - self.wall;
        let height = (LETTERS_SHARE * self.wall).min(LETTERS).min(room / strokes::width(label, 1.0));
        if height < LOWEST_LETTERS {
            return Vec::new();
        }
        let start = 0.5 * (left + right - strokes::width(label, height));
        let middle = self.far - self.away() * 0.5 * self.wall;
        strokes::strokes(label, Point::new(start, middle - 0.5 * height), height)
    }
}

/// The points of an edge that runs aft, between two ends; those at cuts are left to the cuts.
fn between(edge: &[Point], front: End, back: End) -> impl Iterator<Item = Point> + '_ {
    let after = move |p: &Point| !matches!(front, End::Cut(_)) || p.x > front.x();
    let before = move |p: &Point| !matches!(back, End::Cut(_)) || p.x < back.x();
    edge.iter().copied().filter(move |p| after(p) && before(p))
}

/// Where an edge that runs aft passes `x`.
fn height_at(edge: &[Point], x: f64) -> Point {
    let pair = edge.windows(2).find(|pair| pair[0].x <= x && x < pair[1].x);
    let y = pair.map_or(0.0, |pair| {
        let share = (x - pair[0].x) / (pair[1].x - pair[0].x);
        pair[0].y + share * (pair[1].y - pair[0].y)
    });
    Point::new(x, y)
}

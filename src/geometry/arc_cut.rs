//! Parting closed paths of lines and arcs along a line or a circle.

use kurbo::{Point, Vec2};

use super::arc_path::Segment;
use super::{ArcPath, ArcVertex, GeometryError};

/// Equal parts of a segment at whose ends a crossing is looked for: two crossings within one part
/// are not found.
const PARTS: usize = 16;
/// Crossings are closed in on to this share of a part.
const HALVINGS: usize = 60;

impl ArcPath {
    /// The stretches of a closed path on which `side` is positive, as open paths in its direction;
    /// the whole path where it never changes sign to negative.
    ///
    /// `side`: continuous, such as a distance from a line.
    #[must_use]
    pub fn stretches(&self, side: &dyn Fn(Point) -> f64) -> Vec<Self> {
        let pieces: Vec<(Segment, bool)> = self.segments().flat_map(|s| split(&s, side)).collect();
        let Some(start) = (0..pieces.len()).find(|&i| {
            let before = pieces[(i + pieces.len() - 1) % pieces.len()].1;
            pieces[i].1 && !before
        }) else {
            return if pieces.first().is_some_and(|piece| piece.1) { vec![self.clone()] } else { Vec::new() };
        };
        let mut stretches: Vec<Vec<Segment>> = Vec::new();
        let mut was_kept = false;
        for i in 0..pieces.len() {
            let (segment, kept) = pieces[(start + i) % pieces.len()];
            match (kept, stretches.last_mut()) {
                (true, Some(stretch)) if was_kept => stretch.push(segment),
                (true, _) => stretches.push(vec![segment]),
                (false, _) => {}
            }
            was_kept = kept;
        }
        stretches.into_iter().map(|segments| open(&segments)).collect()
    }

    /// What lies on the side of a line that `inwards` points to, closed along the line.
    ///
    /// # Errors
    /// When the line does not part the path into two pieces.
    pub fn cut_by_line(&self, on: Point, inwards: Vec2) -> Result<Self, GeometryError> {
        let mut stretches = self.stretches(&|p| (p - on).dot(inwards));
        match (stretches.pop(), stretches.is_empty()) {
            (Some(one), true) if !one.is_closed() => Ok(Self::new(one.vertices().to_vec(), true)),
            _ => Err(GeometryError::Cut { x: on.x, y: on.y }),
        }
    }

    /// The stretch of a closed path between two lengths from its start, mm, as an open path; lengths
    /// beyond the end go on from the start.
    #[must_use]
    pub fn part(&self, from: f64, to: f64) -> Self {
        let whole: f64 = self.segments().map(|s| s.length()).sum();
        let (from, length_of) = (from.rem_euclid(whole), (to - from).max(0.0));
        let to = from + length_of.min(whole);
        let mut at = 0.0;
        let mut pieces = Vec::new();
        for segment in self.segments().chain(self.segments()) {
            let length = segment.length();
            let share = |place: f64| ((place - at) / length).clamp(0.0, 1.0);
            let (start, end) = (share(from), share(to));
            if end - start > 1e-9 {
                pieces.push(segment.piece(start, end));
            }
            at += length;
        }
        open(&pieces)
    }

    /// An open path closed by an arc about `centre` from its end to its start, anticlockwise or
    /// clockwise. Both ends have to lie on one circle about it.
    #[must_use]
    pub fn closed_about(&self, centre: Point, anticlockwise: bool) -> Self {
        let mut vertices = self.vertices().to_vec();
        if let (Some(&first), Some(last)) = (self.vertices().first(), vertices.last_mut()) {
            let (from, to) = ((last.point - centre).angle(), (first.point - centre).angle());
            let full = std::f64::consts::TAU;
            let turn = (to - from).rem_euclid(full);
            let sweep = if anticlockwise { turn } else { turn - full };
            last.bulge = (0.25 * sweep).tan();
        }
        Self::new(vertices, true)
    }
}

impl Segment {
    /// The piece from one share of its length to another.
    fn piece(&self, from: f64, to: f64) -> Self {
        Self { from: self.at(from), to: self.at(to), bulge: (self.bulge.atan() * (to - from)).tan() }
    }
}

/// A segment in pieces on which `side` keeps its sign, each with whether that is positive.
fn split(segment: &Segment, side: &dyn Fn(Point) -> f64) -> Vec<(Segment, bool)> {
    let positive = |share: f64| side(segment.at(share)) > 0.0;
    let share = |i: usize| i as f64 / PARTS as f64;
    let mut cuts = vec![0.0];
    for i in 0..PARTS {
        let here = positive(share(i));
        if positive(share(i + 1)) != here {
            let (mut low, mut high) = (share(i), share(i + 1));
            for _ in 0..HALVINGS {
                let middle = 0.5 * (low + high);
                if positive(middle) == here { low = middle } else { high = middle }
            }
            cuts.push(0.5 * (low + high));
        }
    }
    cuts.push(1.0);
    cuts.windows(2)
        .filter(|ends| ends[1] > ends[0])
        .map(|ends| {
            let piece = if ends == [0.0, 1.0] { *segment } else { segment.piece(ends[0], ends[1]) };
            (piece, positive(0.5 * (ends[0] + ends[1])))
        })
        .collect()
}

fn open(segments: &[Segment]) -> ArcPath {
    let mut vertices: Vec<ArcVertex> =
        segments.iter().map(|s| ArcVertex { point: s.from, bulge: s.bulge }).collect();
    vertices.extend(segments.last().map(|s| ArcVertex { point: s.to, bulge: 0.0 }));
    ArcPath::new(vertices, false)
}

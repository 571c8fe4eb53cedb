//! Printed cradles: blocks with the negative of one face, in which the half-shaped wood lies.

use super::Half;
use crate::geometry::{ArcPath, GeometryError, Point, Solid, rectangle_fits};

/// A cross-section of the part, moved out by the clearance.
#[derive(Debug, Clone, PartialEq)]
pub struct CradleSection {
    /// Distance from the root, mm.
    pub at: f64,
    /// The outline in the foil's axes: x aft, y up, mm.
    pub outline: ArcPath,
}

/// A cradle that stands on the board.
#[derive(Debug, Clone, PartialEq)]
pub struct Cradle {
    /// Its pieces from the nose aft, side by side on the board. x as the foil's, y along the span (of the
    /// upper face towards the root), z up from the board.
    pub pieces: Vec<Solid>,
}

/// Corners along the face, closer at its ends, where it stands upright.
const CORNERS: usize = 96;
/// How near its face's chords lie to the outline, mm.
const CHORDS: f64 = 0.004;
/// A cradle is parted into so many pieces at most.
const MOST_PIECES: usize = 12;

impl Cradle {
    /// The cradle that holds a face over a stretch of the span, by the sections from its one end to its
    /// other.
    ///
    /// `board`: height of the board in the foil's axes, mm, below the lower face or above the upper one.
    /// `wall`: width of the rims ahead and behind. A cradle that does not lie on the `bed` is parted along
    /// upright faces. It stands as it is printed, without support: nothing of it hangs over.
    ///
    /// # Errors
    /// When a face cannot be followed, or reaches below the board.
    pub fn under(
        sections: &[CradleSection],
        face: Half,
        board: f64,
        wall: f64,
        bed: [f64; 2],
    ) -> Result<Self, GeometryError> {
        let row = |section: &CradleSection| -> Vec<[f64; 3]> {
            let edge = spaced(&facing(&section.outline, face));
            let (first, last) = (edge[0], edge[edge.len() - 1]);
            let rims = [Point::new(first.x - wall, first.y)].into_iter().chain(edge);
            let rims = rims.chain([Point::new(last.x + wall, last.y)]);
            rims.map(|p| on_board(p, section.at, face, board)).collect()
        };
        let mut rows: Vec<Vec<[f64; 3]>> = sections.iter().map(row).collect();
        if face == Half::Upper {
            rows.reverse();
        }
        let count = rows.first().map_or(0, Vec::len);
        for pieces in 1..=MOST_PIECES {
            let cut = |i: usize| (count - 1) * i / pieces;
            let parted: Result<Vec<Solid>, _> = (0..pieces)
                .map(|i| {
                    let part: Vec<_> = rows.iter().map(|row| row[cut(i)..=cut(i + 1)].to_vec()).collect();
                    Solid::under(&part)
                })
                .collect();
            let parted = parted?;
            let lies = |solid: &Solid| rectangle_fits([solid.size()[0], solid.size()[1]], bed);
            if pieces == MOST_PIECES || parted.iter().all(lies) {
                return Ok(Self { pieces: parted });
            }
        }
        Ok(Self { pieces: Vec::new() })
    }
}

/// Where a place of a section lies when the board is at the bottom: for the upper face all is turned
/// over about the chord.
pub(super) fn on_board(p: Point, at: f64, face: Half, board: f64) -> [f64; 3] {
    match face {
        Half::Lower => [p.x, at, p.y - board],
        Half::Upper => [p.x, -at, board - p.y],
    }
}

/// A face of an outline from its foremost to its hindmost point, x growing.
pub(super) fn facing(outline: &ArcPath, face: Half) -> Vec<Point> {
    let points = outline.flattened(CHORDS);
    let by_x = |&a: &usize, &b: &usize| points[a].x.total_cmp(&points[b].x);
    let nose = (0..points.len()).min_by(by_x).unwrap_or(0);
    let tail = (0..points.len()).max_by(by_x).unwrap_or(0);
    let count = points.len().max(1);
    // The outline runs anticlockwise: under the lower side from the nose to the tail.
    let (from, to) = if face == Half::Lower { (nose, tail) } else { (tail, nose) };
    let mut edge: Vec<Point> =
        (0..=(to + count - from) % count).map(|i| points[(from + i) % count]).collect();
    if face == Half::Upper {
        edge.reverse();
    }
    // What stands quite upright there would be a wall without a top.
    edge.dedup_by(|next, before| next.x <= before.x + 1e-4);
    edge
}

/// A line of points by as many as a cradle's row has, at the same shares of its length.
fn spaced(edge: &[Point]) -> Vec<Point> {
    let mut lengths = vec![0.0];
    for pair in edge.windows(2) {
        lengths.push(lengths[lengths.len() - 1] + pair[0].distance(pair[1]));
    }
    let whole = lengths[lengths.len() - 1];
    (0..=CORNERS)
        .map(|i| {
            let share = 0.5 - 0.5 * (std::f64::consts::PI * i as f64 / CORNERS as f64).cos();
            let place = share * whole;
            let after = lengths.partition_point(|&length| length < place).clamp(1, edge.len() - 1);
            let (from, to) = (lengths[after - 1], lengths[after]);
            edge[after - 1].lerp(edge[after], ((place - from) / (to - from)).clamp(0.0, 1.0))
        })
        .collect()
}

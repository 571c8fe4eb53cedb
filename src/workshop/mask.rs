//! Printed masks: two plates that close round a station's outline and show where it is proud.

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

impl Mask {
    /// The mask of a station, its plates lying flat on the bed with x along the chord.
    ///
    /// The plates part at the foremost and the hindmost point of the opening, where the outline
    /// is upright, so that neither has to be forced over it.
    ///
    /// # Errors
    /// When the outline cannot be followed, or the clearance leaves no single opening.
    pub fn of(shape: &StationShape<'_>, settings: MaskSettings) -> Result<Self, GeometryError> {
        // Half of the tolerance for the arcs, half for the chords that a solid is made of.
        let step = 0.5 * settings.tolerance;
        let opening = follow_with_arcs(shape, step)?.offset(settings.clearance)?;
        let bounds = opening.bounds();
        let points = opening.flattened(step);
        let Some((nose, tail)) = foremost_and_hindmost(&points) else {
            return Err(GeometryError::Offset { distance: settings.clearance, pieces: 0 });
        };

        let (left, right) = (bounds.x0 - settings.wall, bounds.x1 + settings.wall);
        let plate = |from: usize, to: usize, far_side: f64| {
            // The opening runs anticlockwise, so a plate follows it backwards.
            let mut face: Vec<Point> = walk(&points, from, to).collect();
            let (first, last) = (points[from], points[to]);
            let (first_side, last_side) = if first.x > last.x { (right, left) } else { (left, right) };
            face.push(Point::new(last_side, last.y));
            face.push(Point::new(last_side, far_side));
            face.push(Point::new(first_side, far_side));
            face.push(Point::new(first_side, first.y));
            Solid::extruded(&face, settings.thickness)
        };
        Ok(Self {
            upper: plate(tail, nose, bounds.y1 + settings.wall)?,
            lower: plate(nose, tail, bounds.y0 - settings.wall)?,
        })
    }
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

//! Printed masks: two plates that close round a station's outline and show where it is proud.

use super::plate::{End, PlatePiece, Strip, numbered, parted_on_bed};
use crate::geometry::{ArcPath, GeometryError, Point, Solid};

/// How masks are made, millimetres.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct MaskSettings {
    /// Between the mask and the part's outline, all round.
    pub clearance: f64,
    /// Least wall round the opening.
    pub wall: f64,
    /// Thickness of the plates.
    pub thickness: f64,
    /// Greatest distance of the opening's chords from the outline moved out by the clearance.
    pub tolerance: f64,
    /// The printer's bed less its margin: a plate that does not lie on it is parted.
    pub bed: [f64; 2],
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

/// A printed piece of a mask.
#[derive(Debug, Clone, PartialEq)]
pub struct MaskPiece {
    /// The half that it belongs to.
    pub half: Half,
    /// The piece itself.
    pub plate: PlatePiece,
}

impl MaskPiece {
    /// Its half, and which piece of it where that is parted: "upper" or "upper-2".
    #[must_use]
    pub fn name(&self) -> String {
        let [number, count] = self.plate.number;
        if count == 1 { self.half.word().to_owned() } else { format!("{}-{number}", self.half.word()) }
    }
}

/// A mask for one station.
#[derive(Debug, Clone, PartialEq)]
pub struct Mask {
    /// Its pieces: those of the upper half, then those of the lower one.
    pub pieces: Vec<MaskPiece>,
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

impl Mask {
    /// The mask that closes round a closed outline, its plates lying flat on the bed with x along the
    /// chord.
    ///
    /// The plates part at the foremost and the hindmost point of the opening, where the outline
    /// is upright, so that neither has to be forced over it. A peg in each parting face of the upper
    /// half goes into a socket of the lower one. A half that is longer than the bed is parted across
    /// the chord, with a dovetail in the wall. Nothing needs support.
    ///
    /// # Errors
    /// When the clearance leaves no single opening.
    pub fn of(
        outline: &ArcPath,
        settings: MaskSettings,
        marks: MaskMarks<'_>,
    ) -> Result<Self, GeometryError> {
        let opening = outline.offset(settings.clearance)?;
        let points = opening.flattened(settings.tolerance);
        let Some((nose, tail)) = foremost_and_hindmost(&points) else {
            return Err(GeometryError::Offset { distance: settings.clearance, pieces: 0 });
        };
        let mut pieces = Vec::new();
        for half in [Half::Upper, Half::Lower] {
            // The opening runs anticlockwise: over the upper side from the tail to the nose.
            let mut edge: Vec<Point> = match half {
                Half::Upper => walk(&points, tail, nose).collect(),
                Half::Lower => walk(&points, nose, tail).collect(),
            };
            if half == Half::Upper {
                edge.reverse();
            }
            pieces.extend(half_of(half, &edge, &opening, settings, marks)?);
        }
        Ok(Self { pieces })
    }

    /// The solids of all pieces.
    pub fn solids(&self) -> impl Iterator<Item = &Solid> {
        self.pieces.iter().map(|piece| &piece.plate.solid)
    }
}

/// One half in as few pieces as lie on the bed.
///
/// `edge`: the opening's side of it, from the nose aft.
fn half_of(
    half: Half,
    edge: &[Point],
    opening: &ArcPath,
    settings: MaskSettings,
    marks: MaskMarks<'_>,
) -> Result<Vec<MaskPiece>, GeometryError> {
    let (bounds, wall) = (opening.bounds(), settings.wall);
    let (left, right) = (bounds.x0 - wall, bounds.x1 + wall);
    let far = if half == Half::Upper { bounds.y1 + wall } else { bounds.y0 - wall };
    let plates = parted_on_bed([End::Side(left), End::Side(right)], wall, settings.bed, |number, ends| {
        let strip = Strip { half, edge, far, wall, ends };
        let letters = strip.letters(&numbered(&format!("{} {}", marks.label, half.word()), number));
        let is_labelled = !letters.is_empty();
        let depth = Strip::engraved(settings.thickness);
        let solid = Solid::engraved(&strip.face(marks.sights), settings.thickness, &letters, depth)?;
        Ok(PlatePiece { number, is_labelled, solid })
    })?;
    Ok(plates.into_iter().map(|plate| MaskPiece { half, plate }).collect())
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

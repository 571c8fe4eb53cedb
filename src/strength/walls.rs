//! The skin round a section as a ring of short straight walls, and the wood inside of it.

use std::collections::HashMap;
use std::ops::RangeInclusive;

use super::{CoreElastic, Layer, Layup, StrengthError};
use crate::geometry::{ArcPath, Point, Vec2, polygon};
use crate::section::Side;

/// Which surfaces a ply covers.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum SkinSides {
    /// Both, round the nose in one.
    Both,
    /// One of them.
    One(Side),
}

/// A ply on a section.
#[derive(Debug, Clone, PartialEq)]
pub struct SkinPly {
    /// The ply.
    pub layer: Layer,
    /// Surfaces that it covers.
    pub sides: SkinSides,
    /// From where to where along the chord, fractions of it.
    pub chord: RangeInclusive<f64>,
}

impl SkinPly {
    /// A ply over both surfaces.
    #[must_use]
    pub fn all_round(layer: Layer) -> Self {
        Self { layer, sides: SkinSides::Both, chord: 0.0..=1.0 }
    }

    fn covers(&self, side: Side, share: f64) -> bool {
        let sided = match self.sides {
            SkinSides::Both => true,
            SkinSides::One(one) => one == side,
        };
        sided && self.chord.contains(&share)
    }
}

/// Where a flap is parted off, so that only what lies ahead of it carries.
#[derive(Debug, Clone, PartialEq)]
pub struct FlapCut {
    /// Distance of the cut from the nose along the chord, mm.
    pub at: f64,
    /// Plies on the cut face, which close the cell; none leaves the section open.
    pub web: Vec<Layer>,
}

/// What a section is made of at one place along the span.
#[derive(Debug, Clone, PartialEq)]
pub struct SectionBuild {
    /// Corners of the outline of the laminate, mm: x aft, y towards the upper side; filler and paint
    /// not counted. It must not cross itself, which is not looked at here. Of an [`ArcPath`] take [`outline_points`].
    pub outline: Vec<Point>,
    /// x of the nose, mm.
    pub nose: f64,
    /// Chord, mm.
    pub chord: f64,
    /// The plies from the core outwards.
    pub plies: Vec<SkinPly>,
    /// What fills the section.
    pub core: CoreElastic,
    /// Slots and bores taken out of the core, each as its corners.
    pub cut_outs: Vec<Vec<Point>>,
    /// The flap parted off, if there is one here.
    pub flap: Option<FlapCut>,
}

/// Corners of an outline for [`SectionBuild::outline`]: chords within a thousandth of a mm.
#[must_use]
pub fn outline_points(path: &ArcPath) -> Vec<Point> {
    path.flattened(1e-3)
}

/// A short piece of the skin between two corners of the outline.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Wall {
    /// Outer corners, anticlockwise round the section.
    pub outer: [Point; 2],
    /// Inner corners that belong to them.
    pub inner: [Point; 2],
    /// Which skin of [`Walls::skins`]; `None` where the section is open.
    pub skin: Option<usize>,
    /// Surface; of a web, the side to which it faces is meaningless.
    pub side: Side,
    /// Whether it is the face of a flap's cut.
    pub is_web: bool,
}

impl Wall {
    /// Ends of the middle line.
    #[must_use]
    pub fn middle_line(&self) -> [Point; 2] {
        [0, 1].map(|i| self.outer[i].midpoint(self.inner[i]))
    }

    /// Length of the middle line, mm.
    #[must_use]
    pub fn length(&self) -> f64 {
        let [a, b] = self.middle_line();
        a.distance(b)
    }

    /// Corners anticlockwise.
    pub(super) fn corners(&self) -> [Point; 4] {
        [self.outer[0], self.outer[1], self.inner[1], self.inner[0]]
    }

    /// Area, mm².
    #[must_use]
    pub fn area(&self) -> f64 {
        polygon::area(&self.corners())
    }
}

/// The ring of walls of a section.
#[derive(Debug, Clone, PartialEq)]
pub struct Walls {
    /// Anticlockwise round the section.
    pub walls: Vec<Wall>,
    /// The skins that they point to.
    pub skins: Vec<Layup>,
}

/// Longest wall, as a share of the chord.
const LONGEST: f64 = 0.02;
/// Over what share of the chord the skin's thickness steps at the edge of a ply, each way.
const STEP: f64 = 1e-4;
/// A corner that turns by more than this keeps no skin behind it: a sharp trailing edge.
const SHARP: f64 = 2.1;

impl Walls {
    /// Lays the plies of a section inside of its outline.
    ///
    /// Corners are mitred. Where the skins of both sides meet, ahead of a thin trailing edge, each
    /// reaches to the middle between the surfaces.
    ///
    /// # Errors
    /// When the outline encloses nothing, or a skin is impossible; `at` only names the place.
    pub fn of(build: &SectionBuild, at: f64) -> Result<Self, StrengthError> {
        let outline = corners(build).ok_or(StrengthError::Outline { at })?;
        let count = outline.len();
        let mut ring = Self { walls: Vec::with_capacity(count), skins: Vec::new() };
        let mut known: HashMap<Vec<usize>, usize> = HashMap::new();
        let mut web = None;
        for i in 0..count {
            let ends = [outline[i], outline[(i + 1) % count]];
            let middle = ends[0].midpoint(ends[1]);
            let along = ends[1] - ends[0];
            // The ring runs anticlockwise: on the upper side it runs towards the nose.
            let side = if along.x < 0.0 { Side::Upper } else { Side::Lower };
            let is_web = build.flap.as_ref().is_some_and(|flap| {
                ends.iter().all(|end| (end.x - build.nose - flap.at).abs() < 1e-9 * build.chord)
            });
            let skin = if is_web {
                let layers = build.flap.as_ref().map(|flap| flap.web.clone()).unwrap_or_default();
                if layers.is_empty() {
                    None
                } else {
                    if web.is_none() {
                        ring.skins.push(Layup::new(layers)?);
                        web = Some(ring.skins.len() - 1);
                    }
                    web
                }
            } else {
                let share = (middle.x - build.nose) / build.chord;
                let over: Vec<usize> =
                    (0..build.plies.len()).filter(|&ply| build.plies[ply].covers(side, share)).collect();
                match known.get(&over) {
                    Some(&skin) => Some(skin),
                    None if over.is_empty() => None,
                    None => {
                        let layers = over.iter().map(|&ply| build.plies[ply].layer.clone()).collect();
                        ring.skins.push(Layup::new(layers)?);
                        known.insert(over, ring.skins.len() - 1);
                        Some(ring.skins.len() - 1)
                    }
                }
            };
            ring.walls.push(Wall { outer: ends, inner: ends, skin, side, is_web });
        }
        let thickness: Vec<f64> = ring.walls.iter().map(|wall| ring.nominal(wall)).collect();
        let inner: Vec<Point> = (0..count)
            .map(|i| {
                let before = (i + count - 1) % count;
                outline[i] + depth(&outline, i, [thickness[before], thickness[i]])
            })
            .collect();
        for (i, wall) in ring.walls.iter_mut().enumerate() {
            wall.inner = [inner[i], inner[(i + 1) % count]];
        }
        Ok(ring)
    }

    /// Thickness of the plies of a wall, mm; nought where there is no skin.
    #[must_use]
    pub fn nominal(&self, wall: &Wall) -> f64 {
        self.skin(wall).map_or(0.0, Layup::thickness)
    }

    /// The skin of a wall.
    #[must_use]
    pub fn skin(&self, wall: &Wall) -> Option<&Layup> {
        wall.skin.and_then(|skin| self.skins.get(skin))
    }

    /// The outline of the core before anything is taken out of it.
    #[must_use]
    pub fn core(&self) -> Vec<Point> {
        self.walls.iter().map(|wall| wall.inner[0]).collect()
    }

    /// The middle line of the skin.
    #[must_use]
    pub fn middle_line(&self) -> Vec<Point> {
        self.walls.iter().map(|wall| wall.middle_line()[0]).collect()
    }
}

/// The outline anticlockwise, ahead of the flap, with corners at the edges of plies and no long sides.
fn corners(build: &SectionBuild) -> Option<Vec<Point>> {
    let chord = build.chord;
    let finite = |p: &Point| p.x.is_finite() && p.y.is_finite();
    if !(chord > 0.0 && chord.is_finite() && build.nose.is_finite() && build.outline.iter().all(finite)) {
        return None;
    }
    let mut points = build.outline.clone();
    if polygon::area(&points) < 0.0 {
        points.reverse();
    }
    if let Some(flap) = &build.flap {
        points = ahead_of(&points, build.nose + flap.at);
    }
    points.dedup_by(|a, b| a.distance(*b) < 1e-9 * chord);
    while points.len() > 1 && points[0].distance(points[points.len() - 1]) < 1e-9 * chord {
        points.pop();
    }
    if points.len() < 3 || polygon::area(&points) <= 1e-9 * chord * chord {
        return None;
    }
    let edges: Vec<f64> = build
        .plies
        .iter()
        .flat_map(|ply| [*ply.chord.start(), *ply.chord.end()])
        .filter(|share| *share > 0.0 && *share < 1.0)
        // A thickness steps between two corners close by, not over a whole wall.
        .flat_map(|share| [share - STEP, share, share + STEP])
        .map(|share| build.nose + share * chord)
        .collect();
    let mut fine = Vec::new();
    for (i, &from) in points.iter().enumerate() {
        let to = points[(i + 1) % points.len()];
        let mut stops: Vec<f64> = edges
            .iter()
            .map(|x| (x - from.x) / (to.x - from.x))
            .filter(|s| *s > 1e-6 && *s < 1.0 - 1e-6)
            .collect();
        let pieces = (from.distance(to) / (LONGEST * chord)).ceil().clamp(1.0, 200.0) as usize;
        stops.extend((0..pieces).map(|piece| piece as f64 / pieces as f64));
        stops.sort_by(f64::total_cmp);
        stops.dedup_by(|a, b| (*a - *b).abs() < 1e-6);
        fine.extend(stops.into_iter().map(|share| from.lerp(to, share)));
    }
    Some(fine)
}

/// What of a polygon lies ahead of `x` (Sutherland and Hodgman 1974, for one edge).
fn ahead_of(points: &[Point], x: f64) -> Vec<Point> {
    let mut kept = Vec::with_capacity(points.len() + 2);
    for (i, &a) in points.iter().enumerate() {
        let b = points[(i + 1) % points.len()];
        if a.x <= x {
            kept.push(a);
        }
        if (a.x < x && b.x > x) || (a.x > x && b.x < x) {
            // Exactly on the cut, by which the web is known.
            kept.push(Point::new(x, a.lerp(b, (x - a.x) / (b.x - a.x)).y));
        }
    }
    kept
}

/// From a corner of the outline to the corner of the core that belongs to it.
fn depth(outline: &[Point], i: usize, [before, after]: [f64; 2]) -> Vec2 {
    let count = outline.len();
    let here = outline[i];
    let into = (here - outline[(i + count - 1) % count]).normalize();
    let out = (outline[(i + 1) % count] - here).normalize();
    let turn = into.cross(out).atan2(into.dot(out));
    if turn > SHARP {
        return Vec2::ZERO;
    }
    // Where both inner faces meet; along a smooth stretch that is square to it.
    let (n, m) = (into.turn_90(), out.turn_90());
    let det = n.cross(m);
    let mitre = if det.abs() < 0.3 {
        let middle = n + m;
        0.5 * (before + after) * 2.0 / middle.hypot2() * middle
    } else {
        Vec2::new(before * m.y - after * n.y, after * n.x - before * m.x) / det
    };
    let length = mitre.hypot();
    if length <= 0.0 {
        return Vec2::ZERO;
    }
    let room = 0.5 * across(outline, i, mitre / length);
    if length > room { mitre * (room / length) } else { mitre }
}

/// How far the other side lies from a corner in a direction.
fn across(outline: &[Point], i: usize, direction: Vec2) -> f64 {
    let count = outline.len();
    let here = outline[i];
    let mut nearest = f64::INFINITY;
    // The two sides that meet in the corner are left out.
    for step in 1..count - 1 {
        let (a, b) = (outline[(i + step) % count] - here, outline[(i + step + 1) % count] - here);
        let (left, right) = (direction.cross(a), direction.cross(b));
        if (left > 0.0) != (right > 0.0) {
            let share = left / (left - right);
            let reach = direction.dot(a + share * (b - a));
            if reach > 0.0 {
                nearest = nearest.min(reach);
            }
        }
    }
    nearest
}

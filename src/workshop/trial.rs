//! A trial of the printed pieces: closed on the part that they are made for, how near they come.
//!
//! The pieces are taken as they will be printed, cut level, and the part from its equations, so that
//! whatever was lost on the way between the two shows.

use super::cradle::on_board;
use super::{Cradle, Half};
use crate::geometry::{Curve, Point, Solid};

/// How a mask or a cradle closes on its part.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Fit {
    /// The least gap between them, mm; negative where one runs into the other.
    pub least: f64,
    /// The greatest, mm.
    pub greatest: f64,
}

/// Places along each smooth piece of the part's outline.
const PLACES: usize = 300;
/// Places along the line that closes a blunt trailing edge.
const BASE_PLACES: usize = 12;
/// Two pieces this near to each other touch there, or a joint has its play, mm.
const TOUCHING: f64 = 0.3;

/// Closes the pieces of a mask, which lie in the frame of the part, on it.
///
/// `reach`: how far from the part the opening can lie at most, mm; what is further away belongs to the
/// outside of the mask.
#[must_use]
pub fn close_mask<'a, C: Curve + ?Sized>(
    part: &C,
    pieces: impl Iterator<Item = &'a Solid>,
    reach: f64,
) -> Fit {
    let cuts: Vec<Vec<[Point; 2]>> = pieces.map(|piece| piece.level_cut(0.5 * piece.size()[2])).collect();
    let outline = along(part);
    let sides: Vec<[Point; 2]> = cuts.iter().flatten().copied().collect();
    let masks = Near::to(&sides);
    let mut fit = Fit { least: f64::INFINITY, greatest: 0.0 };
    let mut note = |gap: f64| fit = Fit { least: fit.least.min(gap), greatest: fit.greatest.max(gap) };
    for &point in &outline {
        note(masks.signed(point));
    }
    // The other way round: no hollow in the opening that the part does not see. Parting faces touch the
    // next piece and are no opening.
    let part_sides: Vec<[Point; 2]> =
        (0..outline.len()).map(|i| [outline[i], outline[(i + 1) % outline.len()]]).collect();
    let part = Near::to(&part_sides);
    for (i, cut) in cuts.iter().enumerate() {
        let others: Vec<[Point; 2]> = cuts
            .iter()
            .enumerate()
            .filter(|(j, _)| *j != i)
            .flat_map(|(_, cut)| cut.iter().copied())
            .collect();
        let others = Near::to(&others);
        for side in cut {
            let middle = side[0].midpoint(side[1]);
            let gap = part.distance(middle);
            if gap <= reach && others.distance(middle) > TOUCHING {
                note(gap);
            }
        }
    }
    fit
}

/// Lays a part into its cradle at one place of the span.
///
/// `outline`: the part's outline there, in the foil's axes; `face`: the face that the cradle holds;
/// `board`: as of the cradle. The greatest gap is that of the face itself, without what stands upright at
/// nose and tail, where the rims begin.
#[must_use]
pub fn lay_in_cradle(outline: &[Point], at: f64, face: Half, board: f64, cradle: &Cradle) -> Fit {
    let flat = |p: Point| on_board(p, at, face, board);
    let place = flat(Point::ORIGIN)[1];
    let sides: Vec<[Point; 2]> = cradle.pieces.iter().flat_map(|piece| piece.upright_cut(place)).collect();
    let blocks = Near::to(&sides);
    let points: Vec<Point> = outline
        .iter()
        .map(|&p| {
            let [x, _, z] = flat(p);
            Point::new(x, z)
        })
        .collect();
    let nose = points.iter().map(|p| p.x).fold(f64::INFINITY, f64::min);
    let tail = points.iter().map(|p| p.x).fold(f64::NEG_INFINITY, f64::max);
    let count = points.len();
    let mut fit = Fit { least: f64::INFINITY, greatest: 0.0 };
    for (i, &point) in points.iter().enumerate() {
        let gap = blocks.signed(point);
        fit.least = fit.least.min(gap);
        // Turned over or not, the face that lies in the cradle looks down: there x grows along an
        // outline that runs anticlockwise, and falls along one that was turned.
        let onwards = points[(i + 1) % count].x - points[(i + count - 1) % count].x;
        let looks_down = if face == Half::Lower { onwards > 0.0 } else { onwards < 0.0 };
        let is_face = point.x > nose + UPRIGHT && point.x < tail - UPRIGHT;
        if looks_down && is_face {
            fit.greatest = fit.greatest.max(gap);
        }
    }
    fit
}

/// How far from nose and tail a face begins, mm.
const UPRIGHT: f64 = 1.5;

/// Points along a closed curve, and along the line that closes it.
pub fn along<C: Curve + ?Sized>(curve: &C) -> Vec<Point> {
    let breaks = curve.breaks();
    let mut points = Vec::new();
    for ends in breaks.windows(2) {
        let at = |i: usize| ends[0] + (ends[1] - ends[0]) * i as f64 / PLACES as f64;
        points.extend((0..PLACES).map(|i| curve.jet(at(i)).point));
    }
    if let (Some(&first), Some(&last)) = (breaks.first(), breaks.last()) {
        let (from, to) = (curve.jet(last).point, curve.jet(first).point);
        points.extend((0..BASE_PLACES).map(|i| from.lerp(to, i as f64 / BASE_PLACES as f64)));
    }
    points
}

/// Sides of the cuts of closed solids in upright bands, so that those near a point are found quickly.
struct Near<'a> {
    sides: &'a [[Point; 2]],
    left: f64,
    band: f64,
    bands: Vec<Vec<usize>>,
}

/// Bands that the width is parted into.
const BANDS: usize = 128;

impl<'a> Near<'a> {
    fn to(sides: &'a [[Point; 2]]) -> Self {
        let all = || sides.iter().flatten().map(|p| p.x);
        let (left, right) = (all().fold(f64::INFINITY, f64::min), all().fold(f64::NEG_INFINITY, f64::max));
        let band = ((right - left) / BANDS as f64).max(1e-6);
        let mut near = Self { sides, left, band, bands: vec![Vec::new(); BANDS] };
        for (i, [a, b]) in sides.iter().enumerate() {
            for band in near.band_of(a.x.min(b.x))..=near.band_of(a.x.max(b.x)) {
                near.bands[band].push(i);
            }
        }
        near
    }

    fn band_of(&self, x: f64) -> usize {
        (((x - self.left) / self.band).max(0.0) as usize).min(BANDS - 1)
    }

    /// Distance from the nearest side.
    fn distance(&self, point: Point) -> f64 {
        let middle = self.band_of(point.x);
        let mut best = f64::INFINITY;
        for out in 0..BANDS {
            // Bands further away hold nothing nearer.
            if best < (out as f64 - 1.0) * self.band {
                break;
            }
            let bands = [middle.checked_sub(out), (out > 0).then_some(middle + out)];
            for &i in bands.into_iter().flatten().filter_map(|band| self.bands.get(band)).flatten() {
                let [a, b] = self.sides[i];
                let chord = b - a;
                let share = ((point - a).dot(chord) / chord.hypot2().max(f64::MIN_POSITIVE)).clamp(0.0, 1.0);
                best = best.min(point.distance(a + share * chord));
            }
        }
        best
    }

    /// The same, negative within the solid.
    fn signed(&self, point: Point) -> f64 {
        let distance = self.distance(point);
        if self.is_within(point) { -distance } else { distance }
    }

    /// Whether a point lies within, by the sides above it.
    fn is_within(&self, point: Point) -> bool {
        let above = |i: &&usize| {
            let [a, b] = self.sides[**i];
            (a.x > point.x) != (b.x > point.x) && point.y < a.y + (point.x - a.x) / (b.x - a.x) * (b.y - a.y)
        };
        self.bands[self.band_of(point.x)].iter().filter(above).count() % 2 == 1
    }
}

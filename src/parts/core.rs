//! The core: the finished section less its skin.

use super::{Laminate, PartError};
use crate::geometry::{Curve, Jet, Point, Vec2, polygon};
use crate::section::Side;
use crate::wing::StationShape;

/// The outline of the wood at one station, in the frame of the finished one, mm: every point of it
/// lies the skin's thickness inside of the finished surface, measured square to that surface.
///
/// As a [`Curve`] it runs from where the wood ends at the trailing edge along the upper side, over
/// the nose, and back along the lower side. Where both skins meet, ahead of the trailing edge and
/// at a nose that is sharper than its skin is thick, the wood ends in an edge and what lies beyond
/// is laminate alone.
#[derive(Debug, Clone)]
pub struct Core<'a> {
    shape: &'a StationShape<'a>,
    laminate: &'a Laminate,
    /// Parameters of the finished outline at which the wood ends behind: upper, lower.
    tail: [f64; 2],
    /// The same at the nose, both nought where the wood goes round it; both may lie on one side, where it
    /// folds beside the nose.
    nose: [f64; 2],
}

/// Points along each side at which the skins are looked at.
const LOOKS: usize = 600;
/// Parameter from the nose up to which a fold about it is looked for: 20 % of the chord.
const NOSE: f64 = 0.45;
/// Share of the parameter by which derivatives of the spanwise lean are taken.
const STEP: f64 = 1e-5;

impl<'a> Core<'a> {
    /// The core of a station.
    ///
    /// # Errors
    /// When the skins leave no wood, or the core folds.
    pub fn of(shape: &'a StationShape<'a>, laminate: &'a Laminate) -> Result<Self, PartError> {
        let mut core = Self { shape, laminate, tail: [-1.0, 1.0], nose: [0.0, 0.0] };
        let is_wood = |[upper, lower]: [f64; 2]| {
            let (a, b) = (core.inside(upper).point, core.inside(lower).point);
            a.y > b.y && core.stretch(upper) > 0.0 && core.stretch(lower) > 0.0
        };
        // Wood lies between two crossings of the inner faces, or one and an end, where the upper one is above.
        let ends: Vec<[f64; 2]> =
            std::iter::once([0.0; 2]).chain(core.crossings()).chain([[-1.0, 1.0]]).collect();
        let stretches = ends.windows(2).map(|pair| [pair[0], pair[1]]);
        let wooden = stretches.filter(|[a, b]| is_wood([0.5 * (a[0] + b[0]), 0.5 * (a[1] + b[1])]));
        let widest = wooden.max_by(|[a, b], [c, d]| (b[1] - a[1]).total_cmp(&(d[1] - c[1])));
        let Some([nose, tail]) = widest else { return Err(core.none()) };
        (core.nose, core.tail) = (nose, tail);
        if core.nose == [0.0; 2] {
            core.nose = core.fold_at_nose().unwrap_or_default();
        }
        core.refuse_folds()?;
        Ok(core)
    }

    /// The finished shape that the core lies in.
    #[must_use]
    pub fn shape(&self) -> &StationShape<'a> {
        self.shape
    }

    /// What lies over it.
    #[must_use]
    pub fn laminate(&self) -> &Laminate {
        self.laminate
    }

    /// Where the wood ends behind: a point where both skins meet, or the middle of its blunt end.
    #[must_use]
    pub fn tail(&self) -> Point {
        self.inside(self.tail[0]).point.midpoint(self.inside(self.tail[1]).point)
    }

    /// Where the wood begins.
    #[must_use]
    pub fn nose(&self) -> Point {
        self.inside(self.nose[0]).point
    }

    /// Whether both skins meet ahead of the trailing edge, so that it is laminate alone.
    #[must_use]
    pub fn ends_in_laminate(&self) -> bool {
        self.tail[1] < 1.0
    }

    /// The place behind which the wood is thinner than `least` mm, from the nose along the chord;
    /// `None` where it is nowhere so thin.
    #[must_use]
    pub fn thin_behind(&self, least: f64) -> Option<f64> {
        let thickness = |share: f64| {
            let [upper, lower] = [0, 1].map(|i| {
                let from = 0.5 * (self.nose[i] + self.tail[i]);
                self.inside(from + share * (self.tail[i] - from)).point
            });
            (upper.distance(lower), upper.midpoint(lower).x)
        };
        if thickness(1.0).0 >= least {
            return None;
        }
        let (mut thick, mut thin) = (0.0, 1.0);
        for _ in 0..50 {
            let middle = 0.5 * (thick + thin);
            if thickness(middle).0 >= least { thick = middle } else { thin = middle }
        }
        Some(thickness(thin).1)
    }

    /// That there is no wood, with what the skins take up where the section is thickest.
    fn none(&self) -> PartError {
        let height = |share: f64| {
            let [upper, lower] = [-share, share].map(|t| self.shape.jet(t).point);
            upper.distance(lower)
        };
        let shares = (1..LOOKS).map(|i| i as f64 / LOOKS as f64);
        let thickest = shares.max_by(|a, b| height(*a).total_cmp(&height(*b))).unwrap_or(0.5);
        let skins = [-thickest, thickest].map(|t| self.skin(t)[0] * self.lean(t));
        PartError::NoCore { at: self.shape.at, thickest: height(thickest), skins: skins[0] + skins[1] }
    }

    /// Greatest thickness of the wood, mm, between places of equal parameter.
    #[must_use]
    pub fn thickest(&self) -> f64 {
        let thickness = |i: usize| {
            let share = i as f64 / LOOKS as f64;
            self.inside(self.outer(-share)).point.distance(self.inside(self.outer(share)).point)
        };
        (1..LOOKS).map(thickness).fold(0.0, f64::max)
    }

    /// Thickness of the skin in mm, square to the surface, at a parameter of the finished outline,
    /// and its rate.
    fn skin(&self, t: f64) -> [f64; 2] {
        let side = if t < 0.0 { Side::Upper } else { Side::Lower };
        let jet = self.shape.jet(t);
        let [thickness, slope] = self.laminate.thickness(side, self.shape.at, jet.point.x, self.shape.chord);
        [thickness, slope * jet.first.x]
    }

    /// How much longer the skin is in the plane of the section than square to a surface that leans
    /// along the span.
    fn lean(&self, t: f64) -> f64 {
        let normal = self.shape.jet(t).tangent().map_or(Vec2::ZERO, Vec2::turn_90);
        1.0_f64.hypot(self.shape.spread(t).dot(normal))
    }

    /// The point of the core that belongs to a parameter of the finished outline, untrimmed.
    fn inside(&self, t: f64) -> Jet {
        let jet = self.shape.jet(t);
        let speed = jet.first.hypot();
        let along = jet.first / speed;
        // The outline runs anticlockwise, so that its left is inside.
        let inwards = along.turn_90();
        let [skin, rate] = self.skin(t);
        let lean = self.lean(t);
        let lean_rate = {
            let (before, after) = ((t - STEP).max(-1.0), (t + STEP).min(1.0));
            (self.lean(after) - self.lean(before)) / (after - before)
        };
        let depth = skin * lean;
        let depth_rate = rate * lean + skin * lean_rate;
        Jet {
            point: jet.point + depth * inwards,
            first: speed * (1.0 - depth * jet.curvature()) * along + depth_rate * inwards,
            second: Vec2::ZERO,
        }
    }

    /// Share of its length that a piece of the outline keeps in the core; negative where it folds.
    fn stretch(&self, t: f64) -> f64 {
        1.0 - self.skin(t)[0] * self.lean(t) * self.shape.jet(t).curvature()
    }

    /// Parameters of the upper and the lower side at which their inner faces cross, from the nose.
    fn crossings(&self) -> Vec<[f64; 2]> {
        let root = |i: usize| i as f64 / LOOKS as f64;
        let side =
            |sign: f64| -> Vec<Point> { (0..=LOOKS).map(|i| self.inside(sign * root(i)).point).collect() };
        let (upper, lower) = (side(-1.0), side(1.0));
        let mut found: Vec<[f64; 2]> = Vec::new();
        for (i, a) in upper.windows(2).enumerate() {
            let (left, right) = (a[0].x.min(a[1].x), a[0].x.max(a[1].x));
            for (j, b) in lower.windows(2).enumerate() {
                // The two sides begin in one point, which is no crossing.
                if i == 0 && j == 0 || b[0].x.max(b[1].x) < left || b[0].x.min(b[1].x) > right {
                    continue;
                }
                if let Some((u, v)) = crossing([a[0], a[1]], [b[0], b[1]]) {
                    let guess = [-(root(i) + u / LOOKS as f64), root(j) + v / LOOKS as f64];
                    found.extend(self.met(guess, [[-1.0, 0.0], [0.0, 1.0]]));
                }
            }
        }
        found.sort_by(|a, b| a[1].total_cmp(&b[1]));
        found.dedup_by(|a, b| (a[1] - b[1]).abs() < 1e-6);
        found
    }

    /// Parameters between which the inner face runs back on itself about the nose, as where it bends there
    /// more sharply than the skin is thick: the fold that is trimmed.
    fn fold_at_nose(&self) -> Option<[f64; 2]> {
        let step = NOSE / LOOKS as f64;
        let at = |i: usize| step * (i as f64 - LOOKS as f64);
        let folded: Vec<usize> = (0..=2 * LOOKS).filter(|&i| self.stretch(at(i)) <= 0.0).collect();
        let (first, last) = (*folded.first()?, *folded.last()?);
        let line: Vec<Point> = (0..=2 * LOOKS).map(|i| self.inside(at(i)).point).collect();
        // The branch before the fold and the one after it, from the fold outwards.
        for i in (0..first).rev() {
            for j in last..2 * LOOKS {
                if let Some((u, v)) = crossing([line[i], line[i + 1]], [line[j], line[j + 1]]) {
                    let (a, b) = (at(first), at(last));
                    return self.met([at(i) + u * step, at(j) + v * step], [[-NOSE, a], [b, NOSE]]);
                }
            }
        }
        None
    }

    /// Newton's method from near a crossing of two branches, each within its bounds.
    fn met(&self, guess: [f64; 2], bounds: [[f64; 2]; 2]) -> Option<[f64; 2]> {
        let [mut upper, mut lower] = guess;
        for _ in 0..30 {
            let (a, b) = (self.inside(upper), self.inside(lower));
            let gap = a.point - b.point;
            if gap.hypot() < 1e-10 * self.shape.chord {
                return Some([upper, lower]);
            }
            let det = a.first.cross(-b.first);
            upper = (upper - gap.cross(-b.first) / det).clamp(bounds[0][0], bounds[0][1]);
            lower = (lower - a.first.cross(gap) / det).clamp(bounds[1][0], bounds[1][1]);
            if !(upper.is_finite() && lower.is_finite()) {
                return None;
            }
        }
        None
    }

    /// Refuses an inner face that runs back on itself elsewhere than at the nose. Where the skin's share
    /// of the plane changes fast, as in a tip, it may bend in without doing so.
    fn refuse_folds(&self) -> Result<(), PartError> {
        let sides = [[self.tail[0], self.nose[0]], [self.nose[1], self.tail[1]]];
        let places =
            |[from, to]: [f64; 2]| (0..=LOOKS).map(move |i| from + (to - from) * i as f64 / LOOKS as f64);
        let Some(t) = sides.into_iter().flat_map(places).find(|&t| self.stretch(t) <= 0.0) else {
            return Ok(());
        };
        let mut outline: Vec<Point> =
            sides.into_iter().flat_map(places).map(|t| self.inside(t).point).collect();
        // Ends that are one point are no crossing.
        outline.dedup_by(|a, b| a.distance(*b) < 1e-9);
        if outline.first().zip(outline.last()).is_some_and(|(a, b)| a.distance(*b) < 1e-9) {
            outline.pop();
        }
        polygon::refuse_crossings(&outline).map_err(|_| {
            let jet = self.shape.jet(t);
            let (skin, radius) = (self.skin(t)[0] * self.lean(t), 1.0 / jet.curvature());
            PartError::Folds { at: self.shape.at, x: jet.point.x, skin, radius }
        })
    }

    /// The parameter of the finished outline that belongs to one of the core: the nose that the wood
    /// does not reach is left out.
    fn outer(&self, t: f64) -> f64 {
        let i = usize::from(t >= 0.0);
        self.nose[i] + t.abs() * (self.tail[i] - self.nose[i])
    }
}

impl Curve for Core<'_> {
    /// The second derivative is left at nought: nothing that follows a core needs it.
    fn jet(&self, t: f64) -> Jet {
        let i = usize::from(t >= 0.0);
        let rate = (self.tail[i] - self.nose[i]).abs();
        let jet = self.inside(self.outer(t));
        Jet { first: rate * jet.first, ..jet }
    }

    fn breaks(&self) -> Vec<f64> {
        let mut outer = self.shape.breaks();
        for x in self.laminate.edges(self.shape.chord) {
            outer.extend(self.shape.roots_at(x));
        }
        let mut breaks: Vec<f64> = outer
            .into_iter()
            .filter_map(|t| {
                // What lies between the two ends at the nose is trimmed.
                let i = usize::from(t > self.nose[0]);
                let share = (t - self.nose[i]) / (self.tail[i] - self.nose[i]);
                (share > 1e-9 && share < 1.0 - 1e-9).then(|| if i == 0 { -share } else { share })
            })
            .chain([-1.0, 0.0, 1.0])
            .collect();
        breaks.sort_by(f64::total_cmp);
        breaks.dedup_by(|a, b| (*a - *b).abs() < 1e-9);
        breaks
    }
}

/// Shares of two segments at which they cross.
fn crossing(a: [Point; 2], b: [Point; 2]) -> Option<(f64, f64)> {
    let (da, db, gap) = (a[1] - a[0], b[1] - b[0], b[0] - a[0]);
    let det = da.cross(db);
    let (u, v) = (gap.cross(db) / det, gap.cross(da) / det);
    let inside = |share: f64| (0.0..=1.0).contains(&share);
    (inside(u) && inside(v)).then_some((u, v))
}

//! The foil seen from above.

use super::Wing;
use crate::geometry::{Point, polygon};

/// The outline of the foil seen along z, and what it measures. Millimetres; x along the span,
/// y aft of the root's quarter chord.
#[derive(Debug, Clone, PartialEq)]
pub struct Planform {
    /// Corners of the leading edge from the root to the tip.
    pub leading: Vec<Point>,
    /// Corners of the trailing edge from the root to the tip.
    pub trailing: Vec<Point>,
    mirrored: bool,
}

impl Wing {
    /// The planform. Leading and trailing edges are the lofted noses and trailing edges, straight
    /// from station to station; those of a rounded tip in short straight pieces.
    #[must_use]
    pub fn planform(&self) -> Planform {
        let edges = |at: f64| {
            self.shape_at(at).ok().map(|shape| {
                let aft = shape.nose.x + shape.chord * shape.twist.cos();
                (Point::new(at, shape.nose.x), Point::new(at, aft))
            })
        };
        let (leading, trailing) = self.even_places().into_iter().filter_map(edges).unzip();
        Planform { leading, trailing, mirrored: self.is_mirrored() }
    }
}

impl Planform {
    /// The whole outline, both halves of a mirrored foil.
    #[must_use]
    pub fn outline(&self) -> Vec<Point> {
        let half: Vec<Point> = self.leading.iter().chain(self.trailing.iter().rev()).copied().collect();
        if !self.mirrored {
            return half;
        }
        // The root's two corners lie on the mirror line: drop them from both halves.
        let inner = &half[1..half.len() - 1];
        let other = inner.iter().rev().map(|p| Point::new(-p.x, p.y));
        let (front, back) = (self.leading[0], self.trailing[0]);
        std::iter::once(front).chain(inner.iter().copied()).chain([back]).chain(other).collect()
    }

    /// Whether both halves of a mirrored foil are meant.
    #[must_use]
    pub fn is_mirrored(&self) -> bool {
        self.mirrored
    }

    /// How far aft the leading and the trailing edge lie at `at` mm from the root.
    #[must_use]
    pub fn edges(&self, at: f64) -> (f64, f64) {
        let along = |edge: &[Point]| {
            let pair = edge.windows(2).find(|pair| at <= pair[1].x).or(edge.windows(2).last());
            pair.map_or(0.0, |pair| {
                let fraction = (at - pair[0].x) / (pair[1].x - pair[0].x);
                pair[0].y + fraction * (pair[1].y - pair[0].y)
            })
        };
        (along(&self.leading), along(&self.trailing))
    }

    /// Area of the whole foil in mm².
    #[must_use]
    pub fn area(&self) -> f64 {
        polygon::area(&self.outline()).abs()
    }

    /// Area in mm² of one half, or of a foil that is all of a piece, from `from` to `to` mm along the
    /// span.
    #[must_use]
    pub fn area_between(&self, from: f64, to: f64) -> f64 {
        let mut places: Vec<f64> =
            self.leading.iter().map(|p| p.x).filter(|at| from < *at && *at < to).collect();
        places.insert(0, from);
        places.push(to);
        let chord = |at: f64| {
            let (front, back) = self.edges(at);
            back - front
        };
        places.windows(2).map(|pair| 0.5 * (pair[1] - pair[0]) * (chord(pair[0]) + chord(pair[1]))).sum()
    }

    /// Tip to tip, mm.
    #[must_use]
    pub fn span(&self) -> f64 {
        let reach = self.leading.last().map_or(0.0, |p| p.x);
        if self.mirrored { 2.0 * reach } else { reach }
    }

    /// Span² over area.
    #[must_use]
    pub fn aspect_ratio(&self) -> f64 {
        self.span().powi(2) / self.area()
    }

    /// Area over span, mm.
    #[must_use]
    pub fn mean_chord(&self) -> f64 {
        self.area() / self.span()
    }

    /// Mean aerodynamic chord, mm: ∫ c² dy over the area.
    #[must_use]
    pub fn aerodynamic_chord(&self) -> f64 {
        let [area, square, _] = self.chord_moments();
        square / area
    }

    /// How far the aerodynamic centre lies aft of the root's quarter chord, mm, taken at the quarter
    /// of every chord; flow along the span and the free surface move it.
    ///
    /// Source: the usual strip rule, as in Abbott and von Doenhoff, "Theory of Wing Sections" (1959),
    /// chapter 1.
    #[must_use]
    pub fn aerodynamic_centre(&self) -> f64 {
        let [area, _, moment] = self.chord_moments();
        moment / area
    }

    /// ∫ c dy, ∫ c² dy and ∫ x c dy of one half, x the quarter chord; exact between straight edges.
    fn chord_moments(&self) -> [f64; 3] {
        let strip = |i: usize| {
            let (front, back) = (self.leading[i], self.trailing[i]);
            let chord = back.y - front.y;
            (front.x, chord, front.y + 0.25 * chord)
        };
        let mut sums = [0.0; 3];
        for i in 1..self.leading.len() {
            let ((y0, c0, x0), (y1, c1, x1)) = (strip(i - 1), strip(i));
            let (step, c, x) = (y1 - y0, 0.5 * (c0 + c1), 0.5 * (x0 + x1));
            // Simpson's rule, exact for these.
            let simpson = |first: f64, middle: f64, last: f64| step * (first + 4.0 * middle + last) / 6.0;
            sums[0] += step * c;
            sums[1] += simpson(c0 * c0, c * c, c1 * c1);
            sums[2] += simpson(x0 * c0, x * c, x1 * c1);
        }
        sums
    }

    /// Tip chord over root chord, as seen from above.
    #[must_use]
    pub fn taper(&self) -> f64 {
        let chord = |i: usize| self.trailing[i].y - self.leading[i].y;
        chord(self.leading.len() - 1) / chord(0)
    }
}

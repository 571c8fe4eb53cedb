//! Thickness forms: how the half thickness runs from nose to trailing edge.

/// How the trailing edge of a published form is finished.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default, Hash, serde::Serialize)]
#[serde(rename_all = "lowercase")]
pub enum TrailingEdge {
    /// Open by 0.21 % of chord for each 10 % of thickness, as the published equation leaves it.
    #[default]
    Published,
    /// Brought to a sharp edge at x = 1 by the last coefficient alone.
    Closed,
}

impl TrailingEdge {
    /// The word a user writes for it.
    #[must_use]
    pub fn word(self) -> &'static str {
        match self {
            Self::Published => "published",
            Self::Closed => "closed",
        }
    }
}

/// Half thickness over x in [0, 1] as a polynomial in the square root of x.
///
/// Source: Jacobs, Ward and Pinkerton, NACA Report 460 (1933); the last coefficient of the closed
/// edge is chosen so that the five add up to nothing.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct ThicknessForm {
    /// Nominal thickness, a fraction of the chord.
    thickness: f64,
    trailing_edge: TrailingEdge,
}

/// Coefficients of x^1/2, x, x², x³, x⁴ for a nominal thickness of one.
const PUBLISHED: [f64; 5] = [1.4845, -0.6300, -1.7580, 1.4215, -0.5075];
const CLOSED: [f64; 5] = [1.4845, -0.6300, -1.7580, 1.4215, -0.5180];

impl ThicknessForm {
    /// The four- and five-digit form of nominal thickness `thickness` (fraction of chord).
    #[must_use]
    pub fn new(thickness: f64, trailing_edge: TrailingEdge) -> Self {
        Self { thickness, trailing_edge }
    }

    /// How the trailing edge is finished.
    #[must_use]
    pub fn trailing_edge(&self) -> TrailingEdge {
        self.trailing_edge
    }

    /// Half thickness at x = `root`², with its first and second derivatives with respect to
    /// `root` (the square root of x), which stay finite through the nose. `root` in [0, 1].
    #[must_use]
    pub fn half_at_root(&self, root: f64) -> [f64; 3] {
        let [a, b, c, d, e] = match self.trailing_edge {
            TrailingEdge::Published => PUBLISHED,
            TrailingEdge::Closed => CLOSED,
        };
        let (r, x) = (root, root * root);
        let value = r * (a + r * (b + x * (c + x * (d + x * e))));
        let first = a + r * (2.0 * b + x * (4.0 * c + x * (6.0 * d + x * 8.0 * e)));
        let second = 2.0 * b + x * (12.0 * c + x * (30.0 * d + x * 56.0 * e));
        [value, first, second].map(|v| v * self.thickness)
    }

    /// Radius of the nose circle of the form, as tabulated with it: a fraction of the chord.
    ///
    /// y² → 2 r x at the nose, so r is half the square of the first coefficient: 1.1019 t².
    #[must_use]
    pub fn nose_radius(&self) -> f64 {
        (PUBLISHED[0] * self.thickness).powi(2) / 2.0
    }
}

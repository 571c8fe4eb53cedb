//! Thickness forms: how the half thickness runs from nose to trailing edge.

use super::{EquationError, Equations};

/// How the trailing edge of a published form is finished.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default, Hash, serde::Serialize)]
#[serde(rename_all = "lowercase")]
pub enum TrailingEdge {
    /// Open, as the published equation leaves it: by 2.1 % of the thickness for the four-digit
    /// form, by 2 % for the modified one.
    #[default]
    Published,
    /// Brought to a sharp edge at x = 1.
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

/// Half thickness over x in [0, 1].
#[derive(Debug, Clone, PartialEq)]
pub struct ThicknessForm {
    /// Nominal thickness, a fraction of the chord.
    thickness: f64,
    trailing_edge: TrailingEdge,
    law: Law,
}

/// Half thickness for a nominal thickness of one.
#[derive(Debug, Clone, PartialEq)]
enum Law {
    /// Coefficients of √x, x, x², x³, x⁴.
    FourDigit([f64; 5]),
    Modified {
        /// Where the two pieces join, at the greatest thickness.
        joint: f64,
        /// Coefficients of √x, x, x², x³ ahead of it.
        fore: [f64; 4],
        /// Coefficients of 1, (1 - x), (1 - x)², (1 - x)³ behind it.
        aft: [f64; 4],
    },
    /// The user's own full thickness; the nominal thickness is a half then.
    Equations(Equations),
}

/// The coefficient of √x that gives the usual nose, for a nominal thickness of one.
const NOSE: f64 = 1.4845;

/// Slope of the modified form at its trailing edge (`d1`) for a thickness of 0.2, by the position
/// of the greatest thickness. NACA Report 492, from memory.
const EDGE_SLOPE: [(f64, f64); 5] = [(0.2, 0.200), (0.3, 0.234), (0.4, 0.315), (0.5, 0.465), (0.6, 0.700)];

impl ThicknessForm {
    /// The four- and five-digit form of nominal thickness `thickness` (fraction of chord).
    ///
    /// Source: Jacobs, Ward and Pinkerton, NACA Report 460 (1933); the last coefficient of the
    /// closed edge is chosen so that the five add up to nothing.
    #[must_use]
    pub fn four_digit(thickness: f64, trailing_edge: TrailingEdge) -> Self {
        let last = match trailing_edge {
            TrailingEdge::Published => -0.5075,
            TrailingEdge::Closed => -0.5180,
        };
        Self { thickness, trailing_edge, law: Law::FourDigit([NOSE, -0.6300, -1.7580, 1.4215, last]) }
    }

    /// The modified form: `nose_index` from 1 to 8, or 9 (6 for the usual nose, 3 for a quarter of
    /// its radius, 9 for three times it), and the greatest thickness at `position`, 0.2 to 0.6 of the
    /// chord. `None` outside these.
    ///
    /// Source: Stack and von Doenhoff, NACA Report 492 (1934). The coefficients are derived here
    /// from its conditions: greatest thickness and no slope at the joint from both sides, equal
    /// curvature there, given nose radius, edge and edge slope. Between the positions for which the
    /// report gives the edge slope it is interpolated (Lagrange's polynomial through all five).
    #[must_use]
    pub fn modified(
        thickness: f64,
        nose_index: f64,
        position: f64,
        trailing_edge: TrailingEdge,
    ) -> Option<Self> {
        if !(0.2..=0.6).contains(&position) {
            return None;
        }
        let d1: f64 = EDGE_SLOPE
            .iter()
            .map(|&(at, slope)| {
                let others = EDGE_SLOPE.iter().filter(|(other, _)| *other != at);
                slope * others.map(|(other, _)| (position - other) / (at - other)).product::<f64>()
            })
            .sum();
        let nose = match nose_index {
            9.0 => NOSE * 3_f64.sqrt(),
            1.0..=8.0 => NOSE * nose_index / 6.0,
            _ => return None,
        };
        // The report's conditions are for a thickness of 0.2, five times less than one.
        let d1 = 5.0 * d1;
        let d0 = match trailing_edge {
            TrailingEdge::Published => 0.01,
            TrailingEdge::Closed => 0.0,
        };
        let joint = position;
        let s = 1.0 - joint;
        let d2 = (3.0 * (0.5 - d0) - 2.0 * s * d1) / (s * s);
        let d3 = (s * d1 - 2.0 * (0.5 - d0)) / (s * s * s);
        let curvature = 2.0 * d2 + 6.0 * d3 * s;

        // Ahead of the joint: value v, slope and curvature that the cubic part has to make up.
        let (m, root) = (joint, joint.sqrt());
        let v = 0.5 - nose * root;
        let slope = -0.5 * nose / root;
        let bend = curvature + 0.25 * nose / (m * root);
        let a3 = (v - m * slope + 0.5 * m * m * bend) / (m * m * m);
        let a2 = 0.5 * bend - 3.0 * a3 * m;
        let a1 = slope - 2.0 * a2 * m - 3.0 * a3 * m * m;
        let law = Law::Modified { joint, fore: [nose, a1, a2, a3], aft: [d0, d1, d2, d3] };
        Some(Self { thickness, trailing_edge, law })
    }

    /// A form from expressions for the full thickness over x, both fractions of the chord.
    ///
    /// # Errors
    /// With the place, when it is not finite or not smooth, steps, is negative, nought or too
    /// great, or has no round nose.
    pub fn from_equations(equations: Equations) -> Result<Self, EquationError> {
        equations.refuse_as_thickness()?;
        let open = equations.at_root(1.0).value() > 1e-9;
        let trailing_edge = if open { TrailingEdge::Published } else { TrailingEdge::Closed };
        Ok(Self { thickness: 0.5, trailing_edge, law: Law::Equations(equations) })
    }

    /// How the trailing edge is finished; of expressions, whether they close it.
    #[must_use]
    pub fn trailing_edge(&self) -> TrailingEdge {
        self.trailing_edge
    }

    /// The word for the trailing edge: `published`, `closed`, or `open` for the user's own.
    #[must_use]
    pub fn edge_word(&self) -> &'static str {
        match (&self.law, self.trailing_edge) {
            (Law::Equations(_), TrailingEdge::Published) => "open",
            (_, edge) => edge.word(),
        }
    }

    /// Half thickness at x = `root`², with its first and second derivatives with respect to
    /// `root` (the square root of x), which stay finite through the nose. `root` in [0, 1].
    #[must_use]
    pub fn half_at_root(&self, root: f64) -> [f64; 3] {
        let (r, x) = (root, root * root);
        let values = match self.law {
            Law::Equations(ref equations) => {
                let [value, first, second, _] = equations.at_root(r).derivatives();
                [value, first, second]
            }
            Law::FourDigit([a, b, c, d, e]) => [
                r * (a + r * (b + x * (c + x * (d + x * e)))),
                a + r * (2.0 * b + x * (4.0 * c + x * (6.0 * d + x * 8.0 * e))),
                2.0 * b + x * (12.0 * c + x * (30.0 * d + x * 56.0 * e)),
            ],
            Law::Modified { joint, fore: [a, b, c, d], .. } if x < joint => [
                r * (a + r * (b + x * (c + x * d))),
                a + r * (2.0 * b + x * (4.0 * c + x * 6.0 * d)),
                2.0 * b + x * (12.0 * c + x * 30.0 * d),
            ],
            Law::Modified { aft: [d0, d1, d2, d3], .. } => {
                let u = 1.0 - x;
                let (first, second) = (d1 + u * (2.0 * d2 + u * 3.0 * d3), 2.0 * d2 + u * 6.0 * d3);
                [d0 + u * (d1 + u * (d2 + u * d3)), -2.0 * r * first, -2.0 * first + 4.0 * x * second]
            }
        };
        values.map(|v| v * self.thickness)
    }

    /// Where the form changes from one piece to the next, ascending and strictly inside (0, 1).
    #[must_use]
    pub fn joints(&self) -> Vec<f64> {
        match &self.law {
            Law::FourDigit(_) => Vec::new(),
            Law::Modified { joint, .. } => vec![*joint],
            Law::Equations(equations) => equations.joints().to_vec(),
        }
    }

    /// Radius of the nose circle of the form, as tabulated with it: a fraction of the chord.
    ///
    /// y² → 2 r x at the nose, so r is half the square of the first coefficient: 1.1019 t² for the
    /// usual nose.
    #[must_use]
    pub fn nose_radius(&self) -> f64 {
        let nose = match &self.law {
            Law::FourDigit([nose, ..]) | Law::Modified { fore: [nose, ..], .. } => *nose,
            Law::Equations(equations) => equations.at_root(0.0).derivatives()[1],
        };
        (nose * self.thickness).powi(2) / 2.0
    }
}

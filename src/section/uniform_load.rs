//! The a = 0 … 1 mean lines: load uniform from the nose to x = a, then falling evenly to nothing at
//! the trailing edge.
//!
//! Source: Abbott, von Doenhoff and Stivers, NACA Report 824 (1945), equations of the mean lines.

use std::f64::consts::PI;

use super::Ordinate;

/// A mean line of that family.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct UniformLoad {
    a: f64,
    design_lift: f64,
}

/// The exact line is infinitely steep at its nose (and a = 1 at its trailing edge), where nothing
/// can be laid off across it; the published practice takes the slope at 0.5 % of chord there. From
/// the end to this station a cubic stands in that joins with the same height, slope and curvature
/// and goes through the end itself. It strays from the line by no more than 0.0001 of chord at a
/// design lift of one, and takes 2.4 % (a = 0) to 1.3 % (a = 0.8) off the lift of the thin line.
const END: f64 = 0.005;
/// Nearest approach to x = a and x = 1 in the logarithms of the curvature, which has no limit there.
const CLEAR: f64 = 1e-7;

impl UniformLoad {
    /// The line of that `a` for a section lift coefficient of `design_lift` at its ideal angle.
    /// `None` unless `a` is 0, or lies from 0.02 to 1, and both are finite.
    #[must_use]
    pub fn new(a: f64, design_lift: f64) -> Option<Self> {
        let known = a == 0.0 || (0.02..=1.0).contains(&a);
        (known && design_lift.is_finite()).then_some(Self { a, design_lift })
    }

    /// Ordinate and derivatives at `x` in [0, 1].
    #[must_use]
    pub fn at(&self, x: f64) -> Ordinate {
        if x < END {
            cubic_from_end(&self.exact(END), x)
        } else if self.a == 1.0 && x > 1.0 - END {
            // The a = 1 line is its own mirror image.
            let mirrored = cubic_from_end(&self.exact(END), 1.0 - x);
            Ordinate { slope: -mirrored.slope, third: -mirrored.third, ..mirrored }
        } else {
            self.exact(x)
        }
    }

    /// Where the line, or the cubic that stands in at an end, meets the next piece.
    #[must_use]
    pub fn joints(&self) -> Vec<f64> {
        match self.a {
            1.0 => vec![END, 1.0 - END],
            0.0 => vec![END],
            a => vec![END, a],
        }
    }

    fn exact(&self, x: f64) -> Ordinate {
        if self.a == 1.0 {
            let k = self.design_lift / (4.0 * PI);
            let u = 1.0 - x;
            return Ordinate {
                y: -k * (x_log(u) + x_log(x)),
                slope: k * (u.ln() - x.ln()),
                second: -k * (1.0 / u + 1.0 / x),
                third: k * (1.0 / (x * x) - 1.0 / (u * u)),
            };
        }
        let a = self.a;
        let share = 1.0 / (1.0 - a);
        let square_log = |v: f64| v * x_log(v);
        let g = -share * (0.5 * square_log(a) - 0.25 * a * a + 0.25);
        let h = share * (0.5 * square_log(1.0 - a) - 0.25 * (1.0 - a).powi(2)) + g;
        let (u, d) = (1.0 - x, a - x);
        let k = self.design_lift / (2.0 * PI * (a + 1.0));
        let (clear_u, clear_d) = (u.max(CLEAR), if d.abs() < CLEAR { CLEAR.copysign(d) } else { d });
        let bent = 0.5 * d * d.signum() * x_log(d.abs()) - 0.5 * square_log(u) + 0.25 * u * u - 0.25 * d * d;
        Ordinate {
            y: k * (share * bent - x_log(x) + g - h * x),
            slope: k * (share * (x_log(u) - d.signum() * x_log(d.abs())) - x.ln() - 1.0 - h),
            second: k * (share * (clear_d.abs().ln() - clear_u.ln()) - 1.0 / x),
            third: k * (share * (1.0 / clear_u - 1.0 / clear_d) + 1.0 / (x * x)),
        }
    }
}

/// v ln v with its limit at nought.
fn x_log(v: f64) -> f64 {
    if v > 0.0 { v * v.ln() } else { 0.0 }
}

/// The cubic through the end (0, 0) that joins `at` at x = [`END`] with the same height, slope and
/// curvature.
fn cubic_from_end(at: &Ordinate, x: f64) -> Ordinate {
    let e = END;
    // p x + q x² + r x³ from the three conditions.
    let r = (at.y - e * at.slope + 0.5 * e * e * at.second) / (e * e * e);
    let q = 0.5 * at.second - 3.0 * r * e;
    let p = at.slope - 2.0 * q * e - 3.0 * r * e * e;
    Ordinate {
        y: x * (p + x * (q + x * r)),
        slope: p + x * (2.0 * q + x * 3.0 * r),
        second: 2.0 * q + 6.0 * r * x,
        third: 6.0 * r,
    }
}

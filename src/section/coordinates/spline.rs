//! Splines of the fifth degree over the root of the station, and their least squares.

use std::sync::Arc;

/// Degree of the splines: four derivatives are continuous.
const DEGREE: usize = 5;
/// Coefficients that act at one place.
const WIDTH: usize = DEGREE + 1;
/// How often the nose counts as a break. A half thickness with terms in √x and in x, as the
/// published ones have, is a y(t) whose second derivative steps there; the curvature of the
/// outline does not, since it hangs on the slope alone where x' = 2t is nought.
const NOSE_FOLD: usize = 4;

/// Both surfaces of a section as one smooth function y(t) at unit chord.
///
/// `t` runs from -1 (upper trailing edge) over 0 (nose) to 1 (lower trailing edge), x is its
/// square. Four derivatives are continuous but at the nose, where value and slope are; since x' is
/// nought there, the curvature of the outline (t², y(t)) is continuous through the nose as well.
/// `y(0)` is nought, and so is the sum of the two ends.
#[derive(Debug, Clone, PartialEq)]
pub struct FittedSurfaces {
    knots: Arc<[f64]>,
    /// Between two knots: the coefficients of the powers of the distance from the first of them.
    pieces: Arc<[[f64; WIDTH]]>,
}

impl FittedSurfaces {
    /// y, dy/dt and d²y/dt² at `t`, in chords; at 0 those of the lower surface, and beyond -1 and 1 those at the trailing edge.
    #[must_use]
    pub fn at(&self, t: f64) -> [f64; 3] {
        let t = t.clamp(-1.0, 1.0);
        let index = self.knots.partition_point(|knot| *knot <= t).saturating_sub(1);
        let index = index.min(self.pieces.len().saturating_sub(1));
        let (Some(from), Some([a, b, c, d, e, f])) = (self.knots.get(index), self.pieces.get(index)) else {
            return [f64::NAN; 3];
        };
        let h = t - from;
        [
            a + h * (b + h * (c + h * (d + h * (e + h * f)))),
            b + h * (2.0 * c + h * (3.0 * d + h * (4.0 * e + h * 5.0 * f))),
            2.0 * c + h * (6.0 * d + h * (12.0 * e + h * 20.0 * f)),
        ]
    }

    /// The values of `t` between which y is one polynomial: ascending, from -1 to 1, with 0.
    #[must_use]
    pub fn knots(&self) -> &[f64] {
        &self.knots
    }
}

/// The functions that splines over given breaks are made of (the B-splines).
///
/// Source: de Boor, A Practical Guide to Splines (1978), chapter X.
pub(super) struct Basis {
    /// The breaks, the first and the last six-fold.
    knots: Vec<f64>,
}

impl Basis {
    /// Over `breaks`, which ascend strictly and are two at least. Where one of them is nought, only
    /// value and slope are continuous there.
    pub(super) fn new(breaks: &[f64]) -> Self {
        let mut knots = Vec::with_capacity(breaks.len() + 2 * DEGREE + NOSE_FOLD);
        for (i, &at) in breaks.iter().enumerate() {
            let fold = match at {
                _ if i == 0 || i + 1 == breaks.len() => WIDTH,
                0.0 => NOSE_FOLD,
                _ => 1,
            };
            knots.extend(std::iter::repeat_n(at, fold));
        }
        Self { knots }
    }

    pub(super) fn count(&self) -> usize {
        self.knots.len() - WIDTH
    }

    /// The intervals that are more than a point, by the index of their first knot.
    fn intervals(&self) -> impl Iterator<Item = (usize, f64, f64)> + '_ {
        let ends = |span: usize| (span, self.knots[span], self.knots[span + 1]);
        (DEGREE..self.count()).map(ends).filter(|(_, from, to)| from < to)
    }

    /// The interval that holds `t`, as the index of the last function that acts there; outside of
    /// the breaks that at the end.
    pub(super) fn span(&self, t: f64) -> usize {
        let passed = self.knots.partition_point(|knot| *knot <= t);
        passed.saturating_sub(1).clamp(DEGREE, self.count() - 1)
    }

    /// The derivative of order `order` (0 to 5) of the six functions that act on interval `span`.
    pub(super) fn row(&self, span: usize, t: f64, order: usize) -> [f64; WIDTH] {
        let u = &self.knots;
        let mut row = [0.0; WIDTH];
        row[0] = 1.0;
        // Values of the degree that is `order` lower.
        for degree in 1..=DEGREE - order {
            let mut carried = 0.0;
            for r in 0..degree {
                let (right, left) = (u[span + r + 1], u[span + 1 + r - degree]);
                let share = row[r] / (right - left);
                row[r] = carried + (right - t) * share;
                carried = (t - left) * share;
            }
            row[degree] = carried;
        }
        // Each step up in degree differentiates once.
        for degree in DEGREE - order + 1..=DEGREE {
            let mut before = 0.0;
            for (r, value) in row.iter_mut().enumerate().take(degree + 1) {
                let i = span + r - degree;
                let share =
                    if r < degree { degree as f64 * *value / (u[i + degree + 1] - u[i + 1]) } else { 0.0 };
                *value = before - share;
                before = share;
            }
        }
        row
    }

    /// Value of the spline with these coefficients, or of one of its derivatives.
    pub(super) fn value(&self, coefficients: &[f64], t: f64, order: usize) -> f64 {
        let span = self.span(t);
        let row = self.row(span, t, order);
        row.iter().zip(&coefficients[span - DEGREE..=span]).map(|(a, b)| a * b).sum()
    }

    /// Rows whose squares add up to the integral of the squared third derivative, with the
    /// interval of each: three Gauss points are exact there.
    pub(super) fn roughness(&self) -> Vec<(usize, [f64; WIDTH])> {
        let away = 0.6_f64.sqrt();
        let mut rows = Vec::new();
        for (span, from, to) in self.intervals() {
            let (middle, half) = (0.5 * (from + to), 0.5 * (to - from));
            for (at, weight) in [(-away, 5.0 / 9.0), (0.0, 8.0 / 9.0), (away, 5.0 / 9.0)] {
                let scale = (weight * half).sqrt();
                let row = self.row(span, middle + at * half, 3);
                rows.push((span, row.map(|value| value * scale)));
            }
        }
        rows
    }

    /// The spline between -1 and 1, brought to nought at the nose and on the mean of the ends.
    pub(super) fn surfaces(&self, coefficients: &[f64]) -> FittedSurfaces {
        let at = |t| self.value(coefficients, t, 0);
        let nose = at(0.0);
        let tail = 0.5 * (at(-1.0) + at(1.0)) - nose;
        let inner = self.intervals().map(|(_, from, _)| from).filter(|knot| knot.abs() < 1.0 - 1e-9);
        let knots: Vec<f64> = [-1.0].into_iter().chain(inner).chain([1.0]).collect();
        let pieces = knots.windows(2).map(|ends| {
            let (from, span) = (ends[0], self.span(0.5 * (ends[0] + ends[1])));
            let mut factorial = 1.0;
            let mut piece = [0.0; WIDTH];
            for (order, coefficient) in piece.iter_mut().enumerate() {
                factorial *= order.max(1) as f64;
                let row = self.row(span, from, order);
                let sum: f64 = row.iter().zip(&coefficients[span - DEGREE..=span]).map(|(a, b)| a * b).sum();
                *coefficient = sum / factorial;
            }
            piece[0] -= nose + tail * from * from;
            piece[1] -= 2.0 * tail * from;
            piece[2] -= tail;
            piece
        });
        FittedSurfaces { pieces: pieces.collect(), knots: knots.clone().into() }
    }
}

/// One equation of a least-squares problem: six neighbouring coefficients, one unknown common to
/// all equations, and the right-hand side.
#[derive(Clone, Copy)]
pub(super) struct Equation {
    /// Interval, as [`Basis::span`] gives it.
    pub(super) span: usize,
    pub(super) row: [f64; WIDTH],
    pub(super) common: f64,
    pub(super) value: f64,
}

/// Solves equations in the sense of least squares; they come in order of their intervals. Gives
/// the coefficients and the common unknown.
///
/// By rotations (Givens), which keep the accuracy that the normal equations would square away.
pub(super) fn least_squares(count: usize, equations: impl Iterator<Item = Equation>) -> (Vec<f64>, f64) {
    const ALL: usize = WIDTH + 2;
    let mut triangle = vec![[0.0; ALL]; count];
    let mut last = [0.0; 2];
    for equation in equations {
        let mut row = [0.0; ALL];
        row[..WIDTH].copy_from_slice(&equation.row);
        row[WIDTH] = equation.common;
        row[WIDTH + 1] = equation.value;
        for pivot in triangle.iter_mut().skip(equation.span - DEGREE) {
            if row[..WIDTH].iter().all(|value| *value == 0.0) {
                break;
            }
            rotate(pivot, &mut row);
            row.copy_within(1..WIDTH, 0);
            row[WIDTH - 1] = 0.0;
        }
        let mut rest = [row[WIDTH], row[WIDTH + 1]];
        rotate(&mut last, &mut rest);
    }
    let ratio = |value: f64, by: f64| if by == 0.0 { 0.0 } else { value / by };
    let common = ratio(last[1], last[0]);
    let mut solution = vec![0.0; count];
    for (i, row) in triangle.iter().enumerate().rev() {
        let known: f64 = row[1..WIDTH].iter().zip(&solution[(i + 1).min(count)..]).map(|(a, b)| a * b).sum();
        solution[i] = ratio(row[WIDTH + 1] - row[WIDTH] * common - known, row[0]);
    }
    (solution, common)
}

/// Turns two rows so that the first entry of the second vanishes.
fn rotate<const N: usize>(pivot: &mut [f64; N], row: &mut [f64; N]) {
    let length = pivot[0].hypot(row[0]);
    if row[0] == 0.0 || length == 0.0 {
        return;
    }
    let (cos, sin) = (pivot[0] / length, row[0] / length);
    for (p, r) in pivot.iter_mut().zip(row.iter_mut()) {
        (*p, *r) = (cos * *p + sin * *r, cos * *r - sin * *p);
    }
    row[0] = 0.0;
}

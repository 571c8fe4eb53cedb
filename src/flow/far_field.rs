//! One panel's influence on every point of the outline at once, as a series in the inverse
//! distance, in vector registers.
//!
//! Nothing transcendental is evaluated here: the series also gives the step of log r from one
//! node to the next, so logarithms walk along the outline with it. Points near the panel, where
//! the series does not converge fast enough, are left out and named.

use pulp::Simd;

/// Points nearer to the middle of a panel than this many half chords are left out.
pub(super) const NEAR: f64 = 2.2;

/// From this many half chords on the short series is enough.
const FAR: f64 = 6.0;

/// Terms of U in the short and in the long series. The greatest of the terms left out, in the
/// moment F₂, is below 1e-12 at the near end of each, and the moments enter the matrix multiplied
/// by the half chord over 4π: some 1e-3 at most with the usual number of panels.
const SHORT: usize = 6;
const LONG: usize = 17;

/// What a panel is to the loop: all numbers it needs, ready to be spread over the registers.
pub(super) struct PanelConstants {
    /// Middle of the chord.
    pub(super) middle: [f64; 2],
    /// One over the half chord, as a complex number.
    pub(super) inverse: [f64; 2],
    /// Bow as in `Panel`.
    pub(super) bow: f64,
    /// Half the length of the parabola over 4π.
    pub(super) scale: f64,
    /// Weights of four nodes in the bend.
    pub(super) bend: [f64; 4],
}

/// The points, padded so that they fill registers: their number is a multiple of [`LANES`].
pub(super) struct Points<'a> {
    pub(super) x: &'a [f64],
    pub(super) y: &'a [f64],
}

/// Doubles in the widest register there is.
pub(super) const LANES: usize = 8;

/// The points that a panel left out, and room to find them.
pub(super) struct Near {
    pub(super) points: Vec<usize>,
    /// Squares of the distances, in half chords.
    squares: Vec<f64>,
    /// Registers that hold a point for which the long series was used.
    registers: Vec<usize>,
}

impl Near {
    pub(super) fn among(points: usize) -> Self {
        Self { points: Vec::with_capacity(points), squares: vec![0.0; points], registers: vec![0; points] }
    }
}

/// Short names for the arithmetic of one kind of register.
#[derive(Clone, Copy)]
struct Lanes<S: Simd>(S);

impl<S: Simd> Lanes<S> {
    #[inline(always)]
    fn all(self, value: f64) -> S::f64s {
        self.0.splat_f64s(value)
    }
    #[inline(always)]
    fn add(self, a: S::f64s, b: S::f64s) -> S::f64s {
        self.0.add_f64s(a, b)
    }
    #[inline(always)]
    fn sub(self, a: S::f64s, b: S::f64s) -> S::f64s {
        self.0.sub_f64s(a, b)
    }
    #[inline(always)]
    fn mul(self, a: S::f64s, b: S::f64s) -> S::f64s {
        self.0.mul_f64s(a, b)
    }
    /// a b + c
    #[inline(always)]
    fn fma(self, a: S::f64s, b: S::f64s, c: S::f64s) -> S::f64s {
        self.0.mul_add_e_f64s(a, b, c)
    }
    /// c - a b
    #[inline(always)]
    fn fnma(self, a: S::f64s, b: S::f64s, c: S::f64s) -> S::f64s {
        self.0.negate_mul_add_e_f64s(a, b, c)
    }
    /// Complex product.
    #[inline(always)]
    fn product(self, a: [S::f64s; 2], b: [S::f64s; 2]) -> [S::f64s; 2] {
        [self.fnma(a[1], b[1], self.mul(a[0], b[0])), self.fma(a[0], b[1], self.mul(a[1], b[0]))]
    }
}

/// Adds the influence of a panel to the columns of the four nodes around it, and takes `log`
/// from its first node to its second. The points left out go to `near`.
///
/// With p = (z - middle)/half, w = 1/p and L = log((p + 1)/(p - 1)) = 2(w + w³/3 + w⁵/5 + …), the
/// sums S = pL/2 - 1 = w²T, T = 1/3 + w²U and U = 1/5 + w²/7 + … hold every moment of the panel:
/// see `influence::moments`, whose formulas these are.
#[inline(always)]
pub(super) fn add_panel<S: Simd>(
    simd: S,
    panel: &PanelConstants,
    points: &Points,
    log: &mut [f64],
    columns: [&mut [f64]; 4],
    near: &mut Near,
) {
    let v = Lanes(simd);
    let (x, _) = S::as_simd_f64s(points.x);
    let (y, _) = S::as_simd_f64s(points.y);
    let (log, _) = S::as_mut_simd_f64s(log);
    let [c0, c1, c2, c3] = columns.map(|column| S::as_mut_simd_f64s(column).0);

    let [mx, my] = panel.middle.map(|value| v.all(value));
    let inverse = panel.inverse.map(|value| v.all(value));
    let bend = panel.bend.map(|value| v.all(panel.scale * value));
    let scale = v.all(panel.scale);
    let two_bow = v.all(2.0 * panel.bow);
    let (one, two, zero) = (v.all(1.0), v.all(2.0), v.all(0.0));
    let (third, two_thirds, two_ninths) = (v.all(1.0 / 3.0), v.all(2.0 / 3.0), v.all(-2.0 / 9.0));

    let (squares, _) = S::as_mut_simd_f64s(&mut near.squares);
    let mut found = 0;

    let count = x.len();
    assert!(squares.len() == count);
    assert!(y.len() == count && log.len() == count);
    assert!(c0.len() == count && c1.len() == count && c2.len() == count && c3.len() == count);
    for i in 0..count {
        let p = v.product([v.sub(x[i], mx), v.sub(y[i], my)], inverse);
        let square = v.fma(p[0], p[0], v.mul(p[1], p[1]));
        let reciprocal = simd.div_f64s(one, square);
        let w = [v.mul(p[0], reciprocal), v.fnma(p[1], reciprocal, zero)];
        let w2 = [v.fnma(w[1], w[1], v.mul(w[0], w[0])), v.mul(v.add(w[0], w[0]), w[1])];

        squares[i] = square;
        let close = simd.reduce_min_f64s(square) < FAR * FAR;

        // U: a polynomial with real coefficients at the complex w², by Goertzel's recurrence.
        let (twice, modulus) = (v.add(w2[0], w2[0]), v.mul(reciprocal, reciprocal));
        let coefficient = |k: usize| v.all(1.0 / (2 * k + 5) as f64);
        let (mut after, mut current) = (zero, coefficient(SHORT - 1));
        if close {
            current = zero;
            for k in (SHORT - 1..LONG).rev() {
                let next = v.fma(twice, current, v.fnma(modulus, after, coefficient(k)));
                (after, current) = (current, next);
            }
        }
        for k in (1..SHORT - 1).rev() {
            let next = v.fma(twice, current, v.fnma(modulus, after, coefficient(k)));
            (after, current) = (current, next);
        }
        let u = [v.fma(w2[0], current, v.fnma(modulus, after, v.all(0.2))), v.mul(w2[1], current)];
        let w2u = v.product(w2, u);
        let t = [v.add(third, w2u[0]), w2u[1]];
        let s = v.product(w2, t);
        let rise = [v.sub(v.add(one, s[0]), t[0]), v.sub(s[1], t[1])];
        let e = v.product(w, rise);
        let g2 = v.fma(w[0], v.sub(t[1], u[1]), v.mul(w[1], v.sub(t[0], u[0])));

        let step = v.fnma(w[1], s[1], v.fma(w[0], s[0], w[0]));
        let second = v.fnma(two, step, log[i]);
        let logs = v.add(log[i], second);
        log[i] = second;

        let f2 = v.fma(third, logs, v.fma(two_thirds, t[0], two_ninths));
        let f0 = v.fma(two, s[0], v.fma(two_bow, e[1], logs));
        let f1 = v.sub(v.mul(two_bow, rise[1]), e[0]);
        let f2 = v.fma(two_bow, g2, f2);
        let (mut bent, mut first, mut last) = (v.sub(f2, f0), v.sub(f0, f1), v.add(f0, f1));
        if close {
            // What is left out may be infinite, so it is replaced, not scaled.
            let left_out = simd.less_than_f64s(square, v.all(NEAR * NEAR));
            [bent, first, last] = [bent, first, last].map(|value| simd.select_f64s(left_out, zero, value));
            if let Some(slot) = near.registers.get_mut(found) {
                *slot = i;
                found += 1;
            }
        }
        c0[i] = v.fma(bend[0], bent, c0[i]);
        c1[i] = v.fma(bend[1], bent, v.fma(scale, first, c1[i]));
        c2[i] = v.fma(bend[2], bent, v.fma(scale, last, c2[i]));
        c3[i] = v.fma(bend[3], bent, c3[i]);
    }

    // Only now, so that nothing in the loop above has to be put aside for it.
    let lanes = points.x.len() / count.max(1);
    near.points.clear();
    for &register in &near.registers[..found] {
        let range = register * lanes..(register + 1) * lanes;
        near.points.extend(range.filter(|&point| near.squares[point] < NEAR * NEAR));
    }
}

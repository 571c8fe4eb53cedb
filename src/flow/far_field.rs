//! Influence of the panels on the points of the outline, as series in the inverse distance, in
//! vector registers.
//!
//! Nothing transcendental is evaluated here: the series also gives the step of log r from one
//! node to the next, so logarithms walk along the outline with it. Points near a panel, where
//! the series does not converge fast enough, are asked for one by one.
//!
//! With p = (z - middle)/half, w = 1/p and L = log((p + 1)/(p - 1)) = 2(w + w³/3 + w⁵/5 + …), the
//! sums S = pL/2 - 1 = w²T, T = 1/3 + w²U and U = 1/5 + w²/7 + … hold every moment of the panel:
//! see `influence::moments`, whose formulas these are.

use pulp::Simd;

use super::lanes::{Complex, Lanes};

/// Points nearer to the middle of a panel than this many half chords are left to the closed form.
const NEAR: f64 = 2.2;

/// From these distances on, in half chords, fewer terms of U will do. The greatest of the terms
/// left out, in the moment F₂, is below 1e-12 at the near end of each range, and the moments enter
/// the matrix multiplied by the half chord over 4π: some 1e-3 at most with the usual number of
/// panels. Few ranges, since each change from one to the next is a branch foretold wrongly.
const MIDDLE: f64 = 3.6;
const FAR: f64 = 12.0;
const FURTHEST: f64 = 65.0;
const NEAR_TERMS: usize = 17;
const MIDDLE_TERMS: usize = 9;
const FAR_TERMS: usize = 4;
const FURTHEST_TERMS: usize = 2;

/// Panels taken through one step of the work before the next step. What a step hands on stays in
/// the nearest cache; and as a step is short, the processor has several panels in hand at once.
const BATCH: usize = 16;

/// What a panel is to the loop: all numbers it needs, ready to be spread over the registers.
pub(super) struct PanelConstants {
    /// One over the half chord, as a complex number.
    pub(super) inverse: [f64; 2],
    /// Middle of the chord times `inverse`.
    pub(super) origin: [f64; 2],
    /// Twice the bow of `Panel`.
    pub(super) two_bow: f64,
    /// Half the length of the parabola over 4π.
    pub(super) scale: f64,
    /// Weights of four nodes in the bend, times `scale`.
    pub(super) bend: [f64; 4],
}

/// The points, padded so that they fill registers: their number is a multiple of [`LANES`].
pub(super) struct Points<'a> {
    /// How many there are without those that pad.
    pub(super) count: usize,
    pub(super) x: &'a [f64],
    pub(super) y: &'a [f64],
    /// Logarithm of the distance to the first node of the first panel.
    pub(super) log: &'a [f64],
}

/// Doubles in the widest register there is.
pub(super) const LANES: usize = 8;

/// What a panel adds at one point.
pub(super) struct Exact {
    /// To the columns of the four nodes around the panel.
    pub(super) columns: [f64; 4],
    /// Logarithm of the distance to its second node.
    pub(super) log: f64,
}

/// Powers of w = 1/p.
// Aligned, lest every other register straddles two cache lines.
#[derive(Clone, Copy)]
#[repr(align(64))]
struct Inverse<S: Simd> {
    w: Complex<S>,
    w2: Complex<S>,
    /// Square of the modulus of w.
    modulus2: S::f64s,
    /// Least square of the modulus of p in any lane.
    least: f64,
}

// Aligned, lest every other register straddles two cache lines.
#[derive(Clone, Copy)]
#[repr(align(64))]
struct Sums<S: Simd> {
    s: Complex<S>,
    t: Complex<S>,
    /// T - U
    fall: Complex<S>,
}

/// Where a register of points has come on its way along the panels.
#[derive(Clone, Copy)]
struct Walk<S: Simd> {
    /// Logarithm of the distance to the first node of the next panel.
    log: S::f64s,
    /// Entries, so far, of the node before the next panel and of the three after it.
    entries: [S::f64s; 4],
}

/// Fills the columns of all nodes with the influence of the panels between them. `columns` begins
/// with that of the node before the first panel, and every column is as long as the points are
/// many. `exact` is asked for what panel and point, by their numbers, are too near each other for.
///
/// Registers of points walk along the panels, a batch of these at a time, so that the columns under
/// way stay in registers and those just completed in the nearest cache.
#[inline(always)]
pub(super) fn fill<S: Simd>(
    simd: S,
    panels: &[PanelConstants],
    points: &Points,
    columns: &mut [f64],
    exact: impl Fn(usize, usize) -> Exact,
) {
    let v = Lanes(simd);
    let zero = v.all(0.0);
    let [x, y, log] = [points.x, points.y, points.log].map(|values| S::as_simd_f64s(values).0);
    let (columns, _) = S::as_mut_simd_f64s(columns);
    let count = x.len();
    assert!(y.len() == count && log.len() == count);

    let nothing = Inverse::<S> { w: [zero; 2], w2: [zero; 2], modulus2: zero, least: 0.0 };
    let mut inverses = [nothing; BATCH];
    let mut sums = [Sums::<S> { s: [zero; 2], t: [zero; 2], fall: [zero; 2] }; BATCH];
    let used = points.count.div_ceil(S::F64_LANES);
    let mut walks: Vec<Walk<S>> =
        log.iter().take(used).map(|&log| Walk { log, entries: [zero; 4] }).collect();
    let batches = panels.chunks(BATCH).zip(columns.chunks_mut(BATCH * count));
    for (batch, (panels, columns)) in batches.enumerate() {
        for (i, under_way) in walks.iter_mut().enumerate() {
            // By value from here on, or it would not be kept in registers.
            let mut walk = *under_way;
            for (inverse, panel) in inverses.iter_mut().zip(panels) {
                *inverse = inverse_of(v, panel, x[i], y[i]);
            }
            for (sums, inverse) in sums.iter_mut().zip(&inverses).take(panels.len()) {
                *sums = sums_of(v, inverse);
            }
            let work = panels.iter().zip(&inverses).zip(&sums).zip(columns.chunks_exact_mut(count));
            for (k, (((panel, inverse), sums), column)) in work.enumerate() {
                walk = add_panel(v, panel, inverse, sums, walk);
                if inverse.least < NEAR * NEAR {
                    let first_point = i * S::F64_LANES;
                    walk = add_exact(inverse, walk, |lane| exact(batch * BATCH + k, first_point + lane));
                }
                let [complete, rest @ ..] = walk.entries;
                column[i] = complete;
                walk.entries = [rest[0], rest[1], rest[2], zero];
            }
            *under_way = walk;
        }
    }
    for (i, walk) in walks.into_iter().enumerate() {
        for (column, entries) in columns[panels.len() * count..].chunks_exact_mut(count).zip(walk.entries) {
            column[i] = entries;
        }
    }
}

#[inline(always)]
fn inverse_of<S: Simd>(v: Lanes<S>, panel: &PanelConstants, x: S::f64s, y: S::f64s) -> Inverse<S> {
    let [along, across] = panel.inverse.map(|value| v.all(value));
    let origin = panel.origin.map(|value| v.all(value));
    // The conjugate of p, whose inverse is a multiple of it.
    let p = [v.fnma(y, across, v.fms(x, along, origin[0])), v.fnma(x, across, v.fnma(y, along, origin[1]))];
    let square = v.fma(p[0], p[0], v.mul(p[1], p[1]));
    let modulus2 = v.0.div_f64s(v.all(1.0), square);
    let w = [v.mul(p[0], modulus2), v.mul(p[1], modulus2)];
    let twice = v.add(w[0], w[0]);
    let w2 = [v.fms(twice, w[0], modulus2), v.mul(twice, w[1])];
    Inverse { w, w2, modulus2, least: v.0.reduce_min_f64s(square) }
}

#[inline(always)]
fn sums_of<S: Simd>(v: Lanes<S>, inverse: &Inverse<S>) -> Sums<S> {
    let &Inverse { w2, modulus2, least, .. } = inverse;
    let modulus4 = v.mul(modulus2, modulus2);
    let u = if least > FURTHEST * FURTHEST {
        series::<S, FURTHEST_TERMS>(v, w2, modulus4)
    } else if least > FAR * FAR {
        series::<S, FAR_TERMS>(v, w2, modulus4)
    } else if least > MIDDLE * MIDDLE {
        series::<S, MIDDLE_TERMS>(v, w2, modulus4)
    } else {
        series::<S, NEAR_TERMS>(v, w2, modulus4)
    };
    let t =
        [v.fnma(w2[1], u[1], v.fma(w2[0], u[0], v.all(1.0 / 3.0))), v.fma(w2[1], u[0], v.mul(w2[0], u[1]))];
    Sums { s: v.product(w2, t), t, fall: [v.sub(t[0], u[0]), v.sub(t[1], u[1])] }
}

/// U: a polynomial with real coefficients at the complex `w2`, by Goertzel's recurrence.
#[inline(always)]
fn series<S: Simd, const TERMS: usize>(v: Lanes<S>, w2: Complex<S>, modulus4: S::f64s) -> Complex<S> {
    let coefficient = |k: usize| v.all(1.0 / (2 * k + 5) as f64);
    let twice = v.add(w2[0], w2[0]);
    let (mut after, mut current) = (None, coefficient(TERMS - 1));
    for k in (1..TERMS - 1).rev() {
        let constant = after.map_or(coefficient(k), |after| v.fnma(modulus4, after, coefficient(k)));
        (after, current) = (Some(current), v.fma(twice, current, constant));
    }
    let constant = after.map_or(coefficient(0), |after| v.fnma(modulus4, after, coefficient(0)));
    [v.fma(w2[0], current, constant), v.mul(w2[1], current)]
}

/// Takes a register from the first node of a panel to the second and adds the panel's influence,
/// but nothing in lanes that are near it.
#[inline(always)]
fn add_panel<S: Simd>(
    v: Lanes<S>,
    panel: &PanelConstants,
    inverse: &Inverse<S>,
    sums: &Sums<S>,
    walk: Walk<S>,
) -> Walk<S> {
    let &Inverse { w, modulus2, least, .. } = inverse;
    let &Sums { s, t, fall } = sums;
    let two_bow = v.all(panel.two_bow);

    let one_and_s = v.add(v.all(1.0), s[0]);
    let rise = [v.sub(one_and_s, t[0]), v.sub(s[1], t[1])];
    let e = v.product(w, rise);
    let g2 = v.fma(w[0], fall[1], v.mul(w[1], fall[0]));

    // The step is twice the real part of w (1 + S).
    let second = v.fma(v.add(w[1], w[1]), s[1], v.fnma(v.add(w[0], w[0]), one_and_s, walk.log));
    let logs = v.add(walk.log, second);

    let f0 = v.fma(two_bow, e[1], v.add(v.add(s[0], s[0]), logs));
    let f1 = v.fms(two_bow, rise[1], e[0]);
    let f2 = v.fma(v.all(2.0 / 3.0), t[0], v.fma(v.all(1.0 / 3.0), logs, v.all(-2.0 / 9.0)));
    let f2 = v.fma(two_bow, g2, f2);
    let mut parts = [v.sub(f2, f0), v.sub(f0, f1), v.add(f0, f1)];
    if least < NEAR * NEAR {
        // What is left out may be infinite, so it is replaced, not scaled.
        let left_out = v.0.less_than_f64s(v.all(1.0 / (NEAR * NEAR)), modulus2);
        parts = parts.map(|part| v.0.select_f64s(left_out, v.all(0.0), part));
    }
    let [bent, first, last] = parts;
    let bend = panel.bend.map(|weight| v.all(weight));
    let scale = v.all(panel.scale);
    let [before, at_first, at_second, _] = walk.entries;
    let entries = [
        v.fma(bend[0], bent, before),
        v.fma(bend[1], bent, v.fma(scale, first, at_first)),
        v.fma(bend[2], bent, v.fma(scale, last, at_second)),
        v.mul(bend[3], bent),
    ];
    Walk { log: second, entries }
}

/// Adds what [`add_panel`] left out.
#[inline(always)]
fn add_exact<S: Simd>(inverse: &Inverse<S>, walk: Walk<S>, exact: impl Fn(usize) -> Exact) -> Walk<S> {
    let spread = |register: S::f64s| {
        let mut values = [0.0; LANES];
        S::as_mut_simd_f64s(&mut values).0[0] = register;
        values
    };
    let gather = |values: &[f64; LANES]| S::as_simd_f64s(values).0[0];

    let modulus2 = spread(inverse.modulus2);
    let mut log = spread(walk.log);
    let mut entries = walk.entries.map(spread);
    for lane in (0..S::F64_LANES).filter(|&lane| modulus2[lane] > 1.0 / (NEAR * NEAR)) {
        let exact = exact(lane);
        log[lane] = exact.log;
        for (entries, add) in entries.iter_mut().zip(exact.columns) {
            entries[lane] += add;
        }
    }
    Walk { log: gather(&log), entries: entries.each_ref().map(gather) }
}

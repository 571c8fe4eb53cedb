//! The smoothest spline that stays with the points, and the placing that belongs to it.
//!
//! Nose and trailing edge belong to the outline and not to the points, so both are found together
//! with the spline: y is a spline over t = ∓√x, the points are compared with it along its normal
//! (Gauss and Newton), and after each step the chord is laid anew through the nose and the middle
//! of the trailing edge of what was found.

use super::placing::Placing;
use super::spline::{Basis, Equation, FittedSurfaces, least_squares};
use super::{CoordinateError, Given};
use crate::geometry::{Point, Vec2};

/// Below this no distance is asked for, in chords: a ten-millionth of a millimetre on half a metre.
const FINEST: f64 = 2e-10;
/// The most intervals of the spline.
const INTERVALS: f64 = 600.0;
/// The shortest interval, as a share of what even ones would be.
const CROWDED: f64 = 0.02;
/// Weights of the roughness that are tried, as powers of ten.
const STIFFEST: f64 = 3.0;
const START: f64 = -7.0;
const SOFTEST: f64 = -19.0;
/// Points that are further off than so many times what is allowed are not brought near by weight.
const CLOSE: f64 = 2.0;
/// What the two ends of a sharp trailing edge weigh, so that it closes.
const SHARP: f64 = 1e4;
/// Distance at which no one would call the outline that of the points, in chords.
const ASTRAY: f64 = 0.005;

/// A fit.
pub(super) struct Fit {
    pub(super) surfaces: FittedSurfaces,
    pub(super) placing: Placing,
    /// The points at unit chord.
    pub(super) places: Vec<Point>,
    /// Where each of them lies on the outline.
    pub(super) roots: Vec<f64>,
    /// Unit normal of the outline there.
    pub(super) normals: Vec<Vec2>,
    /// Distance from the outline along it, in chords.
    pub(super) distances: Vec<f64>,
    /// How far off each may be.
    pub(super) allowed: Vec<f64>,
    /// Half a unit of the last digit, across the outline.
    pub(super) half_units: Vec<f64>,
}

impl Fit {
    /// The point that is furthest off.
    pub(super) fn furthest(&self) -> (usize, f64) {
        let all = self.distances.iter().map(|distance| distance.abs()).enumerate();
        all.max_by(|a, b| a.1.total_cmp(&b.1)).unwrap_or((0, 0.0))
    }

    /// The greatest distance as a share of what is allowed.
    pub(super) fn greatest_share(&self) -> f64 {
        self.distances.iter().zip(&self.allowed).map(|(d, allowed)| d.abs() / allowed).fold(0.0, f64::max)
    }
}

/// Fits points in order; `nose` is the rank of the one next to it. `tolerance` in chords replaces
/// what the digits of the points leave open.
pub(super) fn fit(
    points: &[Given],
    placing: Placing,
    nose: usize,
    tolerance: Option<f64>,
) -> Result<Fit, CoordinateError> {
    let mut job = Job::new(points, placing, nose, tolerance);
    // With a stiff spline first, so that points and nose find their places; then over the
    // intervals that these places give.
    let mut state = job.start(placing, nose);
    job.settle(&mut state, -6.0, 12);
    job.basis = basis(&state.roots);
    job.settle(&mut state, START, 12);

    // Softer by and by, each from where the stiffer one left nose and trailing edge: a soft spline
    // over points that are not yet in their places goes wild.
    let nose_slope = job.slope_at_nose(&state);
    let tried = |state: &State, weight: f64, turns: usize| {
        let mut trial = state.clone();
        job.settle(&mut trial, weight, turns);
        let steeper = job.slope_at_nose(&trial) / nose_slope;
        // Not a number counts as wild.
        let sane = (0.6..1.6).contains(&steeper);
        let worst = if sane { job.worst(&trial) } else { f64::INFINITY };
        (trial, worst)
    };
    let first = job.worst(&state);
    let mut walk = vec![(START, first, state)];
    let mut least = first;
    while let Some((weight, worst, state)) = walk.last()
        && least > 1.0
        && *weight > SOFTEST
        && *worst < 4.0 * least
    {
        let softer = weight - 1.0;
        let (trial, worst) = tried(state, softer, 8);
        least = least.min(worst);
        walk.push((softer, worst, trial));
    }
    // A few points just too far may come near enough when they weigh more.
    if least > 1.0 {
        let close = walk.iter().find(|(_, worst, _)| *worst < CLOSE);
        let closest = walk.iter().find(|(_, worst, _)| *worst == least && least < CLOSE);
        let nudged =
            close.into_iter().chain(closest).find_map(|(weight, _, state)| job.nudged(state, *weight));
        if let Some(best) = nudged {
            return job.finish(&best);
        }
    }
    // Where nothing is near enough, the stiffest that is about as near as any.
    let target = if least <= 1.0 { 1.0 } else { 1.5 * least };
    let chosen = walk.iter().position(|(_, worst, _)| *worst <= target).unwrap_or(0);
    let mut stiff = chosen.checked_sub(1).map_or(STIFFEST, |before| walk[before].0);
    let (mut soft, _, mut best) = walk.swap_remove(chosen);
    for _ in 0..7 {
        let middle = 0.5 * (soft + stiff);
        let (trial, worst) = tried(&best, middle, 8);
        if worst <= target {
            (best, soft) = (trial, middle);
        } else {
            stiff = middle;
        }
    }
    let (settled, worst) = tried(&best, soft, 30);
    job.finish(if worst <= 1.001 * target { &settled } else { &best })
}

struct Job<'a> {
    points: &'a [Given],
    basis: Basis,
    tolerance: Option<f64>,
    /// Whether both ends are one point.
    sharp: bool,
}

#[derive(Clone)]
struct State {
    placing: Placing,
    roots: Vec<f64>,
    normals: Vec<Vec2>,
    coefficients: Vec<f64>,
    /// What each point weighs.
    weights: Vec<f64>,
}

/// Breaks at the nose and at the points, but not at the three nearest to each end: there the spline
/// takes its shape from its neighbours, and is as accurate as elsewhere.
fn basis(roots: &[f64]) -> Basis {
    let mut sorted = roots.to_vec();
    sorted.sort_by(f64::total_cmp);
    let ends = (sorted.first().copied().unwrap_or(-1.0), sorted.last().copied().unwrap_or(1.0));
    // Points whose places were lost, as where they are not numbers, give none.
    let (first, last) = if ends.0 < -0.5 && ends.1 > 0.5 { ends } else { (-1.0, 1.0) };
    sorted.retain(|root| (first..=last).contains(root));
    let count = sorted.len().max(1) as f64;
    let even = (last - first) / count.min(INTERVALS);
    // Points crowd at the trailing edge; in a table that is not too long each has its break.
    let shortest = if count <= INTERVALS { CROWDED * even } else { even };
    let inner = sorted.iter().skip(3).take(sorted.len().saturating_sub(6)).copied();
    let mut inner: Vec<f64> = inner.filter(|root| root.abs() >= shortest).collect();
    inner.push(0.0);
    inner.sort_by(f64::total_cmp);
    let mut breaks = vec![first];
    for root in inner {
        let before = breaks.last().copied().unwrap_or(first);
        if root == 0.0 || (root - before >= shortest && last - root >= shortest) {
            breaks.push(root);
        }
    }
    breaks.push(last);
    Basis::new(&breaks)
}

impl<'a> Job<'a> {
    fn new(points: &'a [Given], placing: Placing, nose: usize, tolerance: Option<f64>) -> Self {
        let sharp = match (points.first(), points.last()) {
            (Some(first), Some(last)) => first.point.distance(last.point) < 1e-9 * placing.chord(),
            _ => false,
        };
        let basis = basis(&roots(points, &placing, nose));
        Self { points, basis, tolerance, sharp }
    }

    fn start(&self, placing: Placing, nose: usize) -> State {
        let places = self.places(&placing);
        let normals = (0..places.len()).map(|i| {
            let (before, behind) = (i.saturating_sub(1), (i + 1).min(places.len() - 1));
            let run = places[behind] - places[before];
            // The outline runs anticlockwise, with dx = 2t dt.
            let normal = Vec2::new(-run.y, run.x);
            if normal.hypot2() > 0.0 { normal.normalize() } else { Vec2::new(0.0, 1.0) }
        });
        State {
            placing,
            roots: roots(self.points, &placing, nose),
            normals: normals.collect(),
            coefficients: vec![0.0; self.basis.count()],
            weights: self.weights(),
        }
    }

    /// One for each point, and more for the two that are a sharp edge.
    fn weights(&self) -> Vec<f64> {
        let last = self.points.len().saturating_sub(1);
        let at_edge = |i: usize| self.sharp && (i == 0 || i == last);
        (0..self.points.len()).map(|i| if at_edge(i) { SHARP } else { 1.0 }).collect()
    }

    /// The same with the points that are too far made to weigh more, by and by, if that brings
    /// them near enough (the idea is Lawson's).
    fn nudged(&self, state: &State, weight: f64) -> Option<State> {
        const TURNS: usize = 10;
        let mut state = state.clone();
        for _ in 0..TURNS {
            for (row, weight) in self.judge(&state).1.iter().zip(&mut state.weights) {
                let share = row[0].abs() / row[1];
                if share > 0.9 {
                    *weight = (*weight * share * 1.2).min(SHARP);
                }
            }
            self.settle(&mut state, weight, 2);
            if self.worst(&state) <= 1.0 {
                return Some(state);
            }
        }
        None
    }

    fn places(&self, placing: &Placing) -> Vec<Point> {
        self.points.iter().map(|given| placing.place(given.point)).collect()
    }

    /// Turns until nose and trailing edge stay where they are, `turns` at most.
    fn settle(&self, state: &mut State, weight: f64, turns: usize) {
        let weight = 10_f64.powf(0.5 * weight);
        let roughness: Vec<_> =
            self.basis.roughness().into_iter().map(|(span, row)| (span, row.map(|v| v * weight))).collect();
        for _ in 0..turns {
            if self.turn(state, &roughness) < 1e-14 {
                break;
            }
        }
    }

    /// One step of Gauss and Newton, and the chord laid anew; gives how far its ends moved.
    fn turn(&self, state: &mut State, roughness: &[(usize, [f64; 6])]) -> f64 {
        let places = self.places(&state.placing);
        let mut equations = Vec::with_capacity(places.len() + roughness.len());
        for (i, place) in places.iter().enumerate() {
            let (t, normal) = (state.roots[i], state.normals[i]);
            let weight = state.weights[i];
            let span = self.basis.span(t);
            equations.push(Equation {
                span,
                row: self.basis.row(span, t, 0).map(|value| value * normal.y * weight),
                common: normal.x * weight,
                value: (normal.x * (place.x - t * t) + normal.y * place.y) * weight,
            });
        }
        let rough = roughness.iter().map(|&(span, row)| Equation { span, row, common: 0.0, value: 0.0 });
        equations.extend(rough);
        equations.sort_by_key(|equation| equation.span);
        let (coefficients, ahead) = least_squares(self.basis.count(), equations.into_iter());
        let y = |t: f64, order: usize| self.basis.value(&coefficients, t, order);

        for (i, place) in places.iter().enumerate() {
            let mut t = state.roots[i];
            let mut tangent = Vec2::ZERO;
            for _ in 0..3 {
                tangent = Vec2::new(2.0 * t, y(t, 1));
                let off = *place - Point::new(ahead + t * t, y(t, 0));
                let step = off.dot(tangent) / tangent.hypot2();
                if step.is_finite() {
                    t += step.clamp(-0.02, 0.02);
                }
            }
            state.roots[i] = t;
            let normal = Vec2::new(-tangent.y, tangent.x);
            if normal.hypot2() > 0.0 {
                state.normals[i] = normal.normalize();
            }
        }
        let height = y(0.0, 0);
        let middle = 0.5 * (y(-1.0, 0) + y(1.0, 0));
        let moved = ahead.abs() + height.abs() + middle.abs();
        // A spline gone astray must not take the chord with it.
        if moved < 0.1 {
            state.placing = state.placing.moved(Point::new(ahead, height), Point::new(1.0, middle));
        }
        state.coefficients = coefficients;
        moved
    }

    /// Distances along the normals, what is allowed, and half a unit there.
    fn judge(&self, state: &State) -> (Vec<Point>, Vec<[f64; 3]>) {
        let places = self.places(&state.placing);
        let rows = places.iter().zip(self.points).enumerate().map(|(i, (place, given))| {
            let (t, normal) = (state.roots[i], state.normals[i]);
            let on = Point::new(t * t, self.basis.value(&state.coefficients, t, 0));
            let half = state.placing.half_unit(given.half, normal);
            let allowed = self.tolerance.unwrap_or(half).max(FINEST);
            [(*place - on).dot(normal), allowed, half]
        });
        let rows = rows.collect();
        (places, rows)
    }

    fn slope_at_nose(&self, state: &State) -> f64 {
        self.basis.value(&state.coefficients, 0.0, 1)
    }

    fn worst(&self, state: &State) -> f64 {
        let shares = self.judge(state).1.into_iter().map(|[distance, allowed, _]| distance.abs() / allowed);
        shares.fold(0.0, |worst: f64, share| if share.is_nan() { f64::INFINITY } else { worst.max(share) })
    }

    fn finish(&self, state: &State) -> Result<Fit, CoordinateError> {
        let (places, rows) = self.judge(state);
        let fit = Fit {
            surfaces: self.basis.surfaces(&state.coefficients),
            placing: state.placing,
            places,
            roots: state.roots.clone(),
            normals: state.normals.clone(),
            distances: rows.iter().map(|row| row[0]).collect(),
            allowed: rows.iter().map(|row| row[1]).collect(),
            half_units: rows.iter().map(|row| row[2]).collect(),
        };
        let wild = fit.distances.iter().position(|distance| !distance.is_finite());
        let (rank, distance) = wild.map_or(fit.furthest(), |rank| (rank, f64::INFINITY));
        let index = self.points.get(rank).map_or(1, |given| given.index);
        let near = distance <= ASTRAY.max(self.tolerance.unwrap_or(0.0));
        if !near {
            return Err(CoordinateError::NotSmooth { index, distance });
        }
        self.refuse_bad_outline(&fit)?;
        Ok(fit)
    }

    fn refuse_bad_outline(&self, fit: &Fit) -> Result<(), CoordinateError> {
        let nearest = |t: f64| {
            let away = |root: &f64| (root - t).abs();
            let best = fit.roots.iter().enumerate().min_by(|a, b| away(a.1).total_cmp(&away(b.1)));
            best.and_then(|(rank, _)| self.points.get(rank)).map_or(1, |given| given.index)
        };
        // y runs down through the nose, and half the square of its slope there is the radius.
        let round = fit.surfaces.at(0.0)[1] < -1e-3;
        if !round {
            return Err(CoordinateError::SharpNose { index: nearest(0.0) });
        }
        const STATIONS: u32 = 4000;
        for i in 1..STATIONS {
            let t = f64::from(i) / f64::from(STATIONS);
            let apart = fit.surfaces.at(-t)[0] > fit.surfaces.at(t)[0];
            if !apart {
                return Err(CoordinateError::Crosses { index: nearest(t), percent: 100.0 * t * t });
            }
        }
        Ok(())
    }
}

/// √x of the points, negative on the upper side.
fn roots(points: &[Given], placing: &Placing, nose: usize) -> Vec<f64> {
    let places: Vec<Point> = points.iter().map(|given| placing.place(given.point)).collect();
    let mut roots: Vec<f64> = places
        .iter()
        .enumerate()
        .map(|(i, place)| if i < nose { -place.x.max(0.0).sqrt() } else { place.x.max(0.0).sqrt() })
        .collect();
    // The point next to the nose lies on the side towards which the nose was moved.
    if let Some(root) = roots.get_mut(nose)
        && places[nose].y > 0.0
    {
        *root = -*root;
    }
    roots
}

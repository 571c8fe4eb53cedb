//! Points that stand out, and waves.

use super::Given;
use super::fit::Fit;
use super::report::{Outlier, Wave};
use crate::geometry::Point;
use crate::section::Side;

/// The most points that are named as standing out.
const MOST_OUTLIERS: usize = 100;
/// A point stands out from so many times the scatter of the others.
const SIGMAS: f64 = 6.0;
/// And from so many units of the last digit.
const UNITS: f64 = 3.0;
/// Its neighbours must fall to this share of its distance when it is left out: it is one point
/// that is off then, and not a bend of the outline.
const NEIGHBOURS: f64 = 0.3;

/// Points that are far from where their neighbours put them.
///
/// Each is held against the cubic in t through the two nearest points on either side, left out
/// itself. What is left over is divided by what equal scatter of all five would give, and compared
/// with the median of all points (times 1.4826, which of a normal scatter is its deviation).
pub(super) fn outliers(fit: &Fit, points: &[Given]) -> Vec<Outlier> {
    let mut active: Vec<usize> = (0..points.len()).collect();
    let mut found = Vec::new();
    while found.len() < MOST_OUTLIERS {
        let misses: Vec<Miss> = (0..active.len()).map(|i| miss(fit, &active, i)).collect();
        let mut sorted: Vec<f64> = misses.iter().map(|miss| miss.scaled).collect();
        sorted.sort_by(f64::total_cmp);
        let sigma = 1.4826 * sorted.get(sorted.len() / 2).copied().unwrap_or(0.0);
        let far = |i: &usize| {
            let unit = 2.0 * fit.half_units[active[*i]];
            misses[*i].scaled > SIGMAS * sigma && misses[*i].distance > (UNITS * unit).max(1e-7)
        };
        let mut candidates: Vec<usize> = (0..active.len()).filter(far).collect();
        candidates.sort_by(|a, b| misses[*b].scaled.total_cmp(&misses[*a].scaled));
        // Of a bend no point is alone; a few of the furthest tell.
        let alone = candidates.into_iter().take(20).find(|&i| {
            let mut others = active.clone();
            others.remove(i);
            let near = i.saturating_sub(2)..(i + 2).min(others.len());
            near.map(|j| miss(fit, &others, j).scaled).all(|left| left <= NEIGHBOURS * misses[i].scaled)
        });
        let Some(i) = alone else { break };
        let rank = active.remove(i);
        let side = if fit.roots[rank] < 0.0 { Side::Upper } else { Side::Lower };
        let (index, x) = (points[rank].index, fit.places[rank].x);
        found.push(Outlier { index, line: None, side, x, distance: misses[i].distance });
    }
    found.sort_by_key(|outlier| outlier.index);
    found
}

struct Miss {
    /// Across the outline, in chords.
    distance: f64,
    /// The same over the deviation that a scatter of one would give.
    scaled: f64,
}

fn miss(fit: &Fit, active: &[usize], i: usize) -> Miss {
    let none = Miss { distance: 0.0, scaled: 0.0 };
    if active.len() < 8 {
        return none;
    }
    // Two on either side; at the ends the four that are nearest.
    let first = i.saturating_sub(2).min(active.len() - 5);
    let others: Vec<usize> = (first..first + 5).filter(|&j| j != i).map(|j| active[j]).collect();
    let t = fit.roots[active[i]];
    let (mut value, mut gain) = (0.0, 1.0);
    for &a in &others {
        let factors = others.iter().filter(|&&b| b != a);
        let weight: f64 = factors.map(|&b| (t - fit.roots[b]) / (fit.roots[a] - fit.roots[b])).product();
        value += weight * fit.places[a].y;
        gain += weight * weight;
    }
    let distance = ((fit.places[active[i]].y - value) * fit.normals[active[i]].y).abs();
    let scaled = distance / gain.sqrt();
    if scaled.is_finite() { Miss { distance, scaled } } else { none }
}

/// Changes of the curvature's sign on a surface that are a matter of shape.
const SHAPE: usize = 3;
/// A stretch between two changes that is shorter than this share of the chord is no shape.
const SHORT: f64 = 0.06;
/// What a stretch must rise over its own chord to be more than a figure.
const LOW: f64 = 2e-5;
/// And turn, in radians: half a degree.
const TURN: f64 = 0.008;

/// A part of a surface over which the curvature keeps its sign.
#[derive(Clone, Copy)]
struct Stretch {
    hollow: bool,
    from: f64,
    to: f64,
    rise: f64,
    turn: f64,
}

impl Stretch {
    fn length(&self) -> f64 {
        (self.to * self.to - self.from * self.from).abs()
    }
}

/// Waves of both surfaces.
///
/// A surface is let change the sign of its curvature three times, as the lower one of a cambered
/// section does whose mean line is of two pieces. A stretch between two changes is a wave if it is
/// shorter than 6 % of the chord or there are more changes than three; and if it rises over its
/// own chord by 2e-5 of the chord and by a unit of the last digit, and turns by 0.008 rad.
/// Neighbouring ones are one wave.
pub(super) fn waves(fit: &Fit, points: &[Given]) -> Vec<Wave> {
    let unit =
        2.0 * fit.half_units.iter().zip(&fit.normals).map(|(half, n)| half * n.y.abs()).fold(0.0, f64::max);
    let mut found = Vec::new();
    for (side, sign) in [(Side::Upper, -1.0), (Side::Lower, 1.0)] {
        let stretches = merged(stretches(fit, sign), unit.max(LOW));
        let changes = stretches.len().saturating_sub(1);
        let is_wave = |stretch: &Stretch| stretch.length() < SHORT || changes > SHAPE;
        let mut run: Vec<Stretch> = Vec::new();
        for (i, stretch) in stretches.iter().enumerate() {
            let inner = i > 0 && i < changes;
            if inner && is_wave(stretch) {
                run.push(*stretch);
            } else {
                found.extend(wave(fit, points, side, &run));
                run.clear();
            }
        }
        found.extend(wave(fit, points, side, &run));
    }
    found
}

fn wave(fit: &Fit, points: &[Given], side: Side, run: &[Stretch]) -> Option<Wave> {
    let strongest = run.iter().max_by(|a, b| a.rise.total_cmp(&b.rise))?;
    let middle = 0.5 * (strongest.from + strongest.to);
    let away = |rank: &usize| (fit.roots[*rank] - middle).abs();
    let nearest = (0..points.len()).min_by(|a, b| away(a).total_cmp(&away(b)))?;
    let (from, to) = (run.first()?.from, run.last()?.to);
    Some(Wave {
        index: points[nearest].index,
        line: None,
        side,
        x: middle * middle,
        from: from * from,
        to: to * to,
        amplitude: strongest.rise,
        hollow: strongest.hollow,
    })
}

/// The stretches of a surface from nose to trailing edge; `sign` is that of t.
fn stretches(fit: &Fit, sign: f64) -> Vec<Stretch> {
    const STEPS: u32 = 6;
    let mut roots: Vec<f64> = fit
        .surfaces
        .knots()
        .windows(2)
        .flat_map(|ends| (0..STEPS).map(|i| ends[0] + (ends[1] - ends[0]) * f64::from(i) / f64::from(STEPS)))
        .chain([1.0])
        .filter(|t| t * sign >= 0.0)
        .collect();
    roots.sort_by(|a, b| a.abs().total_cmp(&b.abs()));
    // Of (t², y): the sign of x'y'' - y'x'', which is positive where the outline is convex.
    let bend = |t: f64| {
        let [_, first, second] = fit.surfaces.at(t);
        t * second - first
    };
    let mut found = Vec::new();
    let mut from = 0.0;
    for pair in roots.windows(2) {
        let (a, b) = (bend(pair[0]), bend(pair[1]));
        if (a < 0.0) != (b < 0.0) {
            let change = pair[0] + (pair[1] - pair[0]) * a / (a - b);
            found.push(stretch(fit, from, change));
            from = change;
        }
    }
    found.push(stretch(fit, from, sign));
    found
}

fn stretch(fit: &Fit, from: f64, to: f64) -> Stretch {
    let point = |t: f64| Point::new(t * t, fit.surfaces.at(t)[0]);
    let (start, end) = (point(from), point(to));
    let chord = end - start;
    let mut rise = 0.0_f64;
    for i in 1..16 {
        let off = point(from + (to - from) * f64::from(i) / 16.0) - start;
        let height = chord.cross(off) / chord.hypot();
        if height.abs() > rise.abs() {
            rise = height;
        }
    }
    let slope = |t: f64| fit.surfaces.at(t)[1] / (2.0 * t);
    let turn = (slope(to).atan() - slope(from).atan()).abs();
    let middle = 0.5 * (from + to);
    let [_, first, second] = fit.surfaces.at(middle);
    Stretch { hollow: middle * second - first < 0.0, from, to, rise: rise.abs(), turn }
}

/// Takes out the stretches that are too low to be seen, the lowest first; what lies on both sides
/// of one becomes one.
fn merged(mut stretches: Vec<Stretch>, low: f64) -> Vec<Stretch> {
    loop {
        let inner = 1..stretches.len().saturating_sub(1);
        let lowest = inner
            .filter(|&i| stretches[i].rise < low || stretches[i].turn < TURN)
            .min_by(|&a, &b| stretches[a].rise.total_cmp(&stretches[b].rise));
        let Some(i) = lowest else { break };
        let (before, behind) = (stretches[i - 1], stretches[i + 1]);
        let whole = Stretch {
            hollow: before.hollow,
            from: before.from,
            to: behind.to,
            rise: before.rise.max(behind.rise),
            turn: before.turn.max(behind.turn),
        };
        stretches.splice(i - 1..=i + 1, [whole]);
    }
    // One that is low and reaches the trailing edge belongs to what lies ahead of it.
    if let [.., before, last] = stretches.as_mut_slice()
        && (last.rise < low || last.turn < TURN)
    {
        before.to = last.to;
        stretches.pop();
    }
    stretches
}

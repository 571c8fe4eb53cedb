//! Viscous flow over a range of incidence.

use super::{Conditions, Viscous, ViscousError, ViscousSolution};
use crate::flow::side_by_side::{processors, side_by_side_on};

/// Points from which a neighbour is still started from, over gaps.
const FAR: usize = 3;

/// Halvings of the way from a converged neighbour before a point is left as a gap.
const HALVINGS: usize = 5;

/// Lift, drag and moment over incidence.
#[derive(Debug, Clone, PartialEq)]
pub struct LiftCurve {
    /// What it holds for.
    pub conditions: Conditions,
    /// How many panels it was solved on.
    pub panels: usize,
    /// In the order of growing incidence.
    pub points: Vec<CurvePoint>,
}

/// One incidence of a curve.
#[derive(Debug, Clone, PartialEq)]
pub struct CurvePoint {
    /// In radians.
    pub incidence: f64,
    /// `None` where no flow was found: a gap.
    pub solution: Option<ViscousSolution>,
}

impl LiftCurve {
    /// The flow at each of `incidences`, in radians.
    ///
    /// Starts where the layers have least to do, near zero lift, and goes on from neighbour to
    /// neighbour both ways. A point that does not converge from its neighbour is started afresh,
    /// then approached in smaller steps; what is left is tried again from the other side.
    ///
    /// # Errors
    /// When the conditions or an incidence are out of range. A point that does not converge is a
    /// gap and no error.
    pub fn sweep(
        viscous: &Viscous,
        conditions: &Conditions,
        incidences: &[f64],
    ) -> Result<Self, ViscousError> {
        let mut curves = Self::sweep_on(1, viscous, std::slice::from_ref(conditions), incidences)?;
        Ok(curves.remove(0))
    }

    /// A curve for each of `conditions`, in the same order. Both ways from zero lift of every curve
    /// are gone side by side, as many at a time as there are processors; what comes out does not
    /// depend on their number.
    ///
    /// # Errors
    /// As [`LiftCurve::sweep`], of the first that has one.
    pub fn sweep_all(
        viscous: &Viscous,
        conditions: &[Conditions],
        incidences: &[f64],
    ) -> Result<Vec<Self>, ViscousError> {
        Self::sweep_on(processors(), viscous, conditions, incidences)
    }

    /// As [`LiftCurve::sweep_all`], on so many threads.
    ///
    /// # Errors
    /// As [`LiftCurve::sweep_all`].
    pub fn sweep_on(
        threads: usize,
        viscous: &Viscous,
        conditions: &[Conditions],
        incidences: &[f64],
    ) -> Result<Vec<Self>, ViscousError> {
        conditions.iter().try_for_each(Conditions::check)?;
        if let Some(&bad) = incidences.iter().find(|angle| !angle.is_finite()) {
            return Err(ViscousError::Incidence(bad));
        }
        let mut sorted = incidences.to_vec();
        sorted.sort_by(f64::total_cmp);
        sorted.dedup();
        let easy = viscous.zero_lift();
        let first = (0..sorted.len())
            .min_by(|&a, &b| (sorted[a] - easy).abs().total_cmp(&(sorted[b] - easy).abs()))
            .unwrap_or(0);

        // Slow water has the most trouble, and so goes first.
        let mut order: Vec<usize> = (0..conditions.len()).collect();
        order.sort_by(|&a, &b| conditions[a].reynolds.total_cmp(&conditions[b].reynolds));
        let jobs: Vec<usize> = (0..2 * order.len()).collect();
        let quiet = |_| ();
        let begin = |&job: &usize| {
            let start = sorted.get(first).map(|&at| viscous.at(at, &conditions[order[job]], None));
            start.and_then(Result::ok)
        };
        let begun = side_by_side_on(threads, &jobs[..order.len()], begin, quiet);
        let go = |&job: &usize| {
            let (curve, start) = (order[job / 2], begun[job / 2].clone());
            let way = if job % 2 == 0 { &sorted[first..] } else { &sorted[..(first + 1).min(sorted.len())] };
            let mut points = open(way);
            if job % 2 == 1 {
                points.reverse();
            }
            if let Some(point) = points.first_mut() {
                point.solution = start;
            }
            carry(viscous, &conditions[curve], &mut points);
            points
        };
        let ways = side_by_side_on(threads, &jobs, go, quiet);
        let close = |&job: &usize| {
            let [up, down] = [&ways[2 * job], &ways[2 * job + 1]];
            // Gaps, from the side that was not tried.
            let mut points: Vec<CurvePoint> = up.iter().rev().chain(down.iter().skip(1)).cloned().collect();
            carry(viscous, &conditions[order[job]], &mut points);
            points.reverse();
            points
        };
        let closed = side_by_side_on(threads, &jobs[..order.len()], close, quiet);
        let mut curves: Vec<(usize, Self)> = std::iter::zip(order, closed)
            .map(|(i, points)| {
                (i, Self { conditions: conditions[i], panels: viscous.panelling().len(), points })
            })
            .collect();
        curves.sort_by_key(|&(i, _)| i);
        Ok(curves.into_iter().map(|(_, curve)| curve).collect())
    }

    /// How many points converged.
    #[must_use]
    pub fn converged(&self) -> usize {
        self.points.iter().filter(|point| point.solution.is_some()).count()
    }

    /// What was found, without the gaps.
    pub fn solutions(&self) -> impl Iterator<Item = &ViscousSolution> {
        self.points.iter().filter_map(|point| point.solution.as_ref())
    }

    /// Greatest lift coefficient and its incidence in radians, by the parabola through the greatest
    /// point and its neighbours; `None` when the greatest is at an end of the curve, where lift may
    /// still grow.
    #[must_use]
    pub fn greatest_lift(&self) -> Option<(f64, f64)> {
        let found: Vec<[f64; 2]> = self.solutions().map(|s| [s.incidence, s.cl]).collect();
        let best = (0..found.len()).max_by(|&a, &b| found[a][1].total_cmp(&found[b][1]))?;
        if best == 0 || best + 1 == found.len() {
            return None;
        }
        let [[a0, c0], [a1, c1], [a2, c2]] = [found[best - 1], found[best], found[best + 1]];
        let (before, after) = ((c1 - c0) / (a1 - a0), (c2 - c1) / (a2 - a1));
        let bend = (after - before) / (a2 - a0);
        if bend >= 0.0 {
            return Some((c1, a1));
        }
        // Newton's form: c = c0 + before (a − a0) + bend (a − a0)(a − a1).
        let at = (0.5 * (a0 + a1 - before / bend)).clamp(a0, a2);
        Some((c0 + before * (at - a0) + bend * (at - a0) * (at - a1), at))
    }

    /// Slope of lift per radian and incidence of zero lift in radians, by the straight line of
    /// least squares through the points with a lift coefficient between -0.2 and 0.6; `None` with
    /// fewer than two of them.
    #[must_use]
    pub fn slope_and_zero_lift(&self) -> Option<(f64, f64)> {
        let used: Vec<[f64; 2]> =
            self.solutions().map(|s| [s.incidence, s.cl]).filter(|p| (-0.2..=0.6).contains(&p[1])).collect();
        let count = used.len() as f64;
        let mean = |k: usize| used.iter().map(|p| p[k]).sum::<f64>() / count;
        let (angle, lift) = (mean(0), mean(1));
        let square: f64 = used.iter().map(|p| (p[0] - angle).powi(2)).sum();
        let product: f64 = used.iter().map(|p| (p[0] - angle) * (p[1] - lift)).sum();
        let slope = product / square;
        (used.len() > 1 && slope.is_finite() && slope != 0.0).then(|| (slope, angle - lift / slope))
    }

    /// The point of least drag.
    #[must_use]
    pub fn least_drag(&self) -> Option<&ViscousSolution> {
        self.solutions().min_by(|a, b| a.cd.total_cmp(&b.cd))
    }
}

fn open(incidences: &[f64]) -> Vec<CurvePoint> {
    incidences.iter().map(|&incidence| CurvePoint { incidence, solution: None }).collect()
}

/// Solves what is still open, from neighbour to neighbour in the order of the points.
fn carry(viscous: &Viscous, conditions: &Conditions, points: &mut [CurvePoint]) {
    let mut last: Option<usize> = None;
    for i in 0..points.len() {
        let target = points[i].incidence;
        if points[i].solution.is_none() {
            let near = last.map(|near| (i - near, points[near].solution.as_ref()));
            points[i].solution = match near {
                Some((steps, Some(solution))) if steps <= FAR => {
                    from_neighbour(viscous, conditions, solution, target)
                }
                // Behind several gaps the neighbour leads nowhere as a rule.
                Some(_) => viscous.attempt(target, conditions, None),
                None => viscous.at(target, conditions, None).ok(),
            };
        }
        if points[i].solution.is_some() {
            last = Some(i);
        }
    }
}

/// Difference of the speeds of both sides near the trailing edge, over that of the neighbour, from
/// which on a solution is doubted.
const DOUBTED: f64 = 0.03;

/// Newton steps from which on a solution is doubted that was started from a neighbour: it has come
/// from afar.
const MANY_STEPS: usize = 9;

/// From a neighbour, afresh, or from the neighbour in smaller steps.
///
/// The equations can have a second solution, in which the sides run together at the very edge only
/// and not, as the Kutta condition means, ahead of it. So where they differ there more than at the
/// neighbour, or the way was long, all three ways are gone and that taken which brings the sides
/// together best.
fn from_neighbour(
    viscous: &Viscous,
    conditions: &Conditions,
    near: &ViscousSolution,
    target: f64,
) -> Option<ViscousSolution> {
    let believed = |found: &ViscousSolution| {
        found.steps <= MANY_STEPS && found.edge_difference() < near.edge_difference() + DOUBTED
    };
    let ways: [&dyn Fn() -> Option<ViscousSolution>; 3] = [
        &|| viscous.attempt(target, conditions, Some(&near.state)),
        &|| viscous.attempt(target, conditions, None),
        &|| by_halves(viscous, conditions, near, target),
    ];
    let mut best: Option<ViscousSolution> = None;
    for way in ways {
        let Some(found) = way() else { continue };
        if best.is_none() && believed(&found) {
            return Some(found);
        }
        best = best.filter(|best| best.edge_difference() <= found.edge_difference()).or(Some(found));
    }
    best
}

/// Offsets, in degrees, at which a start is looked for when a point has none of its own.
const DETOURS: [f64; 8] = [1.0, -1.0, 2.0, -2.0, 3.5, -3.5, 5.0, -5.0];

/// Factors of the Reynolds number at which a start is looked for when none is found at its own.
const OTHER_REYNOLDS: [f64; 6] = [2.0, 0.5, 5.0, 0.2, 20.0, 0.05];

/// By way of a point nearby that can be started afresh.
pub(super) fn by_detour(viscous: &Viscous, conditions: &Conditions, target: f64) -> Option<ViscousSolution> {
    let by_incidence = DETOURS.iter().find_map(|offset| {
        let near = viscous.attempt(target + offset.to_radians(), conditions, None)?;
        by_halves(viscous, conditions, &near, target)
    });
    by_incidence.or_else(|| by_other_reynolds(viscous, conditions, target))
}

/// By way of another Reynolds number at which the point can be started afresh.
fn by_other_reynolds(viscous: &Viscous, conditions: &Conditions, target: f64) -> Option<ViscousSolution> {
    OTHER_REYNOLDS.iter().find_map(|&factor| {
        let between =
            |part: f64| Conditions { reynolds: conditions.reynolds * factor.powf(1.0 - part), ..*conditions };
        let near = viscous.attempt(target, &between(0.0), None)?;
        walk(viscous, near, |part| (target, between(part)))
    })
}

/// From a neighbour in smaller steps of incidence.
fn by_halves(
    viscous: &Viscous,
    conditions: &Conditions,
    near: &ViscousSolution,
    target: f64,
) -> Option<ViscousSolution> {
    let from = near.incidence;
    let between = |part: f64| if part == 1.0 { target } else { from + part * (target - from) };
    walk(viscous, near.clone(), |part| (between(part), *conditions))
}

/// From a point along a way that runs from nought to one, in steps that are halved when one fails,
/// and grow again when they do not.
fn walk(
    viscous: &Viscous,
    from: ViscousSolution,
    way: impl Fn(f64) -> (f64, Conditions),
) -> Option<ViscousSolution> {
    let (mut at, mut gone, mut step) = (from, 0.0, 0.5);
    let mut halvings = 1;
    while halvings <= HALVINGS {
        let next = if gone + step > 0.999 { 1.0 } else { gone + step };
        let (incidence, conditions) = way(next);
        match viscous.attempt(incidence, &conditions, Some(&at.state)) {
            Some(found) if next == 1.0 => return Some(found),
            Some(found) => {
                (at, gone) = (found, next);
                step *= 1.5;
            }
            None => {
                step *= 0.5;
                halvings += 1;
            }
        }
    }
    None
}

//! The bucket of a section: which lift it carries without cavitation at which cavitation number.

use super::{LiftCurve, PotentialFlow, Water};

/// A section at one incidence.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct BucketPoint {
    /// In radians.
    pub incidence: f64,
    /// Lift coefficient.
    pub cl: f64,
    /// Greatest suction −cp: the cavitation number at which the water starts to boil.
    pub suction: f64,
}

/// Greatest suction over lift, from the least to the greatest lift that was found.
///
/// Plotted with the cavitation number across and lift upwards it is the bucket: within it nothing
/// boils.
#[derive(Debug, Clone, PartialEq)]
pub struct Bucket {
    points: Vec<BucketPoint>,
}

/// Lift between two bounds.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct FreeLift {
    /// Least lift coefficient that does not cavitate.
    pub from: f64,
    /// Greatest.
    pub to: f64,
    /// Whether the curve ends at either before anything boils, so that it may go on.
    pub open: [bool; 2],
}

impl Bucket {
    /// Through points of growing incidence. What lies beyond the least and the greatest lift is
    /// stalled and left out; so is what is not finite.
    #[must_use]
    pub fn through(points: impl IntoIterator<Item = BucketPoint>) -> Self {
        let finite = |p: &BucketPoint| p.cl.is_finite() && p.suction.is_finite();
        let points: Vec<BucketPoint> = points.into_iter().filter(finite).collect();
        let by_lift = |a: &usize, b: &usize| points[*a].cl.total_cmp(&points[*b].cl);
        let (least, most) = ((0..points.len()).min_by(by_lift), (0..points.len()).max_by(by_lift));
        let kept = match (least, most) {
            (Some(least), Some(most)) if least <= most => points[least..=most].to_vec(),
            _ => Vec::new(),
        };
        Self { points: kept }
    }

    /// Of a curve with friction.
    #[must_use]
    pub fn of(curve: &LiftCurve) -> Self {
        let point =
            |s: &super::ViscousSolution| BucketPoint { incidence: s.incidence, cl: s.cl, suction: -s.cp_min };
        Self::through(curve.solutions().map(point))
    }

    /// Without friction, at `incidences` in radians, growing.
    #[must_use]
    pub fn without_friction(flow: &PotentialFlow, incidences: &[f64]) -> Self {
        Self::through(incidences.iter().map(|&incidence| {
            let solution = flow.at(incidence);
            BucketPoint { incidence, cl: solution.cl, suction: -solution.cp_min }
        }))
    }

    /// What it goes through, by growing incidence.
    #[must_use]
    pub fn points(&self) -> &[BucketPoint] {
        &self.points
    }

    /// The bottom of the bucket: the point of least suction.
    #[must_use]
    pub fn bottom(&self) -> Option<&BucketPoint> {
        self.points.iter().min_by(|a, b| a.suction.total_cmp(&b.suction))
    }

    /// Greatest suction at a lift coefficient; `None` outside what was found.
    #[must_use]
    pub fn suction_at(&self, cl: f64) -> Option<f64> {
        self.points.windows(2).find(|pair| pair[0].cl <= cl && cl <= pair[1].cl).map(|pair| {
            let share = (cl - pair[0].cl) / (pair[1].cl - pair[0].cl).max(f64::MIN_POSITIVE);
            pair[0].suction + share * (pair[1].suction - pair[0].suction)
        })
    }

    /// Speed in m/s from which on it cavitates at a lift coefficient, at `depth` in m, with the
    /// cavitation number to stay by `margin` (a share of the suction) above it.
    ///
    /// `None` outside what was found, and where there is no suction.
    #[must_use]
    pub fn inception_speed(&self, cl: f64, water: &Water, depth: f64, margin: f64) -> Option<f64> {
        water.inception_speed(depth, -self.suction_at(cl)? * (1.0 + margin))
    }

    /// Lift that does not cavitate at a cavitation number, about the bottom of the bucket, with the
    /// number to stay by `margin` (a share of the suction) above it; `None` if there is none.
    #[must_use]
    pub fn free_lift(&self, sigma: f64, margin: f64) -> Option<FreeLift> {
        let most = sigma / (1.0 + margin);
        let bottom = self.points.iter().position(|p| Some(p) == self.bottom())?;
        if most.is_nan() || self.points[bottom].suction > most {
            return None;
        }
        // Going from the bottom outwards, where the suction first passes the number.
        let end = |way: &mut dyn Iterator<Item = &BucketPoint>| {
            let mut inside = self.points[bottom];
            for &outside in way {
                if outside.suction > most {
                    let share = (most - inside.suction) / (outside.suction - inside.suction);
                    return (inside.cl + share * (outside.cl - inside.cl), false);
                }
                inside = outside;
            }
            (inside.cl, true)
        };
        let (from, from_is_open) = end(&mut self.points[..bottom].iter().rev());
        let (to, to_is_open) = end(&mut self.points[bottom + 1..].iter());
        Some(FreeLift { from, to, open: [from_is_open, to_is_open] })
    }

    /// Cavitation number and lift coefficient along the bucket, for a plot as far as `widest`.
    #[must_use]
    pub fn outline(&self, widest: f64) -> Vec<(f64, f64)> {
        let mut line: Vec<(f64, f64)> = Vec::new();
        for pair in self.points.windows(2) {
            let [a, b] = [&pair[0], &pair[1]].map(|p| (p.suction, p.cl));
            let crossing = || {
                let share = (widest - a.0) / (b.0 - a.0);
                (widest, a.1 + share * (b.1 - a.1))
            };
            match (a.0 <= widest, b.0 <= widest) {
                (true, true) => line.extend([a, b]),
                (true, false) => line.extend([a, crossing(), (f64::NAN, f64::NAN)]),
                (false, true) => line.extend([crossing(), b]),
                (false, false) => {}
            }
        }
        line.dedup();
        if line.last().is_some_and(|last| last.0.is_nan()) {
            line.pop();
        }
        line
    }
}

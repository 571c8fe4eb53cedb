//! Load cases as plain data.
//!
//! Places are in mm from the root (of a strut, from where it leaves the hull). Forces are in newtons:
//! "across" is along y of the section (lift; side force on a strut), "along" is along the chord,
//! rearwards positive. Where a force acts on the chord, `x` and `y`, is in the axes of the section
//! outlines, mm. The load factor multiplies everything in a case.

use super::StrengthError;

/// Standard gravity, m/s².
pub const GRAVITY: f64 = 9.806_65;

/// A load spread along the span, in straight lines between samples.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct LineLoad {
    /// Place along the span, mm.
    pub at: f64,
    /// Force per length across and along, N/mm.
    pub force: [f64; 2],
    /// Nose-up torque per length about the origin of the section's axes, N·mm/mm.
    pub torque: f64,
}

/// A load in one place.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct PointLoad {
    /// Place along the span, mm.
    pub at: f64,
    /// Force across and along, N.
    pub force: [f64; 2],
    /// Nose-up torque about the origin of the section's axes, N·mm.
    pub torque: f64,
    /// Force towards the root, N.
    pub compression: f64,
}

impl PointLoad {
    /// A force across and along, N, that acts at `x`, `y` of the section's axes, mm.
    #[must_use]
    pub fn acting_at(at: f64, force: [f64; 2], [x, y]: [f64; 2]) -> Self {
        Self { at, force, torque: nose_up(force, [x, y]), compression: 0.0 }
    }
}

/// Nose-up torque about the origin of a force that acts at a place.
fn nose_up([across, along]: [f64; 2], [x, y]: [f64; 2]) -> f64 {
    along * y - across * x
}

/// What a part has to stand at one time.
#[derive(Debug, Clone, PartialEq)]
pub struct LoadCase {
    /// What the user calls it.
    pub name: String,
    /// By how much all loads of the case are multiplied; it stands with every result.
    pub factor: f64,
    /// Spread loads, each a row of samples in rising order; the load is nought outside of them.
    pub spread: Vec<Vec<LineLoad>>,
    /// Loads in one place.
    pub points: Vec<PointLoad>,
}

impl LoadCase {
    /// A case without loads yet.
    #[must_use]
    pub fn new(name: &str, factor: f64) -> Self {
        Self { name: name.to_owned(), factor, spread: Vec::new(), points: Vec::new() }
    }

    /// Lift given as samples (mm from the root, N/mm), acting at `x` on the chord of each, with a
    /// nose-up moment per length about that place (N·mm/mm): samples are (at, lift, x, moment).
    #[must_use]
    pub fn lift(name: &str, factor: f64, samples: &[[f64; 4]]) -> Self {
        let sample = |&[at, lift, x, moment]: &[f64; 4]| LineLoad {
            at,
            force: [lift, 0.0],
            torque: moment + nose_up([lift, 0.0], [x, 0.0]),
        };
        Self { spread: vec![samples.iter().map(sample).collect()], ..Self::new(name, factor) }
    }

    /// A side force of `total` N, even along the wet part of a strut from `wet[0]` to `wet[1]` mm, that
    /// acts at `x` on the chord.
    #[must_use]
    pub fn side_force(name: &str, factor: f64, total: f64, wet: [f64; 2], x: f64) -> Self {
        let force = [total / (wet[1] - wet[0]), 0.0];
        let torque = nose_up(force, [x, 0.0]);
        let spread = wet.map(|at| LineLoad { at, force, torque }).to_vec();
        Self { spread: vec![spread], ..Self::new(name, factor) }
    }

    /// A tow of `pull` N that pulls `off` radians off the course, fastened `at` mm along the span at
    /// `place` (x, y) of the section's axes.
    #[must_use]
    pub fn off_course_tow(name: &str, factor: f64, pull: f64, off: f64, at: f64, place: [f64; 2]) -> Self {
        let force = [pull * off.sin(), -pull * off.cos()];
        Self { points: vec![PointLoad::acting_at(at, force, place)], ..Self::new(name, factor) }
    }

    /// A person of `weight` kg who stands on it `at` mm along the span at `x` of the chord.
    #[must_use]
    pub fn standing(name: &str, factor: f64, weight: f64, at: f64, x: f64) -> Self {
        let force = [-weight * GRAVITY, 0.0];
        Self { points: vec![PointLoad::acting_at(at, force, [x, 0.0])], ..Self::new(name, factor) }
    }

    /// Grounding at the tip: a push towards the root, one rearwards and one across, N, the latter two
    /// at `x` of the tip's chord, `at` mm from the root.
    #[must_use]
    pub fn grounding(name: &str, factor: f64, [push, rearwards, across]: [f64; 3], at: f64, x: f64) -> Self {
        let load = PointLoad { compression: push, ..PointLoad::acting_at(at, [across, rearwards], [x, 0.0]) };
        Self { points: vec![load], ..Self::new(name, factor) }
    }

    /// Refuses a case that cannot be worked out on a part of a reach in mm.
    ///
    /// # Errors
    /// Names the place of a load that is no number, off the part or out of order; an empty case.
    pub fn check(&self, reach: f64) -> Result<(), StrengthError> {
        let has_loads = !self.points.is_empty() || self.spread.iter().any(|row| row.len() > 1);
        if !(has_loads && self.factor > 0.0 && self.factor.is_finite()) {
            return Err(StrengthError::EmptyCase { case: self.name.clone() });
        }
        let wrong = |at: f64| StrengthError::Load { case: self.name.clone(), at, reach };
        let lies = |at: f64| (0.0..=reach * (1.0 + 1e-9)).contains(&at);
        for load in &self.points {
            let numbers = [load.force[0], load.force[1], load.torque, load.compression];
            if !(lies(load.at) && numbers.iter().all(|number| number.is_finite())) {
                return Err(wrong(load.at));
            }
        }
        for row in &self.spread {
            let mut before = 0.0;
            for load in row {
                let numbers = [load.force[0], load.force[1], load.torque];
                if !(lies(load.at) && load.at >= before && numbers.iter().all(|number| number.is_finite())) {
                    return Err(wrong(load.at));
                }
                before = load.at;
            }
        }
        Ok(())
    }

    /// Spread load just at a place, by straight lines: across, along, torque; factor included.
    pub(super) fn spread_at(&self, at: f64) -> [f64; 3] {
        let mut sum = [0.0; 3];
        for row in &self.spread {
            if let Some(pair) = row.windows(2).find(|pair| pair[0].at <= at && at < pair[1].at) {
                let share = (at - pair[0].at) / (pair[1].at - pair[0].at);
                let mix = |a: f64, b: f64| self.factor * (a + share * (b - a));
                sum[0] += mix(pair[0].force[0], pair[1].force[0]);
                sum[1] += mix(pair[0].force[1], pair[1].force[1]);
                sum[2] += mix(pair[0].torque, pair[1].torque);
            }
        }
        sum
    }

    /// Places at which the load has a corner or a jump, mm.
    pub(super) fn places(&self) -> impl Iterator<Item = f64> + '_ {
        self.spread.iter().flatten().map(|load| load.at).chain(self.points.iter().map(|load| load.at))
    }
}

//! The lifting line: the load along the span that agrees with every strip's lift curve.

use super::induced::{Induced, velocity};
use super::result::{Loading, StripLoad};
use super::section_lift::{SectionLift, SectionPoint, mix};
use super::strips::{Setting, Strip, Strips};
use super::{GreatestLift, LoadingError, dense, error::checked};
use crate::wing::Wing;
use std::f64::consts::TAU;

/// Most strips from the root to the tip.
pub const MOST_STRIPS: usize = 200;
/// Largest disagreement of a strip, in chords, at which the load counts as settled.
const SETTLED: f64 = 1e-10;
/// Newton steps, and halvings of one, before giving up.
const STEPS: usize = 60;
const HALVINGS: i32 = 12;
/// Steps from no incidence in which a load that does not settle at once is approached.
const RAMP: usize = 16;
/// Rounds in which falling lift curves are eased.
const EASINGS: usize = 25;
/// Half width of the difference that gives a lift slope, radians.
const SLOPE_STEP: f64 = 5e-4;

/// How a foil moves through the water.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct State {
    /// Speed, m/s, from 0.01 to 200.
    pub speed: f64,
    /// Density of the water, kg/m³, from 1 to 2000.
    pub density: f64,
    /// Nose-up incidence of the foil's x axis to the flow, radians, within ±0.8. The foil's height and the
    /// depth are taken as without it.
    pub incidence: f64,
    /// Flap angle, trailing edge down, radians. Acts between the ends of [`Setting::flap`].
    pub flap: f64,
}

/// A foil laid out for loads.
///
/// Source of the line: Prandtl, NACA Report 116 (1921); of strips that follow a measured lift curve:
/// Sivells and Neely, NACA TN 1269 (1947). Horseshoes lie at equal steps of Glauert's angle.
pub struct LiftingLine {
    pub(super) strips: Strips,
    induced: Induced,
    depth: Option<f64>,
    /// mm² and mm, of all that carries load.
    area: f64,
    span: f64,
}

impl LiftingLine {
    /// Cuts a foil into strips.
    ///
    /// # Errors
    /// When the setting cannot be, the foil is not under water, or its quarter-chord line is swept by more
    /// than 35° or rises by more than 60°.
    pub fn new(wing: &Wing, setting: &Setting) -> Result<Self, LoadingError> {
        let strips = Strips::of(wing, setting, MOST_STRIPS)?;
        let induced = Induced::of(&strips, setting.depth);
        let (area, span) = (strips.area(), strips.span());
        Ok(Self { strips, induced, depth: setting.depth, area, span })
    }

    /// Area of all strips, seen from above, mm².
    #[must_use]
    pub fn area(&self) -> f64 {
        self.area
    }

    /// Tip to tip, seen from above, mm.
    #[must_use]
    pub fn span(&self) -> f64 {
        self.span
    }

    /// The load in one state.
    ///
    /// # Errors
    /// When a quantity of the state makes no sense, a section gives no finite number, or the load does not
    /// settle.
    pub fn load(&self, sections: &dyn SectionLift, state: &State) -> Result<Loading, LoadingError> {
        self.load_from(sections, state, None)
    }

    /// As [`LiftingLine::load`], starting from the circulation of a neighbouring state.
    pub(super) fn load_from(
        &self,
        sections: &dyn SectionLift,
        state: &State,
        start: Option<&Loading>,
    ) -> Result<Loading, LoadingError> {
        checked("the speed", state.speed, "from 0.01 to 200 m/s", |v| (0.01..=200.0).contains(&v))?;
        let density = |v: f64| (1.0..=2000.0).contains(&v);
        checked("the density of the water", state.density, "from 1 to 2000 kg/m³", density)?;
        checked("the incidence", state.incidence, "from -0.8 to 0.8 radians", |v| v.abs() <= 0.8)?;
        checked("the flap angle", state.flap, "from -0.8 to 0.8 radians", |v| v.abs() <= 0.8)?;
        let begin =
            start.map_or_else(|| self.first_guess(sections, state), |loading| loading.over_speed.clone());
        let settled = self.settle(sections, state, begin).or_else(|_| {
            // From no incidence the attached load is followed up, so that of several that agree with a
            // falling lift curve it is the one that grew.
            let level = State { incidence: 0.0, ..*state };
            let mut circulation = self.first_guess(sections, &level);
            for step in 0..RAMP {
                let incidence = state.incidence * step as f64 / RAMP as f64;
                circulation = match self.settle(sections, &State { incidence, ..*state }, circulation) {
                    Ok(found) => found.circulation,
                    Err((best, _)) => best,
                };
            }
            self.settle(sections, state, circulation).map_err(|(_, error)| error)
        });
        let loading = self.result(sections, state, settled?);
        let sums = [loading.lift, loading.drag(), loading.pitching_moment];
        if sums.iter().all(|sum| sum.is_finite()) {
            Ok(loading)
        } else {
            Err(LoadingError::Table { why: "its lift, drag or moment is no finite number".into() })
        }
    }

    /// The load that agrees with the lift curves, eased where they fall; on failure the best that was found.
    ///
    /// Where lift falls with incidence, strips beside each other can settle on either side of the top in
    /// turn, and the finer the strips the wilder. With a slope -s a wave k along the span is damped by
    /// 1 - c s k/8 (its wake turns the flow by k Γ/4), which passes through zero; with ℓ² Γ'' added, where
    /// ℓ = c s/8, it is 1 - u + u² for u = k ℓ and never below 3/4. So the load is eased over some third of a
    /// chord there, and nowhere else. The thought of an added viscosity past the stall is Chattot's
    /// (Computational Fluid Dynamics Journal, 2004, from memory); its size is worked out here.
    fn settle(
        &self,
        sections: &dyn SectionLift,
        state: &State,
        mut circulation: Vec<f64>,
    ) -> Result<Settled, (Vec<f64>, LoadingError)> {
        let mut easing = vec![0.0; circulation.len()];
        let mut residual = f64::INFINITY;
        for _ in 0..EASINGS {
            (circulation, residual) = self.newton(sections, state, circulation, &easing);
            // Easing only grows, so that this ends.
            let needed = self.easing(sections, state, &circulation);
            if needed.iter().zip(&easing).all(|(needed, ease)| *needed <= ease * (1.0 + 1e-6)) {
                break;
            }
            easing.iter_mut().zip(needed).for_each(|(ease, needed)| *ease = ease.max(needed));
        }
        // Strips that were past the top only on the way need none.
        let needed = self.easing(sections, state, &circulation);
        if residual < SETTLED && needed != easing {
            let (tried, left) = self.newton(sections, state, circulation.clone(), &needed);
            let again = self.easing(sections, state, &tried);
            if left < SETTLED && again.iter().zip(&needed).all(|(again, ease)| *again <= ease * (1.0 + 1e-6))
            {
                return Ok(Settled { circulation: tried, easing: needed });
            }
        }
        if residual < SETTLED {
            return Ok(Settled { circulation, easing });
        }
        Err((circulation, LoadingError::NotSettled { degrees: state.incidence.to_degrees(), residual }))
    }

    /// ℓ² of each strip, mm², for the slopes at which the sections work.
    fn easing(&self, sections: &dyn SectionLift, state: &State, circulation: &[f64]) -> Vec<f64> {
        let ease = |(i, strip): (usize, &Strip)| {
            let slope = self.slope(i, sections, state, circulation);
            (strip.chord * strip.cos_sweep * (-slope).max(0.0) / 8.0).powi(2)
        };
        self.strips.strips.iter().enumerate().map(ease).collect()
    }

    /// The load by a slope of 2π from what each section lifts at no incidence: below a stall it is near, and
    /// it starts no strip past its top because its wake was not there yet.
    fn first_guess(&self, sections: &dyn SectionLift, state: &State) -> Vec<f64> {
        let strips = &self.strips.strips;
        let still = vec![0.0; strips.len()];
        let rows = strips.iter().enumerate().map(|(i, strip)| {
            let factor = 0.5 * strip.chord * strip.cos_sweep * TAU;
            let turned = self.induced.by_wake[i].iter().zip(&self.induced.by_image[i]);
            let mut row: Vec<f64> = turned.map(|(wake, image)| factor * (wake + image)).collect();
            row[i] += 1.0;
            row
        });
        let asked = strips.iter().enumerate().map(|(i, strip)| {
            let cl = on_strip(sections, strip, 0.0, state.flap).cl
                + TAU * self.section_incidence(i, state, &still);
            0.5 * strip.chord * strip.cos_sweep.powi(2) * cl
        });
        dense::solve(rows.collect(), asked.collect()).unwrap_or(still)
    }

    /// Newton's method with steps halved until the disagreement falls; gives the largest that is left too.
    fn newton(
        &self,
        sections: &dyn SectionLift,
        state: &State,
        mut circulation: Vec<f64>,
        easing: &[f64],
    ) -> (Vec<f64>, f64) {
        let mut misses = self.misses(sections, state, &circulation, easing);
        for _ in 0..STEPS {
            if self.worst(&misses) < SETTLED {
                break;
            }
            let matrix = self.change_of_misses(sections, state, &circulation, easing);
            let Some(step) = dense::solve(matrix, misses.iter().map(|miss| -miss).collect()) else { break };
            let size = sum_of_squares(&misses);
            let shares = (0..HALVINGS).map(|halvings| 0.5_f64.powi(halvings));
            let better = shares.into_iter().find_map(|share| {
                let tried: Vec<f64> = circulation.iter().zip(&step).map(|(g, d)| g + share * d).collect();
                let missed = self.misses(sections, state, &tried, easing);
                (sum_of_squares(&missed) < size * (1.0 - 1e-4 * share)).then_some((tried, missed))
            });
            let Some(found) = better else { break };
            (circulation, misses) = found;
        }
        let residual = self.worst(&misses);
        (circulation, residual)
    }

    /// Circulation over speed less what the lift curves ask, mm.
    fn misses(
        &self,
        sections: &dyn SectionLift,
        state: &State,
        circulation: &[f64],
        easing: &[f64],
    ) -> Vec<f64> {
        let miss = |(i, strip): (usize, &Strip)| {
            let incidence = self.section_incidence(i, state, circulation);
            let cl = on_strip(sections, strip, incidence, state.flap).cl;
            let asked = 0.5 * strip.chord * strip.cos_sweep.powi(2) * cl;
            let eased: f64 = match easing[i] {
                0.0 => 0.0,
                ease => {
                    ease * self.bend(i).into_iter().map(|(j, factor)| factor * circulation[j]).sum::<f64>()
                }
            };
            circulation[i] - asked - eased
        };
        self.strips.strips.iter().enumerate().map(miss).collect()
    }

    /// Largest miss, in chords.
    fn worst(&self, misses: &[f64]) -> f64 {
        let in_chords = misses.iter().zip(&self.strips.strips).map(|(miss, strip)| miss.abs() / strip.chord);
        // The greater of a number and no number is the number: look at that first.
        if misses.iter().all(|miss| miss.is_finite()) { in_chords.fold(0.0, f64::max) } else { f64::INFINITY }
    }

    /// Change of each miss with each circulation.
    fn change_of_misses(
        &self,
        sections: &dyn SectionLift,
        state: &State,
        circulation: &[f64],
        easing: &[f64],
    ) -> Vec<Vec<f64>> {
        let row = |(i, strip): (usize, &Strip)| {
            let slope = self.slope(i, sections, state, circulation);
            let factor = 0.5 * strip.chord * strip.cos_sweep * slope;
            let turned = self.induced.by_wake[i].iter().zip(&self.induced.by_image[i]);
            let mut row: Vec<f64> = turned.map(|(wake, image)| factor * (wake + image)).collect();
            row[i] += 1.0;
            for (j, bend) in self.bend(i) {
                row[j] -= easing[i] * bend;
            }
            row
        };
        self.strips.strips.iter().enumerate().map(row).collect()
    }

    /// Lift slope of a strip's section where it works, per radian.
    fn slope(&self, i: usize, sections: &dyn SectionLift, state: &State, circulation: &[f64]) -> f64 {
        let incidence = self.section_incidence(i, state, circulation);
        let cl = |change: f64| on_strip(sections, &self.strips.strips[i], incidence + change, state.flap).cl;
        (cl(SLOPE_STEP) - cl(-SLOPE_STEP)) / (2.0 * SLOPE_STEP)
    }

    /// Factors of the circulations in the second derivative along the line at a strip, 1/mm²; level at both
    /// ends.
    fn bend(&self, i: usize) -> [(usize, f64); 3] {
        let strips = &self.strips.strips;
        let factor = |j: usize| {
            let apart = 0.5 * (strips[i].length + strips[j].length);
            if j == i { 0.0 } else { 1.0 / (apart * strips[i].length) }
        };
        let (before, after) = (i.saturating_sub(1), (i + 1).min(strips.len() - 1));
        let (inner, outer) = (factor(before), factor(after));
        [(before, inner), (i, -inner - outer), (after, outer)]
    }

    /// The incidence at which a strip's section works, square to its line, radians.
    ///
    /// A swept strip feels the speed across its line, V cos Λ, at the incidence α / cos Λ (simple sweep:
    /// Busemann 1935; Betz); a raised one the part of the incidence square to it.
    fn section_incidence(&self, i: usize, state: &State, circulation: &[f64]) -> f64 {
        let strip = &self.strips.strips[i];
        let set = (state.incidence + strip.twist) * strip.along[0];
        let turned = dot(&self.induced.by_wake[i], circulation) + dot(&self.induced.by_image[i], circulation);
        (set - turned) / strip.cos_sweep
    }

    fn result(&self, sections: &dyn SectionLift, state: &State, settled: Settled) -> Loading {
        let Settled { circulation: over_speed, easing } = settled;
        let pressure = 0.5 * state.density * state.speed * state.speed;
        let loads = self.strips.strips.iter().enumerate().map(|(i, strip)| {
            let g = over_speed[i];
            let incidence = self.section_incidence(i, state, &over_speed);
            let point = on_strip(sections, strip, incidence, state.flap);
            let greatest = greatest_on_strip(sections, strip, state.flap);
            let wake = dot(&self.induced.by_wake[i], &over_speed);
            StripLoad {
                at: strip.middle[1],
                chord: strip.chord,
                width: strip.width,
                circulation: g * 1e-3 * state.speed,
                // ρ V Γ on each mm along the line, of which the part upwards is that on each mm of span.
                lift_per_mm: 2.0 * pressure * g * 1e-6,
                lift_coefficient: 2.0 * g / strip.chord,
                section_lift: point.cl,
                effective_incidence: incidence,
                downwash: wake,
                induced_drag_per_mm: 2.0 * pressure * g * wake * 1e-6 * strip.length / strip.width,
                profile_drag_per_mm: pressure * strip.chord * point.cd * 1e-6 * strip.length / strip.width,
                moment_per_mm: pressure * strip.chord.powi(2) * point.cm * strip.cos_sweep.powi(2) * 1e-9,
                quarter_chord: strip.middle,
                stall_margin: greatest.map(|top| top.incidence - incidence),
                eased: easing[i] > 0.0,
                beyond: point.beyond,
            }
        });
        Loading::sum(*state, loads.collect(), over_speed, self.strips.halves, self.area, self.span)
    }

    /// The angle by which the flow is turned down at a place (x, y, z) mm from the root's quarter chord,
    /// radians for small ones; negative where it is turned up. For the other foil of a boat, which stands
    /// in it.
    ///
    /// The legs run straight aft at the height at which they leave the foil. Within their sheet a place on
    /// a leg, as the middle of a mirrored foil is, reads low by a share of one in twice the strips; a strip's
    /// width above or below it that is gone. Within a thousandth of the mean chord of a vortex the angle is
    /// eased to nothing.
    ///
    /// # Errors
    /// When a coordinate is no number, or the load is not of this line.
    pub fn downwash_at(&self, loading: &Loading, place: [f64; 3]) -> Result<f64, LoadingError> {
        for value in place {
            checked("the place of the downwash", value, "a finite number of mm", |_| true)?;
        }
        let strips = self.strips.strips.len();
        if loading.over_speed.len() != strips {
            return Err(LoadingError::StripCount {
                strips: loading.over_speed.len(),
                least: strips,
                most: strips,
            });
        }
        let core = 0.001 * self.area / self.span;
        Ok(-velocity(place, &self.strips, self.depth, &loading.over_speed, core)[2])
    }
}

/// A load, and by how much it was eased: ℓ² of each strip, mm².
struct Settled {
    circulation: Vec<f64>,
    easing: Vec<f64>,
}

/// The section of a strip; one partly flapped is the mean of both by their shares.
fn on_strip(sections: &dyn SectionLift, strip: &Strip, incidence: f64, flap: f64) -> SectionPoint {
    let read = |flap: f64| sections.at(strip.middle[1], incidence, flap);
    match strip.flapped {
        0.0 => read(0.0),
        1.0 => read(flap),
        share => mix(read(0.0), read(flap), share),
    }
}

fn greatest_on_strip(sections: &dyn SectionLift, strip: &Strip, flap: f64) -> Option<GreatestLift> {
    let plain = sections.greatest(strip.middle[1], 0.0)?;
    if strip.flapped == 0.0 {
        return Some(plain);
    }
    let flapped = sections.greatest(strip.middle[1], flap)?;
    let between = |from: f64, to: f64| from + strip.flapped * (to - from);
    Some(GreatestLift {
        incidence: between(plain.incidence, flapped.incidence),
        cl: between(plain.cl, flapped.cl),
    })
}

fn dot(a: &[f64], b: &[f64]) -> f64 {
    a.iter().zip(b).map(|(a, b)| a * b).sum()
}

fn sum_of_squares(values: &[f64]) -> f64 {
    values.iter().map(|value| value * value).sum()
}

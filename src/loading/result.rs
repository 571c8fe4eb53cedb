//! What a load amounts to.

use super::State;
use std::f64::consts::PI;

/// The load on one strip. Lengths in mm, from the root.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct StripLoad {
    /// Distance of its middle from the root, mm.
    pub at: f64,
    /// Chord, mm.
    pub chord: f64,
    /// Extent along the span, mm.
    pub width: f64,
    /// Circulation, m²/s.
    pub circulation: f64,
    /// Lift on each mm of span, N/mm.
    pub lift_per_mm: f64,
    /// Lift over dynamic pressure and chord, as seen along the flow.
    pub lift_coefficient: f64,
    /// Lift coefficient at which the section works: the same on an unswept foil, more on a swept one.
    pub section_lift: f64,
    /// Incidence at which the section works, radians.
    pub effective_incidence: f64,
    /// By how much the foil's own wake turns the flow down, radians.
    pub downwash: f64,
    /// N/mm of span.
    pub induced_drag_per_mm: f64,
    /// N/mm of span.
    pub profile_drag_per_mm: f64,
    /// Moment of the section about its quarter chord, nose up, N m/mm of span.
    pub moment_per_mm: f64,
    /// x aft, y along the span and z up, mm.
    pub quarter_chord: [f64; 3],
    /// Incidence left until the section's greatest lift, radians; negative when stalled, `None` when the
    /// lift curve shows no greatest.
    pub stall_margin: Option<f64>,
    /// Whether the load is eased between neighbouring strips, since the section is past its greatest lift,
    /// or was while the load was sought: lift and section then agree only in the mean.
    pub eased: bool,
    /// Whether the section was asked outside of what is known of it.
    pub beyond: bool,
}

/// The load on a foil in one state. Of a mirrored foil the sums are those of both halves.
#[derive(Debug, Clone, PartialEq)]
pub struct Loading {
    /// The state that was asked.
    pub state: State,
    /// The strips from the root to the tip; of a mirrored foil, those of one half.
    pub strips: Vec<StripLoad>,
    /// Lift, N.
    pub lift: f64,
    /// N.
    pub induced_drag: f64,
    /// N.
    pub profile_drag: f64,
    /// About the root's quarter chord, nose up, N m: of lift, of drag at its height, and of the sections.
    pub pitching_moment: f64,
    /// Over dynamic pressure and area.
    pub lift_coefficient: f64,
    /// Over dynamic pressure and area.
    pub induced_drag_coefficient: f64,
    /// Circulation over speed, mm.
    pub(super) over_speed: Vec<f64>,
    aspect_ratio: f64,
}

impl Loading {
    pub(super) fn sum(
        state: State,
        strips: Vec<StripLoad>,
        over_speed: Vec<f64>,
        halves: f64,
        area: f64,
        span: f64,
    ) -> Self {
        let total = |per_mm: &dyn Fn(&StripLoad) -> f64| {
            halves * strips.iter().map(|strip| per_mm(strip) * strip.width).sum::<f64>()
        };
        let lift = total(&|s| s.lift_per_mm);
        let induced_drag = total(&|s| s.induced_drag_per_mm);
        let profile_drag = total(&|s| s.profile_drag_per_mm);
        let pitching_moment = total(&|s| {
            let [aft, _, up] = s.quarter_chord;
            let drag = s.induced_drag_per_mm + s.profile_drag_per_mm;
            s.moment_per_mm + 1e-3 * (drag * up - s.lift_per_mm * aft)
        });
        let full = 0.5 * state.density * state.speed * state.speed * area * 1e-6;
        Self {
            state,
            lift,
            induced_drag,
            profile_drag,
            pitching_moment,
            lift_coefficient: lift / full,
            induced_drag_coefficient: induced_drag / full,
            strips,
            over_speed,
            aspect_ratio: span * span / area,
        }
    }

    /// The same coefficients at another speed, m/s.
    pub(super) fn at_speed(&self, speed: f64) -> Self {
        let ratio = speed / self.state.speed;
        let forces = ratio * ratio;
        let mut other = self.clone();
        other.state.speed = speed;
        for sum in
            [&mut other.lift, &mut other.induced_drag, &mut other.profile_drag, &mut other.pitching_moment]
        {
            *sum *= forces;
        }
        for strip in &mut other.strips {
            strip.circulation *= ratio;
            strip.lift_per_mm *= forces;
            strip.induced_drag_per_mm *= forces;
            strip.profile_drag_per_mm *= forces;
            strip.moment_per_mm *= forces;
        }
        other
    }

    /// Induced and profile drag together, N.
    #[must_use]
    pub fn drag(&self) -> f64 {
        self.induced_drag + self.profile_drag
    }

    /// Power that the drag takes at this speed, W.
    #[must_use]
    pub fn power(&self) -> f64 {
        self.drag() * self.state.speed
    }

    /// Span efficiency e in C_Di = C_L² / (π A e), near the surface included; `None` without induced drag.
    #[must_use]
    pub fn span_efficiency(&self) -> Option<f64> {
        let efficiency =
            self.lift_coefficient.powi(2) / (PI * self.aspect_ratio * self.induced_drag_coefficient);
        (efficiency.is_finite() && efficiency > 0.0).then_some(efficiency)
    }

    /// The strip with the least incidence left until it stalls: where a stall sets in, or has. `None` when
    /// no lift curve shows a greatest lift.
    #[must_use]
    pub fn nearest_to_stall(&self) -> Option<&StripLoad> {
        let margin = |strip: &&StripLoad| strip.stall_margin;
        let known = self.strips.iter().filter(|strip| margin(strip).is_some());
        known.min_by(|a, b| margin(a).unwrap_or(0.0).total_cmp(&margin(b).unwrap_or(0.0)))
    }

    /// Whether any strip was asked outside of what is known of its section.
    #[must_use]
    pub fn is_beyond(&self) -> bool {
        self.strips.iter().any(|strip| strip.beyond)
    }
}

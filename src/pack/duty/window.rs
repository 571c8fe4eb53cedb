//! The window in which a foil works: between what stalls it and what makes the water boil, over the speeds.

use super::{Foil, worst_inception};
use crate::loading::{Loading, LoadingError, State};

/// Speeds that are looked at.
const SPEEDS: usize = 9;
/// Incidences that are looked at, degrees.
const RANGE: (f64, f64) = (-5.0, 15.0);
const STEPS: usize = 14;

/// One speed of the window; forces in N.
#[derive(Debug, Clone, Copy)]
pub(in crate::pack) struct Limits {
    /// m/s.
    pub(in crate::pack) speed: f64,
    /// Lift at which the first part of the foil stalls.
    pub(in crate::pack) stall: f64,
    /// Lift above which the water boils somewhere, where that is below the stall; else no number.
    pub(in crate::pack) boils_above: f64,
    /// Lift below which it boils on the lower side; else no number.
    pub(in crate::pack) boils_below: f64,
}

/// The limits from somewhat below the slowest to somewhat above the fastest of the speeds.
pub(super) fn window(foil: &Foil<'_>, slowest: f64, fastest: f64) -> Result<Vec<Limits>, LoadingError> {
    let (from, to) = (0.75 * slowest, 1.3 * fastest);
    let speeds = (0..SPEEDS).map(|i| from + (to - from) * i as f64 / (SPEEDS - 1) as f64);
    speeds.map(|speed| limits(foil, speed)).collect()
}

fn limits(foil: &Foil<'_>, speed: f64) -> Result<Limits, LoadingError> {
    let at = foil.at(speed)?;
    let angle = |i: usize| (RANGE.0 + (RANGE.1 - RANGE.0) * i as f64 / STEPS as f64).to_radians();
    let mut seen: Vec<(Loading, f64)> = Vec::new();
    for i in 0..=STEPS {
        let state = State { incidence: angle(i), ..at.state };
        let Ok(loading) = at.line.load(&at.curves.lift, &state) else { continue };
        if loading.is_beyond() {
            continue;
        }
        let stalled =
            loading.nearest_to_stall().and_then(|strip| strip.stall_margin).is_some_and(|m| m < 0.0);
        let inception = worst_inception(foil, &at, &loading).map_or(f64::INFINITY, |worst| worst.0);
        seen.push((loading, inception));
        if stalled {
            break;
        }
    }
    let lift = |i: usize| seen[i].0.lift;
    let stall = (0..seen.len()).map(lift).fold(f64::NAN, f64::max);
    // The place that is furthest from boiling, and from there both ways.
    let calm = (0..seen.len()).max_by(|&a, &b| seen[a].1.total_cmp(&seen[b].1));
    let crossing = |inner: usize, outer: usize| {
        let (a, b) = (seen[inner].1.min(1e3) - speed, seen[outer].1.min(1e3) - speed);
        (a >= 0.0 && b < 0.0).then(|| lift(inner) + a / (a - b) * (lift(outer) - lift(inner)))
    };
    let (above, below) = match calm {
        // It boils at any lift.
        Some(calm) if seen[calm].1 < speed => (Some(lift(calm)), Some(lift(calm))),
        Some(calm) => (
            (calm + 1..seen.len()).find_map(|i| crossing(i - 1, i)),
            (1..=calm).rev().find_map(|i| crossing(i, i - 1)),
        ),
        None => (None, None),
    };
    Ok(Limits {
        speed,
        stall,
        boils_above: above.unwrap_or(f64::NAN),
        boils_below: below.unwrap_or(f64::NAN),
    })
}

/// The speeds from and to which the load lies within the limits, as far as they are among those looked at.
pub(in crate::pack) fn works(limits: &[Limits], load: f64) -> (Option<f64>, Option<f64>) {
    let crossing = |a: &Limits, b: &Limits, value: fn(&Limits) -> f64| {
        let (p, q) = (value(a) - load, value(b) - load);
        ((p < 0.0) != (q < 0.0)).then(|| a.speed + p / (p - q) * (b.speed - a.speed))
    };
    let from = limits.windows(2).find_map(|pair| crossing(&pair[0], &pair[1], |l| l.stall));
    let to = limits.windows(2).find_map(|pair| {
        let above = |l: &Limits| if l.boils_above.is_finite() { l.boils_above } else { l.stall };
        let rises_through = |value: f64, other: f64| value >= load && other < load;
        (rises_through(above(&pair[0]), above(&pair[1])))
            .then(|| {
                let (p, q) = (above(&pair[0]) - load, above(&pair[1]) - load);
                pair[0].speed + p / (p - q) * (pair[1].speed - pair[0].speed)
            })
            .or_else(|| {
                let below =
                    |l: &Limits| if l.boils_below.is_finite() { l.boils_below } else { f64::NEG_INFINITY };
                let (p, q) = (below(&pair[0]) - load, below(&pair[1]) - load);
                (p <= 0.0 && q > 0.0).then(|| {
                    let share = if p.is_finite() { p / (p - q) } else { 1.0 };
                    pair[0].speed + share * (pair[1].speed - pair[0].speed)
                })
            })
    });
    (from, to)
}

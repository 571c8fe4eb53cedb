//! Axes of charts: ends on round values, ticks, and a further scale along the same axis.

use crate::units::number;

/// An axis: its ends on round values, and its ticks.
pub(super) struct Axis {
    low: f64,
    high: f64,
    /// From one tick to the next.
    pub(super) step: f64,
}

/// A further scale along an axis: the same places in other units.
#[derive(Debug, Clone, PartialEq)]
pub struct SecondScale {
    /// Name and unit.
    pub name: String,
    /// How its values follow from those of the axis.
    pub rule: Rule,
}

/// How one scale follows from another.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Rule {
    /// The value times this.
    Times(f64),
    /// This over the root of the value, as the speed by the cavitation number.
    OverRoot(f64),
}

/// Share of the axis that ticks of a further scale keep from each other.
const APART: f64 = 0.09;

impl Axis {
    pub(super) fn over(values: impl Iterator<Item = f64>) -> Self {
        let (mut low, mut high) = values
            .filter(|v| v.is_finite())
            .fold((f64::INFINITY, f64::NEG_INFINITY), |(low, high), v| (low.min(v), high.max(v)));
        if low > high {
            (low, high) = (0.0, 1.0);
        }
        if high - low < 1e-9 {
            (low, high) = (low - 0.5, high + 0.5);
        }
        let step = round_step((high - low) / 8.0);
        // A trace beyond a round value, as a nose ahead of 0 % of chord, earns no tick of its own.
        Self { low: (low / step + 0.02).floor() * step, high: (high / step - 0.02).ceil() * step, step }
    }

    pub(super) fn fraction(&self, value: f64) -> f64 {
        (value - self.low) / (self.high - self.low)
    }

    /// Where the ticks are, and what they say.
    pub(super) fn ticks(&self) -> impl Iterator<Item = (f64, String)> + '_ {
        let count = ((self.high - self.low) / self.step).round() as usize;
        (0..=count).map(|i| {
            let at = self.low + i as f64 * self.step;
            (at, number(at, places(self.step)))
        })
    }

    /// Where the ticks of a further scale are, in values of this axis, and what they say.
    pub(super) fn second_ticks(&self, rule: Rule) -> Vec<(f64, String)> {
        let mut ticks: Vec<(f64, String)> = Vec::new();
        match rule {
            Rule::Times(factor) if factor.abs() > 0.0 && factor.is_finite() => {
                let second = Self::over([self.low * factor, self.high * factor].into_iter());
                ticks.extend(second.ticks().map(|(at, word)| (at / factor, word)));
            }
            Rule::OverRoot(factor) if factor > 0.0 && self.high > 0.0 => {
                let slowest = factor / self.high.sqrt();
                let step = round_step(slowest / 5.0);
                let first = (slowest / step).ceil() as usize;
                for i in first..5 * first {
                    let value = i as f64 * step;
                    let at = (factor / value).powi(2);
                    let far = |last: f64| (last - at) / (self.high - self.low) > APART;
                    if ticks.last().is_none_or(|(last, _)| far(*last)) {
                        ticks.push((at, number(value, places(step))));
                    }
                }
            }
            _ => {}
        }
        ticks.retain(|(at, _)| (-1e-6..=1.0 + 1e-6).contains(&self.fraction(*at)));
        ticks
    }
}

/// The round value next above.
fn round_step(rough: f64) -> f64 {
    let power = 10_f64.powf(rough.log10().floor());
    [1.0, 2.0, 5.0, 10.0].into_iter().find(|m| m * power >= rough).unwrap_or(10.0) * power
}

fn places(step: f64) -> usize {
    (-(step * 1.000_001).log10().floor()).max(0.0) as usize
}

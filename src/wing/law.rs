//! Foils whose chord, twist and sweep run smoothly along the span.

use super::{Station, WingError};
use crate::section::Section;

/// How chord, twist, sweep and rise run between the stations that are given.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default, Hash)]
pub enum Law {
    /// In straight lines, as a batten lies.
    #[default]
    Straight,
    /// By a curve through all stations that neither overshoots nor has a corner.
    Smooth,
    /// The chord as the half of an ellipse over the span, cut off at the tip's chord; the rest in
    /// straight lines. For two stations, root and tip.
    Elliptic,
}

impl Law {
    /// Every law, in the order in which [`Law::WORDS`] names them.
    pub const ALL: [Self; 3] = [Self::Straight, Self::Smooth, Self::Elliptic];
    /// The words of the design file for them.
    pub const WORDS: &'static [&'static str] = &["straight", "smooth", "elliptic"];

    /// The word of the design file.
    #[must_use]
    pub fn word(self) -> &'static str {
        match self {
            Self::Straight => "straight",
            Self::Smooth => "smooth",
            Self::Elliptic => "elliptic",
        }
    }

    /// The law of a word of the design file.
    #[must_use]
    pub fn from_word(word: &str) -> Option<Self> {
        Self::ALL.into_iter().find(|law| law.word() == word)
    }
}

/// Stations that are put in for a curved law, over the whole span: the straight lines between them
/// lie within a hundred-thousandth of the span of the curve.
const FINE: usize = 96;

/// The stations of a foil by a law: those given and as many between them that straight lines from one
/// to the next follow it.
///
/// # Errors
/// When an elliptic law is asked of other than two stations, or a section between two cannot be made.
pub fn along(law: Law, given: Vec<Station>) -> Result<Vec<Station>, WingError> {
    if law == Law::Straight || given.len() < 2 {
        return Ok(given);
    }
    if law == Law::Elliptic && given.len() != 2 {
        return Err(WingError::EllipticStations { count: given.len() });
    }
    let reach = given.last().map_or(0.0, |station| station.at);
    let places: Vec<f64> = given.iter().map(|station| station.at).collect();
    let curve = |value: fn(&Station) -> f64| {
        let values: Vec<f64> = given.iter().map(value).collect();
        Monotone::through(&places, &values)
    };
    let (chord, twist) = (curve(|s| s.chord), curve(|s| s.twist));
    let (sweep, rise) = (curve(|s| s.sweep), curve(|s| s.rise));
    let mut all = Vec::with_capacity(FINE + given.len());
    for pair in given.windows(2) {
        let (inner, outer) = (&pair[0], &pair[1]);
        all.push(inner.clone());
        // An ellipse falls off ever faster towards the tip: its stations draw together there.
        let count = (FINE as f64 * (outer.at - inner.at) / reach).ceil().max(1.0);
        for i in 1..count as usize {
            let share = i as f64 / count;
            let share =
                if law == Law::Elliptic { (std::f64::consts::FRAC_PI_2 * share).sin() } else { share };
            let at = inner.at + share * (outer.at - inner.at);
            let chord = match law {
                Law::Elliptic => {
                    let s = at / reach;
                    outer.chord + (inner.chord - outer.chord) * (1.0 - s * s).sqrt()
                }
                _ => chord.at(at),
            };
            all.push(Station {
                at,
                chord,
                section: between(inner, outer, share)?,
                twist: twist.at(at),
                sweep: sweep.at(at),
                rise: rise.at(at),
                twist_about: inner.twist_about,
            });
        }
    }
    all.extend(given.last().cloned());
    Ok(all)
}

fn between(inner: &Station, outer: &Station, share: f64) -> Result<Section, WingError> {
    if inner.section == outer.section {
        return Ok(inner.section.clone());
    }
    let name = format!("{} to {}", inner.section.name(), outer.section.name());
    Section::blend(name, &inner.section, &outer.section, share)
        .map_err(|error| WingError::Section { why: error.to_string() })
}

/// A cubic through values that rises where they rise and falls where they fall.
///
/// Source: Fritsch and Carlson, "Monotone piecewise cubic interpolation", SIAM Journal on Numerical
/// Analysis 17 (1980); slopes inside by the weighted harmonic mean of Fritsch and Butland (1984).
struct Monotone {
    places: Vec<f64>,
    values: Vec<f64>,
    slopes: Vec<f64>,
}

impl Monotone {
    fn through(places: &[f64], values: &[f64]) -> Self {
        let steps: Vec<f64> = places.windows(2).map(|pair| pair[1] - pair[0]).collect();
        let rates: Vec<f64> =
            values.windows(2).zip(&steps).map(|(pair, step)| (pair[1] - pair[0]) / step).collect();
        let last = places.len() - 1;
        let inner = |i: usize| {
            let (before, after) = (rates[i - 1], rates[i]);
            if before * after <= 0.0 {
                return 0.0;
            }
            let (w1, w2) = (2.0 * steps[i] + steps[i - 1], steps[i] + 2.0 * steps[i - 1]);
            (w1 + w2) / (w1 / before + w2 / after)
        };
        // At an end the parabola through three points, held from overshooting.
        let end = |rate: f64, next: Option<f64>, step: f64, next_step: f64| {
            let Some(next) = next else { return rate };
            let slope = ((2.0 * step + next_step) * rate - step * next) / (step + next_step);
            if slope * rate <= 0.0 {
                0.0
            } else if rate * next <= 0.0 && slope.abs() > 3.0 * rate.abs() {
                3.0 * rate
            } else {
                slope
            }
        };
        let slopes = (0..=last)
            .map(|i| match i {
                0 => end(rates[0], rates.get(1).copied(), steps[0], steps.get(1).copied().unwrap_or(1.0)),
                i if i == last => {
                    let before = last.checked_sub(2);
                    let [rate, step] = [rates[last - 1], steps[last - 1]];
                    end(rate, before.map(|k| rates[k]), step, before.map_or(1.0, |k| steps[k]))
                }
                i => inner(i),
            })
            .collect();
        Self { places: places.to_vec(), values: values.to_vec(), slopes }
    }

    fn at(&self, place: f64) -> f64 {
        let i = self.places.partition_point(|p| *p <= place).clamp(1, self.places.len() - 1) - 1;
        let step = self.places[i + 1] - self.places[i];
        let s = (place - self.places[i]) / step;
        let (a, b) = (self.values[i], self.values[i + 1]);
        let (da, db) = (self.slopes[i] * step, self.slopes[i + 1] * step);
        let rest = 1.0 - s;
        a * (1.0 + 2.0 * s) * rest * rest + da * s * rest * rest + b * s * s * (3.0 - 2.0 * s)
            - db * s * s * rest
    }
}

//! The ways in which an outline comes about.

use std::sync::Arc;

use super::SectionError;
use super::flap::Flapped;
use super::laid::Laid;
use super::upright::Upright;
use super::working::Working;
use crate::geometry::{Curve, Jet, Vec2};

/// A curve over [-1, 1] from the upper trailing edge over the nose (0) to the lower one.
#[derive(Debug, Clone, PartialEq)]
pub(super) enum Form {
    /// A thickness laid off across a mean line.
    Laid(Laid),
    /// Two surfaces as heights above the chord.
    Upright(Upright),
    /// A mixture of two others, point by point.
    Blend(Arc<Blend>),
    /// Another with a flap deflected.
    Flapped(Arc<Flapped>),
}

#[derive(Debug, Clone, PartialEq)]
pub(super) struct Blend {
    pub(super) of: [Form; 2],
    /// Share of the second, 0 to 1.
    pub(super) weight: f64,
}

impl Form {
    /// With one more round of changes, made before any flap is deflected. Of a blend both are
    /// changed alike, which changes what they make together in the same way.
    pub(super) fn worked(&self, round: Working, name: &str) -> Result<Self, SectionError> {
        Ok(match self {
            Self::Laid(laid) => {
                let mut laid = laid.clone();
                laid.rounds.push(round);
                Self::Laid(laid)
            }
            Self::Upright(upright) => {
                let mut upright = upright.clone();
                upright.rounds.push(round);
                Self::Upright(upright)
            }
            Self::Blend(blend) => {
                let [first, second] = &blend.of;
                let of = [first.worked(round, name)?, second.worked(round, name)?];
                Self::Blend(Arc::new(Blend { of, weight: blend.weight }))
            }
            Self::Flapped(flapped) => {
                let whole = flapped.whole.worked(round, name)?;
                Self::Flapped(Arc::new(Flapped::new(whole, flapped.flap, name)?))
            }
        })
    }

    /// The outline before a flap was deflected.
    pub(super) fn unflapped(&self) -> &Self {
        match self {
            Self::Flapped(flapped) => flapped.whole.unflapped(),
            other => other,
        }
    }

    /// The first place at which a surface turns back on itself: its name and the station.
    pub(super) fn fold(&self) -> Option<(&'static str, f64)> {
        match self {
            Self::Laid(laid) => laid.fold(),
            Self::Upright(_) => None,
            Self::Blend(blend) => blend.of.iter().find_map(Self::fold),
            Self::Flapped(flapped) => flapped.whole.fold(),
        }
    }

    /// Parameter values between which the curve is analytic: the breaks, and the knots of fits.
    pub(super) fn knots(&self) -> Vec<f64> {
        match self {
            Self::Laid(_) | Self::Flapped(_) => self.breaks(),
            Self::Upright(upright) => both_sides(upright.knots()),
            Self::Blend(blend) => merged(blend.of.iter().flat_map(Self::knots).collect()),
        }
    }
}

impl Curve for Form {
    fn jet(&self, t: f64) -> Jet {
        match self {
            Self::Laid(laid) => laid.jet(t),
            Self::Upright(upright) => upright.jet(t),
            Self::Blend(blend) => {
                let [a, b] = blend.of.each_ref().map(|form| form.jet(t));
                let mix = |p: Vec2, q: Vec2| p * (1.0 - blend.weight) + q * blend.weight;
                Jet {
                    point: mix(a.point.to_vec2(), b.point.to_vec2()).to_point(),
                    first: mix(a.first, b.first),
                    second: mix(a.second, b.second),
                }
            }
            Self::Flapped(flapped) => flapped.jet(t),
        }
    }

    fn breaks(&self) -> Vec<f64> {
        match self {
            Self::Laid(laid) => both_sides(laid.joints()),
            Self::Upright(upright) => both_sides(upright.joints()),
            Self::Blend(blend) => merged(blend.of.iter().flat_map(Self::breaks).collect()),
            Self::Flapped(flapped) => flapped.breaks(),
        }
    }
}

/// The parameter values on both sides of stations, with nose and ends.
fn both_sides(stations: Vec<f64>) -> Vec<f64> {
    let roots = stations.into_iter().map(f64::sqrt).chain([1.0]);
    merged(roots.flat_map(|root| [-root, root]).chain([0.0]).collect())
}

fn merged(mut breaks: Vec<f64>) -> Vec<f64> {
    breaks.sort_by(f64::total_cmp);
    breaks.dedup_by(|a, b| (*a - *b).abs() < 1e-12);
    breaks
}

//! The foil cut into strips: where they lie and how they lean.

use super::LoadingError;
use super::error::checked;
use crate::wing::{Station, Wing};
use std::f64::consts::{FRAC_PI_2, PI};

/// Fewest strips from the root to the tip.
const LEAST_STRIPS: usize = 4;
/// Most sweep and rise of the quarter-chord line, degrees. Beyond them the simple rules for a leaning strip
/// are no longer near.
const MOST_SWEEP: f64 = 35.0;
const MOST_RISE: f64 = 60.0;

/// What the root of a one-handed foil ends in. A mirrored foil has its other half there.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub enum RootEnd {
    /// Water: the root is a second tip.
    #[default]
    Free,
    /// A wall square to the span, as a hull: it mirrors the load.
    Wall,
    /// The surface of the water square to the span, at high speed, as for a strut that pierces it: the load
    /// is mirrored with its sign changed, so that the potential vanishes there.
    Surface,
}

/// How a foil is set in the water.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Setting {
    /// Strips from the root to the tip, from 4 to [`super::MOST_STRIPS`].
    pub strips: usize,
    /// Depth of the root's quarter chord below the level surface, mm; `None` far from it.
    pub depth: Option<f64>,
    /// Ends of the flap, mm from the root, when there is one.
    pub flap: Option<(f64, f64)>,
    /// What the root ends in; not used for a mirrored foil.
    pub root: RootEnd,
}

impl Default for Setting {
    /// Forty strips, far from the surface, no flap.
    fn default() -> Self {
        Self { strips: 40, depth: None, flap: None, root: RootEnd::Free }
    }
}

/// A place in the foil's axes, mm.
pub(super) type Place = [f64; 3];

/// A strip of the foil, between two nodes of the quarter-chord line.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Strip {
    /// Its middle: the quarter chord there.
    pub(super) middle: Place,
    /// Chord, mm.
    pub(super) chord: f64,
    /// Nose-up, radians.
    pub(super) twist: f64,
    /// Extent along the span, mm.
    pub(super) width: f64,
    /// Extent along the line as seen from ahead, mm.
    pub(super) length: f64,
    /// Along the line as seen from ahead: parts along y and z.
    pub(super) along: [f64; 2],
    /// Cosine of the sweep of the line, in the plane of the strip.
    pub(super) cos_sweep: f64,
    /// Share of the strip that has a flap.
    pub(super) flapped: f64,
}

/// The nodes and strips of one half.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Strips {
    pub(super) nodes: Vec<Place>,
    pub(super) strips: Vec<Strip>,
    /// What the other side of the root carries for each unit of this one: 1, 0 or -1.
    pub(super) mirror: f64,
    /// Halves that carry load: 2 for a mirrored foil, else 1.
    pub(super) halves: f64,
}

impl Strips {
    pub(super) fn of(wing: &Wing, setting: &Setting, most: usize) -> Result<Self, LoadingError> {
        let count = setting.strips;
        if !(LEAST_STRIPS..=most).contains(&count) {
            return Err(LoadingError::StripCount { strips: count, least: LEAST_STRIPS, most });
        }
        let reach = wing.reach();
        let flap = setting.flap.unwrap_or((0.0, 0.0));
        if setting.flap.is_some() && !(0.0 <= flap.0 && flap.0 < flap.1 && flap.1 <= reach * (1.0 + 1e-9)) {
            return Err(LoadingError::FlapSpan { from: flap.0, to: flap.1, reach });
        }
        let mirror = match setting.root {
            _ if wing.is_mirrored() => 1.0,
            RootEnd::Free => 0.0,
            RootEnd::Wall => 1.0,
            RootEnd::Surface => -1.0,
        };
        // Equal steps of Glauert's angle draw the strips together at a free end. Middles lie at half steps:
        // the sums over the nodes are then exact for the modes of the series but for a factor
        // sin(nδ)/(nδ), δ half a step.
        let span_at = |step: f64| {
            let share = step / count as f64;
            if mirror == 0.0 {
                0.5 * reach * (1.0 - (PI * share).cos())
            } else {
                reach * (FRAC_PI_2 * share).sin()
            }
        };
        let line = Line { stations: wing.stations() };
        let nodes: Vec<Place> = (0..=count).map(|i| line.quarter(span_at(i as f64))).collect();
        let mut strips = Vec::with_capacity(count);
        for (i, pair) in nodes.windows(2).enumerate() {
            let (inner, outer) = (pair[0], pair[1]);
            let at = span_at(i as f64 + 0.5);
            let width = outer[1] - inner[1];
            let share = (at - inner[1]) / width;
            // On the straight piece between the nodes, not on a corner of the line beside it.
            let middle = [0, 1, 2].map(|k| inner[k] + share * (outer[k] - inner[k]));
            let length = width.hypot(outer[2] - inner[2]);
            let cos_sweep = length / length.hypot(outer[0] - inner[0]);
            let leans = [("is swept", cos_sweep, MOST_SWEEP), ("rises", width / length, MOST_RISE)];
            for (leans, cosine, most) in leans {
                let degrees = cosine.clamp(-1.0, 1.0).acos().to_degrees();
                if degrees > most {
                    return Err(LoadingError::Leans { at, leans, degrees, most });
                }
            }
            let overlap = flap.1.min(outer[1]) - flap.0.max(inner[1]);
            strips.push(Strip {
                middle,
                // A shaped tip carries less, on the quarter chord of its stations.
                chord: wing.chord_at(at),
                twist: line.read(at, |s| s.twist),
                width,
                length,
                along: [width / length, (outer[2] - inner[2]) / length],
                cos_sweep,
                flapped: (overlap.max(0.0) / width).min(1.0),
            });
        }
        if let Some(depth) = setting.depth {
            checked("the depth", depth, "a positive number of mm", |depth| depth > 0.0)?;
            let rise = nodes.iter().map(|node| node[2]).fold(0.0, f64::max);
            if rise >= depth {
                return Err(LoadingError::OutOfTheWater { rise, depth });
            }
        }
        Ok(Self { nodes, strips, mirror, halves: if wing.is_mirrored() { 2.0 } else { 1.0 } })
    }

    /// Area of all that carries load, mm².
    pub(super) fn area(&self) -> f64 {
        self.halves * self.strips.iter().map(|strip| strip.chord * strip.width).sum::<f64>()
    }

    /// Tip to tip, mm.
    pub(super) fn span(&self) -> f64 {
        self.halves * self.strips.iter().map(|strip| strip.width).sum::<f64>()
    }
}

/// Stations read in straight lines.
struct Line<'a> {
    stations: &'a [Station],
}

impl Line<'_> {
    fn read(&self, at: f64, value: impl Fn(&Station) -> f64) -> f64 {
        let outer = self.stations.partition_point(|s| s.at < at).clamp(1, self.stations.len() - 1);
        let (a, b) = (&self.stations[outer - 1], &self.stations[outer]);
        let share = ((at - a.at) / (b.at - a.at)).clamp(0.0, 1.0);
        value(a) + share * (value(b) - value(a))
    }

    fn quarter(&self, at: f64) -> Place {
        let first = &self.stations[0];
        [self.read(at, |s| s.sweep - first.sweep), at, self.read(at, |s| s.rise - first.rise)]
    }
}

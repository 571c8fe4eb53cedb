//! The nodes of an outline, set where the flow needs them, and the shape of the panels between.

use std::f64::consts::FRAC_PI_2;

use super::FlowError;
use crate::geometry::{Curve, Point, Vec2};

/// Panels about an outline unless another number is asked for.
pub const DEFAULT_PANELS: usize = 200;

/// Fewest panels that are accepted.
pub const LEAST_PANELS: usize = 10;

/// Most panels that are accepted: the time grows with the cube of the number.
pub const MOST_PANELS: usize = 2000;

/// Points nearer to each other than this, in chords, are one.
const COINCIDENT: f64 = 1e-9;
/// A trailing edge open by less than this, in chords, counts as sharp: far below the shortest panel,
/// and what a fit through printed coordinates leaves open.
const SHARP: f64 = 1e-6;

/// Share of the nodes that goes where the outline turns, against those spread over its length.
///
/// The round of a nose is half a turn or a little more. At 0.25 it is given about a fifth of the
/// nodes, however thin the section is.
const TURN_WEIGHT: f64 = 0.25;

/// Nodes of an outline from the upper trailing edge over the nose to the lower trailing edge.
///
/// Between two nodes the surface is a parabola, and what lives on the surface is a parabola of
/// its length: both are made of the nodes alone, by the second differences of their neighbours.
#[derive(Debug, Clone, PartialEq)]
pub struct Panelling {
    nodes: Vec<Point>,
    panels: Vec<Panel>,
}

/// One panel: in complex terms the parabola z(u) = middle + half (u + i bow (1 - u²)), with u from
/// -1 at its first node to 1 at its second.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct Panel {
    /// Middle of the chord between its nodes.
    pub(crate) middle: Point,
    /// Half the chord, as a vector from the middle to the second node.
    pub(crate) half: Vec2,
    /// Rise of the surface over the chord at the middle, in half chords, positive to the left.
    pub(crate) bow: f64,
    /// Weights of the nodes j-1 … j+2 in the second derivative by u of a surface quantity on
    /// panel j. Those of nodes that do not exist are zero.
    pub(crate) bend: [f64; 4],
}

impl Panelling {
    /// `panels` panels about a closed outline that is a curve over [-1, 1].
    ///
    /// Nodes are spread by the cosine of an angle that runs evenly along the parameter, drawn
    /// towards where the outline turns, so that the nose of a thin section keeps its share: the
    /// sum of both is dealt out in equal parts (de Boor 1973, "Good approximation by splines with
    /// variable knots", equidistribution).
    ///
    /// # Errors
    /// As [`Panelling::from_points`].
    pub fn of(curve: &impl Curve, panels: usize) -> Result<Self, FlowError> {
        check_count(panels)?;
        let half = (8 * panels).max(1000);
        let step = FRAC_PI_2 / half as f64;
        let at = |angle: f64| curve.jet(angle.sin().clamp(-1.0, 1.0)).point;
        // Counted from the nose to either side, so that the sides of a symmetric outline are
        // dealt with alike to the last digit.
        let side = |sign: f64| -> Vec<f64> {
            let points: Vec<Point> = (0..=half + 1).map(|i| at(sign * step * (i as f64 - 1.0))).collect();
            let turn = |i: usize| {
                if i == half {
                    return 0.0;
                }
                let (before, after) = (points[i + 1] - points[i], points[i + 2] - points[i + 1]);
                before.cross(after).atan2(before.dot(after)).abs()
            };
            let mut dealt = vec![0.0];
            for i in 0..half {
                dealt.push(dealt[i] + step + 0.5 * TURN_WEIGHT * (turn(i) + turn(i + 1)));
            }
            dealt
        };
        let (upper, lower) = (side(-1.0), side(1.0));
        let (before, after) = (upper[half], lower[half]);
        let nodes = (0..=panels).map(|i| {
            let even = (2.0 * i as f64 - panels as f64) / panels as f64;
            let wanted = 0.5 * ((before + after) * even + (after - before));
            let dealt = if wanted < 0.0 { &upper } else { &lower };
            let next = dealt.partition_point(|&sum| sum < wanted.abs()).clamp(1, half);
            let part = (wanted.abs() - dealt[next - 1]) / (dealt[next] - dealt[next - 1]);
            at((step * ((next - 1) as f64 + part.min(1.0))).copysign(wanted))
        });
        Self::from_points(nodes.collect())
    }

    /// Panels between given points, one more than panels, from the upper trailing edge over the
    /// nose to the lower trailing edge. The chord is taken as one.
    ///
    /// # Errors
    /// When there are too few or too many points, one is not finite, neighbours coincide, or the
    /// outline runs clockwise.
    pub fn from_points(mut nodes: Vec<Point>) -> Result<Self, FlowError> {
        check_count(nodes.len().saturating_sub(1))?;
        if let Some((index, point)) = nodes.iter().enumerate().find(|(_, point)| !point.is_finite()) {
            return Err(FlowError::NotFinite { index, x: point.x, y: point.y });
        }
        if let Some(index) = nodes.windows(2).position(|pair| pair[0].distance(pair[1]) < COINCIDENT) {
            return Err(FlowError::Coincident { index, x: nodes[index].x, y: nodes[index].y });
        }
        let origin = nodes[0];
        let twice_area: f64 = nodes.windows(2).map(|pair| (pair[0] - origin).cross(pair[1] - origin)).sum();
        if twice_area <= 0.0 {
            return Err(FlowError::Direction);
        }
        let last = nodes.len() - 1;
        if nodes[0].distance(nodes[last]) < SHARP {
            nodes[0] = nodes[0].midpoint(nodes[last]);
            nodes[last] = nodes[0];
        }
        let panels = panels_between(&nodes);
        Ok(Self { nodes, panels })
    }

    /// The nodes, one more than panels.
    #[must_use]
    pub fn nodes(&self) -> &[Point] {
        &self.nodes
    }

    /// How many panels there are.
    #[must_use]
    pub fn len(&self) -> usize {
        self.panels.len()
    }

    /// Never: there are [`LEAST_PANELS`] at least.
    #[must_use]
    pub fn is_empty(&self) -> bool {
        self.panels.is_empty()
    }

    /// From the lower trailing edge up to the upper one: nothing for a sharp edge.
    #[must_use]
    pub fn base(&self) -> Vec2 {
        self.nodes[0] - self.nodes[self.len()]
    }

    /// Whether the surfaces meet at the trailing edge.
    #[must_use]
    pub fn is_sharp(&self) -> bool {
        self.base() == Vec2::ZERO
    }

    pub(crate) fn panels(&self) -> &[Panel] {
        &self.panels
    }

    /// Second derivative by u on panel `index` of what has these values at the nodes.
    pub(crate) fn bend_of(&self, index: usize, values: &[f64]) -> f64 {
        let weights = self.panels[index].bend;
        (0..4).filter_map(|k| Some(weights[k] * values.get((index + k).checked_sub(1)?)?)).sum()
    }
}

impl Panel {
    /// Half the length of its parabola, to the second order of the bow.
    pub(crate) fn half_length(&self) -> f64 {
        self.half.hypot() * (1.0 + self.bow * self.bow * 2.0 / 3.0)
    }

    /// Point of the parabola at u = 0.
    pub(crate) fn crest(&self) -> Point {
        self.middle + self.bow * self.half.turn_90()
    }
}

fn check_count(panels: usize) -> Result<(), FlowError> {
    if (LEAST_PANELS..=MOST_PANELS).contains(&panels) {
        Ok(())
    } else {
        Err(FlowError::PanelCount { panels, least: LEAST_PANELS, most: MOST_PANELS })
    }
}

fn panels_between(nodes: &[Point]) -> Vec<Panel> {
    let count = nodes.len() - 1;
    let chord: Vec<Vec2> = nodes.windows(2).map(|pair| pair[1] - pair[0]).collect();
    let length: Vec<f64> = chord.iter().map(|c| c.hypot()).collect();
    // Curvature of the circle through a node and its neighbours; the ends go on as they came.
    let curvature_at = |i: usize| {
        let (before, after) = (chord[i - 1], chord[i]);
        2.0 * before.cross(after) / (length[i - 1] * length[i] * (before + after).hypot())
    };
    let curvature = |i: usize| match i {
        0 => 2.0 * curvature_at(1) - curvature_at(2),
        i if i == count => 2.0 * curvature_at(count - 1) - curvature_at(count - 2),
        i => curvature_at(i),
    };
    // Second divided difference about an inner node, weights of it and its neighbours.
    let second = |i: usize| {
        let (a, b) = (length[i - 1], length[i]);
        [2.0 / (a * (a + b)), -2.0 / (a * b), 2.0 / (b * (a + b))]
    };
    (0..count)
        .map(|j| {
            let half = 0.5 * chord[j];
            let mut bend = [0.0; 4];
            // The mean of both ends; an end without neighbours takes that of the other.
            let (first, last) = (j.max(1), (j + 1).min(count - 1));
            for node in [first, last] {
                for (k, weight) in second(node).into_iter().enumerate() {
                    bend[node + k - j] += 0.5 * weight * half.hypot2();
                }
            }
            // A circle's rise over a short chord is curvature times its square over eight, to the
            // right of the way when it turns left.
            let bow = -0.25 * length[j] * 0.5 * (curvature(j) + curvature(j + 1));
            Panel { middle: nodes[j].midpoint(nodes[j + 1]), half, bow, bend }
        })
        .collect()
}

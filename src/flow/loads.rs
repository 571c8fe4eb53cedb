//! What a distribution of speed over an outline amounts to.

use super::Panelling;
use crate::geometry::{Point, Vec2};

/// Force and moment on the outline by its pressure, as coefficients for unit chord.
pub(super) struct Loads {
    /// Along x and y.
    pub(super) force: Vec2,
    /// About (0.25, 0), positive nose up.
    pub(super) moment: f64,
}

/// Circulation, anticlockwise, of the panels and of a base that has `base` for unit edge speed.
pub(super) fn circulation(panelling: &Panelling, base: f64, speed: &[f64]) -> f64 {
    let panels: f64 = panelling
        .panels()
        .iter()
        .enumerate()
        .map(|(j, panel)| {
            // ∫ mean + ½ bend (u² - 1) du
            panel.half_length() * (speed[j] + speed[j + 1] - panelling.bend_of(j, speed) * 2.0 / 3.0)
        })
        .sum();
    panels + base * 0.5 * (speed[panelling.len()] - speed[0])
}

/// Integrates the pressure, by Simpson's rule on the parabola of each panel; on a base it is that
/// of the edges.
pub(super) fn loads(panelling: &Panelling, speed: &[f64]) -> Loads {
    const QUARTER: Point = Point::new(0.25, 0.0);
    let nodes = panelling.nodes();
    let mut force = Vec2::ZERO;
    let mut anticlockwise = 0.0;
    let mut push = |at: Point, speed_squared: f64, along: Vec2| {
        // Pressure acts inwards, to the left of the way.
        let push = (1.0 - speed_squared) * along.turn_90();
        force += push;
        anticlockwise += (at - QUARTER).cross(push);
    };
    for (j, panel) in panelling.panels().iter().enumerate() {
        let middle = 0.5 * (speed[j] + speed[j + 1]) - 0.5 * panelling.bend_of(j, speed);
        // dz/du = half (1 - 2i bow u)
        let tilt = 2.0 * panel.bow * panel.half.turn_90();
        push(nodes[j], speed[j] * speed[j], (panel.half + tilt) / 3.0);
        push(panel.crest(), middle * middle, panel.half * (4.0 / 3.0));
        push(nodes[j + 1], speed[j + 1] * speed[j + 1], (panel.half - tilt) / 3.0);
    }
    let last = panelling.len();
    let edge = 0.5 * (speed[0] * speed[0] + speed[last] * speed[last]);
    push(nodes[last].midpoint(nodes[0]), edge, panelling.base());
    Loads { force, moment: -anticlockwise }
}

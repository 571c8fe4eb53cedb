//! A thickness laid off on both sides of a mean line, square to it.

use super::working::{Working, worked_camber, worked_half, worked_joints};
use super::{MeanLine, Ordinate, ThicknessForm};
use crate::geometry::{Jet, Point, Vec2};

#[derive(Debug, Clone, PartialEq)]
pub(super) struct Laid {
    pub(super) mean_line: MeanLine,
    pub(super) thickness: ThicknessForm,
    pub(super) rounds: Vec<Working>,
}

impl Laid {
    /// Half thickness at x = `root`² with two derivatives by `root`.
    fn half(&self, root: f64) -> [f64; 3] {
        worked_half(&self.rounds, &|root| self.thickness.half_at_root(root), root)
    }

    fn line(&self, x: f64) -> Ordinate {
        let unworked = |x| {
            let Ordinate { y, slope, second, third } = self.mean_line.at(x);
            [y, slope, second, third]
        };
        let [y, slope, second, third] = worked_camber(&self.rounds, &unworked, x);
        Ordinate { y, slope, second, third }
    }

    pub(super) fn jet(&self, t: f64) -> Jet {
        let x = t * t;
        let line = self.line(x);
        let [half, half_first, half_second] = self.half(t.abs());
        // Offset along the normal and its derivatives in t: upper side (t < 0) outwards is up.
        let (offset, offset_first, offset_second) =
            if t < 0.0 { (half, -half_first, half_second) } else { (-half, -half_first, -half_second) };

        let secant2 = 1.0 + line.slope * line.slope;
        let (cos, sin) = (1.0 / secant2.sqrt(), line.slope / secant2.sqrt());
        let (along, normal) = (Vec2::new(cos, sin), Vec2::new(-sin, cos));
        // Angle of the mean line, differentiated by x and then by t.
        let turn_x = line.second / secant2;
        let turn_xx =
            line.third / secant2 - 2.0 * line.slope * line.second * line.second / (secant2 * secant2);
        let turn = turn_x * 2.0 * t;
        let turn_rate = turn_xx * 4.0 * x + turn_x * 2.0;

        Jet {
            point: Point::new(x, line.y) + offset * normal,
            first: Vec2::new(2.0 * t, 2.0 * t * line.slope) + offset_first * normal - offset * turn * along,
            second: Vec2::new(2.0, 2.0 * line.slope + 4.0 * x * line.second) + offset_second * normal
                - 2.0 * offset_first * turn * along
                - offset * (turn_rate * along + turn * turn * normal),
        }
    }

    /// Stations where a piece ends, inside (0, 1), in no order.
    pub(super) fn joints(&self) -> Vec<f64> {
        worked_joints(&self.rounds, self.thickness.joints(), self.mean_line.joints())
    }

    /// The first station at which a surface turns back on itself, with the name of the surface.
    pub(super) fn fold(&self) -> Option<(&'static str, f64)> {
        const STATIONS: usize = 2000;
        (1..=STATIONS).find_map(|i| {
            let root = i as f64 / STATIONS as f64;
            let x = root * root;
            let line = self.line(x);
            // An offset curve turns back where the offset passes the centre of curvature.
            let reach = self.half(root)[0] * line.second.abs() / (1.0 + line.slope * line.slope).powf(1.5);
            let side = if line.second < 0.0 { "lower" } else { "upper" };
            (reach >= 1.0).then_some((side, x))
        })
    }
}

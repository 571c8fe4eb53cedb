//! The straight line about which a flap turns.

use super::{Hinge, HingeKind, Laminate};
use crate::geometry::{Curve, Point, Vec2};
use crate::section::Side;
use crate::wing::StationShape;

impl Hinge {
    /// Its axis at a station, in the frame of the finished shape: the middle of the skin that runs
    /// through, or the pin.
    #[must_use]
    pub fn axis(&self, shape: &StationShape<'_>, laminate: &Laminate) -> Point {
        let [upper, lower] = shape.roots_at(self.at);
        match self.kind {
            HingeKind::Laminate { side } => {
                let surface = shape.jet(if side == Side::Upper { upper } else { lower });
                let skin = laminate.thickness(side, shape.at, self.at, shape.chord)[0];
                let inwards = surface.tangent().map_or(Vec2::ZERO, Vec2::turn_90);
                surface.point + 0.5 * skin * inwards
            }
            HingeKind::Pin { height } => shape.jet(lower).point.lerp(shape.jet(upper).point, height),
        }
    }
}

/// A straight hinge axis through its places at both ends of a flap.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct HingeAxis {
    /// Distance from the root and place in the foil's axes, mm, at the inner and the outer end.
    pub ends: [(f64, Point); 2],
}

/// Steps of the travel each way at which the ends of a flap are followed.
const STEPS: usize = 12;

impl HingeAxis {
    /// Where it passes at `at` mm from the root, in the foil's axes.
    #[must_use]
    pub fn at(&self, at: f64) -> Point {
        let [(from, inner), (to, outer)] = self.ends;
        inner.lerp(outer, (at - from) / (to - from))
    }

    /// How far `points` of the flap at `at` mm from the root move along the span at most while it turns
    /// `up` and `down`, radians; mm. An axis that is not square to the ends of the flap carries them
    /// towards the wood beside it.
    #[must_use]
    pub fn sway(&self, at: f64, points: &[Point], up: f64, down: f64) -> f64 {
        let [(from, inner), (to, outer)] = self.ends;
        let along = [outer.x - inner.x, to - from, outer.y - inner.y];
        let length = along.iter().map(|v| v * v).sum::<f64>().sqrt();
        let [ux, us, uz] = along.map(|v| v / length);
        let through = self.at(at);
        let mut sway: f64 = 0.0;
        for point in points {
            let (x, z) = (point.x - through.x, point.y - through.y);
            // The span's part of a turn about a line through the origin (Rodrigues' formula).
            let (square, lengthwise) = (uz * x - ux * z, us * (ux * x + uz * z));
            for i in 1..=STEPS {
                for end in [-up, down] {
                    let (sin, cos) = (end * i as f64 / STEPS as f64).sin_cos();
                    sway = sway.max((sin * square + (1.0 - cos) * lengthwise).abs());
                }
            }
        }
        sway
    }
}

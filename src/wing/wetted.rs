//! The surface that the water touches.

use super::{Wing, WingError};
use crate::geometry::{Curve, Vec2};

/// Points of the two-point Gauss rule on a stretch from -1 to 1.
const GAUSS: f64 = 0.577_350_269_189_625_8;
/// Stretches along the outline from one end to the nose and from the nose to the other end, and along
/// the whole span; no fewer than one between two places where the loft bends.
const AROUND: usize = 60;
const ALONG: f64 = 24.0;

impl Wing {
    /// Area in mm² of the skin of one half, or of a foil that is all of a piece, from `from` to `to` mm
    /// along the span: both sides and a blunt trailing edge, not the end.
    ///
    /// Of the lofted surface itself, which leans along the span: to about 1e-4.
    ///
    /// # Errors
    /// When either place is not on the foil.
    pub fn wetted_area(&self, from: f64, to: f64) -> Result<f64, WingError> {
        self.shape_at(from)?;
        self.shape_at(to)?;
        let mut ends: Vec<f64> = self.even_places();
        ends.retain(|at| from < *at && *at < to);
        ends.insert(0, from);
        ends.push(to);
        let mut area = 0.0;
        for pair in ends.windows(2) {
            let count = (ALONG * (pair[1] - pair[0]) / self.reach()).ceil().max(1.0);
            let step = (pair[1] - pair[0]) / count;
            for i in 0..count as usize {
                for side in [-GAUSS, GAUSS] {
                    let at = pair[0] + (i as f64 + 0.5 * (1.0 + side)) * step;
                    area += 0.5 * step * self.skin_rate(at)?;
                }
            }
        }
        Ok(area)
    }

    /// Area of the skin for each mm along the span.
    fn skin_rate(&self, at: f64) -> Result<f64, WingError> {
        let shape = self.shape_at(at)?;
        let step = 1.0 / AROUND as f64;
        let mut rate = shape.jet(-1.0).point.distance(shape.jet(1.0).point);
        for i in 0..2 * AROUND {
            for side in [-GAUSS, GAUSS] {
                let t = (i as f64 + 0.5 * (1.0 + side)) * step - 1.0;
                let first = shape.jet(t).first;
                let normal = shape.jet(t).tangent().map_or(Vec2::ZERO, Vec2::turn_90);
                let lean = shape.spread(t).dot(normal);
                rate += 0.5 * step * first.hypot() * 1.0_f64.hypot(lean);
            }
        }
        Ok(rate)
    }
}

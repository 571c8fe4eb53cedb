//! Fairing with a straight batten: how far it lies from a curved design, and where templates have to
//! be for it to lie near.

use super::{Wing, WingError};
use crate::geometry::{Curve, Point, Vec2};

/// Places between two templates, and on each side of the outline, at which a batten is looked at.
const BETWEEN: usize = 8;
const AROUND: usize = 40;
/// Steps of the span in which the furthest next template is looked for.
const STEPS: usize = 400;

impl Wing {
    /// How far a batten that lies on the templates at `from` and `to` (mm from the root) is from the
    /// design between them at most, square to the outline, in mm.
    ///
    /// # Errors
    /// When a place is not on the foil.
    pub fn batten_gap(&self, from: f64, to: f64) -> Result<f64, WingError> {
        let on = |at: f64| -> Result<Vec<(Point, Vec2)>, WingError> {
            let shape = self.shape_at(at)?;
            let placed = shape.to_foil();
            let along = |v: Vec2| placed * v.to_point() - placed * Point::ORIGIN;
            Ok((0..=2 * AROUND)
                .map(|i| {
                    let jet = shape.jet(i as f64 / AROUND as f64 - 1.0);
                    (placed * jet.point, along(jet.tangent().unwrap_or(Vec2::ZERO).turn_90()))
                })
                .collect())
        };
        let (inner, outer) = (on(from)?, on(to)?);
        let mut widest: f64 = 0.0;
        for i in 1..BETWEEN {
            let share = i as f64 / BETWEEN as f64;
            for (k, (point, normal)) in on(from + share * (to - from))?.into_iter().enumerate() {
                let batten = inner[k].0.lerp(outer[k].0, share);
                widest = widest.max((batten - point).dot(normal).abs());
            }
        }
        Ok(widest)
    }

    /// The fewest places, root and tip among them, such that a batten from one to the next lies within
    /// `fairing` mm of the design; to within a 400th of the span. From each place the next one is as far
    /// off as it can be. A shaped tip is left out, as it is worked to the planform: the last place but the
    /// end is where it begins.
    ///
    /// # Errors
    /// As [`Wing::batten_gap`].
    pub fn fewest_templates(&self, fairing: f64) -> Result<Vec<f64>, WingError> {
        let place = |step: usize| self.tip_from() * step as f64 / STEPS as f64;
        let (mut places, mut here) = (vec![0.0], 0);
        while here < STEPS {
            let fits = |to: usize| Ok::<_, WingError>(self.batten_gap(place(here), place(to))? <= fairing);
            let (mut good, mut bad) = (here + 1, STEPS + 1);
            if fits(STEPS)? {
                good = STEPS;
            } else {
                while bad - good > 1 {
                    let middle = usize::midpoint(good, bad);
                    if fits(middle.min(STEPS))? { good = middle } else { bad = middle }
                }
            }
            here = good.min(STEPS);
            places.push(place(here));
        }
        places.extend(self.tip().map(|_| self.reach()));
        Ok(places)
    }
}

//! The moment about a flap's hinge.

use super::PressurePoint;
use crate::geometry::{Point, Vec2};

/// Moment of the pressure on the part behind `hinge` about it, as a coefficient by the square of the
/// flap's chord (the distance from the hinge to the trailing edge): positive where it turns the tail
/// down.
///
/// `pressure` goes from the upper trailing edge over the nose to the lower one. `hinge` lies within the
/// outline; the flap is what is behind its abscissa, and the moment is that of the pressure on both
/// sides. `None` where there is no outline behind it.
#[must_use]
pub fn hinge_moment(pressure: &[PressurePoint], hinge: Point) -> Option<f64> {
    let tail = pressure.first().map(|point| Point::new(point.x, point.y))?;
    if tail.x <= hinge.x || !hinge.is_finite() {
        return None;
    }
    let chord = tail.distance(hinge);
    let moment: f64 = pressure
        .windows(2)
        .map(|pair| {
            let (a, b) = (pair[0], pair[1]);
            let (mut from, mut to) = (Vec2::new(a.x, a.y), Vec2::new(b.x, b.y));
            let (mut cp_from, mut cp_to) = (a.cp, b.cp);
            if from.x <= hinge.x && to.x <= hinge.x {
                return 0.0;
            }
            // A panel across the hinge line counts from there.
            let part = (hinge.x - from.x) / (to.x - from.x);
            if from.x < hinge.x {
                (from, cp_from) = (from + part * (to - from), cp_from + part * (cp_to - cp_from));
            } else if to.x < hinge.x {
                (to, cp_to) = (from + part * (to - from), cp_from + part * (cp_to - cp_from));
            }
            // Pressure acts inwards, to the left of the way.
            let push = (to - from).turn_90();
            let arm = |at: Vec2| (at - hinge.to_vec2()).cross(push);
            let middle = 0.25 * (cp_from + cp_to) * (arm(from) + arm(to));
            let ends = 0.5 * (cp_from * arm(from) + cp_to * arm(to));
            // Simpson's rule on what is linear times linear.
            (2.0 * middle + ends) / 3.0
        })
        .sum();
    Some(-moment / (chord * chord))
}

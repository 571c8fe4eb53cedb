//! Shear in the glue of a joint that goes round the whole section, as a strut in its pocket.

use super::{BeamNode, StrengthError, UNLOADED};
use crate::geometry::{Point, Vec2, polygon};

/// Greatest shear stress in the glue, MPa, where a part is glued in `depth` mm deep all round its
/// `outline` (corners, mm) and `node` is what the part carries at the joint's mouth.
///
/// Bending and push leave the part as shear along the span in proportion to the strain that they make, so
/// that with the line integrals I = ∮ y² ds and length p of the outline the stress is M y/(I h) + N/(p h)
/// over the depth h. Torque goes over as T/(2 A h) (Bredt 1896), and the forces across and along spread over
/// the whole glue. Both act square to each other. This is the mean over the depth: a glue line has
/// peaks at its ends, which is why its strength is to be that of a lap as long (Volkersen 1938).
///
/// Not a certification: use tested values; local codes and licensed practice come first.
///
/// # Errors
/// When the outline encloses nothing or the depth is no number above zero.
pub fn bond_shear(outline: &[Point], depth: f64, node: &BeamNode) -> Result<f64, StrengthError> {
    if !(depth > 0.0 && depth.is_finite()) {
        return Err(StrengthError::Asked { what: "the depth of a joint", value: depth });
    }
    let sides = || polygon::sides(outline);
    let length: f64 = sides().map(|(a, b)| a.distance(b)).sum();
    let area = polygon::area(outline).abs();
    if !(area > 0.0 && length.is_finite()) {
        return Err(StrengthError::Outline { at: node.at });
    }
    let mean = sides().fold(Vec2::ZERO, |sum, (a, b)| sum + a.distance(b) * a.midpoint(b).to_vec2());
    let centre = mean / length;
    // ∮ of products of coordinates, exact for straight sides.
    let integral = |f: fn(Vec2) -> f64, g: fn(Vec2) -> f64| -> f64 {
        let side = |(a, b): (Point, Point)| {
            let (p, q) = (a.to_vec2() - centre, b.to_vec2() - centre);
            a.distance(b) * (2.0 * f(p) * g(p) + f(p) * g(q) + f(q) * g(p) + 2.0 * f(q) * g(q)) / 6.0
        };
        sides().map(side).sum()
    };
    let (xx, yy, xy) = (integral(|v| v.x, |v| v.x), integral(|v| v.y, |v| v.y), integral(|v| v.x, |v| v.y));
    let det = xx * yy - xy * xy;
    let [across, along] = node.moment;
    let (by_y, by_x) = ((xx * across - xy * along) / det, (yy * along - xy * across) / det);
    let push = node.compression.abs() / length;
    let greatest = |most: f64, point: &Point| {
        let out = point.to_vec2() - centre;
        most.max((by_y * out.y + by_x * out.x).abs())
    };
    let lengthways = outline.iter().fold(0.0, greatest) + push;
    let round = node.torque.abs() / (2.0 * area) + node.shear[0].hypot(node.shear[1]) / length;
    Ok(lengthways.hypot(round) / depth)
}

/// Strength of the glue over its greatest stress, both MPa; at most [`UNLOADED`].
#[must_use]
pub fn bond_reserve(strength: f64, stress: f64) -> f64 {
    if stress > 0.0 { (strength / stress).min(UNLOADED) } else { UNLOADED }
}

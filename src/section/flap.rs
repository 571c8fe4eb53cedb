//! A section with a flap deflected about a hinge.

use kurbo::common::GAUSS_LEGENDRE_COEFFS_16;

use super::SectionError;
use super::form::Form;
use crate::geometry::{Affine, Curve, Jet, Point, Vec2, parameter_at};

/// A deflection of the part of a section behind a hinge.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Flap {
    /// Where the hinge's axis lies along the chord, 0.2 to 0.98.
    pub hinge: f64,
    /// Where it lies across the chord.
    pub height: HingeHeight,
    /// Angle of deflection in radians, trailing edge down positive; -60° to 60°.
    pub angle: f64,
    /// What becomes of the surfaces at the hinge.
    pub surface: FlapSurface,
}

/// Where a hinge's axis lies across the chord.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum HingeHeight {
    /// In the upper surface, as a hinge of laminate left whole there has it.
    Upper,
    /// Midway between the surfaces.
    Middle,
    /// In the lower surface.
    Lower,
}

/// What becomes of the surfaces where a flap turns.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum FlapSurface {
    /// The flap turns as one piece. On the side that opens the round about the hinge's axis shows;
    /// on the side that closes both surfaces end where they meet.
    Broken,
    /// The section bends evenly over this part of the chord, half of it to each side of the hinge,
    /// so that the curvature stays continuous.
    Smooth {
        /// Length that bends, a fraction of the chord.
        over: f64,
    },
}

/// Greatest deflection, degrees.
pub(super) const GREATEST_DEFLECTION: f64 = 60.0;
/// Least and greatest station of a hinge.
pub(super) const HINGE: std::ops::RangeInclusive<f64> = 0.2..=0.98;
/// Share of the parameter that the round about the hinge's axis is given.
const ROUND_SHARE: f64 = 0.02;
/// An angle or a radius below this makes no round.
const NOTHING: f64 = 1e-12;

/// The curve of a deflected section.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Flapped {
    pub(super) whole: Form,
    pub(super) flap: Flap,
    bend: Bend,
}

#[derive(Debug, Clone, PartialEq)]
enum Bend {
    Broken { axis: Point, sides: [BrokenSide; 2] },
    Smooth { height: f64, from: f64, to: f64 },
}

/// How one side of a broken surface runs, over the amount of the parameter from the nose.
#[derive(Debug, Clone, Copy, PartialEq)]
struct BrokenSide {
    /// Where the fixed part ends.
    fixed_to: f64,
    /// Where the flap's surface begins, before it is turned.
    flap_from: f64,
    /// Share of the parameter that the round takes behind the fixed part; nought where there is none.
    round: f64,
}

impl Flapped {
    /// Deflects `whole`; `name` is only repeated in messages.
    pub(super) fn new(whole: Form, flap: Flap, name: &str) -> Result<Self, SectionError> {
        let wrong = |why: String| SectionError::Flap { name: name.to_owned(), why };
        if !HINGE.contains(&flap.hinge) {
            let (least, most) = (HINGE.start(), HINGE.end());
            return Err(wrong(format!(
                "its hinge is at {}: it lies from {least} to {most} of the chord",
                flap.hinge
            )));
        }
        let degrees = flap.angle.to_degrees();
        if degrees.is_nan() || degrees.abs() > GREATEST_DEFLECTION {
            return Err(wrong(format!("it cannot turn by {degrees:.2}°: {GREATEST_DEFLECTION}° at most")));
        }
        let roots = [-1.0, 1.0].map(|end| parameter_at(&whole, 0.0, end, flap.hinge).abs());
        let [upper, lower] = [0, 1].map(|i| whole.jet([-1.0, 1.0][i] * roots[i]).point);
        let axis = match flap.height {
            HingeHeight::Upper => upper,
            HingeHeight::Middle => upper.midpoint(lower),
            HingeHeight::Lower => lower,
        };
        let bend = match flap.surface {
            FlapSurface::Smooth { over } => {
                let (from, to) = (flap.hinge - 0.5 * over, flap.hinge + 0.5 * over);
                let tail = 0.5 * (whole.jet(-1.0).point.x + whole.jet(1.0).point.x);
                if !(over > 0.0 && from > 0.0 && to < tail) {
                    let room = 2.0 * flap.hinge.min(tail - flap.hinge);
                    return Err(wrong(format!(
                        "it cannot bend over {over} of the chord: there is room for {room:.3}"
                    )));
                }
                // The inner side of a bend folds where it lies further from the axis than the radius.
                let thickest = (axis.y - upper.y).abs().max((axis.y - lower.y).abs());
                let sharpest = 1.875 * flap.angle.abs() / over;
                if thickest * sharpest >= 0.95 {
                    let least = 1.875 * flap.angle.abs() * thickest / 0.95;
                    return Err(wrong(format!(
                        "bent over {over} of the chord its inner side folds: {least:.3} at least"
                    )));
                }
                Bend::Smooth { height: axis.y, from, to }
            }
            FlapSurface::Broken => {
                let mut sides = [BrokenSide { fixed_to: 0.0, flap_from: 0.0, round: 0.0 }; 2];
                for (i, sign) in [(0, -1.0), (1, 1.0)] {
                    sides[i] = broken_side(&whole, axis, &flap, sign, roots[i])
                        .ok_or_else(|| wrong("at this angle its surface misses the fixed part".to_owned()))?;
                }
                Bend::Broken { axis, sides }
            }
        };
        Ok(Self { whole, flap, bend })
    }

    pub(super) fn jet(&self, t: f64) -> Jet {
        match &self.bend {
            Bend::Broken { axis, sides } => {
                let (sign, side) = if t < 0.0 { (-1.0, &sides[0]) } else { (1.0, &sides[1]) };
                self.broken(*axis, side, sign, t.abs())
            }
            Bend::Smooth { height, from, to } => {
                bent(&self.whole.jet(t), *height, *from, *to, self.flap.angle)
            }
        }
    }

    /// The jet of one side at the amount `root` of the parameter.
    fn broken(&self, axis: Point, side: &BrokenSide, sign: f64, root: f64) -> Jet {
        let behind = side.fixed_to + side.round;
        if root < side.fixed_to || (root == side.fixed_to && sign < 0.0) {
            return self.whole.jet(sign * root);
        }
        // Trailing edge down is clockwise.
        let turn = -self.flap.angle;
        if root < behind || (side.round > 0.0 && root == behind && sign < 0.0) {
            let start = self.whole.jet(sign * side.fixed_to).point - axis;
            let rate = turn / side.round;
            let arm = Affine::rotate(rate * (root - side.fixed_to)) * start.to_point();
            let arm = arm.to_vec2();
            return Jet { point: axis + arm, first: sign * rate * arm.turn_90(), second: -rate * rate * arm };
        }
        let rate = (1.0 - side.flap_from) / (1.0 - behind);
        let jet = self.whole.jet(sign * (side.flap_from + rate * (root - behind)).min(1.0));
        let turned = |v: Vec2| (Affine::rotate(turn) * v.to_point()).to_vec2();
        Jet {
            point: axis + turned(jet.point - axis),
            first: rate * turned(jet.first),
            second: rate * rate * turned(jet.second),
        }
    }

    /// Amounts of the parameter at which a side may have a corner or a jump of curvature.
    pub(super) fn breaks(&self) -> Vec<f64> {
        let whole = self.whole.breaks();
        let mut breaks: Vec<f64> = match &self.bend {
            Bend::Smooth { from, to, .. } => {
                let ends = [-1.0, 1.0]
                    .into_iter()
                    .flat_map(|end| [*from, *to].map(|x| parameter_at(&self.whole, 0.0, end, x)));
                whole.into_iter().chain(ends).collect()
            }
            Bend::Broken { sides, .. } => whole
                .into_iter()
                .filter_map(|t| {
                    let side = &sides[usize::from(t >= 0.0)];
                    let behind = side.fixed_to + side.round;
                    let root = t.abs();
                    let moved = if root <= side.fixed_to {
                        root
                    } else if root >= side.flap_from {
                        behind + (root - side.flap_from) * (1.0 - behind) / (1.0 - side.flap_from)
                    } else {
                        return None;
                    };
                    Some(moved.copysign(t))
                })
                .chain(
                    [(-1.0, &sides[0]), (1.0, &sides[1])]
                        .into_iter()
                        .flat_map(|(sign, side)| [sign * side.fixed_to, sign * (side.fixed_to + side.round)]),
                )
                .collect(),
        };
        breaks.sort_by(f64::total_cmp);
        breaks.dedup_by(|a, b| (*a - *b).abs() < 1e-12);
        breaks
    }
}

/// How a side runs past a hinge at `root`; `None` when flap and fixed part do not meet.
fn broken_side(whole: &Form, axis: Point, flap: &Flap, sign: f64, root: f64) -> Option<BrokenSide> {
    let arm = whole.jet(sign * root).point - axis;
    // Turning the trailing edge down opens the upper side.
    let opens = flap.angle * -sign > 0.0;
    if flap.angle.abs() < NOTHING || arm.hypot() < NOTHING {
        return Some(BrokenSide { fixed_to: root, flap_from: root, round: 0.0 });
    }
    if opens {
        let round = ROUND_SHARE.min(0.5 * (1.0 - root));
        return Some(BrokenSide { fixed_to: root, flap_from: root, round });
    }
    // Where the turned surface meets the fixed one: Newton's method from where the bisector of the
    // fold cuts both, which for straight surfaces is the answer.
    let turn = Affine::rotate(-flap.angle);
    let turned = |v: Vec2| (turn * v.to_point()).to_vec2();
    let back = arm.hypot() * (0.5 * flap.angle.abs()).tan();
    let jet = whole.jet(sign * root);
    let per_root = jet.first.hypot();
    let (mut fixed, mut moved) = (root - back / per_root, root + back / per_root);
    for _ in 0..50 {
        let (a, b) = (whole.jet(sign * fixed), whole.jet(sign * moved));
        let gap = a.point - (axis + turned(b.point - axis));
        if gap.hypot() < 1e-14 {
            break;
        }
        let (da, db) = (sign * a.first, -sign * turned(b.first));
        let det = da.cross(db);
        fixed -= gap.cross(db) / det;
        moved -= da.cross(gap) / det;
    }
    let met = {
        let (a, b) = (whole.jet(sign * fixed).point, whole.jet(sign * moved).point);
        (a - (axis + turned(b - axis))).hypot() < 1e-10
    };
    // Where a surface slopes, both may lie a little to one side of the hinge.
    let in_order = fixed > 0.0 && fixed <= moved && moved < 1.0;
    (met && in_order).then_some(BrokenSide { fixed_to: fixed, flap_from: moved, round: 0.0 })
}

/// A jet bent with the line at `height`, whose angle goes from nought at `from` to `angle` at `to`
/// by 10 s³ - 15 s⁴ + 6 s⁵.
fn bent(jet: &Jet, height: f64, from: f64, to: f64, angle: f64) -> Jet {
    let over = to - from;
    let angle_at = |x: f64| {
        let s = ((x - from) / over).clamp(0.0, 1.0);
        let first = 30.0 * s * s * (1.0 - s) * (1.0 - s) / over;
        let second = 60.0 * s * (1.0 - s) * (1.0 - 2.0 * s) / (over * over);
        [s * s * s * (10.0 - s * (15.0 - 6.0 * s)), first, second].map(|v| v * angle)
    };
    let x = jet.point.x;
    let [theta, theta_x, theta_xx] = angle_at(x);
    // Along the bent line and across it, the trailing edge down for a positive angle.
    let (along, across) = (Vec2::new(theta.cos(), -theta.sin()), Vec2::new(theta.sin(), theta.cos()));
    let line = if x <= from {
        Vec2::new(x, height)
    } else {
        let end = x.min(to);
        let half = 0.5 * (end - from);
        let sum: Vec2 = GAUSS_LEGENDRE_COEFFS_16
            .iter()
            .map(|&(weight, offset)| {
                let [theta, ..] = angle_at(from + half * (1.0 + offset));
                weight * half * Vec2::new(theta.cos(), -theta.sin())
            })
            .fold(Vec2::ZERO, |sum, part| sum + part);
        Vec2::new(from, height) + sum + (x - end) * along
    };
    let v = jet.point.y - height;
    let (x1, y1, x2, y2) = (jet.first.x, jet.first.y, jet.second.x, jet.second.y);
    let stretch = 1.0 + v * theta_x;
    Jet {
        point: (line + v * across).to_point(),
        first: x1 * stretch * along + y1 * across,
        second: (x2 * stretch + 2.0 * x1 * y1 * theta_x + v * theta_xx * x1 * x1) * along
            + (y2 - x1 * x1 * stretch * theta_x) * across,
    }
}

/// An angle in degrees without the dust of its way through radians, for names.
pub(super) fn degrees_of(angle: f64) -> f64 {
    (angle.to_degrees() * 1e6).round() / 1e6
}

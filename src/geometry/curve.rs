//! A smooth plane curve known with its derivatives: what every outline is cut, drawn and
//! measured from, so that nothing downstream has to guess a tangent from sample points.

use kurbo::{Point, Vec2};

/// Position and derivatives of a curve at one parameter value.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Jet {
    /// Position.
    pub point: Point,
    /// First derivative with respect to the parameter.
    pub first: Vec2,
    /// Second derivative with respect to the parameter.
    pub second: Vec2,
}

impl Jet {
    /// Unit tangent in the direction of growing parameter; `None` where the curve stands still.
    #[must_use]
    pub fn tangent(&self) -> Option<Vec2> {
        let length = self.first.hypot();
        (length > 0.0 && length.is_finite()).then(|| self.first / length)
    }

    /// Signed curvature, positive where the curve turns anticlockwise; in 1/length.
    #[must_use]
    pub fn curvature(&self) -> f64 {
        self.first.cross(self.second) / self.first.hypot2().powf(1.5)
    }
}

/// A curve that is smooth between its breaks.
pub trait Curve {
    /// Position and derivatives at `t`.
    ///
    /// At a break the derivatives are those of the piece that follows, except at the last one.
    fn jet(&self, t: f64) -> Jet;

    /// The parameter values between which the curve is smooth: ascending, with both ends.
    fn breaks(&self) -> Vec<f64>;

    /// Derivatives at the ends of a piece, as the piece itself sees them.
    ///
    /// Nudges `t` into the piece `[from, to]` by an amount that does not show in the position.
    fn jet_within(&self, t: f64, from: f64, to: f64) -> Jet {
        let nudge = (to - from) * 1e-9;
        self.jet(t.clamp(from + nudge, to - nudge))
    }
}

impl<C: Curve + ?Sized> Curve for &C {
    fn jet(&self, t: f64) -> Jet {
        (**self).jet(t)
    }

    fn breaks(&self) -> Vec<f64> {
        (**self).breaks()
    }
}

/// Height of the branch of `curve` from parameter `nose` to parameter `end` at `x`.
///
/// The branch must run towards greater x but for a bulge ahead of the nose; then the answer is
/// the point furthest along that has not passed `x`. Before the nose this is the nose, and behind
/// the end the end.
#[must_use]
pub fn height_at<C: Curve + ?Sized>(curve: &C, nose: f64, end: f64, x: f64) -> f64 {
    if x <= curve.jet(nose).point.x {
        return curve.jet(nose).point.y;
    }
    curve.jet(parameter_at(curve, nose, end, x)).point.y
}

/// Parameter at which the branch of `curve` from `nose` to `end` passes `x`; an end of the branch
/// where it does not. The branch as for [`height_at`].
#[must_use]
pub fn parameter_at<C: Curve + ?Sized>(curve: &C, nose: f64, end: f64, x: f64) -> f64 {
    let (mut low, mut high) = (nose, end);
    for _ in 0..60 {
        let middle = 0.5 * (low + high);
        if curve.jet(middle).point.x < x { low = middle } else { high = middle }
    }
    0.5 * (low + high)
}

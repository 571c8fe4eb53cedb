//! A closed outline as cubic Béziers fitted to the curve itself.

use std::ops::Range;

use kurbo::{BezPath, CurveFitSample, ParamCurveFit, Point, Vec2, fit_to_bezpath_opt};

use super::Curve;

/// One smooth piece of a curve, as kurbo's fitter wants to see it: over [0, 1].
struct Piece<'a, C: Curve + ?Sized> {
    curve: &'a C,
    from: f64,
    to: f64,
}

impl<C: Curve + ?Sized> ParamCurveFit for Piece<'_, C> {
    fn sample_pt_tangent(&self, t: f64, _sign: f64) -> CurveFitSample {
        let jet = self.curve.jet_within(self.from + t * (self.to - self.from), self.from, self.to);
        CurveFitSample { p: jet.point, tangent: jet.first }
    }

    fn sample_pt_deriv(&self, t: f64) -> (Point, Vec2) {
        let jet = self.curve.jet_within(self.from + t * (self.to - self.from), self.from, self.to);
        (jet.point, jet.first * (self.to - self.from))
    }

    fn break_cusp(&self, _range: Range<f64>) -> Option<f64> {
        // Pieces are smooth by construction.
        None
    }
}

/// Fits cubics to each smooth piece of `curve` and closes the path with a line where the ends do
/// not meet.
///
/// `tolerance`: greatest distance between path and curve, in the curve's units. kurbo measures it
/// at points along the curve: a close estimate, not a proof; the tests hold it to 1e-5 chord.
#[must_use]
pub fn fitted_outline<C: Curve + ?Sized>(curve: &C, tolerance: f64) -> BezPath {
    let mut path = BezPath::new();
    for ends in curve.breaks().windows(2) {
        let piece = fit_to_bezpath_opt(&Piece { curve, from: ends[0], to: ends[1] }, tolerance);
        let joins = !path.is_empty();
        path.extend(piece.into_iter().skip(usize::from(joins)));
    }
    path.close_path();
    path
}

//! Two surfaces given as heights above the chord line.

use std::sync::Arc;

use super::working::{Working, worked_camber_root, worked_half, worked_joints};
use super::{EquationError, Equations, FittedSurfaces};
use crate::geometry::{Jet, Point, Vec2};

/// Camber is the mean of both heights and half thickness half their difference, at the same
/// station: nothing is laid off across anything.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Upright {
    surfaces: Surfaces,
    pub(super) rounds: Vec<Working>,
}

#[derive(Debug, Clone, PartialEq)]
enum Surfaces {
    /// The user's own expressions.
    Equations(Arc<[Equations; 2]>),
    /// Fitted to points.
    Fitted(FittedSurfaces),
}

impl Upright {
    /// From expressions for the heights of the upper and the lower surface over x.
    ///
    /// # Errors
    /// The index of the surface (0 upper, 1 lower) and what is wrong with it: not finite, steps,
    /// not 0 at the nose, surfaces that cross or are too far apart, a sharp nose, a chord line
    /// that does not end in the trailing edge.
    pub(super) fn from_equations(upper: Equations, lower: Equations) -> Result<Self, (usize, EquationError)> {
        upper.refuse_as_surface().map_err(|error| (0, error))?;
        lower.refuse_as_surface().map_err(|error| (1, error))?;
        upper.refuse_as_pair(&lower).map_err(|error| (0, error))?;
        Ok(Self { surfaces: Surfaces::Equations(Arc::new([upper, lower])), rounds: Vec::new() })
    }

    pub(super) fn fitted(surfaces: FittedSurfaces) -> Self {
        Self { surfaces: Surfaces::Fitted(surfaces), rounds: Vec::new() }
    }

    /// Heights of both surfaces at x = `root`², with two derivatives by `root`.
    fn heights(&self, root: f64) -> [[f64; 3]; 2] {
        match &self.surfaces {
            Surfaces::Equations(pair) => pair.each_ref().map(|surface| {
                let [y, first, second, _] = surface.at_root(root).derivatives();
                [y, first, second]
            }),
            Surfaces::Fitted(spline) => {
                let [y, first, second] = spline.at(-root);
                [[y, -first, second], spline.at(root)]
            }
        }
    }

    pub(super) fn jet(&self, t: f64) -> Jet {
        let root = t.abs();
        let side = if t < 0.0 { 1.0 } else { -1.0 };
        let of_both = |upper_share: f64| {
            move |root: f64| {
                let [upper, lower] = self.heights(root);
                std::array::from_fn(|i| 0.5 * (upper[i] + upper_share * lower[i]))
            }
        };
        let camber = worked_camber_root(&self.rounds, &of_both(1.0), root);
        let half = worked_half(&self.rounds, &of_both(-1.0), root);
        let [y, first, second]: [f64; 3] = std::array::from_fn(|i| camber[i] + side * half[i]);
        Jet {
            point: Point::new(t * t, y),
            first: Vec2::new(2.0 * t, -side * first),
            second: Vec2::new(2.0, second),
        }
    }

    /// Stations where a piece ends and the surface may have a corner, inside (0, 1).
    pub(super) fn joints(&self) -> Vec<f64> {
        let own = match &self.surfaces {
            Surfaces::Equations(pair) => pair.iter().flat_map(|surface| surface.joints().to_vec()).collect(),
            Surfaces::Fitted(_) => Vec::new(),
        };
        worked_joints(&self.rounds, own.clone(), own)
    }

    /// Stations between which the surfaces are polynomials or analytic: the joints, and the knots
    /// of a fit, where its third derivative jumps.
    pub(super) fn knots(&self) -> Vec<f64> {
        let mut own = self.joints();
        if let Surfaces::Fitted(spline) = &self.surfaces {
            let knots: Vec<f64> = spline.knots().iter().map(|t| t * t).collect();
            own.extend(worked_joints(&self.rounds, knots.clone(), knots));
        }
        own
    }
}

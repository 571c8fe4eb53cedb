//! Viscous flow about a section: boundary layers and wake coupled to the potential flow.
//!
//! The method, with its equations and sources, stands in `docs/viscous-flow.md`.

mod closure;
mod coupling;
mod curve;
mod dual;
mod interval;
mod layer;
mod march;
mod newton;
mod prescribed;
mod side;
mod solution;
mod solve;
mod sources;
mod state;
mod wake;

pub use curve::{CurvePoint, LiftCurve};
pub use prescribed::layer_along;
pub use solution::{LayerPoint, SideFlow, ViscousSolution};

use super::{FlowError, Panelling};
use coupling::Coupling;
use solve::{Converged, Failed, converge, first_account};
use state::{Problem, Unknowns};

/// What the water and the surface are like.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Conditions {
    /// Reynolds number by chord and onset speed: 1e3 to 1e9.
    pub reynolds: f64,
    /// Amplification exponent N at which transition takes place, 0.1 to 20: nine for a clean tank,
    /// less in natural water.
    pub amplification: f64,
    /// Where a trip makes the upper side turbulent, in chords along x, 0 to 1.
    pub trip_upper: Option<f64>,
    /// The same for the lower side.
    pub trip_lower: Option<f64>,
}

/// Why there is no viscous flow to show.
#[derive(Debug, Clone, Copy, PartialEq, thiserror::Error)]
pub enum ViscousError {
    /// The Reynolds number is out of range.
    #[error("a Reynolds number of {0} is outside 1e3 to 1e9")]
    Reynolds(f64),
    /// The amplification exponent is out of range.
    #[error("an amplification exponent of {0} is outside 0.1 to 20")]
    Amplification(f64),
    /// A trip lies off the chord.
    #[error("a trip at {0} of the chord is outside 0 to 1")]
    Trip(f64),
    /// The incidence is not a finite angle.
    #[error("an incidence of {0} is not a finite angle")]
    Incidence(f64),
    /// A station of a given edge speed is not finite, positive and beyond the one before.
    #[error("station {0} of the edge speed is not finite, positive and beyond the one before")]
    Station(usize),
    /// The equations did not converge.
    #[error("the flow at {:.2}° did not converge in {steps} steps: the last changed it by {change:.1e}", .incidence.to_degrees())]
    NotConverged {
        /// In radians.
        incidence: f64,
        /// Newton steps that were made.
        steps: usize,
        /// Greatest relative change of a thickness in the last of them.
        change: f64,
    },
}

impl Conditions {
    /// Free transition at amplification exponent `amplification`.
    #[must_use]
    pub fn free(reynolds: f64, amplification: f64) -> Self {
        Self { reynolds, amplification, trip_upper: None, trip_lower: None }
    }

    /// With trips on both sides at `x`.
    #[must_use]
    pub fn tripped(self, x: f64) -> Self {
        Self { trip_upper: Some(x), trip_lower: Some(x), ..self }
    }

    fn check(&self) -> Result<(), ViscousError> {
        if !(1e3..=1e9).contains(&self.reynolds) {
            return Err(ViscousError::Reynolds(self.reynolds));
        }
        if !(0.1..=20.0).contains(&self.amplification) {
            return Err(ViscousError::Amplification(self.amplification));
        }
        match [self.trip_upper, self.trip_lower].into_iter().flatten().find(|x| !(0.0..=1.0).contains(x)) {
            Some(bad) => Err(ViscousError::Trip(bad)),
            None => Ok(()),
        }
    }
}

/// Layers at one incidence, to start a neighbouring point from.
#[derive(Debug, Clone, PartialEq)]
pub struct ViscousState {
    unknowns: Unknowns,
}

/// Viscous flow about one outline, put up and factored once for every incidence, Reynolds number
/// and transition.
#[derive(Debug, Clone, PartialEq)]
pub struct Viscous {
    panelling: Panelling,
    coupling: Coupling,
}

impl Viscous {
    /// Assembles and factors the outer flow and its answer to sources on surface and wake.
    ///
    /// # Errors
    /// When the equations have no finite solution.
    pub fn new(panelling: &Panelling) -> Result<Self, FlowError> {
        Ok(Self { panelling: panelling.clone(), coupling: Coupling::of(panelling)? })
    }

    /// The nodes and panels it is solved on.
    #[must_use]
    pub fn panelling(&self) -> &Panelling {
        &self.panelling
    }

    /// Flow at `incidence` in radians, from the state of a neighbouring point if one is given, or
    /// if that does not lead there, from a first account of its own, or at last by way of points
    /// nearby.
    ///
    /// # Errors
    /// When conditions or incidence are out of range, or the equations do not converge: then there
    /// is no flow to show, and none is made up.
    pub fn at(
        &self,
        incidence: f64,
        conditions: &Conditions,
        start: Option<&ViscousState>,
    ) -> Result<ViscousSolution, ViscousError> {
        conditions.check()?;
        if !incidence.is_finite() {
            return Err(ViscousError::Incidence(incidence));
        }
        let from_start = start.map(|state| self.solve(incidence, conditions, Some(state)));
        let last = match from_start {
            Some(Ok(solution)) => return Ok(solution),
            _ => self.solve(incidence, conditions, None),
        };
        last.or_else(|Failed { steps, change }| {
            let found = curve::by_detour(self, conditions, incidence);
            found.ok_or(ViscousError::NotConverged { incidence, steps, change })
        })
    }

    /// Incidence of zero lift without layers, in radians.
    fn zero_lift(&self) -> f64 {
        self.coupling.zero_lift()
    }

    fn attempt(
        &self,
        incidence: f64,
        conditions: &Conditions,
        start: Option<&ViscousState>,
    ) -> Option<ViscousSolution> {
        self.solve(incidence, conditions, start).ok()
    }

    fn solve(
        &self,
        incidence: f64,
        conditions: &Conditions,
        start: Option<&ViscousState>,
    ) -> Result<ViscousSolution, Failed> {
        let mut problem = Problem::new(&self.coupling, incidence, conditions);
        let fits = |state: &&ViscousState| state.unknowns.theta.len() == self.coupling.count();
        let unknowns = match start.filter(fits) {
            Some(state) => Some(state.unknowns.clone()),
            None => first_account(&problem, self.panelling.len() / 2),
        };
        let unknowns = unknowns.ok_or(Failed { steps: 0, change: f64::INFINITY })?;
        let Converged { layers, unknowns, steps } = converge(&mut problem, unknowns)?;
        let state = ViscousState { unknowns };
        let solution =
            ViscousSolution::of(&self.panelling, &problem, conditions, incidence, &layers, steps, state);
        if solution.is_finite() { Ok(solution) } else { Err(Failed { steps, change: f64::NAN }) }
    }
}

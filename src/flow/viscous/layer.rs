//! The boundary layer at one station, with what the closures make of it.

use super::closure::{
    amplification, equilibrium_gradient, equilibrium_shear, laminar_dissipation, laminar_energy_shape,
    laminar_friction, shear_at_transition, slip_velocity, thickness, turbulent_energy_shape,
    turbulent_friction,
};
use super::dual::Dual;

/// Which closures hold.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Regime {
    Laminar,
    Turbulent,
    Wake,
}

/// How fast the shear stress follows its value in equilibrium (Green, Weeks and Brooman 1973, in
/// the form and with the constant of Drela 1989).
const LAG: f64 = 5.6;
/// In the wake the same eddies reach over both halves.
const WAKE_LENGTH: f64 = 0.9;

/// What is known of a layer at a station: lengths in chords, speed in onset speeds.
#[derive(Debug, Clone, Copy)]
pub(super) struct Profile<const N: usize> {
    /// Square root of the coefficient of the greatest shear stress, C_τ; of no meaning where laminar.
    pub(super) shear: Dual<N>,
    /// Momentum thickness θ.
    pub(super) theta: Dual<N>,
    /// Displacement thickness δ*, of the layer alone: without the dead air behind a blunt edge.
    pub(super) delta_star: Dual<N>,
    /// Edge speed.
    pub(super) speed: Dual<N>,
}

impl Profile<4> {
    /// With the four numbers as independent variables, in the order of the fields.
    pub(super) fn free(shear: f64, theta: f64, delta_star: f64, speed: f64) -> Self {
        Self {
            shear: Dual::variable(shear, 0),
            theta: Dual::variable(theta, 1),
            delta_star: Dual::variable(delta_star, 2),
            speed: Dual::variable(speed, 3),
        }
    }
}

/// A profile and its closures, as the equations need them. Rates are by length.
#[derive(Debug, Clone, Copy)]
pub(super) struct Layer<const N: usize> {
    pub(super) log_theta: Dual<N>,
    pub(super) log_speed: Dual<N>,
    pub(super) log_energy_shape: Dual<N>,
    pub(super) log_shear: Dual<N>,
    pub(super) h: Dual<N>,
    /// c_f/(2θ)
    pub(super) friction: Dual<N>,
    /// 2 c_D/(H* θ)
    pub(super) dissipation: Dual<N>,
    /// Growth of the amplification exponent; nothing but where laminar.
    pub(super) growth: Dual<N>,
    /// Growth of the logarithm of C_τ at constant edge speed; nothing where laminar.
    pub(super) shear_growth: Dual<N>,
}

/// Least shape factor that is looked at: closures are singular at one.
const LEAST_SHAPE: f64 = 1.0005;

impl<const N: usize> Layer<N> {
    pub(super) fn of(regime: Regime, profile: &Profile<N>, reynolds: f64) -> Self {
        let Profile { shear, theta, delta_star, speed } = *profile;
        let h = (delta_star / theta).at_least(LEAST_SHAPE);
        let re_theta = (speed * theta * reynolds).at_least(0.1);
        let nothing = Dual::constant(0.0);
        let common = Self {
            log_theta: theta.ln(),
            log_speed: speed.ln(),
            log_energy_shape: nothing,
            log_shear: nothing,
            h,
            friction: nothing,
            dissipation: nothing,
            growth: nothing,
            shear_growth: nothing,
        };
        if regime == Regime::Laminar {
            let scale = (re_theta * theta).recip();
            return Self {
                log_energy_shape: laminar_energy_shape(h).ln(),
                friction: laminar_friction(h) * scale,
                dissipation: laminar_dissipation(h) * scale,
                growth: amplification(h, re_theta) / theta,
                ..common
            };
        }
        let wall = regime == Regime::Turbulent;
        let energy_shape = turbulent_energy_shape(h, re_theta);
        let slip = slip_velocity(h, energy_shape, if wall { 0.95 } else { 0.99995 });
        let outer = shear.square() * (1.0 - slip);
        let viscous = 0.15 * (1.0 - slip).square() / re_theta;
        let half_friction = if wall { turbulent_friction(h, re_theta) } else { nothing };
        let dissipation = if wall { half_friction * slip + outer + viscous } else { 2.0 * (outer + viscous) };
        let equilibrium = equilibrium_shear(h, re_theta, energy_shape, slip, wall);
        let length = thickness(h) * theta;
        let reach = if wall { 1.0 } else { WAKE_LENGTH };
        let gradient = equilibrium_gradient(h, re_theta, half_friction, wall) / theta;
        Self {
            log_energy_shape: energy_shape.ln(),
            log_shear: shear.ln(),
            friction: half_friction / theta,
            dissipation: 2.0 * dissipation / (energy_shape * theta),
            shear_growth: LAG * (equilibrium - reach * shear) / length + 2.0 * gradient,
            ..common
        }
    }

    /// As a function of more variables: see [`Dual::among`].
    pub(super) fn among<const M: usize>(&self, places: [usize; N]) -> Layer<M> {
        Layer {
            log_theta: self.log_theta.among(places),
            log_speed: self.log_speed.among(places),
            log_energy_shape: self.log_energy_shape.among(places),
            log_shear: self.log_shear.among(places),
            h: self.h.among(places),
            friction: self.friction.among(places),
            dissipation: self.dissipation.among(places),
            growth: self.growth.among(places),
            shear_growth: self.shear_growth.among(places),
        }
    }
}

/// Square root of C_τ where a laminar layer of this profile becomes turbulent.
pub(super) fn shear_behind_transition<const N: usize>(profile: &Profile<N>, reynolds: f64) -> Dual<N> {
    let h = (profile.delta_star / profile.theta).at_least(LEAST_SHAPE);
    let re_theta = (profile.speed * profile.theta * reynolds).at_least(0.1);
    let energy_shape = turbulent_energy_shape(h, re_theta);
    let slip = slip_velocity(h, energy_shape, 0.95);
    equilibrium_shear(h, re_theta, energy_shape, slip, true) * shear_at_transition(h)
}

//! The integral equations between two stations: momentum, shape (kinetic energy) and shear stress.
//!
//! Von Kármán's momentum equation, the one for the energy shape parameter that follows with it,
//! and the lag of the shear stress (Drela and Giles 1987, equations (9), (10) and (24)), each
//! divided by its quantity and taken between stations in logarithms:
//!
//! ```text
//!     Δ ln θ  + (H + 2) Δ ln u − ∫ ξ (c_f/2θ) d ln ξ                 = 0
//!     Δ ln H* + (1 − H) Δ ln u + ∫ ξ (c_f/2θ − 2c_D/(H*θ)) d ln ξ    = 0
//!     2 Δ ln √C_τ + 2 Δ ln u − ∫ (shear growth) dξ                   = 0
//! ```
//!
//! ξ is the length from the stagnation point. In ln ξ the flow near the stagnation point, where
//! the integrands are constant, is exact.

use super::dual::Dual;
use super::layer::{Layer, Profile, Regime, shear_behind_transition};

/// Variables of the equations of an interval, in this order: √C_τ, θ, δ*, u and ξ of the first
/// station, the same of the second, and the place ξ of transition between them.
pub(super) const VARIABLES: usize = 11;
/// Where the profile of the first station stands among them.
pub(super) const FIRST: [usize; 4] = [0, 1, 2, 3];
/// Where its ξ does.
pub(super) const FIRST_XI: usize = 4;
/// Where the profile of the second station stands.
pub(super) const SECOND: [usize; 4] = [5, 6, 7, 8];
/// Where its ξ does.
pub(super) const SECOND_XI: usize = 9;
/// Where the place of transition stands.
pub(super) const TRANSITION: usize = 10;

/// One end of an interval.
#[derive(Clone, Copy)]
pub(super) struct End<'a, const N: usize> {
    pub(super) layer: &'a Layer<N>,
    pub(super) xi: Dual<N>,
}

/// What is left of the equations.
#[derive(Debug, Clone, Copy)]
pub(super) struct Residual<const N: usize> {
    pub(super) momentum: Dual<N>,
    pub(super) shape: Dual<N>,
    pub(super) shear: Dual<N>,
}

/// Between two stations of one regime; the last equation means nothing where laminar.
pub(super) fn residual<const N: usize>(first: End<N>, second: End<N>, turbulent: bool) -> Residual<N> {
    let (one, two) = (first.layer, second.layer);
    let log_speed = two.log_speed - one.log_speed;
    let log_xi = (second.xi / first.xi).ln();
    let share = second_share(log_xi);
    let mean = |a: Dual<N>, b: Dual<N>| (1.0 - share) * a + share * b;
    let friction = [first.xi * one.friction, second.xi * two.friction];
    let momentum = two.log_theta - one.log_theta + (mean(one.h, two.h) + 2.0) * log_speed
        - mean(friction[0], friction[1]) * log_xi;

    // Where the shape changes fast, as behind transition, the downstream end has the say: the
    // mean of both would ring (backward against trapezium rule).
    let change = 2.0 * ((two.h - 1.0) / (one.h - 1.0)).ln().square();
    let downstream = (1.0 - share) * change / (change + 1.0) + share;
    let upstream = 1.0 - downstream;
    let work = [friction[0] - first.xi * one.dissipation, friction[1] - second.xi * two.dissipation];
    let shape = two.log_energy_shape - one.log_energy_shape
        + (1.0 - (upstream * one.h + downstream * two.h)) * log_speed
        + (upstream * work[0] + downstream * work[1]) * log_xi;

    let shear = if turbulent {
        2.0 * (two.log_shear - one.log_shear + log_speed)
            - 0.5 * (one.shear_growth + two.shear_growth) * (second.xi - first.xi)
    } else {
        Dual::constant(0.0)
    };
    Residual { momentum, shape, shear }
}

/// Weight of the second station in a mean over ln ξ: a half for short intervals. Where ξ grows
/// manifold, as next to stagnation, the equations are stiff and only the downstream end counts:
/// θ² relaxes by some eight times ln ξ, and the trapezium rule would ring.
fn second_share<const N: usize>(log_xi: Dual<N>) -> Dual<N> {
    1.0 - 0.5 * ((4.0 * log_xi).square() + 1.0).recip()
}

/// At the first station behind the place where a layer begins and is similar: there u ~ ξ^m.
///
/// `exponent` is m: one at a stagnation point, nought on a flat plate.
pub(super) fn similar<const N: usize>(layer: &Layer<N>, xi: Dual<N>, exponent: f64) -> Residual<N> {
    let friction = xi * layer.friction;
    Residual {
        momentum: (layer.h + 2.0) * exponent - friction + 0.5 * (1.0 - exponent),
        shape: (1.0 - layer.h) * exponent + friction - xi * layer.dissipation,
        shear: Dual::constant(0.0),
    }
}

/// Between a laminar station and a turbulent one, with transition at a place between: the sum of
/// a laminar and a turbulent piece, the profile at transition taken from the line between both
/// stations.
pub(super) fn through_transition(
    first: [f64; 5],
    second: [f64; 5],
    transition: f64,
    reynolds: f64,
) -> Residual<VARIABLES> {
    let free = |numbers: [f64; 5], from: usize| {
        let [shear, theta, delta_star, speed, xi]: [Dual<VARIABLES>; 5] =
            std::array::from_fn(|i| Dual::variable(numbers[i], from + i));
        (Profile { shear, theta, delta_star, speed }, xi)
    };
    let (one, first_xi) = free(first, FIRST[0]);
    let (two, second_xi) = free(second, SECOND[0]);
    let place = Dual::variable(transition, TRANSITION);
    let part = (place - first_xi) / (second_xi - first_xi);
    let between = |a: Dual<VARIABLES>, b: Dual<VARIABLES>| a + part * (b - a);
    let mut middle = Profile {
        shear: Dual::constant(1.0),
        theta: between(one.theta, two.theta),
        delta_star: between(one.delta_star, two.delta_star),
        speed: between(one.speed, two.speed),
    };
    middle.shear = shear_behind_transition(&middle, reynolds);

    let [before, ahead] = [&one, &middle].map(|profile| Layer::of(Regime::Laminar, profile, reynolds));
    let [behind, after] = [&middle, &two].map(|profile| Layer::of(Regime::Turbulent, profile, reynolds));
    let laminar = residual(End { layer: &before, xi: first_xi }, End { layer: &ahead, xi: place }, false);
    let turbulent = residual(End { layer: &behind, xi: place }, End { layer: &after, xi: second_xi }, true);
    Residual {
        momentum: laminar.momentum + turbulent.momentum,
        shape: laminar.shape + turbulent.shape,
        shear: turbulent.shear,
    }
}

//! Closure relations of the two-equation integral method: what a velocity profile of shape factor
//! H = δ*/θ amounts to.
//!
//! Laminar: fits of our own to the similar flows of Falkner and Skan, which are exact, up to
//! separation; behind it the reversed branch of M. Drela and M. B. Giles, "Viscous-inviscid
//! analysis of transonic and low Reynolds number airfoils", AIAA Journal 25 (10), 1987. (Their
//! own fits for attached layers are off by up to 5 % in friction.) Turbulent: the same paper, with the energy shape parameter and the lag constant as M. Drela revised them
//! ("Low Reynolds Number Aerodynamics", Lecture Notes in Engineering 54, Springer 1989); skin
//! friction of T. W. Swafford, AIAA Journal 21 (1), 1983. All from memory of those papers; the
//! laminar ones are held against exact similar flows in `tests/boundary_layer.rs`.

use super::dual::Dual;

/// Slope A of the locus of equilibrium flows G = A √(1 + B β), Clauser's parameters.
const EQUILIBRIUM_A: f64 = 6.7;
/// Its B.
const EQUILIBRIUM_B: f64 = 0.75;

/// Shape factor at laminar separation: the similar flow without friction.
const SEPARATION: f64 = 4.03;
/// Profiles fuller than this do not occur; the fits are kept from going there.
const FULLEST: f64 = 1.25;

/// Coefficients of powers of 1/H, highest first, fitted by least squares to the 18 similar flows of
/// `tests/reference/boundary_layer.toml`, from stagnation to separation. Greatest errors: 3.5e-5
/// of H*, 2.3e-5 of Re_θ c_f/2 and 4.4e-6 of Re_θ 2c_D/H*.
const ENERGY_SHAPE: [f64; 5] = [12.90651882, -22.24720024, 15.82557885, -4.52589492, 1.95466939];
const FRICTION: [f64; 5] = [0.0, -4.61563974, 7.6734076, -1.85120225, 0.05735155];
const DISSIPATION: [f64; 5] = [-17.2582929, 30.23298731, -16.87204852, 3.84422302, -0.10509414];

/// A fit up to separation, and behind it the curve `reversed` of Drela and Giles, which is led
/// over to the fit.
fn laminar<const N: usize>(h: Dual<N>, fit: [f64; 5], reversed: impl Fn(Dual<N>) -> Dual<N>) -> Dual<N> {
    let attached = |h: Dual<N>| {
        let inverse = h.at_least(FULLEST).recip();
        fit[1..].iter().fold(Dual::constant(fit[0]), |sum, &coefficient| sum * inverse + coefficient)
    };
    if h.value <= SEPARATION {
        return attached(h);
    }
    let gap = attached(Dual::constant(SEPARATION)).value - reversed(Dual::constant(SEPARATION)).value;
    reversed(h) + gap * ((SEPARATION - h) / 3.0).exp()
}

/// Energy shape parameter H* = θ*/θ of a laminar profile.
pub(super) fn laminar_energy_shape<const N: usize>(h: Dual<N>) -> Dual<N> {
    laminar(h, ENERGY_SHAPE, |h| 0.040 * (h - 4.0).square() / h + 1.515)
}

/// Re_θ c_f/2 of a laminar profile: negative beyond separation.
pub(super) fn laminar_friction<const N: usize>(h: Dual<N>) -> Dual<N> {
    laminar(h, FRICTION, |h| {
        if h.value < 7.4 {
            0.01977 * (7.4 - h).square() / (h - 1.0) - 0.067
        } else {
            0.022 * (1.0 - 1.4 * (h - 6.0).recip()).square() - 0.067
        }
    })
}

/// Re_θ 2 c_D/H* of a laminar profile.
pub(super) fn laminar_dissipation<const N: usize>(h: Dual<N>) -> Dual<N> {
    laminar(h, DISSIPATION, |h| {
        let beyond = (h - 4.0).square();
        0.207 - 0.003 * beyond / (0.02 * beyond + 1.0)
    })
}

/// Energy shape parameter of a turbulent profile.
pub(super) fn turbulent_energy_shape<const N: usize>(h: Dual<N>, re_theta: Dual<N>) -> Dual<N> {
    let re_theta = re_theta.at_least(200.0);
    let separation = (400.0 * re_theta.recip() + 3.0).at_most(4.0);
    let least = 4.0 * re_theta.recip() + 1.5;
    if h.value < separation.value {
        let attached = (separation - h) / (separation - 1.0);
        (2.0 - least) * attached.square() * 1.5 / (h + 0.5) + least
    } else {
        let beyond = h - separation;
        let log = re_theta.ln();
        let wide = beyond + 4.0 * log.recip();
        beyond.square() * (0.007 * log / wide.square() + 0.015 * h.recip()) + least
    }
}

/// c_f/2 of a turbulent profile (Swafford 1983).
pub(super) fn turbulent_friction<const N: usize>(h: Dual<N>, re_theta: Dual<N>) -> Dual<N> {
    let log = re_theta.ln().at_least(3.0) / std::f64::consts::LN_10;
    let power = -1.74 - 0.31 * h;
    let body = 0.3 * (power * log.ln() - 1.33 * h).exp();
    let wake = 0.00011 * ((4.0 - h / 0.875).tanh() - 1.0);
    0.5 * (body + wake)
}

/// Slip velocity of the outer layer over the edge speed.
pub(super) fn slip_velocity<const N: usize>(h: Dual<N>, energy_shape: Dual<N>, most: f64) -> Dual<N> {
    (0.5 * energy_shape * (1.0 - (h - 1.0) / (EQUILIBRIUM_B * h))).at_most(most)
}

/// Square root of the shear-stress coefficient that the profile would have in equilibrium.
///
/// C_τ,EQ = H* (H - 1)³ / (2 A² B (1 - U_s) H³). Within `wall`, the viscous sublayer takes its
/// part of the velocity defect at small Re_θ.
pub(super) fn equilibrium_shear<const N: usize>(
    h: Dual<N>,
    re_theta: Dual<N>,
    energy_shape: Dual<N>,
    slip: Dual<N>,
    wall: bool,
) -> Dual<N> {
    const CONSTANT: f64 = 0.5 / (EQUILIBRIUM_A * EQUILIBRIUM_A * EQUILIBRIUM_B);
    let sublayer = if wall { 18.0 * re_theta.recip() } else { Dual::constant(0.0) };
    let defect = (h - 1.0 - sublayer).at_least(0.01);
    let square = CONSTANT * energy_shape * (h - 1.0) * defect.square() / ((1.0 - slip) * h * h.square());
    square.at_least(1e-10).sqrt()
}

/// Logarithmic gradient of the edge speed that would keep the profile in equilibrium, times θ.
pub(super) fn equilibrium_gradient<const N: usize>(
    h: Dual<N>,
    re_theta: Dual<N>,
    half_friction: Dual<N>,
    wall: bool,
) -> Dual<N> {
    let sublayer = if wall { 18.0 * re_theta.recip() } else { Dual::constant(0.0) };
    let defect = (h - 1.0 - sublayer).at_least(0.01) / (EQUILIBRIUM_A * h);
    (half_friction - defect.square()) / (EQUILIBRIUM_B * h)
}

/// Thickness of a turbulent layer over θ.
pub(super) fn thickness<const N: usize>(h: Dual<N>) -> Dual<N> {
    (1.72 * (h - 1.0).recip() + 3.15 + h).at_most(12.0)
}

/// Shear stress just behind transition over that in equilibrium, as square roots.
pub(super) fn shear_at_transition<const N: usize>(h: Dual<N>) -> Dual<N> {
    1.8 * (-3.3 * (h - 1.0).recip()).exp()
}

/// Growth of the amplification exponent over a length θ: the envelope of the most amplified
/// waves of similar profiles (Orr and Sommerfeld), beyond the critical Re_θ.
///
/// Envelope method of Drela and Giles 1987 with the fits of Drela 1989, which hold for separated
/// profiles too. The growth sets in over ±0.08 decades of Re_θ, so that it is smooth.
pub(super) fn amplification<const N: usize>(h: Dual<N>, re_theta: Dual<N>) -> Dual<N> {
    const HALF_WIDTH: f64 = 0.08;
    let inverse = (h - 1.0).at_least(0.05).recip();
    let critical = 2.492 * inverse.powf(0.43) + 0.7 * ((14.0 * inverse - 9.24).tanh() + 1.0);
    let beyond =
        (re_theta.at_least(1.0).ln() / std::f64::consts::LN_10 - critical + HALF_WIDTH) / (2.0 * HALF_WIDTH);
    if beyond.value <= 0.0 {
        return Dual::constant(0.0);
    }
    let onset = if beyond.value < 1.0 { beyond.square() * (3.0 - 2.0 * beyond) } else { Dual::constant(1.0) };
    let by_re_theta = 0.028 * (h - 1.0) - 0.0345 * (-(3.87 * inverse - 2.52).square()).exp();
    let re_theta_by_length = 2.7 * inverse - 5.5 * inverse.square()
        + 3.0 * inverse.square() * inverse
        + 0.1 * (-20.0 * inverse).exp()
        - 0.05;
    (onset * by_re_theta * re_theta_by_length).at_least(0.0)
}

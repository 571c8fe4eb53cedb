//! Classical laminate theory: from plies at their angles to the stiffness and first failure of a skin.
//!
//! Axes of a skin: 1 along the span, 2 along the chord; angles from the span, radians. Moduli and
//! stresses in MPa, forces per width in N/mm, A in N/mm, B in N, D in N·mm.
//!
//! Source: R. M. Jones, "Mechanics of Composite Materials" (1975), chapters 2 and 4, from memory.

use nalgebra::{Matrix3, Vector3};

use super::{PlyElastic, StrengthError};

/// A reserve above this is not told apart: the place carries next to nothing.
pub const UNLOADED: f64 = 1e6;

/// One ply in a skin.
#[derive(Debug, Clone, PartialEq)]
pub struct Layer {
    /// What it is made of.
    pub material: PlyElastic,
    /// Direction of its fibre (warp) from the span, radians.
    pub angle: f64,
    /// Cured thickness, mm.
    pub thickness: f64,
}

impl Layer {
    /// Plane-stress stiffness in the ply's own axes, MPa (Jones 1975, eq. 2.61).
    #[must_use]
    pub fn own_stiffness(&self) -> Matrix3<f64> {
        let PlyElastic { e1, e2, g12, nu12, .. } = self.material;
        let share = 1.0 - nu12 * nu12 * e2 / e1;
        let coupling = nu12 * e2 / share;
        Matrix3::new(e1 / share, coupling, 0.0, coupling, e2 / share, 0.0, 0.0, 0.0, g12)
    }

    /// The same in the axes of the skin, MPa (Jones 1975, eq. 2.79: Q̄ = T⁻¹ Q T⁻ᵀ).
    #[must_use]
    pub fn stiffness(&self) -> Matrix3<f64> {
        let back = turned(-self.angle);
        back * self.own_stiffness() * back.transpose()
    }

    /// Stresses in the ply's own axes (along, across, shear) for strains of the skin, MPa.
    fn own_stress(&self, strain: Vector3<f64>) -> [f64; 3] {
        (self.own_stiffness() * turned(-self.angle).transpose() * strain).into()
    }
}

/// Turns stresses into axes at `angle` (Jones 1975, eq. 2.70).
fn turned(angle: f64) -> Matrix3<f64> {
    let (s, c) = angle.sin_cos();
    Matrix3::new(c * c, s * s, 2.0 * c * s, s * s, c * c, -2.0 * c * s, -c * s, c * s, c * c - s * s)
}

/// What a ply is held against.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, Default)]
pub enum Criterion {
    /// Each stress against its own strength.
    MaximumStress,
    /// The quadratic sum σ1²/X² - σ1σ2/X² + σ2²/Y² + τ²/S², each strength that of the stress's sign
    /// (Azzi and Tsai 1965). Never milder than the maximum stress but where both normal stresses have one sign.
    #[default]
    TsaiHill,
}

/// How a ply fails.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum PlyMode {
    /// Fibres torn.
    TensionAlong,
    /// Fibres crushed.
    CompressionAlong,
    /// Cracked along the fibre, or the weft torn.
    TensionAcross,
    /// Crushed across the fibre.
    CompressionAcross,
    /// Sheared in the plane.
    Shear,
}

/// The first ply of a skin to fail.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct FirstPly {
    /// How many times the load it stands: below one it fails. At most [`UNLOADED`].
    pub reserve: f64,
    /// Which ply, counted from the core outwards.
    pub ply: usize,
    /// The stress that weighs most in it.
    pub mode: PlyMode,
}

/// Elastic constants of a skin that is kept from curling by what it lies on.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct SkinConstants {
    /// Young's modulus along the span, MPa.
    pub ex: f64,
    /// Young's modulus along the chord, MPa.
    pub ey: f64,
    /// Shear modulus, MPa.
    pub gxy: f64,
    /// Contraction along the chord per extension along the span.
    pub nuxy: f64,
}

/// The plies of a skin from the core outwards.
///
/// Not a certification: use tested material values; local codes and licensed practice come first.
#[derive(Debug, Clone, PartialEq)]
pub struct Layup {
    layers: Vec<Layer>,
    thickness: f64,
    density: f64,
    a: Matrix3<f64>,
    b: Matrix3<f64>,
    d: Matrix3<f64>,
    compliance: Matrix3<f64>,
    constants: SkinConstants,
    bending_modulus: f64,
}

impl Layup {
    /// A skin from its plies.
    ///
    /// # Errors
    /// When there are none, one has no thickness, or a material value is impossible.
    pub fn new(layers: Vec<Layer>) -> Result<Self, StrengthError> {
        let sound =
            |layer: &Layer| layer.thickness > 0.0 && layer.thickness.is_finite() && layer.angle.is_finite();
        if layers.is_empty() || !layers.iter().all(sound) {
            return Err(StrengthError::Plies);
        }
        layers.iter().try_for_each(|layer| layer.material.check())?;
        let thickness: f64 = layers.iter().map(|layer| layer.thickness).sum();
        let weight: f64 = layers.iter().map(|layer| layer.thickness * layer.material.density).sum();
        let (mut a, mut b, mut d) = (Matrix3::zeros(), Matrix3::zeros(), Matrix3::zeros());
        let mut below = -0.5 * thickness;
        for layer in &layers {
            let above = below + layer.thickness;
            let stiffness = layer.stiffness();
            a += stiffness * (above - below);
            b += stiffness * ((above.powi(2) - below.powi(2)) / 2.0);
            d += stiffness * ((above.powi(3) - below.powi(3)) / 3.0);
            below = above;
        }
        let inverse = |matrix: Matrix3<f64>| {
            let inverse = matrix.try_inverse().filter(|m| m.iter().all(|value| value.is_finite()));
            inverse.ok_or(StrengthError::Singular)
        };
        let compliance = inverse(a)?;
        let bending_modulus = 12.0 / (thickness.powi(3) * inverse(d)?[(0, 0)]);
        let constants = SkinConstants {
            ex: 1.0 / (thickness * compliance[(0, 0)]),
            ey: 1.0 / (thickness * compliance[(1, 1)]),
            gxy: 1.0 / (thickness * compliance[(2, 2)]),
            nuxy: -compliance[(0, 1)] / compliance[(0, 0)],
        };
        let density = weight / thickness;
        Ok(Self { layers, thickness, density, a, b, d, compliance, constants, bending_modulus })
    }

    /// The plies from the core outwards.
    #[must_use]
    pub fn layers(&self) -> &[Layer] {
        &self.layers
    }

    /// Thickness, mm.
    #[must_use]
    pub fn thickness(&self) -> f64 {
        self.thickness
    }

    /// Mean density, kg/m³.
    #[must_use]
    pub fn density(&self) -> f64 {
        self.density
    }

    /// The matrices A (N/mm), B (N) and D (N·mm) about the middle of the skin (Jones 1975, eq. 4.24).
    #[must_use]
    pub fn abd(&self) -> [Matrix3<f64>; 3] {
        [self.a, self.b, self.d]
    }

    /// Elastic constants with the skin free to contract but not to curl: those of A alone, as the
    /// core holds each skin flat.
    #[must_use]
    pub fn constants(&self) -> SkinConstants {
        self.constants
    }

    /// Young's modulus along the span that its own bending shows, MPa: 12 / (t³ (D⁻¹)₁₁).
    #[must_use]
    pub fn bending_modulus(&self) -> f64 {
        self.bending_modulus
    }

    /// Which ply fails first under forces per width (along the span, along the chord, shear; N/mm).
    #[must_use]
    pub fn first_ply(&self, forces: [f64; 3], criterion: Criterion) -> FirstPly {
        let strain = self.compliance * Vector3::from(forces);
        let mut first = FirstPly { reserve: UNLOADED, ply: 0, mode: PlyMode::Shear };
        for (ply, layer) in self.layers.iter().enumerate() {
            let (reserve, mode) = reserve_of(&layer.material, layer.own_stress(strain), criterion);
            if reserve < first.reserve {
                first = FirstPly { reserve, ply, mode };
            }
        }
        first
    }

    /// Stress along the span at which the first ply fails in tension and in compression, MPa.
    #[must_use]
    pub fn strengths_along(&self, criterion: Criterion) -> [f64; 2] {
        [1.0, -1.0].map(|sign| self.first_ply([sign * self.thickness, 0.0, 0.0], criterion).reserve)
    }

    /// Strain along the span at which it does, tension and compression, both positive.
    #[must_use]
    pub fn strains_along(&self, criterion: Criterion) -> [f64; 2] {
        self.strengths_along(criterion).map(|stress| stress / self.constants.ex)
    }

    /// Shear stress in the plane at which the first ply fails, the lesser of both directions, MPa.
    #[must_use]
    pub fn shear_strength(&self, criterion: Criterion) -> f64 {
        let one_way = |sign: f64| self.first_ply([0.0, 0.0, sign * self.thickness], criterion).reserve;
        one_way(1.0).min(one_way(-1.0))
    }
}

fn reserve_of(material: &PlyElastic, stress: [f64; 3], criterion: Criterion) -> (f64, PlyMode) {
    let [along, across, shear] = stress;
    let (x, x_mode) = if along >= 0.0 {
        (material.tension_along, PlyMode::TensionAlong)
    } else {
        (material.compression_along, PlyMode::CompressionAlong)
    };
    let (y, y_mode) = if across >= 0.0 {
        (material.tension_across, PlyMode::TensionAcross)
    } else {
        (material.compression_across, PlyMode::CompressionAcross)
    };
    let used = [
        (along.abs() / x, x_mode),
        (across.abs() / y, y_mode),
        (shear.abs() / material.shear, PlyMode::Shear),
    ];
    let most = used.into_iter().fold(used[0], |best, other| if other.0 > best.0 { other } else { best });
    let whole = match criterion {
        Criterion::MaximumStress => most.0,
        Criterion::TsaiHill => {
            let sum = used.iter().map(|(share, _)| share * share).sum::<f64>();
            (sum - along * across / (x * x)).max(0.0).sqrt()
        }
    };
    ((1.0 / whole).min(UNLOADED), most.1)
}

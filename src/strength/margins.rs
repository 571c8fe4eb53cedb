//! How far a section is from failing under the forces in it.
//!
//! A reserve is strength over stress, load factor included: below one it fails.

use super::{BeamNode, CoreElastic, Criterion, PlyMode, SectionStiffness, StrengthError, UNLOADED};
use crate::section::Side;

/// Coefficient of the wrinkling stress that is meant for design.
///
/// Hoff and Mautner, "The buckling of sandwich-type panels" (Journal of the Aeronautical Sciences 12,
/// 1945, from memory): the theory for a thick core gives 0.91, their tests scatter down towards 0.5,
/// which they advise.
pub const WRINKLING_FOR_DESIGN: f64 = 0.5;
/// Coefficient of the wrinkling stress by their theory, for a flat face on a thick core.
pub const WRINKLING_BY_THEORY: f64 = 0.91;

/// Stress at which a face under compression wrinkles, MPa: k ∛(Ef Ec Gc), all MPa (Hoff and Mautner
/// 1945). Moduli that are not positive give nought.
#[must_use]
pub fn wrinkling_stress(coefficient: f64, face: f64, core: f64, core_shear: f64) -> f64 {
    coefficient * (face * core * core_shear).max(0.0).cbrt()
}

/// Reserve of a core against being crushed by a force in N on a patch in mm², such as a foot or a trestle:
/// strength over pressure, the skin spreading nothing, which is on the safe side. At most [`UNLOADED`];
/// nought for a patch that is no number above zero.
///
/// Not a certification: use tested material values; local codes and licensed practice come first.
#[must_use]
pub fn crushing_reserve(core: &CoreElastic, force: f64, patch: f64) -> f64 {
    if !(patch > 0.0 && core.compression > 0.0) || force.is_nan() {
        return 0.0;
    }
    (core.compression * patch / force.abs()).min(UNLOADED)
}

/// What strength is judged by.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Criteria {
    /// For plies.
    pub ply: Criterion,
    /// Coefficient of the wrinkling stress.
    pub wrinkling: f64,
}

impl Default for Criteria {
    /// Tsai-Hill, and the wrinkling coefficient for design.
    fn default() -> Self {
        Self { ply: Criterion::TsaiHill, wrinkling: WRINKLING_FOR_DESIGN }
    }
}

impl Criteria {
    /// Refuses a coefficient that is no number above zero.
    ///
    /// # Errors
    /// With that number.
    pub fn check(&self) -> Result<(), StrengthError> {
        let value = self.wrinkling;
        let what = "the wrinkling coefficient";
        if value > 0.0 && value.is_finite() { Ok(()) } else { Err(StrengthError::Asked { what, value }) }
    }
}

/// How a part fails.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum Mode {
    /// The first ply of the skin.
    Skin(PlyMode),
    /// A skin under compression wrinkles off its core.
    Wrinkling,
    /// The core shears between the skins.
    CoreShear,
    /// The whole strut bends out under a push along it.
    Buckling,
}

impl Mode {
    /// In the words of the shop.
    #[must_use]
    pub fn words(self) -> &'static str {
        match self {
            Self::Skin(PlyMode::TensionAlong) => "a ply tears along its fibre",
            Self::Skin(PlyMode::CompressionAlong) => "a ply is crushed along its fibre",
            Self::Skin(PlyMode::TensionAcross) => "a ply tears across its fibre",
            Self::Skin(PlyMode::CompressionAcross) => "a ply is crushed across its fibre",
            Self::Skin(PlyMode::Shear) => "a ply shears",
            Self::Wrinkling => "a skin wrinkles off the core",
            Self::CoreShear => "the core shears",
            Self::Buckling => "the strut buckles",
        }
    }
}

/// A reserve and what it is against.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Reserve {
    /// Strength over stress; at most [`UNLOADED`].
    pub reserve: f64,
    /// What fails first.
    pub mode: Mode,
    /// Where on the chord, mm in the section's axes.
    pub x: f64,
    /// On which surface.
    pub side: Side,
}

impl Reserve {
    /// The lesser one.
    pub(super) fn or(self, other: Self) -> Self {
        if other.reserve < self.reserve { other } else { self }
    }
}

/// Least reserves of a section: of the skin, against wrinkling and of the core.
///
/// Skins: strain at the outer face from both bendings and the push, and shear flow of torque (Bredt) and
/// of both shears (thin walls), against the first ply with the shear of either sign. Torque and shear across
/// go to walls and core by their stiffness; the shear along counts in full in the walls. Wrinkling: the
/// compressive stress of a skin against [`wrinkling_stress`] with the lesser of its modulus in stretching
/// and in bending. Core: [`SectionStiffness::core_shear`] with the whole of the shear across, which is on the
/// safe side, and its share of the torque.
///
/// Not a certification: use tested material values; local codes and licensed practice come first.
#[must_use]
pub fn reserves(section: &SectionStiffness, node: &BeamNode, criteria: Criteria) -> [Reserve; 3] {
    let curvatures = section.curvatures(node.moment);
    let twist_rate = node.torque / section.torsion;
    let core = section.core();
    let unloaded = |mode| Reserve { reserve: UNLOADED, mode, x: section.centroid.x, side: Side::Upper };
    let mut skin_least = unloaded(Mode::Skin(PlyMode::Shear));
    let mut wrinkling_least = unloaded(Mode::Wrinkling);
    let walls = section.walls();
    for (i, wall) in walls.walls.iter().enumerate() {
        let Some(skin) = walls.skin(wall) else { continue };
        let place = wall.outer[0].midpoint(wall.outer[1]);
        let strain = section.strain(place, curvatures, node.compression);
        let stretch = skin.constants().ex * strain * skin.thickness();
        let of_torque = match section.cell {
            super::Cell::Closed => section.wall_torsion * node.torque.abs() / (2.0 * section.cell_area),
            super::Cell::Open => twist_rate.abs() * skin.constants().gxy * skin.thickness().powi(2),
        };
        let [across, along] = section.wall_flow(i);
        let across = section.wall_shear * across;
        let shear = of_torque + (node.shear[0] * across + node.shear[1] * along).abs();
        for flow in [shear, -shear] {
            let first = skin.first_ply([stretch, 0.0, flow], criteria.ply);
            let here =
                Reserve { reserve: first.reserve, mode: Mode::Skin(first.mode), x: place.x, side: wall.side };
            skin_least = skin_least.or(here);
        }
        if strain < 0.0 {
            let modulus = skin.constants().ex.min(skin.bending_modulus());
            let critical = wrinkling_stress(criteria.wrinkling, modulus, core.across, core.g);
            let reserve = (critical / -(skin.constants().ex * strain)).min(UNLOADED);
            wrinkling_least =
                wrinkling_least.or(Reserve { reserve, mode: Mode::Wrinkling, x: place.x, side: wall.side });
        }
    }
    let stress =
        node.shear[0].abs() * section.core_shear() + core.g * twist_rate.abs() * section.core_height();
    let reserve = if stress > 0.0 { (core.shear / stress).min(UNLOADED) } else { UNLOADED };
    [skin_least, wrinkling_least, Reserve { reserve, ..unloaded(Mode::CoreShear) }]
}

//! Whether a part breaks: skins, core, bending, torsion, load cases, reserves and what mends them.
//!
//! Lengths in mm, forces in N, stresses and moduli in MPa, stiffness in N·mm², weights in kg.
//!
//! **Not a certification.** Results are worth as much as the material values: use tested ones. Fatigue,
//! impact, water in the core, bonds, bolts and stress concentrations are not modelled. Local codes and
//! licensed practice come first. `docs/strength.md` has the equations and what was measured.

mod beam;
mod bond;
mod error;
mod laminate_theory;
mod loads;
mod margins;
pub mod material;
mod member;
mod section_stiffness;
mod shear_flow;
mod walls;

pub use beam::{BeamNode, BeamResult, BeamStation, Cantilever};
pub use bond::{bond_reserve, bond_shear};
pub use error::StrengthError;
pub use laminate_theory::{Criterion, FirstPly, Layer, Layup, PlyMode, SkinConstants, UNLOADED};
pub use loads::{GRAVITY, LineLoad, LoadCase, PointLoad};
pub use margins::{
    Criteria, Mode, Reserve, WRINKLING_BY_THEORY, WRINKLING_FOR_DESIGN, crushing_reserve, reserves,
    wrinkling_stress,
};
pub use material::{CoreElastic, PlyElastic, Provenance};
pub use member::{CaseResult, Cure, Least, Member, MemberStation, StationReserves};
pub use section_stiffness::{Cell, SectionStiffness};
pub use walls::{FlapCut, SectionBuild, SkinPly, SkinSides, Wall, Walls, outline_points};

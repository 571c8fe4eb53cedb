//! What skins and cores are made of: stiffness and strength.
//!
//! Stresses and moduli are in MPa (N/mm²), densities in kg/m³. Values differ from shop to shop: have
//! a laminate of your own cloth, resin and pressure tested and use those values.

use super::StrengthError;

/// Where material values come from. Nothing but [`Provenance::Tested`] is fit to rely on.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum Provenance {
    /// Measured on the user's own laminate or wood.
    Tested,
    /// Taken from a data sheet or a book.
    Published,
    /// Invented for a demonstration: replace by tested ones.
    Invented,
}

/// A cured ply: linear elastic and orthotropic in its plane.
///
/// A cloth of 0/90 is one ply with E1 near to E2; ±45 is the same cloth at an angle; chopped mat is
/// [`PlyElastic::isotropic`].
#[derive(Debug, Clone, PartialEq)]
pub struct PlyElastic {
    /// What the shop calls it.
    pub name: String,
    /// Where the values come from.
    pub provenance: Provenance,
    /// Young's modulus along the fibre (warp), MPa.
    pub e1: f64,
    /// Young's modulus across it, MPa.
    pub e2: f64,
    /// Shear modulus in the plane, MPa.
    pub g12: f64,
    /// Contraction across per extension along; below √(E1/E2).
    pub nu12: f64,
    /// Tensile strength along, MPa.
    pub tension_along: f64,
    /// Compressive strength along, MPa, positive.
    pub compression_along: f64,
    /// Tensile strength across, MPa.
    pub tension_across: f64,
    /// Compressive strength across, MPa, positive.
    pub compression_across: f64,
    /// Shear strength in the plane, MPa.
    pub shear: f64,
    /// Density, kg/m³.
    pub density: f64,
}

impl PlyElastic {
    /// A ply alike in all directions of its plane, such as chopped mat: G = E / 2(1 + ν).
    /// `tension`, `compression` and `shear` are strengths, all MPa; density in kg/m³.
    #[must_use]
    pub fn isotropic(
        name: &str,
        provenance: Provenance,
        [modulus, contraction]: [f64; 2],
        [tension, compression, shear]: [f64; 3],
        density: f64,
    ) -> Self {
        Self {
            name: name.to_owned(),
            provenance,
            e1: modulus,
            e2: modulus,
            g12: modulus / (2.0 * (1.0 + contraction)),
            nu12: contraction,
            tension_along: tension,
            compression_along: compression,
            tension_across: tension,
            compression_across: compression,
            shear,
            density,
        }
    }

    /// Refuses values that no material has.
    ///
    /// # Errors
    /// Names the first value that is not positive, or a contraction beyond what E1 and E2 allow.
    pub fn check(&self) -> Result<(), StrengthError> {
        let positive = [
            ("E1", self.e1),
            ("E2", self.e2),
            ("G12", self.g12),
            ("tensile strength along", self.tension_along),
            ("compressive strength along", self.compression_along),
            ("tensile strength across", self.tension_across),
            ("compressive strength across", self.compression_across),
            ("shear strength", self.shear),
            ("density", self.density),
        ];
        refuse_unless_positive(&self.name, &positive)?;
        if self.nu12.is_nan() || self.nu12.powi(2) >= self.e1 / self.e2 {
            return Err(StrengthError::Material {
                material: self.name.clone(),
                what: "ν12",
                value: self.nu12,
                must: "must be a number whose square is below E1/E2",
            });
        }
        Ok(())
    }
}

/// Wood or foam between the skins, taken as alike in all directions.
#[derive(Debug, Clone, PartialEq)]
pub struct CoreElastic {
    /// What the shop calls it.
    pub name: String,
    /// Where the values come from.
    pub provenance: Provenance,
    /// Young's modulus along the span, MPa.
    pub along_span: f64,
    /// Young's modulus square to the skin, MPa: what holds a skin from wrinkling.
    pub across: f64,
    /// Shear modulus, MPa.
    pub g: f64,
    /// Shear strength, MPa.
    pub shear: f64,
    /// Compressive strength square to the skin, MPa.
    pub compression: f64,
    /// Density, kg/m³.
    pub density: f64,
}

impl CoreElastic {
    /// Refuses values that no material has.
    ///
    /// # Errors
    /// Names the first value that is not positive.
    pub fn check(&self) -> Result<(), StrengthError> {
        let positive = [
            ("E along the span", self.along_span),
            ("E square to the skin", self.across),
            ("G", self.g),
            ("shear strength", self.shear),
            ("compressive strength", self.compression),
            ("density", self.density),
        ];
        refuse_unless_positive(&self.name, &positive)
    }
}

fn refuse_unless_positive(material: &str, values: &[(&'static str, f64)]) -> Result<(), StrengthError> {
    let wrong = values.iter().find(|(_, value)| !(value.is_finite() && *value > 0.0));
    wrong.map_or(Ok(()), |&(what, value)| {
        let must = "must be a number above zero";
        Err(StrengthError::Material { material: material.to_owned(), what, value, must })
    })
}

/// Materials for demonstrations. **Every value here is invented**, of the order that such materials
/// have: replace them by tested ones before anything is built or loaded.
pub mod demo {
    use super::{CoreElastic, PlyElastic, Provenance};

    /// Invented: carbon, all fibre one way.
    #[must_use]
    pub fn unidirectional_carbon() -> PlyElastic {
        PlyElastic {
            name: "unidirectional carbon (invented values)".to_owned(),
            provenance: Provenance::Invented,
            e1: 110_000.0,
            e2: 7_500.0,
            g12: 3_800.0,
            nu12: 0.3,
            tension_along: 1_100.0,
            compression_along: 650.0,
            tension_across: 30.0,
            compression_across: 110.0,
            shear: 50.0,
            density: 1_500.0,
        }
    }

    /// Invented: carbon cloth woven 0/90.
    #[must_use]
    pub fn woven_carbon() -> PlyElastic {
        PlyElastic {
            name: "woven carbon (invented values)".to_owned(),
            provenance: Provenance::Invented,
            e1: 52_000.0,
            e2: 52_000.0,
            g12: 3_600.0,
            nu12: 0.06,
            tension_along: 480.0,
            compression_along: 350.0,
            tension_across: 480.0,
            compression_across: 350.0,
            shear: 60.0,
            density: 1_470.0,
        }
    }

    /// Invented: E-glass cloth woven 0/90.
    #[must_use]
    pub fn woven_glass() -> PlyElastic {
        PlyElastic {
            name: "woven glass (invented values)".to_owned(),
            provenance: Provenance::Invented,
            e1: 19_000.0,
            e2: 19_000.0,
            g12: 3_200.0,
            nu12: 0.13,
            tension_along: 280.0,
            compression_along: 210.0,
            tension_across: 280.0,
            compression_across: 210.0,
            shear: 45.0,
            density: 1_780.0,
        }
    }

    /// Invented: chopped glass mat.
    #[must_use]
    pub fn chopped_glass() -> PlyElastic {
        let name = "chopped glass (invented values)";
        PlyElastic::isotropic(name, Provenance::Invented, [7_000.0, 0.32], [80.0, 110.0, 55.0], 1_450.0)
    }

    /// Invented: a light wood with its grain along the span.
    #[must_use]
    pub fn light_wood() -> CoreElastic {
        CoreElastic {
            name: "light wood (invented values)".to_owned(),
            provenance: Provenance::Invented,
            along_span: 6_000.0,
            across: 250.0,
            g: 350.0,
            shear: 4.0,
            compression: 3.0,
            density: 380.0,
        }
    }

    /// Invented: a rigid foam.
    #[must_use]
    pub fn foam() -> CoreElastic {
        CoreElastic {
            name: "foam (invented values)".to_owned(),
            provenance: Provenance::Invented,
            along_span: 70.0,
            across: 70.0,
            g: 25.0,
            shear: 1.0,
            compression: 1.2,
            density: 80.0,
        }
    }
}

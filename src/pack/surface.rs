//! The finished surface as a whole: its ends, what the water touches, how fair a batten lies.

use super::PackError;
use crate::design::Design;
use crate::wing::{Law, Wing};

/// How near to a curved design a batten is to lie where the design does not say, mm: what filler
/// makes up without being noticed. Common practice, no source.
pub(super) const FAIRING: f64 = 0.5;

/// What is measured of it.
pub(super) struct Surface {
    /// Skin in the water, mm²: both halves of a foil, below the waterline of what stands upright.
    pub(super) wetted: f64,
    /// Of what stands upright: area seen from the side of what is in the water, mm².
    pub(super) immersed: Option<f64>,
    /// From one template to the next of a curved foil, and how far a batten between them is from it.
    pub(super) battens: Vec<(f64, f64, f64)>,
    /// How far a batten over a shaped tip would be from it, mm.
    pub(super) over_tip: Option<f64>,
    /// The places at which the fewest templates of a curved foil keep a batten near, mm from the root.
    pub(super) fewest: Vec<f64>,
}

impl Surface {
    pub(super) fn of(design: &Design, wing: &Wing) -> Result<Self, PackError> {
        let halves = if wing.is_mirrored() { 2.0 } else { 1.0 };
        let waterline = design.waterline.mm();
        let wetted =
            if waterline < wing.reach() { halves * wing.wetted_area(waterline, wing.reach())? } else { 0.0 };
        let immersed =
            (!design.kind.mirrored()).then(|| wing.planform().area_between(waterline, wing.reach()));
        let is_curved = design.law != Law::Straight;
        let limit = design.fairing.map_or(FAIRING, |fairing| fairing.mm());
        let places: Vec<f64> = design.templates.iter().map(|at| at.mm()).collect();
        // A shaped tip is worked to the planform.
        let pairs = places.windows(2).filter(|pair| is_curved && pair[1] <= wing.tip_from() + 1e-3);
        let battens: Result<_, PackError> =
            pairs.map(|pair| Ok((pair[0], pair[1], wing.batten_gap(pair[0], pair[1])?))).collect();
        Ok(Self {
            wetted,
            immersed,
            battens: battens?,
            over_tip: wing.tip().map(|_| wing.batten_gap(wing.tip_from(), wing.reach())).transpose()?,
            fewest: if is_curved { wing.fewest_templates(limit)? } else { Vec::new() },
        })
    }
}

//! From the design to what lies over the wood and how the flap is hinged.

use super::model::{Cut, CutKind, Design, FlapKind, PlySide};
use crate::parts::{
    Covers, CutOut, Hinge, HingeKind, Laminate, PartError, Ply, PlyMaterial, WoodPiece, wood_pieces,
};
use crate::section::Side;
use crate::wing::{Law, Wing};

/// Stretches of a curved foil over which a volume is taken from three cross-sections.
const CURVED: usize = 16;

impl Design {
    /// The skin: plies, filler and paint.
    #[must_use]
    pub fn skin(&self) -> Laminate {
        let plies = self.plies.iter().map(|ply| {
            let material = PlyMaterial {
                areal_weight: ply.weight,
                fibre_density: ply.fibre_density,
                resin_density: ply.resin_density,
                fibre_share: ply.fibre_share,
            };
            Ply {
                thickness: ply.thickness.map_or_else(|| material.thickness(), |measured| measured.mm()),
                covers: match ply.on {
                    PlySide::Both => Covers::Both,
                    PlySide::Upper => Covers::Upper,
                    PlySide::Lower => Covers::Lower,
                },
                span: ply.from.mm()..=ply.to.mm(),
                chord: ply.chord_from..=ply.chord_to,
            }
        });
        Laminate { plies: plies.collect(), finish: self.laminate.finish.mm(), rise: self.laminate.rise.mm() }
    }

    /// Whether wood and finished surface differ.
    #[must_use]
    pub fn has_skin(&self) -> bool {
        !self.plies.is_empty() || self.laminate.finish.mm() > 0.0
    }

    /// The cut-outs at `at` mm from the root, each with what the design says of it.
    pub fn cuts_at(&self, at: f64) -> impl Iterator<Item = (&Cut, CutOut)> {
        let there = move |cut: &&Cut| (cut.from.mm()..=cut.to.mm()).contains(&at);
        self.cuts.iter().filter(there).map(|cut| {
            let shape = match cut.kind {
                CutKind::Slot => CutOut::Slot {
                    from: if cut.from_upper { Side::Upper } else { Side::Lower },
                    at: cut.at,
                    width: cut.width.mm(),
                    depth: cut.depth.mm(),
                },
                CutKind::Bore => CutOut::Bore { at: cut.at, height: cut.height, diameter: cut.width.mm() },
            };
            (cut, shape)
        })
    }

    /// The wooden pieces of the foil, which is the design's own.
    ///
    /// # Errors
    /// When the wood cannot be made at some place.
    pub fn pieces(&self, wing: &Wing) -> Result<Vec<WoodPiece>, PartError> {
        let flap = self.flap.map(|flap| [flap.from.mm(), flap.to.mm()]);
        let hinge_at = |at, chord| self.hinge_at(at, chord);
        let mut joints: Vec<f64> = self.stations.iter().map(|station| station.at.mm()).collect();
        if self.law != Law::Straight {
            // A curve has no corners, but a volume from few cross-sections wants them near each other.
            joints.extend((0..CURVED).map(|i| self.reach().mm() * i as f64 / CURVED as f64));
        }
        wood_pieces(wing, &joints, &self.skin(), &hinge_at, flap, self.router.tolerance.mm())
    }

    /// The hinge at `at` mm from the root, where the chord has so many mm; `None` where no flap is.
    #[must_use]
    pub fn hinge_at(&self, at: f64, chord: f64) -> Option<Hinge> {
        let flap = self.flap?;
        let (from, to) = (flap.from.mm(), flap.to.mm());
        if !(from..=to).contains(&at) {
            return None;
        }
        let share = (at - from) / (to - from);
        Some(Hinge {
            at: chord * (flap.hinge + share * (flap.hinge_end - flap.hinge)),
            kind: match flap.kind {
                FlapKind::LaminateUpper => HingeKind::Laminate { side: Side::Upper },
                FlapKind::LaminateLower => HingeKind::Laminate { side: Side::Lower },
                FlapKind::Pin => HingeKind::Pin { height: flap.axis },
            },
            up: flap.up.radians(),
            down: flap.down.radians(),
            face: flap.face.mm(),
            clearance: flap.clearance.mm(),
        })
    }
}

//! From the design to what lies over the wood and how the flap is hinged.

use std::f64::consts::PI;

use super::model::{Cut, CutKind, Design, FlapKind, Hands, HingeFrom, PlySide};
use crate::parts::{
    Covers, CutOut, Hinge, HingeBy, HingeKind, HingeLine, Laminate, PartError, Ply, PlyMaterial, WoodPiece,
    WoodPlan,
};
use crate::section::Side;
use crate::wing::{Law, Wing};

/// Stretches of a curved foil over which a volume is taken from three cross-sections.
const CURVED: usize = 16;
/// The same in a shaped tip, and across a hole.
const TIP: usize = 4;
const HOLE: usize = 8;

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
        self.cuts.iter().filter_map(move |cut| Some((cut, cut.at_station(at)?)))
    }

    /// The wooden pieces of the foil, which is the design's own.
    ///
    /// # Errors
    /// When the wood cannot be made at some place.
    pub fn pieces(&self, wing: &Wing) -> Result<Vec<WoodPiece>, PartError> {
        let mut joints: Vec<f64> = self.stations.iter().map(|station| station.at.mm()).collect();
        // A curve has no corners, but a volume from few cross-sections wants them near each other.
        if self.law != Law::Straight {
            joints.extend((0..CURVED).map(|i| self.reach().mm() * i as f64 / CURVED as f64));
        }
        if let Some(tip) = self.tip {
            let begins = self.reach().mm() - tip.length.mm();
            joints.extend((0..TIP).map(|i| begins + tip.length.mm() * i as f64 / TIP as f64));
        }
        for cut in &self.cuts {
            let (from, to) = (cut.from.mm(), cut.to.mm());
            joints.extend([from, to]);
            if cut.kind == CutKind::Hole {
                let place = |i: usize| 0.5 * (from + to - (to - from) * (PI * i as f64 / HOLE as f64).cos());
                joints.extend((0..=HOLE).map(place));
            }
        }
        let parted = self.flap.map(|flap| [flap.from.mm(), flap.to.mm()]);
        let plan = WoodPlan {
            wing,
            joints: &joints,
            laminate: &self.skin(),
            hinge_at: &|at, chord| self.hinge_at(at, chord),
            parted,
            flap: self.flap_span(),
            cuts_at: &|at| self.cuts_at(at).map(|(_, cut)| cut).collect(),
            tolerance: self.router.tolerance.mm(),
        };
        let mut pieces = plan.pieces()?;
        if self.hands == Hands::Mirrored {
            pieces.iter_mut().for_each(|piece| piece.count = 2);
        }
        Ok(pieces)
    }

    /// From where to where the flap itself runs, mm from the root: the clearance short of the wood beside
    /// it at either end, and as far as the foil goes where there is none.
    #[must_use]
    pub fn flap_span(&self) -> Option<[f64; 2]> {
        let flap = self.flap?;
        let ends = flap.to.mm() < self.reach().mm() - 1e-6;
        let clearance = flap.clearance.mm();
        Some([flap.from.mm() + clearance, flap.to.mm() - if ends { clearance } else { 0.0 }])
    }

    /// Where the hinge runs; `None` where no flap is.
    #[must_use]
    pub fn hinge_line(&self) -> Option<HingeLine> {
        let flap = self.flap?;
        let (by, places) = match flap.hinge_lengths {
            None => (HingeBy::Fraction, [flap.hinge, flap.hinge_end]),
            Some((HingeFrom::Nose, lengths)) => (HingeBy::FromNose, lengths.map(|length| length.mm())),
            Some((HingeFrom::TrailingEdge, lengths)) => {
                (HingeBy::FromTrailingEdge, lengths.map(|length| length.mm()))
            }
        };
        Some(HingeLine { by, places, from: flap.from.mm(), to: flap.to.mm() })
    }

    /// The hinge at `at` mm from the root, where the chord has so many mm; `None` where no flap is.
    #[must_use]
    pub fn hinge_at(&self, at: f64, chord: f64) -> Option<Hinge> {
        let flap = self.flap?;
        let line = self.hinge_line().filter(|line| line.reaches(at))?;
        Some(Hinge {
            at: line.x_at(at, chord),
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

impl Cut {
    /// What it takes out of the wood at `at` mm from the root; `None` where it does not reach.
    #[must_use]
    pub fn at_station(&self, at: f64) -> Option<CutOut> {
        let (from, to) = (self.from.mm(), self.to.mm());
        if !(from..=to).contains(&at) {
            return None;
        }
        let side = if self.from_upper { Side::Upper } else { Side::Lower };
        let (width, depth) = (self.width.mm(), self.depth.mm());
        Some(match (self.kind, self.chord) {
            (CutKind::Slot | CutKind::Pocket, Some(chord)) => CutOut::Pocket { from: side, chord, depth },
            (CutKind::Slot | CutKind::Pocket, None) => CutOut::Slot { from: side, at: self.at, width, depth },
            (CutKind::Bore, _) => CutOut::Bore { at: self.at, height: self.height, diameter: width },
            (CutKind::Hole, _) => {
                let beside = at - 0.5 * (from + to);
                let width = (width * width - 4.0 * beside * beside).max(0.0).sqrt();
                if depth > 0.0 {
                    CutOut::Slot { from: side, at: self.at, width, depth }
                } else {
                    CutOut::Hole { at: self.at, width }
                }
            }
        })
    }
}

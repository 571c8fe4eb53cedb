//! The list of wooden pieces: how many, what blank each comes from, what it weighs.

use super::{Core, CutOut, CutShape, Hinge, Laminate, PartError, split};
use crate::geometry::{ArcPath, Rect, follow_with_arcs};
use crate::wing::Wing;

/// One kind of wooden piece.
#[derive(Debug, Clone, PartialEq)]
pub struct WoodPiece {
    /// What it is called.
    pub name: &'static str,
    /// How many there are.
    pub count: usize,
    /// The block that it is cut from, without allowance for holding it, mm: along the span, along the
    /// chord, and in height.
    pub blank: [f64; 3],
    /// Volume of one, mm³.
    pub volume: f64,
    /// How the grain runs in it. Every piece of a foil bends along the span and is longest there.
    pub grain: &'static str,
}

/// Longest stretch of the span over which a volume is taken from three cross-sections, mm. The
/// cross-section of a straight loft is of the second degree along the span, for which that is exact;
/// only the skin's share is not.
const STRETCH: f64 = 150.0;

/// What the wood of a foil is made by.
pub struct WoodPlan<'a> {
    /// The finished foil.
    pub wing: &'a Wing,
    /// Where along the span the loft has a corner or something begins or ends, mm from the root, with
    /// both ends.
    pub joints: &'a [f64],
    /// What lies over the wood.
    pub laminate: &'a Laminate,
    /// The hinge at a place, mm from the root, with the chord there.
    pub hinge_at: &'a dyn Fn(f64, f64) -> Option<Hinge>,
    /// From where to where the foil is parted.
    pub parted: Option<[f64; 2]>,
    /// From where to where the flap itself runs: shorter, so that its ends run free.
    pub flap: Option<[f64; 2]>,
    /// What is taken out of the wood at a place.
    pub cuts_at: &'a dyn Fn(f64) -> Vec<CutOut>,
    /// Greatest distance of an outline from the exact one, mm.
    pub tolerance: f64,
}

impl WoodPlan<'_> {
    /// The wooden pieces.
    ///
    /// # Errors
    /// When the wood cannot be made at some place.
    pub fn pieces(&self) -> Result<Vec<WoodPiece>, PartError> {
        let mut ends = self.joints.to_vec();
        ends.extend(self.parted.into_iter().chain(self.flap).flatten());
        ends.extend(self.laminate.plies.iter().flat_map(|ply| [*ply.span.start(), *ply.span.end()]));
        ends.retain(|at| (0.0..=self.wing.reach()).contains(at));
        ends.sort_by(f64::total_cmp);
        ends.dedup_by(|a, b| (*a - *b).abs() < 0.01);

        let mut whole = Sum::default();
        let mut parted = Sum::default();
        for pair in ends.windows(2) {
            let parts = ((pair[1] - pair[0]) / STRETCH).ceil().max(1.0);
            let step = (pair[1] - pair[0]) / parts;
            let middle = 0.5 * (pair[0] + pair[1]);
            let within = |ends: Option<[f64; 2]>| ends.is_some_and(|[a, b]| (a..=b).contains(&middle));
            for i in 0..parts as usize {
                let from = pair[0] + step * i as f64;
                for (share, weight) in [(0.0, 1.0), (0.5, 4.0), (1.0, 1.0)] {
                    // Just within the stretch: at its ends a ply or the flap may begin or end.
                    let at = (from + share * step).clamp(pair[0] + 1e-6 * step, pair[1] - 1e-6 * step);
                    let sections = self.cross_sections(at, within(self.parted))?;
                    let has_flap = within(self.flap);
                    for (sum, section) in [&mut whole, &mut parted].into_iter().zip(sections) {
                        sum.add(at, &section, weight * step / 6.0);
                        if !has_flap {
                            break;
                        }
                    }
                }
            }
        }
        let count = if self.wing.is_mirrored() { 2 } else { 1 };
        let name = if self.flap.is_some() { "main body" } else { "core" };
        let pieces = [(name, whole), ("flap", parted)];
        Ok(pieces.into_iter().filter_map(|(name, sum)| sum.piece(name, count)).collect())
    }

    /// The wood at a place in the foil's axes: the main body or the whole, and the flap.
    fn cross_sections(&self, at: f64, is_parted: bool) -> Result<Vec<CrossSection>, PartError> {
        let shape = self.wing.shape_at(at)?;
        let hinge = (self.hinge_at)(at, shape.chord).filter(|_| is_parted);
        let core = Core::of(&shape, self.laminate)?;
        let paths = match hinge {
            Some(hinge) => {
                let parts = split(&core, &hinge, self.tolerance)?;
                vec![parts.main.core, parts.flap.core]
            }
            None => vec![follow_with_arcs(&core, self.tolerance)?],
        };
        let cuts: Vec<CutShape> = (self.cuts_at)(at).iter().map(|cut| cut.of(&core)).collect();
        let placed = shape.to_foil();
        let section = |path: ArcPath| {
            let flat = if cuts.is_empty() { Vec::new() } else { path.flattened(self.tolerance) };
            let taken: f64 = cuts.iter().map(|cut| cut.taken_from(&flat)).sum();
            CrossSection { area: path.area().abs() - taken, bounds: path.transformed(placed).bounds() }
        };
        Ok(paths.into_iter().map(section).collect())
    }
}

/// One piece, cut across.
struct CrossSection {
    area: f64,
    /// In the foil's axes.
    bounds: Rect,
}

#[derive(Default)]
struct Sum {
    volume: f64,
    span: Option<[f64; 2]>,
    bounds: Option<Rect>,
}

impl Sum {
    fn add(&mut self, at: f64, section: &CrossSection, weight: f64) {
        self.volume += weight * section.area;
        let bounds = section.bounds;
        self.bounds = Some(self.bounds.map_or(bounds, |known| known.union(bounds)));
        let [from, to] = self.span.unwrap_or([at, at]);
        self.span = Some([from.min(at), to.max(at)]);
    }

    fn piece(self, name: &'static str, count: usize) -> Option<WoodPiece> {
        let (bounds, [from, to]) = (self.bounds?, self.span?);
        let blank = [to - from, bounds.width(), bounds.height()];
        Some(WoodPiece { name, count, blank, volume: self.volume, grain: "along the span" })
    }
}

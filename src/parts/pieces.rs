//! The list of wooden pieces: how many, what blank each comes from, what it weighs.

use super::{Core, Hinge, Laminate, PartError, split};
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
}

/// Longest stretch of the span over which a volume is taken from three cross-sections, mm. The
/// cross-section of a straight loft is of the second degree along the span, for which that is exact;
/// only the skin's share is not.
const STRETCH: f64 = 150.0;

/// The wooden pieces of a foil.
///
/// `joints`: where along the span the loft has a corner, mm from the root, with both ends.
/// `hinge_at`: the hinge at a place, mm from the root, with the chord there; the flap runs from
/// `flap` start to end.
///
/// # Errors
/// When the wood cannot be made at some place.
pub fn wood_pieces(
    wing: &Wing,
    joints: &[f64],
    laminate: &Laminate,
    hinge_at: &dyn Fn(f64, f64) -> Option<Hinge>,
    flap: Option<[f64; 2]>,
    tolerance: f64,
) -> Result<Vec<WoodPiece>, PartError> {
    let mut ends = joints.to_vec();
    ends.extend(flap.into_iter().flatten());
    ends.extend(laminate.plies.iter().flat_map(|ply| [*ply.span.start(), *ply.span.end()]));
    ends.retain(|at| (0.0..=wing.reach()).contains(at));
    ends.sort_by(f64::total_cmp);
    ends.dedup_by(|a, b| (*a - *b).abs() < 0.01);

    let mut whole = Sum::default();
    let mut parted = Sum::default();
    for pair in ends.windows(2) {
        let parts = ((pair[1] - pair[0]) / STRETCH).ceil().max(1.0);
        let step = (pair[1] - pair[0]) / parts;
        let is_flapped = flap.is_some_and(|[from, to]| {
            let middle = 0.5 * (pair[0] + pair[1]);
            (from..=to).contains(&middle)
        });
        for i in 0..parts as usize {
            let from = pair[0] + step * i as f64;
            for (share, weight) in [(0.0, 1.0), (0.5, 4.0), (1.0, 1.0)] {
                // Just within the stretch: at its ends a ply or the flap may begin or end.
                let at = (from + share * step).clamp(pair[0] + 1e-6 * step, pair[1] - 1e-6 * step);
                let sections = cross_sections(wing, laminate, hinge_at, is_flapped, at, tolerance)?;
                for (sum, section) in [&mut whole, &mut parted].into_iter().zip(&sections) {
                    sum.add(at, section, weight * step / 6.0);
                }
            }
        }
    }
    let count = if wing.is_mirrored() { 2 } else { 1 };
    let name = if flap.is_some() { "main body" } else { "core" };
    let pieces = [(name, whole), ("flap", parted)];
    Ok(pieces.into_iter().filter_map(|(name, sum)| sum.piece(name, count)).collect())
}

/// Outlines of the wood at a place in the foil's axes: the main body or the whole, and the flap.
fn cross_sections(
    wing: &Wing,
    laminate: &Laminate,
    hinge_at: &dyn Fn(f64, f64) -> Option<Hinge>,
    is_flapped: bool,
    at: f64,
    tolerance: f64,
) -> Result<Vec<ArcPath>, PartError> {
    let shape = wing.shape_at(at).map_err(|_| PartError::NoCore { at })?;
    let hinge = hinge_at(at, shape.chord).filter(|_| is_flapped);
    let core = Core::of(&shape, laminate)?;
    let paths = match hinge {
        Some(hinge) => {
            let parts = split(&core, &hinge, tolerance)?;
            vec![parts.main.core, parts.flap.core]
        }
        None => vec![follow_with_arcs(&core, tolerance)?],
    };
    let placed = shape.to_foil();
    Ok(paths.into_iter().map(|path| path.transformed(placed)).collect())
}

#[derive(Default)]
struct Sum {
    volume: f64,
    span: Option<[f64; 2]>,
    bounds: Option<Rect>,
}

impl Sum {
    fn add(&mut self, at: f64, section: &ArcPath, weight: f64) {
        self.volume += weight * section.area().abs();
        let bounds = section.bounds();
        self.bounds = Some(self.bounds.map_or(bounds, |known| known.union(bounds)));
        let [from, to] = self.span.unwrap_or([at, at]);
        self.span = Some([from.min(at), to.max(at)]);
    }

    fn piece(self, name: &'static str, count: usize) -> Option<WoodPiece> {
        let (bounds, [from, to]) = (self.bounds?, self.span?);
        let blank = [to - from, bounds.width(), bounds.height()];
        Some(WoodPiece { name, count, blank, volume: self.volume })
    }
}

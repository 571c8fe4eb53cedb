//! What the printer is handed: masks, each closed on its part, cradles and rails.

use super::PackError;
use crate::design::{Design, MaskShapes};
use crate::geometry::{ArcPath, Curve, GeometryError, Point, Solid, follow_with_arcs};
use crate::parts::Core;
use crate::units::number;
use crate::wing::{StationShape, Wing};
use crate::workshop::{
    Cradle, CradleSection, Fit, Half, Mask, MaskMarks, MaskSettings, PlatePiece, RailSettings, Stamp,
    close_mask, lay_in_cradle, points_along, rail,
};

/// Greatest distance of a printed opening from its curve, mm: below what a printer resolves.
const PRINT_TOLERANCE: f64 = 0.02;

/// A mask of a station.
pub(super) struct StationMask {
    /// What it closes on.
    pub(super) part: Masked,
    pub(super) mask: Mask,
    /// How it closes.
    pub(super) fit: Fit,
}

/// What a mask closes on.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Masked {
    /// The wood before the laminate.
    Core,
    /// The finished surface.
    Finished,
}

impl Masked {
    /// As it stands in a sentence.
    pub(super) fn words(self) -> &'static str {
        match self {
            Self::Core => "the core",
            Self::Finished => "the finished foil",
        }
    }
}

/// A cradle between two templates.
pub(super) struct StationCradle {
    pub(super) face: Half,
    /// From where to where it holds the wood, mm from the root.
    pub(super) span: [f64; 2],
    pub(super) cradle: Cradle,
    /// How the wood lies in it.
    pub(super) fit: Fit,
}

/// A rail at a station.
pub(super) struct StationRail {
    /// The face that is worked over it.
    pub(super) face: Half,
    /// Distance from the root, mm.
    pub(super) at: f64,
    pub(super) pieces: Vec<PlatePiece>,
}

/// Cradles and rails, which stand on one board.
#[derive(Default)]
pub(super) struct Bench {
    pub(super) cradles: Vec<StationCradle>,
    pub(super) rails: Vec<StationRail>,
}

impl Bench {
    /// Solid of every piece, with its file's ending, its role, and its place in words.
    pub(super) fn pieces(&self) -> impl Iterator<Item = (String, &'static str, Option<f64>, String, &Solid)> {
        let cradles = self.cradles.iter().flat_map(|cradle| {
            let [from, to] = cradle.span.map(|at| number(at, 1));
            let (face, count) = (cradle.face.word(), cradle.cradle.pieces.len());
            cradle.cradle.pieces.iter().enumerate().map(move |(i, solid)| {
                let piece = if count == 1 { String::new() } else { format!("-{}", i + 1) };
                let name = format!("cradle-{from}-to-{to}-{face}{piece}");
                let words =
                    format!("cradle {from} to {to} mm, {face} face{}", piece.replace('-', ", piece "));
                (name, "cradle", None, words, solid)
            })
        });
        let rails = self.rails.iter().flat_map(|rail| {
            rail.pieces.iter().map(move |plate| {
                let (at, face) = (number(rail.at, 3), rail.face.word());
                let piece =
                    if plate.number[1] == 1 { String::new() } else { format!("-{}", plate.number[0]) };
                let name = format!("station-{at}-rail-{face}{piece}");
                let words = format!("rail at {at} mm, {face} face{}", piece.replace('-', ", piece "));
                (name, "end rail", Some(rail.at), words, &plate.solid)
            })
        });
        cradles.chain(rails)
    }
}

fn bed(design: &Design) -> [f64; 2] {
    design.printer.bed().map(|side| side.mm())
}

/// The masks that a design asks for at a station, each closed on its part.
pub(super) fn station_masks(
    design: &Design,
    stamp: &Stamp,
    shape: &StationShape<'_>,
    finished: &ArcPath,
    core: Option<&Core<'_>>,
) -> Result<Vec<StationMask>, GeometryError> {
    let settings = MaskSettings {
        clearance: design.masks.clearance.mm(),
        wall: design.masks.wall.mm(),
        thickness: design.masks.thickness.mm(),
        tolerance: 0.5 * PRINT_TOLERANCE,
        bed: bed(design),
    };
    let label = format!("{} {}", number(shape.at, 1), stamp.fingerprint);
    let hinge = design.hinge_at(shape.at, shape.chord).map(|hinge| hinge.at);
    let is_fine = design.router.tolerance.mm() <= 0.5 * PRINT_TOLERANCE;
    let mut masks = Vec::new();
    let mut add = |part, curve: &dyn Curve, outline: &ArcPath, ends: [f64; 2]| {
        let sights: Vec<f64> = ends.into_iter().chain(hinge).collect();
        let mask = Mask::of(outline, settings, MaskMarks { label: &label, sights: &sights })?;
        let fit = close_mask(curve, mask.solids(), settings.clearance + 0.2 * settings.wall);
        masks.push(StationMask { part, mask, fit });
        Ok::<_, GeometryError>(())
    };
    let wanted = design.masks.shapes;
    let core = core.filter(|_| design.has_skin());
    if let Some(core) = core.filter(|_| wanted != MaskShapes::Finished) {
        add(Masked::Core, core, &fine(core)?, [core.nose().x, core.tail().x])?;
    }
    if core.is_none() || wanted != MaskShapes::Core {
        let ends = [0.0, shape.chord];
        if is_fine {
            add(Masked::Finished, shape, finished, ends)?;
        } else {
            add(Masked::Finished, shape, &fine(shape)?, ends)?;
        }
    }
    Ok(masks)
}

/// A curve followed for the printer: half of the tolerance for the arcs, half for the chords of the solid.
fn fine(curve: &dyn Curve) -> Result<ArcPath, GeometryError> {
    follow_with_arcs(curve, 0.5 * PRINT_TOLERANCE)
}

/// From one cross-section of a cradle to the next, mm.
const CRADLE_STEP: f64 = 10.0;
/// Places along a cradle at which the wood is laid into it, between its cross-sections.
const TRIALS: usize = 5;
/// Ticks of a rail, shares of the chord.
const TICKS: [f64; 10] = [0.02, 0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.9];

/// The cradles and rails that a design asks for.
pub(super) fn bench(design: &Design, wing: &Wing, stamp: &Stamp) -> Result<Bench, PackError> {
    let mut bench = Bench::default();
    let (cradled, railed) = (design.masks.cradles.lower_and_upper(), design.masks.rails.lower_and_upper());
    let both = [Half::Lower, Half::Upper];
    let templates: Vec<f64> = design.templates.iter().map(|at| at.mm()).collect();
    let boards = boards(design, wing)?;
    for (i, face) in both.into_iter().enumerate() {
        if cradled[i] {
            for pair in templates.windows(2) {
                bench.cradles.push(cradle(design, wing, face, boards[i], [pair[0], pair[1]])?);
            }
        }
        if railed[i] {
            // What is worked looks away from the board.
            let board = boards[1 - i];
            for at in design.stations.iter().map(|station| station.at.mm()) {
                let label = format!("{} {} {}", number(at, 1), stamp.fingerprint, face.word());
                let pieces = with_wood(design, wing, at, |curve, shape| {
                    let settings = RailSettings {
                        board,
                        wall: design.masks.wall.mm(),
                        thickness: design.masks.thickness.mm(),
                        bed: bed(design),
                    };
                    let offset = design.masks.rail_offset.mm();
                    let outline = moved_out(curve, shape, offset)?;
                    let side = if face == Half::Upper { -1.0 } else { 1.0 };
                    let tick = |share: &f64| {
                        let jet = curve.jet(side * share.sqrt());
                        let out = -jet.tangent()?.turn_90();
                        let placed = shape.to_foil();
                        let at = placed * (jet.point + offset * out);
                        Some((at, placed * (jet.point + (offset + 1.0) * out) - at))
                    };
                    let ticks: Vec<_> = TICKS.iter().filter_map(tick).collect();
                    rail(&outline, face, &ticks, &label, settings)
                })?;
                bench.rails.push(StationRail { face, at, pieces });
            }
        }
    }
    Ok(bench)
}

/// The wood before the laminate at a place, or the finished surface where there is none, and the shape
/// that it lies in.
fn with_wood<T>(
    design: &Design,
    wing: &Wing,
    at: f64,
    make: impl FnOnce(&dyn Curve, &StationShape<'_>) -> Result<T, GeometryError>,
) -> Result<T, PackError> {
    let shape = wing.shape_at(at)?;
    let skin = design.skin();
    let made = if design.has_skin() { make(&Core::of(&shape, &skin)?, &shape) } else { make(&shape, &shape) };
    made.map_err(|source| PackError::Shape { at, source })
}

/// The outline of a part moved out, in the foil's axes.
fn moved_out(curve: &dyn Curve, shape: &StationShape<'_>, by: f64) -> Result<ArcPath, GeometryError> {
    let outline = fine(curve)?;
    let moved = if by > 0.0 { outline.offset(by)? } else { outline };
    Ok(moved.transformed(shape.to_foil()))
}

/// Height in the foil's axes of the board that the lower face lies over, and of the one that the upper
/// face lies over when all is turned: a wall's width away from all of the foil.
fn boards(design: &Design, wing: &Wing) -> Result<[f64; 2], PackError> {
    let (mut low, mut high) = (f64::INFINITY, f64::NEG_INFINITY);
    for station in &design.stations {
        let shape = wing.shape_at(station.at.mm())?;
        let placed = shape.to_foil();
        for point in points_along(&shape) {
            let y = (placed * point).y;
            (low, high) = (low.min(y), high.max(y));
        }
    }
    let wall = design.masks.wall.mm() + design.masks.rail_offset.mm();
    Ok([low - wall, high + wall])
}

/// The cradle in the middle between two templates, and the wood laid into it.
fn cradle(
    design: &Design,
    wing: &Wing,
    face: Half,
    board: f64,
    bay: [f64; 2],
) -> Result<StationCradle, PackError> {
    let length = design.masks.cradle_length.mm().min(bay[1] - bay[0]);
    let middle = 0.5 * (bay[0] + bay[1]);
    let span = [middle - 0.5 * length, middle + 0.5 * length];
    let clearance = design.masks.clearance.mm();
    let steps = (length / CRADLE_STEP).ceil().max(1.0);
    let sections = (0..=steps as usize)
        .map(|i| {
            let at = (span[0] + length * i as f64 / steps).min(span[1]);
            let outline = with_wood(design, wing, at, |curve, shape| moved_out(curve, shape, clearance))?;
            Ok(CradleSection { at, outline })
        })
        .collect::<Result<Vec<_>, PackError>>()?;
    let failed = |source| PackError::Shape { at: middle, source };
    let cradle =
        Cradle::under(&sections, face, board, design.masks.wall.mm(), bed(design)).map_err(failed)?;
    let mut fit = Fit { least: f64::INFINITY, greatest: 0.0 };
    for i in 0..TRIALS {
        let at = span[0] + length * (i as f64 + 0.37) / TRIALS as f64;
        let here = with_wood(design, wing, at, |curve, shape| {
            let placed = shape.to_foil();
            let outline: Vec<Point> = points_along(curve).into_iter().map(|p| placed * p).collect();
            Ok(lay_in_cradle(&outline, at, face, board, &cradle))
        })?;
        fit = Fit { least: fit.least.min(here.least), greatest: fit.greatest.max(here.greatest) };
    }
    Ok(StationCradle { face, span, cradle, fit })
}

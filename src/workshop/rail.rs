//! Printed rails: plates at the ends of the wood over which a straight edge or a router sled runs.

use super::Half;
use super::cradle::{facing, on_board};
use super::plate::{End, PlatePiece, Strip, numbered, parted_on_bed};
use crate::geometry::{ArcPath, GeometryError, Point, Solid, Vec2};

/// How rails are made, millimetres.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct RailSettings {
    /// Height of the board in the foil's axes, below the lower face or above the upper one.
    pub board: f64,
    /// Width of the rims ahead and behind, which carry a tool before it reaches the wood.
    pub wall: f64,
    /// Thickness along the span.
    pub thickness: f64,
    /// The printer's bed less its margin.
    pub bed: [f64; 2],
}

/// Length and width of a tick and its distance from the edge, mm.
const TICK: [f64; 3] = [5.0, 0.8, 1.2];
/// What a tick keeps from the end of a piece, mm.
const TICK_RIM: f64 = 5.0;

/// The rail for working a face at one place of the span. It stands on the board by its flat side.
///
/// `outline`: the part's outline there, in the foil's axes, moved out by what the tool stands above it.
/// `ticks`: places on that outline over points of the part that lie on one straight line of the loft with
/// those of the other rails, each with the direction out of the part: marked below the edge.
///
/// # Errors
/// When its plate cannot be made.
pub fn rail(
    outline: &ArcPath,
    face: Half,
    ticks: &[(Point, Vec2)],
    label: &str,
    settings: RailSettings,
) -> Result<Vec<PlatePiece>, GeometryError> {
    // The face that is worked looks up, away from the board.
    let away = if face == Half::Upper { Half::Lower } else { Half::Upper };
    let flat = |p: Point| {
        let [x, _, z] = on_board(p, 0.0, away, settings.board);
        Point::new(x, z)
    };
    let edge: Vec<Point> = facing(outline, face).into_iter().map(flat).collect();
    let (Some(first), Some(last)) = (edge.first(), edge.last()) else {
        return Err(GeometryError::Offset { distance: 0.0, pieces: 0 });
    };
    let sides = [End::Plain(first.x - settings.wall), End::Plain(last.x + settings.wall)];
    let marks: Vec<Vec<Point>> =
        ticks.iter().map(|&(at, out)| tick(flat(at), flat(at + out) - flat(at))).collect();
    parted_on_bed(sides, settings.wall, settings.bed, |number, ends| {
        let strip = Strip { half: Half::Lower, edge: &edge, far: 0.0, wall: settings.wall, ends };
        let [left, right] = ends.map(End::x);
        let mut pockets = strip.letters(&numbered(label, number));
        let is_labelled = !pockets.is_empty();
        let here = |mark: &&Vec<Point>| mark.iter().all(|p| p.x > left + TICK_RIM && p.x < right - TICK_RIM);
        pockets.extend(marks.iter().filter(here).cloned());
        let depth = Strip::engraved(settings.thickness);
        let solid = Solid::engraved(&strip.face(&[]), settings.thickness, &pockets, depth)?;
        Ok(PlatePiece { number, is_labelled, solid })
    })
}

/// A tick below a place on the edge, along the direction out of the part.
fn tick(at: Point, out: Vec2) -> Vec<Point> {
    let [length, width, below] = TICK;
    let across = 0.5 * width * out.turn_90();
    let (top, foot) = (at - below * out, at - (below + length) * out);
    vec![top - across, top + across, foot + across, foot - across]
}

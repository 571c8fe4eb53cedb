//! Checks of what the workshop is handed: masks that close and print, pieces that lie on the stock.

use super::Check;
use super::aids::{Aids, StationAids, StationMask};
use super::checks::place;
use crate::design::Design;
use crate::geometry::{Rect, Solid, rectangle_fits};
use crate::workshop::{Drawing, Role};

/// How true a mask closes on its part, mm: what the printer's tolerance and single precision may take.
const CLOSES_WITHIN: f64 = 0.05;
/// The thinnest wall that prints soundly, mm: three lines of a nozzle of 0.4 mm. Common practice, no
/// source.
const LEAST_WALL: f64 = 1.2;
/// How far a facet may lean out over free air without support, degrees from upright. Common practice,
/// no source.
const OVERHANG: f64 = 45.0;

/// Sides of a cut shorter than this bound no wall, mm.
const SHORTEST_SIDE: f64 = 0.4;

pub(super) fn all(design: &Design, aids: &Aids<'_>) -> Vec<Check> {
    let Aids { stations, pattern, .. } = aids;
    let mut checks = Vec::new();
    checks.extend(stations.iter().flat_map(|station| fits(design, station)));
    checks.extend(stations.iter().flat_map(|station| printer(design, station)));
    checks.push(stock(design, "planform pattern", pattern));
    checks.extend(stations.iter().map(|s| stock(design, &place(s.shape.at), &s.template)));
    checks
}

/// The pieces of each mask, closed on its part, must keep the clearance all round.
fn fits<'a>(design: &'a Design, station: &'a StationAids<'_>) -> impl Iterator<Item = Check> + 'a {
    let clearance = design.masks.clearance.mm();
    station.masks.iter().flat_map(move |StationMask { part, fit, .. }| {
        let told = format!(
            "closed on {} it leaves a gap of {:.3} to {:.3} mm",
            part.words(),
            fit.least,
            fit.greatest
        );
        let check = |name: &str, value: f64, limit: f64, passed: bool| Check {
            name: name.to_owned(),
            place: format!("{}, {}", place(station.shape.at), part.words()),
            value,
            limit,
            unit: "mm".to_owned(),
            passed,
            why: if passed {
                told.clone()
            } else {
                format!("{told}: ask for another clearance or a thicker wall")
            },
        };
        let (least, greatest) = (clearance - CLOSES_WITHIN, clearance + CLOSES_WITHIN);
        [
            check("least gap of the closed mask", fit.least, least, fit.least >= least),
            check("greatest gap of the closed mask", fit.greatest, greatest, fit.greatest <= greatest),
        ]
    })
}

/// Each piece of a mask must lie on the bed, turned as it may be, not stand too high, and print without
/// support and with sound walls.
fn printer<'a>(design: &'a Design, station: &'a StationAids<'_>) -> impl Iterator<Item = Check> + 'a {
    let pieces =
        station.masks.iter().flat_map(|mask| mask.mask.pieces.iter().map(move |piece| (mask.part, piece)));
    pieces.flat_map(move |(part, piece)| {
        let place = format!("{}, {}, {} half", place(station.shape.at), part.words(), piece.name());
        [on_the_bed(design, &place, &piece.solid), walls(&place, &piece.solid)]
    })
}

/// A printed piece must lie on the bed.
fn on_the_bed(design: &Design, place: &str, solid: &Solid) -> Check {
    let bed = design.printer.bed().map(|side| side.mm());
    let height = design.printer.bed_z.mm();
    let [x, y, z] = solid.size();
    let size = format!("{x:.2} by {y:.2} by {z:.2} mm");
    let room = format!("{:.2} by {:.2} by {height:.2} mm, the bed less its margin", bed[0], bed[1]);
    let flat = rectangle_fits([x, y], bed);
    let low = z <= height;
    // What is told is what fails, and the length of the piece when nothing does.
    let (value, limit) = if low { (x.max(y), bed[0].max(bed[1])) } else { (z, height) };
    Check {
        name: "printed piece fits the bed".to_owned(),
        place: place.to_owned(),
        value,
        limit,
        unit: "mm".to_owned(),
        passed: flat && low,
        why: match (low, flat) {
            (true, true) => format!("{size} lies on {room}"),
            (false, _) => format!("{size} is higher than {room}: make the masks thinner"),
            (true, false) => format!(
                "{size} is larger than {room}, turned any way: take a larger bed, thinner walls or a shorter chord"
            ),
        },
    }
}

/// A printed piece must have sound walls, and nothing that hangs over free air.
fn walls(place: &str, solid: &Solid) -> Check {
    let wall = solid.least_wall(0.5 * solid.size()[2], SHORTEST_SIDE);
    let overhang = solid.overhang().to_degrees();
    let hangs = overhang > OVERHANG;
    let passed = wall >= LEAST_WALL && !hangs;
    Check {
        name: if hangs { "printed piece hangs over" } else { "walls of the printed piece" }.to_owned(),
        place: place.to_owned(),
        value: if hangs { overhang } else { wall },
        limit: if hangs { OVERHANG } else { LEAST_WALL },
        unit: if hangs { "°" } else { "mm" }.to_owned(),
        passed,
        why: match (hangs, passed) {
            (true, _) => "print it with support there".to_owned(),
            (_, true) => format!(
                "thinnest wall, pegs and sockets included; nothing leans out by more than {overhang:.0}°"
            ),
            (_, false) => "too thin to print soundly: ask for a wider wall under [masks]".to_owned(),
        },
    }
}

/// What is cut must lie on the stock sheet, either way round.
fn stock(design: &Design, place: &str, drawing: &Drawing) -> Check {
    let margin = 2.0 * design.stock.margin.mm();
    let sheet = [design.stock.length, design.stock.width].map(|side| side.mm() - margin);
    let cut = drawing.lines.iter().filter(|line| line.role == Role::CutOutside);
    let size = cut.map(|line| line.path.bounds()).reduce(|a, b| a.union(b)).unwrap_or(Rect::ZERO).size();
    let passed = rectangle_fits([size.width, size.height], sheet);
    Check {
        name: "template fits the stock sheet".to_owned(),
        place: place.to_owned(),
        value: size.width.max(size.height),
        limit: sheet[0].max(sheet[1]),
        unit: "mm".to_owned(),
        passed,
        why: if passed {
            format!("{:.1} by {:.1} mm lies within the sheet less its margin", size.width, size.height)
        } else {
            format!(
                "{:.1} by {:.1} mm does not go on {:.0} by {:.0} mm: take a larger sheet or join two",
                size.width, size.height, sheet[0], sheet[1]
            )
        },
    }
}

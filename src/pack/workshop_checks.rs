//! Checks of what the workshop is handed: masks that close and print, pieces that lie on the stock.

use super::Check;
use super::aids::Aids;
use super::cut_pieces::CutPiece;
use super::printed::{Bench, StationMask};
use super::station::{StationAids, place};
use crate::design::{CutKind, Design};
use crate::geometry::{Rect, Solid, rectangle_fits};
use crate::workshop::{Drawing, Fit, Layout, Role, tightest_inside};

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
    let Aids { stations, pattern, cut, layout, bench, .. } = aids;
    let mut checks = Vec::new();
    checks.extend(stations.iter().flat_map(|station| fits(design, station)));
    checks.extend(stations.iter().flat_map(|station| printer(design, station)));
    checks.extend(bench.cradles.iter().flat_map(|cradle| {
        let [from, to] = cradle.span.map(|at| crate::units::number(at, 1));
        let place = format!("cradle {from} to {to} mm, {} face", cradle.face.word());
        gaps(design, &place, "the wood", "lies in its cradle", &cradle.fit)
    }));
    checks.extend(bench_pieces(design, bench));
    checks.extend(cut.iter().map(|piece| stock(design, piece, layout)));
    checks.extend(slots(design));
    let wood = stations.iter().flat_map(|station| {
        station
            .wood
            .templates
            .iter()
            .map(|(_, ending, drawing)| (format!("{}, {ending}", place(station.shape.at)), drawing))
    });
    let drawings = wood.chain([("planform pattern".to_owned(), pattern)]);
    checks.extend(drawings.filter_map(|(place, drawing)| hollow(design, &place, drawing)));
    checks
}

/// The pieces of each mask, closed on its part, must keep the clearance all round.
fn fits<'a>(design: &'a Design, station: &'a StationAids<'_>) -> impl Iterator<Item = Check> + 'a {
    station.masks.iter().flat_map(move |StationMask { part, fit, .. }| {
        let place = format!("{}, {}", place(station.shape.at), part.words());
        gaps(design, &place, "the mask", &format!("closes on {}", part.words()), fit)
    })
}

/// A printed piece must keep the clearance from its part, everywhere and no more.
fn gaps(design: &Design, place: &str, what: &str, how: &str, fit: &Fit) -> [Check; 2] {
    let clearance = design.masks.clearance.mm();
    let told = format!("{what} {how} with gaps of {:.3} to {:.3} mm", fit.least, fit.greatest);
    let check = |name: String, value: f64, limit: f64, passed: bool| Check {
        name,
        place: place.to_owned(),
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
        check(format!("least gap when {what} {how}"), fit.least, least, fit.least >= least),
        check(format!("greatest gap when {what} {how}"), fit.greatest, greatest, fit.greatest <= greatest),
    ]
}

/// Cradles and rails must lie on the bed and print soundly.
fn bench_pieces<'a>(design: &'a Design, bench: &'a Bench) -> impl Iterator<Item = Check> + 'a {
    bench
        .pieces()
        .flat_map(|(_, _, _, words, solid)| [on_the_bed(design, &words, solid), walls(&words, solid)])
}

/// Each piece of a mask must lie on the bed, turned as it may be, not stand too high, and print without
/// support and with sound walls.
fn printer<'a>(design: &'a Design, station: &'a StationAids<'_>) -> impl Iterator<Item = Check> + 'a {
    let pieces =
        station.masks.iter().flat_map(|mask| mask.mask.pieces.iter().map(move |piece| (mask.part, piece)));
    pieces.flat_map(move |(part, piece)| {
        let place = format!("{}, {}, {} half", place(station.shape.at), part.words(), piece.name());
        [on_the_bed(design, &place, &piece.plate.solid), walls(&place, &piece.plate.solid)]
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

/// What is cut must lie on a sheet of the stock, the way the grain asks.
fn stock(design: &Design, piece: &CutPiece, layout: &Layout) -> Check {
    let sheet =
        [design.stock.length, design.stock.width].map(|side| side.mm() - 2.0 * design.stock.margin.mm());
    let cut = piece.drawing.lines.iter().filter(|line| line.role == Role::CutOutside);
    let size = cut.map(|line| line.path.bounds()).reduce(|a, b| a.union(b)).unwrap_or(Rect::ZERO).size();
    let passed = !layout.too_large.contains(&piece.name);
    let is_too_long = size.width > sheet[0];
    Check {
        name: "template fits the stock sheet".to_owned(),
        place: piece.name.clone(),
        value: if passed || is_too_long { size.width } else { size.height },
        limit: if passed || is_too_long { sheet[0] } else { sheet[1] },
        unit: "mm".to_owned(),
        passed,
        why: if passed {
            format!("{:.1} by {:.1} mm lies within the sheet less its margin", size.width, size.height)
        } else {
            format!(
                "{:.1} by {:.1} mm, its name and its marks do not go on {:.0} by {:.0} mm: take a larger sheet, join two{}",
                size.width,
                size.height,
                sheet[0],
                sheet[1],
                if design.stock.may_turn { "" } else { ", or write grain = \"any\" to let it be turned" }
            )
        },
    }
}

/// The cutter must go into every slot.
fn slots(design: &Design) -> impl Iterator<Item = Check> + '_ {
    let slots = design.cuts.iter().filter(|cut| cut.kind == CutKind::Slot);
    slots.map(|cut| {
        let (width, cutter) = (cut.width, design.router.cutter);
        let passed = width.mm() >= cutter.mm();
        Check {
            name: "the cutter goes into the slot".to_owned(),
            place: cut.purpose.clone(),
            value: width.mm(),
            limit: cutter.mm(),
            unit: "mm".to_owned(),
            passed,
            why: if passed {
                format!("the slot is {width} wide, the cutter {cutter}")
            } else {
                format!("a cutter of {cutter} is wider than the slot of {width}: take a smaller one, or widen the slot")
            },
        }
    })
}

/// Inside radii wider than so many cutters are not told.
const WIDE: f64 = 2.0;

/// The cutter must follow every hollow of an outside contour; inner corners are told.
fn hollow(design: &Design, place: &str, drawing: &Drawing) -> Option<Check> {
    let cutter = design.router.cutter.mm();
    let outside = drawing.lines.iter().find(|line| line.role == Role::CutOutside)?;
    let inside = tightest_inside(&outside.path).filter(|inside| inside.radius < WIDE * cutter)?;
    let (radius, at) = (inside.radius, format!("at {:.1}, {:.1} mm", inside.at.x, inside.at.y));
    let is_corner = radius == 0.0;
    Some(Check {
        name: "the cutter follows the inside radius".to_owned(),
        place: place.to_owned(),
        value: radius,
        limit: if is_corner { 0.0 } else { 0.5 * cutter },
        unit: "mm".to_owned(),
        passed: is_corner || radius >= 0.5 * cutter,
        why: if is_corner {
            format!("an inner corner {at}, where the cutter leaves wood for the chisel")
        } else {
            format!("tightest inside radius, {at}: a cutter of more than twice that leaves wood there")
        },
    })
}

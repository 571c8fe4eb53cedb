//! Checks of the wood: cut-outs, the hinge's line, thickness.

use super::Check;
use super::wood::{Beside, CutFigure, HingeFigure, WoodFigures};
use crate::design::{CutKind, Design};
use crate::units::number;

/// Every one.
pub(super) fn all<'a>(design: &'a Design, figures: &'a WoodFigures<'_>) -> impl Iterator<Item = Check> + 'a {
    let hinge = figures.hinge.iter().flat_map(move |figure| hinge(design, figure));
    let thickest = figures.thickest.iter().map(move |(at, value)| thickest(design, *at, *value));
    figures.cuts.iter().map(cut).chain(hinge).chain(thickest)
}

fn place(at: f64) -> String {
    format!("{} mm from the root", number(at, 1))
}

/// Wood must be left beside every cut-out, all along it.
fn cut(figure: &CutFigure<'_>) -> Check {
    let limit = figure.cut.least_left.mm();
    let passed = figure.wood_left >= limit;
    let what = match figure.cut.kind {
        CutKind::Slot => "slot",
        CutKind::Bore => "bore",
        CutKind::Pocket => "pocket",
        CutKind::Hole => "hole",
    };
    let size = if figure.cut.kind == CutKind::Bore { "diameter" } else { "depth" };
    // Rounded down, so that the value named is one that does.
    let works = figure.works.map(|works| (works * 20.0).floor() / 20.0).filter(|works| *works > 0.0);
    let advice = match (works, figure.beside) {
        (Some(works), _) => format!("a {size} of {} mm would do", number(works, 2)),
        (None, Beside::Face) => {
            "no size of it would do: move it to where the section is thicker, or ask for less wood beside it"
                .to_owned()
        }
        (None, _) => {
            format!("move it {} mm further away", number((limit - figure.wood_left).max(0.0).ceil(), 0))
        }
    };
    let why = match figure.beside {
        _ if passed => {
            "least distance from it to another face of the wood, the hinge or another cut".to_owned()
        }
        Beside::Face if figure.wood_left <= 0.0 => {
            format!("the {what} breaks through the other face: {advice}")
        }
        Beside::Face => format!("too little wood to another face: {advice}"),
        Beside::Hinge if figure.wood_left <= 0.0 => format!("the {what} runs into the hinge: {advice}"),
        Beside::Hinge => format!("too little wood to the hinge: {advice}"),
        Beside::Cut(other) if figure.wood_left <= 0.0 => {
            format!("the {what} runs into that for {}: {advice}", other.purpose)
        }
        Beside::Cut(other) => format!("too little wood to that for {}: {advice}", other.purpose),
    };
    Check {
        name: "wood is left beside the cut".to_owned(),
        place: format!("{}, {}", place(figure.at), figure.cut.purpose),
        value: figure.wood_left,
        limit,
        unit: "mm".to_owned(),
        passed,
        why,
    }
}

/// A flap turns about a straight line, and its ends must not rub.
fn hinge(design: &Design, figure: &HingeFigure) -> Vec<Check> {
    let limit = design.flap.map_or(0.0, |flap| flap.clearance.mm());
    let (at, bow) = figure.bow;
    let passed = bow <= limit;
    let straight = Check {
        name: "the hinge line is straight".to_owned(),
        place: place(at),
        value: bow,
        limit,
        unit: "mm".to_owned(),
        passed,
        why: if passed {
            "furthest from the line through both ends of the flap, in height and along the chord; the gaps are taken about that line"
                .to_owned()
        } else {
            "a flap does not turn about a bent line: give the hinge as a length from a straight edge, part the flap there, \
             or set the sweep of the station between so that the hinge runs straight"
                .to_owned()
        },
    };
    let end = figure.end_gap.map(|(gap, at)| Check {
        name: "the flap's ends run free".to_owned(),
        place: place(at),
        value: gap,
        limit: 0.0,
        unit: "mm".to_owned(),
        passed: gap > 0.0,
        why: if gap > 0.0 {
            format!("least gap at an end of the flap over its travel; at rest it is the clearance of {limit} mm")
        } else {
            format!(
                "the hinge line leans, and carries the end towards the wood beside it: a clearance of {:.1} mm would do",
                (10.0 * (limit - gap)).ceil() / 10.0 + 0.1
            )
        },
    });
    std::iter::once(straight).chain(end).collect()
}

/// The core must somewhere be as thick as the shop can shape.
fn thickest(design: &Design, at: f64, value: f64) -> Check {
    let limit = design.laminate.least_wood.mm();
    let passed = value >= limit;
    Check {
        name: "the core is as thick as the shop can shape".to_owned(),
        place: format!("station {} mm", number(at, 3)),
        value,
        limit,
        unit: "mm".to_owned(),
        passed,
        why: if passed {
            "greatest thickness of the wood; the sheet says behind which place it is thinner than least-wood"
                .to_owned()
        } else {
            "take fewer plies or a thicker section there, or end the foil where the chord is longer"
                .to_owned()
        },
    }
}

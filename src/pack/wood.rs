//! What the wood is held to besides its templates: cut-outs all along, the hinge's line, fairness.

use super::PackError;
use super::station::StationAids;
use crate::design::{Cut, CutKind, Design};
use crate::geometry::{ArcPath, ArcVertex, Point, Vec2};
use crate::parts::{Core, CutShape, HingeAxis, split};
use crate::wing::{Planform, StationShape, Wing};
use crate::workshop::{PlanMark, Role};

/// All of it.
pub(super) struct WoodFigures<'a> {
    pub(super) cuts: Vec<CutFigure<'a>>,
    pub(super) hinge: Option<HingeFigure>,
    /// Greatest thickness of the core at each template station, where there is a skin.
    pub(super) thickest: Vec<(f64, f64)>,
}

/// A cut-out where it leaves the least wood.
pub(super) struct CutFigure<'a> {
    pub(super) cut: &'a Cut,
    /// Where that is, mm from the root.
    pub(super) at: f64,
    pub(super) wood_left: f64,
    /// What is next to it there.
    pub(super) beside: Beside<'a>,
    /// The largest depth or diameter there that leaves enough, where less of it helps.
    pub(super) works: Option<f64>,
}

/// What stands next to a cut-out.
#[derive(Clone, Copy)]
pub(super) enum Beside<'a> {
    /// Another face of the wood.
    Face,
    /// The faces at the flap's hinge.
    Hinge,
    /// Another cut-out.
    Cut(&'a Cut),
}

/// The line of a hinge.
pub(super) struct HingeFigure {
    pub(super) axis: HingeAxis,
    /// Where its places lie furthest from a straight line, mm from the root, and how far, mm.
    pub(super) bow: (f64, f64),
    /// Least gap at the ends of the flap over the travel, mm, and which end, mm from the root.
    pub(super) end_gap: Option<(f64, f64)>,
}

/// Places along a hinge at which it is looked at, besides the stations.
const ALONG: usize = 8;

impl<'a> WoodFigures<'a> {
    pub(super) fn of(design: &'a Design, wing: &Wing) -> Result<Self, PackError> {
        let mut thickest = Vec::new();
        if design.has_skin() {
            let skin = design.skin();
            for at in design.templates.iter().map(|at| at.mm()) {
                thickest.push((at, Core::of(&wing.shape_at(at)?, &skin)?.thickest()));
            }
        }
        let cuts: Result<_, PackError> =
            design.cuts.iter().map(|cut| cut_figure(design, wing, cut)).collect();
        Ok(Self { cuts: cuts?, hinge: hinge_figure(design, wing)?, thickest })
    }
}

/// Looks at a cut-out at both ends, in the middle and at every template station that it passes.
fn cut_figure<'a>(design: &'a Design, wing: &Wing, cut: &'a Cut) -> Result<CutFigure<'a>, PackError> {
    let (from, to) = (cut.from.mm(), cut.to.mm());
    let middle = 0.5 * (from + to);
    // A hole is widest in its middle, and of no width at its ends.
    let mut places = if cut.kind == CutKind::Hole { vec![middle] } else { vec![from, middle, to] };
    places.extend(design.templates.iter().map(|at| at.mm()).filter(|at| from < *at && *at < to));
    let mut worst: Option<CutFigure<'a>> = None;
    for at in places {
        let here = cut_at(design, wing, cut, at)?;
        if worst.as_ref().is_none_or(|known| here.wood_left < known.wood_left) {
            worst = Some(here);
        }
    }
    Ok(worst.unwrap_or(CutFigure {
        cut,
        at: from,
        wood_left: f64::NEG_INFINITY,
        beside: Beside::Face,
        works: None,
    }))
}

fn cut_at<'a>(design: &'a Design, wing: &Wing, cut: &'a Cut, at: f64) -> Result<CutFigure<'a>, PackError> {
    let (shape, skin) = (wing.shape_at(at)?, design.skin());
    let core = Core::of(&shape, &skin)?;
    let Some(own) = cut.at_station(at) else {
        return Ok(CutFigure { cut, at, wood_left: f64::INFINITY, beside: Beside::Face, works: None });
    };
    let made = own.of(&core);
    let mut nearest = (made.wood_left, Beside::Face);
    // A bolt may well go through the bottom of a pocket.
    let may_meet = |other: &Cut| {
        matches!((cut.kind, other.kind), (CutKind::Hole, CutKind::Pocket) | (CutKind::Pocket, CutKind::Hole))
    };
    for (other, shape) in design.cuts_at(at) {
        if std::ptr::eq(other, cut) || may_meet(other) {
            continue;
        }
        let gap = distance(&made, &shape.of(&core));
        if gap < nearest.0 {
            nearest = (gap, Beside::Cut(other));
        }
    }
    if let Some(hinge) = design.hinge_at(at, shape.chord) {
        let split = split(&core, &hinge, design.router.tolerance.mm())?;
        for face in &split.faces {
            // There and back, so that no side is added between its ends.
            let line: Vec<Point> = face.iter().chain(face.iter().rev()).copied().collect();
            let gap = made.distance(&line);
            if gap < nearest.0 {
                nearest = (gap, Beside::Hinge);
            }
        }
    }
    let (wood_left, beside) = nearest;
    let wanted = cut.least_left.mm();
    let is_short = wood_left < wanted && matches!(beside, Beside::Face);
    let works = is_short.then(|| own.largest(&core, wanted)).flatten();
    Ok(CutFigure { cut, at, wood_left, beside, works })
}

fn distance(a: &CutShape, b: &CutShape) -> f64 {
    a.distance(&b.outline.flattened(1e-3))
}

fn hinge_figure(design: &Design, wing: &Wing) -> Result<Option<HingeFigure>, PackError> {
    let (Some(line), Some(flap), Some([first, last])) =
        (design.hinge_line(), design.flap, design.flap_span())
    else {
        return Ok(None);
    };
    let skin = design.skin();
    let place = |at: f64| -> Result<Option<Point>, PackError> {
        let shape = wing.shape_at(at)?;
        let hinge = design.hinge_at(at, shape.chord);
        Ok(hinge.map(|hinge| shape.to_foil() * hinge.axis(&shape, &skin)))
    };
    let (Some(inner), Some(outer)) = (place(line.from)?, place(line.to)?) else { return Ok(None) };
    let axis = HingeAxis { ends: [(line.from, inner), (line.to, outer)] };
    let mut places: Vec<f64> =
        (1..ALONG).map(|i| line.from + (line.to - line.from) * i as f64 / ALONG as f64).collect();
    places.extend(wing.stations().iter().map(|s| s.at).filter(|at| line.from < *at && *at < line.to));
    let mut bow = (line.from, 0.0);
    for at in places {
        let off = place(at)?.map_or(0.0, |point| point.distance(axis.at(at)));
        if off > bow.1 {
            bow = (at, off);
        }
    }
    let mut end_gap: Option<(f64, f64)> = None;
    for (at, gap) in
        [(first, first - line.from), (last, line.to - last)].into_iter().filter(|end| end.1 > 0.0)
    {
        let shape = wing.shape_at(at)?;
        let core = Core::of(&shape, &skin)?;
        let Some(hinge) = design.hinge_at(at, shape.chord) else { continue };
        let parts = split(&core, &hinge, design.router.tolerance.mm())?;
        let placed = shape.to_foil();
        let points: Vec<Point> =
            parts.flap.finished.flattened(0.05).into_iter().map(|p| placed * p).collect();
        let left = gap - axis.sway(at, &points, flap.up.radians(), flap.down.radians());
        if end_gap.is_none_or(|known| left < known.0) {
            end_gap = Some((left, at));
        }
    }
    Ok(Some(HingeFigure { axis, bow, end_gap }))
}

/// Takes the gaps of every station's flap about the straight line that it really turns about.
pub(super) fn turn_about_the_line(design: &Design, axis: &HingeAxis, stations: &mut [StationAids<'_>]) {
    for station in stations {
        let pivot = |shape: &StationShape<'_>| shape.to_foil().inverse() * axis.at(shape.at);
        let hinge = design.hinge_at(station.shape.at, station.shape.chord);
        if let (Some(parts), Some(hinge)) = (station.wood.split.take(), hinge) {
            station.wood.split = Some(parts.turned_about(pivot(&station.shape), &hinge));
        }
    }
}

/// What is marked on the planform: cut-outs, the ends of the flap, the case and the water.
pub(super) fn plan_marks(design: &Design, wing: &Wing, planform: &Planform) -> Vec<PlanMark> {
    let mut marks: Vec<PlanMark> = design.cuts.iter().map(|cut| cut_mark(cut, wing, planform)).collect();
    let across = |at: f64, from: f64, beyond: f64| {
        let back = planform.edges(at).1;
        ArcPath::line(Point::new(at, from), Point::new(at, back + beyond))
    };
    if let (Some(line), Some(flap)) = (design.hinge_line(), design.flap_span()) {
        for at in flap.into_iter().chain([line.from, line.to]) {
            let (front, back) = planform.edges(at);
            let path = across(at, front + line.x_at(at, back - front), 0.0);
            marks.push(PlanMark::new(path, String::new()));
        }
    }
    let levels = [("case ends", design.in_case.mm()), ("waterline", design.waterline.mm())];
    for (i, (name, at)) in levels.into_iter().enumerate() {
        // Where both lie together the first says enough.
        if at > 0.0 && at < wing.reach() && (i == 0 || at > levels[0].1) {
            let path = across(at, planform.edges(at).0 - LEVEL_OVERRUN, LEVEL_OVERRUN);
            let words = format!("{name}, {} mm", crate::units::number(at, 1));
            marks.push(PlanMark::new(path, words));
        }
    }
    marks
}

/// How far a line across runs past the planform, mm.
const LEVEL_OVERRUN: f64 = 12.0;

/// The face that a cut-out opens, in words.
pub(super) fn opens(cut: &Cut) -> &'static str {
    match (cut.kind, cut.from_upper) {
        (CutKind::Bore, _) => "inside",
        (CutKind::Hole, _) if cut.depth.mm() <= 0.0 => "through",
        (_, true) => "upper face",
        (_, false) => "lower face",
    }
}

fn cut_mark(cut: &Cut, wing: &Wing, planform: &Planform) -> PlanMark {
    let (from, to) = (cut.from.mm(), cut.to.mm());
    let words = format!("{}, {}", cut.purpose, opens(cut));
    if cut.kind == CutKind::Hole {
        let (middle, radius) = (0.5 * (from + to), 0.5 * cut.width.mm());
        let (front, back) = planform.edges(middle);
        let centre = Point::new(middle, front + cut.at * (back - front));
        let ends = [centre + Vec2::new(radius, 0.0), centre - Vec2::new(radius, 0.0)];
        let circle = ArcPath::new(ends.map(|point| ArcVertex { point, bulge: 1.0 }).to_vec(), true);
        let mark = PlanMark::new(circle, words);
        return if cut.depth.mm() <= 0.0 { mark.cut(Role::CutInside) } else { seen_from_above(cut, mark) };
    }
    let mut places = wing.even_places();
    places.retain(|at| from < *at && *at < to);
    places.insert(0, from);
    places.push(to);
    let edge = |at: f64, end: usize| {
        let (front, back) = planform.edges(at);
        let x = match cut.chord {
            Some(chord) => chord[end] * (back - front),
            None => cut.at * (back - front) + (end as f64 - 0.5) * cut.width.mm(),
        };
        Point::new(at, front + x)
    };
    let ahead = places.iter().map(|&at| edge(at, 0));
    let behind = places.iter().rev().map(|&at| edge(at, 1));
    let mark = PlanMark::new(ArcPath::polyline(ahead.chain(behind), true), words);
    if cut.kind == CutKind::Bore { mark } else { seen_from_above(cut, mark) }
}

/// A pocket of its depth where it is sunk from above; what is sunk from below is marked alone.
fn seen_from_above(cut: &Cut, mark: PlanMark) -> PlanMark {
    if cut.from_upper { mark.cut(Role::pocket(cut.depth.mm())) } else { mark }
}

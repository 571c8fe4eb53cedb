//! Templates of the stations and the pattern of the planform.

use super::{Drawing, Label, Role, Stamp};
use crate::geometry::{ArcPath, Point, polygon};
use crate::parts::HingeLine;
use crate::units::number;
use crate::wing::{Planform, StationShape};

/// Height of capitals in the labels of a template, mm: read at arm's length.
const LETTERS: f64 = 4.0;
/// A turn below this needs no level line of its own, radians: 0.01 mm over 100 mm.
const LEVEL: f64 = 1e-4;
/// Height of capitals beside a line, mm.
const SMALL: f64 = 2.8;
/// Base line to base line, mm.
const LINE_STEP: f64 = 7.0;
/// From an outline to the first label, mm.
const GAP: f64 = 6.0;
/// How far a reference line runs past the shape, mm.
const OVERRUN: f64 = 5.0;

/// The template of one station: its outline, chord line, hinge line and what it is.
/// Nose at the origin, trailing edge along x.
///
/// `outline`: the finished surface, followed with arcs.
/// `level`: whether the foil lies level; an upright one is seen from above.
#[must_use]
pub fn station_template(
    stamp: &Stamp,
    shape: &StationShape<'_>,
    outline: &ArcPath,
    hinge: Option<&HingeLine>,
    level: bool,
) -> Drawing {
    let bounds = outline.bounds();
    let mut drawing = Drawing::new(format!("{stamp}, station {} mm", number(shape.at, 2)));
    drawing.add(Role::CutOutside, outline.clone());
    let chord_line = ArcPath::line(Point::new(-OVERRUN, 0.0), Point::new(shape.chord + OVERRUN, 0.0));
    drawing.add(Role::Reference, chord_line);

    let (low, high) = (bounds.y0 - OVERRUN, bounds.y1 + OVERRUN);
    if shape.twist.abs() > LEVEL {
        let (front, back) = shape.level_line(4.0 * OVERRUN, 4.0 * OVERRUN);
        drawing.add(Role::Reference, ArcPath::line(front, back));
        drawing.write(Role::Label, Point::new(back.x + 1.0, back.y - 0.5 * SMALL), SMALL, "level");
    }
    if let Some(hinge) = hinge.filter(|hinge| hinge.reaches(shape.at)) {
        let x = hinge.x_at(shape.at, shape.chord);
        drawing.add(Role::Reference, ArcPath::line(Point::new(x, low), Point::new(x, high)));
        drawing.write(Role::Label, Point::new(x + 1.0, high + 1.0), SMALL, "hinge line");
    }
    let words = [
        stamp.to_string(),
        format!("station {} mm from the root", number(shape.at, 2)),
        format!("{}, chord {:.2} mm, twist {}", shape.section_name(), shape.chord, turn(shape.twist)),
        seen(level).to_owned(),
    ];
    write_block(&mut drawing, Point::new(0.0, low - GAP), &words);
    drawing
}

/// Which side is up. With x aft and the span's axis away from the eye, what stands upright in the
/// drawing is the boat's up for a level foil and its starboard side for an upright one.
fn seen(level: bool) -> &'static str {
    if level { "seen facing starboard: upper side up" } else { "seen from above: starboard side up" }
}

/// The template of a part at one station: its own contour to cut, the finished outline for reference,
/// chord line and what it is.
#[must_use]
pub fn part_template(
    stamp: &Stamp,
    shape: &StationShape<'_>,
    finished: &ArcPath,
    level: bool,
    (name, part): (&str, &ArcPath),
    words: &[String],
) -> Drawing {
    let mut drawing = Drawing::new(format!("{stamp}, station {} mm, {name}", number(shape.at, 2)));
    drawing.add(Role::CutOutside, part.clone());
    drawing.add(Role::Reference, finished.clone());
    drawing.add(
        Role::Reference,
        ArcPath::line(Point::new(-OVERRUN, 0.0), Point::new(shape.chord + OVERRUN, 0.0)),
    );
    let mut lines = vec![stamp.to_string(), format!("station {} mm from the root", number(shape.at, 2))];
    lines.push(format!("{name}: the wood under the laminate, its grain along the span, out of this sheet"));
    lines.extend(words.iter().cloned());
    lines.push(seen(level).to_owned());
    lines.push("cut the full line; the broken one is the finished surface".to_owned());
    write_block(&mut drawing, Point::new(0.0, finished.bounds().y0 - OVERRUN - GAP), &lines);
    drawing
}

/// The pattern of the whole planform, with its stations and the hinge line.
///
/// Seen from above: the span runs along x and the leading edge is at the top.
#[must_use]
pub fn planform_pattern(
    stamp: &Stamp,
    planform: &Planform,
    stations: &[f64],
    hinge: Option<&HingeLine>,
) -> Drawing {
    let flip = |p: Point| Point::new(p.x, -p.y);
    let mut outline: Vec<Point> = planform.outline().into_iter().map(flip).collect();
    if polygon::area(&outline) < 0.0 {
        outline.reverse();
    }
    let path = ArcPath::polyline(outline, true);
    let bounds = path.bounds();
    let mut drawing = Drawing::new(format!("{stamp}, planform"));
    drawing.add(Role::CutOutside, path);

    // A picture of a wide pattern grows its letters to 1.2 % of its width.
    let crowded = (1.2 * SMALL).max(0.015 * planform.span());
    let sides: &[f64] = if planform.is_mirrored() { &[1.0, -1.0] } else { &[1.0] };
    for &side in sides {
        let mut labelled = f64::NEG_INFINITY;
        // The root's line is the same for both halves.
        for &at in stations.iter().filter(|&&at| side > 0.0 || at > 0.0) {
            let (front, back) = planform.edges(at);
            let place = |y: f64| Point::new(side * at, -y);
            drawing.add(Role::Reference, ArcPath::line(place(front - OVERRUN), place(back + OVERRUN)));
            // Of words that would run into each other only the first is written, but always that of the end.
            let is_last = stations.last() == Some(&at);
            let room = |other: f64| (at - other).abs() >= crowded;
            let is_free = is_last || room(labelled) && stations.last().is_some_and(|last| room(*last));
            if !is_free {
                continue;
            }
            labelled = at;
            // Upright, so that the words of near stations stay apart.
            drawing.labels.push(Label {
                role: Role::Label,
                at: place(front - OVERRUN - 2.0),
                height: SMALL,
                turn: std::f64::consts::FRAC_PI_2,
                text: number(at, 2),
            });
        }
        if let Some(hinge) = hinge {
            let corners = planform.leading.iter().map(|corner| corner.x);
            let bends = corners.filter(|&at| hinge.from < at && at < hinge.to);
            let line = std::iter::once(hinge.from).chain(bends).chain([hinge.to]).map(|at| {
                let (front, back) = planform.edges(at);
                Point::new(side * at, -(front + hinge.x_at(at, back - front)))
            });
            drawing.add(Role::Reference, ArcPath::polyline(line, false));
        }
    }
    grain_arrow(&mut drawing, planform);
    let words = [
        stamp.to_string(),
        format!("planform, span {} mm, leading edge up, seen from above", number(planform.span(), 2)),
        format!("area {:.1} cm²; distances from the root in mm", planform.area() / 100.0),
        hinge.map_or(String::new(), |hinge| {
            let (from, to) = (number(hinge.from, 2), number(hinge.to, 2));
            format!("hinge line at {}, {from} to {to} mm", hinge.words())
        }),
    ];
    write_block(&mut drawing, Point::new(bounds.x0, bounds.y0 - OVERRUN - GAP), &words);
    drawing
}

/// An arrow along the span, which is where the grain runs.
fn grain_arrow(drawing: &mut Drawing, planform: &Planform) {
    let reach = planform.leading.last().map_or(0.0, |corner| corner.x);
    let (from, to) = (0.12 * reach, 0.12 * reach + (0.2 * reach).min(80.0));
    let (front, back) = planform.edges(to);
    let y = -(front + 0.88 * (back - front));
    let (start, tip) = (Point::new(from, y), Point::new(to, y));
    let barb = 0.08 * (to - from);
    drawing.add(Role::Reference, ArcPath::line(start, tip));
    let barbs = [Point::new(to - 2.0 * barb, y + barb), tip, Point::new(to - 2.0 * barb, y - barb)];
    drawing.add(Role::Reference, ArcPath::polyline(barbs, false));
    drawing.write(Role::Label, Point::new(from, y + 1.5), SMALL, "grain");
}

fn write_block(drawing: &mut Drawing, top: Point, words: &[String]) {
    for (row, text) in words.iter().filter(|text| !text.is_empty()).enumerate() {
        let at = Point::new(top.x, top.y - LETTERS - row as f64 * LINE_STEP);
        drawing.write(Role::Caption, at, LETTERS, text);
    }
}

/// A twist in words: signed, to a hundredth of a degree, and plain nothing for none.
pub(crate) fn turn(radians: f64) -> String {
    let degrees = radians.to_degrees();
    if degrees.abs() < 0.005 { "0°".to_owned() } else { format!("{degrees:+.2}°") }
}

//! A piece's name engraved on it.

use super::{Drawing, Role, strokes};
use crate::geometry::{ArcPath, Point, Rect, polygon};

/// Heights of letters that are tried, mm; lower ones are not read through dust and paint.
const HEIGHTS: [f64; 4] = [6.0, 4.5, 3.5, 2.5];
/// What stays free between letters and any edge, mm.
const RIM: f64 = 1.0;
/// Places along a piece that are tried.
const PLACES: usize = 24;

/// Engraves the first of some texts that goes on the piece, as large as it goes. Whether one did.
pub fn engrave(drawing: &mut Drawing, texts: &[String]) -> bool {
    let Some(outline) = drawing.lines.iter().find(|line| line.role == Role::CutOutside) else { return false };
    let (bounds, edge) = (outline.path.bounds(), outline.path.flattened(0.05));
    let others = drawing.lines.iter().filter(|line| matches!(line.role, Role::CutInside | Role::Pocket(_)));
    let taken: Vec<Rect> = others.map(|line| line.path.bounds()).collect();
    for text in texts {
        for height in HEIGHTS {
            let width = strokes::width(text, height);
            let place = (0..=PLACES).find_map(|i| {
                // From the thick part of the section outwards.
                let share = 0.3 + if i % 2 == 0 { 1.0 } else { -1.0 } * 0.5 * i as f64 / PLACES as f64;
                let x = bounds.x0 + share * bounds.width() - 0.5 * width;
                let y = middle(&edge, x + 0.5 * width)? - 0.5 * height;
                let box_of = Rect::new(x, y, x + width, y + height).inflate(RIM, RIM);
                let is_free = taken.iter().all(|other| other.intersect(box_of).area() == 0.0);
                (is_free && lies_within(box_of, &edge)).then_some(Point::new(x, y))
            });
            if let Some(at) = place {
                for [from, to] in strokes::middle_lines(text, at, height) {
                    drawing.add(Role::Engrave, ArcPath::line(from, to));
                }
                return true;
            }
        }
    }
    false
}

/// Half way between the edges above and below a place.
fn middle(edge: &[Point], x: f64) -> Option<f64> {
    let sides = edge.iter().zip(edge.iter().cycle().skip(1));
    let crossings = sides
        .filter(|(a, b)| (a.x > x) != (b.x > x))
        .map(|(a, b)| a.y + (x - a.x) / (b.x - a.x) * (b.y - a.y));
    let (low, high) =
        crossings.fold((f64::INFINITY, f64::NEG_INFINITY), |(low, high), y| (low.min(y), high.max(y)));
    (high > low).then_some(0.5 * (low + high))
}

fn lies_within(rect: Rect, edge: &[Point]) -> bool {
    let corners = [(rect.x0, rect.y0), (rect.x1, rect.y0), (rect.x1, rect.y1), (rect.x0, rect.y1)];
    // No corner of the edge pokes in, and the rectangle itself lies inside.
    corners.iter().all(|&corner| polygon::contains(edge, corner.into()))
        && edge.iter().all(|point| !rect.contains(*point))
        && polygon::contains(edge, rect.center())
}

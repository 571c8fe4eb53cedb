//! A flap at its hinge: straight, all the way up and all the way down.

use super::{Drawing, Role};
use crate::geometry::{Affine, ArcPath, Point, Vec2};
use crate::parts::{Hinge, Split};

/// How much of the main body is shown ahead of the hinge, of the flap's own length.
const AHEAD: f64 = 0.5;
/// Width of the picture, mm, up to which it is magnified by whole numbers.
const WIDTH: f64 = 200.0;
/// Height of capitals, mm.
const LETTERS: f64 = 4.0;

/// Main body and flap with their laminate, magnified, under the finished outline of their station; the
/// flap's turned places are broken lines. They turn about the axis of this station.
#[must_use]
pub fn flap_picture(parts: &Split, template: &Drawing, hinge: &Hinge) -> Drawing {
    let pivot = parts.axis;
    let flap = parts.flap.finished.bounds();
    let ahead = AHEAD * flap.width();
    let times = (WIDTH / (ahead + flap.width())).floor().clamp(1.0, 10.0);
    let larger = Affine::scale(times) * Affine::translate(-pivot.to_vec2());
    let mut drawing = Drawing::new("flap at its hinge");
    let shown = |path: &ArcPath| {
        let cut = path.cut_by_line(Point::new(flap.x0 - ahead, 0.0), Vec2::new(1.0, 0.0));
        cut.unwrap_or_else(|_| path.clone()).transformed(larger)
    };
    let finished = template.lines.iter().find(|line| line.role == Role::CutOutside);
    // The skin that runs through lies between this and the pieces.
    if let Some(line) = finished {
        drawing.add(Role::Check, shown(&line.path));
    }
    drawing.add(Role::CutOutside, shown(&parts.main.finished));
    drawing.add(Role::CutOutside, parts.flap.finished.transformed(larger));
    for angle in [-hinge.up, hinge.down].into_iter().filter(|angle| *angle != 0.0) {
        let turned = parts.flap.finished.transformed(larger * Affine::rotate_about(-angle, pivot));
        drawing.add(Role::Reference, turned);
    }
    for arm in [Vec2::new(4.0, 0.0), Vec2::new(0.0, 4.0)] {
        drawing.add(Role::Check, ArcPath::line(Point::ORIGIN - arm, Point::ORIGIN + arm));
    }
    let low = drawing.bounds().y0;
    let left = drawing.bounds().x0;
    let degrees = |angle: f64| crate::units::number(angle.to_degrees(), 1);
    let mut words = vec![
        format!("{times} times full size; the cross is the axis"),
        format!("gap {:.2} mm at rest, {:.2} mm at the least", parts.gap_at_rest, parts.least_gap),
        format!("{:.2} mm at {}° up", parts.gap_at_full[0], degrees(hinge.up)),
        format!("{:.2} mm at {}° down", parts.gap_at_full[1], degrees(hinge.down)),
    ];
    if let Some([narrow, wide]) = parts.spacer {
        words.push(format!("spacer {narrow:.2} mm at the hinge, {wide:.2} mm at the open side"));
    }
    for (row, text) in words.into_iter().enumerate() {
        let at = Point::new(left, low - 2.0 * LETTERS - 1.8 * LETTERS * row as f64);
        drawing.write(Role::Label, at, LETTERS, text);
    }
    drawing
}

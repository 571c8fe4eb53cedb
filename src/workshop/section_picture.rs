//! A section at true size with what it measures.

use std::f64::consts::TAU;

use super::{Drawing, Role};
use crate::geometry::{Affine, ArcPath, Curve, GeometryError, Jet, Point, Vec2, follow_with_arcs};
use crate::section::{Numbers, Section, Turn};
use crate::units::Length;

/// How far the drawn outline may lie from the section, mm.
const TOLERANCE: f64 = 0.01;
/// Height of the letters, mm.
const LETTERS: f64 = 3.0;

/// Outline, mean line, chord line, greatest thickness and camber, nose circle and numbers of a
/// section at a chord in mm.
///
/// # Errors
/// When the outline cannot be followed with arcs.
pub fn section_picture(section: &Section, chord: f64) -> Result<Drawing, GeometryError> {
    let mut drawing = Drawing::new(section.name());
    let outline = follow_with_arcs(&Scaled { section, chord }, TOLERANCE)?;
    let bounds = outline.bounds();
    drawing.add(Role::CutOutside, outline);
    let n = section.numbers();
    let place = |p: Point| Affine::scale(chord) * p;
    drawing.add(Role::Reference, ArcPath::line(Point::new(-5.0, 0.0), Point::new(chord + 5.0, 0.0)));
    let middle = (0..=200).map(|i| place(middle(section, f64::from(i) / 200.0)));
    if n.camber != 0.0 {
        drawing.add(Role::Reference, ArcPath::polyline(middle, false));
    }
    nose_circle(&mut drawing, section, chord * n.nose_radius_on_outline);

    // Where it is thickest and where the mean line is furthest out, each with a line across.
    let root = root_at(section, n.thickness_at);
    let [above, below] = section.pair(root).map(place);
    drawing.add(Role::Check, ArcPath::line(above, below));
    if n.camber != 0.0 {
        let top = place(Point::new(n.camber_at, n.camber));
        drawing.add(Role::Check, ArcPath::line(Point::new(top.x, 0.0), top));
    }

    let mut base = bounds.y0 - 8.0;
    let mut write = |text: String| {
        drawing.write(Role::Label, Point::new(0.0, base), LETTERS, text);
        base -= 2.0 * LETTERS;
    };
    write(format!(
        "{}, {} trailing edge, chord {}",
        section.name(),
        section.edge_word(),
        Length::from_mm(chord)
    ));
    for (what, value) in section_numbers(&n, Some(Length::from_mm(chord))) {
        write(format!("{what}: {value}"));
    }
    Ok(drawing)
}

/// What a section measures, in words: each quantity with its value in mm at a chord, otherwise in
/// percent of the chord.
#[must_use]
pub fn section_numbers(n: &Numbers, chord: Option<Length>) -> Vec<(&'static str, String)> {
    let (scale, unit, places) = match chord {
        Some(chord) => (chord.mm(), "mm", 3),
        None => (100.0, "% of chord", 4),
    };
    let length = |v: f64| format!("{:.places$} {unit}", v * scale);
    let (area_scale, area_unit) = match chord {
        Some(_) => (scale * scale, "mm²"),
        None => (100.0, "% of chord²"),
    };
    let (moment_scale, moment_unit) = match chord {
        Some(_) => ((0.1 * scale).powi(4), "cm⁴"),
        None => (1e6, "e-6 chord⁴"),
    };
    let moments = n.second_moments;
    let moment = |v: f64| format!("{:.places$} {moment_unit}", v * moment_scale);
    let turn = |turn: Turn| match turn.radius {
        0.0 => format!("a corner at {}", length(turn.at.x)),
        radius => format!("radius {} at {}", length(radius), length(turn.at.x)),
    };
    let hollow = n.hollowest.map_or("none, the outline bulges everywhere".to_owned(), turn);
    vec![
        ("thickness", format!("{} at {}", length(n.thickness), length(n.thickness_at))),
        (
            "camber",
            if n.camber == 0.0 {
                "none".to_owned()
            } else {
                format!("{} at {}", length(n.camber), length(n.camber_at))
            },
        ),
        (
            "nose radius",
            format!("{} ({} on the outline itself)", length(n.nose_radius), length(n.nose_radius_on_outline)),
        ),
        (
            "trailing edge",
            format!(
                "{} thick, {:.3}° between the surfaces",
                length(n.trailing_edge_thickness),
                n.trailing_edge_angle.to_degrees()
            ),
        ),
        ("area", format!("{:.places$} {area_unit}", n.area * area_scale)),
        ("centroid", format!("{}, {} above the chord line", length(n.centroid.x), length(n.centroid.y))),
        (
            "second moments",
            format!("{} about the chord, {} across it", moment(moments.about_x), moment(moments.about_y)),
        ),
        ("outline", format!("{} long", length(n.perimeter))),
        ("sharpest bulge", turn(n.sharpest)),
        ("sharpest hollow", hollow),
    ]
}

/// The circle that lies in the nose.
fn nose_circle(drawing: &mut Drawing, section: &Section, radius: f64) {
    let inward = section.jet(0.0).tangent().map_or(Vec2::new(1.0, 0.0), Vec2::turn_90);
    let centre = (radius * inward).to_point();
    let round = (0..96).map(|i| {
        let (sin, cos) = (TAU * f64::from(i) / 96.0).sin_cos();
        centre + radius * Vec2::new(cos, sin)
    });
    drawing.add(Role::Check, ArcPath::polyline(round, true));
}

/// Midway between the surfaces.
fn middle(section: &Section, root: f64) -> Point {
    let [upper, lower] = section.pair(root);
    upper.midpoint(lower)
}

/// Parameter of the middle line at station `x`.
fn root_at(section: &Section, x: f64) -> f64 {
    let (mut low, mut high) = (0.0, 1.0);
    for _ in 0..60 {
        let middle = 0.5 * (low + high);
        if self::middle(section, middle).x < x { low = middle } else { high = middle }
    }
    0.5 * (low + high)
}

/// A section at a chord in mm.
struct Scaled<'a> {
    section: &'a Section,
    chord: f64,
}

impl Curve for Scaled<'_> {
    fn jet(&self, t: f64) -> Jet {
        let jet = self.section.jet(t);
        Jet {
            point: Affine::scale(self.chord) * jet.point,
            first: self.chord * jet.first,
            second: self.chord * jet.second,
        }
    }

    fn breaks(&self) -> Vec<f64> {
        self.section.breaks()
    }
}

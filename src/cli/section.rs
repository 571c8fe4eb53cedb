//! `plankform section`: what a section measures, and its ordinates.

use std::path::PathBuf;

use plankform::export::{csv::csv, svg_page};
use plankform::geometry::{Affine, ArcPath, Curve, Point};
use plankform::section::{Numbers, ORDINATE_STATIONS, Section, Side};
use plankform::units::{Length, fixed};
use plankform::workshop::{Drawing, Role, single_page};
use serde_json::{Value, json};

use super::failure::Failure;
use super::section_source::SectionSource;
use super::{Format, Outcome, print, print_json, save};

/// Print the ordinates of a section and what it measures
#[derive(Debug, clap::Args)]
#[command(after_help = "Example:\n  plankform section \"NACA 23012\" --chord \"120 mm\" --svg section.svg")]
pub(super) struct Arguments {
    #[command(flatten)]
    source: SectionSource,
    /// Give lengths in mm for a section of this chord, such as "120 mm"
    #[arg(long, value_name = "LEN", value_parser = chord, allow_hyphen_values = true)]
    chord: Option<Length>,
    /// Points along the outline, in CSV and JSON
    #[arg(long, value_name = "N", default_value_t = 161, allow_hyphen_values = true, value_parser = clap::value_parser!(u32).range(5..=20_001))]
    points: u32,
    /// How to print
    #[arg(long, default_value = "text")]
    format: Format,
    /// Also draw the section to this SVG file, at true size (200 mm without --chord)
    #[arg(long, value_name = "FILE")]
    svg: Option<PathBuf>,
}

/// Chord of the picture when none is given, mm.
const PICTURE_CHORD: f64 = 200.0;

fn chord(text: &str) -> Result<Length, String> {
    let length: Length = text.parse().map_err(|e: plankform::units::UnitError| e.to_string())?;
    let bounds = 1.0..=10_000.0;
    if bounds.contains(&length.mm()) {
        Ok(length)
    } else {
        Err(format!("a chord of {} mm is not possible: it must lie from 1 mm to 10 m", length.mm()))
    }
}

pub(super) fn run(arguments: &Arguments) -> Result<Outcome, Failure> {
    let section = arguments.source.section()?;
    if let Some(path) = &arguments.svg {
        let chord = arguments.chord.map_or(PICTURE_CHORD, Length::mm);
        let drawing = drawn(&section, chord).map_err(Failure::input)?;
        save(path, &svg_page(&single_page(&drawing)))?;
    }
    let scale = arguments.chord.map_or(1.0, Length::mm);
    let points = section.points(arguments.points as usize);
    match arguments.format {
        Format::Text => print(&text(&section, arguments.chord))?,
        Format::Json => print_json(&json(&section, arguments.chord, &points))?,
        Format::Csv => {
            let heading = if arguments.chord.is_some() { ["x_mm", "y_mm"] } else { ["x", "y"] };
            let rows = points.iter().map(|p| [p.x, p.y].map(|v| fixed(v * scale, 8)));
            print(&csv(heading, rows).map_err(Failure::input)?)?;
        }
    }
    Ok(Outcome::Passed)
}

fn json(section: &Section, chord: Option<Length>, points: &[Point]) -> Value {
    let scale = chord.map_or(1.0, Length::mm);
    let n = section.numbers();
    json!({
        "section": section.name(),
        "trailing_edge": section.thickness_form().edge_word(),
        "unit": if chord.is_some() { "mm" } else { "chord" },
        "thickness": n.thickness * scale,
        "thickness_at": n.thickness_at * scale,
        "camber": n.camber * scale,
        "camber_at": n.camber_at * scale,
        "nose_radius": n.nose_radius * scale,
        "nose_radius_on_outline": n.nose_radius_on_outline * scale,
        "trailing_edge_thickness": n.trailing_edge_thickness * scale,
        "trailing_edge_angle_deg": n.trailing_edge_angle.to_degrees(),
        "area": n.area * scale * scale,
        "centroid": [n.centroid.x * scale, n.centroid.y * scale],
        "points": points.iter().map(|p| [p.x * scale, p.y * scale]).collect::<Vec<_>>(),
    })
}

fn text(section: &Section, chord: Option<Length>) -> String {
    let (scale, unit, places) = match chord {
        Some(chord) => (chord.mm(), "mm", 3),
        None => (100.0, "% of chord", 4),
    };
    let Numbers {
        thickness,
        thickness_at,
        camber,
        camber_at,
        nose_radius,
        nose_radius_on_outline,
        trailing_edge_thickness,
        trailing_edge_angle,
        area,
        centroid,
    } = section.numbers();
    let edge = section.thickness_form().edge_word();
    let length = |v: f64| format!("{:.places$} {unit}", v * scale);
    let area_unit = if chord.is_some() { "mm²" } else { "% of chord²" };
    let area_scale = if chord.is_some() { scale * scale } else { scale };
    let of_chord = chord.map_or(String::new(), |c| format!(", chord {c}"));
    let mut text = format!(
        "{}, {edge} trailing edge{of_chord}\n\n\
         thickness            {} at {}\n\
         camber               {} at {}\n\
         nose radius          {} ({} on the outline itself)\n\
         trailing edge        {} thick, {:.3}° between the surfaces\n\
         area                 {:.places$} {area_unit}\n\
         centroid             {}, {} above the chord line\n\n",
        section.name(),
        length(thickness),
        length(thickness_at),
        length(camber),
        length(camber_at),
        length(nose_radius),
        length(nose_radius_on_outline),
        length(trailing_edge_thickness),
        trailing_edge_angle.to_degrees(),
        area * area_scale,
        length(centroid.x),
        length(centroid.y),
    );
    text.push_str(&format!("ordinates in {unit}\n{:>12}{:>12}{:>12}\n", "station", "upper", "lower"));
    for percent in ORDINATE_STATIONS {
        let x = percent / 100.0;
        let surface = |side| section.surface(side, x) * scale;
        text.push_str(&format!(
            "{:>12.places$}{:>12.places$}{:>12.places$}\n",
            x * scale,
            surface(Side::Upper),
            surface(Side::Lower)
        ));
    }
    text
}

/// Outline, mean line and chord line at a chord in mm.
fn drawn(section: &Section, chord: f64) -> Result<Drawing, plankform::geometry::GeometryError> {
    let mut drawing = Drawing::new(section.name());
    let outline = plankform::geometry::follow_with_arcs(&Scaled { section, chord }, 0.01)?;
    let below = outline.bounds().y0;
    drawing.add(Role::CutOutside, outline);
    let mean = (0..=200).map(|i| {
        let x = f64::from(i) / 200.0;
        Point::new(x * chord, section.mean_line().at(x).y * chord)
    });
    drawing.add(Role::Reference, ArcPath::polyline(mean, false));
    drawing.add(Role::Reference, ArcPath::line(Point::new(-5.0, 0.0), Point::new(chord + 5.0, 0.0)));
    let n = section.numbers();
    for (row, words) in [
        format!("{}, chord {chord:.1} mm", section.name()),
        format!(
            "thickness {:.2} % at {:.1} %, camber {:.2} % at {:.1} %",
            100.0 * n.thickness,
            100.0 * n.thickness_at,
            100.0 * n.camber,
            100.0 * n.camber_at
        ),
    ]
    .iter()
    .enumerate()
    {
        drawing.write(Role::Label, Point::new(0.0, below - 8.0 - 6.5 * row as f64), 3.5, words);
    }
    Ok(drawing)
}

/// A section at a chord in mm.
struct Scaled<'a> {
    section: &'a Section,
    chord: f64,
}

impl Curve for Scaled<'_> {
    fn jet(&self, t: f64) -> plankform::geometry::Jet {
        let mut jet = self.section.jet(t);
        jet.point = Affine::scale(self.chord) * jet.point;
        jet.first *= self.chord;
        jet.second *= self.chord;
        jet
    }

    fn breaks(&self) -> Vec<f64> {
        self.section.breaks()
    }
}

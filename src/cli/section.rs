//! `plankform section`: what a section measures, and its ordinates.

use std::path::PathBuf;

use plankform::export::{csv::csv, svg_page};
use plankform::geometry::Point;
use plankform::section::{ORDINATE_STATIONS, Section, Side};
use plankform::units::{Length, fixed};
use plankform::workshop::{section_numbers, section_picture, single_page};
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

pub(super) fn chord(text: &str) -> Result<Length, String> {
    let length: Length = text.parse().map_err(|e: plankform::units::UnitError| e.to_string())?;
    let bounds = 1.0..=10_000.0;
    if bounds.contains(&length.mm()) {
        Ok(length)
    } else {
        Err(format!("a chord of {} mm is not possible: it must lie from 1 mm to 10 m", length.mm()))
    }
}

pub(super) fn run(arguments: &Arguments) -> Result<Outcome, Failure> {
    let section = arguments.source.section(arguments.chord)?;
    if let Some(path) = &arguments.svg {
        let chord = arguments.chord.map_or(PICTURE_CHORD, Length::mm);
        let drawing = section_picture(&section, chord).map_err(Failure::input)?;
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
    let place = |p: Point| [p.x * scale, p.y * scale];
    let moments = n.second_moments;
    json!({
        "section": section.name(),
        "trailing_edge": section.edge_word(),
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
        "centroid": place(n.centroid),
        "second_moments": {
            "about_x": moments.about_x * scale.powi(4),
            "about_y": moments.about_y * scale.powi(4),
            "product": moments.product * scale.powi(4),
        },
        "perimeter": n.perimeter * scale,
        "smallest_radius": n.sharpest.radius * scale,
        "smallest_radius_at": place(n.sharpest.at),
        "smallest_hollow_radius": n.hollowest.map(|turn| turn.radius * scale),
        "smallest_hollow_radius_at": n.hollowest.map(|turn| place(turn.at)),
        "remarks": section.remarks(),
        "points": points.iter().map(|p| place(*p)).collect::<Vec<_>>(),
    })
}

fn text(section: &Section, chord: Option<Length>) -> String {
    let (scale, unit, places) = match chord {
        Some(chord) => (chord.mm(), "mm", 3),
        None => (100.0, "% of chord", 4),
    };
    let of_chord = chord.map_or(String::new(), |c| format!(", chord {c}"));
    let mut text = format!("{}, {} trailing edge{of_chord}\n\n", section.name(), section.edge_word());
    for (what, value) in section_numbers(&section.numbers(), chord) {
        text.push_str(&format!("{what:<21}{value}\n"));
    }
    for remark in section.remarks() {
        text.push_str(&format!("\nnote: {remark}"));
    }
    if !section.remarks().is_empty() {
        text.push('\n');
    }
    text.push_str(&format!("\nordinates in {unit}\n{:>12}{:>12}{:>12}\n", "station", "upper", "lower"));
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

//! `plankform lift`: lift, moment and pressure of a section over a range of incidence.

use std::path::PathBuf;

use plankform::export::chart::{Chart, Series};
use plankform::export::csv::csv;
use plankform::flow::{DEFAULT_PANELS, Panelling, PotentialFlow, Solution};
use plankform::units::fixed;
use serde_json::{Value, json};

use super::failure::Failure;
use super::number_list;
use super::section_source::SectionSource;
use super::{Format, Outcome, print, print_json, save, say};

/// Lift curve of a section, with moment and pressure
#[derive(Debug, clap::Args)]
#[command(
    after_help = "Example:\n  plankform lift \"NACA 4412\" --re 1e6 --angles -4:10:1 --inviscid --pressure --format json"
)]
pub(super) struct Arguments {
    #[command(flatten)]
    source: SectionSource,
    /// Reynolds numbers by the chord, with commas between them; not needed with --inviscid
    #[arg(long, value_name = "RE[,RE]", allow_hyphen_values = true, value_parser = number_list::positive_list, required_unless_present = "inviscid")]
    re: Option<std::vec::Vec<f64>>,
    /// Incidence in degrees, nose up positive: from FROM in whole steps up to TO, or one value
    #[arg(long, value_name = "FROM:TO:STEP", allow_hyphen_values = true, value_parser = angles)]
    angles: std::vec::Vec<f64>,
    /// Flow without friction: lift, moment and pressure, but no drag and no stall
    #[arg(long)]
    inviscid: bool,
    /// Also give the pressure along the outline
    #[arg(long)]
    pressure: bool,
    /// How to print
    #[arg(long, default_value = "text")]
    format: Format,
    /// Also draw the lift curve to this SVG file
    #[arg(long, value_name = "FILE")]
    svg: Option<PathBuf>,
}

/// Beyond this potential flow says nothing about a section.
const GREATEST_ANGLE: f64 = 30.0;

fn angles(text: &str) -> Result<Vec<f64>, String> {
    let values = number_list::range(text)?;
    match values.iter().find(|v| v.abs() > GREATEST_ANGLE) {
        Some(bad) => Err(format!("{bad}° is outside -{GREATEST_ANGLE}° to {GREATEST_ANGLE}°")),
        None => Ok(values),
    }
}

pub(super) fn run(arguments: &Arguments) -> Result<Outcome, Failure> {
    if !arguments.inviscid {
        return Err(Failure::Input(
            "the viscous solution (boundary layer, drag, stall) is not there yet: add --inviscid for lift, moment and \
             pressure without friction"
                .to_owned(),
        ));
    }
    if arguments.re.is_some() {
        say("note: flow without friction is the same at every Reynolds number; --re is not used");
    }
    let section = arguments.source.section(None)?;
    let panelling = Panelling::of(&section, DEFAULT_PANELS).map_err(Failure::input)?;
    let flow = PotentialFlow::new(&panelling).map_err(Failure::input)?;
    let points: Vec<(f64, Solution)> =
        arguments.angles.iter().map(|&angle| (angle, flow.at(angle.to_radians()))).collect();
    if let Some(path) = &arguments.svg {
        save(path, &format!("{}\n", chart(section.name(), &points).to_svg()))?;
    }
    match arguments.format {
        Format::Text => print(&text(section.name(), &flow, &points, arguments.pressure))?,
        Format::Csv => print(&table(&points, arguments.pressure).map_err(Failure::input)?)?,
        Format::Json => print_json(&json!({
            "section": section.name(),
            "trailing_edge": section.edge_word(),
            "curves": [curve(&flow, &points, arguments.pressure)],
        }))?,
    }
    Ok(Outcome::Passed)
}

fn curve(flow: &PotentialFlow, points: &[(f64, Solution)], pressure: bool) -> Value {
    json!({
        "reynolds": null,
        "amplification": null,
        "flap_deg": 0.0,
        "slope_per_deg": flow.slope_per_radian().to_radians(),
        "zero_lift_deg": flow.zero_lift().to_degrees(),
        "cl_max": null,
        "cl_max_deg": null,
        "points": points.iter().map(|(angle, s)| point(*angle, s, pressure)).collect::<Vec<_>>(),
    })
}

fn point(angle: f64, solution: &Solution, pressure: bool) -> Value {
    let mut value = json!({
        "angle_deg": angle,
        "converged": true,
        "cl": solution.cl,
        "cd": null,
        "cm": solution.cm,
        "hinge_moment": null,
        "cp_min": solution.cp_min,
        "transition_upper": null,
        "transition_lower": null,
        "separation_upper": null,
        "separation_lower": null,
        "bubble_upper": null,
        "bubble_lower": null,
    });
    if pressure {
        let along = solution.pressure.iter().map(|p| [p.x, p.y, p.cp]).collect::<Vec<_>>();
        value["pressure"] = json!(along);
    }
    value
}

fn text(name: &str, flow: &PotentialFlow, points: &[(f64, Solution)], pressure: bool) -> String {
    let mut text = format!(
        "{name}, flow without friction: no drag, no stall; real lift is lower near stall\n\
         lift slope {:.5} per degree, zero lift at {}°\n\n{:>10}{:>10}{:>10}{:>12}\n",
        flow.slope_per_radian().to_radians(),
        fixed(flow.zero_lift().to_degrees(), 3),
        "angle",
        "lift",
        "moment",
        "least cp",
    );
    for (angle, s) in points {
        let [cl, cm] = [s.cl, s.cm].map(|v| fixed(v, 4));
        text.push_str(&format!("{angle:>9.2}°{cl:>10}{cm:>10}{:>12.3}\n", s.cp_min));
    }
    if pressure {
        for (angle, s) in points {
            text.push_str(&format!("\npressure at {angle:.2}°\n{:>10}{:>10}{:>10}\n", "x", "y", "cp"));
            for p in &s.pressure {
                text.push_str(&format!("{:>10.5}{:>10.5}{:>10.4}\n", p.x, p.y, p.cp));
            }
        }
    }
    text
}

fn table(points: &[(f64, Solution)], pressure: bool) -> Result<String, plankform::export::ExportError> {
    let fixed = |v: f64| fixed(v, 6);
    if pressure {
        let rows =
            points.iter().flat_map(|(angle, s)| s.pressure.iter().map(move |p| [*angle, p.x, p.y, p.cp]));
        csv(["angle_deg", "x_over_chord", "y_over_chord", "cp"], rows.map(|row| row.map(fixed)))
    } else {
        let rows = points.iter().map(|(angle, s)| [*angle, s.cl, s.cm, s.cp_min].map(fixed));
        csv(["angle_deg", "cl", "cm", "cp_min"], rows)
    }
}

fn chart(name: &str, points: &[(f64, Solution)]) -> Chart {
    Chart {
        title: format!("{name}: lift without friction"),
        across: "incidence, degrees".to_owned(),
        up: "lift coefficient".to_owned(),
        series: vec![Series {
            name: String::new(),
            points: points.iter().map(|(angle, s)| (*angle, s.cl)).collect(),
        }],
        ..Chart::default()
    }
}

//! `plankform lift`: lift, drag, moment and pressure of a section over a range of incidence.

use std::path::PathBuf;

use plankform::export::chart::{Chart, Series};
use plankform::export::csv::csv;
use plankform::flow::{Conditions, DEFAULT_PANELS, LiftCurve, Panelling, PotentialFlow, Solution, Viscous};
use plankform::units::fixed;
use serde_json::{Value, json};

use super::failure::Failure;
use super::number_list;
use super::section_source::SectionSource;
use super::{Format, Outcome, print, print_json, save, say, viscous_lift};

/// Lift curve of a section, with drag, moment, transition and pressure
#[derive(Debug, clap::Args)]
#[command(
    after_help = "Examples:\n  plankform lift \"NACA 4412\" --re 5e5,1e6 --angles -4:14:1\n  plankform lift \"NACA 4412\" --angles -4:10:1 --inviscid --pressure --format json"
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
    /// Amplification exponent N at which the layers become turbulent: 9 in a clean tank, less in
    /// natural water
    #[arg(long, value_name = "N", default_value_t = 9.0, value_parser = amplification)]
    amplification: f64,
    /// Make the layers turbulent at this part of the chord: upper side, lower side, or one for both
    #[arg(long, value_name = "X[,X]", value_parser = trips)]
    trip: Option<[f64; 2]>,
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
        return with_friction(arguments);
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

fn amplification(text: &str) -> Result<f64, String> {
    let value: f64 = text.parse().map_err(|_| format!("'{text}' is not a number"))?;
    if (0.1..=20.0).contains(&value) { Ok(value) } else { Err(format!("{text} is outside 0.1 to 20")) }
}

fn trips(text: &str) -> Result<[f64; 2], String> {
    let place = |text: &str| -> Result<f64, String> {
        let value: f64 = text.trim().parse().map_err(|_| format!("'{text}' is not a number"))?;
        if (0.0..=1.0).contains(&value) { Ok(value) } else { Err(format!("{text} is off the chord, 0 to 1")) }
    };
    let places: Vec<f64> = text.split(',').map(place).collect::<Result<_, _>>()?;
    match *places.as_slice() {
        [both] => Ok([both, both]),
        [upper, lower] => Ok([upper, lower]),
        _ => Err("write one value, or two with a comma between: upper side, lower side".to_owned()),
    }
}

fn with_friction(arguments: &Arguments) -> Result<Outcome, Failure> {
    let section = arguments.source.section(None)?;
    let panelling = Panelling::of(&section, DEFAULT_PANELS).map_err(Failure::input)?;
    let flow = Viscous::new(&panelling).map_err(Failure::input)?;
    let incidences: Vec<f64> = arguments.angles.iter().map(|angle| angle.to_radians()).collect();
    let conditions: Vec<Conditions> = arguments
        .re
        .iter()
        .flatten()
        .map(|&reynolds| Conditions {
            trip_upper: arguments.trip.map(|[upper, _]| upper),
            trip_lower: arguments.trip.map(|[_, lower]| lower),
            ..Conditions::free(reynolds, arguments.amplification)
        })
        .collect();
    let curves = LiftCurve::sweep_all(&flow, &conditions, &incidences).map_err(Failure::input)?;
    if let Some(path) = &arguments.svg {
        save(path, &format!("{}\n", viscous_lift::chart(section.name(), &curves).to_svg()))?;
    }
    match arguments.format {
        Format::Text => print(&viscous_lift::text(section.name(), &curves, arguments.pressure))?,
        Format::Csv => print(&viscous_lift::table(&curves, arguments.pressure).map_err(Failure::input)?)?,
        Format::Json => print_json(&json!({
            "section": section.name(),
            "trailing_edge": section.edge_word(),
            "curves": curves
                .iter()
                .map(|curve| viscous_lift::curve_json(curve, arguments.pressure))
                .collect::<Vec<_>>(),
        }))?,
    }
    let gaps: usize = curves.iter().map(|curve| curve.points.len() - curve.converged()).sum();
    if gaps > 0 {
        say(&format!("note: no solution was found at {gaps} of the angles; they are left out"));
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

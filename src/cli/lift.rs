//! `plankform lift`: lift, drag, moment and pressure of a section over a range of incidence.

use std::path::PathBuf;

use plankform::export::chart::{Chart, Series};
use plankform::export::csv::csv;
use plankform::flow::{
    Conditions, DEFAULT_PANELS, LiftCurve, Panelling, PotentialFlow, Solution, Viscous, hinge_moment,
};
use plankform::geometry::Point;
use plankform::section::{Flap, FlapSurface, HingeHeight, Section, Side};
use plankform::units::fixed;
use serde_json::{Value, json};

use super::failure::Failure;
use super::number_list;
use super::section_source::SectionSource;
use super::viscous_lift::FlapCurve;
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
    /// Deflections of a flap in degrees, trailing edge down positive, with commas between them
    #[arg(long, value_name = "ANGLE[,ANGLE]", allow_hyphen_values = true, value_parser = number_list::list, requires = "hinge")]
    flap: Option<std::vec::Vec<f64>>,
    /// Where the flap's hinge lies, a fraction of the chord from the nose
    #[arg(long, value_name = "X", requires = "flap", allow_hyphen_values = true)]
    hinge: Option<f64>,
    /// Where its axis lies across the chord
    #[arg(long, value_name = "WHERE", requires = "flap", default_value = "middle")]
    axis: Axis,
    /// Flow without friction: lift, moment and pressure, but no drag and no stall
    #[arg(long)]
    inviscid: bool,
    /// Also give the pressure along the outline
    #[arg(long)]
    pressure: bool,
    /// How to print
    #[arg(long, default_value = "text")]
    format: Format,
    /// Also draw lift, drag, moment and transition (without friction: lift) to this SVG file
    #[arg(long, value_name = "FILE")]
    svg: Option<PathBuf>,
}

/// Where a flap's axis lies.
#[derive(Debug, Clone, Copy, PartialEq, Eq, clap::ValueEnum)]
enum Axis {
    /// In the upper surface
    Upper,
    /// Midway between the surfaces
    Middle,
    /// In the lower surface
    Lower,
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

/// A section with its flap at one angle; without a flap, the section alone.
pub(super) struct Deflected {
    section: Section,
    /// Degrees.
    pub(super) flap: f64,
    /// The axis of the flap, if there is one.
    pub(super) axis: Option<Point>,
}

impl Arguments {
    /// The section at every deflection that is asked, or as it is, with its name.
    fn deflected(&self) -> Result<(String, &'static str, Vec<Deflected>), Failure> {
        let section = self.source.section(None)?;
        let (name, edge) = (section.name().to_owned(), section.edge_word());
        let (Some(angles), Some(hinge)) = (&self.flap, self.hinge) else {
            return Ok((name, edge, vec![Deflected { section, flap: 0.0, axis: None }]));
        };
        let (height, across) = match self.axis {
            Axis::Upper => (HingeHeight::Upper, 1.0),
            Axis::Middle => (HingeHeight::Middle, 0.5),
            Axis::Lower => (HingeHeight::Lower, 0.0),
        };
        let [upper, lower] = [Side::Upper, Side::Lower].map(|side| section.surface(side, hinge));
        let axis = Point::new(hinge, lower + across * (upper - lower));
        let at = |&flap: &f64| {
            let deflection = Flap { hinge, height, angle: flap.to_radians(), surface: FlapSurface::Broken };
            let section = section.flapped(deflection).map_err(Failure::input)?;
            Ok(Deflected { section, flap, axis: Some(axis) })
        };
        Ok((name, edge, angles.iter().map(at).collect::<Result<_, Failure>>()?))
    }
}

pub(super) fn run(arguments: &Arguments) -> Result<Outcome, Failure> {
    if !arguments.inviscid {
        return with_friction(arguments);
    }
    if arguments.re.is_some() {
        say("note: flow without friction is the same at every Reynolds number; --re is not used");
    }
    let (name, edge, sections) = arguments.deflected()?;
    let flow = |deflected: &Deflected| {
        let panelling = Panelling::of(&deflected.section, DEFAULT_PANELS).map_err(Failure::input)?;
        let flow = PotentialFlow::new(&panelling).map_err(Failure::input)?;
        let at = |&angle: &f64| (angle, flow.at(angle.to_radians()));
        let points = arguments.angles.iter().map(at).collect();
        Ok(Frictionless { flap: deflected.flap, axis: deflected.axis, flow, points })
    };
    let curves: Vec<Frictionless> = sections.iter().map(flow).collect::<Result<_, Failure>>()?;
    if let Some(path) = &arguments.svg {
        save(path, &format!("{}\n", chart(&name, &curves).to_svg()))?;
    }
    match arguments.format {
        Format::Text => print(&text(&name, &curves, arguments.pressure))?,
        Format::Csv => print(&table(&curves, arguments.pressure).map_err(Failure::input)?)?,
        Format::Json => print_json(&json!({
            "section": name,
            "trailing_edge": edge,
            "curves": curves.iter().map(|c| curve(c, arguments.pressure)).collect::<Vec<_>>(),
        }))?,
    }
    Ok(Outcome::Passed)
}

/// A curve without friction.
struct Frictionless {
    flap: f64,
    axis: Option<Point>,
    flow: PotentialFlow,
    points: Vec<(f64, Solution)>,
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
    let (name, edge, sections) = arguments.deflected()?;
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
    let mut curves = Vec::new();
    for Deflected { section, flap, axis } in sections {
        let panelling = Panelling::of(&section, DEFAULT_PANELS).map_err(Failure::input)?;
        let flow = Viscous::new(&panelling).map_err(Failure::input)?;
        let swept = LiftCurve::sweep_all(&flow, &conditions, &incidences).map_err(Failure::input)?;
        curves.extend(swept.into_iter().map(|curve| FlapCurve { flap, axis, curve }));
    }
    if let Some(path) = &arguments.svg {
        save(path, &format!("{}\n", viscous_lift::charts(&name, &curves)))?;
    }
    match arguments.format {
        Format::Text => print(&viscous_lift::text(&name, &curves, arguments.pressure))?,
        Format::Csv => print(&viscous_lift::table(&curves, arguments.pressure).map_err(Failure::input)?)?,
        Format::Json => print_json(&json!({
            "section": name,
            "trailing_edge": edge,
            "curves": curves
                .iter()
                .map(|curve| viscous_lift::curve_json(curve, arguments.pressure))
                .collect::<Vec<_>>(),
        }))?,
    }
    let gaps: usize = curves.iter().map(|one| one.curve.points.len() - one.curve.converged()).sum();
    if gaps > 0 {
        say(&format!("note: no solution was found at {gaps} of the angles; they are left out"));
    }
    Ok(Outcome::Passed)
}

fn curve(Frictionless { flap, axis, flow, points }: &Frictionless, pressure: bool) -> Value {
    json!({
        "reynolds": null,
        "amplification": null,
        "flap_deg": flap,
        "slope_per_deg": flow.slope_per_radian().to_radians(),
        "zero_lift_deg": flow.zero_lift().to_degrees(),
        "cl_max": null,
        "cl_max_deg": null,
        "points": points.iter().map(|(angle, s)| point(*angle, s, *axis, pressure)).collect::<Vec<_>>(),
    })
}

fn point(angle: f64, solution: &Solution, axis: Option<Point>, pressure: bool) -> Value {
    let mut value = json!({
        "angle_deg": angle,
        "converged": true,
        "cl": solution.cl,
        "cd": null,
        "cm": solution.cm,
        "hinge_moment": axis.and_then(|axis| hinge_moment(&solution.pressure, axis)),
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

fn text(name: &str, curves: &[Frictionless], pressure: bool) -> String {
    let mut text =
        format!("{name}, flow without friction: no drag, no stall; real lift is lower near stall\n");
    for Frictionless { flap, axis, flow, points } in curves {
        if axis.is_some() {
            text.push_str(&format!("\nflap {flap}°\n"));
        }
        text.push_str(&format!(
            "lift slope {:.5} per degree, zero lift at {}°\n\n{:>10}{:>10}{:>10}{:>12}\n",
            flow.slope_per_radian().to_radians(),
            fixed(flow.zero_lift().to_degrees(), 3),
            "angle",
            "lift",
            "moment",
            "least cp",
        ));
        for (angle, s) in points {
            let [cl, cm] = [s.cl, s.cm].map(|v| fixed(v, 4));
            text.push_str(&format!("{angle:>9.2}°{cl:>10}{cm:>10}{:>12.3}\n", s.cp_min));
        }
        for (angle, s) in points.iter().filter(|_| pressure) {
            text.push_str(&format!("\npressure at {angle:.2}°\n{:>10}{:>10}{:>10}\n", "x", "y", "cp"));
            for p in &s.pressure {
                text.push_str(&format!("{:>10.5}{:>10.5}{:>10.4}\n", p.x, p.y, p.cp));
            }
        }
    }
    text
}

fn table(curves: &[Frictionless], pressure: bool) -> Result<String, plankform::export::ExportError> {
    let fixed = |v: f64| fixed(v, 6);
    let points = curves.iter().flat_map(|c| c.points.iter().map(move |(angle, s)| (c.flap, *angle, s)));
    if pressure {
        let rows =
            points.flat_map(|(flap, angle, s)| s.pressure.iter().map(move |p| [flap, angle, p.x, p.y, p.cp]));
        csv(["flap_deg", "angle_deg", "x_over_chord", "y_over_chord", "cp"], rows.map(|row| row.map(fixed)))
    } else {
        let rows = points.map(|(flap, angle, s)| [flap, angle, s.cl, s.cm, s.cp_min].map(fixed));
        csv(["flap_deg", "angle_deg", "cl", "cm", "cp_min"], rows)
    }
}

fn chart(name: &str, curves: &[Frictionless]) -> Chart {
    Chart {
        title: format!("{name}: lift without friction"),
        across: "incidence, degrees".to_owned(),
        up: "lift coefficient".to_owned(),
        series: curves
            .iter()
            .map(|c| Series {
                name: c.axis.map_or(String::new(), |_| format!("flap {}°", c.flap)),
                points: c.points.iter().map(|(angle, s)| (*angle, s.cl)).collect(),
            })
            .collect(),
        ..Chart::default()
    }
}

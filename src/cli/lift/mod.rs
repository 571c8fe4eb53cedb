//! `plankform lift`: lift, drag, moment, cavitation and pressure of a section over a range of
//! incidence.

mod arguments;
mod band;
mod charts;
mod curve;
mod data;
mod running;
mod table;
mod text;

pub(super) use arguments::Arguments;

use plankform::flow::{
    Conditions, DEFAULT_PANELS, LiftCurve, NoseFinish, Panelling, PotentialFlow, Viscous, side_by_side,
};
use plankform::geometry::Point;
use plankform::section::{Flap, FlapSurface, HingeHeight, Section, Side};

use super::failure::Failure;
use super::progress::Progress;
use super::{Format, Outcome, print, print_json, save, say};
use arguments::Axis;
use curve::{Curve, Flow};
use running::{Running, Surroundings};

/// Everything that was worked out, to be shown in one way or another.
struct Answer {
    /// Name of the section.
    section: String,
    /// What its trailing edge is.
    edge: &'static str,
    surroundings: Surroundings,
    curves: Vec<Curve>,
    /// What is asked for besides the curves.
    with: With,
}

/// What is asked for besides the curves.
#[derive(Debug, Clone, Copy)]
struct With {
    pressure: bool,
    layers: bool,
}

/// A section with its flap at one angle; without a flap, the section alone.
struct Deflected {
    section: Section,
    /// Degrees.
    flap: f64,
    /// The axis of the flap, if there is one.
    axis: Option<Point>,
}

pub(super) fn run(arguments: &Arguments) -> Result<Outcome, Failure> {
    let surroundings = arguments.surroundings()?;
    let running = arguments.running(&surroundings)?;
    let with = With { pressure: arguments.pressure, layers: arguments.layers };
    arguments.refuse_what_conflicts()?;
    let section = arguments.source.section(arguments.chord)?;
    let (name, edge) = (section.name().to_owned(), section.edge_word());
    let sections = deflected(arguments, section)?;
    let curves = if arguments.inviscid {
        without_friction(arguments, &sections, &running)?
    } else {
        with_friction(arguments, &sections, &running)?
    };
    let answer = Answer { section: name, edge, surroundings, curves, with };
    if let Some(path) = &arguments.svg {
        save(path, &format!("{}\n", charts::charts(&answer)))?;
    }
    match arguments.format {
        Format::Text => print(&text::text(&answer))?,
        Format::Csv => print(&table::table(&answer).map_err(Failure::input)?)?,
        Format::Json => print_json(&data::json(&answer))?,
    }
    let gaps: usize = answer.curves.iter().map(Curve::gaps).sum();
    if gaps > 0 {
        say(&format!("note: no solution was found at {gaps} of the angles; they are left out"));
    }
    Ok(Outcome::Passed)
}

/// The section at every deflection that is asked, or as it is.
fn deflected(arguments: &Arguments, section: Section) -> Result<Vec<Deflected>, Failure> {
    let (Some(angles), Some(hinge)) = (&arguments.flap, arguments.hinge) else {
        return Ok(vec![Deflected { section, flap: 0.0, axis: None }]);
    };
    let (height, across) = match arguments.axis {
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
    angles.iter().map(at).collect()
}

fn without_friction(
    arguments: &Arguments,
    sections: &[Deflected],
    running: &[Running],
) -> Result<Vec<Curve>, Failure> {
    if arguments.re.is_some() {
        say("note: flow without friction is the same at every Reynolds number; --re is not used");
    }
    let mut curves = Vec::new();
    for Deflected { section, flap, axis } in sections {
        let panelling = Panelling::of(section, DEFAULT_PANELS).map_err(Failure::input)?;
        let flow = PotentialFlow::new(&panelling).map_err(Failure::input)?;
        curves.extend(running.iter().map(|&running| Curve {
            flap: *flap,
            axis: *axis,
            running,
            finish: None,
            flow: Flow::frictionless(&flow, &arguments.angles),
        }));
    }
    Ok(curves)
}

/// One curve to be solved: which section, how it runs, and its finish.
struct Case {
    section: usize,
    running: Running,
    finish: NoseFinish,
    conditions: Conditions,
}

fn with_friction(
    arguments: &Arguments,
    sections: &[Deflected],
    running: &[Running],
) -> Result<Vec<Curve>, Failure> {
    let incidences: Vec<f64> = arguments.angles.iter().map(|angle| angle.to_radians()).collect();
    let flow = |deflected: &Deflected| {
        let panelling = Panelling::of(&deflected.section, DEFAULT_PANELS).map_err(Failure::input)?;
        Viscous::new(&panelling).map_err(Failure::input)
    };
    let flows: Vec<Viscous> =
        side_by_side(sections, flow, |_| ()).into_iter().collect::<Result<_, Failure>>()?;
    let mut cases = Vec::new();
    for section in 0..sections.len() {
        for &running in running {
            for (finish, conditions) in arguments.conditions(running) {
                cases.push(Case { section, running, finish, conditions });
            }
        }
    }
    let progress = Progress::of("lift curves");
    let sweep = |case: &Case| LiftCurve::sweep(&flows[case.section], &case.conditions, &incidences);
    let swept = side_by_side(&cases, sweep, |done| progress.show(done, cases.len()));
    drop(progress);
    let curve = |(case, swept): (Case, Result<LiftCurve, _>)| {
        let Deflected { flap, axis, .. } = sections[case.section];
        let flow = Flow::Viscous(swept.map_err(Failure::input)?);
        Ok(Curve { flap, axis, running: case.running, finish: Some(case.finish), flow })
    };
    cases.into_iter().zip(swept).map(curve).collect()
}

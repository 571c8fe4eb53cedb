//! Lift, drag and pressure of the sections.

use std::fmt::Write as _;

use super::knots;
use crate::design::Design;
use crate::export::chart::{Chart, Mark, Series};
use crate::export::html::{escaped, table};
use crate::flow::{CurvePoint, LiftCurve, PressurePoint, ViscousSolution, Water};
use crate::pack::aids::SectionFlow;
use crate::pack::bucket;
use crate::pack::friction::StationCurves;
use crate::units::number;

/// Lift and drag with friction, what to expect at the design lift, and cavitation.
pub(super) fn friction(body: &mut String, design: &Design, water: &Water, curves: &[StationCurves<'_>]) {
    let range = &design.lift;
    let _ = writeln!(
        body,
        "<h2>Lift and drag at {:.1} kn</h2>\n<p>{} water of {} °C, N = {} (how far waves in the boundary layer grow before it turns \
         turbulent). The lines bear the chord of their station. \u{201c}Rough\u{201d}: the layer is turbulent from 2 % of chord on, as dirt and wear make \
         it. Of a section in steady flow; the foil as a whole has induced drag besides, and gaps in a line are angles at which \
         no flow was found.</p>",
        knots(range.speed),
        if range.sea { "Sea" } else { "Fresh" },
        number(range.temperature, 1),
        number(range.quietness, 1),
    );
    let at = |stations: &[f64]| stations.iter().map(|at| number(*at, 1)).collect::<Vec<_>>().join(", ");
    let rows: Vec<[String; 8]> = curves
        .iter()
        .map(|station| {
            let wanted = StationCurves::at_lift(&station.smooth, range.design);
            let rough = StationCurves::at_lift(&station.rough, range.design);
            let greatest = |curve| {
                let (cl, is_peak) = StationCurves::greatest(curve);
                if is_peak { format!("{cl:.2}") } else { format!("over {cl:.2}") }
            };
            let or_dash = |value: Option<String>| value.unwrap_or("–".to_owned());
            let inception = station.cavitates(design, water);
            [
                at(&station.stations),
                escaped(station.section.name()),
                format!("{:.0} 000", station.reynolds() / 1000.0),
                or_dash(wanted.map(|w| format!("{:.2}°", w.incidence.to_degrees()))),
                or_dash(wanted.map(|w| format!("{:.4}", w.cd))),
                or_dash(rough.map(|w| format!("{:.4}", w.cd))),
                format!("{}, rough {}", greatest(&station.smooth), greatest(&station.rough)),
                or_dash(inception.map(|inception| format!("{:.1} kn", knots(inception.speed)))),
            ]
        })
        .collect();
    let heading = [
        "stations, mm from root",
        "section",
        "Reynolds number",
        "incidence at the design lift",
        "drag there",
        "drag, rough",
        "greatest lift",
        "cavitates from",
    ];
    body.push_str(&table(heading, &rows, |_| false));
    let lines = |value: fn(&ViscousSolution) -> (f64, f64)| -> Vec<Series> {
        let one = |name: String, curve: &LiftCurve| {
            let point = |p: &CurvePoint| p.solution.as_ref().map_or((f64::NAN, f64::NAN), value);
            Series { name, points: curve.points.iter().map(point).collect() }
        };
        let of_station = |station: &StationCurves<'_>| {
            let name = format!("{:.0} mm", station.chord);
            [one(name.clone(), &station.smooth), one(format!("{name}, rough"), &station.rough)]
        };
        curves.iter().flat_map(of_station).collect()
    };
    let charts = [
        Chart {
            title: "Lift with friction".to_owned(),
            across: "incidence, degrees".to_owned(),
            up: "lift coefficient".to_owned(),
            series: lines(|s| (s.incidence.to_degrees(), s.cl)),
            marks: vec![Mark { at: range.design, name: format!("design {}", range.design) }],
            ..Chart::default()
        },
        Chart {
            title: "Lift against drag".to_owned(),
            across: "drag coefficient".to_owned(),
            up: "lift coefficient".to_owned(),
            series: lines(|s| (s.cd, s.cl)),
            marks: vec![Mark { at: range.design, name: format!("design {}", range.design) }],
            ..Chart::default()
        },
    ];
    for chart in charts {
        let _ = writeln!(body, "<figure>{}</figure>", chart.to_svg());
    }
}

/// Up to which speed which lift is free of cavitation.
pub(super) fn cavitation(body: &mut String, design: &Design, water: &Water, curves: &[StationCurves<'_>]) {
    let depth = number(design.lift.depth.mm(), 0);
    let _ = writeln!(
        body,
        "<h2>Cavitation</h2>\n<p>Where the suction on the foil reaches the pressure of the water above it, the water boils: lift \
         falls, drag grows, and the surface wears. Right of a line nothing boils at {depth} mm depth; faster boats move to the left along \
         the scale above. Air that is drawn down from the surface (ventilation) comes earlier and is not in it.</p>"
    );
    for chart in bucket::charts(design, water, curves) {
        let _ = writeln!(body, "<figure>{}</figure>", chart.to_svg());
    }
}

pub(super) fn lift(body: &mut String, design: &Design, flows: &[SectionFlow<'_>]) {
    let wanted = design.lift.design;
    body.push_str(
        "<h2>Lift and pressure without friction</h2>\n<p>To compare with theory: these curves have no drag and no stall.</p>\n",
    );
    let curves = flows.iter().map(|flow| Series {
        name: flow.section.name().to_owned(),
        points: flow.over_range(design).map(|(angle, solution)| (angle, solution.cl)).collect(),
    });
    let chart = Chart {
        title: "Lift of the sections".to_owned(),
        across: "incidence, degrees".to_owned(),
        up: "lift coefficient".to_owned(),
        series: curves.collect(),
        marks: vec![Mark { at: wanted, name: format!("design {wanted}") }],
        ..Chart::default()
    };
    let _ = writeln!(body, "<figure>{}</figure>", chart.to_svg());
    for flow in flows {
        let Some(solution) = flow.at_lift(wanted) else { continue };
        let nose =
            solution.pressure.iter().enumerate().min_by(|a, b| a.1.x.total_cmp(&b.1.x)).map_or(0, |(i, _)| i);
        // Both run aft, so that their names stand at the trailing edge.
        let side = |name: &str, points: &mut dyn Iterator<Item = &PressurePoint>| Series {
            name: name.to_owned(),
            points: points.map(|p| (100.0 * p.x, p.cp)).collect(),
        };
        let chart = Chart {
            title: format!(
                "{} at lift {wanted} ({:.2}°)",
                flow.section.name(),
                solution.incidence.to_degrees()
            ),
            across: "percent of chord".to_owned(),
            up: "pressure coefficient".to_owned(),
            downwards: true,
            series: vec![
                side("upper side", &mut solution.pressure[..=nose].iter().rev()),
                side("lower side", &mut solution.pressure[nose..].iter()),
            ],
            ..Chart::default()
        };
        let _ = writeln!(
            body,
            "<figure>{}<figcaption>Least pressure coefficient {:.2}. Suction is upwards.</figcaption></figure>",
            chart.to_svg(),
            solution.cp_min
        );
    }
}

//! The build sheet: what to check, what to print and cut, in which order, with the pictures.

use std::fmt::Write as _;

use super::aids::{SectionFlow, StationAids};
use super::{Check, PackFile};
use crate::design::Design;
use crate::export::chart::{Chart, Mark, Series};
use crate::export::html::{document, escaped, table};
use crate::export::{number, picture};
use crate::flow::PressurePoint;
use crate::wing::Planform;
use crate::workshop::{Drawing, without_negative_zero};

/// White round a picture, mm.
const MARGIN: f64 = 4.0;

pub(super) fn html(
    design: &Design,
    planform: &Planform,
    stations: &[StationAids<'_>],
    pattern: &Drawing,
    flows: &[SectionFlow<'_>],
    checks: &[Check],
    files: &[PackFile],
) -> String {
    let mut body = String::new();
    heading(&mut body, design, checks);
    cautions(&mut body);
    shape(&mut body, design, planform, stations, pattern);
    lift(&mut body, design, flows);
    steps(&mut body, files);
    check_table(&mut body, checks);
    file_table(&mut body, files);
    document(&format!("{} {}", design.name, design.fingerprint()), &body)
}

fn heading(body: &mut String, design: &Design, checks: &[Check]) {
    let failed = checks.iter().filter(|check| !check.passed).count();
    let verdict = if failed == 0 {
        format!("<p class=\"good\">All {} checks passed.</p>", checks.len())
    } else {
        format!(
            "<p class=\"bad\">{failed} of {} checks are outside their limit: see below before you cut.</p>",
            checks.len()
        )
    };
    let _ = writeln!(
        body,
        "<h1>{}</h1>\n<p>{}, fingerprint <code>{}</code>. Only aids with this fingerprint belong together.</p>\n{verdict}",
        escaped(&design.name),
        escaped(design.kind.word()),
        escaped(&design.fingerprint())
    );
    if let Some(notes) = &design.notes {
        let _ = writeln!(body, "<p>{}</p>", escaped(notes));
    }
}

fn cautions(body: &mut String) {
    body.push_str(
        "<div class=\"caution\"><strong>Before you start.</strong> Sanding dust of wood, filler and fibre harms the lungs: \
         mask and extraction. Uncured resin and hardener harm skin and eyes: gloves, goggles, air, and their data sheets; a \
         pot of mixed resin can catch fire. Guard and clamp for every cutter, and a dry run above the wood for a new file. \
         A foil at speed cuts: keep swimmers away, wear helmet and vest, start in sheltered water with a chase boat. This sheet \
         checks shapes and flow without friction. It says nothing yet of drag, stall, cavitation, ventilation, waves or \
         strength, and is no certificate: local rules and qualified advice come first.</div>\n",
    );
}

fn shape(
    body: &mut String,
    design: &Design,
    planform: &Planform,
    stations: &[StationAids<'_>],
    pattern: &Drawing,
) {
    let _ = writeln!(
        body,
        "<h2>Shape</h2>\n<p>Span {:.1} mm, area {:.1} cm², aspect ratio {:.2}, mean chord {:.1} mm, taper {:.3}.</p>\n\
         <figure>{}<figcaption>Planform, leading edge up; distances from the root in mm{}.</figcaption></figure>",
        planform.span(),
        planform.area() / 100.0,
        planform.aspect_ratio(),
        planform.mean_chord(),
        planform.taper(),
        picture(&pattern.without_caption(), MARGIN),
        design.flap.map_or(String::new(), |flap| format!(
            "; hinge line at {} % of chord",
            number(100.0 * flap.hinge, 1)
        ))
    );
    let rows: Vec<[String; 5]> = stations
        .iter()
        .map(|station| {
            let shape = &station.shape;
            let bounds = station.template.lines.first().map(|line| line.path.bounds());
            [
                number(shape.at, 3),
                shape.section_name(),
                format!("{:.2}", shape.chord),
                format!("{:+.2}°", without_negative_zero(shape.twist.to_degrees())),
                bounds.map_or(String::new(), |b| format!("{:.2}", b.height())),
            ]
        })
        .collect();
    let heading = ["station, mm from root", "section", "chord, mm", "twist", "height of the outline, mm"];
    body.push_str(&table(heading, &rows));
    for station in stations {
        let _ = writeln!(
            body,
            "<figure>{}<figcaption>Station {} mm from the root, {}.</figcaption></figure>",
            picture(&station.template.without_caption(), MARGIN),
            number(station.shape.at, 3),
            escaped(&station.shape.section_name())
        );
    }
}

fn lift(body: &mut String, design: &Design, flows: &[SectionFlow<'_>]) {
    let wanted = design.lift.design;
    body.push_str(
        "<h2>Lift and pressure</h2>\n<p><strong>Flow without friction.</strong> These curves have no drag and no stall; \
         real lift is a little lower, and falls off where the flow leaves the surface.</p>\n",
    );
    let curves = flows.iter().map(|flow| Series {
        name: flow.section.name().to_owned(),
        points: design
            .lift
            .angles()
            .into_iter()
            .map(|angle| (angle.degrees(), flow.flow.at(angle.radians()).cl))
            .collect(),
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
        let Some(incidence) = flow.flow.incidence_for_lift(wanted) else { continue };
        let solution = flow.flow.at(incidence);
        let nose =
            solution.pressure.iter().enumerate().min_by(|a, b| a.1.x.total_cmp(&b.1.x)).map_or(0, |(i, _)| i);
        // Both run aft, so that their names stand at the trailing edge.
        let side = |name: &str, points: &mut dyn Iterator<Item = &PressurePoint>| Series {
            name: name.to_owned(),
            points: points.map(|p| (100.0 * p.x, p.cp)).collect(),
        };
        let chart = Chart {
            title: format!("{} at lift {wanted} ({:.2}°)", flow.section.name(), incidence.to_degrees()),
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

fn steps(body: &mut String, files: &[PackFile]) {
    let count = |kind: &str| files.iter().filter(|file| file.kind == kind).count();
    let _ = writeln!(
        body,
        "<h2>Order of work</h2>\n<ol>\n\
         <li>Read the checks below. Nothing is cut while one is outside its limit.</li>\n\
         <li>Print <code>print/*.pdf</code> at 100 % (no fitting to the page) and measure both 100 mm lines on every page. \
         Join tiles by their crosses.</li>\n\
         <li>Send the {} router files in <code>cut/</code> to the router: millimetres, cut on layer CUT_OUTSIDE only.</li>\n\
         <li>Print the {} mask halves in <code>masks/</code> flat as they lie, without support.</li>\n\
         <li>Cut the planform, mark the stations and the centre line, and shape down to the masks: a pair that closes all \
         round leaves the set clearance.</li>\n\
         <li>Between stations fair with a straight batten; check against <code>tables/offsets.csv</code>.</li>\n</ol>\n\
         <p>The outlines are the finished surface. The allowance for the laminate is not taken off yet.</p>",
        count("dxf"),
        count("stl")
    );
}

fn check_table(body: &mut String, checks: &[Check]) {
    let rows: Vec<[String; 6]> = checks
        .iter()
        .map(|check| {
            let quantity = |v: f64| format!("{} {}", number(v, 3), check.unit).trim_end().to_owned();
            [
                if check.passed { "passed" } else { "OUTSIDE" }.to_owned(),
                check.name.clone(),
                check.place.clone(),
                quantity(check.value),
                quantity(check.limit),
                check.why.clone(),
            ]
        })
        .collect();
    body.push_str("<h2>Checks</h2>\n");
    body.push_str(&table(["", "check", "where", "value", "limit", "why"], &rows));
}

fn file_table(body: &mut String, files: &[PackFile]) {
    let rows: Vec<[String; 3]> = files
        .iter()
        .map(|file| {
            let station = file.station_mm.map_or(String::new(), |at| format!("{} mm", number(at, 3)));
            [file.path.clone(), file.role.to_owned(), station]
        })
        .collect();
    body.push_str("<h2>Files of this pack</h2>\n");
    body.push_str(&table(["file", "what it is", "station"], &rows));
}

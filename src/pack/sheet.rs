//! The build sheet: what to check, what to print and cut, in which order, with the pictures.

use std::fmt::Write as _;

use super::aids::{Aids, SectionFlow, StationAids};
use super::duty::FoilDuty;
use super::friction::StationCurves;
use super::{Check, PackFile};
use crate::design::Design;
use crate::export::chart::{Chart, Mark, Series};
use crate::export::html::{document, escaped, table};
use crate::export::picture;
use crate::flow::{CurvePoint, LiftCurve, PressurePoint, ViscousSolution, Water};
use crate::geometry::Point;
use crate::loading::Loading;
use crate::parts::WoodPiece;
use crate::units::number;
use crate::wing::Planform;
use crate::workshop::{Drawing, turn};

/// White round a picture, mm.
const MARGIN: f64 = 4.0;
/// The word for a check that does not hold.
const OUTSIDE: &str = "OUTSIDE";

pub(super) fn html(design: &Design, aids: &Aids<'_>, checks: &[Check], files: &[PackFile]) -> String {
    let Aids { planform, pattern, stations, flows, water, curves, duty, pieces, .. } = aids;
    let mut body = String::new();
    heading(&mut body, design, checks);
    cautions(&mut body);
    shape(&mut body, design, planform, stations, pattern);
    wood(&mut body, design, stations, pieces);
    if let Some(foil) = duty {
        under_the_boat(&mut body, design, foil);
    }
    friction(&mut body, design, water, curves);
    lift(&mut body, design, flows);
    steps(&mut body, design, files);
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
        "<h2>Shape</h2>\n<p>Seen from {}: span {:.1} mm, area {:.1} cm², aspect ratio {:.2}, mean chord {:.1} mm, taper {:.3}, mean \
         aerodynamic chord {:.1} mm, aerodynamic centre {:.1} mm aft of the root's quarter chord.</p>\n\
         <figure>{}<figcaption>Planform, leading edge up; distances from the root in mm{}.</figcaption></figure>",
        if planform.is_mirrored() { "above" } else { "the side" },
        planform.span(),
        planform.area() / 100.0,
        planform.aspect_ratio(),
        planform.mean_chord(),
        planform.taper(),
        planform.aerodynamic_chord(),
        planform.aerodynamic_centre(),
        picture(&pattern.without_caption(), MARGIN),
        design.flap.map_or(String::new(), |flap| format!(
            "; hinge line at {} % of chord",
            number(100.0 * flap.hinge, 1)
        ))
    );
    let root = stations.first().map_or(Point::ORIGIN, |station| station.shape.nose);
    let rows: Vec<[String; 7]> = stations
        .iter()
        .map(|station| {
            let shape = &station.shape;
            let bounds = station.template.lines.first().map(|line| line.path.bounds());
            [
                number(shape.at, 3),
                shape.section_name(),
                format!("{:.2}", shape.chord),
                turn(shape.twist),
                number(shape.nose.x - root.x, 2),
                number(shape.nose.y - root.y, 2),
                bounds.map_or(String::new(), |b| format!("{:.2}", b.height())),
            ]
        })
        .collect();
    let heading = [
        "station, mm from root",
        "section",
        "chord, mm",
        "twist, nose up",
        "nose aft of the root's, mm",
        "nose above the root's, mm",
        "height of the outline, mm",
    ];
    body.push_str(&table(heading, &rows, |_| false));
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

/// What is cut before anything is laid over it: plies, where the wood ends, the gap of the flap.
fn wood(body: &mut String, design: &Design, stations: &[StationAids<'_>], pieces: &[WoodPiece]) {
    body.push_str("<h2>Wood, laminate and flap</h2>\n");
    let skin = design.skin();
    if design.plies.is_empty() {
        body.push_str(
            "<p>No plies are named: wood and finished surface differ by the finish alone, if at all.</p>\n",
        );
    } else {
        let rows: Vec<[String; 6]> = design
            .plies
            .iter()
            .zip(&skin.plies)
            .map(|(ply, laid)| {
                [
                    escaped(&ply.cloth),
                    format!("{:.0}", ply.weight),
                    format!("{:.3}", laid.thickness),
                    format!("{:?}", ply.on).to_lowercase(),
                    format!("{} to {}", number(ply.from.mm(), 1), number(ply.to.mm(), 1)),
                    format!("{} to {}", number(100.0 * ply.chord_from, 1), number(100.0 * ply.chord_to, 1)),
                ]
            })
            .collect();
        let heading = [
            "cloth, from the wood outwards",
            "g/m²",
            "cured, mm",
            "on",
            "along the span, mm",
            "of the chord, %",
        ];
        body.push_str(&table(heading, &rows, |_| false));
    }
    pieces_table(body, design, pieces);
    if stations.iter().all(|station| station.wood.templates.is_empty()) {
        return;
    }
    let mm = |value: Option<f64>| value.map_or("–".to_owned(), |v| format!("{v:.1}"));
    let rows: Vec<[String; 6]> = stations
        .iter()
        .map(|station| {
            let (wood, split) = (&station.wood, station.wood.split.as_ref());
            [
                number(station.shape.at, 3),
                mm(wood.ends_at),
                mm(wood.thin_behind),
                split.map_or("–".to_owned(), |s| format!("{:.2}, {:.2}", s.axis.x, s.axis.y)),
                split.map_or("–".to_owned(), |s| {
                    format!("{:.2} at rest, {:.2} least", s.gap_at_rest, s.least_gap)
                }),
                split
                    .and_then(|s| s.spacer)
                    .map_or("–".to_owned(), |[narrow, wide]| format!("{narrow:.2} to {wide:.2}")),
            ]
        })
        .collect();
    let heading = [
        "station, mm from root",
        "wood ends, mm from nose",
        "wood thinner than your least behind, mm",
        "hinge axis, mm",
        "gap at the flap, mm",
        "spacer for the gap, mm",
    ];
    body.push_str(&table(heading, &rows, |_| false));
    body.push_str(
        "<p>Behind where the wood ends the trailing edge is laminate alone. The spacer is laid into the gap while the hinge's \
         skin cures, narrow side to the hinge.</p>\n",
    );
    for station in stations {
        for (role, _, drawing) in &station.wood.templates {
            let _ = writeln!(
                body,
                "<figure>{}<figcaption>Station {} mm from the root, {role}.</figcaption></figure>",
                picture(&drawing.without_caption(), MARGIN),
                number(station.shape.at, 3),
            );
        }
    }
}

/// What to saw out before anything is shaped.
fn pieces_table(body: &mut String, design: &Design, pieces: &[WoodPiece]) {
    let around = 2.0 * design.wood.allowance.mm();
    let rows: Vec<[String; 6]> = pieces
        .iter()
        .map(|piece| {
            let [length, width, height] = piece.blank.map(|side| format!("{:.0}", (side + around).ceil()));
            [
                piece.name.to_owned(),
                piece.count.to_string(),
                format!("{length} by {width} by {height}"),
                format!("{:.1}", piece.volume / 1000.0),
                // mm³ times kg/m³ is a millionth of a gram.
                format!("{:.0}", piece.volume * design.wood.density * 1e-6),
                "along the length".to_owned(),
            ]
        })
        .collect();
    let heading = ["piece", "how many", "blank, mm", "volume of one, cm³", "weight of one, g", "grain"];
    let _ = writeln!(
        body,
        "<h3>Pieces of wood</h3>\n<p>{}, {:.0} kg/m³. Blanks have {} more on every side for holding and trimming; mirrored \
         halves are a left and a right one.</p>",
        escaped(&design.wood.species),
        design.wood.density,
        design.wood.allowance
    );
    body.push_str(&table(heading, &rows, |_| false));
}

/// A speed in m/s in knots.
fn knots(speed: f64) -> f64 {
    speed * 3600.0 / 1852.0
}

/// What the whole foil carries at which speed, and what that costs.
fn under_the_boat(body: &mut String, design: &Design, foil: &FoilDuty) {
    let _ = writeln!(
        body,
        "<h2>The foil under its boat</h2>\n<p>{:.0} kg carried at {} mm depth, flap straight. By a lifting line with the image of \
         the free surface, fed with the lift curves below, which hold for {:.1} kn. Not in it: ventilation, waves, spray, the strut, \
         shocks and gusts. Take-off needs a margin for them.</p>",
        foil.duty.carries,
        number(design.lift.depth.mm(), 0),
        knots(design.lift.speed),
    );
    match &foil.take_off {
        Ok(take_off) => {
            let _ = writeln!(
                body,
                "<p>It carries its load from <strong>{:.1} kn</strong> on, with {:.0} % of its greatest lift.</p>",
                knots(take_off.speed),
                100.0 * foil.duty.share
            );
        }
        Err(error) => {
            let _ = writeln!(body, "<p class=\"bad\">{}</p>", escaped(&error.to_string()));
        }
    }
    let rows: Vec<[String; 7]> = foil
        .named
        .iter()
        .map(|(name, point)| {
            let speed = format!("{name}, {:.1} kn", knots(point.speed));
            match &point.carried {
                Ok(loading) => [
                    speed,
                    format!("{:.2}°", loading.state.incidence.to_degrees()),
                    format!("{:.1}", loading.drag()),
                    format!("{:.1}", loading.induced_drag),
                    format!("{:.1}", loading.lift / loading.drag()),
                    format!("{:.0}", loading.power()),
                    loading.nearest_to_stall().map_or("–".to_owned(), |strip| {
                        let left = strip
                            .stall_margin
                            .map_or(String::new(), |m| format!(", {:.1}° left", m.to_degrees()));
                        format!("{:.0} mm from the root{left}", strip.at)
                    }),
                ],
                Err(error) => {
                    let dash = || "–".to_owned();
                    [speed, dash(), dash(), dash(), dash(), dash(), escaped(&error.to_string())]
                }
            }
        })
        .collect();
    let heading = [
        "speed",
        "incidence",
        "drag, N",
        "of it induced, N",
        "lift over drag",
        "power, W",
        "nearest to stall",
    ];
    body.push_str(&table(heading, &rows, |_| false));
    let line = |name: &str, value: fn(&Loading) -> f64| Series {
        name: name.to_owned(),
        points: foil
            .over_speeds
            .iter()
            .map(|p| (knots(p.speed), p.carried.as_ref().map_or(f64::NAN, value)))
            .collect(),
    };
    let chart = Chart {
        title: "Drag of the foil".to_owned(),
        across: "speed, kn".to_owned(),
        up: "drag, N".to_owned(),
        series: vec![
            line("all of it", Loading::drag),
            line("induced", |loading| loading.induced_drag),
            line("of the sections", |loading| loading.profile_drag),
        ],
        ..Chart::default()
    };
    let _ = writeln!(body, "<figure>{}</figure>", chart.to_svg());
}

/// Lift and drag with friction, what to expect at the design lift, and cavitation.
fn friction(body: &mut String, design: &Design, water: &Water, curves: &[StationCurves<'_>]) {
    let range = &design.lift;
    let depth = range.depth.mm() * 1e-3;
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
            let inception = wanted.and_then(|w| water.inception_speed(depth, w.cp_min));
            [
                at(&station.stations),
                escaped(station.section.name()),
                format!("{:.0} 000", station.reynolds() / 1000.0),
                or_dash(wanted.map(|w| format!("{:.2}°", w.incidence.to_degrees()))),
                or_dash(wanted.map(|w| format!("{:.4}", w.cd))),
                or_dash(rough.map(|w| format!("{:.4}", w.cd))),
                format!("{}, rough {}", greatest(&station.smooth), greatest(&station.rough)),
                or_dash(inception.map(|speed| format!("{:.1} kn", knots(speed)))),
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

fn lift(body: &mut String, design: &Design, flows: &[SectionFlow<'_>]) {
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

fn steps(body: &mut String, design: &Design, files: &[PackFile]) {
    let count = |kind: &str| files.iter().filter(|file| file.kind == kind).count();
    let (pages, routed, plates) = (count("pdf"), count("dxf"), count("stl"));
    let mut steps = vec![
        "Read the checks below. For each that is outside its limit, change the design, or know why you go on."
            .to_owned(),
    ];
    if pages > 0 {
        steps.push(
            "Print <code>print/*.pdf</code> at 100 %, with fitting to the page off, and measure both 100 mm lines on \
             every page. Join tiles by laying cross on cross."
                .to_owned(),
        );
    }
    if routed > 0 {
        steps.push(format!(
            "Send the {routed} router files in <code>cut/</code> to the router. They are in millimetres. Cut outside the \
             lines of layer CUT_OUTSIDE; the other layers are never cut."
        ));
    }
    if plates > 0 {
        let sides = if design.kind.mirrored() {
            ""
        } else {
            " On this upright foil the upper half is the starboard one, the lower half the port one."
        };
        steps.push(format!(
            "Print the {plates} mask halves in <code>masks/</code> flat as they lie, without support. Station, fingerprint and \
             half are engraved; notches in the far side show nose, trailing edge and hinge.{sides}"
        ));
    }
    if stations_are_marked(files) {
        let wood =
            files.iter().any(|file| file.role.ends_with("template") && file.role != "station template");
        if wood {
            steps.push(
                "Saw out the blanks, mark the root line and the stations on them from the planform, and shape the wood to \
                 the templates of the wood. Test fit, with the spacer, before any resin is mixed."
                    .to_owned(),
            );
            steps.push(
                "Laminate as in the table of plies, on a sample first: measure its cured thickness and correct the design if it \
                 differs."
                    .to_owned(),
            );
        } else {
            steps.push(
                "Cut the planform, mark the root line and the stations on it, and shape down to the masks."
                    .to_owned(),
            );
        }
        steps.push(
            "Fill and sand to the masks. When a pair closes, the gap all round is the set clearance."
                .to_owned(),
        );
        steps.push(
            "Set the twist: on each template the line marked \u{201c}level\u{201d} lies level when the foil does. The table \
             above gives the height of each nose against the root's."
                .to_owned(),
        );
        steps.push("Between stations, fair the surface with a straight batten.".to_owned());
    }
    body.push_str("<h2>Order of work</h2>\n<ol>\n");
    for step in steps {
        let _ = writeln!(body, "<li>{step}</li>");
    }
    body.push_str("</ol>\n");
}

/// Whether the pack holds anything to shape by.
fn stations_are_marked(files: &[PackFile]) -> bool {
    files.iter().any(|file| matches!(file.kind, "dxf" | "pdf" | "stl"))
}

fn check_table(body: &mut String, checks: &[Check]) {
    let rows: Vec<[String; 6]> = super::checks::worst_first(checks)
        .map(|check| {
            let quantity = |v: f64| format!("{} {}", number(v, 3), check.unit).trim_end().to_owned();
            [
                if check.passed { "passed" } else { OUTSIDE }.to_owned(),
                check.name.clone(),
                check.place.clone(),
                quantity(check.value),
                quantity(check.limit),
                check.why.clone(),
            ]
        })
        .collect();
    body.push_str("<h2>Checks</h2>\n");
    let heading = ["", "check", "where", "value", "limit", "why"];
    body.push_str(&table(heading, &rows, |row| row[0] == OUTSIDE));
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
    body.push_str(&table(["file", "what it is", "station"], &rows, |_| false));
}

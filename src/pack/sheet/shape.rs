//! Shape, wood and laminate: what is cut, and what is laid over it.

use std::fmt::Write as _;

use super::MARGIN;
use crate::design::Design;
use crate::export::html::{escaped, table};
use crate::export::picture;
use crate::geometry::Point;
use crate::pack::station::StationAids;
use crate::parts::WoodPiece;
use crate::units::number;
use crate::wing::Planform;
use crate::workshop::{Drawing, flap_picture, turn};

pub(super) fn shape(
    body: &mut String,
    design: &Design,
    planform: &Planform,
    stations: &[StationAids<'_>],
    (pattern, legend): (&Drawing, &[String]),
) {
    let _ = writeln!(
        body,
        "<h2>Shape</h2>\n<p>Seen from {}: span {:.1} mm, area {:.1} cm², aspect ratio {:.2}, mean chord {:.1} mm, taper {:.3}, mean \
         aerodynamic chord {:.1} mm, aerodynamic centre {:.1} mm aft of the root's quarter chord.</p>\n\
         <figure>{}<figcaption>Planform, leading edge up; distances from the root in mm{}{}.</figcaption></figure>",
        if design.kind.mirrored() { "above" } else { "the side" },
        planform.span(),
        planform.area() / 100.0,
        planform.aspect_ratio(),
        planform.mean_chord(),
        planform.taper(),
        planform.aerodynamic_chord(),
        planform.aerodynamic_centre(),
        picture(&pattern.without_caption(), MARGIN),
        hinge_words(design),
        legend.iter().map(|line| format!("; {}", escaped(line))).collect::<String>()
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

fn hinge_words(design: &Design) -> String {
    design.hinge_line().map_or(String::new(), |line| format!("; hinge line at {}", line.words()))
}

/// What is cut before anything is laid over it: plies, where the wood ends, the gap of the flap.
pub(super) fn wood(body: &mut String, design: &Design, stations: &[StationAids<'_>], pieces: &[WoodPiece]) {
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
                    let [up, down] = s.gap_at_full;
                    format!("{:.2}, {up:.2}, {down:.2}; {:.2}", s.gap_at_rest, s.least_gap)
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
        "gap at rest, full up, full down; least, mm",
        "spacer for the gap, mm",
    ];
    body.push_str(&table(heading, &rows, |_| false));
    body.push_str(
        "<p>Behind where the wood ends the trailing edge is laminate alone. The spacer is laid into the gap while the hinge's \
         skin cures, narrow side to the hinge.</p>\n",
    );
    flap(body, design, stations);
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

/// The flap at its first and its last station, turned through its travel.
fn flap(body: &mut String, design: &Design, stations: &[StationAids<'_>]) {
    let (Some(flap), Some([from, to])) = (design.flap, design.flap_span()) else { return };
    let _ = writeln!(
        body,
        "<p>The flap runs from {} to {} mm: at each end that stands beside wood it is {} shorter than where the foil is parted, so \
         that it turns freely.</p>",
        number(from, 2),
        number(to, 2),
        flap.clearance
    );
    let parted: Vec<_> = stations.iter().filter(|station| station.wood.split.is_some()).collect();
    let ends = [parted.first(), parted.last().filter(|_| parted.len() > 1)];
    for station in ends.into_iter().flatten() {
        let shape = &station.shape;
        let hinge = design.hinge_at(shape.at, shape.chord);
        if let (Some(split), Some(hinge)) = (&station.wood.split, hinge) {
            let _ = writeln!(
                body,
                "<figure>{}<figcaption>Flap at station {} mm, with its laminate; broken lines: all the way up and \
                 down.</figcaption></figure>",
                picture(&flap_picture(split, &station.template, &hinge), MARGIN),
                number(shape.at, 3),
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
                piece.grain.to_owned(),
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

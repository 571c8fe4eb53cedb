//! The tables of a pack. Each row carries the fingerprint, so that a printed table of one revision is
//! not taken for that of another.

use super::aids::SectionFlow;
use super::friction::StationCurves;
use super::station::StationAids;
use crate::design::Design;
use crate::export::ExportError;
use crate::export::csv::csv;
use crate::flow::SideFlow;
use crate::geometry::{Curve, Point, height_at};
use crate::parts::WoodPiece;
use crate::section::ORDINATE_STATIONS;
use crate::units::{fixed, number};
use crate::wing::StationShape;

/// Where each station lies and how it is turned, against the root's nose.
pub(super) fn stations(stations: &[StationAids<'_>], fingerprint: &str) -> Result<Vec<u8>, ExportError> {
    let root = stations.first().map_or(Point::ORIGIN, |station| station.shape.nose);
    let rows = stations.iter().map(|station| {
        let shape = &station.shape;
        let lengths = [
            shape.chord,
            shape.nose.x - root.x,
            shape.nose.y - root.y,
            1.0 / shape.jet(0.0).curvature().abs(),
            overhang(shape),
        ];
        let [chord, aft, above, radius, overhang] = lengths.map(|v| fixed(v, 3));
        let (at, twist) = (number(shape.at, 3), fixed(shape.twist.to_degrees(), 4));
        let stamp = fingerprint.to_owned();
        [at, shape.section_name(), chord, twist, aft, above, radius, overhang, stamp]
    });
    let heading = [
        "station_mm",
        "section",
        "chord_mm",
        "twist_deg",
        "nose_aft_mm",
        "nose_above_mm",
        "nose_radius_mm",
        "nose_overhang_mm",
        "fingerprint",
    ];
    csv(heading, rows).map(String::into_bytes)
}

/// How far the outline runs ahead of its own nose point, as that of a cambered section does.
fn overhang(shape: &StationShape<'_>) -> f64 {
    let foremost = (-200..=200).map(|i| shape.jet(f64::from(i) / 400.0).point.x).fold(0.0, f64::min);
    -foremost
}

/// The pieces of wood: how many, blank with its allowance, volume and weight of one.
pub(super) fn pieces(
    design: &Design,
    pieces: &[WoodPiece],
    fingerprint: &str,
) -> Result<Vec<u8>, ExportError> {
    let around = 2.0 * design.wood.allowance.mm();
    let rows = pieces.iter().map(|piece| {
        let [length, width, height] = piece.blank.map(|side| fixed(side + around, 1));
        let volume = fixed(piece.volume / 1000.0, 3);
        let weight = fixed(piece.volume * design.wood.density * 1e-6, 1);
        let (name, count) = (piece.name.to_owned(), piece.count.to_string());
        [name, count, length, width, height, volume, weight, piece.grain.to_owned(), fingerprint.to_owned()]
    });
    let heading = [
        "piece",
        "count",
        "blank_length_mm",
        "blank_width_mm",
        "blank_height_mm",
        "volume_cm3",
        "weight_g",
        "grain",
        "fingerprint",
    ];
    csv(heading, rows).map(String::into_bytes)
}

/// Heights of both surfaces above the chord line. The first row of a station is the nose itself.
pub(super) fn offsets(stations: &[StationAids<'_>], fingerprint: &str) -> Result<Vec<u8>, ExportError> {
    let rows = stations.iter().flat_map(|station| {
        let shape = &station.shape;
        ORDINATE_STATIONS.iter().map(move |percent| {
            let x = percent / 100.0 * shape.chord;
            let surface = |end: f64| height_at(shape, 0.0, end, x);
            let [x, upper, lower] = [x, surface(-1.0), surface(1.0)].map(|v| fixed(v, 3));
            [number(shape.at, 3), number(*percent, 2), x, upper, lower, fingerprint.to_owned()]
        })
    });
    let heading = ["station_mm", "percent_of_chord", "x_mm", "upper_mm", "lower_mm", "fingerprint"];
    csv(heading, rows).map(String::into_bytes)
}

/// Lift, moment and least pressure of each section over the range of incidence.
pub(super) fn lift(
    design: &Design,
    flows: &[SectionFlow<'_>],
    fingerprint: &str,
) -> Result<Vec<u8>, ExportError> {
    let rows = flows.iter().flat_map(|flow| {
        flow.over_range(design).map(move |(angle, s)| {
            let [angle, cl, cm, cp_min] = [angle, s.cl, s.cm, s.cp_min].map(|v| fixed(v, 6));
            [flow.section.name().to_owned(), angle, cl, cm, cp_min, fingerprint.to_owned()]
        })
    });
    csv(["section", "angle_deg", "cl", "cm", "cp_min", "fingerprint"], rows).map(String::into_bytes)
}

/// Lift, drag and moment of each station with friction, smooth and rough.
pub(super) fn friction(curves: &[StationCurves<'_>], fingerprint: &str) -> Result<Vec<u8>, ExportError> {
    let rows = curves.iter().flat_map(|station| {
        let both = [("smooth", &station.smooth), ("rough", &station.rough)];
        both.into_iter().flat_map(move |(finish, curve)| {
            curve.solutions().map(move |s| {
                let [angle, cl, cm, cp_min] =
                    [s.incidence.to_degrees(), s.cl, s.cm, s.cp_min].map(|v| fixed(v, 4));
                let turbulent = |side: &SideFlow| side.transition.map_or(String::new(), |x| fixed(x, 3));
                let at: Vec<String> = station.stations.iter().map(|at| number(*at, 3)).collect();
                [
                    at.join(" "),
                    station.section.name().to_owned(),
                    fixed(station.reynolds(), 0),
                    finish.to_owned(),
                    angle,
                    cl,
                    fixed(s.cd, 5),
                    cm,
                    cp_min,
                    turbulent(&s.upper),
                    turbulent(&s.lower),
                    fingerprint.to_owned(),
                ]
            })
        })
    });
    let heading = [
        "stations_mm",
        "section",
        "reynolds",
        "finish",
        "angle_deg",
        "cl",
        "cd",
        "cm",
        "cp_min",
        "turbulent_from_upper",
        "turbulent_from_lower",
        "fingerprint",
    ];
    csv(heading, rows).map(String::into_bytes)
}

/// Pressure along each section at the design lift; places in chords.
pub(super) fn pressure(
    design: &Design,
    flows: &[SectionFlow<'_>],
    fingerprint: &str,
) -> Result<Vec<u8>, ExportError> {
    let rows = flows.iter().flat_map(|flow| {
        let points = flow.at_lift(design.lift.design).map_or(Vec::new(), |solution| solution.pressure);
        points.into_iter().map(move |p| {
            let [x, y, cp] = [p.x, p.y, p.cp].map(|v| fixed(v, 6));
            [flow.section.name().to_owned(), x, y, cp, fingerprint.to_owned()]
        })
    });
    csv(["section", "x_over_chord", "y_over_chord", "cp", "fingerprint"], rows).map(String::into_bytes)
}

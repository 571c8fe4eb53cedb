//! The cavitation bucket as a picture and as a table.

use super::friction::StationCurves;
use crate::design::Design;
use crate::export::ExportError;
use crate::export::chart::{Chart, Rule, SecondScale, Series};
use crate::export::csv::csv;
use crate::flow::{Bucket, Water};
use crate::units::{fixed, knots, number};

/// Cavitation number beyond which the bucket is not drawn: that of 8 kn or so, below which foils
/// that lift at all do not cavitate.
const WIDEST: f64 = 12.0;
/// How far the plot goes, in suctions at the bottom.
const DEPTHS: f64 = 8.0;

/// Lift against the cavitation number, of sections with their names: within the lines nothing
/// boils.
///
/// `depth` in m adds the speeds that the numbers stand for, and marks those of `speeds`, in m/s, with
/// their names; `margin` is the share by which the number is to stay above the suction.
#[must_use]
pub fn bucket_chart(
    title: String,
    buckets: &[(String, Bucket)],
    water: &Water,
    depth: Option<f64>,
    margin: f64,
    speeds: &[(String, f64)],
) -> Chart {
    let bottoms = || buckets.iter().filter_map(|(_, bucket)| bucket.bottom());
    let deepest = bottoms().map(|bottom| bottom.suction).fold(0.0, f64::max);
    let widest = (DEPTHS * deepest).clamp(1.0, WIDEST);
    let spare = 1.0 + margin;
    let line = |(name, bucket): &(String, Bucket)| Series {
        name: name.clone(),
        points: bucket.outline(widest / spare).into_iter().map(|(s, cl)| (spare * s, cl)).collect(),
    };
    let to_spare =
        if margin > 0.0 { format!(", {} % to spare", number(100.0 * margin, 1)) } else { String::new() };
    let scale = depth.map(|depth| SecondScale {
        name: format!("speed at {} mm depth, kn", number(1e3 * depth, 1)),
        // σ goes with one over the square of the speed.
        rule: Rule::OverRoot(knots(water.cavitation_number(depth, 1.0).sqrt())),
    });
    let mut series: Vec<Series> = buckets.iter().map(line).collect();
    let points = || series.iter().flat_map(|line| line.points.iter());
    let (least, most) = points().fold((f64::NAN, f64::NAN), |(a, b), p| (a.min(p.1), b.max(p.1)));
    let farthest = points().map(|p| p.0).fold(0.0, f64::max);
    let at_speed = |(name, speed): &(String, f64)| {
        let sigma = water.cavitation_number(depth?, *speed);
        let points = vec![(sigma, most), (sigma, least)];
        (sigma <= farthest).then(|| Series { name: name.clone(), points })
    };
    series.extend(speeds.iter().filter_map(at_speed).collect::<Vec<_>>());
    let word = bottoms().next().map(|bottom| (0.72 * widest, bottom.cl, "no cavitation".to_owned()));
    Chart {
        title: title + &to_spare,
        across: "cavitation number".to_owned(),
        across_too: scale,
        up: "lift coefficient".to_owned(),
        series,
        words: word.into_iter().collect(),
        ..Chart::default()
    }
}

/// The bucket of each section of a design, with those of all chords and finishes it is used at.
pub(super) fn charts(design: &Design, water: &Water, curves: &[StationCurves<'_>]) -> Vec<Chart> {
    let range = &design.lift;
    let depth = range.depth.mm() * 1e-3;
    let mut sections: Vec<Vec<&StationCurves<'_>>> = Vec::new();
    for station in curves {
        match sections.iter_mut().find(|known| known[0].section == station.section) {
            Some(known) => known.push(station),
            None => sections.push(vec![station]),
        }
    }
    let chart = |stations: Vec<&StationCurves<'_>>| {
        let of_station = |station: &&StationCurves<'_>| {
            let name = format!("{:.0} mm", station.chord);
            [
                (name.clone(), Bucket::of(&station.smooth)),
                (format!("{name}, rough"), Bucket::of(&station.rough)),
            ]
        };
        let buckets: Vec<(String, Bucket)> = stations.iter().flat_map(of_station).collect();
        let title = format!("{}: lift without cavitation", stations[0].section.name());
        let top = range.top_speed.map(|speed| (format!("top speed {:.1} kn", knots(speed)), speed));
        bucket_chart(title, &buckets, water, Some(depth), range.cavitation_margin, top.as_slice())
    };
    sections.into_iter().map(chart).collect()
}

/// Greatest suction of each station over its lift, and the speed from which it cavitates.
pub(super) fn table(
    design: &Design,
    water: &Water,
    curves: &[StationCurves<'_>],
) -> Result<Vec<u8>, ExportError> {
    let (range, fingerprint) = (&design.lift, design.fingerprint());
    let depth = range.depth.mm() * 1e-3;
    let mut rows = Vec::new();
    for station in curves {
        let at: Vec<String> = station.stations.iter().map(|at| number(*at, 3)).collect();
        for (finish, curve) in [("smooth", &station.smooth), ("rough", &station.rough)] {
            for point in Bucket::of(curve).points() {
                let speed = water.inception_speed(depth, -point.suction * (1.0 + range.cavitation_margin));
                rows.push([
                    at.join(" "),
                    station.section.name().to_owned(),
                    finish.to_owned(),
                    fixed(point.incidence.to_degrees(), 4),
                    fixed(point.cl, 4),
                    fixed(point.suction, 4),
                    speed.map_or_else(String::new, |speed| fixed(speed, 3)),
                    speed.map_or_else(String::new, |speed| fixed(knots(speed), 2)),
                    fingerprint.clone(),
                ]);
            }
        }
    }
    let heading = [
        "stations_mm",
        "section",
        "finish",
        "angle_deg",
        "cl",
        "greatest_suction",
        "cavitates_from_m_s",
        "cavitates_from_kn",
        "fingerprint",
    ];
    csv(heading, rows).map(String::into_bytes)
}

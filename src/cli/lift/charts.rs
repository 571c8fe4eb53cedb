//! The answer as pictures: what a boatbuilder reads off before cutting.

use plankform::export::chart::{Band as Shade, Chart, Rule, SecondScale, Series, stacked};
use plankform::flow::{NoseFinish, ViscousSolution};
use plankform::pack::bucket_chart;
use plankform::units::number;

use super::Answer;
use super::band::Band;
use super::curve::{At, Curve};
use super::running::{Scale, Surroundings, in_knots};

/// Lift against incidence and against drag, moment, where the layers turn turbulent, and the
/// cavitation bucket.
pub(super) fn charts(answer: &Answer) -> String {
    let with_friction = answer.curves.iter().any(|curve| curve.viscous().is_some());
    let mut charts = vec![lift(answer)];
    if with_friction {
        charts.push(drag(answer));
    }
    charts.extend(forces(answer));
    charts.push(moment(answer));
    if answer.curves.iter().any(|curve| curve.axis.is_some()) {
        charts.push(hinge(answer));
    }
    if with_friction {
        charts.push(turbulent(answer));
    }
    charts.push(bucket(answer));
    stacked(&charts)
}

/// A chart with what all curves have in common under its title.
fn chart(answer: &Answer, title: &str, [across, up]: [&str; 2], series: Vec<Series>) -> Chart {
    Chart {
        title: format!("{}: {title}", answer.section),
        subtitle: common(answer),
        across: across.to_owned(),
        up: up.to_owned(),
        series,
        ..Chart::default()
    }
}

const INCIDENCE: &str = "incidence, degrees";
const LIFT: &str = "lift coefficient";

fn lift(answer: &Answer) -> Chart {
    let with_friction = answer.curves.iter().any(|curve| curve.viscous().is_some());
    let title = if with_friction { "lift" } else { "lift without friction" };
    let lines = lines(answer, |angle, at| (angle, at.cl));
    let mut chart = chart(answer, title, [INCIDENCE, LIFT], lines);
    chart.up_too = scale(answer).map(|scale| newtons("lift", scale));
    chart.bands = shades(answer, |angle, at| (angle, at.cl));
    chart
}

fn drag(answer: &Answer) -> Chart {
    let point = |_: f64, at: &At<'_>| (at.cd.unwrap_or(f64::NAN), at.cl);
    let mut chart = chart(answer, "lift against drag", ["drag coefficient", LIFT], lines(answer, point));
    chart.across_too = scale(answer).map(|scale| newtons("drag", scale));
    chart.up_too = scale(answer).map(|scale| newtons("lift", scale));
    chart.bands = shades(answer, point);
    chart
}

/// At several speeds coefficients hide what the foil carries: forces, in charts of their own.
fn forces(answer: &Answer) -> Vec<Chart> {
    let scales = || answer.curves.iter().map(|curve| answer.surroundings.scale(curve.running));
    if scale(answer).is_some() || scales().any(|scale| scale.is_none()) {
        return Vec::new();
    }
    let line = |of: &dyn Fn(f64, &At<'_>, Scale) -> (f64, f64)| -> Vec<Series> {
        let lines = answer.curves.iter().zip(scales()).map(|(curve, scale)| {
            let point = |angle: f64, at: &At<'_>| scale.map_or((f64::NAN, f64::NAN), |s| of(angle, at, s));
            Series { name: name(answer, curve), points: points(curve, point) }
        });
        lines.collect()
    };
    let (force, up) = ("lift, N for each metre of span", [INCIDENCE, "lift, N/m"]);
    let mut charts = vec![chart(answer, force, up, line(&|angle, at, scale| (angle, scale.force * at.cl)))];
    if answer.curves.iter().any(|curve| curve.viscous().is_some()) {
        let of = |_: f64, at: &At<'_>, scale: Scale| {
            (scale.force * at.cd.unwrap_or(f64::NAN), scale.force * at.cl)
        };
        charts.push(chart(answer, "lift against drag, forces", ["drag, N/m", "lift, N/m"], line(&of)));
    }
    charts
}

fn moment(answer: &Answer) -> Chart {
    let lines = lines(answer, |angle, at| (angle, at.cm));
    chart(answer, "moment about the quarter chord", [INCIDENCE, "moment coefficient"], lines)
}

fn hinge(answer: &Answer) -> Chart {
    let lines = lines(answer, |angle, at| (angle, at.hinge_moment.unwrap_or(f64::NAN)));
    chart(answer, "moment about the flap's hinge", [INCIDENCE, "hinge moment coefficient"], lines)
}

fn turbulent(answer: &Answer) -> Chart {
    let mut series = Vec::new();
    type Transition = fn(&ViscousSolution) -> Option<f64>;
    let sides: [(&str, Transition); 2] =
        [("upper side", |s| s.upper.transition), ("lower side", |s| s.lower.transition)];
    for curve in &answer.curves {
        for (side, transition) in sides {
            let name = name(answer, curve);
            let point = |angle: f64, at: &At<'_>| {
                let place = at.viscous.and_then(transition);
                (angle, place.map_or(100.0, |x| 100.0 * x))
            };
            let joined = if name.is_empty() { side.to_owned() } else { format!("{name}, {side}") };
            series.push(Series { name: joined, points: points(curve, point) });
        }
    }
    chart(answer, "where the layers turn turbulent", [INCIDENCE, "percent of chord"], series)
}

fn bucket(answer: &Answer) -> Chart {
    let Surroundings { water, depth, margin, .. } = &answer.surroundings;
    let buckets: Vec<_> = answer.curves.iter().map(|curve| (name(answer, curve), curve.bucket())).collect();
    let mut speeds: Vec<(String, f64)> = Vec::new();
    for speed in answer.curves.iter().filter_map(|curve| curve.running.speed) {
        if speeds.iter().all(|known| known.1 != speed) {
            speeds.push((format!("at {}", in_knots(speed)), speed));
        }
    }
    let title = format!("{}: lift without cavitation", answer.section);
    Chart { subtitle: common(answer), ..bucket_chart(title, &buckets, water, *depth, *margin, &speeds) }
}

/// The points of a curve, with gaps where no flow was found.
fn points(curve: &Curve, point: impl Fn(f64, &At<'_>) -> (f64, f64)) -> Vec<(f64, f64)> {
    let gap = (f64::NAN, f64::NAN);
    curve.rows().iter().map(|row| row.at.as_ref().map_or(gap, |at| point(row.angle, at))).collect()
}

fn lines(answer: &Answer, point: impl Fn(f64, &At<'_>) -> (f64, f64) + Copy) -> Vec<Series> {
    let line = |curve| Series { name: name(answer, curve), points: points(curve, point) };
    answer.curves.iter().map(line).collect()
}

/// The bands between still and natural water.
fn shades(answer: &Answer, point: impl Fn(f64, &At<'_>) -> (f64, f64) + Copy) -> Vec<Shade> {
    let shade = |band: Band<'_>| Shade { from: points(band.still, point), to: points(band.natural, point) };
    Band::all(&answer.curves).into_iter().map(shade).collect()
}

/// What all curves share of chord and speed, for a further scale in forces.
fn scale(answer: &Answer) -> Option<Scale> {
    let first = answer.curves.first()?.running;
    let same = answer.curves.iter().all(|curve| curve.running == first);
    answer.surroundings.scale(first).filter(|_| same)
}

fn newtons(what: &str, scale: Scale) -> SecondScale {
    SecondScale { name: format!("{what}, N/m"), rule: Rule::Times(scale.force) }
}

/// What tells curves from each other, in the order in which it is named.
fn traits(curve: &Curve) -> [Option<String>; 4] {
    let speed = curve.running.speed.map(in_knots);
    let reynolds = curve.running.reynolds.map(|re| format!("Re {}", thousands(re)));
    [
        curve.axis.map(|_| format!("flap {}°", curve.flap)),
        speed.or(reynolds),
        curve.finish.map(|finish| finish.word().to_owned()),
        // A rough nose leaves nothing to amplify.
        curve
            .viscous()
            .filter(|_| curve.finish == Some(NoseFinish::Smooth))
            .map(|viscous| format!("N {}", viscous.conditions.amplification)),
    ]
}

/// The name of a curve among the others: what they do not share.
fn name(answer: &Answer, curve: &Curve) -> String {
    let own = traits(curve);
    let differs = |i: &usize| answer.curves.iter().any(|other| traits(other)[*i] != own[*i]);
    let parts: Vec<String> = (0..own.len()).filter(differs).filter_map(|i| own[i].clone()).collect();
    parts.join(", ")
}

/// What they do share.
fn common(answer: &Answer) -> String {
    let mut parts = Vec::new();
    parts.extend(answer.surroundings.chord.map(|chord| format!("chord {} mm", number(1e3 * chord, 1))));
    if let Some(first) = answer.curves.first() {
        let all = traits(first);
        let shared = |i: &usize| answer.curves.iter().all(|other| traits(other)[*i] == all[*i]);
        parts.extend((0..all.len()).filter(shared).filter_map(|i| all[i].clone()));
    }
    parts.join(", ")
}

/// A Reynolds number to three figures, as one would say it.
fn thousands(value: f64) -> String {
    if value >= 1e6 {
        format!("{} million", number(value / 1e6, 2))
    } else {
        format!("{} 000", number(value / 1e3, 0))
    }
}

//! What `plankform lift` shows of curves with friction.

use plankform::export::ExportError;
use plankform::export::chart::{Chart, Series, stacked};
use plankform::export::csv::csv;
use plankform::flow::{CurvePoint, LiftCurve, ViscousSolution, hinge_moment};
use plankform::geometry::Point;
use plankform::units::fixed;
use serde_json::{Value, json};

/// A curve with the flap at one angle; without a flap, of the section alone.
pub(super) struct FlapCurve {
    /// Degrees.
    pub(super) flap: f64,
    /// The axis of the flap, if there is one.
    pub(super) axis: Option<Point>,
    pub(super) curve: LiftCurve,
}

impl FlapCurve {
    fn hinge_moment(&self, solution: &ViscousSolution) -> Option<f64> {
        hinge_moment(&solution.pressure, self.axis?)
    }
}

pub(super) fn curve_json(one: &FlapCurve, pressure: bool) -> Value {
    let FlapCurve { flap, curve, .. } = one;
    let straight = curve.slope_and_zero_lift();
    let greatest = curve.greatest_lift();
    json!({
        "reynolds": curve.conditions.reynolds,
        "amplification": curve.conditions.amplification,
        "trip_upper": curve.conditions.trip_upper,
        "trip_lower": curve.conditions.trip_lower,
        "panels": curve.panels,
        "converged": curve.converged(),
        "flap_deg": flap,
        "slope_per_deg": straight.map(|(slope, _)| slope.to_radians()),
        "zero_lift_deg": straight.map(|(_, zero)| zero.to_degrees()),
        "cl_max": greatest.map(|(lift, _)| lift),
        "cl_max_deg": greatest.map(|(_, angle)| angle.to_degrees()),
        "points": curve.points.iter().map(|point| point_json(one, point, pressure)).collect::<Vec<_>>(),
    })
}

fn point_json(one: &FlapCurve, point: &CurvePoint, pressure: bool) -> Value {
    let solution = point.solution.as_ref();
    let number = |of: fn(&ViscousSolution) -> f64| solution.map(of);
    let mut value = json!({
        "angle_deg": angle(point),
        "converged": solution.is_some(),
        "cl": number(|s| s.cl),
        "cd": number(|s| s.cd),
        "cd_friction": number(|s| s.cd_friction),
        "cd_pressure": number(|s| s.cd_pressure),
        "cm": number(|s| s.cm),
        "hinge_moment": solution.and_then(|s| one.hinge_moment(s)),
        "cp_min": number(|s| s.cp_min),
        "transition_upper": solution.and_then(|s| s.upper.transition),
        "transition_lower": solution.and_then(|s| s.lower.transition),
        "separation_upper": solution.and_then(|s| s.upper.separation),
        "separation_lower": solution.and_then(|s| s.lower.separation),
        "bubble_upper": solution.and_then(|s| s.upper.bubble),
        "bubble_lower": solution.and_then(|s| s.lower.bubble),
    });
    if pressure {
        value["pressure"] =
            json!(solution.map(|s| s.pressure.iter().map(|p| [p.x, p.y, p.cp]).collect::<Vec<_>>()));
    }
    value
}

/// Incidence in degrees, without the dust of its way through radians.
fn angle(point: &CurvePoint) -> f64 {
    (point.incidence.to_degrees() * 1e9).round() / 1e9
}

pub(super) fn text(name: &str, curves: &[FlapCurve], pressure: bool) -> String {
    let mut text = format!("{name}, with friction\n");
    for one in curves {
        let curve = &one.curve;
        let conditions = &curve.conditions;
        let trip = |x: Option<f64>| x.map_or_else(|| "free".to_owned(), |x| format!("trip at {x}"));
        text.push_str(&format!(
            "\n{}Reynolds number {:.3e}, N = {}, upper side {}, lower side {}, {} panels, {} of {} points converged\n",
            one.axis.map_or(String::new(), |_| format!("flap {}°, ", one.flap)),
            conditions.reynolds,
            conditions.amplification,
            trip(conditions.trip_upper),
            trip(conditions.trip_lower),
            curve.panels,
            curve.converged(),
            curve.points.len()
        ));
        if let Some((slope, zero)) = curve.slope_and_zero_lift() {
            let zero = fixed(zero.to_degrees(), 2);
            text.push_str(&format!(
                "lift slope {:.4} per degree, zero lift at {zero}°\n",
                slope.to_radians()
            ));
        }
        match curve.greatest_lift() {
            Some((lift, at)) => {
                text.push_str(&format!("greatest lift {lift:.3} at {}°\n", fixed(at.to_degrees(), 1)));
            }
            None => text.push_str("greatest lift not within these angles\n"),
        }
        text.push_str(&format!(
            "\n{:>10}{:>9}{:>10}{:>9}{:>11}  {:<21}{}\n",
            "angle", "lift", "drag", "moment", "least cp", "turbulent from", "separation"
        ));
        for point in &curve.points {
            text.push_str(&line(point));
        }
        let moments = curve.points.iter().filter_map(|point| {
            let moment = one.hinge_moment(point.solution.as_ref()?)?;
            Some(format!("{:>9.2}°{:>10}\n", angle(point), fixed(moment, 4)))
        });
        if one.axis.is_some() {
            text.push_str("\n     angle  moment about the hinge, by the flap's chord, tail down positive\n");
            text.extend(moments);
        }
        for point in curve.points.iter().filter(|_| pressure) {
            if let Some(solution) = &point.solution {
                let heading =
                    format!("\npressure at {:.2}°\n{:>10}{:>10}{:>10}\n", angle(point), "x", "y", "cp");
                text.push_str(&heading);
                for p in &solution.pressure {
                    text.push_str(&format!("{:>10.5}{:>10.5}{:>10.4}\n", p.x, p.y, p.cp));
                }
            }
        }
    }
    text
}

fn line(point: &CurvePoint) -> String {
    let Some(s) = &point.solution else {
        return format!("{:>9.2}°   no solution found\n", angle(point));
    };
    let place = |x: Option<f64>| x.map_or_else(|| "–".to_owned(), |x| fixed(x, 3));
    let turbulent = format!("{} / {}", place(s.upper.transition), place(s.lower.transition));
    let mut events = Vec::new();
    for (word, side) in [("upper", &s.upper), ("lower", &s.lower)] {
        if let Some([from, to]) = side.bubble {
            events.push(format!("{word} bubble {from:.3} to {to:.3}"));
        }
        if let Some(from) = side.separation {
            events.push(format!("{word} from {from:.3}"));
        }
    }
    let line = format!(
        "{:>9.2}°{:>9}{:>10}{:>9}{:>11}  {:<21}{}",
        angle(point),
        fixed(s.cl, 4),
        fixed(s.cd, 5),
        fixed(s.cm, 4),
        fixed(s.cp_min, 3),
        turbulent,
        events.join(", ")
    );
    format!("{}\n", line.trim_end())
}

pub(super) fn table(curves: &[FlapCurve], pressure: bool) -> Result<String, ExportError> {
    let text = |value: Option<f64>| value.map_or_else(String::new, |value| fixed(value, 6));
    if pressure {
        let rows = curves.iter().flat_map(|FlapCurve { flap, curve, .. }| {
            curve.points.iter().flat_map(move |point| {
                let nodes = point.solution.iter().flat_map(|solution| &solution.pressure);
                nodes.map(move |p| {
                    [curve.conditions.reynolds, *flap, angle(point), p.x, p.y, p.cp].map(|v| fixed(v, 6))
                })
            })
        });
        return csv(["reynolds", "flap_deg", "angle_deg", "x_over_chord", "y_over_chord", "cp"], rows);
    }
    let rows = curves.iter().flat_map(|one| {
        let curve = &one.curve;
        curve.points.iter().map(move |point| {
            let s = point.solution.as_ref();
            let number = |of: fn(&ViscousSolution) -> f64| text(s.map(of));
            [
                fixed(curve.conditions.reynolds, 0),
                fixed(one.flap, 6),
                fixed(angle(point), 6),
                s.is_some().to_string(),
                number(|s| s.cl),
                number(|s| s.cd),
                number(|s| s.cd_friction),
                number(|s| s.cm),
                text(s.and_then(|s| one.hinge_moment(s))),
                number(|s| s.cp_min),
                text(s.and_then(|s| s.upper.transition)),
                text(s.and_then(|s| s.lower.transition)),
                text(s.and_then(|s| s.upper.separation)),
                text(s.and_then(|s| s.lower.separation)),
            ]
        })
    });
    let heading = [
        "reynolds",
        "flap_deg",
        "angle_deg",
        "converged",
        "cl",
        "cd",
        "cd_friction",
        "cm",
        "hinge_moment",
        "cp_min",
        "transition_upper",
        "transition_lower",
        "separation_upper",
        "separation_lower",
    ];
    csv(heading, rows)
}

/// Lift against incidence and against drag, moment, and where the layers become turbulent.
pub(super) fn charts(name: &str, curves: &[FlapCurve]) -> String {
    let words = |one: &FlapCurve| {
        let reynolds = format!("Re {:.2e}", one.curve.conditions.reynolds);
        one.axis.map_or_else(|| reynolds.clone(), |_| format!("{}°, {reynolds}", one.flap))
    };
    let lines = |words: &dyn Fn(&FlapCurve) -> String,
                 value: &dyn Fn(f64, &ViscousSolution) -> (f64, f64)|
     -> Vec<Series> {
        let line = |one: &FlapCurve| Series {
            name: words(one),
            points: one
                .curve
                .points
                .iter()
                .map(|point| point.solution.as_ref().map_or((f64::NAN, f64::NAN), |s| value(angle(point), s)))
                .collect(),
        };
        curves.iter().map(line).collect()
    };
    let chart = |title: &str, across: &str, up: &str, series: Vec<Series>| Chart {
        title: format!("{name}: {title}"),
        across: across.to_owned(),
        up: up.to_owned(),
        series,
        ..Chart::default()
    };
    let (incidence, lift) = ("incidence, degrees", "lift coefficient");
    let place = |x: Option<f64>| x.map_or(100.0, |x| 100.0 * x);
    let mut turbulent =
        lines(&|one| format!("{}, upper", words(one)), &|at, s| (at, place(s.upper.transition)));
    turbulent
        .extend(lines(&|one| format!("{}, lower", words(one)), &|at, s| (at, place(s.lower.transition))));
    stacked(&[
        chart("lift with friction", incidence, lift, lines(&words, &|at, s| (at, s.cl))),
        chart("lift against drag", "drag coefficient", lift, lines(&words, &|_, s| (s.cd, s.cl))),
        chart(
            "moment about the quarter chord",
            incidence,
            "moment coefficient",
            lines(&words, &|at, s| (at, s.cm)),
        ),
        chart("where the layers become turbulent", incidence, "percent of chord", turbulent),
    ])
}

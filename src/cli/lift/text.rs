//! The answer as text, for people.

use plankform::flow::{FreeLift, LayerPoint, SideFlow};
use plankform::units::{fixed, knots, number};

use super::Answer;
use super::band::Band;
use super::curve::{At, Curve, Row};
use super::running::{Surroundings, carries, in_knots};

pub(super) fn text(answer: &Answer) -> String {
    let name = &answer.section;
    let with_friction = answer.curves.iter().any(|curve| curve.viscous().is_some());
    let mut text = if with_friction {
        format!("{name}, with friction\n")
    } else {
        format!("{name}, flow without friction: no drag, no stall; real lift is lower near stall\n")
    };
    let around = &answer.surroundings;
    if around.chord.is_some() || around.depth.is_some() {
        text.push_str(&around.words());
        let mm = |length: f64| number(1e3 * length, 1);
        if let Some(chord) = around.chord {
            text.push_str(&format!(", chord {} mm", mm(chord)));
        }
        if let Some(depth) = around.depth {
            text.push_str(&format!(", {} mm below the surface", mm(depth)));
        }
        text.push('\n');
    }
    for curve in &answer.curves {
        text.push('\n');
        heading(&mut text, curve);
        summary(&mut text, curve);
        cavitation(&mut text, around, curve);
        coefficients(&mut text, curve);
        forces(&mut text, around, curve);
        if answer.with.pressure {
            pressure(&mut text, curve);
        }
        if answer.with.layers {
            layers(&mut text, curve);
        }
    }
    for band in Band::all(&answer.curves) {
        between(&mut text, &band);
    }
    text
}

/// What the curve is of, and what it rests on.
fn heading(text: &mut String, curve: &Curve) {
    let mut parts = Vec::new();
    if curve.axis.is_some() {
        parts.push(format!("flap {}°", curve.flap));
    }
    if let Some(speed) = curve.running.speed {
        parts.push(format!("{} ({speed:.2} m/s)", in_knots(speed)));
    }
    if let Some(viscous) = curve.viscous() {
        let conditions = &viscous.conditions;
        let trip = |x: Option<f64>| x.map_or_else(|| "free".to_owned(), |x| format!("trip at {x}"));
        parts.push(format!("Reynolds number {:.3e}", conditions.reynolds));
        parts.extend(curve.finish.map(|finish| format!("{} nose", finish.word())));
        parts.push(format!("N = {}", conditions.amplification));
        parts.push(format!("upper side {}", trip(conditions.trip_upper)));
        parts.push(format!("lower side {}", trip(conditions.trip_lower)));
        parts.push(format!("{} panels", viscous.panels));
        parts.push(format!("{} of {} points converged", viscous.converged(), viscous.points.len()));
    }
    if !parts.is_empty() {
        text.push_str(&format!("{}\n", parts.join(", ")));
    }
}

fn summary(text: &mut String, curve: &Curve) {
    let summary = curve.summary();
    if let (Some(slope), Some(zero)) = (summary.slope_per_degree, summary.zero_lift) {
        text.push_str(&format!("lift slope {slope:.4} per degree, zero lift at {}°\n", fixed(zero, 2)));
    }
    if curve.viscous().is_none() {
        return;
    }
    match summary.greatest_lift {
        Some([lift, at]) => text.push_str(&format!("greatest lift {lift:.3} at {}°\n", fixed(at, 1))),
        None => text.push_str("greatest lift not within these angles\n"),
    }
    if let (Some([cd, cl, at]), Some([ratio, best, best_at])) = (summary.least_drag, summary.best_ratio) {
        text.push_str(&format!(
            "least drag {cd:.5} at lift {} ({}°), most lift for the drag {ratio:.0} at lift {} ({}°)\n",
            fixed(cl, 3),
            number(at, 2),
            fixed(best, 3),
            number(best_at, 2)
        ));
    }
}

fn cavitation(text: &mut String, around: &Surroundings, curve: &Curve) {
    let Some(depth) = around.depth else { return };
    let bucket = curve.bucket();
    let Some(bottom) = bucket.bottom() else { return };
    let margin = if around.margin > 0.0 {
        format!(", with {} % to spare", number(100.0 * around.margin, 1))
    } else {
        String::new()
    };
    if let Some(speed) = around.inception_speed(-bottom.suction) {
        text.push_str(&format!(
            "cavitates latest at lift {}: from {} on{margin}\n",
            fixed(bottom.cl, 3),
            in_knots(speed)
        ));
    }
    let (Some(sigma), Some(speed)) = (around.cavitation_number(curve.running), curve.running.speed) else {
        return;
    };
    let free = match bucket.free_lift(sigma, around.margin) {
        None => "none of these lifts is free of cavitation".to_owned(),
        Some(FreeLift { from, to, open }) => {
            let end = |open: bool| if open { " (the end of the curve)" } else { "" };
            format!(
                "no cavitation from lift {}{} to {}{}",
                fixed(from, 2),
                end(open[0]),
                fixed(to, 2),
                end(open[1])
            )
        }
    };
    text.push_str(&format!(
        "cavitation number {sigma:.2} at {} and {} mm: {free}{margin}\n",
        in_knots(speed),
        number(1e3 * depth, 1)
    ));
}

fn coefficients(text: &mut String, curve: &Curve) {
    if curve.viscous().is_none() {
        let hinge = if curve.axis.is_some() { format!("{:>10}", "hinge") } else { String::new() };
        text.push_str(&format!("\n{:>10}{:>10}{:>10}{:>12}{hinge}\n", "angle", "lift", "moment", "least cp"));
        for row in curve.rows() {
            let Some(at) = row.at else { continue };
            let [cl, cm] = [at.cl, at.cm].map(|v| fixed(v, 4));
            let hinge = at.hinge_moment.map_or(String::new(), |moment| format!("{:>10}", fixed(moment, 4)));
            text.push_str(&format!("{:>9.2}°{cl:>10}{cm:>10}{:>12.3}{hinge}\n", row.angle, at.cp_min));
        }
    } else {
        text.push_str(&format!(
            "\n{:>10}{:>9}{:>10}{:>10}{:>9}{:>10}  {:<17}{}\n",
            "angle", "lift", "drag", "friction", "moment", "least cp", "turbulent from", "separation"
        ));
        for row in curve.rows() {
            text.push_str(&coefficient_line(&row));
        }
        if curve.axis.is_some() {
            text.push_str("\n     angle  moment about the hinge, by the flap's chord, tail down positive\n");
            for row in curve.rows() {
                if let Some(moment) = row.at.and_then(|at| at.hinge_moment) {
                    text.push_str(&format!("{:>9.2}°{:>10}\n", row.angle, fixed(moment, 4)));
                }
            }
        }
    }
}

fn coefficient_line(row: &Row<'_>) -> String {
    let Some(s) = row.at.and_then(|at| at.viscous) else {
        return format!("{:>9.2}°   no solution found\n", row.angle);
    };
    let place = |x: Option<f64>| x.map_or_else(|| "–".to_owned(), |x| fixed(x, 3));
    let turbulent = format!("{} / {}", place(s.upper.transition), place(s.lower.transition));
    let line = format!(
        "{:>9.2}°{:>9}{:>10}{:>10}{:>9}{:>10}  {:<17}{}",
        row.angle,
        fixed(s.cl, 4),
        fixed(s.cd, 5),
        fixed(s.cd_friction, 5),
        fixed(s.cm, 4),
        fixed(s.cp_min, 3),
        turbulent,
        events(&s.upper, &s.lower)
    );
    format!("{}\n", line.trim_end())
}

/// Bubbles and separation of both sides.
fn events(upper: &SideFlow, lower: &SideFlow) -> String {
    let mut events = Vec::new();
    for (word, side) in [("upper", upper), ("lower", lower)] {
        if let Some([from, to]) = side.bubble {
            events.push(format!("{word} bubble {from:.3} to {to:.3}"));
        }
        if let Some(from) = side.separation {
            events.push(format!("{word} from {from:.3}"));
        }
    }
    events.join(", ")
}

/// Forces on each metre of span, and where it cavitates.
fn forces(text: &mut String, around: &Surroundings, curve: &Curve) {
    let scale = around.scale(curve.running);
    if scale.is_none() && around.depth.is_none() {
        return;
    }
    let drag = curve.viscous().is_some();
    let mut heading = format!("\n{:>10}", "angle");
    if scale.is_some() {
        heading.push_str(&format!("{:>11}{:>11}", "lift, N/m", "kg/m"));
        if drag {
            heading.push_str(&format!("{:>11}", "drag, N/m"));
        }
        heading.push_str(&format!("{:>14}", "moment, Nm/m"));
        if curve.axis.is_some() {
            heading.push_str(&format!("{:>13}", "hinge, Nm/m"));
        }
    }
    if around.depth.is_some() {
        heading.push_str(&format!("{:>19}", "cavitates from, kn"));
    }
    text.push_str(&format!("{heading}\n"));
    for row in curve.rows() {
        let Some(at) = row.at else { continue };
        let mut line = format!("{:>9.2}°", row.angle);
        if let Some(scale) = scale {
            let lift = scale.force * at.cl;
            line.push_str(&format!("{:>11}{:>11}", fixed(lift, 1), fixed(carries(lift), 2)));
            if let Some(cd) = at.cd {
                line.push_str(&format!("{:>11}", fixed(scale.force * cd, 2)));
            }
            line.push_str(&format!("{:>14}", fixed(scale.moment * at.cm, 3)));
            if let Some(moment) = curve.hinge_force(&at, scale) {
                line.push_str(&format!("{:>13}", fixed(moment, 3)));
            }
        }
        if around.depth.is_some() {
            let speed = around.inception_speed(at.cp_min);
            line.push_str(&format!("{:>19}", speed.map_or("–".to_owned(), |v| fixed(knots(v), 1))));
        }
        text.push_str(&format!("{line}\n"));
    }
}

fn pressure(text: &mut String, curve: &Curve) {
    for Row { angle, at } in curve.rows() {
        let Some(At { pressure, .. }) = at else { continue };
        text.push_str(&format!("\npressure at {angle:.2}°\n{:>10}{:>10}{:>10}\n", "x", "y", "cp"));
        for p in pressure {
            text.push_str(&format!("{:>10.5}{:>10.5}{:>10.4}\n", p.x, p.y, p.cp));
        }
    }
}

fn layers(text: &mut String, curve: &Curve) {
    for row in curve.rows() {
        let Some(s) = row.at.and_then(|at| at.viscous) else { continue };
        let along: [(&str, &[LayerPoint]); 3] =
            [("upper side", &s.upper.layers), ("lower side", &s.lower.layers), ("wake", &s.wake)];
        for (side, layers) in along {
            text.push_str(&format!(
                "\nlayer of the {side} at {:.2}°\n{:>10}{:>10}{:>12}{:>12}{:>9}{:>11}  state\n",
                row.angle, "x", "speed", "theta", "delta*", "H", "cf"
            ));
            for l in layers {
                text.push_str(&format!(
                    "{:>10.5}{:>10.5}{:>12.7}{:>12.7}{:>9.4}{:>11.6}  {}\n",
                    l.x,
                    l.speed,
                    l.theta,
                    l.delta_star,
                    l.shape(),
                    l.cf,
                    if l.turbulent { "turbulent" } else { "laminar" }
                ));
            }
        }
    }
}

fn between(text: &mut String, band: &Band<'_>) {
    let Band { still, natural } = band;
    let mut of = Vec::new();
    if still.axis.is_some() {
        of.push(format!("flap {}°", still.flap));
    }
    of.extend(still.running.reynolds.map(|reynolds| format!("Reynolds number {reynolds:.3e}")));
    text.push_str(&format!(
        "\nbetween still water (N = {}) and natural water (N = {}), {}\n\
         How quiet the water is decides where the layers turn turbulent. As far as that goes, your foil does something between these.\n\n\
         {:>10}{:>12}{:>9}{:>12}{:>9}\n",
        still.amplification(),
        natural.amplification(),
        of.join(", "),
        "angle",
        "lift from",
        "to",
        "drag from",
        "to"
    ));
    for between in band.between() {
        let [[lift, most_lift], [drag, most_drag]] =
            [(between.cl, 4), (between.cd, 5)].map(|(range, places)| range.map(|value| fixed(value, places)));
        text.push_str(&format!("{:>9.2}°{lift:>12}{most_lift:>9}{drag:>12}{most_drag:>9}\n", between.angle));
    }
}

//! The answer as CSV: one table, of the curves, of the pressure or of the layers.

use plankform::export::ExportError;
use plankform::export::csv::csv;
use plankform::flow::LayerPoint;
use plankform::units::fixed;

use super::Answer;
use super::curve::{At, Curve, Row};

pub(super) fn table(answer: &Answer) -> Result<String, ExportError> {
    if answer.with.pressure {
        pressure(answer)
    } else if answer.with.layers {
        layers(answer)
    } else {
        curves(answer)
    }
}

fn or_nothing(value: Option<f64>) -> String {
    value.map_or_else(String::new, |value| fixed(value, 6))
}

/// What tells the curve of a row from another: Reynolds number, flap, exponent, finish, speed.
fn of_curve(curve: &Curve) -> [String; 5] {
    let conditions = curve.viscous().map(|viscous| viscous.conditions);
    [
        conditions.map_or_else(String::new, |c| fixed(c.reynolds, 0)),
        fixed(curve.flap, 6),
        or_nothing(conditions.map(|c| c.amplification)),
        curve.finish.map_or_else(String::new, |finish| finish.word().to_owned()),
        or_nothing(curve.running.speed),
    ]
}

fn curves(answer: &Answer) -> Result<String, ExportError> {
    let rows = answer.curves.iter().flat_map(|curve| {
        let row = move |row: &Row<'_>| curve_row(answer, curve, row);
        curve.rows().iter().map(row).collect::<Vec<_>>()
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
        "bubble_upper_from",
        "bubble_upper_to",
        "bubble_lower_from",
        "bubble_lower_to",
        "cd_pressure",
        "amplification",
        "finish",
        "speed_m_s",
        "lift_n_per_m",
        "lift_kg_per_m",
        "drag_n_per_m",
        "moment_nm_per_m",
        "hinge_moment_nm_per_m",
        "cavitation_speed_m_s",
    ];
    csv(heading, rows)
}

fn curve_row(answer: &Answer, curve: &Curve, row: &Row<'_>) -> [String; 28] {
    let around = &answer.surroundings;
    let at = row.at.as_ref();
    let viscous = at.and_then(|at| at.viscous);
    let number = |of: fn(&At<'_>) -> f64| or_nothing(at.map(of));
    let [upper, lower] = [viscous.map(|s| &s.upper), viscous.map(|s| &s.lower)];
    let [upper_bubble, lower_bubble] = [upper, lower].map(|side| side.and_then(|side| side.bubble));
    let real = at.zip(around.scale(curve.running));
    let [reynolds, flap, amplification, finish, speed] = of_curve(curve);
    [
        reynolds,
        flap,
        fixed(row.angle, 6),
        at.is_some().to_string(),
        number(|at| at.cl),
        or_nothing(at.and_then(|at| at.cd)),
        or_nothing(viscous.map(|s| s.cd_friction)),
        number(|at| at.cm),
        or_nothing(at.and_then(|at| at.hinge_moment)),
        number(|at| at.cp_min),
        or_nothing(upper.and_then(|side| side.transition)),
        or_nothing(lower.and_then(|side| side.transition)),
        or_nothing(upper.and_then(|side| side.separation)),
        or_nothing(lower.and_then(|side| side.separation)),
        or_nothing(upper_bubble.map(|bubble| bubble[0])),
        or_nothing(upper_bubble.map(|bubble| bubble[1])),
        or_nothing(lower_bubble.map(|bubble| bubble[0])),
        or_nothing(lower_bubble.map(|bubble| bubble[1])),
        or_nothing(viscous.map(|s| s.cd_pressure)),
        amplification,
        finish,
        speed,
        or_nothing(real.map(|(at, scale)| scale.force * at.cl)),
        or_nothing(real.map(|(at, scale)| super::running::carries(scale.force * at.cl))),
        or_nothing(real.and_then(|(at, scale)| Some(scale.force * at.cd?))),
        or_nothing(real.map(|(at, scale)| scale.moment * at.cm)),
        or_nothing(real.and_then(|(at, scale)| curve.hinge_force(at, scale))),
        or_nothing(at.and_then(|at| around.inception_speed(at.cp_min))),
    ]
}

fn pressure(answer: &Answer) -> Result<String, ExportError> {
    let mut rows = Vec::new();
    for curve in &answer.curves {
        for row in curve.rows() {
            for p in row.at.map_or(&[][..], |at| at.pressure) {
                let [reynolds, flap, amplification, finish, speed] = of_curve(curve);
                let [angle, x, y, cp] = [row.angle, p.x, p.y, p.cp].map(|v| fixed(v, 6));
                rows.push([reynolds, flap, angle, x, y, cp, amplification, finish, speed]);
            }
        }
    }
    let heading = [
        "reynolds",
        "flap_deg",
        "angle_deg",
        "x_over_chord",
        "y_over_chord",
        "cp",
        "amplification",
        "finish",
        "speed_m_s",
    ];
    csv(heading, rows)
}

/// Lengths in chords, speeds in onset speeds, friction by the edge speed.
fn layers(answer: &Answer) -> Result<String, ExportError> {
    let mut rows = Vec::new();
    for curve in &answer.curves {
        for row in curve.rows() {
            let Some(s) = row.at.and_then(|at| at.viscous) else { continue };
            let along: [(&str, &[LayerPoint]); 3] =
                [("upper", &s.upper.layers), ("lower", &s.lower.layers), ("wake", &s.wake)];
            for (side, layer) in along.iter().flat_map(|(side, along)| along.iter().map(move |l| (side, l))) {
                let [reynolds, flap, amplification, finish, speed] = of_curve(curve);
                let [x, y, length, edge_speed] =
                    [layer.x, layer.y, layer.length, layer.speed].map(|v| fixed(v, 6));
                let [theta, delta_star, cf] = [layer.theta, layer.delta_star, layer.cf].map(|v| fixed(v, 8));
                rows.push([
                    reynolds,
                    flap,
                    fixed(row.angle, 6),
                    (*side).to_owned(),
                    x,
                    y,
                    length,
                    edge_speed,
                    theta,
                    delta_star,
                    fixed(layer.shape(), 4),
                    cf,
                    fixed(layer.amplification, 3),
                    layer.turbulent.to_string(),
                    amplification,
                    finish,
                    speed,
                ]);
            }
        }
    }
    let heading = [
        "reynolds",
        "flap_deg",
        "angle_deg",
        "side",
        "x_over_chord",
        "y_over_chord",
        "length",
        "edge_speed",
        "theta",
        "delta_star",
        "shape",
        "cf",
        "amplification_here",
        "turbulent",
        "amplification",
        "finish",
        "speed_m_s",
    ];
    csv(heading, rows)
}

//! The answer as JSON.

use plankform::flow::{LayerPoint, Salinity, SideFlow, ViscousSolution};
use serde_json::{Value, json};

use super::band::Band;
use super::curve::{At, Curve, Row};
use super::{Answer, With, running};

pub(super) fn json(answer: &Answer) -> Value {
    let around = &answer.surroundings;
    let mut value = json!({
        "section": answer.section,
        "trailing_edge": answer.edge,
        "curves": answer.curves.iter().map(|one| curve(answer, one)).collect::<Vec<_>>(),
    });
    if around.chord.is_some() || around.depth.is_some() {
        value["surroundings"] = json!({
            "water": if around.salinity == Salinity::Sea { "sea" } else { "fresh" },
            "temperature_c": around.temperature,
            "density_kg_m3": around.water.density,
            "viscosity_m2_s": around.water.viscosity,
            "vapour_pressure_pa": around.water.vapour_pressure,
            "chord_mm": around.chord.map(|chord| 1e3 * chord),
            "depth_mm": around.depth.map(|depth| 1e3 * depth),
            "cavitation_margin": around.margin,
        });
    }
    let bands = Band::all(&answer.curves);
    if !bands.is_empty() {
        value["bands"] = bands.iter().map(band).collect();
    }
    value
}

fn curve(answer: &Answer, one: &Curve) -> Value {
    let around = &answer.surroundings;
    let (summary, conditions) = (one.summary(), one.viscous().map(|curve| curve.conditions));
    let [lift, drag, ratio] =
        [summary.greatest_lift.map(|[cl, at]| [cl, cl, at]), summary.least_drag, summary.best_ratio];
    let part = |of: Option<[f64; 3]>, i: usize| of.map(|of| of[i]);
    let sigma = around.cavitation_number(one.running);
    let free = sigma.and_then(|sigma| one.bucket().free_lift(sigma, around.margin));
    let mut value = json!({
        "reynolds": conditions.map(|c| c.reynolds),
        "amplification": conditions.map(|c| c.amplification),
        "trip_upper": conditions.and_then(|c| c.trip_upper),
        "trip_lower": conditions.and_then(|c| c.trip_lower),
        "panels": one.viscous().map(|curve| curve.panels),
        "converged": one.viscous().map(|curve| curve.converged()),
        "finish": one.finish.map(|finish| finish.word()),
        "speed_m_s": one.running.speed,
        "flap_deg": one.flap,
        "slope_per_deg": summary.slope_per_degree,
        "zero_lift_deg": summary.zero_lift,
        "cl_max": part(lift, 0),
        "cl_max_deg": part(lift, 2),
        "cd_min": part(drag, 0),
        "cd_min_cl": part(drag, 1),
        "cd_min_deg": part(drag, 2),
        "lift_over_drag_max": part(ratio, 0),
        "lift_over_drag_max_cl": part(ratio, 1),
        "lift_over_drag_max_deg": part(ratio, 2),
    });
    if let Some(sigma) = sigma {
        value["cavitation_number"] = json!(sigma);
        // Lift without cavitation at this speed and depth; null where there is none.
        value["cavitation_free_cl"] = json!(free.map(|free| [free.from, free.to]));
    }
    value["points"] = one.rows().iter().map(|row| point(answer, one, row)).collect();
    value
}

fn point(answer: &Answer, one: &Curve, row: &Row<'_>) -> Value {
    let at = row.at.as_ref();
    let viscous = at.and_then(|at| at.viscous);
    let number = |of: fn(&At<'_>) -> f64| at.map(of);
    let [upper, lower] = [viscous.map(|s| &s.upper), viscous.map(|s| &s.lower)];
    let mut value = json!({
        "angle_deg": row.angle,
        "converged": at.is_some(),
        "cl": number(|at| at.cl),
        "cd": at.and_then(|at| at.cd),
        "cd_friction": viscous.map(|s| s.cd_friction),
        "cd_pressure": viscous.map(|s| s.cd_pressure),
        "cm": number(|at| at.cm),
        "hinge_moment": at.and_then(|at| at.hinge_moment),
        "cp_min": number(|at| at.cp_min),
        "transition_upper": upper.and_then(|side| side.transition),
        "transition_lower": lower.and_then(|side| side.transition),
        "separation_upper": upper.and_then(|side| side.separation),
        "separation_lower": lower.and_then(|side| side.separation),
        "bubble_upper": upper.and_then(|side| side.bubble),
        "bubble_lower": lower.and_then(|side| side.bubble),
    });
    let around = &answer.surroundings;
    if let (Some(scale), Some(at)) = (around.scale(one.running), at) {
        value["lift_n_per_m"] = json!(scale.force * at.cl);
        value["lift_kg_per_m"] = json!(running::carries(scale.force * at.cl));
        value["drag_n_per_m"] = json!(at.cd.map(|cd| scale.force * cd));
        value["moment_nm_per_m"] = json!(scale.moment * at.cm);
        value["hinge_moment_nm_per_m"] = json!(one.hinge_force(at, scale));
    }
    if around.depth.is_some() {
        value["cavitation_speed_m_s"] = json!(at.and_then(|at| around.inception_speed(at.cp_min)));
    }
    let With { pressure, layers: with_layers } = answer.with;
    if pressure {
        let along = |at: &At<'_>| at.pressure.iter().map(|p| [p.x, p.y, p.cp]).collect::<Vec<_>>();
        value["pressure"] = json!(at.map(along));
    }
    if with_layers {
        value["layers"] = json!(viscous.map(layers));
    }
    value
}

/// The layers of both sides and the wake, quantity by quantity.
fn layers(s: &ViscousSolution) -> Value {
    let side = |side: &SideFlow| columns(&side.layers);
    json!({ "upper": side(&s.upper), "lower": side(&s.lower), "wake": columns(&s.wake) })
}

fn columns(layers: &[LayerPoint]) -> Value {
    let column = |of: fn(&LayerPoint) -> f64| layers.iter().map(of).collect::<Vec<_>>();
    json!({
        "x": column(|l| l.x),
        "y": column(|l| l.y),
        "length": column(|l| l.length),
        "edge_speed": column(|l| l.speed),
        "theta": column(|l| l.theta),
        "delta_star": column(|l| l.delta_star),
        "shape": column(LayerPoint::shape),
        "cf": column(|l| l.cf),
        "amplification": column(|l| l.amplification),
        "turbulent": layers.iter().map(|l| l.turbulent).collect::<Vec<_>>(),
    })
}

fn band(band: &Band<'_>) -> Value {
    let Band { still, natural } = band;
    let points = band
        .between()
        .into_iter()
        .map(|between| json!({ "angle_deg": between.angle, "cl": between.cl, "cd": between.cd }));
    json!({
        "reynolds": still.running.reynolds,
        "speed_m_s": still.running.speed,
        "flap_deg": still.flap,
        "finish": still.finish.map(|finish| finish.word()),
        "amplification": [still.amplification(), natural.amplification()],
        "points": points.collect::<Vec<_>>(),
    })
}

//! The loads that a part is held to: flight at each speed, and the cases of the design.

use crate::design::{Case, CaseLoad, Design};
use crate::loading::Loading;
use crate::pack::PackError;
use crate::strength::{LineLoad, LoadCase, PointLoad};
use crate::wing::Wing;

/// A case and whether it is part of sailing, in which deflection and twist are held to limits.
pub(super) struct Asked {
    pub(super) case: LoadCase,
    pub(super) is_sailing: bool,
}

/// A case of the design, with places from where the part is held.
pub(super) fn of_design(design: &Design, wing: &Wing, case: &Case) -> Result<Asked, PackError> {
    let held = design.strength.held_to.mm();
    // Where it acts on the chord at a place, in the foil's axes.
    let place = |at: f64| {
        let shape = wing.shape_at(at)?;
        let point = shape.to_foil() * crate::geometry::Point::new(case.on_chord * shape.chord, 0.0);
        Ok::<[f64; 2], PackError>([point.x, point.y])
    };
    let (name, factor) = (case.name.as_str(), case.factor);
    let load = match case.load {
        CaseLoad::SideForce { force, from, to } => {
            let (inner, outer) = (place(from)?[0], place(to)?[0]);
            let per_mm = force / (to - from);
            // The force follows its place on the chord along the span.
            let at = |at: f64, x: f64| LineLoad { at: at - held, force: [per_mm, 0.0], torque: -per_mm * x };
            LoadCase { spread: vec![vec![at(from, inner), at(to, outer)]], ..LoadCase::new(name, factor) }
        }
        CaseLoad::Grounding { pushes, at } => {
            LoadCase::grounding(name, factor, pushes, at - held, place(at)?[0])
        }
        CaseLoad::Tow { pull, off, at } => {
            LoadCase::off_course_tow(name, factor, pull, off, at - held, place(at)?)
        }
        CaseLoad::Standing { mass, at } => LoadCase::standing(name, factor, mass, at - held, place(at)?[0]),
        CaseLoad::Twist { moment, at } => {
            let load = PointLoad { at: at - held, torque: moment, ..PointLoad::default() };
            LoadCase { points: vec![load], ..LoadCase::new(name, factor) }
        }
    };
    Ok(Asked { case: load, is_sailing: matches!(case.load, CaseLoad::SideForce { .. }) })
}

/// A foil in flight: lift, drag and moment of every strip, in straight lines between the strips' middles,
/// lift falling to nothing at the tip.
pub(super) fn in_flight(design: &Design, name: &str, loading: &Loading) -> Asked {
    let (held, reach) = (design.strength.held_to.mm(), design.reach().mm());
    let mut row: Vec<LineLoad> = loading
        .strips
        .iter()
        .map(|strip| {
            let [x, _, y] = strip.quarter_chord;
            let (lift, drag) = (strip.lift_per_mm, strip.induced_drag_per_mm + strip.profile_drag_per_mm);
            // About the origin, nose up: as the library has it for a force across and along.
            let torque = 1e3 * strip.moment_per_mm + drag * y - lift * x;
            LineLoad { at: strip.at, force: [lift, drag], torque }
        })
        .collect();
    if let Some(first) = row.first().copied() {
        row.insert(0, LineLoad { at: 0.0, ..first });
        row.push(LineLoad { at: reach, ..LineLoad::default() });
    }
    let row = beyond(held, &row);
    let case = LoadCase { spread: vec![row], ..LoadCase::new(name, design.strength.flight_factor) };
    Asked { case, is_sailing: true }
}

/// The part of a row beyond a place, with places from there.
fn beyond(held: f64, row: &[LineLoad]) -> Vec<LineLoad> {
    let mut kept = Vec::with_capacity(row.len() + 1);
    for pair in row.windows(2) {
        let (a, b) = (pair[0], pair[1]);
        if a.at < held && held < b.at {
            let share = (held - a.at) / (b.at - a.at);
            let mix = |p: f64, q: f64| p + share * (q - p);
            kept.push(LineLoad {
                at: held,
                force: [mix(a.force[0], b.force[0]), mix(a.force[1], b.force[1])],
                torque: mix(a.torque, b.torque),
            });
        }
    }
    kept.extend(row.iter().filter(|load| load.at >= held).copied());
    kept.iter_mut().for_each(|load| load.at -= held);
    kept
}

//! The foil under its boat as tables: its speeds, and the load along its span.

use super::{Flight, FoilDuty};
use crate::export::ExportError;
use crate::export::csv::csv;
use crate::loading::Loading;
use crate::units::fixed;

/// What the foil does at each speed; empty where it does not carry its load.
pub(in crate::pack) fn speeds(foil: &FoilDuty, fingerprint: &str) -> Result<Vec<u8>, ExportError> {
    let row = |flight: &Flight| {
        let loading = flight.loading().ok();
        let known = |value: Option<f64>, places: usize| value.map_or(String::new(), |v| fixed(v, places));
        let of = |value: fn(&Loading) -> f64| loading.map(value);
        let partner = flight.partner.as_ref();
        let stiffness = |i: usize| flight.stiffness.map(|all| all[i]);
        [
            flight.name.to_owned(),
            fixed(flight.speed, 5),
            fixed(flight.depth, 1),
            fixed(flight.load, 3),
            known(of(|l| l.state.incidence.to_degrees()), 4),
            known(of(|l| l.state.flap.to_degrees()), 4),
            known(of(|l| l.lift), 3),
            known(of(|l| l.induced_drag), 3),
            known(of(|l| l.profile_drag), 3),
            known(of(|l| l.pitching_moment), 3),
            known(loading.and_then(|l| l.nearest_to_stall()?.stall_margin).map(f64::to_degrees), 3),
            known(flight.inception.map(|(speed, _)| speed), 3),
            known(flight.hinge_moment, 4),
            known(stiffness(0), 5),
            known(stiffness(1), 3),
            known(stiffness(2), 3),
            known(partner.map(|p| p.load), 3),
            known(partner.and_then(|p| p.carried.as_ref().ok()).map(|l| l.state.incidence.to_degrees()), 4),
            known(partner.and_then(|p| p.carried.as_ref().ok()).map(|l| l.pitching_moment), 3),
            known(partner.and_then(|p| p.downwash).map(f64::to_degrees), 4),
            fingerprint.to_owned(),
        ]
    };
    let heading = [
        "speed",
        "speed_m_s",
        "depth_mm",
        "load_N",
        "incidence_deg",
        "flap_deg",
        "lift_N",
        "induced_drag_N",
        "profile_drag_N",
        "pitching_moment_Nm",
        "stall_margin_deg",
        "cavitates_from_m_s",
        "hinge_moment_Nm",
        "lift_per_mm_deeper_N",
        "lift_per_degree_N",
        "lift_per_degree_of_flap_N",
        "other_load_N",
        "other_incidence_deg",
        "other_pitching_moment_Nm",
        "downwash_at_other_deg",
        "fingerprint",
    ];
    csv(heading, foil.flights.iter().map(row)).map(String::into_bytes)
}

/// Lift along the span at each speed.
pub(in crate::pack) fn span(foil: &FoilDuty, fingerprint: &str) -> Result<Vec<u8>, ExportError> {
    let rows = foil.flights.iter().filter_map(|flight| Some((flight, flight.loading().ok()?)));
    let rows = rows.flat_map(|(flight, loading)| {
        loading.strips.iter().map(move |strip| {
            [
                flight.name.to_owned(),
                fixed(strip.at, 3),
                fixed(strip.width, 4),
                fixed(strip.chord, 3),
                fixed(strip.lift_per_mm, 6),
                fixed(strip.lift_coefficient, 5),
                fixed(strip.downwash.to_degrees(), 4),
                fingerprint.to_owned(),
            ]
        })
    });
    let heading = [
        "speed",
        "from_root_mm",
        "width_mm",
        "chord_mm",
        "lift_N_per_mm",
        "lift_coefficient",
        "downwash_deg",
        "fingerprint",
    ];
    csv(heading, rows).map(String::into_bytes)
}

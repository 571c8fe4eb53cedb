//! Strength as a table: what the beam carries and does in every section that was looked at.

use super::PartStrength;
use crate::export::ExportError;
use crate::export::csv::csv;
use crate::units::{fixed, number};

/// Pairs are across (lift, side force) and along the chord. Forces, moments and reserves have the load factor in them, and so have slope, deflection and twist.
pub(in crate::pack) fn table(part: &PartStrength<'_>, fingerprint: &str) -> Result<Vec<u8>, ExportError> {
    let rows = part.cases.iter().flat_map(|outcome| {
        let result = &outcome.result;
        result.stations.iter().zip(part.member.sections()).map(move |(station, section)| {
            let node = result.beam.near(station.at);
            let reserve = |i: usize| fixed(station.reserves[i].reserve.min(999.0), 3);
            [
                result.name.clone(),
                number(result.factor, 3),
                number(station.at + part.held, 3),
                fixed(section.mass, 5),
                fixed(section.bending_across, 0),
                fixed(section.bending_along, 0),
                fixed(section.torsion, 0),
                fixed(node.shear[0], 4),
                fixed(node.shear[1], 4),
                fixed(node.moment[0], 2),
                fixed(node.moment[1], 2),
                fixed(node.torque, 2),
                fixed(node.compression, 3),
                fixed(node.deflection[0], 5),
                fixed(node.deflection[1], 5),
                fixed(node.twist.to_degrees(), 5),
                reserve(0),
                reserve(1),
                reserve(2),
                fingerprint.to_owned(),
            ]
        })
    });
    let heading = [
        "case",
        "load_factor",
        "station_mm",
        "mass_kg_per_m",
        "EI_across_Nmm2",
        "EI_along_Nmm2",
        "GJ_Nmm2",
        "shear_across_N",
        "shear_along_N",
        "moment_across_Nmm",
        "moment_along_Nmm",
        "torque_Nmm",
        "push_N",
        "deflection_across_mm",
        "deflection_along_mm",
        "twist_deg",
        "reserve_skin",
        "reserve_wrinkling",
        "reserve_core",
        "fingerprint",
    ];
    csv(heading, rows).map(String::into_bytes)
}

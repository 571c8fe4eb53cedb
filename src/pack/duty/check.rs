//! The foil under its boat among the checks.

use super::{Flight, FoilDuty};
use crate::design::Design;
use crate::loading::LoadingError;
use crate::pack::Check;

/// Every check of the foil under its boat.
pub(in crate::pack) fn checks(design: &Design, foil: &FoilDuty) -> Vec<Check> {
    let mut checks = vec![carries(foil)];
    for flight in &foil.flights {
        checks.extend(flap(design, flight));
        checks.push(stall(foil, flight));
        checks.extend(boils(flight));
        checks.extend(other(foil, flight));
    }
    checks
}

fn at_speed(flight: &Flight) -> String {
    format!("the whole foil at {}, {:.2} m/s", flight.name, flight.speed)
}

/// The foil must carry its load at the take-off speed.
fn carries(foil: &FoilDuty) -> Check {
    // Lift goes with the square of the speed.
    let (value, why) = match &foil.take_off {
        Ok(take_off) => {
            let value = foil.load * (foil.duty.take_off / take_off.speed).powi(2);
            let advice = if value >= foil.load { "" } else { ": take more area, more camber or less load" };
            let why = format!(
                "lift at take-off speed with {:.0} % of the greatest; the load is carried from {:.2} m/s on, at {:.1}° of incidence with {:.0} N of drag and {:.0} W{advice}",
                100.0 * foil.duty.share,
                take_off.speed,
                take_off.loading.state.incidence.to_degrees(),
                take_off.loading.drag(),
                take_off.loading.power(),
            );
            (value, why)
        }
        Err(error) => (0.0, error.to_string()),
    };
    Check {
        name: "the foil carries its load at take-off".to_owned(),
        place: "the whole foil".to_owned(),
        value,
        limit: foil.load,
        unit: "N".to_owned(),
        passed: value >= foil.load,
        why,
    }
}

/// The flap must carry the load within its travel.
fn flap(design: &Design, flight: &Flight) -> Option<Check> {
    let (flapped, of) = (flight.flapped.as_ref()?, design.flap?);
    let travel = |angle: f64| if angle < 0.0 { of.up.degrees() } else { of.down.degrees() };
    let (value, limit, passed, why) = match flapped {
        Ok(loading) => {
            let angle = loading.state.flap.to_degrees();
            let why = format!(
                "flap {} that carries {:.0} N as the foil is set, at {:.2}°",
                if angle < 0.0 { "up" } else { "down" },
                flight.load,
                loading.state.incidence.to_degrees()
            );
            (angle.abs(), travel(angle), true, why)
        }
        Err(error) => {
            let wanted = if matches!(error, LoadingError::TooLittle { .. }) { -1.0 } else { 1.0 };
            (
                travel(wanted),
                travel(wanted),
                false,
                format!("{error}: set it at another incidence, or give the flap more travel"),
            )
        }
    };
    Some(Check {
        name: "the flap holds the boat level".to_owned(),
        place: at_speed(flight),
        value,
        limit,
        unit: "deg".to_owned(),
        passed,
        why,
    })
}

/// Incidence must be left until any part stalls.
fn stall(foil: &FoilDuty, flight: &Flight) -> Check {
    let limit = foil.duty.stall_margin.degrees();
    let (value, why) = match flight.loading() {
        Ok(loading) => {
            match loading.nearest_to_stall().and_then(|strip| Some((strip, strip.stall_margin?))) {
                Some((strip, margin)) => (
                    margin.to_degrees(),
                    format!(
                        "incidence left until the greatest lift of its section, nearest {:.0} mm from the root, {:.1} N of drag",
                        strip.at,
                        loading.drag()
                    ),
                ),
                None => (limit, "no section shows a greatest lift within its curve".to_owned()),
            }
        }
        Err(error) => (0.0, error.to_string()),
    };
    let passed = value >= limit && flight.loading().is_ok();
    let advice = if passed { "" } else { ": take more area, more camber, or come up faster" };
    Check {
        name: "no part of the foil stalls".to_owned(),
        place: at_speed(flight),
        value,
        limit,
        unit: "deg".to_owned(),
        passed,
        why: format!("{why}{advice}"),
    }
}

/// The water must not boil at the foil as it carries its load.
fn boils(flight: &Flight) -> Option<Check> {
    let (value, at) = flight.inception?;
    let passed = value >= flight.speed;
    let advice = if passed { "" } else { ": less lift on more area, a flatter pressure, or less speed" };
    Some(Check {
        name: "the foil does not cavitate".to_owned(),
        place: at_speed(flight),
        value,
        limit: flight.speed,
        unit: "m/s".to_owned(),
        passed,
        why: format!(
            "speed from which the water boils at this load and {:.0} mm depth, first {at:.0} mm from the root{advice}",
            flight.depth
        ),
    })
}

/// The other foil must carry its share too.
fn other(foil: &FoilDuty, flight: &Flight) -> Option<Check> {
    let partner = flight.partner.as_ref()?;
    let limit = foil.duty.stall_margin.degrees();
    let (value, why) = match &partner.carried {
        Ok(loading) => {
            let margin = loading.nearest_to_stall().and_then(|strip| strip.stall_margin);
            (
                margin.map_or(limit, f64::to_degrees),
                format!(
                    "incidence that {} has left until it stalls, with {:.0} N at {:.2}° to the flow there",
                    partner.name,
                    partner.load,
                    loading.state.incidence.to_degrees()
                ),
            )
        }
        Err(error) => (0.0, error.to_string()),
    };
    Some(Check {
        name: "the boat balances on both foils".to_owned(),
        place: format!("{} at {}, {:.2} m/s", partner.name, flight.name, flight.speed),
        value,
        limit,
        unit: "deg".to_owned(),
        passed: partner.carried.is_ok() && value >= limit,
        why,
    })
}

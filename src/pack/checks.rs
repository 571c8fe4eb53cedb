//! What is checked before anything is cut.

use serde::Serialize;

use super::PackError;
use super::aids::{Aids, SectionFlow};
use super::checks_wood;
use super::friction::{Inception, StationCurves};
use super::station::{StationAids, place};
use super::surface::FAIRING;
use crate::design::Design;
use crate::flow::{LiftCurve, Water};
use crate::parts::GAP_SLACK;
use crate::workshop::Role;

/// One check: what was measured, where, and the limit it is held to.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Check {
    /// What is checked.
    pub name: String,
    /// Where on the foil.
    #[serde(rename = "where")]
    pub place: String,
    /// What was measured.
    pub value: f64,
    /// What it is held to.
    pub limit: f64,
    /// Unit of both; empty for a plain number.
    pub unit: String,
    /// Whether it holds.
    pub passed: bool,
    /// What that means, and what to do when it does not hold.
    pub why: String,
}

/// Runs every check of a design without making its pack.
///
/// # Errors
/// When a shape cannot be made at all.
pub fn run_checks(design: &Design) -> Result<Vec<Check>, PackError> {
    run_checks_telling(design, &|_, _| ())
}

/// The same, telling how many of how many lift curves are done: they take the longest.
///
/// # Errors
/// As [`run_checks`].
pub fn run_checks_telling(
    design: &Design,
    told: &(dyn Fn(usize, usize) + Sync),
) -> Result<Vec<Check>, PackError> {
    let wing = design.wing()?;
    Ok(all(design, &Aids::of(design, &wing, told)?))
}

pub(super) fn all(design: &Design, aids: &Aids<'_>) -> Vec<Check> {
    let Aids { stations, flows, water, curves, duty, .. } = aids;
    let mut checks = Vec::new();
    checks.extend(flows.iter().flat_map(|flow| lift(design, flow)));
    checks.extend(curves.iter().flat_map(|curves| stall(design, curves)));
    checks.extend(curves.iter().flat_map(|curves| cavitation(design, water, curves)));
    checks.extend(duty.iter().flat_map(|foil| super::duty::checks(design, foil)));
    checks.extend(aids.strength.iter().flat_map(|part| super::strength::checks(design, part)));
    checks.extend(stations.iter().flat_map(|station| shape(design, station)));
    checks.extend(aids.surface.battens.iter().map(|&(from, to, gap)| batten(design, from, to, gap)));
    checks.extend(stations.iter().filter_map(|station| flap_gap(design, station)));
    checks.extend(checks_wood::all(design, &aids.wood));
    checks.extend(super::workshop_checks::all(design, aids));
    checks
}

/// The design lift must lie within the range of incidence asked.
fn lift<'a>(design: &'a Design, flow: &'a SectionFlow<'_>) -> impl Iterator<Item = Check> + 'a {
    let range = &design.lift;
    let least = flow.flow.at(range.from.radians()).cl;
    let greatest = flow.flow.at(range.to.radians()).cl;
    let wanted = range.design;
    let passed = (least..=greatest).contains(&wanted);
    let why = match flow.flow.incidence_for_lift(wanted) {
        Some(incidence) if passed => format!(
            "{} carries a lift coefficient of {wanted} at {:.2}°, flow without friction",
            flow.section.name(),
            incidence.to_degrees()
        ),
        _ => format!(
            "from {} to {} {} gives lift coefficients of {least:.3} to {greatest:.3}, flow without friction: widen \
             the range, take another section or ask for less",
            range.from,
            range.to,
            flow.section.name()
        ),
    };
    // The nearer end of the range is what the limit is held against.
    let value = if wanted < least { least } else { greatest };
    let name = if wanted < least {
        "least lift in the range of incidence"
    } else {
        "greatest lift in the range of incidence"
    };
    at_each(&flow.stations, name, [value, wanted], "", passed, why)
}

/// The same check at each of some stations, with its value and its limit.
fn at_each(
    stations: &[f64],
    name: &'static str,
    [value, limit]: [f64; 2],
    unit: &'static str,
    passed: bool,
    why: String,
) -> impl Iterator<Item = Check> {
    stations.iter().map(move |at| Check {
        name: name.to_owned(),
        place: place(*at),
        value,
        limit,
        unit: unit.to_owned(),
        passed,
        why: why.clone(),
    })
}

/// With friction the design lift must lie below the greatest lift of the section at its speed.
fn stall<'a>(design: &'a Design, curves: &'a StationCurves<'_>) -> impl Iterator<Item = Check> + 'a {
    let wanted = design.lift.design;
    // A section that is asked to lift downwards is held to its least lift.
    let greatest = |curve: &LiftCurve| {
        if wanted >= 0.0 {
            StationCurves::greatest(curve)
        } else {
            (curve.solutions().map(|s| s.cl).fold(f64::INFINITY, f64::min), false)
        }
    };
    let (value, is_peak) = greatest(&curves.smooth);
    let (rough, _) = greatest(&curves.rough);
    let passed = if wanted >= 0.0 { value >= wanted } else { value <= wanted };
    let reynolds = curves.reynolds();
    let drag = StationCurves::at_lift(&curves.smooth, wanted).map_or(String::new(), |at| {
        format!(
            "; at the design lift {:.2}° and a drag coefficient of {:.4}",
            at.incidence.to_degrees(),
            at.cd
        )
    });
    let why = if passed {
        format!(
            "{} at Reynolds number {:.2e}{}, with a rough nose {rough:.2}{drag}",
            curves.section.name(),
            reynolds,
            if is_peak { "" } else { ", the most in the range of incidence" },
        )
    } else {
        format!(
            "{} at Reynolds number {reynolds:.2e}: take a section with more camber or thickness, more chord, or ask for less lift",
            curves.section.name()
        )
    };
    let name = "design lift lies below the greatest lift, with friction";
    at_each(&curves.stations, name, [value, wanted], "", passed, why)
}

/// At the design lift the water must not boil below the top speed.
fn cavitation<'a>(
    design: &'a Design,
    water: &Water,
    curves: &'a StationCurves<'_>,
) -> impl Iterator<Item = Check> + 'a {
    let limit = design.lift.top_speed.unwrap_or(design.lift.speed);
    // Where the section does not reach that lift, the check of stall says so.
    let found = curves.cavitates(design, water);
    let why = found.map_or(String::new(), |Inception { finish, suction, speed }| {
        let depth = crate::units::number(design.lift.depth.mm(), 0);
        let margin = design.lift.cavitation_margin;
        let spare = if margin > 0.0 {
            format!(", with {} % to spare", crate::units::number(100.0 * margin, 1))
        } else {
            String::new()
        };
        let advice = if speed >= limit {
            ""
        } else {
            ": less lift on more area, a thinner nose or a flatter pressure raises it"
        };
        format!(
            "speed at which the water boils at {depth} mm depth, at the design lift, where the greatest suction of the {} nose is {suction:.2}{spare}{advice}",
            finish.word()
        )
    });
    let stations = curves.stations.iter().filter_map(move |at| Some((at, found?.speed)));
    stations.map(move |(at, value)| Check {
        name: "the section does not cavitate".to_owned(),
        place: place(*at),
        value,
        limit,
        unit: "m/s".to_owned(),
        passed: value >= limit,
        why: why.clone(),
    })
}

/// No crossing, and wood everywhere between the surfaces.
fn shape(design: &Design, station: &StationAids<'_>) -> [Check; 2] {
    let at = station.shape.at;
    let outline = station.template.lines.iter().find(|line| line.role == Role::CutOutside);
    let crossing = outline.map(|line| line.path.refuse_crossings(design.router.tolerance.mm()));
    let simple = matches!(crossing, Some(Ok(())));
    let thickness = least_thickness(&station.shape);
    let name = station.shape.section_name();
    let chord = station.shape.chord;
    [
        Check {
            name: "outline crosses itself".to_owned(),
            place: place(at),
            value: if simple { 0.0 } else { 1.0 },
            limit: 0.0,
            unit: "places".to_owned(),
            passed: simple,
            why: match crossing {
                Some(Err(error)) => error.to_string(),
                _ => format!("{name} at a chord of {chord:.1} mm is one plain contour"),
            },
        },
        Check {
            name: "surfaces keep apart ahead of the trailing edge".to_owned(),
            place: place(at),
            value: thickness,
            limit: 0.0,
            unit: "mm".to_owned(),
            passed: thickness > 0.0,
            why: "least distance between the surfaces from 1 % to 99 % of chord; the upper must lie above"
                .to_owned(),
        },
    ]
}

/// Least distance between points of equal parameter on the two surfaces, from 1 % of chord to the
/// last 1 %, counted negative where they have changed sides.
fn least_thickness(shape: &crate::wing::StationShape<'_>) -> f64 {
    use crate::geometry::Curve;
    const PLACES: usize = 200;
    let roots = (0..=PLACES).map(|i| 0.1 + (0.995 - 0.1) * i as f64 / PLACES as f64);
    roots
        .map(|root| {
            let (upper, lower) = (shape.jet(-root).point, shape.jet(root).point);
            (upper - lower).hypot() * (upper.y - lower.y).signum()
        })
        .fold(f64::INFINITY, f64::min)
}

/// A batten from one template to the next must lie near a curved design.
fn batten(design: &Design, from: f64, to: f64, gap: f64) -> Check {
    let limit = design.fairing.map_or(FAIRING, |fairing| fairing.mm());
    let passed = gap <= limit;
    Check {
        name: "a batten between templates lies near the design".to_owned(),
        place: format!("{} to {} mm", crate::units::number(from, 3), crate::units::number(to, 3)),
        value: gap,
        limit,
        unit: "mm".to_owned(),
        passed,
        why: if passed {
            "this is what a straight batten takes off or leaves on a curved foil".to_owned()
        } else {
            format!(
                "name more places under [templates], or write fairing = \"{limit} mm\" there and have them chosen"
            )
        },
    }
}

/// The flap must keep clear of the main body throughout its travel.
fn flap_gap(design: &Design, station: &StationAids<'_>) -> Option<Check> {
    let (split, flap) = (station.wood.split.as_ref()?, design.flap?);
    let clearance = flap.clearance.mm();
    let passed = split.least_gap >= clearance - GAP_SLACK;
    let angle = split.least_gap_at.to_degrees();
    Some(Check {
        name: "flap keeps clear of the main body".to_owned(),
        place: place(station.shape.at),
        value: split.least_gap,
        limit: clearance,
        unit: "mm".to_owned(),
        passed,
        why: format!(
            "turned from {} up to {} down, the pieces come nearest at {angle:+.1}°{}",
            flap.up,
            flap.down,
            if passed {
                format!("; {:.2} mm at rest", split.gap_at_rest)
            } else {
                let [up, down] = split.free_travel.map(f64::to_degrees);
                format!(
                    ": {up:.1}° up and {down:.1}° down would keep clear, or move the axis towards the middle"
                )
            }
        ),
    })
}

/// The checks with those outside their limit first.
pub(super) fn worst_first(checks: &[Check]) -> impl Iterator<Item = &Check> {
    let outside = checks.iter().filter(|check| !check.passed);
    outside.chain(checks.iter().filter(|check| check.passed))
}

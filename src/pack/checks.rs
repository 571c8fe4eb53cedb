//! What is checked before anything is cut.

use serde::Serialize;

use super::PackError;
use super::aids::{Aids, SectionFlow, StationAids};
use super::friction::StationCurves;
use crate::design::Design;
use crate::flow::{LiftCurve, Water};
use crate::geometry::{Rect, Solid};
use crate::workshop::{Drawing, Half, Role};

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
    let wing = design.wing()?;
    Ok(all(design, &Aids::of(design, &wing)?))
}

/// How near to a curved design a batten is to lie where the design does not say, mm: what filler
/// makes up without being noticed. Common practice, no source.
const FAIRING: f64 = 0.5;

pub(super) fn all(design: &Design, aids: &Aids<'_>) -> Vec<Check> {
    let Aids { stations, pattern, flows, water, curves, duty, .. } = aids;
    let mut checks = Vec::new();
    checks.extend(flows.iter().flat_map(|flow| lift(design, flow)));
    checks.extend(curves.iter().flat_map(|curves| stall(design, curves)));
    checks.extend(curves.iter().flat_map(|curves| cavitation(design, water, curves)));
    checks.extend(duty.iter().flat_map(|foil| super::duty::checks(design, foil)));
    checks.extend(aids.strength.iter().flat_map(|part| super::strength::checks(design, part)));
    checks.extend(stations.iter().flat_map(|station| shape(design, station)));
    checks.extend(aids.battens.iter().map(|&(from, to, gap)| batten(design, from, to, gap)));
    checks.extend(stations.iter().filter_map(|station| flap_gap(design, station)));
    checks.extend(stations.iter().flat_map(cuts));
    checks.extend(stations.iter().flat_map(|station| printer(design, station)));
    checks.push(stock(design, "planform pattern", pattern));
    checks.extend(stations.iter().map(|s| stock(design, &place(s.shape.at), &s.template)));
    checks
}

fn place(at: f64) -> String {
    format!("station {} mm", crate::units::number(at, 3))
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
    let depth = design.lift.depth.mm() * 1e-3;
    let limit = design.lift.top_speed.unwrap_or(design.lift.speed);
    let at = StationCurves::at_lift(&curves.smooth, design.lift.design);
    let inception = at.and_then(|at| water.inception_speed(depth, at.cp_min));
    // Where the section does not reach that lift, the check of stall says so.
    let found = at.zip(inception);
    let why = found.map_or(String::new(), |(at, speed)| {
        let depth = crate::units::number(design.lift.depth.mm(), 0);
        let advice = if speed >= limit {
            ""
        } else {
            ": less lift on more area, a thinner nose or a flatter pressure raises it"
        };
        format!(
            "speed at which the water boils at {depth} mm depth, at the design lift, where the least pressure coefficient is {:.2}{advice}",
            at.cp_min
        )
    });
    let stations = curves.stations.iter().filter_map(move |at| Some((at, found?.1)));
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

/// Wood must be left beside every slot and bore.
fn cuts<'a>(station: &'a StationAids<'_>) -> impl Iterator<Item = Check> + 'a {
    station.wood.cuts.iter().map(|(cut, shape)| {
        let limit = cut.least_left.mm();
        let passed = shape.wood_left >= limit;
        Check {
            name: "wood is left beside the cut".to_owned(),
            place: format!("{}, {}", place(station.shape.at), cut.purpose),
            value: shape.wood_left,
            limit,
            unit: "mm".to_owned(),
            passed,
            why: match (passed, shape.wood_left > 0.0) {
                (true, _) => "least distance from it to another face of the wood".to_owned(),
                (_, true) => {
                    "make it shallower or narrower, or move it to where the section is thicker".to_owned()
                }
                (_, false) => "it goes through the other face: it is too deep or too wide there".to_owned(),
            },
        }
    })
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

/// What the outlines of flap and main body may take of the clearance, mm: each is followed with arcs.
const GAP_SLACK: f64 = 0.03;

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
            if passed { "" } else { ": ask for less travel, or move the axis towards the middle" }
        ),
    })
}

/// Each plate of a mask must lie on the bed, turned as it may be, and not stand too high.
fn printer(design: &Design, station: &StationAids<'_>) -> [Check; 2] {
    let margin = 2.0 * design.printer.margin.mm();
    let bed = [design.printer.bed_x, design.printer.bed_y].map(|side| side.mm() - margin);
    let height = design.printer.bed_z.mm();
    let plate = |half: Half, solid: &Solid| {
        let [x, y, z] = solid.size();
        let size = format!("{x:.2} by {y:.2} by {z:.2} mm");
        let room = format!("{:.2} by {:.2} by {height:.2} mm, the bed less its margin", bed[0], bed[1]);
        let flat = fits([x, y], bed);
        let low = z <= height;
        // What is told is what fails, and the length of the plate when nothing does.
        let (value, limit) = if low { (x.max(y), bed[0].max(bed[1])) } else { (z, height) };
        Check {
            name: "mask fits the printer bed".to_owned(),
            place: format!("{}, {} half", place(station.shape.at), half.word()),
            value,
            limit,
            unit: "mm".to_owned(),
            passed: flat && low,
            why: match (low, flat) {
                (true, true) => format!("{size} lies on {room}"),
                (false, _) => format!("{size} is higher than {room}: make the masks thinner"),
                (true, false) => format!(
                    "{size} is larger than {room}, turned any way: take a larger bed, thinner walls or a shorter chord"
                ),
            },
        }
    };
    [plate(Half::Upper, &station.mask.upper), plate(Half::Lower, &station.mask.lower)]
}

/// What is cut must lie on the stock sheet, either way round.
fn stock(design: &Design, place: &str, drawing: &Drawing) -> Check {
    let margin = 2.0 * design.stock.margin.mm();
    let sheet = [design.stock.length, design.stock.width].map(|side| side.mm() - margin);
    let cut = drawing.lines.iter().filter(|line| line.role == Role::CutOutside);
    let size = cut.map(|line| line.path.bounds()).reduce(|a, b| a.union(b)).unwrap_or(Rect::ZERO).size();
    let passed = fits([size.width, size.height], sheet);
    Check {
        name: "template fits the stock sheet".to_owned(),
        place: place.to_owned(),
        value: size.width.max(size.height),
        limit: sheet[0].max(sheet[1]),
        unit: "mm".to_owned(),
        passed,
        why: if passed {
            format!("{:.1} by {:.1} mm lies within the sheet less its margin", size.width, size.height)
        } else {
            format!(
                "{:.1} by {:.1} mm does not go on {:.0} by {:.0} mm: take a larger sheet or join two",
                size.width, size.height, sheet[0], sheet[1]
            )
        },
    }
}

/// Whether a rectangle lies within another, at any angle.
///
/// Source: W. B. Carver, solution to problem E 1225, American Mathematical Monthly 64 (1957); from
/// memory.
fn fits(piece: [f64; 2], room: [f64; 2]) -> bool {
    let ([p, q], [a, b]) = (longer_first(piece), longer_first(room));
    let diagonal = p * p + q * q;
    (p <= a && q <= b)
        || (p > a && b * diagonal >= 2.0 * p * q * a + (p * p - q * q) * (diagonal - a * a).sqrt())
}

fn longer_first([a, b]: [f64; 2]) -> [f64; 2] {
    if a >= b { [a, b] } else { [b, a] }
}

/// The checks with those outside their limit first.
pub(super) fn worst_first(checks: &[Check]) -> impl Iterator<Item = &Check> {
    let outside = checks.iter().filter(|check| !check.passed);
    outside.chain(checks.iter().filter(|check| check.passed))
}

#[cfg(test)]
mod tests {
    use super::fits;

    #[test]
    fn a_long_piece_may_lie_across_the_corners() {
        // A thin rod goes as far as the diagonal, 311.1 for 220 square.
        assert!(fits([311.0, 0.01], [220.0, 220.0]) && !fits([311.2, 0.01], [220.0, 220.0]));
        // At 45 degrees a square of side s holds a piece whose sides add up to s times root two.
        assert!(fits([250.0, 61.0], [220.0, 220.0]) && !fits([250.0, 62.0], [220.0, 220.0]));
        assert!(fits([100.0, 220.0], [220.0, 100.0]) && !fits([100.0, 221.0], [220.0, 100.0]));
        assert!(!fits([150.0, 150.0], [1000.0, 149.0]));
    }
}

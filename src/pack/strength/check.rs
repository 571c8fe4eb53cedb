//! Strength among the checks.

use super::{Mend, Outcome, PartStrength};
use crate::design::Design;
use crate::pack::Check;
use crate::section::Side;
use crate::units::number;

/// Stands behind every result.
pub(in crate::pack) const CAUTION: &str =
    "not a certification: use tested values; local codes and licensed practice come first";

/// Reserve of each case, deflection and twist in service, the glue.
pub(in crate::pack) fn checks(design: &Design, part: &PartStrength<'_>) -> Vec<Check> {
    let mut checks: Vec<Check> = part.cases.iter().map(|outcome| reserve(design, part, outcome)).collect();
    checks.extend(worst(part, |outcome| outcome.deflection().abs()).map(|outcome| {
        let value = outcome.deflection().abs();
        let passed = value <= part.most_deflection;
        let advice = if passed { "" } else { ": more plies along the span, or a thicker section" };
        Check {
            name: "the far end bends little".to_owned(),
            place: format!("far end, {}", outcome.result.name),
            value,
            limit: part.most_deflection,
            unit: "mm".to_owned(),
            passed,
            why: format!("across, without the load factor{advice}; {}", caution(part)),
        }
    }));
    checks.extend(worst(part, |outcome| outcome.twist().abs()).map(|outcome| {
        let (value, limit) = (outcome.twist().to_degrees(), design.strength.twist.degrees());
        let passed = value.abs() <= limit;
        let advice = if passed { "" } else { ": plies at ±45 stiffen it against twist" };
        Check {
            name: "the far end twists little".to_owned(),
            place: format!("far end, {}", outcome.result.name),
            value: value.abs(),
            limit,
            unit: "deg".to_owned(),
            passed,
            why: format!(
                "nose {}, without the load factor: so much its incidence changes{advice}; {}",
                if value < 0.0 { "down" } else { "up" },
                caution(part)
            ),
        }
    }));
    checks.extend(part.joints.iter().map(|outcome| {
        let limit = design.strength.reserve;
        let passed = outcome.reserve >= limit;
        let advice = if passed { "" } else { ": glue it in deeper" };
        Check {
            name: "the glue holds".to_owned(),
            place: format!("{}, {}", outcome.joint.purpose, outcome.case),
            value: outcome.reserve,
            limit,
            unit: String::new(),
            passed,
            why: format!(
                "strength over mean shear of the glue, {} deep all round{advice}; {}",
                outcome.joint.depth,
                caution(part)
            ),
        }
    }));
    checks
}

/// The sailing case in which something is greatest.
fn worst<'a>(part: &'a PartStrength<'_>, value: impl Fn(&Outcome) -> f64) -> Option<&'a Outcome> {
    let sailing = part.cases.iter().filter(|outcome| outcome.is_sailing);
    sailing.max_by(|a, b| value(a).total_cmp(&value(b)))
}

fn reserve(design: &Design, part: &PartStrength<'_>, outcome: &Outcome) -> Check {
    let least = outcome.result.least();
    let limit = design.strength.reserve;
    let passed = least.reserve.reserve >= limit;
    let cure = match &part.cure {
        _ if passed => String::new(),
        Some(Ok(mend)) => format!(": {}", mend.words()),
        Some(Err(error)) => format!(": {error}"),
        None => String::new(),
    };
    Check {
        name: "it does not break".to_owned(),
        place: format!(
            "{} mm from the root, {} side, {}",
            number(least.at + part.held, 0),
            side(least.reserve.side),
            outcome.result.name
        ),
        value: least.reserve.reserve,
        limit,
        unit: String::new(),
        passed,
        why: format!(
            "strength over stress with a load factor of {}; first {}{cure}; {}",
            number(outcome.result.factor, 2),
            least.reserve.mode.words(),
            caution(part)
        ),
    }
}

pub(in crate::pack) fn side(side: Side) -> &'static str {
    if side == Side::Upper { "upper" } else { "lower" }
}

/// The caution, with the materials that are not tested.
fn caution(part: &PartStrength<'_>) -> String {
    if part.untested.is_empty() {
        return CAUTION.to_owned();
    }
    format!("values of {} were not tested; {CAUTION}", part.untested.join(", "))
}

impl Mend<'_> {
    /// What to lay where.
    pub(in crate::pack) fn words(&self) -> String {
        format!(
            "{} more of {} {} g/m² on both sides, full chord, from {} to {} mm, brings every case to {} or more",
            self.count,
            self.ply.cloth,
            number(self.ply.weight, 0),
            number(self.from, 0),
            number(self.to, 0),
            number((self.reserve * 100.0).floor() / 100.0, 2)
        )
    }
}

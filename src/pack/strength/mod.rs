//! Whether the part breaks: its reserves under flight and under the cases of its design.

mod cases;
mod check;
mod section;
mod table;

pub(super) use check::{CAUTION, checks, side};
pub(super) use table::table;

use super::PackError;
use crate::design::{Design, Joint, Ply};
use crate::loading::Loading;
use crate::strength::{
    CaseResult, Criteria, Layer, LoadCase, Member, Provenance, StrengthError, bond_reserve, bond_shear,
};
use crate::wing::Wing;
use cases::Asked;

/// A part under all its cases.
pub(super) struct PartStrength<'a> {
    pub(super) member: Member,
    pub(super) cases: Vec<Outcome>,
    pub(super) joints: Vec<JointOutcome<'a>>,
    /// What mends it, where the least reserve is below what is asked.
    pub(super) cure: Option<Result<Mend<'a>, StrengthError>>,
    /// Materials whose values were not tested.
    pub(super) untested: Vec<String>,
    /// How far from the root it is held, mm.
    pub(super) held: f64,
    /// Most that the far end may move across in service, mm.
    pub(super) most_deflection: f64,
}

/// The part under one case.
pub(super) struct Outcome {
    pub(super) result: CaseResult,
    pub(super) is_sailing: bool,
}

/// A joint in the case that asks most of it.
pub(super) struct JointOutcome<'a> {
    pub(super) joint: &'a Joint,
    pub(super) case: String,
    pub(super) reserve: f64,
}

/// More of a ply of the design.
pub(super) struct Mend<'a> {
    pub(super) ply: &'a Ply,
    pub(super) count: usize,
    /// From where to where along the span, mm from the root.
    pub(super) from: f64,
    pub(super) to: f64,
    /// The least reserve with it.
    pub(super) reserve: f64,
}

impl Outcome {
    /// How far the tip moves across under the load itself, mm.
    pub(super) fn deflection(&self) -> f64 {
        self.result.beam.tip().deflection[0] / self.result.factor
    }

    /// Nose-up twist of the tip under the load itself, radians.
    pub(super) fn twist(&self) -> f64 {
        self.result.beam.tip().twist / self.result.factor
    }
}

/// The strength of a part, or in words why nothing is said of it. `flight`: loads with the names of
/// their speeds.
pub(super) fn of<'a>(
    design: &'a Design,
    wing: &Wing,
    flight: &[(String, &Loading)],
    more: Option<LoadCase>,
) -> Result<Result<PartStrength<'a>, String>, PackError> {
    if let Some(why) = missing(design) {
        return Ok(Err(why.to_owned()));
    }
    let strength = &design.strength;
    let held = strength.held_to.mm();
    let mut asked: Vec<Asked> =
        flight.iter().map(|(name, loading)| cases::in_flight(design, name, loading)).collect();
    asked.extend(more.into_iter().map(|case| Asked { case, is_sailing: true }));
    for case in &strength.cases {
        asked.push(cases::of_design(design, wing, case)?);
    }
    if asked.is_empty() {
        return Ok(Err("no load is named: add a [duty], a [boat] or a [[case]]".to_owned()));
    }
    let points = asked.iter().flat_map(|asked| &asked.case.points).map(|load| load.at + held);
    let mut others: Vec<f64> = points.collect();
    others.extend(strength.joints.iter().map(|joint| joint.at.mm()));
    let member = section::member(design, wing, &others)?;
    let criteria = Criteria::default();
    let outcomes = asked.iter().map(|asked| {
        let result = member.under(&asked.case, criteria)?;
        Ok(Outcome { result, is_sailing: asked.is_sailing })
    });
    let cases: Vec<Outcome> = outcomes.collect::<Result<_, StrengthError>>()?;
    let least =
        cases.iter().map(|outcome| outcome.result.least().reserve.reserve).fold(f64::INFINITY, f64::min);
    let cure = if least < strength.reserve {
        let loads: Vec<LoadCase> = asked.into_iter().map(|asked| asked.case).collect();
        Some(mend(design, &member, &loads)?)
    } else {
        None
    };
    let joints = strength.joints.iter().map(|joint| glued(design, wing, joint, &cases));
    let mut untested = member.untested();
    let glue = strength.joints.iter().filter(|joint| joint.source != Provenance::Tested);
    untested.extend(glue.map(|joint| format!("glue of {}", joint.purpose)));
    Ok(Ok(PartStrength {
        joints: joints.collect::<Result<_, PackError>>()?,
        most_deflection: strength.deflection.map_or(0.05 * member.beam().reach(), |most| most.mm()),
        member,
        cases,
        cure,
        untested,
        held,
    }))
}

/// Why nothing can be said, if so.
fn missing(design: &Design) -> Option<&'static str> {
    if design.plies.is_empty() {
        Some("it has no laminate: strength is worked out for plies over a core")
    } else if design.plies.iter().any(|ply| ply.material.is_none()) {
        Some("its plies name no materials: add a [[material]] for each, and the values of [wood]")
    } else if design.strength.core.is_none() {
        Some("the values of the wood are missing: add them to [wood]")
    } else {
        None
    }
}

/// The joint in its worst case.
fn glued<'a>(
    design: &Design,
    wing: &Wing,
    joint: &'a Joint,
    cases: &[Outcome],
) -> Result<JointOutcome<'a>, PackError> {
    let at = joint.at.mm();
    let outline = section::laminate_outline(design, &wing.shape_at(at)?)?;
    let outline = crate::strength::outline_points(&outline);
    let mut worst: Option<JointOutcome<'a>> = None;
    for outcome in cases {
        let node = outcome.result.beam.near(at - design.strength.held_to.mm());
        let stress = bond_shear(&outline, joint.depth.mm(), &node)?;
        let reserve = bond_reserve(joint.strength, stress);
        if worst.as_ref().is_none_or(|known| reserve < known.reserve) {
            worst = Some(JointOutcome { joint, case: outcome.result.name.clone(), reserve });
        }
    }
    worst.ok_or_else(|| StrengthError::NoCases.into())
}

/// The fewest more plies of a kind that the design has already; of kinds alike in number the lighter.
fn mend<'a>(
    design: &'a Design,
    member: &Member,
    loads: &[LoadCase],
) -> Result<Result<Mend<'a>, StrengthError>, PackError> {
    let held = design.strength.held_to.mm();
    let skin = design.skin();
    let mut kinds: Vec<(&Ply, Layer)> = Vec::new();
    for (ply, laid) in design.plies.iter().zip(&skin.plies) {
        let layer = section::layer(design, ply, laid.thickness)?;
        if kinds.iter().all(|(_, known)| *known != layer) {
            kinds.push((ply, layer));
        }
    }
    let mut best: Option<Mend<'a>> = None;
    let mut failure = StrengthError::NoCases;
    for (ply, layer) in &kinds {
        match member.cure(loads, Criteria::default(), layer, design.strength.reserve) {
            Ok(cure) => {
                let better = best.as_ref().is_none_or(|known| {
                    (cure.plies, ply.weight).partial_cmp(&(known.count, known.ply.weight))
                        == Some(std::cmp::Ordering::Less)
                });
                if better {
                    let (from, to) = (*cure.span.start(), *cure.span.end());
                    best = Some(Mend {
                        ply,
                        count: cure.plies,
                        // What begins where it is held runs on into what holds it.
                        from: if from > 0.0 { (from + held).floor() } else { 0.0 },
                        to: (to + held).ceil().min(design.reach().mm()),
                        reserve: cure.least.reserve.reserve,
                    });
                }
            }
            Err(error @ StrengthError::NoCure { .. }) => failure = error,
            Err(error) => return Err(error.into()),
        }
    }
    Ok(best.ok_or(failure))
}

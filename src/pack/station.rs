//! What is made at each template station: its shape, its templates, its masks, its wood.

use super::PackError;
use super::printed::{self, StationMask};
use crate::design::{Cut, Design};
use crate::geometry::{ArcPath, follow_with_arcs};
use crate::parts::{Core, CutShape, Split, split};
use crate::units::number;
use crate::wing::{StationShape, Wing};
use crate::workshop::{Drawing, Role, Stamp, part_template, station_template};

/// The aids of one template station.
pub(super) struct StationAids<'a> {
    pub(super) shape: StationShape<'a>,
    pub(super) template: Drawing,
    pub(super) masks: Vec<StationMask>,
    pub(super) wood: Wood<'a>,
}

/// The wood of a station: what is cut before anything is laid over it.
pub(super) struct Wood<'a> {
    /// Templates of the pieces, each with its role and the ending of its file's name.
    pub(super) templates: Vec<(&'static str, &'static str, Drawing)>,
    /// Where the wood ends behind, mm from the nose along the chord, where the skins meet there.
    pub(super) ends_at: Option<f64>,
    /// Where it becomes thinner than the shop can shape, mm from the nose.
    pub(super) thin_behind: Option<f64>,
    /// The flap, parted.
    pub(super) split: Option<Split>,
    /// Slots and bores: what the design says of each, and its shape.
    pub(super) cuts: Vec<(&'a Cut, CutShape)>,
}

impl Wood<'_> {
    /// Where the finished surface itself is cut.
    fn none() -> Self {
        Self { templates: Vec::new(), ends_at: None, thin_behind: None, split: None, cuts: Vec::new() }
    }
}

/// A station as checks name it.
pub(super) fn place(at: f64) -> String {
    format!("station {} mm", number(at, 3))
}

pub(super) fn stamp(design: &Design) -> Stamp {
    Stamp { design: design.name.clone(), fingerprint: design.fingerprint() }
}

/// Shapes, templates and masks of every template station.
pub(super) fn station_aids<'a>(
    design: &'a Design,
    wing: &'a Wing,
) -> Result<Vec<StationAids<'a>>, PackError> {
    let (stamp, hinge) = (stamp(design), design.hinge_line());
    let skin = design.skin();
    let at_station = |at: f64| {
        let failed = |source| PackError::Shape { at, source };
        let shape = wing.shape_at(at)?;
        let tolerance = design.router.tolerance.mm();
        let finished = follow_with_arcs(&shape, tolerance).map_err(failed)?;
        finished.refuse_crossings(tolerance).map_err(failed)?;
        let template = station_template(&stamp, &shape, &finished, hinge.as_ref(), design.kind.mirrored());
        let is_cut_in_wood = design.has_skin()
            || design.cuts_at(at).next().is_some()
            || design.hinge_at(at, shape.chord).is_some();
        let core = if is_cut_in_wood { Some(Core::of(&shape, &skin)?) } else { None };
        let wood = core.as_ref().map_or(Ok(Wood::none()), |core| wood(design, core, &stamp, &finished))?;
        let masks =
            printed::station_masks(design, &stamp, &shape, &finished, core.as_ref()).map_err(failed)?;
        Ok(StationAids { template, masks, wood, shape })
    };
    design.templates.iter().map(|at| at_station(at.mm())).collect()
}

/// The wood at a station and its templates.
fn wood<'a>(
    design: &'a Design,
    core: &Core<'_>,
    stamp: &Stamp,
    finished: &ArcPath,
) -> Result<Wood<'a>, PackError> {
    let shape = core.shape();
    let mut wood = Wood::none();
    let hinge = design.hinge_at(shape.at, shape.chord);
    let tolerance = design.router.tolerance.mm();
    let failed = |source| PackError::Shape { at: shape.at, source };
    wood.ends_at = core.ends_in_laminate().then(|| core.tail().x);
    wood.thin_behind = core.thin_behind(design.laminate.least_wood.mm());
    wood.cuts = design.cuts_at(shape.at).map(|(cut, shape)| (cut, shape.of(core))).collect();
    let ends: Vec<String> = wood
        .ends_at
        .iter()
        .map(|x| format!("behind {x:.1} mm from the nose there is laminate alone"))
        .collect();
    let cuts = &wood.cuts;
    let templates = &mut wood.templates;
    let mut add = |role, ending, name, path: &ArcPath, words: &[String]| {
        let mut drawing = part_template(stamp, shape, finished, design.kind.mirrored(), (name, path), words);
        // Each cut is drawn where its middle lies in this piece.
        let within = |cut: &CutShape| {
            let (middle, bounds) = (cut.outline.bounds().center(), path.bounds());
            bounds.x0 <= middle.x && middle.x <= bounds.x1
        };
        for (_, cut) in cuts.iter().filter(|(_, cut)| within(cut)) {
            drawing.add(Role::CutInside, cut.outline.clone());
        }
        templates.push((role, ending, drawing));
    };
    match hinge {
        None => {
            let path = follow_with_arcs(core, tolerance).map_err(failed)?;
            add("core template", "core", "core", &path, &ends);
        }
        Some(hinge) => {
            let split = split(core, &hinge, tolerance)?;
            let Split { axis, .. } = split;
            let axis = format!("hinge axis {:.2} mm from the nose, {:.2} mm above the chord", axis.x, axis.y);
            let words: Vec<String> = std::iter::once(axis).chain(ends).collect();
            add("main body template", "main", "main body", &split.main.core, &words);
            add("flap template", "flap", "flap", &split.flap.core, &words);
            wood.split = Some(split);
        }
    }
    Ok(wood)
}

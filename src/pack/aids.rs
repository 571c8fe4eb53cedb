//! Everything that a design's pack and its checks are made from, worked out once.

use super::PackError;
use super::duty::{FoilDuty, strut_case};
use super::friction::{StationCurves, water};
use super::strength::{self, PartStrength};
use crate::design::{Cut, Design};
use crate::flow::{DEFAULT_PANELS, Panelling, PotentialFlow, Solution, Water};
use crate::geometry::{ArcPath, follow_with_arcs};
use crate::parts::{Core, CutShape, Laminate, Split, WoodPiece, split};
use crate::section::Section;
use crate::wing::{Law, Planform, StationShape, Wing};
use crate::workshop::{
    Drawing, HingeLine, Mask, MaskMarks, MaskSettings, Role, Stamp, part_template, planform_pattern,
    station_template,
};

/// Greatest distance of a printed opening from its curve, mm: below what a printer resolves.
const PRINT_TOLERANCE: f64 = 0.02;

/// All of it.
pub(super) struct Aids<'a> {
    pub(super) planform: Planform,
    pub(super) pattern: Drawing,
    pub(super) stations: Vec<StationAids<'a>>,
    pub(super) flows: Vec<SectionFlow<'a>>,
    pub(super) water: Water,
    pub(super) curves: Vec<StationCurves<'a>>,
    pub(super) duty: Option<FoilDuty>,
    /// Whether it breaks, or why nothing is said of it.
    pub(super) strength: Result<PartStrength<'a>, String>,
    pub(super) pieces: Vec<WoodPiece>,
    /// From one template to the next of a curved foil, and how far a batten between them is from it.
    pub(super) battens: Vec<(f64, f64, f64)>,
}

impl<'a> Aids<'a> {
    /// Works out a design, whose own foil `wing` is.
    pub(super) fn of(design: &'a Design, wing: &'a Wing) -> Result<Self, PackError> {
        let planform = wing.planform();
        let water = water(design)?;
        let curves = StationCurves::of(design, &water)?;
        let duty = FoilDuty::of(design, wing, &water)?;
        let flight = duty.as_ref().map_or(Vec::new(), FoilDuty::flight);
        Ok(Self {
            strength: strength::of(design, wing, &flight, strut_case(design))?,
            duty,
            pattern: pattern(design, &planform),
            planform,
            stations: station_aids(design, wing)?,
            flows: section_flows(design)?,
            water,
            curves,
            pieces: design.pieces(wing)?,
            battens: battens(design, wing)?,
        })
    }
}

fn battens(design: &Design, wing: &Wing) -> Result<Vec<(f64, f64, f64)>, PackError> {
    if design.law == Law::Straight {
        return Ok(Vec::new());
    }
    let places: Vec<f64> = design.templates.iter().map(|at| at.mm()).collect();
    let gap = |pair: &[f64]| Ok((pair[0], pair[1], wing.batten_gap(pair[0], pair[1])?));
    places.windows(2).map(gap).collect()
}

/// The aids of one template station.
pub(super) struct StationAids<'a> {
    pub(super) shape: StationShape<'a>,
    pub(super) template: Drawing,
    pub(super) mask: Mask,
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

/// The flow about one of the design's sections, and the stations that use it.
pub(super) struct SectionFlow<'a> {
    pub(super) section: &'a Section,
    pub(super) stations: Vec<f64>,
    pub(super) flow: PotentialFlow,
}

impl SectionFlow<'_> {
    /// The flow at a lift coefficient; `None` where potential flow cannot give it.
    pub(super) fn at_lift(&self, cl: f64) -> Option<Solution> {
        self.flow.incidence_for_lift(cl).map(|incidence| self.flow.at(incidence))
    }

    /// Angle in degrees and flow over the range of incidence that the design asks for.
    pub(super) fn over_range(&self, design: &Design) -> impl Iterator<Item = (f64, Solution)> {
        let angles = design.lift.angles().into_iter();
        angles.map(|angle| (angle.degrees(), self.flow.at(angle.radians())))
    }
}

pub(super) fn stamp(design: &Design) -> Stamp {
    Stamp { design: design.name.clone(), fingerprint: design.fingerprint() }
}

fn hinge(design: &Design) -> Option<HingeLine> {
    let flap = design.flap?;
    let chord_fractions = [flap.hinge, flap.hinge_end];
    Some(HingeLine { chord_fractions, from: flap.from.mm(), to: flap.to.mm() })
}

/// Shapes, templates and masks of every template station.
fn station_aids<'a>(design: &'a Design, wing: &'a Wing) -> Result<Vec<StationAids<'a>>, PackError> {
    let (stamp, hinge) = (stamp(design), hinge(design));
    let settings = MaskSettings {
        clearance: design.masks.clearance.mm(),
        wall: design.masks.wall.mm(),
        thickness: design.masks.thickness.mm(),
        tolerance: PRINT_TOLERANCE,
    };
    let skin = design.skin();
    let at_station = |at: f64| {
        let failed = |source| PackError::Shape { at, source };
        let shape = wing.shape_at(at)?;
        let tolerance = design.router.tolerance.mm();
        let template = station_template(&stamp, &shape, hinge.as_ref(), wing.is_mirrored(), tolerance)
            .map_err(failed)?;
        let label = format!("{} {}", crate::units::number(at, 1), stamp.fingerprint);
        let mut sights = vec![0.0, shape.chord];
        sights.extend(design.hinge_at(at, shape.chord).map(|hinge| hinge.at));
        let marks = MaskMarks { label: &label, sights: &sights };
        let mask = Mask::of(&shape, settings, marks).map_err(failed)?;
        let wood = wood(design, &skin, &stamp, &shape)?;
        Ok(StationAids { shape, template, mask, wood })
    };
    design.templates.iter().map(|at| at_station(at.mm())).collect()
}

/// The wood at a station and its templates; none where the finished surface itself is cut.
fn wood<'a>(
    design: &'a Design,
    skin: &Laminate,
    stamp: &Stamp,
    shape: &StationShape<'_>,
) -> Result<Wood<'a>, PackError> {
    let mut wood =
        Wood { templates: Vec::new(), ends_at: None, thin_behind: None, split: None, cuts: Vec::new() };
    let hinge = design.hinge_at(shape.at, shape.chord);
    if hinge.is_none() && !design.has_skin() && design.cuts_at(shape.at).next().is_none() {
        return Ok(wood);
    }
    let tolerance = design.router.tolerance.mm();
    let failed = |source| PackError::Shape { at: shape.at, source };
    let finished = follow_with_arcs(shape, tolerance).map_err(failed)?;
    let core = Core::of(shape, skin)?;
    wood.ends_at = core.ends_in_laminate().then(|| core.tail().x);
    wood.thin_behind = core.thin_behind(design.laminate.least_wood.mm());
    wood.cuts = design.cuts_at(shape.at).map(|(cut, shape)| (cut, shape.of(&core))).collect();
    let cuts = &wood.cuts;
    let templates = &mut wood.templates;
    let mut add = |role, ending, name, path: &ArcPath, words: &[String]| {
        let mut drawing = part_template(stamp, shape, &finished, name, path, words);
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
            let path = follow_with_arcs(&core, tolerance).map_err(failed)?;
            add("core template", "core", "core", &path, &[]);
        }
        Some(hinge) => {
            let split = split(&core, &hinge, tolerance)?;
            let Split { axis, .. } = split;
            let words =
                [format!("hinge axis {:.2} mm from the nose, {:.2} mm above the chord", axis.x, axis.y)];
            add("main body template", "main", "main body", &split.main.core, &words);
            add("flap template", "flap", "flap", &split.flap.core, &words);
            wood.split = Some(split);
        }
    }
    Ok(wood)
}

/// The pattern of the planform.
fn pattern(design: &Design, planform: &Planform) -> Drawing {
    let stations: Vec<f64> = design.templates.iter().map(|at| at.mm()).collect();
    planform_pattern(&stamp(design), planform, &stations, hinge(design).as_ref())
}

/// The flow about each section that the design names, each once.
fn section_flows(design: &Design) -> Result<Vec<SectionFlow<'_>>, PackError> {
    let mut flows: Vec<SectionFlow<'_>> = Vec::new();
    for station in &design.stations {
        if let Some(known) = flows.iter_mut().find(|f| *f.section == station.section) {
            known.stations.push(station.at.mm());
            continue;
        }
        let panelling = Panelling::of(&station.section, DEFAULT_PANELS)?;
        let flow = PotentialFlow::new(&panelling)?;
        flows.push(SectionFlow { section: &station.section, stations: vec![station.at.mm()], flow });
    }
    Ok(flows)
}

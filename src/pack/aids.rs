//! Everything that a design's pack and its checks are made from, worked out once.

use super::PackError;
use super::cut_pieces::{self, CutPiece};
use super::duty::{FoilDuty, strut_case};
use super::friction::{StationCurves, water};
use super::printed::{self, Bench, StationMask};
use super::strength::{self, PartStrength};
use super::surface::Surface;
use super::wood::{self, WoodFigures};
use crate::design::{Cut, Design};
use crate::flow::{DEFAULT_PANELS, Panelling, PotentialFlow, Solution, Water};
use crate::geometry::{ArcPath, follow_with_arcs};
use crate::parts::{Core, CutShape, Split, WoodPiece, split};
use crate::section::Section;
use crate::wing::{Planform, StationShape, Wing};
use crate::workshop::{
    Drawing, Layout, Page, PaperSettings, Role, Stamp, mark_on_plan, part_template, planform_pattern,
    station_template, tiled,
};

/// All of it.
pub(super) struct Aids<'a> {
    pub(super) planform: Planform,
    pub(super) pattern: Drawing,
    /// What the letters on the pattern stand for.
    pub(super) legend: Vec<String>,
    pub(super) stations: Vec<StationAids<'a>>,
    /// What the router is handed, piece by piece, and on sheets.
    pub(super) cut: Vec<CutPiece>,
    pub(super) layout: Layout,
    pub(super) prints: Prints,
    pub(super) bench: Bench,
    pub(super) flows: Vec<SectionFlow<'a>>,
    pub(super) water: Water,
    pub(super) curves: Vec<StationCurves<'a>>,
    pub(super) duty: Option<FoilDuty>,
    /// Whether it breaks, or why nothing is said of it.
    pub(super) strength: Result<PartStrength<'a>, String>,
    pub(super) pieces: Vec<WoodPiece>,
    pub(super) wood: WoodFigures<'a>,
    pub(super) surface: Surface,
}

impl<'a> Aids<'a> {
    /// Works out a design, whose own foil `wing` is, telling how many of how many lift curves are done.
    pub(super) fn of(
        design: &'a Design,
        wing: &'a Wing,
        told: &(dyn Fn(usize, usize) + Sync),
    ) -> Result<Self, PackError> {
        let planform = wing.planform();
        let water = water(design)?;
        let curves = StationCurves::of(design, &water, told)?;
        let wood = WoodFigures::of(design, wing)?;
        let mut stations = station_aids(design, wing)?;
        if let Some(hinge) = &wood.hinge {
            wood::turn_about_the_line(design, &hinge.axis, &mut stations);
        }
        let (pattern, legend) = pattern(design, wing, &planform);
        let duty = FoilDuty::of(design, wing, &water)?;
        let flight = duty.as_ref().map_or(Vec::new(), FoilDuty::flight);
        let cut = cut_pieces::cut_pieces(design, &stations, &pattern)?;
        Ok(Self {
            strength: strength::of(design, wing, &flight, strut_case(design))?,
            duty,
            layout: cut_pieces::layout(design, &cut),
            bench: printed::bench(design, wing, &stamp(design))?,
            prints: Prints::of(design, &stations, &pattern),
            cut,
            pattern,
            legend,
            planform,
            stations,
            wood,
            flows: section_flows(design)?,
            water,
            curves,
            pieces: design.pieces(wing)?,
            surface: Surface::of(design, wing)?,
        })
    }
}

/// The pages of the paper templates.
pub(super) struct Prints {
    /// Planform and finished surface.
    pub(super) finished: Vec<Page>,
    /// The wood.
    pub(super) wood: Vec<Page>,
}

impl Prints {
    fn of(design: &Design, stations: &[StationAids<'_>], pattern: &Drawing) -> Self {
        let [width, height] = design.paper.dimensions();
        let paper = PaperSettings {
            width,
            height,
            margin: design.paper.margin.mm(),
            overlap: design.paper.overlap.mm(),
        };
        let finished = std::iter::once(pattern).chain(stations.iter().map(|station| &station.template));
        let wood =
            stations.iter().flat_map(|station| station.wood.templates.iter().map(|(_, _, drawing)| drawing));
        Self {
            finished: finished.flat_map(|drawing| tiled(drawing, paper)).collect(),
            wood: wood.flat_map(|drawing| tiled(drawing, paper)).collect(),
        }
    }
}

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

/// Shapes, templates and masks of every template station.
fn station_aids<'a>(design: &'a Design, wing: &'a Wing) -> Result<Vec<StationAids<'a>>, PackError> {
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

/// The pattern of the planform, and what the letters on it stand for.
fn pattern(design: &Design, wing: &Wing, planform: &Planform) -> (Drawing, Vec<String>) {
    let stations: Vec<f64> = design.templates.iter().map(|at| at.mm()).collect();
    let mut drawing = planform_pattern(&stamp(design), planform, &stations, design.hinge_line().as_ref());
    let legend = mark_on_plan(&mut drawing, planform, &wood::plan_marks(design, wing, planform));
    (drawing, legend)
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

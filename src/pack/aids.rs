//! Everything that a design's pack and its checks are made from, worked out once.

use super::PackError;
use super::cut_pieces::{self, CutPiece};
use super::duty::{FoilDuty, strut_case};
use super::friction::{StationCurves, water};
use super::printed::{self, Bench};
use super::station::{StationAids, stamp, station_aids};
use super::strength::{self, PartStrength};
use super::surface::Surface;
use super::wood::{self, WoodFigures};
use crate::design::Design;
use crate::flow::{DEFAULT_PANELS, Panelling, PotentialFlow, Solution, Water};
use crate::parts::WoodPiece;
use crate::section::Section;
use crate::wing::{Planform, Wing};
use crate::workshop::{Drawing, Layout, Page, PaperSettings, mark_on_plan, planform_pattern, tiled};

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

//! A design as resolved from its file: every default filled in, every bound checked.

use super::boat::Boat;
use super::strength::Strength;
use crate::section::{Finish, Section};
use crate::units::{Angle, Length};
use crate::wing::{Law, TipForm};
use crate::workshop::Corners;

/// What is built.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum Kind {
    /// The foil that carries the boat, in two mirrored halves.
    MainFoil,
    /// The small foil that trims it, in two mirrored halves.
    Elevator,
    /// What holds the foil below the hull, in one piece.
    Strut,
    /// A single upright foil under a hull.
    Fin,
}

impl Kind {
    /// Every kind, in the order in which [`Kind::WORDS`] names them.
    pub const ALL: [Self; 4] = [Self::MainFoil, Self::Elevator, Self::Strut, Self::Fin];
    /// The words of the design file for them.
    pub const WORDS: &'static [&'static str] = &["main-foil", "elevator", "strut", "fin"];

    /// The word of the design file.
    #[must_use]
    pub fn word(self) -> &'static str {
        match self {
            Self::MainFoil => "main-foil",
            Self::Elevator => "elevator",
            Self::Strut => "strut",
            Self::Fin => "fin",
        }
    }

    /// The kind of a word of the design file.
    #[must_use]
    pub fn from_word(word: &str) -> Option<Self> {
        Self::ALL.into_iter().find(|kind| kind.word() == word)
    }

    /// Whether it lies level, and is made of two mirrored halves unless the design says otherwise.
    #[must_use]
    pub fn mirrored(self) -> bool {
        matches!(self, Self::MainFoil | Self::Elevator)
    }
}

/// How the far end is shaped, as the file says it.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum TipShape {
    /// As the last station has it.
    Square,
    /// By one of the forms of a tip.
    Shaped(TipForm),
}

impl TipShape {
    /// The words of the design file.
    pub const WORDS: &'static [&'static str] = &["square", "rounded", "cut"];

    /// The shape of a word of the design file.
    #[must_use]
    pub fn from_word(word: &str) -> Option<Self> {
        [Self::Square, Self::Shaped(TipForm::Rounded), Self::Shaped(TipForm::Cut)]
            .into_iter()
            .zip(Self::WORDS)
            .find(|(_, known)| **known == word)
            .map(|(shape, _)| shape)
    }
}

/// Whether two parts are made that mirror each other, or one.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum Hands {
    /// Two.
    Mirrored,
    /// One.
    OneHanded,
}

impl Hands {
    /// The words of the design file for them.
    pub const WORDS: &'static [&'static str] = &["mirrored", "one-handed"];

    /// The hands of a word of the design file.
    #[must_use]
    pub fn from_word(word: &str) -> Option<Self> {
        [Self::Mirrored, Self::OneHanded]
            .into_iter()
            .zip(Self::WORDS)
            .find(|(_, known)| **known == word)
            .map(|(hands, _)| hands)
    }
}

/// A checked design.
#[derive(Debug, Clone, PartialEq)]
pub struct Design {
    /// What the maker calls it: 1 to 60 letters, digits, spaces, `-` and `_`.
    pub name: String,
    /// What is built.
    pub kind: Kind,
    /// The maker's own words; they shape nothing.
    pub notes: Option<String>,
    /// Tip to tip for two halves about a root, from one end to the other for the rest.
    pub span: Length,
    /// Whether two parts are made or one.
    pub hands: Hands,
    /// How the far end is shaped; `None` as the last station has it.
    pub tip: Option<Tip>,
    /// How much of a strut or a fin stays in its case, from the upper end; nought for what lies level.
    pub in_case: Length,
    /// Where the water's surface lies on a strut or a fin, from the upper end; at or below the case.
    /// Nought for what lies level.
    pub waterline: Length,
    /// How chord, twist, sweep and rise run between the stations.
    pub law: Law,
    /// Place on the chord about which twist turns, 0 to 1.
    pub twist_about: f64,
    /// From the root outwards, two at least: the first at 0, the last at [`Design::reach`].
    pub stations: Vec<Station>,
    /// Where templates are cut, ascending: every station, and the places the file names besides.
    pub templates: Vec<Length>,
    /// How near to a curved design a batten between two templates is to lie.
    pub fairing: Option<Length>,
    /// What the core is made of.
    pub wood: Wood,
    /// What lies between wood and finished surface besides the plies.
    pub laminate: Laminate,
    /// The plies, from the wood outwards.
    pub plies: Vec<Ply>,
    /// Slots and bores.
    pub cuts: Vec<Cut>,
    /// The flap, if any.
    pub flap: Option<Flap>,
    /// What strength is held to and by which values.
    pub strength: Strength,
    /// What the lift curves cover.
    pub lift: Lift,
    /// What it carries, if that is said.
    pub duty: Option<Duty>,
    /// The boat that it is part of, if that is said.
    pub boat: Option<Boat>,
    /// The masks that guide the sanding.
    pub masks: Masks,
    /// The printer that makes the masks.
    pub printer: Printer,
    /// The paper for templates.
    pub paper: Paper,
    /// The sheet that templates are routed from.
    pub stock: Stock,
    /// The router.
    pub router: Router,
}

impl Design {
    /// Half the span.
    #[must_use]
    pub fn half_span(&self) -> Length {
        Length::from_mm(self.span.mm() / 2.0)
    }

    /// Whether it is two halves about a root, so that the span is measured tip to tip.
    #[must_use]
    pub fn in_halves(&self) -> bool {
        self.kind.mirrored() && self.hands == Hands::Mirrored
    }

    /// From the root to the far end of what is built in one piece: half the span for two halves about
    /// a root, all of it for the rest. The last station lies here.
    #[must_use]
    pub fn reach(&self) -> Length {
        if self.in_halves() { self.half_span() } else { self.span }
    }

    /// The name as files carry it: "Main foil" becomes "main-foil".
    #[must_use]
    pub fn slug(&self) -> String {
        let lower = self.name.to_ascii_lowercase();
        let words: Vec<&str> = lower.split([' ', '-']).filter(|word| !word.is_empty()).collect();
        words.join("-")
    }
}

/// A section at its place along the span.
#[derive(Debug, Clone, PartialEq)]
pub struct Station {
    /// Distance from the root (the hull end of a strut) along the span.
    pub at: Length,
    /// Chord, 5 mm to 2 m.
    pub chord: Length,
    /// The section at unit chord, finished.
    pub section: Section,
    /// The section as the file names it: a designation or a file.
    pub designation: String,
    /// How its trailing edge is finished.
    pub finish: Finish,
    /// Nose-up about [`Design::twist_about`], -30 to 30 degrees.
    pub twist: Angle,
    /// How far the quarter chord lies aft of the first station's.
    pub sweep: Length,
    /// How far it lies above the first station's.
    pub rise: Length,
}

/// A shaped far end.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Tip {
    /// Rounded or cut.
    pub form: TipForm,
    /// Over how much of the span, 1 mm to 2 m.
    pub length: Length,
    /// Chord left at the very end, 5 mm at least.
    pub chord: Length,
    /// The place on the chord towards which it draws together, 0 to 1.
    pub about: f64,
}

/// What the core is made of.
#[derive(Debug, Clone, PartialEq)]
pub struct Wood {
    /// What its maker calls it.
    pub species: String,
    /// Density, kg/m³, 30 to 1500.
    pub density: f64,
    /// Added to a blank on every side, 0 to 50 mm.
    pub allowance: Length,
}

/// What lies between wood and finished surface besides the plies.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Laminate {
    /// Filler and paint over all, 0 to 5 mm.
    pub finish: Length,
    /// Over how much of the chord the recess for a ply deepens at its edge, 0.5 to 100 mm.
    pub rise: Length,
    /// The thinnest wood that the shop can shape, 0 to 50 mm.
    pub least_wood: Length,
}

/// The surfaces that a ply covers.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum PlySide {
    /// Both.
    Both,
    /// The upper one.
    Upper,
    /// The lower one.
    Lower,
}

impl PlySide {
    /// Every choice, in the order in which [`PlySide::WORDS`] names them.
    pub const ALL: [Self; 3] = [Self::Both, Self::Upper, Self::Lower];
    /// The words of the design file for them.
    pub const WORDS: &'static [&'static str] = &["both", "upper", "lower"];

    /// The side of a word of the design file.
    #[must_use]
    pub fn from_word(word: &str) -> Option<Self> {
        Self::ALL.into_iter().zip(Self::WORDS).find(|(_, known)| **known == word).map(|(side, _)| side)
    }
}

/// A layer of the laminate.
#[derive(Debug, Clone, PartialEq)]
pub struct Ply {
    /// What its maker calls it.
    pub cloth: String,
    /// Weight of the dry cloth, g/m², 10 to 3000.
    pub weight: f64,
    /// Density of its fibre, kg/m³, 500 to 4000.
    pub fibre_density: f64,
    /// Density of the cured resin, kg/m³, 800 to 2000.
    pub resin_density: f64,
    /// Share of the fibre in its volume, 0.2 to 0.75.
    pub fibre_share: f64,
    /// Thickness when cured where it has been measured, 0.01 to 20 mm.
    pub thickness: Option<Length>,
    /// The surfaces that it covers.
    pub on: PlySide,
    /// Where it begins along the span, from the root.
    pub from: Length,
    /// Where it ends.
    pub to: Length,
    /// Where it begins along the chord, 0 to 0.95.
    pub chord_from: f64,
    /// Where it ends, 0.05 to 1.
    pub chord_to: f64,
    /// Place of its material in [`Strength::materials`], where it names one.
    pub material: Option<usize>,
    /// From the span to its fibre.
    pub angle: Angle,
}

/// How a flap is hinged.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum FlapKind {
    /// The skin of the upper surface runs through and bends.
    LaminateUpper,
    /// That of the lower surface.
    LaminateLower,
    /// A pin with a round flap nose in a cove.
    Pin,
}

impl FlapKind {
    /// Every kind, in the order in which [`FlapKind::WORDS`] names them.
    pub const ALL: [Self; 3] = [Self::LaminateUpper, Self::LaminateLower, Self::Pin];
    /// The words of the design file for them.
    pub const WORDS: &'static [&'static str] = &["laminate-upper", "laminate-lower", "pin"];

    /// The word of the design file.
    #[must_use]
    pub fn word(self) -> &'static str {
        match self {
            Self::LaminateUpper => "laminate-upper",
            Self::LaminateLower => "laminate-lower",
            Self::Pin => "pin",
        }
    }

    /// The kind of a word of the design file.
    #[must_use]
    pub fn from_word(word: &str) -> Option<Self> {
        Self::ALL.into_iter().find(|kind| kind.word() == word)
    }
}

/// Where a hinge that is given as a length is measured from.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum HingeFrom {
    /// The nose.
    Nose,
    /// The trailing edge.
    TrailingEdge,
}

impl HingeFrom {
    /// The words of the design file for them.
    pub const WORDS: &'static [&'static str] = &["nose", "trailing-edge"];

    /// The place of a word of the design file.
    #[must_use]
    pub fn from_word(word: &str) -> Option<Self> {
        [Self::Nose, Self::TrailingEdge]
            .into_iter()
            .zip(Self::WORDS)
            .find(|(_, known)| **known == word)
            .map(|(from, _)| from)
    }
}

/// A flap.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Flap {
    /// Where the hinge lies at the flap's inner end, a fraction of the chord from the nose, 0.3 to
    /// 0.95.
    pub hinge: f64,
    /// The same at its outer end.
    pub hinge_end: f64,
    /// Where the hinge is given as lengths: what they are measured from, and those at the inner and the
    /// outer end. The fractions above are then those of these two places.
    pub hinge_lengths: Option<(HingeFrom, [Length; 2])>,
    /// How it is hinged.
    pub kind: FlapKind,
    /// Height of a pin between the lower (0) and the upper (1) surface, 0.1 to 0.9.
    pub axis: f64,
    /// Travel with the trailing edge up, 0 to 45 degrees.
    pub up: Angle,
    /// Travel with the trailing edge down, 0 to 45 degrees.
    pub down: Angle,
    /// What stays free throughout the travel, 0.1 to 5 mm.
    pub clearance: Length,
    /// Laminate on the cut faces, 0 to 5 mm.
    pub face: Length,
    /// From the hinge's axis to where the control rod takes hold.
    pub horn: Option<Length>,
    /// Place of its material in [`Strength::materials`], where it names one.
    pub face_material: Option<usize>,
    /// Where it begins, from the root along the span.
    pub from: Length,
    /// Where it ends, at most at [`Design::reach`].
    pub to: Length,
}

/// What kind of cut-out.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum CutKind {
    /// A slot sunk from a face, with a flat floor; along the chord its floor follows the face.
    Slot,
    /// A round bore along the span.
    Bore,
    /// A pocket sunk from a face, whose floor follows it.
    Pocket,
    /// A round hole square to the chord.
    Hole,
}

impl CutKind {
    /// The words of the design file for them.
    pub const WORDS: &'static [&'static str] = &["slot", "bore", "pocket", "hole"];

    /// The kind of a word of the design file.
    #[must_use]
    pub fn from_word(word: &str) -> Option<Self> {
        [Self::Slot, Self::Bore, Self::Pocket, Self::Hole]
            .into_iter()
            .zip(Self::WORDS)
            .find(|(_, known)| **known == word)
            .map(|(kind, _)| kind)
    }
}

/// What is taken out of the wood.
#[derive(Debug, Clone, PartialEq)]
pub struct Cut {
    /// What it is for.
    pub purpose: String,
    /// Which of them.
    pub kind: CutKind,
    /// Where it begins and ends along the chord when it is a pocket or a slot along the chord, fractions
    /// from the nose, 0.02 to 0.98.
    pub chord: Option<[f64; 2]>,
    /// Its middle, a fraction of the chord from the nose, 0.02 to 0.98.
    pub at: f64,
    /// Width of a slot, diameter of a bore or a hole, 0.5 to 500 mm; of a pocket nought.
    pub width: Length,
    /// Depth below the face of the wood, 0 to 200 mm; nought for a hole that goes right through.
    pub depth: Length,
    /// Whether it is sunk from the upper face.
    pub from_upper: bool,
    /// Centre of a bore between the lower (0) and the upper (1) face.
    pub height: f64,
    /// Where it begins along the span, from the root.
    pub from: Length,
    /// Where it ends.
    pub to: Length,
    /// The least wood that is to be left beside it, 0 to 100 mm.
    pub least_left: Length,
}

/// What the lift curves cover.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Lift {
    /// First angle of attack.
    pub from: Angle,
    /// Last angle of attack, above the first.
    pub to: Angle,
    /// From one to the next, positive; at most [`Lift::MOST_POINTS`] in all.
    pub step: Angle,
    /// Speed that the curves are for, m/s, 0.5 to 25.
    pub speed: f64,
    /// Depth below the surface.
    pub depth: Length,
    /// Speed up to which the sections may not cavitate, m/s.
    pub top_speed: Option<f64>,
    /// By what share the cavitation number has to stay above the greatest suction, 0 to 2.
    pub cavitation_margin: f64,
    /// Whether the water is salt.
    pub sea: bool,
    /// Temperature of the water, °C, 0 to 30.
    pub temperature: f64,
    /// N of the e^N method, 1 to 12.
    pub quietness: f64,
    /// Section lift coefficient that every station must reach within that range, -3 to 3.
    pub design: f64,
}

impl Lift {
    /// The most angles that one curve may have.
    pub const MOST_POINTS: usize = 500;

    /// The angles of attack, from the first to the last that whole steps reach.
    #[must_use]
    pub fn angles(&self) -> Vec<Angle> {
        let at = |i: usize| Angle::from_degrees(self.from.degrees() + i as f64 * self.step.degrees());
        (0..self.points().min(Self::MOST_POINTS)).map(at).collect()
    }

    /// How many angles that is. The small addition lets the last one survive rounding.
    pub(super) fn points(&self) -> usize {
        let steps = (self.to.degrees() - self.from.degrees()) / self.step.degrees();
        if steps >= 0.0 { (steps + 1e-6).floor() as usize + 1 } else { 0 }
    }
}

/// What a level foil carries under its boat.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Duty {
    /// Mass, kg, 1 to 5000.
    pub carries: f64,
    /// Speed at which it has to carry it, m/s, 0.5 to 20.
    pub take_off: f64,
    /// Speed at which it usually runs, m/s, above take-off.
    pub cruise: Option<f64>,
    /// How much of its greatest lift it may use at take-off, 0.3 to 1.
    pub share: f64,
    /// Depth of its root at take-off, cruise and top speed, mm.
    pub depths: [f64; 3],
    /// Incidence at which it is set, where that is said.
    pub set_at: Option<Angle>,
    /// Least incidence left until any part of it stalls.
    pub stall_margin: Angle,
}

/// What masks are made for, where wood and finished surface differ.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum MaskShapes {
    /// Wood and finished surface.
    Both,
    /// The wood before the laminate.
    Core,
    /// The finished surface.
    Finished,
}

impl MaskShapes {
    /// The words of the design file for them.
    pub const WORDS: &'static [&'static str] = &["both", "core", "finished"];

    /// The choice of a word of the design file.
    #[must_use]
    pub fn from_word(word: &str) -> Option<Self> {
        let all = [Self::Both, Self::Core, Self::Finished];
        all.into_iter().zip(Self::WORDS).find(|(_, known)| **known == word).map(|(shapes, _)| shapes)
    }
}

/// The faces that an aid is made for.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum Faces {
    /// Neither.
    None,
    /// The lower one.
    Lower,
    /// The upper one.
    Upper,
    /// Each.
    Both,
}

impl Faces {
    /// The words of the design file for them.
    pub const WORDS: &'static [&'static str] = &["none", "lower", "upper", "both"];

    /// The choice of a word of the design file.
    #[must_use]
    pub fn from_word(word: &str) -> Option<Self> {
        let all = [Self::None, Self::Lower, Self::Upper, Self::Both];
        all.into_iter().zip(Self::WORDS).find(|(_, known)| **known == word).map(|(faces, _)| faces)
    }

    /// Whether the lower and the upper one are among them.
    #[must_use]
    pub fn lower_and_upper(self) -> [bool; 2] {
        [matches!(self, Self::Lower | Self::Both), matches!(self, Self::Upper | Self::Both)]
    }
}

/// The printed masks, cradles and rails that guide the shaping.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Masks {
    /// What they are made for.
    pub shapes: MaskShapes,
    /// Gap between the finished skin and the mask, 0.05 to 5 mm.
    pub clearance: Length,
    /// Material around the section, 2 to 60 mm.
    pub wall: Length,
    /// Thickness along the span, 1 to 60 mm.
    pub thickness: Length,
    /// Faces that cradles hold.
    pub cradles: Faces,
    /// Length of a cradle along the span, 10 to 500 mm.
    pub cradle_length: Length,
    /// Faces that rails guide a tool over.
    pub rails: Faces,
    /// How far rails stand proud of the wood, 0 to 100 mm.
    pub rail_offset: Length,
}

/// The printer that makes the masks.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Printer {
    /// Width of the bed, 50 mm to 2 m.
    pub bed_x: Length,
    /// Depth of the bed, 50 mm to 2 m.
    pub bed_y: Length,
    /// Greatest height of a print, 50 mm to 2 m.
    pub bed_z: Length,
    /// Kept free along every edge of the bed, 0 to 50 mm.
    pub margin: Length,
}

impl Printer {
    /// The bed less its margins: width, depth.
    #[must_use]
    pub fn bed(&self) -> [Length; 2] {
        [self.bed_x, self.bed_y].map(|side| Length::from_mm(side.mm() - 2.0 * self.margin.mm()))
    }
}

/// A sheet of paper.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum PaperSize {
    /// 210 mm by 297 mm.
    A4,
    /// 297 mm by 420 mm.
    A3,
    /// 8.5 in by 11 in.
    Letter,
}

impl PaperSize {
    /// Every size, in the order in which [`PaperSize::WORDS`] names them.
    pub const ALL: [Self; 3] = [Self::A4, Self::A3, Self::Letter];
    /// The words of the design file for them.
    pub const WORDS: &'static [&'static str] = &["A4", "A3", "Letter"];

    /// The word of the design file.
    #[must_use]
    pub fn word(self) -> &'static str {
        match self {
            Self::A4 => "A4",
            Self::A3 => "A3",
            Self::Letter => "Letter",
        }
    }

    /// The size of a word of the design file.
    #[must_use]
    pub fn from_word(word: &str) -> Option<Self> {
        Self::ALL.into_iter().find(|size| size.word() == word)
    }

    /// Width and height, upright.
    #[must_use]
    pub fn dimensions(self) -> (Length, Length) {
        let (width, height) = match self {
            Self::A4 => (210.0, 297.0),
            Self::A3 => (297.0, 420.0),
            Self::Letter => (215.9, 279.4),
        };
        (Length::from_mm(width), Length::from_mm(height))
    }
}

/// The paper that templates are printed on.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Paper {
    /// The sheet, where it is no roll.
    pub size: PaperSize,
    /// The width of a roll, 200 mm to 2 m.
    pub roll: Option<Length>,
    /// What the printer leaves white along every edge, 5 to 40 mm.
    pub margin: Length,
    /// How much neighbouring sheets share, 0 to 40 mm.
    pub overlap: Length,
}

impl Paper {
    /// Width and height, mm, upright; a roll has no end.
    #[must_use]
    pub fn dimensions(&self) -> [f64; 2] {
        match (self.roll, self.size.dimensions()) {
            (Some(width), _) => [width.mm(), f64::INFINITY],
            (None, (width, height)) => [width.mm(), height.mm()],
        }
    }
}

/// The sheet that templates are routed from.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Stock {
    /// One side, 50 mm to 5 m.
    pub length: Length,
    /// Other side, 50 mm to 5 m.
    pub width: Length,
    /// Thickness, 1 to 200 mm.
    pub thickness: Length,
    /// Kept free along every edge, 0 to 100 mm.
    pub margin: Length,
    /// Kept free between two pieces, at least the cutter, 0 to 100 mm.
    pub spacing: Length,
    /// Whether pieces may be turned by a quarter, across the grain.
    pub may_turn: bool,
}

/// Which releases of DXF are written.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum DxfRelease {
    /// Release 2000.
    R2000,
    /// R12, for the oldest readers.
    R12,
    /// Both.
    Both,
}

impl DxfRelease {
    /// The words of the design file for them.
    pub const WORDS: &'static [&'static str] = &["2000", "R12", "both"];

    /// The choice of a word of the design file.
    #[must_use]
    pub fn from_word(word: &str) -> Option<Self> {
        let all = [Self::R2000, Self::R12, Self::Both];
        all.into_iter().zip(Self::WORDS).find(|(_, known)| **known == word).map(|(release, _)| release)
    }
}

/// The router.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Router {
    /// How far the cut line may stray from the section, 0.001 to 0.5 mm.
    pub tolerance: Length,
    /// Diameter of the cutter, 0.5 to 50 mm.
    pub cutter: Length,
    /// Whether contours are the path of the cutter's middle instead of the line of the piece.
    pub is_path: bool,
    /// What is done about inner corners.
    pub corners: Corners,
    /// Holding tabs on each piece, 0 to 20.
    pub tabs: usize,
    /// Length of a tab, 1 to 50 mm.
    pub tab_width: Length,
    /// Whether curved contours are written as splines instead of arcs.
    pub splines: bool,
    /// Which releases of DXF are written.
    pub release: DxfRelease,
}

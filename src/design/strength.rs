//! What a design says about its strength: materials, limits, load cases and joints.

use super::keys;
use super::reader::{Row, Sheet};
use super::resolve::{Reach, SAME};
use crate::problems::{Problems, Wrong};
use crate::strength::{CoreElastic, PlyElastic, Provenance};
use crate::units::{Angle, Length, clipped, nearest};

/// The words of the design file for where values come from.
pub(super) const SOURCES: &[&str] = &["tested", "published", "invented"];

/// How the fibre of a cloth runs.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Form {
    /// All one way.
    Unidirectional,
    /// Woven 0/90; ±45 when laid so.
    Woven,
    /// Chopped, alike all ways.
    Chopped,
}

impl Form {
    /// The words of the design file for them.
    pub const WORDS: &'static [&'static str] = &["unidirectional", "woven", "chopped"];
    const ALL: [Self; 3] = [Self::Unidirectional, Self::Woven, Self::Chopped];

    fn from_word(word: &str) -> Option<Self> {
        Self::ALL.into_iter().zip(Self::WORDS).find(|(_, known)| **known == word).map(|(form, _)| form)
    }

    /// As the sheet calls it, with the angle at which it is laid.
    #[must_use]
    pub fn laid_at(self, angle: Angle) -> String {
        let degrees = crate::units::number(angle.degrees(), 1);
        match self {
            Self::Chopped => "all ways".to_owned(),
            Self::Unidirectional if angle.degrees() == 0.0 => "along the span".to_owned(),
            Self::Unidirectional => format!("{degrees}° from the span"),
            Self::Woven if angle.degrees() == 0.0 => "0/90".to_owned(),
            Self::Woven if (angle.degrees().abs() - 45.0).abs() < 1e-9 => "±45".to_owned(),
            Self::Woven => format!("0/90 turned by {degrees}°"),
        }
    }
}

/// A material that plies name.
#[derive(Debug, Clone, PartialEq)]
pub struct Material {
    /// How its fibre runs.
    pub form: Form,
    /// Its values; the density is that of the ply it is used for.
    pub elastic: PlyElastic,
}

/// What a load case is.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum CaseLoad {
    /// A force across, even along a stretch of the span.
    SideForce {
        /// All of it, N.
        force: f64,
        /// Where it begins, mm from the root.
        from: f64,
        /// Where it ends.
        to: f64,
    },
    /// A grounding.
    Grounding {
        /// What it pushes towards the root, rearwards and across, N.
        pushes: [f64; 3],
        /// Where, mm from the root.
        at: f64,
    },
    /// A tow.
    Tow {
        /// Pull, N.
        pull: f64,
        /// How far off the course, radians.
        off: f64,
        /// Where, mm from the root.
        at: f64,
    },
    /// Somebody stands on it.
    Standing {
        /// Of who does, kg.
        mass: f64,
        /// Where, mm from the root.
        at: f64,
    },
    /// A moment about the span.
    Twist {
        /// Nose up, N mm.
        moment: f64,
        /// Where, mm from the root.
        at: f64,
    },
}

/// Kinds of load and the keys that each takes besides those of all: needed, and may be given.
pub(super) struct LoadKind;

impl LoadKind {
    /// The words of the design file for them.
    pub(super) const WORDS: &'static [&'static str] =
        &["side-force", "grounding", "tow", "standing", "twist"];
    const NEEDS: [&'static [&'static str]; 5] =
        [&["force"], &["force"], &["force", "off"], &["mass"], &["moment"]];
    const TAKES: [&'static [&'static str]; 5] =
        [&["from", "to"], &["towards-root", "across", "at"], &["at"], &["at"], &["at"]];
    const KEYS: [&'static str; 9] =
        ["force", "towards-root", "across", "off", "mass", "moment", "at", "from", "to"];
}

/// A load case.
#[derive(Debug, Clone, PartialEq)]
pub struct Case {
    /// What its maker calls it.
    pub name: String,
    /// What acts.
    pub load: CaseLoad,
    /// Where on the chord, a fraction from the nose.
    pub on_chord: f64,
    /// Load factor, 1 to 10.
    pub factor: f64,
}

/// A glued joint.
#[derive(Debug, Clone, PartialEq)]
pub struct Joint {
    /// What it joins.
    pub purpose: String,
    /// Where the load enters it, from the root.
    pub at: Length,
    /// How deep the part is glued in.
    pub depth: Length,
    /// Shear strength of the glue line, MPa.
    pub strength: f64,
    /// Where that comes from.
    pub source: Provenance,
}

/// All of it.
#[derive(Debug, Clone, PartialEq)]
pub struct Strength {
    /// Least reserve, load factors included.
    pub reserve: f64,
    /// Load factor of steady flight.
    pub flight_factor: f64,
    /// Most that the far end may move across in service; 5 % of the free length when not said.
    pub deflection: Option<Length>,
    /// Most that it may twist.
    pub twist: Angle,
    /// How far from the root it is held fast.
    pub held_to: Length,
    /// What plies name.
    pub materials: Vec<Material>,
    /// The wood, as far as its values are given.
    pub core: Option<CoreElastic>,
    /// What the part has to stand besides flight.
    pub cases: Vec<Case>,
    /// Where it is glued.
    pub joints: Vec<Joint>,
}

fn source(row: &Row, key: &str) -> Option<Provenance> {
    Some(match row.text(key)? {
        "tested" => Provenance::Tested,
        "published" => Provenance::Published,
        _ => Provenance::Invented,
    })
}

/// Reads what stands about strength in the tables of its own.
pub(super) fn strength(
    sheet: &Sheet,
    reach: Option<&Reach>,
    density: Option<f64>,
    problems: &mut Problems,
) -> Option<Strength> {
    let row = sheet.one(&keys::STRENGTH)?;
    // What stands in a case leaves the hull where that ends.
    let in_case = || sheet.one(&keys::PLANFORM).and_then(|planform| planform.length("in-case"));
    let named = row.length("held-to");
    let held_to = named.or_else(in_case);
    if let (Some(reach), Some(held)) = (reach, named)
        && held.mm() > reach.to.mm() - 1.0
    {
        let wrong = Wrong::new(format!("held-to is {held}, and {}: nothing is left free", reach.because))
            .help("it lies nearer to the root");
        problems.add(row.place("held-to"), wrong);
    }
    let materials: Vec<_> = sheet.all(&keys::MATERIAL).iter().map(|row| material(row, problems)).collect();
    let rows = sheet.all(&keys::MATERIAL);
    for (i, row) in rows.iter().enumerate() {
        let name = row.text("name");
        if name.is_some() && rows[..i].iter().any(|other| other.text("name") == name) {
            let message = format!("a material named \"{}\" stands above already", name.unwrap_or(""));
            problems.add(row.place("name"), Wrong::new(message).help("give each a name of its own"));
        }
    }
    let core = core(sheet.one(&keys::WOOD)?, density, problems);
    let held = held_to.map_or(0.0, Length::mm);
    let cases: Vec<_> = sheet.all(&keys::CASE).iter().map(|row| case(row, reach, held, problems)).collect();
    let joints: Vec<_> =
        sheet.all(&keys::JOINT).iter().map(|row| joint(row, reach, held, problems)).collect();
    Some(Strength {
        reserve: row.number("reserve")?,
        flight_factor: row.number("flight-factor")?,
        deflection: row.length("deflection"),
        twist: row.angle("twist")?,
        held_to: held_to?,
        materials: materials.into_iter().collect::<Option<_>>()?,
        core,
        cases: cases.into_iter().collect::<Option<_>>()?,
        joints: joints.into_iter().collect::<Option<_>>()?,
    })
}

/// The place of a material among those of the file, by its name.
pub(super) fn named(sheet: &Sheet, row: &Row, key: &str, problems: &mut Problems) -> Option<usize> {
    let name = row.text(key)?;
    let rows = sheet.all(&keys::MATERIAL);
    let found = rows.iter().position(|row| row.text("name") == Some(name));
    if found.is_none() {
        let wrong = Wrong::new(format!("there is no [[material]] named \"{}\"", clipped(name)));
        let wrong = match nearest(name, rows.iter().filter_map(|row| row.text("name"))) {
            Some(near) => wrong.help(format!("did you mean \"{near}\"?")),
            None => wrong.help("add a [[material]] of that name"),
        };
        problems.add(row.place(key), wrong);
    }
    found
}

/// Notes what is missing where strength is meant to be looked at: it takes every ply and the wood.
pub(super) fn refuse_halves(sheet: &Sheet, strength: Option<&Strength>, problems: &mut Problems) {
    let meant =
        [&keys::MATERIAL, &keys::CASE, &keys::JOINT].into_iter().find_map(|table| sheet.all(table).first());
    let Some(first) = meant else { return };
    let plies = sheet.all(&keys::PLY);
    if plies.is_empty() {
        let wrong = Wrong::new("strength is worked out for a laminate over a core, and there is no [[ply]]")
            .help("add the plies, or leave materials, cases and joints out");
        problems.add(first.opening(), wrong);
    }
    for ply in plies.iter().filter(|ply| ply.text("material").is_none()) {
        let wrong = Wrong::new("this ply names no material, and strength takes those of all plies")
            .help("write material = and the name of a [[material]]");
        problems.add(ply.place("weight"), wrong);
    }
    if strength.is_some_and(|strength| strength.core.is_none())
        && let Some(wood) = sheet.one(&keys::WOOD)
        && wood.text("values").is_none()
    {
        let wrong =
            Wrong::new("[wood] holds no values for strength").help(format!("add {}", CORE.join(", ")));
        problems.add(first.opening(), wrong);
    }
}

/// What the wood's values are.
const CORE: [&str; 6] = ["values", "modulus", "modulus-across", "shear-modulus", "shear", "compression"];

/// The values of the wood: all of them, or none.
fn core(row: &Row, density: Option<f64>, problems: &mut Problems) -> Option<CoreElastic> {
    let (there, missing): (Vec<&str>, Vec<&str>) = CORE.iter().partition(|key| row.given(key));
    if !there.is_empty() && !missing.is_empty() {
        let wrong = Wrong::new(format!("[wood] lacks {} for its strength", missing.join(", ")))
            .help("give all of them or none");
        problems.add(row.opening(), wrong);
    }
    Some(CoreElastic {
        name: row.text("species")?.to_owned(),
        provenance: source(row, "values")?,
        along_span: row.number("modulus")?,
        across: row.number("modulus-across")?,
        g: row.number("shear-modulus")?,
        shear: row.number("shear")?,
        compression: row.number("compression")?,
        density: density?,
    })
}

fn material(row: &Row, problems: &mut Problems) -> Option<Material> {
    let form = row.text("form").and_then(Form::from_word)?;
    let alike = form != Form::Unidirectional;
    let needed = match form {
        Form::Unidirectional => {
            &["modulus-across", "shear-modulus", "tension-across", "compression-across"][..]
        }
        Form::Woven => &["shear-modulus"],
        Form::Chopped => &[],
    };
    let missing: Vec<&str> = needed.iter().copied().filter(|key| row.number(key).is_none()).collect();
    if !missing.is_empty() {
        let word = row.text("form").unwrap_or("");
        let wrong = Wrong::new(format!("a material of {word} fibre needs {}", missing.join(", ")));
        problems.add(row.opening(), wrong.help("its other values do not tell them"));
        return None;
    }
    let across = |key: &str, along: f64| row.number(key).or(alike.then_some(along));
    let e1 = row.number("modulus")?;
    let nu12 = row.number("contraction").unwrap_or(if form == Form::Woven { 0.1 } else { 0.3 });
    let (tension, compression) = (row.number("tension")?, row.number("compression")?);
    let elastic = PlyElastic {
        name: row.text("name")?.to_owned(),
        provenance: source(row, "values")?,
        e1,
        e2: across("modulus-across", e1)?,
        g12: row.number("shear-modulus").unwrap_or(e1 / (2.0 * (1.0 + nu12))),
        nu12,
        tension_along: tension,
        compression_along: compression,
        tension_across: across("tension-across", tension)?,
        compression_across: across("compression-across", compression)?,
        shear: row.number("shear")?,
        // That of the ply it is used for takes its place.
        density: 1500.0,
    };
    if let Err(error) = elastic.check() {
        problems.add(row.place("modulus"), Wrong::new(error.to_string()));
        return None;
    }
    Some(Material { form, elastic })
}

/// A place along the span that is free to move, mm from the root.
fn free_place(
    row: &Row,
    key: &str,
    otherwise: f64,
    what: &str,
    (reach, held): (&Reach, f64),
    problems: &mut Problems,
) -> f64 {
    let Some(at) = row.length(key) else { return otherwise };
    reach.holds(what, at, row.place(key), problems);
    if at.mm() < held - SAME {
        let message = format!("{what} lies at {at}, and up to {} it is held", Length::from_mm(held));
        problems.add(row.place(key), Wrong::new(message).help("it lies further from the root"));
    }
    at.mm()
}

fn case(row: &Row, reach: Option<&Reach>, held: f64, problems: &mut Problems) -> Option<Case> {
    let word = row.text("load")?;
    let kind = LoadKind::WORDS.iter().position(|known| *known == word)?;
    let (needs, takes) = (LoadKind::NEEDS[kind], LoadKind::TAKES[kind]);
    let given =
        |key: &str| row.number(key).is_some() || row.length(key).is_some() || row.angle(key).is_some();
    let mut sound = true;
    for key in needs.iter().filter(|key| !given(key)) {
        problems.add(row.opening(), Wrong::new(format!("a case of {word} needs {key}")));
        sound = false;
    }
    for key in LoadKind::KEYS.iter().filter(|key| given(key)) {
        if !needs.contains(key) && !takes.contains(key) {
            let takes = [needs, takes].concat().join(", ");
            let wrong =
                Wrong::new(format!("a case of {word} takes no {key}")).help(format!("it takes {takes}"));
            problems.add(row.place(key), wrong);
            sound = false;
        }
    }
    let reach = reach.filter(|_| sound)?;
    let mut place = |key: &str, otherwise: f64, what: &str| {
        free_place(row, key, otherwise, what, (reach, held), problems)
    };
    let far = reach.to.mm();
    let load = match kind {
        0 => {
            let (from, to) = (place("from", held, "the side force"), place("to", far, "the side force"));
            if to <= from + SAME {
                let wrong = Wrong::new("the side force leaves nothing between its ends")
                    .help("from lies nearer to the root than to");
                problems.add(row.place("to"), wrong);
                return None;
            }
            CaseLoad::SideForce { force: row.number("force")?, from, to }
        }
        1 => {
            let pushes = [
                row.number("towards-root").unwrap_or(0.0),
                row.number("force")?,
                row.number("across").unwrap_or(0.0),
            ];
            CaseLoad::Grounding { pushes, at: place("at", far, "the grounding") }
        }
        2 => CaseLoad::Tow {
            pull: row.number("force")?,
            off: row.angle("off")?.radians(),
            at: place("at", far, "the tow"),
        },
        3 => CaseLoad::Standing { mass: row.number("mass")?, at: place("at", far, "the load") },
        _ => CaseLoad::Twist { moment: 1e3 * row.number("moment")?, at: place("at", far, "the moment") },
    };
    Some(Case {
        name: row.text("name")?.to_owned(),
        load,
        on_chord: row.number("on-chord")?,
        factor: row.number("factor")?,
    })
}

fn joint(row: &Row, reach: Option<&Reach>, held: f64, problems: &mut Problems) -> Option<Joint> {
    let at = free_place(row, "at", 0.0, "the joint", (reach?, held), problems);
    Some(Joint {
        purpose: row.text("for")?.to_owned(),
        at: Length::from_mm(at),
        depth: row.length("depth")?,
        strength: row.number("strength")?,
        source: source(row, "values")?,
    })
}

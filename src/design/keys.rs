//! The registry of what a design file may hold.
//!
//! These tables are the only place where a key, its bounds, its default or its meaning is written
//! down. The reader, its messages, the schema for editors and the page of the hand-book all follow
//! from them.

mod boat;
mod strength;
mod wood;
mod workshop;

pub(super) use boat::{BOAT, DUTY, WEIGHT};
pub(super) use strength::{CASE, JOINT, MATERIAL, STRENGTH};
pub(super) use wood::{CUT, FLAP, LAMINATE, PLY, WOOD};
pub(super) use workshop::{MASKS, PAPER, PRINTER, ROUTER, STOCK};

use super::model::{Hands, Kind, TipShape};
use crate::units::{Quantity, SPEED, TEMPERATURE};
use crate::wing::Law;

/// One table of the file.
pub(super) struct Table {
    /// Its name in brackets; empty for the keys above all tables.
    pub(super) name: &'static str,
    /// How often it may stand.
    pub(super) times: Times,
    /// What it is about, one line.
    pub(super) doc: &'static str,
    /// Its keys, in the order in which people read about them.
    pub(super) keys: &'static [Key],
}

/// How often a table may stand in a file.
#[derive(Clone, Copy, PartialEq)]
pub(super) enum Times {
    /// Exactly once.
    Once,
    /// Once or not at all; then all its defaults hold.
    AtMostOnce,
    /// Once or not at all; then there is no such thing.
    Absent,
    /// In double brackets, as often as these two say.
    Many(usize, usize),
}

/// One key of a table.
pub(super) struct Key {
    /// As written.
    pub(super) name: &'static str,
    /// What it takes.
    pub(super) takes: Takes,
    /// What holds when it is left out.
    pub(super) otherwise: Otherwise,
    /// What it means, one line.
    pub(super) doc: &'static str,
    /// A value as one might write it (without the quotes).
    pub(super) example: &'static str,
}

/// What a key takes, with its bounds.
pub(super) enum Takes {
    /// A name that files are called by.
    Name,
    /// Any text up to so many characters.
    Text(usize),
    /// One of these words.
    Word(&'static [&'static str]),
    /// One of these words, or a length within these, millimetres.
    WordOrLength(&'static [&'static str], f64, f64),
    /// A number within the first two, or a length within the last two, millimetres.
    NumberOrLength([f64; 2], [f64; 2]),
    /// A length within these, millimetres.
    Length(f64, f64),
    /// Up to so many lengths, each within these, millimetres.
    Lengths(usize, f64, f64),
    /// An angle within these, degrees.
    Angle(f64, f64),
    /// Another quantity within these, in its base unit.
    Amount(&'static Quantity, f64, f64),
    /// A number without a unit within these.
    Number(f64, f64),
}

/// What holds when a key is left out.
pub(super) enum Otherwise {
    /// Nothing: it has to stand there.
    Required,
    /// This value, written as in the file without its quotes.
    Default(&'static str),
    /// What these words say.
    Left(&'static str),
}

use Otherwise::{Default, Left, Required};
use Takes::{Amount, Angle, Length, Lengths, Name, Number, NumberOrLength, Text, Word, WordOrLength};

const fn key(
    name: &'static str,
    takes: Takes,
    otherwise: Otherwise,
    doc: &'static str,
    example: &'static str,
) -> Key {
    Key { name, takes, otherwise, doc, example }
}

/// Longest span, and the furthest that a place along it can lie, millimetres.
const LONGEST: f64 = 10_000.0;

/// From where along the span something goes.
const FROM: Key = key(
    "from",
    Length(0.0, LONGEST),
    Default("0 mm"),
    "Where it begins, from the root along the span.",
    "50 mm",
);
/// To where.
const TO: Key = key(
    "to",
    Length(0.0, LONGEST),
    Left("the far end"),
    "Where it ends, from the root along the span.",
    "400 mm",
);

/// The keys above all tables.
pub(super) static ROOT: Table = Table {
    name: "",
    times: Times::Once,
    doc: "What it is called and what it is.",
    keys: &[
        key("name", Name, Required, "What you call it; files are named after it.", "Main foil"),
        key("kind", Word(Kind::WORDS), Required, "What is built.", "main-foil"),
        key(
            "notes",
            Text(4000),
            Left("none"),
            "Your own words; they shape nothing.",
            "First try, paulownia core",
        ),
    ],
};

/// The planform.
pub(super) static PLANFORM: Table = Table {
    name: "planform",
    times: Times::Once,
    doc: "The size along the span.",
    keys: &[
        key(
            "span",
            Length(20.0, LONGEST),
            Required,
            "Tip to tip for a main foil or an elevator, made as two mirrored halves; end to end for a strut or a fin.",
            "900 mm",
        ),
        key(
            "law",
            Word(Law::WORDS),
            Default("straight"),
            "How chord, twist, sweep and rise run between the stations: in straight lines, by a smooth curve through all, or the chord as half an ellipse cut at the tip's chord (two stations).",
            "smooth",
        ),
        key(
            "twist-about",
            Number(0.0, 1.0),
            Default("0.25"),
            "Place on the chord about which twist turns, a fraction from the nose.",
            "0.25",
        ),
        key(
            "tip",
            Word(TipShape::WORDS),
            Default("square"),
            "How the far end is shaped: as the last station has it, both edges rounded as an ellipse, or cut across in straight lines.",
            "rounded",
        ),
        key(
            "tip-length",
            Length(1.0, 2000.0),
            Left("half the last station's chord"),
            "Over how much of the span a rounded or cut tip is shaped.",
            "40 mm",
        ),
        key(
            "tip-chord",
            Length(5.0, 2000.0),
            Left("a third of the last station's chord"),
            "Chord left at the very end of a rounded or cut tip.",
            "25 mm",
        ),
        key(
            "tip-about",
            Number(0.0, 1.0),
            Left("0.5 for a rounded tip, 1 for a cut one"),
            "The place on the chord towards which the tip draws together, a fraction from the nose: 1 keeps the trailing edge straight.",
            "0.6",
        ),
        key(
            "hands",
            Word(Hands::WORDS),
            Left("mirrored for a main foil and an elevator, one-handed for a strut and a fin"),
            "Two parts that mirror each other, or one. The span of a one-handed foil is measured from end to end; a strut or a fin that is mirrored is made twice, as a left and a right one.",
            "one-handed",
        ),
        key(
            "in-case",
            Length(0.0, LONGEST),
            Default("0 mm"),
            "How much of a strut or a fin stays in its case in the hull, from the upper end.",
            "300 mm",
        ),
        key(
            "waterline",
            Length(0.0, LONGEST),
            Left("where the case ends"),
            "Where the water's surface lies on a strut or a fin under way, from the upper end.",
            "450 mm",
        ),
    ],
};

/// One station.
pub(super) static STATION: Table = Table {
    name: "station",
    times: Times::Many(2, 100),
    doc: "A section at its place along the span, from the root outwards: the first at 0, the last at half the span (strut and fin: at the span).",
    keys: &[
        key(
            "at",
            Length(0.0, LONGEST),
            Required,
            "Distance from the root (the hull end of a strut) along the span.",
            "450 mm",
        ),
        key("chord", Length(5.0, 2000.0), Required, "From the nose to the trailing edge.", "120 mm"),
        key(
            "section",
            Text(200),
            Required,
            "Designation of the section, as \"NACA 23012\", \"NACA 0012-34\" or \"NACA 16-209\"; or a file beside the design: a section file (\"mine.toml\"), a table of coordinates (\"friend.txt\"), a traced outline (\"traced.dxf\").",
            "NACA 2412",
        ),
        key(
            "trailing-edge",
            WordOrLength(&["published", "closed"], 0.0, 50.0),
            Default("published"),
            "As wide as the section has it (of a published one, as its equation leaves it), closed to a sharp edge, or so thick at this chord.",
            "0.8 mm",
        ),
        key(
            "edge-from",
            Number(0.1, 0.98),
            Default("0.6"),
            "Where the change to that thickness begins, a fraction of the chord.",
            "0.7",
        ),
        key(
            "twist",
            Angle(-30.0, 30.0),
            Default("0 deg"),
            "Nose-up positive, about twist-about of [planform].",
            "-1.5 deg",
        ),
        key(
            "sweep",
            Length(-2000.0, 2000.0),
            Default("0 mm"),
            "How far the quarter chord lies aft of the first station's.",
            "20 mm",
        ),
        key(
            "rise",
            Length(-2000.0, 2000.0),
            Default("0 mm"),
            "How far the quarter chord lies above the first station's: dihedral.",
            "12 mm",
        ),
    ],
};

/// Where templates are cut.
pub(super) static TEMPLATES: Table = Table {
    name: "templates",
    times: Times::AtMostOnce,
    doc: "Where templates and masks are made, besides the stations.",
    keys: &[
        key(
            "fairing",
            Length(0.01, 5.0),
            Left("no places are added"),
            "For a curved law: as many places as it takes for a straight batten from one template to the next to lie this near to the design.",
            "0.3 mm",
        ),
        key(
            "at",
            Lengths(200, 0.0, LONGEST),
            Left("none but the stations"),
            "Places from the root outwards, in ascending order.",
            "0 mm, 150 mm, 300 mm, 450 mm",
        ),
    ],
};

/// Lift curves.
pub(super) static LIFT: Table = Table {
    name: "lift",
    times: Times::AtMostOnce,
    doc: "The angles of attack of the lift curves, the lift that is asked of the sections, and what they run in.",
    keys: &[
        key(
            "speed",
            Amount(&SPEED, 0.5, 25.0),
            Default("9 kn"),
            "Speed of the curves: with chord and water it makes the Reynolds number.",
            "9 kn",
        ),
        key(
            "depth",
            Length(0.0, 5000.0),
            Default("400 mm"),
            "Depth of the foil below the surface, for cavitation.",
            "400 mm",
        ),
        key(
            "top-speed",
            Amount(&SPEED, 0.5, 25.0),
            Left("not checked"),
            "Speed up to which the sections may not cavitate at the design lift.",
            "18 kn",
        ),
        key(
            "cavitation-margin",
            Number(0.0, 2.0),
            Default("0"),
            "By what share the cavitation number is to stay above the greatest suction: 0.2 keeps a fifth to spare for gusts and waves.",
            "0.2",
        ),
        key("water", Word(&["sea", "fresh"]), Default("sea"), "Sea water, or fresh.", "sea"),
        key("temperature", Amount(&TEMPERATURE, 0.0, 30.0), Default("15 °C"), "Of the water.", "15 °C"),
        key(
            "quietness",
            Number(1.0, 12.0),
            Default("6"),
            "How far the water lets waves in the boundary layer grow before it turns turbulent (N of the e^N method): 9 in a clean tank, less in natural water.",
            "6",
        ),
        key("from", Angle(-20.0, 20.0), Default("-4 deg"), "First angle of attack.", "-4 deg"),
        key("to", Angle(-20.0, 20.0), Default("10 deg"), "Last angle of attack, above the first.", "10 deg"),
        key(
            "step",
            Angle(0.01, 20.0),
            Default("1 deg"),
            "From one angle to the next; at most 500 angles in all.",
            "0.5 deg",
        ),
        key(
            "design",
            Number(-3.0, 3.0),
            Default("0.4"),
            "Section lift coefficient that every station must reach within those angles.",
            "0.4",
        ),
    ],
};

/// Every table, in the order of the hand-book.
pub(super) static TABLES: [&Table; 22] = [
    &ROOT, &PLANFORM, &STATION, &TEMPLATES, &WOOD, &LAMINATE, &PLY, &FLAP, &CUT, &LIFT, &DUTY, &BOAT,
    &WEIGHT, &MATERIAL, &STRENGTH, &CASE, &JOINT, &MASKS, &PRINTER, &PAPER, &STOCK, &ROUTER,
];

impl Table {
    /// The key of that name.
    pub(super) fn key(&self, name: &str) -> Option<&'static Key> {
        self.keys.iter().find(|key| key.name == name)
    }

    /// The header as written: `[planform]`, `[[station]]`, or what the keys above them are called.
    pub(super) fn header(&self) -> String {
        match self.times {
            _ if self.name.is_empty() => "the head of the file, above all tables".to_owned(),
            Times::Many(..) => format!("[[{}]]", self.name),
            _ => format!("[{}]", self.name),
        }
    }

    /// Whether a file has to hold it.
    pub(super) fn required(&self) -> bool {
        matches!(self.times, Times::Once | Times::Many(1.., _))
    }
}

impl Key {
    /// A value as the file writes it, quotes and all.
    pub(super) fn quoted(&self, value: &str) -> String {
        match self.takes {
            Number(..) => value.to_owned(),
            NumberOrLength(..) if value.parse::<f64>().is_ok() => value.to_owned(),
            Lengths(..) => {
                let each: Vec<String> = value.split(", ").map(|item| format!("\"{item}\"")).collect();
                format!("[{}]", each.join(", "))
            }
            _ => format!("\"{value}\""),
        }
    }

    /// The key with a value to go by: `chord = "120 mm"`.
    pub(super) fn line(&self) -> String {
        format!("{} = {}", self.name, self.quoted(self.example))
    }
}

impl Takes {
    /// What it takes as it stands in a sentence: "a length from 5 mm to 2 m".
    pub(super) fn describe(&self) -> String {
        let number = crate::units::plain;
        match *self {
            Name => {
                "1 to 60 letters (a to z), digits, spaces, '-' and '_', the first a letter or a digit".into()
            }
            Text(most) => format!("text of at most {most} characters"),
            Word(words) => one_of(words),
            WordOrLength(words, least, most) => {
                format!(
                    "{}, or a length from {} to {}",
                    one_of(words),
                    round_length(least),
                    round_length(most)
                )
            }
            NumberOrLength([least, most], [shortest, longest]) => format!(
                "a number from {} to {}, or a length from {} to {}",
                number(least),
                number(most),
                round_length(shortest),
                round_length(longest)
            ),
            Length(least, most) => format!("a length from {} to {}", round_length(least), round_length(most)),
            Lengths(count, least, most) => format!(
                "a list of up to {count} lengths from {} to {}",
                round_length(least),
                round_length(most)
            ),
            Angle(least, most) => format!("an angle from {} deg to {} deg", number(least), number(most)),
            Amount(quantity, least, most) => {
                let (name, base) = (quantity.name, quantity.base());
                format!("{name} from {} {base} to {} {base}", number(least), number(most))
            }
            Number(least, most) => format!("a number from {} to {}", number(least), number(most)),
        }
    }
}

/// Words as they stand in a sentence: "a", "b" or "c".
fn one_of(words: &[&str]) -> String {
    let each: Vec<String> = words.iter().map(|word| format!("\"{word}\"")).collect();
    match each.split_last() {
        Some((last, rest)) if !rest.is_empty() => format!("{} or {last}", rest.join(", ")),
        _ => each.concat(),
    }
}

/// Bounds of a metre and more read better in metres.
fn round_length(mm: f64) -> String {
    let number = crate::units::plain;
    if mm.abs() >= 1000.0 { format!("{} m", number(mm / 1000.0)) } else { format!("{} mm", number(mm)) }
}

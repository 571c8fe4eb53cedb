//! The keys of materials, load cases, glued joints and what a part is held to.

use super::Otherwise::{Default, Left, Required};
use super::Takes::{Amount, Angle, Length, Number, Text, Word};
use super::{LONGEST, Table, Times, key};
use crate::design::strength::{Form, LoadKind, SOURCES};
use crate::units::{FORCE, MASS, MOMENT, STRESS};

/// Words for a key of a cloth that is alike along and across.
const AS_ALONG: &str = "of woven and chopped as along";

/// A material.
pub(in crate::design) static MATERIAL: Table = Table {
    name: "material",
    times: Times::Many(0, 30),
    doc: "Values of a cured ply, by which strength is worked out. Have your own cloth, resin and pressure tested; nothing else is fit to rely on.",
    keys: &[
        key("name", Text(60), Required, "What plies name it by.", "carbon, along the span"),
        key("values", Word(SOURCES), Required, "Where the values come from.", "tested"),
        key(
            "form",
            Word(Form::WORDS),
            Required,
            "All fibre one way; woven 0/90, which is ±45 when laid so; or chopped mat, alike all ways.",
            "unidirectional",
        ),
        key("modulus", Amount(&STRESS, 100.0, 1e6), Required, "Young's modulus along the fibre.", "110 GPa"),
        key(
            "modulus-across",
            Amount(&STRESS, 100.0, 1e6),
            Left(AS_ALONG),
            "Young's modulus across it.",
            "7.5 GPa",
        ),
        key(
            "shear-modulus",
            Amount(&STRESS, 100.0, 1e6),
            Left("of chopped E / 2(1 + contraction)"),
            "Shear modulus in the plane.",
            "3.8 GPa",
        ),
        key(
            "contraction",
            Number(0.0, 0.5),
            Left("0.3, of woven 0.1"),
            "How much it contracts across for each extension along.",
            "0.3",
        ),
        key("tension", Amount(&STRESS, 1.0, 1e4), Required, "Tensile strength along the fibre.", "1100 MPa"),
        key("compression", Amount(&STRESS, 1.0, 1e4), Required, "Compressive strength along it.", "650 MPa"),
        key(
            "tension-across",
            Amount(&STRESS, 1.0, 1e4),
            Left(AS_ALONG),
            "Tensile strength across it.",
            "30 MPa",
        ),
        key(
            "compression-across",
            Amount(&STRESS, 1.0, 1e4),
            Left(AS_ALONG),
            "Compressive strength across it.",
            "110 MPa",
        ),
        key("shear", Amount(&STRESS, 1.0, 1e4), Required, "Shear strength in the plane.", "50 MPa"),
    ],
};

/// What a part is held to.
pub(in crate::design) static STRENGTH: Table = Table {
    name: "strength",
    times: Times::AtMostOnce,
    doc: "What strength is held to, where material values are given.",
    keys: &[
        key(
            "reserve",
            Number(0.5, 10.0),
            Default("1.5"),
            "Least strength over stress anywhere, load factors included.",
            "1.5",
        ),
        key(
            "flight-factor",
            Number(1.0, 10.0),
            Default("2"),
            "Load factor of steady flight at the speeds of [duty]: for waves, gusts and landing. Common practice, no source.",
            "2",
        ),
        key(
            "deflection",
            Length(0.1, 2000.0),
            Left("5 % of the free length"),
            "Most that the far end may move across in flight and under side force, without the load factor.",
            "20 mm",
        ),
        key(
            "twist",
            Angle(0.05, 30.0),
            Default("1 deg"),
            "Most that it may twist under the same loads.",
            "1 deg",
        ),
        key(
            "held-to",
            Length(0.0, LONGEST),
            Left("in-case of [planform]"),
            "How far from the root it is held fast: a strut up to where it leaves the hull, a foil up to the edge of its fitting.",
            "300 mm",
        ),
    ],
};

/// A load case.
pub(in crate::design) static CASE: Table = Table {
    name: "case",
    times: Times::Many(0, 30),
    doc: "A load that the part has to stand besides flight: side force along the wet part, a grounding, a tow, a person who stands on it, a twisting moment.",
    keys: &[
        key("name", Text(60), Required, "What you call it.", "grounding at walking pace"),
        key("load", Word(LoadKind::WORDS), Required, "What kind of load.", "grounding"),
        key(
            "force",
            Amount(&FORCE, -1e5, 1e5),
            Left("for side-force, grounding and tow"),
            "The whole side force, to the upper side positive; of a grounding what pushes rearwards; the pull of a tow.",
            "600 N",
        ),
        key(
            "towards-root",
            Amount(&FORCE, 0.0, 1e5),
            Left("none; for grounding"),
            "What a grounding pushes along the span.",
            "300 N",
        ),
        key(
            "across",
            Amount(&FORCE, -1e5, 1e5),
            Left("none; for grounding"),
            "What it pushes to the upper side.",
            "100 N",
        ),
        key("off", Angle(-90.0, 90.0), Left("for tow"), "How far a tow pulls off the course.", "30 deg"),
        key("mass", Amount(&MASS, 1.0, 1000.0), Left("for standing"), "Of who stands on it.", "80 kg"),
        key(
            "moment",
            Amount(&MOMENT, -1e5, 1e5),
            Left("for twist"),
            "Nose-up moment about the span, on a strut that of a foil caught at one tip.",
            "40 N m",
        ),
        key(
            "at",
            Length(0.0, LONGEST),
            Left("the far end; not for side-force"),
            "Where it acts, from the root along the span.",
            "400 mm",
        ),
        key(
            "from",
            Length(0.0, LONGEST),
            Left("held-to of [strength]; for side-force"),
            "Where the side force begins, from the root.",
            "300 mm",
        ),
        key("to", Length(0.0, LONGEST), Left("the far end; for side-force"), "Where it ends.", "850 mm"),
        key(
            "on-chord",
            Number(-10.0, 10.0),
            Default("0.25"),
            "Where it acts on the chord, a fraction from the nose; a towing eye may lie ahead of it or behind.",
            "0.25",
        ),
        key("factor", Number(1.0, 10.0), Default("1.5"), "Load factor.", "1.5"),
    ],
};

/// A glued joint.
pub(in crate::design) static JOINT: Table = Table {
    name: "joint",
    times: Times::Many(0, 10),
    doc: "A joint that is glued round the whole section: a strut in the pocket of its foil or in its head.",
    keys: &[
        key("for", Text(60), Required, "What it joins.", "foil to strut"),
        key(
            "at",
            Length(0.0, LONGEST),
            Required,
            "Where the load enters it, from the root along the span: its mouth.",
            "810 mm",
        ),
        key("depth", Length(1.0, 1000.0), Required, "How deep the part is glued in.", "40 mm"),
        key(
            "strength",
            Amount(&STRESS, 0.1, 100.0),
            Required,
            "Shear strength of the glue line, of a lap as long as the joint is deep.",
            "6 MPa",
        ),
        key("values", Word(SOURCES), Required, "Where that comes from.", "tested"),
    ],
};

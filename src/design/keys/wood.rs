//! The keys of what is made of wood and cloth: laminate, wood, plies, flap and cut-outs.

use super::Otherwise::{Default, Left, Required};
use super::Takes::{Amount, Angle, Length, Number, NumberOrLength, Text, Word};
use super::{FROM, LONGEST, TO, Table, Times, key};
use crate::design::model::{CutKind, FlapKind, HingeFrom, PlySide};
use crate::design::strength::SOURCES;
use crate::units::{AREAL_WEIGHT, DENSITY, STRESS};

/// What the laminate takes up besides its plies.
pub(in crate::design) static LAMINATE: Table = Table {
    name: "laminate",
    times: Times::AtMostOnce,
    doc: "What lies between wood and finished surface besides the plies.",
    keys: &[
        key("finish", Length(0.0, 5.0), Default("0 mm"), "Filler and paint over all.", "0.2 mm"),
        key(
            "rise",
            Length(0.5, 100.0),
            Default("5 mm"),
            "Over how much of the chord the recess for a ply deepens at an edge of it that lies on a surface.",
            "5 mm",
        ),
        key(
            "least-wood",
            Length(0.0, 50.0),
            Default("1.5 mm"),
            "The thinnest wood that your shop can shape; where the core is thinner you are told.",
            "1.5 mm",
        ),
    ],
};

/// The wood.
pub(in crate::design) static WOOD: Table = Table {
    name: "wood",
    times: Times::AtMostOnce,
    doc: "What the core is made of.",
    keys: &[
        key("species", Text(60), Default("paulownia"), "What you call it.", "paulownia"),
        key(
            "density",
            Amount(&DENSITY, 30.0, 1500.0),
            Default("300 kg/m3"),
            "Density as it lies in your shop; weigh a piece. Paulownia is about 300, cedar 380, balsa 160, foam 40 to 100 kg/m3.",
            "300 kg/m3",
        ),
        key(
            "allowance",
            Length(0.0, 50.0),
            Default("10 mm"),
            "Added to a blank on every side for holding and trimming.",
            "10 mm",
        ),
        key("values", Word(SOURCES), Left(NO_STRENGTH), "Where the values below come from.", "tested"),
        key(
            "modulus",
            Amount(&STRESS, 1.0, 1e5),
            Left(NO_STRENGTH),
            "Young's modulus along the span.",
            "6 GPa",
        ),
        key(
            "modulus-across",
            Amount(&STRESS, 1.0, 1e5),
            Left(NO_STRENGTH),
            "The same square to the skin.",
            "250 MPa",
        ),
        key("shear-modulus", Amount(&STRESS, 1.0, 1e5), Left(NO_STRENGTH), "Shear modulus.", "350 MPa"),
        key("shear", Amount(&STRESS, 0.05, 1000.0), Left(NO_STRENGTH), "Shear strength.", "4 MPa"),
        key(
            "compression",
            Amount(&STRESS, 0.05, 1000.0),
            Left(NO_STRENGTH),
            "Compressive strength square to the skin.",
            "3 MPa",
        ),
    ],
};

/// Words for a key without which strength is not looked at.
const NO_STRENGTH: &str = "strength is not worked out";

/// One ply.
pub(in crate::design) static PLY: Table = Table {
    name: "ply",
    times: Times::Many(0, 60),
    doc: "A layer of the laminate, from the wood outwards. Without any, core and finished surface are one.",
    keys: &[
        key("cloth", Text(60), Default("cloth"), "What you call it.", "carbon twill"),
        key("weight", Amount(&AREAL_WEIGHT, 10.0, 3000.0), Required, "Weight of the dry cloth.", "200 g/m2"),
        key(
            "fibre-density",
            Amount(&DENSITY, 500.0, 4000.0),
            Default("1800 kg/m3"),
            "Density of the fibre: carbon about 1800, E-glass 2550, aramid 1440 kg/m3.",
            "1800 kg/m3",
        ),
        key(
            "resin-density",
            Amount(&DENSITY, 800.0, 2000.0),
            Default("1150 kg/m3"),
            "Density of the cured resin.",
            "1150 kg/m3",
        ),
        key(
            "fibre-share",
            Number(0.2, 0.75),
            Default("0.45"),
            "Share of the fibre in the volume of the cured ply: about 0.35 by hand, 0.45 to 0.5 under vacuum.",
            "0.45",
        ),
        key(
            "thickness",
            Length(0.01, 20.0),
            Left("from weight, density and share"),
            "Thickness of the cured ply, where you have measured it.",
            "0.25 mm",
        ),
        key("on", Word(PlySide::WORDS), Default("both"), "The surfaces that it covers.", "both"),
        FROM,
        TO,
        key(
            "chord-from",
            Number(0.0, 0.95),
            Default("0"),
            "Where it begins along the chord; from 0 on both surfaces it goes round the nose.",
            "0.15",
        ),
        key("chord-to", Number(0.05, 1.0), Default("1"), "Where it ends along the chord.", "0.6"),
        key(
            "material",
            Text(60),
            Left(NO_STRENGTH),
            "Name of the [[material]] that holds its values.",
            "carbon, along the span",
        ),
        key(
            "angle",
            Angle(-90.0, 90.0),
            Default("0 deg"),
            "From the span to its fibre: 0 along the span or 0/90, 45 for woven cloth laid ±45.",
            "45 deg",
        ),
    ],
};

/// The flap.
pub(in crate::design) static FLAP: Table = Table {
    name: "flap",
    times: Times::Absent,
    doc: "A flap: where it is parted from the main body, and how it is hinged.",
    keys: &[
        key(
            "hinge",
            NumberOrLength([0.3, 0.95], [2.0, 2000.0]),
            Required,
            "Where the hinge lies: a fraction of the chord from the nose, or a length along the chord.",
            "0.7",
        ),
        key(
            "hinge-end",
            NumberOrLength([0.3, 0.95], [2.0, 2000.0]),
            Left("as hinge"),
            "The same at the flap's outer end; between the two it changes evenly.",
            "0.72",
        ),
        key(
            "hinge-from",
            Word(HingeFrom::WORDS),
            Default("nose"),
            "Where a hinge that is given as a length is measured from.",
            "trailing-edge",
        ),
        FROM,
        TO,
        key(
            "kind",
            Word(FlapKind::WORDS),
            Default("laminate-upper"),
            "A hinge of laminate in the upper or the lower surface with a wedge-shaped gap, or a pin with a round flap nose.",
            "laminate-upper",
        ),
        key(
            "axis",
            Number(0.1, 0.9),
            Default("0.5"),
            "Height of a pin between the lower (0) and the upper (1) surface.",
            "0.5",
        ),
        key("up", Angle(0.0, 45.0), Default("8 deg"), "Travel with the trailing edge up.", "8 deg"),
        key("down", Angle(0.0, 45.0), Default("12 deg"), "Travel with the trailing edge down.", "12 deg"),
        key(
            "clearance",
            Length(0.1, 5.0),
            Default("0.5 mm"),
            "What stays free between flap and main body throughout the travel.",
            "0.5 mm",
        ),
        key("face", Length(0.0, 5.0), Default("0 mm"), "Laminate on the cut faces.", "0.3 mm"),
        key(
            "face-material",
            Text(60),
            Left("the wood alone closes the section"),
            "Name of the [[material]] of that laminate, laid on the bias (±45).",
            "glass twill",
        ),
        super::boat::HORN,
    ],
};

/// Cut-outs.
pub(in crate::design) static CUT: Table = Table {
    name: "cut",
    times: Times::Many(0, 40),
    doc: "What is taken out of the wood: a slot for a control rod or a tube, a bore, a pocket for a spar, a reinforcement or a joint, a hole for a bolt.",
    keys: &[
        key("for", Text(60), Required, "What it is for.", "control rod"),
        key(
            "kind",
            Word(CutKind::WORDS),
            Required,
            "A slot sunk from a face, with a flat floor; a round bore along the span; a pocket whose floor follows the face; a round hole through the foil.",
            "slot",
        ),
        key("along", Word(&["span", "chord"]), Default("span"), "Which way a slot runs.", "span"),
        key(
            "at",
            Number(0.02, 0.98),
            Left("wanted of a bore, a hole, and a slot along the span"),
            "Its middle, as a fraction of the chord from the nose.",
            "0.3",
        ),
        key(
            "span-at",
            Length(0.0, LONGEST),
            Left("wanted of a hole, and a slot along the chord"),
            "Its middle along the span, from the root.",
            "30 mm",
        ),
        key(
            "width",
            Length(0.5, 500.0),
            Left("wanted of all but a pocket"),
            "Width across a slot, diameter of a bore or a hole.",
            "8 mm",
        ),
        key(
            "depth",
            Length(0.0, 200.0),
            Default("0 mm"),
            "Depth of a slot, a pocket or a hole below the face of the wood; a hole of no depth goes right through.",
            "6 mm",
        ),
        key("face", Word(&["upper", "lower"]), Default("upper"), "The face that it is sunk from.", "upper"),
        key(
            "height",
            Number(0.0, 1.0),
            Default("0.5"),
            "Centre of a bore between the lower (0) and the upper (1) face of the wood.",
            "0.5",
        ),
        key(
            "chord-from",
            Number(0.02, 0.98),
            Left("wanted of a pocket, and a slot along the chord"),
            "Where it begins along the chord, a fraction from the nose.",
            "0.15",
        ),
        key(
            "chord-to",
            Number(0.02, 0.98),
            Left("wanted of a pocket, and a slot along the chord"),
            "Where it ends along the chord.",
            "0.45",
        ),
        FROM,
        TO,
        key(
            "least-left",
            Length(0.0, 100.0),
            Default("3 mm"),
            "The least wood that is to be left beside it.",
            "3 mm",
        ),
    ],
};

//! The keys of the boat that a foil flies under, and of what it carries.

use super::Otherwise::{Default, Left, Required};
use super::Takes::{Amount, Angle, Length, Number, Text};
use super::{Table, Times, key};
use crate::units::{FORCE, MASS, SPEED};

/// Furthest that something on a boat lies from the mark, millimetres.
const FAR: f64 = 30_000.0;

/// What the foil is asked to carry.
pub(in crate::design) static DUTY: Table = Table {
    name: "duty",
    times: Times::Absent,
    doc: "What a level foil carries under its boat, for a main foil or an elevator.",
    keys: &[
        key(
            "carries",
            Amount(&MASS, 1.0, 5000.0),
            Left("by the balance of [boat]"),
            "Mass that this foil carries in flight: its share of boat, crew and rig.",
            "150 kg",
        ),
        key("take-off", Amount(&SPEED, 0.5, 20.0), Required, "Speed at which it has to carry it.", "8 kn"),
        key(
            "cruise",
            Amount(&SPEED, 0.5, 25.0),
            Left("not shown"),
            "Speed at which it usually runs.",
            "12 kn",
        ),
        key(
            "share",
            Number(0.3, 1.0),
            Default("0.85"),
            "How much of its greatest lift it may use at take-off; the rest is the margin to stall.",
            "0.85",
        ),
        key(
            "take-off-depth",
            Length(1.0, 5000.0),
            Left("depth of [lift]"),
            "Depth of the foil's root below the surface at take-off.",
            "500 mm",
        ),
        key("cruise-depth", Length(1.0, 5000.0), Left("depth of [lift]"), "The same at cruise.", "350 mm"),
        key("top-depth", Length(1.0, 5000.0), Left("depth of [lift]"), "The same at top speed.", "300 mm"),
        key(
            "set-at",
            Angle(-10.0, 15.0),
            Left("so that it carries its load at cruise with the flap straight"),
            "Incidence of the root's chord at which a foil with a flap is set on its boat.",
            "1.5 deg",
        ),
        key(
            "stall-margin",
            Angle(0.0, 10.0),
            Default("1 deg"),
            "Least incidence left until any part of it stalls at these speeds. Common practice, no source.",
            "1 deg",
        ),
    ],
};

/// The boat.
pub(in crate::design) static BOAT: Table = Table {
    name: "boat",
    times: Times::Absent,
    doc: "The boat on two foils, in the file of one of them; the other parts name that file. Places are measured aft from any mark, such as the bow.",
    keys: &[
        key(
            "described-in",
            Text(200),
            Left("here"),
            "Design beside this one, of a foil, that describes the boat; then nothing else stands here.",
            "main-foil.toml",
        ),
        key(
            "foil-at",
            Length(-FAR, FAR),
            Left("for balance"),
            "Quarter chord of this foil's root, aft of the mark.",
            "1700 mm",
        ),
        key("other-at", Length(-FAR, FAR), Left("for balance"), "That of the other foil.", "4400 mm"),
        key(
            "other-foil",
            Text(200),
            Left("nothing but its share is worked out"),
            "Design of the other foil beside this one.",
            "elevator.toml",
        ),
        key(
            "other-below",
            Length(-2000.0, 2000.0),
            Default("0 mm"),
            "How much deeper the other foil lies.",
            "50 mm",
        ),
        key(
            "mass",
            Amount(&MASS, 1.0, 10_000.0),
            Left("the sum of [[weight]]"),
            "All that flies, to hold the shares or the weights against.",
            "205 kg",
        ),
        key(
            "other-carries",
            Amount(&MASS, 0.0, 5000.0),
            Left("by the balance"),
            "What the other foil carries, where the shares are given and no weights.",
            "40 kg",
        ),
        key(
            "drive",
            Amount(&FORCE, 0.0, 1e5),
            Default("0 N"),
            "What the sail pulls forwards in flight, and as much drag holds back.",
            "160 N",
        ),
        key(
            "effort-height",
            Length(-1000.0, FAR),
            Default("0 mm"),
            "Height of the sail's centre of effort above the drag's, which lies near the foils.",
            "2600 mm",
        ),
        key(
            "side-force",
            Amount(&FORCE, 0.0, 1e5),
            Default("0 N"),
            "Side force on the strut in flight.",
            "300 N",
        ),
        key(
            "heel",
            Angle(0.0, 45.0),
            Default("0 deg"),
            "Heel in flight: the foils then lift the weight over its cosine, and one tip comes up.",
            "8 deg",
        ),
    ],
};

/// A weight.
pub(in crate::design) static WEIGHT: Table = Table {
    name: "weight",
    times: Times::Many(0, 40),
    doc: "Something heavy on the boat of [boat]: hull, rig, each of the crew.",
    keys: &[
        key("for", Text(60), Required, "What it is.", "hull"),
        key("mass", Amount(&MASS, 0.0, 5000.0), Required, "Its mass.", "65 kg"),
        key("aft", Length(-FAR, FAR), Required, "How far aft of the mark it lies.", "2100 mm"),
    ],
};

/// Where the rod takes hold of a flap.
pub(super) const HORN: super::Key = key(
    "horn",
    Length(1.0, 1000.0),
    Left("the rod's force is not worked out"),
    "From the hinge's axis to where the control rod takes hold, square to the rod.",
    "25 mm",
);

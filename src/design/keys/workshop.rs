//! The keys of the workshop: masks, printer, paper, stock and router.

use super::Otherwise::Default;
use super::Takes::{Length, Number, Word, WordOrLength};
use super::{Table, Times, key};
use crate::design::model::{DxfRelease, Faces, MaskShapes, PaperSize};
use crate::workshop::Corners;

/// Masks.
pub(in crate::design) static MASKS: Table = Table {
    name: "masks",
    times: Times::AtMostOnce,
    doc: "The printed masks, cradles and rails that guide the shaping.",
    keys: &[
        key(
            "for",
            Word(MaskShapes::WORDS),
            Default("both"),
            "The wood before the laminate, the finished surface, or both; without a laminate they are one.",
            "core",
        ),
        key(
            "clearance",
            Length(0.05, 5.0),
            Default("0.3 mm"),
            "Gap between the mask and what it closes on.",
            "0.3 mm",
        ),
        key("wall", Length(2.0, 60.0), Default("10 mm"), "Material around the section.", "10 mm"),
        key(
            "thickness",
            Length(1.0, 60.0),
            Default("6 mm"),
            "Thickness of a mask or a rail along the span.",
            "6 mm",
        ),
        key(
            "cradles",
            Word(Faces::WORDS),
            Default("none"),
            "Cradles that hold the half-shaped wood by a face, one between each two templates.",
            "lower",
        ),
        key(
            "cradle-length",
            Length(10.0, 500.0),
            Default("60 mm"),
            "Length of a cradle along the span; no more than lies between the templates.",
            "60 mm",
        ),
        key(
            "rails",
            Word(Faces::WORDS),
            Default("none"),
            "Rails at the stations that guide a straight edge or a router sled over a face.",
            "upper",
        ),
        key(
            "rail-offset",
            Length(0.0, 100.0),
            Default("0 mm"),
            "How far the rails stand proud of the wood, square to it: what a sled and its cutter need; nothing for a straight edge.",
            "12 mm",
        ),
    ],
};

/// The 3D printer.
pub(in crate::design) static PRINTER: Table = Table {
    name: "printer",
    times: Times::AtMostOnce,
    doc: "The 3D printer that makes the masks.",
    keys: &[
        key("bed-x", Length(50.0, 2000.0), Default("220 mm"), "Width of the bed.", "220 mm"),
        key("bed-y", Length(50.0, 2000.0), Default("220 mm"), "Depth of the bed.", "220 mm"),
        key("bed-z", Length(50.0, 2000.0), Default("250 mm"), "Greatest height of a print.", "250 mm"),
        key("margin", Length(0.0, 50.0), Default("5 mm"), "Kept free along every edge of the bed.", "5 mm"),
    ],
};

/// Paper.
pub(in crate::design) static PAPER: Table = Table {
    name: "paper",
    times: Times::AtMostOnce,
    doc: "The paper that templates are printed on.",
    keys: &[
        key(
            "size",
            WordOrLength(PaperSize::WORDS, 200.0, 2000.0),
            Default("A4"),
            "The sheet, or the width of a roll.",
            "A4",
        ),
        key(
            "margin",
            Length(5.0, 40.0),
            Default("10 mm"),
            "What the printer leaves white along every edge.",
            "10 mm",
        ),
        key("overlap", Length(0.0, 40.0), Default("10 mm"), "How much neighbouring sheets share.", "10 mm"),
    ],
};

/// Sheet stock.
pub(in crate::design) static STOCK: Table = Table {
    name: "stock",
    times: Times::AtMostOnce,
    doc: "The sheet that templates are routed from.",
    keys: &[
        key("length", Length(50.0, 5000.0), Default("1200 mm"), "Length of the sheet.", "1200 mm"),
        key("width", Length(50.0, 5000.0), Default("600 mm"), "Width of the sheet.", "600 mm"),
        key("thickness", Length(1.0, 200.0), Default("18 mm"), "Thickness of the sheet.", "18 mm"),
        key(
            "margin",
            Length(0.0, 100.0),
            Default("10 mm"),
            "Kept free along every edge of the sheet.",
            "10 mm",
        ),
        key(
            "spacing",
            Length(0.5, 100.0),
            Default("12 mm"),
            "Kept free between two pieces: the cutter and what holds the sheet.",
            "12 mm",
        ),
        key(
            "grain",
            Word(&["along", "any"]),
            Default("along"),
            "Whether every piece keeps its length along the sheet's, as its grain asks, or may be turned by a quarter.",
            "along",
        ),
    ],
};

/// The router.
pub(in crate::design) static ROUTER: Table = Table {
    name: "router",
    times: Times::AtMostOnce,
    doc: "The router that cuts the templates.",
    keys: &[
        key(
            "tolerance",
            Length(0.001, 0.5),
            Default("0.01 mm"),
            "How far the cut line may stray from the section.",
            "0.01 mm",
        ),
        key(
            "cutter",
            Length(0.5, 50.0),
            Default("6 mm"),
            "Diameter of the cutter; inside radii that it does not reach are told.",
            "6 mm",
        ),
        key(
            "contour",
            Word(&["piece", "path"]),
            Default("piece"),
            "What a contour is: the line of the piece, for a machine that sets off the cutter's radius itself, or the path of the cutter's middle.",
            "piece",
        ),
        key(
            "corners",
            Word(Corners::WORDS),
            Default("sharp"),
            "Inner corners of slots and pockets: left sharp for the chisel, or relieved by the cutter's radius, along the bisector or into the end wall.",
            "dog-bone",
        ),
        key("tabs", Number(0.0, 20.0), Default("0"), "Holding tabs on each piece, a whole number.", "4"),
        key("tab-width", Length(1.0, 50.0), Default("6 mm"), "Length of a tab along the contour.", "6 mm"),
        key(
            "curves",
            Word(&["arcs", "splines"]),
            Default("arcs"),
            "How curved contours are written: as lines and arcs, or as splines (release 2000 alone).",
            "arcs",
        ),
        key(
            "dxf",
            Word(DxfRelease::WORDS),
            Default("2000"),
            "Release of the router files: 2000, R12 for the oldest readers, or both.",
            "both",
        ),
    ],
};

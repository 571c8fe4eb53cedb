//! What was found in coordinates and done with them, and how to say it to a boatbuilder.

use super::placing::Placing;
use crate::section::Side;
use crate::units::{fixed, number};

/// What was found in coordinates and done with them. Lengths are in chords unless they say
/// otherwise; points are counted from 1 as they stand in the file, of a drawing along its outline
/// as it was drawn.
#[derive(Debug, Clone, PartialEq)]
pub struct CoordinateReport {
    /// Title of the table, or layer of the outline.
    pub title: Option<String>,
    /// How many points were given.
    pub count: usize,
    /// Whether the upper surface came first.
    pub upper_first: bool,
    /// 1 where the points go round the section, 2 where each surface stands for itself.
    pub blocks: usize,
    /// Whether the points began at the nose.
    pub from_nose: bool,
    /// Whether decimals were written with a comma.
    pub decimal_comma: bool,
    /// What the coordinates were taken for.
    pub unit: ChordUnit,
    /// Where the section lay in the file: its chord, its rotation, its nose.
    pub placing: Placing,
    /// How far the ends of the surfaces lie apart.
    pub edge_gap: f64,
    /// Points that repeat the one before them and were left out.
    pub duplicates: Vec<usize>,
    /// Points on a rounded or blunt trailing edge that were left out.
    pub rounded: Vec<usize>,
    /// By how much the ends of the surfaces had passed each other before they were joined to a
    /// sharp edge; nought where they had not.
    pub joined: f64,
    /// One unit of the last digit of the heights; `None` for a drawing.
    pub resolution: Option<f64>,
    /// How far the outline may be from the points, where the user said so.
    pub tolerance: Option<f64>,
    /// The greatest distance of the outline from a point, along its normal.
    pub greatest_distance: f64,
    /// The point that it was found at.
    pub greatest_at: usize,
    /// Whether each point is reached within half a unit of its last digit, or the tolerance.
    pub reached: bool,
    /// Points that stand out from their neighbours. They are kept.
    pub outliers: Vec<Outlier>,
    /// Waves. They are kept.
    pub waves: Vec<Wave>,
    /// What else was found, as in a drawing objects that are no outline.
    pub notes: Vec<String>,
}

/// What coordinates were taken for.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum ChordUnit {
    /// Fractions of the chord.
    Chord,
    /// Percent of the chord.
    Percent,
    /// Millimetres, for want of anything else.
    AssumedMillimetres,
    /// A unit that the file names, with its length in millimetres.
    Named(&'static str, f64),
    /// A drawing that names no unit.
    Unitless,
}

/// A point that stands out from its neighbours.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Outlier {
    /// The point.
    pub index: usize,
    /// Its line in the file.
    pub line: Option<usize>,
    /// The surface.
    pub side: Side,
    /// Its station.
    pub x: f64,
    /// How far it is from where its neighbours put it.
    pub distance: f64,
}

/// A place where a surface changes between round and hollow and back.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Wave {
    /// The point nearest to its strongest part.
    pub index: usize,
    /// Line of that point in the file.
    pub line: Option<usize>,
    /// The surface.
    pub side: Side,
    /// Station of the strongest part.
    pub x: f64,
    /// Station at which it begins.
    pub from: f64,
    /// Station at which it ends.
    pub to: f64,
    /// What the strongest part rises over its own chord.
    pub amplitude: f64,
    /// Whether that part is hollow.
    pub hollow: bool,
}

impl CoordinateReport {
    /// The chord in millimetres, where the file says what its units are or they are taken for
    /// millimetres.
    #[must_use]
    pub fn chord_mm(&self) -> Option<f64> {
        let chord = self.placing.chord();
        match self.unit {
            ChordUnit::Chord | ChordUnit::Percent => None,
            ChordUnit::AssumedMillimetres | ChordUnit::Unitless => Some(chord),
            ChordUnit::Named(_, mm) => Some(chord * mm),
        }
    }

    /// All of it in plain words, a sentence or two a line.
    #[must_use]
    pub fn lines(&self) -> Vec<String> {
        let mut lines = vec![self.listing(), self.size(), self.place()];
        lines.extend(self.left_out());
        lines.push(self.edge());
        lines.push(self.distance());
        lines.extend(self.findings());
        lines.extend(self.notes.iter().cloned());
        lines
    }

    fn listing(&self) -> String {
        let title = self.title.as_ref().map_or(String::new(), |title| format!("{title}: "));
        let first = if self.upper_first { "upper" } else { "lower" };
        let order = match (self.blocks, self.from_nose) {
            (2, true) => format!("in two blocks, the {first} surface first, from the nose"),
            (2, false) => format!("in two blocks, the {first} surface first, from the trailing edge"),
            (_, true) => {
                format!("from the nose round the trailing edge and back; the {first} surface is read first")
            }
            (_, false) => format!("from the trailing edge over the {first} surface to the nose and back"),
        };
        let comma = if self.decimal_comma { " Decimals are written with a comma." } else { "" };
        format!("{title}{} points, {order}.{comma}", self.count)
    }

    fn size(&self) -> String {
        let chord = significant(self.placing.chord());
        match self.unit {
            ChordUnit::Chord => format!("The numbers are fractions of the chord (it is {chord} long)."),
            ChordUnit::Percent => format!("The numbers are percent of the chord (it is {chord} long)."),
            ChordUnit::AssumedMillimetres => {
                format!("The numbers are taken for millimetres: the chord is {chord} mm long.")
            }
            ChordUnit::Named(unit, 1.0) => {
                format!("The drawing is in {unit}: the chord is {chord} mm long.")
            }
            ChordUnit::Named(unit, mm) => format!(
                "The drawing is in {unit}: the chord is {chord} of them, {} mm.",
                significant(self.placing.chord() * mm)
            ),
            ChordUnit::Unitless => {
                format!("The drawing names no unit; taken for millimetres, the chord is {chord} mm long.")
            }
        }
    }

    fn place(&self) -> String {
        let nose = self.placing.nose();
        let mirrored = if self.placing.mirrored() {
            "The nose pointed to the right: the section was mirrored. "
        } else {
            ""
        };
        let degrees = self.placing.rotation().to_degrees();
        let turned = if degrees.abs() < 0.0005 {
            "lies level".to_owned()
        } else {
            format!("rose by {} degrees and was laid level", number(degrees, 3))
        };
        let far = nose.to_vec2().hypot() / self.placing.chord();
        let moved = if far < 1e-9 {
            "The nose is at the origin".to_owned()
        } else {
            let at = format!("x = {}, y = {}", significant(nose.x), significant(nose.y));
            format!(
                "The nose, the point furthest from the trailing edge, was found at {at} and moved to the origin"
            )
        };
        format!("{mirrored}{moved}; the chord {turned}.")
    }

    fn left_out(&self) -> Vec<String> {
        let mut lines = Vec::new();
        if !self.duplicates.is_empty() {
            lines.push(format!("Left out, since they repeat the one before: {}.", points(&self.duplicates)));
        }
        if !self.rounded.is_empty() {
            let which = points(&self.rounded);
            lines.push(format!(
                "Left out, since they lie on the round or the cut of the trailing edge: {which}."
            ));
        }
        lines
    }

    fn edge(&self) -> String {
        if self.joined > 0.0 {
            let by = significant(100.0 * self.joined);
            return format!(
                "At the trailing edge the surfaces had passed each other by {by} % of the chord: their ends were joined, and the edge is sharp."
            );
        }
        if self.edge_gap < 1e-9 {
            return "The trailing edge is sharp.".to_owned();
        }
        let mm = self
            .chord_mm()
            .map_or(String::new(), |chord| format!(", {} mm", significant(self.edge_gap * chord)));
        format!("The trailing edge is open by {} % of the chord{mm}.", significant(100.0 * self.edge_gap))
    }

    fn distance(&self) -> String {
        let basis = match (self.tolerance, self.resolution) {
            (Some(tolerance), _) => format!("the tolerance of {tolerance} of the chord"),
            (None, Some(unit)) => format!(
                "half a unit of the last digit that is printed (a unit is {} of the chord)",
                significant(unit)
            ),
            (None, None) => "what a drawing is followed by".to_owned(),
        };
        let (far, at) = (significant(self.greatest_distance), self.greatest_at);
        if self.reached {
            format!(
                "The outline is the smoothest that stays within {basis} of each point; it is furthest from point {at}, by {far} of the chord."
            )
        } else {
            format!(
                "Not every point is within {basis} of the outline: it is furthest from point {at}, by {far} of the chord."
            )
        }
    }

    fn findings(&self) -> Vec<String> {
        let mut lines = Vec::new();
        for outlier in &self.outliers {
            lines.push(format!(
                "Point {}{} on the {} surface, at {} % of the chord, stands out by {} % of the chord from where its neighbours put it. It was kept: correct it if it is a slip.",
                outlier.index,
                on_line(outlier.line),
                word(outlier.side),
                fixed(100.0 * outlier.x, 1),
                significant(100.0 * outlier.distance)
            ));
        }
        for wave in &self.waves {
            let side = word(wave.side);
            let shape = if wave.hollow { "hollow" } else { "hump" };
            lines.push(format!(
                "The {side} surface has a wave from {} % to {} % of the chord: its {shape} near point {}{} is {} % of the chord deep. It was kept.",
                fixed(100.0 * wave.from, 1),
                fixed(100.0 * wave.to, 1),
                wave.index,
                on_line(wave.line),
                significant(100.0 * wave.amplitude)
            ));
        }
        if lines.is_empty() {
            lines.push("No point stands out, and there are no waves.".to_owned());
        }
        lines
    }
}

fn word(side: Side) -> &'static str {
    if side == Side::Upper { "upper" } else { "lower" }
}

fn on_line(line: Option<usize>) -> String {
    line.map_or(String::new(), |line| format!(" (line {line})"))
}

/// A list of points, not longer than one reads.
fn points(indices: &[usize]) -> String {
    const SHOWN: usize = 8;
    let shown: Vec<String> = indices.iter().take(SHOWN).map(ToString::to_string).collect();
    let more = indices.len().saturating_sub(SHOWN);
    let more = if more > 0 { format!(" and {more} more") } else { String::new() };
    let word = if indices.len() == 1 { "point" } else { "points" };
    format!("{word} {}{more}", shown.join(", "))
}

/// Four digits, as short as they can be.
fn significant(value: f64) -> String {
    if value == 0.0 {
        return "0".to_owned();
    }
    if !(1e-4..1e7).contains(&value.abs()) {
        return format!("{value:.1e}");
    }
    let places = (3 - value.abs().log10().floor() as i32).clamp(0, 8);
    number(value, usize::try_from(places).unwrap_or(0))
}

//! What is marked on the pattern of the planform: lines, each with a letter and a word of what it is.

use super::{Drawing, Role};
use crate::geometry::{Affine, ArcPath, Point};
use crate::wing::Planform;

/// Height of capitals, mm.
const LETTERS: f64 = 2.8;
/// The same in the caption, and base line to base line there, mm.
const CAPTION: f64 = 4.0;
const CAPTION_STEP: f64 = 7.0;
/// From the planform to the row of letters, mm: clear of what runs past its edge.
const ROW_GAP: f64 = 6.0;
/// Width up to which a picture of the pattern keeps its letters as high as they are, mm.
const PICTURE: f64 = 240.0;

/// A line on the planform; x along the span, y aft of the root's quarter chord, mm.
#[derive(Debug, Clone, PartialEq)]
pub struct PlanMark {
    /// A line to mark, unless it is to be cut.
    pub role: Role,
    /// Where it runs.
    pub path: ArcPath,
    /// What it is; empty where it needs no word.
    pub words: String,
}

impl PlanMark {
    /// A line to mark.
    #[must_use]
    pub fn new(path: ArcPath, words: String) -> Self {
        Self { role: Role::Reference, path, words }
    }

    /// The same as a contour to be cut.
    #[must_use]
    pub fn cut(self, role: Role) -> Self {
        Self { role, ..self }
    }
}

/// Draws marks on a pattern of the planform, on both halves of a mirrored foil, each with a letter in a row
/// behind the trailing edge; gives what the letters stand for, which also joins the caption.
pub fn mark_on_plan(drawing: &mut Drawing, planform: &Planform, marks: &[PlanMark]) -> Vec<String> {
    let flip = Affine::FLIP_Y;
    for mark in marks {
        drawing.add(mark.role, mark.path.transformed(flip).anticlockwise());
        if planform.is_mirrored() {
            drawing.add(mark.role, mark.path.transformed(flip * Affine::FLIP_X).anticlockwise());
        }
    }
    let mut named: Vec<&PlanMark> = marks.iter().filter(|mark| !mark.words.is_empty()).collect();
    if named.is_empty() {
        return Vec::new();
    }
    let place = |mark: &PlanMark| (flip * mark.path.bounds().center()).to_vec2().to_point();
    named.sort_by(|a, b| place(a).x.total_cmp(&place(b).x));

    // A picture of a wide pattern grows its letters: they need the room of that.
    let grown = LETTERS * (planform.span() / PICTURE).max(1.0);
    let lowest = planform.trailing.iter().map(|p| -p.y).fold(f64::INFINITY, f64::min);
    let row = lowest - ROW_GAP - grown;
    for label in drawing.labels.iter_mut().filter(|label| label.role == Role::Caption) {
        label.at.y -= ROW_GAP + grown;
    }
    let captions = drawing.labels.iter().filter(|label| label.role == Role::Caption).map(|label| label.at);
    let mut next = captions.reduce(|a, b| if b.y < a.y { b } else { a }).unwrap_or(Point::new(0.0, row));
    let mut free = f64::NEG_INFINITY;
    let letters = (b'A'..=b'Z').map(char::from).chain((b'a'..=b'z').map(char::from));
    let mut meaning = Vec::with_capacity(named.len());
    for (mark, letter) in named.into_iter().zip(letters) {
        let from = place(mark);
        let x = from.x.max(free);
        free = x + 1.5 * grown;
        drawing.add(Role::Reference, ArcPath::line(from, Point::new(x, row + 1.2 * grown)));
        drawing.write(Role::Label, Point::new(x - 0.3 * grown, row), LETTERS, letter.to_string());
        let line = format!("{letter} {}", mark.words);
        next.y -= CAPTION_STEP;
        drawing.write(Role::Caption, next, CAPTION, line.as_str());
        meaning.push(line);
    }
    meaning
}

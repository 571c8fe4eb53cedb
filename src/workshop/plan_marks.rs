//! What is marked on the pattern of the planform.

use super::{Drawing, Role};
use crate::geometry::{Affine, ArcPath, Point};
use crate::wing::Planform;

/// Height of capitals, mm.
const LETTERS: f64 = 2.8;

/// A line on the planform; x along the span, y aft of the root's quarter chord, mm.
#[derive(Debug, Clone, PartialEq)]
pub struct PlanMark {
    path: ArcPath,
    words: String,
    /// Left end of the words.
    at: Point,
}

impl PlanMark {
    /// Without words.
    #[must_use]
    pub fn plain(path: ArcPath) -> Self {
        Self { path, words: String::new(), at: Point::ORIGIN }
    }

    /// With words just ahead of where it begins along the span.
    #[must_use]
    pub fn beside(path: ArcPath, words: String) -> Self {
        let bounds = path.bounds();
        Self { path, words, at: Point::new(bounds.x0 + 1.0, bounds.y0 - 1.0) }
    }

    /// With words behind the trailing edge.
    #[must_use]
    pub fn behind(path: ArcPath, words: String) -> Self {
        let bounds = path.bounds();
        Self { path, words, at: Point::new(bounds.x1 + 1.0, bounds.y1) }
    }
}

/// Draws marks on a pattern of the planform, on both halves of a mirrored foil; their words once.
pub fn mark_on_plan(drawing: &mut Drawing, planform: &Planform, marks: &[PlanMark]) {
    for mark in marks {
        let flip = Affine::FLIP_Y;
        drawing.add(Role::Reference, mark.path.transformed(flip));
        if planform.is_mirrored() {
            drawing.add(Role::Reference, mark.path.transformed(flip * Affine::FLIP_X));
        }
        if !mark.words.is_empty() {
            drawing.write(Role::Label, flip * mark.at, LETTERS, mark.words.as_str());
        }
    }
}

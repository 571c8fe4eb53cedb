//! A drawing at true size: what every plane file format writes. Millimetres, y upwards.

use std::borrow::Cow;

use kurbo::Affine;

use crate::geometry::{ArcPath, Point, Rect};
use crate::units::number;

/// What a line or a label is for: its layer in a router file, its line type on paper.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum Role {
    /// A contour whose outside is cut.
    CutOutside,
    /// A contour whose inside is taken out: a slot, a bore.
    CutInside,
    /// A contour whose inside is taken out so deep, in hundredths of a mm.
    Pocket(u32),
    /// A round hole that a drill of its size makes.
    Drill,
    /// A line to engrave.
    Engrave,
    /// A stretch of a contour that stays, to hold the piece in its sheet.
    Tab,
    /// A line to measure from: chord line, root line, hinge line. Never cut.
    Reference,
    /// Words beside a line. Never cut.
    Label,
    /// Words that say what the drawing is, below it. Never cut.
    Caption,
    /// A line of known length to check a print by, and marks to join pages by.
    Check,
}

impl Role {
    /// The pocket of a depth in mm.
    #[must_use]
    pub fn pocket(depth: f64) -> Self {
        Self::Pocket((100.0 * depth).round() as u32)
    }

    /// How it is drawn on paper: width of the line and lengths of dashes and gaps, mm. The types
    /// differ in pattern, not only in weight, so that they survive a photocopier.
    #[must_use]
    pub fn stroke(self) -> (f64, &'static [f64]) {
        match self {
            Self::CutOutside => (0.35, &[]),
            Self::CutInside | Self::Drill => (0.35, &[3.0, 1.2]),
            Self::Pocket(_) => (0.35, &[1.2, 0.8]),
            Self::Tab => (1.0, &[]),
            Self::Reference => (0.2, &[6.0, 1.5, 1.0, 1.5]),
            Self::Engrave | Self::Label | Self::Caption | Self::Check => (0.2, &[]),
        }
    }

    /// Name of its layer; that of a pocket holds its depth, as `POCKET_6_5MM` for 6.5 mm.
    #[must_use]
    pub fn layer(self) -> Cow<'static, str> {
        let name = match self {
            Self::CutOutside => "CUT_OUTSIDE",
            Self::CutInside => "CUT_INSIDE",
            Self::Pocket(hundredths) => {
                let depth = number(f64::from(hundredths) / 100.0, 2).replace('.', "_");
                return Cow::Owned(format!("POCKET_{depth}MM"));
            }
            Self::Drill => "DRILL",
            Self::Engrave => "ENGRAVE",
            Self::Tab => "TAB",
            Self::Reference => "REFERENCE",
            Self::Label | Self::Caption => "LABEL",
            Self::Check => "CHECK",
        };
        Cow::Borrowed(name)
    }
}

/// A path with its role.
#[derive(Debug, Clone, PartialEq)]
pub struct Line {
    /// What it is for.
    pub role: Role,
    /// Where it runs.
    pub path: ArcPath,
}

/// A line of text.
#[derive(Debug, Clone, PartialEq)]
pub struct Label {
    /// What it is for.
    pub role: Role,
    /// Left end of the base line.
    pub at: Point,
    /// Height of a capital letter, mm.
    pub height: f64,
    /// Turn anticlockwise, radians.
    pub turn: f64,
    /// The words.
    pub text: String,
}

/// Lines and labels at true size.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Drawing {
    /// What it shows.
    pub title: String,
    /// Lines, in drawing order.
    pub lines: Vec<Line>,
    /// Labels.
    pub labels: Vec<Label>,
}

impl Drawing {
    /// An empty drawing.
    #[must_use]
    pub fn new(title: impl Into<String>) -> Self {
        Self { title: title.into(), ..Self::default() }
    }

    /// Adds a path.
    pub fn add(&mut self, role: Role, path: ArcPath) {
        self.lines.push(Line { role, path });
    }

    /// Adds a level line of text that starts at `at`.
    pub fn write(&mut self, role: Role, at: Point, height: f64, text: impl Into<String>) {
        let text = text.into();
        self.labels.push(Label { role, at, height, turn: 0.0, text });
    }

    /// Adds a line to its caption.
    pub fn caption(&mut self, text: impl Into<String>) {
        let captions = self.labels.iter().filter(|label| label.role == Role::Caption);
        let Some(last) = captions.min_by(|a, b| a.at.y.total_cmp(&b.at.y)) else { return };
        let (at, height) = (last.at - kurbo::Vec2::new(0.0, 1.75 * last.height), last.height);
        self.write(Role::Caption, at, height, text);
    }

    /// The drawing without its caption, for where that stands beside it.
    #[must_use]
    pub fn without_caption(&self) -> Self {
        let labels = self.labels.iter().filter(|label| label.role != Role::Caption).cloned().collect();
        Self { labels, ..self.clone() }
    }

    /// Its lines alone.
    #[must_use]
    pub fn without_words(&self) -> Self {
        Self { labels: Vec::new(), ..self.clone() }
    }

    /// The smallest upright rectangle round all lines and, by estimate, the labels.
    #[must_use]
    pub fn bounds(&self) -> Rect {
        let lines = self.lines.iter().map(|line| line.path.bounds());
        let labels = self.labels.iter().map(Label::rough_bounds);
        lines.chain(labels).reduce(|a, b| a.union(b)).unwrap_or(Rect::ZERO)
    }

    /// The drawing moved by `by`, a turn and a shift; the height of labels stays.
    #[must_use]
    pub fn moved(&self, by: Affine) -> Self {
        let turn = by.as_coeffs()[1].atan2(by.as_coeffs()[0]);
        Self {
            title: self.title.clone(),
            lines: self.lines.iter().map(|l| Line { role: l.role, path: l.path.transformed(by) }).collect(),
            labels: self
                .labels
                .iter()
                .map(|l| Label { at: by * l.at, turn: l.turn + turn, ..l.clone() })
                .collect(),
        }
    }
}

impl Label {
    /// A rectangle round the text, on the generous side: letters of the fonts in use are at most
    /// as wide as a capital is high.
    fn rough_bounds(&self) -> Rect {
        let width = self.text.chars().count() as f64 * self.height;
        let flat = Rect::new(0.0, -0.4 * self.height, width, 1.2 * self.height);
        (Affine::translate(self.at.to_vec2()) * Affine::rotate(self.turn)).transform_rect_bbox(flat)
    }
}

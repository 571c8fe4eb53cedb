//! Pieces laid out on the sheets of stock that they are routed from.

use super::{Drawing, Role};
use crate::geometry::{Affine, ArcPath, Point, Rect, Vec2, packed};

/// The sheets, millimetres.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct StockSettings {
    /// Along x.
    pub length: f64,
    /// Along y.
    pub width: f64,
    /// Kept free along every edge.
    pub margin: f64,
    /// Kept free between two pieces.
    pub spacing: f64,
    /// Whether a piece may be turned by a quarter, across the grain.
    pub may_turn: bool,
}

/// A piece to be cut: what it is called on its sheet, and its drawing.
#[derive(Debug, Clone, PartialEq)]
pub struct StockPiece {
    /// A few words.
    pub name: String,
    /// Its contours and marks.
    pub drawing: Drawing,
}

/// A sheet with its pieces. Its lower left corner is the origin.
#[derive(Debug, Clone, PartialEq)]
pub struct StockSheet {
    /// The drawing, with the edge of the sheet for reference.
    pub drawing: Drawing,
    /// Names of the pieces on it, and the middle of each.
    pub pieces: Vec<(String, Point)>,
    /// Share of the sheet within the pieces' contours; the rest is waste.
    pub used: f64,
}

/// Pieces on their sheets.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Layout {
    /// The sheets.
    pub sheets: Vec<StockSheet>,
    /// Names of the pieces that go on no sheet.
    pub too_large: Vec<String>,
}

/// Height of the letters of a piece's name, mm, and of the strip below the piece that holds it.
const LETTERS: f64 = 3.5;
const NAME_STRIP: f64 = 6.0;
/// Letters in the margin are left out when they would be lower than this, mm.
const LEAST_LETTERS: f64 = 1.5;

/// Lays pieces out, each with its name below it.
///
/// `title` and `note` stand in the margin of each sheet, where that is wide enough.
#[must_use]
pub fn on_stock(title: &str, note: &str, pieces: &[StockPiece], settings: StockSettings) -> Layout {
    let room = [settings.length, settings.width].map(|side| side - 2.0 * settings.margin);
    let bounds: Vec<Rect> = pieces.iter().map(|piece| extent(&piece.drawing)).collect();
    let sizes: Vec<[f64; 2]> = bounds
        .iter()
        .zip(pieces)
        .map(|(bounds, piece)| {
            let words = 0.8 * LETTERS * piece.name.chars().count() as f64;
            [bounds.width().max(words), bounds.height() + NAME_STRIP]
        })
        .collect();
    let places = packed(&sizes, room, settings.spacing, settings.may_turn);
    let mut layout = Layout::default();
    let count = places.iter().flatten().map(|place| place.sheet + 1).max().unwrap_or(0);
    for sheet in 0..count {
        let mut drawing = Drawing::new(format!("{title}, sheet {} of {count}", sheet + 1));
        let edge =
            [(0.0, 0.0), (settings.length, 0.0), (settings.length, settings.width), (0.0, settings.width)];
        drawing.add(Role::Reference, ArcPath::polyline(edge.map(Point::from), true));
        let words = format!("{}; {note}", drawing.title);
        let letters = (0.5 * settings.margin).min(LETTERS).min(room[0] / words.chars().count() as f64);
        if letters >= LEAST_LETTERS {
            let at = Point::new(settings.margin, 0.5 * (settings.margin - letters));
            drawing.write(Role::Label, at, letters, words);
        }
        let (mut names, mut area) = (Vec::new(), 0.0);
        for (i, piece) in pieces.iter().enumerate() {
            let Some(place) = places[i].filter(|place| place.sheet == sheet) else { continue };
            let corner = place.corner + Vec2::new(settings.margin, settings.margin);
            let mut own = piece.drawing.without_words();
            let below = Point::new(bounds[i].x0, bounds[i].y0 - 0.8 * NAME_STRIP);
            own.write(Role::Label, below, LETTERS, &piece.name);
            let to_corner = Affine::translate(-Vec2::new(bounds[i].x0, bounds[i].y0 - NAME_STRIP));
            // A quarter turn clockwise stands on what was its left side.
            let turn = if place.is_turned {
                Affine::translate((0.0, sizes[i][0])) * Affine::rotate(-std::f64::consts::FRAC_PI_2)
            } else {
                Affine::IDENTITY
            };
            let moved = own.moved(Affine::translate(corner.to_vec2()) * turn * to_corner);
            let outside = moved.lines.iter().filter(|line| line.role == Role::CutOutside);
            area += outside.map(|line| line.path.area().abs()).sum::<f64>();
            names.push((piece.name.clone(), extent(&moved).center()));
            drawing.lines.extend(moved.lines);
            drawing.labels.extend(moved.labels);
        }
        let used = area / (settings.length * settings.width);
        layout.sheets.push(StockSheet { drawing, pieces: names, used });
    }
    let left = pieces.iter().zip(&places).filter(|(_, place)| place.is_none());
    layout.too_large = left.map(|(piece, _)| piece.name.clone()).collect();
    layout
}

/// What a piece takes of the sheet: all that is cut, and the marks on it.
fn extent(drawing: &Drawing) -> Rect {
    let lines = drawing.lines.iter().map(|line| line.path.bounds());
    lines.reduce(|a, b| a.union(b)).unwrap_or(Rect::ZERO)
}

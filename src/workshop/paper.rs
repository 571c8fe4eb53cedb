//! Drawings on paper at true size: one page as large as needed, or tiles over a printer's sheets.

use kurbo::Affine;

use super::{Drawing, Label, Role};
use crate::geometry::{ArcPath, Point, Rect, Vec2};

/// Length of the lines by which a print is checked, mm.
const CHECK_LENGTH: f64 = 100.0;
/// Width of the strip along the left and lower edge that holds the check lines, mm.
const STRIP: f64 = 12.0;
/// Height of the strip along the upper edge that says what the page shows, mm.
const TITLE: f64 = 9.0;
/// Height of capitals on the page's own texts, mm.
const LETTERS: f64 = 2.6;
/// Width and height of the map of the pages, mm.
const MAP: (f64, f64) = (26.0, 7.0);
/// Half the size of a match mark, mm.
const MARK: f64 = 4.0;

/// The sheets a drawing is tiled over, millimetres.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct PaperSettings {
    /// Shorter side.
    pub width: f64,
    /// Longer side; infinite for a roll, whose pages are as long as the drawing needs.
    pub height: f64,
    /// Edge that the printer cannot reach, all round.
    pub margin: f64,
    /// How much of the drawing two neighbouring tiles share.
    pub overlap: f64,
}

/// One page at true size. Millimetres from its lower left corner, y upwards.
#[derive(Debug, Clone, PartialEq)]
pub struct Page {
    /// Width.
    pub width: f64,
    /// Height.
    pub height: f64,
    /// The window in which the drawing shows; the rest of it is on other pages.
    pub window: Rect,
    /// The drawing, moved to its place on this page.
    pub drawing: Drawing,
    /// What belongs to the page itself: check lines, match marks, title.
    pub furniture: Drawing,
}

/// The drawing on a single page as large as it needs.
#[must_use]
pub fn single_page(drawing: &Drawing) -> Page {
    const MARGIN: f64 = 10.0;
    // The window cuts lines at its edge, and an outermost line is as wide outside as inside.
    let bounds = drawing.bounds().inflate(1.0, 1.0);
    let window_width = bounds.width().max(CHECK_LENGTH + 10.0);
    let window_height = bounds.height().max(CHECK_LENGTH + 10.0);
    let window = Rect::from_origin_size((MARGIN + STRIP, MARGIN + STRIP), (window_width, window_height));
    let (width, height) = (window.x1 + MARGIN, window.y1 + TITLE + MARGIN);
    let shift = Vec2::new(window.x0 - bounds.x0, window.y1 - bounds.y1);
    let mut furniture = Drawing::new(&drawing.title);
    add_check_lines(&mut furniture, window);
    let title = Point::new(window.x0, window.y1 + TITLE - LETTERS);
    furniture.write(Role::Label, title, LETTERS, format!("{} (true size)", drawing.title));
    Page { width, height, window, drawing: drawing.moved(Affine::translate(shift)), furniture }
}

/// The drawing over as many sheets as it takes, upright or on their side, whichever needs fewer.
///
/// Neighbouring tiles repeat the overlap, with the same match marks in it. An overlap that leaves
/// no room on the sheet gives no pages; the design refuses it before.
#[must_use]
pub fn tiled(drawing: &Drawing, paper: PaperSettings) -> Vec<Page> {
    let upright = Tiling::new(drawing, paper.width, paper.height, paper);
    let on_its_side = Tiling::new(drawing, paper.height, paper.width, paper);
    match (upright, on_its_side) {
        (Some(a), Some(b)) => {
            // Of a roll also the shorter piece.
            let cost = |tiling: &Tiling| (tiling.count(), tiling.page.area());
            let (upright, lying) = (cost(&a), cost(&b));
            let better = lying.0 < upright.0 || lying.0 == upright.0 && lying.1 < upright.1;
            if better { b.pages(drawing) } else { a.pages(drawing) }
        }
        (Some(a), None) | (None, Some(a)) => a.pages(drawing),
        (None, None) => Vec::new(),
    }
}

struct Tiling {
    page: Rect,
    window: Rect,
    step: Vec2,
    columns: usize,
    rows: usize,
    /// Lower left corner, in the drawing, of the lower left window.
    origin: Point,
    overlap: f64,
}

impl Tiling {
    fn new(drawing: &Drawing, width: f64, height: f64, paper: PaperSettings) -> Option<Self> {
        let bounds = drawing.bounds();
        // The end of a roll is where the drawing ends, and the check line beside it.
        let ended = |side: f64, drawn: f64, strip: f64| {
            let needed = (drawn + 2.0).max(CHECK_LENGTH + 10.0) + 2.0 * paper.margin + strip;
            if side.is_finite() { side } else { needed }
        };
        let width = ended(width, bounds.width(), STRIP);
        let height = ended(height, bounds.height(), STRIP + TITLE);
        let window = Rect::new(
            paper.margin + STRIP,
            paper.margin + STRIP,
            width - paper.margin,
            height - paper.margin - TITLE,
        );
        let step = Vec2::new(window.width() - paper.overlap, window.height() - paper.overlap);
        if step.x < CHECK_LENGTH / 2.0 || step.y < CHECK_LENGTH / 2.0 {
            return None;
        }
        let tiles = |length: f64, step: f64| (((length - paper.overlap) / step).ceil() as usize).max(1);
        let (columns, rows) = (tiles(bounds.width(), step.x), tiles(bounds.height(), step.y));
        // Centred, so that the spare paper is shared by both ends.
        let covered =
            Vec2::new(step.x * columns as f64 + paper.overlap, step.y * rows as f64 + paper.overlap);
        let origin = bounds.center() - 0.5 * covered;
        let page = Rect::new(0.0, 0.0, width, height);
        Some(Self { page, window, step, columns, rows, origin, overlap: paper.overlap })
    }

    fn count(&self) -> usize {
        self.columns * self.rows
    }

    fn pages(&self, drawing: &Drawing) -> Vec<Page> {
        let mut pages = Vec::with_capacity(self.count());
        for row in (0..self.rows).rev() {
            for column in 0..self.columns {
                pages.push(self.page(drawing, column, row));
            }
        }
        pages
    }

    fn page(&self, drawing: &Drawing, column: usize, row: usize) -> Page {
        let corner = self.origin + Vec2::new(self.step.x * column as f64, self.step.y * row as f64);
        let shift = self.window.origin() - corner;
        let mut furniture = Drawing::new(&drawing.title);
        add_check_lines(&mut furniture, self.window);
        self.add_match_marks(&mut furniture, column, row);
        self.add_map(&mut furniture, column, row);
        let place = if self.count() == 1 {
            String::new()
        } else {
            let (from_top, rows, columns) = (self.rows - row, self.rows, self.columns);
            format!(" · row {from_top} of {rows}, column {} of {columns}", column + 1)
        };
        let title = Point::new(self.window.x0, self.window.y1 + TITLE - LETTERS - 2.0);
        furniture.write(Role::Label, title, LETTERS, format!("{}{place}", drawing.title));
        Page {
            width: self.page.width(),
            height: self.page.height(),
            window: self.window,
            drawing: drawing.moved(Affine::translate(shift)),
            furniture,
        }
    }

    /// A small map of all tiles beside the title, this one crossed out.
    fn add_map(&self, furniture: &mut Drawing, column: usize, row: usize) {
        if self.count() == 1 {
            return;
        }
        let (columns, rows) = (self.columns as f64, self.rows as f64);
        let cell = Vec2::new((MAP.0 / columns).min(6.0), (MAP.1 / rows).min(4.0));
        let corner = Point::new(self.window.x1 - columns * cell.x, self.window.y1 + 1.0);
        let at = |i: f64, j: f64| corner + Vec2::new(i * cell.x, j * cell.y);
        for i in 0..=self.columns {
            furniture.add(Role::Check, ArcPath::line(at(i as f64, 0.0), at(i as f64, rows)));
        }
        for j in 0..=self.rows {
            furniture.add(Role::Check, ArcPath::line(at(0.0, j as f64), at(columns, j as f64)));
        }
        let (i, j) = (column as f64, row as f64);
        furniture.add(Role::Check, ArcPath::line(at(i, j), at(i + 1.0, j + 1.0)));
        furniture.add(Role::Check, ArcPath::line(at(i, j + 1.0), at(i + 1.0, j)));
    }

    /// Crosses in the middle of each overlap, at the same place of the drawing on both tiles.
    fn add_match_marks(&self, furniture: &mut Drawing, column: usize, row: usize) {
        let half = 0.5 * self.overlap;
        let window = self.window;
        let mut seams = Vec::new();
        if column > 0 {
            seams.push((window.x0 + half, true));
        }
        if column + 1 < self.columns {
            seams.push((window.x1 - half, true));
        }
        if row > 0 {
            seams.push((window.y0 + half, false));
        }
        if row + 1 < self.rows {
            seams.push((window.y1 - half, false));
        }
        for (at, upright) in seams {
            let (from, to) = if upright { (window.y0, window.y1) } else { (window.x0, window.x1) };
            // Fractions of the window: the same on both sides of the seam.
            for fraction in [0.15, 0.85] {
                let along = from + fraction * (to - from);
                let centre = if upright { Point::new(at, along) } else { Point::new(along, at) };
                for arm in [Vec2::new(MARK, 0.0), Vec2::new(0.0, MARK)] {
                    furniture.add(Role::Check, ArcPath::line(centre - arm, centre + arm));
                }
            }
        }
    }
}

/// A line of 100 mm along the lower and the left edge, with ends to measure between.
fn add_check_lines(furniture: &mut Drawing, window: Rect) {
    const INSET: f64 = 6.0;
    const TICK: f64 = 2.0;
    let corner = Point::new(window.x0 - INSET, window.y0 - INSET);
    for (along, across, turn) in [
        (Vec2::new(1.0, 0.0), Vec2::new(0.0, 1.0), 0.0),
        (Vec2::new(0.0, 1.0), Vec2::new(-1.0, 0.0), std::f64::consts::FRAC_PI_2),
    ] {
        let start = corner + 5.0 * along;
        let end = start + CHECK_LENGTH * along;
        furniture.add(Role::Check, ArcPath::line(start, end));
        for tip in [start, end] {
            furniture.add(Role::Check, ArcPath::line(tip - TICK * across, tip + TICK * across));
        }
        furniture.labels.push(Label {
            role: Role::Label,
            at: start + 0.3 * CHECK_LENGTH * along + 1.2 * across,
            height: LETTERS,
            turn,
            text: "measure this: 100 mm".to_owned(),
        });
    }
}

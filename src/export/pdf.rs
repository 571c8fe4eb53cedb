//! Drawings for paper: PDF, every page at true size, the font embedded.

use krilla::Document;
use krilla::color::luma;
use krilla::geom::{Path, PathBuilder, Point, Rect, Transform};
use krilla::metadata::Metadata;
use krilla::num::NormalizedF32;
use krilla::page::PageSettings;
use krilla::paint::{Fill, FillRule, Stroke, StrokeDash};
use krilla::surface::Surface;
use krilla::text::{Font, TextDirection};
use kurbo::PathEl;

use super::ExportError;
use super::svg::CAPITAL;
use crate::geometry::ArcPath;
use crate::workshop::{Drawing, Label, Page};

/// DejaVu Sans, unmodified; its licence lies beside it. It has the degree sign and the Greek.
const FONT: &[u8] = include_bytes!("fonts/DejaVuSans.ttf");
/// A PDF counts in points, 72 to the inch.
const POINTS_PER_MM: f64 = 72.0 / 25.4;
/// Greatest distance of a drawn arc from its circle, mm.
const ARC_TOLERANCE: f64 = 1e-3;

/// The pages as one file, in their order.
///
/// # Errors
/// When a page has no size, or the library refuses what it was given.
pub fn pdf(title: &str, pages: &[Page]) -> Result<Vec<u8>, ExportError> {
    let failed = |why: &str| ExportError { format: "PDF", why: why.to_owned() };
    let font = Font::new(FONT.into(), 0).ok_or_else(|| failed("the font is damaged"))?;
    let mut document = Document::new();
    document.set_metadata(Metadata::new().title(title.to_owned()));
    for page in pages {
        let settings = PageSettings::from_wh(points(page.width), points(page.height))
            .ok_or_else(|| failed("a page has no size"))?;
        let mut sheet = document.start_page_with(settings);
        let mut surface = sheet.surface();
        let pen = Pen { height: page.height, font: &font };
        if let Some(window) = pen.window(page) {
            surface.push_clip_path(&window, &FillRule::NonZero);
            pen.draw(&mut surface, &page.drawing);
            surface.pop();
        }
        pen.draw(&mut surface, &page.furniture);
        surface.finish();
        sheet.finish();
    }
    document.finish().map_err(|error| failed(&format!("{error:?}")))
}

fn points(millimetres: f64) -> f32 {
    (millimetres * POINTS_PER_MM) as f32
}

/// Turns millimetres with y upwards into points with y downwards.
struct Pen<'a> {
    height: f64,
    font: &'a Font,
}

impl Pen<'_> {
    fn place(&self, p: kurbo::Point) -> (f32, f32) {
        (points(p.x), points(self.height - p.y))
    }

    fn window(&self, page: &Page) -> Option<Path> {
        let (left, top) = self.place(kurbo::Point::new(page.window.x0, page.window.y1));
        let (right, bottom) = self.place(kurbo::Point::new(page.window.x1, page.window.y0));
        let mut path = PathBuilder::new();
        path.push_rect(Rect::from_ltrb(left, top, right, bottom)?);
        path.finish()
    }

    fn draw(&self, surface: &mut Surface<'_>, drawing: &Drawing) {
        surface.set_fill(None);
        for line in &drawing.lines {
            let (width, dashes) = line.role.stroke();
            let dash = (!dashes.is_empty())
                .then(|| StrokeDash { array: dashes.iter().map(|&d| points(d)).collect(), offset: 0.0 });
            surface.set_stroke(Some(Stroke {
                paint: luma::Color::black().into(),
                width: points(width),
                dash,
                ..Stroke::default()
            }));
            if let Some(path) = self.path(&line.path) {
                surface.draw_path(&path);
            }
        }
        surface.set_stroke(None);
        surface.set_fill(Some(Fill {
            paint: luma::Color::black().into(),
            opacity: NormalizedF32::ONE,
            rule: FillRule::NonZero,
        }));
        for label in &drawing.labels {
            self.write(surface, label);
        }
    }

    fn path(&self, path: &ArcPath) -> Option<Path> {
        let mut builder = PathBuilder::new();
        for element in path.to_bezier(ARC_TOLERANCE).elements() {
            match *element {
                PathEl::MoveTo(p) => {
                    let (x, y) = self.place(p);
                    builder.move_to(x, y);
                }
                PathEl::LineTo(p) => {
                    let (x, y) = self.place(p);
                    builder.line_to(x, y);
                }
                PathEl::QuadTo(a, p) => {
                    let ((ax, ay), (x, y)) = (self.place(a), self.place(p));
                    builder.quad_to(ax, ay, x, y);
                }
                PathEl::CurveTo(a, b, p) => {
                    let ((ax, ay), (bx, by), (x, y)) = (self.place(a), self.place(b), self.place(p));
                    builder.cubic_to(ax, ay, bx, by, x, y);
                }
                PathEl::ClosePath => builder.close(),
            }
        }
        builder.finish()
    }

    fn write(&self, surface: &mut Surface<'_>, label: &Label) {
        let (x, y) = self.place(label.at);
        let degrees = -label.turn.to_degrees() as f32;
        surface.push_transform(&Transform::from_rotate_at(degrees, x, y));
        surface.draw_text(
            Point::from_xy(x, y),
            self.font.clone(),
            points(label.height / CAPITAL),
            &label.text,
            false,
            TextDirection::LeftToRight,
        );
        surface.pop();
    }
}

//! Drawings for paper and screen: SVG in millimetres.

use svg::Document;
use svg::node::element::{ClipPath, Definitions, Group, Path, Rectangle, SVG, Text};

use crate::geometry::{ArcPath, Point, Segment};
use crate::units::number;
use crate::workshop::{Drawing, Label, Page, Role};

/// Decimals of a coordinate, in mm.
const PLACES: usize = 4;
/// A capital's height as a fraction of the font size, for the shipped font.
pub(super) const CAPITAL: f64 = 0.729;

/// A page at true size.
#[must_use]
pub fn svg_page(page: &Page) -> String {
    let window = Rectangle::new()
        .set("x", number(page.window.x0, PLACES))
        .set("y", number(page.height - page.window.y1, PLACES))
        .set("width", number(page.window.width(), PLACES))
        .set("height", number(page.window.height(), PLACES));
    let clip = Definitions::new().add(ClipPath::new().set("id", "window").add(window));
    let drawing = group(&page.drawing, page.height, 1.0).set("clip-path", "url(#window)");
    let document = document(page.width, page.height)
        .add(svg::node::element::Title::new(page.drawing.title.clone()))
        .add(clip)
        .add(drawing)
        .add(group(&page.furniture, page.height, 1.0));
    format!("{document}\n")
}

/// Width up to which a picture shows at true size inside a document, mm.
const PICTURE_WIDTH: f64 = 240.0;

/// A drawing alone, `margin` mm of white round it, to be shown inside other documents at
/// up to its true size. Letters and lines of a wider drawing
/// grow, so that they can still be read when it is shrunk to fit.
#[must_use]
pub fn picture(drawing: &Drawing, margin: f64) -> String {
    let growth = (drawing.bounds().width() / PICTURE_WIDTH).max(1.0);
    let mut grown = drawing.clone();
    for label in &mut grown.labels {
        label.height *= growth;
    }
    let bounds = grown.bounds().inflate(margin * growth, margin * growth);
    let moved = grown.moved(kurbo::Affine::translate((-bounds.x0, -bounds.y0)));
    // Read out by what reads pages to people.
    let named =
        document(bounds.width(), bounds.height()).set("role", "img").set("aria-label", &*drawing.title);
    named.add(group(&moved, bounds.height(), growth)).to_string()
}

/// Width of a small picture of a sheet or a page, mm.
const SHEET_WIDTH: f64 = 170.0;
const PAGE_WIDTH: f64 = 48.0;

/// The lines of a drawing, small, with a number at each of some places.
#[must_use]
pub fn numbered_picture(drawing: &Drawing, places: &[Point]) -> String {
    let bounds = drawing.bounds();
    let growth = (bounds.width() / SHEET_WIDTH).max(1.0);
    let mut lines = drawing.without_words();
    lines.lines.retain(|line| line.role != Role::Engrave);
    let lines = lines.moved(kurbo::Affine::translate(-bounds.origin().to_vec2()));
    let mut document = sized(bounds.width(), bounds.height(), growth, &drawing.title).add(group(
        &lines,
        bounds.height(),
        growth,
    ));
    for (i, place) in places.iter().enumerate() {
        let at = *place - bounds.origin().to_vec2();
        let text = Text::new((i + 1).to_string())
            .set("x", number(at.x, 1))
            .set("y", number(bounds.height() - at.y, 1))
            .set("font-family", "DejaVu Sans, Verdana, sans-serif")
            .set("font-size", number(3.2 * growth, 2))
            .set("text-anchor", "middle")
            .set("dominant-baseline", "central")
            .set("stroke", "white")
            .set("stroke-width", number(growth, 2))
            .set("paint-order", "stroke");
        document = document.add(text);
    }
    document.to_string()
}

/// A page, small: its edge, what shows of the drawing, and what belongs to the page.
#[must_use]
pub fn page_picture(page: &Page) -> String {
    let growth = page.width.max(page.height) / (2.0 * PAGE_WIDTH);
    let window = page.window;
    // A picture within a picture shows no more than its own size.
    let inside = SVG::new()
        .set("x", number(window.x0, 2))
        .set("y", number(page.height - window.y1, 2))
        .set("width", number(window.width(), 2))
        .set("height", number(window.height(), 2))
        .set(
            "viewBox",
            format!(
                "{} {} {} {}",
                number(window.x0, 2),
                number(page.height - window.y1, 2),
                number(window.width(), 2),
                number(window.height(), 2)
            ),
        )
        .add(group(&page.drawing, page.height, growth));
    let edge = Rectangle::new()
        .set("width", number(page.width, 2))
        .set("height", number(page.height, 2))
        .set("fill", "none")
        .set("stroke", "black")
        .set("stroke-width", number(0.3 * growth, 2));
    sized(page.width, page.height, growth, &page.drawing.title)
        .add(edge)
        .add(inside)
        .add(group(&page.furniture, page.height, growth))
        .to_string()
}

/// A document that shows so many millimetres in that many times less, and is read out by its name.
fn sized(width: f64, height: f64, growth: f64, name: &str) -> Document {
    let shown = |v: f64| format!("{}mm", number(v / growth, 2));
    document(width, height)
        .set("width", shown(width))
        .set("height", shown(height))
        .set("role", "img")
        .set("aria-label", name)
}

fn document(width: f64, height: f64) -> Document {
    let size = |v: f64| format!("{}mm", number(v, PLACES));
    Document::new()
        .set("width", size(width))
        .set("height", size(height))
        .set("viewBox", format!("0 0 {} {}", number(width, PLACES), number(height, PLACES)))
}

fn group(drawing: &Drawing, height: f64, growth: f64) -> Group {
    let mut group = Group::new().set("fill", "none").set("stroke", "black");
    for line in &drawing.lines {
        let (width, dashes) = line.role.stroke();
        let mut path = Path::new()
            .set("class", line.role.layer().into_owned())
            .set("stroke-width", number(width * growth, 3))
            .set("d", outline(&line.path, height));
        if !dashes.is_empty() {
            let lengths: Vec<String> = dashes.iter().map(|d| number(d * growth, 2)).collect();
            path = path.set("stroke-dasharray", lengths.join(" "));
        }
        group = group.add(path);
    }
    for label in &drawing.labels {
        group = group.add(text(label, height));
    }
    group
}

/// Path data; `height` turns y upwards into y downwards.
fn outline(path: &ArcPath, height: f64) -> String {
    let place = |p: Point| format!("{} {}", number(p.x, PLACES), number(height - p.y, PLACES));
    let mut data = path.vertices().first().map_or(String::new(), |v| format!("M{}", place(v.point)));
    for segment in path.segments() {
        data.push_str(&piece(&segment, &place));
    }
    if path.is_closed() {
        data.push('Z');
    }
    data
}

fn piece(segment: &Segment, place: &impl Fn(Point) -> String) -> String {
    match segment.radius() {
        Some(radius) => {
            let radius = number(radius, PLACES);
            let large = u8::from(segment.bulge.abs() > 1.0);
            let clockwise = u8::from(segment.bulge < 0.0);
            format!("A{radius} {radius} 0 {large} {clockwise} {}", place(segment.to))
        }
        None => format!("L{}", place(segment.to)),
    }
}

fn text(label: &Label, height: f64) -> Text {
    let (x, y) = (number(label.at.x, PLACES), number(height - label.at.y, PLACES));
    let mut text = Text::new(label.text.clone())
        .set("class", label.role.layer().into_owned())
        .set("x", x.clone())
        .set("y", y.clone())
        .set("fill", "black")
        .set("stroke", "none")
        .set("font-family", "DejaVu Sans, Verdana, sans-serif")
        .set("font-size", number(label.height / CAPITAL, PLACES));
    if label.turn != 0.0 {
        let degrees = number(-label.turn.to_degrees(), PLACES);
        text = text.set("transform", format!("rotate({degrees} {x} {y})"));
    }
    text
}

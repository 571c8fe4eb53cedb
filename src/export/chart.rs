//! Plain line charts as SVG, to be read in a dusty shop: heavy lines, big figures, no colour
//! needed to tell one line from another.

use std::fmt::Write as _;

pub use super::axis::{Rule, SecondScale};

use super::axis::Axis;
use super::html::escaped;

/// One line of a chart.
#[derive(Debug, Clone, PartialEq)]
pub struct Series {
    /// What it is, shown at its end.
    pub name: String,
    /// Points in the units of the axes; a point that is not finite makes a gap.
    pub points: Vec<(f64, f64)>,
}

/// A mark across the chart at one value.
#[derive(Debug, Clone, PartialEq)]
pub struct Mark {
    /// Where on the vertical axis.
    pub at: f64,
    /// What it is.
    pub name: String,
}

/// What lies between two lines, shaded.
#[derive(Debug, Clone, PartialEq)]
pub struct Band {
    /// One of its sides.
    pub from: Vec<(f64, f64)>,
    /// The other, in the same direction.
    pub to: Vec<(f64, f64)>,
}

/// A place that is marked by a spot.
#[derive(Debug, Clone, PartialEq)]
pub struct Dot {
    /// Where, in the units of the axes.
    pub at: (f64, f64),
    /// What it is.
    pub name: String,
}

/// A line chart.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Chart {
    /// Heading.
    pub title: String,
    /// What it holds for, under the heading; may be empty.
    pub subtitle: String,
    /// Name and unit of the horizontal axis.
    pub across: String,
    /// A further scale above.
    pub across_too: Option<SecondScale>,
    /// Name and unit of the vertical axis.
    pub up: String,
    /// A further scale on the right.
    pub up_too: Option<SecondScale>,
    /// Whether the vertical axis grows downwards, as pressure is plotted by custom.
    pub downwards: bool,
    /// The lines.
    pub series: Vec<Series>,
    /// What was measured: points without a line, named below the lines.
    pub measured: Vec<Series>,
    /// Shades under the lines.
    pub bands: Vec<Band>,
    /// Level marks.
    pub marks: Vec<Mark>,
    /// Words within the chart, each at its place in the units of the axes.
    pub words: Vec<(f64, f64, String)>,
    /// Spots.
    pub dots: Vec<Dot>,
}

/// Size of the field within the axes.
const FIELD: (f64, f64) = (495.0, 320.0);
const LEFT: f64 = 75.0;
const BOTTOM: f64 = 60.0;
/// Room for names on the right, at least.
const NAMES: f64 = 150.0;
/// Room that a further scale takes.
const SECOND_ACROSS: f64 = 44.0;
const SECOND_UP: f64 = 70.0;
/// The piece of line before a name, with the white after it.
const SAMPLE: f64 = 36.0;
/// Mean width of a letter of a name.
const LETTER: f64 = 9.0;
/// From one name to the next.
const LINE: f64 = 18.0;
/// Line patterns, told apart without colour.
const DASHES: [&str; 5] = ["", "9 4", "2 4", "12 4 2 4", "5 2 5 8"];
/// Dark enough on paper, told apart by most eyes.
/// One more than patterns, so that thirty lines differ.
const COLOURS: [&str; 6] = ["#003a70", "#a03000", "#1b5e20", "#4a148c", "#333333", "#00606a"];

/// Charts one below the other in one picture.
#[must_use]
pub fn stacked(charts: &[Chart]) -> String {
    let sizes: Vec<(f64, f64)> = charts.iter().map(|chart| Frame::of(chart).size()).collect();
    let width = sizes.iter().map(|size| size.0).fold(0.0, f64::max);
    let height: f64 = sizes.iter().map(|size| size.1).sum();
    let mut svg = format!(
        "<svg xmlns=\"http://www.w3.org/2000/svg\" width=\"{width}\" height=\"{height}\" viewBox=\"0 0 {width} {height}\">\n\
         <rect width=\"{width}\" height=\"{height}\" fill=\"white\"/>\n"
    );
    let mut down = 0.0;
    for (chart, size) in charts.iter().zip(sizes) {
        let _ = writeln!(svg, "<g transform=\"translate(0 {down})\">{}</g>", chart.to_svg());
        down += size.1;
    }
    svg.push_str("</svg>");
    svg
}

/// Where the field of a chart lies in its picture, and its axes.
struct Frame {
    top: f64,
    /// Room on the right of the field.
    names: f64,
    /// Of a further scale on the right.
    second: f64,
    /// What all names take in height.
    listed: f64,
    across: Axis,
    up: Axis,
    downwards: bool,
}

impl Frame {
    fn of(chart: &Chart) -> Self {
        let sides = chart.bands.iter().flat_map(|band| band.from.iter().chain(&band.to));
        let lines = chart.series.iter().chain(&chart.measured);
        let points: Vec<(f64, f64)> = lines.flat_map(|s| s.points.iter()).chain(sides).copied().collect();
        let names = chart.series.iter().chain(&chart.measured).map(|s| &s.name);
        let longest = names.map(|name| name.chars().count()).max().unwrap_or(0) as f64;
        let marked = chart.marks.iter().map(|mark| mark.name.chars().count()).max().unwrap_or(0) as f64;
        let names = (SAMPLE + longest * LETTER).max(marked * LETTER) + 20.0;
        let subtitle = if chart.subtitle.is_empty() { 0.0 } else { 20.0 };
        let above = if chart.across_too.is_some() { SECOND_ACROSS } else { 0.0 };
        Self {
            top: 40.0 + subtitle + above,
            names: names.max(NAMES),
            second: if chart.up_too.is_some() { SECOND_UP } else { 0.0 },
            listed: LINE * (chart.marks.len() + chart.series.len() + chart.measured.len()) as f64,
            across: Axis::over(points.iter().map(|p| p.0)),
            up: Axis::over(points.iter().map(|p| p.1).chain(chart.marks.iter().map(|m| m.at))),
            downwards: chart.downwards,
        }
    }

    fn size(&self) -> (f64, f64) {
        (LEFT + FIELD.0 + self.second + self.names, (self.top + FIELD.1 + BOTTOM).max(self.listed + 20.0))
    }

    fn right(&self) -> f64 {
        LEFT + FIELD.0
    }

    fn bottom(&self) -> f64 {
        self.top + FIELD.1
    }

    /// Where names begin.
    fn names_at(&self) -> f64 {
        self.right() + self.second + 14.0
    }

    fn x(&self, value: f64) -> f64 {
        LEFT + self.across.fraction(value) * FIELD.0
    }

    fn y(&self, value: f64) -> f64 {
        let fraction = self.up.fraction(value);
        self.top + if self.downwards { fraction } else { 1.0 - fraction } * FIELD.1
    }

    /// A path through points, with gaps where one is not finite.
    fn path(&self, points: &[(f64, f64)]) -> String {
        let (mut data, mut pen_down) = (String::new(), false);
        for &(across, up) in points {
            let seen = across.is_finite() && up.is_finite();
            if seen {
                let command = if pen_down { 'L' } else { 'M' };
                let _ = write!(data, "{command}{:.2} {:.2}", self.x(across), self.y(up));
            }
            pen_down = seen;
        }
        data
    }
}

impl Chart {
    /// The chart as an SVG document.
    #[must_use]
    pub fn to_svg(&self) -> String {
        let frame = Frame::of(self);
        let (width, height) = frame.size();
        let mut svg = format!(
            "<svg xmlns=\"http://www.w3.org/2000/svg\" role=\"img\" aria-label=\"{0}\" width=\"{width}\" height=\"{height}\" \
             viewBox=\"0 0 {width} {height}\" font-family=\"DejaVu Sans, Verdana, sans-serif\" font-size=\"15\">\n\
             <rect width=\"{width}\" height=\"{height}\" fill=\"white\"/>\n\
             <text x=\"{LEFT}\" y=\"24\" font-size=\"17\" font-weight=\"bold\">{0}</text>\n",
            escaped(&self.title)
        );
        if !self.subtitle.is_empty() {
            let _ = writeln!(svg, "<text x=\"{LEFT}\" y=\"44\">{}</text>", escaped(&self.subtitle));
        }
        self.draw_bands(&mut svg, &frame);
        self.draw_grid(&mut svg, &frame);
        self.draw_second_scales(&mut svg, &frame);
        for mark in &self.marks {
            let level = frame.y(mark.at);
            let _ = writeln!(
                svg,
                "<line x1=\"{LEFT}\" x2=\"{:.1}\" y1=\"{level:.1}\" y2=\"{level:.1}\" stroke=\"black\" stroke-width=\"1.5\" stroke-dasharray=\"3 3\"/>",
                frame.right()
            );
        }
        for (across, up, word) in &self.words {
            let (x, y) = (frame.x(*across), frame.y(*up));
            let _ = writeln!(
                svg,
                "<text x=\"{x:.1}\" y=\"{y:.1}\" text-anchor=\"middle\" font-style=\"italic\" stroke=\"white\" stroke-width=\"5\" \
                 paint-order=\"stroke\">{}</text>",
                escaped(word)
            );
        }
        self.draw_series(&mut svg, &frame);
        for dot in &self.dots {
            let (at, level) = (frame.x(dot.at.0), frame.y(dot.at.1));
            // The name stands where there is room.
            let (anchor, beside) =
                if at > 0.5 * (LEFT + frame.right()) { ("end", -12.0) } else { ("start", 12.0) };
            let _ = writeln!(
                svg,
                "<circle cx=\"{at:.1}\" cy=\"{level:.1}\" r=\"7\" fill=\"white\" stroke=\"black\" stroke-width=\"3\"/>\
                 <text x=\"{:.1}\" y=\"{:.1}\" text-anchor=\"{anchor}\" font-weight=\"bold\" paint-order=\"stroke\" stroke=\"white\" stroke-width=\"4\">{}</text>",
                at + beside,
                level - 8.0,
                escaped(&dot.name)
            );
        }
        svg.push_str("</svg>");
        svg
    }

    fn draw_bands(&self, svg: &mut String, frame: &Frame) {
        let seen = |point: &&(f64, f64)| point.0.is_finite() && point.1.is_finite();
        for (i, band) in self.bands.iter().enumerate() {
            let round: Vec<(f64, f64)> =
                band.from.iter().filter(seen).chain(band.to.iter().rev().filter(seen)).copied().collect();
            let _ = writeln!(
                svg,
                "<path d=\"{}Z\" fill=\"{}\" fill-opacity=\"0.2\" stroke=\"none\"/>",
                frame.path(&round),
                COLOURS[i % COLOURS.len()]
            );
        }
    }

    fn draw_grid(&self, svg: &mut String, frame: &Frame) {
        let (top, right, bottom) = (frame.top, frame.right(), frame.bottom());
        let shade = |at: f64, step: f64| if at.abs() < step * 1e-6 { "#666" } else { "#ccc" };
        for (tick, word) in frame.across.ticks() {
            let (at, shade) = (frame.x(tick), shade(tick, frame.across.step));
            let _ = writeln!(
                svg,
                "<line x1=\"{at:.1}\" x2=\"{at:.1}\" y1=\"{top}\" y2=\"{bottom}\" stroke=\"{shade}\"/>\
                 <text x=\"{at:.1}\" y=\"{:.1}\" text-anchor=\"middle\">{word}</text>",
                bottom + 20.0,
            );
        }
        for (tick, word) in frame.up.ticks() {
            let (at, shade) = (frame.y(tick), shade(tick, frame.up.step));
            let _ = writeln!(
                svg,
                "<line x1=\"{LEFT}\" x2=\"{right}\" y1=\"{at:.1}\" y2=\"{at:.1}\" stroke=\"{shade}\"/>\
                 <text x=\"{:.1}\" y=\"{:.1}\" text-anchor=\"end\">{word}</text>",
                LEFT - 8.0,
                at + 5.0,
            );
        }
        let middle = 0.5 * (top + bottom);
        let _ = writeln!(
            svg,
            "<rect x=\"{LEFT}\" y=\"{top}\" width=\"{:.1}\" height=\"{:.1}\" fill=\"none\" stroke=\"black\"/>\
             <text x=\"{:.1}\" y=\"{:.1}\" text-anchor=\"middle\">{}</text>\
             <text x=\"20\" y=\"{middle:.1}\" text-anchor=\"middle\" transform=\"rotate(-90 20 {middle:.1})\">{}</text>",
            right - LEFT,
            bottom - top,
            0.5 * (LEFT + right),
            bottom + BOTTOM - 15.0,
            escaped(&self.across),
            escaped(&self.up)
        );
    }

    fn draw_second_scales(&self, svg: &mut String, frame: &Frame) {
        let (top, right) = (frame.top, frame.right());
        if let Some(scale) = &self.across_too {
            for (tick, word) in frame.across.second_ticks(scale.rule) {
                let at = frame.x(tick);
                let _ = writeln!(
                    svg,
                    "<line x1=\"{at:.1}\" x2=\"{at:.1}\" y1=\"{:.1}\" y2=\"{top}\" stroke=\"black\"/>\
                     <text x=\"{at:.1}\" y=\"{:.1}\" text-anchor=\"middle\">{word}</text>",
                    top - 6.0,
                    top - 9.0
                );
            }
            let middle = 0.5 * (LEFT + right);
            let _ = writeln!(
                svg,
                "<text x=\"{middle:.1}\" y=\"{:.1}\" text-anchor=\"middle\">{}</text>",
                top - 28.0,
                escaped(&scale.name)
            );
        }
        if let Some(scale) = &self.up_too {
            for (tick, word) in frame.up.second_ticks(scale.rule) {
                let at = frame.y(tick);
                let _ = writeln!(
                    svg,
                    "<line x1=\"{right}\" x2=\"{:.1}\" y1=\"{at:.1}\" y2=\"{at:.1}\" stroke=\"black\"/>\
                     <text x=\"{:.1}\" y=\"{:.1}\">{word}</text>",
                    right + 6.0,
                    right + 9.0,
                    at + 5.0
                );
            }
            let (at, middle) = (right + SECOND_UP - 8.0, 0.5 * (top + frame.bottom()));
            let _ = writeln!(
                svg,
                "<text x=\"{at:.1}\" y=\"{middle:.1}\" text-anchor=\"middle\" transform=\"rotate(-90 {at:.1} {middle:.1})\">{}</text>",
                escaped(&scale.name)
            );
        }
    }

    fn draw_series(&self, svg: &mut String, frame: &Frame) {
        let levels = self.name_levels(frame);
        let names_at = frame.names_at();
        let name = |svg: &mut String, across: f64, level: f64, name: &str, colour: &str| {
            let _ = writeln!(
                svg,
                "<text x=\"{across:.1}\" y=\"{:.1}\" fill=\"{colour}\">{}</text>",
                level + 5.0,
                escaped(name)
            );
        };
        let mut levels = levels.into_iter();
        for mark in &self.marks {
            name(svg, names_at, levels.next().unwrap_or_default(), &mark.name, "black");
        }
        for (i, series) in self.series.iter().enumerate() {
            let (dash, colour) = (DASHES[i % DASHES.len()], COLOURS[i % COLOURS.len()]);
            let style =
                format!("fill=\"none\" stroke=\"{colour}\" stroke-width=\"2.5\" stroke-dasharray=\"{dash}\"");
            let _ = writeln!(svg, "<path d=\"{}\" {style}/>", frame.path(&series.points));
            let level = levels.next().unwrap_or_default();
            if !series.name.is_empty() {
                let end = names_at + SAMPLE - 6.0;
                let _ = writeln!(svg, "<path d=\"M{names_at:.1} {level:.1}L{end:.1} {level:.1}\" {style}/>");
                name(svg, names_at + SAMPLE, level, &series.name, colour);
            }
        }
        for (i, series) in self.measured.iter().enumerate() {
            for &(across, up) in series.points.iter().filter(|p| p.0.is_finite() && p.1.is_finite()) {
                symbol(svg, i, frame.x(across), frame.y(up));
            }
            let level = levels.next().unwrap_or_default();
            symbol(svg, i, names_at + 0.5 * SAMPLE - 4.0, level);
            name(svg, names_at + SAMPLE, level, &series.name, "black");
        }
    }

    /// Where the names of marks, lines and measured points stand: each as near to the end of its line as
    /// the others let it. A line without a name takes no room.
    fn name_levels(&self, frame: &Frame) -> Vec<f64> {
        let end = |points: &[(f64, f64)]| {
            let last = points.iter().rev().find(|p| p.0.is_finite() && p.1.is_finite());
            last.map_or(frame.top, |p| frame.y(p.1)).clamp(frame.top, frame.bottom())
        };
        let lines = self.series.iter().chain(&self.measured);
        let mut levels: Vec<f64> = self.marks.iter().map(|mark| frame.y(mark.at)).collect();
        levels.extend(lines.clone().map(|line| end(&line.points)));
        let named = lines.map(|line| !line.name.is_empty());
        let named: Vec<bool> = std::iter::repeat_n(true, self.marks.len()).chain(named).collect();
        let mut order: Vec<usize> = (0..levels.len()).filter(|&i| named[i]).collect();
        order.sort_by(|&a, &b| levels[a].total_cmp(&levels[b]));
        let mut least = f64::NEG_INFINITY;
        for &i in &order {
            levels[i] = levels[i].max(least);
            least = levels[i] + LINE;
        }
        let mut most = frame.size().1 - 10.0;
        for &i in order.iter().rev() {
            levels[i] = levels[i].min(most);
            most = levels[i] - LINE;
        }
        levels
    }
}

/// The sign of a measured point: a circle, a square or a triangle.
fn symbol(svg: &mut String, kind: usize, x: f64, y: f64) {
    let style = "fill=\"white\" stroke=\"black\" stroke-width=\"1.5\"";
    let _ = match kind % 3 {
        0 => writeln!(svg, "<circle cx=\"{x:.1}\" cy=\"{y:.1}\" r=\"4\" {style}/>"),
        1 => writeln!(
            svg,
            "<rect x=\"{:.1}\" y=\"{:.1}\" width=\"7\" height=\"7\" {style}/>",
            x - 3.5,
            y - 3.5
        ),
        _ => writeln!(
            svg,
            "<path d=\"M{:.1} {:.1}L{:.1} {:.1}L{x:.1} {:.1}Z\" {style}/>",
            x - 4.5,
            y + 3.5,
            x + 4.5,
            y + 3.5,
            y - 4.5
        ),
    };
}

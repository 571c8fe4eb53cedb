//! Plain line charts as SVG, to be read in a dusty shop: heavy lines, big figures, no colour
//! needed to tell one line from another.

use std::fmt::Write as _;

use super::html::escaped;
use crate::units::number;

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
    /// Name and unit of the horizontal axis.
    pub across: String,
    /// Name and unit of the vertical axis.
    pub up: String,
    /// Whether the vertical axis grows downwards, as pressure is plotted by custom.
    pub downwards: bool,
    /// The lines.
    pub series: Vec<Series>,
    /// Level marks.
    pub marks: Vec<Mark>,
    /// Spots.
    pub dots: Vec<Dot>,
}

const WIDTH: f64 = 720.0;
const HEIGHT: f64 = 420.0;
const LEFT: f64 = 75.0;
const RIGHT: f64 = 150.0;
const TOP: f64 = 40.0;
const BOTTOM: f64 = 60.0;
/// Line patterns, told apart without colour.
const DASHES: [&str; 5] = ["", "9 4", "2 4", "12 4 2 4", "5 2 5 8"];
/// Dark enough on paper, told apart by most eyes.
/// One more than patterns, so that thirty lines differ.
const COLOURS: [&str; 6] = ["#003a70", "#a03000", "#1b5e20", "#4a148c", "#333333", "#00606a"];

/// Charts one below the other in one picture.
#[must_use]
pub fn stacked(charts: &[Chart]) -> String {
    let height = HEIGHT * charts.len() as f64;
    let mut svg = format!(
        "<svg xmlns=\"http://www.w3.org/2000/svg\" width=\"{WIDTH}\" height=\"{height}\" viewBox=\"0 0 {WIDTH} {height}\">\n"
    );
    for (i, chart) in charts.iter().enumerate() {
        let _ = writeln!(svg, "<g transform=\"translate(0 {})\">{}</g>", HEIGHT * i as f64, chart.to_svg());
    }
    svg.push_str("</svg>");
    svg
}

/// An axis: its ends on round values, and its ticks.
struct Axis {
    low: f64,
    high: f64,
    step: f64,
}

impl Axis {
    fn over(values: impl Iterator<Item = f64>) -> Self {
        let (mut low, mut high) = values
            .filter(|v| v.is_finite())
            .fold((f64::INFINITY, f64::NEG_INFINITY), |(low, high), v| (low.min(v), high.max(v)));
        if low > high {
            (low, high) = (0.0, 1.0);
        }
        if high - low < 1e-9 {
            (low, high) = (low - 0.5, high + 0.5);
        }
        let rough = (high - low) / 8.0;
        let power = 10_f64.powf(rough.log10().floor());
        let step = [1.0, 2.0, 5.0, 10.0].into_iter().find(|m| m * power >= rough).unwrap_or(10.0) * power;
        // A trace beyond a round value, as a nose ahead of 0 % of chord, earns no tick of its own.
        Self { low: (low / step + 0.02).floor() * step, high: (high / step - 0.02).ceil() * step, step }
    }

    fn fraction(&self, value: f64) -> f64 {
        (value - self.low) / (self.high - self.low)
    }

    fn ticks(&self) -> impl Iterator<Item = f64> + '_ {
        let count = ((self.high - self.low) / self.step).round() as usize;
        (0..=count).map(|i| self.low + i as f64 * self.step)
    }

    fn places(&self) -> usize {
        (-self.step.log10().floor()).max(0.0) as usize
    }
}

impl Chart {
    /// The chart as an SVG document.
    #[must_use]
    pub fn to_svg(&self) -> String {
        let points = || self.series.iter().flat_map(|s| s.points.iter());
        let across = Axis::over(points().map(|p| p.0));
        let up = Axis::over(points().map(|p| p.1).chain(self.marks.iter().map(|m| m.at)));
        let x = |v: f64| LEFT + across.fraction(v) * (WIDTH - LEFT - RIGHT);
        let y = |v: f64| {
            let fraction = if self.downwards { up.fraction(v) } else { 1.0 - up.fraction(v) };
            TOP + fraction * (HEIGHT - TOP - BOTTOM)
        };
        let mut svg = format!(
            "<svg xmlns=\"http://www.w3.org/2000/svg\" width=\"{WIDTH}\" height=\"{HEIGHT}\" viewBox=\"0 0 {WIDTH} {HEIGHT}\" \
             font-family=\"DejaVu Sans, Verdana, sans-serif\" font-size=\"15\">\n\
             <rect width=\"{WIDTH}\" height=\"{HEIGHT}\" fill=\"white\"/>\n\
             <text x=\"{LEFT}\" y=\"24\" font-size=\"17\" font-weight=\"bold\">{}</text>\n",
            escaped(&self.title)
        );
        self.draw_grid(&mut svg, &across, &up, &x, &y);
        for mark in &self.marks {
            let level = y(mark.at);
            let _ = writeln!(
                svg,
                "<line x1=\"{LEFT}\" x2=\"{0:.1}\" y1=\"{level:.1}\" y2=\"{level:.1}\" stroke=\"black\" stroke-width=\"1.5\" stroke-dasharray=\"3 3\"/>\
                 <text x=\"{1:.1}\" y=\"{2:.1}\">{3}</text>",
                WIDTH - RIGHT,
                WIDTH - RIGHT + 6.0,
                level + 5.0,
                escaped(&mark.name)
            );
        }
        self.draw_series(&mut svg, &x, &y);
        for dot in &self.dots {
            let (at, level) = (x(dot.at.0), y(dot.at.1));
            // The name stands where there is room.
            let (anchor, beside) =
                if at > 0.5 * (LEFT + WIDTH - RIGHT) { ("end", -12.0) } else { ("start", 12.0) };
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

    fn draw_grid(
        &self,
        svg: &mut String,
        across: &Axis,
        up: &Axis,
        x: &impl Fn(f64) -> f64,
        y: &impl Fn(f64) -> f64,
    ) {
        let (right, bottom) = (WIDTH - RIGHT, HEIGHT - BOTTOM);
        for tick in across.ticks() {
            let (at, heavy) = (x(tick), if tick.abs() < across.step * 1e-6 { "#666" } else { "#ccc" });
            let _ = writeln!(
                svg,
                "<line x1=\"{at:.1}\" x2=\"{at:.1}\" y1=\"{TOP}\" y2=\"{bottom}\" stroke=\"{heavy}\"/>\
                 <text x=\"{at:.1}\" y=\"{:.1}\" text-anchor=\"middle\">{}</text>",
                bottom + 20.0,
                number(tick, across.places())
            );
        }
        for tick in up.ticks() {
            let (at, heavy) = (y(tick), if tick.abs() < up.step * 1e-6 { "#666" } else { "#ccc" });
            let _ = writeln!(
                svg,
                "<line x1=\"{LEFT}\" x2=\"{right}\" y1=\"{at:.1}\" y2=\"{at:.1}\" stroke=\"{heavy}\"/>\
                 <text x=\"{:.1}\" y=\"{:.1}\" text-anchor=\"end\">{}</text>",
                LEFT - 8.0,
                at + 5.0,
                number(tick, up.places())
            );
        }
        let middle = 0.5 * (TOP + bottom);
        let _ = writeln!(
            svg,
            "<rect x=\"{LEFT}\" y=\"{TOP}\" width=\"{:.1}\" height=\"{:.1}\" fill=\"none\" stroke=\"black\"/>\
             <text x=\"{:.1}\" y=\"{:.1}\" text-anchor=\"middle\">{}</text>\
             <text x=\"20\" y=\"{middle:.1}\" text-anchor=\"middle\" transform=\"rotate(-90 20 {middle:.1})\">{}</text>",
            right - LEFT,
            bottom - TOP,
            0.5 * (LEFT + right),
            HEIGHT - 15.0,
            escaped(&self.across),
            escaped(&self.up)
        );
    }

    fn draw_series(&self, svg: &mut String, x: &impl Fn(f64) -> f64, y: &impl Fn(f64) -> f64) {
        let mut ends: Vec<f64> = self.marks.iter().map(|m| y(m.at) + 5.0).collect();
        for (i, series) in self.series.iter().enumerate() {
            let (dash, colour) = (DASHES[i % DASHES.len()], COLOURS[i % COLOURS.len()]);
            let mut data = String::new();
            let mut pen_down = false;
            for &(across, up) in &series.points {
                let seen = across.is_finite() && up.is_finite();
                if seen {
                    let command = if pen_down { 'L' } else { 'M' };
                    let _ = write!(data, "{command}{:.2} {:.2}", x(across), y(up));
                }
                pen_down = seen;
            }
            let _ = writeln!(
                svg,
                "<path d=\"{data}\" fill=\"none\" stroke=\"{colour}\" stroke-width=\"2.5\" stroke-dasharray=\"{dash}\"/>"
            );
            if series.name.is_empty() {
                continue;
            }
            // Names stand at the line's end, moved down where one stands already.
            let last = series.points.iter().rev().find(|p| p.0.is_finite() && p.1.is_finite());
            let mut at = last.map_or(TOP, |p| y(p.1) + 5.0).clamp(TOP, HEIGHT - BOTTOM);
            let is_taken = |at: f64| ends.iter().any(|end: &f64| (end - at).abs() < 17.0);
            // Down as a rule, and up from where the chart ends.
            let step = if at > HEIGHT - BOTTOM - 40.0 { -17.0 } else { 17.0 };
            while is_taken(at) {
                at += step;
            }
            ends.push(at);
            let _ = writeln!(
                svg,
                "<text x=\"{:.1}\" y=\"{at:.1}\" fill=\"{colour}\">{}</text>",
                WIDTH - RIGHT + 6.0,
                escaped(&series.name)
            );
        }
    }
}

//! The page: what was asked beside what was reached, and the pictures.

use std::fmt::Write as _;

/// What belongs under one heading.
pub(crate) struct Part {
    pub(crate) heading: &'static str,
    /// What it is compared with: author, title, year.
    pub(crate) source: &'static str,
    pub(crate) rows: Vec<Row>,
    pub(crate) pictures: Vec<Picture>,
}

/// One claim.
pub(crate) struct Row {
    what: String,
    asked: Option<f64>,
    reached: f64,
    unit: Unit,
}

/// How a figure is written, with its decimals.
#[derive(Clone, Copy)]
pub(crate) enum Unit {
    /// A ratio, shown in percent.
    Percent(usize),
    Degrees(usize),
    Millimetres(usize),
    Plain(usize),
    /// In powers of ten.
    Power,
}

/// A picture of the page.
pub(crate) struct Picture {
    pub(crate) name: &'static str,
    pub(crate) caption: &'static str,
    pub(crate) svg: String,
}

impl Picture {
    /// From the root of the repository.
    pub(crate) fn path(&self) -> String {
        format!("docs/pictures/validation/{}.svg", self.name)
    }
}

/// Difference of `reached`, to be no more than `asked`.
pub(crate) fn row(what: impl Into<String>, asked: impl Into<Option<f64>>, reached: f64, unit: Unit) -> Row {
    assert!(reached.is_finite(), "a figure of the page is no number");
    Row { what: what.into(), asked: asked.into(), reached: reached.abs(), unit }
}

impl Unit {
    fn write(self, value: f64) -> String {
        match self {
            Self::Percent(places) => format!("{:.places$} %", 100.0 * value),
            Self::Degrees(places) => format!("{value:.places$}°"),
            Self::Millimetres(places) => format!("{value:.places$} mm"),
            Self::Plain(places) => format!("{value:.places$}"),
            // Below this it is the rounding of one machine or another.
            Self::Power if value < 1e-12 => "1e-12".to_owned(),
            Self::Power => format!("1e{}", value.log10().ceil()),
        }
    }

    /// As short as it was asked.
    fn write_asked(self, value: f64) -> String {
        let plain = |value: f64| plankform::units::number(value, 6);
        match self {
            Self::Percent(_) => format!("{} %", plain(100.0 * value)),
            Self::Degrees(_) => format!("{}°", plain(value)),
            Self::Millimetres(_) => format!("{} mm", plain(value)),
            Self::Plain(_) => plain(value),
            Self::Power => format!("{value:e}"),
        }
    }
}

const HEAD: &str = "# How close it comes

What Plankform computes, against printed tables, exact solutions and measurements. Every figure here is measured by
`cargo test --test validation`, which fails where this page says anything else; `PLANKFORM_HANDBOOK=write cargo test --test
validation` writes page and pictures anew. The reference values with their sources are in `tests/reference/`; those marked \"from
memory\" there were not looked up again.

\u{201c}Asked\u{201d} is the figure that was set before it was measured, the most by which the two may differ; where nothing was set, there is a
dash. **Bold** figures are not reached. docs/viscous-flow.md says what is known of why.
";

pub(crate) fn page(parts: &[Part]) -> String {
    let rows = || parts.iter().flat_map(|part| &part.rows);
    let asked = rows().filter(|row| row.asked.is_some()).count();
    let missed = rows().filter(|row| !row.holds()).count();
    let mut page = String::from(HEAD);
    let _ =
        writeln!(page, "\nOf {asked} figures asked, {} are reached and {missed} are not.", asked - missed);
    for part in parts {
        let _ = writeln!(
            page,
            "\n## {}\n\nAgainst: {}\n\n| differs by at most | asked | reached |\n| --- | --- | --- |",
            part.heading, part.source
        );
        for row in &part.rows {
            let reached = row.unit.write(row.reached);
            let reached = if row.holds() { reached } else { format!("**{reached}**") };
            let asked = row.asked.map_or("–".to_owned(), |asked| row.unit.write_asked(asked));
            let _ = writeln!(page, "| {} | {asked} | {reached} |", row.what);
        }
        for picture in &part.pictures {
            let path = picture.path();
            let beside = path.strip_prefix("docs/").unwrap_or(&path);
            let _ = writeln!(page, "\n![{}]({beside})", picture.caption);
        }
    }
    page
}

impl Row {
    fn holds(&self) -> bool {
        self.asked.is_none_or(|asked| self.reached <= asked)
    }
}

/// Whether two texts are the same but for the rounding of other machines: a number may differ by two
/// of its last digit.
pub(crate) fn alike(kept: &str, made: &str) -> Result<(), String> {
    let (mut kept, mut made) = (tokens(kept).into_iter(), tokens(made).into_iter());
    loop {
        match (kept.next(), made.next()) {
            (None, None) => return Ok(()),
            (Some(a), Some(b)) if a == b || near(a, b) => {}
            (a, b) => {
                return Err(format!("'{}' against '{}'", a.unwrap_or("nothing"), b.unwrap_or("nothing")));
            }
        }
    }
}

/// Numbers, and what lies between them.
fn tokens(text: &str) -> Vec<&str> {
    let is_number = |c: char| c.is_ascii_digit() || c == '.';
    let mut tokens = Vec::new();
    let mut rest = text;
    while let Some(first) = rest.chars().next() {
        let same = is_number(first);
        let end = rest.find(|c: char| is_number(c) != same).unwrap_or(rest.len());
        tokens.push(&rest[..end]);
        rest = &rest[end..];
    }
    tokens
}

fn near(a: &str, b: &str) -> bool {
    let places = |text: &str| text.split_once('.').map_or(0, |(_, digits)| digits.len() as i32);
    match (a.parse::<f64>(), b.parse::<f64>()) {
        // Whole numbers are counts, and powers of ten: of these one more is as good.
        (Ok(x), Ok(y)) if places(a) == places(b) && places(a) > 0 => {
            (x - y).abs() <= 2.01 * 10f64.powi(-places(a))
        }
        (Ok(x), Ok(y)) => (x - y).abs() < 1e-9,
        _ => false,
    }
}

#[test]
fn alike_takes_rounding_and_nothing_else() {
    assert!(alike("a 1.23 b", "a 1.24 b").is_ok());
    assert!(alike("a 1.23 b", "a 1.27 b").is_err());
    assert!(alike("5 of 6", "4 of 6").is_err());
    assert!(alike("**5.1 %**", "5.1 %").is_err());
    assert!(alike("a 1.2", "a 1.2 b").is_err());
}

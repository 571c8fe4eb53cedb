//! The reader of tables: two columns of numbers, x and y.

use std::ops::Range;

use super::{FEWEST, Given, LARGEST_TABLE, MOST};
use crate::geometry::{Point, Vec2};
use crate::problems::{FileErrors, Problems, Wrong};
use crate::units::clipped;

/// The most lines of text that may stand ahead of the points.
const MOST_TITLE_LINES: usize = 20;

/// A table as it was read.
pub(super) struct Table {
    pub(super) title: Option<String>,
    /// The points of one block or of two.
    pub(super) blocks: Vec<Vec<Given>>,
    /// Where each point stands in the text, and on which line.
    pub(super) places: Vec<(Range<usize>, usize)>,
    /// One unit of the last digit as it is printed, in units of the table: the coarsest of y.
    pub(super) unit: f64,
    pub(super) decimal_comma: bool,
}

/// One number as it was printed.
#[derive(Clone, Copy)]
struct Printed {
    value: f64,
    /// Digits behind the point, less the exponent.
    decimals: i32,
    /// Digits from the first that is not nought.
    digits: i32,
}

enum Line<'a> {
    Blank,
    Text(&'a str),
    One,
    Pair(Printed, Printed),
    Wrong(String, &'static str),
}

struct Row {
    printed: [Printed; 2],
    span: Range<usize>,
    line: usize,
}

pub(super) fn read(text: &str, file_name: &str) -> Result<Table, FileErrors> {
    let mut problems = Problems::default();
    let table = read_table(text, &mut problems);
    match table {
        Some(table) if problems.is_empty() => Ok(table),
        _ => Err(problems.report(text, file_name)),
    }
}

fn read_table(text: &str, problems: &mut Problems) -> Option<Table> {
    if text.len() > LARGEST_TABLE {
        let message = format!("the file has more than {LARGEST_TABLE} bytes, the most that are read");
        problems.add(0..0, Wrong::new(message).help("a table holds the points of one section"));
        return None;
    }
    let decimal_comma = has_decimal_comma(text);
    let mut title: Option<String> = None;
    let mut title_lines = 0;
    let mut rows: Vec<Row> = Vec::new();
    // Ranks of the rows ahead of which there is a blank line.
    let mut gaps: Vec<usize> = Vec::new();
    for (i, (span, content)) in lines(text).enumerate() {
        match parse(content, decimal_comma) {
            Line::Blank => {
                // A comment between two points divides nothing.
                if content.trim().is_empty() && !rows.is_empty() && gaps.last() != Some(&rows.len()) {
                    gaps.push(rows.len());
                }
            }
            Line::Pair(x, y) => rows.push(Row { printed: [x, y], span, line: i + 1 }),
            Line::Text(words) if rows.is_empty() => {
                title_lines += 1;
                if title_lines > MOST_TITLE_LINES {
                    let message = "this is no table: there is more text here than a title";
                    problems
                        .add(span, Wrong::new(message).help("a table has two numbers on each line, x and y"));
                    return None;
                }
                if !heads_columns(words) {
                    title.get_or_insert_with(|| clipped(words));
                }
            }
            Line::Text(words) => {
                let message = format!("there is text among the points: '{}'", clipped(words));
                let help = "text may stand ahead of the first point, or behind a # as a comment";
                problems.add(span, Wrong::new(message).help(help));
            }
            // A name that is a number, or the count of the points.
            Line::One if rows.is_empty() && title_lines == 0 => {
                title_lines += 1;
                title = Some(clipped(content.trim()));
            }
            Line::One => {
                let wrong = Wrong::new("there is one number on this line");
                problems.add(span, wrong.help("a table has two numbers on each line, x and y"));
            }
            Line::Wrong(message, help) => problems.add(span, Wrong::new(message).help(help)),
        }
    }
    let first_block = counts(&mut rows, &mut gaps, problems);
    if !problems.is_empty() {
        return None;
    }
    if !(FEWEST..=MOST).contains(&rows.len()) {
        let place = rows.last().map_or(0..0, |row| row.span.clone());
        let message = format!("there are {} points: a section takes from {FEWEST} to {MOST}", rows.len());
        let help =
            "a table has two numbers on each line, x and y, from the trailing edge round the nose and back";
        problems.add(place, Wrong::new(message).help(help));
        return None;
    }
    let mut units = [column_units(&rows, 0), column_units(&rows, 1)];
    // Stations are often round numbers, exact though they are printed with few digits.
    if let [ColumnUnit::Decimals(x), ColumnUnit::Decimals(y)] = units {
        units[0] = ColumnUnit::Decimals(x.max(y));
    }
    let mut points: Vec<Given> = Vec::with_capacity(rows.len());
    for (i, row) in rows.iter().enumerate() {
        let [x, y] = row.printed;
        let half = Vec2::new(0.5 * units[0].of(x), 0.5 * units[1].of(y));
        points.push(Given { point: Point::new(x.value, y.value), index: i + 1, half });
    }
    let unit = 2.0 * points.iter().map(|given| given.half.y).fold(0.0, f64::max);
    let split = first_block.or(match gaps[..] {
        [gap] if gap >= 3 && rows.len() - gap >= 3 => Some(gap),
        _ => None,
    });
    let mut blocks = vec![points];
    if let (Some(split), Some(first)) = (split, blocks.first_mut())
        && split < first.len()
    {
        let second = first.split_off(split);
        blocks.push(second);
    }
    let places = rows.into_iter().map(|row| (row.span, row.line)).collect();
    Some(Table { title, blocks, places, unit, decimal_comma })
}

/// Whether a line without numbers only says what the columns are, as "x y" or "x/c;y/c" do.
fn heads_columns(words: &str) -> bool {
    let parts = words.split([' ', '\t', ',', ';']).filter(|part| !part.is_empty());
    let names: Vec<&str> = parts.collect();
    let named = |name: Option<&&str>, letter: char| {
        name.is_some_and(|name| name.len() <= 6 && name.to_ascii_lowercase().starts_with(letter))
    };
    names.len() == 2 && named(names.first(), 'x') && named(names.get(1), 'y')
}

/// Each line with the bytes of what stands on it.
fn lines(text: &str) -> impl Iterator<Item = (Range<usize>, &str)> {
    let mut at = 0;
    text.split('\n').map(move |line| {
        let start = at;
        at += line.len() + 1;
        let content = line.trim_start_matches('\u{feff}');
        let lead = line.len() - content.trim_start().len();
        let shown = content.trim();
        (start + lead..start + lead + shown.len(), shown)
    })
}

/// Takes off the line that gives the counts of two blocks; gives the first of them.
fn counts(rows: &mut Vec<Row>, gaps: &mut [usize], problems: &mut Problems) -> Option<usize> {
    let [one, two] = rows.first()?.printed.map(|printed| printed.value);
    let whole = |value: f64| value.fract() == 0.0 && (3.0..=MOST as f64).contains(&value);
    if !whole(one) || !whole(two) {
        return None;
    }
    let rest = rows.get(1..).unwrap_or_default();
    let greatest =
        rest.iter().flat_map(|row| row.printed).map(|printed| printed.value.abs()).fold(0.0, f64::max);
    // At unit chord no point lies where a count would put it; at others only the sum tells.
    let is_count = one + two == rest.len() as f64;
    if !is_count && greatest > 2.0 {
        return None;
    }
    let first = rows.remove(0);
    for gap in gaps.iter_mut() {
        *gap = gap.saturating_sub(1);
    }
    if !is_count {
        let message = format!("this line gives {one} and {two} points, and {} follow", rows.len());
        let help = "correct the two counts, or leave the line out";
        problems.add(first.span, Wrong::new(message).help(help));
        return None;
    }
    Some(one as usize)
}

/// Whether numbers are written with a comma: no point anywhere, and lines whose parts are divided
/// by blanks or semicolons have commas between digits.
fn has_decimal_comma(text: &str) -> bool {
    let numeric = |content: &&str| {
        content.contains(|c: char| c.is_ascii_digit())
            && content.chars().all(|c| c.is_ascii_digit() || " \t;,.+-\u{2212}eE".contains(c))
    };
    let contents = || lines(text).map(|(_, content)| uncommented(content)).filter(numeric);
    let inner = |part: &str| {
        part.split_once(',').is_some_and(|(whole, decimals)| {
            whole.ends_with(|c: char| c.is_ascii_digit())
                && decimals.starts_with(|c: char| c.is_ascii_digit())
        })
    };
    !contents().any(|content| content.contains('.'))
        && contents().any(|content| {
            let parts: Vec<&str> = content
                .split(|c: char| c.is_whitespace() || c == ';')
                .filter(|part| !part.is_empty())
                .collect();
            parts.len() == 2 && parts.iter().any(|part| inner(part))
        })
}

fn uncommented(content: &str) -> &str {
    if content.starts_with(['#', ';', '!', '%']) {
        return "";
    }
    let end = ["#", "//", "!"].iter().filter_map(|mark| content.find(mark)).min().unwrap_or(content.len());
    content.get(..end).unwrap_or("").trim()
}

fn parse(content: &str, decimal_comma: bool) -> Line<'_> {
    let content = uncommented(content);
    if content.is_empty() {
        return Line::Blank;
    }
    let divides = |c: char| c.is_whitespace() || c == ';' || (c == ',' && !decimal_comma);
    // More than three parts say no more than three.
    let parts: Vec<&str> = content.split(divides).filter(|part| !part.is_empty()).take(4).collect();
    let mut numbers = Vec::new();
    for part in &parts {
        let part = if decimal_comma { part.replace(',', ".") } else { (*part).to_owned() };
        match printed(&part) {
            Some(number) if number.value.is_finite() => numbers.push(number),
            Some(_) => {
                let message = format!("'{}' is not a finite number", clipped(&part));
                return Line::Wrong(message, "a coordinate is a number such as 0.0375");
            }
            None => return Line::Text(content),
        }
    }
    match numbers[..] {
        [x, y] => Line::Pair(x, y),
        [_] => Line::One,
        [_, _, _] if content.contains(',') && !decimal_comma => Line::Wrong(
            format!("there are three numbers in '{}'", clipped(content)),
            "write decimals with a point, or divide the columns by a semicolon",
        ),
        _ => Line::Wrong(
            "there are more than two numbers on this line".to_owned(),
            "a table has two numbers on each line, x and y",
        ),
    }
}

fn printed(part: &str) -> Option<Printed> {
    let text = part.replace('\u{2212}', "-");
    let value: f64 = text.parse().ok()?;
    let (mantissa, exponent) = text.split_once(['e', 'E']).unwrap_or((&text, "0"));
    let decimals = mantissa.split_once('.').map_or(0, |(_, decimals)| decimals.len());
    let digits = mantissa.trim_start_matches(['+', '-', '0', '.']).bytes().filter(u8::is_ascii_digit).count();
    let exponent = exponent.parse().unwrap_or(0_i32).clamp(-400, 400);
    let small = |count: usize| i32::try_from(count).unwrap_or(i32::MAX / 2);
    Some(Printed { value, decimals: small(decimals) - exponent, digits: small(digits) })
}

/// What one unit of the last digit is in a column.
#[derive(Clone, Copy)]
enum ColumnUnit {
    /// So many decimals in each number, whether or not noughts at the end were left out.
    Decimals(i32),
    /// So many digits in each number, and at most so many decimals.
    Digits(i32, i32),
}

impl ColumnUnit {
    fn of(self, printed: Printed) -> f64 {
        let decimals = match self {
            Self::Decimals(decimals) => decimals,
            // Of nought itself nothing is known but that it is as good as the others.
            Self::Digits(_, finest) if printed.value == 0.0 => finest,
            Self::Digits(digits, _) => digits - 1 - printed.value.abs().log10().floor() as i32,
        };
        10_f64.powi(-decimals.clamp(-18, 18))
    }
}

/// Numbers with equally many digits show more decimals where they are small; numbers with equally
/// many decimals show them on the great ones too.
fn column_units(rows: &[Row], column: usize) -> ColumnUnit {
    let all = || rows.iter().map(move |row| row.printed[column]);
    let greatest = all().map(|printed| printed.value.abs()).fold(0.0, f64::max);
    let most = |low: f64, high: f64| {
        let within = |printed: &Printed| (low * greatest..=high * greatest).contains(&printed.value.abs());
        all().filter(|printed| printed.value != 0.0 && within(printed)).map(|printed| printed.decimals).max()
    };
    let (small, great) = (most(0.0, 0.1), most(0.5, 1.0));
    let finest = most(0.0, 1.0).unwrap_or(0);
    let digits = all().map(|printed| printed.digits).max().unwrap_or(1).max(1);
    let full = all().filter(|printed| printed.digits == digits).count();
    if small > great && 2 * full > rows.len() {
        ColumnUnit::Digits(digits, finest)
    } else {
        ColumnUnit::Decimals(finest)
    }
}

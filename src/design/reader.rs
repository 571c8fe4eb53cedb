//! Walks a parsed file along the registry of keys, and notes everything that does not fit it.

use std::collections::BTreeMap;
use std::ops::Range;

use toml::Spanned;
use toml::de::{DeArray, DeString, DeTable, DeValue};

use super::keys::{Key, Otherwise, ROOT, TABLES, Table, Times};
use super::value::{self, Value};
use crate::problems::{Problems, Wrong};
use crate::units::{Angle, Length, clipped, nearest};

/// A file whose tables and keys have been read one by one; what was wrong is left out of it.
pub(super) struct Sheet {
    rows: BTreeMap<&'static str, Vec<Row>>,
}

/// One table of the file with its values, defaults filled in.
#[derive(Default)]
pub(super) struct Row {
    /// Where it is opened.
    header: Range<usize>,
    values: BTreeMap<&'static str, (Range<usize>, Value)>,
}

impl Sheet {
    /// Reads every table of the registry out of a file.
    pub(super) fn read(root: &DeTable<'_>, problems: &mut Problems) -> Self {
        let mut rows = BTreeMap::new();
        let meant = guesses(&ROOT, root);
        rows.insert(ROOT.name, vec![Row::read(&ROOT, 0..0, root, problems)]);
        for table in TABLES.into_iter().filter(|table| !table.name.is_empty()) {
            let found = match root.get(table.name) {
                Some(raw) => read_table(table, raw, problems),
                None if meant.contains(&table.name) => Vec::new(),
                None => absent(table, problems),
            };
            rows.insert(table.name, found);
        }
        Self { rows }
    }

    /// The tables of that name, in the order of the file.
    pub(super) fn all(&self, table: &Table) -> &[Row] {
        self.rows.get(table.name).map_or(&[], Vec::as_slice)
    }

    /// The table of that name, if the file has it or its defaults hold without it.
    pub(super) fn one(&self, table: &Table) -> Option<&Row> {
        self.all(table).first()
    }
}

fn read_table(table: &'static Table, raw: &Spanned<DeValue<'_>>, problems: &mut Problems) -> Vec<Row> {
    let header = table.header();
    match (raw.get_ref(), table.times) {
        (DeValue::Array(array), Times::Many(least, most)) => {
            read_many(table, array, raw.span(), (least, most), problems)
        }
        (DeValue::Table(inner), Times::Many(..)) => {
            let wrong = Wrong::new(format!("there can be several of {header}, so it takes double brackets"))
                .help(format!("write {header}"));
            problems.add(raw.span(), wrong);
            vec![Row::read(table, raw.span(), inner, problems)]
        }
        (DeValue::Table(inner), _) => vec![Row::read(table, raw.span(), inner, problems)],
        (other, _) => {
            let wrong = Wrong::new(format!("{} is a table, and this is {}", table.name, value::noun(other)))
                .help(format!("write {header} on a line of its own, and its keys below"));
            problems.add(raw.span(), wrong);
            Vec::new()
        }
    }
}

fn read_many(
    table: &'static Table,
    array: &DeArray<'_>,
    span: Range<usize>,
    (least, most): (usize, usize),
    problems: &mut Problems,
) -> Vec<Row> {
    let header = table.header();
    let rows = array.iter().take(most).filter_map(|raw| match raw.get_ref() {
        DeValue::Table(inner) => Some(Row::read(table, raw.span(), inner, problems)),
        other => {
            let wrong = Wrong::new(format!("{header} holds tables, and this is {}", value::noun(other)))
                .help(format!("write {header} on a line of its own, and its keys below"));
            problems.add(raw.span(), wrong);
            None
        }
    });
    let rows: Vec<Row> = rows.collect();
    if let Some(beyond) = array.get(most) {
        let message = format!("this file has {} of {header}: at most {most} are read", array.len());
        problems.add(beyond.span(), Wrong::new(message));
    }
    if array.len() < least {
        let place = array.first().map_or(span, Spanned::span);
        let wrong = Wrong::new(format!(
            "{header} is wanted {least} times at least, and stands here {}",
            match array.len() {
                0 => "not at all",
                _ => "only once",
            }
        ))
        .help("a foil is lofted between stations: give one at the root and one at the far end");
        problems.add(place, wrong);
    }
    rows
}

fn absent(table: &'static Table, problems: &mut Problems) -> Vec<Row> {
    if table.required() {
        let example: Vec<String> = required_keys(table).map(Key::line).collect();
        let wrong = Wrong::new(format!("{} is missing: {}", table.header(), table.doc)).help(format!(
            "write {} and below it {}",
            table.header(),
            example.join(", ")
        ));
        problems.add(0..0, wrong);
    }
    match table.times {
        Times::AtMostOnce => vec![Row::read(table, 0..0, &DeTable::new(), problems)],
        _ => Vec::new(),
    }
}

fn required_keys(table: &'static Table) -> impl Iterator<Item = &'static Key> {
    table.keys.iter().filter(|key| matches!(key.otherwise, Otherwise::Required))
}

impl Row {
    fn read(
        table: &'static Table,
        header: Range<usize>,
        found: &DeTable<'_>,
        problems: &mut Problems,
    ) -> Self {
        for name in unknown_names(table, found) {
            problems.add(name.span(), unknown(table, name.get_ref()));
        }
        // A key that is only misspelt is not reported a second time as missing.
        let meant = guesses(table, found);
        let mut values = BTreeMap::new();
        for key in table.keys {
            if let Some(raw) = found.get(key.name) {
                if let Some(value) = value::read(key, raw, problems) {
                    values.insert(key.name, (raw.span(), value));
                }
                continue;
            }
            match key.otherwise {
                Otherwise::Required if meant.contains(&key.name) => {}
                Otherwise::Required => {
                    let wrong =
                        Wrong::new(format!("{}{} is missing: {}", key.name, place_of(table), key.doc)).help(
                            format!(
                                "write {}, or what yours is; it takes {}",
                                key.line(),
                                key.takes.describe()
                            ),
                        );
                    problems.add(header.clone(), wrong);
                }
                Otherwise::Default(text) => {
                    if let Ok(value) = value::from_text(key, text) {
                        values.insert(key.name, (header.clone(), value));
                    }
                }
                Otherwise::Left(_) => {}
            }
        }
        Self { header, values }
    }

    /// Whether a key is there and right.
    pub(super) fn given(&self, key: &str) -> bool {
        self.value(key).is_some()
    }

    /// Where the table is opened.
    pub(super) fn opening(&self) -> Range<usize> {
        self.header.clone()
    }

    /// Where a value stands; for a default, where its table is opened.
    pub(super) fn place(&self, key: &str) -> Range<usize> {
        self.values.get(key).map_or_else(|| self.header.clone(), |(span, _)| span.clone())
    }

    /// Where the table is opened.
    pub(super) fn header(&self) -> Range<usize> {
        self.header.clone()
    }

    /// Whether the file itself gives the key, rather than its default.
    pub(super) fn gives(&self, key: &str) -> bool {
        self.values.get(key).is_some_and(|(span, _)| *span != self.header)
    }

    fn value(&self, key: &str) -> Option<&Value> {
        self.values.get(key).map(|(_, value)| value)
    }

    /// The text or word of a key, if it is there and right.
    pub(super) fn text(&self, key: &str) -> Option<&str> {
        match self.value(key)? {
            Value::Text(text) => Some(text),
            _ => None,
        }
    }

    /// The number of a key, if it is there and right.
    pub(super) fn number(&self, key: &str) -> Option<f64> {
        match self.value(key)? {
            Value::Number(number) => Some(*number),
            _ => None,
        }
    }

    /// The length of a key, if it is there and right.
    pub(super) fn length(&self, key: &str) -> Option<Length> {
        match self.value(key)? {
            Value::Length(length) => Some(*length),
            _ => None,
        }
    }

    /// The lengths of a key and where each stands, if it is there and right.
    pub(super) fn lengths(&self, key: &str) -> Option<&[(Length, Range<usize>)]> {
        match self.value(key)? {
            Value::Lengths(lengths) => Some(lengths),
            _ => None,
        }
    }

    /// The angle of a key, if it is there and right.
    pub(super) fn angle(&self, key: &str) -> Option<Angle> {
        match self.value(key)? {
            Value::Angle(angle) => Some(*angle),
            _ => None,
        }
    }
}

/// " of [planform]", or nothing above the tables.
fn place_of(table: &Table) -> String {
    if table.name.is_empty() { String::new() } else { format!(" of {}", table.header()) }
}

/// The names in a table of the file that its registry does not know.
fn unknown_names<'a, 'i>(
    table: &'static Table,
    found: &'a DeTable<'i>,
) -> impl Iterator<Item = &'a Spanned<DeString<'i>>> {
    let known = here(table);
    found.iter().map(|(name, _)| name).filter(move |name| !known.contains(&name.get_ref().as_ref()))
}

/// What the unknown names in a table of the file were probably meant to be. Past a hundred of them
/// it is no design with slips in it, and guessing on would only cost time.
fn guesses(table: &'static Table, found: &DeTable<'_>) -> Vec<&'static str> {
    unknown_names(table, found).take(100).filter_map(|name| guess(table, name.get_ref())).collect()
}

/// The name that stands here and is spelt most like `name`. A key that stands in the wrong table is
/// spelt right, so nothing is guessed for it.
fn guess(table: &'static Table, name: &str) -> Option<&'static str> {
    let misplaced = TABLES.iter().any(|other| other.key(name).is_some());
    if misplaced { None } else { nearest(name, here(table).into_iter()) }
}

/// Every name that can stand in a table: its keys, and above all tables the tables too.
fn here(table: &'static Table) -> Vec<&'static str> {
    let tables = TABLES.iter().map(|other| other.name);
    let tables = tables.filter(|other| table.name.is_empty() && !other.is_empty());
    table.keys.iter().map(|key| key.name).chain(tables).collect()
}

fn unknown(table: &'static Table, name: &str) -> Wrong {
    let wrong = Wrong::new(format!("'{}' is not a key{}", clipped(name), place_of(table)));
    let homes: Vec<String> =
        TABLES.iter().filter(|other| other.key(name).is_some()).map(|other| other.header()).collect();
    if !homes.is_empty() {
        return wrong.help(format!("{name} is a key of {}", homes.join(", ")));
    }
    match guess(table, name) {
        Some(near) => wrong.help(format!("did you mean {near}?")),
        None => wrong.help(format!("what can stand here: {}", here(table).join(", "))),
    }
}

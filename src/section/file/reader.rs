//! The values of a section file, each with what is wrong with it.

use std::ops::{Range, RangeInclusive};

use toml::Spanned;
use toml::de::{DeTable, DeValue};

use super::LARGEST_SECTION_FILE;
use crate::problems::{Problems, Wrong};
use crate::units::{Angle, clipped, nearest};

/// A file while it is read.
pub(super) struct Reader<'a> {
    pub(super) text: &'a str,
    pub(super) problems: Problems,
}

/// A value with its place.
pub(super) type Raw<'a> = Spanned<DeValue<'a>>;

impl<'a> Reader<'a> {
    pub(super) fn new(text: &'a str) -> Self {
        Self { text, problems: Problems::default() }
    }

    pub(super) fn wrong(&mut self, span: Range<usize>, message: impl AsRef<str>, help: impl AsRef<str>) {
        self.problems.add(span, Wrong::new(message).help(help));
    }

    /// The whole file as a table.
    pub(super) fn root(&mut self) -> Option<Spanned<DeTable<'a>>> {
        if self.text.len() > LARGEST_SECTION_FILE {
            let message =
                format!("the file has more than {LARGEST_SECTION_FILE} bytes, the most that are read");
            self.wrong(0..0, message, "points stand in a file of their own, which [coordinates] names");
            return None;
        }
        self.problems.toml(self.text, "a section file")
    }

    pub(super) fn refuse_unknown(
        &mut self,
        table: &DeTable<'_>,
        known: &'static [&'static str],
        place: &str,
    ) {
        for (key, _) in table.iter().filter(|(key, _)| !known.contains(&key.get_ref().as_ref())) {
            let help = match nearest(key.get_ref(), known.iter().copied()) {
                Some(near) => format!("did you mean {near}?"),
                None => format!("what can stand here: {}", known.join(", ")),
            };
            self.wrong(key.span(), format!("'{}' is not a key of {place}", clipped(key.get_ref())), help);
        }
    }

    /// What the section is called.
    pub(super) fn name(&mut self, root: &DeTable<'_>) -> Option<String> {
        let fit = |c: char| c.is_ascii_alphanumeric() || " -_.,()=%".contains(c);
        let Some(raw) = root.get("name") else {
            self.wrong(0..0, "name is missing: what the section is called", "write name = \"My section\"");
            return None;
        };
        match raw.get_ref() {
            DeValue::String(text) if !text.trim().is_empty() && text.len() <= 60 && text.chars().all(fit) => {
                Some(text.trim().to_owned())
            }
            _ => {
                let help = "it takes up to 60 letters, digits, blanks and - _ . , ( ) = %, in quotes";
                self.wrong(raw.span(), "this cannot be the name of a section", help);
                None
            }
        }
    }

    /// The table under a heading.
    pub(super) fn table<'t, 'v>(&mut self, heading: &str, raw: &'t Raw<'v>) -> Option<&'t DeTable<'v>> {
        match raw.get_ref() {
            DeValue::Table(table) => Some(table),
            _ => {
                let help =
                    format!("write [{heading}] on a line of its own, and a key = value on each line below");
                self.wrong(raw.span(), format!("{heading} is a table"), help);
                None
            }
        }
    }

    /// A share of the chord: a number, or percent in quotes. `Ok(None)` where the key is left out.
    pub(super) fn share(
        &mut self,
        table: &DeTable<'_>,
        key: &str,
        bounds: RangeInclusive<f64>,
    ) -> Result<Option<f64>, Wronged> {
        let value = |raw: &DeValue<'_>| match raw {
            DeValue::String(text) => {
                let percent = text.trim().strip_suffix('%')?.trim().parse::<f64>().ok()?;
                Some(percent / 100.0)
            }
            other => number(other),
        };
        self.bounded(table, key, &bounds, value, |least, most, middle| {
            let message = format!("{key} takes a share of the chord from {least} to {most}");
            (message, format!("write {key} = {middle}, or {key} = \"{} %\"", clear(100.0 * middle)))
        })
    }

    /// A plain number. `Ok(None)` where the key is left out.
    pub(super) fn number(
        &mut self,
        table: &DeTable<'_>,
        key: &str,
        bounds: RangeInclusive<f64>,
    ) -> Result<Option<f64>, Wronged> {
        self.bounded(table, key, &bounds, number, |least, most, middle| {
            let message = format!("{key} takes a number from {least} to {most}, without quotes");
            (message, format!("write {key} = {middle}"))
        })
    }

    /// A value within bounds; `words` give message and help from least, most and a value between.
    fn bounded(
        &mut self,
        table: &DeTable<'_>,
        key: &str,
        bounds: &RangeInclusive<f64>,
        value: impl Fn(&DeValue<'_>) -> Option<f64>,
        words: impl Fn(f64, f64, f64) -> (String, String),
    ) -> Result<Option<f64>, Wronged> {
        let Some(raw) = table.get(key) else { return Ok(None) };
        if let Some(value) = value(raw.get_ref()).filter(|value| bounds.contains(value)) {
            return Ok(Some(value));
        }
        let (least, most) = (*bounds.start(), *bounds.end());
        let (message, help) = words(least, most, clear(0.5 * (least + most)));
        self.wrong(raw.span(), message, help);
        Err(Wronged)
    }

    /// An angle with its unit. `Ok(None)` where the key is left out.
    pub(super) fn angle(&mut self, table: &DeTable<'_>, key: &str) -> Result<Option<Angle>, Wronged> {
        let Some(raw) = table.get(key) else { return Ok(None) };
        let read = match raw.get_ref() {
            DeValue::String(text) => text.parse::<Angle>().map_err(|error| error.to_string()),
            _ => Err("an angle has its unit with it, in quotes".to_owned()),
        };
        read.map(Some).map_err(|message| {
            self.wrong(raw.span(), format!("{key}: {message}"), format!("write {key} = \"10 deg\""));
            Wronged
        })
    }

    /// Text in quotes. `Ok(None)` where the key is left out.
    pub(super) fn text(&mut self, table: &DeTable<'_>, key: &str) -> Result<Option<String>, Wronged> {
        let Some(raw) = table.get(key) else { return Ok(None) };
        match raw.get_ref() {
            DeValue::String(text) => Ok(Some(text.to_string())),
            _ => {
                self.wrong(raw.span(), format!("{key} takes text in quotes"), format!("write {key} = \"…\""));
                Err(Wronged)
            }
        }
    }

    /// One of some words; the first of them where the key is left out.
    pub(super) fn word(
        &mut self,
        table: &DeTable<'_>,
        key: &str,
        words: &'static [&'static str],
    ) -> Result<&'static str, Wronged> {
        let text = self.text(table, key)?;
        let Some(text) = text else { return words.first().copied().ok_or(Wronged) };
        words.iter().copied().find(|word| *word == text).ok_or_else(|| {
            let help = match nearest(&text, words.iter().copied()) {
                Some(near) => format!("did you mean \"{near}\"?"),
                None => format!("it takes one of: {}", words.join(", ")),
            };
            self.wrong(span_of(table, key), format!("{key} is '{}'", clipped(&text)), help);
            Wronged
        })
    }

    /// Notes that a key is missing.
    pub(super) fn missing<T>(&mut self, place: Range<usize>, what: &str, help: &str) -> Result<T, Wronged> {
        self.wrong(place, format!("{what} is missing"), help);
        Err(Wronged)
    }
}

/// What was wrong has been noted.
#[derive(Debug, Clone, Copy)]
pub(super) struct Wronged;

/// The place of a key's value.
pub(super) fn span_of(table: &DeTable<'_>, key: &str) -> Range<usize> {
    table.get(key).map_or(0..0, Spanned::span)
}

/// A finite number of the file.
pub(super) fn number(raw: &DeValue<'_>) -> Option<f64> {
    let digits = match raw {
        DeValue::Integer(integer) if integer.radix() == 10 => integer.as_str(),
        DeValue::Float(float) => float.as_str(),
        _ => return None,
    };
    digits.parse().ok().filter(|value: &f64| value.is_finite())
}

/// A value for an example, without the dust of binary fractions.
fn clear(value: f64) -> f64 {
    (value * 1000.0).round() / 1000.0
}

//! The section file: a section written as equations, in TOML.

use std::collections::BTreeMap;
use std::ops::Range;

use toml::Spanned;
use toml::de::{DeString, DeTable, DeValue};

use super::expression::known_names;
use super::{EquationError, Equations, Expression, MeanLine, Piece, Section, ThicknessForm};
use crate::problems::{FileErrors, Problems, Wrong};
use crate::units::{clipped, nearest};

/// The largest section file that is read, in bytes. It bounds the work that a file can ask for.
pub const LARGEST_SECTION_FILE: usize = 20_000;
const MOST_CONSTANTS: usize = 200;

pub(super) fn parse(text: &str, file_name: &str) -> Result<Section, FileErrors> {
    let mut file = File { text, problems: Problems::default(), constants: BTreeMap::new() };
    match file.section() {
        Some(section) if file.problems.is_empty() => Ok(section),
        _ => Err(file.problems.report(text, file_name)),
    }
}

/// The equations of one line, with the place of each piece in the file.
type Placed = (Equations, Vec<Range<usize>>);

struct File<'a> {
    text: &'a str,
    problems: Problems,
    constants: BTreeMap<String, f64>,
}

impl File<'_> {
    fn wrong(&mut self, span: Range<usize>, message: impl AsRef<str>, help: impl AsRef<str>) {
        self.problems.add(span, Wrong::new(message).help(help));
    }

    fn section(&mut self) -> Option<Section> {
        if self.text.len() > LARGEST_SECTION_FILE {
            let message =
                format!("the file has more than {LARGEST_SECTION_FILE} bytes, the most that are read");
            self.wrong(0..0, message, "a section file holds equations, no lists of points");
            return None;
        }
        let root = match DeTable::parse(self.text) {
            Ok(root) => root,
            Err(error) => {
                let message = format!("this is not TOML, the form of a section file: {}", error.message());
                self.problems.add(error.span().unwrap_or(0..0), Wrong::new(message));
                return None;
            }
        };
        let root = root.get_ref();
        self.refuse_unknown(root, &["name", "constants", "camber", "thickness"], "a section file");
        if let Some(constants) = root.get("constants") {
            self.read_constants(constants);
        }
        let name = match root.get("name") {
            Some(raw) => self.name(raw),
            None => {
                self.wrong(
                    0..0,
                    "name is missing: what the section is called",
                    "write name = \"My section\"",
                );
                None
            }
        };
        let line = match root.get("camber") {
            Some(raw) => self.equations("camber", "y", raw).and_then(|(equations, places)| {
                let line = MeanLine::from_equations(equations);
                self.noted(line, &places)
            }),
            None => Some(MeanLine::Straight),
        };
        let form = match root.get("thickness") {
            Some(raw) => self.equations("thickness", "t", raw).and_then(|(equations, places)| {
                let form = ThicknessForm::from_equations(equations);
                self.noted(form, &places)
            }),
            None => {
                let help = "write thickness = \"0.3*sqrt(x)*(1 - x)\", or what yours is: the full thickness over x, in chords";
                self.wrong(0..0, "thickness is missing", help);
                None
            }
        };
        let made = Section::new(name?, line?, form?)
            .and_then(|section| section.refuse_crossing_surfaces().map(|()| section));
        let place = root.get("camber").or(root.get("thickness")).map_or(0..0, Spanned::span);
        made.map_err(|error| self.problems.add(place, Wrong::new(error.to_string()))).ok()
    }

    fn refuse_unknown(&mut self, table: &DeTable<'_>, known: &'static [&'static str], place: &str) {
        for (key, _) in table.iter().filter(|(key, _)| !known.contains(&key.get_ref().as_ref())) {
            let help = match nearest(key.get_ref(), known.iter().copied()) {
                Some(near) => format!("did you mean {near}?"),
                None => format!("what can stand here: {}", known.join(", ")),
            };
            self.wrong(key.span(), format!("'{}' is not a key of {place}", clipped(key.get_ref())), help);
        }
    }

    fn name(&mut self, raw: &Spanned<DeValue<'_>>) -> Option<String> {
        let fit = |c: char| c.is_ascii_alphanumeric() || " -_.,()=%".contains(c);
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

    fn read_constants(&mut self, raw: &Spanned<DeValue<'_>>) {
        let DeValue::Table(table) = raw.get_ref() else {
            self.wrong(
                raw.span(),
                "constants is a table",
                "write [constants] on a line of its own, and a name = value on each line below",
            );
            return;
        };
        if table.len() > MOST_CONSTANTS {
            self.wrong(
                raw.span(),
                format!("there are {} constants: {MOST_CONSTANTS} at most", table.len()),
                "leave out what is not used",
            );
            return;
        }
        for (key, value) in table.iter() {
            if !self.may_be_a_constant(key) {
                continue;
            }
            match number(value.get_ref()) {
                Some(number) => {
                    self.constants.insert(key.get_ref().to_string(), number);
                }
                None => {
                    let message = format!("the constant {} is not a finite number", clipped(key.get_ref()));
                    self.wrong(
                        value.span(),
                        message,
                        format!("write {} = 0.12, without quotes", clipped(key.get_ref())),
                    );
                }
            }
        }
    }

    fn may_be_a_constant(&mut self, key: &Spanned<DeString<'_>>) -> bool {
        let name = key.get_ref();
        let letters = |c: char| c.is_ascii_alphanumeric() || c == '_';
        let starts = name.starts_with(|c: char| c.is_ascii_alphabetic() || c == '_');
        let shown = clipped(name);
        if known_names().any(|known| known == name.as_ref()) {
            self.wrong(
                key.span(),
                format!("'{shown}' has a meaning of its own in expressions"),
                "take another name",
            );
        } else if !starts || !name.chars().all(letters) {
            let help = "it takes letters, digits and _, and starts with no digit: a - would be read as minus";
            self.wrong(key.span(), format!("'{shown}' cannot be the name of a constant"), help);
        } else {
            return true;
        }
        false
    }

    /// The equations under a key: one text, or a list of pieces.
    fn equations(&mut self, key: &str, value: &'static str, raw: &Spanned<DeValue<'_>>) -> Option<Placed> {
        let (pieces, places): (Vec<Piece>, Vec<[Range<usize>; 2]>) = match raw.get_ref() {
            DeValue::String(_) => {
                let value = self.expression(raw)?;
                (vec![Piece { from: 0.0, to: 1.0, value }], vec![[raw.span(), raw.span()]])
            }
            DeValue::Array(array) if !array.is_empty() && array.len() <= super::equations::MOST_PIECES => {
                let read: Vec<_> = array.iter().map(|raw| self.piece(key, value, raw)).collect();
                read.into_iter().collect::<Option<Vec<_>>>()?.into_iter().unzip()
            }
            _ => {
                let help = format!(
                    "write {key} = \"…\", or several of [[{key}]] (50 at most) with from, to and {value} each"
                );
                self.wrong(
                    raw.span(),
                    format!("{key} takes an expression in quotes, or a list of pieces"),
                    help,
                );
                return None;
            }
        };
        let equations = Equations::new(pieces);
        // How the pieces join is marked at their heads, what is in them at their expressions.
        let (heads, values): (Vec<_>, Vec<_>) = places.into_iter().map(|[head, value]| (head, value)).unzip();
        self.noted(equations, &heads).map(|equations| (equations, values))
    }

    fn piece(
        &mut self,
        key: &str,
        value: &'static str,
        raw: &Spanned<DeValue<'_>>,
    ) -> Option<(Piece, [Range<usize>; 2])> {
        let DeValue::Table(table) = raw.get_ref() else {
            self.wrong(
                raw.span(),
                format!("a piece of {key} is a table"),
                format!("write [[{key}]] with from, to and {value}"),
            );
            return None;
        };
        let known: &'static [&'static str] =
            if value == "y" { &["from", "to", "y"] } else { &["from", "to", "t"] };
        self.refuse_unknown(table, known, &format!("[[{key}]]"));
        let missing: Vec<&str> = known.iter().copied().filter(|name| !table.contains_key(*name)).collect();
        if !missing.is_empty() {
            let message = format!("this piece of {key} lacks {}", missing.join(", "));
            self.wrong(raw.span(), message, format!("a piece has from, to and {value}"));
            return None;
        }
        let from = table.get("from").and_then(|raw| self.end(raw));
        let to = table.get("to").and_then(|raw| self.end(raw));
        let text = table.get(value)?;
        let value = self.expression(text);
        Some((Piece { from: from?, to: to?, value: value? }, [raw.span(), text.span()]))
    }

    /// An end of a piece: a number, or an expression without x.
    fn end(&mut self, raw: &Spanned<DeValue<'_>>) -> Option<f64> {
        let value = match raw.get_ref() {
            DeValue::String(_) => self.expression(raw)?.constant().filter(|value| value.is_finite()),
            other => number(other),
        };
        if value.is_none() {
            self.wrong(
                raw.span(),
                "this is no place along the chord",
                "write a number from 0 to 1, or an expression of constants in quotes",
            );
        }
        value
    }

    fn expression(&mut self, raw: &Spanned<DeValue<'_>>) -> Option<Expression> {
        let DeValue::String(text) = raw.get_ref() else {
            self.wrong(raw.span(), "an expression stands in quotes", "write it as \"0.3*sqrt(x)*(1 - x)\"");
            return None;
        };
        match Expression::parse(text, &self.constants) {
            Ok(expression) => Some(expression),
            Err(error) => {
                // Escapes in the file shift what follows; then the whole text is marked.
                let whole = raw.span();
                let inside = self.text.get(whole.clone()).and_then(|literal| literal.find(text.as_ref()));
                let span = match inside {
                    Some(offset) if !text.is_empty() => {
                        let start = whole.start + offset;
                        start + error.span.start..start + error.span.end
                    }
                    _ => whole,
                };
                let wrong = Wrong::new(&error.message);
                self.problems.add(
                    span,
                    match &error.help {
                        Some(help) => wrong.help(help),
                        None => wrong,
                    },
                );
                None
            }
        }
    }

    fn noted<T>(&mut self, made: Result<T, EquationError>, places: &[Range<usize>]) -> Option<T> {
        made.map_err(|error| {
            let place = places.get(error.piece).or(places.last()).cloned().unwrap_or(0..0);
            self.wrong(place, &error.message, error.help);
        })
        .ok()
    }
}

/// A finite number of the file.
fn number(raw: &DeValue<'_>) -> Option<f64> {
    let digits = match raw {
        DeValue::Integer(integer) if integer.radix() == 10 => integer.as_str(),
        DeValue::Float(float) => float.as_str(),
        _ => return None,
    };
    digits.parse().ok().filter(|value: &f64| value.is_finite())
}

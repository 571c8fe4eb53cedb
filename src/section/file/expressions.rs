//! Expressions in a section file: constants, pieces, and what they make.

use std::collections::BTreeMap;
use std::ops::Range;

use toml::Spanned;
use toml::de::{DeString, DeTable, DeValue};

use super::reader::{Raw, Reader, number};
use crate::problems::Wrong;
use crate::section::equations::MOST_PIECES;
use crate::section::expression::known_names;
use crate::section::{EquationError, Equations, Expression, Piece};
use crate::units::clipped;

const MOST_CONSTANTS: usize = 200;

/// The equations of one line, with the place of each piece in the file.
pub(super) type PlacedEquations = (Equations, Vec<Range<usize>>);

/// Reads expressions in which the constants of the file may stand.
pub(super) struct Expressions<'r, 'a> {
    pub(super) reader: &'r mut Reader<'a>,
    constants: BTreeMap<String, f64>,
}

impl<'r, 'a> Expressions<'r, 'a> {
    pub(super) fn new(reader: &'r mut Reader<'a>, root: &DeTable<'_>) -> Self {
        let mut expressions = Self { reader, constants: BTreeMap::new() };
        if let Some(constants) = root.get("constants") {
            expressions.read_constants(constants);
        }
        expressions
    }

    fn wrong(&mut self, span: Range<usize>, message: impl AsRef<str>, help: impl AsRef<str>) {
        self.reader.wrong(span, message, help);
    }

    fn read_constants(&mut self, raw: &Raw<'_>) {
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
    pub(super) fn equations(
        &mut self,
        key: &str,
        value: &'static str,
        raw: &Raw<'_>,
    ) -> Option<PlacedEquations> {
        let (pieces, places): (Vec<Piece>, Vec<[Range<usize>; 2]>) = match raw.get_ref() {
            DeValue::String(_) => {
                let value = self.expression(raw)?;
                (vec![Piece { from: 0.0, to: 1.0, value }], vec![[raw.span(), raw.span()]])
            }
            DeValue::Array(array) if !array.is_empty() && array.len() <= MOST_PIECES => {
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

    fn piece(&mut self, key: &str, value: &'static str, raw: &Raw<'_>) -> Option<(Piece, [Range<usize>; 2])> {
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
        self.reader.refuse_unknown(table, known, &format!("[[{key}]]"));
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
    fn end(&mut self, raw: &Raw<'_>) -> Option<f64> {
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

    fn expression(&mut self, raw: &Raw<'_>) -> Option<Expression> {
        let DeValue::String(text) = raw.get_ref() else {
            self.wrong(raw.span(), "an expression stands in quotes", "write it as \"0.3*sqrt(x)*(1 - x)\"");
            return None;
        };
        match Expression::parse(text, &self.constants) {
            Ok(expression) => Some(expression),
            Err(error) => {
                // Escapes in the file shift what follows; then the whole text is marked.
                let whole = raw.span();
                let inside =
                    self.reader.text.get(whole.clone()).and_then(|literal| literal.find(text.as_ref()));
                let span = match inside {
                    Some(offset) if !text.is_empty() => {
                        let start = whole.start + offset;
                        start + error.span.start..start + error.span.end
                    }
                    _ => whole,
                };
                let wrong = Wrong::new(&error.message);
                self.reader.problems.add(
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

    pub(super) fn noted<T>(&mut self, made: Result<T, EquationError>, places: &[Range<usize>]) -> Option<T> {
        made.map_err(|error| {
            let place = places.get(error.piece).or(places.last()).cloned().unwrap_or(0..0);
            self.wrong(place, &error.message, error.help);
        })
        .ok()
    }
}

//! One value of the file against what its key takes.

use std::ops::Range;

use toml::Spanned;
use toml::de::DeValue;

use super::keys::{Key, Takes};
use crate::problems::{Problems, Wrong};
use crate::units::{ANGLE, Angle, LENGTH, Length, Quantity, UnitError, clipped, nearest, plain};

/// A value that its key takes.
pub(super) enum Value {
    /// Text, a name or a word.
    Text(String),
    /// A number without a unit.
    Number(f64),
    /// A length.
    Length(Length),
    /// Lengths, each with its place in the file.
    Lengths(Vec<(Length, Range<usize>)>),
    /// An angle.
    Angle(Angle),
}

/// Reads the value of `key`; notes what is wrong and gives nothing then.
pub(super) fn read(key: &Key, raw: &Spanned<DeValue<'_>>, problems: &mut Problems) -> Option<Value> {
    if let (Takes::Lengths(most, ..), DeValue::Array(array)) = (&key.takes, raw.get_ref()) {
        if array.len() > *most || array.is_empty() {
            let message =
                format!("{} has {} places: it takes {}", key.name, array.len(), key.takes.describe());
            problems.add(raw.span(), Wrong::new(message));
            return None;
        }
        let mut lengths = Vec::with_capacity(array.len());
        for item in array.iter() {
            if let Some(Value::Length(length)) = noted(single(key, item.get_ref()), item.span(), problems) {
                lengths.push((length, item.span()));
            }
        }
        return (lengths.len() == array.len()).then_some(Value::Lengths(lengths));
    }
    let result = match &key.takes {
        Takes::Lengths(..) => Err(mismatch(key, raw.get_ref())),
        _ => single(key, raw.get_ref()),
    };
    noted(result, raw.span(), problems)
}

fn noted(result: Result<Value, Wrong>, span: Range<usize>, problems: &mut Problems) -> Option<Value> {
    result.map_err(|wrong| problems.add(span, wrong)).ok()
}

/// Reads a value that is not a list.
fn single(key: &Key, raw: &DeValue<'_>) -> Result<Value, Wrong> {
    let digits = match raw {
        DeValue::Integer(integer) if integer.radix() == 10 => Some(integer.as_str()),
        DeValue::Float(float) => Some(float.as_str()),
        _ => None,
    };
    match (&key.takes, raw, digits) {
        (Takes::Number(..), DeValue::String(_), _) => {
            Err(Wrong::new(format!("{} is a number without a unit, and stands without quotes", key.name))
                .help(format!("write {}", key.line())))
        }
        (Takes::NumberOrLength(..), DeValue::String(text), _) if text.trim().parse::<f64>().is_ok() => {
            Err(Wrong::new(format!("{}: a number without a unit stands without quotes", key.name))
                .help(format!("write {} = {}, or a length with its unit", key.name, clipped(text.trim()))))
        }
        (_, DeValue::String(text), _) => from_text(key, text),
        (Takes::NumberOrLength([least, most], _), _, Some(digits)) => number(key, digits, [*least, *most]),
        (Takes::Number(..), _, Some(digits)) => from_text(key, digits),
        (Takes::Length(..) | Takes::Lengths(..) | Takes::WordOrLength(..), _, Some(digits)) => {
            Err(bare(key, &LENGTH, digits))
        }
        (Takes::Angle(..), _, Some(digits)) => Err(bare(key, &ANGLE, digits)),
        (Takes::Amount(quantity, ..), _, Some(digits)) => Err(bare(key, quantity, digits)),
        _ => Err(mismatch(key, raw)),
    }
}

/// A number where a quantity is wanted.
fn bare(key: &Key, quantity: &'static Quantity, digits: &str) -> Wrong {
    let text = clipped(digits);
    let finite = digits.parse::<f64>().is_ok_and(f64::is_finite);
    let (error, right) = if finite {
        (UnitError::Bare { quantity, text: text.clone() }, format!("{text} {}", quantity.base()))
    } else {
        (UnitError::NotFinite { quantity, text }, one_of(key).to_owned())
    };
    Wrong::new(format!("{}: {error}", key.name))
        .help(format!("write the unit with it, in quotes: \"{right}\""))
}

/// Reads a value from text: that of a string in the file, the digits of a number, or a default.
pub(super) fn from_text(key: &Key, text: &str) -> Result<Value, Wrong> {
    match key.takes {
        Takes::Name => name(text).map(Value::Text),
        Takes::Text(most) => {
            let length = text.chars().count();
            if length > most {
                return Err(Wrong::new(format!(
                    "{} has {length} characters: it takes {}",
                    key.name,
                    key.takes.describe()
                )));
            }
            Ok(Value::Text(text.to_owned()))
        }
        Takes::WordOrLength(words, ..) if words.contains(&text) => Ok(Value::Text(text.to_owned())),
        // No length begins with a letter: a word was meant.
        Takes::WordOrLength(words, ..) if text.starts_with(|c: char| c.is_alphabetic()) => {
            let message = format!("{} is '{}': it takes {}", key.name, clipped(text), key.takes.describe());
            let help = match nearest(text, words.iter().copied()) {
                Some(near) => format!("did you mean \"{near}\"?"),
                None => format!("for example \"{}\"", key.example),
            };
            Err(Wrong::new(message).help(help))
        }
        Takes::Word(words) => match words.contains(&text) {
            true => Ok(Value::Text(text.to_owned())),
            false => {
                let wrong = Wrong::new(format!(
                    "{} is '{}': it takes {}",
                    key.name,
                    clipped(text),
                    key.takes.describe()
                ));
                Err(match nearest(text, words.iter().copied()) {
                    Some(near) => wrong.help(format!("did you mean \"{near}\"?")),
                    None => wrong,
                })
            }
        },
        // Text is the length; the number stands without quotes.
        Takes::NumberOrLength(_, [least, most])
        | Takes::Length(least, most)
        | Takes::Lengths(_, least, most)
        | Takes::WordOrLength(_, least, most) => {
            let length = quantity(key, &LENGTH, text)?;
            within(length, least, most)
                .map(|mm| Value::Length(Length::from_mm(mm)))
                .ok_or_else(|| beyond(key, &Length::from_mm(length).to_string()))
        }
        Takes::Angle(least, most) => {
            let angle = quantity(key, &ANGLE, text)?;
            within(angle, least, most)
                .map(|degrees| Value::Angle(Angle::from_degrees(degrees)))
                .ok_or_else(|| beyond(key, &Angle::from_degrees(angle).to_string()))
        }
        Takes::Amount(kind, least, most) => {
            let amount = quantity(key, kind, text)?;
            within(amount, least, most)
                .map(Value::Number)
                .ok_or_else(|| beyond(key, &format!("{} {}", plain(amount), kind.base())))
        }
        Takes::Number(least, most) => number(key, text, [least, most]),
    }
}

/// Reads a number without a unit.
fn number(key: &Key, text: &str, [least, most]: [f64; 2]) -> Result<Value, Wrong> {
    let number = text.parse().unwrap_or(f64::NAN);
    if !f64::is_finite(number) {
        return Err(Wrong::new(format!("{} is {}, not a finite number", key.name, clipped(text)))
            .help(format!("it takes {}", key.takes.describe())));
    }
    within(number, least, most).map(Value::Number).ok_or_else(|| beyond(key, &plain(number)))
}

fn quantity(key: &Key, quantity: &'static Quantity, text: &str) -> Result<f64, Wrong> {
    quantity.parse(text).map_err(|error| {
        Wrong::new(format!("{}: {error}", key.name)).help(format!("for example \"{}\"", one_of(key)))
    })
}

/// The value when it lies within bounds. A hair beyond is the rounding of another unit, and is
/// brought back onto the bound.
fn within(value: f64, least: f64, most: f64) -> Option<f64> {
    let hair = 1e-9 * least.abs().max(most.abs()).max(1.0);
    (value >= least - hair && value <= most + hair).then(|| value.clamp(least, most))
}

fn beyond(key: &Key, shown: &str) -> Wrong {
    Wrong::new(format!("{} is {shown}: it takes {}", key.name, key.takes.describe()))
}

fn mismatch(key: &Key, raw: &DeValue<'_>) -> Wrong {
    Wrong::new(format!("{} takes {}, and this is {}", key.name, key.takes.describe(), noun(raw)))
        .help(format!("write {}", key.line()))
}

/// What a value of the file is called.
pub(super) fn noun(raw: &DeValue<'_>) -> &'static str {
    match raw {
        DeValue::String(_) => "text",
        DeValue::Integer(_) | DeValue::Float(_) => "a number",
        DeValue::Boolean(_) => "true or false",
        DeValue::Datetime(_) => "a date or a time",
        DeValue::Array(_) => "a list",
        DeValue::Table(_) => "a table",
    }
}

/// The example of a key, or the first of its list.
fn one_of(key: &Key) -> &'static str {
    key.example.split(", ").next().unwrap_or(key.example)
}

/// A name that files can safely be called by, on every system and in every drawing.
fn name(text: &str) -> Result<String, Wrong> {
    let shown = clipped(text);
    if text.contains(['/', '\\']) || text.contains("..") {
        return Err(Wrong::new(format!(
            "'{shown}' cannot be a name: files are named after it, and '/', '\\' and '..' would lead to other folders"
        ))
        .help(format!("it takes {}", Takes::Name.describe())));
    }
    let allowed = |character: char| character.is_ascii_alphanumeric() || matches!(character, ' ' | '-' | '_');
    let starts = text.chars().next().is_some_and(|first| first.is_ascii_alphanumeric());
    if starts && text.len() <= 60 && text.chars().all(allowed) {
        return Ok(text.to_owned());
    }
    let message = match text.chars().find(|&character| !allowed(character)) {
        _ if text.is_empty() => "the name is empty, and files are named after it".to_owned(),
        Some(other) => {
            format!(
                "'{shown}' cannot be a name: files are named after it, and '{}' is not safe there",
                clipped(&other.to_string())
            )
        }
        None if !starts => format!("'{shown}' cannot be a name: it starts with neither a letter nor a digit"),
        None => format!("the name has {} characters", text.len()),
    };
    Err(Wrong::new(message).help(format!("it takes {}", Takes::Name.describe())))
}

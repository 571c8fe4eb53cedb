//! Cutting the text of an expression into numbers, names and signs.

use std::ops::Range;

use super::ExpressionError;
use crate::units::clipped;

/// A piece of the text.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) enum Token<'a> {
    Number(f64),
    Name(&'a str),
    /// One of `+-*/^(),`.
    Sign(char),
}

/// Signs that people paste in, and what to write for them.
const LOOKALIKES: [(char, &str); 9] = [
    ('×', "*"),
    ('·', "*"),
    ('⋅', "*"),
    ('−', "-"),
    ('–', "-"),
    ('÷', "/"),
    ('√', "sqrt(…)"),
    ('²', "^2"),
    ('π', "pi"),
];

pub(super) fn tokens(text: &str) -> Result<Vec<(Token<'_>, Range<usize>)>, ExpressionError> {
    let mut found = Vec::new();
    let mut at = 0;
    while let Some(first) = text[at..].chars().next() {
        let rest = &text[at..];
        let length = match first {
            _ if first.is_whitespace() => {
                at += first.len_utf8();
                continue;
            }
            '0'..='9' | '.' => number_length(rest.as_bytes()),
            'a'..='z' | 'A'..='Z' | '_' => {
                rest.find(|c: char| !c.is_ascii_alphanumeric() && c != '_').unwrap_or(rest.len())
            }
            _ => first.len_utf8(),
        };
        let span = at..at + length;
        let piece = &text[span.clone()];
        let token = match first {
            '0'..='9' | '.' => Token::Number(number(piece, span.clone())?),
            'a'..='z' | 'A'..='Z' | '_' => Token::Name(piece),
            '*' if rest.starts_with("**") => {
                return Err(
                    ExpressionError::new(at..at + 2, "a power is written with ^").help("write ^ for **")
                );
            }
            '+' | '-' | '*' | '/' | '^' | '(' | ')' | ',' => Token::Sign(first),
            _ => return Err(strange(first, piece, span)),
        };
        found.push((token, span));
        at += length;
    }
    Ok(found)
}

fn strange(first: char, piece: &str, span: Range<usize>) -> ExpressionError {
    let error = ExpressionError::new(span, format!("'{}' has no meaning in an expression", clipped(piece)));
    match LOOKALIKES.into_iter().find(|(sign, _)| *sign == first) {
        Some((_, right)) => error.help(format!("write {right}")),
        None => error.help("it takes numbers, names, + - * / ^, parentheses and functions"),
    }
}

/// Digits, a point, digits, and an exponent if digits follow it.
fn number_length(bytes: &[u8]) -> usize {
    let digits = |from: usize| bytes[from..].iter().take_while(|b| b.is_ascii_digit()).count();
    let mut end = digits(0);
    if bytes.get(end) == Some(&b'.') {
        end += 1;
        end += digits(end);
    }
    if matches!(bytes.get(end), Some(b'e' | b'E')) {
        let sign = usize::from(matches!(bytes.get(end + 1), Some(b'+' | b'-')));
        let from = end + 1 + sign;
        if from < bytes.len() && digits(from) > 0 {
            end = from + digits(from);
        }
    }
    end
}

fn number(piece: &str, span: Range<usize>) -> Result<f64, ExpressionError> {
    match piece.parse::<f64>() {
        Ok(value) if value.is_finite() => Ok(value),
        Ok(_) => Err(ExpressionError::new(span, format!("{} is too large a number", clipped(piece)))),
        Err(_) => Err(ExpressionError::new(span, format!("'{}' is not a number", clipped(piece)))),
    }
}

//! Numbers in text: where one ends, and how one is written back.

/// Splits a text after the number it starts with. What comes first may still not be one
/// ("1.2.3", "2,5"), so that the message can show the whole of it.
pub(super) fn split_number(text: &str) -> (&str, &str) {
    let mut end = 0;
    let mut digit_seen = false;
    let mut letter_seen = false;
    for (at, character) in text.char_indices() {
        let next = text[at + character.len_utf8()..].trim_start_matches(['+', '-']).chars().next();
        let takes = match character {
            '+' | '-' | '\u{2212}' => at == 0 || text[..at].ends_with(['e', 'E']),
            '0'..='9' | '.' | ',' | '_' => true,
            'e' | 'E' => {
                digit_seen && !letter_seen && next.is_some_and(|character| character.is_ascii_digit())
            }
            _ => false,
        };
        if !takes {
            break;
        }
        digit_seen |= character.is_ascii_digit();
        letter_seen |= character.is_ascii_alphabetic();
        end = at + character.len_utf8();
    }
    text.split_at(end)
}

/// Whether the text starts with one of the words that computers take for numbers.
pub(super) fn is_not_finite(text: &str) -> bool {
    let lower = text.trim_start_matches(['+', '-', '\u{2212}']).to_ascii_lowercase();
    let word: &str = lower.split(|character: char| !character.is_alphabetic()).next().unwrap_or("");
    matches!(word, "nan" | "inf" | "infinity" | "infinite")
}

/// A number as one would write it: up to six decimals and none that say nothing.
pub(crate) fn plain(value: f64) -> String {
    // Outside these the fixed form would be hundreds of digits long, or no digit at all.
    if value != 0.0 && !(1e-5..1e9).contains(&value.abs()) {
        return format!("{value:e}");
    }
    number(value, 6)
}

/// A number with so many decimals, and never "-0.0".
#[must_use]
pub fn fixed(value: f64, places: usize) -> String {
    let text = format!("{value:.places$}");
    match text.strip_prefix('-') {
        Some(digits) if digits.bytes().all(|b| matches!(b, b'0' | b'.')) => digits.to_owned(),
        _ => text,
    }
}

/// A number as short as it can be with `places` decimals, and never "-0".
#[must_use]
pub fn number(value: f64, places: usize) -> String {
    let text = fixed(value, places);
    if text.contains('.') { text.trim_end_matches('0').trim_end_matches('.').to_owned() } else { text }
}

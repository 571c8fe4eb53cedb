//! Guessing what a misspelt word was meant to be, and showing it without letting it run away.

/// Longest piece of a user's text that a message repeats, in characters.
const SHOWN: usize = 40;

/// The word of `known` that is spelt most like `word`, if any is near enough to be a likely slip.
pub(crate) fn nearest<'a>(word: &str, known: impl Iterator<Item = &'a str>) -> Option<&'a str> {
    // Likeness costs the product of the lengths, and nobody mistypes a word into a page.
    if word.chars().count() > SHOWN {
        return None;
    }
    let fold = |text: &str| text.to_lowercase().replace(['_', ' '], "-");
    let word = fold(word);
    known
        .map(|candidate| (strsim::normalized_damerau_levenshtein(&word, &fold(candidate)), candidate))
        // Half of the letters is not enough: of two-letter units, every other would be near.
        .filter(|&(likeness, _)| likeness > 0.5)
        .max_by(|a, b| a.0.total_cmp(&b.0))
        .map(|(_, candidate)| candidate)
}

/// A user's text fit for a message: cut to a length that can be read at a glance, and with nothing
/// in it that a terminal would obey.
pub(crate) fn clipped(text: &str) -> String {
    let mut short: String = text.chars().take(SHOWN).map(harmless).collect();
    if text.chars().nth(SHOWN).is_some() {
        short.push('…');
    }
    short
}

/// Controls, and the marks that turn the direction of writing round, as a visible stand-in.
pub(crate) fn harmless(character: char) -> char {
    match character {
        '\u{200e}' | '\u{200f}' | '\u{202a}'..='\u{202e}' | '\u{2066}'..='\u{2069}' => '\u{fffd}',
        _ if character.is_control() => '\u{fffd}',
        _ => character,
    }
}

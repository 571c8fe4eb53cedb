//! Letters of straight strokes that do not touch one another, to be engraved in a plate.

use crate::geometry::{Point, Vec2};

/// Width of a letter, of a stroke and of the gap between strokes, shares of its height.
const WIDTH: f64 = 0.56;
const STROKE: f64 = 0.15;
const GAP: f64 = 0.035;
/// From one letter to the next, a share of the height.
const STEP: f64 = 0.9;
/// How much shorter a slanting stroke is at each end, in strokes: enough to clear its neighbours.
const SLANT: f64 = 1.0;

/// The strokes: from where to where, in half widths and half heights of a letter.
const STROKES: [(char, [i8; 4]); 14] = [
    ('a', [0, 2, 2, 2]),
    ('b', [2, 2, 2, 1]),
    ('c', [2, 1, 2, 0]),
    ('d', [0, 0, 2, 0]),
    ('e', [0, 1, 0, 0]),
    ('f', [0, 2, 0, 1]),
    ('g', [0, 1, 1, 1]),
    ('h', [1, 1, 2, 1]),
    ('j', [1, 2, 1, 1]),
    ('m', [1, 1, 1, 0]),
    ('n', [1, 1, 2, 0]),
    ('k', [1, 1, 0, 2]),
    ('l', [1, 1, 2, 2]),
    ('.', [1, 0, 1, 0]),
];

/// The strokes of each letter that a label has: figures, the sixteenth figures of a fingerprint, and
/// those of the halves of masks and the pieces of wood.
const LETTERS: [(char, &str); 24] = [
    ('0', "abcdef"),
    ('1', "bc"),
    ('2', "abghed"),
    ('3', "abhcd"),
    ('4', "fghbc"),
    ('5', "afghcd"),
    ('6', "afedcgh"),
    ('7', "abc"),
    ('8', "abcdefgh"),
    ('9', "abcdfgh"),
    ('A', "abcefgh"),
    ('B', "abcdhjm"),
    ('C', "adef"),
    ('D', "abcdjm"),
    ('E', "adefg"),
    ('F', "aefg"),
    ('I', "jm"),
    ('L', "def"),
    ('O', "abcdef"),
    ('P', "abefgh"),
    ('R', "abefghn"),
    ('U', "bcdef"),
    ('W', "bcdefm"),
    ('-', "gh"),
];

/// Letters whose strokes would touch when they have a width: for middle lines alone.
const NARROW_LETTERS: [(char, &str); 2] = [('M', "bcefkl"), ('N', "bcefkn")];

/// Width of a text of letters so high.
pub(super) fn width(text: &str, height: f64) -> f64 {
    let count = text.chars().count() as f64;
    ((count - 1.0) * STEP + WIDTH + STROKE).max(0.0) * height
}

/// The outlines of the strokes of a text, anticlockwise, none touching another. `at`: lower left corner
/// of the first letter. Small letters become capitals; what has no letter is left blank.
pub(super) fn strokes(text: &str, at: Point, height: f64) -> Vec<Vec<Point>> {
    let mut outlines = Vec::new();
    for (i, character) in text.chars().enumerate() {
        let Some(letter) = letter(character) else { continue };
        let origin = at + Vec2::new((i as f64 * STEP + 0.5 * STROKE) * height, 0.5 * STROKE * height);
        let used = STROKES.iter().filter(|(name, _)| letter.contains(*name));
        outlines.extend(used.map(|(_, ends)| stroke(origin, *ends, height)));
    }
    outlines
}

/// The middle lines of the strokes of a text, to be engraved with a point. `at`: as for [`strokes`].
pub(super) fn middle_lines(text: &str, at: Point, height: f64) -> Vec<[Point; 2]> {
    let mut lines = Vec::new();
    for (i, character) in text.chars().enumerate() {
        let Some(letter) = letter(character).or_else(|| known(&NARROW_LETTERS, character)) else { continue };
        let origin = at + Vec2::new(i as f64 * STEP * height, 0.0);
        let node = |x: i8, y: i8| origin + height * Vec2::new(0.5 * WIDTH * f64::from(x), 0.5 * f64::from(y));
        let used = STROKES.iter().filter(|(name, _)| letter.contains(*name));
        lines.extend(used.map(|(_, [x0, y0, x1, y1])| {
            let (from, to) = (node(*x0, *y0), node(*x1, *y1));
            // A point is a short stroke.
            if from == to { [from, from + Vec2::new(0.0, 0.1 * height)] } else { [from, to] }
        }));
    }
    lines
}

/// The strokes that a character has, if it has any.
fn letter(character: char) -> Option<&'static str> {
    known(&LETTERS, character).or((character == '.').then_some("."))
}

fn known(letters: &[(char, &'static str)], character: char) -> Option<&'static str> {
    let upper = character.to_ascii_uppercase();
    letters.iter().find(|(known, _)| *known == upper).map(|(_, letter)| *letter)
}

fn stroke(origin: Point, ends: [i8; 4], height: f64) -> Vec<Point> {
    let thick = STROKE * height;
    let cell = Vec2::new(0.5 * WIDTH * height, 0.5 * (1.0 - STROKE) * height);
    let node = |x: i8, y: i8| origin + Vec2::new(f64::from(x) * cell.x, f64::from(y) * cell.y);
    let (from, to) = (node(ends[0], ends[1]), node(ends[2], ends[3]));
    if from == to {
        // A point is a square.
        let half = 0.5 * thick;
        return [(-1.0, -1.0), (1.0, -1.0), (1.0, 1.0), (-1.0, 1.0)]
            .map(|(x, y)| from + Vec2::new(x * half, y * half))
            .to_vec();
    }
    let along = (to - from).normalize();
    let across = 0.5 * thick * along.turn_90();
    if ends[0] != ends[2] && ends[1] != ends[3] {
        let shorter = SLANT * thick + GAP * height;
        let (from, to) = (from + shorter * along, to - shorter * along);
        return vec![from - across, to - across, to + across, from + across];
    }
    // Pointed ends, so that strokes that meet at a right angle run along each other.
    // The upright strokes in the middle end under the level ones, and not beside them.
    let end = |[x, y]: [i8; 2]| {
        let under = x == 1 && y != 1 && ends[0] == ends[2];
        if under { 0.5 * thick + 2.0 * GAP * height } else { GAP * height }
    };
    let (from, to) = (from + end([ends[0], ends[1]]) * along, to - end([ends[2], ends[3]]) * along);
    let shoulder = 0.5 * thick * along;
    vec![
        from,
        from + shoulder - across,
        to - shoulder - across,
        to,
        to - shoulder + across,
        from + shoulder + across,
    ]
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::geometry::polygon;

    /// Strokes that touched would leave a plate with a facet on a facet.
    #[test]
    fn no_stroke_touches_another() {
        for (letter, _) in LETTERS.iter().chain(&[('.', ".")]) {
            let outlines = strokes(&format!("{letter}8"), Point::ORIGIN, 5.0);
            assert!(!outlines.is_empty());
            for (i, a) in outlines.iter().enumerate() {
                assert!(polygon::area(a) > 0.0, "{letter} runs clockwise");
                for b in outlines.iter().skip(i + 1) {
                    let apart = a.iter().all(|p| !polygon::contains(b, *p))
                        && b.iter().all(|p| !polygon::contains(a, *p));
                    let near = |p: &Point, q: &[Point]| {
                        let side = |k: usize| (q[k], q[(k + 1) % q.len()]);
                        (0..q.len())
                            .map(|k| {
                                let (from, to) = side(k);
                                let chord = to - from;
                                let share = ((*p - from).dot(chord) / chord.hypot2()).clamp(0.0, 1.0);
                                p.distance(from + share * chord)
                            })
                            .fold(f64::INFINITY, f64::min)
                    };
                    let gap =
                        a.iter().map(|p| near(p, b)).chain(b.iter().map(|p| near(p, a))).fold(9.0, f64::min);
                    assert!(apart && gap > 0.1, "{letter}: {gap}");
                }
            }
        }
        assert!(strokes("?! ", Point::ORIGIN, 5.0).is_empty());
    }
}

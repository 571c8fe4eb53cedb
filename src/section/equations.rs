//! A line over the chord given by expressions, piece by piece, and what it must hold to.

use std::ops::Range;
use std::sync::Arc;

use super::{Expression, Taylor};

/// One expression and the stretch of the chord over which it holds.
#[derive(Debug, Clone, PartialEq)]
pub struct Piece {
    /// Where it begins, a fraction of the chord.
    pub from: f64,
    /// Where it ends.
    pub to: f64,
    /// Its value, a fraction of the chord.
    pub value: Expression,
}

/// Pieces that cover the chord from 0 to 1, checked to be smooth but for the joints between them
/// and the corners of `abs`, `min` and `max` in them.
#[derive(Debug, Clone, PartialEq)]
pub struct Equations {
    pieces: Arc<[Piece]>,
    joints: Arc<[f64]>,
}

/// Why expressions make no mean line or no thickness.
#[derive(Debug, Clone, PartialEq, thiserror::Error)]
#[error("{message}")]
pub struct EquationError {
    /// Index of the piece that it concerns.
    pub piece: usize,
    /// Station, a fraction of the chord.
    pub x: f64,
    /// What is wrong, with the station in percent of chord.
    pub message: String,
    /// What would be right.
    pub help: &'static str,
}

/// Intervals of √x between which the expressions are looked at.
const INTERVALS: u32 = 2000;
/// The most pieces that a line has.
pub(super) const MOST_PIECES: usize = 50;
/// The most corners that are looked for in a piece; each takes some sixty evaluations.
const MOST_CORNERS: usize = 100;
/// Two ends nearer than this are one, in chords.
const SAME: f64 = 1e-9;
/// Greatest step between two pieces, in chords: a ten-thousandth of a millimetre on a metre.
const STEP: f64 = 1e-7;
/// Greatest turn of the mean line at a joint. Thickness is laid off across the line, and a turn
/// would tear the surface open by this share of it.
const TURN: f64 = 1e-5;
/// Greatest height and thickness, in chords, and greatest slope of a mean line.
const GREATEST: f64 = 0.5;
const STEEPEST: f64 = 10.0;
/// Least coefficient of √x in the half thickness: a nose radius of 5e-7 chord.
const SHARP: f64 = 1e-3;

const FRACTIONS: &str = "x and the result are fractions of the chord, not percent";
const DEFINED: &str = "change the expression, or divide the chord into pieces that keep clear of that place";

impl Equations {
    /// Joins pieces.
    ///
    /// # Errors
    /// When they do not cover the chord from 0 to 1 in order and without gaps, or there are more
    /// than fifty.
    pub fn new(pieces: Vec<Piece>) -> Result<Self, EquationError> {
        let fail = |piece, x, message: String| {
            Err(EquationError {
                piece,
                x,
                message,
                help: "the pieces go from 0 to 1, each from where the one before it ends",
            })
        };
        if pieces.len() > MOST_PIECES {
            return fail(
                MOST_PIECES,
                0.0,
                format!("there are {} pieces: {MOST_PIECES} at most", pieces.len()),
            );
        }
        let mut end = 0.0;
        for (i, piece) in pieces.iter().enumerate() {
            if !within(piece.from - end, SAME) {
                return fail(
                    i,
                    end,
                    format!("this piece begins at {}, and the one before it ends at {end}", piece.from),
                );
            }
            let covers = piece.to > piece.from + SAME;
            if !covers {
                return fail(
                    i,
                    end,
                    format!("this piece goes from {} to {}, and covers nothing", piece.from, piece.to),
                );
            }
            end = piece.to;
        }
        if !within(end - 1.0, SAME) {
            return fail(
                pieces.len().saturating_sub(1),
                end,
                format!("the pieces end at {end}, and the chord at 1"),
            );
        }
        let mut joints: Vec<f64> = pieces.iter().skip(1).map(|piece| piece.from).collect();
        for piece in &pieces {
            joints.extend(corners(piece));
        }
        joints.retain(|x| *x > SAME && *x < 1.0 - SAME);
        joints.sort_by(f64::total_cmp);
        joints.dedup_by(|a, b| (*a - *b).abs() < SAME);
        Ok(Self { pieces: pieces.into(), joints: joints.into() })
    }

    /// The pieces, from nose to trailing edge.
    #[must_use]
    pub fn pieces(&self) -> &[Piece] {
        &self.pieces
    }

    /// Where the line may have a corner, ascending and strictly inside (0, 1).
    #[must_use]
    pub fn joints(&self) -> &[f64] {
        &self.joints
    }

    /// Value and derivatives with respect to x, at `x` in [0, 1]; at a joint those of the rear.
    #[must_use]
    pub fn at(&self, x: f64) -> Taylor {
        self.of_piece(self.index(x), |value| value.at(x))
    }

    /// Value and derivatives with respect to `root` at x = `root`².
    #[must_use]
    pub fn at_root(&self, root: f64) -> Taylor {
        self.of_piece(self.index(root * root), |value| value.at_root(root))
    }

    fn index(&self, x: f64) -> usize {
        self.pieces.iter().position(|piece| x < piece.to).unwrap_or(self.pieces.len().saturating_sub(1))
    }

    fn of_piece(&self, index: usize, value: impl Fn(&Expression) -> Taylor) -> Taylor {
        self.pieces.get(index).map_or(Taylor::constant(f64::NAN), |piece| value(&piece.value))
    }

    /// Holds the line against what a mean line must be.
    pub(super) fn refuse_as_mean_line(&self) -> Result<(), EquationError> {
        // The curvature of the surface takes the third derivative too.
        self.refuse_rough(4, &|line, x| line.at(x), &|root| root * root)?;
        for i in 0..=INTERVALS {
            let x = station(i);
            let [y, slope, ..] = self.at(x).derivatives();
            if y.abs() > GREATEST {
                return self.fail(x, format!("the camber is {y:.4} of chord {}", place(x)), FRACTIONS);
            }
            if slope.abs() > STEEPEST {
                let message = format!("the mean line is too steep {}: its slope is {slope:.1}", place(x));
                return self.fail(x, message, "a slope of 10 is the most");
            }
        }
        for (x, what) in [(0.0, "nose"), (1.0, "trailing edge")] {
            let y = self.at(x).value();
            if y.abs() > SAME {
                let message = format!("the camber is {y:.3e} of chord at the {what}, and must be 0 there");
                return self.fail(x, message, "the chord line goes from the nose to the trailing edge");
            }
        }
        for &x in self.joints.iter() {
            let [before, after] = self.about(x).map(|side| side.derivatives()[1]);
            if (after - before).abs() > TURN {
                let message = format!(
                    "the mean line turns sharply {}: its slope goes from {before:.6} to {after:.6}",
                    place(x)
                );
                return self.fail(
                    x,
                    message,
                    "thickness is laid off across the mean line, which must be smooth",
                );
            }
        }
        Ok(())
    }

    /// Holds the line against what a full thickness must be.
    pub(super) fn refuse_as_thickness(&self) -> Result<(), EquationError> {
        self.refuse_as_surface()?;
        self.refuse_as_gap(&|root| self.at_root(root))
    }

    /// Holds the line against what the height of a surface must be: smooth but for its corners, and
    /// 0 at the nose.
    pub(super) fn refuse_as_surface(&self) -> Result<(), EquationError> {
        self.refuse_rough(3, &|line, root| line.at_root(root), &|root| root)?;
        let nose = self.at_root(0.0).value();
        if nose.abs() > SAME {
            let message = format!("the value is {nose:.3e} of chord at the nose, and must be 0 there");
            return self.fail(0.0, message, "a nose is blunt by a term in sqrt(x), not by a face");
        }
        Ok(())
    }

    /// Holds an upper surface and its `lower` one against each other.
    pub(super) fn refuse_as_pair(&self, lower: &Self) -> Result<(), EquationError> {
        self.refuse_as_gap(&|root| self.at_root(root) - lower.at_root(root))?;
        let [upper, lower] = [self, lower].map(|surface| surface.at_root(1.0).value());
        if upper < -SAME || lower > SAME {
            let message = format!(
                "the trailing edge goes from {lower:.6} to {upper:.6} of chord, and the chord line at 0 must end in it"
            );
            return self.fail(1.0, message, "the chord line goes from the nose to the trailing edge");
        }
        Ok(())
    }

    /// Holds a full thickness over the root of x against what it must be.
    fn refuse_as_gap(&self, gap: &dyn Fn(f64) -> Taylor) -> Result<(), EquationError> {
        let thickness = |i: u32| gap(f64::from(i) / f64::from(INTERVALS)).value();
        if (0..=INTERVALS).all(|i| thickness(i) == 0.0) {
            return self.fail(0.5, "the thickness is nought everywhere".to_owned(), FRACTIONS);
        }
        for i in 1..=INTERVALS {
            let (x, t) = (station(i), thickness(i));
            if t < -SAME || (t <= 0.0 && i < INTERVALS) {
                let word = if t < 0.0 { "negative" } else { "nought" };
                return self.fail(
                    x,
                    format!("the thickness is {word} {}: {t:.3e} of chord", place(x)),
                    FRACTIONS,
                );
            }
            if t > GREATEST {
                return self.fail(x, format!("the thickness is {t:.4} of chord {}", place(x)), FRACTIONS);
            }
        }
        if let Some(root) = waists(gap).into_iter().find(|root| gap(*root).value() <= SAME) {
            let x = root * root;
            return self.fail(x, format!("the thickness is nought {}", place(x)), FRACTIONS);
        }
        if gap(0.0).derivatives()[1] < 2.0 * SHARP {
            let help = "a round nose needs a term in sqrt(x); the nose radius is an eighth of the square of its coefficient";
            return self.fail(
                0.0,
                "the nose is sharp: the thickness has no term in sqrt(x)".to_owned(),
                help,
            );
        }
        Ok(())
    }

    /// Refuses what is not finite, steps at a joint, and what changes faster than its slope says.
    ///
    /// `line` gives the derivatives in a variable of its own, which `variable` makes of √x.
    fn refuse_rough(
        &self,
        orders: usize,
        line: &dyn Fn(&Self, f64) -> Taylor,
        variable: &dyn Fn(f64) -> f64,
    ) -> Result<(), EquationError> {
        let names = ["value", "slope", "curvature", "rate of curvature"];
        let root = |i: u32| f64::from(i) / f64::from(INTERVALS);
        for i in 0..=2 * INTERVALS {
            let r = f64::from(i) / f64::from(2 * INTERVALS);
            let found = line(self, variable(r)).derivatives();
            if let Some(order) = found.iter().take(orders).position(|v| !v.is_finite()) {
                let message = format!("the {} has no finite value {}", names[order], place(r * r));
                return self.fail(r * r, message, DEFINED);
            }
        }
        for &x in self.joints.iter() {
            let [before, after] = self.about(x).map(|side| side.value());
            if !within(after - before, STEP) {
                let message =
                    format!("there is a step {}, from {before:.7} to {after:.7} of chord", place(x));
                return self.fail(x, message, "neighbouring pieces must meet");
            }
        }
        // Between two stations the change must be what the slopes there and midway make of it.
        for i in 0..INTERVALS {
            let (from, to) = (variable(root(i)), variable(root(i + 1)));
            let (x_from, x_to) = (station(i), station(i + 1));
            if self.joints.iter().any(|x| *x >= x_from && *x <= x_to) {
                continue;
            }
            let [a, b, c] = [from, 0.5 * (from + to), to].map(|v| line(self, v).derivatives());
            let change = (to - from) * (a[1] + 4.0 * b[1] + c[1]) / 6.0;
            if !within(c[0] - a[0] - change, STEP) {
                let message = format!("the value jumps or swings too fast {}", place(x_from));
                return self.fail(x_from, message, DEFINED);
            }
        }
        Ok(())
    }

    /// Just before and just behind a joint.
    fn about(&self, x: f64) -> [Taylor; 2] {
        let (before, after) = (x - SAME, x + SAME);
        let front = self.of_piece(self.index(before), |value| {
            let mut series = value.at(before);
            // Brought to the joint along the slope, so that the nudge does not count as a step.
            series = series + Taylor::constant(SAME * series.derivatives()[1]);
            series
        });
        let rear = self.of_piece(self.index(after), |value| {
            let series = value.at(after);
            series + Taylor::constant(-SAME * series.derivatives()[1])
        });
        [front, rear]
    }

    fn fail(&self, x: f64, message: String, help: &'static str) -> Result<(), EquationError> {
        Err(EquationError { piece: self.index(x), x, message, help })
    }
}

/// Whether a difference is small; what is no number is not.
fn within(difference: f64, limit: f64) -> bool {
    difference.abs() <= limit
}

fn station(i: u32) -> f64 {
    let root = f64::from(i) / f64::from(INTERVALS);
    root * root
}

fn place(x: f64) -> String {
    format!("at {:.2} % of chord", 100.0 * x)
}

/// Roots of the stations at which a thickness has a least value between two others.
fn waists(thickness: &dyn Fn(f64) -> Taylor) -> Vec<f64> {
    let root = |i: u32| f64::from(i) / f64::from(INTERVALS);
    let rises = |r: f64| thickness(r).derivatives()[1] > 0.0;
    let turns = (1..INTERVALS).filter(|i| !rises(root(*i)) && rises(root(i + 1)));
    let waist = |i: u32| {
        let (mut low, mut high) = (root(i), root(i + 1));
        for _ in 0..60 {
            let middle = 0.5 * (low + high);
            if rises(middle) { high = middle } else { low = middle }
        }
        high
    };
    turns.map(waist).collect()
}

/// Where `abs`, `min` and `max` in a piece change over.
fn corners(piece: &Piece) -> Vec<f64> {
    let mut found = Vec::new();
    let mut before = piece.value.sides(piece.from);
    if before.is_empty() {
        return found;
    }
    for i in 1..=INTERVALS {
        let share = |i: u32| piece.from + (piece.to - piece.from) * f64::from(i) / f64::from(INTERVALS);
        let here = piece.value.sides(share(i));
        for k in (0..here.len()).filter(|k| before.get(*k) != here.get(*k)) {
            let mut between: Range<f64> = share(i - 1)..share(i);
            for _ in 0..60 {
                let middle = 0.5 * (between.start + between.end);
                if piece.value.sides(middle).get(k) == before.get(k) {
                    between.start = middle;
                } else {
                    between.end = middle;
                }
            }
            found.push(between.end);
            // More than these are no design; the check of the slopes refuses what is left out.
            if found.len() >= MOST_CORNERS {
                return found;
            }
        }
        before = here;
    }
    found
}

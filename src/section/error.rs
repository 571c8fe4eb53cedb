//! What can be wrong with a section, in the user's words.

/// Why a section cannot be made.
#[derive(Debug, Clone, PartialEq, thiserror::Error)]
pub enum SectionError {
    /// The text is not a designation that is known.
    #[error(
        "'{text}' is not a section this program knows: write a NACA designation of four digits (\"NACA 4412\"), five (\"NACA 23012\"), either with a modified thickness (\"NACA 0012-34\"), or of the 16-series (\"NACA 16-209\")"
    )]
    Unknown {
        /// What was given.
        text: String,
    },
    /// Digits without the family's name.
    #[error("'{digits}' lacks the name of its family: write \"NACA {digits}\"")]
    NoFamily {
        /// What was given.
        digits: String,
    },
    /// The number of digits fits no family.
    #[error(
        "'{text}' has {count} digits: a NACA designation has four (\"NACA 4412\") or five (\"NACA 23012\")"
    )]
    DigitCount {
        /// What was given.
        text: String,
        /// How many digits it has.
        count: usize,
    },
    /// The last two digits ask for no thickness, or for more than a foil can have.
    #[error(
        "the last two digits of '{text}' ask for a thickness of {percent} % of chord: it must lie from 1 % to 40 %"
    )]
    Thickness {
        /// What was given.
        text: String,
        /// Percent of chord.
        percent: u32,
    },
    /// The two digits after the dash name no modified thickness form.
    #[error(
        "'-{modifier}' in '{text}' names no modified thickness: write two digits, the first 1 to 9 for the nose (6 is the usual one), the second 2 to 6 for the position of the greatest thickness in tenths of the chord"
    )]
    Modifier {
        /// What was given.
        text: String,
        /// What stands after the dash.
        modifier: String,
    },
    /// A 16-series designation that is none.
    #[error(
        "'{text}' is no 16-series section: write three digits after the dash, design lift in tenths and thickness in percent (\"NACA 16-209\"), and if wanted the mean line (\"NACA 16-209, a = 0.8\", a from 0.02 to 1, or 0)"
    )]
    Series16 {
        /// What was given.
        text: String,
    },
    /// Camber without a position, or a position without camber.
    #[error(
        "in '{text}' the first digit (camber) is {camber} and the second (its position) is {position}: both are zero for a symmetric section, neither is otherwise"
    )]
    CamberPosition {
        /// What was given.
        text: String,
        /// First digit.
        camber: u8,
        /// Second digit.
        position: u8,
    },
    /// A five-digit section without design lift.
    #[error(
        "the first digit of '{text}' (design lift) is 0: for a symmetric section write four digits, \"NACA 00{thickness:02}\""
    )]
    DesignLift {
        /// What was given.
        text: String,
        /// Its thickness digits.
        thickness: u32,
    },
    /// The third of five digits is neither plain nor reflexed.
    #[error("the third digit of '{text}' is {digit}: it is 0 for a plain or 1 for a reflexed mean line")]
    FiveDigitKind {
        /// What was given.
        text: String,
        /// Third digit.
        digit: u8,
    },
    /// There is no five-digit mean line with its highest point there.
    #[error(
        "no {} five-digit mean line has its highest point at {percent:.4} % of chord: it lies from {least} % to 42 % (the digits of a designation count twentieths)",
        if *.reflexed { "reflexed" } else { "plain" }
    )]
    FiveDigitPosition {
        /// What was asked, percent of chord.
        percent: f64,
        /// Whether the reflexed lines were asked for.
        reflexed: bool,
        /// Least position, percent of chord.
        least: f64,
    },
    /// The mean line bends so sharply that a surface offset from it folds over.
    #[error(
        "{name}: the mean line bends too sharply for this thickness, and the {side} surface folds over itself near {percent:.1} % of chord; take less thickness, less camber, or camber further aft"
    )]
    Folds {
        /// Designation.
        name: String,
        /// `upper` or `lower`.
        side: &'static str,
        /// Where along the chord.
        percent: f64,
    },
    /// The two surfaces meet between nose and trailing edge.
    #[error(
        "{name}: the surfaces cross near {percent:.1} % of chord; take less camber, or more thickness there"
    )]
    SurfacesCross {
        /// Designation.
        name: String,
        /// Where along the chord.
        percent: f64,
    },
    /// Something asked of a section that it cannot be brought to.
    #[error("{name} cannot be worked: {why}")]
    Work {
        /// Designation.
        name: String,
        /// What is in the way.
        why: String,
    },
    /// A flap that cannot be.
    #[error("the flap of {name} cannot be: {why}")]
    Flap {
        /// Designation.
        name: String,
        /// What is in the way.
        why: String,
    },
    /// A share of a blend that is none.
    #[error("a blend cannot take {weight} of its second section: from 0 to 1")]
    BlendWeight {
        /// What was asked.
        weight: f64,
    },
}

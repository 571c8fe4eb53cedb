//! What can be wrong with what is asked of a foil in the water.

/// Why there is no load to show.
#[derive(Debug, Clone, PartialEq, thiserror::Error)]
pub enum LoadingError {
    /// Too few strips to mean anything, or more than are worth solving.
    #[error("{strips} strips along the span: from {least} to {most} can be taken")]
    StripCount {
        /// How many were asked.
        strips: usize,
        /// Fewest that are accepted.
        least: usize,
        /// Most that are accepted.
        most: usize,
    },
    /// A quantity that is no number, or outside what makes sense.
    #[error("{what} is {value}: it must be {wanted}")]
    Quantity {
        /// What it is.
        what: &'static str,
        /// What was given.
        value: f64,
        /// What would do.
        wanted: &'static str,
    },
    /// The foil, or part of it, is not under water.
    #[error(
        "the foil comes out of the water: its highest place lies {rise:.1} mm above the root, which is only {depth:.1} mm deep"
    )]
    OutOfTheWater {
        /// Highest quarter chord above the root's, mm.
        rise: f64,
        /// Depth of the root's quarter chord, mm.
        depth: f64,
    },
    /// A quarter-chord line that leans more than the method holds for.
    #[error(
        "near {at:.1} mm from the root the quarter-chord line {leans} by {degrees:.1}°: the lifting line holds up to {most:.0}°"
    )]
    Leans {
        /// Where, mm from the root.
        at: f64,
        /// `is swept` or `rises`.
        leans: &'static str,
        /// By how much, degrees.
        degrees: f64,
        /// The limit, degrees.
        most: f64,
    },
    /// A flap whose ends are not on the foil.
    #[error(
        "the flap runs from {from} mm to {to} mm: it must lie between 0 mm and {reach} mm and end after it starts"
    )]
    FlapSpan {
        /// Inner end, mm.
        from: f64,
        /// Outer end, mm.
        to: f64,
        /// Root to tip, mm.
        reach: f64,
    },
    /// A table of a section that is none.
    #[error("the lift curve of a section cannot be used: {why}")]
    Table {
        /// What is wrong.
        why: String,
    },
    /// The strips found no load that agrees with their lift curves.
    #[error(
        "at an incidence of {degrees:.2}° the load along the span does not settle (the strips disagree by {residual:.1e} of their chord): the sections are probably far beyond their greatest lift"
    )]
    NotSettled {
        /// Incidence, degrees.
        degrees: f64,
        /// Largest disagreement of a strip's circulation, in chords times speed.
        residual: f64,
    },
    /// No setting in the range carries that much.
    #[error(
        "the foil cannot carry {load:.0} N at {speed:.2} m/s: the most it could carry is {most:.0} N, at {degrees:.1}° of {control}"
    )]
    TooMuch {
        /// What was asked, N.
        load: f64,
        /// Speed, m/s.
        speed: f64,
        /// The most it could carry, N.
        most: f64,
        /// Where it carries that, degrees.
        degrees: f64,
        /// `incidence` or `flap`.
        control: &'static str,
    },
    /// Even at the low end of the range the foil lifts more.
    #[error(
        "the foil lifts at least {least:.0} N at {speed:.2} m/s, more than the {load:.0} N asked: {degrees:.1}° of {control} is as low as was allowed"
    )]
    TooLittle {
        /// What was asked, N.
        load: f64,
        /// Speed, m/s.
        speed: f64,
        /// The least it lifts, N.
        least: f64,
        /// Where, degrees.
        degrees: f64,
        /// `incidence` or `flap`.
        control: &'static str,
    },
    /// Two foils at one place share nothing.
    #[error("both foils lie at {at} mm: they must lie apart for the boat to balance")]
    SamePlace {
        /// Where, mm.
        at: f64,
    },
    /// A foil that would have to pull down.
    #[error(
        "the {foil} foil would have to pull down with {force:.0} N to balance the boat: move weight towards it, move the foils, or lower the sail's drive"
    )]
    PullsDown {
        /// `forward` or `after`.
        foil: &'static str,
        /// How hard, N, positive.
        force: f64,
    },
}

/// `value` when it is finite and `holds`.
pub(super) fn checked(
    what: &'static str,
    value: f64,
    wanted: &'static str,
    holds: impl Fn(f64) -> bool,
) -> Result<f64, LoadingError> {
    if value.is_finite() && holds(value) {
        Ok(value)
    } else {
        Err(LoadingError::Quantity { what, value, wanted })
    }
}

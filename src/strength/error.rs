//! Why the strength of a part cannot be worked out.

/// Why the strength of a part cannot be worked out.
#[derive(Debug, Clone, PartialEq, thiserror::Error)]
pub enum StrengthError {
    /// A material value that cannot be.
    #[error("material \"{material}\": {what} is {value}, and {must}")]
    Material {
        /// Name of the material.
        material: String,
        /// Which value.
        what: &'static str,
        /// What was given.
        value: f64,
        /// What it must be.
        must: &'static str,
    },
    /// A skin without plies, or with one that has no thickness.
    #[error("a skin needs at least one ply, each with a thickness above zero and an angle")]
    Plies,
    /// Plies whose stiffness does not come out as a number.
    #[error("the plies of a skin give no stiffness: look at their material values")]
    Singular,
    /// An outline without an inside.
    #[error("at {at:.1} mm from the root the outline encloses no area")]
    Outline {
        /// Distance from the root, mm.
        at: f64,
    },
    /// A section that has no bending or torsional stiffness.
    #[error("at {at:.1} mm from the root the section has no {what} stiffness")]
    NoStiffness {
        /// Distance from the root, mm.
        at: f64,
        /// Bending or torsional.
        what: &'static str,
    },
    /// Stations that are too few or not in order.
    #[error("stations go from the root at 0 mm to the tip in rising order, at least two of them")]
    Stations,
    /// A load that is no number or does not lie on the part.
    #[error(
        "load case \"{case}\": the load at {at} mm is no number, out of order or not between 0 mm and {reach} mm"
    )]
    Load {
        /// Name of the case.
        case: String,
        /// Where the load was put, mm.
        at: f64,
        /// Root to tip, mm.
        reach: f64,
    },
    /// A load factor that is not positive, or a case without a load.
    #[error("load case \"{case}\" needs a load and a load factor above zero")]
    EmptyCase {
        /// Name of the case.
        case: String,
    },
    /// No load case to judge by.
    #[error("without a load case there is nothing to judge by")]
    NoCases,
    /// What is asked is not a positive number.
    #[error("{what} must be a number above zero; it is {value}")]
    Asked {
        /// Which.
        what: &'static str,
        /// What was given.
        value: f64,
    },
    /// More plies of that kind do not help.
    #[error(
        "up to {tried} more plies do not bring the reserve to {asked}: the best is {best:.2}, at {at:.0} mm ({what})"
    )]
    NoCure {
        /// Most plies that were tried.
        tried: usize,
        /// Reserve that was asked.
        asked: f64,
        /// Best least reserve that was found.
        best: f64,
        /// Where it is, mm from the root.
        at: f64,
        /// In what it fails.
        what: &'static str,
    },
}

//! The functions of one argument.

use super::Taylor;

/// A function of one argument.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Function {
    Sqrt,
    Exp,
    Ln,
    Log10,
    Sin,
    Cos,
    Tan,
    Asin,
    Acos,
    Atan,
    Sinh,
    Cosh,
    Tanh,
    Abs,
}

use Function::{Abs, Acos, Asin, Atan, Cos, Cosh, Exp, Ln, Log10, Sin, Sinh, Sqrt, Tan, Tanh};

const NAMES: [(&str, Function); 14] = [
    ("sqrt", Sqrt),
    ("exp", Exp),
    ("ln", Ln),
    ("log10", Log10),
    ("sin", Sin),
    ("cos", Cos),
    ("tan", Tan),
    ("asin", Asin),
    ("acos", Acos),
    ("atan", Atan),
    ("sinh", Sinh),
    ("cosh", Cosh),
    ("tanh", Tanh),
    ("abs", Abs),
];

/// Every name that an expression knows by itself, but for the constants of its file.
pub(in crate::section) fn known_names() -> impl Iterator<Item = &'static str> {
    NAMES.into_iter().map(|(name, _)| name).chain(["min", "max", "x", "pi", "e"])
}

impl Function {
    pub(super) fn named(name: &str) -> Option<Self> {
        NAMES.into_iter().find(|(known, _)| *known == name).map(|(_, function)| function)
    }

    /// The function of a series: its value and first three derivatives at the argument, chained.
    pub(super) fn of(self, argument: Taylor) -> Taylor {
        let a = argument.value();
        let derivatives = match self {
            Sqrt => return argument.to_constant(0.5),
            Abs => return if argument.is_negative() { -argument } else { argument },
            Exp => [a.exp(); 4],
            Ln => [a.ln(), 1.0 / a, -1.0 / (a * a), 2.0 / (a * a * a)],
            Log10 => {
                let unit = std::f64::consts::LOG10_E;
                [a.log10(), unit / a, -unit / (a * a), 2.0 * unit / (a * a * a)]
            }
            Sin => [a.sin(), a.cos(), -a.sin(), -a.cos()],
            Cos => [a.cos(), -a.sin(), -a.cos(), a.sin()],
            Tan => {
                let t = a.tan();
                let s = 1.0 + t * t;
                [t, s, 2.0 * t * s, s * (2.0 + 6.0 * t * t)]
            }
            Asin => arc_sine(a),
            Acos => {
                let [_, first, second, third] = arc_sine(a);
                [a.acos(), -first, -second, -third]
            }
            Atan => {
                let g = 1.0 / (1.0 + a * a);
                [a.atan(), g, -2.0 * a * g * g, (6.0 * a * a - 2.0) * g * g * g]
            }
            Sinh => [a.sinh(), a.cosh(), a.sinh(), a.cosh()],
            Cosh => [a.cosh(), a.sinh(), a.cosh(), a.sinh()],
            Tanh => {
                let t = a.tanh();
                let s = 1.0 - t * t;
                [t, s, -2.0 * t * s, s * (6.0 * t * t - 2.0)]
            }
        };
        argument.chained(derivatives)
    }
}

fn arc_sine(a: f64) -> [f64; 4] {
    let q = 1.0 / (1.0 - a * a);
    let first = q.sqrt();
    [a.asin(), first, a * q * first, (1.0 + 2.0 * a * a) * q * q * first]
}

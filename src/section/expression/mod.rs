//! Expressions in x, such as `0.6*sqrt(x) - 0.25*x^2`, evaluated with exact derivatives.
//!
//! `token` cuts the text up, `parse` orders it into steps for a small stack machine, `taylor` is
//! the arithmetic of that machine. The steps run without recursion, so that no text, however
//! nested, can exhaust the stack.

mod error;
mod function;
mod parse;
mod taylor;
mod token;

use std::collections::BTreeMap;

pub use error::ExpressionError;
pub use taylor::Taylor;

pub(super) use function::known_names;

use function::Function;

/// The longest text of an expression, in bytes.
pub const LONGEST: usize = 2000;
/// How deeply parentheses, signs and powers may be nested.
pub const DEEPEST: usize = 100;

/// A compiled expression in the variable x.
///
/// ```
/// use std::collections::BTreeMap;
/// use plankform::section::Expression;
///
/// let parabola = Expression::parse("4*m*x*(1 - x)", &BTreeMap::from([("m".to_owned(), 0.03)]))?;
/// let [y, slope, second, third] = parabola.at(0.25).derivatives();
/// assert!((y - 0.0225).abs() < 1e-15 && (slope - 0.06).abs() < 1e-15);
/// assert!((second + 0.24).abs() < 1e-15 && third == 0.0);
/// # Ok::<(), plankform::section::ExpressionError>(())
/// ```
#[derive(Debug, Clone, PartialEq)]
pub struct Expression {
    text: String,
    steps: Vec<Step>,
}

/// One step of the stack machine.
#[derive(Debug, Clone, Copy, PartialEq)]
enum Step {
    Number(f64),
    X,
    /// x to a constant power: in r with x = r² this is r to twice the power, and stays smooth
    /// through the nose for √x and its odd powers.
    PowerOfX(f64),
    Negate,
    Add,
    Subtract,
    Multiply,
    Divide,
    Power,
    Call(Function),
    Min,
    Max,
}

/// What x is when steps run.
#[derive(Clone, Copy)]
enum Seed {
    X(f64),
    Root(f64),
}

impl Expression {
    /// Reads an expression. `constants` are names that may stand in it besides x, `pi`, `e` and
    /// the functions, which go before a constant of the same name.
    ///
    /// # Errors
    /// What is wrong, with the bytes of the text that it concerns; texts longer than [`LONGEST`]
    /// bytes or nested deeper than [`DEEPEST`].
    pub fn parse(text: &str, constants: &BTreeMap<String, f64>) -> Result<Self, ExpressionError> {
        Ok(Self { text: text.to_owned(), steps: parse::steps(text, constants)? })
    }

    /// The text it was read from.
    #[must_use]
    pub fn text(&self) -> &str {
        &self.text
    }

    /// The value of an expression in which x does not occur.
    #[must_use]
    pub fn constant(&self) -> Option<f64> {
        let varies = |step: &Step| matches!(step, Step::X | Step::PowerOfX(_));
        (!self.steps.iter().any(varies)).then(|| self.at(0.0).value())
    }

    /// Value and derivatives with respect to x. Where the expression is not defined, or a
    /// derivative has no finite value, that entry is no finite number. At a corner of `abs`, `min`
    /// or `max` they are those on the side of greater x.
    #[must_use]
    pub fn at(&self, x: f64) -> Taylor {
        self.run(Seed::X(x), &mut |_| ())
    }

    /// Value and derivatives at x = `root`², with respect to `root`, which must not be negative.
    /// √x is `root` itself there, and has finite derivatives at the nose.
    #[must_use]
    pub fn at_root(&self, root: f64) -> Taylor {
        self.run(Seed::Root(root), &mut |_| ())
    }

    /// On which side of its corner each `abs`, `min` and `max` is at `x`.
    pub(super) fn sides(&self, x: f64) -> Vec<bool> {
        let mut sides = Vec::new();
        self.run(Seed::X(x), &mut |side| sides.push(side));
        sides
    }

    fn run(&self, seed: Seed, note: &mut dyn FnMut(bool)) -> Taylor {
        let mut stack: Vec<Taylor> = Vec::with_capacity(8);
        for &step in &self.steps {
            let top = match step {
                Step::Number(value) => Taylor::constant(value),
                Step::X => match seed {
                    Seed::X(x) => Taylor::variable(x),
                    Seed::Root(r) => Taylor::from_coefficients([r * r, 2.0 * r, 1.0, 0.0]),
                },
                Step::PowerOfX(power) => match seed {
                    Seed::X(x) => Taylor::variable(x).to_constant(power),
                    Seed::Root(r) => Taylor::variable(r).to_constant(2.0 * power),
                },
                Step::Negate => -pop(&mut stack),
                Step::Call(function) => {
                    let argument = pop(&mut stack);
                    if function == Function::Abs {
                        note(argument.is_negative());
                    }
                    function.of(argument)
                }
                _ => {
                    let (right, left) = (pop(&mut stack), pop(&mut stack));
                    match step {
                        Step::Add => left + right,
                        Step::Subtract => left - right,
                        Step::Multiply => left * right,
                        Step::Divide => left / right,
                        Step::Power => left.to_power(right),
                        _ => {
                            let less = (left - right).is_negative();
                            note(less);
                            if less == (step == Step::Min) { left } else { right }
                        }
                    }
                }
            };
            stack.push(top);
        }
        pop(&mut stack)
    }
}

/// The parser leaves no step without its operands; if it did, the answer would be no number.
fn pop(stack: &mut Vec<Taylor>) -> Taylor {
    stack.pop().unwrap_or(Taylor::constant(f64::NAN))
}

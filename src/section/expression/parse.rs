//! From tokens to the steps of the stack machine, by the order in which people read arithmetic:
//! `^` first and from the right, then a sign in front, then `*` and `/`, then `+` and `-`.

use std::collections::BTreeMap;
use std::ops::Range;

use super::function::{Function, known_names};
use super::token::{Token, tokens};
use super::{DEEPEST, ExpressionError, LONGEST, Step};
use crate::units::{clipped, nearest};

/// The steps of an expression, or why there are none. Each token gives two steps at most, and the
/// length of the text bounds the tokens.
pub(super) fn steps(text: &str, constants: &BTreeMap<String, f64>) -> Result<Vec<Step>, ExpressionError> {
    if text.len() > LONGEST {
        let message = format!("the expression has {} characters: {LONGEST} at most are read", text.len());
        return Err(ExpressionError::new(0..0, message)
            .help("give its numbers names under [constants], or divide it into pieces"));
    }
    let tokens = tokens(text)?;
    let mut parser = Parser { tokens, at: 0, end: text.len(), depth: 0, constants, steps: Vec::new() };
    if parser.tokens.is_empty() {
        return Err(ExpressionError::new(0..text.len(), "the expression is empty"));
    }
    parser.sum()?;
    match parser.peek() {
        None => Ok(parser.steps),
        Some(_) => Err(parser.left_over()),
    }
}

struct Parser<'a> {
    tokens: Vec<(Token<'a>, Range<usize>)>,
    at: usize,
    end: usize,
    depth: usize,
    constants: &'a BTreeMap<String, f64>,
    steps: Vec<Step>,
}

impl<'a> Parser<'a> {
    fn peek(&self) -> Option<Token<'a>> {
        self.tokens.get(self.at).map(|(token, _)| *token)
    }

    fn place(&self) -> Range<usize> {
        self.tokens.get(self.at).map_or(self.end..self.end, |(_, span)| span.clone())
    }

    fn take(&mut self, sign: char) -> bool {
        let here = self.peek() == Some(Token::Sign(sign));
        self.at += usize::from(here);
        here
    }

    /// Goes one level deeper, if that is not too deep.
    fn deeper(&mut self) -> Result<(), ExpressionError> {
        self.depth += 1;
        if self.depth > DEEPEST {
            let message = format!("the expression is nested deeper than {DEEPEST} levels");
            return Err(ExpressionError::new(self.place(), message));
        }
        Ok(())
    }

    fn sum(&mut self) -> Result<(), ExpressionError> {
        self.product()?;
        loop {
            let step = match self.peek() {
                Some(Token::Sign('+')) => Step::Add,
                Some(Token::Sign('-')) => Step::Subtract,
                _ => return Ok(()),
            };
            self.at += 1;
            self.product()?;
            self.steps.push(step);
        }
    }

    fn product(&mut self) -> Result<(), ExpressionError> {
        self.signed()?;
        loop {
            let step = match self.peek() {
                Some(Token::Sign('*')) => Step::Multiply,
                Some(Token::Sign('/')) => Step::Divide,
                _ => return Ok(()),
            };
            self.at += 1;
            self.signed()?;
            self.steps.push(step);
        }
    }

    fn signed(&mut self) -> Result<(), ExpressionError> {
        self.deeper()?;
        if self.take('-') {
            self.signed()?;
            self.steps.push(Step::Negate);
        } else if self.take('+') {
            self.signed()?;
        } else {
            self.power()?;
        }
        self.depth -= 1;
        Ok(())
    }

    fn power(&mut self) -> Result<(), ExpressionError> {
        let base = self.steps.len();
        self.value()?;
        if self.take('^') {
            let exponent = self.steps.len();
            self.signed()?;
            match (&self.steps[base..exponent], self.constant_from(exponent)) {
                ([Step::X], Some(power)) => {
                    self.steps.truncate(base);
                    self.steps.push(Step::PowerOfX(power));
                }
                _ => self.steps.push(Step::Power),
            }
        }
        Ok(())
    }

    /// The value of the steps from `start` on when x does not occur in them.
    fn constant_from(&self, start: usize) -> Option<f64> {
        let steps = self.steps.get(start..)?.to_vec();
        super::Expression { text: String::new(), steps }.constant()
    }

    fn value(&mut self) -> Result<(), ExpressionError> {
        let place = self.place();
        let Some(token) = self.peek() else {
            return Err(ExpressionError::new(
                place,
                "the expression breaks off: a number or a name is missing",
            ));
        };
        match token {
            Token::Number(value) => {
                self.at += 1;
                self.steps.push(Step::Number(value));
                Ok(())
            }
            Token::Name(name) => {
                self.at += 1;
                self.name(name, place)
            }
            Token::Sign('(') => {
                self.at += 1;
                self.sum()?;
                self.close(place)
            }
            Token::Sign(sign) => {
                Err(ExpressionError::new(place, format!("a number or a name is missing before '{sign}'")))
            }
        }
    }

    fn name(&mut self, name: &str, place: Range<usize>) -> Result<(), ExpressionError> {
        let two = match name {
            "min" => Some(Step::Min),
            "max" => Some(Step::Max),
            _ => None,
        };
        let function = Function::named(name);
        if two.is_some() || function.is_some() {
            return self.call(name, function, two, place);
        }
        let step = match name {
            "x" => Step::X,
            "pi" => Step::Number(std::f64::consts::PI),
            "e" => Step::Number(std::f64::consts::E),
            _ => match self.constants.get(name) {
                Some(value) => Step::Number(*value),
                None => return Err(self.unknown(name, place)),
            },
        };
        self.steps.push(step);
        Ok(())
    }

    fn unknown(&self, name: &str, place: Range<usize>) -> ExpressionError {
        let error = ExpressionError::new(place, format!("'{}' is not a name known here", clipped(name)));
        if let Some(near) = self.constants.keys().find(|key| key.eq_ignore_ascii_case(name)) {
            return error.help(format!("did you mean {near}?"));
        }
        match nearest(name, known_names()) {
            Some(near) => error.help(format!("did you mean {near}?")),
            None => error.help("the variable is x; give other names a value under [constants]"),
        }
    }

    fn call(
        &mut self,
        name: &str,
        function: Option<Function>,
        two: Option<Step>,
        place: Range<usize>,
    ) -> Result<(), ExpressionError> {
        let open = self.place();
        if !self.take('(') {
            return Err(ExpressionError::new(
                place,
                format!("{name} is a function, and nothing follows it in parentheses"),
            )
            .help(format!("write {name}({})", if two.is_some() { "…, …" } else { "…" })));
        }
        let start = self.steps.len();
        self.sum()?;
        if let Some(step) = two {
            if !self.take(',') {
                return Err(ExpressionError::new(self.place(), format!("{name} takes two arguments"))
                    .help(format!("write {name}(…, …)")));
            }
            self.sum()?;
            self.steps.push(step);
        } else if let Some(function) = function {
            if function == Function::Sqrt && self.steps[start..] == [Step::X] {
                self.steps.truncate(start);
                self.steps.push(Step::PowerOfX(0.5));
            } else {
                self.steps.push(Step::Call(function));
            }
        }
        self.close(open)
    }

    fn close(&mut self, open: Range<usize>) -> Result<(), ExpressionError> {
        if self.take(')') {
            return Ok(());
        }
        match self.peek() {
            None => Err(ExpressionError::new(open, "this parenthesis is not closed")),
            Some(_) => Err(self.left_over()),
        }
    }

    /// What is wrong with a token that stands where an operator should.
    fn left_over(&self) -> ExpressionError {
        let place = self.place();
        match self.peek() {
            Some(Token::Sign(')')) => ExpressionError::new(place, "this parenthesis closes nothing"),
            Some(Token::Sign(',')) => {
                ExpressionError::new(place, "a comma stands only between the two arguments of min and max")
                    .help("decimals take a point: 0.5")
            }
            _ => ExpressionError::new(place, "an operator is missing before this")
                .help("multiplication is always written out: 2*x, x*(1 - x)"),
        }
    }
}

//! Text to expression: a list of steps in the order of evaluation, each with its place in the text.
//!
//! ```text
//! sum      = product (("+" | "-") product)*
//! product  = signed (("*" | "/") (signed | units))*
//! signed   = ("-" | "+") signed | power
//! power    = primary ["^" integer]
//! primary  = number [units] | parameter | function "(" sum ("," sum)* ")" | "(" sum ")" [units]
//! number   = digits | integer integer "/" integer | number "/" number      the last only before units
//! units    = unit ["^" integer] ((" " | "*" | "/") unit ["^" integer])*
//! ```
//!
//! `5/16 in` is the fraction 5/16 in inches, `1 1/2 in` a mixed number; where a fraction with a unit stands
//! behind a division, and where units stand side by side behind a division, the text is refused as ambiguous.
//! Evaluation is in `evaluate`; steps keep both stages free of recursion except for brackets, which are limited.

use super::faults::Span;
use super::lexer::{ExpressionFault, Token, tokens};
use super::nearest::{listed, suggestion};
use super::quantity::{Quantity, split_unit, unit, unit_names};

/// Deepest nesting of brackets, functions and signs.
const DEEPEST: usize = 40;

/// Greatest exponent that can be written.
const GREATEST_POWER: i32 = 9;

/// The functions of expressions.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Function {
    /// Square root.
    Sqrt,
    /// Absolute value.
    Abs,
    /// Least of several.
    Min,
    /// Greatest of several.
    Max,
    /// Sine.
    Sin,
    /// Cosine.
    Cos,
    /// Tangent.
    Tan,
}

/// Names of the functions.
pub(super) const FUNCTIONS: [(&str, Function); 7] = [
    ("sqrt", Function::Sqrt),
    ("abs", Function::Abs),
    ("min", Function::Min),
    ("max", Function::Max),
    ("sin", Function::Sin),
    ("cos", Function::Cos),
    ("tan", Function::Tan),
];

/// What one step does with the stack of values.
#[derive(Debug, Clone, PartialEq)]
pub(super) enum Action {
    /// Pushes a quantity.
    Push(Quantity),
    /// Pushes the value of a parameter.
    Parameter(String),
    /// Adds the two on top.
    Add,
    /// Subtracts the top from the one below.
    Subtract,
    /// Multiplies the two on top.
    Multiply,
    /// Divides the one below by the top.
    Divide,
    /// Changes the sign of the top.
    Negate,
    /// Raises the top to a power.
    Power(i32),
    /// Calls a function on this many values.
    Call(Function, usize),
}

/// A step and the part of the text it computes.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Step {
    /// What it does.
    pub(super) action: Action,
    /// The text of its result.
    pub(super) span: Span,
}

/// Parses a text.
///
/// # Errors
/// The first thing that cannot be understood.
pub(super) fn parse(text: &str) -> Result<Vec<Step>, ExpressionFault> {
    let tokens = tokens(text)?;
    if tokens.is_empty() {
        return Err(ExpressionFault::new(0..text.len(), "the text is empty")
            .accepted("a number with its unit or an expression"));
    }
    let mut parser = Parser { text, tokens, next: 0, depth: 0, steps: Vec::new() };
    parser.sum()?;
    match parser.peek() {
        None => Ok(parser.steps),
        Some(token) => Err(parser.unexpected(token)),
    }
}

struct Parser<'t> {
    text: &'t str,
    tokens: Vec<(Token<'t>, Span)>,
    next: usize,
    depth: usize,
    steps: Vec<Step>,
}

type Parsed<T> = Result<T, ExpressionFault>;

impl<'t> Parser<'t> {
    fn peek_at(&self, ahead: usize) -> Option<Token<'t>> {
        self.tokens.get(self.next + ahead).map(|(token, _)| *token)
    }

    fn peek(&self) -> Option<Token<'t>> {
        self.peek_at(0)
    }

    /// Place of the next token, or of the end of the text.
    fn here(&self) -> Span {
        self.tokens.get(self.next).map_or(self.text.len()..self.text.len(), |(_, span)| span.clone())
    }

    fn end_before(&self) -> usize {
        self.next.checked_sub(1).and_then(|last| self.tokens.get(last)).map_or(0, |(_, span)| span.end)
    }

    fn eat(&mut self, sign: char) -> bool {
        let eaten = self.peek() == Some(Token::Sign(sign));
        self.next += usize::from(eaten);
        eaten
    }

    fn push(&mut self, action: Action, start: usize) {
        let span = start..self.end_before();
        self.steps.push(Step { action, span });
    }

    fn deeper(&mut self) -> Parsed<()> {
        self.depth += 1;
        if self.depth > DEEPEST {
            return Err(ExpressionFault::new(self.here(), "the expression is nested too deeply")
                .accepted(format!("at most {DEEPEST} levels of brackets and signs")));
        }
        Ok(())
    }

    fn unexpected(&self, token: Token<'_>) -> ExpressionFault {
        let span = self.here();
        match token {
            Token::Sign(',') => ExpressionFault::new(span, "`,` outside the brackets of a function")
                .hint("write the decimal point as `.`"),
            Token::Sign(sign) => ExpressionFault::new(span, format!("`{sign}` is not expected here"))
                .accepted("a number with its unit, a parameter, a function or `(`"),
            Token::Number(..) | Token::Name(_) => {
                let shown = &self.text[span.clone()];
                ExpressionFault::new(span, format!("an operator is missing before `{shown}`"))
                    .accepted("`+`, `-`, `*` or `/`")
            }
        }
    }

    fn ended(&self) -> ExpressionFault {
        ExpressionFault::new(self.here(), "the expression ends too early")
            .accepted("a number with its unit, a parameter, a function or `(`")
    }

    fn sum(&mut self) -> Parsed<()> {
        let start = self.here().start;
        self.product()?;
        loop {
            let action = match self.peek() {
                Some(Token::Sign('+')) => Action::Add,
                Some(Token::Sign('-')) => Action::Subtract,
                _ => return Ok(()),
            };
            self.next += 1;
            self.product()?;
            self.push(action, start);
        }
    }

    fn product(&mut self) -> Parsed<()> {
        let start = self.here().start;
        self.signed()?;
        loop {
            let action = match self.peek() {
                Some(Token::Sign('*')) => Action::Multiply,
                Some(Token::Sign('/')) => Action::Divide,
                _ => return Ok(()),
            };
            self.next += 1;
            if action == Action::Divide && self.fraction_with_unit() {
                let message = format!("`{}` can be read in two ways", &self.text[start..]);
                return Err(ExpressionFault::new(self.here(), message)
                    .hint("put the fraction and its unit in brackets"));
            }
            match self.peek() {
                Some(Token::Name(name)) if unit(name).is_some() => {
                    let unit_start = self.here().start;
                    let units = self.units()?;
                    self.push(Action::Push(units), unit_start);
                }
                _ => self.signed()?,
            }
            self.push(action, start);
        }
    }

    fn signed(&mut self) -> Parsed<()> {
        let start = self.here().start;
        let negative = self.peek() == Some(Token::Sign('-'));
        if negative || self.peek() == Some(Token::Sign('+')) {
            self.next += 1;
            self.deeper()?;
            self.signed()?;
            self.depth -= 1;
            if negative {
                self.push(Action::Negate, start);
            }
            return Ok(());
        }
        self.primary()?;
        if self.eat('^') {
            let power = self.exponent()?;
            self.push(Action::Power(power), start);
        }
        Ok(())
    }

    fn primary(&mut self) -> Parsed<()> {
        let start = self.here().start;
        match self.peek() {
            None => Err(self.ended()),
            Some(Token::Number(value, _)) => self.number(value),
            Some(Token::Sign('(')) => {
                self.next += 1;
                self.deeper()?;
                self.sum()?;
                self.close()?;
                self.depth -= 1;
                if self.unit_follows() {
                    let unit_start = self.here().start;
                    let units = self.units()?;
                    self.push(Action::Push(units), unit_start);
                    self.push(Action::Multiply, start);
                }
                Ok(())
            }
            Some(token @ Token::Sign(_)) => Err(self.unexpected(token)),
            Some(Token::Name(name)) => {
                if let Some((_, function)) = FUNCTIONS.iter().find(|(known, _)| *known == name) {
                    return self.call(name, *function);
                }
                if unit(name).is_some() {
                    return Err(ExpressionFault::new(
                        self.here(),
                        format!("the unit `{name}` has no number"),
                    )
                    .hint(format!("write `1 {name}`")));
                }
                self.next += 1;
                if self.peek() == Some(Token::Sign('(')) {
                    let span = start..self.end_before();
                    let fault = ExpressionFault::new(span, format!("there is no function `{name}`"))
                        .accepted(listed(FUNCTIONS.map(|(known, _)| known)));
                    return Err(match suggestion(name, FUNCTIONS.map(|(known, _)| known)) {
                        Some(hint) => fault.hint(hint),
                        None => fault,
                    });
                }
                self.push(Action::Parameter(name.to_owned()), start);
                Ok(())
            }
        }
    }

    fn close(&mut self) -> Parsed<()> {
        if self.eat(')') {
            return Ok(());
        }
        Err(self.peek().map_or_else(
            || ExpressionFault::new(self.here(), "a closing bracket is missing").accepted("`)`"),
            |token| self.unexpected(token),
        ))
    }

    fn call(&mut self, name: &str, function: Function) -> Parsed<()> {
        let start = self.here().start;
        self.next += 1;
        if !self.eat('(') {
            return Err(ExpressionFault::new(self.here(), format!("`{name}` is a function"))
                .accepted(format!("`{name}(...)`")));
        }
        self.deeper()?;
        let mut count = 1;
        self.sum()?;
        while self.eat(',') {
            self.sum()?;
            count += 1;
        }
        self.close()?;
        self.depth -= 1;
        let several = matches!(function, Function::Min | Function::Max);
        if count > 1 && !several {
            let span = start..self.end_before();
            return Err(ExpressionFault::new(span, format!("`{name}` takes one value, found {count}")));
        }
        self.push(Action::Call(function, count), start);
        Ok(())
    }

    /// Whether `number / number unit` comes next.
    fn fraction_with_unit(&self) -> bool {
        matches!(
            (self.peek(), self.peek_at(1), self.peek_at(2), self.peek_at(3)),
            (
                Some(Token::Number(..)),
                Some(Token::Sign('/')),
                Some(Token::Number(..)),
                Some(Token::Name(name)),
            ) if unit(name).is_some()
        )
    }

    fn unit_follows(&self) -> bool {
        matches!(self.peek(), Some(Token::Name(name)) if unit(name).is_some())
    }

    fn number(&mut self, first: f64) -> Parsed<()> {
        let start = self.here().start;
        let ahead = [1, 2, 3].map(|ahead| self.peek_at(ahead));
        let mut value = first;
        if let (
            Some(Token::Number(whole, true)),
            [Some(Token::Number(part, true)), Some(Token::Sign('/')), Some(Token::Number(parts, true))],
        ) = (self.peek(), ahead)
        {
            self.next += 4;
            if part >= parts {
                let span = start..self.end_before();
                let message = format!("`{}` is not a mixed number", &self.text[span.clone()]);
                return Err(ExpressionFault::new(span, message).accepted("for example `1 1/2`"));
            }
            value = whole + part / parts;
        } else if self.fraction_with_unit() {
            self.next += 3;
            if let [_, Some(Token::Number(parts, _)), _] = ahead {
                value = first / parts;
            }
        } else {
            self.next += 1;
        }
        if !value.is_finite() {
            let span = start..self.end_before();
            let message = format!("`{}` is a division by zero", &self.text[span.clone()]);
            return Err(ExpressionFault::new(span, message));
        }
        let mut quantity = Quantity::pure(value);
        if self.unit_follows() {
            let units = self.units()?;
            quantity = Quantity { value: value * units.value, exponents: units.exponents };
        } else if let Some(Token::Name(name)) = self.peek() {
            return Err(self.no_unit(name, &self.text[start..self.end_before()]));
        }
        self.push(Action::Push(quantity), start);
        Ok(())
    }

    fn no_unit(&self, name: &str, number: &str) -> ExpressionFault {
        let fault = ExpressionFault::new(self.here(), format!("`{name}` behind a number is not a unit"))
            .accepted(listed(unit_names()));
        if let Some((first, second)) = split_unit(name) {
            return fault.hint(format!("write `{first} {second}`"));
        }
        fault.hint(
            suggestion(name, unit_names())
                .unwrap_or_else(|| format!("for a parameter write `{number}*{name}`")),
        )
    }

    /// One or more units, of which the first is known to follow.
    fn units(&mut self) -> Parsed<Quantity> {
        let start = self.here().start;
        let mut product = Quantity::pure(1.0);
        let mut divide = false;
        loop {
            let Some(Token::Name(name)) = self.peek() else { return Ok(product) };
            let Some(one) = unit(name) else { return Ok(product) };
            self.next += 1;
            let power = if self.eat('^') { self.exponent()? } else { 1 };
            let factor = one.value.powi(power);
            product.value = if divide { product.value / factor } else { product.value * factor };
            product.exponents =
                product
                    .exponents
                    .times(one.exponents, if divide { -power } else { power })
                    .ok_or_else(|| ExpressionFault::new(start..self.end_before(), "too many units"))?;
            let next_is_unit = |parser: &Self, ahead| matches!(parser.peek_at(ahead), Some(Token::Name(name)) if unit(name).is_some());
            match self.peek() {
                Some(Token::Sign(sign @ ('*' | '/'))) if next_is_unit(self, 1) => {
                    self.next += 1;
                    divide = sign == '/';
                }
                Some(Token::Name(_)) if next_is_unit(self, 0) => {
                    if divide {
                        let message =
                            format!("`{}` can be read in two ways", &self.text[start..self.here().end]);
                        return Err(ExpressionFault::new(start..self.here().end, message)
                            .hint("put `/` or `*` before the last unit"));
                    }
                }
                _ => return Ok(product),
            }
        }
    }

    /// An integer exponent behind `^`.
    fn exponent(&mut self) -> Parsed<i32> {
        let start = self.here().start;
        let negative = self.eat('-');
        let found = self.peek();
        self.next += usize::from(found.is_some());
        let power = match found {
            Some(Token::Number(value, true)) => (1..=GREATEST_POWER).find(|power| {
                let difference = f64::from(*power) - value;
                difference.abs() < 0.5
            }),
            _ => None,
        };
        power.map(|power| if negative { -power } else { power }).ok_or_else(|| {
            let span = start..self.end_before().max(start);
            ExpressionFault::new(span, "an exponent must be a whole number")
                .accepted(format!("1 to {GREATEST_POWER}, or -1 to -{GREATEST_POWER}"))
        })
    }
}

/// The names an expression refers to.
pub(super) fn names(steps: &[Step]) -> impl Iterator<Item = &str> {
    steps.iter().filter_map(|step| match &step.action {
        Action::Parameter(name) => Some(name.as_str()),
        Action::Push(_)
        | Action::Add
        | Action::Subtract
        | Action::Multiply
        | Action::Divide
        | Action::Negate
        | Action::Power(_)
        | Action::Call(..) => None,
    })
}

/// Whether a name belongs to a unit or a function.
pub(super) fn is_reserved(name: &str) -> bool {
    unit(name).is_some() || FUNCTIONS.iter().any(|(known, _)| *known == name)
}

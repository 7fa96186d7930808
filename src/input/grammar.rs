//! Text to expression: the grammar of expressions, by recursive descent.
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
//! Only brackets, functions and signs recurse, and those are limited. Numbers and units are in `literal`.

use super::expression::{Action, FUNCTIONS, Function, Step};
use super::faults::Span;
use super::lexer::{ExpressionFault, Token, tokens};
use super::nearest::{listed, suggestion};
use super::quantity::unit;

/// Deepest nesting of brackets, functions and signs.
const DEEPEST: usize = 40;

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
    if let Some(fault) = hyphenated(text, &tokens) {
        return Err(fault);
    }
    let mut parser = Parser { text, tokens, next: 0, depth: 0, steps: Vec::new() };
    parser.sum()?;
    match parser.peek() {
        None => Ok(parser.steps),
        Some(token) => Err(parser.unexpected(token)),
    }
}

/// Customary spellings with a hyphen, which would be read as a difference: `5-1/2 in`, `50 kip-in`.
fn hyphenated(text: &str, tokens: &[(Token<'_>, Span)]) -> Option<ExpressionFault> {
    let is_unit = |token: &Token<'_>| matches!(token, Token::Name(name) if unit(name).is_some());
    for (at, window) in tokens.windows(3).enumerate() {
        let [(before, left), (Token::Sign('-'), hyphen), (after, right)] = window else { continue };
        if left.end != hyphen.start || hyphen.end != right.start {
            continue;
        }
        let rest = &tokens[at + 3..];
        let fraction =
            matches!(rest, [(Token::Sign('/'), _), (Token::Number(..), _), (name, _), ..] if is_unit(name));
        if is_unit(before) && is_unit(after) {
            let (one, two) = (&text[left.clone()], &text[right.clone()]);
            let fault = ExpressionFault::new(left.start..right.end, format!("`{one}-{two}` is not a unit"));
            return Some(fault.hint(format!("a product of units is written with a space: `{one} {two}`")));
        }
        if matches!((before, after), (Token::Number(..), Token::Number(..))) && fraction {
            let span = left.start..rest[1].1.end;
            let (whole, part) = (&text[left.clone()], &text[right.start..rest[1].1.end]);
            let fault = ExpressionFault::new(span, format!("`{whole}-{part}` can be read as a difference"));
            return Some(fault.hint(format!("a mixed number is written with a space: `{whole} {part}`")));
        }
    }
    None
}

/// A text being parsed.
pub(super) struct Parser<'t> {
    pub(super) text: &'t str,
    tokens: Vec<(Token<'t>, Span)>,
    pub(super) next: usize,
    depth: usize,
    steps: Vec<Step>,
}

/// A part understood, or the first thing that is not.
pub(super) type Parsed<T> = Result<T, ExpressionFault>;

impl<'t> Parser<'t> {
    pub(super) fn peek_at(&self, ahead: usize) -> Option<Token<'t>> {
        self.tokens.get(self.next + ahead).map(|(token, _)| *token)
    }

    pub(super) fn peek(&self) -> Option<Token<'t>> {
        self.peek_at(0)
    }

    /// Place of the next token, or of the end of the text.
    pub(super) fn here(&self) -> Span {
        self.tokens.get(self.next).map_or(self.text.len()..self.text.len(), |(_, span)| span.clone())
    }

    pub(super) fn end_before(&self) -> usize {
        self.next.checked_sub(1).and_then(|last| self.tokens.get(last)).map_or(0, |(_, span)| span.end)
    }

    pub(super) fn eat(&mut self, sign: char) -> bool {
        let eaten = self.peek() == Some(Token::Sign(sign));
        self.next += usize::from(eaten);
        eaten
    }

    pub(super) fn push(&mut self, action: Action, start: usize) {
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
}

//! Numbers with units within an expression: fractions, mixed numbers, compound units, exponents.
//!
//! A fraction is one number only where a unit follows it (`5/16 in`); a mixed number is two whole numbers, a
//! stroke and a greater whole number (`1 1/2`). Units side by side multiply; behind a stroke only one unit may
//! stand, because `N/mm mm` is read in two ways by different people.

use super::expression::Action;
use super::grammar::{Parsed, Parser};
use super::lexer::{ExpressionFault, Token};
use super::nearest::{listed, suggestion};
use super::quantity::{Quantity, split_unit, unit, unit_names};

/// Greatest exponent that can be written.
const GREATEST_POWER: i32 = 9;

impl Parser<'_> {
    /// Whether `number / number unit` comes next.
    pub(super) fn fraction_with_unit(&self) -> bool {
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

    pub(super) fn unit_follows(&self) -> bool {
        matches!(self.peek(), Some(Token::Name(name)) if unit(name).is_some())
    }

    pub(super) fn number(&mut self, first: f64) -> Parsed<()> {
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
    pub(super) fn units(&mut self) -> Parsed<Quantity> {
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
    pub(super) fn exponent(&mut self) -> Parsed<i32> {
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

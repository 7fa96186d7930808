//! Expression to quantity: runs the steps on a stack, with the dimension checked at every step.
//!
//! Sums need terms of one dimension; products add exponents; `sqrt` halves them; `sin`, `cos` and `tan` take
//! an angle. A result that is not finite is a fault where it arises.

use super::dimension::Exponents;
use super::expression::{Action, FUNCTIONS, Function, Step};
use super::faults::{Span, shortened};
use super::lexer::ExpressionFault;
use super::nearest::suggestion;
use super::quantity::{Quantity, split_unit, unit_names};

/// What a name stands for.
pub(super) enum Looked {
    /// A value.
    Value(Quantity),
    /// A parameter whose own fault is reported already.
    Faulty,
    /// Nothing.
    Unknown,
}

/// Why there is no value.
#[derive(Debug)]
pub(super) enum NoValue {
    /// A fault of this expression.
    Fault(ExpressionFault),
    /// It refers to a parameter whose fault is reported already.
    Reported,
}

impl From<ExpressionFault> for NoValue {
    fn from(fault: ExpressionFault) -> Self {
        Self::Fault(fault)
    }
}

/// The value of an expression.
///
/// # Errors
/// Unknown names, terms of different dimension, a result that is not finite.
pub(super) fn evaluate<'n>(
    text: &str,
    steps: &[Step],
    look_up: &dyn Fn(&str) -> Looked,
    known: &dyn Fn() -> Vec<&'n str>,
) -> Result<Quantity, NoValue> {
    let mut stack: Vec<(Quantity, Span)> = Vec::new();
    for step in steps {
        let span = &step.span;
        let result = match &step.action {
            Action::Push(quantity) => *quantity,
            Action::Parameter(name) => match look_up(name) {
                Looked::Value(quantity) => quantity,
                Looked::Faulty => return Err(NoValue::Reported),
                Looked::Unknown => return Err(unknown(name, span, &known()).into()),
            },
            Action::Add | Action::Subtract => {
                let (right, left) = (pop(&mut stack, span)?, pop(&mut stack, span)?);
                let adds = step.action == Action::Add;
                same_dimension(text, span, if adds { "adds" } else { "subtracts" }, &left, &right)?;
                let value = if adds { left.0.value + right.0.value } else { left.0.value - right.0.value };
                Quantity { value, exponents: left.0.exponents }
            }
            Action::Multiply | Action::Divide => {
                let (right, left) = (pop(&mut stack, span)?.0, pop(&mut stack, span)?.0);
                let multiplies = step.action == Action::Multiply;
                let value = if multiplies { left.value * right.value } else { left.value / right.value };
                let power = if multiplies { 1 } else { -1 };
                Quantity { value, exponents: product(left.exponents, right.exponents, power, span)? }
            }
            Action::Negate => {
                let operand = pop(&mut stack, span)?.0;
                Quantity { value: -operand.value, ..operand }
            }
            Action::Power(power) => {
                let operand = pop(&mut stack, span)?.0;
                let exponents = product(Exponents::PURE, operand.exponents, *power, span)?;
                Quantity { value: operand.value.powi(*power), exponents }
            }
            Action::Call(function, count) => {
                let values = stack.split_off(stack.len().saturating_sub(*count));
                call(text, span, *function, &values)?
            }
        };
        if !result.value.is_finite() {
            let message = format!("`{}` has no finite value", shortened(&text[span.clone()]));
            return Err(ExpressionFault::new(span.clone(), message).into());
        }
        stack.push((result, span.clone()));
    }
    Ok(pop(&mut stack, &(0..text.len()))?.0)
}

fn pop(stack: &mut Vec<(Quantity, Span)>, span: &Span) -> Result<(Quantity, Span), ExpressionFault> {
    // The parser pushes every operand before its operator, so the stack never runs empty.
    stack.pop().ok_or_else(|| ExpressionFault::new(span.clone(), "the expression is not complete"))
}

fn product(a: Exponents, b: Exponents, power: i32, span: &Span) -> Result<Exponents, ExpressionFault> {
    a.times(b, power)
        .ok_or_else(|| ExpressionFault::new(span.clone(), "the powers of the units grow too large"))
}

fn same_dimension(
    text: &str,
    span: &Span,
    verb: &str,
    left: &(Quantity, Span),
    right: &(Quantity, Span),
) -> Result<(), ExpressionFault> {
    if left.0.exponents == right.0.exponents {
        return Ok(());
    }
    let whole = shortened(&text[span.clone()]);
    let (first, second) = (left.0.exponents.name(), right.0.exponents.name());
    let fault = ExpressionFault::new(span.clone(), format!("`{whole}` {verb} {first} and {second}"))
        .accepted("terms of one dimension");
    let bare = [left, right].into_iter().find(|(quantity, _)| quantity.exponents == Exponents::PURE);
    Err(match bare {
        Some((_, place)) => {
            let number = shortened(&text[place.clone()]);
            fault.hint(format!("in an expression every quantity carries its unit: give `{number}` one"))
        }
        None => fault,
    })
}

fn call(
    text: &str,
    span: &Span,
    function: Function,
    values: &[(Quantity, Span)],
) -> Result<Quantity, ExpressionFault> {
    let Some((first, others)) = values.split_first() else {
        return Err(ExpressionFault::new(span.clone(), "the function has no value"));
    };
    let angle = |compute: fn(f64) -> f64| {
        if first.0.exponents == Exponents::ANGLE {
            return Ok(Quantity::pure(compute(first.0.value)));
        }
        let message = format!(
            "`{}` takes an angle, found {}",
            shortened(&text[span.clone()]),
            first.0.exponents.name()
        );
        Err(ExpressionFault::new(span.clone(), message).accepted("an angle, for example `30 deg`"))
    };
    match function {
        Function::Sqrt => {
            let exponents = first.0.exponents.root().ok_or_else(|| {
                let name = first.0.exponents.name();
                ExpressionFault::new(span.clone(), format!("the square root of {name} is no quantity"))
            })?;
            Ok(Quantity { value: first.0.value.sqrt(), exponents })
        }
        Function::Abs => Ok(Quantity { value: first.0.value.abs(), ..first.0 }),
        Function::Min | Function::Max => {
            let mut best = first.0;
            for other in others {
                same_dimension(text, span, "compares", first, other)?;
                let better = if function == Function::Min {
                    best.value.min(other.0.value)
                } else {
                    best.value.max(other.0.value)
                };
                best.value = better;
            }
            Ok(best)
        }
        Function::Sin => angle(f64::sin),
        Function::Cos => angle(f64::cos),
        Function::Tan => angle(f64::tan),
    }
}

fn unknown(name: &str, span: &Span, parameters: &[&str]) -> ExpressionFault {
    let fault = ExpressionFault::new(span.clone(), format!("there is no parameter `{}`", shortened(name)));
    if let Some((first, second)) = split_unit(name) {
        return fault.hint(format!("for the unit write `{first} {second}`"));
    }
    let mut candidates: Vec<&str> = parameters.to_vec();
    candidates.extend(unit_names());
    candidates.extend(FUNCTIONS.map(|(known, _)| known));
    match suggestion(name, candidates) {
        Some(hint) => fault.hint(hint),
        None => fault.hint("name it under `[parameters]`"),
    }
}

#[cfg(test)]
#[allow(clippy::float_cmp)] // exact factors are meant exactly
mod tests {
    use super::super::grammar::parse;
    use super::*;

    fn value(text: &str) -> Result<Quantity, String> {
        let steps = parse(text).map_err(|fault| fault.message)?;
        let look_up = |name: &str| match name {
            "b" => Looked::Value(Quantity { value: 120.0, exponents: Exponents::LENGTH }),
            "n" => Looked::Value(Quantity::pure(2.0)),
            "bad" => Looked::Faulty,
            _ => Looked::Unknown,
        };
        evaluate(text, &steps, &look_up, &|| vec!["b", "n"]).map_err(|error| match error {
            NoValue::Fault(fault) => fault.message,
            NoValue::Reported => "reported".to_owned(),
        })
    }

    fn in_mm(text: &str) -> f64 {
        let quantity = value(text).unwrap();
        assert_eq!(quantity.exponents, Exponents::LENGTH, "{text}");
        quantity.value
    }

    #[test]
    fn fractions_and_mixed_numbers_take_the_unit_as_a_whole() {
        assert_eq!(in_mm("5/16 in"), 0.3125 * 25.4);
        assert_eq!(in_mm("1 1/2 in"), 1.5 * 25.4);
        assert_eq!(in_mm("-1 1/2 in"), -1.5 * 25.4);
        assert_eq!(in_mm("-3 mm"), -3.0);
        assert_eq!(in_mm("(1/2) in"), 12.7);
        assert_eq!(in_mm("140mm"), 140.0);
        assert_eq!(in_mm("b + 3/8 in"), 120.0 + 0.375 * 25.4);
        assert_eq!(value("1 1/2").unwrap(), Quantity::pure(1.5));
        assert!(value("1 3/2 in").unwrap_err().contains("mixed number"));
        assert!(value("1/0 in").unwrap_err().contains("division by zero"));
        assert!(value("b / 1/2 in").unwrap_err().contains("two ways"));
    }

    #[test]
    fn compound_units() {
        let moment = Exponents::FORCE.times(Exponents::LENGTH, 1).unwrap();
        for (text, expected) in [
            ("12 kN m", 12e6),
            ("12 kN*m", 12e6),
            ("3 N mm", 3.0),
            ("2 kip in", 2.0 * (4_448.221_615_260_5 * 25.4)),
            ("2 kip ft", 2.0 * (4_448.221_615_260_5 * 304.8)),
        ] {
            assert_eq!(value(text).unwrap(), Quantity { value: expected, exponents: moment }, "{text}");
        }
        let stress = |text: &str| {
            let quantity = value(text).unwrap();
            assert_eq!(quantity.exponents, Exponents::STRESS, "{text}");
            quantity.value
        };
        assert_eq!(stress("490 N/mm^2"), 490.0);
        assert_eq!(stress("490 N/mm/mm"), 490.0);
        assert_eq!(stress("490 N mm^-2"), 490.0);
        assert_eq!(stress("70 ksi"), 70.0 * stress("1 kip/in^2"));
        assert!((stress("70000 psi") - stress("70 ksi")).abs() < 1e-12 * 482.0);
        assert!(value("4 N/mm mm").unwrap_err().contains("two ways"));
        assert_eq!(value("12 kN / 2 m").unwrap().value, 6.0);
    }

    #[test]
    fn precedence_signs_and_functions() {
        assert_eq!(in_mm("2*b - b/n + 3 mm"), 240.0 - 60.0 + 3.0);
        assert_eq!(in_mm("-(b - 20 mm)*n"), -200.0);
        assert_eq!(in_mm("n * 5 * mm"), 10.0);
        assert_eq!(in_mm("sqrt((3 mm)^2 + (4 mm)^2)"), 5.0);
        assert_eq!(in_mm("max(b, 1 m, 2 mm)"), 1000.0);
        assert_eq!(in_mm("min(b, 1 m)"), 120.0);
        assert_eq!(in_mm("abs(-b)"), 120.0);
        assert_eq!(value("-2^2").unwrap().value, -4.0);
        assert!((value("sin(30 deg) + cos(60 deg)").unwrap().value - 1.0).abs() < 1e-15);
        assert!((value("tan(45 deg)").unwrap().value - 1.0).abs() < 1e-15);
    }

    #[test]
    fn dimensions_are_checked() {
        assert_eq!(value("b + 250").unwrap_err(), "`b + 250` adds a length and a pure number");
        assert_eq!(value("b - 2 kN").unwrap_err(), "`b - 2 kN` subtracts a length and a force");
        assert_eq!(value("max(b, 1)").unwrap_err(), "`max(b, 1)` compares a length and a pure number");
        assert_eq!(value("sin(30)").unwrap_err(), "`sin(30)` takes an angle, found a pure number");
        assert_eq!(value("sqrt(b)").unwrap_err(), "the square root of a length is no quantity");
        assert!(value("((b^9)^9)^9").unwrap_err().contains("grow too large"));
    }

    #[test]
    fn values_must_be_finite() {
        for text in ["1/0", "b/(n - 2)", "1e300*1e300", "sqrt(-1)", "0^-1", "1e308 m"] {
            assert!(value(text).is_err(), "{text}");
        }
        assert_eq!(value("1e308").unwrap().value, 1e308);
    }

    #[test]
    fn names_must_be_known() {
        assert_eq!(value("bb").unwrap_err(), "there is no parameter `bb`");
        assert_eq!(value("bad + 1").unwrap_err(), "reported");
        assert_eq!(value("mm").unwrap_err(), "the unit `mm` has no number");
        assert_eq!(value("50 kip-in").unwrap_err(), "`kip-in` is not a unit");
        assert_eq!(value("5-1/2 in").unwrap_err(), "`5-1/2` can be read as a difference");
        assert_eq!(value("12 kNm").unwrap_err(), "`kNm` behind a number is not a unit");
        assert_eq!(value("2 b").unwrap_err(), "`b` behind a number is not a unit");
        assert_eq!(value("b n").unwrap_err(), "an operator is missing before `n`");
        assert_eq!(value("log(2)").unwrap_err(), "there is no function `log`");
        assert_eq!(value("sqrt 2").unwrap_err(), "`sqrt` is a function");
        assert_eq!(value("sin(1 deg, 2 deg)").unwrap_err(), "`sin` takes one value, found 2");
        assert_eq!(value("7,5 mm").unwrap_err(), "`,` outside the brackets of a function");
        assert_eq!(value("").unwrap_err(), "the text is empty");
        assert_eq!(value("1 +").unwrap_err(), "the expression ends too early");
        assert_eq!(value("(1").unwrap_err(), "a closing bracket is missing");
        assert_eq!(value("2^0.5").unwrap_err(), "an exponent must be a whole number");
        assert_eq!(value("b^").unwrap_err(), "an exponent must be a whole number");
    }

    #[test]
    fn nesting_is_limited_and_never_overflows() {
        let nested = |depth: usize| format!("{}1{}", "(".repeat(depth), ")".repeat(depth));
        assert_eq!(value(&nested(40)).unwrap().value, 1.0);
        assert!(value(&nested(41)).unwrap_err().contains("too deeply"));
        assert!(value(&"-".repeat(900)).unwrap_err().contains("too deeply"));
        assert!(value(&"(".repeat(100_000)).unwrap_err().contains("too long"));
        assert!(value(&format!("1{}", "+1".repeat(450))).is_ok());
    }
}

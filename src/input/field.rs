//! Values of the file that still wait for the parameters and the units: numbers, expressions, texts, lists.
//!
//! [`Given`] tells a key that is absent from one whose fault is reported already, so that one mistake is
//! reported once.

use super::document::{Node, Text, Value};
use super::expression::Step;
use super::faults::{Faults, Origin, Span, shortened};
use super::grammar::parse;
use super::lexer::ExpressionFault;
use super::nearest::{listed, suggestion};

/// A value with its place.
#[derive(Debug, Clone)]
pub(super) struct Located<T> {
    /// Its place.
    pub(super) span: Span,
    /// The value.
    pub(super) value: T,
}

/// What became of a key.
#[derive(Debug, Clone)]
pub(super) enum Given<T> {
    /// The key is not there.
    Absent,
    /// It is there, and its fault is reported.
    Faulty,
    /// It is there.
    Value(T),
}

impl<T> Given<T> {
    /// The value, if there is one.
    pub(super) fn value(&self) -> Option<&T> {
        match self {
            Self::Value(value) => Some(value),
            Self::Absent | Self::Faulty => None,
        }
    }

    /// Whether the key is not there.
    pub(super) fn is_absent(&self) -> bool {
        matches!(self, Self::Absent)
    }

    /// A value from what was read, where a fault has been reported for `None`.
    pub(super) fn reported(value: Option<T>) -> Self {
        value.map_or(Self::Faulty, Self::Value)
    }
}

/// An expression with its text and origin.
#[derive(Debug, Clone)]
pub(super) struct Expression {
    /// The text.
    pub(super) text: String,
    /// Its steps.
    pub(super) steps: Vec<Step>,
    /// Where it comes from.
    pub(super) origin: Origin,
    /// Where its first letter stands in the file, when a place inside can be told.
    pub(super) inner: Option<usize>,
}

impl Expression {
    /// Parses a text; `None` when its fault is reported.
    pub(super) fn read(
        text: &str,
        origin: Origin,
        inner: Option<usize>,
        faults: &mut Faults<'_>,
    ) -> Option<Self> {
        match parse(text) {
            Ok(steps) => Some(Self { text: text.to_owned(), steps, origin, inner }),
            Err(fault) => {
                report(fault, &origin, inner, faults);
                None
            }
        }
    }
}

/// Reports the fault of an expression at its place in the file.
pub(super) fn report(fault: ExpressionFault, origin: &Origin, inner: Option<usize>, faults: &mut Faults<'_>) {
    let place = match (origin, inner) {
        (Origin::File(_), Some(start)) => Origin::File(start + fault.span.start..start + fault.span.end),
        (Origin::File(_) | Origin::Option { .. }, _) => origin.clone(),
    };
    let reported = faults.at(place, fault.message).hint_if(fault.hint);
    if let Some(accepted) = fault.accepted {
        reported.accepted(accepted);
    }
}

/// A number in the file's units, or an expression.
#[derive(Debug, Clone)]
pub(super) enum Content {
    /// A bare number.
    Bare(f64),
    /// A text.
    Expression(Expression),
    /// Something whose fault is reported already: it keeps its place among others.
    Faulty,
}

/// A number of the file.
#[derive(Debug, Clone)]
pub(super) struct Field {
    /// What it is called in messages.
    pub(super) name: String,
    /// Its place.
    pub(super) origin: Origin,
    /// The number.
    pub(super) content: Content,
}

/// Reports a value of the wrong kind.
pub(super) fn wrong_kind(node: &Node, name: &str, wanted: &str, faults: &mut Faults<'_>) {
    faults.at(&node.span, format!("{name} must be {wanted}, found {}", node.value.kind()));
}

/// A text that is not empty.
pub(super) fn text(node: &Node, name: &str, faults: &mut Faults<'_>) -> Option<Located<String>> {
    match &node.value {
        Value::Text(Text { content, .. }) if content.trim().is_empty() => {
            faults.at(&node.span, format!("{name} must not be empty"));
            None
        }
        Value::Text(Text { content, .. }) => {
            Some(Located { span: node.span.clone(), value: content.clone() })
        }
        Value::Number(_) | Value::Boolean | Value::Date(_) | Value::List(_) | Value::Table(_) => {
            wrong_kind(node, name, "a text in quotes", faults);
            None
        }
    }
}

/// A number or an expression.
pub(super) fn field(node: &Node, name: &str, faults: &mut Faults<'_>) -> Option<Field> {
    let origin = Origin::from(&node.span);
    let content = match &node.value {
        Value::Number(number) if number.is_finite() => Content::Bare(*number),
        Value::Number(_) => {
            let found = faults.found(&node.span);
            faults.at(&node.span, format!("{name} must be a finite number, found `{found}`"));
            return None;
        }
        Value::Text(text) => {
            Content::Expression(Expression::read(&text.content, origin.clone(), text.inner, faults)?)
        }
        Value::Boolean | Value::Date(_) | Value::List(_) | Value::Table(_) => {
            wrong_kind(node, name, "a number or a text with a unit", faults);
            return None;
        }
    };
    Some(Field { name: name.to_owned(), origin, content })
}

/// A list of numbers or expressions; a faulty one keeps its place, so that the others are still checked.
pub(super) fn fields(node: &Node, name: &str, faults: &mut Faults<'_>) -> Option<Located<Vec<Field>>> {
    let Value::List(items) = &node.value else {
        wrong_kind(node, name, "a list of numbers", faults);
        return None;
    };
    let faulty = |item: &Node| Field {
        name: name.to_owned(),
        origin: Origin::from(&item.span),
        content: Content::Faulty,
    };
    let read = items.iter().map(|item| field(item, name, faults).unwrap_or_else(|| faulty(item))).collect();
    Some(Located { span: node.span.clone(), value: read })
}

/// The choice a text names, or a fault that lists the choices.
pub(super) fn choice<'c>(
    found: &Located<String>,
    key: &str,
    choices: &[&'c str],
    faults: &mut Faults<'_>,
) -> Option<&'c str> {
    let chosen = choices.iter().find(|choice| **choice == found.value).copied();
    if chosen.is_none() {
        let message = format!("unknown {key} `{}`", shortened(&found.value));
        faults
            .at(&found.span, message)
            .accepted(listed(choices.iter().copied()))
            .hint_if(suggestion(&found.value, choices.iter().copied()));
    }
    chosen
}

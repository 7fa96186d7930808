//! Reading the keys of one table: unknown, later and missing keys are reported here, and wrong kinds of value.
//!
//! [`Given`] tells a key that is absent from one whose fault is reported already, so that one mistake is
//! reported once. A [`Field`] is a number that still waits for the parameters and the units of the file.

use super::document::{Node, Table, Text, Value};
use super::expression::{Step, parse};
use super::faults::{Faults, Origin, Span};
use super::lexer::ExpressionFault;
use super::nearest::{listed, nearest, suggestion};

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

/// The keys of one table.
pub(super) struct Fields<'d> {
    table: &'d Table,
    name: &'static str,
    meant: Vec<String>,
}

impl<'d> Fields<'d> {
    /// Opens a table called `name` in messages, with the keys it may have, and those that come later.
    pub(super) fn open(
        table: &'d Table,
        name: &'static str,
        keys: &[&str],
        later: &[&str],
        faults: &mut Faults<'_>,
    ) -> Self {
        let mut meant = Vec::new();
        for entry in &table.entries {
            let key = entry.key.as_str();
            if later.contains(&key) {
                faults.at(&entry.key_span, format!("`{key}` is not available yet")).hint("remove it");
            } else if !keys.contains(&key) {
                let message = format!("unknown key `{}` {name}", super::faults::shortened(key));
                let near = nearest(key, keys.iter().chain(later).copied());
                meant.extend(near.map(str::to_owned));
                let hint = near.map(|near| format!("did you mean `{near}`?")).or_else(|| belongs(key));
                faults.at(&entry.key_span, message).accepted(listed(keys.iter().copied())).hint_if(hint);
            }
        }
        Self { table, name, meant }
    }

    /// Place of the table.
    pub(super) fn span(&self) -> &'d Span {
        &self.table.span
    }

    /// The value of a key.
    pub(super) fn get(&self, key: &str) -> Option<&'d Node> {
        self.table.get(key).map(|entry| &entry.node)
    }

    /// Place of a key, or of the table when the key is absent.
    pub(super) fn key_span(&self, key: &str) -> &'d Span {
        self.table.get(key).map_or(&self.table.span, |entry| &entry.key_span)
    }

    /// Whether an unknown key was probably meant to be one of these: then none of them is called missing.
    pub(super) fn meant(&self, keys: &[&str]) -> bool {
        self.meant.iter().any(|meant| keys.contains(&meant.as_str()))
    }

    /// Reports that a key is missing.
    pub(super) fn missing(&self, key: &str, accepted: &str, faults: &mut Faults<'_>) {
        if self.meant(&[key]) {
            return;
        }
        faults.at(self.span(), format!("the key `{key}` is missing {}", self.name)).accepted(accepted);
    }

    /// A text.
    pub(super) fn text(&self, key: &str, faults: &mut Faults<'_>) -> Given<Located<String>> {
        match self.get(key) {
            None => Given::Absent,
            Some(node) => Given::reported(text(node, &format!("`{key}`"), faults)),
        }
    }

    /// A text that must be there.
    pub(super) fn required_text(&self, key: &str, faults: &mut Faults<'_>) -> Given<Located<String>> {
        let given = self.text(key, faults);
        if given.is_absent() {
            self.missing(key, "a text", faults);
        }
        given
    }

    /// A number.
    pub(super) fn field(&self, key: &str, faults: &mut Faults<'_>) -> Given<Field> {
        match self.get(key) {
            None => Given::Absent,
            Some(node) => Given::reported(field(node, &format!("`{key}`"), faults)),
        }
    }

    /// A number that must be there.
    pub(super) fn required_field(&self, key: &str, accepted: &str, faults: &mut Faults<'_>) -> Given<Field> {
        let given = self.field(key, faults);
        if given.is_absent() {
            self.missing(key, accepted, faults);
        }
        given
    }

    /// Numbers in a list.
    pub(super) fn fields(&self, key: &str, faults: &mut Faults<'_>) -> Given<Located<Vec<Field>>> {
        match self.get(key) {
            None => Given::Absent,
            Some(node) => Given::reported(fields(node, &format!("`{key}`"), faults)),
        }
    }

    /// A table.
    pub(super) fn table(&self, key: &str, faults: &mut Faults<'_>) -> Given<&'d Table> {
        match self.get(key) {
            None => Given::Absent,
            Some(Node { value: Value::Table(table), .. }) => Given::Value(table),
            Some(node) => {
                wrong_kind(node, &format!("`{key}`"), "a table", faults);
                Given::Faulty
            }
        }
    }

    /// Tables under one header that may stand several times; false when something is no such table.
    pub(super) fn tables(&self, key: &str, faults: &mut Faults<'_>) -> (Vec<&'d Table>, bool) {
        let Some(node) = self.get(key) else { return (Vec::new(), true) };
        let header = format!("write the header as `[[{key}]]`");
        let Value::List(items) = &node.value else {
            let message = format!("`{key}` must be a list of tables, found {}", node.value.kind());
            faults.at(&node.span, message).hint(header);
            return (Vec::new(), false);
        };
        let mut tables = Vec::new();
        for item in items {
            if let Value::Table(table) = &item.value {
                tables.push(table);
            } else {
                wrong_kind(item, &format!("an entry of `{key}`"), "a table", faults);
            }
        }
        let sound = tables.len() == items.len();
        (tables, sound)
    }
}

/// Where a known key belongs, when it stands in the wrong table.
fn belongs(key: &str) -> Option<String> {
    let home = match key {
        "title" | "units" | "rules" | "law" | "elements" | "action" => {
            return Some(format!("`{key}` stands at the top of the file, before the first header"));
        }
        "leg" | "legs" | "throat" | "path" | "arc" | "dihedral" | "sides" => "[[weld]]",
        "force" | "moment" | "case" | "at" => "[[load]]",
        "thickness" | "grade" | "yield" | "ultimate" => "[[plate]]",
        "factors" => "[[combination]]",
        "strength" | "class" => "[filler]",
        "project" | "author" | "checker" | "revision" | "date" | "subject" => "[document]",
        _ => return None,
    };
    Some(format!("`{key}` belongs under `{home}`"))
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

/// A list of numbers or expressions.
pub(super) fn fields(node: &Node, name: &str, faults: &mut Faults<'_>) -> Option<Located<Vec<Field>>> {
    let Value::List(items) = &node.value else {
        wrong_kind(node, name, "a list of numbers", faults);
        return None;
    };
    let read: Vec<Field> = items.iter().filter_map(|item| field(item, name, faults)).collect();
    (read.len() == items.len()).then(|| Located { span: node.span.clone(), value: read })
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
        let message = format!("unknown {key} `{}`", super::faults::shortened(&found.value));
        faults
            .at(&found.span, message)
            .accepted(listed(choices.iter().copied()))
            .hint_if(suggestion(&found.value, choices.iter().copied()));
    }
    chosen
}

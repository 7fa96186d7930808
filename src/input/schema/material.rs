//! Filler metal and plates.
//!
//! `[filler]` holds `strength` or `class`; the `filler` of one weld may also be the class or the strength
//! itself. Which of the two a text means is decided in `check`, where the classes and parameters are known.

use crate::input::document::{Node, Table, Text, Value};
use crate::input::faults::{Faults, Span};
use crate::input::field::{Field, Given, Located, field};
use crate::input::fields::Fields;

/// What the file says about a filler metal.
#[derive(Debug, Clone)]
pub(in crate::input) enum FillerEntry {
    /// Its tensile strength.
    Strength(Field),
    /// Its class.
    Class(Located<String>),
    /// A text that is a class or a strength.
    Text(Located<Text>),
}

/// What the file says about a plate.
#[derive(Debug, Clone)]
pub(in crate::input) struct PlateEntry {
    /// Place of its table.
    pub(in crate::input) span: Span,
    /// Name.
    pub(in crate::input) name: Given<Located<String>>,
    /// Thickness.
    pub(in crate::input) thickness: Given<Field>,
    /// Steel grade.
    pub(in crate::input) grade: Given<Located<String>>,
    /// Yield strength.
    pub(in crate::input) yield_strength: Given<Field>,
    /// Tensile strength.
    pub(in crate::input) ultimate_strength: Given<Field>,
}

pub(super) fn read_filler(node: &Node, faults: &mut Faults<'_>) -> Option<FillerEntry> {
    match &node.value {
        Value::Table(table) => read_filler_table(table, faults),
        Value::Text(text) => {
            Some(FillerEntry::Text(Located { span: node.span.clone(), value: text.clone() }))
        }
        Value::Number(_) | Value::Boolean | Value::Date(_) | Value::List(_) => {
            field(node, "`filler`", faults).map(FillerEntry::Strength)
        }
    }
}

fn read_filler_table(table: &Table, faults: &mut Faults<'_>) -> Option<FillerEntry> {
    let keys = Fields::open(table, "in `filler`", &["strength", "class"], &[], faults);
    let strength = keys.field("strength", faults);
    let class = keys.text("class", faults);
    match (strength, class) {
        (Given::Value(strength), Given::Absent) => Some(FillerEntry::Strength(strength)),
        (Given::Absent, Given::Value(class)) => Some(FillerEntry::Class(class)),
        (Given::Absent, Given::Absent) if keys.meant(&["strength", "class"]) => None,
        (Given::Absent, Given::Absent) => {
            let accepted = "`strength` (tensile strength) or `class`";
            faults.at(keys.span(), "the filler metal has neither strength nor class").accepted(accepted);
            None
        }
        (Given::Value(_), Given::Value(_)) => {
            faults
                .at(keys.key_span("class"), "the filler metal has a strength and a class")
                .accepted("`strength` or `class`")
                .hint("remove one of them");
            None
        }
        (Given::Faulty, _) | (_, Given::Faulty) => None,
    }
}

pub(super) fn read_plate(table: &Table, faults: &mut Faults<'_>) -> PlateEntry {
    let known = ["name", "thickness", "grade", "yield", "ultimate"];
    let keys = Fields::open(table, "in `[[plate]]`", &known, &["lap"], faults);
    PlateEntry {
        span: table.span.clone(),
        name: keys.required_text("name", faults),
        thickness: keys.required_field("thickness", "a length", faults),
        grade: keys.text("grade", faults),
        yield_strength: keys.field("yield", faults),
        ultimate_strength: keys.field("ultimate", faults),
    }
}

//! Key `law`: an identifier, or a table with the user's own curves.
//!
//! ```toml
//! [law]
//! name = "our tests, batch 3"
//! [[law.curve]]
//! angle = 0                                       # between displacement and weld axis
//! points = [[0, 0], [0.05, 0.8], [0.10, 1.0]]     # deformation / leg, strength / longitudinal strength
//! ```

use crate::input::document::{Node, Table, Value};
use crate::input::faults::{Faults, Span};
use crate::input::field::{Field, Given, Located, fields, text, wrong_kind};
use crate::input::fields::Fields;

/// What the file says about the law.
#[derive(Debug, Clone)]
pub(in crate::input) enum LawEntry {
    /// Identifier of a known law.
    Known(Located<String>),
    /// The user's own curves.
    Own(OwnLaw),
}

/// A law of the user's own.
#[derive(Debug, Clone)]
pub(in crate::input) struct OwnLaw {
    /// Place of the table.
    pub(in crate::input) span: Span,
    /// Its name.
    pub(in crate::input) name: Given<Located<String>>,
    /// Its curves.
    pub(in crate::input) curves: Vec<CurveEntry>,
}

/// One curve.
#[derive(Debug, Clone)]
pub(in crate::input) struct CurveEntry {
    /// Place of its table.
    pub(in crate::input) span: Span,
    /// Angle between displacement and weld axis.
    pub(in crate::input) angle: Given<Field>,
    /// Pairs of deformation and strength.
    pub(in crate::input) points: Given<Vec<Located<Vec<Field>>>>,
}

pub(super) fn read(node: &Node, faults: &mut Faults<'_>) -> Option<LawEntry> {
    match &node.value {
        Value::Table(table) => Some(LawEntry::Own(read_own(table, faults))),
        Value::Text(_) => text(node, "`law`", faults).map(LawEntry::Known),
        Value::Number(_) | Value::Boolean | Value::Date(_) | Value::List(_) => {
            wrong_kind(node, "`law`", "the identifier of a law or a table with curves", faults);
            None
        }
    }
}

fn read_own(table: &Table, faults: &mut Faults<'_>) -> OwnLaw {
    let keys = Fields::open(table, "in `[law]`", &["name", "curve"], &[], faults);
    let name = keys.required_text("name", faults);
    let (tables, sound) = keys.tables("curve", faults);
    if tables.is_empty() && sound {
        keys.missing("curve", "at least one `[[law.curve]]` with `angle` and `points`", faults);
    }
    let curves = tables.into_iter().map(|table| read_curve(table, faults)).collect();
    OwnLaw { span: table.span.clone(), name, curves }
}

fn read_curve(table: &Table, faults: &mut Faults<'_>) -> CurveEntry {
    let keys = Fields::open(table, "in `[[law.curve]]`", &["angle", "points"], &[], faults);
    let angle = keys.required_field("angle", "an angle from 0 to 90 degrees", faults);
    let points = match keys.get("points") {
        None => {
            keys.missing("points", "a list of [deformation / leg, strength / longitudinal strength]", faults);
            Given::Faulty
        }
        Some(Node { value: Value::List(items), .. }) => {
            let read: Vec<Located<Vec<Field>>> =
                items.iter().filter_map(|item| fields(item, "a point of the curve", faults)).collect();
            Given::reported((read.len() == items.len()).then_some(read))
        }
        Some(node) => {
            wrong_kind(node, "`points`", "a list of pairs", faults);
            Given::Faulty
        }
    };
    CurveEntry { span: table.span.clone(), angle, points }
}

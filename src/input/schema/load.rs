//! Loads and their combinations.

use super::weld::{Point, read_point};
use crate::input::document::{Node, Table, Value};
use crate::input::faults::{Faults, Span};
use crate::input::field::{Field, Given, Located, field, wrong_kind};
use crate::input::fields::Fields;

/// A force as written.
#[derive(Debug, Clone)]
#[allow(clippy::large_enum_variant)] // one a load: a box would save nothing
pub(in crate::input) enum ForceEntry {
    /// Its components.
    Components(Point),
    /// Its size and the angle from the x axis.
    Polar {
        /// Size.
        size: Given<Field>,
        /// Angle.
        angle: Given<Field>,
    },
}

/// A moment as written.
#[derive(Debug, Clone)]
pub(in crate::input) enum MomentEntry {
    /// About z.
    Plane(Field),
    /// Three components.
    Components(Located<Vec<Field>>),
}

/// A load as written.
#[derive(Debug, Clone)]
pub(in crate::input) struct LoadEntry {
    /// Place of its table.
    pub(in crate::input) span: Span,
    /// Name of its case.
    pub(in crate::input) case: Given<Located<String>>,
    /// Point of application of the force.
    pub(in crate::input) at: Given<Point>,
    /// Force.
    pub(in crate::input) force: Given<ForceEntry>,
    /// Moment.
    pub(in crate::input) moment: Given<MomentEntry>,
}

/// A combination as written.
#[derive(Debug, Clone)]
pub(in crate::input) struct CombinationEntry {
    /// Name.
    pub(in crate::input) name: Given<Located<String>>,
    /// Case names with their factors; `None` when a factor is faulty.
    pub(in crate::input) factors: Vec<(Located<String>, Option<Field>)>,
}

pub(super) fn read_load(table: &Table, faults: &mut Faults<'_>) -> LoadEntry {
    let known = ["case", "at", "force", "moment"];
    let keys = Fields::open(table, "in `[[load]]`", &known, &["reversible"], faults);
    let at = keys.get("at").map_or(Given::Absent, |node| Given::reported(read_point(node, "`at`", faults)));
    let force = keys.get("force").map_or(Given::Absent, |node| Given::reported(read_force(node, faults)));
    let moment = keys.get("moment").map_or(Given::Absent, |node| Given::reported(read_moment(node, faults)));
    if force.is_absent() && moment.is_absent() {
        if !keys.meant(&["force", "moment"]) {
            faults
                .at(keys.span(), "the load has neither force nor moment")
                .accepted("`force`, `moment` or both");
        }
    } else if at.is_absent() && !force.is_absent() && !keys.meant(&["at"]) {
        let message = "the key `at` is missing in `[[load]]`: a force needs its point of application";
        faults.at(keys.span(), message).accepted("a point");
    }
    LoadEntry { span: table.span.clone(), case: keys.required_text("case", faults), at, force, moment }
}

fn read_force(node: &Node, faults: &mut Faults<'_>) -> Option<ForceEntry> {
    match &node.value {
        Value::Table(table) => {
            let keys = Fields::open(table, "in `force`", &["size", "angle"], &[], faults);
            let size = keys.required_field("size", "a force", faults);
            let angle = keys.required_field("angle", "an angle from the x axis, in degrees", faults);
            Some(ForceEntry::Polar { size, angle })
        }
        Value::List(_) => read_point(node, "`force`", faults).map(ForceEntry::Components),
        Value::Text(_) | Value::Number(_) | Value::Boolean | Value::Date(_) => {
            wrong_kind(node, "`force`", "a list of components or `{ size, angle }`", faults);
            None
        }
    }
}

fn read_moment(node: &Node, faults: &mut Faults<'_>) -> Option<MomentEntry> {
    let Value::List(_) = &node.value else {
        return field(node, "`moment`", faults).map(MomentEntry::Plane);
    };
    let components = crate::input::field::fields(node, "`moment`", faults)?;
    if components.value.len() == 3 {
        return Some(MomentEntry::Components(components));
    }
    let message = format!("`moment` must have 3 components, found {}", components.value.len());
    faults.at(&node.span, message).accepted("a number (about z) or 3 components");
    None
}

pub(super) fn read_combination(table: &Table, faults: &mut Faults<'_>) -> CombinationEntry {
    let keys = Fields::open(table, "in `[[combination]]`", &["name", "factors"], &[], faults);
    let name = keys.required_text("name", faults);
    let mut factors = Vec::new();
    match keys.table("factors", faults) {
        Given::Faulty => {}
        Given::Absent => keys.missing("factors", "a table of cases with their factors", faults),
        Given::Value(table) => {
            for entry in &table.entries {
                let case = Located { span: entry.key_span.clone(), value: entry.key.clone() };
                let what = format!("the factor of `{}`", crate::input::faults::shortened(&entry.key));
                factors.push((case, field(&entry.node, &what, faults)));
            }
            if factors.is_empty() {
                faults.at(&table.span, "the combination has no factor").accepted("`{ case = factor, ... }`");
            }
        }
    }
    CombinationEntry { name, factors }
}

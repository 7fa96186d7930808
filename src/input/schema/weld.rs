//! Welds: size by `leg`, `legs` or `throat`, run by `path` or `arc`.

use super::material::{FillerEntry, read_filler};
use crate::input::document::{Node, Table, Value};
use crate::input::faults::{Faults, Span};
use crate::input::field::{Field, Given, Located, fields, text, wrong_kind};
use crate::input::fields::Fields;

const KEYS: [&str; 11] =
    ["name", "leg", "legs", "throat", "dihedral", "sides", "filler", "path", "arc", "plates", "set"];
const LATER: [&str; 8] =
    ["single_sided", "hss_wall", "end_loaded", "edge", "full_size_to_ends", "faces", "category", "made"];

/// A point or vector as written: two or three components.
pub(in crate::input) type Point = Located<Vec<Field>>;

/// The size of a weld as written.
#[derive(Debug, Clone)]
pub(in crate::input) enum SizeEntry {
    /// Equal legs.
    Leg(Field),
    /// Two legs.
    Legs(Located<Vec<Field>>),
    /// Effective throat.
    Throat(Field),
}

/// An arc as written.
#[derive(Debug, Clone)]
pub(in crate::input) struct ArcEntry {
    /// Place of its table.
    pub(in crate::input) span: Span,
    /// Centre.
    pub(in crate::input) centre: Given<Point>,
    /// Radius.
    pub(in crate::input) radius: Given<Field>,
    /// Angle of the start.
    pub(in crate::input) start: Given<Field>,
    /// Angle swept.
    pub(in crate::input) sweep: Given<Field>,
    /// Normal of its plane.
    pub(in crate::input) normal: Given<Point>,
}

/// A weld as written.
#[derive(Debug, Clone)]
pub(in crate::input) struct WeldEntry {
    /// Place of its table.
    pub(in crate::input) span: Span,
    /// Name.
    pub(in crate::input) name: Given<Located<String>>,
    /// Size.
    pub(in crate::input) size: Option<SizeEntry>,
    /// Angle between the fusion faces.
    pub(in crate::input) dihedral: Given<Field>,
    /// 1 or 2.
    pub(in crate::input) sides: Given<Field>,
    /// Filler metal of this weld.
    pub(in crate::input) filler: Given<FillerEntry>,
    /// Points of a polyline.
    pub(in crate::input) path: Given<Located<Vec<Point>>>,
    /// Arc.
    pub(in crate::input) arc: Given<ArcEntry>,
    /// Names of the plates joined.
    pub(in crate::input) plates: Vec<Located<String>>,
    /// Set of welds sized together.
    pub(in crate::input) set: Given<Located<String>>,
}

pub(super) fn read(table: &Table, faults: &mut Faults<'_>) -> WeldEntry {
    let keys = Fields::open(table, "in `[[weld]]`", &KEYS, &LATER, faults);
    let path = keys.get("path").map_or(Given::Absent, |node| Given::reported(read_path(node, faults)));
    let arc = match keys.table("arc", faults) {
        Given::Absent => Given::Absent,
        Given::Faulty => Given::Faulty,
        Given::Value(table) => Given::Value(read_arc(table, faults)),
    };
    if path.is_absent() && arc.is_absent() {
        if !keys.meant(&["path", "arc"]) {
            faults.at(keys.span(), "the weld has no run").accepted("`path` (a polyline) or `arc`");
        }
    } else if !path.is_absent() && !arc.is_absent() {
        faults
            .at(keys.key_span("arc"), "the weld has a path and an arc")
            .accepted("`path` or `arc`")
            .hint("write two welds");
    }
    WeldEntry {
        span: table.span.clone(),
        name: keys.required_text("name", faults),
        size: read_size(&keys, faults),
        dihedral: keys.field("dihedral", faults),
        sides: keys.field("sides", faults),
        filler: keys.get("filler").map_or(Given::Absent, |node| Given::reported(read_filler(node, faults))),
        path,
        arc,
        plates: read_plates(&keys, faults),
        set: keys.text("set", faults),
    }
}

fn read_size(keys: &Fields<'_>, faults: &mut Faults<'_>) -> Option<SizeEntry> {
    let given: Vec<&str> =
        ["leg", "legs", "throat"].into_iter().filter(|key| keys.get(key).is_some()).collect();
    let leg = keys.field("leg", faults);
    let legs = keys.fields("legs", faults);
    let throat = keys.field("throat", faults);
    let accepted = "one of `leg`, `legs` and `throat`";
    match given.as_slice() {
        [] if keys.meant(&["leg", "legs", "throat"]) => None,
        [] => {
            faults.at(keys.span(), "the weld has no size").accepted(accepted);
            None
        }
        [_] => {
            if let Given::Value(legs) = &legs
                && legs.value.len() != 2
            {
                let message = format!("`legs` must have two lengths, found {}", legs.value.len());
                faults.at(&legs.span, message);
                return None;
            }
            (leg.value().cloned().map(SizeEntry::Leg))
                .or_else(|| legs.value().cloned().map(SizeEntry::Legs))
                .or_else(|| throat.value().cloned().map(SizeEntry::Throat))
        }
        [first, .., last] => {
            let message = format!("the weld has more than one size, found `{first}` and `{last}`");
            faults.at(keys.key_span(last), message).accepted(accepted);
            None
        }
    }
}

/// A point of two or three components.
pub(super) fn read_point(node: &Node, name: &str, faults: &mut Faults<'_>) -> Option<Point> {
    let point = fields(node, name, faults)?;
    if matches!(point.value.len(), 2 | 3) {
        return Some(point);
    }
    let message = format!("{name} must have 2 or 3 components, found {}", point.value.len());
    faults.at(&node.span, message);
    None
}

fn read_path(node: &Node, faults: &mut Faults<'_>) -> Option<Located<Vec<Point>>> {
    let Value::List(items) = &node.value else {
        wrong_kind(node, "`path`", "a list of points", faults);
        return None;
    };
    // A faulty point keeps its place without components, so that the others are still checked.
    let faulty = |item: &Node| Located { span: item.span.clone(), value: Vec::new() };
    let points: Vec<Point> = items
        .iter()
        .map(|item| read_point(item, "a point of `path`", faults).unwrap_or_else(|| faulty(item)))
        .collect();
    if points.len() < 2 {
        let message = format!("`path` must have at least two points, found {}", points.len());
        faults.at(&node.span, message);
        return None;
    }
    Some(Located { span: node.span.clone(), value: points })
}

fn read_arc(table: &Table, faults: &mut Faults<'_>) -> ArcEntry {
    let keys =
        Fields::open(table, "in `arc`", &["centre", "radius", "start", "sweep", "normal"], &[], faults);
    let point = |key: &str, faults: &mut Faults<'_>| {
        keys.get(key)
            .map_or(Given::Absent, |node| Given::reported(read_point(node, &format!("`{key}`"), faults)))
    };
    let centre = point("centre", faults);
    if centre.is_absent() {
        keys.missing("centre", "a point", faults);
    }
    ArcEntry {
        span: table.span.clone(),
        centre,
        radius: keys.required_field("radius", "a length", faults),
        start: keys.field("start", faults),
        sweep: keys.field("sweep", faults),
        normal: point("normal", faults),
    }
}

fn read_plates(keys: &Fields<'_>, faults: &mut Faults<'_>) -> Vec<Located<String>> {
    match keys.get("plates") {
        None => Vec::new(),
        Some(Node { value: Value::List(items), .. }) => {
            items.iter().filter_map(|item| text(item, "a name in `plates`", faults)).collect()
        }
        Some(node) => {
            wrong_kind(node, "`plates`", "a list of names of plates", faults);
            Vec::new()
        }
    }
}

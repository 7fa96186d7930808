//! Mirror of the joint file: which keys there are, of what kind, before any number is computed.
//!
//! Structural faults (unknown, missing, later and wrongly typed keys) are found here, once for a file; the
//! numbers wait as `Field`s for the parameters, so that one schema serves many parameter values.

mod law;
mod load;
mod material;
mod weld;

pub(super) use law::{CurveEntry, LawEntry, OwnLaw};
pub(super) use load::{CombinationEntry, ForceEntry, LoadEntry, MomentEntry};
pub(super) use material::{FillerEntry, PlateEntry};
pub(super) use weld::{ArcEntry, Point, SizeEntry, WeldEntry};

use super::document::{Node, Table, Value};
use super::faults::Faults;
use super::field::{Field, Given, Located, choice, wrong_kind};
use super::fields::Fields;
use super::parameters::{self, ParameterEntry};
use crate::model::Document;
use crate::units::UnitSystem;

const KEYS: [&str; 13] = [
    "title",
    "units",
    "rules",
    "law",
    "elements",
    "action",
    "document",
    "parameters",
    "filler",
    "plate",
    "weld",
    "load",
    "combination",
];
const LATER: [&str; 3] = ["gamma_m2", "loads", "bearing"];

/// Everything a joint file says.
#[derive(Debug, Clone)]
pub(super) struct File {
    /// Title.
    pub(super) title: Given<Located<String>>,
    /// Units of bare numbers.
    pub(super) units: Given<UnitSystem>,
    /// Identifier of the rule set.
    pub(super) rules: Given<Located<String>>,
    /// The law: an identifier or the user's own curves.
    pub(super) law: Given<LawEntry>,
    /// Elements on the longest run.
    pub(super) elements: Given<Field>,
    /// Title block.
    pub(super) document: Document,
    /// Parameters.
    pub(super) parameters: Vec<ParameterEntry>,
    /// Default filler metal.
    pub(super) filler: Given<FillerEntry>,
    /// Plates.
    pub(super) plates: Vec<PlateEntry>,
    /// Welds.
    pub(super) welds: Vec<WeldEntry>,
    /// Loads.
    pub(super) loads: Vec<LoadEntry>,
    /// Combinations.
    pub(super) combinations: Vec<CombinationEntry>,
}

/// Reads the document.
pub(super) fn read(document: &Table, faults: &mut Faults<'_>) -> File {
    let fields = Fields::open(document, "at the top of the file", &KEYS, &LATER, faults);
    read_action(&fields, faults);
    let mut parameters = Vec::new();
    if let Given::Value(table) = fields.table("parameters", faults) {
        parameters = parameters::read(table, faults);
    }
    let (plates, _) = fields.tables("plate", faults);
    let (welds, sound_welds) = fields.tables("weld", faults);
    let (loads, sound_loads) = fields.tables("load", faults);
    let (combinations, _) = fields.tables("combination", faults);
    if welds.is_empty() && sound_welds && !fields.meant(&["weld"]) {
        faults.whole("there is no weld").accepted("at least one `[[weld]]`");
    }
    if loads.is_empty() && sound_loads && !fields.meant(&["load"]) {
        faults.whole("there is no load").accepted("at least one `[[load]]`; a load of zero will do");
    }
    File {
        title: fields.text("title", faults),
        units: read_units(&fields, faults),
        rules: if fields.meant(&["rules"]) { Given::Faulty } else { read_rules(&fields, faults) },
        law: fields.get("law").map_or(Given::Absent, |node| Given::reported(law::read(node, faults))),
        elements: fields.field("elements", faults),
        document: read_document(&fields, faults),
        parameters,
        filler: fields.get("filler").map_or(Given::Absent, |node| match node.value {
            Value::Table(_) => Given::reported(material::read_filler(node, faults)),
            Value::Text(_) | Value::Number(_) | Value::Boolean | Value::Date(_) | Value::List(_) => {
                wrong_kind(node, "`filler`", "a table", faults);
                Given::Faulty
            }
        }),
        plates: plates.into_iter().map(|table| material::read_plate(table, faults)).collect(),
        welds: welds.into_iter().map(|table| weld::read(table, faults)).collect(),
        loads: loads.into_iter().map(|table| load::read_load(table, faults)).collect(),
        combinations: combinations.into_iter().map(|table| load::read_combination(table, faults)).collect(),
    }
}

fn read_units(fields: &Fields<'_>, faults: &mut Faults<'_>) -> Given<UnitSystem> {
    let text = fields.text("units", faults);
    if text.is_absent() {
        fields.missing("units", "`metric` (mm, kN, kN m, MPa) or `us` (in, kip, kip in, ksi)", faults);
    }
    match text {
        Given::Absent => Given::Absent,
        Given::Faulty => Given::Faulty,
        Given::Value(text) => {
            let chosen = choice(&text, "units", &["metric", "us"], faults);
            Given::reported(chosen.map(|chosen| match chosen {
                "us" => UnitSystem::Us,
                _ => UnitSystem::Metric,
            }))
        }
    }
}

/// The rule set is looked up later, where the rule sets are known; so is its absence.
fn read_rules(fields: &Fields<'_>, faults: &mut Faults<'_>) -> Given<Located<String>> {
    if let Some(Node { span, value: Value::Table(_) }) = fields.get("rules") {
        faults
            .at(span, "rule sets of one's own are not available yet")
            .accepted("the identifier of a rule set")
            .hint("`weldpole rules` lists them");
        return Given::Faulty;
    }
    fields.text("rules", faults)
}

fn read_action(fields: &Fields<'_>, faults: &mut Faults<'_>) {
    if let Given::Value(action) = fields.text("action", faults) {
        if action.value == "dynamic" {
            faults.at(&action.span, "dynamic action is not available yet").accepted("`static`");
        } else {
            choice(&action, "action", &["static"], faults);
        }
    }
}

fn read_document(fields: &Fields<'_>, faults: &mut Faults<'_>) -> Document {
    let Given::Value(table) = fields.table("document", faults) else { return Document::default() };
    let keys = ["project", "subject", "author", "checker", "revision", "date"];
    let fields = Fields::open(table, "in `[document]`", &keys, &[], faults);
    let mut text = |key: &str| match fields.get(key) {
        // A date may be written as a date.
        Some(Node { value: Value::Date(date), .. }) if key == "date" => Some(date.clone()),
        _ => fields.text(key, faults).value().map(|text| text.value.clone()),
    };
    Document {
        project: text("project"),
        subject: text("subject"),
        author: text("author"),
        checker: text("checker"),
        revision: text("revision"),
        date: text("date"),
    }
}

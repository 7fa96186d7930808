//! Reading the keys of one table: unknown, later and missing keys are reported here, and wrong kinds of value.

use super::document::{Node, Table, Value};
use super::faults::{Faults, Span, shortened};
use super::field::{Field, Given, Located, field, fields, text, wrong_kind};
use super::nearest::{listed, nearest};

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
                let message = format!("unknown key `{}` {name}", shortened(key));
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

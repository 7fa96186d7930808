//! Named quantities: values that may refer to each other in any order, and overrides from the command line.
//!
//! References are followed from what is known outward (each parameter is evaluated when all it refers to is
//! known); what is left over refers to itself in a circle, and each circle is reported once.

use super::document::Table;
use super::evaluate::{Looked, NoValue, evaluate};
use super::expression::{Action, Step, is_reserved, names};
use super::faults::{Faults, Origin, Span};
use super::field::{Content, Expression, Field, field, report};
use super::lexer::is_name;
use super::nearest::{listed, suggestion};
use super::quantity::{Quantity, number};
use std::collections::BTreeMap;

/// A parameter as written.
#[derive(Debug, Clone)]
pub(super) struct ParameterEntry {
    /// Its name.
    pub(super) name: String,
    /// Place of the name.
    pub(super) span: Span,
    /// Its value; `None` when its fault is reported.
    pub(super) field: Option<Field>,
}

/// The values of the parameters; `None` where a fault is reported.
#[derive(Debug, Clone, Default)]
pub(super) struct Parameters(BTreeMap<String, Option<Quantity>>);

impl Parameters {
    /// What a name stands for.
    pub(super) fn look_up(&self, name: &str) -> Looked {
        match self.0.get(name) {
            Some(Some(quantity)) => Looked::Value(*quantity),
            Some(None) => Looked::Faulty,
            None => Looked::Unknown,
        }
    }

    /// The value of a parameter, if there is one.
    pub(super) fn get(&self, name: &str) -> Option<Quantity> {
        self.0.get(name).copied().flatten()
    }

    /// Their names.
    pub(super) fn names(&self) -> Vec<&str> {
        self.0.keys().map(String::as_str).collect()
    }

    /// The value of an expression; `None` when its fault is reported.
    pub(super) fn value(&self, expression: &Expression, faults: &mut Faults<'_>) -> Option<Quantity> {
        let look_up = |name: &str| self.look_up(name);
        match evaluate(&expression.text, &expression.steps, &look_up, &|| self.names()) {
            Ok(quantity) => Some(quantity),
            Err(NoValue::Reported) => None,
            Err(NoValue::Fault(fault)) => {
                report(fault, &expression.origin, expression.inner, faults);
                None
            }
        }
    }
}

/// Reads the entries of `[parameters]`.
pub(super) fn read(table: &Table, faults: &mut Faults<'_>) -> Vec<ParameterEntry> {
    let mut entries = Vec::new();
    for entry in &table.entries {
        let name = entry.key.as_str();
        let shown = super::faults::shortened(name);
        if is_reserved(name) {
            faults
                .at(&entry.key_span, format!("`{shown}` is the name of a unit or a function"))
                .hint("choose another name for the parameter");
            continue;
        }
        if !is_name(name) {
            faults
                .at(&entry.key_span, format!("`{shown}` cannot be the name of a parameter"))
                .accepted("letters, digits and `_`, with a letter first");
            continue;
        }
        let field = field(&entry.node, &format!("parameter `{name}`"), faults);
        entries.push(ParameterEntry { name: name.to_owned(), span: entry.key_span.clone(), field });
    }
    entries
}

/// Replaces values by those of the command line; a name that is no parameter is a fault.
pub(super) fn override_with(
    entries: &mut [ParameterEntry],
    set: &[(String, String)],
    faults: &mut Faults<'_>,
) {
    for (name, text) in set {
        let origin = Origin::Option { name: "--set", text: format!("{name}={text}") };
        let Some(entry) = entry(entries, name, &origin, faults) else { continue };
        let expression = Expression::read(text, origin, None, faults);
        entry.field = expression.map(|expression| overriding(name, expression));
    }
}

/// Replaces one value by a quantity that is known already.
pub(super) fn give(
    entries: &mut [ParameterEntry],
    name: &str,
    quantity: Quantity,
    origin: Origin,
    faults: &mut Faults<'_>,
) {
    let Some(entry) = entry(entries, name, &origin, faults) else { return };
    let text = number(quantity.value);
    let steps = vec![Step { action: Action::Push(quantity), span: 0..text.len() }];
    entry.field = Some(overriding(name, Expression { text, steps, origin, inner: None }));
}

fn overriding(name: &str, expression: Expression) -> Field {
    let origin = expression.origin.clone();
    Field { name: format!("parameter `{name}`"), origin, content: Content::Expression(expression) }
}

/// The entry of this name; a fault when there is none.
fn entry<'e>(
    entries: &'e mut [ParameterEntry],
    name: &str,
    origin: &Origin,
    faults: &mut Faults<'_>,
) -> Option<&'e mut ParameterEntry> {
    if let Some(at) = entries.iter().position(|entry| entry.name == name) {
        return entries.get_mut(at);
    }
    let names: Vec<&str> = entries.iter().map(|entry| entry.name.as_str()).collect();
    report_unknown(name, &names, origin, faults);
    None
}

/// Reports a name of the command line that is none of those known.
pub(super) fn report_unknown(name: &str, known: &[&str], origin: &Origin, faults: &mut Faults<'_>) {
    let names = || known.iter().copied();
    let reported = faults.at(origin, "the file has no parameter of this name");
    if known.is_empty() {
        reported.hint("name it under `[parameters]`");
    } else {
        reported.accepted(listed(names())).hint_if(suggestion(name, names()));
    }
}

/// The values of all parameters.
pub(super) fn resolve(entries: &[ParameterEntry], faults: &mut Faults<'_>) -> Parameters {
    let mut parameters = Parameters::default();
    let index: BTreeMap<&str, usize> =
        entries.iter().enumerate().map(|(at, entry)| (entry.name.as_str(), at)).collect();
    let references: Vec<Vec<usize>> = entries
        .iter()
        .map(|entry| match entry.field.as_ref().map(|field| &field.content) {
            Some(Content::Expression(expression)) => {
                let mut found: Vec<usize> =
                    names(&expression.steps).filter_map(|name| index.get(name).copied()).collect();
                found.sort_unstable();
                found.dedup();
                found
            }
            Some(Content::Bare(_) | Content::Faulty) | None => Vec::new(),
        })
        .collect();
    let mut users: Vec<Vec<usize>> = vec![Vec::new(); entries.len()];
    for (user, found) in references.iter().enumerate() {
        for used in found {
            users[*used].push(user);
        }
    }
    let mut waiting: Vec<usize> = references.iter().map(Vec::len).collect();
    let mut ready: Vec<usize> = (0..entries.len()).filter(|at| waiting[*at] == 0).collect();
    let mut next = 0;
    // Every name is entered first, so that an unknown name gets its suggestion from all of them.
    for entry in entries {
        parameters.0.insert(entry.name.clone(), None);
    }
    while let Some(at) = ready.get(next).copied() {
        next += 1;
        let value = match entries[at].field.as_ref().map(|field| &field.content) {
            Some(Content::Bare(number)) => Some(Quantity::pure(*number)),
            Some(Content::Expression(expression)) => parameters.value(expression, faults),
            Some(Content::Faulty) | None => None,
        };
        parameters.0.insert(entries[at].name.clone(), value);
        for user in &users[at] {
            waiting[*user] -= 1;
            if waiting[*user] == 0 {
                ready.push(*user);
            }
        }
    }
    report_circles(entries, &references, &waiting, faults);
    parameters
}

fn report_circles(
    entries: &[ParameterEntry],
    references: &[Vec<usize>],
    waiting: &[usize],
    faults: &mut Faults<'_>,
) {
    let mut visited = vec![false; entries.len()];
    for start in 0..entries.len() {
        // Every parameter that waits refers to one that waits: following them must come back somewhere.
        let mut path = Vec::new();
        let mut at = start;
        while waiting[at] > 0 && !visited[at] {
            visited[at] = true;
            path.push(at);
            let Some(next) = references[at].iter().copied().find(|next| waiting[*next] > 0) else { break };
            at = next;
        }
        let Some(first) = path.iter().position(|member| *member == at) else { continue };
        let circle = &path[first..];
        if waiting[at] == 0 || circle.is_empty() {
            continue;
        }
        let mut chain = String::new();
        for member in circle {
            chain.push_str(&format!("`{}` -> ", entries[*member].name));
        }
        let head = &entries[circle[0]];
        let message = if circle.len() == 1 {
            format!("the parameter `{}` refers to itself", head.name)
        } else {
            format!("parameters refer to each other in a circle: {chain}`{}`", head.name)
        };
        let origin = match head.field.as_ref().map(|field| &field.origin) {
            Some(origin @ Origin::Option { .. }) => origin.clone(),
            Some(Origin::File(_)) | None => Origin::from(&head.span),
        };
        faults.at(origin, message).hint("give one of them a value of its own");
    }
}

#[cfg(test)]
#[allow(clippy::float_cmp)] // exact factors are meant exactly
mod tests {
    use super::super::document;
    use super::*;

    fn values(text: &str, set: &[(&str, &str)]) -> Result<Vec<(String, f64)>, Vec<String>> {
        let mut faults = Faults::new("f", text);
        let table = document::read(text, &mut faults).unwrap();
        let mut entries = read(&table, &mut faults);
        let set: Vec<(String, String)> =
            set.iter().map(|(name, text)| ((*name).to_owned(), (*text).to_owned())).collect();
        override_with(&mut entries, &set, &mut faults);
        let parameters = resolve(&entries, &mut faults);
        if faults.is_empty() {
            let value = |quantity: Option<Quantity>| quantity.unwrap().value;
            return Ok(parameters.0.into_iter().map(|(name, quantity)| (name, value(quantity))).collect());
        }
        Err(faults.finish().iter().map(ToString::to_string).collect())
    }

    #[test]
    fn any_order_will_do() {
        let found = values("a = \"2*b + c\"\nb = \"c/2\"\nc = \"8 in\"\nn = 3\n", &[]).unwrap();
        let numbers: Vec<f64> = found.iter().map(|(_, value)| *value).collect();
        assert_eq!(numbers, [16.0 * 25.4, 4.0 * 25.4, 8.0 * 25.4, 3.0]);
    }

    #[test]
    fn circles_are_reported_once() {
        let faults = values("a = \"b\"\nb = \"c\"\nc = \"b\"\nd = \"d\"\ne = \"d + 1\"\n", &[]).unwrap_err();
        assert_eq!(faults.len(), 2, "{faults:?}");
        assert!(faults[0].contains("in a circle: `b` -> `c` -> `b`"), "{faults:?}");
        assert!(faults[1].contains("`d` refers to itself"), "{faults:?}");
    }

    #[test]
    fn overrides_replace_values() {
        assert_eq!(values("b = \"1 mm\"\n", &[("b", "140mm")]).unwrap()[0].1, 140.0);
        assert_eq!(values("b = 2\nc = \"3*b\"", &[("b", "5")]).unwrap()[1].1, 15.0);
        let faults = values("width = 2\n", &[("widht", "5")]).unwrap_err();
        assert_eq!(
            faults,
            ["--set: in `widht=5`: the file has no parameter of this name; accepted: `width`; \
              hint: did you mean `width`?"]
        );
        let faults = values("b = 2\n", &[("b", "5 mmm")]).unwrap_err();
        assert!(faults[0].starts_with("--set: in `b=5 mmm`: `mmm` behind a number is not a unit"));
    }

    #[test]
    fn bad_names_and_values_are_faults() {
        let text = "mm = 1\nsqrt = 2\na-b = 3\nc = true\nd = inf\ne = \"lenght\"\nlength = 1\n";
        let faults = values(text, &[]).unwrap_err();
        assert_eq!(faults.len(), 6, "{faults:?}");
        assert!(faults[5].ends_with("did you mean `length`?"), "{faults:?}");
    }

    #[test]
    fn a_long_chain_does_not_overflow() {
        let mut text = "p0 = \"1 mm\"\n".to_owned();
        for number in 1..5000 {
            text.push_str(&format!("p{number} = \"p{} + 1 mm\"\n", number - 1));
        }
        let found = values(&text, &[]).unwrap();
        assert!(found.contains(&("p4999".to_owned(), 5000.0)));
    }
}

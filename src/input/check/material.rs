//! Filler metals and plates.

use super::super::catalog;
use super::super::faults::{Faults, Origin, Span, shortened};
use super::super::field::{Content, Expression, Field, Given, Located};
use super::super::lexer::is_name;
use super::super::nearest::{listed, suggestion};
use super::super::schema::{FillerEntry, PlateEntry};
use super::value::Values;
use crate::model::{Filler, Plate};

/// The filler metal; `None` when a fault is reported.
pub(super) fn filler(entry: &FillerEntry, values: &Values<'_>, faults: &mut Faults<'_>) -> Option<Filler> {
    match entry {
        FillerEntry::Strength(field) => of_strength(field, values, faults),
        FillerEntry::Class(class) => of_class(&class.value, &class.span, faults),
        FillerEntry::Text(text) => {
            let content = text.value.content.trim();
            let class = catalog::electrode(content).is_some();
            if is_name(content) && !values.is_parameter(content) {
                return of_class(content, &text.span, faults);
            }
            if class {
                let message = format!("`{content}` is a class of filler metal and a parameter");
                faults.at(&text.span, message).hint("give the parameter another name");
                return None;
            }
            let origin = Origin::from(&text.span);
            let expression = Expression::read(&text.value.content, origin.clone(), text.value.inner, faults)?;
            let content = Content::Expression(expression);
            of_strength(&Field { name: "`filler`".to_owned(), origin, content }, values, faults)
        }
    }
}

fn of_strength(field: &Field, values: &Values<'_>, faults: &mut Faults<'_>) -> Option<Filler> {
    let strength = values.strength(field, faults)?;
    match Filler::new(None, strength) {
        Ok(filler) => Some(filler),
        Err(error) => {
            faults.at(&field.origin, error.to_string());
            None
        }
    }
}

fn of_class(class: &str, span: &Span, faults: &mut Faults<'_>) -> Option<Filler> {
    let classes = || catalog::electrodes().iter().map(|electrode| electrode.class.as_str());
    let Some(electrode) = catalog::electrode(class) else {
        faults
            .at(span, format!("unknown class of filler metal `{}`", shortened(class)))
            .accepted(listed(classes()))
            .hint_if(
                suggestion(class, classes())
                    .or_else(|| Some("give its tensile strength as `strength`".to_owned())),
            );
        return None;
    };
    match Filler::new(Some(electrode.class.clone()), electrode.strength) {
        Ok(filler) => Some(filler),
        Err(error) => {
            faults.at(span, error.to_string());
            None
        }
    }
}

/// The plates, with unique names.
pub(super) fn plates(entries: &[PlateEntry], values: &Values<'_>, faults: &mut Faults<'_>) -> Vec<Plate> {
    unique(entries.iter().filter_map(|entry| entry.name.value()), "plates", faults);
    entries.iter().filter_map(|entry| plate(entry, values, faults)).collect()
}

fn plate(entry: &PlateEntry, values: &Values<'_>, faults: &mut Faults<'_>) -> Option<Plate> {
    let thickness = entry.thickness.value().and_then(|field| values.size(field, faults));
    let mut strength = |given: &Given<Field>| given.value().and_then(|field| values.strength(field, faults));
    let yield_strength = strength(&entry.yield_strength);
    let ultimate_strength = strength(&entry.ultimate_strength);
    if let (Some(least), Some(greatest)) = (yield_strength, ultimate_strength)
        && least > greatest
    {
        faults.at(&entry.span, "the yield strength of the plate is greater than its tensile strength");
    }
    Some(Plate {
        name: entry.name.value()?.value.clone(),
        thickness: thickness?,
        grade: entry.grade.value().map(|grade| grade.value.clone()),
        yield_strength,
        ultimate_strength,
    })
}

/// Reports names given twice.
pub(super) fn unique<'n>(
    names: impl Iterator<Item = &'n Located<String>>,
    what: &str,
    faults: &mut Faults<'_>,
) {
    let mut seen: std::collections::BTreeMap<&str, &Span> = std::collections::BTreeMap::new();
    for name in names {
        if let Some(first) = seen.get(name.value.as_str()) {
            let line = faults.line(first);
            let message =
                format!("two {what} are named `{}`, the first on line {line}", shortened(&name.value));
            faults.at(&name.span, message).hint("give each its own name");
        } else {
            seen.insert(&name.value, &name.span);
        }
    }
}

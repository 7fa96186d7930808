//! Schema to model: numbers with their units, ranges, references between tables; all faults in one pass.
//!
//! A value that cannot be had is `None` and its fault is in the list; the joint is built when the list is
//! empty. Parameters come in as values, so that a caller can build many joints from one schema.

mod geometry;
mod law;
mod load;
mod material;
mod value;
mod weld;

pub(super) use load::LARGEST_ANGLE;

use super::Options;
use super::catalog;
use super::faults::{Faults, Origin, shortened};
use super::field::{Field, Given};
use super::nearest::{listed, suggestion};
use super::parameters::Parameters;
use super::schema::File;
use crate::model::{Discretisation, Joint, RuleSet, WeldGroup};
use crate::units::UnitSystem;
use value::Values;

/// Most mid-point elements on the longest run.
const MOST_ELEMENTS: usize = 100_000;

/// Builds the joint; `None` when there is a fault.
pub(super) fn joint(
    file: &str,
    schema: &File,
    parameters: &Parameters,
    options: &Options,
    faults: &mut Faults<'_>,
) -> Option<Joint> {
    let units = schema.units.value().copied().unwrap_or(UnitSystem::Metric);
    let values = Values::new(units, parameters);
    let rules = rule_set(schema, options, faults);
    let law = law::law(schema, options, rules, &values, faults);
    let discretisation = discretisation(schema, options, &values, faults);
    let filler = match &schema.filler {
        Given::Absent => Given::Absent,
        Given::Faulty => Given::Faulty,
        Given::Value(entry) => Given::reported(material::filler(entry, &values, faults)),
    };
    let plates = material::plates(&schema.plates, &values, faults);
    let welds = weld::welds(schema, &filler, &values, faults);
    let (cases, unused_cases) = load::cases(schema, &values, faults);
    let combined = !schema.combinations.is_empty();
    if !faults.is_empty() {
        return None;
    }
    let group = match WeldGroup::new(welds) {
        Ok(group) => group,
        Err(error) => {
            faults.whole(error.to_string());
            return None;
        }
    };
    let title = schema.title.value().map_or_else(|| file_name(file), |title| title.value.clone());
    Some(Joint {
        file: file.to_owned(),
        title,
        units,
        rules: rules?.clone(),
        law: law?,
        discretisation: discretisation?,
        filler: filler.value().cloned(),
        plates,
        group,
        cases,
        combined,
        unused_cases,
        document: schema.document.clone(),
    })
}

/// The last part of a path.
fn file_name(file: &str) -> String {
    file.rsplit(['/', '\\']).next().unwrap_or(file).to_owned()
}

fn rule_set(schema: &File, options: &Options, faults: &mut Faults<'_>) -> Option<&'static RuleSet> {
    let ids = || catalog::rule_sets().iter().map(|rules| rules.id.as_str());
    let mut find = |id: &str, origin: Origin| {
        let found = catalog::rule_set(id);
        if found.is_none() {
            faults
                .at(origin, format!("unknown rule set `{}`", shortened(id)))
                .accepted(listed(ids()))
                .hint_if(suggestion(id, ids()));
        }
        found
    };
    let in_file = schema.rules.value().and_then(|id| find(&id.value, Origin::from(&id.span)));
    if let Some(id) = &options.rules {
        return find(id, Origin::Option { name: "--rules", text: String::new() });
    }
    if schema.rules.is_absent() {
        faults
            .at(0..0, "the key `rules` is missing at the top of the file")
            .accepted(listed(ids()))
            .hint("`weldpole rules` lists the rule sets");
    }
    in_file
}

fn discretisation(
    schema: &File,
    options: &Options,
    values: &Values<'_>,
    faults: &mut Faults<'_>,
) -> Option<Discretisation> {
    let in_file = match &schema.elements {
        Given::Absent => Some(Discretisation::Continuous),
        Given::Faulty => None,
        Given::Value(field) => elements(field, values, faults).map(Discretisation::Elements),
    };
    match options.elements {
        None => in_file,
        Some(count) if (1..=MOST_ELEMENTS).contains(&count) => Some(Discretisation::Elements(count)),
        Some(count) => {
            let origin = Origin::Option { name: "--elements", text: String::new() };
            faults
                .at(origin, format!("the number of elements is out of range, found {count}"))
                .accepted(format!("1 to {MOST_ELEMENTS}"));
            None
        }
    }
}

fn elements(field: &Field, values: &Values<'_>, faults: &mut Faults<'_>) -> Option<usize> {
    values.whole(field, 1, MOST_ELEMENTS, faults)
}

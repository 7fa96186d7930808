//! The load-deformation law: a known one, or the user's own curves.

use super::super::Options;
use super::super::catalog;
use super::super::faults::{Faults, Origin, shortened};
use super::super::field::Given;
use super::super::nearest::{listed, suggestion};
use super::super::schema::{CurveEntry, File, LawEntry, OwnLaw};
use super::value::Values;
use crate::model::{Confirmation, Law, LawForm, RuleSet, TableCurve, TableLaw};
use crate::units::Dimension;

/// The law of the command line, of the file, or the default of the rule set.
pub(super) fn law(
    schema: &File,
    options: &Options,
    rules: Option<&RuleSet>,
    values: &Values<'_>,
    faults: &mut Faults<'_>,
) -> Option<Law> {
    let in_file = match &schema.law {
        Given::Absent => rules.and_then(|rules| catalog::law(&rules.law)).cloned(),
        Given::Faulty => None,
        Given::Value(LawEntry::Known(id)) => known(&id.value, Origin::from(&id.span), faults),
        Given::Value(LawEntry::Own(own)) => self::own(own, values, faults),
    };
    match &options.law {
        Some(id) => known(id, Origin::Option { name: "--law", text: String::new() }, faults),
        None => in_file,
    }
}

fn known(id: &str, origin: Origin, faults: &mut Faults<'_>) -> Option<Law> {
    let ids = || catalog::laws().iter().map(|law| law.id.as_str());
    let found = catalog::law(id);
    if found.is_none() {
        faults
            .at(origin, format!("unknown law `{}`", shortened(id)))
            .accepted(listed(ids()))
            .hint_if(suggestion(id, ids()));
    }
    found.cloned()
}

fn own(entry: &OwnLaw, values: &Values<'_>, faults: &mut Faults<'_>) -> Option<Law> {
    let mut curves = Vec::new();
    for curve in &entry.curves {
        curves.extend(self::curve(curve, values, faults));
    }
    let name = entry.name.value()?.value.clone();
    if curves.is_empty() || curves.len() != entry.curves.len() {
        return None;
    }
    match TableLaw::new(curves) {
        Ok(table) => Some(Law {
            id: "own".to_owned(),
            title: name,
            source: "curves of the joint file".to_owned(),
            status: Confirmation::Recalled,
            form: LawForm::Table(table),
        }),
        Err(error) => {
            faults.at(&entry.span, error.to_string());
            None
        }
    }
}

/// One curve, checked by itself so that its fault stands at its place.
fn curve(entry: &CurveEntry, values: &Values<'_>, faults: &mut Faults<'_>) -> Option<TableCurve> {
    let angle = entry
        .angle
        .value()
        .and_then(|field| values.between(field, Dimension::Angle, (0.0, 90.0), faults))
        .map(|angle| angle.to_degrees().clamp(0.0, 90.0));
    let mut points = Vec::new();
    let mut sound = true;
    for point in entry.points.value()? {
        let read: Vec<Option<f64>> =
            point.value.iter().map(|field| values.number(field, Dimension::Pure, faults)).collect();
        match read.as_slice() {
            [Some(deformation), Some(strength)] => points.push([*deformation, *strength]),
            [_, _] => sound = false,
            _ => {
                let found = point.value.len();
                let message = format!("a point of the curve must have two numbers, found {found}");
                faults.at(&point.span, message);
                sound = false;
            }
        }
    }
    if !sound {
        return None;
    }
    let curve = TableCurve { angle: angle?, points };
    if let Err(error) = TableLaw::new(vec![curve.clone()]) {
        faults.at(&entry.span, error.to_string());
        return None;
    }
    Some(curve)
}

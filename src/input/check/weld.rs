//! Welds: size, run, filler metal, references to plates.

use super::super::faults::{Faults, shortened};
use super::super::field::Given;
use super::super::nearest::{listed, suggestion};
use super::super::schema::{File, SizeEntry, WeldEntry};
use super::value::Values;
use super::{geometry, material};
use crate::model::{Filler, FilletSize, Run, Weld};
use crate::units::Dimension;
use std::f64::consts::FRAC_PI_2;

/// The welds of a file.
pub(super) fn welds(
    schema: &File,
    default: &Given<Filler>,
    values: &Values<'_>,
    faults: &mut Faults<'_>,
) -> Vec<Weld> {
    material::unique(schema.welds.iter().filter_map(|weld| weld.name.value()), "welds", faults);
    let mut welds = Vec::new();
    for entry in &schema.welds {
        check_plates(entry, schema, faults);
        welds.extend(weld(entry, default, values, faults));
    }
    welds
}

fn weld(
    entry: &WeldEntry,
    default: &Given<Filler>,
    values: &Values<'_>,
    faults: &mut Faults<'_>,
) -> Option<Weld> {
    let size = size(entry, values, faults);
    let filler = filler(entry, default, values, faults);
    let sides = match &entry.sides {
        Given::Absent => Some(1),
        Given::Faulty => None,
        Given::Value(field) => values.whole(field, 1, 2, faults).map(|sides| if sides == 2 { 2 } else { 1 }),
    };
    let runs = runs(entry, values, faults);
    Some(Weld {
        name: entry.name.value()?.value.clone(),
        runs: runs?,
        size: size?,
        filler: filler?,
        sides: sides?,
        plates: entry.plates.iter().map(|plate| plate.value.clone()).collect(),
        set: entry.set.value().map(|set| set.value.clone()),
    })
}

/// The runs of the path or the arc; both are checked when both are given, which is a fault of its own.
fn runs(entry: &WeldEntry, values: &Values<'_>, faults: &mut Faults<'_>) -> Option<Vec<Run>> {
    let path = entry.path.value().and_then(|path| geometry::path(path, values, faults));
    let arc = entry.arc.value().and_then(|arc| geometry::arc(arc, values, faults));
    path.or(arc)
}

fn size(entry: &WeldEntry, values: &Values<'_>, faults: &mut Faults<'_>) -> Option<FilletSize> {
    let dihedral = match &entry.dihedral {
        Given::Absent => Some(FRAC_PI_2),
        Given::Faulty => None,
        Given::Value(field) => values.between(field, Dimension::Angle, (60.0, 120.0), faults),
    };
    let made = match entry.size.as_ref()? {
        SizeEntry::Leg(field) => {
            let leg = values.size(field, faults)?;
            FilletSize::from_legs([leg, leg], dihedral?)
        }
        SizeEntry::Legs(legs) => {
            let read: Vec<Option<f64>> = legs.value.iter().map(|field| values.size(field, faults)).collect();
            let [Some(first), Some(second)] = read.as_slice() else { return None };
            FilletSize::from_legs([*first, *second], dihedral?)
        }
        SizeEntry::Throat(field) => FilletSize::from_throat(values.size(field, faults)?, dihedral?),
    };
    match made {
        Ok(size) => Some(size),
        Err(error) => {
            faults.at(&entry.span, error.to_string());
            None
        }
    }
}

fn filler(
    entry: &WeldEntry,
    default: &Given<Filler>,
    values: &Values<'_>,
    faults: &mut Faults<'_>,
) -> Option<Filler> {
    match (&entry.filler, default) {
        (Given::Value(own), _) => material::filler(own, values, faults),
        (Given::Faulty, _) | (Given::Absent, Given::Faulty) => None,
        (Given::Absent, Given::Value(filler)) => Some(filler.clone()),
        (Given::Absent, Given::Absent) => {
            faults
                .at(&entry.span, "the weld has no filler metal")
                .accepted("`[filler]` for all welds, or `filler` of this weld");
            None
        }
    }
}

/// Names of plates are checked when plates are declared.
fn check_plates(entry: &WeldEntry, schema: &File, faults: &mut Faults<'_>) {
    if schema.plates.is_empty() || schema.plates.iter().any(|plate| plate.name.value().is_none()) {
        return;
    }
    let names =
        || schema.plates.iter().filter_map(|plate| plate.name.value()).map(|name| name.value.as_str());
    for plate in &entry.plates {
        if !names().any(|name| name == plate.value) {
            faults
                .at(&plate.span, format!("there is no plate `{}`", shortened(&plate.value)))
                .accepted(listed(names()))
                .hint_if(suggestion(&plate.value, names()));
        }
    }
}

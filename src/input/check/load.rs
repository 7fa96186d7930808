//! Loads, cases and combinations. Factors apply to loads, never to results.
//!
//! A force of size F at the angle a from the x axis is `(F cos a, F sin a)`, see [`direction`].

use super::super::faults::{Faults, shortened};
use super::super::field::Given;
use super::super::nearest::{listed, suggestion};
use super::super::schema::{CombinationEntry, File, ForceEntry, LoadEntry, MomentEntry};
use super::value::Values;
use super::{geometry, material};
use crate::model::{AppliedLoad, LARGEST_FORCE, LARGEST_MOMENT, LoadCase, Vector, Wrench, direction};
use crate::units::Dimension;

const LOADS_IN_SPACE: &str = "loads in space are not solved yet";

/// Greatest angle of a load accepted, degrees: a hundred turns.
pub(in crate::input) const LARGEST_ANGLE: f64 = 36_000.0;

/// Greatest load factor accepted in a combination.
const LARGEST_FACTOR: f64 = 1e4;

/// What has to be verified, and the names of the cases that no combination uses.
pub(super) fn cases(
    schema: &File,
    values: &Values<'_>,
    faults: &mut Faults<'_>,
) -> (Vec<LoadCase>, Vec<String>) {
    let mut gathered: Vec<(String, Vec<AppliedLoad>)> = Vec::new();
    for entry in &schema.loads {
        let wrench = wrench(entry, values, faults);
        let (Some(name), Some(wrench)) = (entry.case.value(), wrench) else { continue };
        let load =
            AppliedLoad { case: name.value.clone(), factor: 1.0, placed: !entry.at.is_absent(), wrench };
        match gathered.iter_mut().find(|(case, _)| *case == name.value) {
            Some((_, loads)) => loads.push(load),
            None => gathered.push((name.value.clone(), vec![load])),
        }
    }
    let cases: Vec<LoadCase> = gathered.into_iter().map(|(name, loads)| LoadCase::new(name, loads)).collect();
    if schema.combinations.is_empty() {
        return (cases, Vec::new());
    }
    let names = schema.combinations.iter().filter_map(|combination| combination.name.value());
    material::unique(names, "combinations", faults);
    let combined = schema
        .combinations
        .iter()
        .filter_map(|entry| combination(entry, schema, &cases, values, faults))
        .collect();
    let used = |case: &LoadCase| {
        let mut factors = schema.combinations.iter().flat_map(|entry| &entry.factors);
        factors.any(|(name, _)| name.value == case.name)
    };
    let unused = cases.iter().filter(|case| !used(case)).map(|case| case.name.clone()).collect();
    (combined, unused)
}

/// The load about its point of application.
fn wrench(entry: &LoadEntry, values: &Values<'_>, faults: &mut Faults<'_>) -> Option<Wrench> {
    let at = match &entry.at {
        Given::Absent => Some(Vector::zeros()),
        Given::Faulty => None,
        Given::Value(point) => geometry::point(point, LOADS_IN_SPACE, values, faults),
    };
    let force = match &entry.force {
        Given::Absent => Some(Vector::zeros()),
        Given::Faulty => None,
        Given::Value(force) => self::force(force, values, faults),
    };
    let moment = match &entry.moment {
        Given::Absent => Some(Vector::zeros()),
        Given::Faulty => None,
        Given::Value(moment) => self::moment(moment, values, faults),
    };
    match Wrench::new(at?, force?, moment?) {
        Ok(wrench) => Some(wrench),
        Err(error) => {
            faults.at(&entry.span, error.to_string());
            None
        }
    }
}

fn force(entry: &ForceEntry, values: &Values<'_>, faults: &mut Faults<'_>) -> Option<Vector> {
    match entry {
        ForceEntry::Components(components) => {
            let read: Vec<Option<f64>> = components
                .value
                .iter()
                .map(|field| values.limited(field, Dimension::Force, LARGEST_FORCE, faults))
                .collect();
            if let (Some(field), Some(Some(z))) = (components.value.get(2), read.get(2))
                && z.abs() > 0.0
            {
                let found = values.shown(Dimension::Force, *z);
                faults
                    .at(&field.origin, format!("{LOADS_IN_SPACE}, found a force of {found} along z"))
                    .accepted("0 along z");
                return None;
            }
            match read.as_slice() {
                [Some(x), Some(y)] | [Some(x), Some(y), Some(_)] => Some(Vector::new(*x, *y, 0.0)),
                _ => None,
            }
        }
        ForceEntry::Polar { size, angle } => {
            let length = size.value().and_then(|field| {
                let length = values.limited(field, Dimension::Force, LARGEST_FORCE, faults)?;
                if length < 0.0 {
                    let found = values.shown(Dimension::Force, length);
                    faults
                        .at(&field.origin, format!("the size of a force must not be negative, found {found}"))
                        .hint("turn its angle by 180 degrees");
                    return None;
                }
                Some(length)
            });
            let angle = angle.value().and_then(|field| {
                values.between(field, Dimension::Angle, (-LARGEST_ANGLE, LARGEST_ANGLE), faults)
            });
            Some(direction(angle?) * length?)
        }
    }
}

fn moment(entry: &MomentEntry, values: &Values<'_>, faults: &mut Faults<'_>) -> Option<Vector> {
    let components = match entry {
        MomentEntry::Plane(field) => {
            let z = values.limited(field, Dimension::Moment, LARGEST_MOMENT, faults)?;
            return Some(Vector::new(0.0, 0.0, z));
        }
        MomentEntry::Components(components) => components,
    };
    let read: Vec<Option<f64>> = components
        .value
        .iter()
        .map(|field| values.limited(field, Dimension::Moment, LARGEST_MOMENT, faults))
        .collect();
    let [Some(x), Some(y), Some(z)] = read.as_slice() else { return None };
    if x.abs() > 0.0 || y.abs() > 0.0 {
        let message = format!("{LOADS_IN_SPACE}, found a moment about x or y");
        faults.at(&components.span, message).accepted("[0, 0, moment]");
        return None;
    }
    Some(Vector::new(0.0, 0.0, *z))
}

fn combination(
    entry: &CombinationEntry,
    schema: &File,
    cases: &[LoadCase],
    values: &Values<'_>,
    faults: &mut Faults<'_>,
) -> Option<LoadCase> {
    let names = || schema.loads.iter().filter_map(|load| load.case.value()).map(|name| name.value.as_str());
    let all_named = schema.loads.iter().all(|load| load.case.value().is_some());
    let mut loads: Vec<AppliedLoad> = Vec::new();
    let mut sound = true;
    for (case, field) in &entry.factors {
        let factor =
            field.as_ref().and_then(|field| values.limited(field, Dimension::Pure, LARGEST_FACTOR, faults));
        if !names().any(|name| name == case.value) {
            sound = false;
            if all_named && names().next().is_some() {
                let mut known: Vec<&str> = Vec::new();
                for name in names() {
                    if !known.contains(&name) {
                        known.push(name);
                    }
                }
                faults
                    .at(&case.span, format!("there is no load of the case `{}`", shortened(&case.value)))
                    .accepted(listed(known.iter().copied()))
                    .hint_if(suggestion(&case.value, known.iter().copied()));
            }
            continue;
        }
        let found = cases.iter().find(|known| known.name == case.value);
        match (factor, found) {
            (Some(factor), Some(found)) => loads.extend(found.loads.iter().map(|load| AppliedLoad {
                factor,
                wrench: load.wrench.scaled(factor),
                ..load.clone()
            })),
            _ => sound = false,
        }
    }
    let name = entry.name.value()?.value.clone();
    sound.then(|| LoadCase::new(name, loads))
}

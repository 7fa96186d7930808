//! Points, paths and arcs, all in the plane z = 0 for now.

use super::super::faults::Faults;
use super::super::field::{Given, Located};
use super::super::schema::{ArcEntry, Point};
use super::value::Values;
use crate::model::{LARGEST_LENGTH, Run, SMALLEST_LENGTH, Vector};
use crate::units::Dimension;

/// What a point belongs to, for the fault of a point out of the plane.
pub(super) const WELDS_IN_SPACE: &str = "welds in space are not solved yet";

/// A point in the plane.
pub(super) fn point(
    entry: &Point,
    not_solved: &str,
    values: &Values<'_>,
    faults: &mut Faults<'_>,
) -> Option<Vector> {
    let read: Vec<Option<f64>> = entry
        .value
        .iter()
        .map(|field| values.limited(field, Dimension::Length, LARGEST_LENGTH, faults))
        .collect();
    if let (Some(field), Some(Some(z))) = (entry.value.get(2), read.get(2))
        && z.abs() > 0.0
    {
        let found = values.shown(Dimension::Length, *z);
        faults.at(&field.origin, format!("{not_solved}, found z = {found}")).accepted("z = 0");
        return None;
    }
    match read.as_slice() {
        [Some(x), Some(y)] | [Some(x), Some(y), Some(_)] => Some(Vector::new(*x, *y, 0.0)),
        _ => None,
    }
}

/// The runs of a polyline.
pub(super) fn path(
    entry: &Located<Vec<Point>>,
    values: &Values<'_>,
    faults: &mut Faults<'_>,
) -> Option<Vec<Run>> {
    let points: Vec<Option<Vector>> =
        entry.value.iter().map(|entry| point(entry, WELDS_IN_SPACE, values, faults)).collect();
    let mut runs = Vec::new();
    for (at, pair) in points.windows(2).enumerate() {
        let (Some(from), Some(to)) = (pair[0], pair[1]) else { continue };
        let span = &entry.value[at + 1].span;
        if (to - from).norm() < SMALLEST_LENGTH {
            faults
                .at(span, format!("points {} and {} of `path` coincide", at + 1, at + 2))
                .accepted("runs with a length")
                .hint("remove one of the points");
            continue;
        }
        match Run::straight(from, to) {
            Ok(run) => runs.push(run),
            Err(error) => {
                faults.at(span, error.to_string());
            }
        }
    }
    (runs.len() + 1 == entry.value.len()).then_some(runs)
}

/// The run of an arc.
pub(super) fn arc(entry: &ArcEntry, values: &Values<'_>, faults: &mut Faults<'_>) -> Option<Vec<Run>> {
    if let Given::Value(normal) = &entry.normal {
        check_normal(normal, values, faults);
    }
    let centre = entry.centre.value().and_then(|centre| point(centre, WELDS_IN_SPACE, values, faults));
    let radius = entry.radius.value().and_then(|radius| values.size(radius, faults));
    let start = match &entry.start {
        Given::Absent => Some(0.0),
        Given::Faulty => None,
        Given::Value(field) => values.between(field, Dimension::Angle, (-36_000.0, 36_000.0), faults),
    };
    let sweep = match &entry.sweep {
        Given::Absent => Some(std::f64::consts::TAU),
        Given::Faulty => None,
        Given::Value(field) => values.between(field, Dimension::Angle, (-360.0, 360.0), faults),
    };
    let (centre, radius, start, sweep) = (centre?, radius?, start?, sweep?);
    if radius * sweep.abs() < SMALLEST_LENGTH {
        let span = entry.sweep.value().map_or_else(|| (&entry.span).into(), |field| field.origin.clone());
        faults.at(span, "the arc has no length").accepted("a sweep other than zero");
        return None;
    }
    match Run::arc(centre, radius, start, sweep) {
        Ok(run) => Some(vec![run]),
        Err(error) => {
            faults.at(&entry.span, error.to_string());
            None
        }
    }
}

fn check_normal(normal: &Point, values: &Values<'_>, faults: &mut Faults<'_>) {
    let mut components = Vec::new();
    for field in &normal.value {
        let Some(component) = values.number(field, Dimension::Pure, faults) else { return };
        components.push(component);
    }
    let upright = matches!(components.as_slice(), [x, y, z] if x.abs() <= 0.0 && y.abs() <= 0.0 && *z > 0.0);
    if !upright {
        faults.at(&normal.span, format!("{WELDS_IN_SPACE}, found another normal")).accepted("[0, 0, 1]");
    }
}

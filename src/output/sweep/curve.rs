//! One variable: a row for each value, and a line where the strength jumps between two of them.

use super::labels::Labels;
use crate::analysis::{Demand, Status};
use crate::model::Basis;
use crate::output::layout::{Emphasis, Layout};
use crate::output::names::basis_name;
use crate::output::number::{MISSING, people, percent, quantity, utilisation};
use crate::output::table::{Cell, Side, Table, hanging};
use crate::output::words;
use crate::study::sweep::{Answer, Jump, PointCase, Sweep};
use crate::units::{Dimension, UnitSystem};

/// The table of a sweep over one variable.
pub(super) fn text(sweep: &Sweep, labels: &Labels<'_>, layout: &Layout) -> String {
    let variable = &sweep.variables[0];
    let mut table = Table::new(&[
        (variable.name.trim_start_matches("load."), Side::Right),
        ("ultimate", Side::Right),
        ("elastic", Side::Right),
        ("ult./el.", Side::Right),
        ("peak", Side::Right),
        ("utilis.", Side::Right),
        ("verdict", Side::Left),
        ("", Side::Flexible),
    ]);
    let measure = measure(sweep);
    let unit = measure.map_or("", |dimension| sweep.joint.units.symbol(dimension));
    table.row([variable.unit.as_str(), unit, unit, "", unit, "", "", ""].map(Cell::from).to_vec());
    for (index, point) in sweep.points.iter().enumerate() {
        let value = labels.values(0).get(index).map_or("", String::as_str);
        match &point.outcome {
            Ok(answer) => table.row(row(sweep, value, answer, measure)),
            Err(_) => table.row(faulty(value)),
        }
        for jump in sweep.jumps.iter().filter(|jump| jump.points[0] == index) {
            table.across(Cell::emphasised(&jump_line(jump, labels, sweep.joint.units), Emphasis::Caution));
        }
    }
    let heading = (layout.paint)(Emphasis::Heading, "Strength by value");
    let meaning = "nominal strengths as the size of the load; utilisation with the design factor";
    format!("{heading}\n{}{}", hanging("  ", meaning, layout.columns()), table.render(2, layout))
}

/// Force or moment: the measure of the first point with a load.
fn measure(sweep: &Sweep) -> Option<Dimension> {
    let cases = sweep.points.iter().filter_map(|point| sweep.shown_case(point));
    cases.filter_map(|case| case.demand).map(dimension).next()
}

fn dimension(demand: Demand) -> Dimension {
    if demand.in_moment { Dimension::Moment } else { Dimension::Force }
}

fn row(sweep: &Sweep, value: &str, answer: &Answer, measure: Option<Dimension>) -> Vec<Cell> {
    let Some(case) = answer.cases.get(sweep.shown) else { return faulty(value) };
    let units = sweep.joint.units;
    // A load of the other measure than the column's carries its unit.
    let strength = |factor: Option<f64>| {
        let known = factor.and_then(|factor| case.load_times(factor)).zip(case.demand.map(dimension));
        known.map_or_else(
            || MISSING.to_owned(),
            |(size, own)| {
                if Some(own) == measure { people(units.shown(own, size)) } else { quantity(units, own, size) }
            },
        )
    };
    let ratio = case.ultimate_over_elastic().map_or_else(|| MISSING.to_owned(), people);
    let exceeded = case.status == Status::Exceeded;
    let used = case.utilisation().map_or_else(|| MISSING.to_owned(), |value| utilisation(value, exceeded));
    let status = answer.status();
    vec![
        value.into(),
        strength(case.ultimate.map(|strength| strength.load_factor)).into(),
        strength(case.elastic.map(|strength| strength.load_factor)).into(),
        ratio.into(),
        strength(case.peak_load_factor).into(),
        used.into(),
        Cell::emphasised(words::status(status), words::status_emphasis(status)),
        notes(sweep, answer, case).join("; ").into(),
    ]
}

/// A point whose joint has faults.
fn faulty(value: &str) -> Vec<Cell> {
    let mut cells = vec![Cell::from(value)];
    cells.extend([MISSING; 5].map(Cell::from));
    cells.push(Cell::emphasised("no joint", Emphasis::NotSolved));
    cells.push("".into());
    cells
}

/// What is out of the ordinary at a point.
fn notes(sweep: &Sweep, answer: &Answer, case: &PointCase) -> Vec<String> {
    let mut notes = Vec::new();
    if case.demand.is_none() {
        notes.push("no load".to_owned());
    }
    if case.states > 1 {
        notes.push(format!("{} states", case.states));
    }
    if case.incomplete {
        notes.push("incomplete".to_owned());
    }
    if case.ultimate.is_some() && case.peak_load_factor.is_none() {
        notes.push("path lost".to_owned());
    }
    let usual = if sweep.joint.accepts(Basis::Ultimate) { Basis::Ultimate } else { Basis::Elastic };
    if let Some(verification) = case.verification.as_ref().filter(|found| found.basis != usual) {
        notes.push(basis_name(verification.basis).to_owned());
    }
    if let Some(other) = answer.governing.filter(|index| *index != sweep.shown)
        && let Some(used) = answer.utilisation()
    {
        let exceeded = answer.cases.get(other).is_some_and(|case| case.status == Status::Exceeded);
        notes.push(format!("other {}", utilisation(used, exceeded)));
    }
    if answer.breached {
        notes.push("detailing broken".to_owned());
    }
    notes
}

/// `--- jumps at 2.429 mm from 228.6 kN to 248.5 kN, +8.7 % ---`.
fn jump_line(jump: &Jump, labels: &Labels<'_>, units: UnitSystem) -> String {
    let [before, after] = jump.strength.map(|strength| quantity(units, dimension(strength), strength.size));
    let change = jump.relative_change();
    let sign = if change < 0.0 { '-' } else { '+' };
    let at = labels.between(jump.variable, jump.at[0]);
    format!("---- ultimate strength jumps at {at}: {before} to {after}, {sign}{} ----", percent(change))
}

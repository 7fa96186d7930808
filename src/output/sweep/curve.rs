//! One variable: a row for each value, and a line where the strength jumps between two of them.

use super::labels::Labels;
use crate::analysis::{Demand, Status};
use crate::model::Basis;
use crate::output::layout::{Emphasis, Layout};
use crate::output::number::{self, MISSING, people, percent, quantity, utilisation};
use crate::output::table::{Cell, Side, Table, clip, hanging};
use crate::output::words;
use crate::study::sweep::{Answer, Jump, PointCase, Sweep};
use crate::units::{Dimension, UnitSystem};

/// Longest name of a variable above its column.
const LONGEST_NAME: usize = 12;

/// The table of a sweep over one variable.
pub(super) fn text(sweep: &Sweep, labels: &Labels<'_>, layout: &Layout) -> String {
    let variable = &sweep.variables[0];
    let name = clip(variable.name.trim_start_matches("load."), LONGEST_NAME);
    let mut table = Table::new(&[
        (name.as_str(), Side::Right),
        ("ultimate", Side::Right),
        ("elastic", Side::Right),
        ("ult./el.", Side::Right),
        ("peak", Side::Right),
        ("utilis.", Side::Right),
        ("verdict", Side::Left),
        ("", Side::Left),
    ]);
    let measure = measure(sweep);
    let unit = measure.map_or("", |dimension| sweep.joint.units.symbol(dimension));
    table.row([variable.unit.as_str(), unit, unit, "", unit, "", "", ""].map(Cell::from).to_vec());
    let mut footnotes = Footnotes::default();
    for (index, point) in sweep.points.iter().enumerate() {
        let value = labels.values(0).get(index).map_or("", String::as_str);
        match &point.outcome {
            Ok(answer) => table.row(row(sweep, value, answer, measure, &mut footnotes)),
            Err(_) => table.row(faulty(value)),
        }
        for jump in sweep.jumps.iter().filter(|jump| jump.points[0] == index) {
            table.across(Cell::emphasised(&jump_line(jump, labels, sweep.joint.units), Emphasis::Caution));
        }
    }
    let heading = (layout.paint)(Emphasis::Heading, "Strength by value");
    let meaning = hanging("  ", &meaning(sweep), layout.columns());
    format!("{heading}\n{meaning}{}{}", table.render(2, layout), footnotes.text(layout))
}

/// What the columns hold.
fn meaning(sweep: &Sweep) -> String {
    let whose = if sweep.cases.len() > 1 { "and verdict of all cases" } else { "with the design factor" };
    format!("nominal strengths, as sizes of the load; utilisation {whose}")
}

/// Remarks below the table, each once, with the letters that stand in the rows.
#[derive(Default)]
struct Footnotes(Vec<String>);

impl Footnotes {
    /// The letters of these remarks.
    fn marks(&mut self, remarks: Vec<String>) -> String {
        let mut marks: Vec<String> = remarks.into_iter().map(|remark| self.mark(remark)).collect();
        marks.sort();
        marks.join(",")
    }

    fn mark(&mut self, remark: String) -> String {
        let known = self.0.iter().position(|known| *known == remark);
        let index = known.unwrap_or_else(|| {
            self.0.push(remark);
            self.0.len() - 1
        });
        letter(index)
    }

    fn text(&self, layout: &Layout) -> String {
        let lines = self.0.iter().enumerate();
        lines
            .map(|(index, remark)| hanging(&format!("  {}  ", letter(index)), remark, layout.columns()))
            .collect()
    }
}

/// a to z, then aa, bb, ...
fn letter(index: usize) -> String {
    let letters = ('a'..='z').cycle().skip(index).take(1);
    letters.flat_map(|letter| std::iter::repeat_n(letter, index / 26 + 1)).collect()
}

/// Force or moment: the measure of the first point with a load.
fn measure(sweep: &Sweep) -> Option<Dimension> {
    let cases = sweep.points.iter().filter_map(|point| sweep.shown_case(point));
    cases.filter_map(|case| case.demand).map(dimension).next()
}

fn dimension(demand: Demand) -> Dimension {
    number::measure(demand.in_moment)
}

fn row(
    sweep: &Sweep,
    value: &str,
    answer: &Answer,
    measure: Option<Dimension>,
    footnotes: &mut Footnotes,
) -> Vec<Cell> {
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
    let status = answer.status();
    let exceeded = status == Status::Exceeded && !answer.breached;
    let used = answer.utilisation().map_or_else(|| MISSING.to_owned(), |value| utilisation(value, exceeded));
    vec![
        value.into(),
        strength(case.ultimate.map(|strength| strength.load_factor)).into(),
        strength(case.elastic.map(|strength| strength.load_factor)).into(),
        ratio.into(),
        strength(case.peak_load_factor).into(),
        used.into(),
        Cell::emphasised(words::status(status), words::status_emphasis(status)),
        footnotes.marks(remarks(sweep, answer, case)).into(),
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
fn remarks(sweep: &Sweep, answer: &Answer, case: &PointCase) -> Vec<String> {
    let mut remarks = Vec::new();
    if case.demand.is_none() {
        remarks.push("no load in the case shown".to_owned());
    }
    if case.states > 1 {
        remarks.push(format!(
            "{} equilibrium states at first rupture; the smallest is the strength",
            case.states
        ));
    }
    if case.incomplete {
        remarks.push("signs of a state that was not found: a smaller strength is possible".to_owned());
    }
    if case.ultimate.is_some() && case.peak_load_factor.is_none() {
        remarks.push("the path from zero load was lost: no peak".to_owned());
    }
    if let Some(reason) = &case.not_solved {
        remarks.push(reason.clone());
    }
    let governing = answer.governing.and_then(|index| answer.cases.get(index));
    let usual = if sweep.joint.accepts(Basis::Ultimate) { Basis::Ultimate } else { Basis::Elastic };
    let decided = governing.and_then(|case| case.verification.as_ref());
    if let Some(verification) = decided.filter(|found| found.basis != usual) {
        remarks.push(format!(
            "verified by the {} (check {})",
            words::basis(verification.basis),
            verification.check
        ));
    }
    if let Some(name) =
        answer.governing.filter(|case| *case != sweep.shown).and_then(|case| sweep.cases.get(case))
    {
        remarks.push(format!("{name} governs"));
    }
    if answer.breached {
        remarks.push("a rule of detailing is broken".to_owned());
    }
    remarks
}

/// `--- jumps at 2.429 mm from 228.6 kN to 248.5 kN, +8.7 % ---`.
fn jump_line(jump: &Jump, labels: &Labels<'_>, units: UnitSystem) -> String {
    let [before, after] = jump.strength.map(|strength| quantity(units, dimension(strength), strength.size));
    let change = jump.relative_change();
    let sign = if change < 0.0 { '-' } else { '+' };
    let at = labels.between(jump.variable, jump.at[0]);
    format!("---- ultimate strength jumps at {at}: {before} to {after}, {sign}{} ----", percent(change))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn each_remark_has_one_letter() {
        let mut footnotes = Footnotes::default();
        assert_eq!(footnotes.marks(vec!["x".into(), "y".into()]), "a,b");
        assert_eq!(footnotes.marks(vec!["z".into(), "x".into()]), "a,c");
        assert_eq!((letter(25).as_str(), letter(26).as_str()), ("z", "aa"));
    }
}

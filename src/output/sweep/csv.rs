//! The table of a sweep: one row per point and case, in the file's units.
//!
//! Strengths stand in the column of their measure, force or moment; the other stays empty, as does a design
//! strength of a method that the rule set does not accept.

use crate::analysis::{Strength, Verification};
use crate::output::csv::{field, to_text, unit_suffix};
use crate::output::names::{basis_name, status_name};
use crate::output::number::{machine, rounded_up};
use crate::output::words;
use crate::study::sweep::{Answer, Point, PointCase, Sweep, Variable};
use crate::units::{Dimension, UnitSystem};

/// Measures of a strength.
const MEASURES: [Dimension; 2] = [Dimension::Force, Dimension::Moment];

/// The points and cases of a sweep, one row each.
#[must_use]
pub fn sweep_csv(sweep: &Sweep) -> String {
    let mut rows = vec![titles(sweep)];
    for point in &sweep.points {
        for (index, name) in sweep.cases.iter().enumerate() {
            rows.push(row(sweep, point, index, name));
        }
    }
    to_text(rows)
}

fn titles(sweep: &Sweep) -> Vec<String> {
    let mut titles = vec!["joint".to_owned()];
    titles.extend(sweep.variables.iter().map(variable_title));
    titles.extend(
        [
            "case",
            "status",
            "basis",
            "check",
            "utilisation",
            "ultimate_load_factor",
            "elastic_load_factor",
            "ultimate_over_elastic",
            "peak_load_factor",
            "states",
        ]
        .map(str::to_owned),
    );
    for dimension in MEASURES {
        let unit = unit_suffix(sweep.joint.units, dimension);
        for name in
            ["ultimate_strength", "elastic_strength", "ultimate_design_strength", "elastic_design_strength"]
        {
            titles.push(format!("{name}_{unit}"));
        }
    }
    titles.extend(["governing", "fault"].map(str::to_owned));
    titles
}

/// `arm_mm`, `load_angle_deg`; a pure number has no unit.
fn variable_title(variable: &Variable) -> String {
    let unit = variable.unit.replace('/', "_per_").replace([' ', '^'], "_");
    format!("{}_{unit}", variable.name.replace('.', "_")).trim_end_matches('_').to_owned()
}

fn row(sweep: &Sweep, point: &Point, index: usize, name: &str) -> Vec<String> {
    let mut cells = vec![words::joint_title(&sweep.joint).to_owned()];
    let values = sweep.variables.iter().zip(&point.values);
    cells.extend(values.map(|(variable, value)| machine(variable.shown(*value))));
    cells.push(name.to_owned());
    let known = point.outcome.as_ref().ok().and_then(|answer| Some((answer, answer.cases.get(index)?)));
    match known {
        Some((answer, case)) => cells.extend(answered(case, answer, index, sweep.joint.units)),
        None => {
            cells.push(status_name(point.status()).to_owned());
            let empty = 9 + 4 * MEASURES.len();
            cells.extend(std::iter::repeat_n(String::new(), empty));
            let fault = point.outcome.as_ref().err().and_then(|faults| faults.first());
            cells.push(fault.map(ToString::to_string).unwrap_or_default());
        }
    }
    cells
}

fn answered(case: &PointCase, answer: &Answer, index: usize, units: UnitSystem) -> Vec<String> {
    let decided = case.verification.as_ref();
    let basis = |verification: &Verification| basis_name(verification.basis).to_owned();
    let (ultimate, elastic) = (case.ultimate, case.elastic);
    let factor = |strength: Option<Strength>| strength.map(|strength| strength.load_factor);
    let design = |strength: Option<Strength>| strength.and_then(|strength| strength.design_load_factor);
    let mut cells = vec![
        status_name(case.status).to_owned(),
        decided.map(basis).unwrap_or_default(),
        decided.map(|verification| verification.check.clone()).unwrap_or_default(),
        case.utilisation().map(|value| machine(rounded_up(value))).unwrap_or_default(),
        field(factor(ultimate)),
        field(factor(elastic)),
        field(case.ultimate_over_elastic()),
        field(case.peak_load_factor),
        if ultimate.is_some() { case.states.to_string() } else { String::new() },
    ];
    for dimension in MEASURES {
        let of_measure =
            case.demand.is_some_and(|demand| demand.in_moment == (dimension == Dimension::Moment));
        for factor in [factor(ultimate), factor(elastic), design(ultimate), design(elastic)] {
            let size = factor.filter(|_| of_measure).and_then(|factor| case.load_times(factor));
            cells.push(field(size.map(|size| units.shown(dimension, size))));
        }
    }
    cells.push(if answer.governing == Some(index) { "yes" } else { "no" }.to_owned());
    cells.push(case.not_solved.clone().unwrap_or_default());
    cells
}

#[cfg(test)]
mod tests {
    use super::super::fixture;
    use super::*;

    #[test]
    fn one_row_per_point_and_case() {
        insta::assert_snapshot!(sweep_csv(&fixture::curve()));
    }

    #[test]
    fn names_of_columns_carry_the_unit() {
        let title = |name: &str, unit: &str| {
            let variable = fixture::curve().variables.remove(0);
            variable_title(&Variable { name: name.into(), unit: unit.into(), ..variable })
        };
        assert_eq!(title("load.angle", "deg"), "load_angle_deg");
        assert_eq!(title("n", ""), "n");
        assert_eq!(title("q", "kN/mm"), "q_kN_per_mm");
        assert_eq!(title("area", "mm^2"), "area_mm_2");
    }
}

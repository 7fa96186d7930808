//! The summary table: one row per case with its verdict and the strengths by both methods.
//!
//! Load factors and utilisations have no unit. `governing` is `yes` for the case that decides its joint.

use super::{field, joint_labels, to_text};
use crate::analysis::{CaseReport, Report};
use crate::output::names::{basis_name, status_name};
use crate::output::number::{machine, rounded_up};
use crate::solvers::Ultimate;

/// Column titles.
const TITLES: [&str; 17] = [
    "joint",
    "case",
    "status",
    "basis",
    "check",
    "utilisation",
    "ultimate_load_factor",
    "ultimate_design_load_factor",
    "peak_load_factor",
    "states",
    "elastic_load_factor",
    "elastic_design_load_factor",
    "ultimate_over_elastic",
    "residual",
    "error_estimate",
    "governing",
    "file",
];

/// The cases of all joints, one row each.
#[must_use]
pub fn summary_csv(reports: &[Report]) -> String {
    let mut rows = vec![TITLES.map(str::to_owned)];
    for (report, label) in reports.iter().zip(joint_labels(reports)) {
        for (index, case) in report.cases.iter().enumerate() {
            rows.push(fields(report, case, label.clone(), report.governing == Some(index)));
        }
    }
    to_text(rows)
}

fn fields(report: &Report, case: &CaseReport, label: String, governing: bool) -> [String; 17] {
    let joint = &report.joint;
    let (ultimate, elastic) = (case.ultimate_strength(joint), case.elastic_strength(joint));
    let state = case.ultimate().map(Ultimate::governing);
    let decided = case.verification.as_ref();
    [
        label,
        case.name.clone(),
        status_name(case.status).to_owned(),
        decided.map(|verification| basis_name(verification.basis).to_owned()).unwrap_or_default(),
        decided.map(|verification| verification.check.clone()).unwrap_or_default(),
        case.utilisation().map(|value| machine(rounded_up(value))).unwrap_or_default(),
        field(ultimate.map(|strength| strength.load_factor)),
        field(ultimate.and_then(|strength| strength.design_load_factor)),
        field(case.ultimate().and_then(|answer| answer.peak_load_factor)),
        case.ultimate().map(|answer| answer.states.len().to_string()).unwrap_or_default(),
        field(elastic.map(|strength| strength.load_factor)),
        field(elastic.and_then(|strength| strength.design_load_factor)),
        field(case.ultimate_over_elastic()),
        field(state.map(|state| state.residual)),
        field(state.map(|state| state.error_estimate)),
        if governing { "yes" } else { "no" }.to_owned(),
        report.joint.file.clone(),
    ]
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::output::fixture;

    #[test]
    fn one_row_per_case() {
        let cases = vec![fixture::case("crane", 1.25), fixture::unloaded("idle"), fixture::unsolved("odd")];
        insta::assert_snapshot!(summary_csv(&[fixture::report(cases, None)]));
    }

    #[test]
    fn an_ultimate_analysis_that_is_not_accepted_has_no_design_load_factor() {
        let report = fixture::report(vec![fixture::case("crane", 1.25)], Some(0));
        let text = summary_csv(&[fixture::behind_the_firewall(report)]);
        assert!(
            text.contains(",exceeded,elastic,elastic-vector,1.33333333334,1.25,,1.3125,2,1,0.75,"),
            "{text}"
        );
    }
}

//! Reports as JSON for other programs, schema `weldpole.check/1`.
//!
//! N, N mm, mm, MPa and rad throughout, 12 significant digits; a utilisation is rounded up at the twelfth.
//! Every key is always present; a missing value is `null`, never 0. Members follow the order of the schema.
//!
//! Additions that a reader may ignore: `faults` beside `joints` (files that could not be read), and
//! `not_solved` and `coefficients` in a case.

mod case;
pub(super) mod value;

use crate::analysis::{Grade, Report};
use crate::diagnostic::{Diagnostic, Severity};
use case::CaseJson;
use serde::Serialize;
use value::{Number, Triple};

#[derive(Serialize)]
struct DocumentJson<'a> {
    schema: &'static str,
    version: &'a str,
    joints: Vec<JointJson<'a>>,
    faults: Vec<FaultJson<'a>>,
}

#[derive(Serialize)]
struct JointJson<'a> {
    file: &'a str,
    title: &'a str,
    rules: &'a str,
    law: &'a str,
    length: Number,
    throat_area: Number,
    centroid: Triple,
    cases: Vec<CaseJson<'a>>,
    governing: Option<&'a str>,
    findings: Vec<FindingJson<'a>>,
}

#[derive(Serialize)]
struct FindingJson<'a> {
    severity: &'static str,
    clause: &'a str,
    subject: &'a str,
    message: &'a str,
}

#[derive(Serialize)]
pub(super) struct FaultJson<'a> {
    severity: &'static str,
    file: &'a str,
    line: Option<usize>,
    column: Option<usize>,
    message: &'a str,
    accepted: Option<&'a str>,
    hint: Option<&'a str>,
}

impl<'a> JointJson<'a> {
    fn new(report: &'a Report) -> Self {
        let joint = &report.joint;
        let governing = report.governing.and_then(|index| report.cases.get(index));
        Self {
            file: &joint.file,
            title: &joint.title,
            rules: &joint.rules.id,
            law: &joint.law.id,
            length: Number(report.section.length),
            throat_area: Number(report.section.throat_area),
            centroid: Triple::from(report.section.centroid),
            cases: report.cases.iter().map(|case| CaseJson::new(case, joint)).collect(),
            governing: governing.map(|case| case.name.as_str()),
            findings: report
                .findings
                .iter()
                .map(|finding| FindingJson {
                    severity: match finding.grade {
                        Grade::Breach => "breach",
                        Grade::Caution => "caution",
                        Grade::Note => "note",
                    },
                    clause: &finding.clause,
                    subject: &finding.subject,
                    message: &finding.message,
                })
                .collect(),
        }
    }
}

impl<'a> From<&'a Diagnostic> for FaultJson<'a> {
    fn from(fault: &'a Diagnostic) -> Self {
        Self {
            severity: match fault.severity {
                Severity::Fault => "fault",
                Severity::Caution => "caution",
            },
            file: &fault.file,
            line: fault.place.as_ref().map(|place| place.line),
            column: fault.place.as_ref().map(|place| place.column),
            message: &fault.message,
            accepted: fault.accepted.as_deref(),
            hint: fault.hint.as_deref(),
        }
    }
}

/// The reports of a run, and the faults of the files that gave none, as a JSON document.
#[must_use]
pub fn check_json(version: &str, reports: &[Report], faults: &[Diagnostic]) -> String {
    let document = DocumentJson {
        schema: "weldpole.check/1",
        version,
        joints: reports.iter().map(JointJson::new).collect(),
        faults: faults.iter().map(FaultJson::from).collect(),
    };
    value::pretty(&document)
}

pub(super) use value::pretty;

#[cfg(test)]
mod tests {
    use super::super::fixture;
    use super::*;
    use crate::model::Confirmation;
    use serde_json::Value;

    fn parsed(report: Report) -> Value {
        serde_json::from_str(&check_json("0.0.0", &[report], &[])).unwrap()
    }

    fn assert_null(object: &Value, keys: &[&str]) {
        for key in keys {
            assert_eq!(object.get(key), Some(&Value::Null), "{key} in {object}");
        }
    }

    #[test]
    fn the_whole_document() {
        let reports = [fixture::report(vec![fixture::case("crane", 1.25)], Some(0))];
        insta::assert_snapshot!(check_json("0.0.0", &reports, &[fixture::fault()]));
    }

    #[test]
    fn without_load_the_utilisation_is_zero_and_every_other_result_is_missing() {
        let json = parsed(fixture::report(vec![fixture::unloaded("idle")], Some(0)));
        let case = &json["joints"][0]["cases"][0];
        assert_eq!(case["status"], "satisfied");
        assert_eq!(case["verification"]["utilisation"], 0.0);
        assert_eq!(case["ultimate"]["utilisation"], 0.0);
        assert_eq!(case["elastic"]["utilisation"], 0.0);
        let missing = ["load_factor", "design_load_factor", "centre", "peak_load_factor", "residual"];
        assert_null(&case["ultimate"], &missing);
        assert_null(&case["elastic"], &["load_factor", "design_load_factor"]);
        assert_null(case, &["ultimate_over_elastic"]);
        assert_eq!(case["ultimate"]["states"].as_array().unwrap().len(), 0);
    }

    #[test]
    fn an_unsolved_case_says_why_and_keeps_its_elastic_result() {
        let json = parsed(fixture::report(vec![fixture::unsolved("crane")], None));
        assert_null(&json["joints"][0], &["governing"]);
        let case = &json["joints"][0]["cases"][0];
        assert_eq!(case["status"], "not-solved");
        assert_null(&case["verification"], &["basis", "check", "utilisation"]);
        assert_null(&case["ultimate"], &["load_factor", "utilisation", "translation", "rotation"]);
        assert_eq!(case["elastic"]["load_factor"], 1.6);
        assert_eq!(case["not_solved"]["reason"], "the search for equilibrium stalled");
        assert_eq!(case["not_solved"]["residual"], 0.02);
    }

    #[test]
    fn an_ultimate_analysis_that_is_not_accepted_has_no_design_strength() {
        let report = fixture::report(vec![fixture::case("crane", 1.25)], Some(0));
        let json = parsed(fixture::behind_the_firewall(report));
        let case = &json["joints"][0]["cases"][0];
        assert_eq!(case["ultimate"]["accepted"], false);
        assert_eq!(case["ultimate"]["load_factor"], 1.25);
        assert_null(&case["ultimate"], &["design_load_factor", "utilisation"]);
        let row = &case["checks"][1];
        assert_eq!(row["verdict"], "information");
        assert_null(row, &["resistance", "utilisation"]);
    }

    #[test]
    fn a_confirmed_number_is_read_and_a_utilisation_never_below_the_true_one() {
        let mut report = fixture::report(vec![fixture::case("crane", 4.0)], Some(0));
        report.cases[0].checks[0].values = Confirmation::Read;
        let json = parsed(report);
        let case = &json["joints"][0]["cases"][0];
        assert_eq!(case["checks"][0]["values"], "read");
        assert_eq!(case["ultimate"]["utilisation"].as_f64(), Some(0.333_333_333_334));
    }
}

//! The self-check as JSON for other programs, schema `weldpole.selfcheck/1`.
//!
//! Values are in the unit of the printed ones, which `unit` names; 12 significant digits. `expected` is the
//! printed value, `printed` its digits. Every key is always present; a missing value is `null`, never 0.

use super::words;
use crate::model::Discretisation;
use crate::output::json::pretty;
use crate::output::number::rounded;
use crate::study::selfcheck::{Outcome, SelfCheck};
use serde::Serialize;

#[derive(Serialize)]
struct DocumentJson<'a> {
    schema: &'static str,
    version: &'a str,
    verdict: &'static str,
    counts: CountsJson,
    law: &'a str,
    /// Elements on the longest run; `null` for the continuous weld.
    elements: Option<usize>,
    rules: Vec<&'a str>,
    remarks: &'a [String],
    cases: Vec<CaseJson<'a>>,
}

#[derive(Serialize)]
struct CountsJson {
    cases: usize,
    passed: usize,
    failed: usize,
}

#[derive(Serialize)]
struct CaseJson<'a> {
    id: &'a str,
    method: &'static str,
    rules: &'static str,
    shape: &'static str,
    k: f64,
    a: f64,
    load_angle_from_vertical_deg: f64,
    quantity: &'static str,
    unit: &'static str,
    expected: f64,
    printed: &'a str,
    computed: Option<f64>,
    ratio: Option<f64>,
    tolerance: f64,
    tolerance_kind: &'static str,
    why: &'a str,
    source: &'a str,
    #[serde(rename = "where")]
    place: &'a str,
    note: &'a str,
    verdict: &'static str,
    reason: Option<String>,
}

impl<'a> From<&'a Outcome> for CaseJson<'a> {
    fn from(outcome: &'a Outcome) -> Self {
        let case = &outcome.case;
        let (tolerance_kind, tolerance) = words::allowance(&outcome.tolerance);
        Self {
            id: &case.id,
            method: case.method.name(),
            rules: case.rules(),
            shape: case.shape.name(),
            k: case.k,
            a: case.a,
            load_angle_from_vertical_deg: case.load_angle_deg,
            quantity: case.quantity.name(),
            unit: case.quantity.unit(),
            expected: case.expected.value,
            printed: &case.expected.text,
            computed: outcome.computed.as_ref().ok().copied().map(rounded),
            ratio: outcome.ratio().map(rounded),
            tolerance,
            tolerance_kind,
            why: &outcome.tolerance.why,
            source: &case.source,
            place: &case.place,
            note: &case.note,
            verdict: words::verdict(outcome.passed()),
            reason: (!outcome.passed()).then(|| words::reason(outcome)),
        }
    }
}

/// The self-check of the program of this version as a JSON document.
#[must_use]
pub fn selfcheck_json(version: &str, check: &SelfCheck) -> String {
    let (cases, failed) = (check.outcomes.len(), check.failures().count());
    pretty(&DocumentJson {
        schema: "weldpole.selfcheck/1",
        version,
        verdict: words::verdict(check.passed()),
        counts: CountsJson { cases, passed: cases - failed, failed },
        law: &check.law.id,
        elements: match check.discretisation {
            Discretisation::Continuous => None,
            Discretisation::Elements(count) => Some(count),
        },
        rules: check.rules(),
        remarks: &check.remarks,
        cases: check.outcomes.iter().map(CaseJson::from).collect(),
    })
}

#[cfg(test)]
mod tests {
    use super::super::fixture;
    use super::*;

    #[test]
    fn the_whole_document() {
        insta::assert_snapshot!(selfcheck_json("0.0.0", &fixture::passed()));
    }

    #[test]
    fn a_value_without_answer_is_null_with_its_reason() {
        let json: serde_json::Value =
            serde_json::from_str(&selfcheck_json("0.0.0", &fixture::failed())).unwrap();
        assert_eq!(json["verdict"], "failed");
        assert_eq!((&json["counts"]["passed"], &json["counts"]["failed"]), (&1.into(), &2.into()));
        let case = &json["cases"][2];
        assert!(case["computed"].is_null() && case["ratio"].is_null());
        assert_eq!(case["reason"], "the search for equilibrium stalled");
        assert!(json["cases"][0]["reason"].is_null());
    }
}

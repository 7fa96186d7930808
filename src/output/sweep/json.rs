//! A sweep as JSON for other programs, schema `weldpole.sweep/1`.
//!
//! N, N mm, mm, MPa and rad, 12 significant digits; every key is always present, a missing value is `null`.
//! `strength` is the size of the load at the nominal strength: N, or N mm where `in_moment` is true.

use crate::analysis::Strength;
use crate::diagnostic::Diagnostic;
use crate::output::json::value::{Number, Pair, VerificationJson};
use crate::output::json::{FaultJson, pretty};
use crate::output::names::status_name;
use crate::study::sweep::{Answer, Jump, Point, PointCase, Sweep, Variable};
use serde::Serialize;

#[derive(Serialize)]
struct DocumentJson<'a> {
    schema: &'static str,
    version: &'a str,
    sweep: Option<SweepJson<'a>>,
    faults: Vec<FaultJson<'a>>,
}

#[derive(Serialize)]
struct SweepJson<'a> {
    file: &'a str,
    title: &'a str,
    rules: &'a str,
    law: &'a str,
    variables: Vec<VariableJson<'a>>,
    shown: &'a str,
    points: Vec<PointJson<'a>>,
    jumps: Vec<JumpJson<'a>>,
}

#[derive(Serialize)]
struct VariableJson<'a> {
    name: &'a str,
    unit: &'a str,
    /// The parameter's value in the file; `null` for the load.
    given: Option<Number>,
    values: Vec<Number>,
}

#[derive(Serialize)]
struct PointJson<'a> {
    values: Vec<Number>,
    status: &'static str,
    governing: Option<&'a str>,
    cases: Vec<CaseJson<'a>>,
    faults: Vec<FaultJson<'a>>,
}

#[derive(Serialize)]
struct CaseJson<'a> {
    case: &'a str,
    status: &'static str,
    demand: Option<Number>,
    in_moment: Option<bool>,
    verification: VerificationJson<'a>,
    ultimate: UltimateJson,
    elastic: ElasticJson,
    ultimate_over_elastic: Option<Number>,
    not_solved: Option<&'a str>,
}

#[derive(Serialize)]
struct UltimateJson {
    load_factor: Option<Number>,
    design_load_factor: Option<Number>,
    strength: Option<Number>,
    peak_load_factor: Option<Number>,
    states: usize,
    incomplete: bool,
    centre: Option<Pair>,
}

#[derive(Serialize)]
struct ElasticJson {
    load_factor: Option<Number>,
    design_load_factor: Option<Number>,
    strength: Option<Number>,
}

#[derive(Serialize)]
struct JumpJson<'a> {
    variable: &'a str,
    points: [usize; 2],
    at: Pair,
    load_factor: Pair,
    strength: Pair,
    in_moment: bool,
}

/// A sweep, or the faults that stand in its way, as a JSON document.
#[must_use]
pub fn sweep_json(version: &str, sweep: Option<&Sweep>, faults: &[Diagnostic]) -> String {
    let document = DocumentJson {
        schema: "weldpole.sweep/1",
        version,
        sweep: sweep.map(SweepJson::new),
        faults: faults.iter().map(FaultJson::from).collect(),
    };
    pretty(&document)
}

impl<'a> SweepJson<'a> {
    fn new(sweep: &'a Sweep) -> Self {
        let joint = &sweep.joint;
        Self {
            file: &joint.file,
            title: &joint.title,
            rules: &joint.rules.id,
            law: &joint.law.id,
            variables: sweep.variables.iter().map(VariableJson::from).collect(),
            shown: sweep.shown_name(),
            points: sweep.points.iter().map(|point| PointJson::new(point, &sweep.cases)).collect(),
            jumps: sweep.jumps.iter().map(|jump| JumpJson::new(jump, &sweep.variables)).collect(),
        }
    }
}

fn numbers(values: &[f64]) -> Vec<Number> {
    values.iter().copied().map(Number).collect()
}

impl<'a> From<&'a Variable> for VariableJson<'a> {
    fn from(variable: &'a Variable) -> Self {
        Self {
            name: &variable.name,
            unit: &variable.inside_unit,
            given: variable.given.map(Number),
            values: numbers(&variable.values),
        }
    }
}

impl<'a> PointJson<'a> {
    fn new(point: &'a Point, names: &'a [String]) -> Self {
        let answer = point.outcome.as_ref().ok();
        let cases = answer.map_or(&[][..], |answer| answer.cases.as_slice());
        let governing = answer.and_then(|answer: &Answer| names.get(answer.governing?));
        let faults = point.outcome.as_ref().err().map_or(&[][..], Vec::as_slice);
        Self {
            values: numbers(&point.values),
            status: status_name(point.status()),
            governing: governing.map(String::as_str),
            cases: cases.iter().zip(names).map(|(case, name)| CaseJson::new(case, name)).collect(),
            faults: faults.iter().map(FaultJson::from).collect(),
        }
    }
}

impl<'a> CaseJson<'a> {
    fn new(case: &'a PointCase, name: &'a str) -> Self {
        let (ultimate, elastic) = (case.ultimate, case.elastic);
        let factor = |strength: Option<Strength>| strength.map(|strength| Number(strength.load_factor));
        let design = |strength: Option<Strength>| strength.and_then(|s| s.design_load_factor).map(Number);
        let size =
            |strength: Option<Strength>| strength.and_then(|s| case.load_times(s.load_factor)).map(Number);
        Self {
            case: name,
            status: status_name(case.status),
            demand: case.demand.map(|demand| Number(demand.size)),
            in_moment: case.demand.map(|demand| demand.in_moment),
            verification: VerificationJson::new(case.verification.as_ref(), case.utilisation()),
            ultimate: UltimateJson {
                load_factor: factor(ultimate),
                design_load_factor: design(ultimate),
                strength: size(ultimate),
                peak_load_factor: case.peak_load_factor.map(Number),
                states: case.states,
                incomplete: case.incomplete,
                centre: case.centre.map(Pair::from),
            },
            elastic: ElasticJson {
                load_factor: factor(elastic),
                design_load_factor: design(elastic),
                strength: size(elastic),
            },
            ultimate_over_elastic: case.ultimate_over_elastic().map(Number),
            not_solved: case.not_solved.as_deref(),
        }
    }
}

impl<'a> JumpJson<'a> {
    fn new(jump: &Jump, variables: &'a [Variable]) -> Self {
        Self {
            variable: variables.get(jump.variable).map_or("", |variable| variable.name.as_str()),
            points: jump.points,
            at: Pair::from(jump.at),
            load_factor: Pair::from(jump.load_factor),
            strength: Pair::from(jump.strength.map(|strength| strength.size)),
            in_moment: jump.strength[0].in_moment,
        }
    }
}

#[cfg(test)]
mod tests {
    use super::super::fixture;
    use super::*;
    use serde_json::Value;

    fn parsed(text: &str) -> Value {
        serde_json::from_str(text).unwrap()
    }

    #[test]
    fn every_point_has_its_cases_or_its_faults() {
        let json = parsed(&sweep_json("0.0.0", Some(&fixture::curve()), &[]));
        assert_eq!((&json["schema"], &json["sweep"]["shown"]), (&"weldpole.sweep/1".into(), &"crane".into()));
        let points = json["sweep"]["points"].as_array().unwrap();
        assert_eq!(points[0]["status"], "not-solved");
        assert_eq!(
            (points[0]["cases"].as_array().unwrap().len(), &points[0]["governing"]),
            (0, &Value::Null)
        );
        assert_eq!(points[0]["faults"].as_array().unwrap().len(), 1);
        let crane = &points[1]["cases"][0];
        assert_eq!(crane["ultimate"]["strength"], 100_000.0);
        assert_eq!(crane["verification"]["utilisation"], 0.666_666_666_667);
        let idle = &points[3]["cases"][0];
        assert_eq!((&idle["demand"], &idle["ultimate"]["strength"]), (&Value::Null, &Value::Null));
        assert_eq!(idle["verification"]["utilisation"], 0.0);
        assert_eq!(points[3]["governing"], "twist");
        let jump = &json["sweep"]["jumps"][0];
        assert_eq!((&jump["variable"], jump["strength"][0].as_f64()), (&"arm".into(), Some(95_000.0)));
        assert_eq!(json["sweep"]["variables"][0]["given"], 20.0);
    }

    #[test]
    fn without_a_sweep_there_are_faults() {
        let json = parsed(&sweep_json("0.0.0", None, &[crate::output::fixture::fault()]));
        assert_eq!((&json["sweep"], json["faults"].as_array().unwrap().len()), (&Value::Null, 1));
    }
}

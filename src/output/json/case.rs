//! One load case as JSON.

use super::value::{Number, Pair, Triple, Utilisation, VerificationJson};
use crate::analysis::{Analyses, CaseReport, Check};
use crate::model::{Basis, Joint};
use crate::output::names::{confirmation_name, status_name, verdict_name};
use crate::solvers::{ElasticPeak, NotSolved, Rupture, Ultimate};
use serde::Serialize;

#[derive(Serialize)]
pub(super) struct CaseJson<'a> {
    case: &'a str,
    status: &'static str,
    load: LoadJson,
    verification: VerificationJson<'a>,
    ultimate: UltimateJson<'a>,
    elastic: ElasticJson<'a>,
    ultimate_over_elastic: Option<Number>,
    checks: Vec<CheckJson<'a>>,
    not_solved: Option<NotSolvedJson>,
    coefficients: Option<CoefficientsJson>,
}

#[derive(Serialize)]
struct LoadJson {
    force: Triple,
    moment_about_centroid: Triple,
}

#[derive(Serialize)]
struct UltimateJson<'a> {
    load_factor: Option<Number>,
    design_load_factor: Option<Number>,
    utilisation: Option<Utilisation>,
    accepted: bool,
    centre: Option<Pair>,
    translation: Option<Triple>,
    rotation: Option<Triple>,
    critical: CriticalJson<'a>,
    states: Vec<StateJson>,
    peak_load_factor: Option<Number>,
    residual: Option<Number>,
    error_estimate: Option<Number>,
}

#[derive(Serialize, Default)]
struct CriticalJson<'a> {
    weld: Option<&'a str>,
    at: Option<Triple>,
    angle_deg: Option<Number>,
    deformation: Option<Number>,
    deformation_limit: Option<Number>,
}

#[derive(Serialize)]
struct StateJson {
    load_factor: Number,
    centre: Option<Pair>,
    /// Whether the path from zero load leads to this state; `null` where the path is not known.
    reached: Option<bool>,
}

#[derive(Serialize)]
struct ElasticJson<'a> {
    load_factor: Option<Number>,
    design_load_factor: Option<Number>,
    utilisation: Option<Utilisation>,
    critical: ElasticCriticalJson<'a>,
}

#[derive(Serialize, Default)]
struct ElasticCriticalJson<'a> {
    weld: Option<&'a str>,
    at: Option<Triple>,
    force_per_length: Option<Triple>,
}

#[derive(Serialize)]
struct CheckJson<'a> {
    id: &'a str,
    clause: &'a str,
    subject: &'a str,
    demand: Number,
    resistance: Option<Number>,
    unit: &'static str,
    utilisation: Option<Utilisation>,
    verdict: &'static str,
    values: &'static str,
}

#[derive(Serialize)]
struct NotSolvedJson {
    reason: String,
    residual: Number,
}

#[derive(Serialize)]
struct CoefficientsJson {
    mean_strength: Number,
    handbook: Option<Number>,
}

/// 0 where there is no load to resist; otherwise the value.
fn utilisation(case: &CaseReport, value: Option<f64>) -> Option<Utilisation> {
    match case.analyses {
        Analyses::Unloaded => Some(Utilisation(0.0)),
        Analyses::Loaded { .. } => value.map(Utilisation),
    }
}

fn weld_name(joint: &Joint, index: usize) -> Option<&str> {
    joint.group.welds().get(index).map(|weld| weld.name.as_str())
}

impl<'a> CaseJson<'a> {
    pub(super) fn new(case: &'a CaseReport, joint: &'a Joint) -> Self {
        Self {
            case: &case.name,
            status: status_name(case.status),
            load: LoadJson {
                force: Triple::from(case.load.force),
                moment_about_centroid: Triple::from(case.load.moment),
            },
            verification: VerificationJson::new(case.verification.as_ref(), case.utilisation()),
            ultimate: UltimateJson::new(case, joint),
            elastic: ElasticJson::new(case, joint),
            ultimate_over_elastic: case.ultimate_over_elastic().map(Number),
            checks: case.checks.iter().map(CheckJson::from).collect(),
            not_solved: case.not_solved().map(NotSolvedJson::from),
            coefficients: case.coefficients(joint).map(|coefficients| CoefficientsJson {
                mean_strength: Number(coefficients.mean_strength),
                handbook: coefficients.handbook.map(Number),
            }),
        }
    }
}

impl<'a> UltimateJson<'a> {
    fn new(case: &'a CaseReport, joint: &'a Joint) -> Self {
        let strength = case.ultimate_strength(joint);
        let accepted = joint.accepts(Basis::Ultimate);
        let answer = case.ultimate();
        let state = answer.map(crate::solvers::Ultimate::governing);
        let motion = state.map(|state| state.motion);
        let design = strength.and_then(|strength| strength.design_load_factor);
        Self {
            load_factor: strength.map(|strength| Number(strength.load_factor)),
            design_load_factor: design.map(Number),
            utilisation: if accepted {
                utilisation(case, strength.and_then(|strength| strength.utilisation()))
            } else {
                None
            },
            accepted,
            centre: state.and_then(|state| state.centre).map(Pair::from),
            translation: motion
                .map(|motion| Triple::from([motion.translation[0], motion.translation[1], 0.0])),
            rotation: motion.map(|motion| Triple::from([0.0, 0.0, motion.rotation])),
            critical: state
                .and_then(|state| state.critical.as_ref())
                .map_or_else(CriticalJson::default, |rupture| CriticalJson::new(rupture, joint)),
            states: answer.map_or_else(Vec::new, StateJson::all),
            peak_load_factor: answer.and_then(|answer| answer.peak_load_factor).map(Number),
            residual: state.map(|state| Number(state.residual)),
            error_estimate: state.map(|state| Number(state.error_estimate)),
        }
    }
}

impl<'a> CriticalJson<'a> {
    fn new(rupture: &Rupture, joint: &'a Joint) -> Self {
        Self {
            weld: weld_name(joint, rupture.place.weld),
            at: Some(Triple::from(rupture.place.at)),
            angle_deg: Some(Number(rupture.angle.to_degrees())),
            deformation: Some(Number(rupture.deformation)),
            deformation_limit: Some(Number(rupture.limit)),
        }
    }
}

impl StateJson {
    fn all(ultimate: &Ultimate) -> Vec<Self> {
        let states = ultimate.states.iter().enumerate();
        states
            .map(|(index, state)| Self {
                load_factor: Number(state.load_factor),
                centre: state.centre.map(Pair::from),
                reached: ultimate.reached.map(|reached| reached == index),
            })
            .collect()
    }
}

impl<'a> ElasticJson<'a> {
    fn new(case: &'a CaseReport, joint: &'a Joint) -> Self {
        let strength = case.elastic_strength(joint);
        Self {
            load_factor: strength.map(|strength| Number(strength.load_factor)),
            design_load_factor: strength.and_then(|strength| strength.design_load_factor).map(Number),
            utilisation: utilisation(case, strength.and_then(|strength| strength.utilisation())),
            critical: case.elastic().map_or_else(ElasticCriticalJson::default, |elastic| {
                ElasticCriticalJson::new(&elastic.critical, joint)
            }),
        }
    }
}

impl<'a> ElasticCriticalJson<'a> {
    fn new(peak: &ElasticPeak, joint: &'a Joint) -> Self {
        Self {
            weld: weld_name(joint, peak.place.weld),
            at: Some(Triple::from(peak.place.at)),
            force_per_length: Some(Triple::from(peak.force_per_length)),
        }
    }
}

impl<'a> From<&'a Check> for CheckJson<'a> {
    fn from(check: &'a Check) -> Self {
        Self {
            id: &check.id,
            clause: &check.clause,
            subject: &check.subject,
            demand: Number(check.demand),
            resistance: check.design_resistance().map(Number),
            unit: if check.in_moment { "N mm" } else { "N" },
            utilisation: check.design_utilisation().map(Utilisation),
            verdict: verdict_name(check),
            values: confirmation_name(check.values),
        }
    }
}

impl From<&NotSolved> for NotSolvedJson {
    fn from(failure: &NotSolved) -> Self {
        Self { reason: failure.reason.to_string(), residual: Number(failure.residual) }
    }
}

//! The calculation of one joint, step by step.

use super::{Analyses, CaseReport, Report, Status, elements, findings};
use crate::mechanics::PlaneGroup;
use crate::model::{Basis, Joint, LoadCase};
use crate::solvers::{UltimateSettings, UltimateSolver, elastic};
use crate::verify::{
    Demand, Verification, concentric_checks, elastic_check, governing_first, ultimate_check, verification,
};

/// Analyses every case of a joint with the default settings.
#[must_use]
pub fn analyse(joint: &Joint) -> Report {
    analyse_with(joint, &UltimateSettings::default())
}

/// Analyses every case of a joint with the default settings and leaves the element tables empty: for many cases,
/// of which they would fill the memory.
#[must_use]
pub fn analyse_without_elements(joint: &Joint) -> Report {
    analysed(joint, &UltimateSettings::default(), false)
}

/// Analyses every case of a joint.
#[must_use]
pub fn analyse_with(joint: &Joint, settings: &UltimateSettings) -> Report {
    analysed(joint, settings, true)
}

fn analysed(joint: &Joint, settings: &UltimateSettings, with_elements: bool) -> Report {
    let longitudinal = joint.rules.longitudinal.value;
    let group = PlaneGroup::new(&joint.group, &joint.law, longitudinal, joint.discretisation);
    let solver = UltimateSolver::new(&group, settings.clone());
    let cases: Vec<CaseReport> =
        joint.cases.iter().map(|case| case_report(joint, &group, &solver, case, with_elements)).collect();
    let findings = findings::of(joint, &cases);
    Report { joint: joint.clone(), section: group.section, governing: governing(&cases), cases, findings }
}

fn case_report(
    joint: &Joint,
    group: &PlaneGroup,
    solver: &UltimateSolver<'_>,
    case: &LoadCase,
    with_elements: bool,
) -> CaseReport {
    let rules = &joint.rules;
    let load = case.wrench.about(group.section.centroid);
    let triple = group.triple(&load);
    let Some(elastic) = elastic(group, &joint.group, rules.longitudinal.value, &triple) else {
        return CaseReport {
            name: case.name.clone(),
            load,
            status: Status::Satisfied,
            verification: None,
            analyses: Analyses::Unloaded,
            checks: Vec::new(),
            elements: Vec::new(),
        };
    };
    let ultimate = solver.solve(&triple);
    let demand = Demand::of(&load);
    let mut checks = vec![elastic_check(&elastic, demand, joint)];
    checks.extend(concentric_checks(joint, &load));
    if let Ok(ultimate) = &ultimate {
        checks.push(ultimate_check(ultimate, demand, joint));
    }
    let unanswered = ultimate.is_err() && joint.accepts(Basis::Ultimate);
    let verification = if unanswered { None } else { verification(&checks) };
    governing_first(&mut checks, verification.as_ref());
    let satisfied = |verification: &Verification| {
        checks.iter().any(|check| check.id == verification.check && check.satisfied)
    };
    let status = match &verification {
        None => Status::NotSolved,
        Some(verification) if satisfied(verification) => Status::Satisfied,
        Some(_) => Status::Exceeded,
    };
    let state = ultimate.as_ref().ok().map(crate::solvers::Ultimate::governing);
    let elements = if with_elements { elements::rows(joint, group, state, &elastic) } else { Vec::new() };
    let analyses = Analyses::Loaded { ultimate, elastic };
    CaseReport { name: case.name.clone(), load, status, verification, analyses, checks, elements }
}

/// The case of largest utilisation; `None` when some case has no answer.
#[must_use]
pub fn governing(cases: &[CaseReport]) -> Option<usize> {
    if cases.iter().any(|case| case.status == Status::NotSolved) {
        return None;
    }
    let utilisation =
        |case: &CaseReport| case.verification.as_ref().map_or(0.0, |verification| verification.utilisation);
    let mut best: Option<(usize, f64)> = None;
    for (index, case) in cases.iter().enumerate() {
        if best.is_none_or(|(_, known)| utilisation(case) > known) {
            best = Some((index, utilisation(case)));
        }
    }
    best.map(|(index, _)| index)
}

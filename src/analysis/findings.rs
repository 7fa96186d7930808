//! Engineering remarks about a joint and its results: what a responsible engineer must weigh or know.

use super::{CaseReport, Finding, Grade};
use crate::model::{Basis, Confirmation, DesignFactor, Discretisation, Joint};

/// Elements on the longest run below which the published procedure is coarse.
const FEW_ELEMENTS: usize = 100;
/// Share by which the peak on the path must exceed the governing state to be worth a word.
const NOTABLE_PEAK: f64 = 1e-3;

/// All findings, breaches first.
pub(super) fn of(joint: &Joint, cases: &[CaseReport]) -> Vec<Finding> {
    let mut findings: Vec<Finding> = cases.iter().flat_map(about_case).collect();
    findings.extend(about_welds(joint));
    findings.extend(about_rules(joint));
    findings.extend(about_loads(joint));
    findings.sort_by_key(|finding| finding.grade);
    findings
}

fn finding(grade: Grade, subject: &str, message: String) -> Finding {
    Finding { grade, clause: String::new(), subject: subject.into(), message }
}

fn about_case(case: &CaseReport) -> Vec<Finding> {
    let mut findings = Vec::new();
    let mut say = |grade, message: String| findings.push(finding(grade, &case.name, message));
    if case.elastic().is_none() {
        say(Grade::Note, "the load is zero: nothing to resist, utilisation 0".into());
    }
    let Some(ultimate) = case.ultimate() else { return findings };
    if let Some(ratio) = case.ultimate_over_elastic().filter(|ratio| *ratio < 1.0) {
        say(
            Grade::Caution,
            format!(
                "the ultimate strength is {ratio:.3} of the elastic one: the first point ruptures before the rest of \
                 the weld is fully used, or late on the falling part of its curve"
            ),
        );
    }
    let states = ultimate.states.len();
    if states > 1 {
        say(
            Grade::Caution,
            format!(
                "{states} equilibrium states at first rupture were found, usual for loads nearly along the welds; the \
                 smallest is reported as the strength"
            ),
        );
    }
    match ultimate.peak_load_factor {
        None => say(
            Grade::Caution,
            "the path from zero load could not be followed to rupture: no peak load is given".into(),
        ),
        Some(peak) if peak > ultimate.governing().load_factor * (1.0 + NOTABLE_PEAK) => {
            let share = 100.0 * (peak / ultimate.governing().load_factor - 1.0);
            say(
                Grade::Note,
                format!(
                    "on the way from zero load the group carries up to {share:.1} % more than at the reported first \
                     rupture; the published method does not count it"
                ),
            );
        }
        Some(_) => {}
    }
    findings
}

#[allow(clippy::float_cmp)] // sizes and strengths differ when they are given differently
fn about_welds(joint: &Joint) -> Vec<Finding> {
    let welds = joint.group.welds();
    let mut findings = Vec::new();
    let mut say = |grade, message: &str| findings.push(finding(grade, "welds", message.into()));
    let first = &welds[0];
    if welds.iter().any(|weld| weld.size.deformation_size() != first.size.deformation_size()) {
        say(
            Grade::Caution,
            "welds of different size in one group: the smallest ruptures first and decides for all; a larger leg \
             elsewhere can lower the strength",
        );
    }
    if welds.iter().any(|weld| weld.filler.strength != first.filler.strength) {
        say(
            Grade::Caution,
            "filler metals of different strength in one group: the same load-deformation curve is taken for all",
        );
    }
    say(
        Grade::Note,
        "not checked: base metal, sizes and lengths required by detailing rules, plate bending, block shear, bending \
         of the support, fatigue",
    );
    findings
}

fn about_rules(joint: &Joint) -> Vec<Finding> {
    let rules = &joint.rules;
    let mut findings = Vec::new();
    let mut say = |grade, subject: &str, message: String| findings.push(finding(grade, subject, message));
    for remark in &rules.remarks {
        say(Grade::Note, &rules.edition, remark.clone());
    }
    if rules.design == DesignFactor::None {
        say(Grade::Caution, &rules.id, "nominal strengths: no resistance or safety factor is applied".into());
    }
    if !rules.accepts(Basis::Ultimate) {
        say(
            Grade::Note,
            &rules.edition,
            "the ultimate analysis is not accepted as a verification: it is shown for information".into(),
        );
    }
    if joint.law.id != rules.law {
        say(
            Grade::Caution,
            &joint.law.id,
            format!("the load-deformation law is not the default of the rule set ({})", rules.law),
        );
    }
    if joint.law.status == Confirmation::Recalled {
        say(
            Grade::Note,
            &joint.law.id,
            format!(
                "the law's coefficients were recalled, not read in the publication: {}",
                joint.law.source
            ),
        );
    }
    if let Discretisation::Elements(count) = joint.discretisation {
        let grade = if count < FEW_ELEMENTS { Grade::Caution } else { Grade::Note };
        say(
            grade,
            "elements",
            format!(
                "mid-point elements, {count} on the longest run: the result differs from the continuous weld's by \
                 tenths of a percent at 20 elements, and more with fewer"
            ),
        );
    }
    findings
}

fn about_loads(joint: &Joint) -> Vec<Finding> {
    let mut findings = Vec::new();
    if !joint.combined {
        findings.push(finding(
            Grade::Note,
            "loads",
            "no combinations: the load cases are taken as factored already".into(),
        ));
    }
    for case in &joint.unused_cases {
        findings.push(finding(
            Grade::Caution,
            case,
            "this load case is in no combination: it is not verified".into(),
        ));
    }
    findings
}

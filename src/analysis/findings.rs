//! Engineering remarks about a joint and its results: what a responsible engineer must weigh or know.

use super::{CaseReport, Finding, Grade};
use crate::model::{Basis, Confirmation, DesignFactor, Discretisation, Joint, LawForm, Run, Vector, Weld};
use crate::units::Dimension;

/// Elements on the longest run below which the published procedure is coarse.
const FEW_ELEMENTS: usize = 100;
/// Length over leg below which codes reduce the size of a weld (AISC 360-22 J2.2b: 4).
const SHORT_IN_LEGS: f64 = 4.0;
/// Length over leg beyond which codes reduce the strength of end-loaded welds (AISC 360-22 J2.2b: 100).
const LONG_IN_LEGS: f64 = 100.0;
/// Welds are compared in pairs up to this number: a million pairs take some milliseconds.
const MOST_COMPARED: usize = 1500;
/// Distance over length below which two runs lie on each other.
const TOUCH: f64 = 1e-6;
/// Eccentricity over length of weld up to which a load is worth a word as nearly concentric.
const NEARLY_CONCENTRIC: f64 = 1e-2;
/// Share by which the peak on the path must exceed the governing state to be worth a word.
const NOTABLE_PEAK: f64 = 1e-3;

/// All findings, breaches first.
pub(super) fn of(joint: &Joint, cases: &[CaseReport]) -> Vec<Finding> {
    let mut findings: Vec<Finding> = cases.iter().flat_map(about_case).collect();
    findings.extend(cases.iter().filter_map(|case| nearly_concentric(joint, case)));
    findings.extend(cases.iter().filter_map(rests_on_concentricity));
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
    if ultimate.incomplete {
        say(
            Grade::Caution,
            "the search for equilibrium states saw signs of a state it could not find: a smaller strength is possible"
                .into(),
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

/// A verdict that holds by a rule for concentric loads and would not hold a little beside the centroid.
fn rests_on_concentricity(case: &CaseReport) -> Option<Finding> {
    let rule = case.governing_check().filter(|check| check.basis == Basis::Concentric && check.satisfied)?;
    let other = case.checks.iter().filter(|check| check.accepted && check.basis != Basis::Concentric);
    let other =
        other.min_by(|a, b| a.utilisation.total_cmp(&b.utilisation)).filter(|check| !check.satisfied)?;
    let message = format!(
        "satisfied by a rule for loads through the centroid alone (`{}`); by `{}`, which holds beside it as well, the \
         utilisation is {:.3}",
        rule.id,
        other.id,
        (other.utilisation * 1e3).ceil() / 1e3
    );
    Some(finding(Grade::Caution, &case.name, message))
}

#[allow(clippy::float_cmp)] // sizes and strengths differ when they are given differently
/// A load that misses the rules for concentric loads by little.
fn nearly_concentric(joint: &Joint, case: &CaseReport) -> Option<Finding> {
    let applied = case.checks.iter().any(|check| check.basis == Basis::Concentric);
    let length: f64 = joint.group.welds().iter().map(Weld::length).sum();
    let eccentricity = case.load.moment.norm() / case.load.force.norm();
    let near = eccentricity.is_finite() && eccentricity <= NEARLY_CONCENTRIC * length;
    if applied || joint.rules.concentric.is_empty() || !near {
        return None;
    }
    let given = joint.units.shown(Dimension::Length, eccentricity);
    let unit = joint.units.symbol(Dimension::Length);
    let message = format!(
        "the rules for concentric loads are not applied: the load passes the centroid of the welds at {given:.3} {unit}, \
         or the welds are not of one size and straight, along or across the load"
    );
    Some(finding(Grade::Note, &case.name, message))
}

fn about_welds(joint: &Joint) -> Vec<Finding> {
    let welds = joint.group.welds();
    let mut findings = Vec::new();
    let mut say = |grade, message: &str| findings.push(finding(grade, "welds", message.into()));
    let first = &welds[0];
    if welds.iter().any(|weld| (weld.size.deformation_size() - first.size.deformation_size()).abs() > 0.0) {
        say(
            Grade::Caution,
            "welds of different size in one group: the smallest ruptures first and decides for all; a larger leg \
             elsewhere can lower the strength",
        );
    }
    if welds.iter().any(|weld| (weld.filler.strength - first.filler.strength).abs() > 0.0) {
        say(
            Grade::Caution,
            "filler metals of different strength in one group: the same load-deformation curve is taken for all",
        );
    }
    for weld in welds {
        findings.extend(about_length(weld));
    }
    findings.extend(overlaps(welds));
    let mut say = |grade, message: &str| findings.push(finding(grade, "welds", message.into()));
    say(
        Grade::Note,
        "not checked: base metal, sizes and lengths required by detailing rules, plate bending, block shear, bending \
         of the support, fatigue",
    );
    findings
}

/// Welds so short or long that codes reduce their strength; the reduction is not made here.
fn about_length(weld: &Weld) -> Option<Finding> {
    let legs = weld.length() / weld.size.deformation_size();
    let message = if legs < SHORT_IN_LEGS {
        format!(
            "only {legs:.1} legs long: codes count shorter welds than {SHORT_IN_LEGS} legs with a smaller size, which is \
             not done here"
        )
    } else if legs > LONG_IN_LEGS {
        format!(
            "{legs:.0} legs long: where such a weld is loaded at its ends, codes reduce its strength beyond \
             {LONG_IN_LEGS} legs, which is not done here"
        )
    } else {
        return None;
    };
    Some(finding(Grade::Caution, &weld.name, message))
}

/// Pairs of welds that lie on each other: meant perhaps as two sides of a plate, but counted twice.
fn overlaps(welds: &[Weld]) -> Vec<Finding> {
    let mut findings = Vec::new();
    if welds.len() > MOST_COMPARED {
        return findings;
    }
    for (index, one) in welds.iter().enumerate() {
        for two in &welds[index + 1..] {
            if one.runs.iter().any(|first| two.runs.iter().any(|second| overlap(first, second))) {
                let message = format!("lies on the weld {}: both are counted in full", two.name);
                findings.push(finding(Grade::Caution, &one.name, message));
            }
        }
    }
    findings
}

/// Whether two straight runs share a stretch, or two arcs of one circle start at one point.
fn overlap(one: &Run, two: &Run) -> bool {
    let near = TOUCH * (one.length() + two.length());
    match (one, two) {
        (Run::Straight { from, .. }, Run::Straight { from: other_from, to: other_to }) => {
            let along = one.tangent(0.0);
            let aside = |point: &Vector| (point - from).cross(&along).norm();
            let place = |point: &Vector| (point - from).dot(&along);
            let (a, b) = (place(other_from), place(other_to));
            aside(other_from) <= near
                && aside(other_to) <= near
                && a.max(b).min(one.length()) - a.min(b).max(0.0) > near
        }
        (Run::Arc { centre, radius, .. }, Run::Arc { centre: other, radius: other_radius, .. }) => {
            (centre - other).norm() <= near
                && (radius - other_radius).abs() <= near
                && (one.point(0.5) - two.point(0.5)).norm() <= near
        }
        (Run::Straight { .. }, Run::Arc { .. }) | (Run::Arc { .. }, Run::Straight { .. }) => false,
    }
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
    } else if !joint.accepts(Basis::Ultimate) {
        say(
            Grade::Caution,
            &rules.edition,
            format!(
                "the ultimate analysis is accepted with the law {} only: with {} it is shown for information, and the \
                 elastic result decides",
                rules.ultimate_laws.join(", "),
                joint.law.id
            ),
        );
    }
    if matches!(joint.law.form, LawForm::RigidPlastic { .. }) {
        say(
            Grade::Caution,
            &joint.law.id,
            "full strength at any deformation, no rupture: an estimate that no bound theorem supports".into(),
        );
    }
    if matches!(joint.law.form, LawForm::Table(_)) {
        say(
            Grade::Caution,
            &joint.law.id,
            "the user's own curve: nothing supports it but the tests it was taken from".into(),
        );
    }
    if joint.law.id != rules.law {
        say(
            Grade::Caution,
            &joint.law.id,
            format!("the load-deformation law is not the default of the rule set ({})", rules.law),
        );
    }
    if joint.law.status == Confirmation::Recalled && !matches!(joint.law.form, LawForm::Table(_)) {
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
            "no combinations: the load cases are taken as factored (for ASD: combined) already".into(),
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

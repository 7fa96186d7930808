//! The words for people, in texts and drawings: verdicts, bases, titles.

use crate::analysis::{Analyses, CaseReport, Report, Status};
use crate::model::{Basis, Confirmation, DesignFactor, Discretisation, Joint};
use crate::output::layout::Emphasis;
use crate::output::number::{MISSING, percent, utilisation};

/// The verdict on a joint in capitals.
pub(super) fn verdict(report: &Report) -> (&'static str, Emphasis) {
    let exceeded = report.cases.iter().any(|case| case.status == Status::Exceeded);
    let status = report.verdict();
    if status == Status::Exceeded && !exceeded {
        ("BREACH", Emphasis::Exceeded)
    } else {
        (status_in_capitals(status), status_emphasis(status))
    }
}

pub(in crate::output) fn status_in_capitals(status: Status) -> &'static str {
    match status {
        Status::Satisfied => "SATISFIED",
        Status::Exceeded => "EXCEEDED",
        Status::NotSolved => "NOT SOLVED",
    }
}

/// A status in a table.
pub(in crate::output) fn status(status: Status) -> &'static str {
    match status {
        Status::Satisfied => "satisfied",
        Status::Exceeded => "exceeded",
        Status::NotSolved => "not solved",
    }
}

/// How a status is emphasised.
pub(in crate::output) fn status_emphasis(status: Status) -> Emphasis {
    match status {
        Status::Satisfied => Emphasis::Satisfied,
        Status::Exceeded => Emphasis::Exceeded,
        Status::NotSolved => Emphasis::NotSolved,
    }
}

/// The name of an analysis.
pub(in crate::output) fn basis(basis: Basis) -> &'static str {
    match basis {
        Basis::Ultimate => "instantaneous centre",
        Basis::Elastic => "elastic vector",
        Basis::Concentric => "concentric rule",
    }
}

/// How far values are confirmed.
pub(super) fn confirmation(status: Confirmation) -> &'static str {
    match status {
        Confirmation::Read => "values read in the published text",
        Confirmation::Recalled => "some values recalled: confirm them against the text",
    }
}

/// How the welds are integrated.
pub(super) fn discretisation(discretisation: Discretisation) -> String {
    match discretisation {
        Discretisation::Continuous => "continuous".to_owned(),
        Discretisation::Elements(1) => "1 mid-point element on the longest run".to_owned(),
        Discretisation::Elements(count) => format!("{count} mid-point elements on the longest run"),
    }
}

/// The title of the joint of a report.
pub(super) fn title(report: &Report) -> &str {
    joint_title(&report.joint)
}

/// The title of a joint, or its file where it has none.
pub(in crate::output) fn joint_title(joint: &Joint) -> &str {
    if joint.title.is_empty() { &joint.file } else { &joint.title }
}

/// The utilisation of a case: 0 without load, a dash without answer.
pub(super) fn case_utilisation(case: &CaseReport) -> String {
    match (&case.analyses, &case.verification) {
        (_, Some(verification)) => {
            let exceeded = case.governing_check().is_some_and(|check| check.accepted && !check.satisfied);
            utilisation(verification.utilisation, exceeded)
        }
        (Analyses::Unloaded, None) => utilisation(0.0, false),
        (Analyses::Loaded { .. }, None) => MISSING.to_owned(),
    }
}

/// The utilisation of the governing case.
pub(super) fn governing_utilisation(report: &Report) -> String {
    report.deciding_case().map_or_else(|| MISSING.to_owned(), case_utilisation)
}

/// What decides the joint, in words.
pub(super) fn deciding(report: &Report) -> String {
    let Some(case) = report.deciding_case() else { return "no load case was given".to_owned() };
    if let Some(failure) = case.not_solved() {
        return format!("case {}: {}", case.name, failure.reason);
    }
    if matches!(case.analyses, Analyses::Unloaded) {
        return format!("utilisation 0: case {} has no load", case.name);
    }
    let by = case.verification.as_ref().map_or("", |verification| basis(verification.basis));
    let clause = case.governing_check().map_or("", |check| check.clause.as_str());
    let breach = if report.breached() { "; a rule of detailing is broken, see the findings" } else { "" };
    let clause = if clause.is_empty() { String::new() } else { format!(" ({clause})") };
    format!("utilisation {} in case {}, {by}{clause}{breach}", case_utilisation(case), case.name)
}

/// What decides one case, in a sentence.
pub(super) fn decision(case: &CaseReport) -> String {
    match (&case.analyses, &case.verification) {
        (_, Some(verification)) => {
            let by = basis(verification.basis);
            format!("Decided by {by}: utilisation {}, {}.", case_utilisation(case), status(case.status))
        }
        (Analyses::Unloaded, None) => "No load: nothing to resist.".to_owned(),
        (Analyses::Loaded { .. }, None) => "Not solved: no verification.".to_owned(),
    }
}

/// Rules, design factor, law and how the welds are integrated, in brief.
pub(super) fn basis_in_brief(joint: &Joint) -> String {
    let factor = match &joint.rules.design {
        DesignFactor::None => String::new(),
        DesignFactor::Resistance(phi) => format!(", phi = {}", phi.value),
        DesignFactor::Safety(omega) => format!(", Omega = {}", omega.value),
    };
    format!("{}{factor}; {}", joint.rules.id, law_in_brief(joint))
}

/// The law and how the welds are integrated, in brief.
fn law_in_brief(joint: &Joint) -> String {
    format!("{}, {}", joint.law.id, discretisation(joint.discretisation))
}

/// The ratio of the two methods in words.
pub(in crate::output) fn ratio(ratio: f64) -> String {
    let share = 1.0 - 1.0 / ratio;
    if share.abs() < 0.0005 {
        "Both methods give practically the same nominal strength.".to_owned()
    } else if share > 0.0 {
        format!("The elastic method leaves {} of the ultimate strength unused.", percent(share))
    } else {
        format!("The elastic method exceeds the ultimate strength by {}.", percent(share))
    }
}

/// What becomes of an ultimate analysis under rules that do not accept it.
pub(in crate::output) fn not_accepted(joint: &Joint) -> String {
    let edition = &joint.rules.edition;
    format!("{edition} does not accept the ultimate analysis: it is information and decides nothing.")
}

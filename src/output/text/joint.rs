//! One joint: the verdict, the input in brief, the line properties of the welds, its cases, the findings.

use super::{case, cases};
use crate::analysis::{Finding, Grade, Report, Section};
use crate::model::{Confirmation, DesignFactor, Joint, LawForm};
use crate::output::layout::{Emphasis, Layout};
use crate::output::number::{length, people, point, power_of_length};
use crate::output::table::{hanging, labelled, wrap};
use crate::output::words;
use crate::units::{Dimension, UnitSystem};

/// The text of one joint.
pub(super) fn text(report: &Report, layout: &Layout) -> String {
    let mut blocks = vec![verdict(report, layout), input(report, layout)];
    if report.cases.len() > 1 {
        blocks.push(cases::text(report, layout));
    }
    let governing = report.deciding_case();
    for each in &report.cases {
        if layout.all_cases || governing.is_some_and(|case| std::ptr::eq(case, each)) {
            blocks.push(case::text(each, &report.joint, layout));
        }
    }
    if !report.findings.is_empty() {
        blocks.push(findings(&report.findings, layout));
    }
    blocks.join("\n")
}

/// `SATISFIED  title`, then what decides it.
fn verdict(report: &Report, layout: &Layout) -> String {
    let (word, emphasis) = words::verdict(report);
    let title = hanging(&format!("{word:<10}  "), words::title(report), layout.columns());
    // The verdict stands at the start of the block: paint it after the wrapping.
    let title = title.replacen(word, &(layout.paint)(emphasis, word), 1);
    title + &hanging("            ", &words::deciding(report), layout.columns())
}

/// File, rules, law and line properties.
fn input(report: &Report, layout: &Layout) -> String {
    let joint = &report.joint;
    let mut rows = given(joint);
    rows.extend(section(joint, &report.section));
    labelled(0, &rows, layout.columns())
}

/// What a joint is verified with: file, rules, law, kind of loads.
pub(in crate::output) fn given(joint: &Joint) -> Vec<(&'static str, String)> {
    let rules = &joint.rules;
    let loads = if joint.combined {
        "combinations of factored cases"
    } else {
        "cases taken as factored (for ASD: combined) already"
    };
    vec![
        ("File", joint.file.clone()),
        ("Rules", format!("{} ({}); {}", rules.title, rules.id, words::confirmation(rules.status()))),
        ("Design factor", design_factor(&rules.design)),
        ("Law", law(joint)),
        ("Loads", loads.to_owned()),
    ]
}

fn law(joint: &Joint) -> String {
    let recalled = match (&joint.law.form, joint.law.status) {
        (LawForm::Table(_), _) => "; given in the joint file",
        (_, Confirmation::Read) => "",
        (_, Confirmation::Recalled) => "; coefficients recalled",
    };
    format!(
        "{} ({}); {}{recalled}",
        joint.law.title,
        joint.law.id,
        words::discretisation(joint.discretisation)
    )
}

fn design_factor(factor: &DesignFactor) -> String {
    match factor {
        DesignFactor::None => "none: nominal strengths".to_owned(),
        DesignFactor::Resistance(phi) => format!("phi = {} ({})", phi.value, phi.clause),
        DesignFactor::Safety(omega) => format!("Omega = {} ({})", omega.value, omega.clause),
    }
}

/// Properties of the welds as lines weighted by throat.
fn section(joint: &Joint, section: &Section) -> Vec<(&'static str, String)> {
    let units: UnitSystem = joint.units;
    let with_power = |value: f64, power: i32| {
        let (factor, unit) = power_of_length(units, power);
        format!("{} {unit}", people(value / factor))
    };
    let count = joint.group.welds().len();
    let noun = if count == 1 { "weld" } else { "welds" };
    let size = format!(
        "{count} {noun}, length {}, throat area {}",
        length(units, section.length),
        with_power(section.throat_area, 2)
    );
    let moments = format!(
        "Ix {}, Iy {}, Ixy {}, J {}",
        with_power(section.i_x, 4),
        with_power(section.i_y, 4),
        with_power(if section.i_xy.abs() <= 1e-9 * section.j { 0.0 } else { section.i_xy }, 4),
        with_power(section.j, 4)
    );
    vec![
        ("Welds", size),
        ("Centroid", point(units, Dimension::Length, section.centroid.as_slice())),
        ("Throat inertia", moments),
    ]
}

/// Findings by gravity.
fn findings(findings: &[Finding], layout: &Layout) -> String {
    let mut block = (layout.paint)(Emphasis::Heading, "Findings") + "\n";
    for (grade, word, emphasis) in [
        (Grade::Breach, "breach", Some(Emphasis::Exceeded)),
        (Grade::Caution, "caution", Some(Emphasis::Caution)),
        (Grade::Note, "note", None),
    ] {
        for finding in findings.iter().filter(|finding| finding.grade == grade) {
            let clause =
                if finding.clause.is_empty() { String::new() } else { format!(" [{}]", finding.clause) };
            let subject =
                if finding.subject.is_empty() { String::new() } else { format!("{}: ", finding.subject) };
            let sentence = format!("{subject}{}{clause}", finding.message);
            let indent = "           ";
            for (index, line) in wrap(&sentence, layout.columns() - indent.len()).iter().enumerate() {
                let shown = match emphasis {
                    Some(emphasis) => (layout.paint)(emphasis, word),
                    None => word.to_owned(),
                };
                let space = " ".repeat(9 - word.len());
                block.push_str(&if index == 0 { format!("  {shown}{space}") } else { indent.to_owned() });
                block.push_str(line);
                block.push('\n');
            }
        }
    }
    block
}

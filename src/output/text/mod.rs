//! Reports as text for people: the verdict first, then the evidence, then what the answer does not cover.
//!
//! Several joints open with a list of their verdicts. One joint: verdict, input in brief, a table of its
//! cases when there are several, the governing case in detail, findings. The cautions close the text once.

mod case;
mod cases;
pub(super) mod cautions;
mod joint;
mod words;

use super::layout::{Emphasis, Layout};
use super::number::MISSING;
use super::table::{Cell, Side, Table, clip};
use crate::analysis::{Report, Status};

/// The reports of one run as text; `unread` names the files that gave no joint, so that none goes unseen.
#[must_use]
pub fn check_text(reports: &[Report], unread: &[String], layout: &Layout) -> String {
    let mut blocks = Vec::new();
    if reports.len() + unread.len() > 1 {
        blocks.push(overview(reports, unread, layout));
    }
    for (index, report) in reports.iter().enumerate() {
        let rule = if reports.len() > 1 { separator(index, reports.len(), layout) } else { String::new() };
        blocks.push(rule + &joint::text(report, layout));
    }
    if !reports.is_empty() {
        blocks.push(cautions::text(layout));
    }
    blocks.join("\n")
}

/// A line that tells where the text of one joint begins.
fn separator(index: usize, count: usize, layout: &Layout) -> String {
    let title = format!("---- joint {} of {count} ", index + 1);
    format!("{title:-<width$}\n", width = layout.columns())
}

/// One line per joint.
fn overview(reports: &[Report], unread: &[String], layout: &Layout) -> String {
    let count = |status: Status| reports.iter().filter(|report| report.verdict() == status).count();
    let counts = [
        (count(Status::Satisfied), "satisfied"),
        (count(Status::Exceeded), "exceeded"),
        (count(Status::NotSolved), "not solved"),
        (unread.len(), "not read"),
    ];
    let parts: Vec<String> = counts
        .iter()
        .filter(|(count, _)| *count > 0)
        .map(|(count, word)| format!("{count} {word}"))
        .collect();
    let heading = format!("{} joints: {}", reports.len() + unread.len(), parts.join(", "));
    let mut table =
        Table::new(&[("", Side::Left), ("", Side::Right), ("", Side::Flexible), ("", Side::Left)]);
    for report in reports {
        let (word, emphasis) = words::verdict(report);
        table.row(vec![
            Cell::emphasised(word, emphasis),
            words::governing_utilisation(report).into(),
            words::title(report).into(),
            clip(&report.joint.file, layout.columns() / 3).into(),
        ]);
    }
    for file in unread {
        table.row(vec![
            Cell::emphasised("NOT READ", Emphasis::NotSolved),
            MISSING.into(),
            "see the messages on standard error".into(),
            clip(file, layout.columns() / 3).into(),
        ]);
    }
    format!("{}\n{}", (layout.paint)(Emphasis::Heading, &heading), table.render(2, layout))
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::output::fixture;

    fn one(report: Report) -> String {
        check_text(&[report], &[], &Layout::default())
    }

    #[test]
    fn one_joint_with_one_case() {
        insta::assert_snapshot!(one(fixture::report(vec![fixture::case("crane", 1.25)], Some(0))));
    }

    #[test]
    fn several_cases_show_the_governing_one_in_detail() {
        let cases = vec![fixture::case("wind", 2.0), fixture::case("crane", 1.25), fixture::unloaded("idle")];
        let text = one(fixture::report(cases, Some(1)));
        assert!(text.contains("Case crane") && !text.contains("Case wind"), "{text}");
        insta::assert_snapshot!(text.split("\n\n").nth(2).unwrap());
    }

    #[test]
    fn all_cases_are_shown_in_detail_on_request() {
        let cases = vec![fixture::case("wind", 2.0), fixture::case("crane", 1.25)];
        let layout = Layout { all_cases: true, ..Layout::default() };
        let text = check_text(&[fixture::report(cases, Some(1))], &[], &layout);
        assert!(text.contains("Case crane") && text.contains("Case wind"), "{text}");
    }

    #[test]
    fn an_unsolved_case_comes_first() {
        let cases = vec![fixture::case("wind", 2.0), fixture::unsolved("crane")];
        let text = one(fixture::report(cases, None));
        assert!(text.starts_with("NOT SOLVED"), "{text}");
        assert!(text.contains("Case crane") && text.contains("the search for equilibrium stalled"), "{text}");
    }

    #[test]
    fn an_ultimate_analysis_that_is_not_accepted_is_information() {
        let report = fixture::report(vec![fixture::case("crane", 2.0)], Some(0));
        let text = one(fixture::behind_the_firewall(report));
        assert!(text.starts_with("SATISFIED  "), "{text}");
        assert!(text.contains("not accepted") && text.contains("information"), "{text}");
    }

    #[test]
    fn a_breach_is_no_satisfaction() {
        let mut report = fixture::report(vec![fixture::case("crane", 2.0)], Some(0));
        report.findings[0].grade = crate::analysis::Grade::Breach;
        assert!(one(report).starts_with("BREACH"));
    }

    #[test]
    fn no_line_is_wider_than_asked() {
        let mut long = fixture::report(vec![fixture::case(&"crane ".repeat(30), 1.25); 3], Some(0));
        long.joint.title = "A title that goes on and on ".repeat(8);
        for width in [72, 80, 120] {
            let layout = Layout { width, all_cases: true, ..Layout::default() };
            let text = check_text(&[long.clone(), long.clone()], &[], &layout);
            for line in text.lines() {
                assert!(line.chars().count() <= width, "{width}: {line}");
            }
        }
    }

    #[test]
    fn several_joints_open_with_their_verdicts() {
        let good = fixture::report(vec![fixture::case("crane", 2.0)], Some(0));
        let bad = fixture::report(vec![fixture::case("crane", 1.25)], Some(0));
        let text = check_text(&[good, bad], &["slip.toml".to_owned()], &Layout::default());
        assert!(text.starts_with("3 joints: 1 satisfied, 1 exceeded, 1 not read\n"), "{text}");
        assert!(text.contains("NOT READ"), "{text}");
    }
}

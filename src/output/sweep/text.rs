//! A sweep as text for people: what is varied, what it is verified with, the numbers, what they say, the limits.

use super::labels::Labels;
use super::{curve, matrix, summary};
use crate::analysis::Status;
use crate::output::layout::{Emphasis, Layout};
use crate::output::table::{hanging, labelled};
use crate::output::text::{cautions, joint};
use crate::output::words;
use crate::study::sweep::Sweep;

/// The text of a sweep.
#[must_use]
pub fn sweep_text(sweep: &Sweep, layout: &Layout) -> String {
    let labels = Labels::new(sweep);
    let numbers = if sweep.variables.len() == 1 {
        curve::text(sweep, &labels, layout)
    } else {
        matrix::text(sweep, &labels, layout)
    };
    let blocks = [
        heading(sweep, &labels, layout),
        given(sweep, layout),
        numbers,
        summary::text(sweep, &labels, layout),
        cautions::text(layout),
    ];
    blocks.into_iter().filter(|block| !block.is_empty()).collect::<Vec<_>>().join("\n")
}

/// Title, ranges and how many points hold.
fn heading(sweep: &Sweep, labels: &Labels<'_>, layout: &Layout) -> String {
    let word = "SWEEP";
    let title = hanging("SWEEP       ", words::joint_title(&sweep.joint), layout.columns());
    let mut block = title.replacen(word, &(layout.paint)(Emphasis::Heading, word), 1);
    for variable in 0..sweep.variables.len() {
        block.push_str(&hanging("            ", &labels.range(variable), layout.columns()));
    }
    let counts: Vec<String> = [Status::Satisfied, Status::Exceeded, Status::NotSolved]
        .into_iter()
        .map(|status| (sweep.count(status), status))
        .filter(|(count, _)| *count > 0)
        .map(|(count, status)| match status {
            Status::Satisfied | Status::Exceeded => format!("{count} {}", words::status(status)),
            Status::NotSolved => format!("{count} without an answer"),
        })
        .collect();
    let counts = format!("{} points: {}", sweep.points.len(), counts.join(", "));
    block + &hanging("            ", &counts, layout.columns())
}

fn given(sweep: &Sweep, layout: &Layout) -> String {
    let mut rows = joint::given(&sweep.joint);
    let noun = if sweep.joint.combined { "combination" } else { "case" };
    let among = match sweep.cases.len() {
        0 | 1 => String::new(),
        count => format!(", one of {count}; verdicts are those of all"),
    };
    rows.push(("Shown", format!("{noun} {}{among}", sweep.shown_name())));
    labelled(0, &rows, layout.columns())
}

#[cfg(test)]
mod tests {
    use super::super::fixture;
    use super::*;

    fn without_limits(text: &str) -> &str {
        text.split_once("Limits of this calculation").unwrap().0
    }

    #[test]
    fn a_curve_shows_its_jump_and_what_is_out_of_the_ordinary() {
        insta::assert_snapshot!(without_limits(&sweep_text(&fixture::curve(), &Layout::default())));
    }

    #[test]
    fn two_variables_make_matrices() {
        let text = sweep_text(&fixture::plane(4), &Layout::default());
        insta::assert_snapshot!(without_limits(&text));
    }

    #[test]
    fn many_columns_are_left_to_a_spreadsheet() {
        let text = sweep_text(&fixture::plane(40), &Layout::default());
        assert!(text.contains("`--format csv` writes a row for each point"), "{text}");
    }

    #[test]
    fn no_line_is_wider_than_asked() {
        let mut curve = fixture::curve();
        curve.joint.title = "A title that goes on and on ".repeat(8);
        curve.cases = vec!["crane ".repeat(30), "twist ".repeat(30)];
        for (sweep, width) in [(&curve, 72), (&curve, 80), (&fixture::plane(6), 72)] {
            let text = sweep_text(sweep, &Layout { width, ..Layout::default() });
            for line in text.lines() {
                assert!(line.chars().count() <= width, "{width}: {line}");
            }
        }
    }

    #[test]
    fn an_ultimate_analysis_that_is_not_accepted_is_said_to_be_information() {
        let mut sweep = fixture::curve();
        sweep.joint.rules.accepts = vec![crate::model::Basis::Elastic];
        assert!(sweep_text(&sweep, &Layout::default()).contains("it is information"));
    }
}

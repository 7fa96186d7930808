//! The self-check as text: the page for a quality file.
//!
//! Verdict and program first; then what has failed; a summary by document; every value with its source, its
//! tolerance and the reason for it; last what such a comparison does not say.

use super::group::{Document, documents};
use super::{block, words};
use crate::output::layout::{Emphasis, Layout};
use crate::output::names::confirmation_name;
use crate::output::number::{MISSING, fixed, percent};
use crate::output::table::{Cell, Side, Table, hanging, labelled};
use crate::output::text::cautions;
use crate::study::selfcheck::{Outcome, SelfCheck};

/// What the program cannot know, for whoever files the page: it reads no clock and no machine.
const SIGNATURES: &str = "Run on (machine)  ______________________    Date  ______________________\n\n\
                          Filed by (name)   ______________________    Sign  ______________________\n";

/// The self-check of the program of this version as text.
#[must_use]
pub fn selfcheck_text(version: &str, check: &SelfCheck, layout: &Layout) -> String {
    let documents = documents(check);
    let mut blocks = vec![verdict(check, layout), program(version, check, &documents, layout)];
    if !check.passed() {
        blocks.push(failures(check, layout));
    }
    blocks.push(summary(&documents, layout));
    blocks.push(symbols(check, layout));
    for document in &documents {
        let heading = hanging(&format!("{}  ", document.number), document.source, layout.columns());
        let painted = heading.lines().map(|line| (layout.paint)(Emphasis::Heading, line) + "\n");
        blocks.push(painted.collect());
        blocks.extend(document.groups.iter().map(|group| block::text(group, layout)));
    }
    blocks.push(remarks(check, layout));
    blocks.push(cautions::text(layout));
    blocks.push(SIGNATURES.to_owned());
    blocks.join("\n")
}

fn verdict(check: &SelfCheck, layout: &Layout) -> String {
    let (count, passed) = (check.outcomes.len(), check.passed());
    let word = words::verdict(passed).to_uppercase();
    let sentence = if passed {
        format!("all {count} published values are met within their tolerances")
    } else {
        format!("{} of {count} published values are not met", check.failures().count())
    };
    let text = hanging(&format!("{word:<10}  "), &sentence, layout.columns());
    // The verdict stands at the start of the block: paint it after the wrapping.
    text.replacen(&word, &(layout.paint)(words::emphasis(passed), &word), 1)
}

/// The program, and how the values were computed.
fn program(version: &str, check: &SelfCheck, documents: &[Document<'_>], layout: &Layout) -> String {
    let rows = [
        ("Program", format!("weldpole {version}")),
        (
            "Values",
            format!(
                "{} printed in {} documents, embedded in the program with their tolerances",
                check.outcomes.len(),
                documents.len()
            ),
        ),
        (
            "Law",
            format!(
                "{} ({}); coefficients {}",
                check.law.title,
                check.law.id,
                confirmation_name(check.law.status)
            ),
        ),
        ("Weld", words::discretisation(check.discretisation)),
        ("Rules", check.rules().join(", ")),
        (
            "Analysis",
            "each case as a joint of its own through the analysis of `weldpole check`: all equilibrium states \
             searched for, the smallest load factor used"
                .to_owned(),
        ),
    ];
    labelled(0, &rows, layout.columns())
}

fn failures(check: &SelfCheck, layout: &Layout) -> String {
    let mut text = (layout.paint)(Emphasis::Heading, "Failures") + "\n";
    for outcome in check.failures() {
        text.push_str(&hanging("  - ", &failure(outcome), layout.columns()));
    }
    text
}

/// One failure in words.
fn failure(outcome: &Outcome) -> String {
    let case = &outcome.case;
    let found = match &outcome.computed {
        Ok(_) => format!(
            "weldpole {}, {} of what is allowed",
            block::computed(outcome),
            outcome.use_of_tolerance().map_or_else(|| MISSING.to_owned(), percent)
        ),
        Err(reason) => format!("weldpole has no value: {reason}"),
    };
    format!(
        "{} ({}, {}; {}): {}: published {}, {found}",
        case.id,
        case.source,
        case.place,
        words::shape(case),
        words::measure(case.quantity),
        case.expected.text
    )
}

/// One line per group: how near the computed values are to the published ones.
fn summary(documents: &[Document<'_>], layout: &Layout) -> String {
    let mut text = (layout.paint)(Emphasis::Heading, "Summary") + "\n";
    for document in documents {
        text.push_str(&hanging(&format!("  {}  ", document.number), document.source, layout.columns()));
    }
    text.push('\n');
    let mut table = Table::new(&[
        ("", Side::Left),
        ("values of", Side::Flexible),
        ("met", Side::Right),
        ("least", Side::Right),
        ("greatest", Side::Right),
        ("allowed", Side::Right),
        ("used", Side::Right),
    ]);
    for group in documents.iter().flat_map(|document| &document.groups) {
        let decimals = group.decimals();
        let (least, greatest) = match group.ratios() {
            Some((least, greatest)) => (fixed(least, decimals), fixed(greatest, decimals)),
            None => (MISSING.to_owned(), MISSING.to_owned()),
        };
        let method = words::method(group.first.case.method);
        let met = group.outcomes.iter().filter(|outcome| outcome.passed()).count();
        let count = group.outcomes.len();
        table.row(vec![
            group.number.as_str().into(),
            format!("{}, {method}", block::symbols(group)).into(),
            Cell::emphasised(&format!("{met} of {count}"), words::emphasis(met == count)),
            least.into(),
            greatest.into(),
            words::allowed(&group.first.tolerance).into(),
            group.use_of_tolerance().map_or_else(|| MISSING.to_owned(), percent).into(),
        ]);
    }
    let legend = "least, greatest: ratio of weldpole's value to the published one; allowed: how far values may \
                  differ, in percent or in units of the last printed digit; used: greatest difference as a share \
                  of what is allowed.";
    text + &table.render(2, layout) + &hanging("  ", legend, layout.columns())
}

/// The shapes in words.
const SHAPES: &str = "lines of length l are vertical, as is the load where no angle is told; C: horizontals of k l at \
                      both ends, L: one at the foot, both towards the load; two lines: k l apart; two lines \
                      across: horizontal, of length l, k l apart";

/// What the symbols and columns of the tables mean.
fn symbols(check: &SelfCheck, layout: &Layout) -> String {
    let mut rows: Vec<(&str, String)> = Vec::new();
    for outcome in &check.outcomes {
        let (symbol, meaning) = words::meaning(outcome.case.quantity);
        if !rows.iter().any(|(known, _)| *known == symbol) {
            rows.push((symbol, meaning.to_owned()));
        }
    }
    rows.extend([
        ("shapes", SHAPES.to_owned()),
        ("k", "second dimension of the shape over its length l".to_owned()),
        ("a", "distance from the weld centroid to the load over l".to_owned()),
        (
            "weldpole",
            "the computed value, shown with one digit more than the published one and judged unrounded"
                .to_owned(),
        ),
        ("ratio", "weldpole over published".to_owned()),
        ("allowed", "how far the ratio may be from 1".to_owned()),
    ]);
    (layout.paint)(Emphasis::Heading, "Symbols and columns") + "\n" + &labelled(2, &rows, layout.columns())
}

fn remarks(check: &SelfCheck, layout: &Layout) -> String {
    let mut text = (layout.paint)(Emphasis::Heading, "What this comparison says") + "\n";
    for remark in &check.remarks {
        text.push_str(&hanging("  - ", remark, layout.columns()));
    }
    text
}

#[cfg(test)]
mod tests {
    use super::super::fixture;
    use super::*;

    #[test]
    fn the_whole_page() {
        insta::assert_snapshot!(selfcheck_text("0.0.0", &fixture::passed(), &Layout::default()));
    }

    #[test]
    fn failures_come_first_with_their_reasons() {
        let text = selfcheck_text("0.0.0", &fixture::failed(), &Layout::default());
        assert!(text.starts_with("FAILED      2 of 3 published values are not met\n"), "{text}");
        let (failures, rest) = (text.find("\nFailures\n").unwrap(), text.find("\nSummary\n").unwrap());
        assert!(failures < rest, "{text}");
        insta::assert_snapshot!(text[failures..text.find("\nWhat this").unwrap()].trim_start());
    }

    #[test]
    fn no_line_is_wider_than_asked() {
        for check in [fixture::passed(), fixture::failed(), crate::study::selfcheck::run()] {
            for width in [72, 80, 120] {
                let text = selfcheck_text("0.0.0", &check, &Layout { width, ..Layout::default() });
                for line in text.lines() {
                    assert!(line.chars().count() <= width, "{width}: {line}");
                }
            }
        }
    }
}

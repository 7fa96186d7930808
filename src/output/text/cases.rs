//! The table of all cases of a joint, one line each.

use crate::analysis::Report;
use crate::output::layout::{Emphasis, Layout};
use crate::output::number::{MISSING, people};
use crate::output::table::{Cell, Side, Table};
use crate::output::words;

/// Every case with its verdict and the nominal load factors of both methods.
pub(super) fn text(report: &Report, layout: &Layout) -> String {
    let noun = if report.joint.combined { "combination" } else { "case" };
    let mut table = Table::new(&[
        (noun, Side::Flexible),
        ("verdict", Side::Left),
        ("utilis.", Side::Right),
        ("ultimate", Side::Right),
        ("elastic", Side::Right),
        ("ult./el.", Side::Right),
        ("", Side::Left),
    ]);
    let joint = &report.joint;
    let number = |value: Option<f64>| value.map_or_else(|| MISSING.to_owned(), people);
    for (index, case) in report.cases.iter().enumerate() {
        table.row(vec![
            case.name.as_str().into(),
            Cell::emphasised(words::status(case.status), words::status_emphasis(case.status)),
            words::case_utilisation(case).into(),
            number(case.ultimate_strength(joint).map(|strength| strength.load_factor)).into(),
            number(case.elastic_strength(joint).map(|strength| strength.load_factor)).into(),
            number(case.ultimate_over_elastic()).into(),
            if report.governing == Some(index) { "governs" } else { "" }.into(),
        ]);
    }
    let heading = format!("All {noun}s (ultimate, elastic: nominal load factors)");
    format!("{}\n{}", (layout.paint)(Emphasis::Heading, &heading), table.render(2, layout))
}

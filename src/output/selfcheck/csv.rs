//! The self-check as a table, one row per published value.
//!
//! `expected` keeps the printed digits; `tolerance` is a share of them (`relative`) or counts units of their last
//! digit (`last-digit`). A value that could not be computed leaves `computed` and `ratio` empty and says why.

use super::words;
use crate::output::csv::{field, to_text};
use crate::output::number::machine;
use crate::study::selfcheck::{Outcome, SelfCheck};

/// Column titles.
const TITLES: [&str; 18] = [
    "id",
    "method",
    "shape",
    "k",
    "a",
    "load_angle_from_vertical_deg",
    "quantity",
    "unit",
    "expected",
    "computed",
    "ratio",
    "tolerance",
    "tolerance_kind",
    "why",
    "source",
    "where",
    "verdict",
    "reason",
];

/// The values of a self-check, one row each.
#[must_use]
pub fn selfcheck_csv(check: &SelfCheck) -> String {
    let mut rows = vec![TITLES.map(str::to_owned)];
    rows.extend(check.outcomes.iter().map(fields));
    to_text(rows)
}

fn fields(outcome: &Outcome) -> [String; 18] {
    let case = &outcome.case;
    let (kind, size) = words::allowance(&outcome.tolerance);
    [
        case.id.clone(),
        case.method.name().to_owned(),
        case.shape.name().to_owned(),
        machine(case.k),
        machine(case.a),
        machine(case.load_angle_deg),
        case.quantity.name().to_owned(),
        case.quantity.unit().to_owned(),
        case.expected.text.clone(),
        field(outcome.computed.as_ref().ok().copied()),
        field(outcome.ratio()),
        machine(size),
        kind.to_owned(),
        outcome.tolerance.why.clone(),
        case.source.clone(),
        case.place.clone(),
        words::verdict(outcome.passed()).to_owned(),
        words::reason(outcome),
    ]
}

#[cfg(test)]
mod tests {
    use super::super::fixture;
    use super::*;

    #[test]
    fn one_row_per_value_and_no_number_from_a_failure() {
        insta::assert_snapshot!(selfcheck_csv(&fixture::failed()));
    }
}

//! One group of values as text: what they are, how far they may be off and why, then one line each.

use super::group::Group;
use super::words;
use crate::output::layout::{Emphasis, Layout};
use crate::output::number::{MISSING, fixed, small};
use crate::output::table::{Cell, Side, Table, hanging, labelled};
use crate::study::selfcheck::Outcome;

/// Columns from which each line also carries the id of its row.
const WIDTH_WITH_IDS: usize = 100;

/// Decimals beyond which a small number is shown with a power of ten.
const MOST_DECIMALS: usize = 6;

/// The text of one group.
pub(super) fn text(group: &Group<'_>, layout: &Layout) -> String {
    let first = format!("{}  ", group.number);
    let method = words::method(group.first.case.method);
    let title = match group.shared(|outcome| outcome.case.quantity.unit()) {
        Some(unit) => format!("{} in {unit}, {method}", symbols(group)),
        None => format!("{}, {method}", symbols(group)),
    };
    let heading = hanging(&first, &title, layout.columns());
    let mut block =
        heading.lines().map(|line| (layout.paint)(Emphasis::Heading, line) + "\n").collect::<String>();
    let mut facts = vec![("Allowed", words::allowed_because(&group.first.tolerance))];
    facts.extend(place(group).map(|place| ("Place", place.to_owned())));
    facts.extend(shape(group).map(|shape| ("Case", shape)));
    block.push_str(&labelled(first.len(), &facts, layout.columns()));
    block.push_str(&table(group, layout).render(2, layout));
    block
}

/// The symbols of what the values are of.
pub(super) fn symbols(group: &Group<'_>) -> String {
    let mut symbols: Vec<&str> = Vec::new();
    for outcome in &group.outcomes {
        let symbol = words::symbol(outcome.case.quantity);
        if !symbols.contains(&symbol) {
            symbols.push(symbol);
        }
    }
    symbols.join(", ")
}

/// The place in the document, where all values share it.
fn place<'a>(group: &'a Group<'_>) -> Option<&'a str> {
    group.shared(|outcome| outcome.case.place.as_str())
}

/// The shape, where all values share it and their place.
fn shape(group: &Group<'_>) -> Option<String> {
    place(group).and_then(|_| group.shared(|outcome| words::shape(&outcome.case)))
}

fn table(group: &Group<'_>, layout: &Layout) -> Table {
    let (one_place, one_shape) = (place(group).is_some(), shape(group).is_some());
    let with_quantity = one_shape || group.shared(|outcome| outcome.case.quantity).is_none();
    let with_ids = layout.columns() >= WIDTH_WITH_IDS;
    let mut columns = Vec::new();
    if with_ids {
        columns.push(("row", Side::Left));
    }
    if !one_shape {
        columns.push(("case", Side::Flexible));
    }
    if with_quantity {
        columns.push(("value of", Side::Left));
    }
    columns.extend([
        ("published", Side::Right),
        ("weldpole", Side::Right),
        ("ratio", Side::Right),
        ("allowed", Side::Right),
        ("verdict", Side::Left),
    ]);
    let mut table = Table::new(&columns);
    let decimals = group.decimals();
    for outcome in &group.outcomes {
        let case = &outcome.case;
        let mut cells: Vec<Cell> = Vec::new();
        if with_ids {
            cells.push(case.id.as_str().into());
        }
        if !one_shape {
            let shape = words::shape(case);
            cells.push(if one_place { shape } else { format!("{}: {shape}", case.place) }.into());
        }
        if with_quantity {
            cells.push(words::symbol(case.quantity).into());
        }
        let passed = outcome.passed();
        cells.extend([
            case.expected.text.as_str().into(),
            computed(outcome).into(),
            outcome.ratio().map_or_else(|| MISSING.to_owned(), |ratio| fixed(ratio, decimals)).into(),
            format!("+-{}", allowed(outcome.allowed_ratio(), decimals)).into(),
            Cell::emphasised(words::verdict(passed), words::emphasis(passed)),
        ]);
        table.row(cells);
    }
    table
}

/// How far a ratio may be from 1: with the decimals of the ratio, or their power of ten where they are many.
fn allowed(ratio: f64, decimals: usize) -> String {
    if decimals > MOST_DECIMALS { small(ratio) } else { fixed(ratio, decimals) }
}

/// The computed value with one decimal more than the published one.
pub(super) fn computed(outcome: &Outcome) -> String {
    let shown = |value: &f64| fixed(*value, outcome.case.expected.decimals + 1);
    outcome.computed.as_ref().map_or_else(|_| MISSING.to_owned(), shown)
}

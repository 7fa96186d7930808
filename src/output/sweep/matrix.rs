//! Two variables: matrices of utilisation and of the ratio of the methods, where they fit.

use super::labels::Labels;
use crate::analysis::Status;
use crate::output::layout::{Emphasis, Layout, plain};
use crate::output::number::{MISSING, people, utilisation};
use crate::output::table::{Cell, Side, Table, hanging};
use crate::study::sweep::{Answer, Point, PointCase, Sweep};

/// Rows beyond which a matrix is for a spreadsheet.
const MOST_ROWS: usize = 60;

/// The matrices of a sweep over two variables.
pub(super) fn text(sweep: &Sweep, labels: &Labels<'_>, layout: &Layout) -> String {
    let used = render(sweep, labels, &|point| joint_utilisation(point), layout);
    let ratio = render(sweep, labels, &|point| ratio(sweep.shown_case(point)), layout);
    // Without colours, whose codes take no column.
    let unpainted = Layout { paint: plain, ..*layout };
    let measured = render(sweep, labels, &|point| joint_utilisation(point), &unpainted);
    let fits = measured.lines().all(|line| line.chars().count() <= layout.columns());
    if labels.values(0).len() > MOST_ROWS || !fits {
        let sentence = "The numbers are too many for a page: `--format csv` writes a row for each point.";
        return hanging("", sentence, layout.columns());
    }
    let [rows, columns] = [0, 1].map(|at| {
        let variable = &sweep.variables[at];
        format!("{} {}", variable.name, variable.unit).trim_end().to_owned()
    });
    let heading = |what: &str| {
        let directions = hanging("  ", &format!("rows: {rows}; columns: {columns}"), layout.columns());
        format!("{}\n{directions}", (layout.paint)(Emphasis::Heading, what))
    };
    let used = heading("Utilisation of the joint") + &used;
    let ratio = heading("Ultimate over elastic strength in the case shown") + &ratio;
    format!("{used}\n{ratio}")
}

fn render(sweep: &Sweep, labels: &Labels<'_>, cell: &dyn Fn(&Point) -> Cell, layout: &Layout) -> String {
    let mut columns = vec![("", Side::Right)];
    columns.extend(labels.values(1).iter().map(|value| (value.as_str(), Side::Right)));
    let mut table = Table::new(&columns);
    let rows = sweep.points.chunks(labels.values(1).len().max(1));
    for (value, points) in labels.values(0).iter().zip(rows) {
        let mut cells = vec![Cell::from(value)];
        cells.extend(points.iter().map(cell));
        table.row(cells);
    }
    table.render(2, layout)
}

/// The utilisation of the governing case.
fn joint_utilisation(point: &Point) -> Cell {
    let status = point.status();
    let used = point.outcome.as_ref().ok().and_then(Answer::utilisation);
    match used {
        Some(used) if status == Status::Exceeded => {
            Cell::emphasised(&utilisation(used, true), Emphasis::Exceeded)
        }
        Some(used) => utilisation(used, false).into(),
        None => MISSING.into(),
    }
}

fn ratio(case: Option<&PointCase>) -> Cell {
    let ratio = case.and_then(PointCase::ultimate_over_elastic);
    ratio.map_or_else(|| MISSING.to_owned(), people).into()
}

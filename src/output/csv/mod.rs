//! Tables for spreadsheets and programs, as RFC 4180 text (comma, CRLF, quotes where needed).
//!
//! | table | one row per | function |
//! |---|---|---|
//! | element table | element of a weld, case and joint | [`elements_csv`] |
//! | summary | case and joint | [`summary_csv`] |
//!
//! Numbers keep 12 significant digits; a missing value is an empty field.

mod elements;
mod summary;

pub use elements::elements_csv;
pub use summary::summary_csv;

use super::number::machine;
use crate::analysis::Report;
use crate::units::{Dimension, UnitSystem};

/// A field for a number that may be missing.
pub(super) fn field(value: Option<f64>) -> String {
    value.map(machine).unwrap_or_default()
}

/// The unit as it stands in a column title: `kN_m`, `kip_per_in`.
pub(super) fn unit_suffix(units: UnitSystem, dimension: Dimension) -> String {
    units.symbol(dimension).replace('/', "_per_").replace(' ', "_")
}

/// What tells the joints of a run apart: the title; with the file where titles are missing or shared.
fn joint_labels(reports: &[Report]) -> Vec<String> {
    let shared = |title: &str| reports.iter().filter(|report| report.joint.title == title).count() > 1;
    let label = |report: &Report| {
        let (title, file) = (&report.joint.title, &report.joint.file);
        if title.is_empty() {
            file.clone()
        } else if shared(title) {
            format!("{title} ({file})")
        } else {
            title.clone()
        }
    };
    reports.iter().map(label).collect()
}

/// Rows of equal length as text.
pub(super) fn to_text<R: AsRef<[String]>>(rows: Vec<R>) -> String {
    let mut writer =
        ::csv::WriterBuilder::new().terminator(::csv::Terminator::CRLF).from_writer(Vec::<u8>::new());
    for row in rows {
        writer.write_record(row.as_ref()).expect("rows are equally long and memory accepts every write");
    }
    let bytes = writer.into_inner().expect("memory accepts every write");
    String::from_utf8(bytes).expect("text fields, commas, quotes and line breaks are UTF-8")
}

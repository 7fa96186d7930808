//! Sweeps as text for people, as a table for spreadsheets, and as JSON for other programs.
//!
//! ```text
//! Sweep -> sweep_text    one variable: a table with its jumps (curve.rs); two: matrices (matrix.rs)
//!       -> sweep_csv     one row per point and case
//!       -> sweep_json    schema weldpole.sweep/1
//! ```

mod csv;
mod curve;
#[cfg(test)]
mod fixture;
mod json;
pub(super) mod labels;
mod matrix;
pub(super) mod summary;
mod text;

use crate::study::sweep::Sweep;

pub use csv::sweep_csv;
pub use json::sweep_json;
pub use text::sweep_text;

/// Where a point of a sweep is: `arm = 150 mm, load.angle = 45 deg`.
#[must_use]
pub fn sweep_point(sweep: &Sweep, point: usize) -> String {
    labels::Labels::new(sweep).point(point)
}

//! Report to text: for people, for spreadsheets, for other programs.
//!
//! ```text
//! Report -> check_text     verdict first, the two methods side by side   text/
//!        -> check_json     schema weldpole.check/1                       json/
//!        -> elements_csv   one row per element of weld                   csv/elements.rs
//!        -> summary_csv    one row per case                              csv/summary.rs
//! Sweep  -> sweep_text, sweep_csv, sweep_json                                 sweep/
//! RuleSet, Law -> rules_text, rules_json                                 rules.rs
//! SelfCheck -> selfcheck_text, selfcheck_csv, selfcheck_json             selfcheck/
//! ```
//!
//! Writers compute nothing: they ask the report. Rounding and unit text are in `number.rs` alone.

mod csv;
mod drawing;
#[cfg(test)]
mod fixture;
mod json;
mod layout;
mod methods;
mod names;
mod number;
mod rules;
mod selfcheck;
mod sweep;
mod table;
mod text;
mod words;

pub use csv::{elements_csv, summary_csv};
#[cfg(feature = "png")]
pub use drawing::{PngError, png};
pub use drawing::{joint_svg, sweep_svg};
pub use json::check_json;
pub use layout::{Emphasis, Layout, Painter, plain};
pub use rules::{law_text, rule_set_text, rules_json, rules_text};
pub use selfcheck::{selfcheck_csv, selfcheck_json, selfcheck_text};
pub use sweep::{sweep_csv, sweep_json, sweep_point, sweep_text};
pub use text::check_text;

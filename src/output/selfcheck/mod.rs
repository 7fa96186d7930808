//! The self-check: published values beside computed ones, for a quality file, a spreadsheet, a program.
//!
//! ```text
//! SelfCheck -> selfcheck_text   verdict, failures, summary, every value by its source   text.rs, block.rs
//!           -> selfcheck_csv    one row per value                                       csv.rs
//!           -> selfcheck_json   schema weldpole.selfcheck/1                             json.rs
//! ```
//!
//! Text groups the values by document, and within it by tolerance: [`group`]. All writers take the words and
//! names of `words.rs`.

mod block;
mod csv;
#[cfg(test)]
mod fixture;
mod group;
mod json;
mod text;
mod words;

pub use csv::selfcheck_csv;
pub use json::selfcheck_json;
pub use text::selfcheck_text;

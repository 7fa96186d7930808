//! Is the answer enough: each analysis against the design strength of the rule set.

mod capacity;
mod check;
mod concentric;

pub use capacity::{elastic_check, governing_first, ultimate_check, verification};
pub use check::{Check, Demand, Verification};
pub use concentric::concentric_checks;

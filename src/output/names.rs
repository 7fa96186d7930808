//! The words of machine outputs for the closed sets of the model.

use crate::analysis::{Check, Status};
use crate::model::{Basis, Confirmation};

/// The name of a basis in machine outputs.
pub(super) fn basis_name(basis: Basis) -> &'static str {
    match basis {
        Basis::Ultimate => "ultimate",
        Basis::Elastic => "elastic",
        Basis::Concentric => "concentric",
    }
}

/// The name of a status in machine outputs.
pub(super) fn status_name(status: Status) -> &'static str {
    match status {
        Status::Satisfied => "satisfied",
        Status::Exceeded => "exceeded",
        Status::NotSolved => "not-solved",
    }
}

/// The name of a confirmation status in machine outputs.
pub(super) fn confirmation_name(status: Confirmation) -> &'static str {
    match status {
        Confirmation::Read => "read",
        Confirmation::Recalled => "recalled",
    }
}

/// The verdict of a row in machine outputs.
pub(super) fn verdict_name(check: &Check) -> &'static str {
    match (check.accepted, check.satisfied) {
        (false, _) => "information",
        (true, true) => "satisfied",
        (true, false) => "exceeded",
    }
}

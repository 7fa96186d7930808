//! The exit status: what a script learns without reading a word.

use std::process::ExitCode;
use weldpole::analysis::Status;

/// How a run ended, from good to bad: the worst of several outcomes is their maximum.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub(super) enum Exit {
    /// Every verification satisfied.
    Satisfied,
    /// Some verification exceeded, a rule of detailing broken, or a published value not met.
    Exceeded,
    /// No answer for at least one joint, or an answer that could not be written.
    NoAnswer,
}

impl From<Status> for Exit {
    fn from(status: Status) -> Self {
        match status {
            Status::Satisfied => Self::Satisfied,
            Status::Exceeded => Self::Exceeded,
            Status::NotSolved => Self::NoAnswer,
        }
    }
}

impl From<Exit> for ExitCode {
    fn from(exit: Exit) -> Self {
        match exit {
            Exit::Satisfied => Self::from(0),
            Exit::Exceeded => Self::from(1),
            Exit::NoAnswer => Self::from(2),
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn no_answer_outweighs_an_excess_which_outweighs_satisfaction() {
        assert!(Exit::NoAnswer > Exit::Exceeded && Exit::Exceeded > Exit::Satisfied);
    }
}

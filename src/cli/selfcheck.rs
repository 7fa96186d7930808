//! The command `selfcheck`: the published cases that the program ships, computed again.

use super::args::{SelfCheckArguments, SelfCheckFormat};
use super::destination::Destination;
use super::exit::Exit;
use super::{VERSION, colour, message};
use weldpole::output::{selfcheck_csv, selfcheck_json, selfcheck_text};
use weldpole::study::selfcheck::{self, SelfCheck};

/// Runs the self-check and writes its page, also when a case has failed.
pub(super) fn run(arguments: &SelfCheckArguments) -> Exit {
    let destination = Destination::from(arguments.output.as_ref());
    let layout = colour::layout(arguments.width, false, &destination);
    let check = selfcheck::run();
    let outcome = match arguments.format {
        SelfCheckFormat::Text => destination.write_text(&selfcheck_text(VERSION, &check, &layout)),
        SelfCheckFormat::Json => destination.write(selfcheck_json(VERSION, &check)),
        SelfCheckFormat::Csv => destination.write(selfcheck_csv(&check)),
    };
    match outcome {
        Ok(()) => verdict(&check),
        Err(refusal) => {
            message::refuse(&refusal, layout.columns());
            Exit::NoAnswer
        }
    }
}

/// A published value that is not met is an excess: the page is written and says which.
fn verdict(check: &SelfCheck) -> Exit {
    if check.passed() { Exit::Satisfied } else { Exit::Exceeded }
}

#[cfg(test)]
mod tests {
    use super::*;
    use weldpole::input::catalog::PUBLISHED_CASES;

    /// The outcome for the first row of the shipped table, its printed 1.88 replaced.
    fn first_row_with(published: &str) -> Exit {
        let rows: Vec<&str> = PUBLISHED_CASES.lines().take(2).collect();
        verdict(&selfcheck::run_on(&rows.join("\n").replace(",1.88,", published)).unwrap())
    }

    #[test]
    fn one_value_that_is_not_met_changes_the_exit_status() {
        assert_eq!(first_row_with(",1.88,"), Exit::Satisfied);
        assert_eq!(first_row_with(",1.90,"), Exit::Exceeded);
    }
}

//! The command `new`: a file to begin with.

use super::args::NewArguments;
use super::destination::Destination;
use super::exit::Exit;
use super::source::fault;
use super::{colour, message};
use weldpole::diagnostic::Diagnostic;
use weldpole::input::catalog;

/// Writes the starter or the demonstration joint, never over an existing file unless told to.
pub(super) fn run(arguments: &NewArguments) -> Exit {
    match write(arguments) {
        Ok(()) => Exit::Satisfied,
        Err(refusal) => {
            message::refuse(&refusal, colour::columns(None));
            Exit::NoAnswer
        }
    }
}

fn write(arguments: &NewArguments) -> Result<(), Box<Diagnostic>> {
    let destination = Destination::from(arguments.output.as_ref());
    if let Destination::File(path) = &destination
        && path.is_file()
        && !arguments.force
    {
        let hint = "choose another name, or replace it with --force";
        return Err(fault(&path.display().to_string(), "the file exists already", Some(hint)));
    }
    destination.write(if arguments.demo { catalog::DEMO } else { catalog::STARTER })
}

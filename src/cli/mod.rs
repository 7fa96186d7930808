//! The command line: reads files, asks the library, writes what comes back, and sets the exit status.
//!
//! ```text
//! args.rs -> check.rs | sweep.rs | selfcheck.rs | rules.rs | starter.rs    one file per command
//!            source.rs       where text is read from
//!            destination.rs  where results are written, whole or not at all
//!            message.rs      everything that goes to standard error, but
//!            progress.rs     how far a long run is
//! ```
//!
//! Only this part of the program touches files, the environment and the terminal; it sees the library from
//! outside, as any other program would.

mod args;
mod check;
mod colour;
mod destination;
mod exit;
mod figure;
mod message;
mod progress;
mod rules;
mod selfcheck;
mod source;
mod starter;
mod sweep;

use args::{Arguments, Command};
use clap::Parser;
use exit::Exit;
use std::ffi::OsString;
use std::process::ExitCode;

/// The version printed and written into documents.
const VERSION: &str = env!("CARGO_PKG_VERSION");

/// Runs the command that `arguments` (the program's name first) ask for.
pub(crate) fn run(arguments: impl Iterator<Item = OsString>) -> ExitCode {
    let arguments = match Arguments::try_parse_from(arguments) {
        Ok(arguments) => arguments,
        Err(refusal) => {
            // Help and version are results; a usage error is no answer. A closed pipe changes neither.
            let _ = refusal.print();
            return if refusal.use_stderr() { Exit::NoAnswer } else { Exit::Satisfied }.into();
        }
    };
    match arguments.command {
        Command::Check(arguments) => check::run(&arguments),
        Command::Sweep(arguments) => sweep::run(&arguments),
        Command::Rules(arguments) => rules::run(&arguments),
        Command::SelfCheck(arguments) => selfcheck::run(&arguments),
        Command::New(arguments) => starter::run(&arguments),
    }
    .into()
}

//! The command line tool `weldpole`: hands the arguments to `cli` and its verdict to the caller's shell.

mod cli;

use std::process::ExitCode;

fn main() -> ExitCode {
    cli::run(std::env::args_os())
}

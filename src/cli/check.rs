//! The command `check`: files to verdicts.

use super::args::{CheckArguments, CheckFormat};
use super::destination::Destination;
use super::exit::Exit;
use super::source::{Source, fault};
use super::{VERSION, colour, message};
use std::path::PathBuf;
use weldpole::analysis::{Report, analyse};
use weldpole::diagnostic::Diagnostic;
use weldpole::input::read_joint;
use weldpole::output::{check_json, check_text, elements_csv, summary_csv};

/// Verifies every joint, also those after a bad one, and writes the results.
pub(super) fn run(arguments: &CheckArguments) -> Exit {
    let columns = colour::columns(arguments.width);
    if let Err(refusal) = destinations_are_safe(arguments) {
        message::refuse(&refusal, columns);
        return Exit::NoAnswer;
    }
    let Outcomes { reports, unread, faults } = outcomes(arguments, columns);
    let mut exit = reports.iter().map(|report| Exit::from(report.verdict())).max().unwrap_or(Exit::Satisfied);
    let count = sources(arguments).len();
    if reports.len() < count {
        exit = Exit::NoAnswer;
        if count > 1 {
            message::notice(&format!("{} of {count} files gave no answer", count - reports.len()));
        }
    }
    for outcome in write(arguments, &reports, &unread, &faults) {
        if let Err(refusal) = outcome {
            message::refuse(&refusal, columns);
            exit = Exit::NoAnswer;
        }
    }
    exit
}

fn sources(arguments: &CheckArguments) -> Vec<Source> {
    if arguments.demo {
        vec![Source::Demonstration]
    } else {
        arguments.files.iter().map(Source::from).collect()
    }
}

/// Refuses to write over a joint file.
pub(super) fn refuse_replacing(results: Option<&PathBuf>, files: &[PathBuf]) -> Result<(), Box<Diagnostic>> {
    let destination = Destination::from(results);
    match results {
        Some(path) if files.iter().any(|file| destination.is_file(file)) => {
            let message = "the results would replace a joint file";
            Err(fault(&path.display().to_string(), message, Some("choose another name")))
        }
        Some(_) | None => Ok(()),
    }
}

/// Refuses to write over a joint file or over another result, and to read standard input twice.
fn destinations_are_safe(arguments: &CheckArguments) -> Result<(), Box<Diagnostic>> {
    for path in [&arguments.output, &arguments.elements_csv] {
        refuse_replacing(path.as_ref(), &arguments.files)?;
    }
    if let (Some(results), Some(elements)) = (&arguments.output, &arguments.elements_csv)
        && (Destination::from(Some(results)).is_file(elements)
            || (results.as_os_str() == "-" && elements.as_os_str() == "-"))
    {
        let message = "the element table and the results cannot share one destination";
        return Err(fault(&results.display().to_string(), message, Some("choose another name")));
    }
    if arguments.files.iter().filter(|file| file.as_os_str() == "-").count() > 1 {
        return Err(fault("-", "standard input can be read only once", None));
    }
    Ok(())
}

/// What became of the files.
#[derive(Default)]
struct Outcomes {
    reports: Vec<Report>,
    /// Names of the files that gave no joint.
    unread: Vec<String>,
    /// Their faults, already shown.
    faults: Vec<Diagnostic>,
}

fn outcomes(arguments: &CheckArguments, columns: usize) -> Outcomes {
    let options = arguments.overrides.options();
    let mut outcomes = Outcomes::default();
    for source in sources(arguments) {
        let (text, outcome) = match source.read() {
            Ok(text) => {
                let outcome = read_joint(&text.name, &text.contents, &options);
                (Some(text), outcome)
            }
            Err(refusal) => (None, Err(vec![*refusal])),
        };
        match outcome {
            Ok(joint) => outcomes.reports.push(analyse(&joint)),
            Err(found) => {
                message::show(&found, text.as_ref(), columns);
                outcomes.unread.push(source.name());
                outcomes.faults.extend(found);
            }
        }
    }
    outcomes
}

/// Writes the results and the element table; the outcome of each.
fn write(
    arguments: &CheckArguments,
    reports: &[Report],
    unread: &[String],
    faults: &[Diagnostic],
) -> Vec<Result<(), Box<Diagnostic>>> {
    let results = Destination::from(arguments.output.as_ref());
    let elements = arguments.elements_csv.as_ref().map(|path| Destination::from(Some(path)));
    let mut outcomes = Vec::new();
    let table_takes_standard_output =
        elements == Some(Destination::StandardOutput) && results == Destination::StandardOutput;
    // Without a report only the JSON has something to say.
    if !table_takes_standard_output && (!reports.is_empty() || arguments.format == CheckFormat::Json) {
        outcomes.push(match arguments.format {
            CheckFormat::Text => {
                let layout = colour::layout(arguments.width, arguments.all_cases, &results);
                results.write_text(&check_text(reports, unread, &layout))
            }
            CheckFormat::Json => results.write(&check_json(VERSION, reports, faults)),
            CheckFormat::Csv => results.write(&summary_csv(reports)),
        });
    }
    if let Some(elements) = elements.filter(|_| !reports.is_empty()) {
        outcomes.push(elements.write(&elements_csv(reports)));
    }
    outcomes
}

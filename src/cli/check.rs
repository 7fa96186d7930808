//! The command `check`: files to verdicts.

use super::args::{CheckArguments, CheckFormat};
use super::destination::{self, Destination};
use super::exit::Exit;
use super::source::{Source, fault};
use super::{VERSION, colour, figure, message};
use std::path::PathBuf;
use weldpole::analysis::{Report, analyse};
use weldpole::diagnostic::Diagnostic;
use weldpole::input::read_joint;
use weldpole::output::{check_json, check_text, elements_csv, joint_svg, summary_csv};

/// Verifies every joint, also those after a bad one, and writes the results.
pub(super) fn run(arguments: &CheckArguments) -> Exit {
    let columns = colour::columns(arguments.width);
    if let Err(refusal) = arguments_are_sound(arguments) {
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

/// Refuses to write over a joint file or over another result, to read standard input twice, and to draw several
/// joints into one figure.
fn arguments_are_sound(arguments: &CheckArguments) -> Result<(), Box<Diagnostic>> {
    let outputs = [&arguments.output, &arguments.elements_csv, &arguments.figure];
    destination::are_safe(&outputs, &arguments.files)?;
    if arguments.files.iter().filter(|file| file.as_os_str() == "-").count() > 1 {
        return Err(fault("-", "standard input can be read only once", None));
    }
    if let Some(figure) = &arguments.figure
        && arguments.files.len() > 1
    {
        let message = format!("one figure shows one joint, but {} files are given", arguments.files.len());
        return Err(fault(&figure.display().to_string(), &message, Some("draw each file by itself")));
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
    let is_dash = |path: &Option<PathBuf>| path.as_ref().is_some_and(|path| path.as_os_str() == "-");
    let taken = is_dash(&arguments.elements_csv) || is_dash(&arguments.figure);
    let results_give_way = taken && results == Destination::StandardOutput;
    // Without a report only the JSON has something to say.
    if !results_give_way && (!reports.is_empty() || arguments.format == CheckFormat::Json) {
        outcomes.push(match arguments.format {
            CheckFormat::Text => {
                let layout = colour::layout(arguments.width, arguments.all_cases, &results);
                results.write_text(&check_text(reports, unread, &layout))
            }
            CheckFormat::Json => results.write(check_json(VERSION, reports, faults)),
            CheckFormat::Csv => results.write(summary_csv(reports)),
        });
    }
    if let Some(elements) = elements.filter(|_| !reports.is_empty()) {
        outcomes.push(elements.write(elements_csv(reports)));
    }
    if let (Some(path), Some(report)) = (&arguments.figure, reports.first()) {
        outcomes.push(draw(path, report, arguments.case.as_deref()));
    }
    outcomes
}

/// Draws the case asked for, else the one that decides.
fn draw(path: &PathBuf, report: &Report, case: Option<&str>) -> Result<(), Box<Diagnostic>> {
    let chosen = match case {
        None => report.deciding_case(),
        Some(name) => Some(report.case(name).ok_or_else(|| no_case(name, report))?),
    };
    chosen.map_or(Ok(()), |case| figure::write(path, &joint_svg(report, case)))
}

/// The case asked for is none of the joint's.
fn no_case(name: &str, report: &Report) -> Box<Diagnostic> {
    let names: Vec<String> = report.cases.iter().map(|case| format!("`{}`", case.name)).collect();
    Box::new(Diagnostic {
        accepted: Some(names.join(", ")),
        ..*fault(&report.joint.file, &format!("there is no case or combination `{name}`"), None)
    })
}

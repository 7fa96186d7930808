//! The command `sweep`: one joint file to the strengths along one or two variables.

use super::args::{SweepArguments, SweepFormat};
use super::destination::{self, Destination};
use super::exit::Exit;
use super::progress::Progress;
use super::source::{Source, Text};
use super::{VERSION, colour, figure, message};
use weldpole::diagnostic::Diagnostic;
use weldpole::input::Template;
use weldpole::output::{sweep_csv, sweep_json, sweep_point, sweep_svg, sweep_text};
use weldpole::study::sweep::{GroupedFault, Sweep, sweep};

/// Values of a variable named beside a fault of many points.
const MOST_NAMED: usize = 3;

/// Sweeps the joint and writes the results.
pub(super) fn run(arguments: &SweepArguments) -> Exit {
    let columns = colour::columns(arguments.width);
    let outcome = destination::are_safe(&[&arguments.output, &arguments.figure], arguments.file.as_slice())
        .and_then(|()| source(arguments).read());
    let text = match outcome {
        Ok(text) => text,
        Err(refusal) => {
            message::refuse(&refusal, columns);
            return Exit::NoAnswer;
        }
    };
    let outcome = swept(arguments, &text);
    let mut written: Vec<Result<(), Box<Diagnostic>>> = Vec::new();
    let mut exit = match &outcome {
        Ok(sweep) => {
            for fault in sweep.faults() {
                show(&fault, sweep, &text, columns);
            }
            written.extend(arguments.figure.as_ref().map(|path| figure::write(path, &sweep_svg(sweep))));
            written.push(write(arguments, Some(sweep), &[]));
            Exit::from(sweep.verdict())
        }
        Err(faults) => {
            message::show(faults, Some(&text), columns);
            written.push(write(arguments, None, faults));
            Exit::NoAnswer
        }
    };
    // A figure that cannot be written takes no results with it.
    for refusal in written.into_iter().filter_map(Result::err) {
        message::refuse(&refusal, columns);
        exit = Exit::NoAnswer;
    }
    exit
}

fn source(arguments: &SweepArguments) -> Source {
    arguments.file.as_ref().map_or(Source::Demonstration, Source::from)
}

fn swept(arguments: &SweepArguments, text: &Text) -> Result<Sweep, Vec<Diagnostic>> {
    let template = Template::read(&text.name, &text.contents, &arguments.overrides.options())?;
    let variables = template.variables(&arguments.vary)?;
    let total = variables.iter().map(|variable| variable.values.len()).product();
    let progress = Progress::new("points", total);
    let outcome = sweep(&template, &variables, arguments.case.as_deref(), &|done| progress.tell(done));
    progress.finish();
    outcome
}

/// Shows a fault once, and at which points it stands.
fn show(found: &GroupedFault, sweep: &Sweep, text: &Text, columns: usize) {
    message::show(std::slice::from_ref(&found.fault), Some(text), columns);
    let places: Vec<String> =
        found.points.iter().take(MOST_NAMED).map(|index| sweep_point(sweep, *index)).collect();
    let count = found.points.len();
    let more = if count > MOST_NAMED { "; ..." } else { "" };
    let noun = if count == 1 { "point" } else { "points" };
    message::notice(&format!("at {count} {noun}: {}{more}", places.join("; ")));
}

fn write(
    arguments: &SweepArguments,
    sweep: Option<&Sweep>,
    faults: &[Diagnostic],
) -> Result<(), Box<Diagnostic>> {
    let results = Destination::from(arguments.output.as_ref());
    let figure_takes_standard_output = arguments.figure.as_ref().is_some_and(|path| path.as_os_str() == "-");
    if figure_takes_standard_output && results == Destination::StandardOutput {
        return Ok(());
    }
    match (arguments.format, sweep) {
        (SweepFormat::Text, Some(sweep)) => {
            let layout = colour::layout(arguments.width, false, &results);
            results.write_text(&sweep_text(sweep, &layout))
        }
        (SweepFormat::Csv, Some(sweep)) => results.write(sweep_csv(sweep)),
        (SweepFormat::Json, sweep) => results.write(sweep_json(VERSION, sweep, faults)),
        // Without a sweep only the JSON has something to say.
        (SweepFormat::Text | SweepFormat::Csv, None) => Ok(()),
    }
}

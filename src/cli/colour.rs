//! Colour and width of the text on a terminal.
//!
//! Escape codes are written only to standard streams through `anstream`, which drops them when the stream is
//! no terminal or `NO_COLOR` is set; a result file never holds any.

use super::destination::Destination;
use anstyle::{AnsiColor, Style};
use weldpole::output::{Emphasis, Layout, plain};

/// Columns where neither `--width` nor the terminal says otherwise.
const DEFAULT_WIDTH: usize = 80;

/// The layout of text that goes to `destination`.
pub(super) fn layout(width: Option<u16>, all_cases: bool, destination: &Destination) -> Layout {
    let paint = match destination {
        Destination::StandardOutput => painted,
        Destination::File(_) => plain,
    };
    Layout { width: columns(width), all_cases, paint }
}

/// The width asked for, else the terminal's, else 80.
pub(super) fn columns(width: Option<u16>) -> usize {
    let environment = || std::env::var("COLUMNS").ok()?.parse::<u16>().ok();
    width.or_else(environment).map_or(DEFAULT_WIDTH, usize::from)
}

/// Text between the escape codes of its emphasis.
fn painted(emphasis: Emphasis, text: &str) -> String {
    let style = match emphasis {
        Emphasis::Satisfied => AnsiColor::Green.on_default().bold(),
        Emphasis::Exceeded => AnsiColor::Red.on_default().bold(),
        Emphasis::NotSolved => AnsiColor::Magenta.on_default().bold(),
        Emphasis::Caution => AnsiColor::Yellow.on_default(),
        Emphasis::Heading => Style::new().bold(),
    };
    format!("{style}{text}{style:#}")
}

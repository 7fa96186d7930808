//! The panel beside the drawing: both methods in numbers, the verdict on the case, key, remarks, sizes of welds.

use super::super::canvas::{Anchor, Area, Canvas, SMALL, Spot, Text};
use super::super::column::{Column, HEADING};
use super::super::count::as_float;
use super::super::font;
use super::super::ink::Ink;
use super::forces::Forces;
use super::key;
use super::subject::Subject;
use super::welds;
use crate::analysis::Status;
use crate::output::methods::Methods;
use crate::output::number::{length, people, point, quantity};
use crate::output::words;
use crate::units::Dimension;

/// Distance of the rows of the table, px.
const TABLE_ROW: f64 = 20.0;
/// Room after a sentence, px.
const GAP_OF_SENTENCES: f64 = 3.0;
/// Least distance of columns of the table, px.
const GAP: f64 = 8.0;

/// What the drawing could not say in place.
#[derive(Debug, Clone, Default)]
pub(super) struct Notes {
    /// Loads without words at them.
    pub(super) loads: Vec<String>,
    /// Sentences about the drawing and the case.
    pub(super) remarks: Vec<String>,
}

/// Draws the panel.
pub(super) fn draw(canvas: &mut Canvas, panel: &Area, subject: &Subject<'_>, forces: &Forces, notes: &Notes) {
    let mut column = Column::new(canvas, panel, GAP_OF_SENTENCES);
    column.heading(&format!("Case {}", subject.case.name));
    load(&mut column, subject);
    methods(&mut column, subject);
    verdict(&mut column, subject);
    column.heading("Key");
    key::draw(&mut column, subject, forces);
    list(&mut column, "Remarks", &notes.remarks);
    list(&mut column, "Loads", &notes.loads);
    sizes(&mut column, subject);
}

/// A heading with as many sentences as there is room for.
fn list(column: &mut Column<'_>, heading: &str, sentences: &[String]) {
    let first = sentences.first().map(|first| as_float(font::lines(first, SMALL, column.room()).len()));
    let Some(lines) = first else { return };
    if column.y + HEADING + lines * font::LEADING * SMALL > column.bottom {
        return;
    }
    column.heading(heading);
    column.sentences(sentences, "");
}

/// The load about the centroid.
fn load(column: &mut Column<'_>, subject: &Subject<'_>) {
    let (units, load) = (subject.joint().units, &subject.case.load);
    let moment = quantity(units, Dimension::Moment, load.moment.z);
    // Where the measure is a moment, a force is what rounding leaves of loads that cancel.
    let words = if subject.is_force() {
        let force = point(units, Dimension::Force, &[load.force.x, load.force.y]);
        let arm = subject.foot().map_or(0.0, |foot| (foot - subject.centroid()).norm());
        format!("Load {force}, moment about the centroid {moment}, e = {}.", length(units, arm))
    } else {
        format!("Moment {moment}.")
    };
    if subject.case.elastic().is_some() {
        column.sentence(&words, Ink::TEXT);
    }
}

/// What decides the case.
fn verdict(column: &mut Column<'_>, subject: &Subject<'_>) {
    let ink = match subject.case.status {
        Status::Satisfied => Ink::SATISFIED,
        Status::Exceeded => Ink::EXCEEDED,
        Status::NotSolved => Ink::TEXT,
    };
    column.sentence(&words::decision(subject.case), ink);
    column.sentence(&words::basis_in_brief(subject.joint()), Ink::QUIET);
}

/// The two methods side by side.
fn methods(column: &mut Column<'_>, subject: &Subject<'_>) {
    let methods = Methods::of(subject.case, subject.joint());
    let middle = column.left + 0.68 * column.room();
    let mut row = |label: &str, left: &str, right: &str, ink: Ink| {
        let y = column.y + 0.5 * TABLE_ROW + 0.5 * font::CAPITALS * SMALL;
        let rooms = [(left, middle, 0.5 * column.room()), (right, column.right, column.right - middle - GAP)];
        for (words, x, room) in rooms {
            // A value is never cut; a long one is written smaller.
            let size = SMALL * (room / font::width(words, SMALL).max(1.0)).min(1.0);
            column.canvas.text(&Text { size, ink, anchor: Anchor::End, ..Text::new(words, Spot::new(x, y)) });
        }
        let room = middle - font::width(left, SMALL).min(0.5 * column.room()) - GAP - column.left;
        let label = font::clipped(label, SMALL, room);
        column.canvas.text(&Text {
            size: SMALL,
            ink: Ink::QUIET,
            ..Text::new(&label, Spot::new(column.left, y))
        });
        column.y += TABLE_ROW;
    };
    row("", "ultimate", "elastic", Ink::TEXT);
    for (label, [left, right], ink) in [
        ("under the rules", &methods.standing, Ink::QUIET),
        ("nominal strength", &methods.nominal, Ink::TEXT),
        ("design strength", &methods.design, Ink::TEXT),
        ("factor, nominal", &methods.nominal_factor, Ink::TEXT),
        ("factor, design", &methods.design_factor, Ink::TEXT),
        ("utilisation", &methods.utilisation, Ink::TEXT),
    ] {
        row(label, left, right, ink);
    }
    if let Some(ratio) = subject.case.ultimate_over_elastic() {
        row("ultimate / elastic", &people(ratio), "", Ink::TEXT);
    }
}

/// Lengths by size of weld.
fn sizes(column: &mut Column<'_>, subject: &Subject<'_>) {
    let joint = subject.joint();
    let mut kinds: Vec<(String, usize, f64)> = Vec::new();
    for weld in joint.group.welds() {
        let size = welds::size(weld, joint);
        match kinds.iter_mut().find(|(known, ..)| *known == size) {
            Some((_, count, total)) => {
                *count += 1;
                *total += weld.length();
            }
            None => kinds.push((size, 1, weld.length())),
        }
    }
    let line = font::LEADING * SMALL + GAP_OF_SENTENCES;
    // The heading, the sizes or as many as there is room for and a word on the rest.
    let lines_left = (column.bottom - column.y - HEADING) / line;
    let mut shown = kinds.len();
    let needed = |shown: usize| as_float(shown) + if shown < kinds.len() { 1.0 } else { 0.0 };
    while shown > 0 && needed(shown) > lines_left {
        shown -= 1;
    }
    if shown == 0 || needed(shown) > lines_left {
        return;
    }
    column.heading("Welds");
    for (size, count, total) in &kinds[..shown] {
        let noun = if *count == 1 { "weld" } else { "welds" };
        column.line(&format!("{count} {noun}, {}: {size}", length(joint.units, *total)), Ink::TEXT);
    }
    if kinds.len() > shown {
        let rest = kinds.len() - shown;
        column.line(&format!("and {rest} more {}", if rest == 1 { "size" } else { "sizes" }), Ink::QUIET);
    }
}

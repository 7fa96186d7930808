//! The panel beside the drawing: both methods in numbers, the legend, the sizes of the welds, remarks.

use super::super::arrow::Arrow;
use super::super::canvas::{Anchor, Area, BODY, Canvas, SMALL, Spot, Stroke, Text};
use super::super::font;
use super::super::ink::{Ink, as_float, ramp};
use super::bands;
use super::forces::{ELASTIC, Forces, ULTIMATE};
use super::marks;
use super::subject::Subject;
use super::welds;
use crate::output::methods::Methods;
use crate::output::number::{length, people, quantity};
use crate::output::words;
use crate::units::Dimension;

/// Margin within the panel, px.
const MARGIN: f64 = 16.0;
/// Distance of the rows of the table, px.
const ROW: f64 = 22.0;
/// Least distance of columns, px.
const GAP: f64 = 8.0;
/// Height of a heading, px.
const HEADING: f64 = BODY + 22.0;

/// Writes from top to bottom.
struct Column<'c> {
    canvas: &'c mut Canvas,
    left: f64,
    right: f64,
    y: f64,
    bottom: f64,
}

impl Column<'_> {
    fn room(&self) -> f64 {
        self.right - self.left
    }

    fn heading(&mut self, words: &str) {
        self.y += 10.0;
        let words = font::clipped(words, BODY, self.room());
        self.canvas.text(&Text::new(&words, Spot::new(self.left, self.y + BODY)));
        self.y += BODY + 7.0;
        self.canvas.line(
            Spot::new(self.left, self.y),
            Spot::new(self.right, self.y),
            Stroke::solid(Ink::HAIR, 1.0),
        );
        self.y += 5.0;
    }

    /// A sentence in small letters, as many lines of it as fit; false when some were left out.
    fn sentence(&mut self, words: &str, ink: Ink) -> bool {
        for line in font::lines(words, SMALL, self.room()) {
            if self.y + font::LEADING * SMALL > self.bottom {
                return false;
            }
            self.canvas.text(&Text {
                size: SMALL,
                ink,
                ..Text::new(&line, Spot::new(self.left, self.y + SMALL))
            });
            self.y += font::LEADING * SMALL;
        }
        self.y += 3.0;
        true
    }

    /// One line in small letters, cut where it is too long.
    fn line(&mut self, words: &str, ink: Ink) {
        let words = font::clipped(words, SMALL, self.room());
        self.sentence(&words, ink);
    }

    /// A symbol with its meaning.
    fn key(&mut self, words: &str, symbol: impl FnOnce(&mut Canvas, Spot)) {
        let middle = self.y + 0.5 * ROW;
        symbol(self.canvas, Spot::new(self.left + 24.0, middle));
        let at = Spot::new(self.left + 58.0, middle + 0.5 * font::CAPITALS * SMALL);
        let words = font::clipped(words, SMALL, self.right - at.x);
        self.canvas.text(&Text { size: SMALL, ..Text::new(&words, at) });
        self.y += ROW;
    }
}

/// Draws the panel; `remarks` are sentences about the drawing.
pub(super) fn draw(
    canvas: &mut Canvas,
    panel: &Area,
    subject: &Subject<'_>,
    forces: &Forces,
    remarks: &[String],
) {
    canvas.area(panel, Some(Ink::WASH), None);
    let mut column = Column {
        canvas,
        left: panel.least.x + MARGIN,
        right: panel.most.x - MARGIN,
        y: panel.least.y + 2.0,
        bottom: panel.most.y - 6.0,
    };
    column.heading(&format!("Case {}", subject.case.name));
    methods(&mut column, subject);
    column.heading("Key");
    key(&mut column, subject, forces);
    if !remarks.is_empty() {
        column.heading("Remarks");
        for remark in remarks {
            if !column.sentence(remark, Ink::TEXT) {
                break;
            }
        }
    }
    sizes(&mut column, subject);
}

/// The two methods side by side.
fn methods(column: &mut Column<'_>, subject: &Subject<'_>) {
    let methods = Methods::of(subject.case, subject.joint());
    let middle = column.left + 0.64 * column.room();
    let mut row = |label: &str, left: &str, right: &str, ink: Ink| {
        let y = column.y + 0.5 * ROW + 0.5 * font::CAPITALS * SMALL;
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
        column.y += ROW;
    };
    row("", "ultimate", "elastic", Ink::TEXT);
    for (label, [left, right], ink) in [
        ("under the rules", &methods.standing, Ink::QUIET),
        ("nominal strength", &methods.nominal, Ink::TEXT),
        ("design strength", &methods.design, Ink::TEXT),
        ("load factor", &methods.nominal_factor, Ink::TEXT),
        ("utilisation", &methods.utilisation, Ink::TEXT),
    ] {
        row(label, left, right, ink);
    }
    if let Some(ratio) = subject.case.ultimate_over_elastic() {
        row("ultimate / elastic", &people(ratio), "", Ink::TEXT);
    }
}

fn key(column: &mut Column<'_>, subject: &Subject<'_>, forces: &Forces) {
    let has_ratios = subject.case.elements.iter().any(|row| row.deformation_ratio.is_some());
    if has_ratios {
        scale(column);
    } else if subject.state().is_some() {
        column.sentence("The law has no rupture deformation: the welds carry no shades.", Ink::TEXT);
    }
    let arrow = |look: Arrow| {
        move |canvas: &mut Canvas, at: Spot| {
            look.draw(canvas, at - Spot::new(22.0, 0.0), at + Spot::new(22.0, 0.0));
        }
    };
    if forces.greatest > 0.0 {
        column.key("ultimate force on the weld", arrow(ULTIMATE));
        column.key("elastic force on the weld", arrow(ELASTIC));
        let units = subject.joint().units;
        let longest = quantity(units, Dimension::LineForce, forces.greatest);
        column.line(&format!("at the given load; longest: {longest}"), Ink::QUIET);
    }
    column.key("weld centroid", marks::centroid);
    if subject.near_centre().is_some() {
        column.key("centre of rotation", marks::centre);
    }
    if subject.state().is_some_and(|state| state.critical.is_some()) {
        column.key("first rupture, ultimate", marks::rupture);
    }
    if subject.case.elastic().is_some() {
        column.key("worst point, elastic", marks::worst);
    }
}

/// The ramp of deformation ratios.
fn scale(column: &mut Column<'_>) {
    column.sentence("deformation / rupture limit", Ink::TEXT);
    let (left, width, height) = (column.left + 4.0, column.room() - 24.0, 12.0);
    let top = column.y;
    let shades = as_float(bands::SHADES);
    for shade in 0..bands::SHADES {
        let from = left + width * as_float(shade) / shades;
        let area = Area::new(from, top, from + width / shades + 0.4, top + height);
        column.canvas.area(&area, Some(ramp(as_float(shade) / (shades - 1.0))), None);
    }
    let frame = Area::new(left, top, left + width, top + height);
    column.canvas.area(&frame, None, Some(Stroke::solid(Ink::TEXT, 1.0)));
    for (place, words) in [(0.0, "0"), (0.25, "0.25"), (0.5, "0.5"), (0.75, "0.75"), (1.0, "1")] {
        let at = Spot::new(left + place * width, top + height + 3.0 + SMALL);
        column.canvas.text(&Text { size: SMALL, anchor: Anchor::Middle, ..Text::new(words, at) });
    }
    column.y = top + height + SMALL + 12.0;
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
    let line = font::LEADING * SMALL + 3.0;
    // The heading, the sizes or as many as there is room for and a word on the rest, and the rules.
    let lines_left = (column.bottom - column.y - HEADING) / line;
    let mut shown = kinds.len();
    let needed = |shown: usize| as_float(shown) + if shown < kinds.len() { 2.0 } else { 1.0 };
    while shown > 0 && needed(shown) > lines_left {
        shown -= 1;
    }
    if needed(shown) > lines_left {
        return;
    }
    column.heading("Welds");
    for (size, count, total) in &kinds[..shown] {
        let noun = if *count == 1 { "weld" } else { "welds" };
        column.line(&format!("{count} {noun}, {size}: {} long", length(joint.units, *total)), Ink::TEXT);
    }
    if kinds.len() > shown {
        let rest = kinds.len() - shown;
        column.line(&format!("and {rest} more {}", if rest == 1 { "size" } else { "sizes" }), Ink::QUIET);
    }
    column.line(&format!("{}; {}", joint.rules.id, words::law_in_brief(joint)), Ink::QUIET);
}

//! The key: shades, arrows and marks, and where the marks stand.

use super::super::arrow::Arrow;
use super::super::canvas::{Anchor, Area, Canvas, SMALL, Spot, Stroke, Text};
use super::super::column::Column;
use super::super::count::as_float;
use super::super::ink::{Ink, ramp};
use super::bands;

use super::forces::{ELASTIC, Forces, ULTIMATE};
use super::marks;
use super::subject::Subject;
use crate::model::Vector;
use crate::output::number::{point, quantity};
use crate::solvers::Place;
use crate::units::Dimension;

/// The key.
pub(super) fn draw(column: &mut Column<'_>, subject: &Subject<'_>, forces: &Forces) {
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
        column.key("ultimate force on the weld", None, arrow(ULTIMATE));
        column.key("elastic force on the weld", None, arrow(ELASTIC));
        let units = subject.joint().units;
        let longest = quantity(units, Dimension::LineForce, forces.greatest);
        let cells = subject.case.elements.len();
        let pieces = if forces.count < cells {
            format!("{} of {cells} pieces", forces.count)
        } else {
            "every piece".to_owned()
        };
        column.sentence(&format!("At the given load, middle of {pieces}; longest {longest}."), Ink::QUIET);
    }
    let place = |at: Vector| point(subject.joint().units, Dimension::Length, &[at.x, at.y]);
    let welds = subject.joint().group.welds();
    // With a single weld its name says nothing.
    let name = |found: &Place| {
        welds.get(found.weld).filter(|_| welds.len() > 1).map(|weld| format!("in {}", weld.name))
    };
    column.key(&format!("centroid {}", place(subject.centroid())), None, marks::centroid);
    if let Some(centre) = subject.near_centre() {
        column.key(&format!("centre {}", place(centre)), None, marks::centre);
    }
    if let Some(critical) = subject.state().and_then(|state| state.critical.as_ref()) {
        let found = &critical.place;
        column.key(&format!("first rupture {}", place(found.at)), name(found).as_deref(), marks::rupture);
    }
    if let Some(elastic) = subject.case.elastic() {
        let found = &elastic.critical.place;
        column.key(&format!("elastic worst {}", place(found.at)), name(found).as_deref(), marks::worst);
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

//! Dimensions: rows of measures beside the group, on the sides away from the loads.
//!
//! The first row divides the group at the ends of its runs, the next gives it as a whole, the last goes from its edge
//! over the centroid to the loads. A measure that has no room on its row is placed beside it.

use super::super::canvas::{Anchor, Area, Canvas, SMALL, Spot, Stroke, Text};
use super::super::font;
use super::super::ink::Ink;
use super::super::space::Space;
use super::super::view::View;
use super::subject::{Subject, extremes};
use crate::model::{Run, Vector};
use crate::output::number::length;

/// Distance of rows, px.
pub(super) const ROW: f64 = 41.0;
/// Half a tick, px.
const TICK: f64 = 4.5;
/// Distance of texts from their line, px.
const GAP: f64 = 4.0;
/// Most measures in a row.
const MOST: usize = 6;
/// Share of the group by which a load lies clearly outside it.
const CLEARLY: f64 = 0.03;
/// Places closer than this share of the group count as one.
const SAME: f64 = 2e-3;

/// The directions in which is measured.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Axis {
    X,
    Y,
}

impl Axis {
    fn of(self, at: Vector) -> f64 {
        match self {
            Self::X => at.x,
            Self::Y => at.y,
        }
    }
}

/// Rows along one direction, and the side of the group they stand on.
#[derive(Debug, Clone)]
struct Rows {
    axis: Axis,
    /// True for above (x) or right (y).
    beyond: bool,
    /// Coordinates, mm.
    rows: Vec<Vec<f64>>,
}

/// The rows of a drawing.
#[derive(Debug, Clone)]
pub(super) struct Dimensions {
    across: Rows,
    up: Rows,
}

impl Dimensions {
    pub(super) fn of(subject: &Subject<'_>) -> Self {
        Self { across: rows(subject, Axis::X), up: rows(subject, Axis::Y) }
    }

    /// Room needed left and above, right and below of the group, px.
    pub(super) fn room(&self) -> (Spot, Spot) {
        let depth = |rows: &Rows| ROW * super::super::count::as_float(rows.rows.len());
        let (across, up) = (depth(&self.across), depth(&self.up));
        let split = |beyond: bool, depth: f64| if beyond { (0.0, depth) } else { (depth, 0.0) };
        let (below, above) = split(self.across.beyond, across);
        let (left, right) = split(self.up.beyond, up);
        (Spot::new(left, above), Spot::new(right, below))
    }

    /// Draws the rows outside `group`, the part of the page that welds and arrows fill.
    pub(super) fn draw(
        &self,
        canvas: &mut Canvas,
        space: &mut Space,
        subject: &Subject<'_>,
        view: &View,
        group: &Area,
    ) {
        for rows in [&self.across, &self.up] {
            for (index, places) in rows.rows.iter().enumerate() {
                let offset = 17.0 + ROW * super::super::count::as_float(index);
                row(canvas, space, subject, view, rows, places, group, offset);
            }
        }
    }
}

fn rows(subject: &Subject<'_>, axis: Axis) -> Rows {
    let (least, most) = (axis.of(subject.least), axis.of(subject.most));
    let size = subject.size();
    let across = match axis {
        Axis::X => Axis::Y,
        Axis::Y => Axis::X,
    };
    // Loads, with the way they point, decide which side stays free.
    let middle = 0.5 * (across.of(subject.least) + across.of(subject.most));
    let half = 0.5 * (across.of(subject.most) - across.of(subject.least));
    let loads = subject.near_loads();
    // Usual is below and left; the other side where a load lies or points out of the group there.
    let downward = across.of(subject.case.load.force) < 0.0;
    let outside = |at: &Vector| across.of(*at) - middle < -half - CLEARLY * size;
    let at_edge = |at: &Vector| downward && across.of(*at) - middle < -half + CLEARLY * size;
    let usual_is_taken = loads.iter().any(|at| outside(at) || at_edge(at));
    let mut rows = Vec::new();
    let runs = subject.joint().group.welds().iter().flat_map(|weld| &weld.runs);
    let parts = distinct(runs.flat_map(|run| reach(run, axis)), size);
    if (3..=MOST + 1).contains(&parts.len()) {
        rows.push(parts);
    }
    if most - least > SAME * size {
        rows.push(vec![least, most]);
    }
    let loads = loads.iter().map(|at| axis.of(*at));
    let places = distinct([least, axis.of(subject.centroid())].into_iter().chain(loads), size);
    if places.len() > 1 && places.len() <= MOST {
        rows.push(places);
    }
    Rows { axis, beyond: usual_is_taken, rows }
}

/// Where a run begins and ends along an axis.
fn reach(run: &Run, axis: Axis) -> [f64; 2] {
    let places = extremes(run).into_iter().map(|at| axis.of(at));
    let (mut least, mut most) = (f64::INFINITY, f64::NEG_INFINITY);
    for place in places {
        (least, most) = (least.min(place), most.max(place));
    }
    [least, most]
}

/// Coordinates in order, those that are nearly equal once.
fn distinct(values: impl Iterator<Item = f64>, size: f64) -> Vec<f64> {
    let mut values: Vec<f64> = values.collect();
    values.sort_by(f64::total_cmp);
    values.dedup_by(|a, b| (*a - *b).abs() <= SAME * size);
    values
}

#[allow(clippy::too_many_arguments)] // one row is a place, its rows and the page
fn row(
    canvas: &mut Canvas,
    space: &mut Space,
    subject: &Subject<'_>,
    view: &View,
    rows: &Rows,
    places: &[f64],
    group: &Area,
    offset: f64,
) {
    let side = match (rows.axis, rows.beyond) {
        (Axis::X, false) => group.most.y + offset,
        (Axis::X, true) => group.least.y - offset,
        (Axis::Y, false) => group.least.x - offset,
        (Axis::Y, true) => group.most.x + offset,
    };
    let spot = |place: f64| match rows.axis {
        Axis::X => Spot::new(view.spot(Vector::new(place, subject.least.y, 0.0)).x, side),
        Axis::Y => Spot::new(side, view.spot(Vector::new(subject.least.x, place, 0.0)).y),
    };
    let (across, stroke) = match rows.axis {
        Axis::X => (Spot::new(0.0, 1.0), Stroke::solid(Ink::QUIET, 1.0)),
        Axis::Y => (Spot::new(1.0, 0.0), Stroke::solid(Ink::QUIET, 1.0)),
    };
    let (Some(first), Some(last)) = (places.first(), places.last()) else { return };
    canvas.line(spot(*first), spot(*last), stroke);
    space.take_line(spot(*first), spot(*last));
    for place in places {
        let at = spot(*place);
        canvas.line(at - across * TICK, at + across * TICK, stroke);
        space.take(Area::around(at, Spot::new(2.0 * TICK, 2.0 * TICK)));
    }
    for pair in places.windows(2) {
        measure(canvas, space, subject, rows.axis, spot(pair[0]), spot(pair[1]), pair[1] - pair[0]);
    }
}

/// The text of one measure, on its line where it fits.
fn measure(
    canvas: &mut Canvas,
    space: &mut Space,
    subject: &Subject<'_>,
    axis: Axis,
    from: Spot,
    to: Spot,
    value: f64,
) {
    let words = length(subject.joint().units, value);
    let width = font::width(&words, SMALL);
    let middle = (from + to) / 2.0;
    let base = Text {
        size: SMALL,
        ink: Ink::QUIET,
        anchor: Anchor::Middle,
        halo: true,
        ..Text::new(&words, middle - Spot::new(0.0, GAP))
    };
    let text = match axis {
        Axis::X => base,
        Axis::Y => Text { at: middle - Spot::new(GAP, 0.0), upward: true, ..base },
    };
    let size = text.area().size();
    let offset = match axis {
        Axis::X => Spot::new(0.0, 0.5 * size.y + TICK + 3.5),
        Axis::Y => Spot::new(0.5 * size.x + TICK + 3.5, 0.0),
    };
    let baseline = match axis {
        Axis::X => Spot::new(0.0, 0.5 * (font::ASCENT - font::DESCENT) * SMALL),
        Axis::Y => Spot::new(0.5 * (font::ASCENT - font::DESCENT) * SMALL, 0.0),
    };
    let fits = width + 10.0 <= (to - from).norm();
    // On the line; where it is too short, close on the other side of it. A measure without room is left out.
    let beside = Text { at: middle + offset + baseline, ..text.clone() };
    for text in [Some(text).filter(|_| fits), Some(beside)].into_iter().flatten() {
        if space.is_free(&text.area().grown(-3.0)) {
            space.take(text.area());
            canvas.text(&text);
            return;
        }
    }
}

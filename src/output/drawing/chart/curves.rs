//! One variable: strength by both methods, their ratio, the utilisation, below each other over one axis.
//!
//! Curves are broken where the strength jumps, where a point has no answer, and (utilisation) where another basis
//! decides. The ends of a break at a jump stand at the values where it was located.

use super::super::canvas::{Anchor, Area, Canvas, SMALL, Spot, Stroke, Text};
use super::super::font;
use super::super::ink::Ink;
use super::super::sheet;
use super::notes;
use super::plot::{Mark, Plot, range};
use super::quantity::{MOST_MARKED, Quantity, all, always, none};
use crate::analysis::Status;
use crate::study::sweep::{Jump, Point, Sweep, Variable};
use crate::units::UnitSystem;

/// Size of the page, px.
const PAGE: (f64, f64) = (1200.0, 830.0);
/// Left and right edge of the plots.
const ACROSS: [f64; 2] = [88.0, 742.0];
/// Upper and lower edges of strength, ratio, utilisation.
const HEIGHTS: [[f64; 2]; 3] = [[128.0, 410.0], [462.0, 570.0], [622.0, 716.0]];
/// The notes.
const NOTES: [f64; 4] = [852.0, 98.0, 1176.0, 770.0];
/// What stands at the value that the variable has without the sweep.
const AS_GIVEN: &str = "as given";
/// Room for the title of the uppermost plot, px.
const TITLE_ROOM: f64 = 190.0;
/// Room above the highest value, as a share.
const HEADROOM: f64 = 0.06;

/// The page.
pub(super) fn drawn(sweep: &Sweep, variable: &Variable) -> Canvas {
    let mut canvas = Canvas::new(PAGE.0, PAGE.1);
    sheet::head(&mut canvas, None, &sweep.joint.title, &notes::subject(sweep));
    let shown: Vec<f64> = variable.values.iter().map(|value| variable.shown(*value)).collect();
    let x = range(shown.iter().copied());
    strength(&mut canvas, sweep, variable, x);
    ratio(&mut canvas, sweep, variable, x);
    utilisation(&mut canvas, sweep, variable, x);
    as_given(&mut canvas, variable, x);
    let panel = Area::new(NOTES[0], NOTES[1], NOTES[2], NOTES[3]);
    notes::draw(&mut canvas, &panel, sweep);
    sheet::foot(&mut canvas, &sweep.joint);
    canvas
}

fn area(index: usize) -> Area {
    let [top, bottom] = HEIGHTS[index];
    Area::new(ACROSS[0], top, ACROSS[1], bottom)
}

/// A line through all plots at the value that the variable has without the sweep.
fn as_given(canvas: &mut Canvas, variable: &Variable, x: [f64; 2]) {
    let Some(given) = variable.given.map(|given| variable.shown(given)) else { return };
    if given < x[0] || given > x[1] {
        return;
    }
    for index in 0..HEIGHTS.len() {
        let plot = Plot::new(area(index), x, [0.0, 1.0]);
        canvas.line(plot.spot(given, 0.0), plot.spot(given, 1.0), Stroke::dashed(Ink::QUIET, 1.0, 2.0, 3.0));
    }
    let plot = Plot::new(area(0), x, [0.0, 1.0]);
    let width = font::width(AS_GIVEN, SMALL);
    let x = plot
        .spot(given, 1.0)
        .x
        .clamp(plot.area.least.x + TITLE_ROOM + width / 2.0, plot.area.most.x - width / 2.0);
    let at = Spot::new(x, plot.area.least.y - 9.0);
    let text = Text { size: SMALL, ink: Ink::QUIET, anchor: Anchor::Middle, ..Text::new(AS_GIVEN, at) };
    canvas.text(&text);
}

/// From zero to a little above the values.
fn from_zero(values: &[f64]) -> [f64; 2] {
    let most = values.iter().copied().fold(0.0, f64::max);
    range([0.0, if most > 0.0 { most * (1.0 + HEADROOM) } else { 1.0 }].into_iter())
}

fn strength(canvas: &mut Canvas, sweep: &Sweep, variable: &Variable, x: [f64; 2]) {
    let (dimension, units): (_, UnitSystem) = (notes::measure(sweep), sweep.joint.units);
    let no_jump = |_: &Jump, _: usize| None;
    let side = |jump: &Jump, side: usize| {
        let strength = jump.strength[side];
        (strength.in_moment == sweep.in_moment()).then(|| units.shown(dimension, strength.size))
    };
    let of_ultimate = |point: &Point| notes::strength(sweep, point, |case| Some(case.ultimate?.load_factor));
    let of_elastic = |point: &Point| notes::strength(sweep, point, |case| Some(case.elastic?.load_factor));
    let of_peak = |point: &Point| notes::strength(sweep, point, |case| case.peak_load_factor);
    let ultimate =
        Quantity { sweep, variable, value: &of_ultimate, follows: &all, at_jump: &side, joined: &always };
    let elastic =
        Quantity { sweep, variable, value: &of_elastic, follows: &none, at_jump: &no_jump, joined: &always };
    let peak =
        Quantity { sweep, variable, value: &of_peak, follows: &none, at_jump: &no_jump, joined: &always };
    let values = [ultimate.values(), elastic.values(), peak.values()].concat();
    let plot = Plot::new(area(0), x, from_zero(&values)).in_units(&variable.unit, "");
    plot.axes(canvas, None, &format!("nominal strength, {}", units.symbol(dimension)));
    if notes::peak_differs(sweep) {
        peak.draw(canvas, &plot, Ink::PEAK, 1.6, None);
    }
    elastic.draw(canvas, &plot, Ink::ELASTIC, 2.4, Some(Mark::Square));
    ultimate.draw(canvas, &plot, Ink::ULTIMATE, 2.4, Some(Mark::Dot));
    open_ends(canvas, &plot, sweep, variable, &side);
    blanks(canvas, &plot, sweep, variable);
    let names = [
        (ultimate.last(), "ultimate", Ink::ULTIMATE),
        (elastic.last(), "elastic", Ink::ELASTIC),
        (peak.last().filter(|_| notes::peak_differs(sweep)), "peak", Ink::PEAK),
    ];
    name_curves(canvas, &plot, &names, x);
}

fn ratio(canvas: &mut Canvas, sweep: &Sweep, variable: &Variable, x: [f64; 2]) {
    let value = |point: &Point| sweep.shown_case(point)?.ultimate_over_elastic();
    // Both sides of a jump are located for the ultimate strength alone.
    let no_jump = |_: &Jump, _: usize| None;
    let quantity =
        Quantity { sweep, variable, value: &value, follows: &all, at_jump: &no_jump, joined: &always };
    let values = quantity.values();
    // Without a value the line at 1 stands alone.
    let [least, most] = if values.is_empty() { [0.5, 1.5] } else { range(values.into_iter().chain([1.0])) };
    let margin = 0.1 * (most - least);
    let plot = Plot::new(area(1), x, [least - margin, most + margin]).in_units(&variable.unit, "");
    plot.axes(canvas, None, "ultimate / elastic");
    canvas.line(plot.spot(x[0], 1.0), plot.spot(x[1], 1.0), Stroke::dashed(Ink::QUIET, 1.2, 6.0, 4.0));
    quantity.draw(canvas, &plot, Ink::TEXT, 2.0, Some(Mark::Dot));
}

fn utilisation(canvas: &mut Canvas, sweep: &Sweep, variable: &Variable, x: [f64; 2]) {
    let value = |point: &Point| point.outcome.as_ref().ok()?.utilisation();
    let no_jump = |_: &Jump, _: usize| None;
    // Jumps are searched for the shown case alone.
    let decides = |jump: &Jump| sweep.decides_at(jump);
    let same_basis = |one: &Point, next: &Point| notes::deciding(one) == notes::deciding(next);
    let quantity = Quantity {
        sweep,
        variable,
        value: &value,
        follows: &decides,
        at_jump: &no_jump,
        joined: &same_basis,
    };
    let values = quantity.values();
    let plot =
        Plot::new(area(2), x, from_zero(&[values.as_slice(), &[1.0]].concat())).in_units(&variable.unit, "");
    plot.axes(canvas, Some(&notes::axis(variable)), notes::utilisation(sweep));
    let limit = Stroke::dashed(Ink::EXCEEDED, 1.4, 7.0, 4.0);
    canvas.line(plot.spot(x[0], 1.0), plot.spot(x[1], 1.0), limit);
    let at = plot.spot(x[1], 1.0) + Spot::new(8.0, 0.5 * font::CAPITALS * SMALL);
    canvas.text(&Text { size: SMALL, ink: Ink::EXCEEDED, ..Text::new("limit", at) });
    quantity.draw(canvas, &plot, Ink::TEXT, 2.0, None);
    let points = quantity.points();
    for (index, [x, y]) in points.iter().filter(|_| points.len() <= MOST_MARKED) {
        let holds = sweep.points[*index].status() == Status::Satisfied;
        let (mark, ink) = if holds { (Mark::Dot, Ink::TEXT) } else { (Mark::Ring, Ink::EXCEEDED) };
        mark.draw(canvas, plot.spot(*x, *y), ink);
    }
}

/// Rings at both ends of a jump.
fn open_ends(
    canvas: &mut Canvas,
    plot: &Plot,
    sweep: &Sweep,
    variable: &Variable,
    side: &dyn Fn(&Jump, usize) -> Option<f64>,
) {
    for jump in &sweep.jumps {
        for end in 0..2 {
            if let Some(value) = side(jump, end) {
                Mark::Ring.draw(canvas, plot.spot(variable.shown(jump.at[end]), value), Ink::ULTIMATE);
            }
        }
    }
}

/// A cross on the axis where a point has no answer.
fn blanks(canvas: &mut Canvas, plot: &Plot, sweep: &Sweep, variable: &Variable) {
    for point in &sweep.points {
        if point.status() == Status::NotSolved {
            let x = plot.spot(variable.shown(point.values[0]), 0.0).x;
            let at = Spot::new(x, plot.area.most.y);
            for across in [Spot::new(4.0, 4.0), Spot::new(4.0, -4.0)] {
                canvas.line(at - across, at + across, Stroke::solid(Ink::EXCEEDED, 1.8));
            }
        }
    }
}

/// Names at the right end of the curves, moved apart where they would touch.
fn name_curves(canvas: &mut Canvas, plot: &Plot, names: &[(Option<f64>, &str, Ink)], x: [f64; 2]) {
    let mut places: Vec<(f64, &str, Ink)> = names
        .iter()
        .filter_map(|(value, name, ink)| Some((plot.spot(x[1], (*value)?).y, *name, *ink)))
        .collect();
    places.sort_by(|a, b| a.0.total_cmp(&b.0));
    let line = 1.25 * SMALL;
    for index in 1..places.len() {
        places[index].0 = places[index].0.max(places[index - 1].0 + line);
    }
    // What was pushed below the plot moves up again.
    let mut lowest = plot.area.most.y;
    for place in places.iter_mut().rev() {
        place.0 = place.0.min(lowest);
        lowest = place.0 - line;
    }
    for (y, name, ink) in places {
        let at = Spot::new(plot.area.most.x + 10.0, y + 0.5 * font::CAPITALS * SMALL);
        // Light inks are for lines; the word is dark, with a bar of the ink before it.
        let bar = Area::new(at.x, y - 2.0, at.x + 12.0, y + 2.0);
        canvas.area(&bar, Some(ink), None);
        canvas.text(&Text {
            size: SMALL,
            anchor: Anchor::Start,
            ..Text::new(name, at + Spot::new(17.0, 0.0))
        });
    }
}

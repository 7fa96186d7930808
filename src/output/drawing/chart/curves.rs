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
use crate::analysis::Status;
use crate::study::sweep::{Jump, Point, PointCase, Sweep, Variable};
use crate::units::UnitSystem;

/// Size of the page, px.
const PAGE: (f64, f64) = (1200.0, 830.0);
/// Left and right edge of the plots.
const ACROSS: [f64; 2] = [88.0, 742.0];
/// Upper and lower edges of strength, ratio, utilisation.
const HEIGHTS: [[f64; 2]; 3] = [[128.0, 410.0], [462.0, 570.0], [622.0, 716.0]];
/// The notes.
const NOTES: [f64; 4] = [852.0, 98.0, 1176.0, 770.0];
/// Most points that are marked one by one.
const MOST_MARKED: usize = 80;
/// What stands at the value that the variable has without the sweep.
const AS_GIVEN: &str = "as given";
/// Room for the title of the uppermost plot, px.
const TITLE_ROOM: f64 = 190.0;
/// Room above the highest value, as a share.
const HEADROOM: f64 = 0.06;

/// What is drawn of one quantity.
struct Quantity<'s> {
    sweep: &'s Sweep,
    variable: &'s Variable,
    /// At a point, in the unit of the axis.
    value: &'s dyn Fn(&Point) -> Option<f64>,
    /// Whether it jumps with the ultimate strength.
    jumps: bool,
    /// On both sides of a jump, in the unit of the axis; `None` where it is known at the points alone.
    at_jump: &'s dyn Fn(&Jump, usize) -> Option<f64>,
    /// Whether a curve runs on between two neighbours.
    joined: &'s dyn Fn(&Point, &Point) -> bool,
}

impl Quantity<'_> {
    /// Points with their value, by index.
    fn points(&self) -> Vec<(usize, [f64; 2])> {
        let of = |(index, point): (usize, &Point)| {
            Some((index, [self.variable.shown(point.values[0]), (self.value)(point)?]))
        };
        self.sweep.points.iter().enumerate().filter_map(of).collect()
    }

    /// The pieces of the curve, each unbroken.
    fn pieces(&self) -> Vec<Vec<[f64; 2]>> {
        let mut pieces: Vec<Vec<[f64; 2]>> = Vec::new();
        let mut before: Option<usize> = None;
        for (index, place) in self.points() {
            let follows = before.is_some_and(|before| before + 1 == index && self.runs_on(before, index));
            let jump = self.jump_between(before, index);
            let sides = jump.and_then(|jump| Some([(self.at_jump)(jump, 0)?, (self.at_jump)(jump, 1)?]));
            match (pieces.last_mut(), jump, sides) {
                (Some(piece), Some(jump), Some([left, right])) => {
                    piece.push([self.variable.shown(jump.at[0]), left]);
                    pieces.push(vec![[self.variable.shown(jump.at[1]), right], place]);
                }
                (Some(piece), None, _) if follows => piece.push(place),
                _ => pieces.push(vec![place]),
            }
            before = Some(index);
        }
        pieces
    }

    fn jump_between(&self, before: Option<usize>, index: usize) -> Option<&Jump> {
        let between = |jump: &&Jump| before == Some(jump.points[0]) && jump.points[1] == index;
        self.sweep.jumps.iter().filter(|_| self.jumps).find(between)
    }

    fn runs_on(&self, one: usize, next: usize) -> bool {
        (self.joined)(&self.sweep.points[one], &self.sweep.points[next])
    }

    fn draw(&self, canvas: &mut Canvas, plot: &Plot, ink: Ink, width: f64, mark: Option<Mark>) {
        for piece in self.pieces() {
            if piece.len() > 1 {
                plot.curve(canvas, &piece, ink, width);
            }
        }
        let points = self.points();
        if let Some(mark) = mark.filter(|_| points.len() <= MOST_MARKED) {
            let places: Vec<[f64; 2]> = points.iter().map(|(_, place)| *place).collect();
            plot.marks(canvas, &places, mark, ink);
        }
    }

    fn values(&self) -> Vec<f64> {
        let at_jumps =
            self.sweep.jumps.iter().flat_map(|jump| [(self.at_jump)(jump, 0), (self.at_jump)(jump, 1)]);
        self.points().iter().map(|(_, [_, value])| *value).chain(at_jumps.flatten()).collect()
    }

    /// Value at the last point that has one.
    fn last(&self) -> Option<f64> {
        self.points().last().map(|(_, [_, value])| *value)
    }
}

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

fn always(_: &Point, _: &Point) -> bool {
    true
}

fn strength(canvas: &mut Canvas, sweep: &Sweep, variable: &Variable, x: [f64; 2]) {
    let (dimension, units): (_, UnitSystem) = (notes::measure(sweep), sweep.joint.units);
    let shown =
        |case: &PointCase, factor: f64| case.load_times(factor).map(|size| units.shown(dimension, size));
    let no_jump = |_: &Jump, _: usize| None;
    let of = |point: &Point, factor: fn(&PointCase) -> Option<f64>| {
        let case = sweep.shown_case(point)?;
        shown(case, factor(case)?)
    };
    let ultimate_value = |point: &Point| of(point, |case| Some(case.ultimate?.load_factor));
    let elastic_value = |point: &Point| of(point, |case| Some(case.elastic?.load_factor));
    let peak_value = |point: &Point| of(point, |case| case.peak_load_factor);
    let side = |jump: &Jump, side: usize| Some(units.shown(dimension, jump.strength[side].size));
    let ultimate =
        Quantity { sweep, variable, value: &ultimate_value, jumps: true, at_jump: &side, joined: &always };
    let elastic =
        Quantity { sweep, variable, value: &elastic_value, jumps: false, at_jump: &no_jump, joined: &always };
    let peak =
        Quantity { sweep, variable, value: &peak_value, jumps: false, at_jump: &no_jump, joined: &always };
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
        Quantity { sweep, variable, value: &value, jumps: true, at_jump: &no_jump, joined: &always };
    let [least, most] = range(quantity.values().into_iter().chain([1.0]));
    let margin = 0.1 * (most - least);
    let plot = Plot::new(area(1), x, [least - margin, most + margin]).in_units(&variable.unit, "");
    plot.axes(canvas, None, "ultimate / elastic");
    canvas.line(plot.spot(x[0], 1.0), plot.spot(x[1], 1.0), Stroke::dashed(Ink::QUIET, 1.2, 6.0, 4.0));
    quantity.draw(canvas, &plot, Ink::TEXT, 2.0, Some(Mark::Dot));
}

fn utilisation(canvas: &mut Canvas, sweep: &Sweep, variable: &Variable, x: [f64; 2]) {
    let value = |point: &Point| point.outcome.as_ref().ok()?.utilisation();
    let no_jump = |_: &Jump, _: usize| None;
    let same_basis = |one: &Point, next: &Point| notes::deciding(one) == notes::deciding(next);
    let quantity =
        Quantity { sweep, variable, value: &value, jumps: true, at_jump: &no_jump, joined: &same_basis };
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

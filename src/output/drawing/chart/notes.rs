//! What the drawing of a sweep says in words.

use super::super::canvas::{Area, BODY, Canvas, SMALL, Spot, Stroke, Text};
use super::super::font;
use super::super::ink::Ink;
use super::plot::Mark;
use crate::analysis::Status;
use crate::output::number::{people, quantity, trimmed};
use crate::output::words;
use crate::study::sweep::{PointCase, Sweep, Target, Variable};
use crate::units::Dimension;

/// Jumps told one by one.
const JUMPS: usize = 3;
/// Share by which the peak must exceed the ultimate strength to have a curve of its own in words.
const NOTABLE_PEAK: f64 = 1e-3;

/// What a variable is called.
pub(super) fn name(variable: &Variable) -> &str {
    match variable.target {
        Target::Parameter => &variable.name,
        Target::LoadEccentricity => "eccentricity of the load",
        Target::LoadAngle => "angle of the load",
    }
}

/// The title of an axis.
pub(super) fn axis(variable: &Variable) -> String {
    if variable.unit.is_empty() {
        name(variable).to_owned()
    } else {
        format!("{}, {}", name(variable), variable.unit)
    }
}

/// A value of a variable with its unit.
fn value(variable: &Variable, inside: f64) -> String {
    format!("{} {}", trimmed(variable.shown(inside)), variable.unit).trim_end().to_owned()
}

/// `name = value`, for all variables of a point.
fn place(sweep: &Sweep, index: usize) -> String {
    let Some(point) = sweep.points.get(index) else { return String::new() };
    let each =
        |(variable, inside): (&Variable, &f64)| format!("{} = {}", variable.name, value(variable, *inside));
    sweep.variables.iter().zip(&point.values).map(each).collect::<Vec<_>>().join(", ")
}

/// What is varied, in one line.
pub(super) fn subject(sweep: &Sweep) -> String {
    let each = |variable: &Variable| {
        format!(
            "{} from {} to {}",
            name(variable),
            value(variable, variable.from()),
            value(variable, variable.to())
        )
    };
    let varied: Vec<String> = sweep.variables.iter().map(each).collect();
    format!("Case {}: {}, {} points", sweep.shown_name(), varied.join(" and "), sweep.points.len())
}

/// Whether the load of the shown case is a force or a moment.
pub(super) fn measure(sweep: &Sweep) -> Dimension {
    let demands = sweep.points.iter().filter_map(|point| sweep.shown_case(point)?.demand);
    let mut moments = demands.map(|demand| demand.in_moment);
    if moments.next().unwrap_or(false) { Dimension::Moment } else { Dimension::Force }
}

/// Whether the peak exceeds the ultimate strength somewhere.
pub(super) fn peak_differs(sweep: &Sweep) -> bool {
    let exceeds = |case: &PointCase| {
        let both = case.peak_load_factor.zip(case.ultimate);
        both.is_some_and(|(peak, ultimate)| peak > ultimate.load_factor * (1.0 + NOTABLE_PEAK))
    };
    sweep.points.iter().filter_map(|point| sweep.shown_case(point)).any(exceeds)
}

/// What a reader should take from the drawing.
pub(super) fn sentences(sweep: &Sweep) -> Vec<String> {
    let mut sentences = Vec::new();
    if let Some(extremes) = sweep.extremes() {
        let (largest, ratio) = extremes.largest;
        sentences.push(format!(
            "The elastic method loses most at {}: ultimate / elastic {}.",
            place(sweep, largest),
            people(ratio)
        ));
        let (smallest, ratio) = extremes.smallest;
        let words =
            if ratio < 1.0 { "The elastic strength is the greater at" } else { "The methods are closest at" };
        sentences.push(format!("{words} {}: ultimate / elastic {}.", place(sweep, smallest), people(ratio)));
    }
    for crossing in sweep.crossings() {
        let [before, after] = crossing.points.map(|index| place(sweep, index));
        sentences.push(format!("The verdict changes between {before} and {after}."));
    }
    let units = sweep.joint.units;
    let dimension = measure(sweep);
    for jump in sweep.jumps.iter().take(if sweep.variables.len() == 1 { JUMPS } else { 0 }) {
        let [from, to] = jump.strength.map(|strength| quantity(units, dimension, strength.size));
        let at = sweep
            .variables
            .get(jump.variable)
            .map_or_else(String::new, |variable| value(variable, jump.at[0]));
        sentences.push(format!("The ultimate strength jumps at {at}: {from} to {to}."));
    }
    let untold =
        if sweep.variables.len() == 1 { sweep.jumps.len().saturating_sub(JUMPS) } else { sweep.jumps.len() };
    if untold > 0 {
        let noun = if untold == 1 { "jump" } else { "jumps" };
        sentences.push(format!(
            "{untold} {noun} of the ultimate strength between neighbouring points: steps in the drawing."
        ));
    }
    let unanswered = sweep.count(Status::NotSolved);
    if unanswered > 0 {
        let noun = if unanswered == 1 { "point has" } else { "points have" };
        sentences.push(format!("{unanswered} {noun} no answer."));
    }
    sentences
}

/// Rules and law.
fn basis(sweep: &Sweep) -> String {
    format!("{}; {}", sweep.joint.rules.id, words::law_in_brief(&sweep.joint))
}

/// The panel beside curves.
pub(super) fn draw(canvas: &mut Canvas, panel: &Area, sweep: &Sweep) {
    canvas.area(panel, Some(Ink::WASH), None);
    let (left, right) = (panel.least.x + 16.0, panel.most.x - 16.0);
    let mut y = heading(canvas, "Key", left, right, panel.least.y + 2.0);
    let line = |ink: Ink, width: f64, mark: Option<Mark>| {
        move |canvas: &mut Canvas, at: Spot| {
            canvas.line(at - Spot::new(22.0, 0.0), at + Spot::new(22.0, 0.0), Stroke::solid(ink, width));
            if let Some(mark) = mark {
                mark.draw(canvas, at, ink);
            }
        }
    };
    let mut key = |words: &str, symbol: &dyn Fn(&mut Canvas, Spot)| {
        symbol(canvas, Spot::new(left + 24.0, y + 11.0));
        let at = Spot::new(left + 58.0, y + 11.0 + 0.5 * font::CAPITALS * SMALL);
        canvas.text(&Text { size: SMALL, ..Text::new(words, at) });
        y += 22.0;
    };
    key("ultimate, first rupture", &line(Ink::ULTIMATE, 2.4, Some(Mark::Dot)));
    key("elastic vector method", &line(Ink::ELASTIC, 2.4, Some(Mark::Square)));
    if peak_differs(sweep) {
        key("peak on the path from zero load", &line(Ink::PEAK, 1.6, None));
    }
    if !sweep.jumps.is_empty() {
        key("both sides of a jump", &|canvas, at| {
            Mark::Ring.draw(canvas, at - Spot::new(9.0, 4.0), Ink::ULTIMATE);
            Mark::Ring.draw(canvas, at + Spot::new(9.0, 4.0), Ink::ULTIMATE);
        });
    }
    key("utilisation, satisfied", &|canvas, at| Mark::Dot.draw(canvas, at, Ink::TEXT));
    key("utilisation, exceeded", &|canvas, at| Mark::Ring.draw(canvas, at, Ink::EXCEEDED));
    y = heading(canvas, "What it shows", left, right, y);
    for sentence in sentences(sweep).iter().chain([&basis(sweep)]) {
        let lines = font::lines(sentence, SMALL, right - left);
        if y + font::LEADING * SMALL * super::super::ink::as_float(lines.len()) > panel.most.y - 8.0 {
            break;
        }
        y = canvas.lines(&lines, Spot::new(left, y + SMALL), SMALL, Ink::TEXT) - SMALL + 6.0;
    }
}

fn heading(canvas: &mut Canvas, words: &str, left: f64, right: f64, y: f64) -> f64 {
    let y = y + 10.0;
    canvas.text(&Text::new(words, Spot::new(left, y + BODY)));
    canvas.line(
        Spot::new(left, y + BODY + 7.0),
        Spot::new(right, y + BODY + 7.0),
        Stroke::solid(Ink::HAIR, 1.0),
    );
    y + BODY + 13.0
}

/// The sentences below maps.
pub(super) fn below(canvas: &mut Canvas, sweep: &Sweep, at: Spot) {
    let right = canvas.page().most.x - at.x;
    let mut y = at.y;
    for sentence in sentences(sweep).iter().chain([&basis(sweep)]) {
        let lines = font::lines(sentence, SMALL, right - at.x);
        if y > canvas.page().most.y - 44.0 {
            break;
        }
        y = canvas.lines(&lines, Spot::new(at.x, y), SMALL, Ink::TEXT);
    }
}

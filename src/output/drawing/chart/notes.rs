//! What the drawing of a sweep says in words.

use super::super::canvas::{Area, BODY, Canvas, SMALL, Spot, Stroke, Text};
use super::super::count::as_float;
use super::super::font;
use super::super::ink::Ink;
use super::plot::Mark;
use crate::analysis::Status;
use crate::model::Basis;
use crate::output::sweep::labels::Labels;
use crate::output::sweep::summary;
use crate::output::words;
use crate::study::sweep::{Point, PointCase, Sweep, Target, Variable};
use crate::units::Dimension;

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

/// What is varied, in one line.
pub(super) fn subject(sweep: &Sweep) -> String {
    let labels = Labels::new(sweep);
    let varied: Vec<String> = (0..sweep.variables.len()).map(|variable| labels.range(variable)).collect();
    format!("Case {}: {}", sweep.shown_name(), varied.join("; "))
}

/// Which case decides a point, and by which analysis.
pub(super) fn deciding(point: &Point) -> Option<(usize, Basis)> {
    let answer = point.outcome.as_ref().ok()?;
    let governing = answer.governing?;
    Some((governing, answer.cases.get(governing)?.verification.as_ref()?.basis))
}

/// What the utilisation is of: the governing case of a joint may be another than the one shown.
pub(super) fn utilisation(sweep: &Sweep) -> &'static str {
    match (sweep.cases.len() > 1, sweep.variables.len() > 1) {
        (true, true) => "utilisation of the joint, governing case; limit 1 in red",
        (true, false) => "utilisation of the joint, governing case",
        (false, true) => "utilisation; limit 1 in red",
        (false, false) => "utilisation",
    }
}

/// The dimension of the strengths that are drawn.
pub(super) fn measure(sweep: &Sweep) -> Dimension {
    if sweep.in_moment() { Dimension::Moment } else { Dimension::Force }
}

/// A strength of the shown case at a point in the unit of the drawing; `None` where it has the other measure.
pub(super) fn strength(sweep: &Sweep, point: &Point, factor: fn(&PointCase) -> Option<f64>) -> Option<f64> {
    let case = sweep.shown_case(point)?;
    let demand = case.demand.filter(|demand| demand.in_moment == sweep.in_moment())?;
    Some(sweep.joint.units.shown(measure(sweep), demand.size * factor(case)?))
}

/// Whether the peak exceeds the ultimate strength somewhere.
pub(super) fn peak_differs(sweep: &Sweep) -> bool {
    let exceeds = |case: &PointCase| {
        let both = case.peak_load_factor.zip(case.ultimate);
        both.is_some_and(|(peak, ultimate)| peak > ultimate.load_factor * (1.0 + NOTABLE_PEAK))
    };
    sweep.points.iter().filter_map(|point| sweep.shown_case(point)).any(exceeds)
}

/// What a reader should take from the drawing: the verdicts, and what the numbers say.
fn sentences(sweep: &Sweep) -> Vec<String> {
    let count = |status: Status, words: &str| {
        let count = sweep.count(status);
        (count > 0).then(|| format!("{count} {words}"))
    };
    let counts = [
        count(Status::Satisfied, "satisfied"),
        count(Status::Exceeded, "exceeded"),
        count(
            Status::NotSolved,
            if sweep.variables.len() > 1 {
                "without an answer"
            } else {
                "without an answer (a cross on the axis)"
            },
        ),
    ];
    let counts: Vec<String> = counts.into_iter().flatten().collect();
    let mut sentences = vec![
        words::basis_in_brief(&sweep.joint),
        format!("{} points: {}.", sweep.points.len(), counts.join(", ")),
    ];
    if sweep.variables.len() > 1
        && (sweep.count(Status::NotSolved) > 0 || sweep.decided_by(Basis::Concentric) > 0)
    {
        sentences
            .push("Grey: beside points without an answer, or where another analysis decides.".to_owned());
    }
    if sweep.points.iter().all(|point| sweep.shown_case(point).is_none_or(|case| case.demand.is_none())) {
        sentences.push("The case shown has no load: there is no strength to draw.".to_owned());
    }
    let other = sweep.in_other_measure();
    if other > 0 {
        let noun = if sweep.in_moment() { "force" } else { "moment alone" };
        let points = if other == 1 { "1 point".to_owned() } else { format!("{other} points") };
        sentences.push(format!("{points} with a {noun} for a load: left out of the strengths."));
    }
    sentences.extend(summary::sentences(sweep, &Labels::new(sweep)));
    sentences.extend(summary::out_of_the_ordinary(sweep));
    sentences
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
    if sweep.count(Status::Exceeded) > 0 {
        key("utilisation, exceeded", &|canvas, at| Mark::Ring.draw(canvas, at, Ink::EXCEEDED));
    }
    y = heading(canvas, "What it shows", left, right, y);
    let sentences = sentences(sweep);
    for (index, sentence) in sentences.iter().enumerate() {
        let lines = font::lines(sentence, SMALL, right - left);
        let left_over = sentences.len() - index;
        let free = if left_over == 1 { 0.0 } else { font::LEADING * SMALL };
        if y + font::LEADING * SMALL * as_float(lines.len()) + free > panel.most.y - 8.0 {
            let words = format!("and {left_over} more: see the text");
            canvas.text(&Text {
                size: SMALL,
                ink: Ink::QUIET,
                ..Text::new(&words, Spot::new(left, y + SMALL))
            });
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

/// The lines below maps.
pub(super) fn lines(sweep: &Sweep, room: f64) -> Vec<String> {
    sentences(sweep).iter().flat_map(|sentence| font::lines(sentence, SMALL, room)).collect()
}

//! What the drawing of a sweep says in words.

use super::super::canvas::{Area, Canvas, SMALL, Spot, Stroke};
use super::super::column::Column;
use super::super::font;
use super::super::ink::Ink;
use super::plot::Mark;
use crate::analysis::Status;
use crate::model::Basis;
use crate::output::number;
use crate::output::sweep::labels::Labels;
use crate::output::sweep::summary;
use crate::output::words;
use crate::study::sweep::{Point, PointCase, Sweep, Target, Variable};
use crate::units::Dimension;

/// Room after a sentence, px.
const GAP_OF_SENTENCES: f64 = 6.0;
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
    number::measure(sweep.in_moment())
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
    let mut column = Column::new(canvas, panel, GAP_OF_SENTENCES);
    column.heading("Key");
    let line = |ink: Ink, width: f64, mark: Option<Mark>| {
        move |canvas: &mut Canvas, at: Spot| {
            canvas.line(at - Spot::new(22.0, 0.0), at + Spot::new(22.0, 0.0), Stroke::solid(ink, width));
            if let Some(mark) = mark {
                mark.draw(canvas, at, ink);
            }
        }
    };
    column.key("ultimate, first rupture", None, line(Ink::ULTIMATE, 2.4, Some(Mark::Dot)));
    column.key("elastic vector method", None, line(Ink::ELASTIC, 2.4, Some(Mark::Square)));
    if peak_differs(sweep) {
        column.key("peak on the path from zero load", None, line(Ink::PEAK, 1.6, None));
    }
    if !sweep.jumps.is_empty() {
        column.key("both sides of a jump", None, |canvas, at| {
            Mark::Ring.draw(canvas, at - Spot::new(9.0, 4.0), Ink::ULTIMATE);
            Mark::Ring.draw(canvas, at + Spot::new(9.0, 4.0), Ink::ULTIMATE);
        });
    }
    column.key("utilisation, satisfied", None, |canvas, at| Mark::Dot.draw(canvas, at, Ink::TEXT));
    if sweep.count(Status::Exceeded) > 0 {
        column.key("utilisation, exceeded", None, |canvas, at| Mark::Ring.draw(canvas, at, Ink::EXCEEDED));
    }
    column.heading("What it shows");
    column.sentences(&sentences(sweep), ": see the text");
}

/// The lines below maps.
pub(super) fn lines(sweep: &Sweep, room: f64) -> Vec<String> {
    sentences(sweep).iter().flat_map(|sentence| font::lines(sentence, SMALL, room)).collect()
}

//! The loads where they act, the resultant's line of action, and its distance from the centroid.
//!
//! A force hangs at its point of application; moments at one place have one arrow for their sum. A force too far
//! away to be drawn in place stands at the rim, where the way to it leaves the drawing, and its words say where it
//! acts; a moment too far away, or without a place, stands at the centroid. Which is shown, a force or a moment, is
//! told by the measure of the case's strength, so that the rounding of loads that cancel is no load.

use super::super::arrow::Arrow;
use super::super::canvas::{Area, Canvas, SMALL, Spot, Stroke, Text};
use super::super::font;
use super::super::ink::Ink;
use super::super::space::{Label, Space, clipped};
use super::super::view::{View, on_page};
use super::subject::{LENGTHS, Subject};
use crate::model::{AppliedLoad, Vector};
use crate::output::number::{length, point, quantity, trimmed};
use crate::units::Dimension;

/// Radius of the arrow of a moment, px.
pub(super) const TURN: f64 = 22.0;

/// Shortest perpendicular that is drawn, px.
const SHORTEST_ARM: f64 = 14.0;
/// Side of the mark of a right angle, px.
const RIGHT_ANGLE: f64 = 8.0;
/// Where the eccentricity is written along the perpendicular.
const ALONG_THE_ARM: f64 = 0.62;
/// Farther than any page reaches, px.
const BEYOND: f64 = 5000.0;
/// Longest words of a load, px.
const LONGEST_NAME: f64 = 330.0;
/// Least room for a name in them, px.
const SHORTEST_NAME: f64 = 60.0;

const LOAD: Arrow = Arrow { ink: Ink::LOAD, width: 3.0, head: 13.0 };

/// Loads that are drawn one by one.
fn drawn<'r>(subject: &Subject<'r>) -> Vec<&'r AppliedLoad> {
    if subject.draws_each_load() { subject.loads().iter().collect() } else { Vec::new() }
}

/// Whether the resultant says more than the loads themselves.
fn resultant_is_shown(subject: &Subject<'_>) -> bool {
    subject.loads().len() > 1 && subject.is_force()
}

/// Draws the loads and takes their place; the words of those that have none at them.
pub(super) fn draw(
    canvas: &mut Canvas,
    space: &mut Space,
    subject: &Subject<'_>,
    view: &View,
) -> Vec<String> {
    line_of_action(canvas, space, subject, view);
    let loads = drawn(subject);
    if loads.is_empty() {
        resultant(canvas, space, subject, view);
        return subject.loads().iter().map(|load| in_words(subject, load)).collect();
    }
    let greatest = loads.iter().map(|load| load.wrench.force.norm()).fold(0.0, f64::max);
    let mut unsaid = Vec::new();
    for load in loads.iter().filter(|load| load.wrench.force.norm() > 0.0) {
        let length = LENGTHS.1 + (LENGTHS.0 - LENGTHS.1) * load.wrench.force.norm() / greatest;
        unsaid.extend(force(canvas, space, subject, view, load, length));
    }
    let mut moments: Vec<(Vector, Vec<&AppliedLoad>)> = Vec::new();
    for load in loads.iter().filter(|load| load.wrench.moment.z.abs() > 0.0) {
        let at = subject.place_of_moment(load);
        match moments.iter_mut().find(|(known, _)| subject.is_same(*known, at)) {
            Some((_, there)) => there.push(load),
            None => moments.push((at, vec![load])),
        }
    }
    for (at, there) in moments {
        unsaid.extend(moment(canvas, space, subject, view.spot(at), &there));
    }
    unsaid
}

/// A load with its case, size and place.
fn in_words(subject: &Subject<'_>, load: &AppliedLoad) -> String {
    let units = subject.joint().units;
    let mut parts = Vec::new();
    if load.wrench.force.norm() > 0.0 {
        let at = load.wrench.reference;
        let force = point(units, Dimension::Force, &[load.wrench.force.x, load.wrench.force.y]);
        parts.push(format!("{force} at {}", point(units, Dimension::Length, &[at.x, at.y])));
    }
    if load.wrench.moment.z.abs() > 0.0 {
        parts.push(quantity(units, Dimension::Moment, load.wrench.moment.z));
    }
    format!("{}: {}", name(load), parts.join(" and "))
}

/// What a load is called: factor and case.
fn name(load: &AppliedLoad) -> String {
    #[allow(clippy::float_cmp)] // the factor of a case without combinations is exactly 1
    if load.factor == 1.0 { load.case.clone() } else { format!("{} × {}", trimmed(load.factor), load.case) }
}

fn force(
    canvas: &mut Canvas,
    space: &mut Space,
    subject: &Subject<'_>,
    view: &View,
    load: &AppliedLoad,
    length: f64,
) -> Option<String> {
    let units = subject.joint().units;
    let unit = on_page(load.wrench.force).normalize();
    let size = quantity(units, Dimension::Force, load.wrench.force.norm());
    let at = load.wrench.reference;
    let near = subject.is_near(at);
    let tail = if near { view.spot(at) } else { rim(space, view, subject, at, unit * length) };
    let tip = tail + unit * length;
    LOAD.draw(canvas, tail, tip);
    canvas.circle(tail, 3.4, Some(Ink::LOAD), None);
    space.take_along(tail, tip, 5.0);
    let value =
        if near { size } else { format!("{size} at {}", point(units, Dimension::Length, &[at.x, at.y])) };
    let said = say(canvas, space, &name(load), &value, (tail + tip) / 2.0, 6.0, beside(unit));
    (!said).then(|| in_words(subject, load))
}

/// A place at the rim of the drawing for a load that acts far off, in its direction from the group.
fn rim(space: &Space, view: &View, subject: &Subject<'_>, at: Vector, arrow: Spot) -> Spot {
    let from = view.spot(subject.centroid());
    let toward = on_page(at - subject.centroid()).normalize();
    let frame = space.frame().grown(-30.0);
    let end = clipped(&frame, from, from + toward * BEYOND).map_or(from, |[_, end]| end);
    // The whole arrow stays within the frame.
    let tip = end + arrow;
    let clamped =
        Spot::new(tip.x.clamp(frame.least.x, frame.most.x), tip.y.clamp(frame.least.y, frame.most.y));
    clamped - arrow
}

/// The moments at one place: one arrow for their sum.
fn moment(
    canvas: &mut Canvas,
    space: &mut Space,
    subject: &Subject<'_>,
    at: Spot,
    loads: &[&AppliedLoad],
) -> Vec<String> {
    let units = subject.joint().units;
    let sum: f64 = loads.iter().map(|load| load.wrench.moment.z).sum();
    turn(canvas, space, at, sum);
    let value = quantity(units, Dimension::Moment, sum);
    let (name, value) = match loads {
        [load] => (name(load), value),
        several => (String::new(), format!("{} moments, sum {value}", several.len())),
    };
    let said = say(canvas, space, &name, &value, at, TURN, Spot::new(1.0, -1.0));
    if said && loads.len() == 1 {
        Vec::new()
    } else {
        loads.iter().map(|load| in_words(subject, load)).collect()
    }
}

/// The arrow of a moment, and its place.
fn turn(canvas: &mut Canvas, space: &mut Space, at: Spot, moment: f64) {
    if moment.abs() > 0.0 {
        LOAD.turn(canvas, at, TURN, moment > 0.0);
    }
    space.take(Area::around(at, Spot::new(2.0 * TURN, 2.0 * TURN)));
}

/// The sum of all loads, where they are too many to be drawn.
fn resultant(canvas: &mut Canvas, space: &mut Space, subject: &Subject<'_>, view: &View) {
    let units = subject.joint().units;
    let load = &subject.case.load;
    let size = load.force.norm();
    if subject.is_force() {
        let at = subject.foot().unwrap_or_else(|| subject.centroid());
        let near = subject.is_near(at);
        let unit = on_page(load.force).normalize();
        let tail = if near { view.spot(at) } else { rim(space, view, subject, at, unit * LENGTHS.0) };
        LOAD.draw(canvas, tail, tail + unit * LENGTHS.0);
        space.take_along(tail, tail + unit * LENGTHS.0, 5.0);
        let words =
            format!("{} loads, resultant {}", subject.loads().len(), quantity(units, Dimension::Force, size));
        say(canvas, space, "", &words, tail + unit * (0.5 * LENGTHS.0), 6.0, beside(unit));
    } else if load.moment.z.abs() > 0.0 {
        let at = view.spot(subject.centroid());
        turn(canvas, space, at, load.moment.z);
        let size = quantity(units, Dimension::Moment, load.moment.z);
        say(canvas, space, "", &size, at, TURN, Spot::new(1.0, -1.0));
    }
}

/// The line of action of the resultant, from its foot to the loads, and the eccentricity.
fn line_of_action(canvas: &mut Canvas, space: &mut Space, subject: &Subject<'_>, view: &View) {
    let Some(foot) = subject.foot().filter(|foot| subject.is_near(*foot)) else { return };
    let along = on_page(subject.case.load.force).normalize();
    let at = view.spot(foot);
    let frame = space.frame().grown(-10.0);
    if !frame.contains(at) {
        return;
    }
    let mut reach = [0.0_f64, 0.0];
    for near in subject.near_loads() {
        let distance = (view.spot(near) - at).dot(&along);
        reach = [reach[0].min(distance), reach[1].max(distance)];
    }
    let (from, to) = (at + along * (reach[0] - 24.0), at + along * (reach[1] + 24.0));
    let Some([from, to]) = clipped(&frame, from, to) else { return };
    canvas.line(from, to, Stroke::dashed(Ink::LOAD, 1.2, 9.0, 5.0));
    space.take_line(from, to);
    if resultant_is_shown(subject) && !drawn(subject).is_empty() {
        let units = subject.joint().units;
        let words =
            format!("resultant {}", quantity(units, Dimension::Force, subject.case.load.force.norm()));
        let up = if along.y < 0.0 { to } else { from };
        say(canvas, space, "", &words, up, 2.0, Spot::new(0.3, -1.0));
    }
    let centroid = view.spot(subject.centroid());
    let arm = (at - centroid).norm();
    if arm > SHORTEST_ARM {
        canvas.line(centroid, at, Stroke::solid(Ink::QUIET, 1.0));
        space.take_line(centroid, at);
        // A right angle at the foot.
        let back = (centroid - at) / arm * RIGHT_ANGLE;
        let side = along * RIGHT_ANGLE;
        canvas.polyline(&[at + back, at + back + side, at + side], Stroke::solid(Ink::QUIET, 1.0));
    }
    let words = format!("e = {}", length(subject.joint().units, (foot - subject.centroid()).norm()));
    let text = Text { size: SMALL, ink: Ink::QUIET, ..Text::new(&words, Spot::zeros()) };
    let up = if along.y > 0.0 { -along } else { along };
    let wish = centroid + (at - centroid) * ALONG_THE_ARM;
    space.lead_label(canvas, &[Label { text, wish, reach: 1.0, direction: up }]);
}

/// Across an arrow, to the right or above.
fn beside(unit: Spot) -> Spot {
    Spot::new(unit.y.abs() + 1e-3, -unit.x.abs())
}

/// Puts a name and a value; the name is cut where it is long, the value never. Whether there was room.
fn say(
    canvas: &mut Canvas,
    space: &mut Space,
    name: &str,
    value: &str,
    wish: Spot,
    reach: f64,
    direction: Spot,
) -> bool {
    let room = LONGEST_NAME - font::width(value, SMALL);
    let name = font::clipped(name, SMALL, room.max(SHORTEST_NAME));
    let words = if name.is_empty() { value.to_owned() } else { format!("{name}: {value}") };
    let text = Text { size: SMALL, ink: Ink::LOAD, ..Text::new(&words, Spot::zeros()) };
    space.lead_label(canvas, &[Label { text, wish, reach, direction }])
}

//! Marks: weld centroid, centre of rotation (or where it lies), the point that ruptures first, the elastic worst point.
//!
//! | mark | meaning |
//! |---|---|
//! | circle with a cross | weld centroid |
//! | diamond | instantaneous centre of rotation |
//! | ring | first rupture, ultimate method |
//! | square | worst point, elastic method |
//! | open arrow at the rim | direction of a centre that lies off the drawing, or of a translation |

use super::super::arrow::Arrow;
use super::super::canvas::{Area, Canvas, SMALL, Spot, Stroke, Text};
use super::super::ink::Ink;
use super::super::space::{Label, Space};
use super::super::view::{View, on_page};
use super::subject::Subject;
use crate::model::Vector;
use crate::output::number::length;

/// Radius of the marks, px.
const RADIUS: f64 = 8.0;
/// Length of the arrow that points off the drawing, px.
const POINTER: f64 = 46.0;

/// The weld centroid.
pub(super) fn centroid(canvas: &mut Canvas, at: Spot) {
    let stroke = Stroke::solid(Ink::TEXT, 1.3);
    canvas.circle(at, 0.8 * RADIUS, Some(Ink::PAPER), Some(stroke));
    canvas.line(at - Spot::new(RADIUS + 3.0, 0.0), at + Spot::new(RADIUS + 3.0, 0.0), stroke);
    canvas.line(at - Spot::new(0.0, RADIUS + 3.0), at + Spot::new(0.0, RADIUS + 3.0), stroke);
}

/// The centre of rotation.
pub(super) fn centre(canvas: &mut Canvas, at: Spot) {
    let (x, y) = (Spot::new(RADIUS + 1.0, 0.0), Spot::new(0.0, RADIUS + 1.0));
    let stroke = Stroke::solid(Ink::ULTIMATE, 2.0);
    canvas.polygon(&[at - x, at - y, at + x, at + y], Some(Ink::PAPER), Some(stroke));
    canvas.circle(at, 2.2, Some(Ink::ULTIMATE), None);
}

/// First rupture.
pub(super) fn rupture(canvas: &mut Canvas, at: Spot) {
    canvas.circle(at, RADIUS + 3.0, None, Some(Stroke::solid(Ink::PAPER, 5.5)));
    canvas.circle(at, RADIUS + 3.0, None, Some(Stroke::solid(Ink::EXCEEDED, 2.6)));
}

/// The elastic worst point.
pub(super) fn worst(canvas: &mut Canvas, at: Spot) {
    let half = Spot::new(RADIUS - 1.5, RADIUS - 1.5);
    let area = Area { least: at - half, most: at + half };
    canvas.area(&area, None, Some(Stroke::solid(Ink::PAPER, 4.5)));
    canvas.area(&area, None, Some(Stroke::solid(Ink::ELASTIC, 2.4)));
}

/// Draws all marks and takes their place.
pub(super) fn draw(canvas: &mut Canvas, space: &mut Space, subject: &Subject<'_>, view: &View) {
    let mut take = |at: Spot| space.take(Area::around(at, Spot::new(2.4 * RADIUS, 2.4 * RADIUS)));
    let at = view.spot(subject.centroid());
    centroid(canvas, at);
    take(at);
    if let Some(elastic) = subject.case.elastic() {
        let at = view.spot(elastic.critical.place.at);
        worst(canvas, at);
        take(at);
    }
    if let Some(critical) = subject.state().and_then(|state| state.critical.as_ref()) {
        let at = view.spot(critical.place.at);
        rupture(canvas, at);
        take(at);
    }
    if let Some(near) = subject.near_centre() {
        let at = view.spot(near);
        centre(canvas, at);
        take(at);
    }
}

/// Says where the centre is: at its mark, or with an arrow toward it. The words, where there is no room for them.
pub(super) fn label(
    canvas: &mut Canvas,
    space: &mut Space,
    subject: &Subject<'_>,
    view: &View,
) -> Option<String> {
    let state = subject.state()?;
    if let Some(near) = subject.near_centre() {
        let text = Text { size: SMALL, ink: Ink::ULTIMATE, ..Text::new("centre of rotation", Spot::zeros()) };
        let away = on_page(near - subject.centroid());
        let label = Label { text, wish: view.spot(near), reach: RADIUS + 3.0, direction: away };
        space.lead_label(canvas, &[label]);
        return None;
    }
    let (words, toward) = match subject.centre() {
        Some(centre) => {
            let away = centre - subject.centroid();
            let distance = length(subject.joint().units, away.norm());
            (format!("centre of rotation {distance} from the centroid"), away)
        }
        None => {
            let [x, y] = state.motion.translation;
            ("translation: no centre of rotation".to_owned(), Vector::new(x, y, 0.0))
        }
    };
    let said = point_off(canvas, space, view.spot(subject.centroid()), on_page(toward), &words);
    let mut letters = words.chars();
    let capital = letters.next().map(|first| first.to_ascii_uppercase());
    (!said).then(|| format!("{}{}.", capital.map(String::from).unwrap_or_default(), letters.as_str()))
}

/// An arrow away from the group, toward what lies off the drawing, with a text; whether the text found room.
fn point_off(canvas: &mut Canvas, space: &mut Space, from: Spot, toward: Spot, words: &str) -> bool {
    if toward.norm() <= 0.0 {
        return false;
    }
    let unit = toward.normalize();
    let look = Arrow { ink: Ink::ULTIMATE, width: 2.2, head: 12.0 };
    let text = Text { size: SMALL, ink: Ink::ULTIMATE, ..Text::new(words, Spot::zeros()) };
    // The first place along the ray where the arrow meets nothing; without one only the words remain.
    let mut distance = 20.0;
    let mut chosen = None;
    while chosen.is_none() && distance < 2000.0 {
        let (tail, tip) = (from + unit * distance, from + unit * (distance + POINTER));
        let room = Area { least: tail.inf(&tip), most: tail.sup(&tip) }.grown(7.0);
        if space.is_free(&room) && !space.is_crossed(&room) {
            chosen = Some((tail, tip, room));
        }
        distance += 6.0;
    }
    let Some((tail, tip, room)) = chosen else { return false };
    look.open(canvas, tail, tip);
    space.take(room);
    let label = Label { text, wish: (tail + tip) / 2.0, reach: 10.0, direction: Spot::new(-unit.y, unit.x) };
    space.label(canvas, &label)
}

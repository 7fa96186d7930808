//! Arrows: straight ones for forces and motions, bent ones for moments.

use super::canvas::{Canvas, Spot, Stroke, outline, spot};
use super::ink::Ink;

/// Width of a pale rim, px.
const RIM: f64 = 0.9;

/// How an arrow looks.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Arrow {
    pub(super) ink: Ink,
    /// Width of the shaft, px.
    pub(super) width: f64,
    /// Length of the head, px; shortened on a short arrow.
    pub(super) head: f64,
}

impl Arrow {
    /// Draws it with a pale rim, so that it shows on dark ground.
    pub(super) fn draw_rimmed(&self, canvas: &mut Canvas, tail: Spot, tip: Spot) {
        let along = tip - tail;
        if along.norm() > 0.5 {
            let unit = along.normalize();
            let rim = Self { ink: Ink::PAPER, width: self.width + 2.0 * RIM, head: self.head + 2.0 * RIM };
            rim.draw(canvas, tail, tip + unit * RIM);
        }
        self.draw(canvas, tail, tip);
    }

    /// Draws it from tail to tip.
    pub(super) fn draw(&self, canvas: &mut Canvas, tail: Spot, tip: Spot) {
        let along = tip - tail;
        let length = along.norm();
        if length < 0.5 {
            return;
        }
        let unit = along / length;
        let head = self.head.min(0.7 * length);
        let neck = tip - unit * head;
        // The shaft ends within the head, so that no gap shows between them.
        canvas.line(tail, neck + unit * (0.3 * head), Stroke::solid(self.ink, self.width));
        self.head(canvas, tip, unit, head);
    }

    fn head(&self, canvas: &mut Canvas, tip: Spot, unit: Spot, length: f64) {
        let across = Spot::new(-unit.y, unit.x) * (0.36 * length + 0.5 * self.width);
        let neck = tip - unit * length;
        canvas.polygon(&[tip, neck + across, neck - across], Some(self.ink), None);
    }

    /// Draws 250 degrees of a turn about a point, anticlockwise as seen on the page or clockwise.
    pub(super) fn turn(&self, canvas: &mut Canvas, middle: Spot, radius: f64, anticlockwise: bool) {
        // On the page y points down, so a rising angle turns clockwise.
        let sense = if anticlockwise { -1.0 } else { 1.0 };
        let at = |angle: f64| {
            let angle = sense * angle.to_radians();
            middle + Spot::new(angle.cos(), angle.sin()) * radius
        };
        let (begin, end) = (-135.0, 115.0);
        let sweep = u8::from(!anticlockwise);
        let data = format!("M{}A{radius} {radius} 0 1 {sweep} {}", spot(at(begin)), spot(at(end)));
        canvas.path(&data, None, Some(Stroke::solid(self.ink, self.width)));
        let tip = at(end + 15.0);
        let unit = (tip - at(end - 15.0)).normalize();
        self.head(canvas, tip, unit, self.head);
    }

    /// Draws it with two short lines for a head, for a motion.
    pub(super) fn open(&self, canvas: &mut Canvas, tail: Spot, tip: Spot) {
        let unit = (tip - tail).normalize();
        let across = Spot::new(-unit.y, unit.x) * (0.45 * self.head);
        let neck = tip - unit * self.head;
        let stroke = Stroke::solid(self.ink, self.width);
        canvas.line(tail, tip, stroke);
        canvas.path(&outline(&[neck + across, tip, neck - across], false), None, Some(stroke));
    }
}

//! Where on the page there is room: texts are placed so that none overlaps another.
//!
//! Boxes (texts, symbols) are never overlapped; lines (welds, arrows) are crossed only when nothing else is free.
//! A text that finds no place is not put at all: the caller lists it beside the drawing.

use super::canvas::{Anchor, Area, Canvas, Spot, Stroke, Text};
use super::font;
use super::ink::Ink;

/// Least distance of two texts.
const APART: f64 = 3.0;
/// What a crossed line costs, in px of distance from the wished place.
const CROSSING: f64 = 120.0;
/// Distances from the wished place that are tried.
const RINGS: [f64; 7] = [6.0, 16.0, 30.0, 48.0, 72.0, 100.0, 140.0];
/// Directions that are tried at each distance.
const DIRECTIONS: u32 = 16;
/// Distance from which a text is led to its place by a line.
const LEADER: f64 = 22.0;

/// What is taken on a part of the page.
#[derive(Debug, Clone)]
pub(super) struct Space {
    frame: Area,
    boxes: Vec<Area>,
    lines: Vec<[Spot; 2]>,
}

/// Where a text was placed.
#[derive(Debug, Clone, Copy, PartialEq)]
struct Placed {
    /// The box of the text.
    area: Area,
    /// What it belongs to.
    wish: Spot,
    /// Whether it is so far from its wished place that a line should lead to it.
    led: bool,
}

impl Space {
    /// An empty part of the page.
    pub(super) fn new(frame: Area) -> Self {
        Self { frame, boxes: Vec::new(), lines: Vec::new() }
    }

    /// The part of the page.
    pub(super) fn frame(&self) -> &Area {
        &self.frame
    }

    /// Takes a box.
    pub(super) fn take(&mut self, area: Area) {
        self.boxes.push(area);
    }

    /// Takes a line.
    pub(super) fn take_line(&mut self, from: Spot, to: Spot) {
        self.lines.push([from, to]);
    }

    /// Takes a line with this room on both sides.
    pub(super) fn take_along(&mut self, from: Spot, to: Spot, room: f64) {
        let steps = ((to - from).norm() / room.max(1.0)).ceil().clamp(1.0, 200.0);
        let mut step = 0.0;
        while step < steps {
            let (a, b) = (from + (to - from) * (step / steps), from + (to - from) * ((step + 1.0) / steps));
            self.take(Area { least: a.inf(&b), most: a.sup(&b) }.grown(room));
            step += 1.0;
        }
    }

    /// Whether a box is free of other boxes and within the frame.
    pub(super) fn is_free(&self, area: &Area) -> bool {
        self.frame.holds(area) && !self.boxes.iter().any(|taken| taken.overlaps(&area.grown(APART)))
    }

    /// Whether a line passes through a box.
    pub(super) fn is_crossed(&self, area: &Area) -> bool {
        self.crossings(area) > 0
    }

    fn crossings(&self, area: &Area) -> usize {
        let grown = area.grown(1.0);
        self.lines.iter().filter(|[from, to]| crosses(&grown, *from, *to)).count()
    }

    /// The cheapest free place of a box near `wish`, `reach` beside it at least, first in `direction`; and its cost.
    fn best(&self, size: Spot, wish: Spot, reach: f64, direction: Spot) -> Option<(f64, Placed)> {
        let heading = if direction.norm() > 0.0 { direction.y.atan2(direction.x) } else { 0.0 };
        let mut best: Option<(f64, Placed)> = None;
        for ring in RINGS {
            for step in 0..DIRECTIONS {
                // Alternately to either side of the wished direction.
                let side = if step % 2 == 0 { 1.0 } else { -1.0 };
                let turn = side * f64::from(step.div_ceil(2)) * std::f64::consts::TAU / f64::from(DIRECTIONS);
                let unit = Spot::new((heading + turn).cos(), (heading + turn).sin());
                let distance = reach + ring;
                // The box is moved on until only its nearest edge is at that distance.
                let half = Spot::new(unit.x * size.x, unit.y * size.y) / 2.0;
                let area = Area::around(wish + unit * distance + half, size);
                let cost = ring + 4.0 * turn.abs();
                if best.as_ref().is_some_and(|(known, _)| *known <= cost) || !self.is_free(&area) {
                    continue;
                }
                let cost = cost + CROSSING * super::count::as_float(self.crossings(&area));
                if best.as_ref().is_none_or(|(known, _)| cost < *known) {
                    best = Some((cost, Placed { area, wish, led: ring >= LEADER }));
                }
            }
        }
        best
    }

    /// Places a text near its wish and puts it on the canvas; whether there was room.
    pub(super) fn label(&mut self, canvas: &mut Canvas, label: &Label<'_>) -> bool {
        self.put(canvas, std::slice::from_ref(label)).is_some()
    }

    /// Places one text at the best of several wishes, with a line that leads to it where it is far; whether there was
    /// room.
    pub(super) fn lead_label(&mut self, canvas: &mut Canvas, labels: &[Label<'_>]) -> bool {
        let Some(Placed { area, wish, led }) = self.put(canvas, labels) else { return false };
        if led {
            let from =
                Spot::new(wish.x.clamp(area.least.x, area.most.x), wish.y.clamp(area.least.y, area.most.y));
            canvas.line(from, wish, Stroke::solid(Ink::QUIET, 0.8));
        }
        true
    }

    /// Places one text at the best of several wishes; the first of equals.
    fn put(&mut self, canvas: &mut Canvas, labels: &[Label<'_>]) -> Option<Placed> {
        let mut best: Option<(f64, Placed, &Label<'_>)> = None;
        for label in labels {
            let level = Text { at: Spot::zeros(), anchor: Anchor::Start, ..label.text.clone() };
            let found = self.best(level.area().size(), label.wish, label.reach, label.direction);
            if let Some((cost, placed)) = found
                && best.as_ref().is_none_or(|(known, ..)| cost < *known)
            {
                best = Some((cost, placed, label));
            }
        }
        let (_, placed, label) = best?;
        self.take(placed.area);
        let at = Spot::new(placed.area.least.x, placed.area.least.y + font::ASCENT * label.text.size);
        canvas.text(&Text { at, anchor: Anchor::Start, halo: true, ..label.text.clone() });
        Some(placed)
    }
}

/// A text to be placed.
#[derive(Debug, Clone)]
pub(super) struct Label<'t> {
    pub(super) text: Text<'t>,
    /// What it belongs to.
    pub(super) wish: Spot,
    /// Least distance from it.
    pub(super) reach: f64,
    /// The side on which it is looked for first.
    pub(super) direction: Spot,
}

/// Whether a line passes through an area. Source: Liang and Barsky (1984), parametric clipping.
pub(super) fn crosses(area: &Area, from: Spot, to: Spot) -> bool {
    clipped(area, from, to).is_some()
}

/// The part of a line within an area.
pub(super) fn clipped(area: &Area, from: Spot, to: Spot) -> Option<[Spot; 2]> {
    let along = to - from;
    let (mut enters, mut leaves) = (0.0_f64, 1.0_f64);
    for (step, room) in [
        (-along.x, from.x - area.least.x),
        (along.x, area.most.x - from.x),
        (-along.y, from.y - area.least.y),
        (along.y, area.most.y - from.y),
    ] {
        if step == 0.0 {
            if room < 0.0 {
                return None;
            }
        } else if step < 0.0 {
            enters = enters.max(room / step);
        } else {
            leaves = leaves.min(room / step);
        }
    }
    (enters <= leaves).then(|| [from + along * enters, from + along * leaves])
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_line_is_clipped_to_its_part_within() {
        let area = Area::new(0.0, 0.0, 10.0, 10.0);
        let [from, to] = clipped(&area, Spot::new(-5.0, 5.0), Spot::new(15.0, 5.0)).unwrap();
        assert!((from - Spot::new(0.0, 5.0)).norm() < 1e-12 && (to - Spot::new(10.0, 5.0)).norm() < 1e-12);
        assert!(clipped(&area, Spot::new(-5.0, 0.0), Spot::new(0.0, 20.0)).is_none());
        assert!(clipped(&area, Spot::new(2.0, -1.0), Spot::new(2.0, -3.0)).is_none());
        assert!(crosses(&area, Spot::new(2.0, 2.0), Spot::new(3.0, 3.0)));
    }

    #[test]
    fn texts_keep_apart_until_there_is_no_room() {
        let mut space = Space::new(Area::new(0.0, 0.0, 120.0, 60.0));
        let (wish, size) = (Spot::new(60.0, 30.0), Spot::new(40.0, 12.0));
        let mut placed: Vec<Area> = Vec::new();
        while let Some((_, found)) = space.best(size, wish, 0.0, Spot::new(1.0, 0.0)) {
            space.take(found.area);
            assert!(placed.iter().all(|area| !area.overlaps(&found.area)));
            assert!(space.frame().holds(&found.area));
            placed.push(found.area);
            assert!(placed.len() < 20);
        }
        assert!(placed.len() >= 4, "{}", placed.len());
    }

    #[test]
    fn a_line_is_avoided_where_there_is_another_place() {
        let mut space = Space::new(Area::new(0.0, 0.0, 200.0, 200.0));
        space.take_line(Spot::new(100.0, 100.0), Spot::new(200.0, 100.0));
        let (_, found) =
            space.best(Spot::new(30.0, 10.0), Spot::new(100.0, 100.0), 0.0, Spot::new(1.0, 0.0)).unwrap();
        assert!(!crosses(&found.area, Spot::new(100.0, 100.0), Spot::new(200.0, 100.0)));
    }
}

//! One quantity along a variable: the pieces of its curve, broken where it jumps or has no value.

use super::super::canvas::Canvas;
use super::super::ink::Ink;
use super::plot::{Mark, Plot};
use crate::study::sweep::{Jump, Point, Sweep, Variable};

/// Most points that are marked one by one.
pub(super) const MOST_MARKED: usize = 80;

/// What is drawn of one quantity.
pub(super) struct Quantity<'s> {
    pub(super) sweep: &'s Sweep,
    pub(super) variable: &'s Variable,
    /// At a point, in the unit of the axis.
    pub(super) value: &'s dyn Fn(&Point) -> Option<f64>,
    /// Which jumps of the ultimate strength it follows.
    pub(super) follows: &'s dyn Fn(&Jump) -> bool,
    /// On both sides of a jump, in the unit of the axis; `None` where it is known at the points alone.
    pub(super) at_jump: &'s dyn Fn(&Jump, usize) -> Option<f64>,
    /// Whether a curve runs on between two neighbours.
    pub(super) joined: &'s dyn Fn(&Point, &Point) -> bool,
}

impl Quantity<'_> {
    /// Points with their value, by index.
    pub(super) fn points(&self) -> Vec<(usize, [f64; 2])> {
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
        self.sweep.jumps.iter().filter(|jump| (self.follows)(jump)).find(between)
    }

    fn runs_on(&self, one: usize, next: usize) -> bool {
        (self.joined)(&self.sweep.points[one], &self.sweep.points[next])
    }

    pub(super) fn draw(&self, canvas: &mut Canvas, plot: &Plot, ink: Ink, width: f64, mark: Option<Mark>) {
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

    pub(super) fn values(&self) -> Vec<f64> {
        let at_jumps =
            self.sweep.jumps.iter().flat_map(|jump| [(self.at_jump)(jump, 0), (self.at_jump)(jump, 1)]);
        self.points().iter().map(|(_, [_, value])| *value).chain(at_jumps.flatten()).collect()
    }

    /// Value at the right end.
    pub(super) fn last(&self) -> Option<f64> {
        let points = self.points();
        let right = points.iter().max_by(|(_, a), (_, b)| a[0].total_cmp(&b[0]));
        right.map(|(_, [_, value])| *value)
    }
}

/// Follows every jump.
pub(super) fn all(_: &Jump) -> bool {
    true
}

/// Follows no jump.
pub(super) fn none(_: &Jump) -> bool {
    false
}

/// Runs on between any neighbours.
pub(super) fn always(_: &Point, _: &Point) -> bool {
    true
}

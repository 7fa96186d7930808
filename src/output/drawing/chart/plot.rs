//! One plot: a frame, ticks, a grid, and curves that plotters draws into it.

use super::super::canvas::{Anchor, Area, Canvas, SMALL, Spot, Stroke, Text};
use super::super::font;
use super::super::ink::Ink;
use super::pen::{Pen, fine};
use crate::output::number::graded;
use plotters::chart::ChartBuilder;
use plotters::coord::ranged1d::{BoldPoints, Ranged};
use plotters::coord::types::RangedCoordf64;
use plotters::drawing::IntoDrawingArea;
use plotters::series::LineSeries;
use plotters::style::{Color, RGBColor};

/// Why plotters cannot fail here.
const PROOF: &str = "the page takes every line, and the part of it that a plot has is not shared";

/// Distance of the numbers below the frame: clear of the lowest number beside it, px.
const BELOW: f64 = 9.0;
/// Length of a tick outside the frame, px.
const TICK: f64 = 4.0;
/// The unit whose round numbers are parts of a turn.
const DEGREES: &str = "deg";
/// Its round steps.
const STEPS_IN_DEGREES: [f64; 9] = [2.0, 5.0, 10.0, 15.0, 30.0, 45.0, 90.0, 180.0, 360.0];
/// Most ticks along an axis.
const MOST_TICKS: usize = 9;

/// A plot on a page.
#[derive(Debug, Clone)]
pub(super) struct Plot {
    /// Where it stands.
    pub(super) area: Area,
    x: [f64; 2],
    y: [f64; 2],
    /// Whether the axes are in degrees.
    degrees: [bool; 2],
}

/// How points are marked.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Mark {
    /// A filled circle.
    Dot,
    /// An open circle.
    Ring,
    /// A filled square.
    Square,
}

impl Mark {
    /// Draws the mark.
    pub(super) fn draw(self, canvas: &mut Canvas, at: Spot, ink: Ink) {
        match self {
            Self::Dot => canvas.circle(at, 3.2, Some(ink), None),
            Self::Ring => canvas.circle(at, 3.4, Some(Ink::PAPER), Some(Stroke::solid(ink, 1.6))),
            Self::Square => canvas.area(&Area::around(at, Spot::new(6.0, 6.0)), Some(ink), None),
        }
    }
}

/// A range that is not empty.
pub(super) fn range(values: impl Iterator<Item = f64>) -> [f64; 2] {
    let (mut least, mut most) = (f64::INFINITY, f64::NEG_INFINITY);
    for value in values {
        (least, most) = (least.min(value), most.max(value));
    }
    if !(least.is_finite() && most.is_finite()) {
        return [0.0, 1.0];
    }
    let middle = 0.5 * (least + most);
    let least_width = 1e-6 * middle.abs().max(1e-9);
    if most - least < least_width { [middle - least_width, middle + least_width] } else { [least, most] }
}

/// Round numbers as text, with as many decimals as tell them apart.
pub(super) fn plain(ticks: &[f64]) -> Vec<String> {
    let step = match ticks {
        [first, second, ..] => second - first,
        [only] => *only,
        [] => 0.0,
    };
    graded(ticks, step)
}

/// Round numbers within a range, at most so many.
pub(super) fn ticks(range: [f64; 2], most: usize) -> Vec<f64> {
    let axis: RangedCoordf64 = (range[0]..range[1]).into();
    axis.key_points(BoldPoints(most))
}

/// Round numbers of degrees within a range, at most so many; those of other units where the range is small.
fn ticks_in_degrees([least, most]: [f64; 2], count: usize) -> Vec<f64> {
    let fits = |step: &&f64| (most - least) / **step + 1.0 <= super::super::count::as_float(count);
    let step = STEPS_IN_DEGREES.iter().find(fits).filter(|step| most - least >= 2.0 * **step);
    let Some(step) = step else { return ticks([least, most], count) };
    let mut found = Vec::new();
    // The range is a fair part of the step at least, so the ticks are few.
    let mut tick = (least / step - 1e-9).ceil() * step;
    while tick <= most + 1e-9 * step {
        found.push(tick + 0.0);
        tick += step;
    }
    found
}

impl Plot {
    pub(super) fn new(area: Area, x: [f64; 2], y: [f64; 2]) -> Self {
        Self { area, x, y, degrees: [false, false] }
    }

    /// The same with ticks that suit degrees along the axes that have this unit.
    pub(super) fn in_units(self, x: &str, y: &str) -> Self {
        Self { degrees: [x, y].map(|unit| unit == DEGREES), ..self }
    }

    /// Where a point of the plot is on the page.
    pub(super) fn spot(&self, x: f64, y: f64) -> Spot {
        let share = |value: f64, [least, most]: [f64; 2]| (value - least) / (most - least);
        let size = self.area.size();
        let (x, y) = (share(x, self.x), share(y, self.y));
        Spot::new(self.area.least.x + x * size.x, self.area.most.y - y * size.y)
    }

    /// Draws the grid, the numbers and the titles; the numbers of the x axis only with a title below.
    pub(super) fn axes(&self, canvas: &mut Canvas, x_title: Option<&str>, y_title: &str) {
        let size = self.area.size();
        self.numbers(canvas, x_title.is_some(), Stroke::solid(Ink::HAIR, 0.8), [size.x, -size.y]);
        self.frame(canvas);
        self.titles(canvas, x_title, y_title);
    }

    /// Draws numbers, the titles of x, y and the whole, and the frame on a map that fills the plot; the title of the y
    /// axis stands upright beside it.
    pub(super) fn axes_over(&self, canvas: &mut Canvas, titles: &[String; 3]) {
        let [x_title, y_title, title] = titles;
        self.numbers(canvas, true, Stroke::solid(Ink::QUIET, 1.0), [-TICK, TICK]);
        self.frame(canvas);
        self.titles(canvas, Some(x_title), title);
        let y_title = font::clipped(y_title, SMALL, self.area.size().y);
        let at = Spot::new(self.area.least.x - 52.0, self.area.middle().y);
        canvas.text(&Text { size: SMALL, anchor: Anchor::Middle, upward: true, ..Text::new(&y_title, at) });
    }

    /// Draws a line at every tick, as far along the page's x and y as `reach` says, and the numbers.
    fn numbers(&self, canvas: &mut Canvas, with_x: bool, stroke: Stroke, reach: [f64; 2]) {
        let found = self.x_ticks();
        for (value, words) in found.iter().zip(plain(&found)) {
            let at = self.spot(*value, self.y[0]);
            canvas.line(at, at + Spot::new(0.0, reach[1]), stroke);
            if with_x {
                number(canvas, &words, at + Spot::new(0.0, BELOW + font::ASCENT * SMALL), Anchor::Middle);
            }
        }
        let found = self.y_ticks();
        for (value, words) in found.iter().zip(plain(&found)) {
            let at = self.spot(self.x[0], *value);
            canvas.line(at, at + Spot::new(reach[0], 0.0), stroke);
            number(canvas, &words, at + Spot::new(-8.0, 0.5 * font::CAPITALS * SMALL), Anchor::End);
        }
    }

    /// Draws the outline.
    fn frame(&self, canvas: &mut Canvas) {
        canvas.area(&self.area, None, Some(Stroke::solid(Ink::QUIET, 1.0)));
    }

    fn titles(&self, canvas: &mut Canvas, x_title: Option<&str>, y_title: &str) {
        let above = Spot::new(self.area.least.x, self.area.least.y - 9.0);
        let room = self.area.size().x;
        let y_title = font::clipped(y_title, SMALL, room);
        canvas.text(&Text { size: SMALL, ..Text::new(&y_title, above) });
        if let Some(title) = x_title {
            let title = font::clipped(title, SMALL, room);
            let below = Spot::new(self.area.middle().x, self.area.most.y + 10.0 + 2.35 * SMALL);
            canvas.text(&Text { size: SMALL, anchor: Anchor::Middle, ..Text::new(&title, below) });
        }
    }

    fn ticks(&self, axis: usize, most: usize) -> Vec<f64> {
        let range = if axis == 0 { self.x } else { self.y };
        if self.degrees[axis] { ticks_in_degrees(range, most) } else { ticks(range, most) }
    }

    /// Ticks whose numbers stand clear of each other.
    fn x_ticks(&self) -> Vec<f64> {
        let mut most = MOST_TICKS;
        loop {
            let found = self.ticks(0, most);
            let widest = plain(&found).iter().map(|words| font::width(words, SMALL)).fold(0.0, f64::max);
            let apart = match found.as_slice() {
                [first, second, ..] => (self.spot(*second, 0.0) - self.spot(*first, 0.0)).x.abs(),
                _ => f64::INFINITY,
            };
            if widest + 12.0 <= apart || most <= 2 {
                return found;
            }
            most -= 1;
        }
    }

    fn y_ticks(&self) -> Vec<f64> {
        let room = self.area.size().y / (1.9 * SMALL);
        let mut most = MOST_TICKS;
        while super::super::count::as_float(most) > room && most > 2 {
            most -= 1;
        }
        self.ticks(1, most)
    }

    /// Draws a curve through points.
    pub(super) fn curve(&self, canvas: &mut Canvas, points: &[[f64; 2]], ink: Ink, width: f64) {
        let root = Pen::new(canvas, self.area).into_drawing_area();
        let mut chart = ChartBuilder::on(&root)
            .build_cartesian_2d(self.x[0]..self.x[1], self.y[0]..self.y[1])
            .expect(PROOF);
        let [r, g, b] = ink.0;
        let style = RGBColor(r, g, b).stroke_width(fine(width));
        let places = points.iter().map(|[x, y]| (*x, *y));
        chart.draw_series(LineSeries::new(places, style)).expect(PROOF);
    }

    /// Marks points.
    pub(super) fn marks(&self, canvas: &mut Canvas, points: &[[f64; 2]], mark: Mark, ink: Ink) {
        for [x, y] in points {
            mark.draw(canvas, self.spot(*x, *y), ink);
        }
    }
}

/// A number at a tick.
fn number(canvas: &mut Canvas, words: &str, at: Spot, anchor: Anchor) {
    canvas.text(&Text { size: SMALL, ink: Ink::QUIET, anchor, ..Text::new(words, at) });
}

#[cfg(test)]
#[allow(clippy::float_cmp)] // round numbers are meant exactly
mod tests {
    use super::*;

    #[test]
    fn a_curve_goes_through_its_points() {
        let mut canvas = Canvas::new(200.0, 200.0);
        let plot = Plot::new(Area::new(20.0, 20.0, 180.0, 120.0), [0.0, 10.0], [0.0, 5.0]);
        plot.curve(&mut canvas, &[[0.0, 0.0], [5.0, 2.5], [10.0, 5.0]], Ink::ULTIMATE, 2.0);
        let drawing = canvas.finish("", "");
        let data = drawing.split("<path d=\"M").nth(1).and_then(|rest| rest.split('"').next()).unwrap();
        let numbers: Vec<f64> = data.split([' ', 'L']).map(|number| number.parse().unwrap()).collect();
        for (found, expected) in numbers.iter().zip([20.0, 120.0, 100.0, 70.0, 180.0, 20.0]) {
            // One px of plotters.
            assert!((found - expected).abs() <= 0.13, "{data}");
        }
        assert!((plot.spot(5.0, 2.5) - Spot::new(100.0, 70.0)).norm() < 1e-12);
        assert!(drawing.contains("stroke=\"#163f73\" stroke-width=\"2\""), "{drawing}");
    }

    #[test]
    fn ticks_are_round_numbers_within_the_range() {
        for range in [[0.0, 1.0], [-37.0, 1200.0], [0.000_31, 0.000_34], [1e9, 1.7e9]] {
            let found = ticks(range, 8);
            assert!((2..=8).contains(&found.len()), "{range:?}: {found:?}");
            assert!(found.iter().all(|tick| *tick >= range[0] && *tick <= range[1]));
        }
    }

    #[test]
    fn degrees_are_told_in_parts_of_a_turn() {
        assert_eq!(
            ticks_in_degrees([-180.0, 180.0], 9),
            [-180.0, -135.0, -90.0, -45.0, 0.0, 45.0, 90.0, 135.0, 180.0]
        );
        assert_eq!(ticks_in_degrees([-10.0, 80.0], 9), [0.0, 15.0, 30.0, 45.0, 60.0, 75.0]);
        assert!(ticks_in_degrees([60.0, 62.0], 9).len() > 2);
        assert!(ticks_in_degrees([0.0, 36_000.0], 9).len() <= 9);
    }

    #[test]
    fn an_empty_range_is_widened() {
        let [least, most] = range([3.0, 3.0].into_iter());
        assert!(least < 3.0 && most > 3.0);
        assert_eq!(range(std::iter::empty()), [0.0, 1.0]);
    }
}

//! The panel beside a drawing: a column of headings, sentences and symbols, written from top to bottom.

use super::canvas::{Area, BODY, Canvas, SMALL, Spot, Stroke, Text};
use super::count::as_float;
use super::font;
use super::ink::Ink;

/// Distance of rows, px.
pub(super) const ROW: f64 = 22.0;
/// Height of a heading of one line, px.
pub(super) const HEADING: f64 = BODY + 22.0;

/// Margin within the panel, px.
const MARGIN: f64 = 16.0;

/// Writes from top to bottom.
pub(super) struct Column<'c> {
    pub(super) canvas: &'c mut Canvas,
    pub(super) left: f64,
    pub(super) right: f64,
    /// Where the next thing begins.
    pub(super) y: f64,
    pub(super) bottom: f64,
    /// Room after a sentence, px.
    gap: f64,
}

impl<'c> Column<'c> {
    /// The column of a panel, whose ground it draws.
    pub(super) fn new(canvas: &'c mut Canvas, panel: &Area, gap: f64) -> Self {
        canvas.area(panel, Some(Ink::WASH), None);
        let (left, right) = (panel.least.x + MARGIN, panel.most.x - MARGIN);
        Self { canvas, left, right, y: panel.least.y + 2.0, bottom: panel.most.y - 6.0, gap }
    }

    pub(super) fn room(&self) -> f64 {
        self.right - self.left
    }

    /// A heading of up to two lines.
    pub(super) fn heading(&mut self, words: &str) {
        self.y += 10.0;
        let mut lines = font::lines(words, BODY, self.room());
        if lines.len() > 2 {
            lines.truncate(1);
            let rest =
                words.split_whitespace().skip(lines[0].split(' ').count()).collect::<Vec<_>>().join(" ");
            lines.push(font::clipped(&rest, BODY, self.room()));
        }
        self.canvas.lines(&lines, Spot::new(self.left, self.y + BODY), BODY, Ink::TEXT);
        self.y += font::LEADING * BODY * (as_float(lines.len()) - 1.0) + BODY + 7.0;
        self.canvas.line(
            Spot::new(self.left, self.y),
            Spot::new(self.right, self.y),
            Stroke::solid(Ink::HAIR, 1.0),
        );
        self.y += 5.0;
    }

    /// A sentence in small letters, whole or not at all; whether there was room.
    pub(super) fn sentence(&mut self, words: &str, ink: Ink) -> bool {
        self.sentence_above(words, ink, 0.0)
    }

    /// Sentences as far as there is room; then how many are left out, with `where_else` they stand.
    pub(super) fn sentences(&mut self, sentences: &[String], where_else: &str) {
        for (index, sentence) in sentences.iter().enumerate() {
            let left_over = sentences.len() - index;
            // A line stays free for what is left over.
            let free = if left_over == 1 { 0.0 } else { font::LEADING * SMALL };
            if !self.sentence_above(sentence, Ink::TEXT, free) {
                self.sentence(&format!("and {left_over} more{where_else}"), Ink::QUIET);
                break;
            }
        }
    }

    /// The same where so much room must stay free below.
    fn sentence_above(&mut self, words: &str, ink: Ink, free: f64) -> bool {
        let lines = font::lines(words, SMALL, self.room());
        let height = font::LEADING * SMALL * as_float(lines.len());
        if self.y + height + free > self.bottom {
            return false;
        }
        self.canvas.lines(&lines, Spot::new(self.left, self.y + SMALL), SMALL, ink);
        self.y += height + self.gap;
        true
    }

    /// One line in small letters, cut where it is too long.
    pub(super) fn line(&mut self, words: &str, ink: Ink) {
        let words = font::clipped(words, SMALL, self.room());
        self.sentence(&words, ink);
    }

    /// A symbol with its meaning, and where it stands.
    pub(super) fn key(&mut self, words: &str, place: Option<&str>, symbol: impl FnOnce(&mut Canvas, Spot)) {
        let middle = self.y + 0.5 * ROW;
        symbol(self.canvas, Spot::new(self.left + 24.0, middle));
        let at = Spot::new(self.left + 58.0, middle + 0.5 * font::CAPITALS * SMALL);
        let room = self.right - at.x;
        let words = font::clipped(words, SMALL, room);
        self.canvas.text(&Text { size: SMALL, ..Text::new(&words, at) });
        self.y += ROW;
        if let Some(place) = place {
            let place = font::clipped(place, SMALL, room);
            let at = at + Spot::new(0.0, 1.25 * SMALL);
            self.canvas.text(&Text { size: SMALL, ink: Ink::QUIET, ..Text::new(&place, at) });
            self.y += 1.25 * SMALL;
        }
    }
}

//! A page on which lines, areas and texts are put: it becomes an SVG document.
//!
//! x points right, y down, lengths are in px. Coordinates are rounded to hundredths in `number.rs`.
//! Source: Scalable Vector Graphics (SVG) 1.1, W3C Recommendation 2011; `paint-order` is from SVG 2.

use super::font;
use super::ink::Ink;
use crate::output::number::coordinate;
use nalgebra::Vector2;
use std::fmt::Write;

/// A place on the page, px.
pub(super) type Spot = Vector2<f64>;

/// A rectangle parallel to the page.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Area {
    /// Upper left corner.
    pub(super) least: Spot,
    /// Lower right corner.
    pub(super) most: Spot,
}

impl Area {
    /// From its corners' coordinates.
    pub(super) fn new(left: f64, top: f64, right: f64, bottom: f64) -> Self {
        Self { least: Spot::new(left, top), most: Spot::new(right, bottom) }
    }

    /// Of this size around a middle.
    pub(super) fn around(middle: Spot, size: Spot) -> Self {
        Self { least: middle - size / 2.0, most: middle + size / 2.0 }
    }

    /// Width and height.
    pub(super) fn size(&self) -> Spot {
        self.most - self.least
    }

    /// The middle.
    pub(super) fn middle(&self) -> Spot {
        (self.least + self.most) / 2.0
    }

    /// Grown by a margin on all sides.
    pub(super) fn grown(&self, margin: f64) -> Self {
        let margin = Spot::new(margin, margin);
        Self { least: self.least - margin, most: self.most + margin }
    }

    /// Whether two areas share more than an edge.
    pub(super) fn overlaps(&self, other: &Self) -> bool {
        self.least.x < other.most.x
            && other.least.x < self.most.x
            && self.least.y < other.most.y
            && other.least.y < self.most.y
    }

    /// Whether it holds another.
    pub(super) fn holds(&self, other: &Self) -> bool {
        self.contains(other.least) && self.contains(other.most)
    }

    /// Whether it holds a point.
    pub(super) fn contains(&self, spot: Spot) -> bool {
        (self.least.x..=self.most.x).contains(&spot.x) && (self.least.y..=self.most.y).contains(&spot.y)
    }
}

/// How a line is drawn.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Stroke {
    pub(super) ink: Ink,
    pub(super) width: f64,
    /// Lengths of dash and gap.
    pub(super) dash: Option<[f64; 2]>,
}

impl Stroke {
    /// An unbroken line.
    pub(super) fn solid(ink: Ink, width: f64) -> Self {
        Self { ink, width, dash: None }
    }

    /// A broken line.
    pub(super) fn dashed(ink: Ink, width: f64, dash: f64, gap: f64) -> Self {
        Self { ink, width, dash: Some([dash, gap]) }
    }
}

/// Where the place of a text is on its line.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Anchor {
    Start,
    Middle,
    End,
}

/// A line of text.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Text<'t> {
    pub(super) words: &'t str,
    /// Where its baseline begins, is halved or ends.
    pub(super) at: Spot,
    pub(super) size: f64,
    pub(super) ink: Ink,
    pub(super) anchor: Anchor,
    /// Turned to read upward.
    pub(super) upward: bool,
    /// Set off from what lies behind it.
    pub(super) halo: bool,
}

impl<'t> Text<'t> {
    /// A text in the usual size and colour.
    pub(super) fn new(words: &'t str, at: Spot) -> Self {
        Self { words, at, size: BODY, ink: Ink::TEXT, anchor: Anchor::Start, upward: false, halo: false }
    }

    /// The box it fills.
    pub(super) fn area(&self) -> Area {
        let width = font::width(self.words, self.size);
        let before = match self.anchor {
            Anchor::Start => 0.0,
            Anchor::Middle => width / 2.0,
            Anchor::End => width,
        };
        let (up, down) = (font::ASCENT * self.size, font::DESCENT * self.size);
        let (x, y) = (self.at.x, self.at.y);
        if self.upward {
            Area::new(x - up, y - (width - before), x + down, y + before)
        } else {
            Area::new(x - before, y - up, x + (width - before), y + down)
        }
    }
}

/// Usual size of texts.
pub(super) const BODY: f64 = 15.0;
/// Size of secondary texts: the smallest of all.
pub(super) const SMALL: f64 = 13.5;

/// The page.
#[derive(Debug, Clone)]
pub(super) struct Canvas {
    size: Spot,
    body: String,
}

impl Canvas {
    /// An empty page.
    pub(super) fn new(width: f64, height: f64) -> Self {
        Self { size: Spot::new(width, height), body: String::new() }
    }

    /// The whole page.
    pub(super) fn page(&self) -> Area {
        Area { least: Spot::zeros(), most: self.size }
    }

    fn put(&mut self, element: std::fmt::Arguments<'_>) {
        // Writing to a text cannot fail.
        let _ = self.body.write_fmt(element);
        self.body.push('\n');
    }

    /// A line between two points.
    pub(super) fn line(&mut self, from: Spot, to: Spot, stroke: Stroke) {
        self.path(&format!("M{}L{}", spot(from), spot(to)), None, Some(stroke));
    }

    /// A line through points.
    pub(super) fn polyline(&mut self, points: &[Spot], stroke: Stroke) {
        self.path(&outline(points, false), None, Some(stroke));
    }

    /// A filled area.
    pub(super) fn polygon(&mut self, points: &[Spot], fill: Option<Ink>, stroke: Option<Stroke>) {
        self.path(&outline(points, true), fill, stroke);
    }

    /// A rectangle.
    pub(super) fn area(&mut self, area: &Area, fill: Option<Ink>, stroke: Option<Stroke>) {
        let Area { least, most } = area;
        let corners = [*least, Spot::new(most.x, least.y), *most, Spot::new(least.x, most.y)];
        self.polygon(&corners, fill, stroke);
    }

    /// A circle.
    pub(super) fn circle(&mut self, middle: Spot, radius: f64, fill: Option<Ink>, stroke: Option<Stroke>) {
        let (x, y, r) = (coordinate(middle.x), coordinate(middle.y), coordinate(radius));
        self.put(format_args!("<circle cx=\"{x}\" cy=\"{y}\" r=\"{r}\"{}/>", paint(fill, stroke)));
    }

    /// A path in the language of SVG.
    pub(super) fn path(&mut self, data: &str, fill: Option<Ink>, stroke: Option<Stroke>) {
        self.put(format_args!("<path d=\"{data}\"{}/>", paint(fill, stroke)));
    }

    /// A text.
    pub(super) fn text(&mut self, text: &Text<'_>) {
        if text.words.is_empty() {
            return;
        }
        let (x, y) = (coordinate(text.at.x), coordinate(text.at.y));
        let anchor = match text.anchor {
            Anchor::Start => "",
            Anchor::Middle => " text-anchor=\"middle\"",
            Anchor::End => " text-anchor=\"end\"",
        };
        let place = if text.upward {
            format!("transform=\"translate({x} {y}) rotate(-90)\"")
        } else {
            format!("x=\"{x}\" y=\"{y}\"")
        };
        let halo = if text.halo {
            " stroke=\"#ffffff\" stroke-width=\"4\" stroke-linejoin=\"round\" paint-order=\"stroke\""
        } else {
            ""
        };
        let (size, length) = (coordinate(text.size), coordinate(font::width(text.words, text.size)));
        let fill = text.ink.hex();
        self.put(format_args!(
            "<text {place} font-size=\"{size}\" textLength=\"{length}\" lengthAdjust=\"spacingAndGlyphs\"\
             {anchor}{halo} fill=\"{fill}\">{}</text>",
            escaped(text.words)
        ));
    }

    /// Lines below each other, the first with its baseline at `at`; the baseline after the last.
    pub(super) fn lines(&mut self, lines: &[String], at: Spot, size: f64, ink: Ink) -> f64 {
        let mut y = at.y;
        for line in lines {
            self.text(&Text { size, ink, ..Text::new(line, Spot::new(at.x, y)) });
            y += font::LEADING * size;
        }
        y
    }

    /// The document; `title` and `description` are for readers who do not see it.
    pub(super) fn finish(&self, title: &str, description: &str) -> String {
        let (width, height) = (coordinate(self.size.x), coordinate(self.size.y));
        format!(
            "<svg xmlns=\"http://www.w3.org/2000/svg\" viewBox=\"0 0 {width} {height}\" width=\"{width}\" \
             height=\"{height}\" role=\"img\" xml:space=\"preserve\" font-family=\"{}\">\n<title>{}</title>\n<desc>{}</desc>\n\
             <rect width=\"{width}\" height=\"{height}\" fill=\"#ffffff\"/>\n{}</svg>\n",
            font::FAMILY,
            escaped(title),
            escaped(description),
            self.body
        )
    }
}

/// The coordinates of a point in path data.
pub(super) fn spot(spot: Spot) -> String {
    format!("{} {}", coordinate(spot.x), coordinate(spot.y))
}

/// Path data of a line through points.
pub(super) fn outline(points: &[Spot], closed: bool) -> String {
    let mut data = String::new();
    for (index, point) in points.iter().enumerate() {
        data.push(if index == 0 { 'M' } else { 'L' });
        data.push_str(&spot(*point));
    }
    if closed {
        data.push('Z');
    }
    data
}

fn paint(fill: Option<Ink>, stroke: Option<Stroke>) -> String {
    let mut attributes = match fill {
        Some(ink) => format!(" fill=\"{}\"", ink.hex()),
        None => " fill=\"none\"".to_owned(),
    };
    if let Some(Stroke { ink, width, dash }) = stroke {
        let _ = write!(attributes, " stroke=\"{}\" stroke-width=\"{}\"", ink.hex(), coordinate(width));
        if let Some([dash, gap]) = dash {
            let _ = write!(attributes, " stroke-dasharray=\"{} {}\"", coordinate(dash), coordinate(gap));
        }
    }
    attributes
}

/// Text as XML holds it; characters that XML 1.0 forbids become the replacement character.
fn escaped(text: &str) -> String {
    let mut escaped = String::with_capacity(text.len());
    for letter in text.chars() {
        match letter {
            '&' => escaped.push_str("&amp;"),
            '<' => escaped.push_str("&lt;"),
            '>' => escaped.push_str("&gt;"),
            '"' => escaped.push_str("&quot;"),
            '\n' | '\t' | '\r' => escaped.push(' '),
            control if control.is_control() || matches!(control, '\u{fffe}' | '\u{ffff}') => {
                escaped.push('\u{fffd}');
            }
            other => escaped.push(other),
        }
    }
    escaped
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_page_is_a_document() {
        let mut canvas = Canvas::new(100.0, 50.0);
        canvas.line(Spot::new(0.0, 1.0), Spot::new(10.006, -0.001), Stroke::dashed(Ink::TEXT, 1.5, 4.0, 2.0));
        canvas
            .text(&Text { anchor: Anchor::Middle, ..Text::new("a < b & \"c\"\u{7}", Spot::new(50.0, 20.0)) });
        let document = canvas.finish("T", "D");
        assert!(document.contains("<path d=\"M0 1L10.01 0\" fill=\"none\" stroke=\"#1b222c\""), "{document}");
        assert!(document.contains("stroke-dasharray=\"4 2\""));
        assert!(document.contains(">a &lt; b &amp; &quot;c&quot;\u{fffd}</text>"));
        assert!(document.starts_with("<svg ") && document.ends_with("</svg>\n"));
    }

    #[test]
    fn the_box_of_a_text_turns_with_it() {
        let at = Spot::new(10.0, 40.0);
        let level = Text { anchor: Anchor::End, ..Text::new("12", at) };
        let upward = Text { upward: true, ..level.clone() };
        let width = font::width("12", BODY);
        assert!((level.area().least.x - (10.0 - width)).abs() < 1e-9);
        assert!((upward.area().size().y - width).abs() < 1e-9);
        assert!((upward.area().most.y - (40.0 + width)).abs() < 1e-9);
    }

    #[test]
    fn areas_that_touch_do_not_overlap() {
        let area = Area::new(0.0, 0.0, 10.0, 10.0);
        assert!(!area.overlaps(&Area::new(10.0, 0.0, 20.0, 10.0)));
        assert!(area.overlaps(&Area::new(9.9, 9.9, 20.0, 20.0)));
        assert!(area.holds(&Area::new(1.0, 1.0, 10.0, 10.0)) && !area.holds(&area.grown(1.0)));
    }
}

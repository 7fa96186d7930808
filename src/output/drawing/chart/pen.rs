//! The page as a drawing backend of plotters.
//!
//! plotters works in whole px; here one px of the page is [`FINE`] of its px, so that no curve shows steps.

use super::super::canvas::{Anchor, Area, Canvas, Spot, Stroke, Text};
use super::super::font;
use super::super::ink::Ink;
use plotters_backend::text_anchor::{HPos, VPos};
use plotters_backend::{
    BackendColor, BackendCoord, BackendStyle, BackendTextStyle, DrawingBackend, DrawingErrorKind,
};
use std::convert::Infallible;

/// px of plotters to the px of the page.
const FINE: f64 = 16.0;

type Drawn = Result<(), DrawingErrorKind<Infallible>>;

/// Draws on a part of a page.
pub(super) struct Pen<'c> {
    canvas: &'c mut Canvas,
    area: Area,
}

impl<'c> Pen<'c> {
    pub(super) fn new(canvas: &'c mut Canvas, area: Area) -> Self {
        Self { canvas, area }
    }

    fn spot(&self, (x, y): BackendCoord) -> Spot {
        self.area.least + Spot::new(f64::from(x), f64::from(y)) / FINE
    }
}

/// A length of the page in the px of plotters.
pub(super) fn fine(length: f64) -> u32 {
    // Lengths on a page are positive and below 2^20.
    #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)]
    let fine = (length * FINE).round().clamp(0.0, 1e6) as u32;
    fine
}

fn ink(colour: BackendColor) -> Ink {
    let (r, g, b) = colour.rgb;
    Ink([r, g, b])
}

fn stroke<S: BackendStyle>(style: &S) -> Stroke {
    Stroke::solid(ink(style.color()), f64::from(style.stroke_width()) / FINE)
}

fn paints<S: BackendStyle>(style: &S, fill: bool) -> (Option<Ink>, Option<Stroke>) {
    if fill { (Some(ink(style.color())), None) } else { (None, Some(stroke(style))) }
}

impl DrawingBackend for Pen<'_> {
    type ErrorType = Infallible;

    fn get_size(&self) -> (u32, u32) {
        let size = self.area.size();
        (fine(size.x), fine(size.y))
    }

    fn ensure_prepared(&mut self) -> Drawn {
        Ok(())
    }

    fn present(&mut self) -> Drawn {
        Ok(())
    }

    fn draw_pixel(&mut self, point: BackendCoord, colour: BackendColor) -> Drawn {
        self.canvas.circle(self.spot(point), 0.5 / FINE, Some(ink(colour)), None);
        Ok(())
    }

    fn draw_line<S: BackendStyle>(&mut self, from: BackendCoord, to: BackendCoord, style: &S) -> Drawn {
        self.canvas.line(self.spot(from), self.spot(to), stroke(style));
        Ok(())
    }

    fn draw_rect<S: BackendStyle>(
        &mut self,
        upper_left: BackendCoord,
        lower_right: BackendCoord,
        style: &S,
        fill: bool,
    ) -> Drawn {
        let area = Area { least: self.spot(upper_left), most: self.spot(lower_right) };
        let (fill, stroke) = paints(style, fill);
        self.canvas.area(&area, fill, stroke);
        Ok(())
    }

    fn draw_path<S: BackendStyle, I: IntoIterator<Item = BackendCoord>>(
        &mut self,
        path: I,
        style: &S,
    ) -> Drawn {
        let points: Vec<Spot> = path.into_iter().map(|point| self.spot(point)).collect();
        if points.len() > 1 {
            self.canvas.polyline(&points, stroke(style));
        }
        Ok(())
    }

    fn draw_circle<S: BackendStyle>(
        &mut self,
        middle: BackendCoord,
        radius: u32,
        style: &S,
        fill: bool,
    ) -> Drawn {
        let (fill, stroke) = paints(style, fill);
        self.canvas.circle(self.spot(middle), f64::from(radius) / FINE, fill, stroke);
        Ok(())
    }

    fn fill_polygon<S: BackendStyle, I: IntoIterator<Item = BackendCoord>>(
        &mut self,
        corners: I,
        style: &S,
    ) -> Drawn {
        let points: Vec<Spot> = corners.into_iter().map(|point| self.spot(point)).collect();
        self.canvas.polygon(&points, Some(ink(style.color())), None);
        Ok(())
    }

    fn draw_text<T: BackendTextStyle>(&mut self, words: &str, style: &T, at: BackendCoord) -> Drawn {
        let size = style.size() / FINE;
        let down = match style.anchor().v_pos {
            VPos::Top => font::ASCENT * size,
            VPos::Center => 0.5 * font::CAPITALS * size,
            VPos::Bottom => -font::DESCENT * size,
        };
        let anchor = match style.anchor().h_pos {
            HPos::Left => Anchor::Start,
            HPos::Center => Anchor::Middle,
            HPos::Right => Anchor::End,
        };
        let at = self.spot(at) + Spot::new(0.0, down);
        self.canvas.text(&Text { size, anchor, ink: ink(style.color()), ..Text::new(words, at) });
        Ok(())
    }

    fn estimate_text_size<T: BackendTextStyle>(
        &self,
        words: &str,
        style: &T,
    ) -> Result<(u32, u32), DrawingErrorKind<Infallible>> {
        let size = style.size() / FINE;
        Ok((fine(font::width(words, size)), fine((font::ASCENT + font::DESCENT) * size)))
    }
}

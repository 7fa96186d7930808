//! A drawing as PNG: the SVG itself, rasterised with the embedded font.
//!
//! One px of the drawing becomes [`SCALE`] dots, enough for print at the size of a page.

use super::font;
use resvg::tiny_skia::{Pixmap, Transform};
use resvg::usvg::{Options, Tree};
use std::sync::Arc;
use thiserror::Error;

/// Dots to the px.
const SCALE: f32 = 2.0;

/// Why a drawing could not be rasterised.
#[derive(Debug, Clone, PartialEq, Eq, Error)]
pub enum PngError {
    /// The text is not a drawing.
    #[error("the drawing cannot be read: {0}")]
    NotADrawing(String),
    /// The picture is too large for memory.
    #[error("the picture is too large")]
    TooLarge,
    /// The picture cannot be encoded.
    #[error("the picture cannot be encoded: {0}")]
    Encoding(String),
}

/// The PNG file of a drawing made by this module.
///
/// # Errors
/// A text that is no SVG, or a picture that cannot be held or encoded.
pub fn png(svg: &str) -> Result<Vec<u8>, PngError> {
    let mut options = Options::default();
    Arc::make_mut(&mut options.fontdb).load_font_data(font::FONT.to_vec());
    let tree = Tree::from_str(svg, &options).map_err(|error| PngError::NotADrawing(error.to_string()))?;
    let size = tree.size().to_int_size().scale_by(SCALE).ok_or(PngError::TooLarge)?;
    let mut pixmap = Pixmap::new(size.width(), size.height()).ok_or(PngError::TooLarge)?;
    resvg::render(&tree, Transform::from_scale(SCALE, SCALE), &mut pixmap.as_mut());
    pixmap.encode_png().map_err(|error| PngError::Encoding(error.to_string()))
}

#[cfg(test)]
mod tests {
    use super::super::canvas::{Canvas, Spot, Text};
    use super::*;

    #[test]
    fn a_text_leaves_dots_on_the_picture() {
        let blank = png(&Canvas::new(60.0, 40.0).finish("", "")).unwrap();
        let mut canvas = Canvas::new(60.0, 40.0);
        canvas.text(&Text::new("kN", Spot::new(10.0, 30.0)));
        let written = png(&canvas.finish("", "")).unwrap();
        let dark = |file: &[u8]| {
            let picture = Pixmap::decode_png(file).unwrap();
            assert_eq!((picture.width(), picture.height()), (120, 80));
            picture.pixels().iter().filter(|dot| dot.red() < 100).count()
        };
        assert_eq!(dark(&blank), 0);
        assert!(dark(&written) > 50);
    }

    #[test]
    fn what_is_no_drawing_is_refused() {
        assert!(matches!(png("weld"), Err(PngError::NotADrawing(_))));
    }
}

//! The font of the drawings: the width of a text, and text broken to a width.
//!
//! Every text is measured with the font embedded here, whose advances add up without kerning. PNG files are
//! rendered with it; SVG files name it and fix the length of each text, so that a drawing keeps its spacing
//! where another font takes its place. A character without glyph counts as a full square.

use std::sync::OnceLock;
use ttf_parser::Face;

/// The font file: see `data/fonts/README.md` for its origin and licence.
pub(super) const FONT: &[u8] = include_bytes!("../../../data/fonts/NotoSans-Latin-Greek-Cyrillic.ttf");

/// The family asked for, and what stands in for it.
pub(super) const FAMILY: &str = "Noto Sans, Helvetica, Arial, sans-serif";

/// Height of capitals over the size of the text.
pub(super) const CAPITALS: f64 = 0.714;
/// Depth of descenders over the size of the text.
pub(super) const DESCENT: f64 = 0.24;
/// Height of the tallest usual letters over the size of the text.
pub(super) const ASCENT: f64 = 0.80;
/// Distance of lines over the size of the text.
pub(super) const LEADING: f64 = 1.35;

/// Advance over size for a character that the font does not have: a full square, as wide as any script needs.
const ADVANCE_OF_UNKNOWN: f64 = 1.0;

fn face() -> &'static Face<'static> {
    static FACE: OnceLock<Face<'static>> = OnceLock::new();
    FACE.get_or_init(|| Face::parse(FONT, 0).expect("the embedded font, read by the test `the_font_is_read`"))
}

/// Width of a text in px at a size in px.
pub(super) fn width(text: &str, size: f64) -> f64 {
    let face = face();
    let per_em = f64::from(face.units_per_em());
    text.chars().map(|letter| advance(face, per_em, letter)).sum::<f64>() * size
}

/// Advance of a letter over the size; a control character counts as the blank that it is written as.
fn advance(face: &Face<'_>, per_em: f64, letter: char) -> f64 {
    let letter = if letter.is_whitespace() { ' ' } else { letter };
    let glyph = face.glyph_index(letter).and_then(|glyph| face.glyph_hor_advance(glyph));
    glyph.map_or(ADVANCE_OF_UNKNOWN, |units| f64::from(units) / per_em)
}

/// Lines of a text no wider than `room` px; a word that is wider than that is cut with an ellipsis.
pub(super) fn lines(text: &str, size: f64, room: f64) -> Vec<String> {
    let mut lines = Vec::new();
    let mut line = String::new();
    let (mut used, blank) = (0.0, width(" ", size));
    for word in text.split_whitespace() {
        let own = width(word, size);
        if !line.is_empty() && used + blank + own <= room {
            line = line + " " + word;
            used += blank + own;
            continue;
        }
        if !line.is_empty() {
            lines.push(std::mem::take(&mut line));
        }
        line = clipped(word, size, room);
        used = own;
    }
    if !line.is_empty() {
        lines.push(line);
    }
    lines
}

/// A text cut to `room` px, with an ellipsis where something is left out.
pub(super) fn clipped(text: &str, size: f64, room: f64) -> String {
    if width(text, size) <= room {
        return text.to_owned();
    }
    let face = face();
    let per_em = f64::from(face.units_per_em());
    let room = room - width("…", size);
    let mut used = 0.0;
    let fits = |letter: &char| {
        used += advance(face, per_em, *letter) * size;
        used <= room
    };
    let kept: String = text.chars().take_while(fits).collect();
    kept.trim_end().to_owned() + "…"
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_font_is_read() {
        // Published: advances in the font's table `hmtx` (572 of 1000 for digits, 268 for the full stop), as fonttools
        // prints them.
        assert!((width("0123456789", 100.0) - 572.0).abs() < 1e-9);
        assert!((width("1.5", 10.0) - 14.12).abs() < 1e-9);
        for letter in "φΩθλ°±×·–…äßŁЖ".chars() {
            assert!(face().glyph_index(letter).is_some(), "{letter}");
        }
    }

    #[test]
    fn what_the_font_lacks_counts_as_a_square() {
        assert!((width("焊", 20.0) - 20.0).abs() < 1e-9);
    }

    #[test]
    fn lines_keep_within_their_room() {
        let text = "a force that misses the centroid of the welds turns the part about a centre";
        let broken = lines(text, 12.0, 150.0);
        assert!(broken.len() > 2 && broken.iter().all(|line| width(line, 12.0) <= 150.0));
        assert_eq!(broken.join(" "), text);
        let cut = lines("Donaudampfschifffahrtsgesellschaft", 12.0, 80.0);
        assert!(cut.len() == 1 && cut[0].ends_with('…') && width(&cut[0], 12.0) <= 80.0);
        assert!(lines("  ", 12.0, 80.0).is_empty());
    }
}

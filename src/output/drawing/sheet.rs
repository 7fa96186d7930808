//! What every page has in common: the verdict and the title above, the cautions below.

use super::canvas::{Anchor, Area, Canvas, SMALL, Spot, Stroke, Text};
use super::font;
use super::ink::Ink;
use crate::model::Joint;
use crate::output::layout::Emphasis;

/// Left and right margin, px.
pub(super) const MARGIN: f64 = 24.0;
/// Size of the title.
const TITLE: f64 = 21.0;

/// What the page leaves out, in one line.
const CAUTION: &str = "Static strength of fillet welds between rigid parts; no fatigue, fracture or seismic detailing. \
                       Supports, and does not replace, the judgement of a licensed engineer under the code in force.";

/// The verdict, the title, and a sentence that is cut where it is longer than the page.
pub(super) fn head(canvas: &mut Canvas, verdict: Option<(&str, Emphasis)>, title: &str, sentence: &str) {
    let page = canvas.page();
    let right = page.most.x - MARGIN;
    let mut left = MARGIN;
    if let Some((word, emphasis)) = verdict {
        let width = font::width(word, 17.0) + 28.0;
        let area = Area::new(MARGIN, 18.0, MARGIN + width, 48.0);
        canvas.area(&area, Some(ink(emphasis)), None);
        let at = Spot::new(area.middle().x, 39.2);
        canvas.text(&Text { size: 17.0, ink: Ink::PAPER, anchor: Anchor::Middle, ..Text::new(word, at) });
        left = area.most.x + 16.0;
    }
    let title = font::clipped(title, TITLE, right - left);
    canvas.text(&Text { size: TITLE, ..Text::new(&title, Spot::new(left, 40.6)) });
    let sentence = font::clipped(sentence, SMALL, right - MARGIN);
    canvas.text(&Text { size: SMALL, ..Text::new(&sentence, Spot::new(MARGIN, 72.0)) });
    canvas.line(Spot::new(MARGIN, 85.0), Spot::new(right, 85.0), Stroke::solid(Ink::TEXT, 1.4));
}

/// The cautions, and what the drawing belongs to.
pub(super) fn foot(canvas: &mut Canvas, joint: &Joint) {
    let page = canvas.page();
    let (left, right, y) = (MARGIN, page.most.x - MARGIN, page.most.y - 14.0);
    let above = y - font::LEADING * SMALL;
    canvas.line(Spot::new(left, above - 20.0), Spot::new(right, above - 20.0), Stroke::solid(Ink::HAIR, 1.0));
    let size = SMALL.min(SMALL * (right - left) / font::width(CAUTION, SMALL));
    canvas.text(&Text { size, ink: Ink::QUIET, ..Text::new(CAUTION, Spot::new(left, above)) });
    let origin = font::clipped(&origin(joint), SMALL, right - left);
    canvas.text(&Text { size: SMALL, ink: Ink::QUIET, ..Text::new(&origin, Spot::new(left, y)) });
}

/// The title block of the joint file, as far as it is given, the file and the program.
fn origin(joint: &Joint) -> String {
    let document = &joint.document;
    let given = [
        ("", &document.project),
        ("", &document.subject),
        ("by ", &document.author),
        ("checked by ", &document.checker),
        ("revision ", &document.revision),
        ("", &document.date),
    ];
    let mut parts: Vec<String> =
        given.iter().filter_map(|(what, words)| Some(format!("{what}{}", words.as_ref()?))).collect();
    parts.push(joint.file.clone());
    parts.push(format!("weldpole {}", env!("CARGO_PKG_VERSION")));
    parts.join("; ")
}

/// The colour of a verdict.
fn ink(emphasis: Emphasis) -> Ink {
    match emphasis {
        Emphasis::Satisfied => Ink::SATISFIED,
        Emphasis::Exceeded | Emphasis::Caution => Ink::EXCEEDED,
        Emphasis::NotSolved | Emphasis::Heading => Ink::QUIET,
    }
}

//! Everything that goes to standard error: faults with the line they concern, and short notices.

use super::source::Text;
use annotate_snippets::{AnnotationKind, Element, Group, Level, Origin, Renderer, Snippet};
use std::io::Write;
use weldpole::diagnostic::{Diagnostic, Severity};

/// Shows faults, each with the line of the text it concerns where `text` holds it.
pub(super) fn show(faults: &[Diagnostic], text: Option<&Text>, columns: usize) {
    for fault in faults {
        write(&rendered(fault, text, &Renderer::styled().term_width(columns)));
    }
}

/// Shows a fault that has no line of a text.
pub(super) fn refuse(fault: &Diagnostic, columns: usize) {
    show(std::slice::from_ref(fault), None, columns);
}

/// Shows one line.
pub(super) fn notice(line: &str) {
    write(line);
}

/// A standard error that cannot be written leaves nobody to tell.
fn write(block: &str) {
    let _ = writeln!(anstream::stderr().lock(), "{block}");
}

/// A fault as a block of lines.
fn rendered(fault: &Diagnostic, text: Option<&Text>, renderer: &Renderer) -> String {
    let level = match fault.severity {
        Severity::Fault => Level::ERROR,
        Severity::Caution => Level::WARNING,
    };
    let mut group =
        Group::with_title(level.primary_title(fault.message.as_str())).element(place(fault, text));
    if let Some(accepted) = &fault.accepted {
        group = group.element(Level::NOTE.with_name("accepted").message(accepted.as_str()));
    }
    if let Some(hint) = &fault.hint {
        group = group.element(Level::HELP.message(hint.as_str()));
    }
    renderer.render(&[group])
}

/// The line with a mark below it; the bare file, line and column where the text is not at hand.
fn place<'a>(fault: &'a Diagnostic, text: Option<&'a Text>) -> Element<'a> {
    let origin = Origin::path(fault.file.as_str());
    let Some(place) = &fault.place else { return origin.into() };
    let bare = || origin.clone().line(place.line).char_column(place.column).into();
    let Some(text) = text.filter(|text| text.name == fault.file) else { return bare() };
    let (contents, span) = (text.contents.as_str(), place.span.clone());
    // `get` refuses a span outside the text or across a character.
    if contents.is_empty() || contents.get(span.clone()).is_none() {
        return bare();
    }
    // The lines of the span alone: many faults in a long text must not cost their product.
    let first = contents[..span.start].rfind('\n').map_or(0, |newline| newline + 1);
    let last = contents[span.end..].find('\n').map_or(contents.len(), |newline| span.end + newline);
    let marked = AnnotationKind::Primary.span(span.start - first..span.end - first);
    Snippet::source(&contents[first..last])
        .line_start(place.line)
        .path(fault.file.as_str())
        .annotation(marked)
        .into()
}

#[cfg(test)]
mod tests {
    use super::*;
    use weldpole::diagnostic::Place;

    fn fault(span: std::ops::Range<usize>) -> Diagnostic {
        Diagnostic {
            severity: Severity::Fault,
            file: "bad.toml".to_owned(),
            place: Some(Place { span, line: 2, column: 1 }),
            message: "unknown key `leeg`".to_owned(),
            accepted: Some("leg, legs, throat".to_owned()),
            hint: Some("did you mean `leg`?".to_owned()),
        }
    }

    fn text(contents: &str) -> Text {
        Text { name: "bad.toml".to_owned(), contents: contents.to_owned() }
    }

    #[test]
    fn a_fault_shows_its_line_what_is_accepted_and_a_hint() {
        let text = text("[[weld]]\nleeg = 8\n");
        insta::assert_snapshot!(rendered(&fault(9..13), Some(&text), &Renderer::plain()));
    }

    #[test]
    fn a_span_that_does_not_fit_the_text_still_gives_a_message() {
        for (contents, span) in
            [("", 0..3), ("short", 3..99), ("\u{e9}\u{e9}", 1..2), ("a\n", 2..2), ("a\n", 1..2)]
        {
            let shown = rendered(&fault(span), Some(&text(contents)), &Renderer::plain());
            assert!(shown.contains("unknown key `leeg`") && shown.contains("bad.toml"), "{shown}");
        }
    }
}

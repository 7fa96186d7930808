//! The list of faults of one reading: every fault with its place, collected, never the first alone.
//!
//! A place is a byte span of the file; line and column (in characters) are counted here and nowhere else.
//! Faults of command-line overrides carry the name of the option in place of the file.

use crate::diagnostic::{Diagnostic, Place, Severity};
use std::ops::Range;

/// Byte range in the text of the file.
pub(super) type Span = Range<usize>;

/// Most faults listed in one run: more help nobody and would make a list without end of a damaged file.
const MOST: usize = 500;

/// Where a value came from.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(super) enum Origin {
    /// A span of the file.
    File(Span),
    /// An option of the command line.
    Option {
        /// The option, for example `--set`.
        name: &'static str,
        /// What followed it; empty when the message says it all.
        text: String,
    },
}

impl From<Span> for Origin {
    fn from(span: Span) -> Self {
        Self::File(span)
    }
}

impl From<&Span> for Origin {
    fn from(span: &Span) -> Self {
        Self::File(span.clone())
    }
}

impl From<&Origin> for Origin {
    fn from(origin: &Origin) -> Self {
        origin.clone()
    }
}

/// The faults found so far.
pub(super) struct Faults<'t> {
    file: &'t str,
    text: &'t str,
    line_starts: Vec<usize>,
    list: Vec<Diagnostic>,
}

/// A fault just reported, to be completed.
pub(super) struct Reported<'f>(Option<&'f mut Diagnostic>);

impl Reported<'_> {
    /// Says what is accepted.
    pub(super) fn accepted(self, text: impl Into<String>) -> Self {
        if let Self(Some(diagnostic)) = self {
            diagnostic.accepted = Some(text.into());
            return Self(Some(diagnostic));
        }
        self
    }

    /// Says what the user could do.
    pub(super) fn hint(self, text: impl Into<String>) -> Self {
        self.hint_if(Some(text.into()))
    }

    /// Says what the user could do, where something can be said.
    pub(super) fn hint_if(self, text: Option<String>) -> Self {
        if let Self(Some(diagnostic)) = self {
            if text.is_some() {
                diagnostic.hint = text;
            }
            return Self(Some(diagnostic));
        }
        self
    }
}

impl<'t> Faults<'t> {
    /// No faults yet, of this file and text.
    pub(super) fn new(file: &'t str, text: &'t str) -> Self {
        let ends = text.bytes().enumerate().filter(|(_, byte)| *byte == b'\n').map(|(at, _)| at + 1);
        Self { file, text, line_starts: std::iter::once(0).chain(ends).collect(), list: Vec::new() }
    }

    /// Reports a fault at a place.
    pub(super) fn at(&mut self, origin: impl Into<Origin>, message: impl Into<String>) -> Reported<'_> {
        if self.list.len() >= MOST {
            return Reported(None);
        }
        let message = message.into();
        match origin.into() {
            Origin::File(span) => {
                let place = self.place(&span);
                self.push(self.file.to_owned(), Some(place), message)
            }
            Origin::Option { name, text } if text.is_empty() => self.push(name.to_owned(), None, message),
            Origin::Option { name, text } => {
                self.push(name.to_owned(), None, format!("in `{}`: {message}", shortened(&text)))
            }
        }
    }

    /// Reports a fault of the file as a whole.
    pub(super) fn whole(&mut self, message: impl Into<String>) -> Reported<'_> {
        self.push(self.file.to_owned(), None, message.into())
    }

    /// Whether there is none.
    pub(super) fn is_empty(&self) -> bool {
        self.list.is_empty()
    }

    /// The line (from 1) of a span.
    pub(super) fn line(&self, span: &Span) -> usize {
        self.place(span).line
    }

    /// The text of a span as it stands in the file, shortened.
    pub(super) fn found(&self, span: &Span) -> String {
        shortened(self.text.get(span.clone()).unwrap_or_default())
    }

    /// The faults in the order of the file; those without a place stand first.
    pub(super) fn finish(mut self) -> Vec<Diagnostic> {
        self.list.sort_by_key(|diagnostic| diagnostic.place.as_ref().map(|place| place.span.start));
        self.list.dedup();
        self.list
    }

    fn push(&mut self, file: String, place: Option<Place>, message: String) -> Reported<'_> {
        if self.list.len() >= MOST {
            return Reported(None);
        }
        let (accepted, hint) = (None, None);
        self.list.push(Diagnostic { severity: Severity::Fault, file, place, message, accepted, hint });
        Reported(self.list.last_mut())
    }

    fn place(&self, span: &Span) -> Place {
        let boundary = |mut at: usize| {
            at = at.min(self.text.len());
            while !self.text.is_char_boundary(at) {
                at -= 1;
            }
            at
        };
        let start = boundary(span.start);
        let end = boundary(span.end).max(start);
        let line = self.line_starts.partition_point(|first| *first <= start).max(1);
        let column = self.text[self.line_starts[line - 1]..start].chars().count() + 1;
        Place { span: start..end, line, column }
    }
}

/// A text on one line, without control characters, at most 60 characters long.
pub(super) fn shortened(text: &str) -> String {
    let mut short = String::new();
    for (count, letter) in text.chars().enumerate() {
        if count == 60 {
            short.push_str("...");
            break;
        }
        if letter.is_control() {
            short.extend(letter.escape_default());
        } else {
            short.push(letter);
        }
    }
    short
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn lines_and_columns_count_characters_from_one() {
        let text = "a = 1\nstraße = \"x\"\n";
        let faults = Faults::new("f", text);
        let place = |span: Span| {
            let place = faults.place(&span);
            (place.line, place.column)
        };
        assert_eq!(place(0..1), (1, 1));
        assert_eq!(place(5..6), (1, 6));
        assert_eq!(place(6..7), (2, 1));
        let quote = text.find('"').unwrap();
        assert_eq!(place(quote..quote + 3), (2, 10));
        assert_eq!(place(text.len()..text.len()), (3, 1));
        assert_eq!(place(9999..99999), (3, 1));
    }

    #[test]
    fn a_span_inside_a_character_is_moved_to_its_start() {
        let faults = Faults::new("f", "ß");
        assert_eq!(faults.place(&(1..1)).span, 0..0);
    }

    #[test]
    fn faults_stand_in_the_order_of_the_file() {
        let mut faults = Faults::new("f", "a\nb\n");
        faults.at(2..3, "second");
        faults.at(0..1, "first").accepted("x").hint("y");
        faults.whole("whole");
        let text: Vec<String> = faults.finish().iter().map(ToString::to_string).collect();
        assert_eq!(text, ["f: whole", "f:1:1: first; accepted: x; hint: y", "f:2:1: second"]);
    }

    #[test]
    fn the_list_ends_somewhere() {
        let mut faults = Faults::new("f", "");
        for number in 0..2 * MOST {
            faults.at(0..0, number.to_string()).hint("more");
        }
        assert_eq!(faults.finish().len(), MOST);
    }
}

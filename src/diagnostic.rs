//! Faults in the input: severity, place, what was found, what is accepted, hints; collected in a list.

use std::fmt;

/// How grave a diagnostic is.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum Severity {
    /// No answer can be given.
    Fault,
    /// An answer can be given, with a caution.
    Caution,
}

/// A place in a text: byte span, and the line and column (both from 1) of its start.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Place {
    /// Byte range in the text.
    pub span: std::ops::Range<usize>,
    /// Line, from 1.
    pub line: usize,
    /// Column in characters, from 1.
    pub column: usize,
}

/// One fault.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Diagnostic {
    /// How grave it is.
    pub severity: Severity,
    /// The file (or `--set`, `-`, ...) it was found in.
    pub file: String,
    /// Where in the file; `None` when the fault concerns the file as a whole.
    pub place: Option<Place>,
    /// What is wrong and what was found, lower case, one sentence.
    pub message: String,
    /// What is accepted.
    pub accepted: Option<String>,
    /// What the user could do.
    pub hint: Option<String>,
}

impl fmt::Display for Diagnostic {
    /// `file:line:column: message; accepted: ...; hint: ...` on one line.
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "{}", self.file)?;
        if let Some(place) = &self.place {
            write!(f, ":{}:{}", place.line, place.column)?;
        }
        write!(f, ": {}", self.message)?;
        if let Some(accepted) = &self.accepted {
            write!(f, "; accepted: {accepted}")?;
        }
        if let Some(hint) = &self.hint {
            write!(f, "; hint: {hint}")?;
        }
        Ok(())
    }
}

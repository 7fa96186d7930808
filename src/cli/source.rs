//! Where the text of a joint comes from: a file, standard input, or the built-in demonstration.

use std::fs::File;
use std::io::{self, Read};
use std::path::{Path, PathBuf};
use weldpole::diagnostic::{Diagnostic, Place, Severity};
use weldpole::input::catalog;

/// Largest text read, bytes: far beyond any joint file, far below the memory of any machine.
const LARGEST_TEXT: u64 = 16 * 1024 * 1024;

/// A text with the name it is called by in messages and results.
#[derive(Debug, Clone)]
pub(super) struct Text {
    /// Path, `-` or `--demo`.
    pub(super) name: String,
    /// Contents.
    pub(super) contents: String,
}

/// Where a text comes from.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(super) enum Source {
    /// A file.
    File(PathBuf),
    /// Standard input, named `-`.
    StandardInput,
    /// The demonstration joint.
    Demonstration,
}

impl From<&PathBuf> for Source {
    fn from(path: &PathBuf) -> Self {
        if path.as_os_str() == "-" { Self::StandardInput } else { Self::File(path.clone()) }
    }
}

impl Source {
    /// What the source is called.
    pub(super) fn name(&self) -> String {
        match self {
            Self::File(path) => path.display().to_string(),
            Self::StandardInput => "-".to_owned(),
            Self::Demonstration => "--demo".to_owned(),
        }
    }

    /// Reads the text.
    ///
    /// # Errors
    /// A source that cannot be opened or read, is too long, or is not UTF-8.
    pub(super) fn read(&self) -> Result<Text, Box<Diagnostic>> {
        let name = self.name();
        let bytes = match self {
            Self::File(path) => read_file(path),
            Self::StandardInput => read_limited(io::stdin().lock()),
            Self::Demonstration => Ok(catalog::DEMO.as_bytes().to_vec()),
        };
        let bytes = bytes.map_err(|error| fault(&name, &unreadable(&error), None))?;
        if bytes.len() as u64 > LARGEST_TEXT {
            let message = format!("the text is longer than {} MiB", LARGEST_TEXT / (1024 * 1024));
            return Err(fault(&name, &message, Some("is it a joint file?")));
        }
        match String::from_utf8(bytes) {
            Ok(contents) => Ok(Text { name, contents }),
            Err(error) => Err(not_utf8(&name, error.as_bytes(), error.utf8_error().valid_up_to())),
        }
    }
}

fn read_file(path: &Path) -> io::Result<Vec<u8>> {
    if path.is_dir() {
        return Err(io::Error::from(io::ErrorKind::IsADirectory));
    }
    read_limited(File::open(path)?)
}

/// At most one byte more than is accepted.
fn read_limited(reader: impl Read) -> io::Result<Vec<u8>> {
    let mut bytes = Vec::new();
    reader.take(LARGEST_TEXT + 1).read_to_end(&mut bytes)?;
    Ok(bytes)
}

/// Why a text could not be read, in words.
fn unreadable(error: &io::Error) -> String {
    let kind = error.kind();
    if kind == io::ErrorKind::NotFound {
        "there is no such file".to_owned()
    } else if kind == io::ErrorKind::IsADirectory {
        "this is a directory, not a joint file".to_owned()
    } else if kind == io::ErrorKind::PermissionDenied {
        "permission to read the file is denied".to_owned()
    } else {
        format!("the file cannot be read: {error}")
    }
}

/// A fault of a text as a whole.
pub(super) fn fault(name: &str, message: &str, hint: Option<&str>) -> Box<Diagnostic> {
    Box::new(Diagnostic {
        severity: Severity::Fault,
        file: name.to_owned(),
        place: None,
        message: message.to_owned(),
        accepted: None,
        hint: hint.map(str::to_owned),
    })
}

/// The first byte that is not UTF-8.
fn not_utf8(name: &str, bytes: &[u8], valid: usize) -> Box<Diagnostic> {
    let before = String::from_utf8_lossy(&bytes[..valid]);
    let line = before.matches('\n').count() + 1;
    let column = before.rsplit('\n').next().map_or(0, |rest| rest.chars().count()) + 1;
    let message = "the file is not UTF-8 text";
    Box::new(Diagnostic {
        place: Some(Place { span: valid..valid + 1, line, column }),
        accepted: Some("text in UTF-8".to_owned()),
        ..*fault(name, message, Some("save the file with the encoding UTF-8"))
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_byte_that_is_not_text_is_located() {
        let found = not_utf8("a.toml", b"title = 1\nab\xff", 12);
        let place = found.place.unwrap();
        assert_eq!((place.line, place.column), (2, 3));
    }
}

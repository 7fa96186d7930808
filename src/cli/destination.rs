//! Where results are written: standard output, or a file that appears whole or not at all.
//!
//! A file is written under a temporary name in its own directory and then renamed. What is no ordinary file
//! (a device, a pipe) is written in place, because renaming would replace it.

use super::source::fault;
use std::fs::{self, File, OpenOptions};
use std::io::{self, ErrorKind, Write};
use std::path::{Path, PathBuf};
use weldpole::diagnostic::Diagnostic;

/// Temporary names tried before giving up.
const ATTEMPTS: u32 = 100;

/// A place for results.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(super) enum Destination {
    /// Standard output.
    StandardOutput,
    /// A file.
    File(PathBuf),
}

impl From<Option<&PathBuf>> for Destination {
    fn from(path: Option<&PathBuf>) -> Self {
        match path {
            Some(path) if path.as_os_str() != "-" => Self::File(path.clone()),
            Some(_) | None => Self::StandardOutput,
        }
    }
}

impl Destination {
    /// Writes data as it is.
    ///
    /// # Errors
    /// A destination that cannot be written; a reader that closes the pipe is no error.
    pub(super) fn write(&self, data: impl AsRef<[u8]>) -> Result<(), Box<Diagnostic>> {
        match self {
            Self::StandardOutput => finished(write_all(io::stdout().lock(), data.as_ref())),
            Self::File(path) => write_file(path, data.as_ref()).map_err(|error| unwritable(path, &error)),
        }
    }

    /// Writes text that may hold colour codes: they are dropped where they make no sense.
    ///
    /// # Errors
    /// As [`Destination::write`].
    pub(super) fn write_text(&self, text: &str) -> Result<(), Box<Diagnostic>> {
        match self {
            Self::StandardOutput => finished(write_all(anstream::stdout().lock(), text.as_bytes())),
            Self::File(_) => self.write(text),
        }
    }

    /// Whether writing here would destroy the ordinary file at `path`.
    pub(super) fn is_file(&self, path: &Path) -> bool {
        match self {
            Self::StandardOutput => false,
            Self::File(own) => !is_special(own) && resolved(own) == resolved(path),
        }
    }
}

/// Refuses to write over a joint file, and to write two results to one place.
///
/// # Errors
/// The first conflict.
pub(super) fn are_safe(outputs: &[&Option<PathBuf>], inputs: &[PathBuf]) -> Result<(), Box<Diagnostic>> {
    let named: Vec<&PathBuf> = outputs.iter().filter_map(|path| path.as_ref()).collect();
    for (index, path) in named.iter().enumerate() {
        let name = path.display().to_string();
        let hint = Some("choose another name");
        let destination = Destination::from(Some(*path));
        if inputs.iter().any(|file| destination.is_file(file)) {
            return Err(fault(&name, "the results would replace a joint file", hint));
        }
        let is_same = |other: &&PathBuf| {
            destination.is_file(other) || (path.as_os_str() == "-" && other.as_os_str() == "-")
        };
        if named[..index].iter().any(is_same) {
            return Err(fault(&name, "two results cannot share one destination", hint));
        }
    }
    Ok(())
}

fn write_all(mut stream: impl Write, data: &[u8]) -> io::Result<()> {
    stream.write_all(data)?;
    stream.flush()
}

/// The outcome of writing to standard output.
fn finished(outcome: io::Result<()>) -> Result<(), Box<Diagnostic>> {
    match outcome {
        Err(error) if error.kind() != ErrorKind::BrokenPipe => {
            Err(fault("standard output", &format!("the results cannot be written: {error}"), None))
        }
        Ok(()) | Err(_) => Ok(()),
    }
}

/// A device, pipe or socket.
fn is_special(path: &Path) -> bool {
    fs::metadata(path).is_ok_and(|found| !found.is_file() && !found.is_dir())
}

/// The path without links, as far as it exists.
fn resolved(path: &Path) -> PathBuf {
    if let Ok(whole) = path.canonicalize() {
        return whole;
    }
    match (directory_of(path).canonicalize(), path.file_name()) {
        (Ok(directory), Some(name)) => directory.join(name),
        _ => path.to_owned(),
    }
}

fn directory_of(path: &Path) -> &Path {
    path.parent().filter(|parent| !parent.as_os_str().is_empty()).unwrap_or(Path::new("."))
}

fn write_file(path: &Path, data: &[u8]) -> io::Result<()> {
    let existing = match fs::metadata(path) {
        Ok(found) => Some(found),
        Err(error) if error.kind() == ErrorKind::NotFound => None,
        Err(error) => return Err(error),
    };
    match &existing {
        Some(found) if found.is_dir() => return Err(ErrorKind::IsADirectory.into()),
        Some(found) if !found.is_file() => {
            return write_all(OpenOptions::new().write(true).open(path)?, data);
        }
        Some(found) if found.permissions().readonly() => return Err(ErrorKind::PermissionDenied.into()),
        Some(_) | None => {}
    }
    let target = resolved(path);
    let (mut file, temporary) = Temporary::beside(&target)?;
    file.write_all(data)?;
    if let Some(found) = existing {
        file.set_permissions(found.permissions())?;
    }
    file.sync_all()?;
    drop(file);
    temporary.rename_to(&target)
}

/// A temporary file that is removed unless it is renamed.
struct Temporary {
    path: Option<PathBuf>,
}

impl Temporary {
    /// A new, empty file in the directory of `target`.
    fn beside(target: &Path) -> io::Result<(File, Self)> {
        let directory = directory_of(target);
        for attempt in 0..ATTEMPTS {
            let path = directory.join(format!(".weldpole-{}-{attempt}.partial", std::process::id()));
            match OpenOptions::new().write(true).create_new(true).open(&path) {
                Ok(file) => return Ok((file, Self { path: Some(path) })),
                Err(error) if error.kind() == ErrorKind::AlreadyExists => {}
                Err(error) => return Err(error),
            }
        }
        Err(ErrorKind::AlreadyExists.into())
    }

    fn rename_to(mut self, target: &Path) -> io::Result<()> {
        if let Some(path) = &self.path {
            fs::rename(path, target)?;
        }
        self.path = None;
        Ok(())
    }
}

impl Drop for Temporary {
    fn drop(&mut self) {
        if let Some(path) = &self.path {
            // Nothing better can be done about a temporary file that refuses to go.
            let _ = fs::remove_file(path);
        }
    }
}

fn unwritable(path: &Path, error: &io::Error) -> Box<Diagnostic> {
    let kind = error.kind();
    let reason = if kind == ErrorKind::NotFound {
        "its directory does not exist".to_owned()
    } else if kind == ErrorKind::IsADirectory {
        "it is a directory".to_owned()
    } else if kind == ErrorKind::PermissionDenied {
        "permission is denied".to_owned()
    } else {
        error.to_string()
    };
    let hint = "choose another name with the option that gave this one";
    fault(&path.display().to_string(), &format!("the file cannot be written: {reason}"), Some(hint))
}

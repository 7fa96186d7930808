//! Drawings as files: what the name asks for, SVG or PNG.

use super::destination::Destination;
use super::source::fault;
use std::path::{Path, PathBuf};
use weldpole::diagnostic::Diagnostic;

/// Endings of names that are understood.
const ACCEPTED: &str = "a name that ends in .svg or .png, or `-` for an SVG on standard output";

/// The form of a drawing.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Form {
    Svg,
    Png,
}

/// The form that a name asks for.
fn form(path: &Path) -> Option<Form> {
    if path.as_os_str() == "-" {
        return Some(Form::Svg);
    }
    let ending = path.extension()?.to_str()?.to_ascii_lowercase();
    match ending.as_str() {
        "svg" => Some(Form::Svg),
        "png" => Some(Form::Png),
        _ => None,
    }
}

/// Reads the argument of `--figure`.
pub(super) fn path(text: &str) -> Result<PathBuf, String> {
    let path = PathBuf::from(text);
    match form(&path) {
        Some(Form::Png) if !cfg!(feature = "png") => {
            Err("this program was built without PNG; accepted: a name that ends in .svg".to_owned())
        }
        Some(Form::Svg | Form::Png) => Ok(path),
        None => Err(format!("accepted: {ACCEPTED}")),
    }
}

/// Writes a drawing in the form that the name asks for.
///
/// # Errors
/// A drawing that cannot be rasterised, or a file that cannot be written.
pub(super) fn write(path: &PathBuf, svg: &str) -> Result<(), Box<Diagnostic>> {
    let destination = Destination::from(Some(path));
    match form(path) {
        Some(Form::Png) => destination.write(raster(path, svg)?),
        Some(Form::Svg) | None => destination.write(svg),
    }
}

#[cfg(feature = "png")]
fn raster(path: &Path, svg: &str) -> Result<Vec<u8>, Box<Diagnostic>> {
    weldpole::output::png(svg).map_err(|error| fault(&path.display().to_string(), &error.to_string(), None))
}

#[cfg(not(feature = "png"))]
fn raster(path: &Path, _: &str) -> Result<Vec<u8>, Box<Diagnostic>> {
    let message = "this program was built without PNG";
    Err(fault(
        &path.display().to_string(),
        message,
        Some("ask for an .svg, or build it with the feature `png`"),
    ))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_ending_of_the_name_decides() {
        assert_eq!(form(Path::new("a/b.SVG")), Some(Form::Svg));
        assert_eq!(form(Path::new("b.png")), Some(Form::Png));
        assert_eq!(form(Path::new("-")), Some(Form::Svg));
        for refused in ["b", "b.pdf", ".svg.txt", ""] {
            assert!(path(refused).is_err(), "{refused}");
        }
    }
}

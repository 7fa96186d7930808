//! Reads classes of filler metal and their tensile strength from a data file.
//!
//! A file is one publication: its title, the unit of its strengths (`ksi` or `MPa`), and `[[class]]` entries
//! with `name`, `strength`, `clause`, `source` and `status`.

use super::{Status, cited};
use crate::model::Confirmation;
use crate::units::{Dimension, UnitSystem};
use serde::Deserialize;

/// A class of filler metal.
#[derive(Debug, Clone, PartialEq)]
pub struct Electrode {
    /// Class, for example `E70`.
    pub class: String,
    /// Tensile strength, MPa.
    pub strength: f64,
    /// Tensile strength as the publication states it, for example `70 ksi`.
    pub stated: String,
    /// The publication.
    pub publication: String,
    /// Clause or rule within it.
    pub clause: String,
    /// Where the number was taken from.
    pub source: String,
    /// How far it is confirmed.
    pub status: Confirmation,
}

#[derive(Deserialize)]
enum Unit {
    #[serde(rename = "ksi")]
    Ksi,
    #[serde(rename = "MPa")]
    Mpa,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct Class {
    name: String,
    strength: f64,
    clause: String,
    source: String,
    status: Status,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct File {
    publication: String,
    unit: Unit,
    class: Vec<Class>,
}

/// The classes of a data file.
pub(super) fn read(text: &str) -> Result<Vec<Electrode>, String> {
    let file: File = toml::from_str(text).map_err(|error| error.to_string())?;
    cited("the file", &[&file.publication])?;
    let units = match file.unit {
        Unit::Ksi => UnitSystem::Us,
        Unit::Mpa => UnitSystem::Metric,
    };
    let mut electrodes = Vec::new();
    for class in file.class {
        cited(&class.name, &[&class.clause, &class.source])?;
        if !(class.strength.is_finite() && class.strength > 0.0) {
            return Err(format!("the strength of {} must be positive", class.name));
        }
        electrodes.push(Electrode {
            strength: units.inside(Dimension::Stress, class.strength),
            stated: format!("{} {}", class.strength, units.symbol(Dimension::Stress)),
            class: class.name,
            publication: file.publication.clone(),
            clause: class.clause,
            source: class.source,
            status: class.status.into(),
        });
    }
    Ok(electrodes)
}

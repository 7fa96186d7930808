//! Reads a rule set from its data file.
//!
//! A file has the identifier, the default law, the accepted bases, the clauses, and tables of numbers:
//! `[longitudinal]`, `[resistance]` or `[safety]`, `[[concentric]]`; each number with `value`, `clause`,
//! `source` and `status` (`read` or `recalled`).

use super::{Status, cited};
use crate::model::{Basis, ConcentricRule, DesignFactor, RuleSet, Sourced};
use serde::Deserialize;

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct Number {
    value: f64,
    clause: String,
    source: String,
    status: Status,
}

#[derive(Deserialize)]
#[serde(rename_all = "lowercase")]
enum Accepted {
    Ultimate,
    Elastic,
    Concentric,
}

#[derive(Deserialize)]
#[serde(tag = "kind", rename_all = "kebab-case", deny_unknown_fields)]
enum Concentric {
    LinearGroup { id: String, clause: String, increase: Number },
    LongitudinalTransverse { id: String, clause: String, longitudinal: Number, transverse: Number },
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct File {
    id: String,
    title: String,
    edition: String,
    law: String,
    accepts: Vec<Accepted>,
    #[serde(default)]
    ultimate_laws: Vec<String>,
    ultimate_clause: String,
    elastic_clause: String,
    remarks: Vec<String>,
    longitudinal: Number,
    resistance: Option<Number>,
    safety: Option<Number>,
    #[serde(default)]
    concentric: Vec<Concentric>,
}

fn sourced(number: Number) -> Result<Sourced, String> {
    cited(&format!("the number {}", number.value), &[&number.clause, &number.source])?;
    if !(number.value.is_finite() && number.value > 0.0) {
        return Err(format!("a factor must be positive, found {}", number.value));
    }
    Ok(Sourced {
        value: number.value,
        clause: number.clause,
        source: number.source,
        status: number.status.into(),
    })
}

/// The rule set of a data file.
pub(super) fn read(text: &str) -> Result<RuleSet, String> {
    let file: File = toml::from_str(text).map_err(|error| error.to_string())?;
    let design = match (file.resistance, file.safety) {
        (None, None) => DesignFactor::None,
        (Some(phi), None) => DesignFactor::Resistance(sourced(phi)?),
        (None, Some(omega)) => DesignFactor::Safety(sourced(omega)?),
        (Some(_), Some(_)) => return Err("a resistance factor and a safety factor".to_owned()),
    };
    let mut concentric = Vec::new();
    for rule in file.concentric {
        concentric.push(match rule {
            Concentric::LinearGroup { id, clause, increase } => {
                ConcentricRule::LinearGroup { id, clause, increase: sourced(increase)? }
            }
            Concentric::LongitudinalTransverse { id, clause, longitudinal, transverse } => {
                ConcentricRule::LongitudinalTransverse {
                    id,
                    clause,
                    longitudinal: sourced(longitudinal)?,
                    transverse: sourced(transverse)?,
                }
            }
        });
    }
    let accepts = file
        .accepts
        .iter()
        .map(|accepted| match accepted {
            Accepted::Ultimate => Basis::Ultimate,
            Accepted::Elastic => Basis::Elastic,
            Accepted::Concentric => Basis::Concentric,
        })
        .collect();
    cited("the acceptance", &[&file.ultimate_clause, &file.elastic_clause, &file.edition])?;
    Ok(RuleSet {
        id: file.id,
        title: file.title,
        edition: file.edition,
        law: file.law,
        longitudinal: sourced(file.longitudinal)?,
        design,
        accepts,
        ultimate_laws: file.ultimate_laws,
        ultimate_clause: file.ultimate_clause,
        elastic_clause: file.elastic_clause,
        concentric,
        remarks: file.remarks,
    })
}

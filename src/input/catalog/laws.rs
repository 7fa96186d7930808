//! Reads a load-deformation law from its data file.
//!
//! The form is named by `form`; each table of coefficients carries `clause`, `source` and `status`. A law is
//! "read" only when all of its tables are.

use super::{Status, cited};
use crate::model::{Confirmation, Curve, Directional, Law, LawForm, Limit, PowerOfAngle, RootPolynomial};
use serde::Deserialize;

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct Strength {
    amplitude: f64,
    clause: String,
    source: String,
    status: Status,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct Product {
    a: f64,
    b: f64,
    exponent: f64,
    clause: String,
    source: String,
    status: Status,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct Roots {
    slope: f64,
    linear_to: f64,
    coefficients: [f64; 6],
    clause: String,
    source: String,
    status: Status,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct Power {
    coefficient: f64,
    offset: f64,
    exponent: f64,
    cap: Option<f64>,
    clause: String,
    source: String,
    status: Status,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct Shape {
    numerator: [f64; 2],
    denominator: [f64; 2],
    mu: [f64; 2],
    lambda: [f64; 2],
    test_leg: f64,
    clause: String,
    source: String,
    status: Status,
}

#[derive(Deserialize)]
#[serde(tag = "form", rename_all = "kebab-case", deny_unknown_fields)]
#[allow(clippy::large_enum_variant)] // one value at a time, taken apart at once
enum File {
    LesikKennedy {
        id: String,
        title: String,
        source: String,
        directional: Strength,
        product: Option<Product>,
        roots: Option<Roots>,
        peak: Power,
        limit: Power,
    },
    ButlerPalKulak {
        id: String,
        title: String,
        source: String,
        shape: Shape,
        limit: Power,
    },
    RigidPlastic {
        id: String,
        title: String,
        source: String,
        directional: Strength,
    },
}

impl Power {
    fn power(&self) -> PowerOfAngle {
        PowerOfAngle { coefficient: self.coefficient, offset: self.offset, exponent: self.exponent }
    }
}

/// Collects the status of the tables of a law, and refuses one without a source.
struct Tables(Confirmation);

impl Tables {
    fn note(&mut self, what: &str, clause: &str, source: &str, status: Status) -> Result<(), String> {
        if Confirmation::from(status) == Confirmation::Recalled {
            self.0 = Confirmation::Recalled;
        }
        cited(what, &[clause, source])
    }
}

/// The law of a data file.
pub(super) fn read(text: &str) -> Result<Law, String> {
    let file: File = toml::from_str(text).map_err(|error| error.to_string())?;
    let mut tables = Tables(Confirmation::Read);
    let (id, title, source, form) = match file {
        File::LesikKennedy { id, title, source, directional, product, roots, peak, limit } => {
            tables.note("directional", &directional.clause, &directional.source, directional.status)?;
            tables.note("peak", &peak.clause, &peak.source, peak.status)?;
            tables.note("limit", &limit.clause, &limit.source, limit.status)?;
            let curve = match (product, roots) {
                (Some(product), None) => {
                    tables.note("product", &product.clause, &product.source, product.status)?;
                    Curve::Product { a: product.a, b: product.b, exponent: product.exponent }
                }
                (None, Some(roots)) => {
                    tables.note("roots", &roots.clause, &roots.source, roots.status)?;
                    Curve::Roots(RootPolynomial {
                        slope: roots.slope,
                        linear_to: roots.linear_to,
                        coefficients: roots.coefficients,
                    })
                }
                (None, None) | (Some(_), Some(_)) => return Err("one of `product` and `roots`".to_owned()),
            };
            let form = LawForm::LesikKennedy {
                directional: Directional { amplitude: directional.amplitude },
                curve,
                peak: peak.power(),
                limit: Limit { power: limit.power(), cap: limit.cap },
            };
            (id, title, source, form)
        }
        File::ButlerPalKulak { id, title, source, shape, limit } => {
            tables.note("shape", &shape.clause, &shape.source, shape.status)?;
            tables.note("limit", &limit.clause, &limit.source, limit.status)?;
            let form = LawForm::ButlerPalKulak {
                numerator: shape.numerator,
                denominator: shape.denominator,
                mu: shape.mu,
                lambda: shape.lambda,
                limit: limit.power(),
                test_leg: shape.test_leg,
            };
            (id, title, source, form)
        }
        File::RigidPlastic { id, title, source, directional } => {
            tables.note("directional", &directional.clause, &directional.source, directional.status)?;
            let directional = Directional { amplitude: directional.amplitude };
            (id, title, source, LawForm::RigidPlastic { directional })
        }
    };
    cited("the law", &[&id, &title, &source])?;
    Ok(Law { id, title, source, status: tables.0, form })
}

//! JSON values: numbers of 12 significant digits, vectors, and the document as text.

use crate::analysis::Verification;
use crate::model::Vector;
use crate::output::names::basis_name;
use crate::output::number::{rounded, rounded_up};
use serde::{Serialize, Serializer};

/// A number rounded to 12 significant digits; `null` when it is not finite.
pub(in crate::output) struct Number(pub(in crate::output) f64);

impl Serialize for Number {
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        serializer.serialize_f64(rounded(self.0))
    }
}

/// A utilisation: like [`Number`], rounded up.
pub(in crate::output) struct Utilisation(pub(in crate::output) f64);

impl Serialize for Utilisation {
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        serializer.serialize_f64(rounded_up(self.0))
    }
}

/// Three components.
#[derive(Serialize)]
pub(in crate::output) struct Triple([Number; 3]);

impl From<Vector> for Triple {
    fn from(vector: Vector) -> Self {
        Self([Number(vector.x), Number(vector.y), Number(vector.z)])
    }
}

impl From<[f64; 3]> for Triple {
    fn from(values: [f64; 3]) -> Self {
        Self(values.map(Number))
    }
}

/// Two components.
#[derive(Serialize)]
pub(in crate::output) struct Pair([Number; 2]);

impl From<[f64; 2]> for Pair {
    fn from(values: [f64; 2]) -> Self {
        Self(values.map(Number))
    }
}

/// What decides a case.
#[derive(Serialize)]
pub(in crate::output) struct VerificationJson<'a> {
    basis: Option<&'static str>,
    check: Option<&'a str>,
    utilisation: Option<Utilisation>,
}

impl<'a> VerificationJson<'a> {
    /// The verification that decides, and the utilisation: 0 without a load.
    pub(in crate::output) fn new(decided: Option<&'a Verification>, utilisation: Option<f64>) -> Self {
        Self {
            basis: decided.map(|verification| basis_name(verification.basis)),
            check: decided.map(|verification| verification.check.as_str()),
            utilisation: utilisation.map(Utilisation),
        }
    }
}

/// A document as indented text, one line break at the end.
pub(in crate::output) fn pretty<T: Serialize>(document: &T) -> String {
    let text = serde_json::to_string_pretty(document).expect(
        "serialising fails only for maps with keys that are no strings, and the documents are structs",
    );
    text + "\n"
}

//! A joint: everything one joint file says, as model values.

use super::{Basis, Filler, Law, LoadCase, RuleSet, WeldGroup};
use crate::units::UnitSystem;

/// How the weld is integrated.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Discretisation {
    /// Integrals and rupture on the weld itself.
    Continuous,
    /// Mid-point elements, this many on the longest run and the same element length elsewhere.
    Elements(usize),
}

/// Title block of the calculation, as the user gives it.
#[derive(Debug, Clone, Default, PartialEq, Eq)]
pub struct Document {
    /// Project.
    pub project: Option<String>,
    /// Subject.
    pub subject: Option<String>,
    /// Author.
    pub author: Option<String>,
    /// Checker.
    pub checker: Option<String>,
    /// Revision.
    pub revision: Option<String>,
    /// Date, in the user's words.
    pub date: Option<String>,
}

/// A plate joined by welds.
#[derive(Debug, Clone, PartialEq)]
pub struct Plate {
    /// Name, unique in the joint.
    pub name: String,
    /// Thickness, mm.
    pub thickness: f64,
    /// Steel grade.
    pub grade: Option<String>,
    /// Yield strength, MPa.
    pub yield_strength: Option<f64>,
    /// Tensile strength, MPa.
    pub ultimate_strength: Option<f64>,
}

/// One joint to be verified.
#[derive(Debug, Clone, PartialEq)]
pub struct Joint {
    /// Name of the file it came from.
    pub file: String,
    /// Title.
    pub title: String,
    /// Units of the file, in which results are shown to people.
    pub units: UnitSystem,
    /// Rule set.
    pub rules: RuleSet,
    /// Load-deformation law.
    pub law: Law,
    /// Continuous weld or elements.
    pub discretisation: Discretisation,
    /// Default filler metal.
    pub filler: Option<Filler>,
    /// Plates.
    pub plates: Vec<Plate>,
    /// Welds.
    pub group: WeldGroup,
    /// What has to be verified: the combinations, or the cases where there are none.
    pub cases: Vec<LoadCase>,
    /// True when there are combinations; false when the cases are taken as factored already.
    pub combined: bool,
    /// Names of the load cases that no combination uses; empty without combinations.
    pub unused_cases: Vec<String>,
    /// Title block.
    pub document: Document,
}

impl Joint {
    /// Whether a verification of this joint may rest on an analysis.
    ///
    /// The ultimate analysis counts with a law that the rule set accepts for it; the elastic one where the rule
    /// set accepts it and no ultimate analysis counts, so that it never outbids the more exact result.
    #[must_use]
    pub fn accepts(&self, basis: Basis) -> bool {
        let ultimate = self.rules.accepts(Basis::Ultimate) && self.rules.accepts_law(&self.law.id);
        match basis {
            Basis::Ultimate => ultimate,
            Basis::Elastic => self.rules.accepts(Basis::Elastic) && !ultimate,
            Basis::Concentric => self.rules.accepts(Basis::Concentric),
        }
    }
}

//! A rule set: the factors and accepted analyses of one code of practice and edition, as data.
//!
//! Each number keeps its clause, its source and how far it is confirmed. Rule sets are read from data files
//! by `input`; nothing here knows a particular code.

use super::Confirmation;

/// A number with its clause and confirmation status.
#[derive(Debug, Clone, PartialEq)]
pub struct Sourced {
    /// The number.
    pub value: f64,
    /// Clause, table or equation of the code.
    pub clause: String,
    /// Where the number was taken from.
    pub source: String,
    /// Whether it was read in the published text or recalled.
    pub status: Confirmation,
}

/// How a nominal strength becomes a design strength.
#[derive(Debug, Clone, PartialEq)]
pub enum DesignFactor {
    /// The nominal strength is used as it is.
    None,
    /// Resistance factor phi: design strength = phi times nominal.
    Resistance(Sourced),
    /// Safety factor Omega: design strength = nominal over Omega.
    Safety(Sourced),
}

impl DesignFactor {
    /// What multiplies the nominal strength.
    #[must_use]
    pub fn multiplier(&self) -> f64 {
        match self {
            Self::None => 1.0,
            Self::Resistance(phi) => phi.value,
            Self::Safety(omega) => 1.0 / omega.value,
        }
    }
}

/// The analysis on which a verification rests.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Basis {
    /// The instantaneous-centre method.
    Ultimate,
    /// The elastic vector method.
    Elastic,
    /// A rule of the code for loads through the centroid of the group.
    Concentric,
}

/// A rule for loads through the centroid of a group of one leg size and one filler.
#[derive(Debug, Clone, PartialEq)]
pub enum ConcentricRule {
    /// All runs parallel: the directional strength at their one angle to the load.
    LinearGroup {
        /// Identifier printed with the result.
        id: String,
        /// Clause.
        clause: String,
        /// Factor of sin^1.5 theta.
        increase: Sourced,
    },
    /// Runs along and across the load: the larger of `R_l + R_t` and `longitudinal R_l + transverse R_t`,
    /// with both at the longitudinal strength per area.
    LongitudinalTransverse {
        /// Identifier printed with the result.
        id: String,
        /// Clause.
        clause: String,
        /// Factor of the strength of the longitudinal runs.
        longitudinal: Sourced,
        /// Factor of the strength of the transverse runs.
        transverse: Sourced,
    },
}

/// The rules of one code and edition.
#[derive(Debug, Clone, PartialEq)]
pub struct RuleSet {
    /// Identifier used in joint files, for example `aisc-360-22-lrfd`.
    pub id: String,
    /// Title for people.
    pub title: String,
    /// Document and edition.
    pub edition: String,
    /// Identifier of the default load-deformation law.
    pub law: String,
    /// Longitudinal strength per throat area over the filler's tensile strength (0.60 in most codes).
    pub longitudinal: Sourced,
    /// From nominal to design strength.
    pub design: DesignFactor,
    /// The analyses the code accepts as a verification.
    pub accepts: Vec<Basis>,
    /// The laws with which the ultimate analysis is accepted; any law when empty.
    pub ultimate_laws: Vec<String>,
    /// Clause that accepts the ultimate analysis.
    pub ultimate_clause: String,
    /// Clause or document behind the elastic comparison.
    pub elastic_clause: String,
    /// Rules for concentric loads.
    pub concentric: Vec<ConcentricRule>,
    /// What a reader should be told whenever this rule set is used.
    pub remarks: Vec<String>,
}

impl RuleSet {
    /// Whether the code accepts a verification on this basis.
    #[must_use]
    pub fn accepts(&self, basis: Basis) -> bool {
        self.accepts.contains(&basis)
    }

    /// Whether the code accepts the ultimate analysis with this law.
    #[must_use]
    pub fn accepts_law(&self, law: &str) -> bool {
        self.ultimate_laws.is_empty() || self.ultimate_laws.iter().any(|accepted| accepted == law)
    }

    /// Every sourced number of the rule set, with its name.
    #[must_use]
    pub fn numbers(&self) -> Vec<(&'static str, &Sourced)> {
        let mut all = vec![("longitudinal strength / F_EXX", &self.longitudinal)];
        match &self.design {
            DesignFactor::None => {}
            DesignFactor::Resistance(phi) => all.push(("resistance factor phi", phi)),
            DesignFactor::Safety(omega) => all.push(("safety factor Omega", omega)),
        }
        for rule in &self.concentric {
            match rule {
                ConcentricRule::LinearGroup { increase, .. } => {
                    all.push(("linear group: factor of sin^1.5 theta", increase));
                }
                ConcentricRule::LongitudinalTransverse { longitudinal, transverse, .. } => {
                    all.push(("concentric: factor of longitudinal runs", longitudinal));
                    all.push(("concentric: factor of transverse runs", transverse));
                }
            }
        }
        all
    }

    /// `Read` when every number was read in the published text.
    #[must_use]
    pub fn status(&self) -> Confirmation {
        if self.numbers().iter().all(|(_, number)| number.status == Confirmation::Read) {
            Confirmation::Read
        } else {
            Confirmation::Recalled
        }
    }
}

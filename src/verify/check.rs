//! One verification as a row: clause, demand, resistance, utilisation, verdict.
//!
//! | symbol | code | unit | meaning |
//! |---|---|---|---|
//! | lambda | `load_factor` | - | multiplies the given load to reach the nominal strength |
//! | phi, Omega | `DesignFactor` | - | `lambda_d = phi lambda` or `lambda / Omega` |
//! | U | `utilisation` | - | 1 / lambda_d |
//!
//! A check is satisfied when `U (1 + error) <= 1`, with the relative error estimate of lambda.

use crate::model::{Basis, Confirmation, DesignFactor, Joint, RuleSet, Wrench};

/// One verification.
#[derive(Debug, Clone, PartialEq)]
pub struct Check {
    /// Identifier, for example `instantaneous-centre`.
    pub id: String,
    /// The analysis it rests on.
    pub basis: Basis,
    /// Clause.
    pub clause: String,
    /// What is checked, in words.
    pub subject: String,
    /// Nominal load factor: multiplies the given load to reach the nominal strength.
    pub load_factor: f64,
    /// Load factor to the design strength.
    pub design_load_factor: f64,
    /// Size of the given load: resultant force, N, or moment about the centroid, N mm, where there is no force.
    pub demand: f64,
    /// Design strength in the same unit.
    pub resistance: f64,
    /// True when demand and resistance are moments.
    pub in_moment: bool,
    /// 1 / `design_load_factor`.
    pub utilisation: f64,
    /// Relative error estimate of the load factor.
    pub error_estimate: f64,
    /// Whether it is satisfied, error estimate included.
    pub satisfied: bool,
    /// Whether the code accepts it as the verification; information only otherwise.
    pub accepted: bool,
    /// Whether the numbers it rests on were read in the published text or recalled.
    pub values: Confirmation,
}

/// The size of a load in the measure in which demand and resistance are shown.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Demand {
    /// Resultant force, N, or moment, N mm.
    pub size: f64,
    /// True for a moment.
    pub in_moment: bool,
}

/// Share of the moment (over a length of 1 mm) below which a force counts as none.
const NO_FORCE: f64 = 1e-12;

impl Demand {
    /// The resultant force of a load, or its moment where there is no force.
    #[must_use]
    pub fn of(load: &Wrench) -> Self {
        let (force, moment) = (load.force.norm(), load.moment.norm());
        if force > NO_FORCE * moment {
            Self { size: force, in_moment: false }
        } else {
            Self { size: moment, in_moment: true }
        }
    }
}

/// What a check is about.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Topic {
    pub(super) id: String,
    pub(super) basis: Basis,
    pub(super) clause: String,
    pub(super) subject: String,
}

impl Check {
    /// A check of a nominal load factor against the design strength of the joint's rule set.
    pub(super) fn new(
        topic: Topic,
        load_factor: f64,
        error_estimate: f64,
        demand: Demand,
        joint: &Joint,
    ) -> Self {
        let rules = &joint.rules;
        let design_load_factor = load_factor * rules.design.multiplier();
        let utilisation = 1.0 / design_load_factor;
        Self {
            accepted: joint.accepts(topic.basis),
            id: topic.id,
            basis: topic.basis,
            clause: topic.clause,
            subject: topic.subject,
            load_factor,
            design_load_factor,
            demand: demand.size,
            resistance: demand.size * design_load_factor,
            in_moment: demand.in_moment,
            utilisation,
            error_estimate,
            satisfied: utilisation * (1.0 + error_estimate) <= 1.0,
            values: confirmation(rules),
        }
    }
}

/// How far the numbers behind a design strength are confirmed.
fn confirmation(rules: &RuleSet) -> Confirmation {
    let factor_read = match &rules.design {
        DesignFactor::None => true,
        DesignFactor::Resistance(number) | DesignFactor::Safety(number) => {
            number.status == Confirmation::Read
        }
    };
    if factor_read && rules.longitudinal.status == Confirmation::Read {
        Confirmation::Read
    } else {
        Confirmation::Recalled
    }
}

/// The verification that decides a case.
#[derive(Debug, Clone, PartialEq)]
pub struct Verification {
    /// Basis.
    pub basis: Basis,
    /// Identifier of the governing row of the checks.
    pub check: String,
    /// Utilisation.
    pub utilisation: f64,
}

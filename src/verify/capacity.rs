//! The two analyses as verifications, and which verification decides.
//!
//! Of all verifications that the rule set accepts, each is sufficient by itself, so the largest accepted
//! strength decides. An analysis the rule set does not accept is information: it takes part in no verdict.

use super::check::{Check, Demand, Topic, Verification};
use crate::model::{Basis, Confirmation, Law, RuleSet};
use crate::solvers::{Elastic, Ultimate};

/// The instantaneous-centre method against the design strength.
///
/// The row counts as recalled when the law's coefficients are, whatever the rule set's numbers.
#[must_use]
pub fn ultimate_check(ultimate: &Ultimate, law: &Law, demand: Demand, rules: &RuleSet) -> Check {
    let topic = Topic {
        id: "instantaneous-centre".into(),
        basis: Basis::Ultimate,
        clause: rules.ultimate_clause.clone(),
        subject: "weld group, first rupture".into(),
    };
    let state = ultimate.governing();
    let mut check = Check::new(topic, state.load_factor, state.error_estimate, demand, rules);
    if law.status == Confirmation::Recalled {
        check.values = Confirmation::Recalled;
    }
    check
}

/// The elastic vector method against the design strength.
#[must_use]
pub fn elastic_check(elastic: &Elastic, demand: Demand, rules: &RuleSet) -> Check {
    let topic = Topic {
        id: "elastic-vector".into(),
        basis: Basis::Elastic,
        clause: rules.elastic_clause.clone(),
        subject: "weld group, worst point".into(),
    };
    Check::new(topic, elastic.load_factor, 4.0 * f64::EPSILON, demand, rules)
}

/// The accepted check of largest design strength, if any is accepted.
#[must_use]
pub fn verification(checks: &[Check]) -> Option<Verification> {
    let mut best: Option<&Check> = None;
    for check in checks.iter().filter(|check| check.accepted) {
        if best.is_none_or(|known| check.design_load_factor > known.design_load_factor) {
            best = Some(check);
        }
    }
    best.map(|check| Verification {
        basis: check.basis,
        check: check.id.clone(),
        utilisation: check.utilisation,
    })
}

/// Sorts checks: the governing one, then the other accepted ones, then information; each by utilisation.
pub fn governing_first(checks: &mut [Check], governing: Option<&Verification>) {
    let rank = |check: &Check| {
        let governs = governing.is_some_and(|verification| verification.check == check.id);
        (!governs, !check.accepted)
    };
    checks.sort_by(|a, b| rank(a).cmp(&rank(b)).then(a.utilisation.total_cmp(&b.utilisation)));
}

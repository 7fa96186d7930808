//! The two analyses as verifications, and which verification decides.
//!
//! Of the verifications that are accepted for a joint each is sufficient by itself, so the largest accepted
//! strength decides. An analysis that is not accepted is information: it takes part in no verdict. A joint whose
//! accepted ultimate analysis has no answer is not solved, whatever the other rows say.

use super::check::{Check, Demand, Topic, Verification};
use crate::model::{Basis, Confirmation, Joint};
use crate::solvers::{Elastic, Ultimate};

/// The instantaneous-centre method against the design strength.
///
/// The row counts as recalled when the law's coefficients are, whatever the rule set's numbers.
#[must_use]
pub fn ultimate_check(ultimate: &Ultimate, demand: Demand, joint: &Joint) -> Check {
    let state = ultimate.governing();
    let topic = Topic {
        id: "instantaneous-centre".into(),
        basis: Basis::Ultimate,
        clause: joint.rules.ultimate_clause.clone(),
        subject: if state.critical.is_some() {
            "weld group, first rupture"
        } else {
            "weld group, full strength"
        }
        .into(),
    };
    let mut check = Check::new(topic, state.load_factor, state.error_estimate, demand, joint);
    if joint.law.status == Confirmation::Recalled {
        check.values = Confirmation::Recalled;
    }
    check
}

/// The elastic vector method against the design strength.
#[must_use]
pub fn elastic_check(elastic: &Elastic, demand: Demand, joint: &Joint) -> Check {
    let topic = Topic {
        id: "elastic-vector".into(),
        basis: Basis::Elastic,
        clause: joint.rules.elastic_clause.clone(),
        subject: "weld group, worst point".into(),
    };
    Check::new(topic, elastic.load_factor, 4.0 * f64::EPSILON, demand, joint)
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

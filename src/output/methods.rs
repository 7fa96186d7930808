//! The two methods side by side in words: one wording for the text and the drawing.

use super::number::{MISSING, measure, people, quantity, utilisation};
use crate::analysis::{CaseReport, Strength};
use crate::model::{Basis, Joint};
use crate::units::UnitSystem;

/// What each method says of a case; the ultimate method first.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(super) struct Methods {
    /// Whether the rules accept it for the verification.
    pub(super) standing: [String; 2],
    /// The load at the nominal strength.
    pub(super) nominal: [String; 2],
    /// The load at the design strength.
    pub(super) design: [String; 2],
    /// Load factor to the nominal strength.
    pub(super) nominal_factor: [String; 2],
    /// Load factor to the design strength.
    pub(super) design_factor: [String; 2],
    /// Utilisation.
    pub(super) utilisation: [String; 2],
}

const BASES: [Basis; 2] = [Basis::Ultimate, Basis::Elastic];

impl Methods {
    /// The words for a case.
    pub(super) fn of(case: &CaseReport, joint: &Joint) -> Self {
        let strengths = [case.ultimate_strength(joint), case.elastic_strength(joint)];
        // An ultimate analysis that is information only has no design strength.
        let guarded = |words: [String; 2]| {
            let [ultimate, elastic] = words;
            if joint.accepts(Basis::Ultimate) {
                [ultimate, elastic]
            } else {
                ["not accepted".to_owned(), elastic]
            }
        };
        let nominal = strengths.map(|strength| strength.map(|strength| strength.load_factor));
        let design = strengths.map(|strength| strength.and_then(|strength| strength.design_load_factor));
        let factors = |factors: [Option<f64>; 2]| {
            factors.map(|factor| factor.map_or_else(|| MISSING.to_owned(), people))
        };
        let loads = |factors: [Option<f64>; 2]| factors.map(|factor| resultant(case, factor, joint.units));
        let [ultimate, elastic] = strengths;
        let used = [used(case, Basis::Ultimate, ultimate), used(case, Basis::Elastic, elastic)];
        Self {
            standing: BASES
                .map(|basis| if joint.accepts(basis) { "accepted" } else { "information" }.to_owned()),
            nominal: loads(nominal),
            design: guarded(loads(design)),
            nominal_factor: factors(nominal),
            design_factor: guarded(factors(design)),
            utilisation: guarded(used),
        }
    }
}

/// A strength as the size of the load it stands for.
fn resultant(case: &CaseReport, factor: Option<f64>, units: UnitSystem) -> String {
    let shown = |(size, in_moment): (f64, bool)| quantity(units, measure(in_moment), size);
    factor.and_then(|factor| case.load_times(factor)).map_or_else(|| MISSING.to_owned(), shown)
}

fn used(case: &CaseReport, basis: Basis, strength: Option<Strength>) -> String {
    let exceeded = case.checks.iter().any(|check| check.basis == basis && check.accepted && !check.satisfied);
    let value = strength.and_then(|strength| strength.utilisation());
    value.map_or_else(|| MISSING.to_owned(), |value| utilisation(value, exceeded))
}

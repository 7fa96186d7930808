//! What the program ships: rule sets, load-deformation laws, filler metals and example files.
//!
//! The files under `data/` are embedded and read once, when first asked for, by the same code that would read
//! a user's file of that kind. Every number in them carries its clause, its source and how far it is
//! confirmed; the tests of this module read every file.

mod electrodes;
mod laws;
mod rules;

pub use electrodes::Electrode;

use crate::model::{Confirmation, Law, RuleSet};
use serde::Deserialize;
use std::sync::OnceLock;

/// The example of the documentation: a davit bracket on a ferry pier.
pub const DEMO: &str = include_str!("../../../data/examples/demo.toml");

/// A commented file to begin with.
pub const STARTER: &str = include_str!("../../../data/examples/starter.toml");

/// Further examples, with their file names.
pub const EXAMPLES: [(&str, &str); 4] = [
    ("lug-plate.toml", include_str!("../../../data/examples/lug-plate.toml")),
    ("mixed-legs.toml", include_str!("../../../data/examples/mixed-legs.toml")),
    ("ring.toml", include_str!("../../../data/examples/ring.toml")),
    ("us-units.toml", include_str!("../../../data/examples/us-units.toml")),
];

/// Published values to compare with, one a row, each with its source.
pub const PUBLISHED_CASES: &str = include_str!("../../../data/cases/plane-groups-published.csv");

/// How far a computed value may be from a published one, and why.
pub const CASE_TOLERANCES: &str = include_str!("../../../data/cases/tolerances.toml");

const RULE_SETS: [&str; 3] = [
    include_str!("../../../data/rules/nominal.toml"),
    include_str!("../../../data/rules/aisc-360-22-lrfd.toml"),
    include_str!("../../../data/rules/aisc-360-22-asd.toml"),
];

const LAWS: [&str; 4] = [
    include_str!("../../../data/laws/lesik-kennedy.toml"),
    include_str!("../../../data/laws/lesik-kennedy-polynomial.toml"),
    include_str!("../../../data/laws/butler-pal-kulak.toml"),
    include_str!("../../../data/laws/rigid-plastic.toml"),
];

const ELECTRODES: [&str; 3] = [
    include_str!("../../../data/electrodes/aws.toml"),
    include_str!("../../../data/electrodes/csa.toml"),
    include_str!("../../../data/electrodes/iso-2560.toml"),
];

/// Why a proof is at hand where embedded data are read.
const PROOF: &str = "embedded data, read by the test `every_data_file_is_read`";

/// The rule sets.
#[must_use]
pub fn rule_sets() -> &'static [RuleSet] {
    static READ: OnceLock<Vec<RuleSet>> = OnceLock::new();
    READ.get_or_init(|| RULE_SETS.iter().map(|text| rules::read(text).expect(PROOF)).collect())
}

/// The rule set of this identifier.
#[must_use]
pub fn rule_set(id: &str) -> Option<&'static RuleSet> {
    rule_sets().iter().find(|rules| rules.id == id)
}

/// The load-deformation laws.
#[must_use]
pub fn laws() -> &'static [Law] {
    static READ: OnceLock<Vec<Law>> = OnceLock::new();
    READ.get_or_init(|| LAWS.iter().map(|text| laws::read(text).expect(PROOF)).collect())
}

/// The law of this identifier.
#[must_use]
pub fn law(id: &str) -> Option<&'static Law> {
    laws().iter().find(|law| law.id == id)
}

/// The filler metals.
#[must_use]
pub fn electrodes() -> &'static [Electrode] {
    static READ: OnceLock<Vec<Electrode>> = OnceLock::new();
    READ.get_or_init(|| ELECTRODES.iter().flat_map(|text| electrodes::read(text).expect(PROOF)).collect())
}

/// The filler metal of this class.
#[must_use]
pub fn electrode(class: &str) -> Option<&'static Electrode> {
    electrodes().iter().find(|electrode| electrode.class == class)
}

/// How far a number is confirmed, as data files write it.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Deserialize)]
#[serde(rename_all = "lowercase")]
enum Status {
    Read,
    Recalled,
}

impl From<Status> for Confirmation {
    fn from(status: Status) -> Self {
        match status {
            Status::Read => Self::Read,
            Status::Recalled => Self::Recalled,
        }
    }
}

/// Refuses a text that must say something.
fn cited(what: &str, texts: &[&str]) -> Result<(), String> {
    if texts.iter().any(|text| text.trim().is_empty()) {
        return Err(format!("{what} does not say where it comes from"));
    }
    Ok(())
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::model::{Basis, DesignFactor, LawForm};
    use crate::units::MPA_PER_KSI;

    #[test]
    fn every_data_file_is_read() {
        assert_eq!(rule_sets().len(), RULE_SETS.len());
        assert_eq!(laws().len(), LAWS.len());
        assert_eq!(electrodes().len(), 12);
    }

    #[test]
    fn identifiers_are_unique_and_defaults_exist() {
        for (at, rules) in rule_sets().iter().enumerate() {
            assert!(rule_sets()[..at].iter().all(|other| other.id != rules.id));
            assert!(law(&rules.law).is_some(), "{}", rules.law);
        }
        for (at, electrode) in electrodes().iter().enumerate() {
            assert!(electrodes()[..at].iter().all(|other| other.class != electrode.class));
        }
        assert!(rule_set("unknown").is_none() && law("unknown").is_none() && electrode("E71").is_none());
    }

    #[test]
    fn every_number_of_every_rule_set_cites() {
        for rules in rule_sets() {
            for (name, number) in rules.numbers() {
                assert!(!number.clause.is_empty() && !number.source.is_empty(), "{}: {name}", rules.id);
            }
        }
    }

    #[test]
    fn published_factors() {
        // ANSI/AISC 360-22, J2.4: phi = 0.75, Omega = 2.00.
        let lrfd = rule_set("aisc-360-22-lrfd").unwrap();
        let asd = rule_set("aisc-360-22-asd").unwrap();
        assert!((lrfd.design.multiplier() - 0.75).abs() < 1e-15);
        assert!((asd.design.multiplier() - 0.50).abs() < 1e-15);
        for rules in [lrfd, asd] {
            assert!(rules.accepts(Basis::Ultimate) && rules.accepts(Basis::Concentric));
            assert!(rules.accepts_law("lesik-kennedy") && !rules.accepts_law("rigid-plastic"));
            assert_eq!(rules.concentric.len(), 2);
            assert_eq!(rules.status(), Confirmation::Read);
        }
        assert_eq!(rule_set("nominal").unwrap().design, DesignFactor::None);
    }

    #[test]
    fn classes_have_the_strength_of_their_name() {
        assert!((electrode("E70").unwrap().strength - 70.0 * MPA_PER_KSI).abs() < 1e-12);
        assert!((electrode("E110").unwrap().strength - 110.0 * MPA_PER_KSI).abs() < 1e-12);
        assert!((electrode("E49").unwrap().strength - 490.0).abs() < 1e-12);
        assert_eq!(electrode("E42").unwrap().status, Confirmation::Recalled);
    }

    #[test]
    fn the_polynomial_is_one_at_its_peak_and_continuous() {
        let LawForm::LesikKennedy { curve: crate::model::Curve::Roots(curve), limit, .. } =
            law("lesik-kennedy-polynomial").unwrap().form
        else {
            panic!("a polynomial");
        };
        let value = |p: f64| -> f64 {
            curve.coefficients.iter().zip(1..).map(|(c, k)| c * p.powf(1.0 / f64::from(k))).sum()
        };
        assert!((value(1.0) - 1.0).abs() < 1e-9);
        assert!((value(curve.linear_to) - curve.slope * curve.linear_to).abs() < 5e-3);
        assert_eq!(limit.cap, None);
    }

    #[test]
    fn a_number_without_a_source_is_refused() {
        let text = include_str!("../../../data/rules/nominal.toml");
        assert!(rules::read(&text.replace("status = \"read\"", "status = \"sure\"")).is_err());
        assert!(rules::read(&text.replace("[longitudinal]", "[lengthwise]")).is_err());
        let unsourced: String = text
            .lines()
            .filter(|line| !line.starts_with("source ="))
            .fold(String::new(), |all, line| all + line + "\n");
        assert!(rules::read(&unsourced).is_err());
        assert!(cited("x", &["a", " "]).is_err());
    }
}

//! The self-check: every published case that the program ships is computed again and compared.
//!
//! ```text
//! data/cases/*.csv --case.rs--> PublishedCase --compute.rs--> computed  \
//! data/cases/tolerances.toml --tolerance.rs--> Tolerance, its reason    -> Outcome: passed or not
//! ```
//!
//! Each case becomes a `model::Joint` and takes the same way as the joint of a user: `analysis::analyse` with
//! its default settings, continuous weld, all equilibrium states searched for, the smallest load factor used.
//! A case without an answer has failed, with the reason; it never becomes a number.
//!
//! The comparison is with printed calculations, which shows that the published methods are carried out as
//! published. It says nothing about physical tests, nor about groups unlike those of the cases.

mod case;
mod compute;
mod quantity;
mod shape;
mod tolerance;

pub use case::PublishedCase;
pub use quantity::{Method, Quantity, Reading};
pub use shape::Shape;
pub use tolerance::{Allowance, Printed, Tolerance};

use crate::diagnostic::Diagnostic;
use crate::input::catalog;
use crate::model::{Discretisation, Law};
use rayon::prelude::*;
use tolerance::Tolerances;

/// The load-deformation law of the published tables.
const LAW: &str = "lesik-kennedy";
/// Why the law is at hand.
const PROOF_LAW: &str = "the law is shipped: the test `every_shipped_case_passes` uses it";
/// Why the embedded data have no fault.
const PROOF_DATA: &str = "embedded data, read by the test `every_shipped_case_passes`";

/// A published case with what became of it.
#[derive(Debug, Clone, PartialEq)]
pub struct Outcome {
    /// What is published.
    pub case: PublishedCase,
    /// How far the computed value may be from it, and why.
    pub tolerance: Tolerance,
    /// The computed value in the unit of the printed one, or why there is none.
    pub computed: Result<f64, String>,
}

impl Outcome {
    /// Computed over published.
    #[must_use]
    pub fn ratio(&self) -> Option<f64> {
        self.computed.as_ref().ok().map(|value| value / self.case.expected.value)
    }

    /// The greatest difference allowed, in the unit of the value.
    #[must_use]
    pub fn allowed(&self) -> f64 {
        self.tolerance.allowed(&self.case.expected)
    }

    /// The greatest difference allowed over the published value: how far the ratio may be from 1.
    #[must_use]
    pub fn allowed_ratio(&self) -> f64 {
        self.allowed() / self.case.expected.value
    }

    /// The difference over the greatest one allowed: more than 1 has failed.
    #[must_use]
    pub fn use_of_tolerance(&self) -> Option<f64> {
        let difference = |value: &f64| (value - self.case.expected.value).abs() / self.allowed();
        self.computed.as_ref().ok().map(difference)
    }

    /// Whether there is a computed value within the tolerance.
    #[must_use]
    pub fn passed(&self) -> bool {
        self.use_of_tolerance().is_some_and(|used| used <= 1.0)
    }
}

/// All cases with their outcomes.
#[derive(Debug, Clone, PartialEq)]
pub struct SelfCheck {
    /// In the order of the table.
    pub outcomes: Vec<Outcome>,
    /// The load-deformation law of the instantaneous-centre cases.
    pub law: Law,
    /// How the welds are integrated.
    pub discretisation: Discretisation,
    /// What the comparison says and does not say.
    pub remarks: Vec<String>,
}

impl SelfCheck {
    /// Whether every case passed.
    #[must_use]
    pub fn passed(&self) -> bool {
        self.outcomes.iter().all(Outcome::passed)
    }

    /// The cases that did not, in the order of the table.
    pub fn failures(&self) -> impl Iterator<Item = &Outcome> {
        self.outcomes.iter().filter(|outcome| !outcome.passed())
    }

    /// Identifiers of the rule sets the cases are computed under, in order of appearance.
    #[must_use]
    pub fn rules(&self) -> Vec<&'static str> {
        distinct(self.outcomes.iter().map(|outcome| outcome.case.rules()))
    }

    /// The documents, in order of appearance.
    #[must_use]
    pub fn sources(&self) -> Vec<&str> {
        distinct(self.outcomes.iter().map(|outcome| outcome.case.source.as_str()))
    }
}

/// What differs, in order of appearance.
fn distinct<'a>(texts: impl Iterator<Item = &'a str>) -> Vec<&'a str> {
    let mut found = Vec::new();
    for text in texts {
        if !found.contains(&text) {
            found.push(text);
        }
    }
    found
}

/// Computes every shipped case again.
#[must_use]
pub fn run() -> SelfCheck {
    run_on(catalog::PUBLISHED_CASES).expect(PROOF_DATA)
}

/// Computes every case of a table again, judged by the shipped tolerances.
///
/// # Errors
/// All faults of the table: what cannot be read is not judged.
pub fn run_on(table: &str) -> Result<SelfCheck, Vec<Diagnostic>> {
    let tolerances = Tolerances::read(catalog::CASE_TOLERANCES).expect(PROOF_DATA);
    let law = catalog::law(LAW).expect(PROOF_LAW);
    let cases = case::read(table)?;
    let (mut judged, mut faults) = (Vec::new(), Vec::new());
    for case in cases {
        match tolerances.of(case.method, case.reading, case.quantity) {
            Ok(tolerance) => judged.push((case, tolerance.clone())),
            Err(message) => faults.push(case::fault(None, format!("{}: {message}", case.id))),
        }
    }
    if !faults.is_empty() {
        return Err(faults);
    }
    // Each case is its own calculation and the order is kept, so the answer is that of one thread.
    let outcomes = judged
        .into_par_iter()
        .map(|(case, tolerance)| Outcome { computed: case.computed(law), case, tolerance })
        .collect();
    Ok(SelfCheck {
        outcomes,
        law: law.clone(),
        discretisation: compute::DISCRETISATION,
        remarks: tolerances.remarks,
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    /// The title line of the shipped table and the rows of these ids.
    fn rows(ids: &[&str]) -> String {
        let mut lines = catalog::PUBLISHED_CASES.lines();
        let titles = lines.next().unwrap().to_owned();
        let wanted = lines.filter(|line| ids.iter().any(|id| line.starts_with(&format!("{id},"))));
        [titles].into_iter().chain(wanted.map(str::to_owned)).map(|line| line + "\n").collect()
    }

    #[test]
    fn every_shipped_case_passes() {
        let check = run();
        let failed: Vec<_> = check.failures().map(|outcome| (&outcome.case.id, &outcome.computed)).collect();
        assert!(check.passed() && failed.is_empty(), "{failed:?}");
        assert_eq!(check.sources().len(), 4);
    }

    #[test]
    fn a_changed_value_fails_and_the_others_do_not() {
        // One case of each method, and the same with another printed value.
        let ids = ["DE16-II.A-26-A", "T8-8_k0.4_a0", "DE16-II.A-27-Ip", "BH-8.9"];
        let table = rows(&ids);
        assert!(run_on(&table).unwrap().passed());
        for (given, changed, id) in [
            (",1.88,", ",1.90,", ids[0]),
            (",3.80,", ",3.79,", ids[1]),
            (",385,", ",386,", ids[2]),
            (",4.538894,", ",4.538896,", ids[3]),
        ] {
            let check = run_on(&table.replace(given, changed)).unwrap();
            let failed: Vec<&str> = check.failures().map(|outcome| outcome.case.id.as_str()).collect();
            assert_eq!(failed, [id]);
            assert!(!check.passed());
        }
    }

    #[test]
    fn a_case_without_an_answer_fails_with_its_reason() {
        // A C whose horizontals have no length is refused by the model; an oblique load through the centroid of
        // a C has no concentric rule.
        let short = rows(&["T8-8_k0.1_a0.1"]).replace(",c,0.1,", ",c,0,");
        let oblique = rows(&["T8-8_k0.4_a0"]).replace(",,,0,,,,C,", ",,,30,,,,C,");
        for (table, reason) in [(short, "length of a run"), (oblique, "not exactly one rule")] {
            let check = run_on(&table).unwrap();
            let outcome = &check.outcomes[0];
            assert!(!check.passed() && outcome.ratio().is_none(), "{outcome:?}");
            assert!(outcome.computed.as_ref().unwrap_err().contains(reason), "{outcome:?}");
        }
    }

    #[test]
    fn a_number_that_is_none_never_passes() {
        let mut outcome = run_on(&rows(&["DE16-II.A-27-Ip"])).unwrap().outcomes.remove(0);
        outcome.computed = Ok(f64::NAN);
        assert!(!outcome.passed());
    }

    #[test]
    fn a_table_that_cannot_be_read_or_judged_is_refused() {
        let table = rows(&["DE16-II.A-27-Ip"]);
        assert!(run_on(&table.replace(",385,", ",,")).is_err());
        let faults = run_on(&table.replace(",printed,", ",interpolated,")).unwrap_err();
        assert!(faults[0].message.contains("DE16-II.A-27-Ip: no tolerance"), "{}", faults[0]);
    }
}

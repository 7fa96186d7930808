//! The values of a self-check by document, and within a document by tolerance: what shares a reason stands together.
//!
//! Documents are numbered 1, 2, ... and their groups 1.1, 1.2, ..., in order of appearance.

use crate::study::selfcheck::{Outcome, SelfCheck};

/// Values of one document under one tolerance; never empty.
pub(super) struct Group<'a> {
    /// Number, such as `1.2`.
    pub(super) number: String,
    /// The first of them: its method and tolerance are those of all.
    pub(super) first: &'a Outcome,
    /// All of them, the first included.
    pub(super) outcomes: Vec<&'a Outcome>,
}

/// The groups of one document.
pub(super) struct Document<'a> {
    /// Number.
    pub(super) number: usize,
    /// The document.
    pub(super) source: &'a str,
    /// Its groups.
    pub(super) groups: Vec<Group<'a>>,
}

/// The documents of a self-check.
pub(super) fn documents(check: &SelfCheck) -> Vec<Document<'_>> {
    let mut documents = Vec::new();
    for (index, source) in check.sources().into_iter().enumerate() {
        let number = index + 1;
        let mut groups: Vec<Group<'_>> = Vec::new();
        for outcome in check.outcomes.iter().filter(|outcome| outcome.case.source == source) {
            match groups.iter_mut().find(|group| group.first.tolerance.id == outcome.tolerance.id) {
                Some(group) => group.outcomes.push(outcome),
                None => groups.push(Group {
                    number: format!("{number}.{}", groups.len() + 1),
                    first: outcome,
                    outcomes: vec![outcome],
                }),
            }
        }
        documents.push(Document { number, source, groups });
    }
    documents
}

impl Group<'_> {
    /// What all its values share, if they do.
    pub(super) fn shared<'b, T: PartialEq>(&'b self, of: impl Fn(&'b Outcome) -> T) -> Option<T> {
        let first = of(self.first);
        self.outcomes.iter().all(|outcome| of(outcome) == first).then_some(first)
    }

    /// Least and greatest ratio of computed to published, of the values that were computed.
    pub(super) fn ratios(&self) -> Option<(f64, f64)> {
        let ratios = self.outcomes.iter().filter_map(|outcome| outcome.ratio());
        ratios.fold(None, |range, ratio| {
            let (least, greatest) = range.unwrap_or((ratio, ratio));
            Some((ratio.min(least), ratio.max(greatest)))
        })
    }

    /// Greatest use of the tolerance, of the values that were computed.
    pub(super) fn use_of_tolerance(&self) -> Option<f64> {
        self.outcomes.iter().filter_map(|outcome| outcome.use_of_tolerance()).reduce(f64::max)
    }

    /// Decimals with which ratios show two figures of the least tolerance, four at least.
    pub(super) fn decimals(&self) -> usize {
        let least = self.outcomes.iter().map(|outcome| outcome.allowed_ratio()).fold(f64::MAX, f64::min);
        (4..=12_u8).find(|decimals| least * 10.0_f64.powi(i32::from(*decimals)) >= 9.5).unwrap_or(12).into()
    }
}

//! What a reader asks of a sweep: does it hold, where is the elastic method farthest off, where does the
//! verdict change, what is wrong with the points that have no answer.

use super::{Answer, Jump, Point, PointCase, Sweep};
use crate::analysis::Status;
use crate::diagnostic::Diagnostic;
use crate::model::Basis;
use std::collections::BTreeMap;

/// Points, by index, at which the ratio of the two methods is extreme.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Extremes {
    /// Point of the largest ratio of ultimate over elastic, and the ratio.
    pub largest: (usize, f64),
    /// Point of the smallest ratio, and the ratio.
    pub smallest: (usize, f64),
}

/// Neighbouring points between which the verdict changes.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Crossing {
    /// The points, by index.
    pub points: [usize; 2],
    /// The utilisations of the joint at them.
    pub utilisation: [f64; 2],
    /// Whether the joint holds at the first of them, and so not at the second.
    pub holds_first: bool,
}

/// A fault and the points that have it.
#[derive(Debug, Clone, PartialEq)]
pub struct GroupedFault {
    /// The fault, as it reads at the first of the points.
    pub fault: Diagnostic,
    /// The points, by index.
    pub points: Vec<usize>,
}

impl PointCase {
    /// Utilisation by the verification that decides; 0 without a load, `None` without an answer.
    #[must_use]
    pub fn utilisation(&self) -> Option<f64> {
        match (&self.verification, self.demand) {
            (Some(verification), _) => Some(verification.utilisation),
            (None, None) => Some(0.0),
            (None, Some(_)) => None,
        }
    }

    /// Nominal load factor of the ultimate method over that of the elastic method.
    #[must_use]
    pub fn ultimate_over_elastic(&self) -> Option<f64> {
        Some(self.ultimate?.load_factor / self.elastic?.load_factor)
    }

    /// Size of the load times a factor, N or N mm; `None` when there is no load.
    #[must_use]
    pub fn load_times(&self, factor: f64) -> Option<f64> {
        self.demand.map(|demand| demand.size * factor)
    }
}

impl Answer {
    /// Utilisation of the governing case; `None` when some case has no answer.
    #[must_use]
    pub fn utilisation(&self) -> Option<f64> {
        self.cases.get(self.governing?)?.utilisation()
    }

    /// Whether the joint holds at this point.
    #[must_use]
    pub fn status(&self) -> Status {
        let breach = self.breached.then_some(Status::Exceeded);
        self.cases.iter().map(|case| case.status).chain(breach).max().unwrap_or(Status::Satisfied)
    }
}

impl Point {
    /// Whether the joint holds at this point; a joint with faults has no answer.
    #[must_use]
    pub fn status(&self) -> Status {
        self.outcome.as_ref().map_or(Status::NotSolved, Answer::status)
    }
}

impl Sweep {
    /// Name of the case that is shown.
    #[must_use]
    pub fn shown_name(&self) -> &str {
        self.cases.get(self.shown).map_or("", String::as_str)
    }

    /// The shown case at a point; `None` where the joint has faults.
    #[must_use]
    pub fn shown_case<'s>(&self, point: &'s Point) -> Option<&'s PointCase> {
        point.outcome.as_ref().ok()?.cases.get(self.shown)
    }

    /// Index, in each variable's values, of a point.
    #[must_use]
    pub fn indices(&self, point: usize) -> Vec<usize> {
        let mut rest = point;
        let mut indices: Vec<usize> = Vec::new();
        for variable in self.variables.iter().rev() {
            let length = variable.values.len().max(1);
            indices.push(rest % length);
            rest /= length;
        }
        indices.reverse();
        indices
    }

    /// The worst of all points: no answer, then exceeded, then satisfied.
    #[must_use]
    pub fn verdict(&self) -> Status {
        self.points.iter().map(Point::status).max().unwrap_or(Status::Satisfied)
    }

    /// Whether the load of the shown case is a moment at most of its points, rather than a force.
    #[must_use]
    pub fn in_moment(&self) -> bool {
        let demands = || self.points.iter().filter_map(|point| self.shown_case(point)?.demand);
        2 * demands().filter(|demand| demand.in_moment).count() > demands().count()
    }

    /// At how many points the shown case is loaded in the other measure.
    #[must_use]
    pub fn in_other_measure(&self) -> usize {
        let in_moment = self.in_moment();
        let demands = self.points.iter().filter_map(|point| self.shown_case(point)?.demand);
        demands.filter(|demand| demand.in_moment != in_moment).count()
    }

    /// Whether the utilisation of the joint follows a jump: the shown case, for which jumps are searched, decides on
    /// both sides by the ultimate analysis.
    #[must_use]
    pub fn decides_at(&self, jump: &Jump) -> bool {
        jump.points.iter().all(|index| {
            let answer = self.points.get(*index).and_then(|point| point.outcome.as_ref().ok());
            let case = answer.filter(|answer| answer.governing == Some(self.shown));
            let verification = case.and_then(|answer| answer.cases.get(self.shown)?.verification.as_ref());
            verification.is_some_and(|found| found.basis == Basis::Ultimate)
        })
    }

    /// At how many points the governing case is verified by an analysis.
    #[must_use]
    pub fn decided_by(&self, basis: Basis) -> usize {
        let decided = |point: &&Point| {
            let answer = point.outcome.as_ref().ok();
            let case = answer.and_then(|answer| answer.cases.get(answer.governing?));
            case.and_then(|case| case.verification.as_ref()).is_some_and(|found| found.basis == basis)
        };
        self.points.iter().filter(decided).count()
    }

    /// How many points have this status.
    #[must_use]
    pub fn count(&self, status: Status) -> usize {
        self.points.iter().filter(|point| point.status() == status).count()
    }

    /// Which cases govern, and at how many points each.
    #[must_use]
    pub fn governing_cases(&self) -> BTreeMap<usize, usize> {
        let mut counts = BTreeMap::new();
        for case in self.points.iter().filter_map(|point| point.outcome.as_ref().ok()?.governing) {
            *counts.entry(case).or_insert(0) += 1;
        }
        counts
    }

    /// How many points of the shown case have several equilibrium states at first rupture.
    #[must_use]
    pub fn with_several_states(&self) -> usize {
        self.shown_cases().filter(|case| case.states > 1).count()
    }

    /// How many points of the shown case may lack a state.
    #[must_use]
    pub fn incomplete(&self) -> usize {
        self.shown_cases().filter(|case| case.incomplete).count()
    }

    fn shown_cases(&self) -> impl Iterator<Item = &PointCase> {
        self.points.iter().filter_map(|point| self.shown_case(point))
    }

    /// The jump of largest relative change.
    #[must_use]
    pub fn largest_jump(&self) -> Option<&Jump> {
        self.jumps.iter().max_by(|a, b| a.relative_change().abs().total_cmp(&b.relative_change().abs()))
    }

    /// The largest and smallest ratio of the two methods in the shown case, each at its first point; `None`
    /// where no point has both.
    #[must_use]
    pub fn extremes(&self) -> Option<Extremes> {
        let mut found: Option<Extremes> = None;
        for (index, point) in self.points.iter().enumerate() {
            let ratio = self.shown_case(point).and_then(PointCase::ultimate_over_elastic);
            let Some(ratio) = ratio else { continue };
            let mut extremes =
                found.unwrap_or(Extremes { largest: (index, ratio), smallest: (index, ratio) });
            if ratio > extremes.largest.1 {
                extremes.largest = (index, ratio);
            }
            if ratio < extremes.smallest.1 {
                extremes.smallest = (index, ratio);
            }
            found = Some(extremes);
        }
        found
    }

    /// Neighbouring points of a single variable between which the joint ceases or begins to hold.
    #[must_use]
    pub fn crossings(&self) -> Vec<Crossing> {
        if self.variables.len() != 1 {
            return Vec::new();
        }
        let answered = |point: &Point| {
            let answer = point.outcome.as_ref().ok()?;
            Some((answer.status() == Status::Satisfied, answer.utilisation()?))
        };
        let crossing = |(index, pair): (usize, &[Point])| {
            let (before, after) = (answered(pair.first()?)?, answered(pair.get(1)?)?);
            let changes = before.0 != after.0;
            changes.then_some(Crossing {
                points: [index, index + 1],
                utilisation: [before.1, after.1],
                holds_first: before.0,
            })
        };
        self.points.windows(2).enumerate().filter_map(crossing).collect()
    }

    /// The faults of all points; those at one place of the file that accept the same are one, for the value
    /// found differs from point to point.
    #[must_use]
    pub fn faults(&self) -> Vec<GroupedFault> {
        let mut groups: Vec<GroupedFault> = Vec::new();
        for (index, point) in self.points.iter().enumerate() {
            for fault in point.outcome.as_ref().err().into_iter().flatten() {
                let known = groups.iter_mut().find(|group| same_fault(&group.fault, fault));
                match known {
                    Some(group) => group.points.push(index),
                    None => groups.push(GroupedFault { fault: fault.clone(), points: vec![index] }),
                }
            }
        }
        groups
    }
}

fn same_fault(a: &Diagnostic, b: &Diagnostic) -> bool {
    let same_message = a.place.is_some() || a.message == b.message;
    (&a.file, &a.place, &a.accepted) == (&b.file, &b.place, &b.accepted) && same_message
}

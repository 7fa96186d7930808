//! Points to answers.
//!
//! Points that share the values of all parameters share one weld group, and with it the atlas of its states.
//! Their loads are the cases of one joint, analysed at once in batches: the answers are those of single
//! analyses bit for bit, because the atlas depends on the group alone. Batches run in parallel.

use super::{Answer, Point, PointCase, Target, Variable, fault};
use crate::analysis::{CaseReport, Section, analyse_without_elements, governing};
use crate::diagnostic::Diagnostic;
use crate::input::Template;
use crate::model::{Joint, LoadCase};
use crate::study::load::{Wanted, varied};
use rayon::prelude::*;
use std::cmp::Ordering;
use std::sync::atomic::{self, AtomicUsize};

/// Points of one batch: enough that the atlas of a group costs little beside them, few enough that all cores
/// have work.
const BATCH: usize = 32;

/// What is to be solved at every point.
pub(super) struct Task<'a> {
    pub(super) template: &'a Template,
    pub(super) variables: &'a [Variable],
    /// Index of the one case to analyse; all when `None`.
    pub(super) only: Option<usize>,
}

impl Task<'_> {
    /// The cases of a joint that are analysed.
    pub(super) fn cases_of<'j>(&self, joint: &'j Joint) -> &'j [LoadCase] {
        match self.only {
            Some(index) => joint.cases.get(index..=index).unwrap_or_default(),
            None => &joint.cases,
        }
    }

    /// Refuses to vary the load of a case that has, as the file stands, a moment and no force.
    pub(super) fn refuse_cases_without_force(&self) -> Result<(), Vec<Diagnostic>> {
        let start: Vec<f64> = self.variables.iter().map(Variable::from).collect();
        self.cases_at(self.template.as_given(), &start).map(|_| ())
    }

    /// The cases of a joint with their loads as these values want them.
    fn cases_at(&self, joint: &Joint, values: &[f64]) -> Result<Vec<LoadCase>, Vec<Diagnostic>> {
        let mut wanted = Wanted::default();
        for (variable, value) in self.variables.iter().zip(values) {
            match variable.target {
                Target::Parameter => {}
                Target::LoadEccentricity => wanted.eccentricity = Some(*value),
                Target::LoadAngle => wanted.angle = Some(*value),
            }
        }
        let section = Section::of(&joint.group);
        let (mut changed, mut faults) = (Vec::new(), Vec::new());
        for case in self.cases_of(joint) {
            match varied(case, wanted, section.centroid, section.length) {
                Ok(case) => changed.push(case),
                Err(reason) => {
                    let hint = "choose a case with a force by `--case`, or vary a parameter".to_owned();
                    let message = format!("case `{}`: {reason}", case.name);
                    faults.push(Diagnostic { hint: Some(hint), ..fault("--vary", message) });
                }
            }
        }
        if faults.is_empty() { Ok(changed) } else { Err(faults) }
    }

    /// The points with these values, in their order.
    pub(super) fn solve(&self, values: &[Vec<f64>], progress: &(dyn Fn(usize) + Sync)) -> Vec<Point> {
        let mut order: Vec<usize> = (0..values.len()).collect();
        order.sort_by(|a, b| self.compare_parameters(&values[*a], &values[*b]));
        let same = |a: &usize, b: &usize| self.compare_parameters(&values[*a], &values[*b]).is_eq();
        let batches: Vec<&[usize]> = order.chunk_by(same).flat_map(|group| group.chunks(BATCH)).collect();
        let done = AtomicUsize::new(0);
        let solved: Vec<Vec<Outcome>> = batches
            .par_iter()
            .map(|batch| {
                let points: Vec<&[f64]> = batch.iter().map(|index| values[*index].as_slice()).collect();
                let outcomes = self.batch(&points);
                let before = done.fetch_add(batch.len(), atomic::Ordering::Relaxed);
                progress(before + batch.len());
                outcomes
            })
            .collect();
        let mut points: Vec<(usize, Point)> = order
            .iter()
            .zip(solved.into_iter().flatten())
            .map(|(index, outcome)| (*index, Point { values: values[*index].clone(), outcome }))
            .collect();
        points.sort_by_key(|(index, _)| *index);
        points.into_iter().map(|(_, point)| point).collect()
    }

    fn compare_parameters(&self, a: &[f64], b: &[f64]) -> Ordering {
        let of_parameters = self.variables.iter().zip(a.iter().zip(b));
        of_parameters
            .filter(|(variable, _)| !variable.is_of_load())
            .map(|(_, (a, b))| a.total_cmp(b))
            .find(|order| order.is_ne())
            .unwrap_or(Ordering::Equal)
    }

    /// Points with the same values of all parameters.
    fn batch(&self, points: &[&[f64]]) -> Vec<Outcome> {
        let Some(first) = points.first() else { return Vec::new() };
        let parameters: Vec<(&str, f64)> = self
            .variables
            .iter()
            .zip(*first)
            .filter(|(variable, _)| !variable.is_of_load())
            .map(|(variable, value)| (variable.name.as_str(), *value))
            .collect();
        let mut joint = match self.template.joint(&parameters) {
            Ok(joint) => joint,
            Err(faults) => return points.iter().map(|_| Err(faults.clone())).collect(),
        };
        let cases: Vec<Result<Vec<LoadCase>, Vec<Diagnostic>>> =
            points.iter().map(|values| self.cases_at(&joint, values)).collect();
        joint.cases = cases.iter().flatten().flatten().cloned().collect();
        let report = analyse_without_elements(&joint);
        let breached = report.breached();
        let mut rest = report.cases.as_slice();
        let mut outcomes = Vec::new();
        for cases in cases {
            outcomes.push(cases.map(|cases| {
                let (own, others) = rest.split_at(cases.len().min(rest.len()));
                rest = others;
                let governing = governing(own);
                Answer {
                    cases: own.iter().map(|case| point_case(case, &joint)).collect(),
                    governing,
                    breached,
                }
            }));
        }
        outcomes
    }
}

type Outcome = Result<Answer, Vec<Diagnostic>>;

/// What is kept of the report of a case.
fn point_case(case: &CaseReport, joint: &Joint) -> PointCase {
    let ultimate = case.ultimate();
    PointCase {
        status: case.status,
        demand: case.demand(),
        ultimate: case.ultimate_strength(joint),
        elastic: case.elastic_strength(joint),
        peak_load_factor: ultimate.and_then(|answer| answer.peak_load_factor),
        states: ultimate.map_or(0, |answer| answer.states.len()),
        incomplete: ultimate.is_some_and(|answer| answer.incomplete),
        centre: ultimate.and_then(|answer| answer.governing().centre),
        verification: case.verification.clone(),
        not_solved: case.not_solved().map(|failure| failure.reason.to_string()),
    }
}

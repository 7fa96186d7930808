//! Strength by both methods while one or two variables run through their values.
//!
//! | file | holds |
//! |---|---|
//! | here | what a sweep is, and its order of work |
//! | `solve` | points to answers: each exactly that of `analyse` on the joint at that point |
//! | `jumps` | where the ultimate strength jumps between neighbouring points |
//! | `questions` | what a reader asks: verdict, extremes, crossings, faults |
//!
//! A variable is a parameter of the joint file, or the angle or eccentricity of the load (`study::load`). The
//! load names vary every case that is analysed, each about its own point of application.

mod jumps;
mod questions;
mod solve;

pub use crate::input::{Target, Variable};
pub use jumps::Jump;
pub use questions::{Crossing, Extremes, GroupedFault};

use crate::analysis::{Demand, Status, Strength, Verification, analyse};
use crate::diagnostic::{Diagnostic, Severity};
use crate::input::Template;
use crate::model::Joint;
use solve::Task;
use std::collections::BTreeMap;

/// What one case says at one point.
#[derive(Debug, Clone, PartialEq)]
pub struct PointCase {
    /// Whether it holds.
    pub status: Status,
    /// Size of the given load, N or N mm; `None` when there is no load.
    pub demand: Option<Demand>,
    /// Instantaneous-centre method; `None` without a load or an answer.
    pub ultimate: Option<Strength>,
    /// Elastic vector method; `None` without a load.
    pub elastic: Option<Strength>,
    /// Largest load factor on the path from zero load; `None` where the path was lost.
    pub peak_load_factor: Option<f64>,
    /// Equilibrium states at first rupture that were found.
    pub states: usize,
    /// Whether the search saw signs of a state that it could not find.
    pub incomplete: bool,
    /// Instantaneous centre of the reported state, mm; `None` for a pure translation or without an answer.
    pub centre: Option<[f64; 2]>,
    /// What decides the case; `None` without a load or an answer.
    pub verification: Option<Verification>,
    /// Why the ultimate analysis has no answer, in words.
    pub not_solved: Option<String>,
}

/// What all cases say at one point.
#[derive(Debug, Clone, PartialEq)]
pub struct Answer {
    /// One for each of [`Sweep::cases`].
    pub cases: Vec<PointCase>,
    /// Index of the case of largest utilisation; `None` when some case has no answer.
    pub governing: Option<usize>,
    /// Whether some rule of detailing is broken.
    pub breached: bool,
}

/// One point of a sweep.
#[derive(Debug, Clone, PartialEq)]
pub struct Point {
    /// The value of each variable, inside units.
    pub values: Vec<f64>,
    /// The answers, or the faults of the joint with these values.
    pub outcome: Result<Answer, Vec<Diagnostic>>,
}

/// A sweep with its answers.
#[derive(Debug, Clone, PartialEq)]
pub struct Sweep {
    /// The joint as the file stands.
    pub joint: Joint,
    /// What is varied, one or two.
    pub variables: Vec<Variable>,
    /// Names of the cases analysed: the one asked for, or all of the joint.
    pub cases: Vec<String>,
    /// Index in `cases` of the case that is shown: the one asked for, else the one that governs at most points, else
    /// the governing one of the joint as it stands.
    pub shown: usize,
    /// The points; the first variable runs slowest.
    pub points: Vec<Point>,
    /// Where the ultimate strength of the shown case jumps between neighbouring points.
    pub jumps: Vec<Jump>,
}

/// Analyses the joint at every point of the variables, in parallel; the answer does not depend on the number of
/// threads.
///
/// `case` names the one case to analyse; `None` means all. `progress` hears how many points are done, and, beyond
/// their number, how many more analyses the search for jumps took.
///
/// # Errors
/// A case that does not exist; a load name varied for a case without a force.
pub fn sweep(
    template: &Template,
    variables: &[Variable],
    case: Option<&str>,
    progress: &(dyn Fn(usize) + Sync),
) -> Result<Sweep, Vec<Diagnostic>> {
    let joint = template.as_given();
    let only = case.map(|name| case_index(joint, name)).transpose()?;
    let task = Task { template, variables, only };
    task.refuse_cases_without_force()?;
    let cases: Vec<String> = task.cases_of(joint).iter().map(|case| case.name.clone()).collect();
    let points = task.solve(&grid(variables), progress);
    let as_given = || analyse(joint).governing.unwrap_or(0);
    let shown = if only.is_some() { 0 } else { most_governing(&points).unwrap_or_else(as_given) };
    let jumps = jumps::find(&task, &points, shown, progress);
    Ok(Sweep { joint: joint.clone(), variables: variables.to_vec(), cases, shown, points, jumps })
}

/// The case that governs at most points; the first of equals.
fn most_governing(points: &[Point]) -> Option<usize> {
    let mut counts: BTreeMap<usize, usize> = BTreeMap::new();
    for case in points.iter().filter_map(|point| point.outcome.as_ref().ok()?.governing) {
        *counts.entry(case).or_default() += 1;
    }
    let most = counts.values().max()?;
    counts.iter().find(|(_, count)| *count == most).map(|(case, _)| *case)
}

/// All combinations of values, the first variable slowest.
fn grid(variables: &[Variable]) -> Vec<Vec<f64>> {
    let mut grid = vec![Vec::new()];
    for variable in variables {
        let longer = |point: &Vec<f64>| {
            let point = point.clone();
            variable.values.iter().map(move |value| [point.as_slice(), &[*value]].concat())
        };
        grid = grid.iter().flat_map(longer).collect();
    }
    grid
}

fn case_index(joint: &Joint, name: &str) -> Result<usize, Vec<Diagnostic>> {
    let found = joint.cases.iter().position(|case| case.name == name);
    found.ok_or_else(|| {
        let noun = if joint.combined { "combination" } else { "case" };
        let names: Vec<String> = joint.cases.iter().map(|case| format!("`{}`", case.name)).collect();
        let accepted = Some(names.join(", "));
        vec![Diagnostic { accepted, ..fault("--case", format!("there is no {noun} `{name}`")) }]
    })
}

/// A fault of an option.
fn fault(option: &str, message: String) -> Diagnostic {
    Diagnostic {
        severity: Severity::Fault,
        file: option.to_owned(),
        place: None,
        message,
        accepted: None,
        hint: None,
    }
}

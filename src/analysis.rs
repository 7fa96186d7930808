//! The whole calculation of one joint, from a [`Joint`] to a [`Report`]: [`analyse`] is the pipeline.
//!
//! joint -> plane group -> per case: elastic and ultimate analysis -> checks -> verification -> element table
//! -> findings. The methods, their equations and sources are described in `mechanics`, `solvers` and `verify`.

mod comparison;
mod elements;
mod findings;
mod pipeline;

pub use crate::mechanics::Section;
pub use crate::verify::{Check, Demand, Verification};
pub use comparison::{Coefficients, Strength};
pub use pipeline::{analyse, analyse_with, analyse_without_elements, governing};

use crate::model::{Joint, Vector, Wrench};
use crate::solvers::{Elastic, NotSolved, Ultimate};

/// Whether a case holds, from good to bad: the worst of several is their maximum.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum Status {
    /// Every verification satisfied.
    Satisfied,
    /// Some verification exceeded.
    Exceeded,
    /// No answer.
    NotSolved,
}

/// Forces on one element (reporting cell) of the weld at the given load, about the weld centroid.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct CellForce {
    /// Force, N.
    pub force: Vector,
    /// Moment about the weld centroid, N mm.
    pub moment: Vector,
    /// Force per length at the middle (all sides), N/mm.
    pub force_per_length: f64,
}

/// One row of the element table.
#[derive(Debug, Clone, PartialEq)]
pub struct ElementRow {
    /// Index of the weld.
    pub weld: usize,
    /// Index of the run in its weld.
    pub run: usize,
    /// Number of the element in its weld, from 1.
    pub element: usize,
    /// Middle of the element, mm.
    pub at: Vector,
    /// Length, mm.
    pub length: f64,
    /// Angle between displacement and weld axis at the middle, rad.
    pub angle: Option<f64>,
    /// Displacement at first rupture, mm.
    pub deformation: Option<f64>,
    /// Displacement over its rupture limit.
    pub deformation_ratio: Option<f64>,
    /// Ultimate method, at the given load; `None` where that analysis has no answer.
    pub ultimate: Option<CellForce>,
    /// Elastic method, at the given load.
    pub elastic: CellForce,
    /// Greatest elastic stress over strength within the element, as a share of the peak over the group.
    pub elastic_ratio: f64,
}

/// The analyses of one load case.
#[derive(Debug, Clone, PartialEq)]
pub enum Analyses {
    /// The load is zero: nothing to resist.
    Unloaded,
    /// The load was analysed.
    Loaded {
        /// Instantaneous-centre method.
        ultimate: Result<Ultimate, NotSolved>,
        /// Elastic vector method.
        elastic: Elastic,
    },
}

/// Everything about one load case.
#[derive(Debug, Clone, PartialEq)]
pub struct CaseReport {
    /// Name of the case or combination.
    pub name: String,
    /// The given load about the weld centroid.
    pub load: Wrench,
    /// Whether it holds.
    pub status: Status,
    /// What decides it; `None` when not solved.
    pub verification: Option<Verification>,
    /// The analyses.
    pub analyses: Analyses,
    /// All verifications, the governing one first.
    pub checks: Vec<Check>,
    /// Element table.
    pub elements: Vec<ElementRow>,
}

/// How grave a finding is.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum Grade {
    /// A rule is broken.
    Breach,
    /// Something a responsible engineer must weigh.
    Caution,
    /// Something good to know.
    Note,
}

/// An engineering remark.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Finding {
    /// How grave.
    pub grade: Grade,
    /// Clause or origin; empty when none.
    pub clause: String,
    /// What it concerns.
    pub subject: String,
    /// One or two sentences.
    pub message: String,
}

/// Everything about one joint.
#[derive(Debug, Clone, PartialEq)]
pub struct Report {
    /// The joint as given.
    pub joint: Joint,
    /// Line properties.
    pub section: Section,
    /// Results by case.
    pub cases: Vec<CaseReport>,
    /// Index of the governing case; `None` when some case has no answer.
    pub governing: Option<usize>,
    /// Remarks.
    pub findings: Vec<Finding>,
}

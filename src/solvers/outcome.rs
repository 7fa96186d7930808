//! What a solver answers: a solution with its evidence, or the reason why there is none.

use crate::mechanics::{PlaneGroup, Triple};
use crate::model::Vector;
use thiserror::Error;

/// A small rigid motion of the moving part, in the plane.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Motion {
    /// Translation of the weld centroid, mm.
    pub translation: [f64; 2],
    /// Rotation about z, rad.
    pub rotation: f64,
}

impl Motion {
    /// The motion of a scaled triple (v_x, v_y, omega rho).
    pub(super) fn of(group: &PlaneGroup, q: &Triple) -> Self {
        Self { translation: [q.x, q.y], rotation: q.z / group.gyration }
    }
}

/// A point of the weld that decides a result.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Place {
    /// Index of the weld in its group.
    pub weld: usize,
    /// Index of the run in its weld.
    pub run: usize,
    /// Coordinates, mm.
    pub at: Vector,
}

/// The point that ruptures first.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Rupture {
    /// Where.
    pub place: Place,
    /// Angle between displacement and weld axis, rad.
    pub angle: f64,
    /// Displacement, mm.
    pub deformation: f64,
    /// Displacement at rupture, mm.
    pub limit: f64,
}

/// One equilibrium state at first rupture.
#[derive(Debug, Clone, PartialEq)]
pub struct State {
    /// What multiplies the given load to give this state's load.
    pub load_factor: f64,
    /// The motion. For a law without deformation limit its size is arbitrary (largest displacement 1 mm).
    pub motion: Motion,
    /// Instantaneous centre, mm; `None` for a pure translation.
    pub centre: Option<[f64; 2]>,
    /// The rupturing point; `None` for a law without deformation limit.
    pub critical: Option<Rupture>,
    /// Relative unbalance of equilibrium, |W(q) - lambda L| / |lambda L| with moments over the gyration radius.
    pub residual: f64,
    /// Estimate of the relative error left in the load factor.
    pub error_estimate: f64,
    /// Newton steps taken.
    pub iterations: usize,
}

/// The answer of the ultimate analysis.
#[derive(Debug, Clone, PartialEq)]
pub struct Ultimate {
    /// All states found, by increasing load factor; never empty.
    pub states: Vec<State>,
    /// Largest load factor on the path from zero load to first rupture; `None` when the path was lost.
    pub peak_load_factor: Option<f64>,
    /// Index in `states` of the state the path from zero load leads to.
    pub reached: Option<usize>,
    /// Whether the search saw signs of a state that it could not find; false where only one was looked for.
    pub incomplete: bool,
}

impl Ultimate {
    /// The published result: the state of smallest load factor.
    #[must_use]
    pub fn governing(&self) -> &State {
        &self.states[0]
    }
}

/// Why there is no answer.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Error)]
pub enum Reason {
    /// No motion of the group resists this load.
    #[error("no motion of the welds resists this load")]
    NoResistance,
    /// The iteration and the fallback search both stalled.
    #[error("the search for equilibrium stalled")]
    Stalled,
    /// The requested tolerance was not reached.
    #[error("the requested tolerance was not reached")]
    Tolerance,
    /// A number left the range of the arithmetic.
    #[error("a number left the range of the arithmetic")]
    NotFinite,
}

/// A run that ended without an answer, with what was tried.
#[derive(Debug, Clone, PartialEq, Error)]
#[error("not solved: {reason} (best residual {residual:.1e} after {} attempts)", trace.len())]
pub struct NotSolved {
    /// Why.
    pub reason: Reason,
    /// Smallest relative unbalance met.
    pub residual: f64,
    /// The motion it was met at.
    pub best: Option<Motion>,
    /// Residual at the end of each attempt.
    pub trace: Vec<f64>,
}

/// The point that governs the elastic method.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct ElasticPeak {
    /// Where.
    pub place: Place,
    /// Force per length of weld (all sides) at the given load, N/mm.
    pub force_per_length: Vector,
}

/// The answer of the elastic vector method.
#[derive(Debug, Clone, PartialEq)]
pub struct Elastic {
    /// What multiplies the given load to bring the worst point to its strength.
    pub load_factor: f64,
    /// The worst point.
    pub critical: ElasticPeak,
    /// Displacement field per unit stiffness that resists the given load: stress = v + omega x (x - c), MPa.
    pub stress_motion: Motion,
}

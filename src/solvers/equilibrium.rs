//! Newton's method for equilibrium at first rupture.
//!
//! Unknown are the motion q (three numbers) and the load lambda along the unit load direction L:
//!
//! `W(q) - lambda L = 0`, `g(q) = 1`
//!
//! One step solves `[K, -L; (dg/dq)^T, 0] (dq, d lambda) = -(W - lambda L, 0)`; then q is scaled back to
//! rupture, which keeps `g = 1` exactly. The step is halved until the unbalance falls (safeguard). The
//! functions are only piecewise smooth: the rupturing point may change; the derivative of the piece at hand is
//! an element of the generalised Jacobian, so this is a semismooth Newton method (Qi and Sun, Math. Program. 58
//! (1993) 353).
//!
//! | symbol | code | unit | meaning |
//! |---|---|---|---|
//! | L | `direction` | - | unit load (F_x, F_y, M / rho) |
//! | lambda | `load` | N | size of the load carried along L |
//! | - | `unbalance` | - | `|W / |W| - L|`, zero in equilibrium |

use crate::mechanics::law::ruptures;
use crate::mechanics::{PlaneGroup, Quadrature, Resultant, Triple, Utmost};
use nalgebra::{Matrix3, Matrix4, Vector4};

/// A motion at first rupture and what it carries.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Iterate {
    /// Motion, scaled to rupture.
    pub q: Triple,
    /// The rupturing point.
    pub utmost: Utmost,
    /// Wrench and tangent.
    pub resultant: Resultant,
    /// Component of the wrench along the load direction, N.
    pub load: f64,
    /// `|W / |W| - L|`.
    pub unbalance: f64,
}

/// How the iteration is run.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct NewtonSettings {
    /// Unbalance at which the iteration may stop. Rounding leaves about 1e-15, so 1e-13 costs one step at most.
    pub unbalance: f64,
    /// Most steps. Convergence is quadratic; 5 to 8 steps are usual.
    pub steps: usize,
    /// Most halvings of one step before it is given up.
    pub halvings: usize,
    /// Deformation ratio g at which equilibrium is sought: 1 at rupture, less on the way to it.
    pub ratio: f64,
}

impl Default for NewtonSettings {
    fn default() -> Self {
        Self { unbalance: 1e-13, steps: 40, halvings: 12, ratio: 1.0 }
    }
}

impl Iterate {
    /// The state in the direction of `q`, scaled to rupture; `None` when q moves nothing.
    #[must_use]
    pub fn at(group: &PlaneGroup, q: &Triple, direction: &Triple, quadrature: &Quadrature) -> Option<Self> {
        Self::at_ratio(group, q, direction, quadrature, 1.0)
    }

    /// The state in the direction of `q`, scaled to the deformation ratio `ratio`.
    fn at_ratio(
        group: &PlaneGroup,
        q: &Triple,
        direction: &Triple,
        quadrature: &Quadrature,
        ratio: f64,
    ) -> Option<Self> {
        let utmost = group.utmost(q)?;
        let scale = ratio / utmost.ratio;
        let q = q * scale;
        let utmost = Utmost { ratio, deformation: utmost.deformation * scale, ..utmost };
        let mut resultant = group.resultant(&q, quadrature);
        if !ruptures(&group.law) {
            resultant.tangent = group.resultant(&nudged(&q), quadrature).tangent;
        }
        let size = resultant.wrench.norm();
        let unbalance = (resultant.wrench / size - direction).norm();
        let load = resultant.wrench.dot(direction);
        unbalance.is_finite().then_some(Self { q, utmost, resultant, load, unbalance })
    }

    /// The Newton step in q and lambda; `None` when the linear system is singular.
    #[must_use]
    pub fn step(&self, direction: &Triple) -> Option<(Triple, f64)> {
        let solution = bordered(self, direction).lu().solve(&unbalanced(self, direction))?;
        solution.iter().all(|value| value.is_finite()).then_some((solution.xyz(), solution.w))
    }
}

/// A motion a little aside of `q`.
///
/// A law that jumps to full strength at the slightest displacement gives the wrench a tangent that no quadrature
/// sees while the centre lies exactly on the weld: the force beside it turns round where the centre moves. A
/// little aside the turn is resolved, and the tangent there serves Newton's method as well.
fn nudged(q: &Triple) -> Triple {
    q + Triple::new(0.5, 0.7, 0.5) * (NUDGE * q.norm())
}

/// Size of the nudge over that of the motion: large against the smallest panels (1e-9), small against the motion.
const NUDGE: f64 = 1e-6;

/// The matrix `[K, -L; (dg/dq)^T, 0]`, rows of force scaled by the wrench, columns by the motion.
fn bordered(state: &Iterate, direction: &Triple) -> Matrix4<f64> {
    framed(&state.resultant.tangent, direction, &(state.utmost.gradient * state.load.abs()), 0.0)
}

/// The matrix `[K, -L; r^T, corner]`.
pub(super) fn framed(tangent: &Matrix3<f64>, load: &Triple, row: &Triple, corner: f64) -> Matrix4<f64> {
    let mut matrix = Matrix4::zeros();
    matrix.fixed_view_mut::<3, 3>(0, 0).copy_from(tangent);
    matrix.fixed_view_mut::<3, 1>(0, 3).copy_from(&(-load));
    matrix.fixed_view_mut::<1, 3>(3, 0).copy_from(&row.transpose());
    matrix[(3, 3)] = corner;
    matrix
}

fn unbalanced(state: &Iterate, direction: &Triple) -> Vector4<f64> {
    let gap = direction * state.load - state.resultant.wrench;
    Vector4::new(gap.x, gap.y, gap.z, 0.0)
}

/// Where an iteration ended.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Ending {
    /// Last iterate: the one of smallest unbalance.
    pub state: Iterate,
    /// Steps taken.
    pub steps: usize,
    /// Whether the unbalance fell below what was asked.
    pub converged: bool,
}

/// Iterates from the motion `start`; `None` when the start moves nothing.
#[must_use]
pub fn newton(
    group: &PlaneGroup,
    start: &Triple,
    direction: &Triple,
    quadrature: &Quadrature,
    settings: &NewtonSettings,
) -> Option<Ending> {
    let mut state = Iterate::at_ratio(group, start, direction, quadrature, settings.ratio)?;
    for steps in 0..settings.steps {
        if state.unbalance <= settings.unbalance {
            return Some(Ending { state, steps, converged: true });
        }
        match improved(group, &state, direction, quadrature, settings) {
            Some(better) => state = better,
            None => {
                return Some(Ending {
                    state,
                    steps,
                    converged: state.unbalance <= ROUNDING * settings.unbalance,
                });
            }
        }
    }
    Some(Ending { state, steps: settings.steps, converged: state.unbalance <= ROUNDING * settings.unbalance })
}

/// A stalled iterate counts as converged up to this many times the unbalance asked for: near a centre on the
/// weld rounding leaves more than elsewhere.
const ROUNDING: f64 = 100.0;

/// The Newton step, halved until the unbalance falls; `None` when no fraction of it helps.
fn improved(
    group: &PlaneGroup,
    state: &Iterate,
    direction: &Triple,
    quadrature: &Quadrature,
    settings: &NewtonSettings,
) -> Option<Iterate> {
    let (dq, _) = state.step(direction)?;
    let mut fraction = 1.0_f64.min(LONGEST_STEP * state.q.norm() / dq.norm());
    for _ in 0..settings.halvings {
        let moved = state.q + dq * fraction;
        if let Some(trial) = Iterate::at_ratio(group, &moved, direction, quadrature, settings.ratio)
            && trial.unbalance < (1.0 - 0.1 * fraction) * state.unbalance
        {
            return Some(trial);
        }
        fraction *= 0.5;
    }
    None
}

/// Longest step over the size of the motion: beyond it the direction of q turns by more than 45 degrees.
const LONGEST_STEP: f64 = 1.0;

/// Sign and size of the Jacobian of the map from motions at rupture to load directions: the determinant of
/// the bordered matrix with the load along W itself. Positive where the map keeps orientation.
#[must_use]
pub fn orientation(resultant: &Resultant, utmost: &Utmost) -> f64 {
    framed(&resultant.tangent, &resultant.wrench.normalize(), &utmost.gradient, 0.0).determinant()
}

impl Iterate {
    /// Relative error of the load that the last unbalance and rounding leave: the Newton step in lambda, and
    /// machine epsilon times the condition of lambda against the wrench.
    #[must_use]
    pub fn load_error(&self, direction: &Triple) -> f64 {
        let Some(inverse) = bordered(self, direction).try_inverse() else { return f64::INFINITY };
        let step = inverse * unbalanced(self, direction);
        let condition = inverse.fixed_view::<1, 3>(3, 0).norm() * self.resultant.wrench.norm();
        (step.w.abs() + ROUNDING_UNITS * f64::EPSILON * condition) / self.load.abs()
    }
}

/// Rounding of a wrench in units of machine epsilon: sums of some hundred terms of one sign leave a few.
const ROUNDING_UNITS: f64 = 8.0;

//! The equilibrium path from zero load to the rupture of the first element, and the largest load on it.
//!
//! With the load direction L fixed, `W(q) - lambda L = 0` is a curve in the four numbers (q, lambda). It is
//! followed by pseudo-arclength continuation, so that load and deformation may both turn back:
//!
//! * tangent t: the null vector of `[K, -L]`, oriented along the way come;
//! * predictor: one step along t;
//! * corrector: Newton on `[K, -L; t^T]`, which keeps the length of the step.
//!
//! `det [K, -L; t^T]` keeps its sign along a regular path: a step over which it changes is taken shorter, lest it
//! leap to another branch that runs close by.
//!
//! The path starts at a small deformation ratio (the tangent at zero is infinite) and ends where
//! `g(q) = max |u| / Delta_u` reaches 1 for the first time. A maximum of lambda is where `t_lambda` changes
//! sign; it is closed in on by root finding on the step length. Where that loses the path, it is climbed by
//! levels of the deformation ratio instead.
//!
//! | symbol | code | unit | meaning |
//! |---|---|---|---|
//! | g | `ratio` | - | largest deformation over its limit |
//! | lambda | `load` | N | load along L |
//! | t | `tangent` | - | direction of the path; q over a typical motion, lambda over a typical load |
//!
//! Source: E. Riks, J. Appl. Mech. 39 (1972) 1060 (continuation by arc length).

use super::equilibrium::{Iterate, NewtonSettings, framed, newton};
use crate::mechanics::{PlaneGroup, Quadrature, Triple};
use crate::numerics::{maximise, root};
use nalgebra::{Matrix4, Vector4};

/// How the path is followed.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct PathSettings {
    /// Deformation ratio of the first point. Below it the load grows with the deformation for every law.
    pub first_ratio: f64,
    /// Longest step, in units of the motion and load at rupture: short against the scale of the curve's hump.
    pub longest_step: f64,
    /// Shortest step before the path is given up.
    pub shortest_step: f64,
    /// Most steps.
    pub steps: usize,
}

impl Default for PathSettings {
    fn default() -> Self {
        Self { first_ratio: 0.02, longest_step: 0.08, shortest_step: 1e-6, steps: 2000 }
    }
}

/// What was met on the path.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Path {
    /// Largest load along the load direction, N.
    pub peak: f64,
    /// Motion at first rupture.
    pub last: Triple,
    /// Load at first rupture, N.
    pub last_load: f64,
}

/// A point of the path: motion over a typical motion, load over a typical load.
type Point = Vector4<f64>;

struct Follower<'a> {
    group: &'a PlaneGroup,
    direction: Triple,
    quadrature: Quadrature,
    motion_scale: f64,
    load_scale: f64,
}

/// Follows the path along the unit load `direction` from zero load to first rupture.
///
/// `typical` is a state at rupture (its motion and load): it scales the path and starts it. `None` when the
/// path is lost.
#[must_use]
pub fn follow(
    group: &PlaneGroup,
    direction: &Triple,
    typical: (&Triple, f64),
    settings: &PathSettings,
) -> Option<Path> {
    let follower = Follower {
        group,
        direction: *direction,
        quadrature: Quadrature::fine(6),
        motion_scale: typical.0.norm(),
        load_scale: typical.1,
    };
    follower.run(typical.0, settings).or_else(|| follower.climb(typical.0, settings))
}

impl Follower<'_> {
    fn run(&self, typical: &Triple, settings: &PathSettings) -> Option<Path> {
        let mut point = self.first(typical, settings.first_ratio)?;
        let (mut tangent, mut side) = self.heading(&point, None)?;
        let mut peak = point.w;
        let mut step = settings.first_ratio.min(settings.longest_step);
        for _ in 0..settings.steps {
            let Some(next) = self.corrected(&(point + tangent * step), &tangent) else {
                step *= 0.5;
                if step < settings.shortest_step {
                    return None;
                }
                continue;
            };
            let (next_tangent, next_side) = self.heading(&next, Some(&tangent))?;
            let bends = next_tangent.dot(&tangent) < MOST_BEND && step > settings.shortest_step;
            let leaps = next_side != side && step > LEAST_LEAP;
            if bends || leaps {
                step *= 0.5;
                continue;
            }
            side = next_side;
            let ruptured = if self.ratio(&next) >= 1.0 {
                Some(step)
            } else {
                self.hump((&point, &tangent), (&next, &next_tangent), step)
            };
            if let Some(length) = ruptured {
                return self.end(&point, &tangent, length, peak);
            }
            if tangent.w > 0.0 && next_tangent.w < 0.0 {
                peak = peak.max(self.summit(&point, &tangent, step)?);
            }
            peak = peak.max(next.w);
            (point, tangent) = (next, next_tangent);
            let near_rupture = self.ratio(&point) > NEAR_RUPTURE;
            let share = if near_rupture { STEP_NEAR_RUPTURE } else { 1.0 };
            step = (1.5 * step).min(share * settings.longest_step);
        }
        None
    }

    /// The length within a step to the greatest deformation ratio, where that rises, reaches 1 and falls again:
    /// inside a fold the group ruptures for a short stretch that both ends of a step can leave out.
    fn hump(&self, from: (&Point, &Point), to: (&Point, &Point), step: f64) -> Option<f64> {
        if self.rise(from.0, from.1) <= 0.0 || self.rise(to.0, to.1) >= 0.0 {
            return None;
        }
        let rise = |length: f64| {
            self.corrected(&(from.0 + from.1 * length), from.1)
                .and_then(|at| Some(self.rise(&at, &self.tangent(&at, Some(from.1))?)))
                .unwrap_or(f64::NAN)
        };
        let length = root(rise, 0.0, step)?;
        let at = self.corrected(&(from.0 + from.1 * length), from.1)?;
        (self.ratio(&at) >= 1.0).then_some(length)
    }

    /// Change of the deformation ratio along the path.
    fn rise(&self, at: &Point, tangent: &Point) -> f64 {
        let utmost = self.group.utmost(&(at.xyz() * self.motion_scale));
        utmost.map_or(0.0, |utmost| utmost.gradient.dot(&tangent.xyz()))
    }

    /// The path by levels of the deformation ratio, each solved from the one below by the damped Newton method.
    ///
    /// It cannot turn back, but passes points where the equations have a kink all along the path (a ring that
    /// turns about its centre: theta is zero everywhere).
    fn climb(&self, typical: &Triple, settings: &PathSettings) -> Option<Path> {
        let mut levels = Vec::new();
        let mut q = *typical;
        let mut ratio = settings.first_ratio;
        loop {
            let state = self.at_ratio(&q, ratio)?;
            q = state.q;
            levels.push((ratio, state));
            if ratio >= 1.0 {
                break;
            }
            ratio = (ratio + 0.5 * settings.longest_step).min(1.0);
        }
        let load = |index: usize| levels[index].1.load;
        let highest = (0..levels.len()).max_by(|a, b| load(*a).total_cmp(&load(*b)))?;
        let mut peak = load(highest);
        if highest > 0 && highest + 1 < levels.len() {
            let (from, to) = (levels[highest - 1].0, levels[highest + 1].0);
            let height =
                |ratio: f64| self.at_ratio(&levels[highest].1.q, ratio).map_or(0.0, |state| state.load);
            peak = peak.max(maximise(height, from, to).1);
        }
        let last = levels.last()?.1;
        Some(Path { peak, last: last.q, last_load: last.load })
    }

    /// Closes in on first rupture within the last step.
    fn end(&self, point: &Point, tangent: &Point, step: f64, peak: f64) -> Option<Path> {
        let excess = |length: f64| {
            self.corrected(&(point + tangent * length), tangent).map_or(f64::NAN, |at| self.ratio(&at) - 1.0)
        };
        let length = if excess(0.0) >= 0.0 { 0.0 } else { root(excess, 0.0, step)? };
        let near = self.corrected(&(point + tangent * length), tangent)?;
        let last_tangent = self.tangent(&near, Some(tangent))?;
        let mut peak = peak.max(near.w);
        if tangent.w > 0.0 && last_tangent.w < 0.0 {
            peak = peak.max(self.summit(point, tangent, length)?);
        }
        let ending =
            newton(self.group, &near.xyz(), &self.direction, &self.quadrature, &NewtonSettings::default())?;
        ending.converged.then_some(Path {
            peak: (peak * self.load_scale).max(ending.state.load),
            last: ending.state.q,
            last_load: ending.state.load,
        })
    }

    /// The largest load between a point and the end of a step over which the load turns down.
    fn summit(&self, point: &Point, tangent: &Point, step: f64) -> Option<f64> {
        let slope = |length: f64| {
            self.corrected(&(point + tangent * length), tangent)
                .and_then(|at| self.tangent(&at, Some(tangent)))
                .map_or(f64::NAN, |direction| direction.w)
        };
        let length = root(slope, 0.0, step)?;
        self.corrected(&(point + tangent * length), tangent).map(|at| at.w)
    }

    /// The point of the path where the deformation ratio is `ratio`.
    fn first(&self, typical: &Triple, ratio: f64) -> Option<Point> {
        let state = self.at_ratio(typical, ratio)?;
        let scaled = state.q / self.motion_scale;
        Some(Point::new(scaled.x, scaled.y, scaled.z, state.load / self.load_scale))
    }

    /// Equilibrium at a deformation ratio, by the damped Newton method from the motion `start`.
    fn at_ratio(&self, start: &Triple, ratio: f64) -> Option<Iterate> {
        let settings = NewtonSettings { ratio, ..NewtonSettings::default() };
        newton(self.group, start, &self.direction, &self.quadrature, &settings)
            .filter(|ending| ending.converged && ending.state.load > 0.0)
            .map(|ending| ending.state)
    }

    /// `[K, -L; border]` in scaled unknowns and loads.
    fn matrix(&self, tangent: &nalgebra::Matrix3<f64>, border: &Triple, last: f64) -> Matrix4<f64> {
        framed(&(tangent * (self.motion_scale / self.load_scale)), &self.direction, border, last)
    }

    /// Unit tangent of the path at a point.
    fn tangent(&self, at: &Point, before: Option<&Point>) -> Option<Point> {
        self.heading(at, before).map(|(tangent, _)| tangent)
    }

    /// Unit tangent of the path at a point, along the way come, or toward growing deformation at the start; and
    /// the sign of `det [K, -L; t^T]`, which a regular path keeps.
    fn heading(&self, at: &Point, before: Option<&Point>) -> Option<(Point, bool)> {
        let q = at.xyz() * self.motion_scale;
        let resultant = self.group.resultant(&q, &self.quadrature);
        let along = match before {
            Some(before) => *before,
            None => {
                let gradient = self.group.utmost(&q)?.gradient.normalize();
                Point::new(gradient.x, gradient.y, gradient.z, 0.0)
            }
        };
        let matrix = self.matrix(&resultant.tangent, &along.xyz(), along.w);
        let tangent = matrix.lu().solve(&Vector4::new(0.0, 0.0, 0.0, 1.0))?.normalize();
        tangent.iter().all(|value| value.is_finite()).then_some((tangent, matrix.determinant() > 0.0))
    }

    /// Newton from a predicted point, square to the tangent.
    fn corrected(&self, predicted: &Point, tangent: &Point) -> Option<Point> {
        let mut point = *predicted;
        for _ in 0..12 {
            let resultant = self.group.resultant(&(point.xyz() * self.motion_scale), &self.quadrature);
            let gap = resultant.wrench / self.load_scale - self.direction * point.w;
            let slip = (point - predicted).dot(tangent);
            if gap.norm() < 1e-11 && slip.abs() < 1e-11 {
                return Some(point);
            }
            let matrix = self.matrix(&resultant.tangent, &tangent.xyz(), tangent.w);
            let change = matrix.lu().solve(&Vector4::new(-gap.x, -gap.y, -gap.z, -slip))?;
            if !change.iter().all(|value| value.is_finite()) || change.norm() > 1.0 {
                return None;
            }
            point += change;
        }
        None
    }

    fn ratio(&self, at: &Point) -> f64 {
        self.group.utmost(&(at.xyz() * self.motion_scale)).map_or(0.0, |utmost| utmost.ratio)
    }
}

/// Deformation ratio from which shorter steps are taken: in a fold it may rise, fall and rise again, the place of
/// its maximum changing in between, before a step of full length ends.
const NEAR_RUPTURE: f64 = 0.85;
/// Those steps over the longest; a half is enough for all reference joints.
const STEP_NEAR_RUPTURE: f64 = 0.25;
/// Longest step over which the determinant may change its sign. A longer one has left the path for another that runs
/// close by (two branches that nearly meet); a shorter one passes a point where branches do meet, by symmetry.
const LEAST_LEAP: f64 = 1e-5;
/// Least cosine between successive tangents: sharper bends are taken in shorter steps.
const MOST_BEND: f64 = 0.9;

//! Ultimate strength by the instantaneous-centre method: all equilibrium states at first rupture.
//!
//! For a load `lambda L` a state is a motion q with `W(q) = lambda L` and `g(q) = max |u| / Delta_u = 1`
//! (see `equilibrium`). Loads nearly along the welds can have three or more states; the published result is
//! taken as the smallest. The search is deterministic: the group's [`Atlas`] names the starts, Newton's method
//! follows each, equal endings are merged, each state is then solved again on finer quadrature.
//!
//! The error estimate of a load factor is the sum of
//!
//! * the change from quadrature of n to quadrature of n + 4 nodes a panel (an overestimate for the latter);
//! * the last Newton step in lambda;
//! * rounding: machine epsilon times the condition of lambda against the wrench;
//! * with mid-point elements, the distance to the load of the continuous weld in the state nearby.
//!
//! Source: the method of Butler, Pal and Kulak (1972) with the laws in `mechanics::law`; AISC Manual Part 8.
//! Valid for a plane group of positive length, for which every load has a state.

use super::atlas::Atlas;
use super::equilibrium::{Iterate, newton};
use super::outcome::{Motion, NotSolved, Place, Reason, Rupture, State, Ultimate};
use super::path::follow;
use super::search::search;
use super::settings::{POINTS, SAME_MOTION, Search, UltimateSettings, distance};
use crate::mechanics::law::{rupture_limit, ruptures};
use crate::mechanics::{PlaneGroup, Quadrature, Triple};
use nalgebra::Vector2;
use std::cell::OnceCell;

/// A group with what is prepared once and used for all its loads.
#[derive(Debug)]
pub struct UltimateSolver<'a> {
    group: &'a PlaneGroup,
    settings: UltimateSettings,
    atlas: OnceCell<Atlas>,
    continuous: OnceCell<PlaneGroup>,
}

/// Elements up to which the atlas is sampled on the elements themselves: about as many as quadrature has nodes.
const FEW_ELEMENTS: usize = 150;
/// Rotation (scaled by the gyration radius) over translation below which the motion is a pure translation.
const PURE_TRANSLATION: f64 = 1e-12;

impl<'a> UltimateSolver<'a> {
    /// Prepares the analysis of a group.
    #[must_use]
    pub fn new(group: &'a PlaneGroup, settings: UltimateSettings) -> Self {
        Self { group, settings, atlas: OnceCell::new(), continuous: OnceCell::new() }
    }

    /// The group's atlas, sampled at first use.
    ///
    /// Many elements carry what the continuous weld carries, so its atlas gives the starts for them as well.
    #[must_use]
    pub fn atlas(&self) -> &Atlas {
        self.atlas.get_or_init(|| {
            if self.group.elements.len() > FEW_ELEMENTS {
                Atlas::new(&self.group.continuous(), &self.settings.atlas)
            } else {
                Atlas::new(self.group, &self.settings.atlas)
            }
        })
    }

    /// Solves for the load (F_x, F_y, M / rho) about the centroid, which must not be zero.
    ///
    /// # Errors
    /// [`NotSolved`] with the reason when no state was found to the tolerance.
    pub fn solve(&self, load: &Triple) -> Result<Ultimate, NotSolved> {
        let size = load.norm();
        let direction = load / size;
        if !(size.is_normal() && direction.iter().all(|value| value.is_finite())) {
            let (residual, trace) = (f64::INFINITY, Vec::new());
            return Err(NotSolved { reason: Reason::NotFinite, residual, best: None, trace });
        }
        let harvest = search(self.group, &direction, &self.settings, || self.atlas())?;
        let mut incomplete = harvest.incomplete;
        let mut solved: Vec<Solved> = Vec::new();
        let mut refused = None;
        for ending in &harvest.endings {
            match self.refined(&ending.state.q, ending.steps, &direction, size) {
                Ok(found) => add_new(&mut solved, found),
                Err(reason) => refused = Some((reason, ending)),
            }
        }
        incomplete |= refused.is_some();
        sort_and_thin(&mut solved);
        let Some(smallest) = solved.first() else {
            let (reason, residual, best) =
                refused.map_or((Reason::Stalled, f64::INFINITY, None), |(reason, ending)| {
                    (reason, ending.state.unbalance, Some(Motion::of(self.group, &ending.state.q)))
                });
            return Err(NotSolved { reason, residual, best, trace: harvest.trace });
        };
        let (mut peak_load_factor, mut reached) = (None, None);
        if !ruptures(&self.group.law) {
            peak_load_factor = Some(smallest.state.load_factor);
            reached = Some(0);
        } else if self.settings.path {
            let typical = (&smallest.at.q, smallest.at.load);
            if let Some(path) = follow(self.group, &direction, typical, &self.settings.path_settings) {
                if position(&solved, &path.last).is_none() {
                    incomplete = true;
                    if let Ok(found) = self.refined(&path.last, 0, &direction, size) {
                        add_new(&mut solved, found);
                        sort_and_thin(&mut solved);
                    }
                }
                reached = position(&solved, &path.last);
                // The path runs on coarser quadrature than its end: where it climbs to the last, the peak is the end.
                let end = reached.map_or(path.last_load / size, |index| solved[index].state.load_factor);
                let climbs = path.peak <= path.last_load * (1.0 + SAME_LOAD);
                peak_load_factor = Some(if climbs { end } else { (path.peak / size).max(end) });
            }
        }
        incomplete &= self.settings.search == Search::All;
        let states = solved.into_iter().map(|found| found.state).collect();
        Ok(Ultimate { states, peak_load_factor, reached, incomplete })
    }

    /// Solves again from the motion `start` on finer quadrature until the error estimate meets the tolerance.
    fn refined(&self, start: &Triple, steps: usize, direction: &Triple, size: f64) -> Result<Solved, Reason> {
        let in_elements = !self.group.elements.is_empty();
        let mut before: Option<f64> = None;
        let (mut start, mut steps) = (*start, steps);
        let mut reason = Reason::Stalled;
        for points in POINTS {
            let quadrature = Quadrature::fine(points);
            let Some(ending) = newton(self.group, &start, direction, &quadrature, &self.settings.newton)
            else {
                continue;
            };
            steps += ending.steps;
            if !ending.converged || ending.state.load <= 0.0 {
                continue;
            }
            start = ending.state.q;
            let load = ending.state.load;
            if let Some(before) = before {
                let quadrature_error = if in_elements { 0.0 } else { (load - before).abs() / load };
                let error = quadrature_error + ending.state.load_error(direction);
                if error <= self.settings.tolerance {
                    let element_error =
                        if in_elements { self.element_error(&ending.state, direction) } else { 0.0 };
                    let state = self.state(&ending.state, direction, size, error + element_error, steps);
                    return Ok(Solved { at: ending.state, state });
                }
                reason = Reason::Tolerance;
            }
            before = Some(load);
        }
        Err(reason)
    }

    /// How far the load of a state in elements is from that of the continuous weld nearby, relative.
    fn element_error(&self, at: &Iterate, direction: &Triple) -> f64 {
        let continuous = self.continuous.get_or_init(|| self.group.continuous());
        let quadrature = Quadrature::fine(POINTS[1]);
        newton(continuous, &at.q, direction, &quadrature, &self.settings.newton)
            .filter(|ending| ending.converged && ending.state.load > 0.0)
            .map_or(0.0, |ending| (ending.state.load - at.load).abs() / at.load)
    }

    fn state(&self, at: &Iterate, direction: &Triple, size: f64, error: f64, iterations: usize) -> State {
        let group = self.group;
        let gap = at.resultant.wrench - direction * at.load;
        let limit = rupture_limit(&group.law, at.utmost.angle);
        // Without a deformation limit the size of the motion is arbitrary: the largest displacement is 1 mm.
        let scale = if limit.is_some() { 1.0 } else { 1.0 / at.utmost.deformation };
        let piece = &group.pieces[at.utmost.piece];
        let critical = limit.map(|(limit, _)| Rupture {
            place: Place { weld: piece.weld, run: piece.run, at: group.unscaled(at.utmost.at) },
            angle: at.utmost.angle,
            deformation: at.utmost.deformation,
            limit: limit * piece.size,
        });
        let translation = at.q.xy().norm();
        let centre = (at.q.z.abs() > PURE_TRANSLATION * translation).then(|| {
            let centre = group.unscaled(Vector2::new(-at.q.y, at.q.x) / at.q.z);
            [centre.x, centre.y]
        });
        State {
            load_factor: at.load / size,
            motion: Motion::of(self.group, &(at.q * scale)),
            centre,
            critical,
            residual: gap.norm() / at.load,
            error_estimate: error,
            iterations,
        }
    }
}

/// A state with the iterate it was made from.
#[derive(Debug, Clone)]
struct Solved {
    at: Iterate,
    state: State,
}

/// Motions whose directions differ by less than this are one state, when one of them ends a path.
const SAME_END: f64 = 1e-4;
/// Relative difference within which the peak of a path is its end.
const SAME_LOAD: f64 = 1e-9;
/// States beyond this number are listed once for each load factor: a group that looks the same when turned (a
/// ring) can have a whole circle of states.
const MOST_TWINS: usize = 9;
/// Relative difference below which two load factors are the same.
const SAME_FACTOR: f64 = 1e-7;

fn position(solved: &[Solved], q: &Triple) -> Option<usize> {
    solved.iter().position(|known| distance(&known.at.q, q) < SAME_END)
}

fn add_new(solved: &mut Vec<Solved>, found: Solved) {
    if solved.iter().all(|known| distance(&known.at.q, &found.at.q) > SAME_MOTION) {
        solved.push(found);
    }
}

fn sort_and_thin(solved: &mut Vec<Solved>) {
    solved.sort_by(|a, b| a.state.load_factor.total_cmp(&b.state.load_factor));
    if solved.len() > MOST_TWINS {
        solved.dedup_by(|a, b| {
            (a.state.load_factor - b.state.load_factor).abs() <= SAME_FACTOR * b.state.load_factor
        });
    }
}

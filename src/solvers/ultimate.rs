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
//! * rounding: machine epsilon times the condition of lambda against the wrench.
//!
//! Source: the method of Butler, Pal and Kulak (1972) with the laws in `mechanics::law`; AISC Manual Part 8.
//! Valid for a plane group of positive length, for which every load has a state.

use super::atlas::{Atlas, AtlasSettings};
use super::equilibrium::{Ending, Iterate, NewtonSettings, newton, orientation};
use super::fallback::direct_search;
use super::outcome::{Motion, NotSolved, Place, Reason, Rupture, State, Ultimate};
use super::path::{PathSettings, follow};
use crate::mechanics::law::rupture_limit;
use crate::mechanics::{PlaneGroup, Quadrature, Triple};

/// Which states are looked for.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Search {
    /// All states, by the atlas of the group.
    All,
    /// The one state that Newton's method reaches from the elastic motion; the atlas only when that fails.
    First,
}

/// How the ultimate analysis is run.
#[derive(Debug, Clone, PartialEq)]
pub struct UltimateSettings {
    /// Relative error allowed in the load factor.
    pub tolerance: f64,
    /// Which states are looked for.
    pub search: Search,
    /// Whether the path from zero load is followed for its peak.
    pub path: bool,
    /// Newton's method.
    pub newton: NewtonSettings,
    /// Sampling of the motions.
    pub atlas: AtlasSettings,
    /// Following the path.
    pub path_settings: PathSettings,
}

impl Default for UltimateSettings {
    fn default() -> Self {
        Self {
            tolerance: 1e-9,
            search: Search::All,
            path: true,
            newton: NewtonSettings::default(),
            atlas: AtlasSettings::default(),
            path_settings: PathSettings::default(),
        }
    }
}

/// A group with what is prepared once and used for all its loads.
#[derive(Debug)]
pub struct UltimateSolver<'a> {
    group: &'a PlaneGroup,
    settings: UltimateSettings,
    atlas: std::cell::OnceCell<Atlas>,
}

/// Endings whose directions of motion differ by less than this are one state.
const SAME_MOTION: f64 = 1e-6;
/// Unbalance a coarse search must reach for an ending to be kept.
const SEARCH_UNBALANCE: f64 = 1e-9;
/// Nodes a panel of the solution, tried in turn until the tolerance is met. The last is for a centre on a weld:
/// there 20 nodes are exact to 1e-11, which only a finer rule can show.
const POINTS: [u16; 5] = [6, 10, 14, 20, 28];
/// Rotation (scaled by the gyration radius) over translation below which the motion is a pure translation.
const PURE_TRANSLATION: f64 = 1e-12;
/// First simplices of the fallback search, rad.
const SIMPLICES: [f64; 3] = [0.1, 0.01, 0.5];

impl<'a> UltimateSolver<'a> {
    /// Prepares the analysis of a group.
    #[must_use]
    pub fn new(group: &'a PlaneGroup, settings: UltimateSettings) -> Self {
        Self { group, settings, atlas: std::cell::OnceCell::new() }
    }

    /// The group's atlas, sampled at first use.
    #[must_use]
    pub fn atlas(&self) -> &Atlas {
        self.atlas.get_or_init(|| Atlas::new(self.group, &self.settings.atlas))
    }

    /// Solves for the load (F_x, F_y, M / rho) about the centroid, which must not be zero.
    ///
    /// # Errors
    /// [`NotSolved`] with the reason when no state was found to the tolerance.
    pub fn solve(&self, load: &Triple) -> Result<Ultimate, NotSolved> {
        let size = load.norm();
        let direction = load / size;
        if !(size.is_normal() && direction.iter().all(|value| value.is_finite())) {
            return Err(failure(Reason::NotFinite, f64::INFINITY, None, Vec::new()));
        }
        let mut trace = Vec::new();
        let endings = self.search(&direction, &mut trace)?;
        let mut solved: Vec<(Iterate, State)> = Vec::new();
        let mut refused = None;
        for ending in &endings {
            match self.refined(ending, &direction, size) {
                Ok(pair) => {
                    let new = solved.iter().all(|(known, _)| distance(&known.q, &pair.0.q) > SAME_MOTION);
                    if new {
                        solved.push(pair);
                    }
                }
                Err(reason) => refused = Some((reason, ending)),
            }
        }
        solved.sort_by(|(_, a), (_, b)| a.load_factor.total_cmp(&b.load_factor));
        let Some((smallest, _)) = solved.first() else {
            let (reason, residual, best) = refused
                .map_or((Reason::Stalled, f64::INFINITY, None), |(r, e)| {
                    (r, e.state.unbalance, Some(self.motion(&e.state.q)))
                });
            return Err(failure(reason, residual, best, trace));
        };
        let (mut peak_load_factor, mut reached) = (None, None);
        if rupture_limit(&self.group.law, 0.0).is_none() {
            peak_load_factor = Some(solved[0].1.load_factor);
            reached = Some(0);
        } else if self.settings.path {
            let path =
                follow(self.group, &direction, (&smallest.q, smallest.load), &self.settings.path_settings);
            if let Some(path) = path {
                reached = solved.iter().position(|(known, _)| distance(&known.q, &path.last) < 1e-4);
                let floor = reached.map_or(0.0, |index| solved[index].1.load_factor);
                peak_load_factor = Some((path.peak / size).max(floor));
            }
        }
        let states = solved.into_iter().map(|(_, state)| state).collect();
        Ok(Ultimate { states, peak_load_factor, reached })
    }

    /// Distinct endings of Newton's method from all starts, on coarse quadrature.
    fn search(&self, direction: &Triple, trace: &mut Vec<f64>) -> Result<Vec<Ending>, NotSolved> {
        let settings = NewtonSettings { unbalance: SEARCH_UNBALANCE, ..self.settings.newton };
        let mut hunt = Hunt {
            group: self.group,
            direction,
            settings,
            quadrature: Quadrature::coarse(),
            endings: Vec::new(),
            best: None,
            trace,
        };
        // The elastic motion: v = F / A and omega rho = (M / rho) / A, so the load itself.
        hunt.attempt(direction);
        if self.settings.search == Search::All || hunt.endings.is_empty() {
            hunt.attempt_all(&self.atlas().starts(direction));
            if hunt.signs() != 1 {
                hunt.quadrature = Quadrature::fine(POINTS[0]);
                hunt.attempt_all(&self.atlas().wide_starts(direction));
            }
        }
        if hunt.endings.is_empty() {
            let nearest = self.atlas().nearest(direction);
            for size in SIMPLICES {
                if let Some(motion) = direct_search(self.group, &nearest, direction, &hunt.quadrature, size) {
                    hunt.attempt(&motion);
                }
                if !hunt.endings.is_empty() {
                    break;
                }
            }
        }
        let Hunt { endings, best, .. } = hunt;
        if endings.is_empty() {
            let residual = best.map_or(f64::INFINITY, |ending| ending.state.unbalance);
            let reason = if best.is_none() { Reason::NoResistance } else { Reason::Stalled };
            let motion = best.map(|ending| self.motion(&ending.state.q));
            return Err(failure(reason, residual, motion, std::mem::take(trace)));
        }
        Ok(endings)
    }

    /// Solves again on finer quadrature until the error estimate meets the tolerance.
    fn refined(&self, ending: &Ending, direction: &Triple, size: f64) -> Result<(Iterate, State), Reason> {
        let mut before: Option<f64> = None;
        let mut start = ending.state.q;
        let mut steps = ending.steps;
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
                let quadrature_error =
                    if self.group.elements.is_empty() { (load - before).abs() / load } else { 0.0 };
                let error = quadrature_error + ending.state.load_error(direction);
                if error <= self.settings.tolerance {
                    let state = self.state(&ending.state, direction, size, error, steps);
                    return Ok((ending.state, state));
                }
                reason = Reason::Tolerance;
            }
            before = Some(load);
        }
        Err(reason)
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
            let centre = group.section.centroid
                + crate::model::Vector::new(-at.q.y, at.q.x, 0.0) * (group.gyration / at.q.z);
            [centre.x, centre.y]
        });
        State {
            load_factor: at.load / size,
            motion: self.motion(&(at.q * scale)),
            centre,
            critical,
            residual: gap.norm() / at.load,
            error_estimate: error,
            iterations,
        }
    }

    fn motion(&self, q: &Triple) -> Motion {
        Motion { translation: [q.x, q.y], rotation: q.z / self.group.gyration }
    }
}

/// A search for distinct endings of Newton's method.
struct Hunt<'a> {
    group: &'a PlaneGroup,
    direction: &'a Triple,
    settings: NewtonSettings,
    quadrature: Quadrature,
    endings: Vec<Ending>,
    /// The ending of smallest unbalance, converged or not.
    best: Option<Ending>,
    trace: &'a mut Vec<f64>,
}

impl Hunt<'_> {
    fn attempt(&mut self, start: &Triple) {
        let Some(ending) = newton(self.group, start, self.direction, &self.quadrature, &self.settings) else {
            return;
        };
        self.trace.push(ending.state.unbalance);
        if self.best.is_none_or(|known| ending.state.unbalance < known.state.unbalance) {
            self.best = Some(ending);
        }
        let q = &ending.state.q;
        if ending.converged && self.endings.iter().all(|known| distance(&known.state.q, q) > SAME_MOTION) {
            self.endings.push(ending);
        }
    }

    fn attempt_all(&mut self, starts: &[Triple]) {
        for start in starts {
            self.attempt(start);
        }
    }

    /// Sum of the orientations of the map at the endings; 1 when none is missing.
    fn signs(&self) -> i32 {
        let sign = |ending: &Ending| {
            if orientation(&ending.state.resultant, &ending.state.utmost) >= 0.0 { 1 } else { -1 }
        };
        self.endings.iter().map(sign).sum()
    }
}

fn distance(one: &Triple, two: &Triple) -> f64 {
    (one.normalize() - two.normalize()).norm()
}

fn failure(reason: Reason, residual: f64, best: Option<Motion>, trace: Vec<f64>) -> NotSolved {
    NotSolved { reason, residual, best, trace }
}

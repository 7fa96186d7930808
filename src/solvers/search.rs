//! The search for all states of one load: distinct endings of Newton's method from the starts of the atlas.
//!
//! Signs of a missed state are kept: the orientations of all states of a map of degree one sum to one, so a
//! search that ends otherwise is repeated from a wider net; if the sum is still wrong, or a limit on the number
//! of attempts or states was met, the harvest is marked incomplete.

use super::atlas::Atlas;
use super::equilibrium::{Ending, NewtonSettings, newton, orientation};
use super::fallback::direct_search;
use super::outcome::{Motion, NotSolved, Reason};
use super::settings::{POINTS, SAME_MOTION, Search, UltimateSettings, distance};
use crate::mechanics::{PlaneGroup, Quadrature, Triple};

/// Unbalance a coarse search must reach for an ending to be kept.
const SEARCH_UNBALANCE: f64 = 1e-9;
/// First simplices of the fallback search, rad.
const SIMPLICES: [f64; 3] = [0.1, 0.01, 0.5];
/// Most attempts for one load; searches that find all states take some tens.
const MOST_ATTEMPTS: usize = 500;
/// Most endings kept; states beyond a handful come from symmetry (a ring has a circle of them).
const MOST_ENDINGS: usize = 40;

/// What a search has found.
#[derive(Debug)]
pub(super) struct Harvest {
    /// Distinct endings, on coarse quadrature; never empty.
    pub(super) endings: Vec<Ending>,
    /// Whether there are signs of a state that was not found.
    pub(super) incomplete: bool,
    /// Unbalance at the end of every attempt.
    pub(super) trace: Vec<f64>,
}

/// Distinct endings of Newton's method for the unit load `direction`; `atlas` is called when it is needed.
pub(super) fn search<'a>(
    group: &PlaneGroup,
    direction: &Triple,
    settings: &UltimateSettings,
    atlas: impl Fn() -> &'a Atlas,
) -> Result<Harvest, NotSolved> {
    let newton_settings = NewtonSettings { unbalance: SEARCH_UNBALANCE, ..settings.newton };
    let mut hunt = Hunt {
        group,
        direction,
        settings: newton_settings,
        quadrature: Quadrature::coarse(),
        endings: Vec::new(),
        best: None,
        trace: Vec::new(),
    };
    // The elastic motion: v = F / A and omega rho = (M / rho) / A, so the load itself.
    hunt.attempt(direction);
    let mut incomplete = false;
    if settings.search == Search::All || hunt.endings.is_empty() {
        hunt.attempt_all(&atlas().starts(direction));
        if hunt.signs() != 1 {
            hunt.quadrature = Quadrature::fine(POINTS[0]);
            hunt.attempt_all(&atlas().wide_starts(direction));
        }
        incomplete = hunt.signs() != 1;
    }
    if hunt.endings.is_empty() {
        let nearest = atlas().nearest(direction);
        for size in SIMPLICES {
            if let Some(motion) = direct_search(group, &nearest, direction, &hunt.quadrature, size) {
                hunt.attempt(&motion);
            }
            if !hunt.endings.is_empty() {
                break;
            }
        }
    }
    let Hunt { endings, best, trace, .. } = hunt;
    if endings.is_empty() {
        let residual = best.map_or(f64::INFINITY, |ending| ending.state.unbalance);
        let reason = if best.is_none() { Reason::NoResistance } else { Reason::Stalled };
        let best = best.map(|ending| Motion::of(group, &ending.state.q));
        return Err(NotSolved { reason, residual, best, trace });
    }
    Ok(Harvest { endings, incomplete, trace })
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
    trace: Vec<f64>,
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
            if self.trace.len() >= MOST_ATTEMPTS || self.endings.len() >= MOST_ENDINGS {
                return;
            }
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

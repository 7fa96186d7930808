//! How the ultimate analysis is run, and what its parts have in common.

use super::atlas::AtlasSettings;
use super::equilibrium::NewtonSettings;
use super::path::PathSettings;
use crate::mechanics::Triple;

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

/// Nodes a panel of the solution, tried in turn until the tolerance is met.
pub(super) const POINTS: [u16; 4] = [6, 10, 14, 20];
/// Endings whose directions of motion differ by less than this are one state.
pub(super) const SAME_MOTION: f64 = 1e-6;

/// Distance between the directions of two motions.
pub(super) fn distance(one: &Triple, two: &Triple) -> f64 {
    (one.normalize() - two.normalize()).norm()
}

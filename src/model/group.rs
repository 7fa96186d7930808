//! A weld group: every weld that joins one part to another.

use super::{ModelError, Weld};

/// The welds of one joint, at least one of them.
#[derive(Debug, Clone, PartialEq)]
pub struct WeldGroup {
    welds: Vec<Weld>,
}

impl WeldGroup {
    /// A group of the given welds.
    ///
    /// # Errors
    /// No weld, or a weld without a run.
    pub fn new(welds: Vec<Weld>) -> Result<Self, ModelError> {
        if welds.is_empty() {
            return Err(ModelError::Empty("weld group"));
        }
        if welds.iter().any(|weld| weld.runs.is_empty()) {
            return Err(ModelError::Empty("weld path"));
        }
        Ok(Self { welds })
    }

    /// The welds, in the order given.
    #[must_use]
    pub fn welds(&self) -> &[Weld] {
        &self.welds
    }

    /// Length of the longest run, mm.
    #[must_use]
    pub fn longest_run(&self) -> f64 {
        self.welds.iter().flat_map(|weld| &weld.runs).map(super::Run::length).fold(0.0, f64::max)
    }

    /// The one size, filler and number of sides that serve all welds, if they do.
    #[must_use]
    pub fn uniform(&self) -> Option<&Weld> {
        let first = &self.welds[0];
        let same =
            |weld: &Weld| weld.size == first.size && weld.filler == first.filler && weld.sides == first.sides;
        self.welds.iter().all(same).then_some(first)
    }
}

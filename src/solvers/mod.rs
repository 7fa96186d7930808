//! Which motion is the answer: the elastic vector method, and equilibrium at first rupture.

mod atlas;
mod elastic;
mod equilibrium;
mod fallback;
mod outcome;
mod path;
mod search;
mod settings;
mod ultimate;

pub use atlas::{Atlas, AtlasSettings};
pub use elastic::elastic;
pub use equilibrium::{Ending, Iterate, NewtonSettings, newton, orientation};
pub use outcome::{Elastic, ElasticPeak, Motion, NotSolved, Place, Reason, Rupture, State, Ultimate};
pub use path::{Path, PathSettings, follow};
pub use settings::{Search, UltimateSettings};
pub use ultimate::UltimateSolver;

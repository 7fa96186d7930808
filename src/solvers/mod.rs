//! Which motion is the answer.

mod outcome;

pub use outcome::{Elastic, ElasticPeak, Motion, NotSolved, Place, Reason, Rupture, State, Ultimate};

//! Strength of eccentrically loaded fillet weld groups.
#![warn(missing_docs)]

pub mod analysis;
pub mod diagnostic;
pub mod input;
pub mod mechanics;
pub mod model;
pub mod numerics;
pub mod output;
pub mod solvers;
pub mod units;
pub mod verify;

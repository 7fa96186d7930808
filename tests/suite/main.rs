//! Everything that is checked from outside the library, in one binary.
#![allow(missing_docs, unreachable_pub)]
#![allow(clippy::cast_precision_loss, clippy::cast_possible_truncation, clippy::cast_sign_loss)]
#![allow(clippy::unwrap_used, clippy::panic, clippy::print_stdout)]

mod architecture;
#[cfg(feature = "cli")]
mod cli;
mod derivatives;
mod diagnostics;
mod drawings;
mod elements;
mod equilibrium;
mod fixture;
mod laws;
mod limits;
mod oracle;
mod published;
mod random;
mod reading;
#[cfg(feature = "cli")]
mod readme;
mod reference;
mod shapes;
mod states;
mod sweep;
mod symmetry;
mod verdicts;

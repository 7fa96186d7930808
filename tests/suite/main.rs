//! Suite.
mod diagnostics;
mod reading;

//! The suite: what a user of the program or the library may rely on.

// Helpers beside the tests may fail as the tests do.
#![allow(clippy::unwrap_used, clippy::panic)]

mod cli;

//! Everything that is checked from outside the library, in one binary.
#![allow(missing_docs, clippy::cast_precision_loss, clippy::cast_possible_truncation, clippy::cast_sign_loss)]
#![allow(clippy::unwrap_used, clippy::print_stdout, unreachable_pub)]

mod fixture;
mod oracle;
mod states;

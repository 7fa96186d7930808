//! Is the answer enough.

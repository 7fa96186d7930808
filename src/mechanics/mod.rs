//! What a given motion produces.

//! Pure mathematics.

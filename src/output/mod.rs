//! Report to text.

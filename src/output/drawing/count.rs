//! Counts as numbers: how many rows, shades, points.

/// A small count as a number.
pub(super) fn as_float(count: usize) -> f64 {
    // Counts of a drawing are far below 2^32.
    u32::try_from(count).map_or(f64::INFINITY, f64::from)
}

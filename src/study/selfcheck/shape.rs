//! The groups of the handbook tables: a length l, a second dimension k l, one run or several.
//!
//! | shape | runs |
//! |---|---|
//! | `line` | a vertical of length l |
//! | `two-lines` | two verticals of length l, k l apart (k = 0: one on the other) |
//! | `two-lines-across` | two horizontals of length l, k l apart |
//! | `c` | a vertical of length l, horizontals of k l to the right at both of its ends |
//! | `l` | a vertical of length l, a horizontal of k l to the right at its foot |
//!
//! Source: AISC *Steel Construction Manual*, Part 8, tables of eccentrically loaded weld groups; `l` and k as there.

use crate::model::{ModelError, Run, Vector};
use serde::Deserialize;

/// A shape of weld group.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Deserialize)]
#[serde(rename_all = "kebab-case")]
pub enum Shape {
    /// One vertical line.
    Line,
    /// Two vertical lines.
    TwoLines,
    /// Two horizontal lines.
    TwoLinesAcross,
    /// A vertical with horizontals at both ends.
    C,
    /// A vertical with a horizontal at its foot.
    L,
}

impl Shape {
    /// Every shape.
    pub const ALL: [Self; 5] = [Self::Line, Self::TwoLines, Self::TwoLinesAcross, Self::C, Self::L];

    /// Its name in the data.
    #[must_use]
    pub fn name(self) -> &'static str {
        match self {
            Self::Line => "line",
            Self::TwoLines => "two-lines",
            Self::TwoLinesAcross => "two-lines-across",
            Self::C => "c",
            Self::L => "l",
        }
    }

    /// The shape of this name.
    #[must_use]
    pub fn named(name: &str) -> Option<Self> {
        Self::ALL.into_iter().find(|shape| shape.name() == name)
    }

    /// The runs for a length `l` in mm and a ratio `k`.
    ///
    /// # Errors
    /// Dimensions the model refuses.
    pub fn runs(self, k: f64, l: f64) -> Result<Vec<Run>, ModelError> {
        let w = k * l;
        let lines: &[[[f64; 2]; 2]] = match self {
            Self::Line => &[[[0.0, 0.0], [0.0, l]]],
            Self::TwoLines => &[[[0.0, 0.0], [0.0, l]], [[w, 0.0], [w, l]]],
            Self::TwoLinesAcross => &[[[0.0, 0.0], [l, 0.0]], [[0.0, w], [l, w]]],
            Self::C => &[[[w, 0.0], [0.0, 0.0]], [[0.0, 0.0], [0.0, l]], [[0.0, l], [w, l]]],
            Self::L => &[[[0.0, l], [0.0, 0.0]], [[0.0, 0.0], [w, 0.0]]],
        };
        let point = |[x, y]: [f64; 2]| Vector::new(x, y, 0.0);
        lines.iter().map(|[from, to]| Run::straight(point(*from), point(*to))).collect()
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn lengths_and_names() {
        for (shape, length) in [
            (Shape::Line, 100.0),
            (Shape::TwoLines, 200.0),
            (Shape::TwoLinesAcross, 200.0),
            (Shape::C, 160.0),
            (Shape::L, 130.0),
        ] {
            let runs = shape.runs(0.3, 100.0).unwrap();
            assert!((runs.iter().map(Run::length).sum::<f64>() - length).abs() < 1e-12, "{shape:?}");
            assert_eq!(Shape::named(shape.name()), Some(shape));
        }
        assert!(Shape::named("o").is_none() && Shape::C.runs(0.0, 100.0).is_err());
    }
}

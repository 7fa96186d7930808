//! What exists: welds, loads, materials, rules. Plain immutable values; constructors refuse nonsense.
//!
//! Everything inside is in one consistent set of units: N, mm, N mm, MPa, rad.

mod group;
mod joint;
mod law;
mod load;
mod rules;
mod size;
mod weld;

pub use group::WeldGroup;
pub use joint::{Discretisation, Document, Joint, Plate};
pub use law::{
    Confirmation, Curve, Directional, Law, LawForm, Limit, PowerOfAngle, RootPolynomial, TableCurve, TableLaw,
};
pub use load::{AppliedLoad, LoadCase, Wrench, direction};
pub use rules::{Basis, ConcentricRule, DesignFactor, RuleSet, Sourced};
pub use size::FilletSize;
pub use weld::{Filler, Run, Weld};

use thiserror::Error;

/// A vector or point in space, mm or N (or N mm for moments).
pub type Vector = nalgebra::Vector3<f64>;

/// Why a model value was refused.
#[derive(Debug, Clone, PartialEq, Error)]
pub enum ModelError {
    /// A number that must be finite and positive is not.
    #[error("{what} must be a positive, finite number, found {found}")]
    NotPositive {
        /// The quantity's name.
        what: &'static str,
        /// The value found.
        found: f64,
    },
    /// A number lies outside the range in which the calculation is meaningful.
    #[error("{what} must lie between {low} and {high}, found {found}")]
    OutOfRange {
        /// The quantity's name.
        what: &'static str,
        /// Least accepted value.
        low: f64,
        /// Greatest accepted value.
        high: f64,
        /// The value found.
        found: f64,
    },
    /// A collection that must hold something is empty.
    #[error("{0} must not be empty")]
    Empty(&'static str),
    /// A table of points is not usable as a load-deformation curve.
    #[error("{0}")]
    Curve(String),
}

/// Returns `value` when it is finite and positive.
///
/// # Errors
/// [`ModelError::NotPositive`] otherwise.
pub(crate) fn positive(what: &'static str, value: f64) -> Result<f64, ModelError> {
    if value.is_finite() && value > 0.0 {
        Ok(value)
    } else {
        Err(ModelError::NotPositive { what, found: value })
    }
}

/// Returns `value` when it lies in `low..=high`.
///
/// # Errors
/// [`ModelError::OutOfRange`] otherwise (also for NaN).
pub(crate) fn within(what: &'static str, value: f64, low: f64, high: f64) -> Result<f64, ModelError> {
    if value >= low && value <= high {
        Ok(value)
    } else {
        Err(ModelError::OutOfRange { what, low, high, found: value })
    }
}

/// Largest length, coordinate or eccentricity accepted, mm (100 km: far beyond any joint, far below overflow).
pub const LARGEST_LENGTH: f64 = 1.0e8;
/// Smallest leg, throat or run length accepted, mm.
pub const SMALLEST_LENGTH: f64 = 1.0e-3;
/// Largest force component accepted, N.
pub const LARGEST_FORCE: f64 = 1.0e15;
/// Largest moment component accepted, N mm.
pub const LARGEST_MOMENT: f64 = 1.0e23;
/// Largest material strength accepted, MPa.
pub const LARGEST_STRENGTH: f64 = 1.0e5;

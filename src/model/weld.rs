//! One weld: its runs (straight or circular), its size, its filler metal.
//!
//! | symbol | code | unit | meaning |
//! |---|---|---|---|
//! | s | - | mm | arc length along a run, from its start |
//! | l | `length` | mm | length of a run |
//! | F_EXX | `strength` | MPa | tensile strength of the filler metal |
//!
//! A polyline of n points is a weld of n - 1 straight runs. Runs lie in the plane z = 0 for now.

use super::{
    FilletSize, LARGEST_LENGTH, LARGEST_STRENGTH, ModelError, SMALLEST_LENGTH, Vector, positive, within,
};
use std::f64::consts::TAU;

/// Filler metal.
#[derive(Debug, Clone, PartialEq)]
pub struct Filler {
    /// Classification as the user gave it, for example `E70`; `None` when only the strength was given.
    pub class: Option<String>,
    /// Tensile strength `F_EXX`, MPa.
    pub strength: f64,
}

impl Filler {
    /// A filler metal of the given tensile strength (MPa).
    ///
    /// # Errors
    /// A strength that is not positive or beyond [`LARGEST_STRENGTH`].
    pub fn new(class: Option<String>, strength: f64) -> Result<Self, ModelError> {
        positive("filler strength", strength)?;
        within("filler strength in MPa", strength, 1.0, LARGEST_STRENGTH)?;
        Ok(Self { class, strength })
    }
}

/// One smooth piece of weld.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Run {
    /// A straight run between two points, mm.
    Straight {
        /// Start.
        from: Vector,
        /// End.
        to: Vector,
    },
    /// A circular arc in the plane, anticlockwise for a positive sweep.
    Arc {
        /// Centre of the circle, mm.
        centre: Vector,
        /// Radius, mm.
        radius: f64,
        /// Angle of the start from the x axis, rad.
        start: f64,
        /// Angle swept, rad, up to one turn either way.
        sweep: f64,
    },
}

impl Run {
    /// A straight run.
    ///
    /// # Errors
    /// Coordinates or a length outside the accepted range.
    pub fn straight(from: Vector, to: Vector) -> Result<Self, ModelError> {
        for coordinate in from.iter().chain(to.iter()) {
            within("coordinate", *coordinate, -LARGEST_LENGTH, LARGEST_LENGTH)?;
        }
        within("length of a run", (to - from).norm(), SMALLEST_LENGTH, 4.0 * LARGEST_LENGTH)?;
        Ok(Self::Straight { from, to })
    }

    /// A circular arc; angles in rad.
    ///
    /// # Errors
    /// A radius, centre, sweep or length outside the accepted range.
    pub fn arc(centre: Vector, radius: f64, start: f64, sweep: f64) -> Result<Self, ModelError> {
        for coordinate in centre.iter() {
            within("coordinate", *coordinate, -LARGEST_LENGTH, LARGEST_LENGTH)?;
        }
        within("radius", radius, SMALLEST_LENGTH, LARGEST_LENGTH)?;
        within("start angle in degrees", start.to_degrees(), -36000.0, 36000.0)?;
        within("sweep in degrees", sweep.to_degrees(), -360.0 - 1e-9, 360.0 + 1e-9)?;
        within("length of a run", radius * sweep.abs(), SMALLEST_LENGTH, 8.0 * LARGEST_LENGTH)?;
        Ok(Self::Arc { centre, radius, start, sweep: sweep.clamp(-TAU, TAU) })
    }

    /// Length along the run, mm.
    #[must_use]
    pub fn length(&self) -> f64 {
        match self {
            Self::Straight { from, to } => (to - from).norm(),
            Self::Arc { radius, sweep, .. } => radius * sweep.abs(),
        }
    }

    /// The point at the share `fraction` (0 to 1) of the length.
    #[must_use]
    pub fn point(&self, fraction: f64) -> Vector {
        match self {
            Self::Straight { from, to } => from + (to - from) * fraction,
            Self::Arc { centre, radius, start, sweep } => {
                let phi = start + sweep * fraction;
                centre + Vector::new(phi.cos(), phi.sin(), 0.0) * *radius
            }
        }
    }

    /// Unit vector along the weld axis at the share `fraction` (0 to 1) of the length.
    #[must_use]
    pub fn tangent(&self, fraction: f64) -> Vector {
        match self {
            Self::Straight { from, to } => (to - from).normalize(),
            Self::Arc { start, sweep, .. } => {
                let phi = start + sweep * fraction;
                Vector::new(-phi.sin(), phi.cos(), 0.0) * sweep.signum()
            }
        }
    }
}

/// A weld: runs of one size and one filler metal under one name.
#[derive(Debug, Clone, PartialEq)]
pub struct Weld {
    /// Name, unique in its group.
    pub name: String,
    /// The runs, in the order of the path.
    pub runs: Vec<Run>,
    /// Legs and throat.
    pub size: FilletSize,
    /// Filler metal.
    pub filler: Filler,
    /// 1, or 2 for equal fillets on both sides of the plate: doubles the strength, not the size.
    pub sides: u8,
    /// Names of the plates joined.
    pub plates: Vec<String>,
    /// Name of the set of welds that are sized together.
    pub set: Option<String>,
}

impl Weld {
    /// Length of all runs, mm (one side).
    #[must_use]
    pub fn length(&self) -> f64 {
        self.runs.iter().map(Run::length).sum()
    }

    /// Effective throat of all sides together, mm.
    #[must_use]
    pub fn total_throat(&self) -> f64 {
        self.size.throat() * f64::from(self.sides)
    }
}

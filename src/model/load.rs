//! Loads, and the one statement of the sign convention.
//!
//! x points right, y up, z toward the reader; moments are right-handed, so a positive moment about z turns
//! anticlockwise. A force acts ON the moving part at its point of application. A [`Wrench`] is a force and
//! the moment about a stated reference point; [`Wrench::about`] moves the reference:
//!
//! `M_b = M_a + (a - b) x F`
//!
//! | symbol | code | unit | meaning |
//! |---|---|---|---|
//! | F | `force` | N | force |
//! | M | `moment` | N mm | moment about `reference` |

use super::{LARGEST_FORCE, LARGEST_LENGTH, LARGEST_MOMENT, ModelError, Vector, within};
use std::f64::consts::FRAC_PI_2;

/// A force and a moment about a reference point.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Wrench {
    /// Force, N.
    pub force: Vector,
    /// Moment about `reference`, N mm.
    pub moment: Vector,
    /// The point the moment refers to, mm.
    pub reference: Vector,
}

impl Wrench {
    /// A force at the point `at`, with a moment that is added to it.
    ///
    /// # Errors
    /// A component that is not finite or absurdly large.
    pub fn new(at: Vector, force: Vector, moment: Vector) -> Result<Self, ModelError> {
        for component in at.iter() {
            within("coordinate", *component, -LARGEST_LENGTH, LARGEST_LENGTH)?;
        }
        for component in force.iter() {
            within("force", *component, -LARGEST_FORCE, LARGEST_FORCE)?;
        }
        for component in moment.iter() {
            within("moment", *component, -LARGEST_MOMENT, LARGEST_MOMENT)?;
        }
        Ok(Self { force, moment, reference: at })
    }

    /// The same wrench with its moment about another point.
    #[must_use]
    pub fn about(&self, point: Vector) -> Self {
        let moment = self.moment + (self.reference - point).cross(&self.force);
        Self { force: self.force, moment, reference: point }
    }

    /// The sum of two wrenches, about the reference of the first.
    #[must_use]
    pub fn plus(&self, other: &Self) -> Self {
        let other = other.about(self.reference);
        Self {
            force: self.force + other.force,
            moment: self.moment + other.moment,
            reference: self.reference,
        }
    }

    /// The wrench times a load factor.
    #[must_use]
    pub fn scaled(&self, factor: f64) -> Self {
        Self { force: self.force * factor, moment: self.moment * factor, reference: self.reference }
    }
}

/// One load as it acts in a case: factors of combinations are included.
#[derive(Debug, Clone, PartialEq)]
pub struct AppliedLoad {
    /// Name of the case it belongs to in the file.
    pub case: String,
    /// Factor of the combination; 1 without combinations.
    pub factor: f64,
    /// Whether the file says where it acts: a moment alone needs no place.
    pub placed: bool,
    /// The factored load about its point of application.
    pub wrench: Wrench,
}

/// What has to be carried at one time: a case as given, or a combination of factored cases.
#[derive(Debug, Clone, PartialEq)]
pub struct LoadCase {
    /// Name of the case or combination.
    pub name: String,
    /// Its loads.
    pub loads: Vec<AppliedLoad>,
    /// Their sum, about the origin.
    pub wrench: Wrench,
}

impl LoadCase {
    /// A case of these loads.
    #[must_use]
    pub fn new(name: String, loads: Vec<AppliedLoad>) -> Self {
        let nothing = Wrench { force: Vector::zeros(), moment: Vector::zeros(), reference: Vector::zeros() };
        let wrench = loads.iter().fold(nothing, |sum, load| sum.plus(&load.wrench));
        Self { name, loads, wrench }
    }
}

/// The unit vector at an angle (rad) from the x axis, exact at multiples of a right angle.
#[must_use]
pub fn direction(angle: f64) -> Vector {
    let turns = angle / FRAC_PI_2;
    let whole = turns.round();
    if (turns - whole).abs() > 1e-14 * whole.abs().max(1.0) {
        return Vector::new(angle.cos(), angle.sin(), 0.0);
    }
    match whole.rem_euclid(4.0) {
        quarter if quarter < 0.5 => Vector::x(),
        quarter if quarter < 1.5 => Vector::y(),
        quarter if quarter < 2.5 => -Vector::x(),
        _ => -Vector::y(),
    }
}

#[cfg(test)]
#[allow(clippy::float_cmp)] // exact components are meant exactly
mod tests {
    use super::*;

    #[test]
    fn right_angles_are_exact() {
        for (degrees, x, y) in
            [(0.0, 1.0, 0.0), (90.0, 0.0, 1.0), (-90.0, 0.0, -1.0), (180.0, -1.0, 0.0), (630.0, 0.0, -1.0)]
        {
            let found = direction(f64::to_radians(degrees));
            assert_eq!((found.x, found.y), (x, y), "{degrees}");
        }
        let found = direction(f64::to_radians(60.0));
        assert!((found.x - 0.5).abs() < 1e-15 && (found.norm() - 1.0).abs() < 1e-15);
    }

    #[test]
    fn a_downward_force_to_the_right_turns_clockwise() {
        let at = Vector::new(100.0, 0.0, 0.0);
        let load = Wrench::new(at, Vector::new(0.0, -2.0, 0.0), Vector::zeros()).unwrap();
        assert_eq!(load.about(Vector::zeros()).moment, Vector::new(0.0, 0.0, -200.0));
    }

    #[test]
    fn a_sum_is_taken_about_the_first_reference() {
        let one = Wrench::new(Vector::zeros(), Vector::new(1.0, 0.0, 0.0), Vector::zeros()).unwrap();
        let two =
            Wrench::new(Vector::new(0.0, 5.0, 0.0), Vector::new(-1.0, 0.0, 0.0), Vector::zeros()).unwrap();
        let sum = one.plus(&two);
        assert_eq!(sum.force, Vector::zeros());
        assert_eq!(sum.moment, Vector::new(0.0, 0.0, 5.0));
    }
}

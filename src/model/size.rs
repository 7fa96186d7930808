//! Size of a fillet weld: legs, dihedral angle, effective throat, deformation size.
//!
//! | symbol | code | unit | meaning |
//! |---|---|---|---|
//! | a, b | `legs` | mm | legs along the two fusion faces |
//! | psi | `dihedral` | rad | angle between the fusion faces |
//! | t | `throat` | mm | effective throat, shortest distance from root to face |
//! | w | `deformation_size` | mm | size that scales the deformation limits of the laws |
//!
//! The diagrammatic weld is the triangle of the legs `a` and `b` enclosing `psi` at the root. Its face has the
//! length `c = sqrt(a^2 + b^2 - 2 a b cos psi)`, and the height on it is `t = a b sin psi / c` when its foot
//! lies on the face; otherwise the shorter leg is the shortest distance.
//!
//! Source: ANSI/AISC 360-22 J2.2a (effective throat: shortest distance from the root to the face of the
//! diagrammatic weld). The deformation size where legs are unequal, the joint is skewed or only the throat
//! is known is `sqrt(2) t`, a choice of this project: it equals the leg for the equal-legged right-angled
//! fillet that the published curves were measured on.

use super::{LARGEST_LENGTH, ModelError, SMALLEST_LENGTH, within};
use std::f64::consts::{FRAC_PI_2, SQRT_2};

/// Size of a fillet weld.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct FilletSize {
    legs: Option<[f64; 2]>,
    dihedral: f64,
    throat: f64,
    deformation_size: f64,
}

impl FilletSize {
    /// A fillet of legs `legs` (mm) between faces that enclose `dihedral` (rad).
    ///
    /// # Errors
    /// Legs outside the accepted lengths, or a dihedral angle outside 60 to 120 degrees.
    pub fn from_legs(legs: [f64; 2], dihedral: f64) -> Result<Self, ModelError> {
        let [a, b] = legs;
        within("leg", a, SMALLEST_LENGTH, LARGEST_LENGTH)?;
        within("leg", b, SMALLEST_LENGTH, LARGEST_LENGTH)?;
        check_dihedral(dihedral)?;
        let cosine = dihedral.cos();
        let face = (a * a + b * b - 2.0 * a * b * cosine).sqrt();
        // The foot of the height lies on the face while neither angle at the face is obtuse.
        let foot_on_face = a >= b * cosine && b >= a * cosine;
        let throat = if foot_on_face { a * b * dihedral.sin() / face } else { a.min(b) };
        let standard = (a - b).abs() <= 1e-12 * a && (dihedral - FRAC_PI_2).abs() <= 1e-12;
        let deformation_size = if standard { a } else { SQRT_2 * throat };
        Ok(Self { legs: Some(legs), dihedral, throat, deformation_size })
    }

    /// A fillet of which only the effective throat (mm) is known.
    ///
    /// # Errors
    /// A throat outside the accepted lengths, or a dihedral angle outside 60 to 120 degrees.
    pub fn from_throat(throat: f64, dihedral: f64) -> Result<Self, ModelError> {
        within("throat", throat, SMALLEST_LENGTH, LARGEST_LENGTH)?;
        check_dihedral(dihedral)?;
        Ok(Self { legs: None, dihedral, throat, deformation_size: SQRT_2 * throat })
    }

    /// The legs, mm; `None` when only the throat was given.
    #[must_use]
    pub fn legs(&self) -> Option<[f64; 2]> {
        self.legs
    }

    /// The smaller leg, mm; `None` when only the throat was given.
    #[must_use]
    pub fn leg(&self) -> Option<f64> {
        self.legs.map(|[a, b]| a.min(b))
    }

    /// Angle between the fusion faces, rad.
    #[must_use]
    pub fn dihedral(&self) -> f64 {
        self.dihedral
    }

    /// Effective throat, mm.
    #[must_use]
    pub fn throat(&self) -> f64 {
        self.throat
    }

    /// Size `w` that scales the deformations of the load-deformation laws, mm.
    #[must_use]
    pub fn deformation_size(&self) -> f64 {
        self.deformation_size
    }
}

fn check_dihedral(dihedral: f64) -> Result<(), ModelError> {
    let slack = 1e-9;
    within("dihedral angle in degrees", dihedral.to_degrees(), 60.0 - slack, 120.0 + slack).map(|_| ())
}

#[cfg(test)]
mod tests {
    use super::*;

    fn close(a: f64, b: f64) -> bool {
        (a - b).abs() <= 1e-12 * a.abs().max(b.abs())
    }

    #[test]
    fn equal_legs_at_a_right_angle_have_a_throat_of_leg_over_root_two() {
        let size = FilletSize::from_legs([8.0, 8.0], FRAC_PI_2).unwrap();
        assert!(close(size.throat(), 8.0 / SQRT_2));
        assert!(close(size.deformation_size(), 8.0));
    }

    #[test]
    fn unequal_legs_follow_the_height_of_the_triangle() {
        // 3-4-5 triangle: height on the hypotenuse is 12/5.
        let size = FilletSize::from_legs([3.0, 4.0], FRAC_PI_2).unwrap();
        assert!(close(size.throat(), 2.4));
        assert!(close(size.deformation_size(), 2.4 * SQRT_2));
    }

    #[test]
    fn skewed_equal_legs_follow_the_half_angle() {
        for degrees in [60.0_f64, 75.0, 105.0, 120.0] {
            let psi = degrees.to_radians();
            let size = FilletSize::from_legs([6.0, 6.0], psi).unwrap();
            assert!(close(size.throat(), 6.0 * (psi / 2.0).cos()));
        }
    }

    #[test]
    fn a_foot_beyond_the_face_leaves_the_shorter_leg() {
        let size = FilletSize::from_legs([4.0, 20.0], 60.0_f64.to_radians()).unwrap();
        assert!(close(size.throat(), 4.0));
    }

    #[test]
    fn impossible_sizes_are_refused() {
        assert!(FilletSize::from_legs([0.0, 6.0], FRAC_PI_2).is_err());
        assert!(FilletSize::from_legs([f64::NAN, 6.0], FRAC_PI_2).is_err());
        assert!(FilletSize::from_throat(-1.0, FRAC_PI_2).is_err());
        assert!(FilletSize::from_throat(5.0, 59.0_f64.to_radians()).is_err());
        assert!(FilletSize::from_throat(5.0, 121.0_f64.to_radians()).is_err());
    }
}

//! A load case turned to another direction, or shifted to another eccentricity.
//!
//! Every force of the case is turned about its own point of application by the one angle that brings their
//! resultant R to the direction wanted; or all forces are shifted in parallel, by t along the normal of R, so
//! that the load acts at the eccentricity wanted. Moments given as moments stay as they are.
//!
//! `F_i' = F_i d conj(R) / |R|` (as complex numbers) and `t x R = s e |R| - M`
//!
//! | symbol | code | unit | meaning |
//! |---|---|---|---|
//! | R | `resultant` | N | resultant force of the case |
//! | d | `direction` | - | unit vector at the angle wanted, exact at multiples of a right angle |
//! | M | `moment` | N mm | moment of the whole case about the weld centroid, before the shift |
//! | e | `eccentricity` | mm | signed distance of the line of action from the centroid |
//! | s | `sense` | - | sense of the moment of the case as given: 1 anticlockwise, -1 clockwise |
//! | t | `shift` | mm | what every point of application is moved by |
//!
//! A positive eccentricity keeps the sense of the moment as given, a negative one reverses it; a load given
//! through the centroid has the sense 1. Turned first, then shifted, with the sense of the load as given.
//! Source: statics. Loads in the plane only; a case without a resultant force cannot be turned or shifted.

use crate::model::{AppliedLoad, LoadCase, Vector, Wrench, direction};
use thiserror::Error;

/// Share of the sum of the sizes of all forces below which their resultant counts as none.
const NO_RESULTANT: f64 = 1e-12;
/// Eccentricity over the length of weld below which a load is given through the centroid: rounding, no more.
const THROUGH_CENTROID: f64 = 1e-9;

/// A load without a resultant force, but not without a moment.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Error)]
#[error("the load has no resultant force that could be turned or shifted")]
pub struct NoForce;

/// Where a load is wanted; `None` leaves it as it is.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct Wanted {
    /// Angle of the resultant from the x axis, rad.
    pub angle: Option<f64>,
    /// Distance of the line of action from the weld centroid, mm.
    pub eccentricity: Option<f64>,
}

/// The case turned and shifted; `length` is that of the weld, mm, the scale of eccentricities.
///
/// A case without any load stays as it is.
///
/// # Errors
/// [`NoForce`] where there is nothing to turn or shift.
pub fn varied(case: &LoadCase, wanted: Wanted, centroid: Vector, length: f64) -> Result<LoadCase, NoForce> {
    let mut loads = case.loads.clone();
    if let Some(angle) = wanted.angle {
        loads = turned(&loads, angle)?;
    }
    if let Some(eccentricity) = wanted.eccentricity {
        let signed = eccentricity * sense(&case.wrench.about(centroid), length);
        loads = shifted(&loads, signed, centroid)?;
    }
    Ok(LoadCase::new(case.name.clone(), loads))
}

/// The loads with their resultant at an angle from the x axis, rad.
fn turned(loads: &[AppliedLoad], angle: f64) -> Result<Vec<AppliedLoad>, NoForce> {
    let Some(resultant) = resultant(loads)? else { return Ok(loads.to_vec()) };
    let (along, wanted) = (resultant / resultant.norm(), direction(angle));
    let turned = |force: Vector| {
        // Against the resultant first: a single force is then exactly real, whatever its direction.
        let (real, imaginary) = (force.dot(&along), force.y * along.x - force.x * along.y);
        Vector::new(real * wanted.x - imaginary * wanted.y, real * wanted.y + imaginary * wanted.x, force.z)
    };
    let changed = |load: &AppliedLoad| {
        let wrench = Wrench { force: turned(load.wrench.force), ..load.wrench };
        AppliedLoad { wrench, ..load.clone() }
    };
    Ok(loads.iter().map(changed).collect())
}

/// The loads with the line of action of their resultant at a distance from the centroid, mm, that is positive
/// where the moment turns anticlockwise.
fn shifted(loads: &[AppliedLoad], signed: f64, centroid: Vector) -> Result<Vec<AppliedLoad>, NoForce> {
    let Some(resultant) = resultant(loads)? else { return Ok(loads.to_vec()) };
    let size = resultant.norm();
    let moment = LoadCase::new(String::new(), loads.to_vec()).wrench.about(centroid).moment.z;
    let normal = Vector::new(resultant.y, -resultant.x, 0.0) / size;
    let shift = normal * (signed - moment / size);
    let changed = |load: &AppliedLoad| {
        let mut changed = load.clone();
        if load.wrench.force.norm() > 0.0 {
            changed.wrench.reference += shift;
        }
        changed
    };
    Ok(loads.iter().map(changed).collect())
}

/// The sense of a load given about the centroid.
fn sense(about_centroid: &Wrench, length: f64) -> f64 {
    let moment = about_centroid.moment.z;
    let through = moment.abs() <= THROUGH_CENTROID * length * about_centroid.force.norm();
    if moment < 0.0 && !through { -1.0 } else { 1.0 }
}

/// The resultant force; `None` where there is no load at all.
fn resultant(loads: &[AppliedLoad]) -> Result<Option<Vector>, NoForce> {
    let sum: Vector = loads.iter().map(|load| load.wrench.force).sum();
    let sizes: f64 = loads.iter().map(|load| load.wrench.force.norm()).sum();
    let moments = loads.iter().any(|load| load.wrench.moment.norm() > 0.0);
    if sizes == 0.0 && !moments {
        Ok(None)
    } else if sum.norm() > NO_RESULTANT * sizes {
        Ok(Some(sum))
    } else {
        Err(NoForce)
    }
}

#[cfg(test)]
#[allow(clippy::float_cmp)] // exact components are meant exactly
mod tests {
    use super::*;
    use std::f64::consts::{FRAC_PI_2, PI};

    const LENGTH: f64 = 300.0;
    /// Some roundings of numbers of some thousand N and mm.
    const ROUNDING: f64 = 1e-9;

    fn at(x: f64, y: f64) -> Vector {
        Vector::new(x, y, 0.0)
    }

    fn load(point: Vector, force: Vector, moment: f64) -> AppliedLoad {
        let wrench = Wrench::new(point, force, Vector::new(0.0, 0.0, moment)).unwrap();
        AppliedLoad { case: "x".into(), factor: 1.0, placed: true, wrench }
    }

    fn case(loads: Vec<AppliedLoad>) -> LoadCase {
        LoadCase::new("x".into(), loads)
    }

    fn to_angle(case: &LoadCase, angle: f64) -> LoadCase {
        varied(case, Wanted { angle: Some(angle), eccentricity: None }, at(3.0, 4.0), LENGTH).unwrap()
    }

    fn to_eccentricity(case: &LoadCase, eccentricity: f64) -> LoadCase {
        let wanted = Wanted { angle: None, eccentricity: Some(eccentricity) };
        varied(case, wanted, at(3.0, 4.0), LENGTH).unwrap()
    }

    fn moment(case: &LoadCase) -> f64 {
        case.wrench.about(at(3.0, 4.0)).moment.z
    }

    #[test]
    fn a_single_force_turns_about_its_point_and_is_exact_at_right_angles() {
        let given = case(vec![load(at(100.0, 20.0), at(-3.1, -4.7), 7.0)]);
        for (angle, x, y) in
            [(0.0, 1.0, 0.0), (FRAC_PI_2, 0.0, 1.0), (-FRAC_PI_2, 0.0, -1.0), (PI, -1.0, 0.0)]
        {
            let found = &to_angle(&given, angle).loads[0].wrench;
            let size = found.force.norm();
            assert_eq!((found.force.x, found.force.y), (x * size, y * size));
            assert!((size - 3.1_f64.hypot(4.7)).abs() < 1e-14);
            assert_eq!((found.reference, found.moment.z), (at(100.0, 20.0), 7.0));
        }
    }

    #[test]
    fn forces_keep_their_angles_to_each_other() {
        let given = case(vec![
            load(at(100.0, 0.0), at(0.0, -12.0), 0.0),
            load(at(160.0, 0.0), at(7.0, -80.0), 0.0),
            load(at(0.0, 0.0), at(0.0, 0.0), 5.0),
        ]);
        let found = to_angle(&given, 0.3);
        assert!((found.wrench.force.y.atan2(found.wrench.force.x) - 0.3).abs() < 1e-14);
        let product = |case: &LoadCase| case.loads[0].wrench.force.dot(&case.loads[1].wrench.force);
        assert!((product(&found) - product(&given)).abs() < ROUNDING);
        assert_eq!(found.loads[2], given.loads[2]);
        // Its own angle changes nothing but roundings.
        let own = given.wrench.force.y.atan2(given.wrench.force.x);
        assert!((to_angle(&given, own).wrench.moment - given.wrench.moment).norm() < ROUNDING);
    }

    #[test]
    fn a_shift_keeps_the_force_and_gives_the_moment_of_the_eccentricity() {
        let given =
            case(vec![load(at(100.0, 0.0), at(0.0, -12.0), 0.0), load(at(160.0, 9.0), at(7.0, -80.0), 40.0)]);
        assert!(moment(&given) < 0.0);
        let size = given.wrench.force.norm();
        for eccentricity in [250.0, 1.0, 0.0, -80.0] {
            let found = to_eccentricity(&given, eccentricity);
            assert!((moment(&found) + eccentricity * size).abs() < ROUNDING, "{eccentricity}");
            assert!((found.wrench.force - given.wrench.force).norm() < 1e-12);
            let apart = |case: &LoadCase| case.loads[1].wrench.reference - case.loads[0].wrench.reference;
            assert!((apart(&found) - apart(&given)).norm() < ROUNDING, "shifted in parallel");
        }
        let own = -moment(&given) / size;
        assert!((moment(&to_eccentricity(&given, own)) - moment(&given)).abs() < ROUNDING);
    }

    #[test]
    fn a_load_through_the_centroid_gets_an_anticlockwise_moment() {
        let given = case(vec![load(at(3.0, 4.0), at(0.0, -10.0), 0.0)]);
        assert!((moment(&to_eccentricity(&given, 20.0)) - 200.0).abs() < ROUNDING);
    }

    #[test]
    fn turned_first_then_shifted_with_the_sense_as_given() {
        let given = case(vec![load(at(103.0, 4.0), at(0.0, -10.0), 0.0)]);
        // Turned upward the force alone would have an anticlockwise moment.
        let wanted = Wanted { angle: Some(FRAC_PI_2), eccentricity: Some(20.0) };
        let found = varied(&given, wanted, at(3.0, 4.0), LENGTH).unwrap();
        assert!((moment(&found) + 200.0).abs() < ROUNDING && found.wrench.force.y == 10.0);
    }

    #[test]
    fn without_a_force_there_is_nothing_to_turn_or_shift() {
        let wanted = Wanted { angle: Some(1.0), eccentricity: None };
        let answer = |loads| varied(&case(loads), wanted, at(0.0, 0.0), LENGTH);
        assert_eq!(answer(vec![load(at(0.0, 0.0), at(0.0, 0.0), 5.0)]), Err(NoForce));
        let couple = vec![load(at(0.0, 0.0), at(0.0, 5.0), 0.0), load(at(9.0, 0.0), at(0.0, -5.0), 0.0)];
        assert_eq!(answer(couple), Err(NoForce));
        let nothing = vec![load(at(1.0, 0.0), at(0.0, 0.0), 0.0)];
        assert_eq!(answer(nothing.clone()), Ok(case(nothing)));
    }
}

//! The load-deformation laws written out once more, and the library's laws against them.
//!
//! Everything here is *independent*: formulas as published, in their own units, with no code of the library.

use weldpole::input::catalog;
use weldpole::mechanics::law::{Direction, response, rupture_limit};
use weldpole::model::Law;

/// A displacement at an angle (rad) to the weld axis.
fn bearing(angle: f64) -> Direction {
    Direction::of(angle.cos(), angle.sin())
}

pub const LAWS: [&str; 4] =
    ["lesik-kennedy", "lesik-kennedy-polynomial", "butler-pal-kulak", "rigid-plastic"];

pub fn shipped(id: &str) -> &'static Law {
    catalog::law(id).unwrap()
}

/// Strength over the longitudinal strength at `theta` degrees and a deformation over the leg.
pub fn strength(id: &str, theta: f64, deformation: f64) -> f64 {
    let directional = 1.0 + 0.5 * theta.to_radians().sin().powf(1.5);
    let p = deformation / (0.209 * (theta + 2.0).powf(-0.32));
    match id {
        "lesik-kennedy" => directional * (p * (1.9 - 0.9 * p)).max(0.0).powf(0.3),
        "lesik-kennedy-polynomial" if p <= 0.0325 => directional * 8.23384 * p,
        "lesik-kennedy-polynomial" => {
            directional
                * (-13.29 * p + 457.32 * p.sqrt() - 3385.9 * p.cbrt() + 9054.29 * p.powf(0.25)
                    - 9952.13 * p.powf(0.2)
                    + 3840.71 * p.powf(1.0 / 6.0))
        }
        "butler-pal-kulak" => {
            // Inches of a 1/4 in leg; kip/in.
            let inches = 0.25 * deformation;
            let r_ult = |theta: f64| (10.0 + theta) / (0.92 + 0.0603 * theta);
            let mu = 75.0 * (0.0114 * theta).exp();
            let lambda = 0.4 * (0.0146 * theta).exp();
            r_ult(theta) * (1.0 - (-mu * inches).exp()).powf(lambda) / r_ult(0.0)
        }
        "rigid-plastic" => directional,
        other => panic!("{other}"),
    }
}

/// Rupture deformation over the leg; infinite where the law has none.
pub fn limit(id: &str, theta: f64) -> f64 {
    match id {
        "lesik-kennedy" => (1.087 * (theta + 6.0).powf(-0.65)).min(0.17),
        "lesik-kennedy-polynomial" => 1.087 * (theta + 6.0).powf(-0.65),
        "butler-pal-kulak" => 0.225 * (theta + 5.0).powf(-0.47) / 0.25,
        "rigid-plastic" => f64::INFINITY,
        other => panic!("{other}"),
    }
}

/// Two evaluations of the same formula in another order of operations. The polynomial adds terms of alternating
/// sign up to 1e4 times its value.
const SAME_FORMULA: f64 = 1e-10;
/// Central differences of step 1e-5: 1e-10 of truncation over the curvature, 1e-10 of rounding over the step.
const DIFFERENCE: f64 = 1e-6;

#[test]
fn every_law_is_its_published_formula() {
    for id in LAWS {
        for theta in [0.0, 0.5, 3.0, 11.4, 30.0, 45.0, 60.0, 89.0, 90.0_f64] {
            let law = shipped(id);
            let own = rupture_limit(law, theta.to_radians()).map_or(f64::INFINITY, |(value, _)| value);
            let most = limit(id, theta);
            assert!(
                (own / most - 1.0).abs() < SAME_FORMULA || own.min(most).is_infinite(),
                "{id}, {theta}: {own}, {most}"
            );
            for share in [1e-4, 1e-3, 0.01, 0.1, 0.3, 0.7, 1.0] {
                let deformation = share * most.min(1.0);
                let own = response(law, &bearing(theta.to_radians()), deformation).strength;
                let expected = strength(id, theta, deformation);
                assert!(
                    (own - expected).abs() <= SAME_FORMULA * expected.max(1.0),
                    "{id}, {theta} degrees, {share} of rupture: {own}, {expected}"
                );
            }
        }
    }
}

#[test]
fn derivatives_of_every_law_are_its_differences() {
    for id in LAWS {
        let law = shipped(id);
        for theta in [0.8, 5.0, 20.0, 45.0, 75.0, 89.0_f64] {
            for share in [0.02, 0.2, 0.6, 0.95] {
                let (angle, d) = (theta.to_radians(), share * limit(id, theta).min(0.2));
                let at = |angle: f64, d: f64| response(law, &bearing(angle), d).strength;
                let own = response(law, &bearing(angle), d);
                let (step, turn) = (1e-5 * d, 1e-5 * angle);
                let by_deformation = (at(angle, d + step) - at(angle, d - step)) / (2.0 * step);
                let by_angle = (at(angle + turn, d) - at(angle - turn, d)) / (2.0 * turn);
                let scale = own.strength / d;
                assert!(
                    (own.by_deformation - by_deformation).abs() < DIFFERENCE * scale,
                    "{id}, {theta}, {share}: {} against {by_deformation}",
                    own.by_deformation
                );
                let scale = own.strength / angle;
                assert!(
                    (own.by_angle - by_angle).abs() < DIFFERENCE * scale,
                    "{id}, {theta}, {share}: {} against {by_angle}",
                    own.by_angle
                );
            }
        }
    }
}

#[test]
fn lesik_kennedy_curves_peak_at_one_and_the_polynomial_is_continuous() {
    for theta in [0.0, 10.0, 45.0, 90.0_f64] {
        let angle = theta.to_radians();
        let delta_m = 0.209 * (theta + 2.0).powf(-0.32);
        let full = 1.0 + 0.5 * angle.sin().powf(1.5);
        for (id, tolerance) in [
            // p (1.9 - 0.9 p) = 1 at p = 1.
            ("lesik-kennedy", 1e-12),
            // The published coefficients add up to 1.00 to the two decimals they have: -13.29 + ... + 3840.71.
            ("lesik-kennedy-polynomial", 1e-9),
        ] {
            let own = response(shipped(id), &bearing(angle), delta_m).strength;
            assert!((own / full - 1.0).abs() < tolerance, "{id}, {theta}: {own} against {full}");
        }
        // At p = 0.0325 the straight part meets the polynomial: the coefficients have two decimals at 1e4, and
        // 0.0325^(1/6) = 0.56 of half a unit of each leaves up to 1e-2.
        let at =
            |p: f64| response(shipped("lesik-kennedy-polynomial"), &bearing(angle), p * delta_m).strength;
        let (below, above) = (at(0.0325 * (1.0 - 1e-9)), at(0.0325 * (1.0 + 1e-9)));
        assert!((above / below - 1.0).abs() < 1e-2, "{theta}: {below}, {above}");
    }
    // The simplified curve peaks at p = 1.9 / 1.8 and ends at 1.9 / 0.9 (method: 1.0556 and 2.11).
    let law = shipped("lesik-kennedy");
    let delta_m = 0.209 * 2.0_f64.powf(-0.32);
    let at = |p: f64| response(law, &bearing(0.0), p * delta_m);
    assert!(at(1.9 / 1.8).by_deformation.abs() < 1e-10);
    assert!(at(1.05).by_deformation > 0.0 && at(1.06).by_deformation < 0.0);
    assert!(at(2.1111).strength > 0.0 && at(2.1112).strength.abs() < 1e-300);
    // At 11.4 degrees rupture lies at p = 1.86, where f = 0.77.
    let p: f64 = 1.087 * 17.4_f64.powf(-0.65) / (0.209 * 13.4_f64.powf(-0.32));
    assert_eq!(format!("{p:.2} {:.2}", (p * (1.9 - 0.9 * p)).powf(0.3)), "1.86 0.77");
}

//! A user's own law: straight lines between measured points, at one or more angles.
//!
//! | symbol | code | unit | meaning |
//! |---|---|---|---|
//! | xi | `share` | - | deformation over the rupture deformation at the same angle |
//! | d_j | - | - | rupture deformation of the curve at angle theta_j, over the leg |
//! | C_j(xi) | `strength_at` | - | strength of that curve at `xi d_j` |
//!
//! Between two curves, with the share `tau` of the way from theta_j to theta_(j+1):
//! `Delta_u = (1 - tau) d_j + tau d_(j+1)` and `s = (1 - tau) C_j(xi) + tau C_(j+1)(xi)`.
//! Outside the given angles the nearest curve holds; beyond rupture the last strength is kept.
//! The interpolation is a choice of this project; the curves are the user's.

use super::response::Response;
use crate::model::{TableCurve, TableLaw};

/// The two curves around an angle (degrees), the share between them, and its derivative per degree.
fn bracket(table: &TableLaw, theta: f64) -> (&TableCurve, &TableCurve, f64, f64) {
    let curves = table.curves();
    let after = curves.partition_point(|curve| curve.angle <= theta);
    if after == 0 || after == curves.len() {
        let only = &curves[after.min(curves.len() - 1)];
        return (only, only, 0.0, 0.0);
    }
    let (low, high) = (&curves[after - 1], &curves[after]);
    let width = high.angle - low.angle;
    (low, high, (theta - low.angle) / width, 1.0 / width)
}

fn rupture_of(curve: &TableCurve) -> f64 {
    curve.points[curve.points.len() - 1][0]
}

/// Strength and slope (per share of rupture) of one curve.
fn strength_at(curve: &TableCurve, share: f64) -> (f64, f64) {
    let rupture = rupture_of(curve);
    let deformation = share * rupture;
    let last = curve.points.len() - 1;
    let after = curve.points.partition_point(|point| point[0] <= deformation).max(1);
    if after > last {
        return (curve.points[last][1], 0.0);
    }
    let ([d0, g0], [d1, g1]) = (curve.points[after - 1], curve.points[after]);
    let slope = (g1 - g0) / (d1 - d0);
    (g0 + slope * (deformation - d0), slope * rupture)
}

pub(super) fn rupture_limit(table: &TableLaw, angle: f64) -> (f64, f64) {
    let (low, high, share, by_theta) = bracket(table, angle.to_degrees());
    let (d0, d1) = (rupture_of(low), rupture_of(high));
    (d0 + share * (d1 - d0), (d1 - d0) * by_theta * 180.0 / std::f64::consts::PI)
}

pub(super) fn response(table: &TableLaw, angle: f64, deformation: f64) -> Response {
    let (low, high, tau, by_theta) = bracket(table, angle.to_degrees());
    let (limit, limit_slope) = rupture_limit(table, angle);
    let share = deformation / limit;
    let (g0, s0) = strength_at(low, share);
    let (g1, s1) = strength_at(high, share);
    let by_share = s0 + tau * (s1 - s0);
    Response {
        strength: g0 + tau * (g1 - g0),
        by_deformation: by_share / limit,
        by_angle: (g1 - g0) * by_theta * 180.0 / std::f64::consts::PI
            - by_share * share * limit_slope / limit,
    }
}

pub(super) fn limit_falls(table: &TableLaw) -> bool {
    table.curves().windows(2).all(|pair| rupture_of(&pair[1]) <= rupture_of(&pair[0]))
}

pub(super) fn kink_levels(table: &TableLaw) -> Vec<f64> {
    let mut levels: Vec<f64> = table
        .curves()
        .iter()
        .flat_map(|curve| {
            let inner = &curve.points[1..curve.points.len() - 1];
            inner.iter().map(|point| point[0] / rupture_of(curve))
        })
        .collect();
    levels.sort_by(f64::total_cmp);
    levels.dedup();
    levels
}

pub(super) fn kink_angles(table: &TableLaw) -> Vec<f64> {
    table
        .curves()
        .iter()
        .map(|curve| curve.angle.to_radians())
        .filter(|angle| *angle > 0.0 && *angle < std::f64::consts::FRAC_PI_2)
        .collect()
}

//! Strength of a weld point at a given deformation and direction: the load-deformation laws evaluated.
//!
//! The strength per length of weld is `r = S s(theta, d)`, with `S = F_l t` the longitudinal strength per
//! length (F_l the rule set's longitudinal strength per throat area, 0.60 F_EXX in most codes).
//!
//! | symbol | code | unit | meaning |
//! |---|---|---|---|
//! | theta | `angle` | rad | angle between displacement and weld axis, 0 to pi/2 (degrees inside the powers) |
//! | d | `deformation` | - | displacement over the deformation size w |
//! | s | `Response::strength` | - | strength over the longitudinal strength |
//! | Delta_m | `peak` | - | deformation at greatest strength over w |
//! | Delta_u | [`rupture_limit`] | - | deformation at rupture over w |
//!
//! * Lesik-Kennedy: `s = (1 + 0.50 sin^1.5 theta) f(p)`, `p = d / Delta_m`, with
//!   `f = [p (1.9 - 0.9 p)]^0.3` (simplified) or a polynomial in roots of p.
//!   Source: Lesik and Kennedy, Can. J. Civ. Eng. 17 (1990); ANSI/AISC 360-10 J2.4.
//! * Butler-Pal-Kulak: `R = (10 + theta)/(0.92 + 0.0603 theta) (1 - exp(-mu D))^lambda`, `s = R / R(0, inf)`.
//!   Source: Butler, Pal and Kulak, J. Struct. Div. ASCE 98 (1972).
//! * Rigid-plastic: `s = 1 + 0.50 sin^1.5 theta` at any deformation. Own tables: `mechanics::table_law`.
//!
//! Valid for 0 <= d up to rupture. Beyond the end of the simplified curve (p > 2.11) the strength is zero.

pub use super::response::{Direction, Response};
use super::table_law;
use crate::model::{Curve, Directional, Law, LawForm, PowerOfAngle, RootPolynomial};

/// Evaluates a law for a displacement of the given direction and size (over w, positive).
#[must_use]
pub fn response(law: &Law, direction: &Direction, deformation: f64) -> Response {
    let angle = direction.angle;
    match &law.form {
        LawForm::LesikKennedy { directional, curve, peak, .. } => {
            lesik_kennedy(directional, curve, peak, direction, deformation)
        }
        LawForm::ButlerPalKulak { numerator, denominator, mu, lambda, test_leg, .. } => {
            let theta = angle.to_degrees();
            let scale = (numerator[0] + numerator[1] * theta) / (denominator[0] + denominator[1] * theta)
                * (denominator[0] / numerator[0]);
            let by_scale = numerator[1] / (numerator[0] + numerator[1] * theta)
                - denominator[1] / (denominator[0] + denominator[1] * theta);
            let mu_value = mu[0] * (mu[1] * theta).exp() * test_leg;
            let exponent = lambda[0] * (lambda[1] * theta).exp();
            let decay = (-mu_value * deformation).exp();
            let base = -(-mu_value * deformation).exp_m1();
            let strength = scale * base.powf(exponent);
            // d ln s / d(mu D) = lambda e^(-mu D) / (1 - e^(-mu D))
            let by_mu_d = exponent * decay / base;
            let log_by_theta =
                by_scale + by_mu_d * mu[1] * mu_value * deformation + exponent * lambda[1] * base.ln();
            Response {
                strength,
                by_deformation: strength * by_mu_d * mu_value,
                by_angle: strength * log_by_theta * DEGREES_PER_RADIAN,
            }
        }
        LawForm::RigidPlastic { directional } => {
            let (strength, by_angle) = directional_strength(directional, direction);
            Response { strength, by_deformation: 0.0, by_angle }
        }
        LawForm::Table(table) => table_law::response(table, angle, deformation),
    }
}

/// Rupture deformation over w and its derivative by the angle (per rad); `None` for a law without limit.
#[must_use]
pub fn rupture_limit(law: &Law, angle: f64) -> Option<(f64, f64)> {
    match &law.form {
        LawForm::LesikKennedy { limit, .. } => {
            let (value, slope) = power_of_angle(&limit.power, angle);
            match limit.cap {
                Some(cap) if value > cap => Some((cap, 0.0)),
                _ => Some((value, slope)),
            }
        }
        LawForm::ButlerPalKulak { limit, test_leg, .. } => {
            let (value, slope) = power_of_angle(limit, angle);
            Some((value / test_leg, slope / test_leg))
        }
        LawForm::RigidPlastic { .. } => None,
        LawForm::Table(table) => Some(table_law::rupture_limit(table, angle)),
    }
}

/// Whether the law has a deformation limit at all.
#[must_use]
pub fn ruptures(law: &Law) -> bool {
    match &law.form {
        LawForm::LesikKennedy { .. } | LawForm::ButlerPalKulak { .. } | LawForm::Table(_) => true,
        LawForm::RigidPlastic { .. } => false,
    }
}

/// Whether the rupture deformation never grows with the angle, so that a straight run ruptures at an end.
#[must_use]
pub fn ruptures_at_ends(law: &Law) -> bool {
    match &law.form {
        LawForm::LesikKennedy { limit, .. } => limit.power.exponent <= 0.0 && limit.power.coefficient > 0.0,
        LawForm::ButlerPalKulak { limit, .. } => limit.exponent <= 0.0 && limit.coefficient > 0.0,
        LawForm::RigidPlastic { .. } => true,
        LawForm::Table(table) => table_law::limit_falls(table),
    }
}

/// Levels of [`level`] at which the strength has a kink in the deformation.
#[must_use]
pub fn kink_levels(law: &Law) -> Vec<f64> {
    match &law.form {
        LawForm::LesikKennedy { curve: Curve::Roots(roots), .. } => vec![roots.linear_to],
        LawForm::LesikKennedy { curve: Curve::Product { .. }, .. }
        | LawForm::ButlerPalKulak { .. }
        | LawForm::RigidPlastic { .. } => Vec::new(),
        LawForm::Table(table) => table_law::kink_levels(table),
    }
}

/// Angles (rad) other than 0 and pi/2 at which the strength has a kink in the angle.
#[must_use]
pub fn kink_angles(law: &Law) -> Vec<f64> {
    match &law.form {
        LawForm::LesikKennedy { .. } | LawForm::ButlerPalKulak { .. } | LawForm::RigidPlastic { .. } => {
            Vec::new()
        }
        LawForm::Table(table) => table_law::kink_angles(table),
    }
}

/// The measure of deformation that [`kink_levels`] refers to: p for the polynomial, share of rupture for tables.
#[must_use]
pub fn level(law: &Law, angle: f64, deformation: f64) -> f64 {
    match &law.form {
        LawForm::LesikKennedy { peak, .. } => deformation / power_of_angle(peak, angle).0,
        LawForm::Table(table) => deformation / table_law::rupture_limit(table, angle).0,
        LawForm::ButlerPalKulak { .. } | LawForm::RigidPlastic { .. } => deformation,
    }
}

const DEGREES_PER_RADIAN: f64 = 180.0 / std::f64::consts::PI;

fn lesik_kennedy(
    directional: &Directional,
    curve: &Curve,
    peak: &PowerOfAngle,
    direction: &Direction,
    deformation: f64,
) -> Response {
    let (delta_m, delta_m_slope) = power_of_angle(peak, direction.angle);
    let p = deformation / delta_m;
    let (f, f_slope) = curve_value(curve, p);
    let (k, k_slope) = directional_strength(directional, direction);
    Response {
        strength: k * f,
        by_deformation: k * f_slope / delta_m,
        by_angle: k_slope * f - k * f_slope * p * delta_m_slope / delta_m,
    }
}

/// `1 + a sin^1.5 theta` and its derivative by theta.
fn directional_strength(directional: &Directional, direction: &Direction) -> (f64, f64) {
    let root = direction.sine.sqrt();
    (
        1.0 + directional.amplitude * direction.sine * root,
        1.5 * directional.amplitude * root * direction.cosine,
    )
}

/// `c (theta + o)^e` with theta in degrees, and its derivative per rad.
fn power_of_angle(power: &PowerOfAngle, angle: f64) -> (f64, f64) {
    let base = angle * DEGREES_PER_RADIAN + power.offset;
    let value = power.coefficient * base.powf(power.exponent);
    (value, value * power.exponent / base * DEGREES_PER_RADIAN)
}

/// f(p) and f'(p).
fn curve_value(curve: &Curve, p: f64) -> (f64, f64) {
    match curve {
        Curve::Product { a, b, exponent } => {
            let bracket = p * (a - b * p);
            if bracket <= 0.0 {
                return (0.0, 0.0);
            }
            let f = bracket.powf(*exponent);
            (f, exponent * f / bracket * (a - 2.0 * b * p))
        }
        Curve::Roots(roots) => root_polynomial(roots, p),
    }
}

fn root_polynomial(roots: &RootPolynomial, p: f64) -> (f64, f64) {
    if p <= roots.linear_to {
        return (roots.slope * p, roots.slope);
    }
    let logarithm = p.ln();
    let (mut f, mut slope) = (0.0, 0.0);
    for (k, coefficient) in (1_u8..).zip(roots.coefficients) {
        let power = 1.0 / f64::from(k);
        let term = coefficient * (logarithm * power).exp();
        f += term;
        slope += term * power / p;
    }
    if f <= 0.0 { (0.0, 0.0) } else { (f, slope) }
}

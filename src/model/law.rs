//! Load-deformation laws as data: the form is chosen here, the coefficients come from data files or the user.
//!
//! | symbol | code | unit | meaning |
//! |---|---|---|---|
//! | theta | - | degree | angle between displacement and weld axis, 0 to 90 |
//! | Delta_m | `peak` | - | deformation at greatest strength, over the leg |
//! | Delta_u | `limit` | - | deformation at rupture, over the leg |
//! | f(p) | `curve` | - | share of the strength at p = Delta / Delta_m |
//!
//! Power laws of the angle read `coefficient (theta + offset)^exponent`. The evaluation is `mechanics::law`.

use super::ModelError;

/// How far a number taken from a publication is confirmed.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Confirmation {
    /// Read in the published text.
    Read,
    /// Recalled from memory, or confirmed only indirectly.
    Recalled,
}

/// `coefficient (theta + offset)^exponent`, theta in degrees.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct PowerOfAngle {
    /// Factor.
    pub coefficient: f64,
    /// Added to theta, degrees.
    pub offset: f64,
    /// Exponent.
    pub exponent: f64,
}

/// Rupture deformation over the leg: a power of the angle, with an optional cap.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Limit {
    /// The power law.
    pub power: PowerOfAngle,
    /// Greatest value over the leg.
    pub cap: Option<f64>,
}

/// Directional strength `1 + amplitude sin^1.5 theta`.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Directional {
    /// Increase at 90 degrees.
    pub amplitude: f64,
}

/// `slope p` up to `linear_to`, beyond it `constant p + sum c_k p^(1/k)`, k = 2..6.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct RootPolynomial {
    /// Slope of the first straight part.
    pub slope: f64,
    /// End of the straight part.
    pub linear_to: f64,
    /// Coefficients of p, p^(1/2), ... p^(1/6).
    pub coefficients: [f64; 6],
}

/// The curve f(p) of a Lesik-Kennedy law.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Curve {
    /// `f = [p (a - b p)]^exponent`.
    Product {
        /// Constant in the bracket.
        a: f64,
        /// Factor of p in the bracket.
        b: f64,
        /// Exponent of the whole.
        exponent: f64,
    },
    /// A polynomial in roots of p.
    Roots(RootPolynomial),
}

/// Strength against deformation at one angle, from a user's tests.
#[derive(Debug, Clone, PartialEq)]
pub struct TableCurve {
    /// Angle between load and weld axis, degrees.
    pub angle: f64,
    /// Points (deformation / leg, strength / longitudinal strength), from (0, 0) to rupture.
    pub points: Vec<[f64; 2]>,
}

/// A user's own law: piecewise straight curves at one or more angles.
///
/// Between two angles the strength is interpolated linearly at equal shares of the rupture deformation, which
/// is itself interpolated linearly; outside the given angles the nearest curve holds.
#[derive(Debug, Clone, PartialEq)]
pub struct TableLaw {
    curves: Vec<TableCurve>,
}

impl TableLaw {
    /// A law from curves at increasing angles.
    ///
    /// # Errors
    /// No curve, angles outside 0 to 90 or not increasing, fewer than two points, a first point other than
    /// (0, 0), deformations that do not increase, or strengths that are not positive and at most 10.
    pub fn new(curves: Vec<TableCurve>) -> Result<Self, ModelError> {
        let refuse = |text: String| Err(ModelError::Curve(text));
        if curves.is_empty() {
            return refuse("a law needs at least one curve".into());
        }
        for pair in curves.windows(2) {
            if pair[1].angle <= pair[0].angle {
                return refuse(format!(
                    "angles must increase, found {} after {}",
                    pair[1].angle, pair[0].angle
                ));
            }
        }
        for curve in &curves {
            if !(0.0..=90.0).contains(&curve.angle) {
                return refuse(format!("an angle must lie between 0 and 90 degrees, found {}", curve.angle));
            }
            if curve.points.len() < 2 {
                return refuse(format!("a curve needs at least two points, found {}", curve.points.len()));
            }
            if curve.points[0] != [0.0, 0.0] {
                return refuse("a curve must start at [0, 0]".into());
            }
            for pair in curve.points.windows(2) {
                let ([before, _], [deformation, strength]) = (pair[0], pair[1]);
                if !(deformation > before && deformation <= 10.0) {
                    return refuse(format!(
                        "deformations must increase and stay below 10 legs, found {deformation} after {before}"
                    ));
                }
                if !(strength > 0.0 && strength <= 10.0) {
                    return refuse(format!("a strength must lie above 0 and at most 10, found {strength}"));
                }
            }
        }
        Ok(Self { curves })
    }

    /// The curves, by increasing angle.
    #[must_use]
    pub fn curves(&self) -> &[TableCurve] {
        &self.curves
    }
}

/// The form of a law with its coefficients.
#[derive(Debug, Clone, PartialEq)]
pub enum LawForm {
    /// Lesik and Kennedy: directional strength times a curve in `p = Delta / Delta_m`.
    LesikKennedy {
        /// Directional strength.
        directional: Directional,
        /// The curve f(p).
        curve: Curve,
        /// Deformation at greatest strength.
        peak: PowerOfAngle,
        /// Deformation at rupture.
        limit: Limit,
    },
    /// Butler, Pal and Kulak, normalised to its longitudinal strength:
    /// `R(theta, D) / R(0, inf)`, `R = (10 + theta) / (0.92 + 0.0603 theta) (1 - e^(-mu D))^lambda`.
    ButlerPalKulak {
        /// 10 and 1: numerator `n0 + n1 theta`.
        numerator: [f64; 2],
        /// 0.92 and 0.0603: denominator `d0 + d1 theta`.
        denominator: [f64; 2],
        /// 75 and 0.0114: `mu = m0 exp(m1 theta)`, per `deformation_scale`.
        mu: [f64; 2],
        /// 0.4 and 0.0146: `lambda = l0 exp(l1 theta)`.
        lambda: [f64; 2],
        /// Rupture deformation in the unit of the tests.
        limit: PowerOfAngle,
        /// Leg of the tests in the unit of their deformations (0.25 in): D = deformation / leg times this.
        test_leg: f64,
    },
    /// Full directional strength at any deformation, without a deformation limit.
    RigidPlastic {
        /// Directional strength.
        directional: Directional,
    },
    /// A user's own table of points.
    Table(TableLaw),
}

/// A load-deformation law.
#[derive(Debug, Clone, PartialEq)]
pub struct Law {
    /// Identifier, for example `lesik-kennedy`.
    pub id: String,
    /// Title for people.
    pub title: String,
    /// Publication.
    pub source: String,
    /// How far its coefficients are confirmed.
    pub status: Confirmation,
    /// Form and coefficients.
    pub form: LawForm,
}

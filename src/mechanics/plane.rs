//! A plane weld group prepared for analysis: pieces of weld in coordinates that suit the arithmetic.
//!
//! Positions are taken from the weld centroid c and divided by the polar gyration radius rho, so that a
//! motion is `q = (v_x, v_y, omega rho)` in mm and a wrench is `(F_x, F_y, M / rho)` in N: three numbers of
//! one unit each.
//!
//! | symbol | code | unit | meaning |
//! |---|---|---|---|
//! | c | `centroid` | mm | throat-weighted centroid |
//! | rho | `gyration` | mm | sqrt(J / A) |
//! | S | `strength` | N per rho | longitudinal strength of a piece per unit of scaled length |
//! | w | `size` | mm | deformation size of the weld |
//! | u | [`displacement`] | mm | `u = (v_x - omega y, v_y + omega x)` |
//!
//! Source: kinematics of a small rigid motion. Runs out of the plane z = 0 are refused by the input layer.

use super::law::{kink_angles, kink_levels, ruptures_at_ends};
use super::section::Section;
use crate::model::{Discretisation, Law, Run, Vector, WeldGroup, Wrench};
use nalgebra::{Vector2, Vector3};

/// A motion `(v_x, v_y, omega rho)`, mm, or a wrench `(F_x, F_y, M / rho)`, N.
pub type Triple = Vector3<f64>;

/// A piece of weld in scaled coordinates.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Shape {
    /// A straight run: start, unit tangent, length.
    Straight {
        /// Start.
        from: Vector2<f64>,
        /// Unit vector along the run.
        tangent: Vector2<f64>,
        /// Length.
        length: f64,
    },
    /// An arc: centre, radius and the angles it covers, `low` below `high`.
    Arc {
        /// Centre.
        centre: Vector2<f64>,
        /// Radius.
        radius: f64,
        /// Smallest angle.
        low: f64,
        /// Greatest angle.
        high: f64,
    },
}

/// One run with what the mechanics needs of its weld.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Piece {
    /// Index of the weld in the group.
    pub weld: usize,
    /// Index of the run in the weld.
    pub run: usize,
    /// Geometry.
    pub shape: Shape,
    /// Longitudinal strength per unit of scaled length, N.
    pub strength: f64,
    /// Deformation size, mm.
    pub size: f64,
}

/// A mid-point element.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct PointElement {
    /// Index of the piece.
    pub piece: usize,
    /// Middle, scaled.
    pub at: Vector2<f64>,
    /// Unit vector along the weld axis.
    pub tangent: Vector2<f64>,
    /// Longitudinal strength of the element, N.
    pub strength: f64,
    /// Deformation size, mm.
    pub size: f64,
}

/// A plane weld group with its law, ready for analysis.
#[derive(Debug, Clone, PartialEq)]
pub struct PlaneGroup {
    /// Runs in scaled coordinates.
    pub pieces: Vec<Piece>,
    /// Mid-point elements; empty for the continuous weld.
    pub elements: Vec<PointElement>,
    /// Load-deformation law.
    pub law: Law,
    /// Line properties.
    pub section: Section,
    /// Polar gyration radius, mm.
    pub gyration: f64,
    /// Levels of deformation where the law has a kink.
    pub(super) kink_levels: Vec<f64>,
    /// Angles where the law has a kink, rad.
    pub(super) kink_angles: Vec<f64>,
    /// Whether straight runs rupture at their ends.
    pub(super) ruptures_at_ends: bool,
}

impl PlaneGroup {
    /// Prepares a group whose longitudinal strength per throat area is `longitudinal` times the filler's
    /// tensile strength.
    #[must_use]
    pub fn new(group: &WeldGroup, law: &Law, longitudinal: f64, discretisation: Discretisation) -> Self {
        let section = Section::of(group);
        let gyration = (section.j / section.throat_area).sqrt();
        let scaled = |point: Vector| ((point - section.centroid) / gyration).xy();
        let mut pieces = Vec::new();
        let mut elements = Vec::new();
        let longest = group.longest_run();
        for (weld_index, weld) in group.welds().iter().enumerate() {
            let strength = longitudinal * weld.filler.strength * weld.total_throat() * gyration;
            let size = weld.size.deformation_size();
            for (run_index, run) in weld.runs.iter().enumerate() {
                let shape = match *run {
                    Run::Straight { from, .. } => Shape::Straight {
                        from: scaled(from),
                        tangent: run.tangent(0.0).xy(),
                        length: run.length() / gyration,
                    },
                    Run::Arc { centre, radius, start, sweep } => Shape::Arc {
                        centre: scaled(centre),
                        radius: radius / gyration,
                        low: start.min(start + sweep),
                        high: start.max(start + sweep),
                    },
                };
                if let Discretisation::Elements(count) = discretisation {
                    let parts = cell_count(run, count, longest);
                    let part = 1.0 / as_float(parts);
                    elements.extend((0..parts).map(|k| {
                        let fraction = (as_float(k) + 0.5) * part;
                        PointElement {
                            piece: pieces.len(),
                            at: scaled(run.point(fraction)),
                            tangent: run.tangent(fraction).xy(),
                            strength: strength * run.length() / gyration * part,
                            size,
                        }
                    }));
                }
                pieces.push(Piece { weld: weld_index, run: run_index, shape, strength, size });
            }
        }
        Self {
            pieces,
            elements,
            law: law.clone(),
            section,
            gyration,
            kink_levels: kink_levels(law),
            kink_angles: kink_angles(law),
            ruptures_at_ends: ruptures_at_ends(law),
        }
    }

    /// The same group as a continuous weld, without elements.
    #[must_use]
    pub fn continuous(&self) -> Self {
        Self { elements: Vec::new(), ..self.clone() }
    }

    /// A load as `(F_x, F_y, M_z / rho)` about the centroid.
    #[must_use]
    pub fn triple(&self, load: &Wrench) -> Triple {
        let load = load.about(self.section.centroid);
        Triple::new(load.force.x, load.force.y, load.moment.z / self.gyration)
    }

    /// The unscaled coordinates of a scaled point, mm; what scaling to and fro leaves of a zero is zero.
    #[must_use]
    pub fn unscaled(&self, at: Vector2<f64>) -> Vector {
        let point = self.section.centroid + Vector::new(at.x, at.y, 0.0) * self.gyration;
        let rounding =
            16.0 * f64::EPSILON * (self.section.centroid.norm() + self.gyration * (1.0 + at.norm()));
        point.map(|coordinate| if coordinate.abs() <= rounding { 0.0 } else { coordinate })
    }
}

/// Number of equal cells of a run when the longest run has `count`: the same cell length, at least one.
#[must_use]
pub fn cell_count(run: &Run, count: usize, longest: f64) -> usize {
    let wanted = (as_float(count) * run.length() / longest).round();
    #[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "between 1 and count")]
    let cells = wanted.clamp(1.0, as_float(count.max(1))) as usize;
    cells
}

/// A count as a float; counts of elements stay far below 2^53.
#[expect(clippy::cast_precision_loss, reason = "counts of elements are far below 2^53")]
pub(super) fn as_float(count: usize) -> f64 {
    count as f64
}

impl Piece {
    /// The piece's parameter range: scaled length along a straight run, angle along an arc.
    #[must_use]
    pub fn range(&self) -> (f64, f64) {
        match self.shape {
            Shape::Straight { length, .. } => (0.0, length),
            Shape::Arc { low, high, .. } => (low, high),
        }
    }

    /// Scaled position, and unit vector along the weld axis, at a parameter.
    #[must_use]
    pub fn frame(&self, parameter: f64) -> (Vector2<f64>, Vector2<f64>) {
        match self.shape {
            Shape::Straight { from, tangent, .. } => (from + tangent * parameter, tangent),
            Shape::Arc { centre, radius, .. } => {
                let (sine, cosine) = parameter.sin_cos();
                (centre + Vector2::new(cosine, sine) * radius, Vector2::new(-sine, cosine))
            }
        }
    }

    /// The points of a part of the piece where a linear field `v + omega x r` can be greatest: the ends, and on an
    /// arc the point farthest from the centre of the field.
    #[must_use]
    pub fn farthest(&self, field: &Triple, (low, high): (f64, f64)) -> Vec<Vector2<f64>> {
        let mut places = vec![self.frame(low).0, self.frame(high).0];
        if let Shape::Arc { centre, .. } = self.shape {
            // Away from the centre of the field through the arc's centre; the field there is square to that.
            let at_centre = displacement(field, &centre) * field.z.signum();
            if at_centre.norm() > 0.0 && field.z != 0.0 {
                let away = (-at_centre.x).atan2(at_centre.y);
                let parameter = low + (away - low).rem_euclid(std::f64::consts::TAU);
                if parameter < high {
                    places.push(self.frame(parameter).0);
                }
            }
        }
        places
    }

    /// Scaled length per unit of parameter.
    #[must_use]
    pub fn stretch(&self) -> f64 {
        match self.shape {
            Shape::Straight { .. } => 1.0,
            Shape::Arc { radius, .. } => radius,
        }
    }
}

/// Displacement of the scaled point `at` under the motion `q`, mm.
#[must_use]
pub fn displacement(q: &Triple, at: &Vector2<f64>) -> Vector2<f64> {
    Vector2::new(q.x - q.z * at.y, q.y + q.z * at.x)
}

/// Components of a displacement along and across the weld axis.
#[must_use]
pub fn along_and_across(u: &Vector2<f64>, tangent: &Vector2<f64>) -> (f64, f64) {
    (u.dot(tangent), tangent.perp(u))
}

//! Properties of a weld group treated as lines, weighted by throat.
//!
//! | symbol | code | unit | meaning |
//! |---|---|---|---|
//! | L | `length` | mm | length of weld, both sides of double-sided welds |
//! | A | `throat_area` | mm^2 | integral of t ds |
//! | c | `centroid` | mm | integral of t x ds / A |
//! | I_x, I_y, I_xy | `i_x`, `i_y`, `i_xy` | mm^4 | integrals of t y^2, t x^2, t x y ds about c |
//! | J | `j` | mm^4 | I_x + I_y |
//!
//! Straight run of length l, middle m, direction (a, b): `integral x^2 ds = l (m_x^2 + l^2 a^2 / 12)`.
//! Arc of radius R, centre k, from phi_0 to phi_1: closed forms in sines of phi and 2 phi.
//! Source: elementary calculus; the treatment of welds as lines is that of the elastic vector method.
//! The throat's own width is neglected, as the method does.

use crate::model::{Run, Vector, WeldGroup};

/// Properties of the welds treated as lines, weighted by throat.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Section {
    /// Length of weld (both sides of double-sided welds), mm.
    pub length: f64,
    /// Throat area, mm^2.
    pub throat_area: f64,
    /// Centroid, mm.
    pub centroid: Vector,
    /// Integral of throat y^2 about the centroid, mm^4.
    pub i_x: f64,
    /// Integral of throat x^2 about the centroid, mm^4.
    pub i_y: f64,
    /// Integral of throat x y about the centroid, mm^4.
    pub i_xy: f64,
    /// Polar: i_x + i_y, mm^4.
    pub j: f64,
}

impl Section {
    /// The properties of a group.
    #[must_use]
    pub fn of(group: &WeldGroup) -> Self {
        let mut length = 0.0;
        let mut throat_area = 0.0;
        let mut first = Vector::zeros();
        let throats_and_runs =
            || group.welds().iter().flat_map(|weld| weld.runs.iter().map(move |run| (weld, run)));
        // Moments are taken about a point of the group first, so that a group far from the origin loses no digits.
        let origin = group.welds()[0].runs[0].point(0.5);
        for (weld, run) in throats_and_runs() {
            length += run.length() * f64::from(weld.sides);
            throat_area += weld.total_throat() * run.length();
            first += middle_moment(run, origin) * weld.total_throat();
        }
        let centroid = (origin + first / throat_area).map(|coordinate| {
            // What rounding leaves of a zero, against the size of the group.
            if coordinate.abs() <= 4.0 * f64::EPSILON * length { 0.0 } else { coordinate }
        });
        let (mut i_x, mut i_y, mut i_xy) = (0.0, 0.0, 0.0);
        for (weld, run) in throats_and_runs() {
            let [xx, yy, xy] = second_moments(run, centroid);
            i_x += weld.total_throat() * yy;
            i_y += weld.total_throat() * xx;
            i_xy += weld.total_throat() * xy;
        }
        Self { length, throat_area, centroid, i_x, i_y, i_xy, j: i_x + i_y }
    }
}

/// Integral of (x - about) ds over a run, mm^2.
pub(super) fn middle_moment(run: &Run, about: Vector) -> Vector {
    match run {
        Run::Straight { from, to } => ((from + to) * 0.5 - about) * run.length(),
        Run::Arc { centre, radius, start, sweep } => {
            let end = start + sweep;
            let turn = Vector::new(end.sin() - start.sin(), start.cos() - end.cos(), 0.0) * sweep.signum();
            (centre - about) * run.length() + turn * (radius * radius)
        }
    }
}

/// Integrals of x^2, y^2 and x y ds over a run about a point, mm^3.
pub(super) fn second_moments(run: &Run, about: Vector) -> [f64; 3] {
    let length = run.length();
    match run {
        Run::Straight { from, to } => {
            let middle = (from + to) * 0.5 - about;
            let span = to - from;
            let own = length / 12.0;
            [
                length * middle.x * middle.x + own * span.x * span.x,
                length * middle.y * middle.y + own * span.y * span.y,
                length * middle.x * middle.y + own * span.x * span.y,
            ]
        }
        Run::Arc { centre, radius, start, sweep } => {
            let (k, r, end) = (centre - about, *radius, start + sweep);
            let sign = sweep.signum();
            let cosines = (end.sin() - start.sin()) * sign;
            let sines = (start.cos() - end.cos()) * sign;
            let double = ((2.0 * end).sin() - (2.0 * start).sin()) * sign / 4.0;
            let cos_squared = sweep.abs() / 2.0 + double;
            let sin_squared = sweep.abs() / 2.0 - double;
            let sin_cos = (end.sin().powi(2) - start.sin().powi(2)) * sign / 2.0;
            [
                k.x * k.x * length + 2.0 * k.x * r * r * cosines + r.powi(3) * cos_squared,
                k.y * k.y * length + 2.0 * k.y * r * r * sines + r.powi(3) * sin_squared,
                k.x * k.y * length + r * r * (k.x * sines + k.y * cosines) + r.powi(3) * sin_cos,
            ]
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::model::{Filler, FilletSize, Weld};
    use std::f64::consts::{FRAC_PI_2, PI, TAU};

    fn group(runs: Vec<Run>) -> WeldGroup {
        let weld = Weld {
            name: "w".into(),
            runs,
            size: FilletSize::from_throat(1.0, FRAC_PI_2).unwrap(),
            filler: Filler::new(None, 490.0).unwrap(),
            sides: 1,
            plates: vec![],
            set: None,
        };
        WeldGroup::new(vec![weld]).unwrap()
    }

    fn at(x: f64, y: f64) -> Vector {
        Vector::new(x, y, 0.0)
    }

    fn close(a: f64, b: f64) {
        assert!((a - b).abs() <= 1e-12 * a.abs().max(b.abs()).max(1.0), "{a} against {b}");
    }

    #[test]
    fn c_shape_by_its_closed_form() {
        // l = 10, returns k l = 5: x_l = k^2 l / (1 + 2k), independent of this code.
        let section = Section::of(&group(vec![
            Run::straight(at(5.0, 0.0), at(0.0, 0.0)).unwrap(),
            Run::straight(at(0.0, 0.0), at(0.0, 10.0)).unwrap(),
            Run::straight(at(0.0, 10.0), at(5.0, 10.0)).unwrap(),
        ]));
        close(section.length, 20.0);
        close(section.centroid.x, 1.25);
        close(section.centroid.y, 5.0);
        close(section.i_x, 1000.0 / 12.0 + 2.0 * 5.0 * 25.0);
        close(section.i_y, 2.0 * (125.0 / 12.0 + 5.0 * 1.25 * 1.25) + 10.0 * 1.25 * 1.25);
        close(section.i_xy, 0.0);
    }

    #[test]
    fn ring_and_half_ring_by_their_closed_forms() {
        let r = 40.0;
        let ring = Section::of(&group(vec![Run::arc(at(7.0, -3.0), r, 0.3, TAU).unwrap()]));
        close(ring.centroid.x, 7.0);
        close(ring.i_x, PI * r.powi(3));
        close(ring.j, TAU * r.powi(3));
        let half = Section::of(&group(vec![Run::arc(at(0.0, 0.0), r, PI, -PI).unwrap()]));
        close(half.centroid.y, 2.0 * r / PI);
        close(half.i_y, PI * r.powi(3) / 2.0);
        close(half.i_x, PI * r.powi(3) / 2.0 - PI * r * (2.0 * r / PI).powi(2));
    }

    #[test]
    fn l_shape_has_a_product_of_inertia() {
        // legs a along y and b along x from a corner: I_xy about the centroid = -a^2 b^2 / (4 (a + b)).
        let (a, b) = (11.5, 4.0);
        let section = Section::of(&group(vec![
            Run::straight(at(0.0, a), at(0.0, 0.0)).unwrap(),
            Run::straight(at(0.0, 0.0), at(b, 0.0)).unwrap(),
        ]));
        close(section.i_xy, -a * a * b * b / (4.0 * (a + b)));
    }
}

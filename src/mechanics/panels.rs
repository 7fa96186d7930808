//! Where a piece of weld is cut for quadrature under a given motion.
//!
//! Along a run the strength depends on `u_t` (constant on a straight run) and `u_n` (linear in s). It is
//! smooth except at the feet, where `u_n = 0`: there theta has a kink, `sin^1.5 theta` a half power, and at
//! a complex distance of about h (where |u| = 0) a branch point. Close to the instantaneous centre h shrinks
//! to zero and the strength starts like a power of the distance. So each piece is cut
//!
//! * at its feet, and at distances `first h, first h ratio, first h ratio^2, ...` from them;
//! * on arcs also where `u_t = 0` (theta is folded at 90 degrees) and into parts of limited angle;
//! * where the deformation meets a kink of the law.
//!
//! In the cell next to a foot the distance is substituted by `z^2` (half powers become smooth), or by
//! `z^5` where the centre lies on the weld itself (a start like s^0.3 becomes z^1.5 dz^5, smooth enough).
//!
//! | symbol | code | unit | meaning |
//! |---|---|---|---|
//! | - | `Foot::at` | scaled length or rad | parameter of a foot |
//! | h | `Foot::scale` | scaled length or rad | `|u_t| / |d u_n / d s|` at the foot |
//!
//! Source: standard graded quadrature; the cuts were chosen by measurement (`tests/suite/reference.rs` holds the result).

use super::law;
use super::plane::{Piece, PlaneGroup, Shape, Triple, along_and_across, displacement};
use crate::numerics::{GaussLegendre, root};
use std::f64::consts::{FRAC_PI_2, PI, TAU};

/// How finely the weld is integrated.
#[derive(Debug, Clone)]
pub struct Quadrature {
    /// Nodes in each panel.
    pub rule: GaussLegendre,
    /// Distance of the first cut from a foot, in h. Below about 0.1 the branch point of the deformation
    /// limits at theta = -2 degrees stays outside the ellipse of convergence.
    pub first: f64,
    /// Ratio of successive distances from a foot.
    pub ratio: f64,
}

impl Quadrature {
    /// Fine panels with this many nodes each; 10 give about 1e-11.
    #[must_use]
    pub fn fine(points: u16) -> Self {
        Self { rule: GaussLegendre::new(points), first: 0.05, ratio: 3.0 }
    }

    /// Coarse panels for searches: about 1e-4.
    #[must_use]
    pub fn coarse() -> Self {
        Self { rule: GaussLegendre::new(4), first: 0.1, ratio: 6.0 }
    }
}

/// Share of the range below which h counts as zero: the centre lies on the weld.
const ON_THE_WELD: f64 = 1e-9;
/// Widest panel on an arc, rad.
const WIDEST_ARC_PANEL: f64 = 0.7;

#[derive(Debug, Clone, Copy)]
struct Foot {
    at: f64,
    scale: f64,
    /// Distances up to this are substituted by `z^power`.
    reach: f64,
    power: i32,
    /// Cuts are graded up to this distance; on an arc the next foot takes over after a quarter turn.
    span: f64,
}

/// Reusable storage for the cuts of one piece.
#[derive(Debug, Default)]
pub(super) struct Panels {
    cuts: Vec<f64>,
    feet: Vec<Foot>,
}

impl Panels {
    /// Cuts the part `(low, high)` of a piece for the motion `q`.
    pub(super) fn cut(
        &mut self,
        group: &PlaneGroup,
        piece: &Piece,
        q: &Triple,
        (low, high): (f64, f64),
        quadrature: &Quadrature,
    ) {
        self.cuts.clear();
        self.feet.clear();
        self.cuts.push(low);
        match piece.shape {
            Shape::Straight { from, tangent, .. } => {
                let (along, across) = along_and_across(&displacement(q, &from), &tangent);
                let foot = -across / q.z;
                if foot.is_finite() {
                    self.add_foot(group, (foot, (along / q.z).abs()), high - low, f64::INFINITY, quadrature);
                }
            }
            Shape::Arc { centre, radius, .. } => {
                self.add_arc_feet(group, q, (low, high), displacement(q, &centre), radius, quadrature);
            }
        }
        self.grade(low, high, quadrature);
        self.sort(low, high);
        if !group.kink_levels.is_empty() || !group.kink_angles.is_empty() {
            self.add_kinks(group, piece, q);
            self.sort(low, high);
        }
    }

    fn sort(&mut self, low: f64, high: f64) {
        self.cuts.retain(|cut| *cut >= low && *cut < high);
        self.cuts.sort_by(f64::total_cmp);
        self.cuts.push(high);
        self.cuts.dedup();
    }

    fn add_foot(
        &mut self,
        group: &PlaneGroup,
        (at, scale): (f64, f64),
        range: f64,
        span: f64,
        quadrature: &Quadrature,
    ) {
        let on_the_weld = scale < ON_THE_WELD * range;
        let (reach, power) = match (on_the_weld, group.kink_levels.is_empty()) {
            (false, _) => (quadrature.first * scale, 2),
            (true, true) => (1e-2 * range, 5),
            (true, false) => (1e-6 * range, 5),
        };
        self.feet.push(Foot { at, scale, reach, power, span });
    }

    /// Feet of an arc: with `u_c` the displacement of its centre, `u_n = |u_c| cos(phi - phi_c)` and
    /// `u_t = omega R - |u_c| sin(phi - phi_c)`.
    fn add_arc_feet(
        &mut self,
        group: &PlaneGroup,
        q: &Triple,
        (low, high): (f64, f64),
        of_centre: nalgebra::Vector2<f64>,
        radius: f64,
        quadrature: &Quadrature,
    ) {
        let size = of_centre.norm();
        let turning = q.z * radius;
        if size > 0.0 {
            let toward = of_centre.y.atan2(of_centre.x);
            for (foot, along) in [(toward + FRAC_PI_2, turning - size), (toward - FRAC_PI_2, turning + size)]
            {
                for at in turns(foot, low - FRAC_PI_2, high + FRAC_PI_2) {
                    self.add_foot(group, (at, (along / size).abs()), high - low, FRAC_PI_2, quadrature);
                }
            }
            let sine = turning / size;
            if sine.abs() < 1.0 {
                for zero in [toward + sine.asin(), toward + PI - sine.asin()] {
                    self.cuts.extend(turns(zero, low, high));
                }
            }
            // Beyond a quarter turn from a foot the next foot takes over.
            self.cuts.extend(turns(toward, low, high));
            self.cuts.extend(turns(toward + PI, low, high));
        }
        let parts = ((high - low) / WIDEST_ARC_PANEL).ceil();
        let mut part = 1.0;
        while part < parts {
            self.cuts.push(low + part * (high - low) / parts);
            part += 1.0;
        }
    }

    /// Graded cuts around every foot.
    fn grade(&mut self, low: f64, high: f64, quadrature: &Quadrature) {
        for index in 0..self.feet.len() {
            let Foot { at, reach, span, .. } = self.feet[index];
            if at > low && at < high {
                self.cuts.push(at);
            }
            if reach <= 0.0 {
                continue;
            }
            for (nearest, farthest, sign) in [(low - at, high - at, 1.0), (at - high, at - low, -1.0)] {
                let farthest = farthest.min(span);
                if farthest <= reach {
                    continue;
                }
                let mut distance = reach;
                if nearest > reach {
                    distance *=
                        quadrature.ratio.powf(((nearest / reach).ln() / quadrature.ratio.ln()).floor());
                }
                while distance < farthest {
                    self.cuts.push(at + sign * distance);
                    distance *= quadrature.ratio;
                }
            }
        }
    }

    /// Cuts where the law has a kink in deformation or angle.
    fn add_kinks(&mut self, group: &PlaneGroup, piece: &Piece, q: &Triple) {
        let local = |parameter: f64| {
            let (at, tangent) = piece.frame(parameter);
            let u = displacement(q, &at);
            let (along, across) = along_and_across(&u, &tangent);
            (across.abs().atan2(along.abs()), u.norm() / piece.size)
        };
        let level = |parameter: f64| {
            let (angle, deformation) = local(parameter);
            law::level(&group.law, angle, deformation)
        };
        let panels = self.cuts.len() - 1;
        for index in 0..panels {
            let (a, b) = (self.cuts[index], self.cuts[index + 1]);
            let middle = 0.5 * (a + b);
            for (from, to) in [(a, middle), (middle, b)] {
                for knot in &group.kink_levels {
                    self.cuts.extend(root(|parameter| level(parameter) - knot, from, to));
                }
                for knot in &group.kink_angles {
                    self.cuts.extend(root(|parameter| local(parameter).0 - knot, from, to));
                }
            }
        }
    }

    /// Visits every node: parameter and weight (per unit of parameter).
    pub(super) fn visit(&self, rule: &GaussLegendre, mut node: impl FnMut(f64, f64)) {
        for pair in self.cuts.windows(2) {
            let (a, b) = (pair[0], pair[1]);
            match self.feet.iter().find(|foot| foot.substitutes(a, b)) {
                None => {
                    let (middle, half) = (0.5 * (a + b), 0.5 * (b - a));
                    for (x, weight) in rule.iter() {
                        node(middle + half * x, half * weight);
                    }
                }
                Some(foot) => {
                    let sign = if a + b > 2.0 * foot.at { 1.0 } else { -1.0 };
                    let exponent = 1.0 / f64::from(foot.power);
                    let from = (a - foot.at).abs().powf(exponent);
                    let to = (b - foot.at).abs().powf(exponent);
                    let (middle, half) = (0.5 * (from + to), 0.5 * (to - from).abs());
                    for (x, weight) in rule.iter() {
                        let z = middle + half * x;
                        let lower = z.powi(foot.power - 1);
                        node(foot.at + sign * lower * z, half * weight * f64::from(foot.power) * lower);
                    }
                }
            }
        }
    }
}

impl Foot {
    /// Whether the panel lies in the reach of this foot, near enough for the substitution to matter.
    fn substitutes(&self, a: f64, b: f64) -> bool {
        let slack = 1e-12 * self.reach;
        let near = (a - self.at).abs().min((b - self.at).abs()) <= (b - a);
        near && a >= self.at - self.reach - slack
            && b <= self.at + self.reach + slack
            && self.scale.is_finite()
    }
}

/// The angles `angle + 2 pi k` strictly between `low` and `high`.
fn turns(angle: f64, low: f64, high: f64) -> impl Iterator<Item = f64> {
    let first = angle + TAU * ((low - angle) / TAU).ceil();
    (0..4_u8).map(move |k| first + TAU * f64::from(k)).take_while(move |turn| *turn < high)
}

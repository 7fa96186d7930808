//! How near a motion is to the rupture of the first point of the weld.
//!
//! `g(q) = max over the weld of |u| / Delta_u(theta)`; the group ruptures at g = 1, and g is homogeneous of
//! degree one, so `q / g(q)` is the motion at rupture in the direction of q.
//!
//! | symbol | code | unit | meaning |
//! |---|---|---|---|
//! | g | `Utmost::ratio` | - | largest deformation ratio |
//! | dg/dq | `Utmost::gradient` | 1/mm | at fixed place (exact for a smooth maximum) |
//!
//! On a straight run |u| and theta both grow away from the foot, so where Delta_u falls with theta the
//! maximum lies at an end. On arcs, and for a user's curve whose limit grows with theta, it is searched: ends,
//! smooth interior maxima between samples, and on arcs the points where `u_t = 0` (there theta = 90 degrees is
//! a ridge; the place moves with q so that u_t stays zero, and the gradient follows it).
//! For a law without limit `g = |q|`, a mere normalisation.

use super::law::{Direction, rupture_limit, ruptures};
use super::plane::{Piece, PlaneGroup, Shape, Triple, along_and_across, displacement};
use crate::numerics::maximise;
use nalgebra::Vector2;
use std::f64::consts::{FRAC_PI_2, PI};

/// The point nearest to rupture under a motion.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Utmost {
    /// Deformation over its limit.
    pub ratio: f64,
    /// Derivative by the motion.
    pub gradient: Triple,
    /// Index of the piece.
    pub piece: usize,
    /// Scaled position.
    pub at: Vector2<f64>,
    /// Angle between displacement and weld axis, rad.
    pub angle: f64,
    /// Displacement, mm.
    pub deformation: f64,
}

/// Samples along a piece on which interior maxima are searched.
const SAMPLES: u8 = 24;
/// Step of a difference quotient over the size of the motion: the maximum is known to about 1e-12.
const DIFFERENCE: f64 = 1e-6;
/// A sampled maximum is closed in on from this share of the largest sample: between samples of a quarter turn
/// over 6 the ratio rises by a few percent at most.
const NEARLY_THE_LARGEST: f64 = 0.9;

impl PlaneGroup {
    /// The point of the group nearest to rupture under the motion `q`; `None` when nothing moves.
    ///
    /// For a law without limit the ratio is the size of the motion and the place is the point that moves most.
    /// Where a limit grows with the angle, ridges of the ratio move along the weld with q in ways that the
    /// gradient at a fixed place does not follow: inside a run it is then taken by differences of the maximum.
    #[must_use]
    pub fn utmost(&self, q: &Triple) -> Option<Utmost> {
        let mut utmost = self.nearest_to_rupture(q)?;
        if !self.ruptures_at_ends && self.elements.is_empty() && !self.at_an_end(&utmost) {
            let step = DIFFERENCE * q.norm();
            for axis in 0..3 {
                let mut aside = Triple::zeros();
                aside[axis] = step;
                let (after, before) =
                    (self.nearest_to_rupture(&(q + aside))?, self.nearest_to_rupture(&(q - aside))?);
                utmost.gradient[axis] = (after.ratio - before.ratio) / (2.0 * step);
            }
        }
        Some(utmost)
    }

    fn at_an_end(&self, utmost: &Utmost) -> bool {
        let piece = &self.pieces[utmost.piece];
        let (low, high) = piece.range();
        [low, high].iter().any(|end| piece.frame(*end).0 == utmost.at)
    }

    fn nearest_to_rupture(&self, q: &Triple) -> Option<Utmost> {
        let mut best: Option<Utmost> = None;
        let mut offer = |candidate: Option<Utmost>| {
            if let Some(candidate) = candidate
                && best.is_none_or(|known| candidate.ratio > known.ratio)
            {
                best = Some(candidate);
            }
        };
        if self.elements.is_empty() {
            for (index, piece) in self.pieces.iter().enumerate() {
                let (low, high) = piece.range();
                offer(self.at_parameter(q, index, piece, low));
                offer(self.at_parameter(q, index, piece, high));
                if let Shape::Arc { .. } = piece.shape {
                    self.inside(q, index, piece, &mut offer);
                    self.transverse_points(q, index, piece, &mut offer);
                } else if !self.ruptures_at_ends {
                    self.inside(q, index, piece, &mut offer);
                }
            }
        } else {
            for element in &self.elements {
                offer(self.at_point(q, element.piece, element.at, &element.tangent, element.size));
            }
        }
        let mut utmost = best?;
        if !ruptures(&self.law) {
            let size = q.norm();
            utmost.ratio = size;
            utmost.gradient = q / size;
        }
        utmost.ratio.is_normal().then_some(utmost)
    }

    fn at_parameter(&self, q: &Triple, index: usize, piece: &Piece, parameter: f64) -> Option<Utmost> {
        let (at, tangent) = piece.frame(parameter);
        self.at_point(q, index, at, &tangent, piece.size)
    }

    fn at_point(
        &self,
        q: &Triple,
        piece: usize,
        at: Vector2<f64>,
        tangent: &Vector2<f64>,
        size: f64,
    ) -> Option<Utmost> {
        let u = displacement(q, &at);
        let deformation = u.norm();
        if deformation <= f64::MIN_POSITIVE {
            return None;
        }
        let (along, across) = along_and_across(&u, tangent);
        let Direction { angle, sense, .. } = Direction::of(along, across);
        let (limit, limit_slope) = rupture_limit(&self.law, angle).unwrap_or((1.0, 0.0));
        let ratio = deformation / (size * limit);
        // d theta / du = sigma n / |u|, n the normal of u.
        let e = u / deformation;
        let by_u = e * (ratio / deformation)
            - Vector2::new(-e.y, e.x) * (ratio * limit_slope / limit * sense / deformation);
        let gradient = Triple::new(by_u.x, by_u.y, at.x * by_u.y - at.y * by_u.x);
        Some(Utmost { ratio, gradient, piece, at, angle, deformation })
    }

    /// Offers the smooth maxima inside a piece.
    fn inside(&self, q: &Triple, index: usize, piece: &Piece, offer: &mut impl FnMut(Option<Utmost>)) {
        let (low, high) = piece.range();
        let step = (high - low) / f64::from(SAMPLES);
        let ratio =
            |parameter: f64| self.at_parameter(q, index, piece, parameter).map_or(0.0, |utmost| utmost.ratio);
        let mut values = [0.0; SAMPLES as usize + 1];
        for (k, value) in (0..=SAMPLES).zip(&mut values) {
            *value = ratio(low + step * f64::from(k));
        }
        let worth_a_look = NEARLY_THE_LARGEST * values.iter().copied().fold(0.0, f64::max);
        for k in 0..=SAMPLES {
            let here = usize::from(k);
            let before = if k == 0 { 0.0 } else { values[here - 1] };
            let after = values.get(here + 1).copied().unwrap_or(0.0);
            if values[here] >= before.max(after).max(worth_a_look) {
                let middle = low + step * f64::from(k);
                let (place, _) = maximise(ratio, (middle - step).max(low), (middle + step).min(high));
                offer(self.at_parameter(q, index, piece, place));
            }
        }
    }

    /// Offers the points of an arc where the displacement is square to it.
    ///
    /// With `u_c` the displacement of the arc's centre and `T = omega R`, `u_t = 0` where
    /// `sin(phi - phi_c) = T / |u_c|`, and there `|u| = sqrt(|u_c|^2 - T^2)` whatever q does.
    fn transverse_points(
        &self,
        q: &Triple,
        index: usize,
        piece: &Piece,
        offer: &mut impl FnMut(Option<Utmost>),
    ) {
        let Shape::Arc { centre, radius, low, high } = piece.shape else { return };
        let of_centre = displacement(q, &centre);
        let (size, turning) = (of_centre.norm(), q.z * radius);
        if turning.abs() >= size {
            return;
        }
        let toward = of_centre.y.atan2(of_centre.x);
        let lean = (turning / size).asin();
        let deformation = (size * size - turning * turning).sqrt();
        let (limit, _) = rupture_limit(&self.law, FRAC_PI_2).unwrap_or((1.0, 0.0));
        let ratio = deformation / (piece.size * limit);
        for angle in [toward + lean, toward + PI - lean] {
            let phi = low + (angle - low).rem_euclid(2.0 * PI);
            if phi >= high || deformation <= 1e-6 * size {
                continue;
            }
            let by_centre = of_centre / deformation;
            let gradient = Triple::new(
                by_centre.x,
                by_centre.y,
                centre.x * by_centre.y - centre.y * by_centre.x - turning * radius / deformation,
            ) / (piece.size * limit);
            let (at, _) = piece.frame(phi);
            offer(Some(Utmost { ratio, gradient, piece: index, at, angle: FRAC_PI_2, deformation }));
        }
    }
}

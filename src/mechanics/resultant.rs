//! The wrench a group resists under a given motion, and its tangent.
//!
//! `W(q) = sum over pieces of the integral of B^T f ds`, with the force per length `f = S s(theta, |u|/w) u/|u|`
//! and `B = [1 0 -y; 0 1 x]`, so that `u = B q`. The tangent is `K = integral of B^T (df/du) B ds` with
//!
//! `df/du = S [ (s_d / w) e e^T + (1/|u|) (s n n^T + sigma s_theta e n^T) ]`,
//!
//! e the direction of u, n the normal to it, sigma the sign of d theta / d phi.
//!
//! | symbol | code | unit | meaning |
//! |---|---|---|---|
//! | q | `q` | mm | motion (v_x, v_y, omega rho) |
//! | W | `wrench` | N | (F_x, F_y, M / rho) the motion carries; equals the load in equilibrium |
//! | K | `tangent` | N/mm | dW/dq; not symmetric, since s depends on the direction |
//!
//! At a point that does not move the force is zero; its tangent, infinite there but integrable, is left out.

use super::law::{Direction, response};
use super::panels::{Panels, Quadrature};
use super::plane::{Piece, PlaneGroup, Triple, along_and_across, displacement};
use nalgebra::{Matrix3, Vector2};

/// A wrench and its tangent.
#[derive(Debug, Clone, Copy, Default, PartialEq)]
pub struct Resultant {
    /// (F_x, F_y, M / rho), N.
    pub wrench: Triple,
    /// dW/dq, N/mm.
    pub tangent: Matrix3<f64>,
}

impl PlaneGroup {
    /// The wrench that the motion `q` carries, by quadrature or by the group's elements.
    #[must_use]
    pub fn resultant(&self, q: &Triple, quadrature: &Quadrature) -> Resultant {
        let mut sum = Resultant::default();
        if !self.elements.is_empty() {
            for element in &self.elements {
                sum.add(self, q, &element.at, &element.tangent, element.strength, element.size);
            }
            return sum;
        }
        let mut panels = Panels::default();
        for piece in &self.pieces {
            sum.integrate(self, piece, piece.range(), q, quadrature, &mut panels);
        }
        sum
    }
}

impl Resultant {
    /// Adds the integral over the part `range` of a piece.
    pub(super) fn integrate(
        &mut self,
        group: &PlaneGroup,
        piece: &Piece,
        range: (f64, f64),
        q: &Triple,
        quadrature: &Quadrature,
        panels: &mut Panels,
    ) {
        panels.cut(group, piece, q, range, quadrature);
        let strength = piece.strength * piece.stretch();
        panels.visit(&quadrature.rule, |parameter, weight| {
            let (at, tangent) = piece.frame(parameter);
            self.add(group, q, &at, &tangent, strength * weight, piece.size);
        });
    }

    /// Adds the force of a stretch of weld of longitudinal strength `strength` (N) at a point.
    pub(super) fn add(
        &mut self,
        group: &PlaneGroup,
        q: &Triple,
        at: &Vector2<f64>,
        tangent: &Vector2<f64>,
        strength: f64,
        size: f64,
    ) {
        let u = displacement(q, at);
        let length = u.norm();
        if length <= f64::MIN_POSITIVE {
            return;
        }
        let (along, across) = along_and_across(&u, tangent);
        let direction = Direction::of(along, across);
        let local = response(&group.law, &direction, length / size);
        let e = u / length;
        let force = e * (strength * local.strength);
        self.wrench += lever(at, &force);
        // Columns of df/du applied to B = [1 0 -y; 0 1 x].
        let stiffness_along = strength * local.by_deformation / size;
        let stiffness_turn = strength * local.strength / length;
        let coupling = direction.sense * strength * local.by_angle / length;
        let n = Vector2::new(-e.y, e.x);
        // Row vectors e^T B and n^T B.
        let e_b = Triple::new(e.x, e.y, at.x * e.y - at.y * e.x);
        let n_b = Triple::new(n.x, n.y, at.x * n.y - at.y * n.x);
        self.tangent += e_b * (e_b * stiffness_along + n_b * coupling).transpose()
            + n_b * (n_b * stiffness_turn).transpose();
    }
}

/// (f_x, f_y, x f_y - y f_x).
fn lever(at: &Vector2<f64>, force: &Vector2<f64>) -> Triple {
    Triple::new(force.x, force.y, at.x * force.y - at.y * force.x)
}

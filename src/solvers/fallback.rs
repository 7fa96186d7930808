//! Fallback when Newton's method finds no state: a direct search that needs no derivative.
//!
//! The unbalance `|W(q)/|W(q)| - L|` is minimised over the two tangential coordinates of the direction of q
//! by the simplex method of Nelder and Mead (argmin), from the sampled motion whose load lies nearest. It serves
//! points where the equations have a kink exactly at the solution.
//!
//! Source: Nelder and Mead, Computer Journal 7 (1965) 308.

use super::equilibrium::Iterate;
use crate::mechanics::{PlaneGroup, Quadrature, Triple};
use argmin::core::{CostFunction, Error, Executor, State};
use argmin::solver::neldermead::NelderMead;

struct Unbalance<'a> {
    group: &'a PlaneGroup,
    direction: &'a Triple,
    quadrature: &'a Quadrature,
    centre: Triple,
    axes: [Triple; 2],
}

impl Unbalance<'_> {
    fn motion(&self, coordinates: &[f64]) -> Triple {
        self.centre + self.axes[0] * coordinates[0] + self.axes[1] * coordinates[1]
    }
}

impl CostFunction for Unbalance<'_> {
    type Param = Vec<f64>;
    type Output = f64;

    fn cost(&self, coordinates: &Vec<f64>) -> Result<f64, Error> {
        let state = Iterate::at(self.group, &self.motion(coordinates), self.direction, self.quadrature);
        Ok(state.map_or(2.0, |state| state.unbalance))
    }
}

/// The motion of smallest unbalance near `start`, by direct search over simplices of the given first size.
pub(super) fn direct_search(
    group: &PlaneGroup,
    start: &Triple,
    direction: &Triple,
    quadrature: &Quadrature,
    size: f64,
) -> Option<Triple> {
    let centre = start.normalize();
    let aside = if centre.z.abs() < 0.7 { Triple::z() } else { Triple::x() };
    let first = centre.cross(&aside).normalize();
    let axes = [first, centre.cross(&first)];
    let problem = Unbalance { group, direction, quadrature, centre, axes };
    let simplex = vec![vec![0.0, 0.0], vec![size, 0.0], vec![0.5 * size, size]];
    let solver = NelderMead::new(simplex).with_sd_tolerance(1e-15).ok()?;
    let result = Executor::new(problem, solver)
        .configure(|state| state.max_iters(400).target_cost(1e-14))
        .run()
        .ok()?;
    let coordinates = result.state().get_best_param()?.clone();
    Some(centre + axes[0] * coordinates[0] + axes[1] * coordinates[1])
}
